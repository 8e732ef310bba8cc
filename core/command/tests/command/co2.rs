//! States of CO2, singly and from a file, against published ones.

use super::{csv, run, run_on, same};
use serde_json::Value;

const KEYS: [&str; 9] = [
    "temperature_k",
    "pressure_pa",
    "density_kg_m3",
    "phase",
    "enthalpy_j_kg",
    "entropy_j_kg_k",
    "heat_capacity_j_kg_k",
    "sound_speed_m_s",
    "viscosity_pa_s",
];

/// T (K), p (Pa), phase, density (kg/m³), h (kJ/kg), s and cp (kJ/(kg K)), w (m/s).
///
/// Source: Span and Wagner, J. Phys. Chem. Ref. Data 25 (1996) 1509, Table 35, as quoted in a secondary text; five digits.
/// The phases are those of our own naming.
const TABLE_35: [(f64, f64, &str, [f64; 5]); 5] = [
    (240.0, 5e4, "gas", [1.1084, -48.014, -0.044_83, 0.788_15, 243.88]),
    (230.0, 1e6, "liquid", [1128.97, -400.19, -2.1006, 1.9959, 879.82]),
    (290.0, 5e6, "gas", [148.41, -81.892, -0.959_59, 2.5783, 207.56]),
    (480.0, 1e7, "supercritical", [119.65, 133.66, -0.485_95, 1.1732, 328.74]),
    (1100.0, 1e8, "supercritical", [371.36, 887.14, 0.031_52, 1.3544, 675.48]),
];

fn near(found: f64, printed: f64) {
    // Half of the last printed digit, of five; 0.03152 is printed with four.
    assert!((found / printed - 1.0).abs() < 2e-4, "{found} {printed}");
}

#[test]
fn a_state_has_the_published_values_under_the_stated_keys() {
    for (t, p, phase, [density, h, s, cp, w]) in TABLE_35 {
        let (t, p) = (format!("{t} K"), format!("{p} Pa"));
        let done = run(&["co2", "--temperature", &t, "--pressure", &p, "--format", "json"]);
        assert_eq!(done.status, 0, "{}", done.complaints);
        let state: Value = serde_json::from_str(&done.out).unwrap();
        let object = state.as_object().unwrap();
        assert!(object.len() == KEYS.len() && KEYS.iter().all(|k| object.contains_key(*k)), "{}", done.out);
        let value = |key: &str| state[key].as_f64().unwrap();
        assert_eq!(state["phase"], phase);
        near(value("density_kg_m3"), density);
        near(value("enthalpy_j_kg"), h * 1e3);
        near(value("entropy_j_kg_k"), s * 1e3);
        near(value("heat_capacity_j_kg_k"), cp * 1e3);
        near(value("sound_speed_m_s"), w);
        assert!(value("viscosity_pa_s") > 0.0);
    }
}

/// SW-846 Method 3562, 11.7.2, states 0.87 g/mL at 50 °C and 299 bar (public copy of the text).
#[test]
fn the_table_reads_as_the_procedure_states() {
    let done = run(&["co2", "--temperature", "50 °C", "--pressure", "299 bar"]);
    assert_eq!((done.status, done.complaints.as_str()), (0, ""));
    let line = done.out.lines().find(|l| l.starts_with("density")).unwrap();
    let density: f64 = line.split_whitespace().nth(1).unwrap().parse().unwrap();
    assert!((density - 870.0).abs() < 5.0, "{line}");
    assert!(done.out.contains("supercritical") && done.out.contains("ideal gas at 298.15 K"));
}

#[test]
fn states_that_do_not_exist_are_refused_with_a_sentence() {
    for (t, p, words) in [
        ("-20 °C", "5000 bar", "solid"),
        ("-100 °C", "1 bar", "solid and gas"),
        ("60", "300 bar", "60"),
        ("60 °C", "300", "300"),
        ("60 °C", "-3 bar", "-3 bar"),
        ("60 kg", "300 bar", "60 kg"),
        ("60 ± 1 °C", "300 bar", "is a range"),
        ("60 °C", "", ""),
    ] {
        let done = run(&["co2", "--temperature", t, "--pressure", p]);
        assert_eq!((done.status, done.out.as_str()), (2, ""), "{t} {p}");
        assert!(
            done.complaints.starts_with("error: ") && done.complaints.contains(words),
            "{}",
            done.complaints
        );
    }
}

#[test]
fn a_file_of_states_gives_a_row_for_each() {
    let mut table = "\u{feff}note,pressure_pa,temperature_k\r\n".to_owned();
    for (t, p, ..) in TABLE_35 {
        table.push_str(&format!("\"a, \"\"b\"\"\",{p},{t}\r\n"));
    }
    table.push_str("solid,5e8,230\n\n,1e5,\nformula,\"=1+1\",300\n");
    let done = run_on(table.as_bytes(), &["co2", "--states", "-"]);
    assert_eq!(done.status, 0, "{}", done.complaints);
    let rows = csv(&done.out);
    assert_eq!(rows[0][..9], KEYS);
    assert_eq!(rows[0][9], "error");
    assert_eq!(rows.len(), 1 + TABLE_35.len() + 3);
    for (row, (t, p, phase, [density, ..])) in rows[1..].iter().zip(TABLE_35) {
        let number = |i: usize| row[i].parse::<f64>().unwrap();
        assert_eq!((number(0), number(1), row[3].as_str(), row[9].as_str()), (t, p, phase, ""));
        near(number(2), density);
        // The same numbers as in the JSON of one state.
        let one = run(&[
            "co2",
            "--temperature",
            &format!("{t} K"),
            "--pressure",
            &format!("{p} Pa"),
            "--format",
            "json",
        ]);
        let one: Value = serde_json::from_str(&one.out).unwrap();
        assert!(same(number(2), one["density_kg_m3"].as_f64().unwrap()));
        assert!(same(number(8), one["viscosity_pa_s"].as_f64().unwrap()));
    }
    let refused = &rows[1 + TABLE_35.len()..];
    assert_eq!(refused[0][..3], ["230", "5e8", ""]);
    assert!(refused[0][9].contains("solid"));
    assert!(refused[1][9].contains("temperature_k is missing"));
    assert!(refused[2][1] == "'=1+1" && refused[2][9].contains("is no number"));
    assert!(done.complaints.contains("columns note") && done.complaints.contains("3 of 8 states"));
}

#[test]
fn a_table_that_is_none_is_refused() {
    for (table, words) in [
        (&b""[..], "the table is empty"),
        (b"temperature_k\n300\n", "no column pressure_pa"),
        (b"temperature_k,pressure_pa,pressure_pa\n", "stands twice"),
        (b"temperature_k,pressure_pa\n\"300,1e5\n", "nothing closes"),
        (b"temperature_k,pressure_pa\n\xff,1e5\n", "not UTF-8"),
    ] {
        let done = run_on(table, &["co2", "--states", "-"]);
        assert_eq!((done.status, done.out.as_str()), (2, ""));
        assert!(done.complaints.contains(words), "{}", done.complaints);
    }
    assert_eq!(run(&["co2", "--states", "no-such-file.csv"]).status, 2);
}
