//! Pictograms and signal words from hazard statements.
//!
//! Witness: `labels.csv`, derived from the same statements by an independent program; the statements' own standing
//! is in the table, and the five solvents seen in public copies of CLP Annex VI are checked apart. Precedence: CLP
//! Article 26(1), read in full copies of the article.
use super::table::{Row, rows};
use thimbleworth::hazard::{Label, SignalWord, label};

const LABELS: &str = include_str!("labels.csv");

fn of(row: &Row) -> Label {
    label(&row["statements"].split_whitespace().collect::<Vec<_>>())
}

#[test]
fn every_substance_gets_its_pictograms_and_word() {
    let table = rows(LABELS);
    assert_eq!(table.len(), 67);
    for row in table {
        let found = of(&row);
        let codes: Vec<_> = found.pictograms.iter().map(|p| p.code()).collect();
        assert_eq!(codes.join(" "), row["pictograms"], "{}", row["name"]);
        assert_eq!(found.signal_word.word(), row["signal_word"], "{}", row["name"]);
        assert!(found.unknown.is_empty(), "{}: {:?}", row["name"], found.unknown);
    }
}

/// Analytical Eco-Scale: number of pictograms times Danger 2, Warning 1 (structure seen in secondary sources).
#[test]
fn eco_scale_points_follow_from_the_label() {
    for row in rows(LABELS) {
        let found = of(&row);
        let word = match found.signal_word {
            SignalWord::None => 0,
            SignalWord::Warning => 1,
            SignalWord::Danger => 2,
        };
        assert_eq!((found.pictograms.len() * word).to_string(), row["eco_scale_points"], "{}", row["name"]);
    }
}

/// Pictograms and signal words printed in public copies of CLP Annex VI, as recollected: from memory.
#[test]
fn harmonised_entries() {
    let printed = [
        ("toluene", "GHS02 GHS07 GHS08", "Danger"),
        ("benzene", "GHS02 GHS07 GHS08", "Danger"),
        ("acetone", "GHS02 GHS07", "Danger"),
        ("ethanol", "GHS02", "Danger"),
        ("NMP", "GHS07 GHS08", "Danger"),
        ("methanol", "GHS02 GHS06 GHS08", "Danger"),
        ("dichloromethane", "GHS08", "Warning"),
    ];
    let table = rows(LABELS);
    for (name, pictograms, word) in printed {
        let found = of(table.iter().find(|r| r["name"] == name).expect(name));
        let codes: Vec<_> = found.pictograms.iter().map(|p| p.code()).collect();
        assert_eq!((codes.join(" ").as_str(), found.signal_word.word()), (pictograms, word), "{name}");
    }
}

/// The usual supplier's label carries more than the harmonised minimum, and scores more (statements from memory).
#[test]
fn usual_supplier_labels_score_more() {
    let points = |statements: &[&str]| {
        let found = label(statements);
        found.pictograms.len() * if found.signal_word == SignalWord::Danger { 2 } else { 1 }
    };
    assert_eq!((points(&["H351"]), points(&["H315", "H319", "H336", "H351"])), (1, 2));
    assert_eq!((points(&["H225"]), points(&["H225", "H319"])), (2, 4));
}
