//! Differences and ratios, and the postings that make them.

use super::finding;
use crate::account::{Account, Contribution, Figure, Group, Measure, RouteAccount, behind};
use crate::ledger::StepIx;
use crate::order;
use crate::program::{RouteProgram, WorkloadProgram};

/// The comparison of one workload.
#[derive(Clone, Debug)]
pub struct Comparison {
    /// The index of the present route.
    pub present: usize,
    /// Every other route beside it, in the order of the plan; routes whose run stopped are left out.
    pub routes: Vec<RouteComparison>,
}

/// One route beside the present one.
#[derive(Clone, Debug)]
pub struct RouteComparison {
    /// The index of the route.
    pub route: usize,
    /// Every figure that either of the two has, in the order of the accounts.
    pub differences: Vec<Difference>,
    /// What switching would change, in one plain sentence (or two, where it pulls both ways).
    pub finding: String,
    /// Headline figures that fall, by title.
    pub better: Vec<String>,
    /// Headline figures that rise, by title: never averaged away against those that fall.
    pub worse: Vec<String>,
    /// What keeps the comparison from being one of equal work.
    pub doubts: Vec<String>,
}

/// One figure of a route beside that of the present one.
#[derive(Clone, Debug)]
pub struct Difference {
    /// The figure's id.
    pub id: String,
    /// Its title.
    pub title: String,
    /// What it measures.
    pub measure: Measure,
    /// Its value on the present route; SI, a year for what grows with the work. `None` where it has no such ratio, or
    /// states no power or water flow.
    pub present: Option<f64>,
    /// Its value on the route; likewise.
    pub other: Option<f64>,
    /// Route less present.
    pub change: Option<f64>,
    /// Route over present; `None` over nothing.
    pub ratio: Option<f64>,
    /// The postings that make the difference, largest first, at most five.
    pub causes: Vec<Cause>,
}

/// A group of postings that are on one route and not, or not as much, on the other.
#[derive(Clone, Debug, PartialEq)]
pub struct Cause {
    /// Technique, rule and material in words.
    pub what: String,
    /// What it adds to the difference; SI, a year.
    pub change: f64,
}

/// Compares the routes of a workload; `None` where the present route has no account.
#[must_use]
pub fn compare(account: &Account, workload: usize) -> Option<Comparison> {
    let program = account.program.as_ref()?;
    let work = program.workloads.get(workload)?;
    let accounts = &account.workloads.get(workload)?.routes;
    let present = accounts.get(work.present)?.as_ref()?;
    let mut routes = Vec::new();
    for (i, other) in accounts.iter().enumerate() {
        if let (Some(other), true) = (other, i != work.present) {
            routes.push(beside(work, i, present, other));
        }
    }
    Some(Comparison { present: work.present, routes })
}

fn beside(
    work: &WorkloadProgram,
    route: usize,
    present: &RouteAccount,
    other: &RouteAccount,
) -> RouteComparison {
    let (old, new) = (&work.routes[work.present], &work.routes[route]);
    let mut differences = Vec::new();
    let mut ids: Vec<&str> = present.figures.iter().map(|f| f.id.as_str()).collect();
    ids.extend(other.figures.iter().map(|f| f.id.as_str()).filter(|id| present.value(id).is_none()));
    for id in ids {
        let figure = present.figures.iter().chain(&other.figures).find(|f| f.id == id);
        let Some(figure) = figure else { continue };
        let value = |route: &RouteProgram, account: &RouteAccount| {
            account.value(id).or(absent_is_zero(route, figure).then_some(0.0))
        };
        let (before, after) = (value(old, present), value(new, other));
        let change = before.zip(after).map(|(b, a)| a - b);
        let ratio = before.zip(after).filter(|(b, _)| *b > 0.0).map(|(b, a)| a / b);
        differences.push(Difference {
            id: id.to_owned(),
            title: figure.title.clone(),
            measure: figure.measure,
            present: before,
            other: after,
            change,
            ratio,
            causes: if change.is_some_and(|c| c != 0.0) {
                causes((old, present), (new, other), id)
            } else {
                Vec::new()
            },
        });
    }
    let judged = finding::judge(
        &old.name,
        &new.name,
        &differences,
        old.uncounted.is_empty() && new.uncounted.is_empty(),
    );
    let mut finding = judged.sentence;
    // What is paid once stands beside what is saved each year.
    if let Some(paid) = other.figures.iter().find(|f| f.id == "cost.once").zip(other.value("cost.once"))
        && paid.1 > 0.0
    {
        finding = format!("{finding} {} are paid at once.", paid.0.measure.shown(paid.1));
    }
    RouteComparison {
        route,
        differences,
        finding,
        better: judged.better,
        worse: judged.worse,
        doubts: doubts(old, new),
    }
}

