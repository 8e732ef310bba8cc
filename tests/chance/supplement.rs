//! JCGM 101:2008, clause 9. Standard uncertainties as printed (seen in a secondary source); intervals from memory,
//! recomputed independently, unless an exact value stands beside them. Tolerances: the last printed digit, or what a
//! million draws leave unsure where that is more.

use super::{drawn, input, near, normal, rectangular};
use thimbleworth::chance::{combined_uncertainty, contribution};
use thimbleworth::quantity::Spread;

/// 9.2.2: the sum of four standard normal quantities has u = 2 and ±1.96 · 2 = ±3.92.
#[test]
fn four_normal_quantities() {
    let inputs = ["a", "b", "c", "d"].map(|n| normal(n, 0.0, 1.0));
    let found = drawn(&inputs, 0.95, |x| x.iter().sum());
    near(found.mean, 0.0, 0.01);
    near(found.u, 2.0, 0.005);
    for (limit, sign) in [(found.symmetric.low, -1.0), (found.symmetric.high, 1.0)] {
        near(limit, sign * 3.92, 0.03);
    }
}

/// 9.2.3: four rectangular ones of standard deviation 1: exact limits ±2√3 (2 − (3/5)^¼) = ±3.88.
#[test]
fn four_rectangular_quantities() {
    let a = 3.0_f64.sqrt();
    let inputs = ["a", "b", "c", "d"].map(|n| rectangular(n, -a, a));
    let found = drawn(&inputs, 0.95, |x| x.iter().sum());
    near(found.u, 2.0, 0.005);
    let exact = 2.0 * a * (2.0 - 0.6_f64.powf(0.25));
    near(exact, 3.88, 0.005);
    near(found.symmetric.low, -exact, 0.02);
    near(found.symmetric.high, exact, 0.02);
}

/// 9.2.4: one of them ten times as wide: u = 10.1, ±17.0, where the first-order interval is ±19.9.
#[test]
fn one_dominant_quantity() {
    let a = 3.0_f64.sqrt();
    let mut inputs: Vec<_> = ["a", "b", "c"].map(|n| rectangular(n, -a, a)).to_vec();
    inputs.push(rectangular("d", -10.0 * a, 10.0 * a));
    let found = drawn(&inputs, 0.95, |x| x.iter().sum());
    near(found.u, 10.1, 0.06);
    near(found.symmetric.low, -17.0, 0.05);
    near(found.symmetric.high, 17.0, 0.05);
    let u = combined_uncertainty(&inputs.map_u(), &[]);
    near(1.96 * u, 19.9, 0.05);
}

trait MapU {
    fn map_u(&self) -> Vec<f64>;
}

impl MapU for Vec<thimbleworth::chance::Input> {
    fn map_u(&self) -> Vec<f64> {
        self.iter().map(|i| i.spread.standard_uncertainty()).collect()
    }
}

/// 9.3, calibration of a weight against a reference of equal nominal mass, mg (inputs from memory; they give the printed
/// first-order u of 0.0539): (m_Rc + δm_Rc)(1 + (ρ_a − 1.2)(1/ρ_W − 1/ρ_R)) − m_nom. By draws 1.2341, u 0.0754 and
/// [1.0834, 1.3825]; to first order 1.2340, u 0.0539, because the derivative by ρ_W is 0 at the centre.
#[test]
fn mass_calibration() {
    let inputs = [
        normal("m", 100_000.0, 0.050),
        normal("delta", 1.234, 0.020),
        rectangular("air", 1.10, 1.30),
        rectangular("weight", 7000.0, 9000.0),
        rectangular("reference", 7950.0, 8050.0),
    ];
    let model = |x: &[f64]| (x[0] + x[1]) * (1.0 + (x[2] - 1.2) * (1.0 / x[3] - 1.0 / x[4])) - 100_000.0;
    let found = drawn(&inputs, 0.95, model);
    near(found.mean, 1.2341, 3e-4);
    near(found.u, 0.0754, 2e-4);
    // Printed is the shortest interval of one run; its ends wander by 0.001 from run to run of a million draws.
    near(found.shortest.low, 1.0834, 3e-3);
    near(found.shortest.high, 1.3825, 3e-3);
    // Twenty runs by NumPy 2.4.6 give 1.084 44 and 1.383 64 for the symmetric one, each u 0.0002.
    near(found.symmetric.low, 1.084_44, 6e-4);
    near(found.symmetric.high, 1.383_64, 6e-4);

    let central: Vec<f64> = inputs.iter().map(|i| i.central_si).collect();
    let mut first_order = Vec::new();
    for (i, input) in inputs.iter().enumerate() {
        let at = |sign: f64| {
            let mut x = central.clone();
            x[i] += sign * input.spread.standard_uncertainty();
            model(&x)
        };
        first_order.push(contribution(at(1.0), at(-1.0)));
    }
    near(model(&central), 1.2340, 5e-5);
    near(combined_uncertainty(&first_order, &[]), 0.0539, 5e-5);
}

