//! One figure opened: the postings behind it, the rule of each, the numbers put into it and what was read.

mod error;
mod text;

pub use error::TraceError;

use super::json::Json;
use super::result::{figure, inputs, step_and_technique};
use super::row::{key_unit, written};
use super::words::si_unit;
use crate::account::{
    Account, Contribution, Figure, Group, How, Measure, RouteAccount, behind, describe, place_name, rule_of,
};
use crate::chance::Input;
use crate::ledger::{Note, Posting, RuleIx, Spending, StepIx};
use crate::plan::below;
use crate::program::{Program, RouteProgram, SiteUse};
use crate::quantity::show;
use crate::step::Rule;

/// Which route's figure is meant.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub struct Selection<'a> {
    /// The name of the workload; may be left out where the plan has one workload, or one with the route named.
    pub workload: Option<&'a str>,
    /// The name of the route; the present one when left out.
    pub route: Option<&'a str>,
}

/// A figure with everything behind it.
pub struct TracedFigure<'a> {
    workload: &'a str,
    route: &'a str,
    opened: Opened<'a>,
    /// The two figures of a ratio, or the volume behind a number of containers.
    parts: Vec<(&'static str, Opened<'a>)>,
    inputs: Vec<&'a Input>,
}

struct Opened<'a> {
    figure: &'a Figure,
    value_si: f64,
    account: &'a RouteAccount,
    entries: Vec<Entry<'a>>,
}

struct Entry<'a> {
    what: String,
    step: StepIx,
    by: (Option<u16>, &'static str),
    rule: Option<&'static Rule>,
    working: Vec<&'a Note>,
    moved: Moved<'a>,
    adds_si: f64,
    measure: Measure,
}

enum Moved<'a> {
    Mass { posting: &'a Posting, from: String, to: String, material: &'a str },
    Utility(&'a Spending),
}

/// Opens one figure of one route.
///
/// # Errors
/// [`TraceError`] where the plan has no accounts, or no such workload, route or figure; with the names that come closest.
///
/// ```
/// use thimbleworth::{account::account_text, example::EXAMPLES};
/// use thimbleworth::report::{Selection, trace};
/// let account = account_text(EXAMPLES[0].text);
/// let traced = trace(&account, Selection::default(), "mass.in").unwrap();
/// assert!(traced.text().contains("m = m_feed"));
/// let error = trace(&account, Selection::default(), "mass.inn").err().unwrap();
/// assert!(error.to_string().contains("mass.in"));
/// ```
pub fn trace<'a>(
    account: &'a Account,
    selection: Selection<'_>,
    figure: &str,
) -> Result<TracedFigure<'a>, TraceError> {
    let program = account.program.as_ref().ok_or(TraceError::NoAccount)?;
    let (w, r) = select(program, selection)?;
    let found = program.workloads.get(w).zip(account.workloads.get(w));
    let (work, accounts) = found.ok_or(TraceError::NoAccount)?;
    let route = work.routes.get(r).ok_or(TraceError::NoAccount)?;
    let stopped = || TraceError::Stopped { route: route.name.clone() };
    let of_route = accounts.routes.get(r).and_then(Option::as_ref).ok_or_else(stopped)?;
    let Some(index) = of_route.figures.iter().position(|f| f.id == figure) else {
        return Err(error::unknown_figure(figure, work, accounts, r));
    };
    let open = |index: usize| opened(route, &program.site, of_route, index);
    let whole = open(index).ok_or(TraceError::NoAccount)?;
    let priced = matches!(whole.figure.group, Group::Time | Group::Cost | Group::Climate);
    let names: &[&str] = match whole.figure.how {
        How::Ratio { .. } => &["over", "under"],
        How::Containers { .. } => &["volume"],
        How::Times { .. } | How::Whole(_) => &["of"],
        How::Lines(_) | How::Sum(_) | How::Spent(_) => &[],
    };
    let names = names.iter().copied().chain(std::iter::repeat("part"));
    let parts = names.zip(whole.figure.how.rests_on().into_iter().map(open));
    let parts: Vec<_> = parts.filter_map(|(name, part)| Some((name, part?))).collect();
    let inputs = inputs_behind(route, priced, std::iter::once(&whole).chain(parts.iter().map(|p| &p.1)));
    Ok(TracedFigure { workload: &work.name, route: &route.name, opened: whole, parts, inputs })
}

