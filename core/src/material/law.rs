//! How a property follows the temperature: published equations with their range and their spread.
use super::{Figure, PropertyError, Text};

/// Molar gas constant, J/(mol K), 2019 SI.
const R: f64 = 8.314_462_618;

/// A property as a function of temperature.
#[derive(Clone, Debug, Default, PartialEq)]
pub enum Law {
    /// No figure is known.
    #[default]
    NotKnown,
    /// One figure for every temperature, as a plan states it for its own material.
    Constant(Figure),
    /// A published equation with its range.
    Equation(Equation),
}

/// A published equation, the range in which it holds, and how far other sources lie from it.
#[derive(Clone, Debug, PartialEq)]
pub struct Equation {
    /// The form with its coefficients.
    pub form: Form,
    /// The lowest temperature, K.
    pub low_k: f64,
    /// The highest temperature, K.
    pub high_k: f64,
    /// How far below the value the lowest source lies, as a share of the value.
    pub below: f64,
    /// How far above the value the highest source lies, as a share of the value.
    pub above: f64,
    /// A key of the bibliography.
    pub source: Text,
}

/// The forms in use; the result is in SI units (kg/m³, Pa or J/kg). `τ = 1 − T/Tc`.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Form {
    /// Density of the saturated liquid, VDI Heat Atlas D3.1: `ρ = ρc + A τ^0.35 + B τ^(2/3) + C τ + D τ^(4/3)`.
    DensityVdi {
        /// Critical temperature, K.
        tc_k: f64,
        /// Critical density, kg/m³.
        rho_c_kg_m3: f64,
        /// A, B, C, D, kg/m³.
        terms: [f64; 4],
    },
    /// Density of the saturated liquid, Perry table 2-32: `ρ = M C1 / C2^(1 + (1 − T/C3)^C4)`.
    DensityPerry {
        /// Molar mass, kg/mol.
        molar_mass_kg_mol: f64,
        /// C1 (mol/m³), C2 (1), C3 (K), C4 (1).
        c: [f64; 4],
    },
    /// One density with a constant expansion: `ρ = ρ₀ (1 − β (T − T₀))`.
    DensityLinear {
        /// ρ₀, kg/m³.
        density_kg_m3: f64,
        /// T₀, K.
        at_k: f64,
        /// β, 1/K.
        expansion_per_k: f64,
    },
    /// Vapour pressure, Wagner: `ln(p/pc) = (Tc/T) (A τ + B τ^1.5 + C τ^x + D τ^y)`, with `(x, y)` = (2.5, 5) or (3, 6).
    Wagner {
        /// Critical temperature, K.
        tc_k: f64,
        /// Critical pressure, Pa.
        pc_pa: f64,
        /// A, B, C, D.
        terms: [f64; 4],
        /// x and y.
        powers: WagnerPowers,
    },
    /// Vapour pressure, Antoine: `log₁₀(p/Pa) = A − B/(T + C)`.
    Antoine {
        /// A (1), B (K), C (K).
        c: [f64; 3],
    },
    /// Vapour pressure, Perry table 2-8: `ln(p/Pa) = C1 + C2/T + C3 ln T + C4 T^C5`.
    VapourPerry {
        /// C1 to C5.
        c: [f64; 5],
    },
    /// Heat of vaporisation, VDI Heat Atlas D3.1: `Δh = (R Tc/M) (A τ^(1/3) + B τ^(2/3) + C τ + D τ² + E τ⁶)`.
    HeatVdi {
        /// Critical temperature, K.
        tc_k: f64,
        /// Molar mass, kg/mol.
        molar_mass_kg_mol: f64,
        /// A to E.
        terms: [f64; 5],
    },
    /// Heat of vaporisation, Perry table 2-150: `Δh = (C1/M) τ^(C2 + C3 Tr + C4 Tr²)`, `Tr = T/Tc`.
    HeatPerry {
        /// Critical temperature, K.
        tc_k: f64,
        /// Molar mass, kg/mol.
        molar_mass_kg_mol: f64,
        /// C1 (J/mol), C2, C3, C4.
        c: [f64; 4],
    },
    /// Heat of vaporisation, Watson: `Δh = Δh₀ (τ/τ₀)^0.38`.
    HeatWatson {
        /// Δh₀, J/kg.
        heat_j_kg: f64,
        /// The temperature of Δh₀, K.
        at_k: f64,
        /// Critical temperature, K.
        tc_k: f64,
    },
}

/// The two pairs of powers in which Wagner's equation is published.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum WagnerPowers {
    /// 2.5 and 5.
    TwoAndAHalfAndFive,
    /// 3 and 6.
    ThreeAndSix,
}

