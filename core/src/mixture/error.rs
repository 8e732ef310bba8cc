//! Why an equilibrium cannot be given.
use super::LARGEST;
use crate::material::{PropertyError, Text};
use std::fmt;

/// Why an equilibrium cannot be given, with the values found.
#[derive(Clone, Debug, PartialEq)]
pub enum MixtureError {
    /// More components than a mixture holds, or none.
    Count {
        /// How many.
        found: usize,
    },
    /// The numbers handed over are not as many as the components.
    Mismatch {
        /// How many numbers, or pairs' components, were handed over.
        found: usize,
        /// How many components there are.
        components: usize,
    },
    /// An amount is negative or not a number.
    NotAnAmount {
        /// Which component, from 0.
        component: usize,
        /// The value, mol.
        value: f64,
    },
    /// All amounts are zero.
    NothingThere,
    /// A figure that has to be above zero is not.
    NotPositive {
        /// Which, with its unit.
        of: &'static str,
        /// The value.
        value: f64,
    },
    /// A property of a component is not known, or not at this temperature.
    Property(PropertyError),
    /// The catalogue has no molar mass for the material.
    NoMolarMass {
        /// The material's name.
        material: Text,
    },
    /// Two of the components form two liquids; a single liquid's equation does not hold.
    TwoLiquids {
        /// One.
        first: Text,
        /// The other.
        second: Text,
    },
    /// The activity coefficients of a pair of the mixture are not known at this temperature.
    ActivityOutOfRange {
        /// The temperature asked for, K.
        temperature_k: f64,
        /// The lowest temperature at which all pairs hold, K.
        low_k: f64,
        /// The highest, K.
        high_k: f64,
    },
    /// The mixture does not boil at this pressure in the range of its equations.
    NoBubblePoint {
        /// The pressure asked for, Pa.
        pressure_pa: f64,
        /// The lowest temperature at which all equations hold, K.
        low_k: f64,
        /// The highest, K.
        high_k: f64,
    },
    /// The distillation was given up on the way, because its steps became too short.
    NotReached {
        /// The volume asked for, m³.
        wanted_m3: f64,
        /// The volume reached, m³.
        reached_m3: f64,
    },
}

impl From<PropertyError> for MixtureError {
    fn from(error: PropertyError) -> Self {
        Self::Property(error)
    }
}

impl fmt::Display for MixtureError {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            Self::Count { found } => {
                write!(f, "the mixture has {found} components; 1 to {LARGEST} can be reckoned with")
            }
            Self::Mismatch { found, components } => write!(
                f,
                "{found} numbers were handed over for {components} components; one for each is needed, in their order"
            ),
            Self::NotAnAmount { component, value } => write!(
                f,
                "the amount of component {component} is {value}; a finite amount of 0 or more is needed"
            ),
            Self::NothingThere => write!(f, "all amounts are 0; there is no liquid"),
            Self::NotPositive { of, value } => write!(f, "the {of} is {value}; a number above 0 is needed"),
            Self::Property(error) => write!(f, "{error}"),
            Self::NoMolarMass { material } => write!(
                f,
                "the molar mass of {material} is not known; give its formula under the plan's materials"
            ),
            Self::TwoLiquids { first, second } => write!(
                f,
                "{first} and {second} form two liquids; separate them first and take each liquid by itself"
            ),
            Self::ActivityOutOfRange { temperature_k, low_k, high_k } => write!(
                f,
                "the activity coefficients were asked for at {:.2} °C; the constants of the pairs hold from {:.2} to {:.2} °C",
                temperature_k - 273.15,
                low_k - 273.15,
                high_k - 273.15
            ),
            Self::NoBubblePoint { pressure_pa, low_k, high_k } => write!(
                f,
                "the mixture does not boil at {pressure_pa:.0} Pa between {:.2} and {:.2} °C, where its equations hold; \
                 choose another pressure",
                low_k - 273.15,
                high_k - 273.15
            ),
            Self::NotReached { wanted_m3, reached_m3 } => write!(
                f,
                "the distillation to {:.3} mL was given up at {:.3} mL; take it in two parts, or leave out a component of which there is next to nothing",
                wanted_m3 * 1e6,
                reached_m3 * 1e6
            ),
        }
    }
}

impl std::error::Error for MixtureError {}
