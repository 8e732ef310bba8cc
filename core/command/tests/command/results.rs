//! Every subcommand on good input.

use super::{PLAN, csv, plan_with, run, run_on, same};
use serde_json::{Value, json};
use std::process::{Command, Stdio};

fn parsed(text: &str) -> Value {
    serde_json::from_str(text).unwrap()
}

#[test]
fn alone_it_shows_the_demo_and_where_to_go() {
    let done = run(&[]);
    assert_eq!((done.status, done.complaints.as_str()), (0, ""));
    let at = |words: &str| done.out.find(words).unwrap_or_else(|| panic!("{words} in {}", done.out));
    assert!(at("not a result of yours") < at("In place of ") && at("In place of ") < at("A year"));
    let next: Vec<&str> = done.out[at("Next:")..].lines().skip(1).collect();
    assert_eq!(next.len(), 3);
    // What it tells people to type works.
    let plan = run(&["example", next[0].split_whitespace().nth(2).unwrap()]);
    assert_eq!(plan.status, 0);
    assert_eq!(run_on(plan.out.as_bytes(), &["compare", "-"]).status, 0);
    let figure = next[2].split_whitespace().nth(3).unwrap();
    assert_eq!(run_on(plan.out.as_bytes(), &["trace", "-", figure]).status, 0);
}

#[test]
fn account_and_compare_write_four_formats_and_warn_on_the_standard_error() {
    for what in ["account", "compare"] {
        for (format, begins) in [
            ("table", "Harbour sediment: leave the Soxhlet bench?\n"),
            ("json", "{\n  \"thimbleworth_result\": 1,\n"),
            ("csv", "workload,route,id,title,unit,per_result,"),
            ("markdown", "# Harbour sediment: leave the Soxhlet bench?\n"),
        ] {
            let done = run_on(PLAN.as_bytes(), &[what, "-", "--format", format]);
            assert_eq!(done.status, 0, "{what} {format}: {}", done.complaints);
            assert!(done.out.starts_with(begins), "{what} {format}: {}", done.out);
            assert!(done.complaints.lines().count() >= 4);
            let worded = |l: &str| l.starts_with("warning ") || l.starts_with("note ");
            assert!(done.complaints.lines().all(worded), "{}", done.complaints);
        }
    }
}

#[test]
fn the_json_result_reads_back_and_agrees_with_the_csv() {
    let result = parsed(&run_on(PLAN.as_bytes(), &["account", "-", "--format", "json"]).out);
    assert!(result["workloads"][0].get("comparison").is_none());
    let figures = result["workloads"][0]["routes"][0]["figures"].as_array().unwrap();
    let rows = csv(&run_on(PLAN.as_bytes(), &["account", "-", "--format", "csv"]).out);
    let column = |name: &str| rows[0].iter().position(|c| c == name).unwrap();
    let mut seen = 0;
    for figure in figures {
        let row = rows.iter().find(|r| r[1] == "Soxhlet" && r[2] == figure["id"].as_str().unwrap()).unwrap();
        assert_eq!(row.len(), rows[0].len());
        if let Some(kg) = figure.get("kg_per_year") {
            assert_eq!(row[column("unit")], "kg");
            assert!(same(row[column("per_year")].parse().unwrap(), kg.as_f64().unwrap()));
            assert_eq!(row[column("per_kg_product")], "");
            seen += 1;
        }
    }
    assert!(seen > 15);
    let compared = parsed(&run_on(PLAN.as_bytes(), &["compare", "-", "--format", "json"]).out);
    let beside = &compared["workloads"][0]["comparison"]["routes"][0];
    assert_eq!(beside["name"], "CO2");
    assert!(beside["finding"].as_str().unwrap().starts_with("In place of Soxhlet, CO2 "));
    assert!(beside["worse"].as_array().unwrap().contains(&json!("CO2 vented")));
}

#[test]
fn the_csv_quotes_and_defuses_names_of_the_plan() {
    let plan = plan_with("/workloads/0/name", json!("=cmd|' /C calc'!A0, \"x\"\nnext"));
    let done = run_on(plan.as_bytes(), &["account", "-", "--format", "csv"]);
    assert_eq!(done.status, 0, "{}", done.complaints);
    for row in csv(&done.out).iter().skip(1) {
        assert_eq!(row[0], "'=cmd|' /C calc'!A0, \"x\"\nnext");
        assert_eq!(row.len(), 12);
    }
}

