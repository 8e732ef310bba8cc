//! Figures: identities between them, sums, bases, and the account against the pure functions of `metric::mass`.
//!
//! Witness: the definitions of the metrics; `metric::mass` is written without the book, and the masses handed to it here
//! are summed from the trace.

use super::generator::{Style, Writer, plan, plan_of, plan_with_product};
use super::{routes, sound};
use serde_json::json;
use thimbleworth::account::{Contribution, Figure, How, Measure, RouteAccount, behind};
use thimbleworth::ledger::Place;
use thimbleworth::material::Class;
use thimbleworth::metric::{Inputs, mass};
use thimbleworth::program::RouteProgram;

const SEEDS: u64 = 80;

fn close(a: f64, b: f64, what: &str) {
    assert!((a - b).abs() <= 1e-12 * (a.abs() + b.abs()), "{what}: {a} {b}");
}

fn value(account: &RouteAccount, id: &str) -> f64 {
    account.value(id).unwrap_or_else(|| panic!("no figure {id}"))
}

/// The masses of a year, summed from the trace.
fn inputs(route: &RouteProgram, account: &RouteAccount) -> Inputs {
    let mut i = Inputs::default();
    let mut waste_kg = 0.0;
    for p in &account.trace.postings {
        let (class, kg) = (route.materials[p.material.0 as usize].substance.class, p.kg_a_year());
        let water = class == Class::Water;
        match p.from {
            Place::FEED if water => i.water_kg += kg,
            Place::FEED => i.raw_materials_kg += kg,
            Place::STORE => match class {
                Class::Solvent | Class::Gas => i.solvents_charged_kg += kg,
                Class::Water => i.water_kg += kg,
                _ => i.reagents_kg += kg,
            },
            // What filling pushes out of a container was counted when it came there.
            from if from.stream_index().is_some() && !water => waste_kg -= kg,
            _ => {}
        }
        match p.to {
            Place::STORE if !water => i.solvents_reused_kg += kg,
            Place::STORE => i.water_kg -= kg,
            Place::PRODUCT => i.product_kg += kg,
            Place::BY_PRODUCT => i.by_product_kg += kg,
            Place::HELD => {}
            to if !to.on_bench() && !water => waste_kg += kg,
            _ => {}
        }
    }
    i.waste_kg = Some(waste_kg);
    i
}

#[test]
fn metrics_keep_their_identities() {
    let mut recovering = 0;
    for seed in 0..SEEDS {
        let account = sound(&plan_with_product(seed, Style { by_the_year: seed % 2 == 0, ..Style::PLAIN }));
        let (_, a) = routes(&account).next().unwrap();
        let m = |id: &str| value(a, &format!("metric.{id}"));
        for which in ["gross", "net"] {
            // cE = PMI − 1, where both count water and solvents; gRME = 1 / PMI
            close(m(&format!("complete_e.{which}")), m(&format!("pmi.{which}")) - 1.0, "cE = PMI - 1");
            close(m(&format!("generalised_rme.{which}")), 1.0 / m(&format!("pmi.{which}")), "gRME = 1 / PMI");
            assert!(m(&format!("mass_intensity.{which}")) <= m(&format!("pmi.{which}")) * (1.0 + 1e-15));
        }
        assert!(m("pmi.net") <= m("pmi.gross") && m("e_factor.net") <= m("e_factor.gross"));
        recovering += usize::from(m("pmi.net") < m("pmi.gross"));
        close(value(a, "input.product"), a.product_kg, "product");
        close(a.per_kg_product(value(a, "input.gross")).unwrap(), m("pmi.gross"), "gross inputs for each kg");
        close(value(a, "input.gross"), value(a, "mass.in"), "all inputs are all mass in");
        close(
            value(a, "input.net"),
            value(a, "mass.feed") + value(a, "mass.bought"),
            "net inputs are feed and bought",
        );
    }
    assert!(recovering > 10, "{recovering}");
}

