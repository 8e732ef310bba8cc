//! The sampled run of a plan: shared inputs, edits, slices, draws that stop, and what is not known.

use super::near;
use serde_json::{Value, json};
use thimbleworth::account::{Account, account_text};
use thimbleworth::chance::{Draw, normal_quantile};
use thimbleworth::example::{EXAMPLES, example};
use thimbleworth::ledger::{Direction, Material, Place, StepIx};
use thimbleworth::odds::{MOST_CELLS, Reading, Sampled, Wish, headline};
use thimbleworth::quantity::{Origin, Spread};
use thimbleworth::report::stopped_words;

fn harbour() -> Value {
    serde_json::from_str(example("harbour-sediment").unwrap().text).unwrap()
}

fn sound(plan: &Value) -> Account {
    let account = account_text(&plan.to_string());
    assert!(!account.broken(), "{:#?}", account.problems);
    account
}

fn wish(draws: u32) -> Wish<'static> {
    Wish { draws, most_cells: MOST_CELLS, wanted: &headline }
}

fn sampled(account: &Account, draws: u32) -> Sampled {
    let mut sampled = Sampled::default();
    sampled.follow(account, wish(draws));
    while sampled.advance(account, 1000) > 0 {}
    sampled
}

/// Every number that the draws say of every figure of every route.
fn says(account: &Account, sampled: &Sampled) -> Vec<String> {
    let mut out = Vec::new();
    for w in 0..account.workloads.len() {
        let reading = Reading::new(account, sampled, w, 0.95).unwrap();
        for id in reading.ids() {
            out.push(format!("{:?}", reading.figure(id).unwrap()));
        }
    }
    out
}

/// The draws are those of the single run with other numbers put in: written out plainly here and compared to the bit.
#[test]
fn a_draw_is_a_run_with_other_numbers() {
    let account = sound(&harbour());
    let sampled = sampled(&account, 300);
    let routes = &account.program.as_ref().unwrap().workloads[0].routes;
    for (r, route) in routes.iter().enumerate() {
        let found = account.workloads[0].routes[r].as_ref().unwrap();
        let mut values = Vec::new();
        for draw in 0..300 {
            let x: Vec<f64> = route.inputs.iter().map(|i| i.draw(1, draw)).collect();
            let mut desk = route.desk();
            route.run(Draw(&x), &mut desk, None).unwrap();
            let mut all = vec![0.0; found.figures.len()];
            thimbleworth::account::evaluate(&found.figures, &desk, Draw(&x), &mut all);
            values.push(all[found.figures.iter().position(|f| f.id == "waste.total.mass").unwrap()]);
        }
        let plain = thimbleworth::chance::summary(&mut values, 0.95).unwrap();
        assert_eq!(sampled.route(0, r).unwrap().summary("waste.total.mass", 0.95), Some(plain));
    }
}

/// A gas stream that is too short in a draw goes on until the mark: the draw counts, with the longer time and its gas, and
/// is told. A plan whose own numbers ask for less than that is stopped.
#[test]
fn a_draw_in_which_the_gas_needs_longer_counts_and_is_told() {
    let text = example("water-laboratory").unwrap().text;
    let account = account_text(text);
    let run = sampled(&account, 1000);
    let routes = &account.program.as_ref().unwrap().workloads[1].routes;
    let (r, route) = routes.iter().enumerate().find(|(_, r)| r.name == "Solid-phase disk").unwrap();
    let columns = run.route(1, r).unwrap();
    assert!(columns.stopped().is_empty() && columns.stopped_share() == 0.0);
    assert!(columns.summary("waste.total.mass", 0.95).is_some());
    let [(step, longer)] = *columns.longer() else { panic!("{:?}", columns.longer()) };
    assert!((100..250).contains(&longer), "{longer}");
    let StepIx::Step(at) = step else { panic!() };
    assert_eq!(route.steps[usize::from(at)].technique.key, "concentrate");
    // By hand: 1.5 L/min of nitrogen over 45 min, or over more of them.
    let nitrogen = route.materials.iter().position(|m| m.name == "nitrogen").unwrap();
    let kg = 1.5e-3 / 60.0 * 2700.0 * 101_325.0 * 0.028_013_4 / (8.314_462_618 * 298.15);
    let (mut more, mut desk) = (0, route.desk());
    for draw in 0..1000 {
        let x: Vec<f64> = route.inputs.iter().map(|i| i.draw(1, draw)).collect();
        route.run(Draw(&x), &mut desk, None).unwrap();
        let m = Material(u16::try_from(nitrogen).unwrap());
        let drawn = desk.cells.passed(Place::STORE, Direction::OutOf, m) / desk.runs.extractions;
        assert!(drawn > kg * (1.0 - 1e-12), "{drawn} {kg}");
        assert_eq!(drawn > kg * (1.0 + 1e-9), desk.longer != 0, "{drawn} {kg}");
        more += u32::from(desk.longer != 0);
    }
    assert_eq!(more, longer);
    let said = stopped_words(
        &account.program.as_ref().unwrap().workloads[1],
        &Reading::new(&account, &run, 1, 0.95).unwrap(),
    );
    assert!(
        said.iter()
            .any(|s| s.starts_with(&format!("Solid-phase disk: in {longer} of 1000 draws the run at step 5"))),
        "{said:?}"
    );
    let short = text.replacen(
        "\"gas_flow\": \"1.5 L/min\",\n              \"time\": \"45 min\"",
        "\"gas_flow\": \"1.5 L/min\",\n              \"time\": \"5 min\"",
        1,
    );
    assert_ne!(short, text);
    let short = account_text(&short);
    assert!(
        short.problems.iter().any(|p| p.found.contains("a gas that leaves saturated needs at least")),
        "{:?}",
        short.problems
    );
}

