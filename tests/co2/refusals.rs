//! What is refused, and in which words.
use super::table::assert_close;
use thimbleworth::co2::{self, StateError};

#[test]
fn the_melting_line() {
    // Span and Wagner 1996: states of Table 35 that the paper puts on the melting line.
    assert_close(co2::melting_pressure_pa(327.673).unwrap(), 800e6, 1e-4, "327.673 K");
    assert_close(co2::melting_pressure_pa(226.679).unwrap(), 50e6, 1e-4, "226.679 K");
    assert_eq!(co2::melting_pressure_pa(330.0), Err(StateError::NoMelting { temperature_k: 330.0 }));
    assert!(co2::state(220.0, 15e6).is_ok());
    for (temperature_k, pressure_pa) in [(220.0, 20e6), (217.0, 5e6), (260.0, 300e6), (304.5, 700e6)] {
        let error = co2::state(temperature_k, pressure_pa).unwrap_err();
        assert!(matches!(error, StateError::Solid { .. }), "{error}");
        assert_eq!(co2::density_kg_m3(temperature_k, pressure_pa), Err(error));
    }
    assert!(matches!(co2::pressure_pa(220.0, 1400.0), Err(StateError::Solid { .. })));
}

#[test]
fn outside_the_range() {
    for temperature_k in [f64::NAN, f64::INFINITY, -1.0, 0.0, 216.591, 1100.1] {
        assert!(
            matches!(co2::state(temperature_k, 1e5), Err(StateError::Temperature { .. })),
            "{temperature_k}"
        );
        assert!(matches!(co2::pressure_pa(temperature_k, 1.0), Err(StateError::Temperature { .. })));
        assert!(matches!(co2::saturated_states(temperature_k), Err(StateError::Temperature { .. })));
        assert!(matches!(co2::melting_pressure_pa(temperature_k), Err(StateError::Temperature { .. })));
    }
    for pressure_pa in [f64::NAN, f64::INFINITY, -1e5, 0.0, 800.1e6] {
        assert!(matches!(co2::state(400.0, pressure_pa), Err(StateError::Pressure { .. })), "{pressure_pa}");
    }
    for density_kg_m3 in [f64::NAN, -1.0, 0.0, 1601.0] {
        assert!(matches!(co2::pressure_pa(400.0, density_kg_m3), Err(StateError::Density { .. })));
    }
    assert!(matches!(co2::viscosity_pa_s(99.0, 1.0), Err(StateError::Viscosity { .. })));
    assert!(matches!(co2::viscosity_pa_s(300.0, -1.0), Err(StateError::Viscosity { .. })));
    // The ends themselves belong to the range.
    assert!(co2::state(216.592, 1e5).is_ok() && co2::state(1100.0, 800e6).is_ok());
}

#[test]
fn where_the_isotherm_is_flat() {
    let error = co2::saturated_states(co2::CRITICAL_TEMPERATURE_K - 1e-9).unwrap_err();
    assert!(matches!(error, StateError::Critical { .. }), "{error}");
    assert!(co2::saturated_states(co2::CRITICAL_TEMPERATURE_K - 1e-3).is_ok());
}

#[test]
fn the_words() {
    let words = |result: Result<co2::State, StateError>| result.unwrap_err().to_string();
    assert_eq!(
        words(co2::state(195.15, 1e5)),
        "CO2 at -78.000 °C (195.150 K) is outside the equation of state, which holds from -56.558 °C (216.592 K) to \
         826.850 °C (1100.000 K); below it there is only solid and gas, and no liquid: state a higher temperature"
    );
    assert_eq!(
        words(co2::state(313.15, -1e5)),
        "CO2 at a pressure of -1.0000 bar (-100000 Pa) is outside the equation of state, which holds above 0 and up to \
         8000.0000 bar (800000000 Pa); state an absolute pressure in between"
    );
    assert_eq!(
        words(co2::state(220.0, 20e6)),
        "CO2 at -53.150 °C (220.000 K) and 200.0000 bar (20000000 Pa) is solid: at this temperature it freezes at \
         167.1871 bar (16718710 Pa); state a lower pressure or a higher temperature"
    );
    let saturation_pa = co2::saturation_pressure_pa(293.15).unwrap();
    assert_eq!(
        words(co2::state(293.15, saturation_pa)),
        "CO2 at 20.000 °C (293.150 K) boils at 57.2905 bar (5729053 Pa): liquid of 773.39 kg/m³ and vapour of \
         194.20 kg/m³ are both possible; state a pressure above it for the liquid or below it for the gas, or ask for \
         the saturated liquid or vapour"
    );
    assert_eq!(
        co2::saturation_pressure_pa(313.15).unwrap_err().to_string(),
        "CO2 at 40.000 °C (313.150 K) has no saturation pressure, since nothing boils from the critical temperature of \
         30.978 °C (304.128 K) upwards; state a lower temperature"
    );
}
