//! How long draws, openings and whole sites take: `cargo bench -p thimbleworth-tests --bench ledger`.
//!
//! `-- draws` stops after the draws. Prints each time and its ratio to what is wanted, and to a yardstick of plain arithmetic measured in the same run, so
//! that figures of different machines can be held side by side. It judges nothing: load on a machine is no fault of the code.
#![allow(clippy::unwrap_used, clippy::panic, reason = "a program for people who measure")]

use serde_json::{Value, json};
use std::hint::black_box;
use std::time::Instant;
use thimbleworth::account::{Account, account, account_text, evaluate};
use thimbleworth::chance::Draw;
use thimbleworth::plan::open;
use thimbleworth::program::resolve;

/// Seconds that this thread has spent on a processor, where the system tells (Linux); else seconds gone by. A busy machine
/// takes turns, and what others do in theirs is not what is measured.
fn seconds(start: Instant) -> f64 {
    let told = std::fs::read_to_string("/proc/thread-self/schedstat").ok();
    let ns = told.and_then(|text| text.split(' ').next()?.parse::<f64>().ok());
    ns.map_or_else(|| start.elapsed().as_secs_f64(), |ns| ns * 1e-9)
}

/// Nanoseconds of one call: the best of several rounds, each of about a tenth of a second.
fn ns(mut call: impl FnMut()) -> f64 {
    call();
    let start = Instant::now();
    call();
    let one = start.elapsed().as_secs_f64();
    let count = ((0.1 / one) as u64).clamp(1, 2_000_000);
    let mut best = f64::INFINITY;
    for _ in 0..7 {
        let before = seconds(start);
        for _ in 0..count {
            call();
        }
        best = best.min((seconds(start) - before) / count as f64);
    }
    best * 1e9
}

fn line(what: &str, ns: f64, wanted_ns: Option<f64>, yard_ns: f64) {
    let time = if ns < 1e4 {
        format!("{ns:.0} ns")
    } else if ns < 1e7 {
        format!("{:.1} µs", ns / 1e3)
    } else {
        format!("{:.1} ms", ns / 1e6)
    };
    let wanted = wanted_ns.map_or(String::new(), |w| format!("{:.2} of what is wanted", ns / w));
    println!("{what:<58} {time:>12}  {:>10.2} yards  {wanted}", ns / yard_ns);
}

/// By what a route extracts.
#[derive(Clone, Copy, PartialEq)]
enum By {
    Solvent,
    OpenCo2,
    ClosedCo2,
}

