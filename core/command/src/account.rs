//! `account` and `compare`: results in four formats.

use crate::input;
use crate::odds::{INTERRUPTED, coverage, draw};
use crate::output::{Refusal, complain_of, deliver};
use clap::ValueEnum;
use std::path::PathBuf;
use std::process::ExitCode;
use thimbleworth::account::Figure;
use thimbleworth::odds::headline;
use thimbleworth::report::{
    Drawn, account_table_drawn, comparison_table, markdown_drawn, odds_table, result_csv_drawn,
    result_json_drawn,
};

#[derive(clap::Args)]
pub(crate) struct Args {
    /// The plan, or - for the standard input
    plan: PathBuf,
    /// With intervals, from so many draws
    #[arg(long, value_parser = clap::value_parser!(u32).range(200..=10_000_000))]
    draws: Option<u32>,
    /// The share of draws that an interval holds, in per cent
    #[arg(long, default_value_t = 95.0, requires = "draws")]
    coverage: f64,
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
    // The table of a comparison shows the headline figures alone.
    let few = compared && matches!(args.format, Format::Table);
    let wanted = |f: &Figure| !few || headline(f);
    let coverage = coverage(args.coverage)?;
    let run = args.draws.map(|draws| draw(&account, draws, &wanted)).transpose()?;
    let drawn = run.as_ref().map(|(sampled, _)| Drawn { sampled, coverage });
    let text = match args.format {
        Format::Table if compared => {
            let mut text = comparison_table(&account);
            if let Some((sampled, _)) = &run {
                text.push('\n');
                text.push_str(&odds_table(&account, sampled, coverage));
            }
            text
        }
        Format::Table => account_table_drawn(&account, drawn),
        Format::Json => result_json_drawn(&account, compared, drawn),
        Format::Csv => result_csv_drawn(&account, drawn),
        Format::Markdown => markdown_drawn(&account, drawn),
    };
    deliver(&text, args.output.as_deref(), &args.plan)?;
    complain_of(&account.problems);
    let ended = run.is_some_and(|(_, ended)| ended);
    Ok(if ended { ExitCode::from(INTERRUPTED) } else { ExitCode::SUCCESS })
}
