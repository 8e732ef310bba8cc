//! Solubility by Chrastil's equation, and its fit to measured points.
use super::DenseGasError;
use super::error::{positive, within};
use crate::source::{Source, Standing};

/// The equation.
pub const SOURCE: Source =
    Source::new("J. Chrastil, J. Phys. Chem. 86 (1982) 3016: form of the equation", Standing::FromMemory);

/// A measured solubility.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Measured {
    /// Density of the carbon dioxide, kg/m³.
    pub density_kg_m3: f64,
    /// Temperature, K.
    pub temperature_k: f64,
    /// Solute in a volume of the dense gas, kg/m³ (the same figure as g/L).
    pub solubility_kg_m3: f64,
}

/// Where the constants were fitted.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Range {
    /// Lowest and highest density, kg/m³.
    pub density_kg_m3: [f64; 2],
    /// Lowest and highest temperature, K.
    pub temperature_k: [f64; 2],
}

/// Whether a solubility lies where its constants were fitted.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum Reach {
    /// Inside.
    Inside,
    /// Outside: an extrapolation.
    Outside,
    /// The constants came without a range.
    NotStated,
}

/// Constants of S = ρᵏ exp(a/T + b), with S and ρ in kg/m³ and T in K.
///
/// Constants fitted with ρ or S in other units are other numbers: with g/mL they cannot be entered here.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Chrastil {
    /// Association number k.
    pub k: f64,
    /// a, K.
    pub a_k: f64,
    /// b.
    pub b: f64,
    /// Where they hold, if known.
    pub range: Option<Range>,
}

impl Chrastil {
    /// Solubility, kg/m³, at a density, kg/m³, and a temperature, K; and whether that is an extrapolation.
    ///
    /// The equation is for dilute solutions: above some 100 kg/m³ to 200 kg/m³ it overstates (from memory).
    ///
    /// # Errors
    /// [`DenseGasError::OutOfRange`] where an input is not above 0 or the result is not a finite number.
    ///
    /// ```
    /// use thimbleworth::dense_gas::chrastil::{Chrastil, Reach};
    /// // Invented constants: 1.5 kg/m³ at 800 kg/m³ and 320 K
    /// let (k, a_k) = (5.0, -4000.0);
    /// let b = (1.5_f64).ln() - k * (800.0_f64).ln() - a_k / 320.0;
    /// let found = Chrastil { k, a_k, b, range: None }.solubility_kg_m3(800.0, 320.0).unwrap();
    /// assert!((found.0 - 1.5).abs() < 1e-12 && found.1 == Reach::NotStated);
    /// ```
    pub fn solubility_kg_m3(
        &self,
        density_kg_m3: f64,
        temperature_k: f64,
    ) -> Result<(f64, Reach), DenseGasError> {
        let density = positive("density, kg/m³", density_kg_m3)?;
        let temperature = positive("temperature, K", temperature_k)?;
        // ln S = k ln ρ + a/T + b
        let ln = self.k * libm::log(density) + self.a_k / temperature + self.b;
        let solubility = within("solubility, kg/m³", libm::exp(ln), ln.is_finite(), "finite constants")?;
        let reach = self.range.map_or(Reach::NotStated, |range| {
            let inside = |[low, high]: [f64; 2], value: f64| value >= low && value <= high;
            if inside(range.density_kg_m3, density) && inside(range.temperature_k, temperature) {
                Reach::Inside
            } else {
                Reach::Outside
            }
        });
        Ok((solubility, reach))
    }
}

/// Constants fitted to measured points, and how well they meet them.
#[derive(Clone, Debug, PartialEq)]
pub struct Fit {
    /// The constants, with the range of the points.
    pub constants: Chrastil,
    /// ln(measured/fitted) of each point, in their order: 0.05 is 5 % too low a fit.
    pub residuals: Vec<f64>,
    /// Standard deviation of the residuals with n − 3 degrees of freedom; `None` for three points, which any fit meets.
    pub deviation: Option<f64>,
    /// Standard errors of k, a (K) and b; `None` for three points.
    pub standard_errors: Option<[f64; 3]>,
}

