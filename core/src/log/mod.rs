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
mod places;
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
pub use reconcile::{
    Line, Reconciliation, Reconciling, Recorded, SolventAccount, UNCERTAINTY, USUAL_LIMITS, reconcile,
};
pub(crate) use tally::rolled;
pub use tally::{Done, Key, Sum, Tally};
pub use why::{Change, Remark, Verdict, Why};

use crate::plan::{Plan, Problem};
use crate::program::Program;

/// What is wrong or doubtful in the mappings that a plan keeps: what cannot be read, and meanings that nothing in the plan
/// bears out.
///
/// ```
/// use thimbleworth::{account::account_text, example::EXAMPLES, log::checked, plan::Log};
/// let account = account_text(EXAMPLES[0].text);
/// let mut plan = account.plan.clone().unwrap();
/// let means = vec![("Ac. roh".to_owned(), "acetonn".to_owned())];
/// plan.logs.push(Log { name: "a.csv".into(), register: "purchases".into(), means, ..Log::default() });
/// let problems = checked(&plan, account.program.as_ref());
/// assert_eq!(problems[0].path, "logs[0].means");
/// ```
#[must_use]
pub fn checked(plan: &Plan, program: Option<&Program>) -> Vec<Problem> {
    let mut problems = Vec::new();
    let known = mappings(plan, &mut problems);
    let Some(mut names) = program.map(|program| Names::of(plan, program)).filter(|_| !known.is_empty())
    else {
        return problems;
    };
    for (i, kept) in plan.logs.iter().enumerate() {
        for (name, meant) in &kept.means {
            if !names.has(meant) && !["sample", "control", "repeat"].contains(&meant.trim()) {
                problems.push(Problem::warning(
                    ["logs[", &i.to_string(), "].means"].concat(),
                    ["\"", name, "\" means \"", meant, "\", which is nothing in the plan or the catalogue"].concat(),
                    "a material, a stream, \"Work / Route\", sample, control, repeat or \"reclaimed off site\"",
                ));
            }
        }
    }
    problems
}

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
