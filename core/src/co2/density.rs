//! The density at a temperature and pressure: Halley's method in ln δ inside an interval that holds one root.

use super::boundary::{self, MELTING_ROUNDING, OnSaturation, Phase};
use super::coefficients::{CRITICAL_DENSITY_KG_M3, CRITICAL_PRESSURE_PA, CRITICAL_TEMPERATURE_K};
use super::error::StateError;
use super::isotherm::Isotherm;
use super::start::Start;
use super::{HIGHEST_DENSITY_KG_M3, HIGHEST_PRESSURE_PA};
use crate::exponential::exp;

/// A pressure this close to the saturation pressure, relatively, is on the saturation line: a hundred times the error
/// of the fitted line.
const ON_THE_LINE: f64 = 1e-9;

/// Halving the interval alone would reach rounding in about 60 steps; two or three of Halley's do.
const STEPS: u32 = 80;

/// Relative error in δ that the last step may leave, by an estimate that errs on the safe side.
const LEFT_OVER: f64 = 2e-13;

/// Density of carbon dioxide, kg/m³.
///
/// Span and Wagner's equation of state of 1996, solved for the density. Range: 216.592 K to 1100 K, pressures
/// above 0 up to 800 MPa or the melting line. Stated uncertainty of the equation in density: 0.03 % to 0.05 % up to
/// 30 MPa and 523 K (abstract of the source, from memory).
///
/// Below the critical temperature a root between the densities of saturated liquid and vapour is never returned: the
/// saturation pressure decides the phase, and the search stays on its side.
///
/// # Errors
/// [`StateError::Temperature`], [`StateError::Pressure`], [`StateError::Solid`], and [`StateError::TwoPhase`] where
/// the pressure is the saturation pressure to within 1e-9 of it.
///
/// ```
/// // US EPA SW-846 method 3562 extracts at 80 °C and 305 bar and states 0.75 g/mL.
/// let density_kg_m3 = thimbleworth::co2::density_kg_m3(353.15, 30.5e6)?;
/// assert!((density_kg_m3 - 750.5).abs() < 0.05);
/// # Ok::<(), thimbleworth::co2::StateError>(())
/// ```
#[inline]
pub fn density_kg_m3(temperature_k: f64, pressure_pa: f64) -> Result<f64, StateError> {
    Ok(density_and_phase(temperature_k, pressure_pa)?.0)
}

/// Density, kg/m³, and phase; as [`density_kg_m3`].
///
/// # Errors
/// As for [`density_kg_m3`].
///
/// ```
/// use thimbleworth::co2::{Phase, density_and_phase};
/// let (density_kg_m3, phase) = density_and_phase(277.15, 6.0e6)?;
/// assert!((density_kg_m3 - 923.66).abs() < 0.01);
/// assert_eq!(phase, Phase::Liquid);
/// # Ok::<(), thimbleworth::co2::StateError>(())
/// ```
pub fn density_and_phase(temperature_k: f64, pressure_pa: f64) -> Result<(f64, Phase), StateError> {
    let (delta, phase) = reduced_density(temperature_k, pressure_pa)?;
    Ok((delta * CRITICAL_DENSITY_KG_M3, phase))
}

#[inline]
pub(super) fn reduced_density(temperature_k: f64, pressure_pa: f64) -> Result<(f64, Phase), StateError> {
    boundary::check_temperature(temperature_k)?;
    if !(pressure_pa > 0.0 && pressure_pa <= HIGHEST_PRESSURE_PA) {
        return Err(StateError::Pressure { pressure_pa });
    }
    let isotherm = Isotherm::new(temperature_k);
    let unit_pa = isotherm.unit_pa;
    let (start, phase) = if temperature_k >= CRITICAL_TEMPERATURE_K {
        let phase = if pressure_pa >= CRITICAL_PRESSURE_PA { Phase::Supercritical } else { Phase::Gas };
        (Start::hot(temperature_k, pressure_pa, unit_pa), phase)
    } else {
        let at = OnSaturation::new(temperature_k);
        let saturation_pa = at.pressure_pa();
        if (pressure_pa - saturation_pa).abs() <= ON_THE_LINE * saturation_pa {
            return Err(StateError::TwoPhase {
                temperature_k,
                saturation_pressure_pa: saturation_pa,
                liquid_kg_m3: at.liquid() * CRITICAL_DENSITY_KG_M3,
                vapour_kg_m3: at.vapour() * CRITICAL_DENSITY_KG_M3,
            });
        }
        if pressure_pa > saturation_pa {
            (Start::liquid(temperature_k, pressure_pa, &at, saturation_pa), Phase::Liquid)
        } else {
            (Start::gas(temperature_k, pressure_pa, &at, saturation_pa, unit_pa), Phase::Gas)
        }
    };
    if phase != Phase::Gas {
        let melting_pressure_pa = boundary::melting_line_pa(temperature_k);
        if pressure_pa > melting_pressure_pa * MELTING_ROUNDING {
            return Err(StateError::Solid { temperature_k, pressure_pa, melting_pressure_pa });
        }
    }
    Ok((solve(&isotherm, pressure_pa / unit_pa, &start), phase))
}