#[test]
fn the_account_agrees_with_the_pure_functions() {
    for seed in 0..SEEDS {
        let account = sound(&plan_with_product(seed, Style { by_the_year: seed % 2 == 0, ..Style::PLAIN }));
        let (route, a) = routes(&account).next().unwrap();
        let i = inputs(route, a);
        let m = |id: &str| value(a, &format!("metric.{id}"));
        close(m("pmi.gross"), mass::process_mass_intensity(&gross_water(route, a, i)).unwrap(), "PMI");
        close(m("pmi.net"), mass::process_mass_intensity_net(&i).unwrap(), "PMI net");
        close(m("complete_e.gross"), mass::complete_e_factor(&gross_water(route, a, i)).unwrap(), "cE");
        close(m("mass_intensity.gross"), mass::mass_intensity(&i).unwrap(), "MI");
        close(m("e_factor.net"), mass::e_factor(&i).unwrap(), "E");
        if i.raw_materials_kg + i.reagents_kg > i.product_kg {
            close(m("simple_e"), mass::simple_e_factor(&i).unwrap(), "sE");
        }
    }
}

/// Water that is returned to the store is not recovered solvent; gross counts it as drawn.
fn gross_water(route: &RouteProgram, account: &RouteAccount, mut i: Inputs) -> Inputs {
    for p in &account.trace.postings {
        let water = route.materials[p.material.0 as usize].substance.class == Class::Water;
        if water && p.to == Place::STORE {
            i.water_kg += p.kg_a_year();
        }
    }
    i
}

/// Without water and without stock the E-factor of what is posted as waste is that of the balance.
#[test]
fn waste_counted_is_waste_by_balance() {
    let mut seen = 0;
    for seed in 0..SEEDS {
        let mut plan = plan_with_product(seed, Style::PLAIN);
        let text = plan.to_string().replace("\"water\":", "\"sand\":").replace("\"held\"", "\"solids\"");
        plan = serde_json::from_str(&text).unwrap();
        let route = &mut plan["workloads"][0]["routes"][0];
        if route.to_string().contains("\"sand\":\"10 %\"") || route.to_string().contains("\"sand\":\"20 %\"")
        {
            continue;
        }
        let account = sound(&plan);
        let (route, a) = routes(&account).next().unwrap();
        let i = inputs(route, a);
        assert!(i.water_kg == 0.0);
        close(value(a, "metric.e_factor.net"), mass::e_factor_by_balance(&i).unwrap(), "E by balance");
        seen += 1;
    }
    assert!(seen > 20, "{seen}");
}

#[test]
fn sums_by_place_are_the_totals() {
    for seed in 0..SEEDS {
        let account = sound(&plan_of(seed, Style { by_the_year: true, ..Style::PLAIN }));
        for (_, a) in routes(&account) {
            let sum = |keep: &dyn Fn(&str) -> bool| {
                let kept = a.figures.iter().zip(&a.values).filter(|(f, _)| keep(&f.id));
                kept.fold(0.0, |sum, (_, v)| sum + v)
            };
            let parts = |id: &str| id.split('.').count();
            let places = sum(&|id| id.starts_with("mass.to.") && parts(id) == 3);
            let cells = sum(&|id| id.starts_with("mass.to.") && parts(id) == 4);
            let returned = sum(&|id| id.starts_with("mass.returned."));
            let drawn = sum(&|id| id.starts_with("mass.drawn."));
            close(places, cells, "places and their materials");
            close(value(a, "mass.in"), places + returned, "what came is what went");
            close(value(a, "mass.in"), value(a, "mass.feed") + drawn, "what came");
            close(value(a, "mass.bought"), drawn - returned, "bought = drawn - returned");
            close(value(a, "mass.feed"), sum(&|id| id.starts_with("mass.feed.")), "feed");
            let streams =
                sum(&|id| id.starts_with("waste.") && id.ends_with(".mass") && id != "waste.total.mass");
            close(value(a, "waste.total.mass"), streams, "waste");
            let in_streams = ["waste", "aqueous", "solids"]
                .iter()
                .fold(0.0, |s, p| s + a.value(&format!("mass.to.{p}")).unwrap_or(0.0));
            close(streams, in_streams, "waste is what lies in the streams");
            if let (Some(used), Some(vented)) = (a.value("co2.used"), a.value("co2.vented")) {
                let made_up = value(a, "co2.make_up");
                close(made_up, used - value(a, "co2.recycled"), "make-up");
                close(made_up, vented + value(a, "co2.carried_off"), "CO2 made up is CO2 lost");
            }
        }
    }
}

#[test]
fn a_figure_has_one_meaning_on_every_basis() {
    for seed in 0..10 {
        let account = sound(&plan_of(seed, Style::PLAIN));
        for (_, a) in routes(&account) {
            for (f, v) in a.figures.iter().zip(&a.values).filter(|(f, _)| f.measure.extensive()) {
                close(a.per_result(*v) * a.runs.results, *v, &f.id);
                close(a.per_batch(*v) * a.runs.batches, *v, &f.id);
            }
        }
    }
}

