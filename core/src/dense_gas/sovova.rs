//! Extraction curve of a bed with broken and intact cells, after Sovová.
//!
//! Milling opens a part of the cells: their solute lies free and comes out first, limited by solubility and by the film. The
//! rest has to get through the walls of intact cells. Plug flow, no mixing back, constant state.
use super::DenseGasError;
use super::error::{positive, recovery, within};
use crate::source::{Source, Standing};

/// The model.
pub const SOURCE: Source = Source::new(
    "H. Sovová, Chem. Eng. Sci. 49 (1994) 409: equations; compared with a direct solution of the model in the tests",
    Standing::Recomputed,
);

/// Parameters of the model, all on solid free of solute.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Sovova {
    /// Solute at the start x₀, kg per kg of solid.
    pub start_kg_kg: f64,
    /// Solute in intact cells at the start x_k, kg per kg of solid; from 0 to below x₀.
    pub intact_kg_kg: f64,
    /// Solubility y_r, kg per kg of carbon dioxide.
    pub loading_kg_kg: f64,
    /// Z of the fast period: film around broken cells.
    pub fast: f64,
    /// W of the slow period: walls of intact cells.
    pub slow: f64,
}

/// Parameters that have been checked, with what follows from them.
struct Curve {
    x0: f64,
    xk: f64,
    yr: f64,
    z: f64,
    w: f64,
    /// W x₀/y_r
    a: f64,
    q_m: f64,
    q_n: f64,
}

impl Sovova {
    fn curve(&self) -> Result<Curve, DenseGasError> {
        let x0 = positive("solute at the start, kg/kg", self.start_kg_kg)?;
        let xk = within(
            "solute in intact cells, kg/kg",
            self.intact_kg_kg,
            self.intact_kg_kg >= 0.0 && self.intact_kg_kg < x0,
            "a number of 0 or more and below the solute at the start",
        )?;
        let yr = positive("solubility, kg/kg", self.loading_kg_kg)?;
        let z = positive("Z of the fast period", self.fast)?;
        let w = positive("W of the slow period", self.slow)?;
        let a = w * x0 / yr;
        // q_m = (x₀ − x_k)/(y_r Z)
        let q_m = (x0 - xk) / (yr * z);
        // q_n = q_m + (1/W) ln{[x_k + (x₀ − x_k) e^(W x₀/y_r)]/x₀}, with the large exponential taken out
        let q_n = q_m + (a + libm::log(((x0 - xk) + xk * libm::exp(-a)) / x0)) / w;
        Ok(Curve { x0, xk, yr, z, w, a, q_m, q_n })
    }

    /// Where the fast period ends at the inlet, and where it ends at the outlet: q_m and q_n, kg of carbon dioxide per kg
    /// of solid.
    ///
    /// # Errors
    /// [`DenseGasError::OutOfRange`].
    ///
    /// ```
    /// use thimbleworth::dense_gas::sovova::Sovova;
    /// let bed =
    ///     Sovova { start_kg_kg: 0.12, intact_kg_kg: 0.04, loading_kg_kg: 0.007, fast: 2.0, slow: 0.2 };
    /// let (q_m, q_n) = bed.periods().unwrap();
    /// assert!((q_m - 5.71429).abs() < 1e-5 && (q_n - 20.91025).abs() < 1e-5);
    /// ```
    pub fn periods(&self) -> Result<(f64, f64), DenseGasError> {
        let c = self.curve()?;
        Ok((c.q_m, c.q_n))
    }

    /// Extracted after q kg of carbon dioxide per kg of solid, kg per kg of solid.
    ///
    /// # Errors
    /// [`DenseGasError::OutOfRange`].
    ///
    /// ```
    /// use thimbleworth::dense_gas::sovova::Sovova;
    /// let bed =
    ///     Sovova { start_kg_kg: 0.12, intact_kg_kg: 0.04, loading_kg_kg: 0.007, fast: 2.0, slow: 0.2 };
    /// assert!((bed.extracted_kg_kg(10.0).unwrap() - 0.059656).abs() < 1e-6);
    /// ```
    pub fn extracted_kg_kg(&self, solvent_kg_kg: f64) -> Result<f64, DenseGasError> {
        let allowed = "a number of 0 or more";
        let q = within("carbon dioxide, kg/kg", solvent_kg_kg, solvent_kg_kg >= 0.0, allowed)?;
        Ok(self.curve()?.extracted(q))
    }

    /// Carbon dioxide for a recovery, kg per kg of solid; `recovery_share` of all solute, from 0 to below 1.
    ///
    /// # Errors
    /// [`DenseGasError::OutOfRange`].
    ///
    /// ```
    /// use thimbleworth::dense_gas::sovova::Sovova;
    /// let bed =
    ///     Sovova { start_kg_kg: 0.12, intact_kg_kg: 0.04, loading_kg_kg: 0.007, fast: 2.0, slow: 0.2 };
    /// let q = bed.solvent_for_kg_kg(0.95).unwrap();
    /// assert!((bed.extracted_kg_kg(q).unwrap() - 0.95 * 0.12).abs() < 1e-12);
    /// ```
    pub fn solvent_for_kg_kg(&self, recovery_share: f64) -> Result<f64, DenseGasError> {
        let wanted = recovery(recovery_share)?;
        Ok(self.curve()?.solvent_for(wanted))
    }
}

