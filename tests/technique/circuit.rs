//! Energies, metering, cylinders and let-down of dense CO2 through whole plans.

use super::{posted_kg, sound};
use serde_json::{Value, json};
use thimbleworth::account::{Account, RouteAccount, account_text};
use thimbleworth::ledger::{Place, Utility};
use thimbleworth::program::RouteProgram;

fn plan(steps: &Value) -> String {
    json!({
        "thimbleworth": 1, "title": "One circuit",
        "site": { "name": "Heron Sluice pilot hall", "streams": [
            { "name": "solvent" }, { "name": "solids", "holds": "solid" }
        ] },
        "workloads": [{ "name": "trial", "results_per_year": 1, "batch": { "samples": 1 }, "feed": { "soil": "2 g" },
            "present": "CO2", "routes": [{ "name": "CO2", "steps": steps, "ends": { "liquor": "solvent", "marc": "solids" } }] }]
    })
    .to_string()
}

fn route(account: &Account) -> (&RouteProgram, &RouteAccount) {
    let work = &account.program.as_ref().unwrap().workloads[0];
    (&work.routes[0], account.workloads[0].routes[0].as_ref().unwrap())
}

fn rows(text: &'static str) -> Vec<Vec<f64>> {
    let lines = text.lines().filter(|l| !l.starts_with('#')).skip(1);
    lines.map(|l| l.split(',').map(|cell| cell.parse().unwrap_or(f64::NAN)).collect()).collect()
}

/// The aim is 0.05 %; small differences of large enthalpies are held to 0.01 J a gram.
fn near_kj(found_j: f64, expected_kj: f64, what: &str) {
    let off = (found_j / 1e3 - expected_kj).abs();
    assert!(off <= 5e-4 * expected_kj.abs() + 1e-5, "{what}: {} kJ, expected {expected_kj}", found_j / 1e3);
}

fn change(found: &RouteAccount, name: &str) -> f64 {
    found.dense[0].1.legs.leg_named(name).unwrap().energy_j_kg
}

/// Each open loop of another program as a plan: the changes of state, and what the book spends for a kilogram drawn.
///
/// Witness: `co2_loop/open.csv`, `CoolProp` 8.0.0.
#[test]
fn open_circuits_of_another_program() {
    let mut seen = 0;
    for n in rows(include_str!("../co2_loop/open.csv")) {
        if n[7] != 1.01325 {
            continue;
        }
        let text = plan(&json!([{ "step": "supercritical", "temperature": format!("{} °C", n[4]),
            "pressure": format!("{} bar", n[3]), "vessel": "7 mL", "metered": "mass", "mass_flow": "10 g/min", "time": "1 h",
            "supply_temperature": format!("{} °C", n[0]), "supply_pressure": format!("{} bar", n[1]),
            "chill": format!("{} °C", n[2]), "vent_temperature": format!("{} °C", n[6]),
            "pump_efficiency": format!("{} %", n[5] * 100.0), "drive_efficiency": "80 %", "cop": "2.5" }]));
        let account = sound(&text);
        let (_, found) = route(&account);
        let what = format!("{:?}", &n[..8]);
        near_kj(change(found, "chill"), n[8], &what);
        near_kj(change(found, "pump"), n[10], &what);
        near_kj(change(found, "preheat"), n[11], &what);
        near_kj(change(found, "restrictor"), n[12], &what);
        // All that is drawn goes the whole way.
        let kg = found.value("co2.used").unwrap();
        let spent = |utility: Utility| {
            let all = found.trace.spendings.iter().filter(|s| s.utility == utility);
            all.fold(0.0, |sum, s| sum + s.amount_si) / kg
        };
        let part =
            |sign: f64| [n[8], n[11], n[12]].iter().map(|q| q * sign).filter(|q| *q > 0.0).sum::<f64>();
        near_kj(spent(Utility::Work), n[10], &what);
        near_kj(spent(Utility::Heat), part(1.0), &what);
        near_kj(spent(Utility::Cooling), part(-1.0), &what);
        near_kj(spent(Utility::ComputedElectricity), n[10] / 0.8 + part(-1.0) / 2.5 + part(1.0), &what);
        assert_eq!(spent(Utility::Electricity), spent(Utility::ComputedElectricity));
        seen += 1;
    }
    assert_eq!(seen, 55);
}