/// Every figure opens into postings that add up to it.
#[test]
fn what_is_behind_a_figure_adds_up_to_it() {
    let mut opened = 0;
    for seed in 0..30 {
        let account = sound(&plan_of(seed, Style { by_the_year: true, ..Style::PLAIN }));
        for (route, a) in routes(&account) {
            for (f, v) in a.figures.iter().zip(&a.values) {
                if matches!(f.how, How::Sum(_) | How::Spent(_)) {
                    let mut sum = 0.0;
                    let mut size = 0.0;
                    for c in behind(route, a, f) {
                        let (Contribution::Posting { amount_si, .. }
                        | Contribution::Spending { amount_si, .. }) = c;
                        sum += amount_si;
                        size += amount_si.abs();
                    }
                    assert!((sum - v).abs() <= 1e-12 * size, "{}: {sum} {v}", f.id);
                    opened += 1;
                }
            }
        }
    }
    assert!(opened > 1000, "{opened}");
}

fn ids(figures: &[Figure]) -> Vec<&str> {
    figures.iter().map(|f| f.id.as_str()).collect()
}

#[test]
fn ids_are_unique_and_every_figure_says_what_it_counts() {
    for seed in 0..SEEDS {
        for account in [sound(&plan_of(seed, Style::PLAIN)), sound(&plan_with_product(seed, Style::PLAIN))] {
            for (_, a) in routes(&account) {
                let mut all = ids(&a.figures);
                let count = all.len();
                all.sort_unstable();
                all.dedup();
                assert_eq!(all.len(), count);
                for f in &a.figures {
                    assert!(
                        !f.title.is_empty() && !f.boundary.is_empty() && !f.formula.is_empty(),
                        "{}",
                        f.id
                    );
                    assert!(!f.source.cite.is_empty() && !f.id.contains(' '), "{}", f.id);
                }
            }
        }
    }
}

#[test]
fn without_a_product_metrics_are_refused_with_the_reason_and_the_masses_are_given() {
    let account = sound(&plan_of(0, Style::PLAIN));
    for (_, a) in routes(&account) {
        assert!(a.product_kg == 0.0 && !a.figures.iter().any(|f| f.measure == Measure::Ratio));
        assert!(a.refusals.iter().any(|r| r.metrics.contains("PMI") && r.reason.contains("product")));
        assert!(a.value("input.gross").is_some() && a.value("input.net").is_some());
        assert!(a.per_kg_product(1.0).is_none());
    }
}

/// Containers are carried over through the year and rounded up once: n = ⌈V / (V_c · fill)⌉.
#[test]
fn containers_are_rounded_up_once() {
    let mut plan = plan(&[Writer::new(5, Style::PLAIN).route("A", false)], 5, Style::PLAIN);
    plan["workloads"][0]["routes"][0]["steps"] = json!([
        { "step": "consume", "material": "nitrile glove", "mass": "1 g", "to": "solids" },
        { "step": "rinse", "solvent": "acetone", "charge": "75 mL", "to": "waste", "loss": "0 %" }
    ]);
    plan["workloads"][0]["routes"][0]["feed"] = json!({});
    plan["workloads"][0]["batch"] = json!({ "samples": 1 });
    plan["workloads"][0]["repeats"] = json!("0 %");
    // 240 of 75 mL are 18 L: exactly one can of 20 L filled to 90 %; one more sample opens a second.
    for (results, cans) in [(1, 1.0), (240, 1.0), (241, 2.0), (480, 2.0), (481, 3.0)] {
        plan["workloads"][0]["results_per_year"] = json!(results);
        let account = sound(&plan);
        let (_, a) = routes(&account).next().unwrap();
        assert_eq!(value(a, "waste.waste.containers"), cans, "{results}");
        // A share is what one run fills, whatever the year is rounded up to: 75 mL of 18 L.
        let figure = a.figures.iter().find(|f| f.id == "waste.waste.containers").unwrap();
        close(a.per_result(a.shared(figure, cans)), 1.0 / 240.0, "a result's share of a container");
        close(value(a, "waste.waste.volume"), 75e-6 * f64::from(results), "volume");
    }
}
