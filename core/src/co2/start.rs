//! Where the search for a density begins.

use super::boundary::{OnSaturation, chebyshev};
use super::coefficients::CRITICAL_TEMPERATURE_K;
use super::fits::{
    COLD_DENSE, COLD_LIGHT, HOT_DENSE, HOT_LIGHT, ISOCHORE, ISOCHORE_TAU, SHEET, SHEET_PRESSURE_PA,
    SHEET_WIDTH,
};

/// A start value and the interval that holds the one true root; all reduced densities.
pub(super) struct Start {
    pub(super) guess: f64,
    pub(super) low: f64,
    pub(super) high: f64,
}

/// No fluid state of the range is denser: 1710 kg/m³.
const DENSEST: f64 = 3.66;
/// A gas or fluid is never less dense than this part of the ideal gas.
const LIGHTEST: f64 = 1.0 / 32.0;
/// More than the error of the fitted saturation densities.
const MARGIN: f64 = 1e-7;

impl Start {
    /// Above the critical temperature, where the pressure rises with density throughout.
    #[inline]
    pub(super) fn hot(temperature_k: f64, pressure_pa: f64, unit_pa: f64) -> Self {
        let tau = CRITICAL_TEMPERATURE_K / temperature_k;
        let [low, high] = ISOCHORE_TAU;
        let isochore_pa = unit_pa * chebyshev(&ISOCHORE, (2.0 * tau - low - high) / (high - low));
        let a = (1.0 - tau).sqrt() / SHEET_WIDTH[0];
        let ideal = pressure_pa / unit_pa;
        let guess = if pressure_pa > isochore_pa {
            sheet(&HOT_DENSE, a, dense(pressure_pa - isochore_pa))
        } else {
            sheet(&HOT_LIGHT, a, light(pressure_pa, isochore_pa)) * ideal
        };
        Self { guess, low: ideal * LIGHTEST, high: DENSEST }
    }

    /// Below the critical temperature: only densities above that of the saturated liquid.
    #[inline]
    pub(super) fn liquid(
        temperature_k: f64,
        pressure_pa: f64,
        at: &OnSaturation,
        saturation_pa: f64,
    ) -> Self {
        let a = (CRITICAL_TEMPERATURE_K / temperature_k - 1.0).sqrt() / SHEET_WIDTH[1];
        let low = at.liquid() * (1.0 - MARGIN);
        let guess = sheet(&COLD_DENSE, a, dense(pressure_pa - saturation_pa));
        Self { guess, low, high: DENSEST }
    }

    /// Below the critical temperature: only densities below that of the saturated vapour.
    #[inline]
    pub(super) fn gas(
        temperature_k: f64,
        pressure_pa: f64,
        at: &OnSaturation,
        saturation_pa: f64,
        unit_pa: f64,
    ) -> Self {
        let a = (CRITICAL_TEMPERATURE_K / temperature_k - 1.0).sqrt() / SHEET_WIDTH[1];
        let high = at.vapour() * (1.0 + MARGIN);
        let ideal = pressure_pa / unit_pa;
        let guess = sheet(&COLD_LIGHT, a, light(pressure_pa, saturation_pa)) * ideal;
        Self { guess, low: ideal * LIGHTEST, high }
    }
}

/// The fourth root stretches the neighbourhood of the saturation line and of the critical point.
#[inline]
fn dense(above_pa: f64) -> f64 {
    (above_pa / (above_pa + SHEET_PRESSURE_PA)).sqrt().sqrt()
}

#[inline]
fn light(pressure_pa: f64, reference_pa: f64) -> f64 {
    (1.0 - pressure_pa / reference_pa).sqrt().sqrt()
}

/// T₀ to T₉ at 2x − 1.
#[inline(always)]
fn basis(x: f64) -> [f64; SHEET] {
    let x = 2.0 * x - 1.0;
    let mut t = [1.0; SHEET];
    t[1] = x;
    for n in 2..SHEET {
        // Products instead of the recurrence, again to keep the chain short: T₂ₙ = 2 Tₙ² − 1, T₂ₙ₊₁ = 2 Tₙ Tₙ₊₁ − x
        t[n] = if n % 2 == 0 { 2.0 * t[n / 2] * t[n / 2] - 1.0 } else { 2.0 * t[n / 2] * t[n / 2 + 1] - x };
    }
    t
}

#[inline]
fn sheet(coefficients: &[[f64; SHEET]; SHEET], a: f64, y: f64) -> f64 {
    let (across, along) = (basis(a), basis(y));
    // Row by row into ten sums, which do not wait for one another.
    let mut sums = [0.0; SHEET];
    for (row, t) in coefficients.iter().zip(across) {
        for (sum, c) in sums.iter_mut().zip(row) {
            *sum += c * t;
        }
    }
    let mut whole = 0.0;
    for (sum, u) in sums.iter().zip(along) {
        whole += sum * u;
    }
    whole
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::co2::coefficients::{GAS_CONSTANT_J_MOL_K, REDUCING_DENSITY_MOL_M3};
    use crate::co2::{CRITICAL_DENSITY_KG_M3, density_kg_m3};

    #[test]
    fn the_basis_is_chebyshev() {
        for x in [0.0, 0.2, 0.5, 0.9, 1.0] {
            for (n, t) in (0_u32..).zip(basis(x)) {
                let expected = libm::cos(f64::from(n) * libm::acos(2.0 * x - 1.0));
                assert!((t - expected).abs() < 1e-14, "T{n} at {x}");
            }
        }
    }

    #[test]
    fn starts_are_within_a_few_percent() {
        // The solver would hide a bad start behind more steps.
        for n in 0..40 {
            let temperature_k = 217.0 + 22.0 * f64::from(n);
            let unit_pa = REDUCING_DENSITY_MOL_M3 * GAS_CONSTANT_J_MOL_K * temperature_k;
            for m in 0..40 {
                let pressure_pa = libm::pow(10.0, 3.0 + 5.8 * f64::from(m) / 39.0);
                let Ok(density) = density_kg_m3(temperature_k, pressure_pa) else { continue };
                let start = if temperature_k >= CRITICAL_TEMPERATURE_K {
                    Start::hot(temperature_k, pressure_pa, unit_pa)
                } else {
                    let at = OnSaturation::new(temperature_k);
                    if pressure_pa > at.pressure_pa() {
                        Start::liquid(temperature_k, pressure_pa, &at, at.pressure_pa())
                    } else {
                        Start::gas(temperature_k, pressure_pa, &at, at.pressure_pa(), unit_pa)
                    }
                };
                let off = start.guess * CRITICAL_DENSITY_KG_M3 / density - 1.0;
                assert!(off.abs() < 0.06, "{temperature_k} K, {pressure_pa} Pa: {off}");
                assert!(start.low * CRITICAL_DENSITY_KG_M3 < density);
                assert!(start.high * CRITICAL_DENSITY_KG_M3 > density);
            }
        }
    }
}
