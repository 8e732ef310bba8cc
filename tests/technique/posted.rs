//! Every rule that is declared is used, every number that is given counts.
//!
//! Witness: the declarations against the trace of runs; no published value.

use super::{plan_around, plan_of_example, sound, text_of};
use serde_json::Value;
use std::collections::{BTreeMap, BTreeSet};
use thimbleworth::account::{Account, account_text};
use thimbleworth::chance::Draw;
use thimbleworth::ledger::{StepIx, Trace};
use thimbleworth::plan::{Severity, below};
use thimbleworth::program::RouteProgram;
use thimbleworth::step::{Need, TECHNIQUES, technique};

/// The examples of the techniques, and those kept beside this file.
fn examples() -> Vec<(String, Account)> {
    let mut out: Vec<(String, Account)> =
        TECHNIQUES.iter().map(|t| (t.key.to_owned(), sound(&plan_of_example(t)))).collect();
    let kept: Value = serde_json::from_str(&text_of("examples.json")).unwrap();
    for (name, example) in kept.as_object().unwrap() {
        let steps = example["steps"].as_array().unwrap().clone();
        let text = plan_around(&example["feed"], steps, &example["ends"]);
        out.push((name.clone(), sound(&text)));
    }
    out
}

fn only_route(account: &Account) -> &RouteProgram {
    &account.program.as_ref().unwrap().workloads[0].routes[0]
}

fn traced(route: &RouteProgram, x: &[f64]) -> Option<Trace> {
    let (mut desk, mut trace) = (route.desk(), Trace::default());
    route.run(Draw(x), &mut desk, Some(&mut trace)).ok().map(|()| trace)
}

#[test]
fn every_declared_rule_moves_or_spends_something_in_an_example() {
    let mut used: BTreeMap<&str, BTreeSet<usize>> = BTreeMap::new();
    for (_, account) in &examples() {
        let route = only_route(account);
        let trace = traced(route, &route.central()).unwrap();
        let mut note = |step: StepIx, rule: u8| {
            if let StepIx::Step(i) = step {
                used.entry(route.steps[i as usize].technique.key).or_default().insert(rule as usize);
            }
        };
        for p in trace.postings.iter().filter(|p| p.kg > 0.0) {
            note(p.step, p.rule.0);
        }
        for s in trace.spendings.iter().filter(|s| s.amount_si > 0.0) {
            note(s.step, s.rule.0);
        }
    }
    for t in TECHNIQUES {
        let seen = used.remove(t.key).unwrap_or_default();
        assert!(
            seen.iter().all(|i| *i < t.rules.len()),
            "{} posts by a rule that it does not declare",
            t.key
        );
        let never: Vec<&str> =
            t.rules.iter().enumerate().filter(|(i, _)| !seen.contains(i)).map(|(_, r)| r.name).collect();
        assert!(never.is_empty(), "{} declares and never uses {never:?}", t.key);
    }
}

/// A number that a plan gives and that changes no posting, no spending and no note is a number that was lost on the way.
#[test]
fn every_number_that_an_example_gives_counts() {
    let mut checked = 0;
    for (name, account) in &examples() {
        let route = only_route(account);
        let x = route.central();
        let before = traced(route, &x).unwrap();
        for (i, input) in route.inputs.iter().enumerate() {
            // The nominal volume describes a cell where the solvent used is known, and a vessel where its void is.
            let described = name == "pressurised liquid by the log" && input.identity.ends_with(".cell")
                || name == "supercritical in two stages" && input.identity.ends_with("steps[1].vessel");
            if !input.identity.contains(".steps[") || x[i] == 0.0 || described {
                continue;
            }
            let mut moved = x.clone();
            moved[i] *= 0.999;
            let after = traced(route, &moved).unwrap_or_else(|| panic!("{name}: {}", input.identity));
            assert!(before != after, "{name}: {} = {} changes nothing", input.identity, input.basis);
            checked += 1;
        }
    }
    assert!(checked > 100, "{checked}");
}

/// Every parameter by itself beside those that are required: it counts, or the plan is told that it does not.
#[test]
fn nothing_that_is_given_is_dropped_in_silence() {
    let kept: Value = serde_json::from_str(&text_of("examples.json")).unwrap();
    let mut lone = BTreeSet::new();
    for example in kept.as_object().unwrap().values() {
        let steps = example["steps"].as_array().unwrap();
        for (i, step) in steps.iter().enumerate() {
            let t = technique(step["step"].as_str().unwrap()).unwrap();
            let required = |key: &str| t.params.iter().any(|p| p.key == key && p.need == Need::Required);
            for p in t.params.iter().filter(|p| p.need != Need::Required && step.get(p.key).is_some()) {
                let hangs_on = p.shown_when.map_or("", |(on, _)| on);
                let fields = step.as_object().unwrap().iter();
                let alone: serde_json::Map<String, Value> = fields
                    .filter(|(k, _)| *k == "step" || required(k) || *k == p.key || *k == hangs_on)
                    .map(|(k, v)| (k.clone(), v.clone()))
                    .collect();
                let mut steps: Vec<Value> = steps[..i].to_vec();
                steps.push(Value::Object(alone));
                let text = plan_around(&example["feed"], steps, &example["ends"]);
                let account = account_text(&text);
                let at = below(&format!("workloads[0].routes[0].steps[{i}]"), p.key);
                let told = account.problems.iter().any(|q| {
                    q.severity == Severity::Error && (q.path.starts_with(&at) || q.found.contains(p.key))
                });
                if !told && !account.broken() {
                    let route = only_route(&account);
                    let x = route.central();
                    let before = traced(route, &x).unwrap();
                    for (slot, input) in route.inputs.iter().enumerate() {
                        if input.identity.starts_with(&at) && x[slot] > 0.0 {
                            let mut moved = x.clone();
                            moved[slot] *= 0.999;
                            let counts = traced(route, &moved).unwrap() != before;
                            // A time says how long; it needs no power beside it.
                            assert!(counts || p.key.ends_with("time"), "{}.{} is dropped", t.key, p.key);
                        }
                    }
                }
                lone.insert((t.key, p.key));
            }
        }
    }
    assert!(lone.len() > 45, "{}", lone.len());
}

/// The equation of a rule and the numbers noted for it name the same things: a rule that computes says with what.
#[test]
fn every_rule_that_computes_shows_its_working() {
    let plain =
        ["all that is there", "what is left", "what the let-down recovers", "what flowed", "what the vessel"];
    for (name, account) in &examples() {
        let route = only_route(account);
        let trace = traced(route, &route.central()).unwrap();
        for p in trace.postings.iter().filter(|p| p.kg > 0.0) {
            let StepIx::Step(i) = p.step else { continue };
            let rule = &route.steps[i as usize].technique.rules[p.rule.0 as usize];
            let computed =
                !plain.iter().any(|words| rule.equation.starts_with(words)) && rule.equation != "m";
            let worked = trace.working(p.step, p.rule).next().is_some();
            assert!(worked || !computed, "{name}: \"{}\" ({}) has no working", rule.name, rule.equation);
        }
    }
}
