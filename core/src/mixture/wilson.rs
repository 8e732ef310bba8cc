//! Activity coefficients by Wilson's equation at one temperature.
use super::{LARGEST, Pairs, PerComponent};
use crate::exponential::exp;

/// Λᵢⱼ of a mixture at one temperature.
#[derive(Clone, Copy, Debug)]
pub(crate) struct Lambda {
    count: usize,
    values: [[f64; LARGEST]; LARGEST],
}

impl Lambda {
    pub(crate) fn at(pairs: &Pairs, temperature_k: f64) -> Self {
        let count = pairs.count();
        let mut values = [[1.0; LARGEST]; LARGEST];
        for ((row, a), b_k) in values.iter_mut().zip(&pairs.a).zip(&pairs.b_k).take(count) {
            for ((value, &a), &b_k) in row.iter_mut().zip(a).zip(b_k).take(count) {
                if a != 0.0 || b_k != 0.0 {
                    // Λᵢⱼ = exp(aᵢⱼ + bᵢⱼ/T)
                    *value = exp(a + b_k / temperature_k);
                }
            }
        }
        Self { count, values }
    }

    /// As [`Lambda::at`], of some of the components only.
    pub(super) fn among(pairs: &Pairs, which: &[usize], temperature_k: f64) -> Self {
        let mut values = [[1.0; LARGEST]; LARGEST];
        for (row, &i) in values.iter_mut().zip(which) {
            for (value, &j) in row.iter_mut().zip(which) {
                let (a, b_k) = (pairs.a[i][j], pairs.b_k[i][j]);
                if a != 0.0 || b_k != 0.0 {
                    // Λᵢⱼ = exp(aᵢⱼ + bᵢⱼ/T)
                    *value = exp(a + b_k / temperature_k);
                }
            }
        }
        Self { count: which.len(), values }
    }

    /// Λᵢⱼ.
    pub(super) fn between(&self, i: usize, j: usize) -> f64 {
        self.values[i][j]
    }

    /// Some of the components only.
    pub(super) fn part(&self, which: &[usize]) -> Self {
        let mut values = [[1.0; LARGEST]; LARGEST];
        for (row, &i) in values.iter_mut().zip(which) {
            for (value, &j) in row.iter_mut().zip(which) {
                *value = self.values[i][j];
            }
        }
        Self { count: which.len(), values }
    }

    /// γᵢ of amounts, of which only the ratio counts.
    pub(super) fn activity_of_amounts(&self, n: &PerComponent) -> PerComponent {
        let mut gamma = [1.0; LARGEST];
        if self.count < 2 {
            return gamma;
        }
        let (mut total, mut over) = (0.0, [0.0; LARGEST]);
        for k in 0..self.count {
            let mut sum = 0.0;
            for (n, value) in n.iter().zip(self.values[k]).take(self.count) {
                sum += n * value;
            }
            // 1/(N Sₖ), N Sₖ = Σⱼ nⱼ Λₖⱼ
            over[k] = 1.0 / sum;
            total += n[k];
        }
        for i in 0..self.count {
            let mut sum = 0.0;
            for k in 0..self.count {
                sum += n[k] * over[k] * self.values[k][i];
            }
            // ln γᵢ = 1 − ln Sᵢ − Σₖ xₖ Λₖᵢ / Sₖ
            gamma[i] = exp(1.0 - sum) * over[i] * total;
        }
        gamma
    }

    /// γᵢ of mole fractions that add to 1.
    pub(super) fn activity_coefficients(&self, x: &PerComponent) -> PerComponent {
        let mut over = [0.0; LARGEST];
        for (over, row) in over.iter_mut().zip(&self.values).take(self.count) {
            let mut sum = 0.0;
            for (x, value) in x.iter().zip(row).take(self.count) {
                sum += x * value;
            }
            // 1/Sₖ, Sₖ = Σⱼ xⱼ Λₖⱼ
            *over = 1.0 / sum;
        }
        let mut gamma = [0.0; LARGEST];
        for (i, gamma) in gamma.iter_mut().enumerate().take(self.count) {
            let mut sum = 0.0;
            for ((x, over), row) in x.iter().zip(over).zip(&self.values).take(self.count) {
                sum += x * row[i] * over;
            }
            // ln γᵢ = 1 − ln Sᵢ − Σₖ xₖ Λₖᵢ / Sₖ
            *gamma = exp(1.0 - sum) * over[i];
        }
        gamma
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::mixture::Wilson;

    #[test]
    fn a_pure_liquid_and_an_ideal_pair_have_gamma_one() {
        let mut pairs = Pairs::ideal(3).unwrap();
        let wilson =
            Wilson { a12: -0.6, b12_k: -340.0, a21: 0.6, b21_k: -365.0, low_k: 200.0, high_k: 400.0 };
        pairs.set(0, 1, wilson).unwrap();
        let lambda = Lambda::at(&pairs, 300.0);
        for (x, at) in [([1.0, 0.0, 0.0], 0), ([0.0, 1.0, 0.0], 1), ([0.0, 0.0, 1.0], 2)] {
            let mut whole = [0.0; LARGEST];
            whole[..3].copy_from_slice(&x);
            assert!((lambda.activity_coefficients(&whole)[at] - 1.0).abs() < 1e-14);
        }
        let mut x = [0.0; LARGEST];
        (x[0], x[2]) = (0.3, 0.7);
        let gamma = lambda.activity_coefficients(&x);
        assert!((gamma[0] - 1.0).abs() < 1e-14 && (gamma[2] - 1.0).abs() < 1e-14);
    }

    // Witness: the limits at infinite dilution, ln γ₁∞ = 1 − ln Λ₁₂ − Λ₂₁.
    #[test]
    fn infinite_dilution_is_the_closed_form() {
        let mut pairs = Pairs::ideal(2).unwrap();
        let wilson =
            Wilson { a12: -0.8, b12_k: -200.0, a21: 0.8, b21_k: -900.0, low_k: 200.0, high_k: 400.0 };
        pairs.set(0, 1, wilson).unwrap();
        let mut x = [0.0; LARGEST];
        x[1] = 1.0;
        let gamma = Lambda::at(&pairs, 330.0).activity_coefficients(&x);
        let (l12, l21) = (libm::exp(-0.8 - 200.0 / 330.0), libm::exp(0.8 - 900.0 / 330.0));
        assert!((gamma[0] / libm::exp(1.0 - libm::log(l12) - l21) - 1.0).abs() < 1e-14);
    }
}