/// Witness: `co2_loop/closed.csv`, `CoolProp` 8.0.0.
#[test]
fn closed_circuits_of_another_program() {
    let mut seen = 0;
    for n in rows(include_str!("../co2_loop/closed.csv")) {
        let text = plan(&json!([{ "step": "supercritical", "temperature": format!("{} °C", n[4]),
            "pressure": format!("{} bar", n[3]), "vessel": "1 L", "metered": "mass", "mass_flow": "100 kg/h", "time": "2 h",
            "circuit": "recycled", "chill": format!("{} °C", n[2]), "separator_pressure": format!("{} bar", n[0]),
            "separator_temperature": format!("{} °C", n[1]), "pump_efficiency": format!("{} %", n[5] * 100.0),
            "let_down_temperature": "40 °C", "let_down_pressure": format!("{} bar", n[0]) }]));
        let account = sound(&text);
        let (_, found) = route(&account);
        let what = format!("{:?}", &n[..6]);
        for (name, expected) in [("pump", n[7]), ("preheat", n[8]), ("separator", n[9]), ("condense", n[10])]
        {
            near_kj(change(found, name), expected, &what);
        }
        seen += 1;
    }
    assert_eq!(seen, 25);
}

/// SW-846 3562, PCB step, for 1886 extractions a year: the project's worked case, recomputed with a reference library
/// (`CoolProp` 8.0.0). Densities within 0.1 %, masses of CO2 within 0.5 % for each stated metering state.
#[test]
fn metered_co2_of_method_3562() {
    let step = |extra: &Value| {
        let mut step = json!({ "step": "supercritical", "temperature": "80 °C", "pressure": "4417 psi", "vessel": "7 mL",
            "filler": "1.0 mL", "metered": "pump head", "flow": "2.5 mL/min", "meter_temperature": "4 °C",
            "meter_pressure": "60 bar", "time": "40 min", "rinse": "n-heptane", "rinse_volume": "3.2 mL",
            "cylinder": "22.7 kg", "heel": "12 %" });
        for (key, value) in extra.as_object().unwrap() {
            step[key] = value.clone();
        }
        plan(&json!([step])).replace("\"results_per_year\":1", "\"results_per_year\":1886")
    };
    let close = |found: f64, expected: f64, tolerance: f64| {
        assert!((found / expected - 1.0).abs() <= tolerance, "{found} where {expected} is expected");
    };
    let account = sound(&step(&json!({})));
    let (_, found) = route(&account);
    let dense = &found.dense[0].1;
    close(dense.density_kg_m3, 750.1, 1e-3);
    let metered: Vec<(f64, f64)> = dense.metered.iter().map(|m| (m.density_kg_m3, m.kg * 1e3)).collect();
    for ((density, g), (expected, expected_g)) in
        metered.iter().zip([(923.7, 92.4), (1042.4, 104.2), (782.6, 78.3)])
    {
        close(*density, expected, 1e-3);
        close(*g, expected_g, 5e-3);
    }
    assert_eq!(metered.len(), 3);
    // The spread is shown, not chosen.
    let words = thimbleworth::report::dense_words(dense).join(" ");
    assert!(words.contains("92.37 g") && words.contains("+13 %") && words.contains("-15 %"), "{words}");
    close(found.per_result(found.value("co2.used").unwrap()) * 1e3, 96.3, 5e-3);
    close(found.value("co2.used").unwrap(), 181.6, 5e-3);
    assert_eq!(found.value("co2.cylinders"), Some(10.0));
    close(found.value("co2.heel").unwrap(), 27.2, 5e-3);
    // A heel is bought and not emitted.
    close(found.value("co2.vented").unwrap(), found.value("co2.used").unwrap(), 1e-12);
    close(found.per_result(found.value("mass.drawn.n-heptane").unwrap()) * 1e3, 2.19, 5e-3);
    // 5 °C and 60 bar come to about 205 bar at 25 °C; here the head is at 4 °C.
    let line = dense.trapped.unwrap();
    assert!((line.pressure_pa / 1e5 - 215.0).abs() < 1.0, "{line:?}");

    // Snow of 0.6 to 0.9 g/mL in equal volume with 100 g of 1.4 g/mL: 43 to 64 g on top.
    for (density, expected) in [("0.6 g/mL", 42.86), ("0.9 g/mL", 64.29)] {
        let snow = json!({ "snow": "1", "snow_sample": "100 g", "snow_density": density });
        let account = sound(&step(&snow));
        let (program, with) = route(&account);
        let g = 1e3
            * posted_kg((program, with), "carbon dioxide", |from, to| {
                (from, to) == (Place::STORE, Place::HOOD)
            });
        close(g, expected, 1e-3);
    }
}