fn select(program: &Program, selection: Selection<'_>) -> Result<(usize, usize), TraceError> {
    let names = |items: &mut dyn Iterator<Item = &String>| items.cloned().collect::<Vec<_>>();
    let all = || names(&mut program.workloads.iter().map(|w| &w.name));
    let workload = match (selection.workload, selection.route) {
        (Some(name), _) => program
            .workloads
            .iter()
            .position(|w| w.name == name)
            .ok_or_else(|| TraceError::UnknownWorkload { asked: name.to_owned(), known: all() })?,
        (None, Some(route)) => {
            let with = |w: &&crate::program::WorkloadProgram| w.routes.iter().any(|r| r.name == route);
            let mut having = program.workloads.iter().enumerate().filter(|(_, w)| with(w));
            match (having.next(), having.next()) {
                (Some((i, _)), None) => i,
                (Some(_), Some(_)) => return Err(TraceError::WhichWorkload { known: all() }),
                (None, _) => {
                    let known = names(&mut program.workloads.iter().flat_map(|w| &w.routes).map(|r| &r.name));
                    return Err(TraceError::UnknownRoute { asked: route.to_owned(), known });
                }
            }
        }
        (None, None) if program.workloads.len() > 1 => {
            return Err(TraceError::WhichWorkload { known: all() });
        }
        (None, None) => 0,
    };
    let work = program.workloads.get(workload).ok_or(TraceError::NoAccount)?;
    let route = match selection.route {
        None => work.present,
        Some(name) => work.routes.iter().position(|r| r.name == name).ok_or_else(|| {
            let known = names(&mut work.routes.iter().map(|r| &r.name));
            TraceError::UnknownRoute { asked: name.to_owned(), known }
        })?,
    };
    Ok((workload, route))
}

fn opened<'a>(
    route: &'a RouteProgram,
    site: &SiteUse,
    account: &'a RouteAccount,
    index: usize,
) -> Option<Opened<'a>> {
    let figure = account.figures.get(index)?;
    let value_si = account.values.get(index).copied()?;
    // A number of containers is opened through its volume.
    let whole = !matches!(figure.how, How::Containers { .. });
    let entries = if whole { behind(route, account, figure) } else { Vec::new() };
    let entries =
        entries.into_iter().filter_map(|c| entry(route, site, account, figure.measure, c)).collect();
    Some(Opened { figure, value_si, account, entries })
}

fn entry<'a>(
    route: &'a RouteProgram,
    site: &SiteUse,
    account: &'a RouteAccount,
    measure: Measure,
    contribution: Contribution,
) -> Option<Entry<'a>> {
    let make = |step: StepIx, rule: RuleIx, what: String, moved, adds_si| Entry {
        what,
        step,
        by: step_and_technique(route, step),
        rule: rule_of(route, step, rule),
        working: account.trace.working(step, rule).collect(),
        moved,
        adds_si,
        measure,
    };
    match contribution {
        Contribution::Posting { index, amount_si } => {
            let posting = account.trace.postings.get(index)?;
            let material = route.materials.get(posting.material.0 as usize).map_or("", |m| m.name.as_str());
            let (from, to) = (place_name(site, posting.from), place_name(site, posting.to));
            let what = describe(route, site, posting);
            Some(make(
                posting.step,
                posting.rule,
                what,
                Moved::Mass { posting, from, to, material },
                amount_si,
            ))
        }
        Contribution::Spending { index, amount_si } => {
            let spending = account.trace.spendings.get(index)?;
            let technique = match spending.step {
                StepIx::Step(i) => route.steps.get(i as usize).map_or("", |s| s.technique.title),
                StepIx::Opening | StepIx::Closing => "the book itself",
            };
            let what = format!("{}, {technique}", spending.utility.name());
            Some(make(spending.step, spending.rule, what, Moved::Utility(spending), amount_si))
        }
    }
}