#[test]
fn slices_and_seed_decide_nothing_and_everything() {
    for example in EXAMPLES {
        let account = account_text(example.text);
        let whole = says(&account, &sampled(&account, 2000));
        let mut slowly = Sampled::default();
        slowly.follow(&account, wish(2000));
        let mut before = slowly.remaining();
        while slowly.advance(&account, 37) > 0 {
            assert!(slowly.remaining() < before && before - slowly.remaining() <= 37);
            before = slowly.remaining();
        }
        assert_eq!(says(&account, &slowly), whole);
    }
    let plan = harbour();
    let mut other = plan.clone();
    other["seed"] = json!(2);
    let one = sound(&plan);
    let two = sound(&other);
    let (first, second) = (says(&one, &sampled(&one, 2000)), says(&two, &sampled(&two, 2000)));
    assert_ne!(first, second);
    other["seed"] = json!(1);
    let again = sound(&other);
    assert_eq!(says(&again, &sampled(&again, 2000)), first, "1 is the seed where none is written");
    for bad in [json!("x"), json!(-1), json!(1.5)] {
        other["seed"] = bad;
        let problems = account_text(&other.to_string()).problems;
        assert!(
            problems.iter().any(|p| p.path == "seed" && p.need.starts_with("a whole number")),
            "{problems:?}"
        );
    }
}

/// An edit of one route leaves the others as they were, to the bit and without drawing them again; so does a route that is
/// added before them.
#[test]
fn only_edited_routes_are_drawn_again() {
    let plan = harbour();
    let account = sound(&plan);
    let mut run = sampled(&account, 1000);
    let names = |a: &Account| {
        a.program.as_ref().unwrap().workloads[0].routes.iter().map(|r| r.name.clone()).collect::<Vec<_>>()
    };
    let of = |run: &Sampled, a: &Account, name: &str| {
        let r = names(a).iter().position(|n| n == name).unwrap();
        run.route(0, r).unwrap().summary("waste.total.mass", 0.95).unwrap()
    };
    let (soxhlet, co2) = (of(&run, &account, "Soxhlet"), of(&run, &account, "Supercritical CO2"));

    let mut edited = plan.clone();
    edited["workloads"][0]["routes"][0]["steps"][2]["charge"] = json!("200 ± 5 mL");
    let edited = sound(&edited);
    let generation = run.generation();
    assert!(run.follow(&edited, wish(1000)) > generation);
    assert_eq!(run.remaining(), 1000, "one route of four");
    while run.advance(&edited, 400) > 0 {}
    assert_eq!(of(&run, &edited, "Supercritical CO2"), co2);
    assert!(of(&run, &edited, "Soxhlet").mean < soxhlet.mean);

    let mut longer = plan.clone();
    let mut first = longer["workloads"][0]["routes"][0].clone();
    first["name"] = json!("Soxhlet, smaller");
    longer["workloads"][0]["routes"].as_array_mut().unwrap().insert(0, first);
    let longer = sound(&longer);
    run.follow(&longer, wish(1000));
    assert_eq!(run.remaining(), 2000, "the new one, and the one that was edited back");
    while run.advance(&longer, 400) > 0 {}
    assert_eq!((of(&run, &longer, "Soxhlet"), of(&run, &longer, "Supercritical CO2")), (soxhlet, co2));

    // What all routes share is drawn again for all of them; the name of the present route and notes touch nothing.
    let mut more = plan.clone();
    more["workloads"][0]["results_per_year"] = json!("1400 ± 100");
    run.follow(&sound(&more), wish(1000));
    assert_eq!(run.remaining(), 4000);
    let mut run = sampled(&account, 1000);
    let mut noted = plan;
    noted["notes"] = json!("other words");
    noted["workloads"][0]["present"] = json!("Ultrasonic");
    run.follow(&sound(&noted), wish(1000));
    assert_eq!(run.remaining(), 0);
    // More draws go on where the others ended.
    run.follow(&account, wish(1500));
    assert_eq!(run.remaining(), 2000);
    while run.advance(&account, 999) > 0 {}
    assert_eq!(says(&account, &run), says(&account, &sampled(&account, 1500)));
}