/// 9.4, comparison loss δY = X1² + X2², u = 0.005; correlated with r = 0.9 by a Cholesky factor. Mean and u against the
/// exact x1² + x2² + 2u² and 4u⁴(1 + r²) + 4u²(x1² + …); the shortest 95 % intervals within 2 %, as far as they are known.
#[test]
fn comparison_loss() {
    let u = 0.005;
    for (x1, r, mean_e6, u_e6, high_e6) in [
        (0.0, 0.0, 50.0, 50.0, Some((0.0, 150.0))),
        (0.010, 0.0, 150.0, 112.0, Some((0.0, 367.0))),
        (0.050, 0.0, 2551.0, 502.0, Some((1590.0, 3543.0))),
        (0.0, 0.9, 50.0, 67.0, Some((0.0, 185.0))),
        (0.010, 0.9, 150.0, 121.0, None),
        (0.050, 0.9, 2551.0, 505.0, Some((1628.0, 3555.0))),
    ] {
        let inputs = [normal("first", 0.0, u), normal("second", 0.0, u)];
        let found = drawn(&inputs, 0.95, |e| {
            let a = x1 + e[0];
            // e₂ = r e₁ + √(1 − r²) e
            let b = r * e[0] + (1.0_f64 - r * r).sqrt() * e[1];
            a * a + b * b
        });
        let exact_mean = x1 * x1 + 2.0 * u * u;
        let exact_u = (4.0 * u * u * u * u * (1.0 + r * r) + 4.0 * u * u * x1 * x1).sqrt();
        near(found.mean, exact_mean, 5.0 * exact_u / 1000.0);
        near(found.u, exact_u, 0.006 * exact_u);
        near(found.mean * 1e6, mean_e6, 0.01 * mean_e6);
        near(found.u * 1e6, u_e6, 0.01 * u_e6);
        if let Some((low, high)) = high_e6 {
            near(found.shortest.low * 1e6, low, 0.02 * high);
            near(found.shortest.high * 1e6, high, 0.02 * high);
        }
    }
}

/// 9.5, gauge block, nm (input quantities seen in a secondary source): by draws 838, u 36, 99 % [745, 932]; to first order
/// u 32. The t, U-shaped and curvilinear trapezoidal quantities are made here from normal and rectangular draws.
#[test]
fn gauge_block() {
    // t with ν degrees of freedom: z / √(χ²/ν); even ν: χ² = −2 Σ ln p over ν/2 uniform numbers.
    fn chi_square(p: &[f64]) -> f64 {
        p.iter().map(|p| -2.0 * p.ln()).sum()
    }
    let mut inputs = Vec::new();
    for i in 0..4 {
        inputs.push(normal(&format!("z{i}"), 0.0, 1.0));
    }
    for i in 0..30 {
        inputs.push(rectangular(&format!("p{i}"), 0.0, 1.0));
    }
    inputs.push(normal("theta0", -0.1, 0.2));
    inputs.push(input("exact", 1.0, Spread::Exact));
    let found = drawn(&inputs, 0.99, |x| {
        let (z, p) = (&x[..4], &x[4..34]);
        let student = |z: f64, p: &[f64]| z / (chi_square(p) / (2.0 * p.len() as f64)).sqrt();
        let ls = 50_000_623.0 + 25.0 * student(z[0], &p[0..9]);
        let d = 215.0 + 6.0 * student(z[1], &p[9..21]);
        // 5 degrees of freedom: two uniform numbers and the square of a normal one, from a pair of uniform numbers.
        let extra = (-2.0 * p[21].ln()).sqrt() * (2.0 * std::f64::consts::PI * p[22]).cos();
        let d1 = 4.0 * z[2] / ((chi_square(&p[23..25]) + extra * extra) / 5.0).sqrt();
        let d2 = 7.0 * student(z[3], &p[25..29]);
        let alpha_s = 9.5e-6 + 4e-6 * p[29];
        let theta0 = x[34];
        // Arc sine on ±0.5, and trapezoids whose half-widths are unsure by themselves, from digits of other numbers.
        let digits = |p: f64, k: f64| (p * k).fract();
        let delta = 0.5 * (2.0 * std::f64::consts::PI * digits(p[29], 4096.0)).sin();
        let trapezoid = |half: f64, unsure: f64, a: f64, b: f64| {
            let half = half - unsure + 2.0 * unsure * a;
            half * (2.0 * b - 1.0)
        };
        let dalpha = trapezoid(1e-6, 0.1e-6, digits(p[0], 4096.0), digits(p[1], 4096.0));
        let dtheta = trapezoid(0.05, 0.025, digits(p[2], 4096.0), digits(p[3], 4096.0));
        let length = ls + d + d1 + d2 - ls * (dalpha * (theta0 + delta) + alpha_s * dtheta);
        length - 50_000_000.0
    });
    near(found.mean, 838.0, 0.5);
    near(found.u, 36.0, 0.5);
    near(found.symmetric.low, 745.0, 2.0);
    near(found.symmetric.high, 932.0, 2.0);
}
