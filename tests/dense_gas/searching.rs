//! The search for the best state.
use thimbleworth::co2_loop::{ClosedLoop, Heating, Utilities};
use thimbleworth::dense_gas::DenseGasError;
use thimbleworth::dense_gas::chrastil::{Chrastil, Range};
use thimbleworth::dense_gas::need::{Curve, Solubility, Target};
use thimbleworth::dense_gas::search::{Limit, Side, Window, least, least_energy, least_solvent};

const WINDOW: Window = Window { temperature_k: [308.15, 353.0], pressure_pa: [15e6, 40e6] };
const OIL: Target = Target { solute_kg_kg: 0.2, recovery: 0.95, curve: Curve::Saturated };
const MACHINES: Utilities =
    Utilities { drive_efficiency: 0.9, cooling_cop: 3.0, heating: Heating::Electric { ratio: 1.0 } };

/// Known minima: a bent, narrow valley (Rosenbrock's, least at (1, 1)), and a slope whose least is in a corner.
#[test]
fn known_minima() {
    let window = Window { temperature_k: [300.0, 303.0], pressure_pa: [10e6, 13e6] };
    let scaled = |t: f64, p: f64| (t - 300.7, p / 1e6 - 10.4);
    let valley = |t: f64, p: f64| {
        let (x, y) = scaled(t, p);
        Some((1.0 - x).powi(2) + 100.0 * (y - x * x).powi(2))
    };
    let found = least(&window, valley).unwrap();
    let (x, y) = scaled(found.temperature_k, found.pressure_pa);
    assert!((x - 1.0).abs() < 5e-3 && (y - 1.0).abs() < 1e-2 && found.least < 2e-5, "{found:?}");
    assert!(found.on.is_empty() && found.refused == 0);

    let corner = least(&window, |t, p| Some(t - p / 1e6)).unwrap();
    assert_eq!((corner.temperature_k, corner.pressure_pa), (300.0, 13e6));
    assert_eq!(corner.on, [(Side::LowestTemperature, Limit::Window), (Side::HighestPressure, Limit::Window)]);
    // A refused half: the least lies against it, and the search says that this is no optimum.
    let half = least(&window, |t, p| (t < 301.4).then_some(-t + p / 1e6)).unwrap();
    assert!((half.temperature_k - 301.4).abs() < 1e-3 && half.refused > 0);
    assert_eq!(half.on, [(Side::HighestTemperature, Limit::Range), (Side::LowestPressure, Limit::Window)]);
}

/// A fine grid in small steps, the second way.
#[test]
fn an_oil_needs_least_at_the_highest_pressure() {
    let found = least_solvent(&WINDOW, &Solubility::VegetableOil, &OIL).unwrap();
    let mut best = (f64::INFINITY, 0.0, 0.0);
    for t in 0..=300 {
        for p in 0..=100 {
            let (temperature_k, pressure_pa) =
                (308.15 + 44.85 * f64::from(t) / 300.0, 15e6 + 0.25e6 * f64::from(p));
            let loading = Solubility::VegetableOil.loading_kg_kg(temperature_k, pressure_pa).unwrap();
            let need = OIL.solvent_kg_kg(loading).unwrap();
            if need < best.0 {
                best = (need, temperature_k, pressure_pa);
            }
        }
    }
    assert!(found.least <= best.0 && found.least > 0.999 * best.0, "{found:?} {best:?}");
    assert_eq!(found.pressure_pa, 40e6);
    assert!((found.temperature_k - best.1).abs() < 0.2, "{found:?} {best:?}");
    assert!(found.on.contains(&(Side::HighestPressure, Limit::Window)));
    assert_eq!(found, least_solvent(&WINDOW, &Solubility::VegetableOil, &OIL).unwrap());
}

/// Energy counts heating and cooling of every kilogram passed through: no colder state than that of least carbon dioxide, and
/// its need times its energy for a kilogram.
#[test]
fn least_energy_of_a_loop() {
    let around = ClosedLoop::default();
    let found = least_energy(&WINDOW, &Solubility::VegetableOil, &OIL, &around, &MACHINES).unwrap();
    let value = |extraction_temperature_k: f64, extraction_pressure_pa: f64| {
        let loading =
            Solubility::VegetableOil.loading_kg_kg(extraction_temperature_k, extraction_pressure_pa).unwrap();
        let state = ClosedLoop { extraction_temperature_k, extraction_pressure_pa, ..around };
        OIL.solvent_kg_kg(loading).unwrap() * MACHINES.drawn(&state.energies().unwrap()).unwrap().total_j_kg()
    };
    assert_eq!(found.least, value(found.temperature_k, found.pressure_pa));
    let solvent = least_solvent(&WINDOW, &Solubility::VegetableOil, &OIL).unwrap();
    assert!(found.least <= value(solvent.temperature_k, solvent.pressure_pa));
    for t in 0..=20 {
        for p in 0..=20 {
            let here = value(308.15 + 44.85 * f64::from(t) / 20.0, 15e6 + 1.25e6 * f64::from(p));
            assert!(found.least <= here * (1.0 + 1e-12));
        }
    }
    let broken = Utilities { cooling_cop: 0.0, ..MACHINES };
    let refused = least_energy(&WINDOW, &Solubility::VegetableOil, &OIL, &around, &broken);
    assert!(matches!(refused, Err(DenseGasError::Loop(_))), "{refused:?}");
}

/// With constants that have a range, the search stays inside it and says that it ended there.
#[test]
fn constants_with_a_range_end_the_search() {
    let range = Range { density_kg_m3: [600.0, 850.0], temperature_k: [313.15, 333.15] };
    let solute = Solubility::Chrastil(Chrastil { k: 6.0, a_k: -4000.0, b: -27.0, range: Some(range) });
    let slow = Target { curve: Curve::BrokenAndIntact { intact_share: 0.4, fast: 2.0, slow: 0.2 }, ..OIL };
    let found = least_solvent(&WINDOW, &solute, &slow).unwrap();
    assert!(found.temperature_k <= 333.15 && found.refused > 0);
    assert!(found.on.iter().any(|(_, limit)| *limit == Limit::Range), "{found:?}");
    let density = thimbleworth::co2::density_kg_m3(found.temperature_k, found.pressure_pa).unwrap();
    assert!(density <= 850.0);

    let elsewhere = Window { temperature_k: [340.0, 350.0], ..WINDOW };
    let none = least_solvent(&elsewhere, &solute, &slow);
    assert!(matches!(none, Err(DenseGasError::NothingFound { tried: 1089 })), "{none:?}");
    let reversed = Window { temperature_k: [350.0, 340.0], ..WINDOW };
    assert!(matches!(least_solvent(&reversed, &solute, &slow), Err(DenseGasError::OutOfRange { .. })));
    // A fixed temperature is a window too.
    let fixed = Window { temperature_k: [320.0, 320.0], pressure_pa: [15e6, 30e6] };
    assert_eq!(least_solvent(&fixed, &Solubility::VegetableOil, &OIL).unwrap().temperature_k, 320.0);
}
