//! What README.md and DEVELOPERS.md show is what the library does. Their Rust is compiled with the documentation tests.

use super::{a_year, accounted, beside, route};
use thimbleworth::account::account_text;
use thimbleworth::plan::{Severity, schema};
use thimbleworth::program::OWN_FIELDS;

const README: &str = include_str!("../../README.md");
const DEVELOPERS: &str = include_str!("../../DEVELOPERS.md");

/// The text with quotation marks of Markdown and line breaks made single spaces.
fn flowing(text: &str) -> String {
    text.lines()
        .map(|l| l.trim_start_matches("> "))
        .flat_map(str::split_whitespace)
        .collect::<Vec<_>>()
        .join(" ")
}

#[test]
fn the_table_in_the_readme_is_computed() {
    let account = accounted("harbour-sediment");
    for (name, shown) in [
        ("Soxhlet", "Soxhlet (present)"),
        ("Ultrasonic", "Ultrasonic"),
        ("Pressurised liquid", "Pressurised liquid"),
        ("Supercritical CO2", "Supercritical CO2"),
    ] {
        let found = route(&account, 0, name);
        let vented = found.value("co2.vented").unwrap_or(0.0);
        let row = format!(
            "| {shown} | {:.0} | {} | {:.1} | {vented:.1} | {:.0} |",
            a_year(found, "waste.total.mass"),
            a_year(found, "waste.flammable.containers"),
            a_year(found, "air.solvents"),
            a_year(found, "energy.electricity"),
        );
        assert!(README.contains(&row), "README.md should show: {row}");
    }
}

#[test]
fn the_finding_in_the_readme_is_computed() {
    let found = beside(&accounted("harbour-sediment"), 0, "Pressurised liquid").finding;
    assert!(flowing(README).contains(&found), "README.md should show: {found}");
}

/// Every JSON block that is a plan opens and accounts.
#[test]
fn plans_in_the_prose_account() {
    let mut plans = 0;
    for text in [README, DEVELOPERS] {
        for block in text.split("```json\n").skip(1) {
            let block = block.split("```").next().unwrap();
            if !block.contains("\"thimbleworth\"") {
                continue;
            }
            plans += 1;
            let account = account_text(block);
            let told: Vec<_> = account.problems.iter().filter(|p| p.severity != Severity::Note).collect();
            assert!(told.is_empty(), "{told:?}");
            assert!(account.workloads.iter().flat_map(|w| &w.routes).all(Option::is_some));
        }
    }
    assert!(plans >= 1);
}

/// The reference of the plan document names every key that the reader knows.
#[test]
fn every_key_of_a_plan_is_in_the_reference() {
    fn keys(schema: &serde_json::Value, found: &mut Vec<String>) {
        match schema {
            serde_json::Value::Object(map) => {
                for (key, inner) in map {
                    if let ("properties", Some(properties)) = (key.as_str(), inner.as_object()) {
                        found.extend(properties.keys().cloned());
                    }
                    keys(inner, found);
                }
            }
            serde_json::Value::Array(items) => items.iter().for_each(|i| keys(i, found)),
            _ => {}
        }
    }
    let mut found: Vec<String> = OWN_FIELDS.iter().map(|f| f.key.to_owned()).collect();
    keys(&serde_json::from_str(&schema(&[])).unwrap(), &mut found);
    assert!(found.len() > 50, "{found:?}");
    for key in found {
        assert!(DEVELOPERS.contains(&format!("`{key}`")), "DEVELOPERS.md should name the key {key}");
    }
}

/// The layout names every room of the core, and no room that is not there.
#[test]
fn the_layout_is_the_tree() {
    let layout = DEVELOPERS.split("  src/\n").nth(1).unwrap().split("  command/").next().unwrap();
    let mut told: Vec<&str> = layout.lines().filter_map(|l| l.split_whitespace().next()).collect();
    let source = std::path::Path::new(env!("CARGO_MANIFEST_DIR")).join("../core/src");
    let mut there: Vec<String> = std::fs::read_dir(source)
        .unwrap()
        .map(|entry| {
            let entry = entry.unwrap();
            let name = entry.file_name().into_string().unwrap();
            if entry.path().is_dir() { format!("{name}/") } else { name }
        })
        .filter(|name| name != "lib.rs")
        .collect();
    told.sort_unstable();
    there.sort_unstable();
    assert_eq!(told, there);
}
