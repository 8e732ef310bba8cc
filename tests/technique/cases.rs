//! Worked cases as plans: nothing here but the plans, the expected values in `cases.toml` and their witness.

use super::{account_of, posted_kg, route, text_of};
use std::collections::BTreeSet;
use thimbleworth::ledger::{Place, StepIx};
use thimbleworth::quantity::Kind;

fn close(found: f64, expected: f64, relative: f64, what: &str) {
    assert!((found / expected - 1.0).abs() <= relative, "{what}: {found} where {expected} is expected");
}

#[test]
fn worked_cases_come_out() {
    let cases: toml::Table = text_of("cases.toml").parse().unwrap();
    let mut checks = 0;
    for (name, case) in &cases {
        let text = |key: &str| case[key].as_str().unwrap();
        assert!(!text("witness").is_empty());
        let tolerance = case["tolerance"].as_float().unwrap();
        let account = account_of(text("plan"));
        let (program, found) = route(&account, text("route"));
        let rows = |key: &str| case.get(key).and_then(|t| t.as_table()).cloned().unwrap_or_default();
        for (id, expected) in rows("result") {
            let kg = found.per_result(found.value(&id).unwrap_or_else(|| panic!("{name}: no figure {id}")));
            close(kg * 1000.0, expected.as_float().unwrap(), tolerance, &format!("{name}: {id}, g a result"));
            checks += 1;
        }
        for (id, expected) in rows("year") {
            let kg = found.value(&id).unwrap_or_else(|| panic!("{name}: no figure {id}"));
            close(kg, expected.as_float().unwrap(), tolerance, &format!("{name}: {id}, kg a year"));
            checks += 1;
        }
        for (symbol, expected) in rows("density") {
            let note = found.trace.notes.iter().find(|n| n.symbol == symbol && n.kind == Kind::Density);
            // Densities printed to three or four digits: 0.1 %.
            close(note.unwrap().value_si, expected.as_float().unwrap(), 1e-3, &format!("{name}: {symbol}"));
            checks += 1;
        }
        if let Some(expected) = case.get("fill_g").and_then(toml::Value::as_float) {
            let rule = program.steps[0].technique.rules.iter().position(|r| r.name == "static fill").unwrap();
            let fill =
                found.trace.postings.iter().find(|p| p.rule.0 as usize == rule && p.from == Place::STORE);
            close(fill.unwrap().kg * 1000.0, expected, tolerance, &format!("{name}: static fill, g"));
            checks += 1;
        }
    }
    assert!(checks >= 30, "{checks}");
}

/// The metering state changes the mass by a third of what the coldest gives; the density at extraction is none of them.
#[test]
fn where_the_flow_is_metered_is_never_left_open() {
    let account = account_of("cell.json");
    let masses: Vec<f64> = ["cold head, extraction pressure", "cold head, cylinder pressure", "warm head"]
        .iter()
        .map(|name| {
            let (_, found) = route(&account, name);
            found.per_result(found.value("co2.circulated").unwrap())
        })
        .collect();
    close(masses[0] / masses[1] - 1.0, 0.128, 0.02, "spread between the two cold heads");
    close(1.0 - masses[2] / masses[1], 0.153, 0.02, "a head that is not chilled");
    let text = text_of("cell.json").replacen("\"metered\": \"pump head\",", "", 1);
    let account = thimbleworth::account::account_text(&text);
    assert!(account.program.is_none());
    assert!(account.problems.iter().any(|p| p.path.ends_with("steps[0].metered")), "{:#?}", account.problems);
}

