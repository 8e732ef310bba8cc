//! Draws against the library `rand_distr`, and moments against exact ones.

use super::{drawn, near, normal, rectangular};
use rand_distr::{Distribution, Normal, Uniform};
use rand_pcg::Pcg64;

const COUNT: u64 = 200_000;

/// The two-sample Kolmogorov-Smirnov distance.
fn distance(mut a: Vec<f64>, mut b: Vec<f64>) -> f64 {
    a.sort_by(f64::total_cmp);
    b.sort_by(f64::total_cmp);
    let (mut i, mut j, mut largest) = (0, 0, 0.0_f64);
    while i < a.len() && j < b.len() {
        if a[i] <= b[j] {
            i += 1;
        } else {
            j += 1;
        }
        largest = largest.max((i as f64 / a.len() as f64 - j as f64 / b.len() as f64).abs());
    }
    largest
}

/// Samples of equal size from one distribution stay below 1.95 √(2/n) in 999 of 1000 cases (Smirnov; constant from
/// memory); a mean that is off by a fiftieth of the standard deviation does not.
#[test]
fn draws_are_those_of_the_reference_library() {
    let limit = 1.95 * (2.0 / COUNT as f64).sqrt();
    for seed in [1_u64, 7] {
        let mut rng = Pcg64::new(u128::from(seed), 0x0a02_bdbf_7bb3_c0a7_ac28_fa16_a64a_bf96);
        let ours =
            |input: &thimbleworth::chance::Input| (0..COUNT).map(|d| input.draw(seed, d)).collect::<Vec<_>>();
        let theirs: Vec<f64> =
            Normal::new(3.0, 0.25).unwrap().sample_iter(&mut rng).take(COUNT as usize).collect();
        assert!(distance(ours(&normal("density", 3.0, 0.25)), theirs.clone()) < limit);
        assert!(distance(ours(&normal("density", 3.005, 0.25)), theirs) > limit);
        let theirs: Vec<f64> =
            Uniform::new(-2.0, 5.0).unwrap().sample_iter(&mut rng).take(COUNT as usize).collect();
        assert!(distance(ours(&rectangular("charge", -2.0, 5.0)), theirs.clone()) < limit);
        assert!(distance(ours(&rectangular("charge", -2.0, 5.1)), theirs) > limit);
    }
}

/// A product of independent quantities: E = Π μ, V = Π (μ² + σ²) − Π μ²; five standard errors are allowed.
#[test]
fn moments_of_a_product_are_exact() {
    let inputs = [normal("n", 100.0, 7.0), rectangular("v", 0.2, 0.4), rectangular("price", 10.0, 30.0)];
    let found = drawn(&inputs, 0.95, |x| x[0] * x[1] * x[2]);
    let (mean, variances) = ([100.0, 0.3, 20.0], [49.0, 0.04 / 12.0, 400.0 / 12.0]);
    let expected: f64 = mean.iter().product();
    let second: f64 = mean.iter().zip(variances).map(|(m, v)| m * m + v).product();
    let u = (second - expected * expected).sqrt();
    near(found.mean, expected, 5.0 * u / 1000.0);
    near(found.u, u, 0.005 * u);
}

/// Numbers of two inputs have nothing to do with one another, nor have those of two seeds: |r| below 5/√n.
#[test]
fn inputs_and_seeds_are_independent() {
    let r = |a: &dyn Fn(u64) -> f64, b: &dyn Fn(u64) -> f64| {
        let n = 100_000;
        let sum: f64 = (0..n).map(|d| (a(d) - 0.5) * (b(d) - 0.5)).sum();
        12.0 * sum / n as f64
    };
    let names =
        ["a", "b", "workloads[0].routes[0].steps[1].charge", "workloads[0].routes[0].steps[2].charge"];
    let inputs = names.map(|n| rectangular(n, 0.0, 1.0));
    for (i, one) in inputs.iter().enumerate() {
        for other in &inputs[..i] {
            assert!(r(&|d| one.draw(1, d), &|d| other.draw(1, d)).abs() < 5.0 / 316.0);
        }
        for seed in [2, 3, u64::MAX] {
            assert!(r(&|d| one.draw(1, d), &|d| one.draw(seed, d)).abs() < 5.0 / 316.0);
        }
        assert!(r(&|d| one.draw(1, d), &|d| one.draw(1, d + 1)).abs() < 5.0 / 316.0);
    }
}
