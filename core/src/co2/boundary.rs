//! The lines between gas, liquid and solid.

use super::coefficients::{
    CRITICAL_DENSITY_KG_M3, CRITICAL_PRESSURE_PA, CRITICAL_TEMPERATURE_K, MELTING, TRIPLE_PRESSURE_PA,
    TRIPLE_TEMPERATURE_K,
};
use super::error::StateError;
use super::fits::{LIQUID, LN_PRESSURE, PIECE, PIECE_ENDS, VAPOUR};
use super::{HIGHEST_PRESSURE_PA, HIGHEST_TEMPERATURE_K};
use crate::exponential::exp;

/// Which fluid phase.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum Phase {
    /// Below the saturation pressure; above the critical temperature, below the critical pressure.
    Gas,
    /// Below the critical temperature and above the saturation pressure, however high the pressure is.
    Liquid,
    /// At or above both the critical temperature and the critical pressure.
    Supercritical,
}

impl Phase {
    /// The word shown.
    ///
    /// ```
    /// assert_eq!(thimbleworth::co2::Phase::Supercritical.word(), "supercritical");
    /// ```
    #[must_use]
    pub const fn word(self) -> &'static str {
        match self {
            Self::Gas => "gas",
            Self::Liquid => "liquid",
            Self::Supercritical => "supercritical",
        }
    }
}

/// A Chebyshev series by Clenshaw's recurrence, x from −1 to 1.
#[inline]
pub(super) fn chebyshev<const N: usize>(coefficients: &[f64; N], x: f64) -> f64 {
    let (mut above, mut here) = (0.0, 0.0);
    for c in coefficients.iter().skip(1).rev() {
        (above, here) = (here, (c - above) + 2.0 * x * here);
    }
    (coefficients[0] - above) + x * here
}

/// The place of a temperature on the saturation line.
pub(super) struct OnSaturation {
    piece: usize,
    x: f64,
    /// 1, and smaller between the last 0.3 mK and the critical point: 1 − T/Tc over that of the last fitted point.
    nearness: f64,
}

impl OnSaturation {
    /// For a temperature between the triple and the critical temperature.
    #[inline]
    pub(super) fn new(temperature_k: f64) -> Self {
        let distance = 1.0 - temperature_k / CRITICAL_TEMPERATURE_K;
        let mut root = distance.sqrt().sqrt();
        let mut nearness = 1.0;
        if root < PIECE_ENDS[0] {
            let last = PIECE_ENDS[0] * PIECE_ENDS[0];
            nearness = distance / (last * last);
            root = PIECE_ENDS[0];
        }
        let mut piece = 0;
        while piece + 2 < PIECE_ENDS.len() && root > PIECE_ENDS[piece + 1] {
            piece += 1;
        }
        let (low, high) = (PIECE_ENDS[piece], PIECE_ENDS[piece + 1]);
        Self { piece, x: (2.0 * root - low - high) / (high - low), nearness }
    }

    fn value(&self, table: &[[f64; PIECE]; PIECE_ENDS.len() - 1]) -> f64 {
        chebyshev(&table[self.piece], self.x)
    }

    #[inline]
    pub(super) fn pressure_pa(&self) -> f64 {
        CRITICAL_PRESSURE_PA * exp(self.value(&LN_PRESSURE) * self.nearness)
    }

    /// δ of the liquid.
    #[inline]
    pub(super) fn liquid(&self) -> f64 {
        1.0 + (self.value(&LIQUID) - 1.0) * self.narrowing()
    }

    /// δ of the vapour.
    #[inline]
    pub(super) fn vapour(&self) -> f64 {
        1.0 + (self.value(&VAPOUR) - 1.0) * self.narrowing()
    }

    /// Both densities close on the critical one as the cube root of the distance in temperature.
    fn narrowing(&self) -> f64 {
        if self.nearness < 1.0 { libm::cbrt(self.nearness) } else { 1.0 }
    }
}

fn on_saturation(temperature_k: f64) -> Result<OnSaturation, StateError> {
    check_temperature(temperature_k)?;
    if temperature_k >= CRITICAL_TEMPERATURE_K {
        return Err(StateError::NoSaturation { temperature_k });
    }
    Ok(OnSaturation::new(temperature_k))
}

pub(super) fn check_temperature(temperature_k: f64) -> Result<(), StateError> {
    if (TRIPLE_TEMPERATURE_K..=HIGHEST_TEMPERATURE_K).contains(&temperature_k) {
        Ok(())
    } else {
        Err(StateError::Temperature { temperature_k })
    }
}

