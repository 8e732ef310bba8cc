//! Lines of cost and time against arithmetic by hand.

use super::{accounted, is, plan, route, sound};
use serde_json::json;
use thimbleworth::account::behind;
use thimbleworth::plan::Severity;

#[test]
fn every_line_is_an_entry_times_its_price() {
    let account = sound(&plan());
    let warned: Vec<_> = account.problems.iter().filter(|p| p.severity != Severity::Note).collect();
    assert!(warned.is_empty(), "{warned:?}");
    let a = route(&account, 0);
    // 100 × 0.8 kg = 80 kg = 100 L at 4 USD/L; 100 × 10 g at 10 USD/kg
    is(a, "cost.material.cleaner", 400.0);
    is(a, "cost.material.pad", 10.0);
    // 100 L in 5 containers of 20 L at 7 USD, and 2 pick-ups at 30 USD; 1 kg at 3 USD
    is(a, "cost.disposal.waste", 95.0);
    is(a, "cost.disposal.solids", 3.0);
    // 100 × 6 min + 10 × 30 min = 15 h at 40 USD
    is(a, "time.attended", 15.0 * 3600.0);
    is(a, "cost.labour", 600.0);
    is(a, "cost.year", 1108.0);
    // Everything bought is lost, and has to be taken away.
    is(a, "cost.lost.waste", 400.0);
    is(a, "cost.waste", 400.0 + 10.0 + 98.0);
    let b = route(&account, 1);
    // 25 L; 2 containers and 2 pick-ups; 5 h; service
    is(b, "cost.year", 100.0 + 74.0 + 200.0 + 50.0);
    // 200 h of runs in the 150 h of one instrument: 2 needed, 1 there
    is(b, "time.instrument", 200.0 * 3600.0);
    is(b, "time.instruments", 2.0);
    is(b, "cost.to_buy", 1.0);
    is(b, "cost.once", 2000.0);
    is(b, "cost.back", 100.0);
}

/// A line of cost opens into the postings behind it, each at its price.
#[test]
fn cost_opens_into_postings() {
    let account = sound(&plan());
    let program = &account.program.as_ref().unwrap().workloads[0].routes[0];
    let a = route(&account, 0);
    for (id, expected) in
        [("cost.material.cleaner", 400.0), ("cost.lost.solids", 10.0), ("cost.waste", 410.0 + 3.0 + 35.0)]
    {
        let figure = a.figures.iter().find(|f| f.id == id).unwrap();
        let sum: f64 = behind(program, a, figure)
            .iter()
            .map(|c| match c {
                thimbleworth::account::Contribution::Posting { amount_si, .. }
                | thimbleworth::account::Contribution::Spending { amount_si, .. } => *amount_si,
            })
            .sum();
        assert!((sum - expected).abs() < 1e-9, "{id} {sum}");
    }
}

/// ISO 14051 as an illustration (numbers from memory): 100 kg in, 70 kg of product; material 1000, energy 50, system 800 and
/// waste management 80: product 1295, loss 635.
#[test]
fn waste_carries_its_full_cost_where_there_is_a_product() {
    let mut plan = plan();
    let site = &mut plan["site"]["money"];
    site["prices"] = json!({ "cleaner": "10 USD/kg" });
    site["disposal"] = json!({ "waste": "80 USD/pick-up" });
    site["pick_ups"] = json!(1);
    plan["workloads"][0]["results_per_year"] = json!(10);
    let steps = json!([
        { "step": "consume", "material": "cleaner", "mass": "7 kg", "to": "product" },
        { "step": "consume", "material": "cleaner", "mass": "3 kg", "to": "waste" }]);
    let route_b = &mut plan["workloads"][0]["routes"][1];
    route_b["steps"] = steps;
    route_b["money"] = json!({ "service": "800 USD", "other": "50 USD" });
    route_b["time"] = json!({ "attended": "0 min", "instruments": 1 });
    let account = sound(&plan);
    let b = route(&account, 1);
    is(b, "cost.flow.share", 0.3);
    is(b, "cost.waste", 635.0);
    is(b, "cost.year", 1930.0);
}

/// What has no price is named and leaves the sum open; it is never counted as nothing.
#[test]
fn what_has_no_price_is_named() {
    let without = |pointer: &str, key: &str, id: &str, named: &str, path: &str| {
        let mut plan = plan();
        plan.pointer_mut(pointer).unwrap().as_object_mut().unwrap().remove(key).unwrap();
        let account = sound(&plan);
        let a = route(&account, 0);
        assert!(a.value("cost.year").is_none() && a.value(id).is_none(), "{key}");
        assert!(a.value("cost.known").unwrap() > 0.0);
        assert!(a.open.iter().any(|(what, at)| what == named && at == path), "{:?}", a.open);
        let told = account.problems.iter().filter(|p| p.path == path && p.found.starts_with(named)).count();
        assert_eq!(told, 1, "{:?}", account.problems);
    };
    without("/site/money/prices", "cleaner", "cost.material.cleaner", "cleaner", "site.money.prices");
    without(
        "/site/money/disposal",
        "waste",
        "cost.disposal.waste",
        "the removal of waste",
        "site.money.disposal",
    );
    without("/site/money", "labour_hour", "cost.labour", "an hour of labour", "site.money.labour_hour");
    without(
        "/site/money",
        "pick_ups",
        "cost.disposal.waste",
        "the removal of waste: the number of pick-ups",
        "site.money.pick_ups",
    );
    let mut open = plan();
    open["site"]["money"]["prices"]["pad"] = json!("not known");
    let account = sound(&open);
    assert_eq!(route(&account, 0).open[0].0, "pad");
    assert!(route(&account, 1).value("cost.year").is_some(), "B needs no pad");
    // Without a word of money there is no account of cost, and nothing is missing.
    let mut none = plan();
    none["site"].as_object_mut().unwrap().remove("money");
    none["workloads"][0]["routes"][1].as_object_mut().unwrap().remove("money");
    let account = accounted(&none);
    assert!(route(&account, 0).figures.iter().all(|f| !f.id.starts_with("cost.")));
    assert!(route(&account, 0).open.is_empty());
}
