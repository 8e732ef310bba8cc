//! Cost, time, climate and the case for switching, by hand arithmetic on small plans; what has no price; odd input.
//!
//! Witness: the arithmetic beside each check; for the investment the closed form of an annuity; for material flow cost an
//! illustration of ISO 14051 with numbers from memory; warming potentials of the IPCC reports as a general property library
//! holds them.
#![allow(clippy::unwrap_used, clippy::panic, reason = "functions shared by tests stand outside them")]

mod case;
mod climate;
mod cost;
mod odd;

use serde_json::{Value, json};
use thimbleworth::account::{Account, RouteAccount, account_text};

/// A hundred results in ten batches; a route that uses 1 L of cleaner and a pad each time, and one that uses a quarter.
fn plan() -> Value {
    json!({
        "thimbleworth": 1, "title": "Cleaner", "site": {
            "name": "Mill", "rules": "none",
            "streams": [
                { "name": "waste", "container": "20 L", "fill": "100 %" },
                { "name": "solids", "holds": "solid", "bulk_density": "0.5 kg/L" }],
            "money": {
                "currency": "USD",
                "prices": { "cleaner": "10 USD for 2.5 L", "pad": "5 USD for 500 g" },
                "disposal": { "waste": "7 USD/container + 30 USD/pick-up", "solids": "3 USD/kg" },
                "pick_ups": 2, "labour_hour": "40 USD", "discount": "10 %", "years": 5, "source": "invented" },
            "hours": { "attended": "150 h" } },
        "materials": {
            "cleaner": { "class": "solvent", "density": "0.8 kg/L", "source": "invented" },
            "pad": { "class": "consumable", "source": "invented" } },
        "workloads": [{
            "name": "Cleaning", "results_per_year": 100, "batch": { "samples": 10 }, "feed": {}, "present": "A",
            "routes": [
                { "name": "A", "recovery": "90 %", "equivalence": "in use", "permission": "in use", "steps": [
                    { "step": "consume", "material": "cleaner", "mass": "0.8 kg", "to": "waste" },
                    { "step": "consume", "material": "pad", "mass": "10 g", "to": "solids" }],
                  "time": { "attended": "6 min", "attended_batch": "30 min" } },
                { "name": "B", "recovery": "90 %", "equivalence": "tried", "permission": "letter", "steps": [
                    { "step": "consume", "material": "cleaner", "mass": "0.2 kg", "to": "waste" }],
                  "time": { "run": "2 h", "attended": "3 min", "instruments": 1 },
                  "money": { "instrument": "1500 USD", "validation": "500 USD", "residual": "100 USD", "service": "50 USD" } }
            ] }]
    })
}

fn accounted(plan: &Value) -> Account {
    account_text(&plan.to_string())
}

fn sound(plan: &Value) -> Account {
    let account = accounted(plan);
    assert!(!account.broken(), "{:#?}", account.problems);
    account
}

fn route(account: &Account, r: usize) -> &RouteAccount {
    account.workloads[0].routes[r].as_ref().unwrap()
}

#[track_caller]
fn is(account: &RouteAccount, id: &str, expected: f64) {
    let found = account.value(id).unwrap_or_else(|| panic!("no figure {id}"));
    assert!((found - expected).abs() <= 1e-9 * expected.abs(), "{id}: {found} is not {expected}");
}
