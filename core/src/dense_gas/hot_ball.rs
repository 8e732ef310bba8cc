//! Extraction of a sphere by diffusion: the hot-ball model.
//!
//! The solute lies evenly in a sphere and leaves a surface that holds none, as heat leaves a ball dipped into cold water.
//! Nothing but diffusion in the solid slows it: no solubility limit, no film, no adsorption.
use super::DenseGasError;
use super::error::{positive, recovery, within};
use crate::source::{Source, Standing};

/// The model.
pub const SOURCE: Source = Source::new(
    "K. D. Bartle and others, J. Supercrit. Fluids 3 (1990) 143; J. Crank, The Mathematics of Diffusion, ch. 6",
    Standing::FromMemory,
);

const PI_SQUARED: f64 = core::f64::consts::PI * core::f64::consts::PI;

/// Share of the solute that is left after a reduced time t_r = π² D t/r²: (6/π²) Σ n⁻² exp(−n² t_r).
///
/// Late, ln(share) = −0.4977 − t_r. Early, where the series converges slowly, its other form is used:
/// 1 − 6 √(τ/π) + 3 τ, τ = t_r/π². Both agree to rounding where they meet.
///
/// # Errors
/// [`DenseGasError::OutOfRange`] for a time that is negative or not a number.
///
/// ```
/// let left = thimbleworth::dense_gas::hot_ball::share_left(0.5).unwrap();
/// assert!((left - 0.390_058_1).abs() < 1e-7);
/// ```
pub fn share_left(reduced_time: f64) -> Result<f64, DenseGasError> {
    let t = within("reduced time", reduced_time, reduced_time >= 0.0, "a number of 0 or more")?;
    if t < 0.25 {
        let tau = t / PI_SQUARED;
        // m/m₀ = 1 − 6 √(τ/π) + 3 τ; what is left out is below 12 √τ exp(−1/τ), 4e-17 here
        return Ok(1.0 - 6.0 * (tau / core::f64::consts::PI).sqrt() + 3.0 * tau);
    }
    let (mut sum, mut n) = (0.0, 1.0);
    loop {
        let term = libm::exp(-n * n * t) / (n * n);
        sum += term;
        if term <= 1e-18 * sum || n > 40.0 {
            break;
        }
        n += 1.0;
    }
    // m/m₀ = (6/π²) Σ n⁻² exp(−n² t_r)
    Ok(6.0 / PI_SQUARED * sum)
}

/// Reduced time after which a recovery is reached: the inverse of [`share_left`], to 1e-12 of the time.
///
/// # Errors
/// [`DenseGasError::OutOfRange`] outside 0 to below 1.
///
/// ```
/// use thimbleworth::dense_gas::hot_ball::{reduced_time_for, share_left};
/// let time = reduced_time_for(0.95).unwrap();
/// assert!((share_left(time).unwrap() - 0.05).abs() < 1e-12);
/// ```
pub fn reduced_time_for(recovery_share: f64) -> Result<f64, DenseGasError> {
    let left = 1.0 - recovery(recovery_share)?;
    // The share left is never above exp(−t_r), since Σ n⁻² = π²/6.
    let (mut low, mut high) = (0.0, -libm::log(left));
    for _ in 0..200 {
        let middle = 0.5 * (low + high);
        if middle <= low || middle >= high || high - low <= 1e-14 * high {
            break;
        }
        if share_left(middle)? > left {
            low = middle;
        } else {
            high = middle;
        }
    }
    Ok(0.5 * (low + high))
}

/// A sphere, its content and the stream around it.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Extraction {
    /// Radius of the particles, m.
    pub radius_m: f64,
    /// Effective diffusion coefficient in the particle, m²/s.
    pub diffusion_m2_s: f64,
    /// Solute at the start, kg.
    pub solute_kg: f64,
    /// Flow of carbon dioxide, kg/s.
    pub flow_kg_s: f64,
    /// Solubility, kg solute per kg of carbon dioxide.
    pub loading_kg_kg: f64,
}

