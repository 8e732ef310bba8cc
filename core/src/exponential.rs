//! The exponential function where a draw needs it most: without a call, a branch or a division, so that several run side by side.
//!
//! The same bits everywhere, as `libm` has them: multiplications and additions alone. It differs from `libm::exp` by at most
//! one in the last place.

/// 1.5 · 2⁵²: adding it rounds to a whole number, which then stands in the last bits.
const ROUND: f64 = 6_755_399_441_055_744.0;
/// ln 2 in two parts; the first one ends in zeros, so that its products with whole numbers up to 2¹¹ are exact.
const LN_2: [f64; 2] = [f64::from_bits(0x3FE6_2E42_FEE0_0000), 1.908_214_929_270_587_7e-10];

/// How far from 0 the quick way goes.
const FAR: f64 = 700.0;

/// e to the power of `x`.
#[cfg_attr(not(target_arch = "wasm32"), inline(always))]
pub(crate) fn exp(x: f64) -> f64 {
    if x.abs() < FAR { within(x) } else { libm::exp(x) }
}

/// e to the power of minus each, side by side; what is above 700 counts as 700, which is 1e-304.
#[cfg_attr(not(target_arch = "wasm32"), inline(always))]
pub(crate) fn decays<const N: usize>(mut x: [f64; N]) -> [f64; N] {
    for x in &mut x {
        *x = within(if *x < FAR { -*x } else { -FAR });
    }
    x
}

#[inline(always)]
fn within(x: f64) -> f64 {
    // eˣ = 2ᵏ eʳ with |r| ≤ ln(2)/2
    let turned = x * core::f64::consts::LOG2_E + ROUND;
    let k = turned - ROUND;
    let r = (x - k * LN_2[0]) - k * LN_2[1];
    // eʳ = Σ rⁿ/n!, of which r¹⁴/14! is 4e-18
    let (r2, r4) = (r * r, (r * r) * (r * r));
    let a = (1.0 / 2.0 + r * (1.0 / 6.0)) + r2 * (1.0 / 24.0 + r * (1.0 / 120.0));
    let b = (1.0 / 720.0 + r * (1.0 / 5040.0)) + r2 * (1.0 / 40_320.0 + r * (1.0 / 362_880.0));
    let c = (1.0 / 3_628_800.0 + r * (1.0 / 39_916_800.0))
        + r2 * (1.0 / 479_001_600.0 + r * (1.0 / 6_227_020_800.0));
    let power = 1.0 + (r + r2 * (a + r4 * (b + r4 * c)));
    // k is added to the exponent: |x| of 700 keeps it in range.
    f64::from_bits(power.to_bits().wrapping_add(turned.to_bits() << 52))
}

#[cfg(test)]
mod tests {
    use super::{decays, exp};
    use crate::chance::{keyed_bits, unit_interval};

    /// Witness: `libm::exp`, which is within one in the last place itself.
    #[test]
    fn it_is_the_exponential_of_libm() {
        for width in [1e-6, 0.1, 1.0, 10.0, 100.0, 699.0] {
            for i in 0..20_000 {
                let x = width * (2.0 * unit_interval(keyed_bits(7, i)) - 1.0);
                assert!(exp(x).to_bits().abs_diff(libm::exp(x).to_bits()) <= 1, "{x}");
            }
        }
        for x in [0.0, -0.0, 1.0, 0.5 * core::f64::consts::LN_2, 699.999, -699.999] {
            assert!(exp(x).to_bits().abs_diff(libm::exp(x).to_bits()) <= 1, "{x}");
        }
        assert_eq!((exp(0.0), exp(-1e4), exp(1e4)), (1.0, 0.0, f64::INFINITY));
        assert_eq!((exp(f64::NEG_INFINITY), exp(-720.0)), (0.0, libm::exp(-720.0)));
        assert!(exp(f64::NAN).is_nan());
        assert_eq!(decays([0.0, 1.5, 60.0, 1e5]), [1.0, exp(-1.5), exp(-60.0), libm::exp(-700.0)]);
    }
}
