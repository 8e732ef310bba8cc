//! From enthalpy, entropy or a closed volume back to the state.
use super::table::{assert_close, number, rows};
use thimbleworth::co2::{
    self, Phases, StateError, isochoric_pressure_pa, saturated_states, saturation_temperature_k, state,
    state_from_enthalpy, state_from_entropy,
};

/// The states of the reference table, by their enthalpy and entropy as printed there by another program.
#[test]
fn the_reference_states_come_back() {
    let mut compared = 0;
    for row in rows(include_str!("states.csv")) {
        let [temperature_k, pressure_pa, density, h, s] = std::array::from_fn(|i| number(row[i + 2]));
        // Saturated states have no condition number; near the critical point density follows no more from enthalpy.
        if row[1] != "-" {
            continue;
        }
        let condition = number(row[11]);
        if condition > 100.0 {
            continue;
        }
        compared += 1;
        let what = format!("{} at {temperature_k} K, {pressure_pa} Pa", row[0]);
        for found in [state_from_enthalpy(h, pressure_pa), state_from_entropy(s, pressure_pa)] {
            let found = found.unwrap_or_else(|error| panic!("{what}: {error}"));
            assert_close(found.temperature_k, temperature_k, 1e-7, &what);
            assert_close(found.density_kg_m3, density, 1e-6 * (1.0 + condition), &what);
            assert!(matches!(found.phases, Phases::Single(_)), "{what}");
        }
    }
    assert!(compared > 120, "{compared}");
}

/// A grid over liquid, gas and supercritical states: back to the temperature that was put in.
#[test]
fn a_grid_comes_back() {
    let mut compared = 0;
    for t in 0..45 {
        let temperature_k = 217.0 + 3.7 * f64::from(t) * (1.0 + 0.1 * f64::from(t));
        for p in 0..45 {
            let pressure_pa = 1e4 * (0.25 * f64::from(p)).exp();
            let Ok(there) = state(temperature_k, pressure_pa) else { continue };
            compared += 1;
            let h = state_from_enthalpy(there.enthalpy_j_kg, pressure_pa).unwrap();
            let s = state_from_entropy(there.entropy_j_kg_k, pressure_pa).unwrap();
            for found in [h, s] {
                let off = (found.temperature_k - temperature_k).abs();
                assert!(off < 1e-7, "{temperature_k} K, {pressure_pa} Pa: {off:e}");
                assert_eq!(found.phases, Phases::Single(there.phase));
            }
        }
    }
    assert!(compared > 1500, "{compared}");
}

/// Definition of the quality: on the line between the saturated states.
#[test]
fn liquid_and_vapour_side_by_side() {
    for pressure_pa in [6e5, 20e5, 50e5, 70e5, 73.5e5] {
        let boiling_k = saturation_temperature_k(pressure_pa).unwrap();
        let (liquid, vapour) = saturated_states(boiling_k).unwrap();
        // At equilibrium h − T s is the same in both phases.
        let heat = boiling_k * (vapour.entropy_j_kg_k - liquid.entropy_j_kg_k);
        assert_close(vapour.enthalpy_j_kg - liquid.enthalpy_j_kg, heat, 1e-6, "Δh = T Δs");
        for share in [0.0, 0.25, 0.5, 0.999] {
            let h = liquid.enthalpy_j_kg + share * (vapour.enthalpy_j_kg - liquid.enthalpy_j_kg);
            let s = liquid.entropy_j_kg_k + share * (vapour.entropy_j_kg_k - liquid.entropy_j_kg_k);
            let volume = 1.0 / liquid.density_kg_m3
                + share * (1.0 / vapour.density_kg_m3 - 1.0 / liquid.density_kg_m3);
            for found in [state_from_enthalpy(h, pressure_pa), state_from_entropy(s, pressure_pa)] {
                let found = found.unwrap();
                let Phases::LiquidAndVapour { vapour_share } = found.phases else { panic!("{found:?}") };
                assert!((vapour_share - share).abs() < 1e-9);
                assert_eq!(found.temperature_k, boiling_k);
                assert_close(found.density_kg_m3, 1.0 / volume, 1e-8, "density");
            }
        }
    }
}