/// Two routes that are alike but for a constant share every number: the difference does not spread at all, and one has less
/// in every draw. Drawn apart they would overlap.
#[test]
fn shared_inputs_cancel() {
    let mut plan = harbour();
    plan["workloads"][0]["results_per_year"] = json!("1400 u 200");
    let routes = plan["workloads"][0]["routes"].as_array_mut().unwrap();
    routes.truncate(1);
    let mut twin = routes[0].clone();
    twin["name"] = json!("Twin");
    for route in [&mut routes[0], &mut twin] {
        // Only what the workload and the catalogue say is unsure.
        let text = route.to_string();
        let mut plain = text.clone();
        while let Some(at) = plain.find(" ± ") {
            let end = at + " ± ".len() + plain[at + " ± ".len()..].find(' ').unwrap();
            plain.replace_range(at..end, "");
        }
        *route = serde_json::from_str(&plain).unwrap();
    }
    twin["steps"].as_array_mut().unwrap().insert(
        0,
        json!(
        { "step": "consume", "material": "nitrile glove", "mass": "1 g", "to": "solids" }),
    );
    routes.push(twin);
    let account = sound(&plan);
    let reading_of = sampled(&account, 10_000);
    let reading = Reading::new(&account, &reading_of, 0, 0.95).unwrap();
    let waste = reading.figure("waste.total.mass").unwrap();
    let rival = &waste.rivals[0];
    assert_eq!((rival.less, rival.same, rival.draws), (0.0, 0.0, 10_000));
    // 1 g for each of S · 1.03 · 17/13 extractions: u = 200 · 1.3469 g
    let difference = rival.difference.unwrap();
    near(difference.u, 0.2 * 1.03 * 17.0 / 13.0, 0.005);
    assert!(waste.routes[0].unwrap().drawn.unwrap().u > 50.0 * difference.u);
    let matters = reading.matters("waste.total.mass", 1, Some(0));
    assert_eq!(matters[0].words, "results per year");
    assert!(matters[0].share > 0.99);
    near(rival.first_order_u.unwrap(), difference.u, 0.005);
    // Read by itself, a figure of a route is the same.
    let brief = reading.brief("waste.total.mass", 1).unwrap();
    assert_eq!(brief.odds, Some((rival.less, rival.same)));
    assert_eq!((brief.figure.id.as_str(), brief.drawn), ("waste.total.mass", waste.routes[1].unwrap().drawn));
    assert_eq!(reading.brief("waste.total.mass", 0).unwrap().odds, None);
}

/// In figures that are nearly linear in their inputs, propagation to first order and the draws agree; its interval is that
/// of a normal distribution.
#[test]
fn first_order_stands_beside_the_draws() {
    let mut compared = 0;
    for example in EXAMPLES {
        let account = account_text(example.text);
        let run = sampled(&account, 20_000);
        // The neighbours of extraction have baths and solubilities, which are curved in their inputs: there only u is held.
        let nearly_linear =
            ["harbour-sediment", "water-laboratory", "botanical-pilot"].contains(&example.key);
        for w in 0..account.workloads.len() {
            let reading = Reading::new(&account, &run, w, 0.95).unwrap();
            for spread in reading.figure("waste.total.mass").unwrap().routes.iter().flatten() {
                let (Some(drawn), Some(u)) = (spread.drawn, spread.first_order_u) else { continue };
                near(u, drawn.u, 0.03 * drawn.u);
                if nearly_linear {
                    compared += 1;
                    near(drawn.mean, spread.central, 0.1 * drawn.u);
                    let width = drawn.symmetric.high - drawn.symmetric.low;
                    let normal = 2.0 * normal_quantile(0.975) * u;
                    assert!(width < 1.05 * normal, "{width} {normal}");
                }
            }
        }
    }
    assert!(compared >= 8, "{compared}");
}

