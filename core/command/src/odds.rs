//! `odds`: how sure the figures are, with progress and a way to end it early.

use crate::input;
use crate::output::{Refusal, complain_of, deliver};
use clap::ValueEnum;
use std::collections::BTreeSet;
use std::io::{IsTerminal, Write, stderr};
use std::path::PathBuf;
use std::process::ExitCode;
use std::sync::Arc;
use std::sync::atomic::{AtomicBool, Ordering};
use std::time::{Duration, Instant};
use thimbleworth::account::{Account, Figure};
use thimbleworth::odds::{MOST_CELLS, Sampled, Wish, headline};
use thimbleworth::report::{odds_json, odds_table};

/// The exit status of a program that was interrupted.
pub(crate) const INTERRUPTED: u8 = 130;
/// So many draws of routes are made between two looks at the clock.
const SLICE: u32 = 2_000;

#[derive(clap::Args)]
pub(crate) struct Args {
    /// The plan, or - for the standard input
    plan: PathBuf,
    /// How many draws
    #[arg(long, default_value_t = 10_000, value_parser = clap::value_parser!(u32).range(200..=100_000_000))]
    draws: u32,
    /// The share of draws that an interval holds, in per cent
    #[arg(long, default_value_t = 95.0)]
    coverage: f64,
    /// A figure by its id, as in waste.flammable.volume, in place of the headline figures; may be given several times
    #[arg(long, value_name = "ID")]
    figure: Vec<String>,
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
    /// For other programs
    Json,
}

pub(crate) fn run(args: &Args) -> Result<ExitCode, Refusal> {
    let coverage = coverage(args.coverage)?;
    let account = input::account(&args.plan)?;
    if account.broken() {
        complain_of(&account.problems);
        return Err(Refusal::Said);
    }
    known(&account, &args.figure)?;
    let wanted = |f: &Figure| if args.figure.is_empty() { headline(f) } else { args.figure.contains(&f.id) };
    let (sampled, ended) = draw(&account, args.draws, &wanted)?;
    let text = match args.format {
        Format::Table => odds_table(&account, &sampled, coverage),
        Format::Json => odds_json(&account, &sampled, coverage),
    };
    deliver(&text, args.output.as_deref(), &args.plan)?;
    complain_of(&account.problems);
    Ok(if ended { ExitCode::from(INTERRUPTED) } else { ExitCode::SUCCESS })
}

/// A per cent above 50 and below 100, as a probability.
pub(crate) fn coverage(percent: f64) -> Result<f64, Refusal> {
    if percent > 50.0 && percent < 100.0 {
        return Ok(percent / 100.0);
    }
    Err(Refusal::because(format!("a coverage of {percent} %; give one above 50 and below 100, such as 95")))
}

fn known(account: &Account, asked: &[String]) -> Result<(), Refusal> {
    let routes = account.workloads.iter().flat_map(|w| &w.routes).flatten();
    let ids: BTreeSet<&str> = routes.flat_map(|r| &r.figures).map(|f| f.id.as_str()).collect();
    match asked.iter().find(|id| !ids.contains(id.as_str())) {
        None => Ok(()),
        Some(id) => {
            let list: Vec<&str> = ids.into_iter().collect();
            Err(Refusal::because(format!("no route has a figure \"{id}\"; there are: {}", list.join(", "))))
        }
    }
}

/// Draws with progress on the standard error. Ctrl-C ends it early: what has been drawn is kept. Returns whether it was.
pub(crate) fn draw(
    account: &Account,
    draws: u32,
    wanted: &dyn Fn(&Figure) -> bool,
) -> Result<(Sampled, bool), Refusal> {
    let stop = Arc::new(AtomicBool::new(false));
    let seen = Arc::clone(&stop);
    // The first interrupt ends the draws, the second the program.
    let handled = ctrlc::set_handler(move || {
        if seen.swap(true, Ordering::SeqCst) {
            std::process::exit(i32::from(INTERRUPTED));
        }
    });
    handled.map_err(|error| Refusal::because(format!("interrupts cannot be heard: {error}")))?;
    let mut sampled = Sampled::default();
    sampled.follow(account, Wish { draws, most_cells: MOST_CELLS, wanted });
    let all = sampled.remaining();
    let mut progress = Progress::new();
    while sampled.advance(account, SLICE) > 0 && !stop.load(Ordering::SeqCst) {
        progress.tell(all - sampled.remaining(), all);
    }
    progress.clear();
    Ok((sampled, stop.load(Ordering::SeqCst)))
}

/// How far it is: one line that is written over on a terminal, a new line now and then elsewhere.
struct Progress {
    terminal: bool,
    told: Instant,
    written: bool,
}

impl Progress {
    fn new() -> Self {
        Self { terminal: stderr().is_terminal(), told: Instant::now(), written: false }
    }

    fn tell(&mut self, done: u64, all: u64) {
        let pause = Duration::from_millis(if self.terminal { 200 } else { 2000 });
        if self.told.elapsed() < pause {
            return;
        }
        self.told = Instant::now();
        let line = format!("{} % drawn; Ctrl-C keeps what there is", done * 100 / all);
        // Nothing can be done where even the standard error is closed.
        let _ = if self.terminal { write!(stderr(), "\r{line}") } else { writeln!(stderr(), "{line}") };
        self.written = true;
    }

    fn clear(&self) {
        if self.terminal && self.written {
            let _ = write!(stderr(), "\r\u{1b}[K");
        }
    }
}
