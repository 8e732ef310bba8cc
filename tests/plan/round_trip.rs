//! What was saved opens as it was, and saves the same way again; plans with errors too.

use std::collections::BTreeSet;

use thimbleworth::plan::{Field, open, save};

use super::generator::Chance;
use super::harbour;

#[test]
fn every_plan_opens_as_it_was_saved() {
    let mut chance = Chance(1);
    for _ in 0..1000 {
        let plan = chance.plan();
        let text = save(&plan);
        // Other readers agree that it is JSON.
        serde_json::from_str::<serde_json::Value>(&text).unwrap();
        let opened = open(&text);
        let again = opened.plan.unwrap();
        assert_eq!(again, plan);
        assert_eq!(save(&again), text);
        assert!(text.ends_with("}\n") && !text.contains('\r'));
        assert!(text.chars().all(|c| c == '\n' || !c.is_control()));
    }
}

#[test]
fn a_saved_document_says_the_same_to_another_reader() {
    let text = harbour();
    let saved = save(&open(&text).plan.unwrap());
    let value = |text: &str| serde_json::from_str::<serde_json::Value>(text).unwrap();
    assert_eq!(value(&saved), value(&text));
    assert_eq!(save(&open(&saved).plan.unwrap()), saved);
    // Amounts verbatim: numbers keep the digits that were written.
    for number in ["\"density\": 2.10,", "\"shots\": 3.50e0 }", "\"count\": 1,"] {
        assert!(text.contains(number) && saved.contains(number), "{number}");
    }
}

#[test]
fn the_order_written_is_kept() {
    let plan = open(&harbour()).plan.unwrap();
    let step = &plan.workloads[0].routes[0].steps[0];
    let fields: Vec<&str> = step.fields.iter().map(|(key, _)| key.as_str()).collect();
    assert_eq!(fields, ["solvent", "charge", "time"]);
    let Field::Rows(solvents) = &step.fields[0].1 else { panic!("{step:?}") };
    assert_eq!(solvents[0].0, "n-hexane");
}

#[test]
fn the_layout_on_paper_does_not_matter() {
    let text = harbour();
    let plan = open(&text).plan;
    let compact = serde_json::from_str::<serde_json::Value>(&text).unwrap().to_string();
    let windows = text.replace('\n', "\r\n");
    assert_eq!(open(&windows).plan, plan);
    assert_eq!(open(&format!("\u{feff}{text}")).plan, plan);
    // Another reader's rewriting sorts keys and reformats numbers, so only the names are compared.
    let names = |text: &str| -> BTreeSet<String> {
        open(text)
            .plan
            .unwrap()
            .workloads
            .iter()
            .flat_map(|w| w.routes.iter().map(|r| r.name.clone()))
            .collect()
    };
    assert_eq!(names(&compact), names(&text));
    assert!(open(&compact).usable());
}
