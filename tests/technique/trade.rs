//! Facts of the trade: common practice, no source.

use super::account_of;
use thimbleworth::account::Account;
use thimbleworth::step::{Param, technique};

fn param(key: &str, of: &str) -> &'static Param {
    technique(of).unwrap().params.iter().find(|p| p.key == key).unwrap()
}

fn usual(key: &str, of: &str, value_si: f64) -> bool {
    let (low, high) = param(key, of).usual;
    value_si >= low && value_si <= high
}

fn drawn_l(account: &Account, workload: usize, route: usize) -> f64 {
    let program = &account.program.as_ref().unwrap().workloads[workload].routes[route];
    let found = account.workloads[workload].routes[route].as_ref().unwrap();
    let mut litres = 0.0;
    for (m, nature) in program.materials.iter().zip(&program.natures) {
        let id = format!("mass.drawn.{}", m.name.replace(' ', "-"));
        if let (Some(kg), Some(density)) = (found.value(&id), nature.density)
            && m.name != "carbon dioxide"
        {
            litres += 1000.0 * kg / program.inputs[density.0 as usize].central_si;
        }
    }
    litres
}

/// Common practice, no source: a Soxhlet extraction is charged with 250 mL.
#[test]
fn a_soxhlet_is_charged_with_a_quarter_litre() {
    assert!(usual("charge", "soxhlet", 250e-6));
    let account = account_of("trade.json");
    // 100 results a year of one extraction each
    assert!((drawn_l(&account, 0, 0) - 25.0).abs() < 1e-9, "{}", drawn_l(&account, 0, 0));
}

/// Common practice, no source: solid-phase extraction takes up to 10 mL a step and up to 50 mL a sample, so that 50
/// samples fill a bottle of 2.5 L.
#[test]
fn fifty_samples_fill_a_bottle() {
    assert!(usual("elute", "solid-phase", 50e-6) && !usual("elute", "solid-phase", 100e-6));
    let account = account_of("trade.json");
    assert!((drawn_l(&account, 1, 0) - 2.5).abs() < 1e-9, "{}", drawn_l(&account, 1, 0));
    let found = account.workloads[1].routes[0].as_ref().unwrap();
    assert!((found.value("waste.solvent.volume").unwrap() - 2.5e-3).abs() < 1e-12);
    assert!((found.value("waste.solvent.containers").unwrap() - 1.0).abs() < 1e-12);
    for p in &account.problems {
        assert!(!p.path.contains("elute") && !p.path.contains("condition"), "{p:?}");
    }
}

/// Common practice, no source: a supercritical trap is rinsed with 1 to 2 mL.
#[test]
fn a_trap_is_rinsed_with_a_millilitre_or_two() {
    assert!(usual("rinse_volume", "supercritical", 1e-6) && usual("rinse_volume", "supercritical", 2e-6));
    let account = account_of("trade.json");
    assert!((drawn_l(&account, 0, 1) - 0.15).abs() < 1e-9, "{}", drawn_l(&account, 0, 1));
}

/// Common practice, no source: CO2 is critical at about 31 °C and 74 bar.
#[test]
fn co2_is_critical_at_31_degrees_and_74_bar() {
    use thimbleworth::co2::{CRITICAL_PRESSURE_PA, CRITICAL_TEMPERATURE_K};
    assert!(
        (CRITICAL_TEMPERATURE_K - 273.15 - 31.0).abs() < 0.5 && (CRITICAL_PRESSURE_PA - 74e5).abs() < 0.5e5
    );
}
