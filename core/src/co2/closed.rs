//! Carbon dioxide shut into a fixed volume: the pressure at a temperature, and the temperature at a pressure.

use super::coefficients::TRIPLE_TEMPERATURE_K;
use super::error::StateError;
use super::{HIGHEST_PRESSURE_PA, HIGHEST_TEMPERATURE_K, pressure_pa};

/// Pressure of a closed, rigid volume filled to a mean density, kg/m³, at a temperature, K; in Pa.
///
/// Liquid alone, gas alone or both: with both in it the pressure is the saturation pressure. It is the pressure that
/// liquid reaches when it is shut in between two valves and warms up: from 5 °C and 60 bar some 7 bar for each kelvin.
/// Pipework gives way a little and seals leak, so the real pressure may be lower; it is the figure to protect against.
/// **Caution:** every length that two valves can shut in needs its own relief, by local codes and licensed practice.
///
/// Range: 216.592 K to 1100 K, densities above 0 up to 1600 kg/m³, pressures up to 800 MPa or the melting line.
///
/// # Errors
/// [`StateError::Temperature`], [`StateError::Density`], [`StateError::Pressure`], [`StateError::Solid`].
///
/// ```
/// use thimbleworth::co2::{density_kg_m3, isochoric_pressure_pa};
/// let shut_in = density_kg_m3(278.15, 60e5)?;
/// let warm_pa = isochoric_pressure_pa(shut_in, 298.15)?;
/// assert!((warm_pa / 1e5 - 205.0).abs() < 1.0, "{warm_pa}");
/// // A cylinder three quarters full by mass holds both phases: its pressure is the saturation pressure.
/// assert!((isochoric_pressure_pa(750.0, 283.15)? / 1e5 - 45.02).abs() < 0.01);
/// # Ok::<(), thimbleworth::co2::StateError>(())
/// ```
pub fn isochoric_pressure_pa(density_kg_m3: f64, temperature_k: f64) -> Result<f64, StateError> {
    match pressure_pa(temperature_k, density_kg_m3) {
        Err(StateError::TwoPhase { saturation_pressure_pa, .. }) => Ok(saturation_pressure_pa),
        other => other,
    }
}

/// Temperature at which a closed, rigid volume filled to a mean density, kg/m³, reaches a pressure, Pa; in K.
///
/// The inverse of [`isochoric_pressure_pa`], solved to 1e-12 of the temperature: when a relief opens, when a cylinder
/// becomes full of liquid. Range as there.
///
/// # Errors
/// [`StateError::Pressure`] also where the pressure is not reached up to 1100 K, or is exceeded at the coldest fluid
/// state of that density already; [`StateError::Density`].
///
/// ```
/// use thimbleworth::co2::{density_kg_m3, isochoric_temperature_k};
/// // Shut in at 5 °C and 60 bar, a relief set to 100 bar opens at 11 °C.
/// let opens_k = isochoric_temperature_k(density_kg_m3(278.15, 60e5)?, 100e5)?;
/// assert!((opens_k - 273.15 - 10.9).abs() < 0.5, "{opens_k}");
/// # Ok::<(), thimbleworth::co2::StateError>(())
/// ```
pub fn isochoric_temperature_k(density_kg_m3: f64, pressure_pa: f64) -> Result<f64, StateError> {
    if !(pressure_pa > 0.0 && pressure_pa <= HIGHEST_PRESSURE_PA) {
        return Err(StateError::Pressure { pressure_pa });
    }
    let (mut low, mut high) = (TRIPLE_TEMPERATURE_K, HIGHEST_TEMPERATURE_K);
    // A pressure too high for the equation or a frozen state lie beyond the wanted one, on the hot and the cold side.
    let beyond = |temperature_k: f64| -> Result<bool, StateError> {
        match isochoric_pressure_pa(density_kg_m3, temperature_k) {
            Ok(found) => Ok(found > pressure_pa),
            Err(StateError::Pressure { .. }) => Ok(true),
            Err(StateError::Solid { .. }) => Ok(false),
            Err(error) => Err(error),
        }
    };
    if beyond(low)? || !beyond(high)? {
        return Err(StateError::Pressure { pressure_pa });
    }
    // Halving: the pressure has a kink where the last bubble or drop goes, and this is no hot path.
    while high - low > 1e-12 * low {
        let middle = 0.5 * (low + high);
        if middle <= low || middle >= high {
            break;
        }
        if beyond(middle)? {
            high = middle;
        } else {
            low = middle;
        }
    }
    // The upper end is the fluid one if a frozen state lies next to the lower one.
    let found = isochoric_pressure_pa(density_kg_m3, high)?;
    if (found / pressure_pa - 1.0).abs() > 1e-6 {
        return Err(StateError::Pressure { pressure_pa });
    }
    Ok(high)
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::co2::density_kg_m3;

    #[test]
    fn temperature_and_pressure_of_a_closed_volume_are_inverse() {
        for density in [2.0, 100.0, 300.0, 467.6, 750.0, 900.0, 1100.0] {
            for temperature_k in [220.0, 270.0, 300.0, 304.0, 320.0, 400.0] {
                let Ok(pressure) = isochoric_pressure_pa(density, temperature_k) else { continue };
                let found = isochoric_temperature_k(density, pressure).unwrap();
                assert!((found - temperature_k).abs() < 1e-6, "{density} {temperature_k}: {found}");
            }
        }
    }

    #[test]
    fn what_is_never_reached_is_refused() {
        let gas = density_kg_m3(293.15, 1e5).unwrap();
        assert!(matches!(isochoric_temperature_k(gas, 50e5), Err(StateError::Pressure { .. })));
        assert!(matches!(isochoric_temperature_k(1000.0, 1e5), Err(StateError::Pressure { .. })));
        assert!(matches!(isochoric_temperature_k(0.0, 1e5), Err(StateError::Density { .. })));
    }
}
