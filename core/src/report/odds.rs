//! How sure the figures are: the sampled run as text and as a document.

use super::grid::{Grid, paragraph};
use super::row::{PROGRAM, written, yearly};
use super::words::{amount, visible};
use crate::account::{Account, Measure};
use crate::chance::{Summary, identity_key};
use crate::ledger::StepIx;
use crate::odds::{FigureReading, MOST_STOPPED, Matter, Reading, Sampled, Stopped};
use crate::plan::save;
use crate::program::{RouteProgram, WorkloadProgram};
use crate::quantity::{Origin, significant};
use serde::Serialize;
use serde::ser::{SerializeMap, Serializer};

/// The version of the document of odds. Keys may be added under the same version.
pub const ODDS_VERSION: u64 = 1;

/// So many inputs are named for each difference.
const NAMED: usize = 4;

/// What the draws say, as text: intervals of the figures drawn, odds against the present route, what matters most, and
/// what is not known.
///
/// ```
/// use thimbleworth::account::account_text;
/// use thimbleworth::example::EXAMPLES;
/// use thimbleworth::odds::{MOST_CELLS, Sampled, Wish, headline};
/// use thimbleworth::report::odds_table;
/// let account = account_text(EXAMPLES[0].text);
/// let mut sampled = Sampled::default();
/// sampled.follow(&account, Wish { draws: 1000, most_cells: MOST_CELLS, wanted: &headline });
/// while sampled.advance(&account, 1000) > 0 {}
/// assert!(odds_table(&account, &sampled, 0.95).contains("less in all draws"));
/// ```
#[must_use]
pub fn odds_table(account: &Account, sampled: &Sampled, coverage: f64) -> String {
    let mut out = String::new();
    let Some(program) = &account.program else { return out };
    let percent = significant(coverage * 100.0, 3);
    paragraph(
        &mut out,
        "",
        &format!(
            "{}. Seed {}. Intervals hold {percent} % of the draws, as many below as above; u is the standard uncertainty, beside it that by propagation to first order.",
            draws_words(sampled),
            sampled.seed()
        ),
    );
    for (w, work) in program.workloads.iter().enumerate() {
        let Some(reading) = Reading::new(account, sampled, w, coverage) else { continue };
        out.push('\n');
        paragraph(&mut out, "", &format!("{}, a year", work.name));
        let mut grid = Grid::new(24, 8);
        let head = ["", "central", "from", "to", "u", "first order", "than the present"];
        grid.row(head.map(str::to_owned).to_vec());
        for figure in reading.ids().into_iter().filter_map(|id| reading.figure(id)) {
            grid.heading(&visible(&figure.title));
            rows(&mut grid, work, &figure);
        }
        grid.print(&mut out);
        stopped(&mut out, work, &reading);
        matters(&mut out, work, &reading);
    }
    out
}

/// How many draws were made, and of how many.
pub(super) fn draws_words(sampled: &Sampled) -> String {
    let (done, asked) = (sampled.done(), sampled.asked());
    if done == asked {
        format!("{done} draws")
    } else if sampled.remaining() > 0 {
        format!("{done} of {asked} draws: ended before the others")
    } else {
        format!("{done} of {asked} draws: more of so many figures would not fit")
    }
}

fn rows(grid: &mut Grid, work: &WorkloadProgram, figure: &FigureReading) {
    for (r, spread) in figure.routes.iter().enumerate() {
        let Some(spread) = spread else { continue };
        let show = |value: f64| amount(value, figure.measure);
        let present = if r == work.present { " (present)" } else { "" };
        let mut cells = vec![format!("  {}{present}", visible(&work.routes[r].name)), show(spread.central)];
        match spread.drawn {
            Some(s) => {
                let first = spread.first_order_u.map_or_else(|| "-".to_owned(), show);
                cells.extend([show(s.symmetric.low), show(s.symmetric.high), show(s.u), first]);
            }
            None => cells.extend(["not known", "", "", ""].map(str::to_owned)),
        }
        if let Some(rival) = figure.rivals.iter().find(|x| x.route == r) {
            cells.push(odds_words(rival.less, rival.same));
        }
        grid.row(cells);
    }
}

