//! The reduced Helmholtz energy with all derivatives up to the second, term by term, and what follows from it.

use super::coefficients::{GAUSSIAN_TERMS, IDEAL_LEAD, IDEAL_LOG, IDEAL_VIBRATIONS, POWER_TERMS};
use super::critical;
use super::isotherm::TauPowers;

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
        const WHOLE: [f64; 29] = whole_numbers();
        let mut sum = Self::default();
        let tau_powers = TauPowers::new(tau);
        let mut delta_powers = [1.0; 11];
        for d in 1..11 {
            delta_powers[d] = delta_powers[d - 1] * delta;
        }
        let mut exponentials = [1.0; 7];
        for l in 1..7 {
            exponentials[l] = libm::exp(-delta_powers[l]);
        }
        for term in &POWER_TERMS {
            let f = term.factor
                * delta_powers[term.delta]
                * tau_powers.at(term.tau, term.tau_quarters)
                * exponentials[term.order];
            // ln f = d ln δ + t ln τ − δˡ
            let l = WHOLE[term.order];
            let ly = if term.order == 0 { 0.0 } else { l * delta_powers[term.order] };
            let t = WHOLE[term.tau] + 0.25 * WHOLE[term.tau_quarters];
            sum.add_logarithmic(f, WHOLE[term.delta] - ly, -l * ly, t, 0.0, 0.0);
        }
        for term in &GAUSSIAN_TERMS {
            let (s, t) = (delta - 1.0, tau - term.gamma);
            let f = term.factor
                * delta_powers[term.delta]
                * tau_powers.at(term.tau, 0)
                * libm::exp(-term.eta * s * s - term.beta * t * t);
            // ln f = d ln δ + t ln τ − η (δ − 1)² − β (τ − γ)²
            sum.add_logarithmic(
                f,
                WHOLE[term.delta] - 2.0 * term.eta * delta * s,
                -2.0 * term.eta * delta * (2.0 * delta - 1.0),
                WHOLE[term.tau] - 2.0 * term.beta * tau * t,
                -2.0 * term.beta * tau * (2.0 * tau - term.gamma),
                0.0,
            );
        }
        critical::add_to_helmholtz(tau, delta, &mut sum);
        sum
    }

    /// The ideal-gas part; its derivatives by ln δ are 1 and 0.
    pub(super) fn ideal(tau: f64, delta: f64) -> Self {
        // φ⁰ = ln δ + a₁ + a₂ τ + a₃ ln τ + Σ aᵢ ln(1 − exp(−θᵢ τ))
        let lead = IDEAL_LEAD[1] * tau;
        let mut sum = Self {
            value: libm::log(delta) + IDEAL_LEAD[0] + lead + IDEAL_LOG * libm::log(tau),
            delta: 1.0,
            delta_delta: 0.0,
            tau: lead + IDEAL_LOG,
            tau_tau: lead,
            delta_tau: 0.0,
        };
        for (factor, theta) in IDEAL_VIBRATIONS {
            let x = theta * tau;
            let e = libm::exp(-x);
            let occupation = e / (1.0 - e);
            sum.value += factor * libm::log(1.0 - e);
            sum.tau += factor * x * occupation;
            sum.tau_tau += factor * x * occupation * (1.0 - x / (1.0 - e));
        }
        sum
    }
}

const fn whole_numbers() -> [f64; 29] {
    let mut numbers = [0.0; 29];
    let mut n = 1;
    while n < 29 {
        numbers[n] = numbers[n - 1] + 1.0;
        n += 1;
    }
    numbers
}

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
