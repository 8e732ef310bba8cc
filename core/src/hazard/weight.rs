//! A mass weighted by a score: this project's own simple figure, nobody's published method.
//!
//! Air is weighted by the CHEM21 health score, drain by the environment score. It orders routes that use comparable
//! solvents; it is no toxicity potential, no exposure, no risk, and its unit (kilograms times points) has no meaning
//! outside one comparison. Scores are ordinal: a score of 8 is not twice as bad as one of 4, and the product treats it
//! as if it were. Show it beside the masses it was made of, never alone.
use crate::source::{Source, Standing};
use std::fmt;

/// Our own weighting: by definition, and with no standing beyond that.
pub const SOURCE: Source =
    Source::new("own weighting: mass times CHEM21 score, summed; no published method", Standing::Definition);

/// Why a weighted mass cannot be formed.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum WeightError {
    /// A mass is negative or not a number.
    Mass {
        /// The mass, kg.
        mass_kg: f64,
    },
    /// A score is outside 1 to 10.
    Score {
        /// The score.
        score: u8,
    },
}

impl fmt::Display for WeightError {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            Self::Mass { mass_kg } => {
                write!(f, "a mass is {mass_kg} kg; a finite mass of 0 kg or more is needed")
            }
            Self::Score { score } => write!(f, "a score is {score}; scores run from 1 to 10"),
        }
    }
}

impl std::error::Error for WeightError {}

/// Σ mᵢ sᵢ, in kilograms times points, of masses in kg and scores from 1 to 10.
///
/// An empty list gives 0.
///
/// # Errors
/// [`WeightError`] for a negative or non-finite mass, or a score outside 1 to 10.
///
/// ```
/// use thimbleworth::hazard::weight::weighted_mass_kg;
/// // 0.2 kg of dichloromethane (health 7) and 0.5 kg of acetone (health 3) to air
/// let air = weighted_mass_kg(&[(0.2, 7), (0.5, 3)]).unwrap();
/// assert!((air - 2.9).abs() < 1e-12);
/// ```
pub fn weighted_mass_kg(masses: &[(f64, u8)]) -> Result<f64, WeightError> {
    let mut sum = 0.0;
    for &(mass_kg, score) in masses {
        if !mass_kg.is_finite() || mass_kg < 0.0 {
            return Err(WeightError::Mass { mass_kg });
        }
        if !(1..=10).contains(&score) {
            return Err(WeightError::Score { score });
        }
        // Σ mᵢ sᵢ
        sum += mass_kg * f64::from(score);
    }
    Ok(sum)
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn nothing_weighs_nothing() {
        assert_eq!(weighted_mass_kg(&[]).map(f64::to_bits), Ok(0.0_f64.to_bits()));
    }

    #[test]
    fn refuses_what_is_no_mass_or_no_score() {
        assert_eq!(weighted_mass_kg(&[(-1.0, 3)]), Err(WeightError::Mass { mass_kg: -1.0 }));
        assert_eq!(weighted_mass_kg(&[(1.0, 0)]), Err(WeightError::Score { score: 0 }));
        assert_eq!(weighted_mass_kg(&[(1.0, 11)]), Err(WeightError::Score { score: 11 }));
    }
}