/// From 250 bar to a receiver at 55 bar 22 % of the filling is lost (the project's notes on practice, recomputed; 60 °C and 20 °C
/// are our reading): "95 % recycled" is refused with that figure, and so is a vessel emptied below its receiver.
#[test]
fn what_cannot_come_back_is_refused() {
    let step = |extra: Value| {
        let mut step = json!({ "step": "supercritical", "temperature": "60 °C", "pressure": "250 bar", "vessel": "50 L",
            "metered": "mass", "mass_flow": "150 kg/h", "time": "2 h", "circuit": "recycled", "separator_pressure": "55 bar",
            "let_down_temperature": "20 °C", "let_down_pressure": "55 bar" });
        for (key, value) in extra.as_object().unwrap() {
            step[key] = value.clone();
        }
        plan(&json!([step]))
    };
    let refused = |text: &str, key: &str| {
        let account = account_text(text);
        let found = account.problems.iter().find(|p| p.path.ends_with(key)).cloned();
        assert!(account.program.is_none(), "{:#?}", account.problems);
        found.unwrap()
    };
    let problem = refused(&step(json!({ "recycled_share": "95 %" })), "recycled_share");
    assert!(
        problem.found.contains("holds 21.99 %") && problem.need.contains("at most 78.01 %"),
        "{problem:?}"
    );
    sound(&step(json!({ "recycled_share": "77 %" })));
    let low = refused(&step(json!({ "let_down_pressure": "20 bar" })), "let_down_pressure");
    assert!(low.found.contains("no compressor"), "{low:?}");
    // With a compressor the rest comes back, at the price of its work: the mass between the two states, by hand.
    let account = sound(&step(
        json!({ "let_down_pressure": "20 bar", "compressor_stages": 1, "let_down_temperature": "30 °C" }),
    ));
    let (program, found) = route(&account);
    let rule = program.steps[0].technique.rules.iter().position(|r| r.name == "recompressing").unwrap();
    let note = found.trace.notes.iter().find(|n| usize::from(n.rule.0) == rule && n.symbol == "m").unwrap();
    let density = |p| thimbleworth::co2::density_kg_m3(303.15, p).unwrap();
    let void = 50e-3 - 2e-3 / 2600.0;
    assert!((note.value_si / (void * (density(55e5) - density(20e5))) - 1.0).abs() < 1e-9);
    let work =
        thimbleworth::co2_loop::compress(&thimbleworth::co2::state(303.15, 20e5).unwrap().into(), 55e5, 0.7);
    let spent =
        found.trace.spendings.iter().find(|s| usize::from(s.rule.0) == rule && s.utility == Utility::Work);
    assert!((spent.unwrap().amount_si / (note.value_si * work.unwrap().work_j_kg) - 1.0).abs() < 1e-9);
}

