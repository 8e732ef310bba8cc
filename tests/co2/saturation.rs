//! The saturation line, and that no root between its densities is ever returned.
use super::naive::Equation;
use super::table::{assert_close, number, rows};
use thimbleworth::co2::{self, Phase, StateError};

#[test]
fn against_the_exact_solution() {
    let table = rows(include_str!("saturation.csv"));
    assert_eq!(table.len(), 51);
    for row in &table {
        let [temperature_k, pressure_pa, liquid, vapour] = std::array::from_fn(|i| number(row[i]));
        let what = format!("at {temperature_k} K");
        let (found_liquid, found_vapour) = co2::saturated_densities_kg_m3(temperature_k).unwrap();
        let density_allowed = if temperature_k < 304.0 { 1e-10 } else { 1e-8 };
        assert_close(co2::saturation_pressure_pa(temperature_k).unwrap(), pressure_pa, 1e-11, &what);
        assert_close(found_liquid, liquid, density_allowed, &what);
        assert_close(found_vapour, vapour, density_allowed, &what);
    }
}

#[test]
fn both_phases_have_one_pressure_and_one_gibbs_energy() {
    // The condition itself, by the term-by-term evaluation, between the points of the exact table.
    let equation = Equation::read();
    for n in 0..400 {
        let temperature_k = 216.6 + 87.5 * f64::from(n) / 400.0;
        let (liquid, vapour) = co2::saturated_densities_kg_m3(temperature_k).unwrap();
        let pressure_pa = co2::saturation_pressure_pa(temperature_k).unwrap();
        let what = format!("at {temperature_k} K");
        assert_close(equation.pressure_pa(temperature_k, vapour), pressure_pa, 1e-9, &what);
        assert_close(equation.pressure_pa(temperature_k, liquid), pressure_pa, 1e-9, &what);
        let gap = equation.gibbs(temperature_k, liquid) - equation.gibbs(temperature_k, vapour);
        assert!(gap.abs() < 1e-8, "{what}: {gap:e}");
    }
}

#[test]
fn measured_saturation_states() {
    // The equation was fitted to these measurements among others; they show that it is CO2, not that it is exact.
    for row in rows(include_str!("saturation_measured.csv")) {
        let [temperature_k, pressure_mpa, vapour, liquid] = std::array::from_fn(|i| number(row[i]));
        let (found_liquid, found_vapour) = co2::saturated_densities_kg_m3(temperature_k).unwrap();
        assert_close(
            co2::saturation_pressure_pa(temperature_k).unwrap() / 1e6,
            pressure_mpa,
            1e-3,
            "pressure",
        );
        assert_close(found_liquid, liquid, 3e-3, "liquid");
        assert_close(found_vapour, vapour, 3e-3, "vapour");
    }
}

#[test]
fn the_spurious_root_is_refused() {
    // At 274.774 K and 30.956 MPa the equation has three roots, near 484.7, 753 and 1051.8 kg/m³ (own scan); at the
    // first the pressure rises with density, as it does in a real state. The last is the density of the liquid.
    let equation = Equation::read();
    let pressure_pa = |density| equation.pressure_pa(274.774, density);
    assert!(pressure_pa(484.6) < 30.956e6 && pressure_pa(484.8) > 30.956e6);
    assert!(pressure_pa(752.0) > 30.956e6 && pressure_pa(754.0) < 30.956e6);
    assert_close(co2::density_kg_m3(274.774, 30.956e6).unwrap(), 1051.8, 1e-4, "density");
}

#[test]
fn never_a_density_between_those_of_the_saturated_phases() {
    let mut states = 0;
    for n in 0..200 {
        let temperature_k = 216.7 + 87.42 * f64::from(n) / 199.0;
        let saturation_pa = co2::saturation_pressure_pa(temperature_k).unwrap();
        let melting_pa = co2::melting_pressure_pa(temperature_k).unwrap();
        let (liquid, vapour) = co2::saturated_densities_kg_m3(temperature_k).unwrap();
        for m in 0..60 {
            // From 1e-8 to 1e4 times the saturation pressure away from it.
            let away = 10_f64.powf(-8.0 + 0.2 * f64::from(m));
            let above_pa = saturation_pa * (1.0 + away);
            if above_pa < melting_pa {
                let (density, phase) = co2::density_and_phase(temperature_k, above_pa).unwrap();
                assert!(density > liquid * (1.0 - 1e-7), "{temperature_k} K, {above_pa} Pa: {density}");
                assert_eq!(phase, Phase::Liquid);
                states += 1;
            }
            if away < 1.0 {
                let below_pa = saturation_pa * (1.0 - away);
                let (density, phase) = co2::density_and_phase(temperature_k, below_pa).unwrap();
                assert!(density < vapour * (1.0 + 1e-7), "{temperature_k} K, {below_pa} Pa: {density}");
                assert_eq!(phase, Phase::Gas);
                states += 1;
            }
        }
    }
    assert!(states > 10_000, "{states}");
}

#[test]
fn on_the_line_both_densities_are_named() {
    let saturation_pa = co2::saturation_pressure_pa(293.15).unwrap();
    for pressure_pa in [saturation_pa, saturation_pa * (1.0 + 5e-10), saturation_pa * (1.0 - 5e-10)] {
        let Err(StateError::TwoPhase { liquid_kg_m3, vapour_kg_m3, .. }) = co2::state(293.15, pressure_pa)
        else {
            panic!("{pressure_pa} Pa was not refused");
        };
        assert_close(liquid_kg_m3, 773.39, 1e-4, "liquid");
        assert_close(vapour_kg_m3, 194.20, 1e-4, "vapour");
    }
    let Err(StateError::TwoPhase { saturation_pressure_pa, .. }) = co2::pressure_pa(293.15, 500.0) else {
        panic!("a density between the phases was not refused");
    };
    assert_eq!(saturation_pressure_pa.to_bits(), saturation_pa.to_bits());
}

#[test]
fn a_steady_line_through_the_last_millikelvin() {
    // Down to the neighbouring double of the critical temperature: pressures rise, densities close, nothing fails.
    let mut last = (0.0, f64::INFINITY, 0.0);
    let mut distance = 1e-2;
    while distance > 1e-13 {
        let temperature_k = co2::CRITICAL_TEMPERATURE_K - distance;
        let pressure_pa = co2::saturation_pressure_pa(temperature_k).unwrap();
        let (liquid, vapour) = co2::saturated_densities_kg_m3(temperature_k).unwrap();
        assert!(pressure_pa > last.0 && pressure_pa <= co2::CRITICAL_PRESSURE_PA, "{distance:e}");
        assert!(liquid < last.1 && vapour > last.2 && liquid > vapour, "{distance:e}");
        last = (pressure_pa, liquid, vapour);
        for pressure_pa in [pressure_pa * (1.0 - 1e-7), pressure_pa * (1.0 + 1e-7)] {
            let density = co2::density_kg_m3(temperature_k, pressure_pa).unwrap();
            assert!(density > 300.0 && density < 700.0, "{distance:e}: {density}");
        }
        distance *= 0.5;
    }
    assert_eq!(
        co2::saturation_pressure_pa(co2::CRITICAL_TEMPERATURE_K),
        Err(StateError::NoSaturation { temperature_k: 304.1282 })
    );
}