/// A loss that is "not known" takes the range of the technique, widens the result and is named with its share.
#[test]
fn what_is_not_known_is_named() {
    let mut plan = harbour();
    let step = &mut plan["workloads"][0]["routes"][0]["steps"][2];
    step.as_object_mut().unwrap().remove("measured");
    let known = {
        let mut plan = plan.clone();
        plan["workloads"][0]["routes"][0]["steps"][2]["loss"] = json!("3 %");
        sound(&plan)
    };
    plan["workloads"][0]["routes"][0]["steps"][2]["loss"] = json!("not known");
    let unknown = sound(&plan);
    let (a, b) = (sampled(&known, 5000), sampled(&unknown, 5000));
    let u = |a: &Account, s: &Sampled| {
        let reading = Reading::new(a, s, 0, 0.95).unwrap();
        (
            reading.figure("air.solvents").unwrap().routes[0].unwrap().drawn.unwrap().u,
            reading.matters("air.solvents", 0, None),
        )
    };
    let ((before, _), (after, matters)) = (u(&known, &a), u(&unknown, &b));
    assert!(after > before, "{before} {after}");
    let named = matters.iter().find(|m| m.origin == Origin::NotKnown).unwrap();
    assert!(named.words.starts_with("Soxhlet, step 3 ("), "{}", named.words);
    assert!(named.share > 0.1, "{named:?}");
}

/// Draws that stop are counted by step and kind and left out; with more than one in twenty there is no interval.
#[test]
fn draws_that_stop_are_counted() {
    let with = |to: &str| {
        let mut plan = harbour();
        // Down to a volume that a nitrogen stream of 1 mL still has to find there.
        plan["workloads"][0]["routes"][0]["steps"][5]["to"] = json!(to);
        let account = sound(&plan);
        let run = sampled(&account, 4000);
        let columns = run.route(0, 0).unwrap();
        (
            columns.stopped().to_vec(),
            columns.stopped_share(),
            columns.summary("waste.total.mass", 0.95).is_some(),
        )
    };
    // Normal: below 1 mL in Φ(−2) = 2.28 % of draws, and in Φ(−1) = 15.9 %.
    let (kinds, share, said) = with("2 mL u 0.5 mL");
    assert!(said);
    assert_eq!(kinds.len(), 1);
    assert_eq!(kinds[0].why, "less is there than should be left");
    near(share, 0.0228, 0.008);
    near(f64::from(kinds[0].draws) / 4000.0, share, 1e-12);
    let (_, share, said) = with("2 mL u 1 mL");
    near(share, 0.1587, 0.02);
    assert!(!said);
}

/// More cells than allowed: fewer draws, and both numbers are told.
#[test]
fn cells_are_capped() {
    let account = sound(&harbour());
    let mut run = Sampled::default();
    run.follow(&account, Wish { draws: 100_000, most_cells: 20_000, wanted: &headline });
    assert_eq!(run.asked(), 100_000);
    let columns: usize = (0..4).map(|r| run.route(0, r).unwrap().ids().count()).sum();
    assert_eq!(run.draws() as usize, 20_000 / columns);
}

/// A plan without any spread has intervals of no width, and nothing matters.
#[test]
fn without_spread_nothing_spreads() {
    let account = sound(&harbour());
    let exact = account.program.as_ref().unwrap().workloads[0].routes[0]
        .inputs
        .iter()
        .filter(|i| i.spread == Spread::Exact);
    assert!(exact.count() > 10);
    let broken = account_text("{}");
    let mut run = Sampled::default();
    run.follow(&broken, wish(1000));
    assert_eq!((run.remaining(), run.advance(&broken, 10)), (0, 0));
    assert!(Reading::new(&broken, &run, 0, 0.95).is_none());
}
