//! The Analytical Eco-Scale against the cases in `eco_scale.toml`, where each has its source.
use thimbleworth::hazard::SignalWord;
use thimbleworth::hazard::eco_scale::{
    Amount, Edge, Options, Procedure, Reagent, Treatment, Verdict, amount_points, score,
};
use toml::{Table, Value};

fn cases(kind: &str) -> Vec<Value> {
    let table: Table = include_str!("eco_scale.toml").parse().expect("a table");
    table[kind].as_array().expect("cases").clone()
}

fn text<'a>(value: &'a Value, key: &str) -> &'a str {
    value[key].as_str().expect(key)
}

fn float(value: &Value, key: &str) -> f64 {
    value[key].as_float().expect(key)
}

#[test]
fn constructed_cases() {
    let cases = cases("case");
    assert_eq!(cases.len(), 5);
    for case in &cases {
        let reagents: Vec<Reagent<'_>> = case["reagents"]
            .as_array()
            .expect("reagents")
            .iter()
            .map(|r| Reagent {
                name: text(r, "name"),
                amount: Amount::VolumeM3(float(r, "ml") * 1e-6),
                pictograms: u32::try_from(r["pictograms"].as_integer().expect("a number")).expect("a count"),
                signal_word: match text(r, "word") {
                    "Danger" => SignalWord::Danger,
                    "Warning" => SignalWord::Warning,
                    _ => SignalWord::None,
                },
                water_or_inert_gas: r.get("inert").is_some(),
            })
            .collect();
        let procedure = Procedure {
            reagents: &reagents,
            energy_j_per_sample: float(case, "energy_kwh") * 3.6e6,
            emits_to_air: case["emits_to_air"].as_bool().expect("a yes or no"),
            waste: Some(Amount::VolumeM3(float(case, "waste_ml") * 1e-6)),
            treatment: match text(case, "treatment") {
                "recycling" => Treatment::Recycling,
                "none" => Treatment::None,
                other => panic!("treatment {other}"),
            },
        };
        let scored = score(&procedure, Options::default()).expect("a score");
        let name = text(case, "name");
        let penalties: Vec<i64> = scored.lines.iter().map(|l| i64::from(l.penalty)).collect();
        let wanted: Vec<i64> =
            case["penalties"].as_array().expect("penalties").iter().filter_map(Value::as_integer).collect();
        assert_eq!(penalties, wanted, "{name}");
        assert_eq!(Some(scored.score), case["score"].as_integer(), "{name}");
        assert_eq!(scored.verdict.word(), text(case, "verdict"), "{name}");
        assert!(scored.lines.iter().all(|l| !l.why.is_empty()), "{name}");
    }
}

#[test]
fn printed_totals() {
    for total in cases("total") {
        let score = 100 - total["penalty"].as_integer().expect("penalty");
        assert_eq!(Some(score), total["score"].as_integer());
        assert_eq!(Verdict::of(score).word(), text(&total, "verdict"));
    }
}

/// Amount bands: below 10, 10 to 100, above 100 mL (Gałuszka 2012, from memory).
#[test]
fn amount_bands() {
    let points =
        [9.99, 10.0, 100.0, 100.1].map(|ml| amount_points(Amount::VolumeM3(ml * 1e-6), Edge::Middle));
    assert_eq!(points, [1, 2, 2, 3]);
    let grams = [9.99, 10.0, 100.0, 100.1].map(|g| amount_points(Amount::MassKg(g * 1e-3), Edge::Middle));
    assert_eq!(grams, points, "grams and millilitres are read alike");
}

/// Counting CO2 as a reagent, which the paper leaves open, costs its one pictogram times Warning times its amount.
#[test]
fn reading_of_inert_gas_is_an_option_and_is_carried() {
    let co2 = Reagent {
        name: "CO2",
        amount: Amount::MassKg(0.0924),
        pictograms: 1,
        signal_word: SignalWord::Warning,
        water_or_inert_gas: true,
    };
    let procedure = Procedure {
        reagents: &[co2],
        energy_j_per_sample: 0.0,
        emits_to_air: true,
        waste: None,
        treatment: Treatment::None,
    };
    let with = Options { count_water_and_inert_gas: true, ..Options::default() };
    assert_eq!(score(&procedure, Options::default()).unwrap().penalty, 3);
    let counted = score(&procedure, with).unwrap();
    assert_eq!((counted.penalty, counted.options), (5, with));
}
