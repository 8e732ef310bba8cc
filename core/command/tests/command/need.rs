//! What a recovery takes, and where it takes least.

use super::{run, run_on};
use serde_json::Value;

const OIL: [&str; 6] = ["need", "--oil", "--solute", "0.2 g/g", "--recovery", "95 %"];

fn oil(temperature: &str, pressure: &str, format: &str) -> super::Run {
    let mut args = OIL.to_vec();
    args.extend(["--temperature", temperature, "--pressure", pressure, "--format", format]);
    run(&args)
}

/// 40 °C and 300 bar: 6.74 g/L in 910 g/L, so 135 kg of CO2 for a kilogram of oil (del Valle and Aguilera 1988, recomputed);
/// the strength there is 16.0 MPa^½ (Giddings, recomputed).
#[test]
fn a_state_takes_what_the_solubility_says() {
    let done = oil("40 °C", "300 bar", "json");
    assert_eq!(done.status, 0, "{}", done.complaints);
    let found: Value = serde_json::from_str(&done.out).unwrap();
    let value = |key: &str| found["stated"][key].as_f64().unwrap();
    assert!((value("co2_kg_per_kg_solid") / (0.95 * 0.2) - 135.0).abs() < 0.5);
    assert!((value("solubility_parameter_mpa_half") - 16.0).abs() < 0.05);
    assert!(found["least_co2"].is_null());
    // Outside the range of the correlation: refused, not extrapolated.
    let done = oil("40 °C", "100 bar", "table");
    assert_eq!(done.status, 2);
    assert!(done.complaints.contains("150 bar to 880 bar"), "{}", done.complaints);
}

/// Above some 300 bar an oil dissolves better when warm: the least lies where the vessel's rating ends.
#[test]
fn the_search_ends_at_the_rating() {
    let done = oil("35 °C to 80 °C", "150 bar to 400 bar", "json");
    let found: Value = serde_json::from_str(&done.out).unwrap();
    assert_eq!(found["least_co2"]["on"], serde_json::json!(["highest temperature", "highest pressure"]));
    assert!((found["least_co2"]["pressure_pa"].as_f64().unwrap() - 40e6).abs() < 1.0);
    let table = oil("35 °C to 80 °C", "150 bar to 400 bar", "table");
    assert!(table.out.contains("beyond it there may be less"), "{}", table.out);
}

/// Points made from known constants give them back.
#[test]
fn constants_are_fitted_to_points() {
    let (k, a, b) = (6.0_f64, -3500.0_f64, -28.0_f64);
    let mut text = "temperature_k,density_kg_m3,solubility_kg_m3\n".to_owned();
    for (t, d) in [(313.0_f64, 700.0_f64), (313.0, 850.0), (333.0, 700.0), (333.0, 850.0)] {
        text.push_str(&format!("{t},{d},{}\n", (k * d.ln() + a / t + b).exp()));
    }
    let mut args = vec!["need", "--points", "-", "--solute", "0.05 g/g", "--recovery", "90 %"];
    args.extend(["--temperature", "50 °C", "--pressure", "250 bar", "--format", "json"]);
    let done = run_on(text.as_bytes(), &args);
    assert_eq!(done.status, 0, "{}", done.complaints);
    let found: Value = serde_json::from_str(&done.out).unwrap();
    let value = |key: &str| found["chrastil"][key].as_f64().unwrap();
    assert!(
        (value("k") - k).abs() < 1e-6 && (value("a_k") - a).abs() < 1e-3 && (value("b") - b).abs() < 1e-6
    );
    // Beyond the points they do not hold.
    args[10] = "400 bar";
    assert_eq!(run_on(text.as_bytes(), &args).status, 2);
}