/// Odds in plain words: "less in 97 % of draws".
///
/// ```
/// use thimbleworth::report::odds_words;
/// assert_eq!(odds_words(0.9731, 0.0), "less in 97.3 % of draws");
/// assert_eq!(odds_words(1.0, 0.0), "less in all draws");
/// assert_eq!(odds_words(0.0, 1.0), "the same in all draws");
/// assert_eq!(odds_words(0.0, 0.0), "more in all draws");
/// assert_eq!(odds_words(0.25, 0.5), "less in 25 %, the same in 50 % of draws");
/// ```
#[must_use]
pub fn odds_words(less: f64, same: f64) -> String {
    let share = |p: f64| {
        // "100 %" and "0 %" are said of all and none only.
        let percent = p * 100.0;
        if percent > 99.9 {
            "over 99.9 %".to_owned()
        } else if percent < 0.1 {
            "under 0.1 %".to_owned()
        } else {
            format!("{} %", significant(percent, 3))
        }
    };
    let more = 1.0 - less - same;
    if less >= 1.0 {
        "less in all draws".to_owned()
    } else if same >= 1.0 {
        "the same in all draws".to_owned()
    } else if less <= 0.0 && same <= 0.0 {
        "more in all draws".to_owned()
    } else if same > 0.0 {
        format!("less in {}, the same in {} of draws", share(less), share(same))
    } else if less >= 0.5 {
        format!("less in {} of draws", share(less))
    } else {
        format!("more in {} of draws", share(more))
    }
}

fn stopped(out: &mut String, work: &WorkloadProgram, reading: &Reading<'_>) {
    for (r, route) in work.routes.iter().enumerate() {
        let Some(columns) = reading.columns(r).filter(|c| !c.stopped().is_empty()) else { continue };
        let share = columns.stopped_share();
        let kept = if share > MOST_STOPPED {
            "too many for an interval: narrow the amounts of that step"
        } else {
            "they are left out"
        };
        for kind in columns.stopped() {
            let text = format!(
                "{}: {} draws stopped {}: {}; {kept}.",
                route.name,
                kind.draws,
                step_words(route, kind.step),
                kind.why
            );
            paragraph(out, "  ", &text);
        }
    }
}

fn step_words(route: &RouteProgram, step: StepIx) -> String {
    match step {
        StepIx::Opening => "before the first step".to_owned(),
        StepIx::Closing => "at the end".to_owned(),
        StepIx::Step(i) => {
            let title = route.steps.get(i as usize).map_or("", |s| s.technique.title);
            format!("at step {} ({title})", i + 1)
        }
    }
}

fn matters(out: &mut String, work: &WorkloadProgram, reading: &Reading<'_>) {
    let name = |r: usize| work.routes.get(r).map_or("", |r| r.name.as_str());
    let mut unknown: Vec<String> = Vec::new();
    let mut lines = Vec::new();
    let figures: Vec<_> = reading.ids().into_iter().filter_map(|id| reading.figure(id)).collect();
    for figure in &figures {
        for rival in &figure.rivals {
            let matters = reading.matters(&figure.id, rival.route, Some(work.present));
            for m in matters.iter().filter(|m| m.origin == Origin::NotKnown) {
                unknown.push(format!(
                    "{}: {} of how far {} and {} differ in {}",
                    m.words,
                    percent(m.share),
                    name(rival.route),
                    name(work.present),
                    figure.title
                ));
            }
            // Where every draw says the same, nobody asks what would turn it.
            let decided = rival.same >= 1.0 || !(0.001..0.999).contains(&rival.less);
            if !matters.is_empty() && (!decided || figures.len() <= 2) {
                lines.push(format!("{}, {}: {}", figure.title, name(rival.route), named(&matters)));
            }
        }
    }
    if !lines.is_empty() {
        out.push_str("What matters most where the draws do not all say the same (share of the difference's variance)\n");
        lines.iter().for_each(|line| paragraph(out, "  ", line));
    }
    if !unknown.is_empty() {
        out.push_str("Not known\n");
        unknown.iter().for_each(|line| paragraph(out, "  ", line));
    }
}

pub(super) fn named(matters: &[Matter]) -> String {
    let list: Vec<String> =
        matters.iter().take(NAMED).map(|m| format!("{} {}", percent(m.share), m.words)).collect();
    list.join("; ")
}

