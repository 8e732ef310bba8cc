//! The equation along one isotherm: temperature is folded in once, a density then costs some 80 multiplications.

use super::coefficients::{
    CRITICAL_TEMPERATURE_K, GAS_CONSTANT_J_MOL_K, GAUSSIAN_TERMS, POWER_TERMS, REDUCING_DENSITY_MOL_M3,
};
use super::critical::{self, CriticalIsotherm};
use crate::exponential::decays;

/// Powers of the reduced temperature that the terms use, by multiplication only so that every machine rounds alike.
pub(super) struct TauPowers {
    /// τⁿ at n; not a number where no term asks for it.
    whole: [f64; 29],
    quarters: [f64; 4],
}

impl TauPowers {
    #[inline(always)]
    pub(super) fn new(tau: f64) -> Self {
        let t2 = tau * tau;
        let t3 = t2 * tau;
        let t6 = t3 * t3;
        let t8 = t6 * t2;
        let t12 = t6 * t6;
        let t14 = t8 * t6;
        let t16 = t8 * t8;
        let mut whole = [f64::NAN; 29];
        (whole[0], whole[1], whole[2], whole[3]) = (1.0, tau, t2, t3);
        (whole[6], whole[7], whole[8], whole[12]) = (t6, t6 * tau, t8, t12);
        (whole[14], whole[16], whole[22]) = (t14, t16, t14 * t8);
        (whole[24], whole[28]) = (t12 * t12, t14 * t14);
        let half = tau.sqrt();
        let quarter = half.sqrt();
        Self { whole, quarters: [1.0, quarter, half, half * quarter] }
    }

    /// τ^(whole + quarters/4).
    #[inline(always)]
    pub(super) const fn at(&self, whole: usize, quarters: usize) -> f64 {
        self.whole[whole] * self.quarters[quarters]
    }
}

/// First three derivatives of the residual Helmholtz energy, δ·∂/∂δ applied once, twice and three times.
#[derive(Clone, Copy)]
pub(super) struct DensityDerivatives {
    pub(super) first: f64,
    pub(super) second: f64,
    pub(super) third: f64,
}

impl DensityDerivatives {
    /// Adds a term whose value is `value` and whose logarithm has the derivatives `g`, `h`, `k`.
    #[inline(always)]
    pub(super) fn add_logarithmic(&mut self, value: f64, g: f64, h: f64, k: f64) {
        // (δ∂)f = f g, (δ∂)²f = f (g² + h), (δ∂)³f = f (g³ + 3 g h + k)
        self.first += value * g;
        self.second += value * (g * g + h);
        self.third += value * (g * (g * g + 3.0 * h) + k);
    }

    /// Adds Σ c δᵈ exp(−δˡ), given m₀ to m₃ = Σ c dⁿ δᵈ, y = δˡ and exp(−y).
    #[inline(always)]
    fn add_block(&mut self, order: f64, y: f64, exponential: f64, m: [f64; 4]) {
        // δ∂ of exp(−δˡ) brings down −l δˡ each time
        let ly = order * y;
        let square = ly * ly - order * ly;
        let cube = ly * (ly * ly - 3.0 * order * ly + order * order);
        self.first += exponential * (m[1] - ly * m[0]);
        self.second += exponential * (m[2] - 2.0 * ly * m[1] + square * m[0]);
        self.third += exponential * (m[3] - 3.0 * ly * m[2] + 3.0 * square * m[1] - cube * m[0]);
    }
}

/// Σ c dⁿ δᵈ for n = 0 to 3, from (c, d, δᵈ).
#[inline(always)]
fn moments<const N: usize>(terms: [(f64, f64, f64); N]) -> [f64; 4] {
    let mut m = [0.0; 4];
    for (c, d, power) in terms {
        let term = c * power;
        m[0] += term;
        m[1] += d * term;
        m[2] += d * d * term;
        m[3] += d * d * d * term;
    }
    m
}

/// An isotherm.
pub(super) struct Isotherm {
    /// ρ_c R T, the pressure by which pressures are reduced, Pa.
    pub(super) unit_pa: f64,
    /// Σ n τᵗ of the terms that share l and d: l = 0 with d = 1, 2, 3;
    plain: [f64; 3],
    /// l = 1 with d = 1, 2, 4, 5, 6;
    first: [f64; 5],
    /// l = 2 with d = 1, 4, 7, 8;
    second: [f64; 4],
    /// l = 3 with d = 2, 3;
    third: [f64; 2],
    /// l = 4 with d = 5, 6, 7, 8, 10;
    fourth: [f64; 5],
    /// l = 5 with d = 4;
    fifth: f64,
    /// l = 6 with d = 8.
    sixth: f64,
    /// The Gaussian terms with their part in τ; the first three share d and η.
    gaussians: [f64; 3],
    critical: CriticalIsotherm,
}

/// Beyond this the Gaussian and critical terms are below 1e-17 of anything they are added to.
const NEGLIGIBLE: f64 = 46.0;

