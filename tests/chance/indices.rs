//! Shares of variance against functions whose shares are known exactly.

use super::{near, normal, rectangular};
use std::f64::consts::PI;
use thimbleworth::chance::variance_share;

/// Ishigami and Homma 1990 with a = 7, b = 0.1 and three quantities uniform on ±π: V1 = (1 + bπ⁴/5)²/2, V2 = a²/8, V3 = 0,
/// V13 = b²π⁸(1/18 − 1/50); shares 0.3139, 0.4424 and 0 (seen in a secondary source, recomputed). The second acts without
/// any trend, and the third only together with the first. A bin flattens a wave: of n waves over 32 bins the share
/// (sin h / h)², h = nπ/32, is left. 100,000 draws: 0.005; 10,000: 0.015.
#[test]
fn ishigami() {
    let (a, b) = (7.0, 0.1);
    let v1 = 0.5 * (1.0 + b * PI.powi(4) / 5.0_f64).powi(2);
    let v2 = a * a / 8.0;
    let v13 = b * b * PI.powi(8) * (1.0 / 18.0 - 1.0 / 50.0);
    let exact = [v1, v2, 0.0].map(|v| v / (v1 + v2 + v13));
    for (found, printed) in exact.iter().zip([0.313_905, 0.442_411, 0.0]) {
        near(*found, printed, 1e-6);
    }
    // sin x1 is one wave, sin² x2 is two.
    let left = |waves: f64| {
        let h = waves * PI / 32.0;
        (h.sin() / h).powi(2)
    };
    let binned = [exact[0] * left(1.0), exact[1] * left(2.0), 0.0];
    let inputs = ["x1", "x2", "x3"].map(|n| rectangular(n, -PI, PI));
    for (draws, within) in [(100_000_u64, 0.005), (10_000, 0.015)] {
        for seed in [1, 2, 3] {
            let values: Vec<f64> = (0..draws)
                .map(|d| {
                    let [x1, x2, x3] = [0, 1, 2].map(|i| inputs[i].draw(seed, d));
                    x1.sin() + a * x2.sin().powi(2) + b * x3.powi(4) * x1.sin()
                })
                .collect();
            for (input, expected) in inputs.iter().zip(binned) {
                near(variance_share(0..draws, &values, input.key, seed).unwrap(), expected, within);
            }
            // A quantity that is not in the function explains nothing.
            near(variance_share(0..draws, &values, 12_345, seed).unwrap(), 0.0, within);
        }
    }
}

/// A sum of independent quantities: each explains its own variance, and together they explain all.
#[test]
fn a_sum_is_explained_whole() {
    let inputs = [normal("a", 5.0, 3.0), normal("b", -1.0, 4.0), rectangular("c", 0.0, 12.0)];
    let values: Vec<f64> = (0..100_000).map(|d| inputs.iter().map(|i| i.draw(9, d)).sum()).collect();
    // 9, 16 and 144/12 of 37
    for (input, part) in inputs.iter().zip([9.0, 16.0, 12.0]) {
        near(variance_share(0..100_000, &values, input.key, 9).unwrap(), part / 37.0, 0.006);
    }
}

#[test]
fn what_does_not_vary_or_is_too_little_has_no_share() {
    assert_eq!(variance_share(0..1000, &[2.0; 1000], 1, 1), None);
    let few: Vec<f64> = (0..319).map(f64::from).collect();
    assert_eq!(variance_share(0..319, &few, 1, 1), None);
}