fn percent(share: f64) -> String {
    format!("{} %", significant(share * 100.0, 2))
}

#[derive(Serialize)]
struct Document<'a> {
    thimbleworth_odds: u64,
    program: &'static str,
    plan_digest: Option<String>,
    seed: u64,
    draws: u32,
    asked: u32,
    coverage: f64,
    workloads: Vec<Work<'a>>,
}

#[derive(Serialize)]
struct Work<'a> {
    name: &'a str,
    present: &'a str,
    routes: Vec<Route<'a>>,
    figures: Vec<FigureDocument<'a>>,
}

#[derive(Serialize)]
struct Route<'a> {
    name: &'a str,
    draws: u32,
    stopped: Vec<StoppedDocument>,
}

#[derive(Serialize)]
struct StoppedDocument {
    step: Option<u16>,
    why: &'static str,
    draws: u32,
}

struct FigureDocument<'a> {
    work: &'a WorkloadProgram,
    coverage: f64,
    figure: FigureReading,
    /// For each rival.
    matters: Vec<Vec<Matter>>,
}

/// The document of odds: JSON for other programs, the same bytes from the command and from the page.
///
/// | key | what it holds |
/// | --- | --- |
/// | `thimbleworth_odds` | [`ODDS_VERSION`] |
/// | `program`, `plan_digest` | as in the result document |
/// | `seed`, `draws`, `asked`, `coverage` | what the draws follow from; how many every route has, and how many were asked for; the probability that an interval holds |
/// | `workloads` | `name`, `present`, `routes` (`name`, `draws`, `stopped`: `step`, `why`, `draws`), `figures` |
///
/// A figure has `id`, `title`, `routes` and `rivals`. Of a route: `name`, `central_U`, `mean_U`, `u_U`, `median_U`,
/// `low_U` and `high_U` (probabilistically symmetric), `shortest_low_U`, `shortest_high_U`, `first_order_u_U`,
/// `first_order_agrees` (to one digit of u; JCGM 101:2008, 8.1), where `U` is the unit, with `_per_year` for what grows
/// with the work; `null` where it is not known. Of a rival, beside the present route: `name`, `draws` that ran on both,
/// `less` and `same` (shares of them), the same numbers of the difference, and `matters`: `identity`, `words`, `share` of
/// the variance and `origin` of each input, largest first.
#[must_use]
pub fn odds_json(account: &Account, sampled: &Sampled, coverage: f64) -> String {
    let mut text = serde_json::to_string_pretty(&document(account, sampled, coverage)).unwrap_or_default();
    text.push('\n');
    text
}

fn document<'a>(account: &'a Account, sampled: &'a Sampled, coverage: f64) -> Document<'a> {
    let works = account.program.iter().flat_map(|p| &p.workloads).enumerate();
    Document {
        thimbleworth_odds: ODDS_VERSION,
        program: PROGRAM,
        plan_digest: account.plan.as_ref().map(|p| format!("fnv1a64:{:016x}", identity_key(&save(p)))),
        seed: sampled.seed(),
        draws: sampled.done(),
        asked: sampled.asked(),
        coverage,
        workloads: works.filter_map(|(w, work)| workload(account, sampled, coverage, w, work)).collect(),
    }
}

fn workload<'a>(
    account: &'a Account,
    sampled: &'a Sampled,
    coverage: f64,
    w: usize,
    work: &'a WorkloadProgram,
) -> Option<Work<'a>> {
    let reading = Reading::new(account, sampled, w, coverage)?;
    let name = |r: usize| work.routes.get(r).map_or("", |r| r.name.as_str());
    let figures = reading.ids().into_iter().filter_map(|id| reading.figure(id));
    let stopped = |s: &Stopped| StoppedDocument {
        step: if let StepIx::Step(i) = s.step { Some(i) } else { None },
        why: s.why,
        draws: s.draws,
    };
    Some(Work {
        name: &work.name,
        present: name(work.present),
        routes: (0..work.routes.len())
            .filter_map(|r| {
                let columns = reading.columns(r)?;
                let stopped = columns.stopped().iter().map(stopped).collect();
                Some(Route { name: name(r), draws: columns.done(), stopped })
            })
            .collect(),
        figures: figures
            .map(|figure| FigureDocument {
                work,
                coverage,
                matters: figure
                    .rivals
                    .iter()
                    .map(|rival| reading.matters(&figure.id, rival.route, Some(work.present)))
                    .collect(),
                figure,
            })
            .collect(),
    })
}

