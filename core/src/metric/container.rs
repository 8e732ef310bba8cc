//! How full a container may be, and how many containers a volume takes.
//!
//! The count here is of containers over a whole period, a part-full one carried over into the next. Counting up month
//! by month overstates, because a drum does not empty at the end of the month; storage time limits can force part-full
//! shipments and understate this count. Those are events in time and belong to whoever holds the calendar.
//!
//! A container may also be limited by its mass and by the relative density it is approved for: a can marked for 1.2
//! must not carry dichloromethane. Degree of filling and approval are the carrier's and the local codes' to confirm.
use crate::source::{Source, Standing};
use std::fmt;

/// The filling rule.
pub const SOURCE: Source = Source::new("ADR 4.1.1.4, degree of filling", Standing::FromMemory);

/// The laboratory's usual degree of filling of a waste container: common practice, no source.
pub const LABORATORY_FILL: f64 = 0.90;

/// What cannot be filled or counted.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum ContainerError {
    /// A value is outside what the rule allows.
    OutOfRange {
        /// Which.
        of: &'static str,
        /// The value, SI.
        value: f64,
        /// What is allowed, in words.
        allowed: &'static str,
    },
}

impl fmt::Display for ContainerError {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            Self::OutOfRange { of, value, allowed } => write!(f, "the {of} is {value}; {allowed} is needed"),
        }
    }
}

impl std::error::Error for ContainerError {}

/// Mean cubic expansion between 15 and 50 °C, 1/K: α = (d₁₅ − d₅₀)/(35 d₅₀), of densities in kg/m³.
///
/// # Errors
/// [`ContainerError::OutOfRange`] unless d₁₅ ≥ d₅₀ > 0.
///
/// ```
/// use thimbleworth::metric::container::expansion_per_k;
/// // acetone
/// assert!((expansion_per_k(795.8, 756.14).unwrap() - 1.4986e-3).abs() < 1e-7);
/// ```
pub fn expansion_per_k(density_15c_kg_m3: f64, density_50c_kg_m3: f64) -> Result<f64, ContainerError> {
    let (d15, d50) = (density_15c_kg_m3, density_50c_kg_m3);
    within("density at 50 °C, kg/m³", d50, d50 > 0.0, "a number above 0")?;
    within("density at 15 °C, kg/m³", d15, d15 >= d50, "at least the density at 50 °C")?;
    // α = (d₁₅ − d₅₀)/(35 d₅₀)
    Ok((d15 - d50) / (35.0 * d50))
}

/// Greatest degree of filling, a fraction: 0.98/(1 + α (50 − t_F)), with t_F the temperature of filling in °C.
///
/// `expansion_per_k` is α in 1/K, `filling_k` the temperature of the liquid when filled, K, up to 50 °C.
///
/// # Errors
/// [`ContainerError::OutOfRange`].
///
/// ```
/// use thimbleworth::metric::container::{adr_fill, expansion_per_k};
/// let alpha = expansion_per_k(795.8, 756.14).unwrap();
/// assert!((adr_fill(alpha, 293.15).unwrap() - 0.9378).abs() < 2e-4);
/// ```
pub fn adr_fill(expansion_per_k: f64, filling_k: f64) -> Result<f64, ContainerError> {
    let alpha = within("expansion, 1/K", expansion_per_k, expansion_per_k >= 0.0, "a number of 0 or more")?;
    let t_f = within(
        "temperature of filling, K",
        filling_k,
        filling_k > 0.0 && filling_k <= 323.15,
        "a temperature above 0 K and up to 323.15 K (50 °C)",
    )? - 273.15;
    // f = 0.98/(1 + α (50 − t_F))
    Ok(0.98 / (1.0 + alpha * (50.0 - t_f)))
}

