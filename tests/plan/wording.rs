//! What is said about each fixture, word for word.

use std::collections::BTreeSet;
use std::fmt::Write as _;

use thimbleworth::plan::{Opened, open_bytes};

use super::{beside, same_as_kept};

fn said(opened: &Opened) -> String {
    let mut out = String::new();
    for problem in &opened.problems {
        let at = if problem.path.is_empty() { "the document" } else { &problem.path };
        let need = if problem.need.is_empty() { String::new() } else { format!("; {}", problem.need) };
        writeln!(out, "{} {at}: {}{need}", problem.severity.word(), problem.found).unwrap();
    }
    let plan = match (&opened.plan, opened.usable()) {
        (Some(_), true) => "usable",
        (Some(_), false) => "can be shown",
        (None, _) => "no plan",
    };
    writeln!(out, "= {plan}").unwrap();
    out
}

#[test]
fn every_fixture_is_told_what_is_wrong_with_it() {
    let files = std::fs::read_dir(beside("."))
        .unwrap()
        .map(|entry| entry.unwrap().file_name().into_string().unwrap());
    // The kept schema is written by another test.
    let files: BTreeSet<String> =
        files.filter(|name| name.ends_with(".json") && name != "schema.json").collect();
    assert_eq!(files.len(), 32);
    let mut text = String::new();
    for name in files {
        let opened = open_bytes(&std::fs::read(beside(&name)).unwrap());
        write!(text, "{name}\n{}\n", said(&opened)).unwrap();
    }
    same_as_kept("wording.txt", &text);
}

#[test]
fn sentences_have_no_full_stop_and_say_what_would_do() {
    for entry in std::fs::read_dir(beside(".")).unwrap() {
        let path = entry.unwrap().path();
        if path.extension().is_some_and(|end| end == "json") {
            for problem in open_bytes(&std::fs::read(&path).unwrap()).problems {
                assert!(!problem.found.is_empty() && !problem.found.ends_with('.'), "{problem:?}");
                let need = !problem.need.is_empty() && !problem.need.ends_with('.');
                assert!(need || problem.severity == thimbleworth::plan::Severity::Note, "{problem:?}");
                for text in [&problem.found, &problem.need, &problem.path] {
                    assert!(!text.chars().any(char::is_control), "{problem:?}");
                }
            }
        }
    }
}
