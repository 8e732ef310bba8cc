//! `case`: the paper for finance and quality.

use crate::input;
use crate::odds::{INTERRUPTED, coverage, draw};
use crate::output::{Refusal, complain_of, deliver};
use std::path::PathBuf;
use std::process::ExitCode;
use thimbleworth::odds::headline;
use thimbleworth::report::{case_markdown, since_markdown};

#[derive(clap::Args)]
pub(crate) struct Args {
    /// The plan, or - for the standard input
    plan: PathBuf,
    /// How many draws
    #[arg(long, default_value_t = 10_000, value_parser = clap::value_parser!(u32).range(200..=10_000_000))]
    draws: u32,
    /// The share of draws that an interval holds, in per cent
    #[arg(long, default_value_t = 95.0)]
    coverage: f64,
    /// Write what differs from this older version of the plan, in place of the case
    #[arg(long, value_name = "PLAN")]
    since: Option<PathBuf>,
    /// Write into this file as a whole, instead of to the standard output
    #[arg(long, value_name = "FILE")]
    output: Option<PathBuf>,
}

pub(crate) fn run(args: &Args) -> Result<ExitCode, Refusal> {
    let coverage = coverage(args.coverage)?;
    let account = input::account(&args.plan)?;
    if account.broken() {
        complain_of(&account.problems);
        return Err(Refusal::Said);
    }
    let mut ended = false;
    let text = match &args.since {
        Some(older) => {
            let old = input::account(older)?;
            if old.plan.is_none() {
                complain_of(&old.problems);
                return Err(Refusal::Said);
            }
            since_markdown(&old, &account)
        }
        None => {
            let (sampled, early) = draw(&account, args.draws, &headline)?;
            ended = early;
            case_markdown(&account, &sampled, coverage)
        }
    };
    deliver(&text, args.output.as_deref(), &args.plan)?;
    complain_of(&account.problems);
    Ok(if ended { ExitCode::from(INTERRUPTED) } else { ExitCode::SUCCESS })
}
