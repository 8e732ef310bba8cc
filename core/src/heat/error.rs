//! Why a heat or an electricity cannot be computed.
use std::fmt;

/// Why a figure cannot be formed, with the value found.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum HeatError {
    /// A value must be above zero and finite.
    NotPositive {
        /// Which.
        of: &'static str,
        /// The value, in the unit of the input.
        value: f64,
    },
    /// A value must be zero or more and finite.
    Negative {
        /// Which.
        of: &'static str,
        /// The value, in the unit of the input.
        value: f64,
    },
    /// A share must lie above 0 and not above 1.
    NotAShare {
        /// Which.
        of: &'static str,
        /// The value.
        value: f64,
    },
}

impl fmt::Display for HeatError {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            Self::NotPositive { of, value } => {
                write!(f, "the {of} is {value}; a finite value above 0 is needed")
            }
            Self::Negative { of, value } => {
                write!(f, "the {of} is {value}; a finite value of 0 or more is needed")
            }
            Self::NotAShare { of, value } => {
                write!(f, "the {of} is {value}; a share above 0 and up to 1 is needed")
            }
        }
    }
}

impl std::error::Error for HeatError {}

pub(super) fn positive(of: &'static str, value: f64) -> Result<f64, HeatError> {
    if value.is_finite() && value > 0.0 { Ok(value) } else { Err(HeatError::NotPositive { of, value }) }
}

pub(super) fn not_negative(of: &'static str, value: f64) -> Result<f64, HeatError> {
    if value.is_finite() && value >= 0.0 { Ok(value) } else { Err(HeatError::Negative { of, value }) }
}

pub(super) fn share(of: &'static str, value: f64) -> Result<f64, HeatError> {
    if value > 0.0 && value <= 1.0 { Ok(value) } else { Err(HeatError::NotAShare { of, value }) }
}
