//! `account` and `compare`: results in four formats.

use crate::input;
use crate::output::{Refusal, complain_of, deliver};
use clap::ValueEnum;
use std::path::PathBuf;
use std::process::ExitCode;
use thimbleworth::report::{account_table, comparison_table, markdown, result_csv, result_json};

#[derive(clap::Args)]
pub(crate) struct Args {
    /// The plan, or - for the standard input
    plan: PathBuf,
    /// What to write
    #[arg(long, value_enum, default_value_t = Format::Table)]
    format: Format,
    /// Write into this file as a whole, instead of to the standard output
    #[arg(long, value_name = "FILE")]
    output: Option<PathBuf>,
}

#[derive(Clone, Copy, ValueEnum)]
enum Format {
    /// Text for a terminal
    Table,
    /// The result document for other programs
    Json,
    /// The figures flat, for a spreadsheet
    Csv,
    /// A report to print
    Markdown,
}

/// Whether the account is asked for, or the comparison.
#[derive(Clone, Copy, PartialEq, Eq)]
pub(crate) enum What {
    Account,
    Comparison,
}

pub(crate) fn run(args: &Args, what: What) -> Result<ExitCode, Refusal> {
    let account = input::account(&args.plan)?;
    if account.broken() {
        complain_of(&account.problems);
        return Err(Refusal::Said);
    }
    let compared = what == What::Comparison;
    let text = match args.format {
        Format::Table if compared => comparison_table(&account),
        Format::Table => account_table(&account),
        Format::Json => result_json(&account, compared),
        Format::Csv => result_csv(&account),
        Format::Markdown => markdown(&account),
    };
    deliver(&text, args.output.as_deref(), &args.plan)?;
    complain_of(&account.problems);
    Ok(ExitCode::SUCCESS)
}
