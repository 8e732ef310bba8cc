//! `trace`: one figure opened.

use crate::input;
use crate::output::{Refusal, complain_of, print};
use clap::ValueEnum;
use std::path::PathBuf;
use std::process::ExitCode;
use thimbleworth::report::{Selection, trace};

#[derive(clap::Args)]
pub(crate) struct Args {
    /// The plan, or - for the standard input
    plan: PathBuf,
    /// The figure's id, as in waste.total.mass
    figure: String,
    /// The route; the present one when left out
    #[arg(long, value_name = "NAME")]
    route: Option<String>,
    /// The workload; need not be named where there is one
    #[arg(long, value_name = "NAME")]
    workload: Option<String>,
    /// What to write
    #[arg(long, value_enum, default_value_t = Format::Table)]
    format: Format,
}

#[derive(Clone, Copy, ValueEnum)]
enum Format {
    /// Text for a terminal
    Table,
    /// For other programs
    Json,
}

pub(crate) fn run(args: &Args) -> Result<ExitCode, Refusal> {
    let account = input::account(&args.plan)?;
    if account.broken() {
        complain_of(&account.problems);
        return Err(Refusal::Said);
    }
    let selection = Selection { workload: args.workload.as_deref(), route: args.route.as_deref() };
    let traced =
        trace(&account, selection, &args.figure).map_err(|error| Refusal::because(error.to_string()))?;
    print(&match args.format {
        Format::Table => traced.text(),
        Format::Json => traced.json(),
    })?;
    Ok(ExitCode::SUCCESS)
}
