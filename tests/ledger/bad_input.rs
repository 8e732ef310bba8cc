//! What is said about plans that cannot be accounted for, word for word.
//!
//! Each case is a change to a sound plan; the sentences are kept in `said.txt` (UPDATE=1 writes them anew), to be read by
//! people: what is wrong, where, and what would do.

use super::{beside, sound};
use serde_json::{Value, json};
use std::fmt::Write as _;
use thimbleworth::account::{Account, account_text};
use thimbleworth::plan::Severity;

fn plan() -> Value {
    json!({
        "thimbleworth": 1, "title": "Sound", "site": { "name": "Curlew Bank laboratory", "streams": [
            { "name": "flammable", "container": "20 L", "fill": "90 %" },
            { "name": "solids", "holds": "solid", "container": "60 L", "fill": "90 %", "bulk_density": "0.6 kg/L" } ] },
        "workloads": [{ "name": "w", "results_per_year": 100, "batch": { "samples": 10, "controls": 2 }, "repeats": "2 %",
            "feed": { "soil": "10 g" }, "present": "r", "routes": [{ "name": "r", "steps": [
                { "step": "soxhlet", "solvent": { "n-hexane": "50 %", "acetone": "50 %" }, "charge": "250 mL", "time": "18 h",
                  "loss": "5 %", "lost_to": "hood", "hold_up": "1 mL/g" },
                { "step": "concentrate", "by": "rotary evaporator", "to": "5 mL", "condensate": "flammable", "loss": "5 %", "lost_to": "hood" } ],
            "ends": { "liquor": "flammable", "marc": "solids" } }] }]
    })
}

fn said(account: &Account) -> String {
    let mut out = String::new();
    for p in &account.problems {
        let at = if p.path.is_empty() { "the document" } else { &p.path };
        let need = if p.need.is_empty() { String::new() } else { format!("; {}", p.need) };
        writeln!(out, "  {} {at}: {}{need}", p.severity.word(), p.found).unwrap();
    }
    if out.is_empty() { "  nothing\n".into() } else { out }
}

/// A value put at a pointer of the sound plan; null takes what is there away.
fn changed(pointer: &str, value: Value) -> String {
    let mut plan = plan();
    let (above, key) = pointer.rsplit_once('/').unwrap();
    match plan.pointer_mut(above).unwrap() {
        Value::Object(map) if value.is_null() => drop(map.remove(key)),
        Value::Object(map) => drop(map.insert(key.to_owned(), value)),
        Value::Array(list) if value.is_null() => drop(list.remove(key.parse().unwrap())),
        Value::Array(list) => list.insert(key.parse().unwrap(), value),
        _ => panic!("{pointer}"),
    }
    plan.to_string()
}

/// The kept cases: a title, a pointer and a value.
fn cases() -> Vec<(String, String)> {
    let kept: Value =
        serde_json::from_str(&std::fs::read_to_string(beside("bad_input.json")).unwrap()).unwrap();
    let rows = kept.as_array().unwrap().iter();
    let mut out: Vec<(String, String)> = rows
        .map(|r| (r[0].as_str().unwrap().to_owned(), changed(r[1].as_str().unwrap(), r[2].clone())))
        .collect();
    out.push(("an empty file".into(), String::new()));
    out.push(("cut short".into(), plan().to_string()[..200].to_owned()));
    let mut plan = plan();
    plan["workloads"][0]["feed"] = json!({ "soil": "-1 g" });
    plan["workloads"][0]["routes"][0]["steps"][0]["charge"] = json!("250 g");
    plan["workloads"][0]["routes"][0]["steps"][1]["loss"] = json!("150 %");
    plan["workloads"][0]["routes"][0]["ends"]["marc"] = json!("solid");
    out.push(("several errors are told at once".into(), plan.to_string()));
    out
}

#[test]
fn every_sentence_is_as_it_was_read_and_approved() {
    sound(&plan());
    let mut text = String::new();
    for (title, plan) in cases() {
        let account = account_text(&plan);
        writeln!(text, "{title}\n{}", said(&account)).unwrap();
    }
    let path = beside("said.txt");
    if std::env::var_os("UPDATE").is_some() {
        std::fs::write(&path, &text).unwrap();
    }
    let kept = std::fs::read_to_string(&path).unwrap_or_default();
    for (number, (now, before)) in text.lines().zip(kept.lines()).enumerate() {
        assert_eq!(now, before, "said.txt, line {}; UPDATE=1 writes the file anew", number + 1);
    }
    assert_eq!(text.len(), kept.len(), "said.txt has lines more or fewer; UPDATE=1 writes the file anew");
}

#[test]
fn every_bad_plan_is_refused_or_doubted_with_what_would_do() {
    for (title, plan) in cases() {
        let account = account_text(&plan);
        assert!(!account.problems.is_empty(), "{title}");
        for p in &account.problems {
            assert!(!p.found.is_empty() && !p.found.ends_with('.'), "{title}: {p:?}");
            assert!(!p.need.is_empty() || p.severity == Severity::Note, "{title}: {p:?}");
            assert!(!p.need.ends_with('.'), "{title}: {p:?}");
            for text in [&p.found, &p.need] {
                assert!(!text.contains("  ") && !text.chars().any(char::is_control), "{title}: {p:?}");
                assert!(!text.contains("inf") || text.contains("information"), "{title}: {p:?}");
            }
        }
        // Worst first, and no accounts beside an error of the plan itself.
        assert!(account.problems.is_sorted_by_key(|p| p.severity), "{title}");
        if account.program.is_none() {
            assert!(account.broken() && account.workloads.is_empty(), "{title}");
        }
    }
}

/// A plan of ten thousand steps is accounted for, closes, and takes no more than a moment.
#[test]
fn ten_thousand_steps() {
    let mut plan = plan();
    let steps = plan["workloads"][0]["routes"][0]["steps"].as_array_mut().unwrap();
    let rinse = json!({ "step": "rinse", "solvent": "acetone", "charge": "10 mL", "to": "flammable", "loss": "2 %", "lost_to": "hood" });
    steps.resize(10_000, rinse);
    let account = sound(&plan);
    let found = account.workloads[0].routes[0].as_ref().unwrap();
    assert!(found.closure.abs() < 1e-12);
    let ml = 1e6 * found.value("mass.drawn.acetone").unwrap() / found.runs.extractions / 790.0;
    assert!((ml / (9998.0 * 10.0 + 125.0) - 1.0).abs() < 0.01, "{ml}");
    // Ten thousand errors are no flood either.
    for step in plan["workloads"][0]["routes"][0]["steps"].as_array_mut().unwrap() {
        step["charge"] = json!("10 kg");
    }
    let account = account_text(&plan.to_string());
    assert!(account.broken() && account.problems.len() <= 10_010);
}

/// A route that stops does not take the others with it.
#[test]
fn the_other_routes_are_accounted_for() {
    let mut plan = plan();
    let mut stops = plan["workloads"][0]["routes"][0].clone();
    stops["name"] = json!("stops");
    stops["steps"][1]["to"] = json!("900 mL");
    plan["workloads"][0]["routes"].as_array_mut().unwrap().push(stops);
    let account = account_text(&plan.to_string());
    assert!(account.broken());
    assert!(account.workloads[0].routes[0].is_some() && account.workloads[0].routes[1].is_none());
}
