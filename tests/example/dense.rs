//! The neighbours of extraction with dense CO2: the arithmetic by hand, for one batch.
//!
//! Densities of CO2 in g/mL are those of the reference equation of state, which has its own evidence: 80 °C and 280 bar 0.7244;
//! 40 °C and 52 bar 0.1196; 115 °C and 250 bar 0.5245; 60 °C and 5 bar 0.00808; 15 °C and 58 bar 0.8358; 5 °C and 4 bar 0.00781; 45 °C and
//! 220 bar 0.8324; 45 °C and 120 bar 0.6577; 20 °C and 5 bar 0.00928. Liquids at 20 °C from memory: tetrachloroethylene 1.623,
//! 2-propanol 0.785 g/mL.

use super::{a_year, accounted, beside, near, route};
use thimbleworth::account::RouteAccount;

/// A figure for one batch.
fn a_batch(found: &RouteAccount, id: &str) -> f64 {
    found.per_batch(a_year(found, id))
}

/// Residue against emission: 4 mg of dichloromethane in a kilogram of beans, 1.8 kg and more to air; ethyl acetate leaves more behind
/// and less in the air; CO2 leaves neither and costs electricity.
#[test]
fn decaffeination() {
    let account = accounted("decaffeination");
    for (name, solvent, density, lost, held_g, share) in [
        ("Dichloromethane", "dichloromethane", 1.326, 1.8, 0.2, 0.97),
        ("Ethyl acetate", "ethyl-acetate", 0.900, 1.2, 1.5, 0.96),
    ] {
        let found = route(&account, 0, name);
        let charged = density * 240.0;
        near(a_batch(found, &format!("mass.drawn.{solvent}")), charged, 2e-3);
        // What the beans hold is liquor: nearly all of it solvent.
        let residue = a_batch(found, &format!("mass.to.product.{solvent}"));
        near(residue, held_g / 1e3, 5e-3);
        // All but the residue is distilled down to a litre, half a per cent of it lost.
        let boiled = charged - lost - held_g / 1e3 - density;
        near(a_batch(found, &format!("mass.to.hood.{solvent}")), lost + 0.005 * boiled, 5e-3);
        near(a_batch(found, &format!("mass.returned.{solvent}")), 0.995 * boiled, 5e-3);
        near(a_batch(found, "mass.to.caffeine-wax.caffeine"), share * 0.6, 1e-3);
        // mg of residue in a kilogram of dry beans
        near(residue * 1e6 / 50.0, held_g * 20.0, 5e-3);
    }
    let found = route(&account, 0, "CO2");
    let void_l = 150.0 - 82.6 / 1.2;
    let (fill, sent_round) = (0.7244 * void_l, 200.0 * 12.0);
    near(a_batch(found, "co2.used"), fill + 0.005 * sent_round, 1e-3);
    near(a_batch(found, "co2.vented"), 0.005 * sent_round + 0.1196 * void_l, 1e-3);
    let beans = 50.0 + 0.6 * 0.03 + 32.0 * 0.95;
    near(a_batch(found, "mass.to.product.carbon-dioxide"), 0.002 * beans, 1e-3);
    assert!(beside(&account, 0, "CO2").worse.contains(&"electricity".to_owned()));
}

/// The bath leaves its water, auxiliaries and a twentieth of the dye in the effluent; CO2 leaves a fiftieth of the dye as solid.
#[test]
fn textile_dyeing() {
    let account = accounted("textile-dyeing");
    let water = route(&account, 0, "Water bath");
    // 600 L at 998.2 g/L less 2 % to air and 0.5 L/kg in 60 kg of cloth, and 1.2 m³ of rinse
    let bath = 0.9982 * 600.0 * 0.98;
    near(a_batch(water, "mass.to.effluent.water"), bath - 0.9982 * 30.0 + 0.9982 * 1200.0, 2e-3);
    near(a_batch(water, "mass.to.effluent.disperse-dye"), 0.03, 1e-9);
    near(a_batch(water, "mass.to.product.disperse-dye"), 0.57, 1e-9);
    let co2 = route(&account, 0, "CO2");
    near(a_batch(co2, "mass.to.product.disperse-dye"), 0.98 * 0.58, 1e-9);
    near(a_batch(co2, "mass.to.dye-residue.disperse-dye"), 0.02 * 0.58, 1e-9);
    let void_l = 300.0 - 60.0 / 1.38;
    near(a_batch(co2, "co2.vented"), 0.002 * 900.0 * 2.0 + 0.00808 * void_l, 2e-3);
    near(a_batch(co2, "co2.used"), 0.5245 * void_l + 0.002 * 1800.0, 2e-3);
    // Uptake: what the cloth has of what is put in
    near(0.98, a_batch(co2, "mass.to.product.disperse-dye") / a_batch(co2, "mass.drawn.disperse-dye"), 1e-9);
}

