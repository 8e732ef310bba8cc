//! The example plans: each opens, accounts, closes and is stored in the writer's own layout; key figures recomputed by
//! hand from the amounts in the plan, with the arithmetic shown.
//!
//! Densities at 20 °C in the hand calculations are from memory, to three or four digits: n-hexane 0.659, acetone 0.790,
//! dichloromethane 1.326, ethyl acetate 0.900, ethanol 0.789 g/mL. So they witness the bookkeeping; the catalogue's own
//! densities have their evidence elsewhere.
// Helpers of tests may panic: that is how a test fails.
#![allow(clippy::unwrap_used, clippy::panic)]

mod botanical;
mod dense;
mod every;
mod harbour;
mod prose;
mod water;

use thimbleworth::account::{Account, RouteAccount, account_text};
use thimbleworth::compare::{RouteComparison, compare};
use thimbleworth::example::example;

fn accounted(key: &str) -> Account {
    account_text(example(key).unwrap().text)
}

fn route<'a>(account: &'a Account, workload: usize, name: &str) -> &'a RouteAccount {
    let names = &account.program.as_ref().unwrap().workloads[workload].routes;
    let i = names.iter().position(|r| r.name == name).unwrap();
    account.workloads[workload].routes[i].as_ref().unwrap()
}

fn beside(account: &Account, workload: usize, name: &str) -> RouteComparison {
    let names = &account.program.as_ref().unwrap().workloads[workload].routes;
    let i = names.iter().position(|r| r.name == name).unwrap();
    compare(account, workload).unwrap().routes.into_iter().find(|r| r.route == i).unwrap()
}

/// A figure in the unit in which it is written: kg, L, kWh, a year.
fn a_year(account: &RouteAccount, id: &str) -> f64 {
    let figure = account.figures.iter().find(|f| f.id == id).unwrap_or_else(|| panic!("no figure {id}"));
    account.value(id).unwrap() * figure.measure.written().1
}

#[track_caller]
fn near(found: f64, by_hand: f64, relative: f64) {
    assert!(
        (found - by_hand).abs() <= relative * by_hand.abs(),
        "{found} is not {by_hand} within {relative}"
    );
}

/// Titles that fall and titles that rise.
#[track_caller]
fn direction(found: &RouteComparison, better: &[&str], worse: &[&str]) {
    assert_eq!(found.better, better, "{}", found.finding);
    assert_eq!(found.worse, worse, "{}", found.finding);
}
