//! What README.md and DEVELOPERS.md show is what the library does. Their Rust is compiled with the documentation tests.

use super::{a_year, accounted, beside, route};
use thimbleworth::account::account_text;
use thimbleworth::plan::Severity;

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