/// A closed machine loses what its balance says; the still returns the rest but for half a litre.
#[test]
fn garment_cleaning() {
    let account = accounted("garment-cleaning");
    let old = route(&account, 0, "Tetrachloroethylene");
    let charged = 1.623 * 50.0;
    let boiled = charged - 0.12 - 0.005 - 1.623 * 0.5;
    near(a_batch(old, "mass.to.hood.tetrachloroethylene"), 0.12 + 0.001 * boiled, 5e-3);
    near(a_batch(old, "mass.to.product.tetrachloroethylene"), 0.005, 5e-3);
    near(a_batch(old, "mass.returned.tetrachloroethylene"), 0.999 * boiled, 5e-3);
    let new = route(&account, 0, "CO2");
    let void_l = 150.0 - 12.15 / 1.4;
    let bath = 0.8358 * void_l;
    near(a_batch(new, "co2.circulated"), bath, 1e-3);
    near(a_batch(new, "co2.vented"), 0.005 * bath + 0.00781 * void_l, 2e-3);
    near(a_batch(new, "mass.to.still-residue.CO2-detergent"), 0.95 * 0.06 * 0.95, 1e-3);
    assert!(a_year(new, "energy.electricity") > a_year(old, "energy.electricity") / 4.0);
}

/// Three portions of 2 L against three fillings of the void.
#[test]
fn implant_cleaning() {
    let account = accounted("implant-cleaning");
    let old = route(&account, 0, "Solvent rinse");
    near(a_batch(old, "mass.drawn.2-propanol"), 0.785 * 6.0, 2e-3);
    near(a_batch(old, "mass.to.flammable.2-propanol"), 0.785 * 6.0 - 0.12 - 0.02, 3e-3);
    let new = route(&account, 0, "CO2");
    let fill = 0.8324 * (5.0 - 4.002 / 4.43);
    near(a_batch(new, "co2.used"), 3.0 * fill, 1e-3);
    near(a_batch(new, "co2.vented"), 3.0 * fill, 1e-3);
    // 30 kg less a heel of 12 % in each cylinder
    let cylinders = (500.0 * 3.0 * fill / (30.0 * 0.88)).ceil();
    assert_eq!(new.value("co2.cylinders"), Some(cylinders));
    near(a_year(new, "co2.heel"), cylinders * 30.0 * 0.12, 1e-9);
    near(a_batch(new, "mass.to.flammable.machining-oil"), 0.99 * 0.002, 1e-9);
}

/// White spirit dries off; CO2 goes back but for what the compressor leaves in the vessel and the wood keeps.
#[test]
fn timber_preservation() {
    let account = accounted("timber-preservation");
    let old = route(&account, 0, "White spirit");
    near(a_batch(old, "mass.to.hood.white-spirit"), 24.0, 1e-9);
    near(a_batch(old, "mass.to.product.white-spirit"), 3.0, 1e-9);
    near(a_batch(old, "mass.returned.white-spirit"), 0.78 * 400.0 - 27.0, 1e-6);
    near(a_batch(old, "mass.to.product.preservative"), 0.72, 1e-9);
    let new = route(&account, 0, "CO2");
    near(a_batch(new, "mass.to.product.preservative"), 0.9 * 0.8, 1e-9);
    near(a_batch(new, "mass.returned.preservative"), 0.1 * 0.8, 1e-9);
    let void_l = 4000.0 - 600.0 / 1.5;
    near(a_batch(new, "co2.used"), 0.6577 * void_l, 1e-3);
    near(a_batch(new, "co2.vented"), 0.00928 * void_l, 2e-3);
    near(a_batch(new, "mass.to.product.carbon-dioxide"), 0.01 * (600.0 + 0.72), 1e-6);
}
