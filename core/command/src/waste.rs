//! `waste`: the papers of the waste desk.

use crate::input;
use crate::output::{Refusal, complain_of, deliver, deliver_bytes};
use crate::workbook;
use clap::ValueEnum;
use std::path::{Path, PathBuf};
use std::process::ExitCode;
use thimbleworth::account::{Account, site_desk};
use thimbleworth::report::{Paper, PaperKind, paper, paper_csv, paper_markdown};

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

#[derive(Clone, Copy, PartialEq, Eq, ValueEnum)]
pub(crate) enum Format {
    /// Papers to read and to print
    Markdown,
    /// Their tables, for a spreadsheet
    Csv,
    /// A workbook with a sheet a paper
    Xlsx,
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
    let papers: Vec<(&str, Paper)> = PaperKind::ALL
        .iter()
        .filter(|k| asked(k))
        .filter_map(|k| Some((k.word(), paper(&account, &desk, *k)?)))
        .collect();
    hand_over(&papers, args.format, args.output.as_deref(), &args.plan)?;
    complain_of(&account.problems);
    Ok(ExitCode::SUCCESS)
}

/// Papers in a format, each with the name of its sheet.
pub(crate) fn hand_over(
    papers: &[(&str, Paper)],
    format: Format,
    output: Option<&Path>,
    plan: &Path,
) -> Result<(), Refusal> {
    let joined = |write: fn(&Paper) -> String, between: &str| {
        papers.iter().map(|(_, paper)| write(paper)).collect::<Vec<_>>().join(between)
    };
    match format {
        Format::Markdown => deliver(&joined(paper_markdown, "\n"), output, plan),
        Format::Csv => deliver(&joined(paper_csv, "\r\n"), output, plan),
        Format::Xlsx if output.is_none() => Err(Refusal::because(workbook::NEEDS_FILE)),
        Format::Xlsx => deliver_bytes(&workbook::papers(papers).map_err(Refusal::because)?, output, plan),
    }
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
