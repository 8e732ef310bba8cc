//! The papers of the waste desk and the pour check.

use super::{csv, plan_with, run, run_on};
use serde_json::json;

/// The example of a water laboratory, under the rules of the United States.
fn plan() -> String {
    run(&["example", "water-laboratory"]).out.replace("\"rules\": \"EU\"", "\"rules\": \"US\"")
}

#[test]
fn every_paper_is_written_in_both_formats() {
    let plan = plan();
    for paper in ["codes", "run", "label", "drum", "months", "pick-ups", "load", "reporting"] {
        let markdown = run_on(plan.as_bytes(), &["waste", "-", "--paper", paper]);
        assert_eq!(markdown.status, 0, "{}", markdown.complaints);
        assert!(markdown.out.starts_with("# ") && markdown.out.matches("\n# ").count() == 0, "{paper}");
        // Each says as of when, whose rules, and who decides.
        for words in ["as of 2026-12-01", "rules: US", "licensed person"] {
            assert!(markdown.out.contains(words), "{paper}: {words}");
        }
        let table = run_on(plan.as_bytes(), &["waste", "-", "--paper", paper, "--format", "csv"]);
        // The same rows: those of Markdown without the line under each heading.
        let rows = csv(&table.out).iter().filter(|r| r.len() > 1).count();
        let lines = markdown.out.lines().filter(|l| l.starts_with('|') && !l.starts_with("| ---")).count();
        assert_eq!(rows, lines, "{paper}");
        assert!(lines > 1, "{paper}");
    }
    let all = run_on(plan.as_bytes(), &["waste", "-"]);
    assert_eq!(all.out.lines().filter(|l| l.starts_with("# ")).count(), 8);
}

#[test]
fn another_route_brings_other_codes() {
    let plan = plan();
    let codes =
        |route: &str| run_on(plan.as_bytes(), &["waste", "-", "--paper", "codes", "--route", route]).out;
    let (funnels, cartridges) = (codes("Liquid-liquid"), codes("Pesticides in drinking water/Solid-phase"));
    assert!(
        funnels.contains("| F002 | applies |")
            && !funnels.contains("routes: Pesticides in drinking water: Solid-phase")
    );
    assert!(cartridges.contains("Pesticides in drinking water: Solid-phase"));
    let unknown = run_on(plan.as_bytes(), &["waste", "-", "--route", "Funnel"]);
    assert_eq!(unknown.status, 2);
    assert!(unknown.complaints.contains("one of: Liquid-liquid, Solid-phase"), "{}", unknown.complaints);
}

#[test]
fn names_bring_neither_markup_nor_formulas_to_a_paper() {
    let evil = "=cmd|'/C calc'!A1<img src=x>";
    let plan = plan_with("/site/name", json!(evil));
    let markdown = run_on(plan.as_bytes(), &["waste", "-", "--paper", "label"]).out;
    assert!(!markdown.contains("<img") && markdown.contains("&lt;img"));
    let plan = plan_with("/workloads/0/name", json!(evil));
    let table = run_on(plan.as_bytes(), &["waste", "-", "--paper", "months", "--format", "csv"]).out;
    let cells = csv(&table).into_iter().flatten();
    assert_eq!(cells.filter(|c| c.starts_with(['=', '+', '@'])).count(), 0);
}

#[test]
fn pouring_is_checked_against_the_container() {
    let plan = plan();
    let pour = |args: &[&str]| run_on(plan.as_bytes(), &[&["pour", "-"], args].concat());
    let acid = pour(&["--into", "halogenated", "nitric acid=50 mL"]);
    assert!(acid.out.starts_with("# Pour into halogenated: do not pour"), "{}{}", acid.out, acid.complaints);
    let rinse = pour(&["--into", "halogenated", "--held", "2 L", "acetone=200 mL"]);
    assert!(rinse.out.contains("The container gains: D001, F003"), "{}", rinse.out);
    let drain = pour(&["--into", "drain", "water=1 L"]);
    assert!(drain.out.contains("the drain is closed"), "{}", drain.out);
    for (args, words) in [
        (&["--into", "halogenated", "acetone"][..], "has no amount"),
        (&["--into", "halogenated", "acetine=1 mL"][..], "did you mean acetone"),
        (&["--into", "sink", "acetone=1 mL"][..], "no stream is called \"sink\""),
        (&["--into", "halogenated", "acetone=1 J"][..], "acetone"),
        (&["--into", "halogenated", "acetone=0 mL"][..], "above zero"),
    ] {
        let refused = pour(args);
        assert_eq!(refused.status, 2, "{}", refused.out);
        assert!(refused.complaints.contains(words), "{}", refused.complaints);
    }
}