impl Form {
    /// The value at `temperature_k`, without regard to the range; NaN where the form has no value.
    fn value(&self, temperature_k: f64) -> f64 {
        let t = temperature_k;
        match *self {
            Self::DensityVdi { tc_k, rho_c_kg_m3, terms: [a, b, c, d] } => {
                let tau = 1.0 - t / tc_k;
                let root = libm::cbrt(tau);
                // ρ = ρc + A τ^0.35 + B τ^(2/3) + C τ + D τ^(4/3)
                rho_c_kg_m3 + a * libm::pow(tau, 0.35) + b * root * root + c * tau + d * tau * root
            }
            Self::DensityPerry { molar_mass_kg_mol, c: [c1, c2, c3, c4] } => {
                // ρ = M C1 / C2^(1 + (1 − T/C3)^C4)
                molar_mass_kg_mol * c1 / libm::pow(c2, 1.0 + libm::pow(1.0 - t / c3, c4))
            }
            Self::DensityLinear { density_kg_m3, at_k, expansion_per_k } => {
                // ρ = ρ₀ (1 − β (T − T₀))
                density_kg_m3 * (1.0 - expansion_per_k * (t - at_k))
            }
            Self::Wagner { tc_k, pc_pa, terms: [a, b, c, d], powers } => {
                let tau = 1.0 - t / tc_k;
                let root = tau.sqrt();
                let square = tau * tau;
                let (to_x, to_y) = match powers {
                    WagnerPowers::TwoAndAHalfAndFive => (square * root, square * square * tau),
                    WagnerPowers::ThreeAndSix => (square * tau, square * square * square),
                };
                let sum = a * tau + b * tau * root + c * to_x + d * to_y;
                // p = pc exp((Tc/T) Σ)
                pc_pa * libm::exp(tc_k / t * sum)
            }
            Self::Antoine { c: [a, b, c] } => {
                // p = 10^(A − B/(T + C))
                libm::pow(10.0, a - b / (t + c))
            }
            Self::VapourPerry { c: [c1, c2, c3, c4, c5] } => {
                // p = exp(C1 + C2/T + C3 ln T + C4 T^C5)
                libm::exp(c1 + c2 / t + c3 * libm::log(t) + c4 * libm::pow(t, c5))
            }
            Self::HeatVdi { tc_k, molar_mass_kg_mol, terms: [a, b, c, d, e] } => {
                let tau = 1.0 - t / tc_k;
                let root = libm::cbrt(tau);
                let cube = tau * tau * tau;
                let sum = a * root + b * root * root + c * tau + d * tau * tau + e * cube * cube;
                // Δh = (R Tc/M) Σ
                R * tc_k / molar_mass_kg_mol * sum
            }
            Self::HeatPerry { tc_k, molar_mass_kg_mol, c: [c1, c2, c3, c4] } => {
                let tr = t / tc_k;
                // Δh = (C1/M) τ^(C2 + C3 Tr + C4 Tr²)
                c1 / molar_mass_kg_mol * libm::pow(1.0 - tr, c2 + c3 * tr + c4 * tr * tr)
            }
            Self::HeatWatson { heat_j_kg, at_k, tc_k } => {
                // Δh = Δh₀ (τ/τ₀)^0.38
                heat_j_kg * libm::pow((1.0 - t / tc_k) / (1.0 - at_k / tc_k), 0.38)
            }
        }
    }
}

impl Law {
    /// The range in which the law holds, K; `None` when nothing is known, everything for a constant.
    #[must_use]
    pub fn range_k(&self) -> Option<(f64, f64)> {
        match self {
            Self::NotKnown => None,
            Self::Constant(_) => Some((0.0, f64::INFINITY)),
            Self::Equation(equation) => Some((equation.low_k, equation.high_k)),
        }
    }

    /// The bare value at a temperature in K: no allocation, for the inside of a sampled run.
    ///
    /// `material` and `property` only name the error.
    ///
    /// # Errors
    /// [`PropertyError`] when nothing is known or the temperature is outside the range.
    pub fn value(
        &self,
        temperature_k: f64,
        material: &Text,
        property: &'static str,
    ) -> Result<f64, PropertyError> {
        match self {
            Self::NotKnown => Err(PropertyError::NotKnown { material: material.clone(), property }),
            Self::Constant(figure) => Ok(figure.value),
            Self::Equation(equation) => {
                // Written so that a temperature that is not a number falls outside.
                if equation.low_k <= temperature_k && temperature_k <= equation.high_k {
                    Ok(equation.form.value(temperature_k))
                } else {
                    Err(PropertyError::OutOfRange {
                        material: material.clone(),
                        property,
                        temperature_k,
                        low_k: equation.low_k,
                        high_k: equation.high_k,
                    })
                }
            }
        }
    }

    /// The value at a temperature in K with its spread and source.
    ///
    /// # Errors
    /// As [`Law::value`].
    pub fn figure(
        &self,
        temperature_k: f64,
        material: &Text,
        property: &'static str,
    ) -> Result<Figure, PropertyError> {
        let value = self.value(temperature_k, material, property)?;
        Ok(match self {
            Self::Equation(equation) => Figure::new(
                value,
                value * (1.0 - equation.below),
                value * (1.0 + equation.above),
                equation.source.clone(),
            ),
            Self::Constant(figure) => figure.clone(),
            Self::NotKnown => Figure::single(value, ""),
        })
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn antoine() -> Law {
        Law::Equation(Equation {
            form: Form::Antoine { c: [9.001_39, 1170.875, -48.833] },
            low_k: 254.24,
            high_k: 365.25,
            below: 0.01,
            above: 0.02,
            source: "Poling 2001".into(),
        })
    }

    // Witness: n-hexane at 20 °C, 16 179 Pa, recomputed from Poling's set (not printed there).
    #[test]
    fn antoine_gives_hexane() {
        let p = antoine().figure(293.15, &"n-hexane".into(), "vapour pressure").unwrap();
        assert!((p.value - 16_178.9).abs() < 0.1, "{}", p.value);
        assert!((p.low / p.value - 0.99).abs() < 1e-12 && (p.high / p.value - 1.02).abs() < 1e-12);
    }

    #[test]
    fn never_extrapolates() {
        for t in [254.23, 365.26, f64::NAN, f64::INFINITY, -1.0] {
            let error = antoine().value(t, &"n-hexane".into(), "vapour pressure").unwrap_err();
            assert!(matches!(error, PropertyError::OutOfRange { .. }), "{t}");
        }
        assert!(matches!(
            Law::NotKnown.value(300.0, &"x".into(), "density"),
            Err(PropertyError::NotKnown { .. })
        ));
        let constant = Law::Constant(Figure::single(900.0, "own"));
        assert_eq!(constant.value(5.0, &"x".into(), "density"), Ok(900.0));
    }
}
