//! Postings, utilities, inputs and assumptions as documents.

use super::super::row::written;
use super::super::words::si_unit;
use crate::account::{Measure, place_name, rule_of};
use crate::chance::Input;
use crate::ledger::{Posting, Spending, StepIx};
use crate::program::{Assumption, RouteProgram, SiteUse};
use crate::quantity::Spread;
use crate::step::Caution;
use serde::Serialize;

#[derive(Serialize)]
pub(super) struct PostingDocument<'a> {
    step: Option<u16>,
    technique: &'static str,
    rule: &'static str,
    from: String,
    to: String,
    material: &'a str,
    kg_per_run: f64,
    runs_per_year: f64,
    kg_per_year: f64,
    seconds_per_run: Option<f64>,
    measured: bool,
}

/// The index of the step in the plan, and the key of its technique.
pub(crate) fn step_and_technique(route: &RouteProgram, step: StepIx) -> (Option<u16>, &'static str) {
    match step {
        StepIx::Opening => (None, "opening"),
        StepIx::Closing => (None, "closing"),
        StepIx::Step(i) => (Some(i), route.steps.get(i as usize).map_or("", |s| s.technique.key)),
    }
}

impl<'a> PostingDocument<'a> {
    pub(super) fn of(route: &'a RouteProgram, site: &SiteUse, p: &Posting) -> Self {
        let (step, technique) = step_and_technique(route, p.step);
        Self {
            step,
            technique,
            rule: rule_of(route, p.step, p.rule).map_or("", |r| r.name),
            from: place_name(site, p.from),
            to: place_name(site, p.to),
            material: route.materials.get(p.material.0 as usize).map_or("", |m| m.name.as_str()),
            kg_per_run: p.kg,
            runs_per_year: p.runs_a_year,
            kg_per_year: p.kg_a_year(),
            seconds_per_run: p.over_s,
            measured: p.measured,
        }
    }
}

#[derive(Serialize)]
pub(super) struct SpendingDocument {
    step: Option<u16>,
    technique: &'static str,
    rule: &'static str,
    utility: &'static str,
    #[serde(skip_serializing_if = "Option::is_none")]
    kwh_per_run: Option<f64>,
    #[serde(skip_serializing_if = "Option::is_none")]
    kg_per_run: Option<f64>,
    runs_per_year: f64,
    #[serde(skip_serializing_if = "Option::is_none")]
    kwh_per_year: Option<f64>,
    #[serde(skip_serializing_if = "Option::is_none")]
    kg_per_year: Option<f64>,
}

impl SpendingDocument {
    pub(super) fn of(route: &RouteProgram, s: &Spending) -> Self {
        let (step, technique) = step_and_technique(route, s.step);
        let energy = s.utility.is_energy();
        let kwh = |j: f64| energy.then(|| written(Measure::Energy, j));
        let kg = |kg: f64| (!energy).then_some(kg);
        let a_year = s.amount_si * s.runs_a_year;
        Self {
            step,
            technique,
            rule: rule_of(route, s.step, s.rule).map_or("", |r| r.name),
            utility: s.utility.name(),
            kwh_per_run: kwh(s.amount_si),
            kg_per_run: kg(s.amount_si),
            runs_per_year: s.runs_a_year,
            kwh_per_year: kwh(a_year),
            kg_per_year: kg(a_year),
        }
    }
}

#[derive(Serialize)]
pub(crate) struct InputDocument<'a> {
    identity: &'a str,
    value_si: f64,
    unit: &'static str,
    #[serde(skip_serializing_if = "Option::is_none")]
    low_si: Option<f64>,
    #[serde(skip_serializing_if = "Option::is_none")]
    high_si: Option<f64>,
    #[serde(skip_serializing_if = "Option::is_none")]
    standard_uncertainty_si: Option<f64>,
    origin: &'static str,
    basis: &'a str,
}

impl<'a> InputDocument<'a> {
    pub(crate) fn of(input: &'a Input) -> Self {
        let (low_si, high_si, standard_uncertainty_si) = match input.spread {
            Spread::Exact => (None, None, None),
            Spread::Limits { low_si, high_si } => (Some(low_si), Some(high_si), None),
            Spread::Standard { u_si } => (None, None, Some(u_si)),
        };
        Self {
            identity: &input.identity,
            value_si: input.central_si,
            unit: si_unit(input.kind),
            low_si,
            high_si,
            standard_uncertainty_si,
            origin: input.origin.word(),
            basis: &input.basis,
        }
    }
}

#[derive(Serialize)]
pub(super) struct AssumptionDocument<'a> {
    path: &'a str,
    label: &'a str,
    value: &'a str,
    source: &'static str,
    standing: &'static str,
}

impl<'a> AssumptionDocument<'a> {
    pub(super) fn of(a: &'a Assumption) -> Self {
        let (source, standing) = (a.source.cite, a.source.standing.words());
        Self { path: &a.path, label: &a.label, value: &a.value, source, standing }
    }
}

#[derive(Serialize)]
pub(super) struct CautionDocument {
    key: &'static str,
    text: &'static str,
    source: &'static str,
}

impl CautionDocument {
    pub(super) fn of(c: &Caution) -> Self {
        Self { key: c.key, text: c.text, source: c.source.cite }
    }
}