impl Curve {
    fn extracted(&self, q: f64) -> f64 {
        let &Self { x0, xk, yr, z, w, a, q_m, q_n } = self;
        if q < q_m {
            // e = q y_r (1 − e^(−Z))
            return q * yr * -libm::expm1(-z);
        }
        let u = w * (q - q_m);
        if q < q_n {
            // z_k = (Z y_r/(W x₀)) ln{[x₀ e^(W (q − q_m)) − x_k]/(x₀ − x_k)}, with the large exponential taken out
            let z_k = z / a * (u + libm::log((x0 - xk * libm::exp(-u)) / (x0 - xk)));
            // e = y_r [q − q_m e^(z_k − Z)]
            return yr * (q - q_m * libm::exp(z_k - z));
        }
        // e = x₀ − (y_r/W) ln{1 + (e^(W x₀/y_r) − 1) e^(W (q_m − q)) x_k/x₀}
        x0 - x0 / a * softplus(ln_expm1(a) - u + libm::log(xk / x0))
    }

    fn solvent_for(&self, recovery: f64) -> f64 {
        let &Self { x0, xk, yr, z, w, a, q_m, q_n } = self;
        let wanted = recovery * x0;
        let rate = yr * -libm::expm1(-z);
        if wanted <= rate * q_m {
            return wanted / rate;
        }
        if wanted >= self.extracted(q_n) && xk > 0.0 {
            // The last equation solved for q.
            let rest = ln_expm1(a * (1.0 - recovery));
            let q = q_m + (ln_expm1(a) + libm::log(xk / x0) - rest) / w;
            return if q > q_n { q } else { q_n };
        }
        let (mut low, mut high) = (q_m, q_n);
        for _ in 0..100 {
            let middle = 0.5 * (low + high);
            if middle <= low || middle >= high {
                break;
            }
            if self.extracted(middle) < wanted {
                low = middle;
            } else {
                high = middle;
            }
        }
        high
    }
}

/// ln(eˣ − 1) without overflow, x above 0.
fn ln_expm1(x: f64) -> f64 {
    if x > 1.0 { x + libm::log1p(-libm::exp(-x)) } else { libm::log(libm::expm1(x)) }
}

/// ln(1 + eˣ) without overflow.
fn softplus(x: f64) -> f64 {
    if x > 0.0 { x + libm::log1p(libm::exp(-x)) } else { libm::log1p(libm::exp(x)) }
}

#[cfg(test)]
mod tests {
    use super::*;

    const BED: Sovova =
        Sovova { start_kg_kg: 0.12, intact_kg_kg: 0.04, loading_kg_kg: 0.007, fast: 2.0, slow: 0.2 };

    #[test]
    fn the_periods_join() {
        for bed in [BED, Sovova { intact_kg_kg: 0.0, ..BED }, Sovova { slow: 50.0, ..BED }] {
            let curve = bed.curve().unwrap();
            for q in [curve.q_m, curve.q_n] {
                let (before, after) = (curve.extracted(q * (1.0 - 1e-12)), curve.extracted(q));
                assert!((before - after).abs() < 1e-12, "{bed:?} {q}: {before} {after}");
            }
        }
    }

    #[test]
    fn large_exponents_do_not_overflow() {
        let stiff = Sovova { slow: 1000.0, loading_kg_kg: 1e-4, ..BED };
        let (q_m, q_n) = stiff.periods().unwrap();
        assert!(q_m.is_finite() && q_n.is_finite() && q_n > q_m);
        for n in 0..100 {
            let e = stiff.extracted_kg_kg(q_n * f64::from(n) / 30.0).unwrap();
            assert!((0.0..=0.12).contains(&e), "{e}");
        }
        for share in [0.1, 0.5, 0.9, 0.999_999] {
            let q = stiff.solvent_for_kg_kg(share).unwrap();
            assert!((stiff.extracted_kg_kg(q).unwrap() - share * 0.12).abs() < 1e-9);
        }
    }

    #[test]
    fn refused() {
        for bad in [
            Sovova { intact_kg_kg: 0.12, ..BED },
            Sovova { start_kg_kg: 0.0, ..BED },
            Sovova { slow: 0.0, ..BED },
            Sovova { fast: f64::NAN, ..BED },
        ] {
            assert!(bed_is_refused(&bad), "{bad:?}");
        }
        assert!(BED.solvent_for_kg_kg(1.0).is_err() && BED.extracted_kg_kg(-1.0).is_err());
        assert_eq!(BED.solvent_for_kg_kg(0.0), Ok(0.0));
    }

    fn bed_is_refused(bed: &Sovova) -> bool {
        bed.extracted_kg_kg(1.0).is_err() && bed.periods().is_err() && bed.solvent_for_kg_kg(0.5).is_err()
    }
}
