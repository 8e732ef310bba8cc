//! Liquid-liquid extraction on the bench against the closed formula of crosscurrent stages.
//!
//! Witness: Nernst's distribution law, (1 + D V_o/V_w)⁻ⁿ, through `metric::staged`, which shares no code with the step.

use super::{passed_kg, plan_around, route, sound};
use serde_json::json;
use thimbleworth::ledger::{Direction, Place};
use thimbleworth::metric::staged::{share_left, solvent_for_recovery_m3};

fn left_in_the_water(distribution: &str, portion: &str, portions: u32) -> f64 {
    let step = json!({ "step": "liquid-liquid", "solvent": "n-heptane", "charge": portion, "portions": portions,
        "distribution": { "tracer": distribution } });
    let feed = json!({ "water": "1 L", "tracer": "1 mg" });
    // The tracer has no density of its own, so that the volume of the water is a litre.
    let text = plan_around(&feed, vec![step], &json!({ "liquor": "waste", "second phase": "elsewhere" }));
    let account = sound(&text);
    let (program, _) = route(&account, "r");
    passed_kg(program, Place::ELSEWHERE, Direction::Into, "tracer") / 1e-6
}

#[test]
fn portions_part_as_crosscurrent_stages_do() {
    for (word, d) in [("0.1", 0.1), ("1", 1.0), ("10", 10.0), ("250", 250.0)] {
        for (text, portion_m3) in [("5 mL", 5e-6), ("60 mL", 60e-6), ("0.5 L", 0.5e-3)] {
            for n in [1, 2, 3, 6, 50] {
                let (found, expected) =
                    (left_in_the_water(word, text, n), share_left(d, portion_m3, 1e-3, n).unwrap());
                // Absolute: the share left is a difference of what was there and what has gone.
                assert!((found - expected).abs() < 1e-12, "D {d}, {text}, {n}: {found} {expected}");
                if expected > 1e-3 {
                    assert!((found / expected - 1.0).abs() < 1e-11, "D {d}, {text}, {n}: {found} {expected}");
                }
            }
        }
    }
}

/// The other way round: the solvent that a recovery of 99 % needs in three portions reaches it on the bench.
#[test]
fn the_solvent_for_a_recovery_reaches_it() {
    let total_m3 = solvent_for_recovery_m3(0.99, 10.0, 1e-3, 3).unwrap();
    let portion = format!("{} mL", total_m3 / 3.0 * 1e6);
    assert!((left_in_the_water("10", &portion, 3) - 0.01).abs() < 1e-12);
}