#[test]
fn a_name_cannot_steer_the_terminal() {
    let plan = plan_with("/title", json!("\u{1b}]0;gone\u{7}\u{1b}[2J"));
    for args in [vec!["account", "-"], vec!["compare", "-"], vec!["check", "-"]] {
        let done = run_on(plan.as_bytes(), &args);
        assert!(!done.out.contains('\u{1b}') && !done.complaints.contains('\u{1b}'));
    }
    let plan = plan_with("/workloads/0/present", json!("\u{1b}[31mred"));
    assert!(!run_on(plan.as_bytes(), &["check", "-"]).out.contains('\u{1b}'));
    assert!(!run(&["trace", "\u{1b}[31m", "x"]).complaints.contains('\u{1b}'));
}

#[test]
fn trace_opens_a_figure_of_any_route() {
    let done = run_on(PLAN.as_bytes(), &["trace", "-", "air.solvents"]);
    assert_eq!(done.status, 0);
    for words in ["condenser loss", "measured", "6 ± 2 g", "mᵢ = s mᵢ(liquor)", "from memory"] {
        assert!(done.out.contains(words), "{words} in {}", done.out);
    }
    let args =
        ["trace", "-", "co2.vented", "--route", "CO2", "--workload", "PAH in sediment", "--format", "json"];
    let json = parsed(&run_on(PLAN.as_bytes(), &args).out);
    let added: f64 =
        json["entries"].as_array().unwrap().iter().map(|e| e["adds_kg_per_year"].as_f64().unwrap()).sum();
    let figure = json["figure"]["kg_per_year"].as_f64().unwrap();
    assert!((added / figure - 1.0).abs() < 1e-12);
    for (args, words) in [
        (vec!["trace", "-", "co2.vented"], "CO2 has it"),
        (vec!["trace", "-", "waste.totl.mass"], "waste.total.mass"),
        (vec!["trace", "-", "mass.in", "--route", "Soxlet"], "did you mean Soxhlet?"),
    ] {
        let done = run_on(PLAN.as_bytes(), &args);
        assert_eq!((done.status, done.out.as_str()), (2, ""));
        assert!(done.complaints.contains(words), "{}", done.complaints);
    }
}

#[test]
fn check_looks_into_how_logs_are_read() {
    let mut plan: serde_json::Value = serde_json::from_str(PLAN).unwrap();
    let mut check = |mut log: serde_json::Value| {
        log["name"] = "a.csv".into();
        plan["logs"] = serde_json::json!([log]);
        run_on(plan.to_string().as_bytes(), &["check", "-"])
    };
    let fine = check(
        serde_json::json!({ "register": "purchases", "columns": { "Item": "material" }, "means": { "x": "acetone" } }),
    );
    assert!(fine.status == 0 && !fine.out.contains("logs"), "{}{}", fine.out, fine.complaints);
    let odd = check(
        serde_json::json!({ "register": "purchases", "columns": { "Item": "material" }, "means": { "x": "acetonn" } }),
    );
    assert!(
        odd.status == 0 && odd.out.contains("means \"acetonn\", which is nothing in the plan"),
        "{}",
        odd.out
    );
    let broken =
        check(serde_json::json!({ "register": "purchases", "columns": { "Item": "material in h" } }));
    assert!(broken.status == 1 && broken.out.contains("logs"), "{}", broken.out);
}

#[test]
fn check_tells_everything_and_says_by_its_status_whether_there_is_an_error() {
    let fine = run_on(PLAN.as_bytes(), &["check", "-"]);
    assert_eq!((fine.status, fine.complaints.as_str()), (0, ""));
    assert!(fine.out.ends_with("0 errors, 4 warnings\n"), "{}", fine.out);
    let plan = plan_with("/workloads/0/routes/0/steps/0/charge", json!("300 parsecs"));
    let plan = plan.replace("\"3 %\"", "\"-3 %\"");
    let broken = run_on(plan.as_bytes(), &["check", "-"]);
    assert_eq!(broken.status, 1);
    assert!(broken.out.contains("error workloads[0].routes[0].steps[0].charge: \"300 parsecs\""));
    assert!(broken.out.contains("error workloads[0].repeats: "), "{}", broken.out);
}

