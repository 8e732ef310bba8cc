//! Measured figures in place of computed ones.

use super::{beside, routes, sound};
use serde_json::{Value, json};
use thimbleworth::account::account_text;
use thimbleworth::ledger::{StepIx, Trace};
use thimbleworth::plan::below;
use thimbleworth::step::{Measurable, technique};

/// The step at the end of a route; with a liquor to work on where it takes none in.
fn plan(step: Value, feed: Value) -> Value {
    let pour = json!({ "step": "ultrasonic", "solvent": { "ethyl acetate": "97 %", "water": "3 %" }, "charge": "50 mL" });
    let takes_in = technique(step["step"].as_str().unwrap()).unwrap().takes_feed.is_some();
    let steps = if takes_in { vec![step] } else { vec![pour, step] };
    json!({
        "thimbleworth": 1, "title": "A weighing",
        "site": { "name": "Lapwing Staithe laboratory", "streams": [{ "name": "waste" }, { "name": "solids", "holds": "solid" }] },
        "materials": { "oil": { "class": "solute", "source": "made up for this test" } },
        "workloads": [{ "name": "w", "results_per_year": 10, "batch": { "samples": 1 }, "feed": feed, "present": "r", "routes": [
            { "name": "r", "steps": steps, "ends": { "liquor": "waste", "second phase": "waste", "marc": "solids", "trap": "waste" } }
        ] }]
    })
}

/// A step of every technique with a measurable rule, and the feed it works on.
fn steps() -> Vec<(Value, Value)> {
    let kept: Value =
        serde_json::from_str(&std::fs::read_to_string(beside("measurable.json")).unwrap()).unwrap();
    kept.as_array().unwrap().iter().map(|s| (s["step"].clone(), s["feed"].clone())).collect()
}

fn measured_postings(trace: &Trace) -> usize {
    trace.postings.iter().filter(|p| p.measured).count()
}

/// For every measurable rule of every technique: the mass posted is the mass measured, split as it was computed, the
/// rest adapts and the book closes.
#[test]
fn the_mass_posted_is_the_mass_measured() {
    let mut seen = 0;
    for (step, feed) in steps() {
        let computed = sound(&plan(step.clone(), feed.clone()));
        let (route, before) = routes(&computed).next().unwrap();
        let at = StepIx::Step(u16::try_from(route.steps.len() - 1).unwrap());
        let technique = route.steps.last().unwrap().technique;
        for (i, rule) in
            technique.rules.iter().enumerate().filter(|(_, r)| r.measurable == Measurable::MassOrShare)
        {
            let of = |trace: &Trace| -> Vec<(u16, f64)> {
                let here = trace.postings.iter().filter(|p| p.step == at);
                here.filter(|p| p.rule.0 as usize == i).map(|p| (p.material.0, p.kg)).collect()
            };
            let old = of(&before.trace);
            let old_kg = old.iter().fold(0.0, |sum, (_, kg)| sum + kg);
            assert!(old_kg > 0.0, "{}: {} moves nothing here", technique.key, rule.name);
            // Half of what was computed can always be there.
            let mg = old_kg * 1e6 / 2.0;
            let mut measured = step.clone();
            measured["measured"] = json!({ rule.name: format!("{mg} mg") });
            let account = sound(&plan(measured.clone(), feed.clone()));
            let (_, after) = routes(&account).next().unwrap();
            let new = of(&after.trace);
            let new_kg = new.iter().fold(0.0, |sum, (_, kg)| sum + kg);
            assert!((new_kg / (old_kg / 2.0) - 1.0).abs() < 1e-14, "{}: {}", technique.key, rule.name);
            for ((m, a), (n, b)) in old.iter().zip(&new) {
                assert!(
                    m == n && (a / 2.0 - b).abs() <= 1e-14 * a,
                    "{}: {}: {a} {b}",
                    technique.key,
                    rule.name
                );
            }
            assert!(measured_postings(&after.trace) == new.len() && measured_postings(&before.trace) == 0);
            let beside = after.trace.notes.iter().find(|n| n.symbol == "computed in its place").unwrap();
            assert!((beside.value_si / old_kg - 1.0).abs() < 1e-14, "the computed mass stays beside it");
            assert!(after.closure.abs() < 1e-12);
            let total = |a: &thimbleworth::account::RouteAccount| a.value("mass.in").unwrap();
            assert!((total(after) / total(before) - 1.0).abs() < 1e-14);

            // A share of what was there, in place of a mass.
            measured["measured"] = json!({ rule.name: "0.1 %" });
            let account = sound(&plan(measured.clone(), feed.clone()));
            assert!(routes(&account).next().unwrap().1.closure.abs() < 1e-12);

            // More than there is: an error that says what, how much, and how much there is.
            measured["measured"] = json!({ rule.name: "90 kg" });
            let account = account_text(&plan(measured.clone(), feed.clone()).to_string());
            let problem = account.problems.iter().find(|p| {
                p.path == below(&format!("{}.measured", route.steps.last().unwrap().path), rule.name)
            });
            let problem = problem
                .unwrap_or_else(|| panic!("{}: {}: {:#?}", technique.key, rule.name, account.problems));
            assert!(problem.found.contains("measured") && problem.found.contains("is there"), "{problem:?}");
            assert!(account.workloads[0].routes[0].is_none());
            seen += 1;
        }
    }
    let declared = thimbleworth::step::TECHNIQUES
        .iter()
        .flat_map(|t| t.rules)
        .filter(|r| r.measurable == Measurable::MassOrShare);
    assert_eq!(seen, declared.count());
}

