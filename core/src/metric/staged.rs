//! Liquid-liquid extraction in portions of fresh solvent, by Nernst's distribution law (crosscurrent).
//!
//! D is the ratio of concentrations, organic over aqueous, and taken as constant: dilute, no change of phase volumes
//! by mutual solubility, equilibrium in every stage. A partly miscible solvent that is lost to the water (dichloro-
//! methane, ethyl acetate) makes the first portions smaller than charged; that is the caller's to account for.
use crate::source::{Source, Standing};
use std::fmt;

/// The law.
pub const SOURCE: Source =
    Source::new("Nernst's distribution law; crosscurrent stages by repeated balance", Standing::Definition);

/// What the law cannot be applied to.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum StagedError {
    /// A volume or the distribution ratio is not a finite number above 0.
    NotPositive {
        /// Which.
        of: &'static str,
        /// The value, SI.
        value: f64,
    },
    /// A recovery outside 0 to 1, or 1 itself, which no finite volume reaches.
    Recovery {
        /// The recovery asked for.
        recovery: f64,
    },
    /// No portion at all.
    NoPortions,
}

impl fmt::Display for StagedError {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            Self::NotPositive { of, value } => {
                write!(f, "the {of} is {value}; a finite number above 0 is needed")
            }
            Self::Recovery { recovery } => {
                write!(f, "a recovery of {recovery} is asked for; from 0 to below 1 can be reached")
            }
            Self::NoPortions => write!(f, "the number of portions is 0; at least one is needed"),
        }
    }
}

impl std::error::Error for StagedError {}

/// Share of the solute left in the water after n portions of V_o each: (1 + D V_o/V_w)⁻ⁿ.
///
/// `distribution` is D (1), the volumes are in m³. No portions leave all of it.
///
/// # Errors
/// [`StagedError::NotPositive`].
///
/// ```
/// use thimbleworth::metric::staged::share_left;
/// // D = 10, three portions of 60 mL against 1 L: (1 + 0.6)⁻³
/// let left = share_left(10.0, 60e-6, 1e-3, 3).unwrap();
/// assert!((left - 0.244140625).abs() < 1e-12);
/// ```
pub fn share_left(
    distribution: f64,
    portion_m3: f64,
    water_m3: f64,
    portions: u32,
) -> Result<f64, StagedError> {
    let (d, v_o, v_w) = checked(distribution, portion_m3, water_m3)?;
    // (1 + D V_o/V_w)⁻ⁿ
    Ok(libm::exp(-f64::from(portions) * libm::log1p(d * v_o / v_w)))
}

/// Total solvent that n equal portions need for a recovery R, m³: n (V_w/D) ((1 − R)^(−1/n) − 1).
///
/// # Errors
/// [`StagedError`] for values that are no volume, ratio, recovery or number of portions.
///
/// ```
/// use thimbleworth::metric::staged::{solvent_for_recovery_m3, least_solvent_m3};
/// // R = 0.99, D = 10, 1 L of water: 9.9 L in one portion, 1.09 L in three, never below 0.46 L
/// let total = |n| solvent_for_recovery_m3(0.99, 10.0, 1e-3, n).unwrap();
/// assert!((total(1) - 9.9e-3).abs() < 1e-12);
/// assert!((total(3) - 1.0925e-3).abs() < 1e-7);
/// assert!((least_solvent_m3(0.99, 10.0, 1e-3).unwrap() - 0.46052e-3).abs() < 1e-8);
/// ```
pub fn solvent_for_recovery_m3(
    recovery: f64,
    distribution: f64,
    water_m3: f64,
    portions: u32,
) -> Result<f64, StagedError> {
    let (d, r, v_w) = checked_recovery(distribution, recovery, water_m3)?;
    if portions == 0 {
        return Err(StagedError::NoPortions);
    }
    let n = f64::from(portions);
    // V_o,total = n (V_w/D) ((1 − R)^(−1/n) − 1), by expm1 and log1p so that many portions keep their digits
    Ok(n * (v_w / d) * libm::expm1(-libm::log1p(-r) / n))
}

/// The least total solvent that chemistry allows for a recovery R, m³: (V_w/D) ln(1/(1 − R)), the limit of ever more,
/// ever smaller portions. The figure to hold a method's volumes against; no bench reaches it.
///
/// # Errors
/// [`StagedError`] for values that are no volume, ratio or recovery.
///
/// ```
/// use thimbleworth::metric::staged::least_solvent_m3;
/// assert!((least_solvent_m3(0.95, 5.0, 1e-3).unwrap() - 0.599146e-3).abs() < 1e-9);
/// ```
pub fn least_solvent_m3(recovery: f64, distribution: f64, water_m3: f64) -> Result<f64, StagedError> {
    let (d, r, v_w) = checked_recovery(distribution, recovery, water_m3)?;
    // V_o,min = (V_w/D) ln(1/(1 − R))
    Ok(v_w / d * -libm::log1p(-r))
}

fn positive(of: &'static str, value: f64) -> Result<f64, StagedError> {
    if value.is_finite() && value > 0.0 { Ok(value) } else { Err(StagedError::NotPositive { of, value }) }
}

fn checked(distribution: f64, portion_m3: f64, water_m3: f64) -> Result<(f64, f64, f64), StagedError> {
    Ok((
        positive("distribution ratio", distribution)?,
        positive("volume of a portion", portion_m3)?,
        positive("volume of water", water_m3)?,
    ))
}

fn checked_recovery(d: f64, recovery: f64, water_m3: f64) -> Result<(f64, f64, f64), StagedError> {
    let (d, v_w) = (positive("distribution ratio", d)?, positive("volume of water", water_m3)?);
    if (0.0..1.0).contains(&recovery) {
        Ok((d, recovery, v_w))
    } else {
        Err(StagedError::Recovery { recovery })
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn agrees_with_shaking_portion_by_portion() {
        let (d, v_o, v_w) = (0.7, 75e-6, 1e-3);
        let mut left = 1.0;
        for n in 1..=12 {
            // equal concentrations ratio: c_o = D c_w, so the water keeps V_w/(V_w + D V_o)
            left *= v_w / (v_w + d * v_o);
            assert!((share_left(d, v_o, v_w, n).unwrap() - left).abs() < 1e-14);
        }
    }

    #[test]
    fn solvent_for_a_recovery_gives_that_recovery() {
        for n in [1, 2, 3, 7, 100] {
            let total = solvent_for_recovery_m3(0.97, 4.0, 2e-3, n).unwrap();
            let left = share_left(4.0, total / f64::from(n), 2e-3, n).unwrap();
            assert!((left - 0.03).abs() < 1e-14, "{n}");
        }
    }

    #[test]
    fn more_portions_need_less_down_to_the_limit() {
        let least = least_solvent_m3(0.99, 10.0, 1e-3).unwrap();
        let mut last = f64::INFINITY;
        for n in [1, 2, 3, 5, 10, 100, 100_000] {
            let total = solvent_for_recovery_m3(0.99, 10.0, 1e-3, n).unwrap();
            assert!(total < last && total > least);
            last = total;
        }
        assert!((last / least - 1.0).abs() < 1e-4);
    }

    #[test]
    fn refuses_the_impossible() {
        assert_eq!(least_solvent_m3(1.0, 1.0, 1.0), Err(StagedError::Recovery { recovery: 1.0 }));
        assert!(matches!(share_left(0.0, 1.0, 1.0, 1), Err(StagedError::NotPositive { .. })));
        assert_eq!(solvent_for_recovery_m3(0.5, 1.0, 1.0, 0), Err(StagedError::NoPortions));
    }
}
