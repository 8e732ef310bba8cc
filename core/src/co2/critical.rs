//! The three terms that shape the critical region: n Δᵇ δ ψ, with Δ = θ² + B |δ − 1|²ᵃ.

use super::coefficients::{CRITICAL_A, CRITICAL_B_SEVENTH, CRITICAL_B_SIXTH, CRITICAL_D, CRITICAL_TERMS};
use super::helmholtz::Derivatives;
use super::isotherm::DensityDerivatives;
use crate::exponential::exp;

/// Below this Δ its powers have vanished, and its logarithm is not taken.
const VANISHED: f64 = 1e-200;

/// What the terms need of the temperature.
pub(super) struct CriticalIsotherm {
    pub(super) tau: f64,
    /// D (τ − 1)²
    pub(super) reach: f64,
    /// exp(−D (τ − 1)²)
    pub(super) temperature_part: f64,
}

/// θ and its first three derivatives in s = δ − 1.
#[inline(always)]
fn theta(tau: f64, s: f64) -> [f64; 4] {
    // θ = (1 − τ) + A |s|^(10/3); the cube root of libm would cost a software fused multiply-add in WebAssembly
    let u = s * s;
    let four_thirds = if u == 0.0 { 0.0 } else { exp(2.0 / 3.0 * libm::log(u)) };
    let over_s = if u == 0.0 { 0.0 } else { four_thirds / s };
    [
        (1.0 - tau) + CRITICAL_A * four_thirds * u,
        CRITICAL_A * (10.0 / 3.0) * four_thirds * s,
        CRITICAL_A * (70.0 / 9.0) * four_thirds,
        CRITICAL_A * (280.0 / 27.0) * over_s,
    ]
}

/// Δ of the first two terms and of the third, each with its first three derivatives in s.
#[inline(always)]
fn distances(s: f64, th: &[f64; 4]) -> [[f64; 4]; 2] {
    let u = s * s;
    let u2 = u * u;
    let u3 = u2 * u;
    let size = s.abs();
    // (θ²)′ = 2θθ′, (θ²)″ = 2(θ′² + θθ″), (θ²)‴ = 2(3θ′θ″ + θθ‴)
    let square = [
        th[0] * th[0],
        2.0 * th[0] * th[1],
        2.0 * (th[1] * th[1] + th[0] * th[2]),
        2.0 * (3.0 * th[1] * th[2] + th[0] * th[3]),
    ];
    let b = CRITICAL_B_SEVENTH;
    let c = CRITICAL_B_SIXTH;
    [
        [
            square[0] + b * u3 * size,
            square[1] + 7.0 * b * u2 * size * s,
            square[2] + 42.0 * b * u2 * size,
            square[3] + 210.0 * b * size * s * u,
        ],
        [
            square[0] + c * u3,
            square[1] + 6.0 * c * u2 * s,
            square[2] + 30.0 * c * u2,
            square[3] + 120.0 * c * u * s,
        ],
    ]
}

/// x^(7/8) by square roots.
#[inline(always)]
fn seven_eighths(x: f64) -> f64 {
    let half = x.sqrt();
    let quarter = half.sqrt();
    half * quarter * quarter.sqrt()
}

/// Δᵇ of the three terms; b = 0.875, 0.925, 0.875.
#[inline(always)]
fn powers(distance: &[[f64; 4]; 2]) -> [f64; 3] {
    let first = seven_eighths(distance[0][0]);
    // Δ^0.925 = Δ^0.875 exp(0.05 ln Δ)
    [first, first * exp(0.05 * libm::log(distance[0][0])), seven_eighths(distance[1][0])]
}

/// First three derivatives of ln x, from x and its derivatives.
#[inline(always)]
fn logarithm(x: &[f64; 4]) -> [f64; 3] {
    let inverse = 1.0 / x[0];
    let [a, b, c] = [x[1] * inverse, x[2] * inverse, x[3] * inverse];
    [a, b - a * a, c - 3.0 * a * b + 2.0 * a * a * a]
}

/// Adds the terms on an isotherm; `narrow` and `wide` are exp(−10 s²) and exp(−12.5 s²).
#[inline(always)]
pub(super) fn add_to_isotherm(
    at: &CriticalIsotherm,
    delta: f64,
    s: f64,
    narrow: f64,
    wide: f64,
    sum: &mut DensityDerivatives,
) {
    let distance = distances(s, &theta(at.tau, s));
    if distance[0][0] < VANISHED {
        return;
    }
    let logs = [logarithm(&distance[0]), logarithm(&distance[1])];
    let power = powers(&distance);
    let common = delta * at.temperature_part;
    let (d2, d3) = (delta * delta, delta * delta * delta);
    let shapes = [(&logs[0], narrow), (&logs[0], narrow), (&logs[1], wide)];
    for ((term, power), (log, shape)) in CRITICAL_TERMS.iter().zip(power).zip(shapes) {
        // ln f = ln δ + b ln Δ − C s² + …, differentiated in s
        let e1 = delta * (term.exponent * log[0] - 2.0 * term.width * s);
        let e2 = d2 * (term.exponent * log[1] - 2.0 * term.width);
        let e3 = d3 * term.exponent * log[2];
        // (δ∂)² = δ∂ + δ²∂², (δ∂)³ = δ∂ + 3 δ²∂² + δ³∂³
        sum.add_logarithmic(term.factor * common * power * shape, 1.0 + e1, e1 + e2, e1 + 3.0 * e2 + e3);
    }
}

/// D (τ − 1)²: how far away the critical point is in temperature.
pub(super) fn reach(tau: f64) -> f64 {
    CRITICAL_D * (tau - 1.0) * (tau - 1.0)
}

/// Adds the terms with their derivatives in both variables; `narrow` and `wide` are exp(−10 s²) and exp(−12.5 s²).
pub(super) fn add_to_helmholtz(
    at: &CriticalIsotherm,
    delta: f64,
    narrow: f64,
    wide: f64,
    sum: &mut Derivatives,
) {
    let tau = at.tau;
    let s = delta - 1.0;
    let t = tau - 1.0;
    let th = theta(tau, s);
    let distance = distances(s, &th);
    if distance[0][0] < VANISHED {
        return;
    }
    let power = powers(&distance);
    let common = delta * at.temperature_part;
    let shapes = [(&distance[0], narrow), (&distance[0], narrow), (&distance[1], wide)];
    for ((term, power), (x, shape)) in CRITICAL_TERMS.iter().zip(power).zip(shapes) {
        let value = term.factor * common * power * shape;
        let inverse = 1.0 / x[0];
        let b = term.exponent;
        // Δ_τ = −2θ, Δ_ττ = 2, Δ_sτ = −2θ′
        let (by_s, by_t) = (x[1] * inverse, -2.0 * th[0] * inverse);
        let s1 = b * by_s - 2.0 * term.width * s;
        let s2 = b * (x[2] * inverse - by_s * by_s) - 2.0 * term.width;
        let t1 = b * by_t - 2.0 * CRITICAL_D * t;
        let t2 = b * (2.0 * inverse - by_t * by_t) - 2.0 * CRITICAL_D;
        let st = b * (-2.0 * th[1] * inverse - by_s * by_t);
        sum.add_logarithmic(
            value,
            1.0 + delta * s1,
            delta * s1 + delta * delta * s2,
            tau * t1,
            tau * t1 + tau * tau * t2,
            delta * tau * st,
        );
    }
}