impl Serialize for FigureDocument<'_> {
    fn serialize<S: Serializer>(&self, serializer: S) -> Result<S::Ok, S::Error> {
        let Self { work, figure, .. } = self;
        let named = |r: usize| work.routes.get(r).map_or("", |r| r.name.as_str());
        let routes = figure.routes.iter().enumerate().filter_map(|(r, spread)| {
            let spread = (*spread)?;
            let mut row = NumberRow::new(named(r), figure.measure);
            row.number("central", Some(spread.central));
            row.summary(spread.drawn, spread.first_order_u);
            row.agrees = Some(spread.agrees(self.coverage));
            Some(row)
        });
        let rivals = figure.rivals.iter().zip(&self.matters).map(|(rival, matters)| {
            let mut row = NumberRow::new(named(rival.route), figure.measure);
            row.odds = Some((rival.draws, rival.less, rival.same));
            row.summary(rival.difference, rival.first_order_u);
            row.matters = Some(matters);
            row
        });
        let mut map = serializer.serialize_map(None)?;
        map.serialize_entry("id", &figure.id)?;
        map.serialize_entry("title", &figure.title)?;
        map.serialize_entry("routes", &routes.collect::<Vec<_>>())?;
        map.serialize_entry("rivals", &rivals.collect::<Vec<_>>())?;
        map.end()
    }
}

/// Numbers under keys that name their unit.
struct NumberRow<'a> {
    name: &'a str,
    measure: Measure,
    odds: Option<(usize, f64, f64)>,
    numbers: Vec<(&'static str, Option<f64>)>,
    agrees: Option<Option<bool>>,
    matters: Option<&'a [Matter]>,
}

impl<'a> NumberRow<'a> {
    const fn new(name: &'a str, measure: Measure) -> Self {
        Self { name, measure, odds: None, numbers: Vec::new(), agrees: None, matters: None }
    }

    fn number(&mut self, key: &'static str, value_si: Option<f64>) {
        self.numbers.push((key, value_si));
    }

    fn summary(&mut self, said: Option<Summary>, first_order_u: Option<f64>) {
        self.number("mean", said.map(|s| s.mean));
        self.number("u", said.map(|s| s.u));
        self.number("median", said.map(|s| s.median));
        self.number("low", said.map(|s| s.symmetric.low));
        self.number("high", said.map(|s| s.symmetric.high));
        self.number("shortest_low", said.map(|s| s.shortest.low));
        self.number("shortest_high", said.map(|s| s.shortest.high));
        self.number("first_order_u", first_order_u);
    }
}

impl Serialize for NumberRow<'_> {
    fn serialize<S: Serializer>(&self, serializer: S) -> Result<S::Ok, S::Error> {
        let unit = yearly(self.measure);
        let mut map = serializer.serialize_map(None)?;
        map.serialize_entry("name", self.name)?;
        if let Some((draws, less, same)) = self.odds {
            map.serialize_entry("draws", &draws)?;
            map.serialize_entry("less", &less)?;
            map.serialize_entry("same", &same)?;
        }
        for (key, value) in &self.numbers {
            map.serialize_entry(&format!("{key}_{unit}"), &value.map(|v| written(self.measure, v)))?;
        }
        if let Some(agrees) = self.agrees {
            map.serialize_entry("first_order_agrees", &agrees)?;
        }
        if let Some(matters) = self.matters {
            let rows: Vec<_> = matters.iter().map(MatterDocument::of).collect();
            map.serialize_entry("matters", &rows)?;
        }
        map.end()
    }
}

#[derive(Serialize)]
struct MatterDocument<'a> {
    identity: &'a str,
    words: &'a str,
    share: f64,
    origin: &'static str,
}

impl<'a> MatterDocument<'a> {
    fn of(m: &'a Matter) -> Self {
        Self { identity: &m.identity, words: &m.words, share: m.share, origin: m.origin.word() }
    }
}
