//! The plan document: the wording of every refusal, the round trip, and hostile input.
//!
//! Witness: RFC 8259 for what JSON is, through serde_json as another reader of the same text; the rest is the
//! document's own contract, held as fixtures beside this file.
#![allow(clippy::unwrap_used, clippy::panic, reason = "functions shared by tests stand outside them")]

mod generator;
mod hostile;
mod round_trip;
mod schema;
mod wording;

use std::path::PathBuf;

/// A file beside this one.
fn beside(name: &str) -> PathBuf {
    PathBuf::from(env!("CARGO_MANIFEST_DIR")).join("plan").join(name)
}

fn harbour() -> String {
    std::fs::read_to_string(beside("harbour.json")).unwrap()
}

/// Compares a text with a file that is kept beside the tests, or writes the file when UPDATE is set.
fn same_as_kept(name: &str, text: &str) {
    let path = beside(name);
    if std::env::var_os("UPDATE").is_some() {
        std::fs::write(&path, text).unwrap();
    }
    let kept = std::fs::read_to_string(&path).unwrap_or_default();
    for (number, (now, before)) in text.lines().zip(kept.lines()).enumerate() {
        assert_eq!(now, before, "{name}, line {}; UPDATE=1 writes the file anew", number + 1);
    }
    assert_eq!(text.len(), kept.len(), "{name} has lines more or fewer; UPDATE=1 writes the file anew");
}