/// A route of eight steps over the bench, every amount with limits.
fn route(i: u64, by: By) -> Value {
    let solvent = json!({ "n-hexane": "50 %", "acetone": "50 %" });
    let extraction = match i {
        _ if by == By::ClosedCo2 => {
            json!({ "step": "supercritical", "temperature": "60 ± 1 °C", "pressure": "300 bar ± 3 bar", "vessel": "7 mL ± 2 %",
            "filler": "1 mL ± 5 %", "metered": "mass", "mass_flow": "2.3 g/min ± 2 %", "time": "40 min ± 1 %",
            "circuit": "recycled", "leak": "0.5 % ± 0.2 %", "chill": "5 ± 2 °C", "separator_temperature": "25 ± 1 °C",
            "separator_pressure": "50 bar ± 1 bar", "let_down_temperature": "40 ± 2 °C", "let_down_pressure": "55 bar ± 1 bar",
            "rinse": "n-heptane", "rinse_volume": "9 mL ± 5 %" })
        }
        _ if by == By::OpenCo2 => {
            json!({ "step": "supercritical", "temperature": "80 ± 1 °C", "pressure": "305 bar ± 3 bar", "vessel": "7 mL ± 2 %",
            "filler": "1 mL ± 5 %", "metered": "pump head", "flow": "2.5 mL/min ± 2 %", "meter_temperature": "4 ± 2 °C",
            "meter_pressure": "60 bar ± 1 bar", "time": "40 min ± 1 %", "rinse": "n-heptane", "rinse_volume": "9 mL ± 5 %" })
        }
        0 => {
            json!({ "step": "soxhlet", "solvent": solvent, "charge": "300 mL ± 5 mL", "time": "18 h ± 5 %", "heater": "250 W ± 10 %",
            "measured": { "condenser loss": "6 g ± 2 g" }, "hold_up": "1 mL/g ± 20 %" })
        }
        1 => {
            json!({ "step": "ultrasonic", "solvent": solvent, "charge": "100 mL ± 2 mL", "portions": 3, "time": "3 min ± 5 %",
            "power": "300 W ± 10 %", "loss": "2 % ± 1 %", "hold_up": "0.5 mL/g ± 20 %" })
        }
        2 => {
            json!({ "step": "pressurised-liquid", "solvent": solvent, "cell": "33 mL ± 1 %", "void": "50 % ± 5 %", "flush": "60 % ± 3 %",
            "lines": "5 mL ± 10 %", "dispersant": "diatomaceous earth", "dispersant_mass": "8 g ± 5 %", "time": "20 min ± 5 %",
            "power": "700 W ± 10 %", "loss": "5 % ± 2 %", "hold_up": "0.1 mL/g ± 20 %" })
        }
        _ => {
            json!({ "step": "soxhlet", "solvent": "ethyl acetate", "charge": "135 mL ± 5 mL", "time": "3 h ± 5 %", "heater": "350 W ± 10 %",
            "loss": "4 % ± 2 %", "hold_up": "1 mL/g ± 20 %" })
        }
    };
    json!({ "name": format!("route {i}"), "recovery": "90 %", "steps": [
        extraction,
        { "step": "discard", "from": "marc", "to": "solids" },
        { "step": "dry", "mass": "5 g ± 10 %", "hold_up": "0.2 mL/g ± 20 %", "to": "solids" },
        { "step": "concentrate", "by": "rotary evaporator", "to": "3 mL ± 10 %", "condensate": "store", "loss": "5 % ± 2 %",
          "time": "20 min ± 10 %", "power": "1.3 kW ± 10 %" },
        { "step": "rinse", "solvent": "acetone", "charge": "40 mL ± 10 %", "to": "flammable", "loss": "2 % ± 1 %" },
        { "step": "rinse", "solvent": solvent, "charge": "20 mL ± 10 %", "to": "liquor", "loss": "2 % ± 1 %" },
        { "step": "concentrate", "by": "nitrogen stream", "to": "1 mL ± 10 %", "gas_flow": "1 L/min ± 10 %", "time": "15 min ± 10 %" },
        { "step": "consume", "material": "cellulose thimble", "mass": "4.1 g ± 5 %", "to": "solids" }
    ], "ends": { "liquor": "flammable" } })
}

fn workload(name: &str, by: &[By]) -> Value {
    let routes: Vec<Value> = (0..4).zip(by).map(|(i, by)| route(i, *by)).collect();
    json!({ "name": name, "results_per_year": 1400, "batch": { "samples": 13, "controls": 4 }, "repeats": "3 % ± 1 %",
        "feed": { "sediment": "3 g ± 1 %" }, "present": "route 0", "routes": routes })
}

fn plan(workloads: &[Value]) -> String {
    json!({ "thimbleworth": 1, "title": "Time", "site": { "name": "Sandpiper Lock laboratory", "rules": "US", "as_of": "2026-12-01",
        "streams": [{ "name": "flammable", "container": "20 L" }, { "name": "solids", "holds": "solid", "container": "60 L" }] },
        "workloads": workloads })
    .to_string()
}

fn sound(text: &str) -> Account {
    let account = account_text(text);
    assert!(!account.broken(), "{:#?}", account.problems);
    account
}

