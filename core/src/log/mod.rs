//! The site's own records: preparation log, purchase ledger, stock count, waste consignments, cylinder returns, as CSV
//! or other delimited text.
//!
//! ```text
//! bytes ──► records ──► rows ──► sums ──► reconciliation with the plan's postings ──► solvent balance
//! ```
//!
//! Each row is used, used with a note of what was changed, or refused with its line and the reason; every sum says on how
//! many rows it stands. The files may be larger than the memory: a [`Reader`] takes bytes as they come and keeps sums.
mod amount;
mod balance;
mod column;
mod day;
mod names;
mod posted;
mod read;
mod reconcile;
mod tally;
mod text;
mod why;

pub use amount::{Decimals, LogUnit};
pub use balance::{OUTPUTS, SOLVENT_BALANCE, SolventBalance, solvent_balance};
pub use column::{Column, Mapping, Register, Role, guess, guess_as};
pub use day::{Day, DayOrder};
pub use names::{LogMaterial, LogRoute, NONE, Names, RECLAIMED};
pub use posted::Posted;
pub use read::{Reader, Reading, Rows, Unread, Unreadable};
pub use reconcile::{Line, Reconciliation, SolventAccount, UNCERTAINTY, USUAL_LIMITS, reconcile};
pub use tally::{Done, Key, Sum, Tally};
pub use why::{Change, Remark, Verdict, Why};

use crate::plan::{Plan, Problem};

/// The mappings that a plan keeps, with what is wrong among the problems.
#[must_use]
pub fn mappings(plan: &Plan, problems: &mut Vec<Problem>) -> Vec<Mapping> {
    let mut out = Vec::new();
    for (i, kept) in plan.logs.iter().enumerate() {
        let mut path = String::from("logs[");
        path.push_str(&i.to_string());
        path.push(']');
        out.extend(Mapping::of(kept, &path, problems));
    }
    out
}
