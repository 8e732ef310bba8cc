//! The same energies by integration, without enthalpies: w = ∫ dp/ρ along the isentrope, q = ∫ c_p dT along the isobar.
use super::table::assert_close;
use thimbleworth::co2::{state, state_from_entropy};
use thimbleworth::co2_loop::{ClosedLoop, Heating, Kind, OpenLoop, Utilities, compress, pump};

/// Gauss and Legendre's rule with five points (abscissas and weights: Abramowitz and Stegun, table 25.4, from memory;
/// checked below on x⁹).
fn integral(low: f64, high: f64, pieces: u32, of: impl Fn(f64) -> f64) -> f64 {
    const RULE: [(f64, f64); 3] = [
        (0.0, 0.568_888_888_888_888_9),
        (0.538_469_310_105_683_1, 0.478_628_670_499_366_5),
        (0.906_179_845_938_664, 0.236_926_885_056_189_1),
    ];
    let half = 0.5 * (high - low) / f64::from(pieces);
    let mut sum = 0.0;
    for piece in 0..pieces {
        let middle = low + half * (2.0 * f64::from(piece) + 1.0);
        for (x, weight) in RULE {
            sum += half * weight * of(middle + half * x);
            if x > 0.0 {
                sum += half * weight * of(middle - half * x);
            }
        }
    }
    sum
}

#[test]
fn the_rule_itself() {
    assert!((integral(0.0, 2.0, 1, |x| x.powi(9)) - 102.4).abs() < 1e-9);
}

#[test]
fn work_is_the_volume_along_the_isentrope() {
    let liquid = state(278.15, 60e5).unwrap();
    let gas = state(298.15, 50e5).unwrap();
    for (inlet, lift) in [
        (liquid, pump(&liquid.into(), 300e5, 1.0).unwrap()),
        (liquid, pump(&liquid.into(), 500e5, 1.0).unwrap()),
        (gas, compress(&gas.into(), 100e5, 1.0).unwrap()),
    ] {
        let volume =
            |pressure_pa| 1.0 / state_from_entropy(inlet.entropy_j_kg_k, pressure_pa).unwrap().density_kg_m3;
        let work = integral(inlet.pressure_pa, lift.pressure_pa, 4, volume);
        assert_close(lift.work_j_kg, work, 1e-6, "∫ dp/ρ");
    }
}

#[test]
fn heat_is_the_heat_capacity_along_the_isobar() {
    let found = OpenLoop::default().energies().unwrap();
    let heat = |pressure_pa: f64, from_k: f64, to_k: f64| {
        integral(from_k, to_k, 8, |t| state(t, pressure_pa).unwrap().heat_capacity_j_kg_k)
    };
    let chilled = heat(60e5, 293.15, 278.15);
    assert_close(found.leg_named("chill").unwrap().energy_j_kg, chilled, 1e-6, "chill");
    let pumped = found.point("pump out").unwrap().state().unwrap();
    let preheat = heat(300e5, pumped.temperature_k, 333.15);
    assert_close(found.leg_named("preheat").unwrap().energy_j_kg, preheat, 1e-6, "preheat");
}

/// Recomputed apart with CoolProp 8.0.0: a loss-free pump from 5 °C and 50 bar to 100 to 500 bar takes 5.5, 16.1, 26.5, 36.7 and
/// 46.7 kJ/kg; with 0.6 and a COP of 3, (26.5/0.6 + 232/3)/3600 = 0.034 kWh/kg. Cooling is the larger part.
#[test]
fn pumping_is_the_smaller_part() {
    let liquid = state(278.15, 50e5).unwrap().into();
    for (bar, kj) in [(100.0, 5.5), (200.0, 16.1), (300.0, 26.5), (400.0, 36.7), (500.0, 46.7)] {
        let ideal = pump(&liquid, bar * 1e5, 0.6).unwrap().ideal_j_kg / 1e3;
        assert!((ideal - kj).abs() < 0.05, "{bar} bar: {ideal}");
    }
    let found =
        ClosedLoop { pump_efficiency: 0.6, extraction_temperature_k: 313.15, ..ClosedLoop::default() }
            .energies()
            .unwrap();
    let utilities = Utilities { drive_efficiency: 1.0, cooling_cop: 3.0, heating: Heating::NotElectric };
    let drawn = utilities.drawn(&found).unwrap();
    // (26.5/0.6 + 232/3)/3600 kWh/kg
    assert!((drawn.total_j_kg() / 3.6e6 - 0.0338).abs() < 1e-4, "{drawn:?}");
    assert!(drawn.drives_j_kg < drawn.coolers_j_kg);
    assert_eq!(drawn.other_heat_j_kg, found.sum_j_kg(Kind::Heat));
    for cooling_cop in [0.0, -1.0, 51.0, f64::NAN] {
        assert!(Utilities { cooling_cop, ..utilities }.drawn(&found).is_err());
    }
    let pumped = Utilities { heating: Heating::Electric { ratio: 4.0 }, ..utilities }.drawn(&found).unwrap();
    assert_close(pumped.heaters_j_kg * 4.0, drawn.other_heat_j_kg, 1e-15, "heat pump");
}
