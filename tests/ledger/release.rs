//! What goes to air carries the time over which it goes; what stays does not.
//!
//! Witness: the times written in the plan.

use super::{routes, sound};
use serde_json::{Value, json};
use thimbleworth::ledger::{Place, StepIx};

fn plan(steps: &Value) -> Value {
    json!({
        "thimbleworth": 1, "title": "Air", "site": { "name": "Alder Quay test bench",
        "streams": [{ "name": "waste" }, { "name": "solids", "holds": "solid" }] },
        "workloads": [{ "name": "w", "results_per_year": 1, "batch": { "samples": 1 }, "feed": { "sediment": "3 g" },
            "present": "r", "routes": [{ "name": "r", "steps": steps, "ends": { "liquor": "waste", "marc": "solids" } }] }]
    })
}

#[test]
fn a_release_lasts_as_long_as_its_step_and_no_longer() {
    let steps = json!([
        { "step": "soxhlet", "solvent": "n-hexane", "charge": "300 mL", "time": "18 h", "lost_to": "room" },
        { "step": "rinse", "solvent": "acetone", "charge": "40 mL", "to": "waste" },
        { "step": "concentrate", "by": "nitrogen stream", "to": "1 mL", "time": "3 h" }
    ]);
    let account = sound(&plan(&steps));
    let (_, found) = routes(&account).next().unwrap();
    let mut seen = [0; 3];
    for p in &found.trace.postings {
        let expected = match (p.to.is_air(), p.step) {
            (true, StepIx::Step(0)) => Some(64_800.0),
            (true, StepIx::Step(2)) => Some(10_800.0),
            _ => None,
        };
        assert_eq!(p.over_s, expected, "{p:?}");
        if let (true, StepIx::Step(i)) = (p.to.is_air() && p.kg > 0.0, p.step) {
            seen[usize::from(i)] += 1;
        }
    }
    // hexane, acetone, hexane: the rinse says no time, and none is made up for it
    assert_eq!(seen, [1, 1, 1], "{:?}", found.trace.postings);
    assert!(found.trace.postings.iter().any(|p| p.to == Place::ROOM && p.kg > 0.0));
}