fn draws(name: &str, text: &str, wanted_ns: Option<f64>, yard_ns: f64) {
    let account = sound(text);
    let routes = &account.program.as_ref().unwrap().workloads[0].routes;
    let found = &account.workloads[0].routes;
    let mut desks: Vec<_> = routes
        .iter()
        .zip(found)
        .map(|(r, a)| {
            (r, a.as_ref().unwrap(), r.central(), r.desk(), vec![0.0; a.as_ref().unwrap().figures.len()])
        })
        .collect();
    let (mut inputs, mut postings, mut figures) = (0, 0, 0);
    for (r, a, ..) in &desks {
        inputs += r.inputs.len();
        postings += a.trace.postings.len();
        figures += a.figures.len();
    }
    println!(
        "{name}: {} routes of {} steps, {inputs} inputs, {postings} postings, {figures} figures",
        routes.len(),
        routes[0].steps.len()
    );
    let mut count = 0_u64;
    let sampling = ns(|| {
        count += 1;
        for (r, _, x, ..) in &mut desks {
            r.draw_into(1, count, x);
        }
    });
    line("  sampling", sampling, None, yard_ns);
    let physics = ns(|| {
        for (r, _, x, desk, _) in &mut desks {
            r.run(Draw(x), desk, None).unwrap();
        }
    });
    line("  physics and postings", physics, None, yard_ns);
    let evaluation = ns(|| {
        for (_, a, x, desk, values) in &mut desks {
            evaluate(&a.figures, desk, Draw(x), values);
        }
        black_box(&desks);
    });
    line("  figures", evaluation, None, yard_ns);
    let all = ns(|| {
        count += 1;
        for (r, a, x, desk, values) in &mut desks {
            r.draw_into(1, count, x);
            r.run(Draw(x), desk, None).unwrap();
            evaluate(&a.figures, desk, Draw(x), values);
        }
        black_box(&desks);
    });
    line("  a draw, all of it", all, wanted_ns, yard_ns);
}

fn main() {
    if cfg!(debug_assertions) {
        println!("not optimised: these times mean nothing");
    }
    // The yardstick: 250 divisions and square roots, each waiting for the one before.
    let mut y = 2.0_f64;
    let yard_ns = ns(|| {
        for _ in 0..250 {
            y = (1.0 + 1.0 / y).sqrt();
        }
        black_box(y);
    });
    println!("a yard is {yard_ns:.0} ns");

    let bench = plan(&[workload("bench", &[By::Solvent; 4])]);
    let open_co2 = plan(&[workload("open", &[By::Solvent, By::Solvent, By::OpenCo2, By::OpenCo2])]);
    let closed_co2 = plan(&[workload("closed", &[By::Solvent, By::Solvent, By::ClosedCo2, By::ClosedCo2])]);
    draws("without CO2", &bench, Some(5e3), yard_ns);
    draws("two of four routes with open loops of CO2", &open_co2, Some(20e3), yard_ns);
    draws("two of four routes with closed loops of CO2", &closed_co2, Some(20e3), yard_ns);
    if std::env::args().any(|a| a == "draws") {
        return;
    }

    println!("from text, {} bytes", bench.len());
    line("  open", ns(|| drop(black_box(open(&bench)))), None, yard_ns);
    let opened = open(&bench).plan.unwrap();
    line("  resolve", ns(|| drop(black_box(resolve(&opened)))), None, yard_ns);
    line("  resolve and account", ns(|| drop(black_box(account(&opened)))), None, yard_ns);
    line("  open and account", ns(|| drop(black_box(account_text(&bench)))), Some(1e6), yard_ns);
    line(
        "  open and account, two routes with CO2",
        ns(|| drop(black_box(account_text(&open_co2)))),
        Some(1e6),
        yard_ns,
    );

    let names: Vec<String> = (0..1000).map(|i| format!("work {i}")).collect();
    let site = plan(
        &names
            .iter()
            .map(|name| workload(name, &[By::Solvent, By::Solvent, By::Solvent, By::OpenCo2]))
            .collect::<Vec<_>>(),
    );
    println!("a site of 1,000 workloads of 4 routes, {} bytes", site.len());
    line("  open", ns(|| drop(black_box(open(&site)))), None, yard_ns);
    // What is made is freed outside of the time: a command answers before it tidies up.
    let mut best = f64::INFINITY;
    for _ in 0..5 {
        let start = Instant::now();
        let before = seconds(start);
        let made = account_text(black_box(&site));
        best = best.min(seconds(start) - before);
        drop(made);
    }
    line("  open and account", best * 1e9, Some(0.5e9), yard_ns);
}
