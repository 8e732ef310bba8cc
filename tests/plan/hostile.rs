//! Input that was cut, damaged or made to hurt.

use std::fmt::Write as _;

use thimbleworth::plan::{open, open_bytes, save};

use super::generator::Chance;
use super::harbour;

#[test]
fn a_plan_cut_short_anywhere_is_refused_with_one_sentence() {
    let text = harbour();
    let bytes = text.trim_end().as_bytes();
    for end in 0..bytes.len() {
        let opened = open_bytes(&bytes[..end]);
        assert!(!opened.usable() && opened.plan.is_none(), "cut at {end}");
        assert_eq!(opened.problems.len(), 1, "cut at {end}");
    }
    assert!(open_bytes(bytes).usable());
}

#[test]
fn damaged_bytes_never_panic_and_a_plan_that_still_opens_is_what_it_says() {
    let text = harbour();
    let mut chance = Chance(2);
    let value = |text: &str| serde_json::from_str::<serde_json::Value>(text).ok();
    let (mut usable, mut shown, mut refused) = (0, 0, 0);
    for _ in 0..8000 {
        let mut bytes = text.clone().into_bytes();
        for _ in 0..=chance.below(3) {
            let at = chance.below(bytes.len());
            match chance.below(3) {
                0 => bytes[at] ^= 1 << chance.below(8),
                1 => drop(bytes.remove(at)),
                _ => bytes.insert(at, b"{}[],:\"\\0-e. n"[chance.below(14)]),
            }
        }
        let opened = open_bytes(&bytes);
        let json = std::str::from_utf8(&bytes).ok().and_then(value);
        // What another reader takes for JSON is read as a tree: it is shown, or refused for its version.
        let version = opened.problems.iter().any(|problem| problem.path == "thimbleworth");
        assert_eq!(json.is_some(), opened.plan.is_some() || version, "{}", String::from_utf8_lossy(&bytes));
        match (&opened.plan, opened.usable()) {
            (Some(plan), true) => {
                usable += 1;
                assert_eq!(value(&save(plan)), json);
            }
            (Some(_), false) => shown += 1,
            (None, _) => refused += 1,
        }
    }
    // All three happened often.
    assert!(usable > 1000 && shown > 300 && refused > 1000, "{usable} {shown} {refused}");
}

#[test]
fn any_bytes_at_all_never_panic() {
    let mut chance = Chance(3);
    for _ in 0..20_000 {
        let bytes: Vec<u8> = (0..chance.below(40))
            .map(|_| {
                if chance.below(4) == 0 {
                    chance.next().to_le_bytes()[0]
                } else {
                    b"{}[],:\"\\u0-e.tn \n"[chance.below(17)]
                }
            })
            .collect();
        assert!(!open_bytes(&bytes).usable());
    }
}

/// A plan with this many steps, each with a note of this length.
fn large(steps: usize, note: usize) -> String {
    let mut out = String::from(
        r#"{ "thimbleworth": 1, "title": "Large", "site": { "name": "Mill", "streams": [] }, "workloads": [{
        "name": "w", "results_per_year": 10, "batch": { "samples": 5 }, "feed": { "soil": "1 g" }, "present": "A",
        "routes": [{ "name": "A", "steps": ["#,
    );
    let note = "é".repeat(note / 2);
    for step in 0..steps {
        let comma = if step > 0 { "," } else { "" };
        write!(
            out,
            r#"{comma} {{ "step": "rinse", "solvent": {{ "acetone": "50 %", "n-hexane": "50 %" }}, "charge": {step}.50, "note": "{note}" }}"#
        )
        .unwrap();
    }
    out.push_str("] }] }] }");
    out
}

#[test]
fn ten_thousand_steps_and_ten_megabytes_open_and_save() {
    for (steps, note) in [(10_000, 10), (10_000, 1000), (10, 1_000_000)] {
        let text = large(steps, note);
        let opened = open(&text);
        assert_eq!(opened.problems, []);
        let plan = opened.plan.unwrap();
        assert_eq!(plan.workloads[0].routes[0].steps.len(), steps);
        assert_eq!(open(&save(&plan)).plan, Some(plan));
    }
}

#[test]
fn of_a_great_many_errors_the_first_thousand_are_listed() {
    let text = large(20_000, 4);
    let every_step = text.replace("\"charge\"", "\"charge\": null, \"per\": 3, \"charge\"");
    let many: String = (0..200_000).map(|i| format!("\"titl{i}\": 1,")).collect();
    let unknown_keys = text.replacen('{', &format!("{{ {many}"), 1);
    for text in [every_step, unknown_keys] {
        let opened = open(&text);
        assert_eq!(opened.problems.len(), 1001);
        assert!(
            !opened.problems[999].path.is_empty()
                && opened.problems[1000].found.starts_with("there are more than these")
        );
        // The plan itself is read to its end all the same.
        assert_eq!(opened.plan.unwrap().workloads[0].routes[0].steps.len(), 20_000);
    }
    let one_each = large(1000, 4).replace("\"charge\"", "\"per\": 3, \"charge\"");
    assert_eq!(open(&one_each).problems.len(), 1000);
}

#[test]
fn endless_keys_names_and_nesting_stay_small_in_what_is_said() {
    let endless = "k".repeat(1_000_000);
    let many: String = (0..2000).map(|i| format!("\"{i}\": null,")).collect();
    let start = r#""thimbleworth": 1, "site": {}"#;
    for text in [
        format!(r#"{{ {start}, "{endless}": 1 }}"#),
        format!(r#"{{ {start}, "materials": {{ "{endless}": {{ {many} "x": "y" }} }} }}"#),
        format!(r#"{{ {start}, "title": ["{endless}"], "notes": {} }}"#, "7".repeat(1_000_000)),
        format!(
            r#"{{ {start}, "workloads": [{{ "present": "{endless}", "routes": [{{ "name": "{endless}x" }}] }}] }}"#
        ),
        "{\"a\":".repeat(1_000_000),
        "[".repeat(10_000_000),
    ] {
        let said: usize =
            open(&text).problems.iter().map(|p| p.path.len() + p.found.len() + p.need.len()).sum();
        assert!(said < 2_000_000, "{said} bytes for {}…", &text[..60]);
    }
}