/// Every input that the entries can rest on: those of the work, the feed and the materials, and those of every step up to
/// the last that made an entry.
fn inputs_behind<'a, 'o>(
    route: &'a RouteProgram,
    priced: bool,
    parts: impl Iterator<Item = &'o Opened<'a>>,
) -> Vec<&'a Input>
where
    'a: 'o,
{
    let mut after = 0;
    for entry in parts.flat_map(|p| &p.entries) {
        let steps = match entry.step {
            StepIx::Opening => 0,
            StepIx::Closing => route.steps.len(),
            StepIx::Step(i) => usize::from(i) + 1,
        };
        if steps > after {
            after = steps;
        }
    }
    let steps = below(&route.path, "steps") + "[";
    let step_of = |i: &Input| i.identity.strip_prefix(&steps)?.split_once(']')?.0.parse::<usize>().ok();
    let later = |i: &Input| step_of(i).is_some_and(|step| step >= after);
    // Prices, hours and factors of climate stand behind figures of theirs alone.
    let apart = [below(&route.path, "money"), below(&route.path, "time")];
    let own = |i: &Input| {
        ["site.money", "site.hours", "site.climate", "site.electricity", apart[0].as_str(), apart[1].as_str()]
            .iter()
            .any(|start| i.identity.starts_with(start))
    };
    route.inputs.iter().filter(|i| !later(i) && (priced || !own(i))).collect()
}

impl TracedFigure<'_> {
    /// The figure as JSON: `workload`, `route`, `figure` (as in the result document), `entries` (largest first), `over`
    /// and `under` for a ratio, `volume` for containers, `of` for whole
    /// things and multiples, `part` for each figure in a sum of lines (each with its own `figure` and `entries`), `inputs`.
    ///
    /// An entry has `what`, `step`, `technique`, `rule`, `equation`, `source`, `standing`, `working` (symbol, `value_si`,
    /// `unit`), for a posting `from`, `to`, `material`, `kg_per_run`, `runs_per_year`, `kg_per_year` and `measured`, for a utility what a run takes and
    /// `runs_per_year`, and what it adds to the figure, as in `adds_kg_per_year`.
    #[must_use]
    pub fn json(&self) -> String {
        Json::document(|json| {
            json.put("workload", self.workload);
            json.put("route", self.route);
            self.opened.write(json);
            for (name, part) in &self.parts {
                json.object(name, |json| part.write(json));
            }
            inputs(json, &mut self.inputs.iter().copied());
        })
    }

    /// The figure in words and numbers for a terminal.
    #[must_use]
    pub fn text(&self) -> String {
        text::text(self)
    }
}

impl Opened<'_> {
    fn write(&self, json: &mut Json) {
        json.object("figure", |json| figure(json, self.account, self.figure, self.value_si));
        json.list("entries", |json| {
            for entry in &self.entries {
                json.row(|json| entry.write(json));
            }
        });
    }
}

impl Entry<'_> {
    fn write(&self, json: &mut Json) {
        json.put("what", &self.what);
        json.put("step", self.by.0);
        json.put("technique", self.by.1);
        json.put("rule", self.rule.map(|r| r.name));
        json.put("equation", self.rule.map(|r| r.equation));
        json.put("source", self.rule.map(|r| r.source.cite));
        json.put("standing", self.rule.map(|r| r.source.standing.words()));
        json.list("working", |json| {
            for note in &self.working {
                json.row(|json| {
                    json.put("symbol", note.symbol);
                    json.put("value_si", note.value_si);
                    json.put("unit", si_unit(note.kind));
                });
            }
        });
        let unit = key_unit(self.measure);
        match &self.moved {
            Moved::Mass { posting, from, to, material } => {
                json.put("from", from);
                json.put("to", to);
                json.put("material", *material);
                json.put("kg_per_run", posting.kg);
                json.put("runs_per_year", posting.runs_a_year);
                json.put("kg_per_year", posting.kg_a_year());
                json.put("measured", posting.measured);
            }
            Moved::Utility(spending) => {
                json.put(&format!("{unit}_per_run"), written(self.measure, spending.amount_si));
                json.put("runs_per_year", spending.runs_a_year);
            }
        }
        json.put(&format!("adds_{unit}_per_year"), written(self.measure, self.adds_si));
    }
}

