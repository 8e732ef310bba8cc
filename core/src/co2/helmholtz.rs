//! The reduced Helmholtz energy with all derivatives up to the second, term by term, and what follows from it.

use super::coefficients::{GAUSSIAN_TERMS, IDEAL_LEAD, IDEAL_LOG, IDEAL_VIBRATIONS, POWER_TERMS};
use super::critical;
use super::critical::CriticalIsotherm;
use crate::exponential::decays;

/// A reduced Helmholtz energy and its derivatives by ln δ and ln τ (δ·∂/∂δ and τ·∂/∂τ, applied once or twice).
#[derive(Clone, Copy, Default)]
pub(super) struct Derivatives {
    pub(super) value: f64,
    pub(super) delta: f64,
    pub(super) delta_delta: f64,
    pub(super) tau: f64,
    pub(super) tau_tau: f64,
    pub(super) delta_tau: f64,
}

impl Derivatives {
    /// Adds a term whose logarithm has the derivatives `g`, `gg` by ln δ, `t`, `tt` by ln τ and `gt` mixed.
    #[inline]
    pub(super) fn add_logarithmic(&mut self, f: f64, g: f64, gg: f64, t: f64, tt: f64, gt: f64) {
        self.value += f;
        self.delta += f * g;
        self.delta_delta += f * (g * g + gg);
        self.tau += f * t;
        self.tau_tau += f * (t * t + tt);
        self.delta_tau += f * (g * t + gt);
    }

    /// The residual part.
    pub(super) fn residual(tau: f64, delta: f64) -> Self {
        let mut sum = Self::default();
        let tau_powers = powers_of_tau(tau);
        let mut delta_powers = [1.0; 16];
        for d in 1..11 {
            delta_powers[d] = delta_powers[d - 1] * delta;
        }
        let s = delta - 1.0;
        let u = s * s;
        let [_, y1, y2, y3, y4, y5, y6, ..] = delta_powers;
        let reach = critical::reach(tau);
        let fallen = decays([0.0, y1, y2, y3, y4, y5, y6, 2.5 * u, reach]);
        let (mut terms, mut l) = (&TERMS[..], 0.0);
        for (order, count) in BLOCKS.into_iter().enumerate() {
            let (here, rest) = terms.split_at(count);
            terms = rest;
            // Σ n δᵈ τᵗ of the terms that share l, and its derivatives
            let mut block = Self::default();
            for term in here {
                // The masks spare checks: both lists have 16 places.
                let powers =
                    delta_powers[usize::from(term.delta & 15)] * tau_powers[usize::from(term.tau & 15)];
                let value = term.factor * powers;
                let (by_delta, by_tau) = (term.d * value, term.t * value);
                block.value += value;
                block.delta += by_delta;
                block.delta_delta += term.d * by_delta;
                block.tau += by_tau;
                block.tau_tau += term.t * by_tau;
                block.delta_tau += term.d * by_tau;
            }
            let (ly, exponential) = (l * delta_powers[order], fallen[order]);
            // δ∂ of exp(−δˡ) brings down −l δˡ each time
            let bend = ly * ly - l * ly;
            sum.value += exponential * block.value;
            sum.delta += exponential * (block.delta - ly * block.value);
            sum.delta_delta +=
                exponential * (block.delta_delta - 2.0 * ly * block.delta + bend * block.value);
            sum.tau += exponential * block.tau;
            sum.tau_tau += exponential * block.tau_tau;
            sum.delta_tau += exponential * (block.delta_tau - ly * block.tau);
            l += 1.0;
        }
        if reach + 10.0 * u < FAR {
            // η = 25, 15, 20 and C = 10, 12.5 are the 10th, 6th, 8th, 4th and 5th power of one exponential.
            let w = fallen[7];
            let w2 = w * w;
            let w4 = w2 * w2;
            let (w6, w8) = (w4 * w2, w4 * w4);
            let w10 = w8 * w2;
            let bells = decays(GAUSSIAN_TERMS.each_ref().map(|term| {
                let away = tau - term.gamma;
                term.beta * away * away
            }));
            for ((term, shape), bell) in GAUSSIAN_TERMS.iter().zip([w10, w10, w10, w6, w8]).zip(bells) {
                let away = tau - term.gamma;
                let powers = delta_powers[term.delta & 15] * tau_powers[GAUSSIAN_TAU[term.tau & 3]];
                let f = term.factor * powers * shape * bell;
                // ln f = d ln δ + t ln τ − η (δ − 1)² − β (τ − γ)²
                let (d, t) = (DELTAS[term.delta & 3], DELTAS[term.tau & 3]);
                sum.add_logarithmic(
                    f,
                    d - 2.0 * term.eta * delta * s,
                    -2.0 * term.eta * delta * (2.0 * delta - 1.0),
                    t - 2.0 * term.beta * tau * away,
                    -2.0 * term.beta * tau * (2.0 * tau - term.gamma),
                    0.0,
                );
            }
            let at = CriticalIsotherm { tau, reach, temperature_part: fallen[8] };
            critical::add_to_helmholtz(&at, delta, w4, w4 * w, &mut sum);
        }
        sum
    }

