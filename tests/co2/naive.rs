//! The equation term by term as it is printed, from its own copy of the coefficients, with the standard library's
//! powers and exponentials. Slow and plain: what the core's folded form is compared with.
use super::table::number;

pub(crate) const CRITICAL_TEMPERATURE_K: f64 = 304.1282;
pub(crate) const REDUCING_DENSITY_MOL_M3: f64 = 10_624.906_3;
pub(crate) const MOLAR_MASS_KG_MOL: f64 = 0.044_009_8;
pub(crate) const GAS_CONSTANT_J_MOL_K: f64 = 8.314_51;

pub(crate) struct Equation {
    /// Kind of term and its coefficients.
    pub(crate) terms: Vec<(&'static str, Vec<f64>)>,
}

impl Equation {
    pub(crate) fn read() -> Self {
        let text = include_str!("coefficients.csv");
        let terms: Vec<_> = text
            .lines()
            .filter(|line| !line.starts_with('#'))
            .map(|line| {
                let (kind, rest) = line.split_once(',').unwrap();
                (kind, rest.split(',').map(number).collect())
            })
            .collect();
        let count = |kind| terms.iter().filter(|(k, _)| *k == kind).count();
        assert_eq!((count("power"), count("gauss"), count("critical"), count("vibration")), (34, 5, 3, 5));
        Self { terms }
    }

    /// φʳ(τ, δ)
    pub(crate) fn residual(&self, tau: f64, delta: f64) -> f64 {
        let mut sum = 0.0;
        for (kind, c) in &self.terms {
            sum += match (*kind, c.as_slice()) {
                ("power", &[n, d, t, l]) => {
                    let decay = if l > 0.0 { (-delta.powf(l)).exp() } else { 1.0 };
                    n * delta.powf(d) * tau.powf(t) * decay
                }
                ("gauss", &[n, d, t, eta, beta, gamma]) => {
                    let away = -eta * (delta - 1.0).powi(2) - beta * (tau - gamma).powi(2);
                    n * delta.powf(d) * tau.powf(t) * away.exp()
                }
                ("critical", &[n, a, b, beta, big_a, big_b, big_c, big_d]) => {
                    let u = (delta - 1.0).powi(2);
                    let theta = (1.0 - tau) + big_a * u.powf(1.0 / (2.0 * beta));
                    let distance = theta * theta + big_b * u.powf(a);
                    n * distance.powf(b) * delta * (-big_c * u - big_d * (tau - 1.0).powi(2)).exp()
                }
                _ => 0.0,
            };
        }
        sum
    }

    /// δ ∂φʳ/∂δ, differentiated by hand term by term.
    pub(crate) fn residual_by_delta(&self, tau: f64, delta: f64) -> f64 {
        let mut sum = 0.0;
        for (kind, c) in &self.terms {
            sum += match (*kind, c.as_slice()) {
                ("power", &[n, d, t, l]) => {
                    let y = if l > 0.0 { delta.powf(l) } else { 0.0 };
                    n * delta.powf(d) * tau.powf(t) * (-y).exp() * (d - l * y)
                }
                ("gauss", &[n, d, t, eta, beta, gamma]) => {
                    let away = -eta * (delta - 1.0).powi(2) - beta * (tau - gamma).powi(2);
                    let slope = d - 2.0 * eta * delta * (delta - 1.0);
                    n * delta.powf(d) * tau.powf(t) * away.exp() * slope
                }
                ("critical", &[n, a, b, beta, big_a, big_b, big_c, big_d]) if delta != 1.0 => {
                    let s = delta - 1.0;
                    let u = s * s;
                    let theta = (1.0 - tau) + big_a * u.powf(1.0 / (2.0 * beta));
                    let distance = theta * theta + big_b * u.powf(a);
                    let theta_slope = big_a / beta * s * u.powf(1.0 / (2.0 * beta) - 1.0);
                    let distance_slope = 2.0 * theta * theta_slope + 2.0 * big_b * a * s * u.powf(a - 1.0);
                    let psi = (-big_c * u - big_d * (tau - 1.0).powi(2)).exp();
                    let power_slope = b * distance.powf(b - 1.0) * distance_slope;
                    n * delta
                        * (distance.powf(b) * (psi - 2.0 * big_c * s * delta * psi)
                            + power_slope * delta * psi)
                }
                _ => 0.0,
            };
        }
        sum
    }

    /// φ⁰(τ, δ)
    pub(crate) fn ideal(&self, tau: f64, delta: f64) -> f64 {
        let mut sum = delta.ln();
        for (kind, c) in &self.terms {
            sum += match (*kind, c.as_slice()) {
                ("lead", &[constant, slope]) => constant + slope * tau,
                ("log", &[a]) => a * tau.ln(),
                ("vibration", &[a, theta]) => a * (1.0 - (-theta * tau).exp()).ln(),
                _ => 0.0,
            };
        }
        sum
    }

    pub(crate) fn pressure_pa(&self, temperature_k: f64, density_kg_m3: f64) -> f64 {
        let (tau, delta) = reduced(temperature_k, density_kg_m3);
        let molar = density_kg_m3 / MOLAR_MASS_KG_MOL;
        molar * GAS_CONSTANT_J_MOL_K * temperature_k * (1.0 + self.residual_by_delta(tau, delta))
    }

    /// g/(R T) up to a function of the temperature.
    pub(crate) fn gibbs(&self, temperature_k: f64, density_kg_m3: f64) -> f64 {
        let (tau, delta) = reduced(temperature_k, density_kg_m3);
        self.residual(tau, delta) + self.residual_by_delta(tau, delta) + delta.ln()
    }
}

pub(crate) fn reduced(temperature_k: f64, density_kg_m3: f64) -> (f64, f64) {
    (CRITICAL_TEMPERATURE_K / temperature_k, density_kg_m3 / MOLAR_MASS_KG_MOL / REDUCING_DENSITY_MOL_M3)
}
