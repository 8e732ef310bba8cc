//! How sure the figures are: the sampled run as text and as a document.

use super::grid::{Grid, paragraph};
use super::json::Json;
use super::row::{PROGRAM, written, yearly};
use super::words::visible;
use crate::account::{Account, Measure};
use crate::chance::{Summary, identity_key};
use crate::ledger::StepIx;
use crate::odds::{FigureReading, MOST_STOPPED, Matter, Reading, Sampled};
use crate::plan::save;
use crate::program::{RouteProgram, WorkloadProgram};
use crate::quantity::{Origin, significant};

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
        stopped_words(work, &reading).iter().for_each(|text| paragraph(&mut out, "  ", text));
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
        let limits = spread.drawn.map_or((0.0, 0.0), |s| (s.symmetric.low, s.symmetric.high));
        let show = |value: f64| figure.measure.shown_within(value, limits);
        let u = |value: f64| figure.measure.shown_within(value, (-value, value));
        let present = if r == work.present { " (present)" } else { "" };
        let mut cells = vec![format!("  {}{present}", visible(&work.routes[r].name)), show(spread.central)];
        match spread.drawn {
            Some(s) => {
                let first = spread.first_order_u.map_or_else(|| "-".to_owned(), u);
                cells.extend([show(limits.0), show(limits.1), u(s.u), first]);
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

/// What is to be said of draws that stopped, and of those in which a step takes longer: a sentence for each step and kind.
#[must_use]
pub fn stopped_words(work: &WorkloadProgram, reading: &Reading<'_>) -> Vec<String> {
    let mut out = Vec::new();
    for (r, route) in work.routes.iter().enumerate() {
        let Some(columns) = reading.columns(r) else { continue };
        let share = columns.stopped_share();
        let kept = if share > MOST_STOPPED {
            "too many for an interval: narrow the amounts of that step"
        } else {
            "they are left out"
        };
        for kind in columns.stopped() {
            out.push(format!(
                "{}: {} draws stopped {}: {}; {kept}.",
                route.name,
                kind.draws,
                step_words(route, kind.step),
                kind.why
            ));
        }
        for (step, draws) in columns.longer() {
            out.push(format!(
                "{}: in {draws} of {} draws the run {} takes longer than the plan says, as long as its gas stream needs; they count with the longer time.",
                route.name,
                columns.done(),
                step_words(route, *step)
            ));
        }
    }
    out
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

/// The document of odds: JSON for other programs, the same bytes from the command and from the page.
///
/// | key | what it holds |
/// | --- | --- |
/// | `thimbleworth_odds` | [`ODDS_VERSION`] |
/// | `program`, `plan_digest` | as in the result document |
/// | `seed`, `draws`, `asked`, `coverage` | what the draws follow from; how many every route has, and how many were asked for; the probability that an interval holds |
/// | `workloads` | `name`, `present`, `routes` (`name`, `draws`, `stopped`: `step`, `why`, `draws`; `longer`: `step`, `draws` in which it takes longer than the plan says), `figures` |
///
/// A figure has `id`, `title`, `routes` and `rivals`. Of a route: `name`, `central_U`, `mean_U`, `u_U`, `median_U`,
/// `low_U` and `high_U` (probabilistically symmetric), `shortest_low_U`, `shortest_high_U`, `first_order_u_U`,
/// `first_order_agrees` (to one digit of u; JCGM 101:2008, 8.1), where `U` is the unit, with `_per_year` for what grows
/// with the work; `null` where it is not known. Of a rival, beside the present route: `name`, `draws` that ran on both,
/// `less` and `same` (shares of them), the same numbers of the difference, and `matters`: `identity`, `words`, `share` of
/// the variance and `origin` of each input, largest first.
#[must_use]
pub fn odds_json(account: &Account, sampled: &Sampled, coverage: f64) -> String {
    Json::document(|json| {
        json.put("thimbleworth_odds", ODDS_VERSION);
        json.put("program", PROGRAM);
        let digest = account.plan.as_ref().map(|p| format!("fnv1a64:{:016x}", identity_key(&save(p))));
        json.put("plan_digest", digest.as_deref());
        json.put("seed", sampled.seed());
        json.put("draws", sampled.done());
        json.put("asked", sampled.asked());
        json.put("coverage", coverage);
        json.list("workloads", |json| {
            let works = account.program.iter().flat_map(|p| &p.workloads).enumerate();
            for (w, work) in works {
                if let Some(reading) = Reading::new(account, sampled, w, coverage) {
                    json.row(|json| workload(json, &reading, coverage, work));
                }
            }
        });
    })
}

fn workload(json: &mut Json, reading: &Reading<'_>, coverage: f64, work: &WorkloadProgram) {
    let name = |r: usize| work.routes.get(r).map_or("", |r| r.name.as_str());
    json.put("name", &work.name);
    json.put("present", name(work.present));
    json.list("routes", |json| {
        for (r, columns) in (0..work.routes.len()).filter_map(|r| Some((r, reading.columns(r)?))) {
            json.row(|json| {
                json.put("name", name(r));
                json.put("draws", columns.done());
                json.list("stopped", |json| {
                    for s in columns.stopped() {
                        json.row(|json| {
                            json.put("step", if let StepIx::Step(i) = s.step { Some(i) } else { None });
                            json.put("why", s.why);
                            json.put("draws", s.draws);
                        });
                    }
                });
                json.list("longer", |json| {
                    for (step, draws) in columns.longer() {
                        json.row(|json| {
                            json.put("step", if let StepIx::Step(i) = step { Some(*i) } else { None });
                            json.put("draws", *draws);
                        });
                    }
                });
            });
        }
    });
    json.list("figures", |json| {
        for figure in reading.ids().into_iter().filter_map(|id| reading.figure(id)) {
            json.row(|json| of_figure(json, reading, coverage, work, &figure));
        }
    });
}

fn of_figure(
    json: &mut Json,
    reading: &Reading<'_>,
    coverage: f64,
    work: &WorkloadProgram,
    figure: &FigureReading,
) {
    let name = |r: usize| work.routes.get(r).map_or("", |r| r.name.as_str());
    json.put("id", &figure.id);
    json.put("title", &figure.title);
    json.list("routes", |json| {
        for (r, spread) in figure.routes.iter().enumerate() {
            let Some(spread) = spread else { continue };
            json.row(|json| {
                json.put("name", name(r));
                number(json, "central", figure.measure, Some(spread.central));
                summary(json, "", figure.measure, spread.drawn);
                number(json, "first_order_u", figure.measure, spread.first_order_u);
                json.put("first_order_agrees", spread.agrees(coverage));
            });
        }
    });
    json.list("rivals", |json| {
        for rival in &figure.rivals {
            json.row(|json| {
                json.put("name", name(rival.route));
                json.put("draws", rival.draws);
                json.put("less", rival.less);
                json.put("same", rival.same);
                summary(json, "", figure.measure, rival.difference);
                number(json, "first_order_u", figure.measure, rival.first_order_u);
                json.list("matters", |json| {
                    for m in reading.matters(&figure.id, rival.route, Some(work.present)) {
                        json.row(|json| {
                            json.put("identity", &m.identity);
                            json.put("words", &m.words);
                            json.put("share", m.share);
                            json.put("origin", m.origin.word());
                        });
                    }
                });
            });
        }
    });
}

/// A number under a key that names its unit.
fn number(json: &mut Json, key: &str, measure: Measure, value_si: Option<f64>) {
    json.put(&format!("{key}_{}", yearly(measure)), value_si.map(|v| written(measure, v)));
}

/// Seven numbers of a summary, each key behind `before`.
pub(super) fn summary(json: &mut Json, before: &str, measure: Measure, said: Option<Summary>) {
    for (key, value) in [
        ("mean", said.map(|s| s.mean)),
        ("u", said.map(|s| s.u)),
        ("median", said.map(|s| s.median)),
        ("low", said.map(|s| s.symmetric.low)),
        ("high", said.map(|s| s.symmetric.high)),
        ("shortest_low", said.map(|s| s.shortest.low)),
        ("shortest_high", said.map(|s| s.shortest.high)),
    ] {
        number(json, &[before, key].concat(), measure, value);
    }
}
