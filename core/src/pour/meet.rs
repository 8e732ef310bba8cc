//! What must not meet in one container, from `core/data/incompatible.csv`.

use super::check::Severity;
use crate::code::{is_halogenated, is_water};
use crate::material::table::Table;
use crate::material::{Class, Substance};
use std::sync::OnceLock;

const TABLE: Table = Table { name: "incompatible.csv", text: include_str!("../../data/incompatible.csv") };

/// Two or three groups that must not meet.
pub(super) struct Pair {
    groups: [&'static str; 3],
    pub(super) severity: Severity,
    pub(super) text: &'static str,
}

/// CAS numbers of groups that are told by their members; from memory, and not complete.
const MEMBERS: [(&str, &[&str]); 10] = [
    ("haloform", &["67-66-3", "75-25-2", "75-47-8"]),
    ("ketone", &["67-64-1", "78-93-3", "108-10-1", "108-94-1"]),
    ("base", &["1310-73-2", "1310-58-3", "1336-21-6", "121-44-8", "109-89-7"]),
    ("nitric acid", &["7697-37-2"]),
    ("peroxide", &["7722-84-1", "79-21-0"]),
    ("azide", &["26628-22-8"]),
    ("amine", &["121-44-8", "109-89-7", "1336-21-6", "110-86-1"]),
    ("metal", &["7440-23-5", "7440-09-7", "7439-93-2", "7429-90-5", "7439-95-4"]),
    ("cyanide", &["143-33-9", "151-50-8", "1313-82-2"]),
    ("hypochlorite", &["7681-52-9"]),
];

/// Acids of the catalogue.
const ACIDS: [&str; 6] = ["7647-01-0", "7664-93-9", "7697-37-2", "7664-38-2", "64-19-7", "64-18-6"];

pub(super) fn belongs(s: &Substance, group: &str) -> bool {
    let cas = s.cas.as_deref().unwrap_or("");
    match group {
        "organic" => matches!(s.class, Class::Solvent),
        "halogenated" => is_halogenated(s),
        "water" => is_water(s),
        "acid" => ACIDS.contains(&cas),
        _ => MEMBERS.iter().any(|(name, members)| *name == group && members.contains(&cas)),
    }
}

fn pairs() -> &'static [Pair] {
    static READ: OnceLock<Vec<Pair>> = OnceLock::new();
    READ.get_or_init(|| {
        let row = |[a, b, c, severity, text]: [&'static str; 5]| Pair {
            groups: [a, b, c],
            severity: if severity == "stop" { Severity::Stop } else { Severity::Ask },
            text,
        };
        let columns = ["a", "b", "c", "severity", "text"];
        TABLE.rows(columns, &mut Vec::new()).into_iter().map(row).collect()
    })
}

/// The pairs of which all groups are there, each met by a substance of its own, with the names of one from each.
pub(super) fn met<'a>(there: &[&'a Substance]) -> Vec<(&'static Pair, Vec<&'a str>)> {
    let mut out = Vec::new();
    for pair in pairs() {
        let mut names: Vec<&str> = Vec::new();
        let mut all = true;
        for group in pair.groups.iter().filter(|g| !g.is_empty()) {
            // One substance cannot react with itself: each group needs another one.
            match there.iter().find(|s| belongs(s, group) && !names.contains(&&*s.name)) {
                Some(s) => names.push(&s.name),
                None => all = false,
            }
        }
        if all {
            out.push((pair, names));
        }
    }
    out
}
