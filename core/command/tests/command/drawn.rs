//! `account` and `compare` with intervals.

use super::{PLAN, run_on};
use serde_json::Value;

fn with(what: &str, args: &[&str]) -> super::Run {
    let done = run_on(PLAN.as_bytes(), &[&[what, "-", "--draws", "1000"], args].concat());
    assert_eq!(done.status, 0, "{}", done.complaints);
    done
}

/// What `odds` says of a figure on a route.
fn odds(id: &str) -> Value {
    let done = with("odds", &["--format", "json", "--figure", id]);
    serde_json::from_str(&done.out).unwrap()
}

#[test]
fn every_format_shows_the_interval_of_the_draws() {
    let table = with("account", &[]).out;
    assert!(table.contains("1000 draws, seed 1: \"from\" and \"to\" hold 95 % of them, a year."), "{table}");
    let line = table.lines().find(|l| l.contains("all waste streams: mass")).unwrap();
    let low = odds("waste.total.mass")["workloads"][0]["figures"][0]["routes"][0]["low_kg_per_year"]
        .as_f64()
        .unwrap();
    let shown = thimbleworth::quantity::show(low, thimbleworth::quantity::Kind::Mass);
    assert!(line.contains(&shown), "{shown}: {line}");
    assert!(with("account", &["--format", "markdown"]).out.contains("| per year | from | to |"));
    let csv = with("account", &["--format", "csv"]).out;
    let mut lines = csv.lines();
    assert!(lines.next().unwrap().ends_with(",boundary,draws,low,high"));
    let waste = lines.find(|l| l.contains(",waste.total.mass,")).unwrap();
    assert!(waste.contains(",1000,") && waste.contains(&format!(",{low},")), "{low}: {waste}");
}

#[test]
fn the_documents_hold_what_odds_says() {
    for what in ["account", "compare"] {
        let document: Value = serde_json::from_str(&with(what, &["--format", "json"]).out).unwrap();
        assert_eq!((document["draws"].as_u64(), document["coverage"].as_f64()), (Some(1000), Some(0.95)));
        let route = &document["workloads"][0]["routes"][0];
        let figure =
            route["figures"].as_array().unwrap().iter().find(|f| f["id"] == "waste.total.mass").unwrap();
        let of_odds = &odds("waste.total.mass")["workloads"][0]["figures"][0];
        for key in ["low_kg_per_year", "high_kg_per_year", "median_kg_per_year", "u_kg_per_year"] {
            assert!(figure[key].is_number() && figure[key] == of_odds["routes"][0][key], "{key}");
        }
        if what == "compare" {
            let differences =
                document["workloads"][0]["comparison"]["routes"][0]["differences"].as_array().unwrap();
            let d = differences.iter().find(|d| d["id"] == "waste.total.mass").unwrap();
            assert_eq!(d["less"], of_odds["rivals"][0]["less"]);
            assert_eq!(d["change_low_kg_per_year"], of_odds["rivals"][0]["low_kg_per_year"]);
        }
    }
    let text = with("compare", &[]).out;
    assert!(
        text.contains("In place of ")
            && text.contains("1000 draws. Seed 1.")
            && text.contains("than the present")
    );
    // Without draws nothing changes.
    let plain = run_on(PLAN.as_bytes(), &["account", "-", "--format", "json"]).out;
    assert!(!plain.contains("\"coverage\"") && !plain.contains("\"u_kg_per_year\""));
    assert_eq!(run_on(PLAN.as_bytes(), &["account", "-", "--coverage", "90"]).status, 2);
}
