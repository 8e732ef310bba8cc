//! What must not change a figure, and what must double it.

use super::generator::{Style, Writer, plan, plan_of};
use super::{routes, sound};
use serde_json::{Value, json};
use thimbleworth::account::{Measure, RouteAccount};
use thimbleworth::chance::Draw;

const SEEDS: u64 = 60;

fn bits(account: &RouteAccount) -> Vec<(String, u64)> {
    account.figures.iter().zip(&account.values).map(|(f, v)| (f.id.clone(), v.to_bits())).collect()
}

#[test]
fn twice_the_results_are_twice_the_mass() {
    for seed in 0..SEEDS {
        let once = sound(&plan_of(seed, Style::PLAIN));
        let twice = sound(&plan_of(seed, Style { results: 2 * Style::PLAIN.results, ..Style::PLAIN }));
        for ((_, a), (_, b)) in routes(&once).zip(routes(&twice)) {
            assert_eq!(a.figures.len(), b.figures.len());
            for ((figure, one), two) in a.figures.iter().zip(&a.values).zip(&b.values) {
                let expected = match figure.measure {
                    Measure::Containers => {
                        // Half-full containers: between one less than double and double.
                        assert!(*two <= 2.0 * one && *two >= 2.0 * one - 1.0, "{}: {one} {two}", figure.id);
                        continue;
                    }
                    Measure::Ratio => *one,
                    Measure::Mass | Measure::Volume | Measure::Energy | Measure::WeightedMass => 2.0 * one,
                    // These plans say nothing of time, money and climate.
                    other => panic!("{}: {other:?}", figure.id),
                };
                let slack = 1e-12 * expected.abs();
                assert!((two - expected).abs() <= slack, "{seed} {}: {one} {two}", figure.id);
            }
        }
    }
}

/// What happens once a year does so however much work there is.
#[test]
fn a_yearly_step_does_not_grow_with_the_work() {
    let style = Style { by_the_year: true, ..Style::PLAIN };
    let once = sound(&plan_of(1, style));
    let twice = sound(&plan_of(1, Style { results: 480, ..style }));
    for ((_, a), (_, b)) in routes(&once).zip(routes(&twice)) {
        for id in ["mass.drawn.activated-carbon", "mass.to.solids.activated-carbon"] {
            let (one, two) = (a.value(id).unwrap(), b.value(id).unwrap());
            assert!((one - two).abs() <= 1e-14 * one && one > 0.0, "{id}: {one} {two}");
        }
    }
}

#[test]
fn another_unit_for_the_same_amount_changes_nothing() {
    let mut texts_differ = 0;
    for seed in 0..SEEDS {
        let style = Style { uncertain: true, ..Style::PLAIN };
        let plain = plan_of(seed, style);
        let first = sound(&plain);
        for units in [1, 2] {
            let other = plan_of(seed, Style { units, ..style });
            texts_differ += usize::from(other != plain);
            let second = sound(&other);
            for ((route, a), (other, b)) in routes(&first).zip(routes(&second)) {
                assert_eq!(route.inputs.len(), other.inputs.len());
                for (i, j) in route.inputs.iter().zip(&other.inputs) {
                    let slack = 4e-16 * i.central_si.abs();
                    assert!(
                        (i.central_si - j.central_si).abs() <= slack,
                        "{}: {} {}",
                        i.identity,
                        i.basis,
                        j.basis
                    );
                }
                for ((figure, one), two) in a.figures.iter().zip(&a.values).zip(&b.values) {
                    assert!((one - two).abs() <= 1e-13 * one.abs(), "{seed} {}: {one} {two}", figure.id);
                }
            }
        }
    }
    assert_eq!(texts_differ as u64, 2 * SEEDS);
}

fn by_name<'a>(account: &'a thimbleworth::account::Account, name: &str) -> &'a RouteAccount {
    routes(account).find(|(route, _)| route.name == name).unwrap().1
}

/// Draw 5 of every figure of a route.
fn drawn(account: &thimbleworth::account::Account, name: &str) -> Vec<u64> {
    let (route, found) = routes(account).find(|(route, _)| route.name == name).unwrap();
    let (mut x, mut desk) = (route.central(), route.desk());
    route.draw_into(1, 5, &mut x);
    route.run(Draw(&x), &mut desk, None).unwrap();
    let mut values = vec![0.0; found.figures.len()];
    thimbleworth::account::evaluate(&found.figures, &desk, Draw(&x), &mut values);
    values.iter().map(|v| v.to_bits()).collect()
}

#[test]
fn the_order_of_the_routes_is_irrelevant_to_figures_and_draws() {
    let style = Style { uncertain: true, ..Style::PLAIN };
    for seed in 0..SEEDS {
        let forward = plan_of(seed, style);
        let mut backward = forward.clone();
        backward["workloads"][0]["routes"].as_array_mut().unwrap().reverse();
        let (a, b) = (sound(&forward), sound(&backward));
        for name in ["A", "B", "C"] {
            assert_eq!(bits(by_name(&a, name)), bits(by_name(&b, name)), "{seed} {name}");
            assert_eq!(drawn(&a, name), drawn(&b, name), "{seed} {name}");
        }
    }
}

#[test]
fn another_route_or_workload_leaves_the_others_as_they_were_to_the_bit() {
    let style = Style { uncertain: true, ..Style::PLAIN };
    for seed in 0..SEEDS {
        let before = plan_of(seed, style);
        let mut after = before.clone();
        let newcomer = Writer::new(seed + 1000, style).route("newcomer", false);
        after["workloads"][0]["routes"].as_array_mut().unwrap().insert(0, newcomer.clone());
        let mut other = plan(&[newcomer], seed, style)["workloads"][0].clone();
        other["name"] = json!("other work");
        after["workloads"].as_array_mut().unwrap().insert(0, other);
        let (a, b) = (sound(&before), sound(&after));
        for name in ["A", "B", "C"] {
            assert_eq!(bits(by_name(&a, name)), bits(by_name(&b, name)), "{seed} {name}");
            assert_eq!(drawn(&a, name), drawn(&b, name), "{seed} {name}");
        }
    }
}

/// A density belongs to the material: every route of every workload draws the same number.
#[test]
fn routes_share_what_they_share() {
    let account = sound(&plan_of(2, Style { uncertain: true, ..Style::PLAIN }));
    let mut shared = 0;
    let all: Vec<_> = routes(&account).map(|(route, _)| route).collect();
    for a in &all {
        for b in &all {
            for i in &a.inputs {
                for j in
                    b.inputs.iter().filter(|j| j.identity == i.identity && !j.identity.contains(".routes["))
                {
                    assert_eq!(i.draw(9, 17).to_bits(), j.draw(9, 17).to_bits());
                    shared += usize::from(a.name != b.name);
                }
            }
        }
    }
    assert!(shared > 20, "{shared}");
}

/// A sample done in two routes of one plan that differ in nothing gives one result.
#[test]
fn a_copied_route_has_the_same_figures() {
    let mut plan = plan_of(3, Style::PLAIN);
    let routes_of = plan["workloads"][0]["routes"].as_array_mut().unwrap();
    let mut copy: Value = routes_of[0].clone();
    copy["name"] = json!("copy");
    routes_of.push(copy);
    let account = sound(&plan);
    assert_eq!(bits(by_name(&account, "A")), bits(by_name(&account, "copy")));
}
