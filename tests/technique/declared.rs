//! What a technique declares, against what it asks for, what its texts read as, and the folder it lives in.
//!
//! Witness: the declarations against the code that uses them; no published value.

use super::{plan_of_example, sound};
use std::collections::BTreeSet;
use thimbleworth::plan::{Field, Step, below, open};
use thimbleworth::program::asked;
use thimbleworth::quantity::{Kind, Spread, read};
use thimbleworth::step::{Control, Need, Param, TECHNIQUES, Technique};

fn example_step(t: &Technique) -> Step {
    let opened = open(&plan_of_example(t));
    let plan = opened.plan.unwrap();
    let steps = &plan.workloads[0].routes[0].steps;
    steps.iter().find(|s| s.technique == t.key).unwrap().clone()
}

#[test]
fn a_technique_asks_for_exactly_what_it_declares() {
    for t in TECHNIQUES {
        let declared: BTreeSet<&str> = t.params.iter().map(|p| p.key).collect();
        // Whatever the step says: nothing at all, and the example.
        for step in [Step { technique: t.key.into(), ..Step::default() }, example_step(t)] {
            let (keys, _) = asked(t, &step);
            let asked: BTreeSet<&str> = keys.iter().copied().collect();
            assert_eq!(asked, declared, "{}", t.key);
        }
    }
}

#[test]
fn an_empty_step_is_told_of_every_required_parameter_that_applies_and_of_nothing_twice() {
    for t in TECHNIQUES {
        let (_, problems) = asked(t, &Step { technique: t.key.into(), ..Step::default() });
        for p in t.params.iter().filter(|p| p.need == Need::Required && p.shown_when.is_none()) {
            let at = below("step", p.key);
            assert_eq!(problems.iter().filter(|q| q.path == at).count(), 1, "{} {at}: {problems:#?}", t.key);
        }
    }
}

#[test]
fn a_key_that_is_not_declared_is_refused_with_the_nearest_one() {
    for t in TECHNIQUES {
        let first = t.params[0].key;
        let wrong = format!("{first}z");
        let step = Step {
            technique: t.key.into(),
            fields: vec![(wrong.clone(), Field::Text("1".into()))],
            ..Step::default()
        };
        let (_, problems) = asked(t, &step);
        let at = below("step", &wrong);
        let found = problems.iter().find(|p| p.path == at).unwrap();
        assert!(found.need.contains(first), "{found:?}");
    }
}

#[test]
fn every_example_reads_without_an_error_and_runs() {
    for t in TECHNIQUES {
        let account = sound(&plan_of_example(t));
        let route = account.workloads[0].routes[0].as_ref().unwrap();
        assert!(route.closure.abs() < 1e-12, "{}", t.key);
        // An example is one that people will copy: nothing in it is unusual.
        for problem in &account.problems {
            assert!(!problem.found.contains("unusual"), "{}: {problem:?}", t.key);
        }
    }
}

#[test]
fn every_parameter_says_what_it_is_and_where_its_range_comes_from() {
    for t in TECHNIQUES {
        for p in t.params {
            let at = format!("{}.{}", t.key, p.key);
            assert!(!p.label.is_empty() && p.hint.ends_with('.'), "{at}: \"{}\"", p.hint);
            assert!(!p.source.cite.is_empty(), "{at}");
            assert!(p.physical.0 <= p.physical.1 && p.usual.0 <= p.usual.1, "{at}");
            assert!(p.physical.0 <= p.usual.0 || p.usual.0.is_infinite(), "{at}");
            assert!(p.usual.1 <= p.physical.1 || p.usual.1.is_infinite(), "{at}");
            if let Control::Quantity(kind) = p.control {
                let finite = p.physical.0.is_finite() && p.physical.1.is_finite();
                assert!(finite, "{at}: an amount of {kind:?} has no bounds");
            }
            if let Some((on, values)) = p.shown_when {
                let other = t.params.iter().find(|q| q.key == on).unwrap();
                let Control::Choice(words) = other.control else { panic!("{at} hangs on {on}, no choice") };
                assert!(!values.is_empty() && values.iter().all(|v| words.contains(v)), "{at}");
            }
            for other in [p.with, p.without].into_iter().flatten() {
                let other = t.params.iter().find(|q| q.key == other).unwrap();
                assert!(other.need == Need::Optional && other.key != p.key, "{at}");
                assert!(p.need != Need::Required, "{at}: the schema knows no such condition");
            }
        }
    }
}

