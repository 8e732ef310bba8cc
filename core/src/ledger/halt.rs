//! Why a run stops. In the single run a halt is the error shown; in a sampled run it is counted by kind.

use super::{Material, Place, RuleIx};
use crate::co2::StateError;
use crate::co2_loop::LoopError;
use crate::emission::EmissionError;
use crate::material::PropertyError;
use crate::mixture::MixtureError;

/// A run cannot go on. `Copy`, carrying values and no text, so that it costs nothing in a draw.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Halt {
    /// A rule wants more of a material than lies in the place.
    Short {
        /// The rule.
        rule: RuleIx,
        /// From where.
        place: Place,
        /// Of what.
        material: Material,
        /// How much was wanted; kg.
        wanted_kg: f64,
        /// How much was there; kg.
        there_kg: f64,
    },
    /// A measured mass stands against a place that holds nothing it could apply to.
    NothingToMeasure {
        /// The rule.
        rule: RuleIx,
        /// From where.
        place: Place,
    },
    /// More was measured than lies in the place.
    MeasuredTooMuch {
        /// The rule.
        rule: RuleIx,
        /// From where.
        place: Place,
        /// How much was measured, or follows from a measured share; kg.
        measured_kg: f64,
        /// How much of what the rule moves was there; kg.
        there_kg: f64,
    },
    /// A step needs something in a place that is empty.
    Empty {
        /// The place.
        place: Place,
    },
    /// A step needs a liquid in a place that holds none.
    NoLiquid {
        /// The place.
        place: Place,
    },
    /// A step works through a place in which something still lies.
    Occupied {
        /// The place.
        place: Place,
        /// What lies there; kg.
        left_kg: f64,
    },
    /// The step runs more often than the one before it while something still lies on the bench.
    FinerBasis {
        /// What lies there; kg.
        left_kg: f64,
    },
    /// Something is left in a bench place and nothing says where it goes.
    NoEnd {
        /// The place.
        place: Place,
        /// How much is left; kg.
        left_kg: f64,
    },
    /// A volume has to hold more than fits.
    DoesNotFit {
        /// What has to fit; m³.
        wanted_m3: f64,
        /// What there is; m³.
        there_m3: f64,
    },
    /// More is to be left than there is.
    NotReached {
        /// What is to be left; m³.
        wanted_m3: f64,
        /// What there is; m³.
        there_m3: f64,
    },
    /// The vapour alone has the pressure that is held, or more: nothing condenses, or no gas is left to carry it.
    Boils {
        /// Sum of the partial pressures; Pa.
        vapour_pa: f64,
        /// What is held; Pa.
        pressure_pa: f64,
        /// At which temperature; K.
        temperature_k: f64,
    },
    /// The time is shorter than a gas that leaves saturated needs.
    TooShort {
        /// The time stated; s.
        given_s: f64,
        /// The least time; s.
        least_s: f64,
    },
    /// The vapour over the liquid is not known at this temperature.
    NoVapour {
        /// The temperature; K.
        temperature_k: f64,
        /// The lowest at which every equation holds; K.
        low_k: f64,
        /// The highest; K.
        high_k: f64,
    },
    /// A number is outside what an equation allows.
    OutOfRange {
        /// Which, with its unit.
        of: &'static str,
        /// The number.
        value: f64,
        /// What is allowed, in words.
        allowed: &'static str,
    },
    /// The equation of state has no such state of CO2.
    Co2(StateError),
    /// A loop of CO2 cannot be.
    Loop(LoopError),
    /// A computed amount is not finite, or negative.
    NotANumber {
        /// The rule.
        rule: RuleIx,
    },
    /// The work comes to no runs at all, or to a number that is not finite.
    NoRuns,
}

impl From<LoopError> for Halt {
    fn from(e: LoopError) -> Self {
        Self::Loop(e)
    }
}

impl Halt {
    /// What stops the run, without its values: one of a few phrases, by which halted draws are counted.
    #[must_use]
    pub const fn in_short(self) -> &'static str {
        match self {
            Self::Short { .. } => "a rule takes more than is there",
            Self::NothingToMeasure { .. } | Self::MeasuredTooMuch { .. } => "more is measured than is there",
            Self::Empty { .. } | Self::NoLiquid { .. } => "nothing is there to work on",
            Self::Occupied { .. } => "something still lies in the way",
            Self::FinerBasis { .. } | Self::NoEnd { .. } => "something is left without a place",
            Self::DoesNotFit { .. } => "more than fits",
            Self::NotReached { .. } => "less is there than should be left",
            Self::Boils { .. } => "a condenser too warm",
            Self::TooShort { .. } => "a gas stream too short",
            Self::NoVapour { .. } | Self::OutOfRange { .. } => "a vapour outside its equations",
            Self::Co2(_) => "no such state of CO2",
            Self::Loop(_) => "no such circuit of CO2",
            Self::NotANumber { .. } => "an amount below zero or not finite",
            Self::NoRuns => "no work",
        }
    }
}

impl From<StateError> for Halt {
    fn from(e: StateError) -> Self {
        Self::Co2(e)
    }
}

impl From<EmissionError> for Halt {
    fn from(e: EmissionError) -> Self {
        match e {
            EmissionError::Boils { vapour_pa, pressure_pa, temperature_k } => {
                Self::Boils { vapour_pa, pressure_pa, temperature_k }
            }
            EmissionError::Impossible { given_s, least_s } => Self::TooShort { given_s, least_s },
            EmissionError::OutOfRange { of, value, allowed } => Self::OutOfRange { of, value, allowed },
            EmissionError::Count { found } => {
                Self::OutOfRange { of: "number of vapours", value: count(found), allowed: "1 to 8 of them" }
            }
            EmissionError::Mixture(e) => e.into(),
        }
    }
}

impl From<MixtureError> for Halt {
    fn from(e: MixtureError) -> Self {
        match e {
            MixtureError::ActivityOutOfRange { temperature_k, low_k, high_k }
            | MixtureError::Property(PropertyError::OutOfRange { temperature_k, low_k, high_k, .. }) => {
                Self::NoVapour { temperature_k, low_k, high_k }
            }
            MixtureError::NotPositive { of, value } => {
                Self::OutOfRange { of, value, allowed: "a number above 0" }
            }
            _ => Self::OutOfRange {
                of: "vapour over the mixture",
                value: f64::NAN,
                allowed: "liquids whose vapour pressures are known",
            },
        }
    }
}

fn count(n: usize) -> f64 {
    u32::try_from(n).map_or(f64::INFINITY, f64::from)
}
