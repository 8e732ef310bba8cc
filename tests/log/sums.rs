//! Sums by material, month, quarter, stream and container, and the work of a preparation log, counted by hand.

use super::{harbour, names, read};
use thimbleworth::log::{Mapping, Reader, guess, mappings};
use thimbleworth::plan::{open, save};

#[test]
fn consignments_by_stream_month_and_container() {
    let text = "Ship date\tWaste stream\tDrum\tNet weight (lb)\n\
        2026-01-31\tflammable\tD1\t10\n2026-02-01\tflammable\tD1\t20\n2026-04-01\tsolids\tD2\t5\n\
        2026-04-02\tsolids\tD2\t-1\n";
    let (reading, names, remarks) = read("waste.tsv", text.as_bytes());
    assert_eq!(remarks, []);
    // 1 lb = 0.453 592 37 kg (NIST SP 811).
    const LB: f64 = 0.453_592_37;
    let kg = |sum: &thimbleworth::log::Sum| (sum.kg / LB * 1e6).round() / 1e6;
    let months: Vec<f64> = reading.tally.by(|k| k.month).values().map(kg).collect();
    assert_eq!(months, [10.0, 20.0, 4.0]);
    let quarters: Vec<f64> = reading.tally.by(|k| k.month / 3).values().map(kg).collect();
    assert_eq!(quarters, [30.0, 4.0]);
    let streams: Vec<(&str, f64)> = reading
        .tally
        .by(|k| k.stream)
        .iter()
        .map(|(s, sum)| (names.streams[usize::from(*s)].as_str(), kg(sum)))
        .collect();
    assert_eq!(streams, [("flammable", 30.0), ("solids", 4.0)]);
    let containers: Vec<(&str, f64, u64)> =
        reading.tally.containers.iter().map(|(c, sum)| (c.as_str(), kg(sum), sum.rows)).collect();
    assert_eq!(containers, [("D1", 30.0, 2), ("D2", 4.0, 2)]);
    // March has no row.
    assert_eq!(reading.tally.empty_months(), [2026 * 12 + 2]);
}

#[test]
fn a_log_counts_extractions_controls_repeats_and_batches() {
    let text = "Batch,Prep date,Method,QC type,Re-extract\n\
        B1,2026-01-30,Soxhlet,Sample,\nB1,2026-01-30,Soxhlet,Sample,\nB1,2026-01-30,Soxhlet,MB,\n\
        B2,2026-01-31,Soxhlet,Sample,yes\nB2,2026-02-01,Soxhlet,LCS,\nB3,2026-02-02,Ultrasonic,Sample,no\n";
    let (reading, names, _) = read("prep.csv", text.as_bytes());
    let done: Vec<(u16, &str, f64, f64, f64, u64)> = reading
        .tally
        .done
        .iter()
        .map(|(key, d)| {
            let (month, label) = (key.month, names.routes[usize::from(key.material)].label.as_str());
            (month % 12 + 1, label, d.extractions, d.controls, d.repeats, d.batches)
        })
        .collect();
    assert_eq!(
        done,
        [
            (1, "PAH in sediment / Soxhlet", 4.0, 1.0, 1.0, 2),
            (2, "PAH in sediment / Soxhlet", 1.0, 1.0, 0.0, 0),
            (2, "PAH in sediment / Ultrasonic", 1.0, 0.0, 0.0, 1),
        ]
    );
}

#[test]
fn a_mapping_that_the_plan_keeps_reads_the_next_file_with_its_columns_shuffled() {
    let account = harbour();
    let mut plan = account.plan.clone().unwrap();
    // Headings that no guess would understand.
    let mapping = Mapping {
        means: vec![("K-17".into(), "acetone".into())],
        ..guess("purchases", &["Date", "Solvent", "Volume (mL)"]).unwrap()
    };
    let mut kept = mapping.kept();
    for (entry, heading) in kept.columns.iter_mut().zip(["When", "Ware", "How much"]) {
        heading.clone_into(&mut entry.0);
    }
    kept.decimals = Some("comma".into());
    plan.logs = vec![kept];
    let again = open(&save(&plan)).plan.unwrap();
    let mut problems = Vec::new();
    let known = mappings(&again, &mut problems);
    assert_eq!(problems, []);
    let mut reader = Reader::new("other.csv", names(&account), &known);
    reader.feed(b"Ware;X;How much;When\nK-17;;1.234;2026-01-05\n");
    let (reading, names, _) = reader.finish();
    let reading = reading.unwrap();
    // 1.234 mL with decimal commas are 1234 mL.
    let sum = reading.tally.over(&|_| true);
    let density = names.materials[0].density_kg_m3.unwrap().0;
    assert!((sum.kg - 1.234e-3 * density).abs() < 1e-12, "{sum:?}");
    assert_eq!(reading.mapping.columns[3].1.text(), "date");
}
