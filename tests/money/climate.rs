//! Lines of climate by hand: never one number.

use super::{is, plan, route, sound};
use serde_json::{Value, json};
use thimbleworth::climate::{Edition, gwp100};

fn with(climate: &Value) -> Value {
    let mut plan = plan();
    plan["site"]["climate"] = climate.clone();
    plan["workloads"][0]["routes"][0]["steps"] = json!([
        { "step": "consume", "material": "dichloromethane", "mass": "1 kg", "to": "hood" },
        { "step": "consume", "material": "carbon dioxide", "mass": "2 kg", "to": "hood" },
        { "step": "consume", "material": "n-hexane", "mass": "1 kg", "to": "waste" }]);
    plan
}

#[test]
fn each_line_stands_by_itself() {
    let plan = with(&json!({ "gwp": "AR6", "co2_origin": "natural well", "incinerated": { "waste": "50 %" },
        "upstream": { "n-hexane": "0.9 kg/kg" }, "source": "supplier" }));
    let account = sound(&plan);
    let a = route(&account, 0);
    // 100 kg of dichloromethane at 11.2 (AR6); oxidised 44.009/84.93; 200 kg of CO2; 100 kg of hexane half burnt
    is(a, "climate.direct", 1120.0);
    let oxidised = a.value("climate.oxidised").unwrap();
    assert!((oxidised - 51.82).abs() < 0.02, "{oxidised}");
    is(a, "climate.vented", 200.0);
    let burnt = a.value("climate.incineration").unwrap();
    assert!((burnt - 50.0 * 3.0641).abs() < 0.05, "{burnt}");
    is(a, "climate.upstream", 90.0);
    let scopes: Vec<&str> =
        a.figures.iter().filter(|f| f.id.starts_with("climate.")).map(|f| f.boundary.as_ref()).collect();
    assert_eq!(scopes.len(), 5);
    assert!(scopes.iter().all(|s| s.contains("scope")), "{scopes:?}");
    assert!(a.value("climate.total").is_none());
}

#[test]
fn the_edition_and_the_origin_are_chosen() {
    for (gwp, direct) in [("AR4", 870.0), ("AR5", 900.0), ("AR6", 1120.0)] {
        let account = sound(&with(&json!({ "gwp": gwp, "co2_origin": "biogenic" })));
        is(route(&account, 0), "climate.direct", direct);
    }
    for (origin, said) in [
        ("fossil by-product", "count it twice"),
        ("biogenic", "outside the scopes"),
        ("natural well", "fully additional"),
        ("air capture", "taken out of the air"),
    ] {
        let account = sound(&with(&json!({ "co2_origin": origin })));
        let figure = route(&account, 0).figures.iter().find(|f| f.id == "climate.vented").unwrap();
        assert!(figure.boundary.contains(said) && figure.title.contains(origin), "{figure:?}");
    }
    // Without its origin the vented CO2 is no line, and it is said.
    let account = sound(&with(&json!({ "gwp": "AR6" })));
    assert!(route(&account, 0).value("climate.vented").is_none());
    assert!(account.problems.iter().any(|p| p.path == "site.climate.co2_origin"));
    // AR4 gives nothing for chloroform: named, not 0.
    let mut plan = with(&json!({ "gwp": "AR4", "co2_origin": "biogenic" }));
    plan["workloads"][0]["routes"][0]["steps"][0]["material"] = json!("chloroform");
    let account = sound(&plan);
    assert!(
        account
            .problems
            .iter()
            .any(|p| p.found.contains("the warming potential of chloroform, which AR4 does not give"))
    );
}

/// Electricity with year and boundary, from the harbour example: kWh times the factor.
#[test]
fn electricity_has_its_year_and_boundary() {
    let account =
        thimbleworth::account::account_text(thimbleworth::example::example("harbour-sediment").unwrap().text);
    let a = route(&account, 0);
    is(a, "climate.electricity", a.value("energy.electricity").unwrap() / 3.6e6 * 0.37);
    let figure = a.figures.iter().find(|f| f.id == "climate.electricity").unwrap();
    assert!(figure.boundary.starts_with("scope 2; 2025, generation"), "{}", figure.boundary);
}

/// IPCC values as a general property library holds them.
#[test]
fn warming_potentials() {
    for (cas, values) in [
        ("75-09-2", [Some(8.7), Some(9.0), Some(11.2)]),
        ("67-66-3", [None, Some(16.0), Some(20.6)]),
        ("56-23-5", [Some(1400.0), Some(1730.0), Some(2200.0)]),
        ("74-82-8", [Some(25.0), Some(28.0), Some(27.9)]),
        ("10024-97-2", [Some(298.0), Some(265.0), Some(273.0)]),
        ("71-55-6", [Some(146.0), Some(160.0), Some(161.0)]),
        ("107-06-2", [None, Some(0.899), Some(1.3)]),
        ("67-64-1", [None, None, None]),
    ] {
        assert_eq!([Edition::Ar4, Edition::Ar5, Edition::Ar6].map(|e| gwp100(cas, e)), values, "{cas}");
    }
}

#[test]
fn factors_without_a_source_are_refused() {
    let account = super::accounted(&with(&json!({ "upstream": { "n-hexane": "0.9 kg/kg" } })));
    assert!(
        account
            .problems
            .iter()
            .any(|p| p.path == "site.climate.source" && p.found.contains("without a source"))
    );
}