/// A number put into a rule, as `V = 300 mL`.
fn working_words(note: &Note) -> String {
    format!("{} = {}", note.symbol, show(note.value_si, note.kind))
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::account::account_text;
    use crate::example::EXAMPLES;
    use serde_json::Value;

    #[test]
    fn the_entries_add_up_to_the_figure() {
        for example in EXAMPLES {
            let account = account_text(example.text);
            let program = account.program.as_ref().unwrap();
            for (work, accounts) in program.workloads.iter().zip(&account.workloads) {
                for (route, of_route) in work.routes.iter().zip(&accounts.routes) {
                    let of_route = of_route.as_ref().unwrap();
                    let selection = Selection { workload: Some(&work.name), route: Some(&route.name) };
                    for (figure, value) in of_route.figures.iter().zip(&of_route.values) {
                        let traced = trace(&account, selection, &figure.id).unwrap();
                        let summed = match figure.how {
                            How::Sum(_) | How::Spent(_) => &traced.opened,
                            How::Containers { .. } => &traced.parts[0].1,
                            How::Times { of, factor } => {
                                assert!((of_route.values[of] * factor - value).abs() < 1e-9);
                                continue;
                            }
                            // What is behind a line is in the tests of cost.
                            How::Lines(_) | How::Whole(_) => continue,
                            How::Ratio { .. } => {
                                assert_eq!(traced.parts.len(), 2);
                                assert!(
                                    (traced.parts[0].1.value_si / traced.parts[1].1.value_si - value).abs()
                                        < 1e-9
                                );
                                continue;
                            }
                        };
                        let sum: f64 = summed.entries.iter().map(|e| e.adds_si).sum();
                        let scale: f64 = summed.entries.iter().map(|e| e.adds_si.abs()).sum();
                        assert!((sum - summed.value_si).abs() <= 1e-12 * scale, "{}", figure.id);
                        let json: Value = serde_json::from_str(&traced.json()).unwrap();
                        assert_eq!(json["figure"]["id"], figure.id.as_str());
                        assert!(
                            traced
                                .text()
                                .contains(&figure.boundary.split_whitespace().next().unwrap().to_owned())
                        );
                    }
                }
            }
        }
    }

    #[test]
    fn a_measured_posting_shows_what_was_computed_in_its_place() {
        let plan = include_str!("trace/measured.json");
        let account = account_text(plan);
        let traced = trace(&account, Selection::default(), "air.solvents").unwrap();
        let text = traced.text();
        assert!(text.contains("measured"), "{text}");
        assert!(text.contains("computed in its place = "), "{text}");
        assert!(text.contains("condenser loss"), "{text}");
        assert!(text.contains("6 ± 2 g"), "{text}");
        let json: Value = serde_json::from_str(&traced.json()).unwrap();
        let entries = json["entries"].as_array().unwrap();
        let loss =
            |e: &Value| e["equation"].as_str().is_some_and(|text| text.starts_with("mᵢ = s mᵢ(liquor);"));
        assert!(entries.iter().any(|e| e["measured"] == true && loss(e)));
    }

    #[test]
    fn what_is_not_there_gets_suggestions() {
        let account = account_text(include_str!("trace/measured.json"));
        let error = |selection, figure| trace(&account, selection, figure).err().unwrap().to_string();
        let none = Selection::default();
        assert!(error(none, "waste.total.mas").contains("waste.total.mass"));
        assert!(error(none, "co2.vented").contains("CO2"), "{}", error(none, "co2.vented"));
        assert!(error(Selection { route: Some("C02"), ..none }, "mass.in").contains("did you mean CO2?"));
        assert!(error(Selection { workload: Some("x"), ..none }, "mass.in").contains("PAH in sediment"));
        assert!(trace(&account_text("{"), none, "mass.in").is_err());
    }
}
