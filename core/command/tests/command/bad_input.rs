//! Input that cannot be used: a sentence that says where, what and what would do; never a panic.

use super::{PLAN, folder, plan_with, run, run_on};
use serde_json::{Value, json};
use std::fs;
use std::time::{Duration, Instant};

/// `account` and `compare` end with 2 and print nothing; `check` ends with 1 and prints the same problems.
fn refused(plan: &[u8], words: &[&str]) {
    let done = run_on(plan, &["account", "-"]);
    assert_eq!((done.status, done.out.as_str()), (2, ""), "{words:?}: {}", done.complaints);
    for word in words {
        assert!(done.complaints.contains(word), "{word} in {}", done.complaints);
    }
    assert!(done.complaints.lines().any(|l| l.starts_with("error")), "{}", done.complaints);
    let checked = run_on(plan, &["check", "-"]);
    assert_eq!(checked.status, 1, "{words:?}");
    assert!(checked.out.starts_with(&done.complaints), "{}", checked.out);
    assert_eq!(run_on(plan, &["compare", "-", "--format", "json"]).status, 2);
    assert_eq!(run_on(plan, &["trace", "-", "mass.in"]).status, 2);
}

fn step(key: &str) -> String {
    format!("/workloads/0/routes/0/steps/0/{key}")
}

#[test]
fn text_that_is_no_plan() {
    refused(b"", &["error"]);
    refused(b"   \n", &["error"]);
    refused(b"{", &["line 1"]);
    refused(PLAN.replace("\"rules\"", "\"rules").as_bytes(), &["error"]);
    refused(b"[1, 2]", &["error"]);
    refused(b"{\"thimbleworth\": 7}", &["7"]);
    refused(b"{ \"thimbleworth\": 1, \xff", &["0xFF", "UTF-8"]);
    refused(b"\xff\xfe{\0", &["UTF-16"]);
    refused(&[0_u8; 1000], &["error"]);
    refused("[".repeat(200_000).as_bytes(), &["error"]);
}

#[test]
fn amounts_that_cannot_be() {
    for (pointer, value, words) in [
        (step("charge"), json!("300 kg"), "steps[0].charge"),
        (step("charge"), json!("300 parsecs"), "parsecs"),
        (step("charge"), json!("-300 mL"), "steps[0].charge"),
        (step("charge"), json!("1,234 mL"), "1,234 mL"),
        (step("charge"), json!("1e9 L"), "outside what is possible"),
        (step("charge"), json!(300), "steps[0].charge"),
        (step("solvent"), json!({ "n-hexane": "50 %", "acetone": "40 %" }), "steps[0].solvent"),
        (step("solvent"), json!("unobtainium"), "unobtainium"),
        (step("solvent"), json!("acetine"), "acetone"),
        (step("step"), json!("soxlet"), "soxhlet"),
        (step("chargge"), json!("1 mL"), "charge"),
        ("/workloads/0/repeats".into(), json!("-3 %"), "repeats"),
        ("/workloads/0/results_per_year".into(), json!(-1), "results_per_year"),
        ("/workloads/0/present".into(), json!("nobody"), "nobody"),
        ("/site/as_of".into(), json!("2026-13-01"), "as_of"),
    ] {
        refused(plan_with(&pointer, value).as_bytes(), &[words]);
    }
}

