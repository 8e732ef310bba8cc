//! Postings, utilities, inputs and assumptions as documents.

use super::super::json::Json;
use super::super::row::written;
use super::super::words::si_unit;
use crate::account::{Measure, place_name, rule_of};
use crate::chance::Input;
use crate::ledger::{Posting, Spending, StepIx};
use crate::program::{Assumption, RouteProgram, SiteUse};
use crate::quantity::Spread;

/// The index of the step in the plan, and the key of its technique.
pub(crate) fn step_and_technique(route: &RouteProgram, step: StepIx) -> (Option<u16>, &'static str) {
    match step {
        StepIx::Opening => (None, "opening"),
        StepIx::Closing => (None, "closing"),
        StepIx::Step(i) => (Some(i), route.steps.get(i as usize).map_or("", |s| s.technique.key)),
    }
}

pub(super) fn posting(json: &mut Json, route: &RouteProgram, site: &SiteUse, p: &Posting) {
    let (index, technique) = step_and_technique(route, p.step);
    json.put("step", index);
    json.put("technique", technique);
    json.put("rule", rule_of(route, p.step, p.rule).map_or("", |r| r.name));
    json.put("from", &place_name(site, p.from));
    json.put("to", &place_name(site, p.to));
    json.put("material", route.materials.get(p.material.0 as usize).map_or("", |m| m.name.as_str()));
    json.put("kg_per_run", p.kg);
    json.put("runs_per_year", p.runs_a_year);
    json.put("kg_per_year", p.kg_a_year());
    json.put("seconds_per_run", p.over_s);
    json.put("measured", p.measured);
}

pub(super) fn spending(json: &mut Json, route: &RouteProgram, s: &Spending) {
    let (index, technique) = step_and_technique(route, s.step);
    let (unit, measure) =
        if s.utility.is_energy() { ("kwh", Measure::Energy) } else { ("kg", Measure::Mass) };
    json.put("step", index);
    json.put("technique", technique);
    json.put("rule", rule_of(route, s.step, s.rule).map_or("", |r| r.name));
    json.put("utility", s.utility.name());
    json.put(&format!("{unit}_per_run"), written(measure, s.amount_si));
    json.put("runs_per_year", s.runs_a_year);
    json.put(&format!("{unit}_per_year"), written(measure, s.amount_si * s.runs_a_year));
}

/// The list of `inputs`.
pub(crate) fn inputs(json: &mut Json, inputs: &mut dyn Iterator<Item = &Input>) {
    json.list("inputs", |json| {
        for input in inputs {
            json.row(|json| {
                json.put("identity", &input.identity);
                json.put("value_si", input.central_si);
                json.put("unit", si_unit(input.kind));
                match input.spread {
                    Spread::Exact => {}
                    Spread::Limits { low_si, high_si } => {
                        json.put("low_si", low_si);
                        json.put("high_si", high_si);
                    }
                    Spread::Standard { u_si } => json.put("standard_uncertainty_si", u_si),
                }
                json.put("origin", input.origin.word());
                json.put("basis", &input.basis);
            });
        }
    });
}

pub(super) fn assumption(json: &mut Json, a: &Assumption) {
    json.put("path", &a.path);
    json.put("label", &a.label);
    json.put("value", &a.value);
    json.put("source", a.source.cite);
    json.put("standing", a.source.standing.words());
}