/// Least squares of ln S on ln ρ and 1/T: every point counts alike, relatively.
///
/// # Errors
/// [`DenseGasError::TooFewPoints`] below three, [`DenseGasError::NotToldApart`] where all points have one temperature or
/// one density or the two go together, [`DenseGasError::OutOfRange`] for a value that is not above 0.
///
/// ```
/// use thimbleworth::dense_gas::chrastil::{Chrastil, Measured, fit};
/// let truth = Chrastil { k: 6.0, a_k: -3500.0, b: -28.0, range: None };
/// let points: Vec<Measured> = [(700.0, 313.0), (850.0, 313.0), (700.0, 333.0), (850.0, 333.0)]
///     .map(|(density_kg_m3, temperature_k)| {
///         let (solubility_kg_m3, _) = truth.solubility_kg_m3(density_kg_m3, temperature_k).unwrap();
///         Measured { density_kg_m3, temperature_k, solubility_kg_m3 }
///     })
///     .to_vec();
/// let found = fit(&points).unwrap();
/// assert!((found.constants.k - 6.0).abs() < 1e-9);
/// assert!(found.deviation.unwrap() < 1e-12);
/// ```
pub fn fit(points: &[Measured]) -> Result<Fit, DenseGasError> {
    const NEEDED: usize = 3;
    if points.len() < NEEDED {
        return Err(DenseGasError::TooFewPoints { found: points.len(), needed: NEEDED });
    }
    // Columns ln ρ, 1000/T and ln S, taken from their means so that the sums keep their digits.
    let mut rows = Vec::with_capacity(points.len());
    let mut mean = [0.0; 3];
    let n = points.len() as f64;
    for point in points {
        let row = [
            libm::log(positive("density of a point, kg/m³", point.density_kg_m3)?),
            1e3 / positive("temperature of a point, K", point.temperature_k)?,
            libm::log(positive("solubility of a point, kg/m³", point.solubility_kg_m3)?),
        ];
        for (sum, value) in mean.iter_mut().zip(row) {
            *sum += value / n;
        }
        rows.push(row);
    }
    let mut s = [[0.0; 3]; 3];
    for row in &mut rows {
        for (value, middle) in row.iter_mut().zip(mean) {
            *value -= middle;
        }
        for (sums, left) in s.iter_mut().zip(*row) {
            for (sum, right) in sums.iter_mut().zip(*row) {
                *sum += left * right;
            }
        }
    }
    let [[s11, s12, s1y], [_, s22, s2y], _] = s;
    // Relative spreads below 1e-6 are one value read twice.
    if s11 < n * 1e-12 {
        return Err(DenseGasError::NotToldApart { what: "all have one density" });
    }
    if s22 < n * 1e-10 {
        return Err(DenseGasError::NotToldApart { what: "all have one temperature" });
    }
    let determinant = s11 * s22 - s12 * s12;
    if determinant < 1e-9 * s11 * s22 {
        return Err(DenseGasError::NotToldApart { what: "density and temperature go together" });
    }
    // Normal equations of the centred columns, by Cramer's rule
    let k = (s1y * s22 - s2y * s12) / determinant;
    let a = (s2y * s11 - s1y * s12) / determinant;
    let residuals: Vec<f64> = rows.iter().map(|[x1, x2, y]| y - k * x1 - a * x2).collect();
    let squares = residuals.iter().fold(0.0, |sum, r| sum + r * r);
    let free = points.len() - NEEDED;
    let (deviation, standard_errors) = if free == 0 {
        (None, None)
    } else {
        let variance = squares / free as f64;
        let [m1, m2, _] = mean;
        // Var b = s² (1/n + m₁² C₁₁ + 2 m₁ m₂ C₁₂ + m₂² C₂₂), C the inverse of the centred sums
        let lever = (m1 * m1 * s22 - 2.0 * m1 * m2 * s12 + m2 * m2 * s11) / determinant;
        let errors = [s22 / determinant, s11 / determinant, 1.0 / n + lever].map(|c| (variance * c).sqrt());
        let [of_k, of_a, of_b] = errors;
        (Some(variance.sqrt()), Some([of_k, 1e3 * of_a, of_b]))
    };
    let [m1, m2, my] = mean;
    let constants = Chrastil {
        k,
        a_k: 1e3 * a,
        b: my - k * m1 - a * m2,
        range: Some(Range {
            density_kg_m3: ends(points.iter().map(|p| p.density_kg_m3)),
            temperature_k: ends(points.iter().map(|p| p.temperature_k)),
        }),
    };
    Ok(Fit { constants, residuals, deviation, standard_errors })
}

fn ends(values: impl Iterator<Item = f64>) -> [f64; 2] {
    values.fold([f64::INFINITY, f64::NEG_INFINITY], |[low, high], value| {
        [if value < low { value } else { low }, if value > high { value } else { high }]
    })
}

#[cfg(test)]
mod tests {
    use super::*;

    fn point(density_kg_m3: f64, temperature_k: f64, solubility_kg_m3: f64) -> Measured {
        Measured { density_kg_m3, temperature_k, solubility_kg_m3 }
    }

    #[test]
    fn what_cannot_be_told_apart_is_refused() {
        let told = |points: &[Measured]| fit(points).unwrap_err();
        assert_eq!(told(&[point(1.0, 300.0, 1.0); 2]), DenseGasError::TooFewPoints { found: 2, needed: 3 });
        let isotherm = [700.0, 800.0, 900.0].map(|d| point(d, 313.15, d / 100.0));
        assert_eq!(told(&isotherm), DenseGasError::NotToldApart { what: "all have one temperature" });
        let isochore = [310.0, 320.0, 330.0].map(|t| point(800.0, t, t / 100.0));
        assert_eq!(told(&isochore), DenseGasError::NotToldApart { what: "all have one density" });
        let together = [310.0, 320.0, 330.0].map(|t| point(libm::exp(2000.0 / t), t, t / 100.0));
        assert_eq!(
            told(&together),
            DenseGasError::NotToldApart { what: "density and temperature go together" }
        );
        let negative = [point(700.0, 310.0, -1.0), point(800.0, 310.0, 1.0), point(800.0, 320.0, 1.0)];
        assert!(matches!(told(&negative), DenseGasError::OutOfRange { .. }));
    }

    #[test]
    fn the_range_is_that_of_the_points() {
        let points = [point(700.0, 310.0, 1.0), point(800.0, 310.0, 2.0), point(800.0, 330.0, 3.0)];
        let found = fit(&points).unwrap();
        assert!(found.deviation.is_none() && found.standard_errors.is_none());
        let reach = |d, t| found.constants.solubility_kg_m3(d, t).unwrap().1;
        assert_eq!(reach(750.0, 320.0), Reach::Inside);
        assert_eq!(reach(699.0, 320.0), Reach::Outside);
        assert_eq!(reach(750.0, 331.0), Reach::Outside);
    }
}
