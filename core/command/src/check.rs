//! `check`: everything that is wrong or doubtful in a plan.

use crate::input;
use crate::output::{Refusal, print};
use std::path::PathBuf;
use std::process::ExitCode;
use thimbleworth::log::checked;
use thimbleworth::plan::Severity;
use thimbleworth::report::problem_line;

#[derive(clap::Args)]
pub(crate) struct Args {
    /// The plan, or - for the standard input
    plan: PathBuf,
}

pub(crate) fn run(args: &Args) -> Result<ExitCode, Refusal> {
    let mut account = input::account(&args.plan)?;
    if let Some(plan) = &account.plan {
        let logs = checked(plan, account.program.as_ref());
        account.problems.extend(logs);
    }
    let mut text = String::new();
    for problem in &account.problems {
        text.push_str(&problem_line(problem));
        text.push('\n');
    }
    let count = |severity| account.problems.iter().filter(|p| p.severity == severity).count();
    let number = |n: usize, word: &str| format!("{n} {word}{}", if n == 1 { "" } else { "s" });
    text.push_str(&format!(
        "{}, {}\n",
        number(count(Severity::Error), "error"),
        number(count(Severity::Warning), "warning")
    ));
    print(&text)?;
    Ok(if account.broken() { ExitCode::from(1) } else { ExitCode::SUCCESS })
}
