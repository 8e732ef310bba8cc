//! The table `reading.toml`: what is written, and what is understood or why it is refused.

use thimbleworth::quantity::{Entry, Kind, ShareBy, Spread, read, read_entry};
use toml::Table;

fn kind(name: &str) -> Option<Kind> {
    Kind::ALL.into_iter().find(|kind| format!("{kind:?}") == name)
}

fn text<'a>(row: &'a Table, key: &str) -> Option<&'a str> {
    row.get(key).and_then(toml::Value::as_str)
}

fn number(row: &Table, key: &str) -> Option<f64> {
    row.get(key).and_then(toml::Value::as_float)
}

#[test]
fn every_row_of_the_table() {
    let table: Table = include_str!("reading.toml").parse().unwrap();
    let rows = table["read"].as_array().unwrap();
    assert_eq!(rows.len(), 126, "the table has its rows");
    let known =
        ["text", "kind", "si", "low", "high", "u", "share", "currency", "understood", "witness", "error"];
    let mut wrong = Vec::new();
    for row in rows {
        let row = row.as_table().unwrap();
        assert!(row.keys().all(|key| known.contains(&key.as_str())), "{row:?}");
        for number in ["si", "low", "high", "u"] {
            assert!(row.get(number).is_none_or(toml::Value::is_float), "{row:?}");
        }
        let written = text(row, "text").unwrap();
        let kind = kind(text(row, "kind").unwrap()).unwrap();
        match (read(written, kind), text(row, "error")) {
            (Err(error), Some(wording)) if error.to_string() == wording => {}
            (Err(error), _) => wrong.push(format!("“{written}”: {error}")),
            (Ok(amount), Some(_)) => wrong.push(format!("“{written}” was read: {}", amount.understood())),
            (Ok(amount), None) => {
                let spread = match (number(row, "low"), number(row, "high"), number(row, "u")) {
                    (None, None, None) => Spread::Exact,
                    (Some(low_si), Some(high_si), None) => Spread::Limits { low_si, high_si },
                    (None, None, Some(u_si)) => Spread::Standard { u_si },
                    other => panic!("“{written}” in the table: {other:?}"),
                };
                let share = match text(row, "share") {
                    Some("Volume") => ShareBy::Volume,
                    Some("Mass") => ShareBy::Mass,
                    _ => ShareBy::Unstated,
                };
                let expected = (number(row, "si").unwrap(), spread, share, text(row, "currency"));
                let currency = amount.currency.map(|currency| currency.to_string());
                let got = (amount.central_si, amount.spread, amount.share_by, currency.as_deref());
                if got != expected {
                    wrong.push(format!("“{written}”: {got:?}, not {expected:?}"));
                }
                if let Some(words) = text(row, "understood").filter(|words| *words != amount.understood()) {
                    wrong
                        .push(format!("“{written}”: understood as “{}”, not “{words}”", amount.understood()));
                }
                assert_eq!(amount.text, written.trim());
            }
        }
    }
    assert!(wrong.is_empty(), "{}", wrong.join("\n"));
}

#[test]
fn not_known_is_not_absent() {
    assert_eq!(read_entry(" Not known ", Kind::Mass), Ok(Entry::NotKnown));
    assert!(matches!(read_entry("5 g", Kind::Mass), Ok(Entry::Known(amount)) if amount.central_si == 0.005));
    assert!(read_entry("", Kind::Mass).is_err());
    assert!(read_entry("unknown", Kind::Mass).is_err());
}

#[test]
fn the_place_of_an_error_is_counted_in_characters() {
    for (written, kind, at) in [
        ("250 ± 5 furlongs", Kind::Volume, 8),
        ("  1,234 mL", Kind::Volume, 2),
        ("\u{2212}5 °C ± 1,234 K", Kind::Temperature, 8),
        ("12 USD to 22 EUR", Kind::Money, 10),
        ("250 mL ± 5", Kind::Volume, 10),
    ] {
        assert_eq!(read(written, kind).unwrap_err().at(), Some(at), "{written}");
    }
}