/// Pressure at which liquid and vapour are in equilibrium, Pa.
///
/// It is the pressure at which the equation of state gives both phases the same Gibbs energy. That condition was solved
/// with 50 digits and fitted; the fit keeps to it within 1e-11 of the pressure. Range: from the triple point
/// (216.592 K) to below the critical temperature (304.1282 K); in the last 0.3 mK it is drawn straight to the
/// critical point.
///
/// # Errors
/// [`StateError::Temperature`] outside the equation's range, [`StateError::NoSaturation`] from the critical
/// temperature upwards.
///
/// ```
/// // 20 °C: 57.29 bar
/// let pressure_pa = thimbleworth::co2::saturation_pressure_pa(293.15)?;
/// assert!((pressure_pa - 5.729_05e6).abs() < 10.0);
/// # Ok::<(), thimbleworth::co2::StateError>(())
/// ```
pub fn saturation_pressure_pa(temperature_k: f64) -> Result<f64, StateError> {
    Ok(on_saturation(temperature_k)?.pressure_pa())
}

/// Densities of the liquid and of the vapour in equilibrium, kg/m³, in this order.
///
/// Range and origin as for [`saturation_pressure_pa`]; within 1e-8 of the exact condition, 1e-10 below 304 K.
///
/// # Errors
/// As for [`saturation_pressure_pa`].
///
/// ```
/// let (liquid, vapour) = thimbleworth::co2::saturated_densities_kg_m3(293.15)?;
/// assert!((liquid - 773.39).abs() < 0.01 && (vapour - 194.20).abs() < 0.01);
/// # Ok::<(), thimbleworth::co2::StateError>(())
/// ```
pub fn saturated_densities_kg_m3(temperature_k: f64) -> Result<(f64, f64), StateError> {
    let at = on_saturation(temperature_k)?;
    Ok((at.liquid() * CRITICAL_DENSITY_KG_M3, at.vapour() * CRITICAL_DENSITY_KG_M3))
}

/// Pressure above which carbon dioxide is solid, Pa: Span and Wagner's equation of the melting line.
///
/// Range: from the triple point (216.592 K) to the temperature at which the line reaches 800 MPa (327.67 K), the
/// highest pressure of the equation of state.
///
/// # Errors
/// [`StateError::Temperature`] outside the equation's range, [`StateError::NoMelting`] where no pressure of the range
/// makes it solid.
///
/// ```
/// // At the triple point the melting line starts from the triple pressure, 5.18 bar.
/// let pressure_pa = thimbleworth::co2::melting_pressure_pa(216.592)?;
/// assert!((pressure_pa - 517_950.0).abs() < 1e-6);
/// # Ok::<(), thimbleworth::co2::StateError>(())
/// ```
pub fn melting_pressure_pa(temperature_k: f64) -> Result<f64, StateError> {
    check_temperature(temperature_k)?;
    let pressure_pa = melting_line_pa(temperature_k);
    if pressure_pa > HIGHEST_PRESSURE_PA * MELTING_ROUNDING {
        return Err(StateError::NoMelting { temperature_k });
    }
    Ok(pressure_pa)
}

/// How far above the melting line a state still counts as fluid: states that the source prints on the line, with the
/// temperature rounded to 1 mK, lie up to 4e-5 above it.
pub(super) const MELTING_ROUNDING: f64 = 1.001;

#[inline]
pub(super) fn melting_line_pa(temperature_k: f64) -> f64 {
    let x = temperature_k / TRIPLE_TEMPERATURE_K - 1.0;
    // pₘ = pₜ [1 + a₁ (T/Tₜ − 1) + a₂ (T/Tₜ − 1)²]
    TRIPLE_PRESSURE_PA * (1.0 + x * (MELTING[0] + x * MELTING[1]))
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_chebyshev_series_is_its_polynomial() {
        // 1 + 2 T₁ + 3 T₂ = 1 + 2x + 3(2x² − 1)
        for x in [-1.0, -0.3, 0.0, 0.7, 1.0] {
            let expected = 1.0 + 2.0 * x + 3.0 * (2.0 * x * x - 1.0);
            assert!((chebyshev(&[1.0, 2.0, 3.0], x) - expected).abs() < 1e-15);
        }
    }

    #[test]
    fn the_pieces_join() {
        for (n, end) in PIECE_ENDS.iter().enumerate().take(PIECE_ENDS.len() - 1).skip(1) {
            let below = OnSaturation { piece: n - 1, x: 1.0, nearness: 1.0 };
            let above = OnSaturation { piece: n, x: -1.0, nearness: 1.0 };
            assert!((below.pressure_pa() / above.pressure_pa() - 1.0).abs() < 1e-11, "{end}");
            assert!((below.liquid() / above.liquid() - 1.0).abs() < 1e-8, "{end}");
            assert!((below.vapour() / above.vapour() - 1.0).abs() < 1e-8, "{end}");
        }
    }
}
