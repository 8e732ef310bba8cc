//! A nitrogen stream over a vial.
use super::close;
use thimbleworth::emission::{EmissionError, check_time, gas_to_carry_mol, least_time_s, self_cooling};
use thimbleworth::material::catalogue;
use thimbleworth::mixture::{Component, Hold, Mixture, Pairs};

const ATM: f64 = 101_325.0;

// 10 mL of hexane at 25 °C, 0.5 L/min: by hand 6.55 g, 76 mmol; p 20.19 kPa; gas 0.305 mol, 7.47 L, 15 min. Five minutes are impossible.
#[test]
fn five_minutes_for_10_ml_of_hexane_are_impossible() {
    let hexane = catalogue().find("hexane").unwrap();
    let pairs = Pairs::between(&[hexane]).unwrap();
    let components = [Component::of(hexane, 298.15).unwrap()];
    let mixture = Mixture::new(&components, &pairs).unwrap();
    let mol = 10e-6 / components[0].molar_volume_m3_mol();
    let end = mixture.distil_batch(&[mol], 0.0, Hold::Temperature(298.15)).unwrap();
    let gas = end.carrier_mol(ATM);
    let p = components[0].vapour_pressure_pa(298.15).unwrap();
    close(gas, gas_to_carry_mol(mol, p, ATM, 298.15).unwrap(), 1e-6, "one liquid");
    let least = least_time_s(gas, 0.5e-3 / 60.0, ATM, 298.15).unwrap();
    close(least / 60.0, 14.9, 0.01, "least time, min");
    assert!(matches!(check_time(300.0, least), Err(EmissionError::Impossible { .. })));
    assert!(check_time(1800.0, least).is_ok());
}

// Witness: the adiabatic saturation temperature of water in dry air at 25 °C and 1 atm is its thermodynamic wet-bulb temperature, 8.2 °C for 0 %
// relative humidity (psychrometric chart, from memory: 8 °C). Nitrogen's heat capacity is that of air within 0.1 %.
#[test]
fn water_cools_to_its_wet_bulb() {
    let water = catalogue().find("water").unwrap();
    let cooling = self_cooling(298.15, ATM, 2.478e6 * 0.018_015, 273.16, |t| {
        Ok(water.vapour_pressure.value(t, &water.name, "vapour pressure")?)
    })
    .unwrap();
    assert!((cooling.adiabatic_k - 273.15 - 8.2).abs() < 0.5, "{}", cooling.adiabatic_k - 273.15);
}

// The balance of energy holds at the temperature found, and solvents cool below freezing, the volatile the furthest.
#[test]
fn the_balance_of_energy_holds() {
    let mut last = 300.0;
    for (name, lowest) in
        [("ethanol", 240.0), ("hexane", 241.0), ("acetone", 241.0), ("dichloromethane", 200.0)]
    {
        let s = catalogue().find(name).unwrap();
        let p = |t: f64| s.vapour_pressure_pa(t).unwrap().value;
        let heat = s.heat_of_vaporisation_j_kg(283.15).unwrap().value * super::molar_mass(name);
        let found = self_cooling(298.15, ATM, heat, lowest, |t| Ok(p(t))).unwrap();
        let t = found.adiabatic_k;
        close(heat * p(t) / (ATM - p(t)), 3.5 * 8.314_462_618 * (298.15 - t), 1e-9, name);
        close(found.heat_j_mol, heat * p(298.15) / (ATM - p(298.15)), 1e-12, name);
        println!("{name} {:.1} °C", t - 273.15);
        assert!(t < last, "{name}");
        last = t;
    }
    assert!(last < 253.15);
}