/// Whether a route that has no such figure has none of what it counts.
///
/// Nothing of a thing is zero of it; a ratio that is not given is not zero, nor is a cooling water flow that is not
/// stated, nor the electricity of a route that leaves a power out, nor time, cost and climate of which the plan says too
/// little.
#[must_use]
pub fn absent_is_zero(route: &RouteProgram, figure: &Figure) -> bool {
    match figure.id.as_str() {
        "energy.electricity" => route.uncounted.is_empty(),
        _ => {
            figure.measure.extensive()
                && !matches!(figure.group, Group::Energy | Group::Time | Group::Cost | Group::Climate)
        }
    }
}

/// The contributions of both routes by technique, rule and material: those of the present one go, the others come.
fn causes(
    (old, present): (&RouteProgram, &RouteAccount),
    (new, other): (&RouteProgram, &RouteAccount),
    id: &str,
) -> Vec<Cause> {
    let mut found: Vec<Cause> = Vec::new();
    for (sign, route, account) in [(-1.0, old, present), (1.0, new, other)] {
        let Some(figure) = account.figures.iter().find(|f| f.id == id) else { continue };
        for contribution in behind(route, account, figure) {
            let (what, amount_si) = match contribution {
                Contribution::Posting { index, amount_si } => {
                    (posting_words(route, account, index), amount_si)
                }
                Contribution::Spending { index, amount_si } => {
                    (spending_words(route, account, index), amount_si)
                }
            };
            let change = sign * amount_si;
            match found.iter_mut().find(|c| c.what == what) {
                Some(cause) => cause.change += change,
                None => found.push(Cause { what, change }),
            }
        }
    }
    found.retain(|c| c.change != 0.0);
    order::sort(&mut found, &|a, b| a.change.abs() > b.change.abs());
    found.truncate(5);
    found
}

fn technique(route: &RouteProgram, step: StepIx) -> &'static str {
    match step {
        StepIx::Opening => "sample taken in",
        StepIx::Closing => "end of the route",
        StepIx::Step(i) => route.steps.get(i as usize).map_or("", |s| s.technique.title),
    }
}

fn posting_words(route: &RouteProgram, account: &RouteAccount, index: usize) -> String {
    account.trace.postings.get(index).map_or_else(String::new, |p| {
        let rule = crate::account::rule_of(route, p.step, p.rule).map_or("", |r| r.name);
        let name = route.materials.get(p.material.0 as usize).map_or("", |m| m.name.as_str());
        format!("{}: {rule}, {name}", technique(route, p.step))
    })
}

fn spending_words(route: &RouteProgram, account: &RouteAccount, index: usize) -> String {
    account.trace.spendings.get(index).map_or_else(String::new, |s| {
        let rule = crate::account::rule_of(route, s.step, s.rule).map_or("", |r| r.name);
        format!("{}: {rule}", technique(route, s.step))
    })
}

/// What keeps two routes from being shown to do equal work.
fn doubts(old: &RouteProgram, new: &RouteProgram) -> Vec<String> {
    let mut out = Vec::new();
    for route in [old, new] {
        if route.recovery.is_none() {
            out.push(format!("nothing says what recovery {} reaches", route.name));
        }
    }
    for route in [old, new] {
        if let Some(first) = route.uncounted.first() {
            let more = match route.uncounted.len() {
                1 => String::new(),
                n => format!(" and {} more", n - 1),
            };
            out.push(format!(
                "electricity is not compared: {} gives no power at {first}{more}, so nothing is counted there",
                route.name
            ));
        }
    }
    let taken_kg = |route: &RouteProgram| {
        let mut sum = 0.0;
        for (_, slot) in &route.feed {
            sum += route.inputs.get(slot.0 as usize).map_or(0.0, |i| i.central_si);
        }
        sum
    };
    let (old_kg, new_kg) = (taken_kg(old), taken_kg(new));
    if (old_kg - new_kg).abs() > 1e-9 * old_kg && new.equivalence.is_none() {
        out.push(format!(
            "{} takes {} a sample and {} takes {}: a smaller sample raises the detection limit, and nothing says that it is still low enough",
            new.name,
            crate::quantity::show(new_kg, crate::quantity::Kind::Mass),
            old.name,
            crate::quantity::show(old_kg, crate::quantity::Kind::Mass),
        ));
    } else if new.equivalence.is_none() {
        out.push(format!("nothing says on what the claim rests that {} does the same work", new.name));
    }
    out
}