/// Degree of filling by boiling point for a liquid filled at 15 °C, a fraction: below 60 °C 0.90, to 100 °C 0.92, to
/// 200 °C 0.94, to 300 °C 0.96, above 0.98. The rule's other branch, for when no densities are at hand.
///
/// `boiling_point_k` is the initial boiling point, K.
///
/// # Errors
/// [`ContainerError::OutOfRange`].
///
/// ```
/// // toluene, 110.6 °C
/// assert_eq!(thimbleworth::metric::container::adr_fill_by_boiling_point(383.75), Ok(0.94));
/// ```
pub fn adr_fill_by_boiling_point(boiling_point_k: f64) -> Result<f64, ContainerError> {
    let boiling_point =
        within("boiling point, K", boiling_point_k, boiling_point_k > 0.0, "a temperature above 0 K")?;
    Ok(match boiling_point - 273.15 {
        c if c < 60.0 => 0.90,
        c if c < 100.0 => 0.92,
        c if c < 200.0 => 0.94,
        c if c < 300.0 => 0.96,
        _ => 0.98,
    })
}

/// Containers that a period's volume takes, a part-full one carried over: ⌈V/(V_c f)⌉.
///
/// `volume_m3` is the waste of the period, `capacity_m3` the capacity of a container, both m³; `fill` the degree of
/// filling, above 0 to 1. A remainder below a millionth of a container is rounding, not a container.
///
/// # Errors
/// [`ContainerError::OutOfRange`].
///
/// ```
/// use thimbleworth::metric::container::containers;
/// // 737 L a year in 20 L cans filled to 90 %: 40.94, so 41; twelve monthly counts of 61.4 L would be 48
/// assert_eq!(containers(0.737, 0.020, 0.90), Ok(41));
/// assert_eq!(12 * containers(0.737 / 12.0, 0.020, 0.90).unwrap(), 48);
/// ```
pub fn containers(volume_m3: f64, capacity_m3: f64, fill: f64) -> Result<u64, ContainerError> {
    const MOST: f64 = 1e15;
    let volume = within("volume, m³", volume_m3, volume_m3 >= 0.0, "a number of 0 or more")?;
    let capacity = within("capacity of a container, m³", capacity_m3, capacity_m3 > 0.0, "a number above 0")?;
    let fill =
        within("degree of filling", fill, fill > 0.0 && fill <= 1.0, "a fraction above 0 and up to 1")?;
    let full = volume / (capacity * fill);
    within("number of containers", full, full <= MOST, "at most 1e15")?;
    let whole = libm::floor(full);
    // ⌈V/(V_c f)⌉
    let count = if full - whole > 1e-6 { whole + 1.0 } else { whole };
    let started = if count < 1.0 && volume > 0.0 { 1.0 } else { count };
    // in range and whole: checked above
    Ok(started as u64)
}

fn within(of: &'static str, value: f64, holds: bool, allowed: &'static str) -> Result<f64, ContainerError> {
    if value.is_finite() && holds {
        Ok(value)
    } else {
        Err(ContainerError::OutOfRange { of, value, allowed })
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn rounding_makes_no_extra_container() {
        // 180 L into 20 L cans at 0.9: ten, though 180e-3/(20e-3 × 0.9) is not 10 to the last bit everywhere
        assert_eq!(containers(180.0 * 1e-3, 20.0 * 1e-3, 0.9), Ok(10));
        assert_eq!(containers(180.1e-3, 20e-3, 0.9), Ok(11));
        assert_eq!(containers(0.0, 20e-3, 0.9), Ok(0));
        assert_eq!(containers(1e-12, 20e-3, 0.9), Ok(1));
    }

    #[test]
    fn refuses_what_cannot_be_filled() {
        assert!(containers(1.0, 0.0, 0.9).is_err());
        assert!(containers(1.0, 0.02, 1.1).is_err());
        assert!(containers(f64::NAN, 0.02, 0.9).is_err());
        assert!(containers(f64::MAX, 1e-300, 0.9).is_err());
        assert!(expansion_per_k(750.0, 760.0).is_err());
        assert!(adr_fill(1e-3, 330.0).is_err());
    }
}
