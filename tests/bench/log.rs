//! How long a million rows take: `cargo bench -p thimbleworth-tests --bench log`.
//!
//! A preparation log and a purchase ledger of 1,000,000 rows each are made, read, classified and summed, here and by the
//! data-frame library `polars` (`bench/log.py`), in turns in one run; the sums have to agree. Where Python has no polars
//! (`PYTHON` names another one), our own time is told alone. It judges nothing: load on a machine is no fault of the code.
#![allow(clippy::unwrap_used, clippy::panic, reason = "a program for people who measure")]

use serde_json::Value;
use std::fmt::Write as _;
use std::fs;
use std::io::Read;
use std::path::Path;
use std::process::Command;
use std::time::Instant;
use thimbleworth::account::{Account, account_text};
use thimbleworth::example::EXAMPLES;
use thimbleworth::log::{Names, Reader, Reading};

const ROWS: u64 = 1_000_000;
const ROUNDS: usize = 5;
const MATERIALS: [(&str, &str); 6] = [
    ("acetone", "67-64-1"),
    ("n-hexane", "110-54-3"),
    ("dichloromethane", "75-09-2"),
    ("methanol", "67-56-1"),
    ("toluene", "108-88-3"),
    ("ethyl acetate", "141-78-6"),
];
const ROUTES: [&str; 4] = ["Soxhlet", "Ultrasonic", "Pressurised liquid", "Supercritical CO2"];
const TYPES: [&str; 5] = ["Sample", "Sample", "Sample", "MB", "LCS"];

/// Seconds that this process has spent on processors, where the system tells (Linux); else seconds gone by.
fn seconds(start: Instant) -> f64 {
    let told = fs::read_to_string("/proc/thread-self/schedstat").ok();
    let ns = told.and_then(|text| text.split(' ').next()?.parse::<f64>().ok());
    ns.map_or_else(|| start.elapsed().as_secs_f64(), |ns| ns * 1e-9)
}

fn date(i: u64) -> String {
    // Rows in the order of time, as logs are.
    let day = i * 365 / ROWS;
    format!("2026-{:02}-{:02}", day / 31 + 1, day % 31 % 28 + 1)
}

fn preparation() -> String {
    let mut text = String::from("Prep date,Batch,Method,Matrix,QC type,Re-extract,Analyst\n");
    for i in 0..ROWS {
        let batch = i / 17;
        let again = if i % 33 == 0 { "yes" } else { "" };
        let (method, kind) = (ROUTES[(batch % 4) as usize], TYPES[(i % 5) as usize]);
        let _ = writeln!(text, "{},B{batch:06},{method},sediment,{kind},{again},KL", date(i));
    }
    text
}

fn purchases() -> String {
    let mut text = String::from("Order date,Item,CAS No.,Amount,Unit,Supplier\n");
    for i in 0..ROWS {
        let (name, cas) = MATERIALS[(i % 6) as usize];
        let sign = if i % 100 == 7 { "-" } else { "" };
        let (amount, unit) = if i % 2 == 0 { (i % 25 + 1, "L") } else { (i % 9973 + 1, "g") };
        let _ = writeln!(text, "{},{name},{cas},{sign}{amount}.{},{unit},Invented Ltd", date(i), i % 10);
    }
    text
}

fn read(path: &Path, account: &Account) -> (Reading, Names) {
    let names = Names::of(account.plan.as_ref().unwrap(), account.program.as_ref().unwrap());
    let mut reader = Reader::new(&path.file_name().unwrap().to_string_lossy(), names, &[]);
    let mut file = fs::File::open(path).unwrap();
    let mut piece = vec![0; 256 * 1024];
    loop {
        let count = file.read(&mut piece).unwrap();
        if count == 0 {
            break;
        }
        reader.feed(&piece[..count]);
        drop(reader.take_remarks());
    }
    let (reading, names, _) = reader.finish();
    (reading.unwrap(), names)
}

