//! Why an emission cannot be given.
use crate::mixture::{LARGEST, MixtureError};
use std::fmt;

/// Why an emission cannot be given, with the values found.
#[derive(Clone, Debug, PartialEq)]
pub enum EmissionError {
    /// The vapour alone has the pressure of the vessel or more: the liquid boils, and no gas is left to carry it.
    Boils {
        /// Sum of the partial pressures, Pa.
        vapour_pa: f64,
        /// Pressure of the vessel, Pa.
        pressure_pa: f64,
        /// The temperature, K.
        temperature_k: f64,
    },
    /// An input is outside what the equation allows.
    OutOfRange {
        /// Which, with its unit.
        of: &'static str,
        /// The value.
        value: f64,
        /// What is allowed, in words.
        allowed: &'static str,
    },
    /// More vapours than one call takes, or none.
    Count {
        /// How many.
        found: usize,
    },
    /// The time is shorter than a gas saturated with the vapour would need.
    Impossible {
        /// The time entered, s.
        given_s: f64,
        /// The least time, s.
        least_s: f64,
    },
    /// The vapour over the liquid cannot be given.
    Mixture(MixtureError),
}

impl From<MixtureError> for EmissionError {
    fn from(error: MixtureError) -> Self {
        Self::Mixture(error)
    }
}

impl fmt::Display for EmissionError {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            Self::Boils { vapour_pa, pressure_pa, temperature_k } => write!(
                f,
                "at {:.2} °C the vapour has {vapour_pa:.0} Pa of the {pressure_pa:.0} Pa in the vessel: the liquid boils and the \
                 equation does not hold; take a lower temperature or a higher pressure, or account for it as distilled",
                temperature_k - 273.15
            ),
            Self::OutOfRange { of, value, allowed } => write!(f, "the {of} is {value}; {allowed} is needed"),
            Self::Count { found } => {
                write!(f, "{found} vapours were handed over; 1 to {LARGEST} can be reckoned with")
            }
            Self::Impossible { given_s, least_s } => write!(
                f,
                "{:.1} min were entered, but the gas needs at least {:.1} min even when it leaves saturated; enter a longer time, a larger \
                 flow or a warmer liquid",
                given_s / 60.0,
                least_s / 60.0
            ),
            Self::Mixture(error) => write!(f, "{error}"),
        }
    }
}

impl std::error::Error for EmissionError {}

/// The value, unless it is not a number or does not hold what is asked of it.
pub(super) fn within(
    of: &'static str,
    value: f64,
    holds: bool,
    allowed: &'static str,
) -> Result<f64, EmissionError> {
    if value.is_finite() && holds { Ok(value) } else { Err(EmissionError::OutOfRange { of, value, allowed }) }
}

pub(super) fn above_zero(of: &'static str, value: f64) -> Result<f64, EmissionError> {
    within(of, value, value > 0.0, "a number above 0")
}

pub(super) fn not_below_zero(of: &'static str, value: f64) -> Result<f64, EmissionError> {
    within(of, value, value >= 0.0, "a number of 0 or more")
}
