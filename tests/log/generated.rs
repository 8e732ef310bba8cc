//! Large files, made as they are read: sums against whole numbers, memory against a limit.

use super::{harbour, names};
use thimbleworth::log::{Reader, Reading};

const MATERIALS: [&str; 4] = ["acetone", "n-hexane", "methanol", "toluene"];

/// A ledger of whole grams: row `i` buys `i mod 997 + 1` g of material `i mod 4` in month `i mod 12`, and every
/// hundredth row takes as much back.
fn row(i: u64) -> (String, usize, i64) {
    let grams = i64::try_from(i % 997 + 1).unwrap() * if i % 100 == 99 { -1 } else { 1 };
    let material = usize::try_from(i % 4).unwrap();
    let text = format!("{},{},2026-{:02}-{:02},PO{i}\n", MATERIALS[material], grams, i % 12 + 1, i % 28 + 1);
    (text, material, grams)
}

#[test]
fn sums_of_many_rows_are_those_of_whole_numbers() {
    const ROWS: u64 = 200_000;
    let mut reader = Reader::new("ledger.csv", names(&harbour()), &[]);
    reader.feed(b"Item,Amount (g),Order date,Order\n");
    let mut expected = [0_i64; 4];
    let mut text = String::new();
    for i in 0..ROWS {
        let (line, material, grams) = row(i);
        expected[material] += grams;
        text.push_str(&line);
        if text.len() > 5000 {
            reader.feed(text.as_bytes());
            text.clear();
        }
    }
    reader.feed(text.as_bytes());
    let (reading, names, remarks) = reader.finish();
    let reading = reading.unwrap();
    assert_eq!((reading.rows.used, reading.rows.refused, remarks.len()), (ROWS, 0, 0));
    for (name, grams) in MATERIALS.iter().zip(expected) {
        let at = names.materials.iter().position(|m| m.name == *name).unwrap();
        let sum = reading.tally.over(&|k| usize::from(k.material) == at);
        let expected_kg = grams as f64 / 1000.0;
        assert!((sum.kg - expected_kg).abs() < 1e-9 * expected_kg, "{name}: {} {expected_kg}", sum.kg);
        assert_eq!(sum.rows, ROWS / 4);
    }
    assert_eq!(reading.tally.by(|k| k.month).len(), 12);
    assert_eq!(reading.tally.over(&|_| true).negative, ROWS / 100);
}

/// Feeds copies of a piece until so many bytes are in.
fn flood(head: &[u8], piece: &[u8], bytes: u64) -> (Reading, u64) {
    let mut reader = Reader::new("ledger.csv", names(&harbour()), &[]);
    reader.feed(head);
    let mut refused = 0;
    while reader.bytes() < bytes {
        reader.feed(piece);
        refused += reader.take_remarks().iter().filter(|r| r.refused()).count() as u64;
    }
    let (reading, _, rest) = reader.finish();
    refused += rest.iter().filter(|r| r.refused()).count() as u64;
    (reading.unwrap(), refused)
}

#[test]
fn two_hundred_megabytes_stay_below_two_hundred_megabytes() {
    const BYTES: u64 = 200_000_000;
    let mut piece = String::new();
    for i in 0..2000 {
        piece.push_str(&row(i).0);
        if i % 10 == 0 {
            piece.push_str("unobtainium,5,2026-01-01,x\n");
        }
    }
    let mut found = None;
    let used = allocation_counter::measure(|| {
        found = Some(flood(b"Item,Amount (g),Order date,Order\n", piece.as_bytes(), BYTES));
    });
    let (reading, refused) = found.unwrap();
    assert_eq!(refused, reading.rows.refused);
    assert!(reading.rows.used > 5_000_000 && reading.rows.refused > 500_000, "{:?}", reading.rows);
    assert!(used.bytes_max < 200_000_000, "{} bytes at most", used.bytes_max);
    // The search for equal rows has its limit, and says so.
    assert!(reading.tally.compared < reading.rows.used);
}

#[test]
fn names_that_never_repeat_and_quotes_that_never_close_fill_no_memory() {
    let mut piece = String::new();
    for i in 0..20_000 {
        piece.push_str(&format!("name{i},5,2026-01-01,\"x\nname{i}y,\"5,2026-01-01,x\n"));
    }
    let mut found = None;
    let used = allocation_counter::measure(|| {
        found = Some(flood(b"Item,Amount (g),Order date,Order\n", piece.as_bytes(), 10_000_000));
    });
    let (reading, refused) = found.unwrap();
    assert_eq!((reading.rows.used, refused), (0, reading.rows.refused));
    assert!(used.bytes_max < 100_000_000, "{} bytes at most", used.bytes_max);
}