impl Isotherm {
    #[inline(always)]
    pub(super) fn new(temperature_k: f64) -> Self {
        let tau = CRITICAL_TEMPERATURE_K / temperature_k;
        let powers = TauPowers::new(tau);
        // n τᵗ of the term at `i`. The numbers are written out so that the compiler folds the table away; that they
        // name the right terms shows in the comparison with a term-by-term evaluation.
        let n = |i: usize| POWER_TERMS[i].factor * powers.at(POWER_TERMS[i].tau, POWER_TERMS[i].tau_quarters);
        // exp(−β (τ − γ)²) of the Gaussian terms, of which the second and the third share β and γ, and of the critical ones
        let exponent = |i: usize| {
            let away = tau - GAUSSIAN_TERMS[i].gamma;
            GAUSSIAN_TERMS[i].beta * away * away
        };
        let reach = critical::reach(tau);
        let bells = decays([exponent(0), exponent(1), exponent(3), exponent(4), reach]);
        let g = |i: usize| GAUSSIAN_TERMS[i].factor * powers.at(GAUSSIAN_TERMS[i].tau, 0);
        Self {
            unit_pa: REDUCING_DENSITY_MOL_M3 * GAS_CONSTANT_J_MOL_K * temperature_k,
            plain: [n(0) + n(1) + n(2) + n(3), n(4) + n(5), n(6)],
            first: [n(7), n(8), n(9), n(10) + n(11) + n(12), n(13) + n(14) + n(15)],
            second: [n(16) + n(17), n(18) + n(19) + n(20), n(21), n(22)],
            third: [n(23), n(24) + n(25)],
            fourth: [n(26) + n(27), n(28), n(29), n(30), n(31)],
            fifth: n(32),
            sixth: n(33),
            gaussians: [g(0) * bells[0] + (g(1) + g(2)) * bells[1], g(3) * bells[2], g(4) * bells[3]],
            critical: CriticalIsotherm { tau, reach, temperature_part: bells[4] },
        }
    }

    /// The derivatives at a reduced density.
    #[inline(always)]
    pub(super) fn at(&self, delta: f64) -> DensityDerivatives {
        let d2 = delta * delta;
        let d3 = d2 * delta;
        let d4 = d2 * d2;
        let d5 = d3 * d2;
        let d6 = d3 * d3;
        let (d7, d8, d10) = (d4 * d3, d4 * d4, d5 * d5);

        let s = delta - 1.0;
        let u = s * s;
        let [e1, e2, e3, e4, e5, e6, w] = decays([delta, d2, d3, d4, d5, d6, 2.5 * u]);
        let c = &self.plain;
        let m = moments([(c[0], 1.0, delta), (c[1], 2.0, d2), (c[2], 3.0, d3)]);
        let mut sum = DensityDerivatives { first: m[1], second: m[2], third: m[3] };
        let c = &self.first;
        let terms = [(c[0], 1.0, delta), (c[1], 2.0, d2), (c[2], 4.0, d4), (c[3], 5.0, d5), (c[4], 6.0, d6)];
        sum.add_block(1.0, delta, e1, moments(terms));
        let c = &self.second;
        let terms = [(c[0], 1.0, delta), (c[1], 4.0, d4), (c[2], 7.0, d7), (c[3], 8.0, d8)];
        sum.add_block(2.0, d2, e2, moments(terms));
        let c = &self.third;
        sum.add_block(3.0, d3, e3, moments([(c[0], 2.0, d2), (c[1], 3.0, d3)]));
        let c = &self.fourth;
        let terms = [(c[0], 5.0, d5), (c[1], 6.0, d6), (c[2], 7.0, d7), (c[3], 8.0, d8), (c[4], 10.0, d10)];
        sum.add_block(4.0, d4, e4, moments(terms));
        sum.add_block(5.0, d5, e5, moments([(self.fifth, 4.0, d4)]));
        sum.add_block(6.0, d6, e6, moments([(self.sixth, 8.0, d8)]));

        if self.critical.reach + 10.0 * u < NEGLIGIBLE + 20.0 {
            // η = 25, 15, 20 and C = 10, 12.5 are the 10th, 6th, 8th, 4th and 5th power of one exponential.
            let w2 = w * w;
            let w4 = w2 * w2;
            let w6 = w4 * w2;
            let shapes = [(25.0, 2.0, d2 * (w6 * w4)), (15.0, 3.0, d3 * w6), (20.0, 3.0, d3 * (w4 * w4))];
            for (part, (eta, d, shape)) in self.gaussians.iter().zip(shapes) {
                // ln f = d ln δ − η (δ − 1)²
                let g = d - 2.0 * eta * delta * s;
                let h = -2.0 * eta * delta * (2.0 * delta - 1.0);
                let k = -2.0 * eta * delta * (4.0 * delta - 1.0);
                sum.add_logarithmic(part * shape, g, h, k);
            }
            if self.critical.reach + 10.0 * u < NEGLIGIBLE {
                critical::add_to_isotherm(&self.critical, delta, s, w4, w4 * w, &mut sum);
            }
        }
        sum
    }

    /// Pressure over ρ_c R T, and δ·∂/∂δ of it once and twice.
    #[inline(always)]
    pub(super) fn reduced_pressure(&self, delta: f64) -> [f64; 3] {
        let phi = self.at(delta);
        // p/(ρ_c R T) = δ (1 + δφ_δ)
        [
            delta * (1.0 + phi.first),
            delta * (1.0 + phi.first + phi.second),
            delta * (1.0 + phi.first + 2.0 * phi.second + phi.third),
        ]
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn every_power_that_a_term_asks_for_is_there() {
        let powers = TauPowers::new(1.1);
        for term in &POWER_TERMS {
            let exponent = term.tau as f64 + 0.25 * term.tau_quarters as f64;
            let found = powers.at(term.tau, term.tau_quarters);
            assert!((found / libm::pow(1.1, exponent) - 1.0).abs() < 1e-14, "{exponent}");
        }
    }
}