/// Our sums, under the keys of the script.
fn sums(reading: &Reading, names: &Names) -> Vec<(String, f64)> {
    let mut out: Vec<(String, f64)> = Vec::new();
    for (key, sum) in &reading.tally.sums {
        let name = &names.materials[usize::from(key.material)].name;
        out.push((format!("{}-{:02} {name}", key.month / 12, key.month % 12 + 1), sum.kg));
    }
    for (key, done) in &reading.tally.done {
        let (month, route) = (key.month, key.material);
        let route = names.routes[usize::from(route)].label.rsplit(" / ").next().unwrap().to_owned();
        let at = format!("{}-{:02} {route}", month / 12, month % 12 + 1);
        out.push((format!("{at} extractions"), done.extractions));
        out.push((format!("{at} controls"), done.controls));
        out.push((format!("{at} repeats"), done.repeats));
    }
    out.sort_by(|a, b| a.0.cmp(&b.0));
    out
}

fn main() {
    if cfg!(debug_assertions) {
        println!("not optimised: these times mean nothing");
    }
    let folder = Path::new(env!("CARGO_TARGET_TMPDIR")).join("bench-log");
    fs::create_dir_all(&folder).unwrap();
    let python = std::env::var("PYTHON").unwrap_or_else(|_| "python3".into());
    let script = Path::new(env!("CARGO_MANIFEST_DIR")).join("bench/log.py");
    let has = Command::new(&python).args(["-c", "import polars"]).output().is_ok_and(|o| o.status.success());
    let account = account_text(EXAMPLES[0].text);
    for (name, text) in [("prep.csv", preparation()), ("purchases.csv", purchases())] {
        let path = folder.join(name);
        fs::write(&path, &text).unwrap();
        println!("{name}: {ROWS} rows, {} bytes", text.len());
        drop(text);
        let mut best = [f64::INFINITY; 3];
        let mut ours = Vec::new();
        let mut theirs: Vec<(String, f64)> = Vec::new();
        for _ in 0..ROUNDS {
            let start = Instant::now();
            let before = seconds(start);
            let (reading, names) = read(&path, &account);
            let took = seconds(start) - before;
            assert_eq!((reading.rows.used, reading.rows.refused), (ROWS, 0));
            ours = sums(&reading, &names);
            best[0] = if took < best[0] { took } else { best[0] };
            if has {
                let densities: Vec<String> = names
                    .materials
                    .iter()
                    .filter_map(|m| Some(format!("{}={}", m.name, m.density_kg_m3?.0)))
                    .collect();
                let done = Command::new(&python).arg(&script).arg(&path).args(&densities).output().unwrap();
                let out = String::from_utf8(done.stdout).unwrap();
                let told: Value = serde_json::from_str(&out)
                    .unwrap_or_else(|e| panic!("{e}: {}", String::from_utf8_lossy(&done.stderr)));
                for (slot, key) in [(1, "cpu_seconds"), (2, "wall_seconds")] {
                    let took = told[key].as_f64().unwrap();
                    best[slot] = if took < best[slot] { took } else { best[slot] };
                }
                theirs = told["sums"]
                    .as_object()
                    .unwrap()
                    .iter()
                    .map(|(key, value)| (key.clone(), value.as_f64().unwrap()))
                    .collect();
                theirs.sort_by(|a, b| a.0.cmp(&b.0));
            }
        }
        println!("  ours, one thread: {:.3} s of processor, {:.2} of the 2 s wanted", best[0], best[0] / 2.0);
        if !has {
            println!("  {python} has no polars: nothing to compare with");
            continue;
        }
        assert_eq!(ours.len(), theirs.len());
        for ((key, a), (other, b)) in ours.iter().zip(&theirs) {
            assert_eq!(key, other);
            assert!((a - b).abs() <= 1e-9 * b.abs(), "{key}: {a} {b}");
        }
        println!("  {} sums agree with those of polars to 1e-9", ours.len());
        println!(
            "  polars, all threads: {:.3} s of processor, {:.3} s by the clock; ours is {:.2} of its processor time and {:.2} of its clock",
            best[1],
            best[2],
            best[0] / best[1],
            best[0] / best[2]
        );
    }
    let mut most = 0;
    for name in ["prep.csv", "purchases.csv"] {
        let used = allocation_counter::measure(|| drop(read(&folder.join(name), &account)));
        most = if used.bytes_max > most { used.bytes_max } else { most };
    }
    println!("memory at most: {:.0} MB of the 200 MB wanted", most as f64 / 1e6);
}
