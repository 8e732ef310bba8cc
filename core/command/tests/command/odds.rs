//! `odds`: what the draws say, refusals, and being interrupted.

use super::{PLAN, run_on};
use serde_json::Value;

fn odds(args: &[&str]) -> super::Run {
    run_on(PLAN.as_bytes(), &[&["odds", "-"], args].concat())
}

#[test]
fn the_table_says_intervals_and_odds() {
    let done = odds(&["--draws", "1000"]);
    assert_eq!(done.status, 0, "{}", done.complaints);
    assert!(done.out.starts_with("1000 draws. Seed 1. Intervals hold 95 % of the draws"), "{}", done.out);
    assert!(done.out.contains("all waste streams: mass") && done.out.contains("(present)"));
    assert!(done.out.contains("draws\n"));
    assert_eq!(odds(&["--draws", "1000"]).out, done.out);
}

#[test]
fn the_document_names_units_and_holds_what_it_says() {
    let done =
        odds(&["--draws", "1000", "--format", "json", "--figure", "waste.total.mass", "--coverage", "90"]);
    assert_eq!(done.status, 0, "{}", done.complaints);
    let document: Value = serde_json::from_str(&done.out).unwrap();
    assert_eq!(document["thimbleworth_odds"], 1);
    assert_eq!((&document["draws"], &document["coverage"]), (&Value::from(1000), &Value::from(0.9)));
    let figures = document["workloads"][0]["figures"].as_array().unwrap();
    assert_eq!(figures.len(), 1);
    let route = &figures[0]["routes"][0];
    let number = |key: &str| route[key].as_f64().unwrap();
    assert!(number("low_kg_per_year") < number("median_kg_per_year"));
    assert!(number("median_kg_per_year") < number("high_kg_per_year"));
    assert!(number("u_kg_per_year") > 0.0 && number("first_order_u_kg_per_year") > 0.0);
    let rival = &figures[0]["rivals"][0];
    assert!((0.0..=1.0).contains(&rival["less"].as_f64().unwrap()));
    let matters = rival["matters"].as_array().unwrap();
    assert!(matters[0]["share"].as_f64().unwrap() >= matters[1]["share"].as_f64().unwrap());
}

#[test]
fn what_cannot_be_drawn_is_refused() {
    for (args, said) in [
        (&["--draws", "10"][..], "200"),
        (&["--coverage", "50"][..], "above 50 and below 100"),
        (&["--coverage", "nan"][..], "above 50 and below 100"),
        (
            &["--figure", "waste.nothing"][..],
            "no route has a figure \"waste.nothing\"; there are: air.solvents",
        ),
    ] {
        let done = odds(args);
        assert_eq!((done.status, done.out.as_str()), (2, ""), "{args:?}");
        assert!(done.complaints.contains(said), "{args:?}: {}", done.complaints);
    }
    assert_eq!(run_on(b"{}", &["odds", "-"]).status, 2);
}

/// Ctrl-C ends the draws; what there is is written, and the status says that it was ended.
#[cfg(unix)]
#[test]
fn an_interrupt_keeps_what_is_drawn() {
    use std::io::{Read, Write};
    use std::process::{Command, Stdio};
    use std::time::Duration;
    let mut child = Command::new(env!("CARGO_BIN_EXE_thimbleworth"))
        .args(["odds", "-", "--draws", "2000000", "--figure", "waste.total.mass"])
        .stdin(Stdio::piped())
        .stdout(Stdio::piped())
        .stderr(Stdio::piped())
        .spawn()
        .unwrap();
    child.stdin.take().unwrap().write_all(PLAN.as_bytes()).unwrap();
    // The first line of progress says that the draws are under way.
    let mut complaints = child.stderr.take().unwrap();
    let mut first = [0; 1];
    complaints.read_exact(&mut first).unwrap();
    std::thread::sleep(Duration::from_millis(20));
    let told = Command::new("kill").args(["-INT", &child.id().to_string()]).status().unwrap();
    assert!(told.success());
    let mut rest = String::new();
    complaints.read_to_string(&mut rest).unwrap();
    let done = child.wait_with_output().unwrap();
    assert_eq!(done.status.code(), Some(130), "{rest}");
    let out = String::from_utf8(done.stdout).unwrap();
    assert!(out.contains(" of 2000000 draws: ended before the others. Seed 1."), "{out}");
    assert!(out.contains("all waste streams: mass"));
}