    /// The ideal-gas part; its derivatives by ln δ are 1 and 0.
    pub(super) fn ideal(tau: f64, delta: f64) -> Self {
        // φ⁰ = ln δ + a₁ + a₂ τ + a₃ ln τ + Σ aᵢ ln(1 − exp(−θᵢ τ)), the two logarithms in one
        const { assert!(IDEAL_LOG == 2.5, "ln δ + a₃ ln τ = ln(δ τ² √τ)") };
        let lead = IDEAL_LEAD[1] * tau;
        let mut sum = Self {
            value: libm::log(delta * (tau * tau * tau.sqrt())) + IDEAL_LEAD[0] + lead,
            delta: 1.0,
            delta_delta: 0.0,
            tau: lead + IDEAL_LOG,
            tau_tau: lead,
            delta_tau: 0.0,
        };
        let fallen = decays(IDEAL_VIBRATIONS.map(|(_, theta)| theta * tau));
        for ((factor, theta), e) in IDEAL_VIBRATIONS.into_iter().zip(fallen) {
            let x = theta * tau;
            let occupation = e / (1.0 - e);
            sum.value += factor * log_of_rest(e);
            sum.tau += factor * x * occupation;
            sum.tau_tau += factor * x * occupation * (1.0 - x * (1.0 + occupation));
        }
        sum
    }
}

/// Beyond this exponent Gaussian and critical terms are below 1e-17 of anything they are added to: exp(−75) is 3e-33, their
/// largest factor with two derivatives 1e10. The Gaussian terms end nearer than the critical ones.
const FAR: f64 = 75.0;

/// ln(1 − e) for e from 0 to below 1, by its series where that is exact to rounding.
fn log_of_rest(e: f64) -> f64 {
    if e < 0.006 {
        // The next term, e⁸/8, is below 4e-17 of the first.
        -e * (1.0
            + e * (1.0 / 2.0
                + e * (1.0 / 3.0 + e * (1.0 / 4.0 + e * (1.0 / 5.0 + e * (1.0 / 6.0 + e * (1.0 / 7.0)))))))
    } else {
        libm::log(1.0 - e)
    }
}

/// The exponents t of τ that the power terms have, and their values at `tau`, by multiplication only so that every machine rounds alike.
const EXPONENTS: [f64; 16] =
    [0.0, 0.75, 1.0, 1.5, 2.0, 2.5, 3.0, 6.0, 7.0, 8.0, 12.0, 14.0, 16.0, 22.0, 24.0, 28.0];

#[inline]
fn powers_of_tau(tau: f64) -> [f64; 16] {
    let half = tau.sqrt();
    let t2 = tau * tau;
    let t3 = t2 * tau;
    let t6 = t3 * t3;
    let t8 = t6 * t2;
    let (t12, t14) = (t6 * t6, t8 * t6);
    let three_quarters = half * half.sqrt();
    let (t16, t22, t24, t28) = (t8 * t8, t14 * t8, t12 * t12, t14 * t14);
    [1.0, three_quarters, tau, tau * half, t2, t2 * half, t3, t6, t6 * tau, t8, t12, t14, t16, t22, t24, t28]
}

/// A power term as the sum reads it.
struct Term {
    factor: f64,
    d: f64,
    t: f64,
    /// d once more, and the place of t among [`EXPONENTS`].
    delta: u8,
    tau: u8,
}