/// Just outside the saturation line, on both sides, and through the neighbourhood of the critical point.
#[test]
fn beside_the_line_and_near_the_critical_point() {
    for pressure_pa in [30e5, 60e5, 73e5, 73.7e5] {
        let (liquid, vapour) = saturated_states(saturation_temperature_k(pressure_pa).unwrap()).unwrap();
        for d in [1e-6, 1e-3, 1.0, 1e3] {
            let under = state_from_enthalpy(liquid.enthalpy_j_kg - d, pressure_pa).unwrap();
            let over = state_from_enthalpy(vapour.enthalpy_j_kg + d, pressure_pa).unwrap();
            assert!(
                under.temperature_k <= liquid.temperature_k && over.temperature_k >= vapour.temperature_k
            );
            assert!((under.enthalpy_j_kg - liquid.enthalpy_j_kg + d).abs() < 1e-2, "{pressure_pa} {d}");
            assert!((over.enthalpy_j_kg - vapour.enthalpy_j_kg - d).abs() < 1e-2, "{pressure_pa} {d}");
        }
    }
    // 0.01 bar to 7 bar above the critical pressure, through the steepest part of the isobar.
    for pressure_pa in [73.78e5, 73.8e5, 74e5, 75e5, 80e5] {
        let (from, to) = (state(290.0, pressure_pa).unwrap(), state(330.0, pressure_pa).unwrap());
        let mut last_k = 0.0;
        for n in 0..=200 {
            let h = from.enthalpy_j_kg + (to.enthalpy_j_kg - from.enthalpy_j_kg) * f64::from(n) / 200.0;
            let found = state_from_enthalpy(h, pressure_pa).unwrap();
            assert!(found.temperature_k > last_k);
            assert!((found.enthalpy_j_kg - h).abs() < 1e-2, "{pressure_pa} Pa, {h} J/kg: {found:?}");
            last_k = found.temperature_k;
        }
    }
}

#[test]
fn refused() {
    let cold = state(216.592, 1e5).unwrap().enthalpy_j_kg;
    let error = state_from_enthalpy(cold - 1000.0, 1e5).unwrap_err();
    assert!(matches!(error, StateError::Enthalpy { below: true, .. }), "{error}");
    assert_eq!(
        error.to_string().split(';').nth(1).unwrap(),
        " below that a part of it is solid, which the equation cannot describe: state a higher value or pressure"
    );
    let hot = state(1100.0, 1e7).unwrap();
    let error = state_from_entropy(hot.entropy_j_kg_k + 1.0, 1e7).unwrap_err();
    assert!(matches!(error, StateError::Entropy { below: false, .. }), "{error}");
    for pressure_pa in [f64::NAN, 0.0, -1.0, 900e6] {
        assert!(matches!(state_from_enthalpy(0.0, pressure_pa), Err(StateError::Pressure { .. })));
    }
    for pressure_pa in [1e5, 50e5, 300e5] {
        for value in [f64::NAN, f64::INFINITY, f64::NEG_INFINITY] {
            assert!(state_from_enthalpy(value, pressure_pa).is_err(), "{pressure_pa} {value}");
            assert!(state_from_entropy(value, pressure_pa).is_err(), "{pressure_pa} {value}");
        }
    }
    assert_eq!(saturation_temperature_k(1e5), Err(StateError::NoBoiling { pressure_pa: 1e5 }));
}

/// CoolProp 8.0.0: liquid of 917.16 kg/m³ (5 °C, 60 bar) has about 205 bar at 25 °C.
#[test]
fn liquid_between_two_valves() {
    let density = co2::density_kg_m3(278.15, 60e5).unwrap();
    assert_close(density, 917.1625430905038, 1e-9, "density, CoolProp 8.0.0");
    let warm_pa = isochoric_pressure_pa(density, 298.15).unwrap();
    assert_close(warm_pa, 205e5, 0.005, "pressure at 25 °C");
    // The other way about: at that pressure and 25 °C the density is the one shut in.
    assert_close(
        co2::density_kg_m3(298.15, warm_pa).unwrap(),
        density,
        1e-11,
        "density at the warm pressure",
    );
    // With a bubble left, the pressure is that of saturation.
    assert_eq!(isochoric_pressure_pa(500.0, 290.0), co2::saturation_pressure_pa(290.0));
}
