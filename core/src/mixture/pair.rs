//! The table of pairs: constants of Wilson's equation and how each was come by.
use crate::material::Text;
use crate::quantity::nearest;
use std::sync::OnceLock;

/// Constants of Wilson's equation for two components: `ln Λᵢⱼ = aᵢⱼ + bᵢⱼ/T`.
///
/// In Wilson's own writing `Λᵢⱼ = (Vⱼ/Vᵢ) exp(−(λᵢⱼ − λᵢᵢ)/(R T))`: there a is the logarithm of the ratio of molar volumes and b the
/// difference of energies over R.
///
/// Source: Wilson, J. Am. Chem. Soc. 86 (1964) 127 (form from memory; recomputed against thermo 0.6.1).
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Wilson {
    /// a₁₂; 1.
    pub a12: f64,
    /// b₁₂; K.
    pub b12_k: f64,
    /// a₂₁; 1.
    pub a21: f64,
    /// b₂₁; K.
    pub b21_k: f64,
    /// The lowest temperature at which they are used; K.
    pub low_k: f64,
    /// The highest temperature at which they are used; K.
    pub high_k: f64,
}

impl Wilson {
    /// The same constants with the two components exchanged.
    ///
    /// ```
    /// let pair = thimbleworth::mixture::find_pair("acetone", "water").unwrap();
    /// let thimbleworth::mixture::PairLaw::Wilson(w) = pair.law else { panic!() };
    /// assert_eq!(w.exchanged().a12, w.a21);
    /// ```
    #[must_use]
    pub const fn exchanged(self) -> Self {
        Self { a12: self.a21, b12_k: self.b21_k, a21: self.a12, b21_k: self.b12_k, ..self }
    }
}

/// What holds between two components.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum PairLaw {
    /// Wilson's equation with these constants.
    Wilson(Wilson),
    /// They form two liquids over some range of composition near room temperature.
    Splits,
}

/// How the constants of a pair were come by.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Basis {
    /// Constants published with the equation.
    Published,
    /// Fitted to the composition and boiling point of one azeotrope (`core/data/azeotropes.csv`).
    Azeotrope,
    /// Fitted to activity coefficients of another published equation or of a group contribution method.
    Fitted,
    /// Kindred molecules, ideal in practice.
    Homologues,
    /// Two liquids.
    Splits,
}

impl Basis {
    /// The word in the table.
    #[must_use]
    pub const fn word(self) -> &'static str {
        match self {
            Self::Published => "published",
            Self::Azeotrope => "azeotrope",
            Self::Fitted => "fitted",
            Self::Homologues => "homologues",
            Self::Splits => "splits",
        }
    }
}

/// A row of the table.
#[derive(Clone, Debug, PartialEq)]
pub struct Pair {
    /// The first component, by its name in the catalogue.
    pub first: Text,
    /// The second component.
    pub second: Text,
    /// What holds between them.
    pub law: PairLaw,
    /// How that was come by.
    pub basis: Basis,
    /// A key of the bibliography.
    pub source: Text,
}

/// The table `core/data/activity.csv`, read once. A row that cannot be read is left out; a test holds the count.
///
/// ```
/// assert!(thimbleworth::mixture::pair_table().len() > 50);
/// ```
pub fn pair_table() -> &'static [Pair] {
    static TABLE: OnceLock<Vec<Pair>> = OnceLock::new();
    TABLE.get_or_init(|| {
        include_str!(concat!(env!("CARGO_MANIFEST_DIR"), "/data/activity.csv"))
            .lines()
            .skip(1)
            .filter_map(row)
            .collect()
    })
}

/// What is known of two materials of the catalogue, by their names in it, in either order; the constants come in the order asked for.
///
/// ```
/// use thimbleworth::mixture::{Basis, find_pair};
/// assert_eq!(find_pair("acetone", "n-hexane").unwrap().basis, Basis::Azeotrope);
/// assert_eq!(find_pair("acetone", "n-hexane").unwrap().first, "acetone");
/// assert!(find_pair("acetone", "sea sand").is_none());
/// ```
#[must_use]
pub fn find_pair(first: &str, second: &str) -> Option<Pair> {
    pair_table().iter().find_map(|pair| {
        if pair.first == first && pair.second == second {
            Some(pair.clone())
        } else if pair.first == second && pair.second == first {
            let law = match pair.law {
                PairLaw::Wilson(wilson) => PairLaw::Wilson(wilson.exchanged()),
                PairLaw::Splits => PairLaw::Splits,
            };
            Some(Pair { first: pair.second.clone(), second: pair.first.clone(), law, ..pair.clone() })
        } else {
            None
        }
    })
}

fn row(line: &'static str) -> Option<Pair> {
    let mut cells = line.split(',');
    let mut next = || cells.next();
    let (first, second) = (next()?, next()?);
    let numbers = [next()?, next()?, next()?, next()?, next()?, next()?].map(nearest);
    let (basis, source) = (next()?, next()?);
    let basis = [Basis::Published, Basis::Azeotrope, Basis::Fitted, Basis::Homologues, Basis::Splits]
        .into_iter()
        .find(|b| b.word() == basis)?;
    let law = match (basis, numbers) {
        (Basis::Splits, _) => PairLaw::Splits,
        (_, [Some(a12), Some(b12_k), Some(a21), Some(b21_k), Some(low_c), Some(high_c)]) => {
            PairLaw::Wilson(Wilson { a12, b12_k, a21, b21_k, low_k: low_c + 273.15, high_k: high_c + 273.15 })
        }
        _ => return None,
    };
    Some(Pair { first: first.into(), second: second.into(), law, basis, source: source.into() })
}