/// A meter counts before a stated power, a stated power before the states; a power too small for them is doubted.
#[test]
fn a_meter_counts_before_a_power_and_a_power_before_the_states() {
    let kwh = |extra: Value| {
        let mut step = json!({ "step": "supercritical", "temperature": "60 °C", "pressure": "300 bar", "vessel": "1 L",
            "metered": "mass", "mass_flow": "20 kg/h", "time": "2 h" });
        for (key, value) in extra.as_object().unwrap() {
            step[key] = value.clone();
        }
        let account = sound(&plan(&json!([step])));
        let doubted = account.problems.iter().any(|p| p.found.contains("stated power over the time"));
        let (_, found) = route(&account);
        (found.value("energy.electricity").unwrap() / 3.6e6, doubted)
    };
    let (computed, doubted) = kwh(json!({}));
    assert!((2.0..5.0).contains(&computed) && !doubted, "{computed}");
    assert_eq!(kwh(json!({ "power": "4 kW", "run_time": "3 h" })), (12.0, false));
    assert_eq!(kwh(json!({ "power": "0.5 kW", "run_time": "3 h" })), (1.5, true));
    assert_eq!(
        kwh(json!({ "power": "4 kW", "run_time": "3 h", "measured": { "electricity": "9 kWh" } })),
        (9.0, false)
    );
}

/// Solubility and curve against what a plan passes through: doubted where it is too little, and outside the range of the
/// correlation, which is not extrapolated. 135 kg of CO2 for a kilogram of oil at 40 °C and 300 bar (del Valle and Aguilera 1988,
/// recomputed).
#[test]
fn more_than_the_co2_can_dissolve_is_doubted() {
    let with = |flow: &str, pressure: &str| {
        let text = json!({
            "thimbleworth": 1, "title": "Oil", "site": { "name": "Heron Sluice pilot hall", "streams": [
                { "name": "solvent" }, { "name": "solids", "holds": "solid" } ] },
            "materials": { "oil": { "class": "solute", "source": "made up for this test" } },
            "workloads": [{ "name": "seed", "results_per_year": 1, "batch": { "samples": 1 },
                "feed": { "plant material": "10 kg", "oil": "2 kg" }, "present": "CO2",
                "routes": [{ "name": "CO2", "ends": { "liquor": "product", "marc": "solids" }, "steps": [
                    { "step": "supercritical", "temperature": "40 °C", "pressure": pressure, "vessel": "20 L", "void": "5 L",
                      "metered": "mass", "mass_flow": flow, "time": "4 h", "extracts": { "oil": "90 %" },
                      "solubility": "vegetable oil", "sought": "oil", "intact": "30 %", "fast": "2", "slow": "0.2",
                      "rated_pressure": "450 bar", "rated_temperature": "70 °C" }] }] }]
        });
        sound(&text.to_string())
    };
    let doubt = |account: &Account, words: &str| account.problems.iter().any(|p| p.found.contains(words));
    let short = with("50 kg/h", "300 bar");
    assert!(doubt(&short, "can dissolve"), "{:#?}", short.problems);
    let ample = with("100 kg/h", "300 bar");
    assert!(!doubt(&ample, "can dissolve"));
    let note = |account: &Account, symbol: &str| {
        let (_, found) = route(account);
        found.trace.notes.iter().find(|n| n.symbol == symbol).unwrap().value_si
    };
    let least = note(&ample, "m_CO2, saturated");
    assert!((least / 1.8 - 135.0).abs() < 0.5, "{least}");
    assert!(note(&ample, "m_CO2, by the curve") > 1.1 * least);
    assert!(doubt(&with("100 kg/h", "120 bar"), "not extrapolated"));
    // The best state within the ratings stands beside it.
    let (program, found) = route(&ample);
    let sheets = thimbleworth::report::energy_sheets(program, found);
    let sheet = sheets.iter().find(|s| s.title.starts_with("CO2 for the recovery")).unwrap();
    assert_eq!(sheet.rows.len(), 3);
    assert!(sheet.rows[1][2].contains("450 bar"), "{sheet:?}");
    // A state above the rating is refused.
    let text = with("100 kg/h", "300 bar").plan.map(|p| thimbleworth::plan::save(&p)).unwrap();
    let account = account_text(&text.replace("\"450 bar\"", "\"250 bar\""));
    assert!(account.program.is_none() && doubt(&account, "above rated_pressure"), "{:#?}", account.problems);
}
