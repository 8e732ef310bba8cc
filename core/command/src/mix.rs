//! `mix`: the mix of routes that lowers a figure most for what it costs.

use crate::input;
use crate::output::{Refusal, complain_of};
use crate::waste::{Format, hand_over};
use std::path::PathBuf;
use std::process::ExitCode;
use thimbleworth::case::{Bound, HAZARDOUS_WASTE};
use thimbleworth::report::mix_paper;

#[derive(clap::Args)]
pub(crate) struct Args {
    /// The plan, or - for the standard input
    plan: PathBuf,
    /// The figure that is to be low, by its id in the account; waste.hazardous counts every hazardous stream
    #[arg(long, value_name = "FIGURE", default_value = HAZARDOUS_WASTE)]
    figure: String,
    /// How much more than the present routes it may cost a year; below zero, so much must be saved
    #[arg(long, value_name = "MONEY", allow_negative_numbers = true, conflicts_with = "price")]
    budget: Option<f64>,
    /// What each unit (kg, kWh ...) less of the figure is worth
    #[arg(long, value_name = "MONEY", allow_negative_numbers = true)]
    price: Option<f64>,
    /// What to write
    #[arg(long, value_enum, default_value_t = Format::Markdown)]
    format: Format,
    /// Write into this file as a whole, instead of to the standard output
    #[arg(long, value_name = "FILE")]
    output: Option<PathBuf>,
}

pub(crate) fn run(args: &Args) -> Result<ExitCode, Refusal> {
    let account = input::account(&args.plan)?;
    if account.broken() {
        complain_of(&account.problems);
        return Err(Refusal::Said);
    }
    for (name, value) in [("--budget", args.budget), ("--price", args.price)] {
        let fits = value.is_none_or(|v| v.is_finite() && (name == "--budget" || v >= 0.0));
        if !fits {
            return Err(Refusal::because(format!("{name} needs a plain sum of money, such as 2500")));
        }
    }
    let bound = match (args.budget, args.price) {
        (Some(more), _) => Bound::Budget(more),
        (None, Some(price)) => Bound::Price(price),
        (None, None) => Bound::None,
    };
    let paper = mix_paper(&account, &args.figure, bound).map_err(Refusal::because)?;
    hand_over(&[("mix", paper)], args.format, args.output.as_deref(), &args.plan)?;
    Ok(ExitCode::SUCCESS)
}
