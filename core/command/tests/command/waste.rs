//! The papers of the waste desk and the pour check.

use super::{csv, folder, plan_with, run, run_on};
use serde_json::json;
use std::fs;
use std::io::Read;
use std::path::Path;

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
fn papers_are_written_as_a_workbook() {
    let plan = plan_with("/site/name", json!("=cmd|'/C calc'!A1"));
    let book = folder("waste_workbook").join("papers.xlsx");
    let to = book.to_str().unwrap();
    assert_eq!(
        run_on(plan.as_bytes(), &["waste", "-", "--format", "xlsx"]).status,
        2,
        "no workbook on a terminal"
    );
    let done = run_on(plan.as_bytes(), &["waste", "-", "--format", "xlsx", "--output", to]);
    assert_eq!(done.status, 0, "{}", done.complaints);
    let (names, all) = sheets(&book);
    assert_eq!(names, ["codes", "run", "label", "drum", "months", "pick-ups", "load", "reporting"]);
    assert!(all.contains("=cmd|") && !all.contains("<f>") && !all.contains("<f "), "text is never a formula");
    // The same numbers as in the CSV, as numbers.
    let table = run_on(plan.as_bytes(), &["waste", "-", "--paper", "load", "--format", "csv"]);
    let rows = csv(&table.out);
    let kg = &rows.iter().find(|r| r.len() == 15 && r[0] != "Stream").unwrap()[13];
    assert!(kg.parse::<f64>().unwrap() > 0.0 && all.contains(&format!("<v>{kg}</v>")), "{kg}");

    let book = book.with_file_name("pour.xlsx");
    let to = book.to_str().unwrap();
    let pour = ["pour", "-", "--into", "drain", "acetone=1 L", "--format", "xlsx", "--output", to];
    let done = run_on(plan.as_bytes(), &pour);
    assert_eq!(done.status, 0, "{}", done.complaints);
    let (names, all) = sheets(&book);
    assert_eq!(names, ["pour"]);
    assert!(all.contains("the drain is closed"));
}

/// The names of a workbook's sheets and the text of all its parts.
fn sheets(book: &Path) -> (Vec<String>, String) {
    let mut archive = zip::ZipArchive::new(fs::File::open(book).unwrap()).unwrap();
    let (mut names, mut all) = (Vec::new(), String::new());
    for i in 0..archive.len() {
        let mut file = archive.by_index(i).unwrap();
        let mut text = String::new();
        if file.name().ends_with(".xml") {
            file.read_to_string(&mut text).unwrap();
        }
        if file.name() == "xl/workbook.xml" {
            names = text
                .split("<sheet name=\"")
                .skip(1)
                .filter_map(|s| Some(s.split_once('"')?.0.to_owned()))
                .collect();
        }
        all.push_str(&text);
    }
    (names, all)
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

#[test]
fn the_mix_keeps_within_its_budget() {
    let plan = run(&["example", "harbour-sediment"]).out;
    let mix = |args: &[&str]| run_on(plan.as_bytes(), &[&["mix", "-", "--format", "csv"], args].concat());
    let free = mix(&["--figure", "waste.total.mass"]);
    assert_eq!(free.status, 0, "{}", free.complaints);
    assert!(free.out.starts_with("The mix with least all waste streams: mass\r\n"), "{}", free.out);
    // Whatever is sought keeps what it promises, by the printed figures.
    for budget in ["-1e9", "-20000", "-1000", "0", "1000", "20000", "1e9"] {
        let done = mix(&["--figure", "waste.total.mass", "--budget", budget]);
        assert_eq!(done.status, 0, "{}", done.complaints);
        let sought: Vec<Vec<String>> = csv(&done.out)
            .into_iter()
            .filter(|r| r.last().is_some_and(|l| l.starts_with("sought")))
            .collect();
        if budget == "-1e9" {
            assert!(sought.is_empty() && done.out.contains("No mix keeps within that"));
            continue;
        }
        for row in sought {
            let more: f64 = row[3].parse().unwrap();
            assert!(more <= budget.parse::<f64>().unwrap() * (1.0 + 1e-3) + 1.0, "{budget}: {row:?}");
        }
    }
    for (args, words) in [
        (&["--figure", "waste.totl.mass"][..], "there are: waste.hazardous, "),
        (&["--figure", "metric.nothing"][..], "no route has a figure"),
        (&["--price", "-3"][..], "--price"),
        (&["--budget", "1", "--price", "3"][..], "cannot be used with"),
    ] {
        let refused = mix(args);
        assert_eq!(refused.status, 2, "{}", refused.out);
        assert!(refused.complaints.contains(words), "{}", refused.complaints);
    }
}
