//! The case for switching: central figures, where it turns, and the same in every draw.

use super::{plan, sound};
use serde_json::json;
use thimbleworth::account::Account;
use thimbleworth::case::{Turn, drawn, switch, turning_prices, turning_results};
use thimbleworth::money::Payback;
use thimbleworth::odds::{MOST_CELLS, Sampled, Wish, headline};

#[test]
fn the_case_is_the_investment_by_hand() {
    let account = sound(&plan());
    let case = switch(&account, 0, 1).unwrap();
    assert!(case.not_ranked.is_empty());
    let i = case.investment;
    assert_eq!((i.paid, i.years, i.residual), (2000.0, 5, 100.0));
    assert!((i.saved_a_year - 684.0).abs() < 1e-9);
    // 684 (1 − 1.1⁻⁵)/0.1 + 100/1.1⁵ − 2000
    let factor = 1.1_f64.powi(5);
    assert!(
        (i.net_present_value() - (684.0 * (1.0 - 1.0 / factor) / 0.1 + 100.0 / factor - 2000.0)).abs() < 1e-9
    );
    let Payback::After(years) = i.simple_payback() else { panic!() };
    assert!((years - 2000.0 / 684.0).abs() < 1e-12);
    // Two instruments, of which one is there: no case without that condition.
    assert_eq!(case.to_buy, Some(1.0));
    assert!(
        case.conditions[0]
            == "instruments of B: 2 needed, for 200 h of runs a year where one can run 150 attended h; 1 not there and to be bought"
    );
}

/// Between steps the saving is linear in the number of results, so the turn can be checked by running the plan there.
#[test]
fn it_turns_where_the_plan_itself_turns() {
    let value = |results: f64| {
        let mut plan = plan();
        plan["workloads"][0]["results_per_year"] = json!(results);
        switch(&sound(&plan), 0, 1).unwrap().investment.net_present_value()
    };
    let account = sound(&plan());
    let Some(Turn::From(turn)) = turning_results(&account, 0, 1) else { panic!() };
    assert!((1.0..100.0).contains(&turn));
    assert!(value(turn + 0.01) >= 0.0 && value(turn - 0.01) < 0.0, "{turn}");
    for price in turning_prices(&account, 0, 1) {
        let mut plan = plan();
        let scaled = |text: &str| {
            let (number, rest) = text.split_once(' ').unwrap();
            format!("{} {rest}", number.parse::<f64>().unwrap() * price.over_central)
        };
        match price.identity.as_str() {
            "site.money.labour_hour" => plan["site"]["money"]["labour_hour"] = json!(scaled("40 USD")),
            "workloads[0].routes[1].money.instrument" => {
                plan["workloads"][0]["routes"][1]["money"]["instrument"] = json!(scaled("1500 USD"));
            }
            "site.money.prices.cleaner" => {
                plan["site"]["money"]["prices"]["cleaner"] = json!(scaled("4 USD/L"));
            }
            _ => continue,
        }
        let there = switch(&sound(&plan), 0, 1).unwrap().investment.net_present_value();
        assert!(there.abs() < 0.01, "{price:?} {there}");
    }
    assert!(turning_prices(&account, 0, 1).len() >= 3);
}

#[test]
fn without_equivalence_or_permission_it_is_shown_but_not_ranked() {
    for (key, said) in [
        ("equivalence", "equal work"),
        ("permission", "may be reported"),
        ("recovery", "what recovery B reaches"),
    ] {
        let mut plan = plan();
        plan["workloads"][0]["routes"][1].as_object_mut().unwrap().remove(key);
        let case = switch(&sound(&plan), 0, 1).unwrap();
        assert_eq!(case.not_ranked.len(), 1);
        assert!(case.not_ranked[0].contains(said), "{:?}", case.not_ranked);
    }
}

#[test]
fn what_is_missing_is_said_before_a_case_is_made() {
    for (pointer, key, said) in [
        ("/site/money", "years", "over how many years"),
        ("/site/money", "discount", "the discount rate"),
        ("/site/money/prices", "cleaner", "the running cost of A; not known: cleaner"),
        ("/workloads/0/routes/1/money", "instrument", "the price of an instrument for B"),
    ] {
        let mut plan = plan();
        plan.pointer_mut(pointer).unwrap().as_object_mut().unwrap().remove(key).unwrap();
        let lacking = switch(&sound(&plan), 0, 1).unwrap_err();
        assert!(lacking.iter().any(|l| l.contains(said)), "{lacking:?}");
    }
    let mut plan = plan();
    plan["site"].as_object_mut().unwrap().remove("hours");
    let case = switch(&sound(&plan), 0, 1).unwrap();
    assert!(case.conditions[0].contains("does not say in how many hours"), "{:?}", case.conditions);
}

fn sampled(account: &Account, draws: u32) -> Sampled {
    let mut sampled = Sampled::default();
    sampled.follow(account, Wish { draws, most_cells: MOST_CELLS, wanted: &headline });
    while sampled.advance(account, 10_000) > 0 {}
    sampled
}

/// One uncertain price enters the saving in proportion: exact mean, u and odds. A quarter litre in place of one, 75 L saved at
/// 4 ± 3 USD/L rectangular (pack of 2.5 L): savings 684 ± 225 USD, u 225/√3; it pays within three years where it saves at
/// least 2000/3 USD, within five where it saves 400.
#[test]
fn draws_of_the_case_are_those_of_the_price() {
    let mut plan = plan();
    plan["site"]["money"]["prices"]["cleaner"] = json!("10 ± 7.5 USD for 2.5 L");
    let account = sound(&plan);
    let run = sampled(&account, 40_000);
    let case = drawn(&account, &run, 0, 1, 0.95).unwrap();
    let factor = (1.0 - 1.1_f64.powi(-5)) / 0.1;
    let central = switch(&account, 0, 1).unwrap().investment.net_present_value();
    let value = case.value.unwrap();
    let u = 225.0 / 3.0_f64.sqrt() * factor;
    assert!((value.mean - central).abs() < 4.0 * u / 200.0);
    assert!((value.u - u).abs() < 0.01 * u);
    let at_least = |saved: f64| (684.0 + 225.0 - saved) / 450.0;
    assert!((case.paid_within[3] - at_least(2000.0 / 3.0)).abs() < 0.01);
    // 100 USD come back in the fifth year, but payback asks for what is saved.
    assert!((case.never - 0.0).abs() < 1e-12);
    assert_eq!(case.paid_within[1], 0.0);
    assert!((case.median_payback.unwrap() - 2000.0 / 684.0).abs() < 0.02);
    assert!((case.cumulative[0].unwrap().mean + 2000.0).abs() < 1e-9);
    assert_eq!(case.cumulative.len(), 6);
    let last = case.cumulative[5].unwrap();
    assert!((last.mean - (5.0 * 684.0 + 100.0 - 2000.0)).abs() < 5.0 * 5.0 * 130.0 / 200.0);
}