/// How many power terms have l = 0, 1, 2 and so on; they stand in this order.
const BLOCKS: [usize; 7] = {
    let mut counts = [0; 7];
    let mut i = 0;
    while i < POWER_TERMS.len() {
        counts[POWER_TERMS[i].order] += 1;
        i += 1;
    }
    counts
};
/// The power of τ of a Gaussian term, 0, 1 or 3, as a place among [`EXPONENTS`].
const GAUSSIAN_TAU: [usize; 4] = [0, 2, 4, 6];
const DELTAS: [f64; 4] = [0.0, 1.0, 2.0, 3.0];

const TERMS: [Term; 34] = {
    let mut terms = [const { Term { factor: 0.0, d: 0.0, t: 0.0, delta: 0, tau: 0 } }; 34];
    let mut i = 0;
    while i < terms.len() {
        let from = &POWER_TERMS[i];
        let t = from.tau as f64 + 0.25 * from.tau_quarters as f64;
        let mut place = 0;
        while EXPONENTS[place] != t {
            place += 1;
        }
        terms[i] =
            Term { factor: from.factor, d: from.delta as f64, t, delta: from.delta as u8, tau: place as u8 };
        i += 1;
    }
    terms
};

/// Caloric properties in units of R, T and M.
pub(super) struct Caloric {
    /// h/(R T)
    pub(super) enthalpy: f64,
    /// s/R
    pub(super) entropy: f64,
    /// c_v/R
    pub(super) isochoric: f64,
    /// c_p/R
    pub(super) isobaric: f64,
    /// w² M/(R T)
    pub(super) sound_squared: f64,
    /// (∂p/∂ρ) M/(R T) along the isotherm
    pub(super) stiffness: f64,
}

impl Caloric {
    pub(super) fn new(tau: f64, delta: f64) -> Self {
        let (o, r) = (Derivatives::ideal(tau, delta), Derivatives::residual(tau, delta));
        // c_v/R = −τ² (φ⁰_ττ + φʳ_ττ)
        let isochoric = -(o.tau_tau - o.tau + r.tau_tau - r.tau);
        // (∂p/∂ρ)_T M/(RT) = 1 + 2δφ_δ + δ²φ_δδ
        let stiffness = 1.0 + r.delta + r.delta_delta;
        // (∂p/∂T)_ρ M/(ρR) = 1 + δφ_δ − δτφ_δτ
        let thermal = 1.0 + r.delta - r.delta_tau;
        Self {
            // h/(RT) = 1 + τ(φ⁰_τ + φʳ_τ) + δφʳ_δ
            enthalpy: 1.0 + o.tau + r.tau + r.delta,
            // s/R = τ(φ⁰_τ + φʳ_τ) − φ⁰ − φʳ
            entropy: o.tau + r.tau - o.value - r.value,
            isochoric,
            // c_p/R = c_v/R + (1 + δφ_δ − δτφ_δτ)²/(1 + 2δφ_δ + δ²φ_δδ)
            isobaric: isochoric + thermal * thermal / stiffness,
            // w² M/(RT) = (1 + 2δφ_δ + δ²φ_δδ) + (1 + δφ_δ − δτφ_δτ)²/(c_v/R)
            sound_squared: stiffness + thermal * thermal / isochoric,
            stiffness,
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn the_terms_stand_in_blocks() {
        let mut i = 0;
        for (order, count) in BLOCKS.into_iter().enumerate() {
            assert!(POWER_TERMS[i..i + count].iter().all(|term| term.order == order));
            i += count;
        }
        assert_eq!(i, POWER_TERMS.len());
        for (power, exponent) in powers_of_tau(1.1).into_iter().zip(EXPONENTS) {
            assert!((power / libm::pow(1.1, exponent) - 1.0).abs() < 1e-14, "{exponent}");
        }
        for term in &GAUSSIAN_TERMS {
            assert_eq!(EXPONENTS[GAUSSIAN_TAU[term.tau]], term.tau as f64);
        }
        let mut shapes = GAUSSIAN_TERMS.iter().map(|term| term.eta);
        assert!([25.0, 25.0, 25.0, 15.0, 20.0].into_iter().all(|eta| shapes.next() == Some(eta)));
    }

    #[test]
    fn the_series_of_the_logarithm_meets_it() {
        for e in [1e-12, 1e-5, 1e-3, 0.005_999, 0.006, 0.05, 0.9] {
            assert!(
                (log_of_rest(e) - libm::log1p(-e)).abs() <= 4e-16 * e + if e < 0.006 { 0.0 } else { 1.2e-16 },
                "{e}"
            );
        }
    }
}
