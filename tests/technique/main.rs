//! The techniques: what they declare against what they ask for and post, and worked cases written as plans.
//!
//! The witness of each case stands beside its expected values in `cases.toml`; the plans are the `.json` files.
#![allow(
    clippy::unwrap_used,
    clippy::panic,
    clippy::needless_pass_by_value,
    reason = "functions shared by tests stand outside them"
)]

mod cases;
mod circuit;
mod declared;
mod diffusion;
mod filling;
mod posted;
mod staged;
mod trade;
mod vapour;

use serde_json::{Value, json};
use std::path::PathBuf;
use thimbleworth::account::{Account, RouteAccount, account_text};
use thimbleworth::ledger::{Direction, Place};
use thimbleworth::program::RouteProgram;
use thimbleworth::step::Technique;

/// A file beside this one.
fn beside(name: &str) -> PathBuf {
    PathBuf::from(env!("CARGO_MANIFEST_DIR")).join("technique").join(name)
}

/// The text of a file beside this one.
fn text_of(name: &str) -> String {
    std::fs::read_to_string(beside(name)).unwrap_or_else(|e| panic!("{name}: {e}"))
}

/// The account of a plan beside this file, which has no error.
fn account_of(name: &str) -> Account {
    sound(&text_of(name))
}

/// The account of a plan that has no error.
fn sound(text: &str) -> Account {
    let account = account_text(text);
    assert!(!account.broken(), "{:#?}\n{text}", account.problems);
    account
}

/// One route of the first workload.
fn route<'a>(account: &'a Account, name: &str) -> (&'a RouteProgram, &'a RouteAccount) {
    let work = &account.program.as_ref().unwrap().workloads[0];
    let i = work.routes.iter().position(|r| r.name == name).unwrap_or_else(|| panic!("no route {name}"));
    (&work.routes[i], account.workloads[0].routes[i].as_ref().unwrap())
}

/// What the traced run posts between two kinds of place, of one material; kg in one run.
fn posted_kg(
    (program, account): (&RouteProgram, &RouteAccount),
    material: &str,
    mut wanted: impl FnMut(Place, Place) -> bool,
) -> f64 {
    let mut sum = 0.0;
    for p in &account.trace.postings {
        if program.materials[p.material.0 as usize].name == material && wanted(p.from, p.to) {
            sum += p.kg;
        }
    }
    sum
}

/// A plan around some steps: one sample a year, a feed for each place where a technique may look for it.
fn plan_around(feed: &Value, steps: Vec<Value>, ends: &Value) -> String {
    json!({
        "thimbleworth": 1,
        "title": "One technique",
        "site": { "name": "Alder Quay test bench", "streams": [
            { "name": "waste" }, { "name": "solids", "holds": "solid" }
        ] },
        "materials": {
            "plant oil": { "class": "solute", "source": "made up for this test" },
            "tracer": { "class": "solute", "source": "made up for this test" }
        },
        "workloads": [{
            "name": "w", "results_per_year": 1, "batch": { "samples": 1 }, "feed": feed, "present": "r",
            "routes": [{ "name": "r", "steps": steps, "ends": ends }]
        }]
    })
    .to_string()
}

/// The example of a technique, in a plan that makes sense of it.
fn plan_of_example(t: &Technique) -> String {
    let example: Value = serde_json::from_str(t.example).unwrap_or_else(|e| panic!("{}: {e}", t.key));
    let extraction = json!({ "step": "ultrasonic", "solvent": "ethyl acetate", "charge": "50 mL" });
    let (feed, steps) = match t.takes_feed {
        Some(Place::SECOND_PHASE) => (json!({ "water": "1 L" }), vec![example]),
        Some(_) => (json!({ "sediment": "3 g" }), vec![example]),
        None => (json!({ "sediment": "3 g" }), vec![extraction, example]),
    };
    let ends = json!({ "liquor": "waste", "marc": "solids", "second phase": "waste", "trap": "waste" });
    plan_around(&feed, steps, &ends)
}

/// What has passed a place in a year, from a run of its own.
fn passed_kg(program: &RouteProgram, place: Place, direction: Direction, material: &str) -> f64 {
    let x = program.central();
    let mut desk = program.desk();
    program.run(thimbleworth::chance::Draw(&x), &mut desk, None).unwrap();
    let i = program.materials.iter().position(|m| m.name == material).unwrap();
    desk.cells.passed(place, direction, thimbleworth::ledger::Material(u16::try_from(i).unwrap()))
}
