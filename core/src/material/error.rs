//! Why a property cannot be given.
use super::Text;
use std::fmt;

/// Why the catalogue cannot give a property at a temperature.
#[derive(Clone, Debug, PartialEq)]
pub enum PropertyError {
    /// There is no figure.
    NotKnown {
        /// The material's name.
        material: Text,
        /// The property's name, such as `vapour pressure`.
        property: &'static str,
    },
    /// There is a figure, but not at this temperature; it is never extrapolated.
    OutOfRange {
        /// The material's name.
        material: Text,
        /// The property's name.
        property: &'static str,
        /// The temperature asked for, K.
        temperature_k: f64,
        /// The lowest temperature of the correlation, K.
        low_k: f64,
        /// The highest temperature of the correlation, K.
        high_k: f64,
    },
}

impl fmt::Display for PropertyError {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            Self::NotKnown { material, property } => write!(
                f,
                "the {property} of {material} is not known to the catalogue; give it under the plan's materials, with its source"
            ),
            Self::OutOfRange { material, property, temperature_k, low_k, high_k } => write!(
                f,
                "the {property} of {material} was asked for at {:.2} °C; its source holds from {:.2} to {:.2} °C; \
                 choose a temperature in that range or give the figure under the plan's materials",
                temperature_k - 273.15,
                low_k - 273.15,
                high_k - 273.15
            ),
        }
    }
}

impl std::error::Error for PropertyError {}

/// A name that is no name, synonym or CAS number of the catalogue.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct UnknownMaterial {
    /// What was asked for, cut after 80 characters.
    pub asked: String,
    /// Names that come close, the closest first; may be empty.
    pub suggestions: Vec<String>,
}

impl fmt::Display for UnknownMaterial {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        write!(f, "\"{}\" is not in the catalogue; ", self.asked)?;
        if self.suggestions.is_empty() {
            write!(
                f,
                "use a name, a synonym or a CAS number of the catalogue, or describe it under the plan's materials"
            )
        } else {
            write!(f, "did you mean {}?", self.suggestions.join(" or "))
        }
    }
}

impl std::error::Error for UnknownMaterial {}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn sentences_say_what_was_found_and_what_would_do() {
        let error = PropertyError::OutOfRange {
            material: "acetone".into(),
            property: "vapour pressure",
            temperature_k: 200.0,
            low_k: 240.0,
            high_k: 473.1,
        };
        assert_eq!(
            error.to_string(),
            "the vapour pressure of acetone was asked for at -73.15 °C; its source holds from -33.15 to 199.95 °C; \
             choose a temperature in that range or give the figure under the plan's materials"
        );
        let unknown = UnknownMaterial { asked: "aceton".into(), suggestions: vec!["acetone".into()] };
        assert_eq!(unknown.to_string(), "\"aceton\" is not in the catalogue; did you mean acetone?");
    }
}