/// The root of δ(1 + δφ_δ) = `target` in the interval of `start`.
#[inline]
fn solve(isotherm: &Isotherm, target: f64, start: &Start) -> f64 {
    let (mut low, mut high) = (start.low, start.high);
    let mut delta = if start.guess > low && start.guess < high { start.guess } else { middle(low, high) };
    for _ in 0..STEPS {
        let [value, slope, curvature] = isotherm.reduced_pressure(delta);
        let excess = value - target;
        if excess > 0.0 {
            high = delta;
        } else {
            low = delta;
        }
        // Newton in ln δ: n = −(p − p₀)/(δ∂p); Halley: n/(1 + n (δ∂)²p / (2 δ∂p))
        let newton = -excess / slope;
        let bend = 0.5 * newton * curvature / slope;
        let step = newton / (1.0 + bend);
        let mut next = delta * exp(step);
        let usable = slope > 0.0 && bend.abs() < 0.6 && step.abs() < 0.7;
        if !(usable && next > low && next < high) {
            // A last step within rounding may touch the end of the interval.
            if usable && step.abs() < 1e-14 * (1.0 + value / slope) {
                return delta;
            }
            next = middle(low, high);
            if !(next > low && next < high) {
                return next;
            }
            delta = next;
            continue;
        }
        delta = next;
        // What a Halley step leaves is about (bend² + c·step²·p/δ∂p) times the step.
        if step.abs() * (bend * bend + 10.0 * step * step * value / slope) < LEFT_OVER {
            return delta;
        }
    }
    delta
}

/// The geometric mean: densities differ by orders of magnitude.
fn middle(low: f64, high: f64) -> f64 {
    (low * high).sqrt()
}

/// Pressure at a temperature and density, Pa.
///
/// Range: 216.592 K to 1100 K, densities above 0 up to 1600 kg/m³, pressures up to 800 MPa or the melting line.
/// It serves a closed vessel: fix the density, change the temperature.
///
/// # Errors
/// [`StateError::Temperature`], [`StateError::Density`], [`StateError::Pressure`] above 800 MPa,
/// [`StateError::Solid`], and [`StateError::TwoPhase`] between the densities of the saturated phases; that error
/// carries the saturation pressure, which is the pressure of a vessel with both phases in it.
///
/// ```
/// use thimbleworth::co2::{density_kg_m3, pressure_pa};
/// // Liquid shut in between two valves at 5 °C and 60 bar, and warmed to 25 °C:
/// let shut_in_pa = pressure_pa(298.15, density_kg_m3(278.15, 6.0e6)?)?;
/// assert!(shut_in_pa > 200e5);
/// # Ok::<(), thimbleworth::co2::StateError>(())
/// ```
pub fn pressure_pa(temperature_k: f64, density_kg_m3: f64) -> Result<f64, StateError> {
    boundary::check_temperature(temperature_k)?;
    if !(density_kg_m3 > 0.0 && density_kg_m3 <= HIGHEST_DENSITY_KG_M3) {
        return Err(StateError::Density { density_kg_m3 });
    }
    let delta = density_kg_m3 / CRITICAL_DENSITY_KG_M3;
    if temperature_k < CRITICAL_TEMPERATURE_K {
        let at = OnSaturation::new(temperature_k);
        let (liquid, vapour) = (at.liquid(), at.vapour());
        if delta > vapour && delta < liquid {
            return Err(StateError::TwoPhase {
                temperature_k,
                saturation_pressure_pa: at.pressure_pa(),
                liquid_kg_m3: liquid * CRITICAL_DENSITY_KG_M3,
                vapour_kg_m3: vapour * CRITICAL_DENSITY_KG_M3,
            });
        }
    }
    let isotherm = Isotherm::new(temperature_k);
    // p = ρ R T (1 + δφ_δ)
    let pressure_pa = isotherm.unit_pa * isotherm.reduced_pressure(delta)[0];
    let melting_pressure_pa = boundary::melting_line_pa(temperature_k);
    if delta > 1.0 && pressure_pa > melting_pressure_pa * MELTING_ROUNDING {
        return Err(StateError::Solid { temperature_k, pressure_pa, melting_pressure_pa });
    }
    if pressure_pa > HIGHEST_PRESSURE_PA {
        return Err(StateError::Pressure { pressure_pa });
    }
    Ok(pressure_pa)
}

#[cfg(test)]
mod tests {
    use super::*;

    /// The search for the liquid at 274.774 K and 30.956 MPa, where the equation has three roots.
    fn from(guess: f64) -> (Start, f64) {
        let (t, p) = (274.774, 30.956e6);
        let isotherm = Isotherm::new(t);
        let at = OnSaturation::new(t);
        let start = Start { guess, ..Start::liquid(t, p, &at, at.pressure_pa()) };
        let density = solve(&isotherm, p / isotherm.unit_pa, &start) * CRITICAL_DENSITY_KG_M3;
        (start, density)
    }

    #[test]
    fn a_bad_start_ends_at_the_same_root() {
        for n in 0..=40 {
            // Up to where no fluid is, and into the neighbourhood of the spurious roots.
            let (_, density) = from(0.1 * f64::from(n));
            assert!((density - 1051.8).abs() < 0.05, "from {}: {density}", 0.1 * f64::from(n));
        }
        assert!((from(f64::NAN).1 - 1051.8).abs() < 0.05);
    }

    #[test]
    fn the_interval_ends_at_the_saturated_phases() {
        let at = OnSaturation::new(274.774);
        let (start, _) = from(2.0);
        assert!(start.low < at.liquid() && start.low > at.liquid() * (1.0 - 1e-6));
        let gas = Start::gas(274.774, 1e6, &at, at.pressure_pa(), Isotherm::new(274.774).unit_pa);
        assert!(gas.high > at.vapour() && gas.high < at.vapour() * (1.0 + 1e-6));
    }
}