/// Where a range is stated as usual, the source says where it comes from; what the site enters has none.
#[test]
fn a_usual_range_has_a_source_of_its_own() {
    use thimbleworth::source::Standing;
    for t in TECHNIQUES {
        for p in t.params.iter().filter(|p| p.usual.0.is_finite() || p.usual.1.is_finite()) {
            assert!(
                !matches!(p.source.standing, Standing::Site),
                "{}.{} calls a range usual on the word of the site",
                t.key,
                p.key
            );
        }
    }
}

fn within(p: &Param, kind: Kind, text: &str) -> bool {
    let amount = read(text, kind).unwrap_or_else(|e| panic!("{} = {text}: {e}", p.key));
    let (low, high) = match amount.spread {
        Spread::Limits { low_si, high_si } => (low_si, high_si),
        Spread::Exact | Spread::Standard { .. } => (amount.central_si, amount.central_si),
    };
    let inside = |(a, b): (f64, f64)| low >= a && high <= b;
    inside(p.physical) && inside(p.usual)
}

#[test]
fn every_default_reads_and_lies_within_its_own_bounds() {
    let mut seen = 0;
    for t in TECHNIQUES {
        for p in t.params {
            let Need::Default(text, source) = p.need else { continue };
            seen += 1;
            let at = format!("{}.{}", t.key, p.key);
            assert!(!source.cite.is_empty(), "{at}");
            match p.control {
                Control::Quantity(kind) => assert!(within(p, kind, text), "{at} = {text}"),
                Control::Choice(words) => assert!(words.contains(&text), "{at} = {text}"),
                Control::Count => {
                    let n = f64::from(text.parse::<u32>().unwrap());
                    assert!(n >= p.usual.0 && n <= p.usual.1, "{at} = {text}");
                }
                Control::YesNo => assert!(["true", "false"].contains(&text), "{at} = {text}"),
                Control::Place => {
                    assert!(thimbleworth::ledger::Place::named(text).is_some(), "{at} = {text}");
                }
                Control::Material => {
                    assert!(thimbleworth::material::catalogue().find(text).is_ok(), "{at} = {text}");
                }
                Control::Mixture | Control::PerMaterial(_) | Control::PerStream(_) | Control::Text => {
                    panic!("{at}: no default makes sense")
                }
            }
        }
    }
    assert!(seen > 25, "{seen}");
}

/// A key stands in a path, as an id in a page and as a column of a table.
fn plain(key: &str, also: char) -> bool {
    key.starts_with(|c: char| c.is_ascii_lowercase())
        && key.chars().all(|c| c.is_ascii_lowercase() || c.is_ascii_digit() || c == also)
}

#[test]
fn keys_are_plain_and_unique() {
    let reserved = ["step", "per", "measured", "note"];
    let mut techniques = BTreeSet::new();
    for t in TECHNIQUES {
        assert!(plain(t.key, '-') && techniques.insert(t.key), "{}", t.key);
        assert!(!t.title.is_empty() && t.about.ends_with('.') && !t.about.contains("  "), "{}", t.key);
        let (mut keys, mut names) = (BTreeSet::new(), BTreeSet::new());
        for p in t.params {
            assert!(plain(p.key, '_') && keys.insert(p.key), "{}.{}", t.key, p.key);
            assert!(!reserved.contains(&p.key), "{}.{}", t.key, p.key);
        }
        for rule in t.rules {
            assert!(!rule.name.is_empty() && names.insert(rule.name), "{}: {}", t.key, rule.name);
            assert!(!rule.equation.is_empty() && !rule.source.cite.is_empty(), "{}: {}", t.key, rule.name);
        }
        for caution in t.cautions {
            assert!(caution.text.ends_with('.') && !caution.key.is_empty(), "{}", caution.key);
        }
    }
}

/// The files of the folder, read as text: whoever declares a technique is in the list.
#[test]
fn every_file_that_declares_a_technique_is_registered() {
    let folder = std::path::Path::new(env!("CARGO_MANIFEST_DIR")).join("../core/src/step");
    let mut declared = BTreeSet::new();
    for entry in std::fs::read_dir(&folder).unwrap() {
        let path = entry.unwrap().path();
        let file = if path.is_dir() { path.join("mod.rs") } else { path.clone() };
        let text = std::fs::read_to_string(&file).unwrap();
        if let Some((_, after)) = text.split_once("static TECHNIQUE: Technique = Technique {") {
            let key = after.split('"').nth(1).unwrap().to_owned();
            assert!(after.trim_start().starts_with("key:"), "{}", file.display());
            let stem = path.file_stem().unwrap().to_str().unwrap().replace('_', "-");
            assert_eq!(stem, key, "the file is named after the technique");
            declared.insert(key);
        }
    }
    let registered: BTreeSet<String> = TECHNIQUES.iter().map(|t| t.key.to_owned()).collect();
    assert_eq!(declared, registered);
}