impl Extraction {
    /// Extracted after a time, s, in kg: the lesser of what diffusion lets out and what the stream can carry, F y_s t.
    ///
    /// It is a bound: where both are of a size, less comes out than either allows.
    ///
    /// # Errors
    /// [`DenseGasError::OutOfRange`].
    ///
    /// ```
    /// use thimbleworth::dense_gas::hot_ball::Extraction;
    /// let run = Extraction {
    ///     radius_m: 0.5e-3, diffusion_m2_s: 1e-11, solute_kg: 1e-3, flow_kg_s: 1e-4, loading_kg_kg: 0.005,
    /// };
    /// // At first the stream is saturated: 0.5 mg each second.
    /// assert!((run.extracted_kg(100.0).unwrap() - 5e-5).abs() < 1e-12);
    /// assert!(run.extracted_kg(20_000.0).unwrap() < 1e-3);
    /// ```
    pub fn extracted_kg(&self, time_s: f64) -> Result<f64, DenseGasError> {
        self.check()?;
        let time = within("time, s", time_s, time_s >= 0.0, "a time of 0 or more")?;
        // t_r = π² D t/r²
        let reduced = PI_SQUARED * self.diffusion_m2_s * time / (self.radius_m * self.radius_m);
        let diffused = self.solute_kg * (1.0 - share_left(reduced)?);
        let carried = self.flow_kg_s * self.loading_kg_kg * time;
        Ok(if carried < diffused { carried } else { diffused })
    }

    /// Time for a recovery, s: the longer of diffusion's and the stream's.
    ///
    /// # Errors
    /// [`DenseGasError::OutOfRange`].
    ///
    /// ```
    /// use thimbleworth::dense_gas::hot_ball::Extraction;
    /// let run = Extraction {
    ///     radius_m: 0.5e-3, diffusion_m2_s: 1e-11, solute_kg: 1e-3, flow_kg_s: 1e-4, loading_kg_kg: 0.005,
    /// };
    /// let time_s = run.time_for_s(0.9).unwrap();
    /// assert!((run.extracted_kg(time_s).unwrap() - 0.9e-3).abs() < 1e-12);
    /// ```
    pub fn time_for_s(&self, recovery_share: f64) -> Result<f64, DenseGasError> {
        self.check()?;
        // t = t_r r²/(π² D)
        let diffusion = reduced_time_for(recovery_share)? * self.radius_m * self.radius_m
            / (PI_SQUARED * self.diffusion_m2_s);
        let carrying = recovery_share * self.solute_kg / (self.flow_kg_s * self.loading_kg_kg);
        Ok(if carrying > diffusion { carrying } else { diffusion })
    }

    /// Carbon dioxide for a recovery, kg: flow times [`time_for_s`](Self::time_for_s).
    ///
    /// Where diffusion is the slower, a smaller flow takes the same time and less carbon dioxide.
    ///
    /// # Errors
    /// [`DenseGasError::OutOfRange`].
    ///
    /// ```
    /// use thimbleworth::dense_gas::hot_ball::Extraction;
    /// let run = Extraction {
    ///     radius_m: 0.5e-3, diffusion_m2_s: 1e-11, solute_kg: 1e-3, flow_kg_s: 1e-4, loading_kg_kg: 0.005,
    /// };
    /// let slower = Extraction { flow_kg_s: 0.5e-4, ..run };
    /// assert!(slower.solvent_for_kg(0.9).unwrap() < 0.51 * run.solvent_for_kg(0.9).unwrap());
    /// ```
    pub fn solvent_for_kg(&self, recovery_share: f64) -> Result<f64, DenseGasError> {
        Ok(self.flow_kg_s * self.time_for_s(recovery_share)?)
    }

    fn check(&self) -> Result<(), DenseGasError> {
        positive("radius, m", self.radius_m)?;
        positive("diffusion coefficient, m²/s", self.diffusion_m2_s)?;
        positive("solute, kg", self.solute_kg)?;
        positive("flow, kg/s", self.flow_kg_s)?;
        positive("solubility, kg/kg", self.loading_kg_kg)?;
        Ok(())
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn the_two_forms_meet() {
        let (below, above) = (share_left(0.25 - 1e-15).unwrap(), share_left(0.25).unwrap());
        assert!((below - above).abs() < 3e-15, "{below} {above}");
        assert_eq!(share_left(0.0), Ok(1.0));
    }

    #[test]
    fn refused() {
        for bad in [-1.0, f64::NAN, f64::INFINITY] {
            assert!(share_left(bad).is_err(), "{bad}");
        }
        for bad in [-0.1, 1.0, f64::NAN] {
            assert!(reduced_time_for(bad).is_err(), "{bad}");
        }
    }
}
