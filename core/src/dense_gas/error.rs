//! Why a solubility, curve or fit is refused.
use crate::co2::StateError;
use crate::co2_loop::LoopError;
use std::fmt;

/// Why a solubility, curve or fit is refused, with the values found.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum DenseGasError {
    /// A number is outside what it can be, or outside the range of a correlation.
    OutOfRange {
        /// Which.
        of: &'static str,
        /// The value, SI.
        value: f64,
        /// What is allowed, in words.
        allowed: &'static str,
    },
    /// Too few points for the constants that are sought.
    TooFewPoints {
        /// Points found.
        found: usize,
        /// Points needed.
        needed: usize,
    },
    /// The points do not tell the constants apart.
    NotToldApart {
        /// What does not vary by itself.
        what: &'static str,
    },
    /// A state is outside the equation.
    State(StateError),
    /// A loop cannot be computed.
    Loop(LoopError),
    /// No point of the window could be computed.
    NothingFound {
        /// How many points were tried.
        tried: u32,
    },
}

impl fmt::Display for DenseGasError {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            Self::OutOfRange { of, value, allowed } => write!(f, "the {of} is {value}; {allowed} is needed"),
            Self::TooFewPoints { found, needed } => {
                write!(f, "{found} points are too few to fit the constants; measure at least {needed}")
            }
            Self::NotToldApart { what } => write!(
                f,
                "the points do not tell the constants apart, because {what}; measure at two temperatures or more and at \
                 several densities at each"
            ),
            Self::State(error) => error.fmt(f),
            Self::Loop(error) => error.fmt(f),
            Self::NothingFound { tried } => write!(
                f,
                "none of {tried} pressures and temperatures of the window could be computed; it lies outside the range of \
                 the solubility or of the equation of state: widen it"
            ),
        }
    }
}

impl std::error::Error for DenseGasError {}

impl From<StateError> for DenseGasError {
    fn from(error: StateError) -> Self {
        Self::State(error)
    }
}

impl From<LoopError> for DenseGasError {
    fn from(error: LoopError) -> Self {
        Self::Loop(error)
    }
}

/// `value` if `ok` and finite.
pub(super) fn within(
    of: &'static str,
    value: f64,
    ok: bool,
    allowed: &'static str,
) -> Result<f64, DenseGasError> {
    if value.is_finite() && ok { Ok(value) } else { Err(DenseGasError::OutOfRange { of, value, allowed }) }
}

/// A finite number above 0.
pub(super) fn positive(of: &'static str, value: f64) -> Result<f64, DenseGasError> {
    within(of, value, value > 0.0, "a number above 0")
}

/// A recovery that some finite amount reaches.
pub(super) fn recovery(value: f64) -> Result<f64, DenseGasError> {
    within("recovery", value, (0.0..1.0).contains(&value), "a share from 0 to below 1")
}
