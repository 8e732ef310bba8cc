//! Why the air of a room cannot be computed.
use std::fmt;

/// Why a figure about the air of a room cannot be formed, with the value found.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum RoomError {
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
    /// A value must lie from 0 to 1.
    NotAFraction {
        /// Which.
        of: &'static str,
        /// The value.
        value: f64,
    },
    /// The settings of the ventilation do not start at zero or do not rise.
    SettingsOutOfOrder {
        /// The time of the setting, s.
        from_s: f64,
    },
    /// The ventilation has no setting.
    NoSetting,
}

impl fmt::Display for RoomError {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            Self::NotPositive { of, value } => {
                write!(f, "the {of} is {value}; a finite value above 0 is needed")
            }
            Self::Negative { of, value } => {
                write!(f, "the {of} is {value}; a finite value of 0 or more is needed")
            }
            Self::NotAFraction { of, value } => {
                write!(f, "the {of} is {value}; a fraction from 0 to 1 is needed")
            }
            Self::SettingsOutOfOrder { from_s } => write!(
                f,
                "a setting of the ventilation starts at {from_s} s; the first starts at 0 s and each after the one before it"
            ),
            Self::NoSetting => write!(f, "the ventilation has no setting; give one that starts at 0 s"),
        }
    }
}

impl std::error::Error for RoomError {}

pub(super) fn positive(of: &'static str, value: f64) -> Result<f64, RoomError> {
    if value.is_finite() && value > 0.0 { Ok(value) } else { Err(RoomError::NotPositive { of, value }) }
}

pub(super) fn not_negative(of: &'static str, value: f64) -> Result<f64, RoomError> {
    if value.is_finite() && value >= 0.0 { Ok(value) } else { Err(RoomError::Negative { of, value }) }
}

pub(super) fn fraction(of: &'static str, value: f64) -> Result<f64, RoomError> {
    if (0.0..=1.0).contains(&value) { Ok(value) } else { Err(RoomError::NotAFraction { of, value }) }
}