/// A loop without a compressor recovers no more than the receiver's pressure lets it: from 250 bar to a receiver at 55 bar
/// 22 % of the fill is lost (the project's notes on practice, recomputed). The temperatures are not stated there; 60 °C in
/// the vessel and 20 °C at the end of recovery are our reading, under which the number comes out.
#[test]
fn a_loop_loses_what_the_receiver_cannot_take() {
    let account = account_of("loop.json");
    let (_, found) = route(&account, "loop");
    let value = |id: &str| found.value(id).unwrap();
    close(value("co2.vented") / value("co2.used"), 0.22, 0.005, "share of the fill that is vented");
    close(value("co2.make_up"), value("co2.vented"), 1e-12, "made up");
    // Neither vent nor make-up is a share of what is sent round: twice the time changes neither.
    let longer = text_of("loop.json").replace("\"time\": \"2 h\"", "\"time\": \"4 h\"");
    let account = super::sound(&longer);
    let (_, twice) = route(&account, "loop");
    close(twice.value("co2.circulated").unwrap(), 2.0 * value("co2.circulated"), 1e-12, "sent round");
    assert_eq!(twice.value("co2.vented").unwrap().to_bits(), value("co2.vented").to_bits());
    // The void is vented, not the vessel.
    let note = |symbol: &str| found.trace.notes.iter().find(|n| n.symbol == symbol).unwrap().value_si;
    close(value("co2.vented") / 200.0, 30e-3 * note("ρ_l"), 1e-12, "vented in one run");
}

/// Water takes up dichloromethane once: the wrong answer of three times as much is 47.9 g, and with the catalogue's own
/// solubility the figure lies between 13 and 20 g (project's worked case).
#[test]
fn the_water_is_saturated_once() {
    let account = account_of("funnel.json");
    let (_, found) = route(&account, "catalogue's solubility");
    let g = 1000.0 * found.per_result(found.value("mass.to.aqueous.dichloromethane").unwrap());
    assert!((13.0..=20.0).contains(&g), "{g}");
    let share = found.value("mass.to.aqueous.acetone").unwrap() / found.value("mass.drawn.acetone").unwrap();
    close(share, 0.9035, 0.005, "share of the acetone in the water");
}

/// Three stages in one vessel (SW-846 3561, amounts from memory): the vessel is filled once, refilled as the state
/// changes and let down once; 180 mL of liquid flow; densities 0.30 and 0.63 g/mL as the method states, from memory.
#[test]
fn stages_share_a_vessel() {
    let account = account_of("stages.json");
    let (program, found) = route(&account, "three stages");
    let notes = |symbol: &str| -> Vec<f64> {
        found.trace.notes.iter().filter(|n| n.symbol == symbol).map(|n| n.value_si).collect()
    };
    let density = notes("ρ");
    close(density[0], 300.0, 0.02, "first stage");
    close(density[1], 630.0, 0.01, "second stage");
    assert_eq!(density[1].to_bits(), density[2].to_bits());

    // Liquid metered: CO2, and the co-solvent that makes up the second stage's 4 mL/min.
    let (flow, time) = (notes("q"), notes("t"));
    assert_eq!(flow.len(), 4);
    let mut ml = 0.0;
    for (q, t) in flow.iter().zip(&time) {
        ml += q * t * 1e6;
    }
    close(ml, 180.0, 1e-12, "liquid metered, mL");

    // Nothing is vented twice: what the vessel holds at the end is what the fills brought.
    let rule = |name: &str| program.steps[0].technique.rules.iter().position(|r| r.name == name).unwrap();
    let kg = |name: &str, from: Place| -> f64 {
        let of_rule =
            found.trace.postings.iter().filter(|p| p.rule.0 as usize == rule(name) && p.from == from);
        of_rule.fold(0.0, |sum, p| sum + p.kg)
    };
    let void = notes("V_void");
    assert!(void.iter().all(|v| (v - void[0]).abs() < 1e-18), "{void:?}");
    close(kg("static fill", Place::STORE), void[0] * density[2], 1e-12, "all fills");
    close(kg("vented at let-down", Place::VAPOUR), void[0] * density[2], 1e-12, "let-down");
    let steps: BTreeSet<StepIx> = (found.trace.postings.iter())
        .filter(|p| p.rule.0 as usize == rule("vented at let-down") && p.kg > 0.0)
        .map(|p| p.step)
        .collect();
    assert_eq!(steps, BTreeSet::from([StepIx::Step(2)]));
    let drawn = posted_kg((program, found), "carbon dioxide", |from, _| from == Place::STORE);
    let vented = posted_kg((program, found), "carbon dioxide", |_, to| to == Place::HOOD);
    close(vented, drawn, 1e-12, "drawn and vented");
}
