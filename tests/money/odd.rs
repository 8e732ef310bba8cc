//! Odd input gets clear words.

use super::{accounted, is, plan, route, sound};
use serde_json::{Value, json};
use thimbleworth::case::{Turn, switch, turning_results};
use thimbleworth::money::{Payback, Rate};
use thimbleworth::plan::Severity;

fn with(pointer: &str, key: &str, value: Value) -> Value {
    let mut plan = plan();
    plan.pointer_mut(pointer).unwrap()[key] = value;
    plan
}

#[test]
fn prices_that_cannot_be() {
    for (pointer, key, value, said) in [
        ("/site/money/prices", "cleaner", json!("4 EUR/L"), "is not in USD, in which the plan counts"),
        ("/site/money/prices", "cleaner", json!("inf USD/L"), "inf"),
        ("/site/money/prices", "cleaner", json!("1e999 USD/L"), "1e999"),
        ("/site/money/prices", "cleaner", json!("4 USD"), "4 USD"),
        ("/site/money/prices", "cleaner", json!("10 USD for nothing"), "is no size of a pack"),
        ("/site/money/prices", "cleaner", json!("10 USD for 0 L"), "a pack of 0 L"),
        ("/site/money/prices", "cleaner", json!("10 USD for 20"), "whose mass is not known"),
        ("/site/money/prices", "pad", json!("4 USD/L"), "whose density is not known"),
        ("/site/money/prices", "nobody knows", json!("4 USD/L"), "no material"),
        ("/site/money/disposal", "drains", json!("4 USD/L"), "no stream is called \"drains\""),
        ("/site/money/disposal", "waste", json!("7 USD/container + x"), "\"x\""),
        ("/site/money", "currency", json!("dollars"), "is no currency"),
        ("/site/money", "years", json!(0), "no such number"),
        ("/site/money", "years", json!("1.5"), "no such number"),
        ("/site/money", "discount", json!("-5 %"), "-5 %"),
        ("/site/money", "pick_ups", json!(-1), "below zero"),
        ("/site/hours", "attended", json!("9000 h"), "9000 hours in a year"),
        ("/site/hours", "attended", json!("0 h"), "no hour of the year in which B can run"),
        ("/workloads/0/routes/1/time", "at_once", json!(0), "holds no extraction"),
    ] {
        let account = accounted(&with(pointer, key, value));
        let errors: Vec<_> = account.problems.iter().filter(|p| p.severity == Severity::Error).collect();
        assert!(errors.iter().any(|p| p.found.contains(said) && !p.need.is_empty()), "{said}: {errors:#?}");
    }
    let mut plan = plan();
    plan["site"].as_object_mut().unwrap().remove("money");
    let account = accounted(&plan);
    assert!(
        account.problems.iter().any(|p| p.found == "the route has prices, and the site names no currency")
    );
}

#[test]
fn nothing_and_less_than_nothing_are_prices() {
    let free = sound(&with("/site/money/prices", "cleaner", json!("0 USD/L")));
    is(route(&free, 0), "cost.year", 708.0);
    let paid = sound(&with("/site/money/prices", "cleaner", json!("-1 USD/L")));
    is(route(&paid, 0), "cost.year", 608.0);
    assert!(
        paid.problems
            .iter()
            .any(|p| p.found.contains("a negative price: the site would be paid for buying it"))
    );
    let credit = sound(&with("/site/money/disposal", "waste", json!("-0.5 USD/kg")));
    is(route(&credit, 0), "cost.disposal.waste", -40.0);
}

/// Prices that are odd and possible are said; what is below zero in some draws alone too.
#[test]
fn odd_prices_are_doubted() {
    for (pointer, key, value, said) in [
        ("/site/money", "labour_hour", json!("-5 USD"), "-5 USD is a negative price"),
        ("/site/money", "labour_hour", json!("40 ± 50 USD"), "falls below zero in some draws"),
        ("/site/money/prices", "cleaner", json!("4 ± 5 USD/L"), "falls below zero in some draws"),
        (
            "/workloads/0/routes/1/money",
            "instrument",
            json!("1500 USD u 900 USD"),
            "falls below zero in some draws",
        ),
        ("/workloads/0/routes/1/money", "residual", json!("9000 USD"), "worth more at the end than it costs"),
    ] {
        let account = sound(&with(pointer, key, value));
        let doubts = account.problems.iter().filter(|p| p.severity == Severity::Warning);
        assert!(
            doubts.clone().any(|p| p.found.contains(said) && !p.need.is_empty()),
            "{said}: {:#?}",
            account.problems
        );
    }
}

/// No capacity, no business case: without run time or hours a route is shown and not ranked, and so is one that finds nothing.
#[test]
fn without_capacity_or_recovery_nothing_is_ranked() {
    let mut no_hours = plan();
    no_hours["site"].as_object_mut().unwrap().remove("hours");
    for (plan, said) in [
        (no_hours, "whether the instruments of B find the time"),
        (with("/workloads/0/routes/1", "recovery", json!("0 %")), "B finds nothing of what is sought"),
    ] {
        let case = switch(&sound(&plan), 0, 1).unwrap();
        assert!(case.not_ranked.iter().any(|why| why.contains(said)), "{:?}", case.not_ranked);
    }
}

/// Savings that never come: "never", not a number.
#[test]
fn benefits_that_never_come() {
    let mut plan = plan();
    plan["workloads"][0]["routes"][1]["money"]["service"] = json!("5000 USD");
    let account = sound(&plan);
    let case = switch(&account, 0, 1).unwrap().investment;
    assert!(case.saved_a_year < 0.0);
    assert_eq!((case.simple_payback(), case.discounted_payback()), (Payback::Never, Payback::Never));
    assert_eq!(case.internal_rate(), Rate::None);
    let turn = turning_results(&account, 0, 1).unwrap();
    assert!(matches!(turn, Turn::From(n) if n > 100.0), "{turn:?}");
}

/// One result a year: a whole container and two pick-ups all the same, and an instrument that stands idle.
#[test]
fn a_year_of_one_sample() {
    let account = sound(&with("/workloads/0", "results_per_year", json!(1)));
    let (a, b) = (route(&account, 0), route(&account, 1));
    is(a, "cost.disposal.waste", 67.0);
    is(b, "cost.to_buy", 0.0);
    assert_eq!(switch(&account, 0, 1).unwrap().investment.paid, 500.0);
    assert_eq!(switch(&account, 0, 1).unwrap().investment.discounted_payback(), Payback::Never);
}
