//! `log`: the site's records as a stream, in every format, with what it refuses.

use super::{Run, csv, folder, run, run_on};
use serde_json::Value;
use std::fs;
use std::io::Read;
use std::path::PathBuf;

const PREP: &str = "Prep date,Batch,Method,QC type\n2026-01-05,B1,Soxhlet,Sample\n2026-01-05,B1,Soxhlet,MB\n\
2026-02-05,B2,Shaking,Sample\n";
const PURCHASES: &str = "Order date;Item;Amount (L);Supplier\n05.01.2026;acetone;2,5;=1+1\n\
06.01.2026;=cmd|' /C calc'!A0;2,5;x\n";

/// A folder with a plan, a preparation log and a purchase ledger.
fn site(name: &str) -> (PathBuf, [String; 3]) {
    let folder = folder(name);
    let plan = run(&["example", "harbour-sediment"]).out;
    let files = [("plan.json", plan.as_str()), ("prep.csv", PREP), ("purchases.csv", PURCHASES)];
    let paths = files.map(|(name, text)| {
        let path = folder.join(name);
        fs::write(&path, text).unwrap();
        path.to_str().unwrap().to_owned()
    });
    (folder, paths)
}

fn log(paths: &[String; 3], more: &[&str]) -> Run {
    let mut args = vec!["log", &paths[1], &paths[2], "--plan", &paths[0]];
    args.extend(more);
    run(&args)
}

#[test]
fn every_format_tells_the_same_sums() {
    let (folder, paths) = site("log_formats");
    let json = log(&paths, &["--format", "json"]);
    assert_eq!(json.status, 0, "{}", json.complaints);
    assert!(json.complaints.contains("prep.csv: 1 of 3 rows are refused"));
    let json: Value = serde_json::from_str(&json.out).unwrap();
    let rows = json["tables"]["reconciliation"]["rows"].as_array().unwrap();
    let acetone = rows.iter().find(|r| r["material"] == "acetone").unwrap();
    let bought = acetone["bought_kg"].as_f64().unwrap();
    // 2.5 L at 0.790 kg/L
    assert!((bought - 1.976).abs() < 0.005, "{bought}");
    let table = log(&paths, &["--format", "csv"]);
    let table = csv(&table.out);
    let line = table.iter().find(|r| r[0] == "acetone").unwrap();
    assert!((line[2].parse::<f64>().unwrap() - bought).abs() < 1e-12);
    let text = log(&paths, &[]).out;
    assert!(text.contains("Reconciliation by solvent and quarter") && text.contains("Solvent balance"));
    let markdown = log(&paths, &["--format", "markdown"]).out;
    assert!(markdown.contains("| acetone | 2026 Q1 |") && markdown.contains("Annex VII"));
    let book = folder.join("book.xlsx");
    let to = book.to_str().unwrap();
    assert_eq!(log(&paths, &["--format", "xlsx"]).status, 2, "no workbook on a terminal");
    let mut bytes = Vec::new();
    for _ in 0..2 {
        assert_eq!(log(&paths, &["--format", "xlsx", "--output", to]).status, 0);
        let again = fs::read(&book).unwrap();
        assert!(bytes.is_empty() || bytes == again, "the same records give the same bytes");
        bytes = again;
    }
    let mut archive = zip::ZipArchive::new(std::io::Cursor::new(bytes)).unwrap();
    let mut all = String::new();
    for i in 0..archive.len() {
        let mut file = archive.by_index(i).unwrap();
        if file.name().ends_with(".xml") {
            file.read_to_string(&mut all).unwrap();
        }
    }
    assert!(all.contains("name=\"reconciliation\"") && all.contains("name=\"balance\""));
    assert!(all.contains("=cmd|"), "the hostile cell is told as it stands");
    assert!(!all.contains("<f>") && !all.contains("<f "), "and is no formula");
    // As far as the reading of JSON is exact.
    assert!(all.contains(&format!("<v>{}", &bought.to_string()[..12])), "numbers are numbers");
}

#[test]
fn every_refused_row_goes_into_the_file_that_is_named() {
    let (folder, paths) = site("log_refused");
    let list = folder.join("refused.csv");
    let done = log(&paths, &["--refused", list.to_str().unwrap(), "--table", "files"]);
    assert_eq!(done.status, 0, "{}", done.complaints);
    let rows = csv(&fs::read_to_string(&list).unwrap());
    assert_eq!(rows.len(), 3);
    assert_eq!((rows[1][0].as_str(), rows[1][1].as_str()), ("prep.csv", "4"));
    assert!(rows[2][3].starts_with("'=cmd"));
    assert!(done.out.starts_with("Files") && !done.out.contains("Reconciliation"));
}

#[test]
fn mappings_are_kept_in_the_plan_and_taken_from_it() {
    let (folder, paths) = site("log_kept");
    let kept = folder.join("kept.json");
    assert_eq!(log(&paths, &["--keep", kept.to_str().unwrap()]).status, 0);
    let text = fs::read_to_string(&kept).unwrap();
    let mut plan: Value = serde_json::from_str(&text).unwrap();
    assert_eq!(plan["logs"][1]["columns"]["Amount (L)"], "amount in L");
    assert_eq!(plan["logs"][1]["decimals"], "comma");
    // What the user changes there is read.
    plan["logs"][0]["means"] = serde_json::json!({ "Shaking": "Ultrasonic" });
    fs::write(&kept, plan.to_string()).unwrap();
    let [_, prep, purchases] = &paths;
    let done = run(&[
        "log",
        prep,
        purchases,
        "--plan",
        kept.to_str().unwrap(),
        "--table",
        "work",
        "--format",
        "csv",
    ]);
    assert!(done.out.contains("PAH in sediment / Ultrasonic"), "{} {}", done.out, done.complaints);
    plan["logs"][0]["register"] = "shopping".into();
    fs::write(&kept, plan.to_string()).unwrap();
    let done = run(&["log", prep, "--plan", kept.to_str().unwrap()]);
    assert_eq!(done.status, 2);
    assert!(done.complaints.contains("logs[0].register"));
}

#[test]
fn what_cannot_be_read_is_said() {
    let (folder, [plan, prep, _]) = site("log_bad");
    let refused = |input: &[u8], args: &[&str], words: &str| {
        let mut all = vec!["log"];
        all.extend(args);
        let done = run_on(input, &all);
        assert_eq!((done.status, done.out.as_str()), (2, ""), "{args:?}");
        assert!(done.complaints.contains(words), "{}", done.complaints);
    };
    refused(b"", &["-", "--plan", &plan], "the file is empty");
    refused(b"PK\x03\x04", &["-", "--plan", &plan], "saved as CSV");
    refused(b"Solvent,Amount (L),Supplier\n", &["-", "--plan", &plan], "a column with the date");
    refused(b"", &["no-such.csv", "--plan", &plan], "there is no such file");
    refused(b"", &[&prep, "--plan", "no-such.json"], "there is no such file");
    refused(b"", &[&prep, "--plan", &plan, "--table", "nonsense"], "there is no table nonsense");
    refused(b"", &[&prep, "--plan", &plan, "--output", &prep], "is a file that is read");
    refused(b"", &[folder.to_str().unwrap(), "--plan", &plan], "it is a folder");
    // A stream needs no file.
    let done = run_on(PREP.as_bytes(), &["log", "-", "--plan", &plan, "--table", "work", "--format", "json"]);
    assert_eq!(done.status, 0, "{}", done.complaints);
    assert!(done.out.contains("\"extractions\": 2"));
}