#[test]
fn steps_that_cannot_happen() {
    // Concentrating before anything is there.
    let mut plan: Value = serde_json::from_str(PLAN).unwrap();
    plan["workloads"][0]["routes"][0]["steps"].as_array_mut().unwrap().swap(0, 1);
    refused(plan.to_string().as_bytes(), &["routes[0].steps[0]", "empty", "an earlier step"]);
    // Nothing that takes the sample in.
    plan["workloads"][0]["routes"][0]["steps"].as_array_mut().unwrap().remove(1);
    refused(plan.to_string().as_bytes(), &["routes[0].steps", "takes the sample in"]);
    // More is measured than was there.
    let more = plan_with(&step("measured"), json!({ "condenser loss": "900 g" }));
    refused(more.as_bytes(), &["condenser loss"]);
    // CO2 that is solid.
    let solid = plan_with("/workloads/0/routes/1/steps/0/pressure", json!("9000 bar"));
    refused(solid.as_bytes(), &["workloads[0].routes[1].steps[0]"]);
    let frozen = plan_with("/workloads/0/routes/1/steps/0/meter_temperature", json!("-120 °C"));
    refused(frozen.as_bytes(), &["workloads[0].routes[1].steps[0]"]);
}

/// Something is left on the bench, and the site has no stream that it could go to.
#[test]
fn mass_left_on_the_bench() {
    let mut plan: Value = serde_json::from_str(PLAN).unwrap();
    let solids = json!([{ "name": "solids", "holds": "solid", "container": "60 L" }]);
    plan["site"]["streams"] = solids;
    let route = &mut plan["workloads"][0]["routes"][0];
    route["steps"] = json!([route["steps"][0].clone()]);
    route["ends"] = json!({ "marc": "solids" });
    plan["workloads"][0]["routes"] = json!([route.clone()]);
    refused(plan.to_string().as_bytes(), &["is left in the liquor", "ends"]);
}

#[test]
fn all_errors_are_told_at_once() {
    let plan = PLAN
        .replace("\"300 ± 5 mL\"", "\"300 parsecs\"")
        .replace("\"18 h\"", "\"18 kg\"")
        .replace("305 bar", "-305 bar");
    let done = run_on(plan.as_bytes(), &["account", "-"]);
    assert_eq!(done.complaints.lines().filter(|l| l.starts_with("error")).count(), 3, "{}", done.complaints);
}

#[test]
fn files_that_are_none() {
    let folder = folder("bad input");
    for (path, words) in
        [("no-such-plan.json", "there is no such file"), (folder.to_str().unwrap(), "it is a folder")]
    {
        for args in [vec!["account", path], vec!["check", path], vec!["trace", path, "mass.in"]] {
            let done = run(&args);
            assert_eq!((done.status, done.out.as_str()), (2, ""));
            assert!(
                done.complaints.starts_with("error: ") && done.complaints.contains(words),
                "{}",
                done.complaints
            );
        }
    }
}

/// Ten thousand steps, and ten megabytes of notes, are read and accounted; ten megabytes of nonsense are refused.
#[test]
fn large_plans() {
    let begun = Instant::now();
    let mut plan: Value = serde_json::from_str(PLAN).unwrap();
    let rinse = json!({ "step": "rinse", "solvent": "acetone", "charge": "40 mL", "to": "flammable" });
    let mut steps = plan["workloads"][0]["routes"][0]["steps"].as_array().unwrap().clone();
    steps.extend(std::iter::repeat_n(rinse, 10_000));
    plan["workloads"][0]["routes"][0]["steps"] = json!(steps);
    let text = plan.to_string();
    let done = run_on(text.as_bytes(), &["account", "-"]);
    assert!(
        done.status == 0 || done.complaints.contains("steps"),
        "{}",
        done.complaints.chars().take(500).collect::<String>()
    );

    plan = serde_json::from_str(PLAN).unwrap();
    plan["notes"] = json!("x".repeat(10_000_000));
    let folder = folder("large");
    let file = folder.join("plan.json");
    fs::write(&file, plan.to_string()).unwrap();
    assert_eq!(run(&["account", file.to_str().unwrap()]).status, 0);

    refused("{\"a\": [".repeat(1_500_000).as_bytes(), &["error"]);
    refused(format!("{{\"{}\": 1}}", "k".repeat(10_000_000)).as_bytes(), &["error"]);
    assert!(begun.elapsed() < Duration::from_secs(60), "{:?}", begun.elapsed());
}
