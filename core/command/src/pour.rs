//! `pour`: may this go into that container?

use crate::input;
use crate::output::{Refusal, complain_of};
use crate::waste::{Format, hand_over};
use std::path::PathBuf;
use std::process::ExitCode;
use thimbleworth::account::site_desk;
use thimbleworth::report::{Asked, pour_paper};

#[derive(clap::Args)]
pub(crate) struct Args {
    /// The plan, or - for the standard input
    plan: PathBuf,
    /// The container: a stream of the site, or drain
    #[arg(long, value_name = "STREAM")]
    into: String,
    /// What is in the container already, such as 12 L; half of what it may hold when left out
    #[arg(long, value_name = "VOLUME")]
    held: Option<String>,
    /// What to write
    #[arg(long, value_enum, default_value_t = Format::Markdown)]
    format: Format,
    /// Write into this file as a whole, instead of to the standard output
    #[arg(long, value_name = "FILE")]
    output: Option<PathBuf>,
    /// What is poured, as one mixture: acetone="40 mL" water="1 L"
    #[arg(required = true, value_name = "MATERIAL=AMOUNT")]
    parts: Vec<String>,
}

pub(crate) fn run(args: &Args) -> Result<ExitCode, Refusal> {
    let account = input::account(&args.plan)?;
    if account.broken() {
        complain_of(&account.problems);
        return Err(Refusal::Said);
    }
    let mut parts = Vec::new();
    for part in &args.parts {
        let Some((name, amount)) = part.split_once('=') else {
            return Err(Refusal::because(format!("\"{part}\" has no amount; acetone=\"40 mL\" would do")));
        };
        parts.push((name.to_owned(), amount.to_owned()));
    }
    let desk = site_desk(&account, &[]).ok_or_else(|| Refusal::because("the plan has no program"))?;
    let asked = Asked { into: &args.into, parts: &parts, held: args.held.as_deref() };
    let paper = pour_paper(&account, &desk, &asked).map_err(Refusal::because)?;
    hand_over(&[("pour", paper)], args.format, args.output.as_deref(), &args.plan)?;
    Ok(ExitCode::SUCCESS)
}