#[test]
fn materials_lists_the_catalogue_and_opens_one() {
    let list = run(&["materials"]);
    assert_eq!(list.status, 0);
    assert!(list.out.lines().count() > 60);
    assert!(list.out.contains("\nn-hexane "));
    let one = run(&["materials", "DCM"]);
    for words in ["dichloromethane (solvent)", "75-09-2", "density of the liquid at 20 °C", "H351", "UN1593"]
    {
        assert!(one.out.contains(words), "{words} in {}", one.out);
    }
    let json = parsed(&run(&["materials", "--format", "json"]).out);
    assert!(json.as_array().unwrap().len() >= 60);
    let hexane = parsed(&run(&["materials", "hexane", "--format", "json"]).out);
    assert_eq!(hexane["cas"], "110-54-3");
    let figures = hexane["figures"].as_array().unwrap();
    let density = figures.iter().find(|f| f["key"] == "density_kg_m3").unwrap();
    let (low, value, high) = (
        density["low"].as_f64().unwrap(),
        density["value"].as_f64().unwrap(),
        density["high"].as_f64().unwrap(),
    );
    assert!(low <= value && value <= high && !density["cite"].as_str().unwrap().is_empty());
    let unknown = run(&["materials", "acetine"]);
    assert_eq!(unknown.status, 2);
    assert!(unknown.complaints.contains("acetone"), "{}", unknown.complaints);
}

#[test]
fn schema_and_technique_come_from_the_declarations() {
    let schema = parsed(&run(&["schema"]).out);
    let techniques = run(&["technique"]);
    let keys: Vec<&str> = techniques.out.lines().map(|l| l.split_whitespace().next().unwrap()).collect();
    assert!(keys.len() >= 11);
    for key in keys {
        assert!(schema["$defs"].get(format!("step-{key}")).is_some(), "{key}");
        let one = run(&["technique", key]);
        assert_eq!(one.status, 0);
        for words in ["Parameters\n", "Rules\n", "Example\n"] {
            assert!(one.out.contains(words), "{key}: {words}");
        }
    }
    let unknown = run(&["technique", "soxlet"]);
    assert_eq!(unknown.status, 2);
    assert!(unknown.complaints.contains("soxhlet"));
}

#[test]
fn every_example_is_accounted_without_an_error() {
    let list = run(&["example"]);
    let keys: Vec<&str> =
        list.out.lines().filter(|l| !l.starts_with(' ')).map(|l| l.split(':').next().unwrap()).collect();
    assert!(!keys.is_empty());
    for key in keys {
        let plan = run(&["example", key]);
        let done = run_on(plan.out.as_bytes(), &["compare", "-"]);
        assert_eq!(done.status, 0, "{key}: {}", done.complaints);
        assert!(done.out.contains("In place of "), "{key}");
    }
    assert_eq!(run(&["example", "none such"]).status, 2);
}

#[test]
fn help_is_no_failure_and_a_wrong_call_is() {
    assert_eq!(run(&["--help"]).status, 0);
    assert!(run(&["--version"]).out.starts_with("thimbleworth "));
    assert!(run(&["co2", "--help"]).out.contains("ideal gas at 298.15 K"));
    for args in [
        vec!["acount"],
        vec!["account"],
        vec!["account", "-", "--format", "pdf"],
        vec!["trace", "-"],
        vec!["co2"],
        vec!["co2", "--temperature", "60 °C"],
        vec!["co2", "--states", "x.csv", "--temperature", "60 °C", "--pressure", "1 bar"],
    ] {
        let done = run(&args);
        assert_eq!((done.status, done.out.as_str()), (2, ""), "{args:?}");
        assert!(!done.complaints.is_empty());
    }
}

#[test]
fn a_reader_that_has_had_enough_is_no_failure() {
    let mut child = Command::new(env!("CARGO_BIN_EXE_thimbleworth"))
        .args(["materials", "--format", "json"])
        .stdout(Stdio::piped())
        .stderr(Stdio::piped())
        .spawn()
        .unwrap();
    // Far more is written than a pipe holds.
    drop(child.stdout.take());
    let done = child.wait_with_output().unwrap();
    assert_eq!((done.status.code(), done.stderr.len()), (Some(0), 0));
}
