//! `waste`: the papers of the waste desk.

use crate::input;
use crate::output::{Refusal, complain_of, deliver};
use clap::ValueEnum;
use std::path::PathBuf;
use std::process::ExitCode;
use thimbleworth::account::{Account, site_desk};
use thimbleworth::report::{PaperKind, paper, paper_csv, paper_markdown};

#[derive(clap::Args)]
pub(crate) struct Args {
    /// The plan, or - for the standard input
    plan: PathBuf,
    /// Which paper; several may be named, and all are written where none is
    #[arg(long, value_name = "PAPER", value_enum)]
    paper: Vec<Which>,
    /// The route that a workload takes, in place of its present one: ROUTE, or WORKLOAD/ROUTE where several have it
    #[arg(long, value_name = "ROUTE")]
    route: Vec<String>,
    /// What to write
    #[arg(long, value_enum, default_value_t = Format::Markdown)]
    format: Format,
    /// Write into this file as a whole, instead of to the standard output
    #[arg(long, value_name = "FILE")]
    output: Option<PathBuf>,
}

#[derive(Clone, Copy, ValueEnum)]
enum Format {
    /// Papers to read and to print
    Markdown,
    /// Their tables, for a spreadsheet
    Csv,
}

#[derive(Clone, Copy, PartialEq, Eq, ValueEnum)]
enum Which {
    /// Every code held against every stream, with its working
    Codes,
    /// What one batch and one result leave
    Run,
    /// The label of each container
    Label,
    /// What a full container holds, with a draft of its profile
    Drum,
    /// What is made month by month, category, headroom
    Months,
    /// Containers and pick-ups
    PickUps,
    /// The load of a year by stream, month, code and alternative
    Load,
    /// What registers and lists may ask for
    Reporting,
}

impl Which {
    const fn kind(self) -> PaperKind {
        match self {
            Self::Codes => PaperKind::Codes,
            Self::Run => PaperKind::Run,
            Self::Label => PaperKind::Label,
            Self::Drum => PaperKind::Drum,
            Self::Months => PaperKind::Months,
            Self::PickUps => PaperKind::PickUps,
            Self::Load => PaperKind::Load,
            Self::Reporting => PaperKind::Reporting,
        }
    }
}

pub(crate) fn run(args: &Args) -> Result<ExitCode, Refusal> {
    let account = input::account(&args.plan)?;
    if account.broken() {
        complain_of(&account.problems);
        return Err(Refusal::Said);
    }
    let routes = chosen(&account, &args.route)?;
    let desk = site_desk(&account, &routes).ok_or_else(|| Refusal::because("the plan has no program"))?;
    let asked = |k: &PaperKind| args.paper.is_empty() || args.paper.iter().any(|w| w.kind() == *k);
    let papers = PaperKind::ALL.iter().filter(|k| asked(k)).filter_map(|k| paper(&account, &desk, *k));
    let text: Vec<String> = papers
        .map(|p| match args.format {
            Format::Markdown => paper_markdown(&p),
            Format::Csv => paper_csv(&p),
        })
        .collect();
    let between = match args.format {
        Format::Markdown => "\n",
        Format::Csv => "\r\n",
    };
    deliver(&text.join(between), args.output.as_deref(), &args.plan)?;
    complain_of(&account.problems);
    Ok(ExitCode::SUCCESS)
}

/// The routes named on the command line, by workload.
fn chosen(account: &Account, names: &[String]) -> Result<Vec<Option<usize>>, Refusal> {
    let Some(program) = &account.program else { return Ok(Vec::new()) };
    let mut out = vec![None; program.workloads.len()];
    for name in names {
        let mut found = false;
        for (work, slot) in program.workloads.iter().zip(&mut out) {
            let full = |route: &str| *name == format!("{}/{route}", work.name);
            if let Some(at) = work.routes.iter().position(|r| r.name == *name || full(&r.name)) {
                *slot = Some(at);
                found = true;
            }
        }
        if !found {
            let known = program.workloads.iter().flat_map(|w| w.routes.iter().map(|r| r.name.as_str()));
            let known = known.collect::<Vec<_>>().join(", ");
            return Err(Refusal::because(format!("no route is called \"{name}\"; one of: {known}")));
        }
    }
    Ok(out)
}
