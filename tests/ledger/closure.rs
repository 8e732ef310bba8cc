//! Replay of the trace: nothing overdrawn, the bench empty, the book closed; in the single run and in every draw.

use super::generator::{Style, plan_of};
use super::{routes, sound};
use thimbleworth::account::evaluate;
use thimbleworth::chance::Draw;
use thimbleworth::ledger::{Direction, Material, Place, Posting, StepIx, Trace};
use thimbleworth::program::{Desk, RouteProgram};

const PLANS: u64 = 120;
const STYLE: Style = Style { uncertain: true, by_the_year: true, ..Style::PLAIN };

/// A bench and an outside kept by nothing but the postings.
struct Replay {
    materials: usize,
    bench: Vec<f64>,
    /// kg a year into places outside less out of them.
    outside: Vec<f64>,
}

fn places() -> usize {
    Place::stream(2).unwrap().index() + 1
}

impl Replay {
    fn of(route: &RouteProgram, trace: &Trace, desk: &Desk) -> Self {
        let materials = route.materials.len();
        let empty = vec![0.0; places() * materials];
        let mut replay = Self { materials, bench: empty.clone(), outside: empty };
        let runs = |step: StepIx, last: f64| match step {
            StepIx::Opening => desk.runs.extractions,
            StepIx::Step(i) => desk.runs.of(route.steps[i as usize].basis),
            StepIx::Closing => last,
        };
        let mut now = 0.0;
        let mut order: Vec<StepIx> = (0..route.steps.len()).map(|i| StepIx::Step(i as u16)).collect();
        order.insert(route.taken_in.map_or(0, |(i, _)| i), StepIx::Opening);
        order.push(StepIx::Closing);
        for step in order {
            let next = runs(step, now);
            if now > 0.0 && next < now {
                replay.bench.iter_mut().for_each(|kg| *kg *= now / next);
            }
            now = next;
            for p in trace.postings.iter().filter(|p| p.step == step) {
                assert_eq!(p.runs_a_year.to_bits(), now.to_bits(), "{p:?}");
                replay.post(p);
            }
        }
        replay
    }

    fn post(&mut self, p: &Posting) {
        assert!(p.kg >= 0.0 && p.kg.is_finite(), "{p:?}");
        for (place, sign) in [(p.from, -1.0), (p.to, 1.0)] {
            let i = place.index() * self.materials + p.material.0 as usize;
            if place.on_bench() {
                self.bench[i] += sign * p.kg;
                assert!(self.bench[i] >= 0.0, "overdrawn by {p:?}: {}", self.bench[i]);
            } else {
                self.outside[i] += sign * p.kg_a_year();
            }
        }
    }
}

fn check(route: &RouteProgram, trace: &Trace, desk: &Desk) {
    let replay = Replay::of(route, trace, desk);
    for (i, kg) in replay.bench.iter().enumerate() {
        assert!(*kg == 0.0, "{kg} kg left on the bench in cell {i}");
    }
    let (mut came, mut imbalance) = (0.0, 0.0);
    for m in 0..replay.materials {
        let material = Material(m as u16);
        let (mut sum, mut in_kg) = (0.0, 0.0);
        for place in 0..places() {
            sum += replay.outside[place * replay.materials + m];
        }
        for place in [Place::FEED, Place::STORE] {
            in_kg += desk.cells.passed(place, Direction::OutOf, material);
        }
        // Material by material: 1e-12 of what came in.
        assert!(sum.abs() <= 1e-12 * in_kg, "{}: {sum} of {in_kg}", route.materials[m].name);
        came += in_kg;
        imbalance += sum;
    }
    assert!(came > 0.0 && imbalance.abs() <= 1e-12 * came);
}