#[test]
fn a_figure_for_a_rule_that_cannot_be_measured_is_refused_with_those_that_can() {
    let (mut step, feed) = steps().swap_remove(0);
    for (name, what) in [
        ("charge", "cannot be replaced"),
        ("condenser los", "has no rule"),
        ("condenser loss ", "has no rule"),
    ] {
        step["measured"] = json!({ name: "2 g" });
        let account = account_text(&plan(step.clone(), feed.clone()).to_string());
        let problem = account.problems.iter().find(|p| p.found.contains(what)).unwrap();
        assert!(problem.need.contains("condenser loss"), "{problem:?}");
    }
    for bad in ["2", "-2 g", "120 %", "two grams", "", "3 mL"] {
        step["measured"] = json!({ "condenser loss": bad });
        let account = account_text(&plan(step.clone(), feed.clone()).to_string());
        assert!(
            account.broken() && account.problems.iter().any(|p| p.path.contains("measured")),
            "{bad}: {:#?}",
            account.problems
        );
    }
}

/// A meter's reading stands in place of power by time, and counts what no power is stated for. What a step takes at least is
/// told where either lies below it.
#[test]
fn a_meter_overrides_power_by_time() {
    let (mut step, feed) = steps().swap_remove(0);
    step["heater"] = json!("250 W");
    let electricity = |step: &Value| {
        let account = sound(&plan(step.clone(), feed.clone()));
        let (route, found) = routes(&account).next().unwrap();
        (found.trace.spendings[0].amount_si, route.uncounted.clone())
    };
    let time_s = 18.0 * 3600.0;
    step["time"] = json!("18 h");
    assert_eq!(electricity(&step), (250.0 * time_s, vec![]));
    step["measured"] = json!({ "heating": "3.1 kWh" });
    assert_eq!(electricity(&step), (3.1 * 3.6e6, vec![]));
    step.as_object_mut().unwrap().remove("heater");
    assert_eq!(electricity(&step), (3.1 * 3.6e6, vec![]));
    for bad in ["3 g", "5 %", "250 W", "", "-1 kWh"] {
        step["measured"] = json!({ "heating": bad });
        let account = account_text(&plan(step.clone(), feed.clone()).to_string());
        assert!(
            account.problems.iter().any(|p| p.path.contains("measured") && p.found.contains(bad)),
            "{bad}"
        );
    }
}
