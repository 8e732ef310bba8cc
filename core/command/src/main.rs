//! The program `thimbleworth`: files, terminal and exit status over the library of that name.
//!
//! Results go to the standard output, problems to the standard error. Exit status: 0 fine, 1 `check` found errors, 2
//! input that cannot be used, or a wrong call, 130 ended early by an interrupt.
#![forbid(unsafe_code)]

mod account;
mod case;
mod check;
mod co2;
mod demo;
mod example;
mod input;
mod log;
mod materials;
mod mix;
mod need;
mod odds;
mod output;
mod pour;
mod schema;
mod states;
mod technique;
mod trace;
mod waste;
mod workbook;

use clap::{Parser, Subcommand};
use output::Refusal;
use std::process::ExitCode;

/// What `--help` says at its end.
const AFTER: &str = "PLAN is a JSON file, or - for the standard input. Results go to the standard output, problems to the \
standard error.\nExit status: 0 fine, 1 check found errors, 2 input that cannot be used, \
130 ended early by Ctrl-C.";

/// Keeps the account of extraction routes like a set of books: where every gram goes, what leaves as waste, what is vented,
/// how hazardous it is, and what differs from the present route.
#[derive(Parser)]
#[command(name = "thimbleworth", version, after_help = AFTER)]
struct Call {
    #[command(subcommand)]
    what: Option<What>,
}

#[derive(Subcommand)]
enum What {
    /// The account of every route of a plan
    Account(account::Args),
    /// Every route beside the present one, with a finding
    Compare(account::Args),
    /// The case for switching on one page, with an annex; or what differs from an older plan
    Case(case::Args),
    /// How sure the figures are: intervals, odds against the present route, what matters most
    Odds(odds::Args),
    /// The postings, rules and inputs behind one figure
    Trace(trace::Args),
    /// Papers of the waste desk: codes, labels, contents, months, pick-ups, load
    Waste(waste::Args),
    /// May this go into that container: codes gained, what must not meet, headspace
    Pour(pour::Args),
    /// The mix of routes that lowers a figure most for what it costs
    Mix(mix::Args),
    /// All errors and warnings of a plan; exit status 1 if there is an error
    Check(check::Args),
    /// The catalogue of materials, or all figures of one with their sources
    Materials(materials::Args),
    /// The JSON schema of a plan
    Schema,
    /// The techniques, or what one asks for, its rules and sources
    Technique(technique::Args),
    /// A state of carbon dioxide, or a file of states
    Co2(co2::Args),
    /// The site's own records beside its plan: sums, reconciliation, solvent balance
    Log(log::Args),
    /// The CO2 that a recovery takes, and the state that takes least
    Need(need::Args),
    /// The example plans, or the text of one to begin from
    Example(example::Args),
}

fn main() -> ExitCode {
    let call = match Call::try_parse() {
        Ok(call) => call,
        Err(error) => {
            // Nothing can be done where even the standard error is closed.
            let _ = error.print();
            return ExitCode::from(u8::try_from(error.exit_code()).unwrap_or(2));
        }
    };
    let done = match &call.what {
        None => demo::run(),
        Some(What::Account(args)) => account::run(args, account::What::Account),
        Some(What::Compare(args)) => account::run(args, account::What::Comparison),
        Some(What::Case(args)) => case::run(args),
        Some(What::Odds(args)) => odds::run(args),
        Some(What::Trace(args)) => trace::run(args),
        Some(What::Waste(args)) => waste::run(args),
        Some(What::Pour(args)) => pour::run(args),
        Some(What::Mix(args)) => mix::run(args),
        Some(What::Check(args)) => check::run(args),
        Some(What::Materials(args)) => materials::run(args),
        Some(What::Schema) => schema::run(),
        Some(What::Technique(args)) => technique::run(args),
        Some(What::Co2(args)) => co2::run(args),
        Some(What::Log(args)) => log::run(args),
        Some(What::Need(args)) => need::run(args),
        Some(What::Example(args)) => example::run(args),
    };
    match done {
        Ok(code) => code,
        // Whoever read the output has had enough.
        Err(Refusal::Closed) => ExitCode::SUCCESS,
        Err(Refusal::Said) => ExitCode::from(2),
        Err(Refusal::Because(why)) => {
            output::complain(&format!("error: {why}"));
            ExitCode::from(2)
        }
    }
}
