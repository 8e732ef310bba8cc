//! Time of a density, and its ratio to the equation evaluated term by term.
//!
//! The term-by-term solver is a secant method that is handed two starts within 1 % of the root, so the ratio is on the
//! low side. The least of many short passes is taken, which a busy machine disturbs least; ratios are the safe figures.
// A broken table or a refused state should stop the measurement.
#![allow(clippy::unwrap_used, clippy::panic)]

#[path = "../co2/naive.rs"]
#[allow(dead_code)]
mod naive;
#[path = "../co2/table.rs"]
#[allow(dead_code)]
mod table;

use std::hint::black_box;
use std::time::Instant;
use thimbleworth::co2;

const STATES: u32 = 60;
const PASSES: u32 = 1000;

/// Nanoseconds a call, least of the passes.
fn time(points: &[(f64, f64)], passes: u32, mut call: impl FnMut(f64, f64) -> f64) -> f64 {
    let mut least = f64::INFINITY;
    for _ in 0..passes {
        let start = Instant::now();
        for &(t, p) in points {
            black_box(call(black_box(t), black_box(p)));
        }
        least = least.min(start.elapsed().as_secs_f64());
    }
    least / f64::from(STATES) * 1e9
}

/// The density by a secant method in ln p over ln ρ.
fn term_by_term(equation: &naive::Equation, t: f64, p: f64, near: f64) -> f64 {
    let off = |x: f64| (equation.pressure_pa(t, x.exp()) / p).ln();
    let (mut a, mut b) = ((0.99 * near).ln(), (1.005 * near).ln());
    let (mut fa, mut fb) = (off(a), off(b));
    for _ in 0..20 {
        if (b - a).abs() < 1e-9 || fa == fb {
            break;
        }
        let c = b - fb * (b - a) / (fb - fa);
        (a, fa) = (b, fb);
        b = c;
        fb = off(b);
    }
    b.exp()
}

fn main() {
    let equation = naive::Equation::read();
    let mut x = 0x1234_5678_9abc_def1_u64;
    let mut uniform = || {
        x ^= x << 13;
        x ^= x >> 7;
        x ^= x << 17;
        f64::from(u32::try_from(x >> 32).unwrap()) / f64::from(u32::MAX)
    };
    println!("{:<34}{:>9}{:>9}{:>14}{:>8}", "ns a call", "density", "state", "term by term", "ratio");
    for (name, t, p) in [
        ("extraction, 0-120 C, 10-600 bar", (273.15, 393.15), (1e6, 60e6)),
        ("supercritical, 32-120 C", (305.15, 393.15), (7.5e6, 60e6)),
        ("liquid, 0-27 C, 70-600 bar", (273.15, 300.15), (7e6, 60e6)),
        ("gas, 0-127 C, 1-30 bar", (273.15, 400.15), (1e5, 3e6)),
        ("near critical, 27-42 C, 70-90 bar", (300.15, 315.15), (7e6, 9e6)),
    ] {
        let points: Vec<_> =
            (0..STATES).map(|_| (t.0 + (t.1 - t.0) * uniform(), p.0 + (p.1 - p.0) * uniform())).collect();
        for &(t, p) in &points {
            let density = co2::density_kg_m3(t, p).unwrap();
            let slow = term_by_term(&equation, t, p, density);
            assert!((slow / density - 1.0).abs() < 1e-8, "{t} K, {p} Pa: {density} and {slow}");
        }
        let density = time(&points, PASSES, |t, p| co2::density_kg_m3(t, p).unwrap());
        let state = time(&points, PASSES, |t, p| co2::state(t, p).unwrap().enthalpy_j_kg);
        let densities: Vec<_> = points.iter().map(|&(t, p)| co2::density_kg_m3(t, p).unwrap()).collect();
        let mut n = 0;
        let slow = time(&points, PASSES / 4, |t, p| {
            n = (n + 1) % densities.len();
            term_by_term(&equation, t, p, densities[(n + densities.len() - 1) % densities.len()])
        });
        println!("{name:<34}{density:>9.0}{state:>9.0}{slow:>14.0}{:>8.1}", slow / density);
    }
}
