//! How long a sampled run takes: `cargo bench -p thimbleworth-tests --bench odds`.
//!
//! Where a Python with NumPy is found (`PYTHON` names another one than `python3`), the same plan is drawn by `odds.py` in the
//! same run: the same draws of the same model, whole columns at a time. Its means and deviations have to agree with ours,
//! and the ratio of the times is printed. The times are judged by nobody: load on a machine is no fault of the code.
#![allow(clippy::unwrap_used, clippy::panic, reason = "a program for people who measure")]

use serde_json::{Map, Value, json};
use std::io::Write;
use std::process::{Command, Stdio};
use std::time::Instant;
use thimbleworth::account::{Account, Figure, account_text};
use thimbleworth::example::example;
use thimbleworth::material::catalogue;
use thimbleworth::mixture::{PairLaw, find_pair};
use thimbleworth::odds::{MOST_CELLS, Reading, Sampled, Wish, headline};
use thimbleworth::quantity::Spread;

const DRAWS: u32 = 100_000;
/// Means agree to this share of the mean, deviations to ten times it of the deviation: both sides evaporate by steps, and not by the same.
const AGREEMENT: f64 = 5e-4;
const LIQUIDS: [&str; 5] = ["n-hexane", "acetone", "n-heptane", "methanol", "water"];

/// Seconds that this thread has spent on a processor, where the system tells (Linux); else seconds gone by.
fn seconds(start: Instant) -> f64 {
    let told = std::fs::read_to_string("/proc/thread-self/schedstat").ok();
    let ns = told.and_then(|text| text.split(' ').next()?.parse::<f64>().ok());
    ns.map_or_else(|| start.elapsed().as_secs_f64(), |ns| ns * 1e-9)
}

fn run(account: &Account, wanted: &dyn Fn(&Figure) -> bool) -> (Sampled, f64) {
    let start = Instant::now();
    let before = seconds(start);
    let mut sampled = Sampled::default();
    sampled.follow(account, Wish { draws: DRAWS, most_cells: MOST_CELLS, wanted });
    while sampled.advance(account, 1000) > 0 {}
    let drawn = seconds(start) - before;
    assert_eq!(sampled.draws(), DRAWS, "the columns do not fit");
    (sampled, drawn)
}

fn main() {
    if cfg!(debug_assertions) {
        println!("not optimised: these times mean nothing");
    }
    let account = account_text(example("harbour-sediment").unwrap().text);
    let (mut best, mut read) = (f64::INFINITY, f64::INFINITY);
    for _ in 0..3 {
        let (sampled, drawn) = run(&account, &headline);
        let start = Instant::now();
        let before = seconds(start);
        let reading = Reading::new(&account, &sampled, 0, 0.95).unwrap();
        for id in reading.ids() {
            let figure = reading.figure(id).unwrap();
            std::hint::black_box(&figure);
            std::hint::black_box(reading.matters(id, 3, Some(0)));
        }
        let here = seconds(start) - before;
        (best, read) = (best.min(drawn), read.min(here));
    }
    println!("{DRAWS} draws of 4 routes: {best:.3} s to draw, {read:.3} s to read all figures drawn");
    beside_numpy(&account, best);
}

/// What `odds.py` reads.
fn given(account: &Account) -> Value {
    let program = account.program.as_ref().unwrap();
    let routes: Vec<Value> = program.workloads[0]
        .routes
        .iter()
        .map(|route| {
            let input = |i: &thimbleworth::chance::Input| {
                let (low, high) = match i.spread {
                    Spread::Limits { low_si, high_si } => (Some(low_si), Some(high_si)),
                    Spread::Exact => (None, None),
                    Spread::Standard { .. } => panic!("the plan has limits alone"),
                };
                json!({ "identity": i.identity, "key": i.key, "central": i.central_si, "low": low, "high": high })
            };
            Value::Array(route.inputs.iter().map(input).collect())
        })
        .collect();
    let mut materials = Map::new();
    let mut pairs = Vec::new();
    for (i, name) in LIQUIDS.iter().enumerate() {
        let s = catalogue().find(name).unwrap();
        let pure = |t: f64| s.vapour_pressure.value(t, &s.name, "vapour pressure").unwrap();
        materials.insert((*name).to_owned(), json!({ "molar_mass": s.molar_mass_kg_mol.as_ref().unwrap().value,
            "co2": s.stoichiometric_co2_kg_kg(), "pure": { "293.15": pure(293.15), "308.15": pure(308.15) } }));
        for other in &LIQUIDS[..i] {
            if let Some(PairLaw::Wilson(w)) = find_pair(other, name).map(|p| p.law) {
                pairs.push(json!([other, name, w.a12, w.b12_k, w.a21, w.b21_k]));
            }
        }
    }
    json!({ "seed": program.seed, "draws": DRAWS, "routes": routes, "materials": materials, "pairs": pairs })
}

fn beside_numpy(account: &Account, ours: f64) {
    let script = concat!(env!("CARGO_MANIFEST_DIR"), "/bench/odds.py");
    let python = std::env::var("PYTHON").unwrap_or_else(|_| "python3".to_owned());
    let child = Command::new(&python).arg(script).stdin(Stdio::piped()).stdout(Stdio::piped()).spawn();
    let Ok(mut child) = child else {
        println!("not compared: no {python} can be started");
        return;
    };
    // A child that has gone says so by its status.
    let _ = child.stdin.take().unwrap().write_all(given(account).to_string().as_bytes());
    let out = child.wait_with_output().unwrap();
    let Ok(theirs) = serde_json::from_slice::<Value>(&out.stdout) else {
        println!("not compared: {python} has no NumPy, or {script} failed ({})", out.status);
        return;
    };
    let compared = |f: &Figure| theirs["routes"].as_array().unwrap().iter().any(|r| r.get(&f.id).is_some());
    let (sampled, _) = run(account, &compared);
    let names = &account.program.as_ref().unwrap().workloads[0].routes;
    let (mut farthest, mut count) = (0.0_f64, 0);
    for (r, figures) in theirs["routes"].as_array().unwrap().iter().enumerate() {
        for (id, said) in figures.as_object().unwrap() {
            let Some(here) = sampled.route(0, r).unwrap().summary(id, 0.95) else { continue };
            let (mean, u) = (said[0].as_f64().unwrap(), said[1].as_f64().unwrap());
            let off = if mean == here.mean { 0.0 } else { (mean / here.mean - 1.0).abs() };
            let spread = if here.u > 1e-9 * here.mean.abs() { (u / here.u - 1.0).abs() / 10.0 } else { 0.0 };
            assert!(
                off < AGREEMENT && spread < AGREEMENT,
                "{} of {}: NumPy says {mean} (u {u}), we say {} (u {})",
                id,
                names[r].name,
                here.mean,
                here.u
            );
            farthest = farthest.max(off);
            count += 1;
        }
    }
    assert!(count > 30, "only {count} figures were compared");
    let seconds = theirs["seconds"].as_f64().unwrap();
    println!(
        "NumPy {}, the same draws of the same model by columns, one thread: {seconds:.3} s, {:.1} times as long; {count} means agree to {farthest:.1e}",
        theirs["numpy"].as_str().unwrap(),
        seconds / ours
    );
}
