//! The book: it closes, nothing is overdrawn, the bench ends empty; what must not change a figure does not; measured
//! figures, metrics, worked examples, bad input.
//!
//! Witness: conservation of mass and the definitions of the metrics, replayed here from the trace by code of its own over
//! generated plans. Where a published example is used it stands beside the check.
#![allow(
    clippy::unwrap_used,
    clippy::panic,
    clippy::needless_pass_by_value,
    reason = "functions shared by tests stand outside them"
)]

mod allocation;
mod bad_input;
mod closure;
mod figures;
mod generator;
mod invariance;
mod measured;
mod release;
mod worked;

use serde_json::Value;
use std::path::PathBuf;
use thimbleworth::account::{Account, RouteAccount, account_text};
use thimbleworth::program::RouteProgram;

/// A file beside this one.
fn beside(name: &str) -> PathBuf {
    PathBuf::from(env!("CARGO_MANIFEST_DIR")).join("ledger").join(name)
}

/// The account of a plan that has no error.
fn sound(plan: &Value) -> Account {
    let account = account_text(&plan.to_string());
    assert!(!account.broken(), "{:#?}\n{plan:#}", account.problems);
    account
}

/// Every route with its account.
fn routes(account: &Account) -> impl Iterator<Item = (&RouteProgram, &RouteAccount)> {
    let programs = account.program.iter().flat_map(|p| &p.workloads).flat_map(|w| &w.routes);
    let accounts = account.workloads.iter().flat_map(|w| &w.routes);
    programs.zip(accounts.map(|a| a.as_ref().unwrap()))
}