#[test]
fn the_book_closes_and_the_bench_ends_empty() {
    let (mut postings, mut gathered) = (0, 0);
    for seed in 0..PLANS {
        let account = sound(&plan_of(seed, Style { uncertain: false, ..STYLE }));
        for (route, found) in routes(&account) {
            let (x, mut desk) = (route.central(), route.desk());
            route.run(Draw(&x), &mut desk, None).unwrap();
            check(route, &found.trace, &desk);
            assert!(found.closure.abs() <= 1e-12, "{seed} {}: {}", route.name, found.closure);
            postings += found.trace.postings.len();
            gathered += usize::from(desk.runs.batches < desk.runs.extractions);
        }
    }
    assert!(postings > 10_000 && gathered > 100, "{postings} {gathered}");
}

/// The keys of a run: who moved what from where to where by which rule.
fn keys(trace: &Trace) -> Vec<(StepIx, u8, Place, Place, u16, bool)> {
    trace.postings.iter().map(|p| (p.step, p.rule.0, p.from, p.to, p.material.0, p.measured)).collect()
}

#[test]
fn a_hundred_draws_have_one_sequence_of_postings_and_all_close() {
    for seed in 0..PLANS / 3 {
        let account = sound(&plan_of(seed, STYLE));
        for (route, found) in routes(&account) {
            let expected = keys(&found.trace);
            let (mut x, mut desk) = (route.central(), route.desk());
            for draw in 0..100 {
                route.draw_into(7, draw, &mut x);
                let mut trace = Trace::default();
                route
                    .run(Draw(&x), &mut desk, Some(&mut trace))
                    .unwrap_or_else(|e| panic!("{seed} {draw}: {e:?}"));
                assert!(keys(&trace) == expected, "{seed} {} {draw}", route.name);
                check(route, &trace, &desk);
            }
        }
    }
}

/// A thousand draws of an uncertain plan: all close, no figure is negative or without value, and they differ.
#[test]
fn a_thousand_draws_close() {
    let account = sound(&plan_of(4, STYLE));
    for (route, found) in routes(&account) {
        let (mut x, mut desk) = (route.central(), route.desk());
        let mut values = vec![0.0; found.figures.len()];
        let total = found.figures.iter().position(|f| f.id == "mass.in").unwrap();
        let (mut low, mut high) = (f64::INFINITY, 0.0_f64);
        for draw in 0..1000 {
            route.draw_into(11, draw, &mut x);
            route.run(Draw(&x), &mut desk, None).unwrap();
            let (mut came, mut left) = (0.0, 0.0);
            for m in 0..route.materials.len() {
                let m = Material(m as u16);
                came += desk.cells.passed(Place::FEED, Direction::OutOf, m)
                    + desk.cells.passed(Place::STORE, Direction::OutOf, m);
                let elsewhere =
                    Place::OUTSIDE.into_iter().chain((0..route.streams).filter_map(Place::stream));
                left += elsewhere.fold(0.0, |sum, p| sum + desk.cells.passed(p, Direction::Into, m));
            }
            assert!((came - left).abs() <= 1e-12 * came, "{draw}: {came} {left}");
            evaluate(&found.figures, &desk, Draw(&x), &mut values);
            assert!(values.iter().all(|v| v.is_finite() && *v >= 0.0));
            (low, high) = (low.min(values[total]), high.max(values[total]));
        }
        assert!(high > 1.001 * low, "{low} {high}");
    }
}

/// The sampled run and the traced run are one code path: the same bits.
#[test]
fn a_trace_changes_nothing() {
    for seed in 0..20 {
        let account = sound(&plan_of(seed, STYLE));
        for (route, _) in routes(&account) {
            let (mut x, mut with, mut without) = (route.central(), route.desk(), route.desk());
            route.draw_into(3, seed, &mut x);
            route.run(Draw(&x), &mut with, Some(&mut Trace::default())).unwrap();
            route.run(Draw(&x), &mut without, None).unwrap();
            assert_eq!(format!("{with:?}"), format!("{without:?}"));
        }
    }
}
