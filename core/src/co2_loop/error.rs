//! Why a loop cannot be computed.
use crate::co2::{Equilibrium, StateError};
use std::fmt;

/// Why a loop cannot be computed, with the values found.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum LoopError {
    /// A state is outside the equation.
    State {
        /// Which point of the loop.
        at: &'static str,
        /// Why.
        error: StateError,
    },
    /// A number is outside what it can be.
    OutOfRange {
        /// Which.
        of: &'static str,
        /// The value, SI.
        value: f64,
        /// What is allowed, in words.
        allowed: &'static str,
    },
    /// A pressure that has to be the higher one is not.
    NotAbove {
        /// The pressure that should be higher.
        of: &'static str,
        /// It, Pa.
        pressure_pa: f64,
        /// The pressure that it should exceed.
        than: &'static str,
        /// That, Pa.
        than_pa: f64,
    },
    /// A pump's inlet holds gas.
    PumpTakesGas {
        /// The inlet.
        inlet: Equilibrium,
    },
    /// A compressor's inlet holds liquid.
    CompressorTakesLiquid {
        /// The inlet.
        inlet: Equilibrium,
    },
}

impl fmt::Display for LoopError {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            Self::State { at, error } => write!(f, "{at}: {error}"),
            Self::OutOfRange { of, value, allowed } => write!(f, "the {of} is {value}; {allowed} is needed"),
            Self::NotAbove { of, pressure_pa, than, than_pa } => write!(
                f,
                "the {of} of {:.3} bar is not above the {than} of {:.3} bar; state absolute pressures that rise",
                pressure_pa / 1e5,
                than_pa / 1e5
            ),
            Self::PumpTakesGas { inlet } => write!(
                f,
                "the pump's inlet at {:.2} °C and {:.3} bar is {}; a liquid pump needs liquid: chill it, or raise its \
                 pressure",
                inlet.temperature_k - 273.15,
                inlet.pressure_pa / 1e5,
                inlet.phases
            ),
            Self::CompressorTakesLiquid { inlet } => write!(
                f,
                "the compressor's inlet at {:.2} °C and {:.3} bar is {}; a compressor needs gas: cool less between the \
                 stages, or pump the liquid instead",
                inlet.temperature_k - 273.15,
                inlet.pressure_pa / 1e5,
                inlet.phases
            ),
        }
    }
}

impl std::error::Error for LoopError {}

/// For `map_err`: names the point.
pub(super) fn at(at: &'static str) -> impl Fn(StateError) -> LoopError {
    move |error| LoopError::State { at, error }
}

/// `value` if `ok`.
pub(super) fn within(
    of: &'static str,
    value: f64,
    ok: bool,
    allowed: &'static str,
) -> Result<f64, LoopError> {
    if value.is_finite() && ok { Ok(value) } else { Err(LoopError::OutOfRange { of, value, allowed }) }
}

/// A share above 0 and up to 1.
pub(super) fn efficiency(of: &'static str, value: f64) -> Result<f64, LoopError> {
    within(of, value, value > 0.0 && value <= 1.0, "a share above 0 and up to 1")
}

/// Refuses a pressure that is not above the other.
pub(super) fn above(
    of: &'static str,
    pressure_pa: f64,
    than: &'static str,
    than_pa: f64,
) -> Result<(), LoopError> {
    if pressure_pa > than_pa { Ok(()) } else { Err(LoopError::NotAbove { of, pressure_pa, than, than_pa }) }
}
