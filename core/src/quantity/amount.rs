//! An amount as it was read: its value in SI, its spread, and what was understood.

use super::show::{Ladder, number_in};
use super::{Currency, Kind};

/// An amount that was read from text.
#[derive(Clone, Debug, PartialEq)]
pub struct Amount {
    /// The text as it was written, without spaces around it.
    pub text: String,
    /// What it measures.
    pub kind: Kind,
    /// The value in SI (see [`Kind`] for the unit); the midpoint of `a to b`.
    pub central_si: f64,
    /// The spread around it.
    pub spread: Spread,
    /// For a fraction: whether the text says that it is by volume or by mass.
    pub share_by: ShareBy,
    /// For money and prices: the currency.
    pub currency: Option<Currency>,
}

/// What is known of the values that an amount may have.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Spread {
    /// One value.
    Exact,
    /// Any value between the limits, all alike: a rectangular distribution. Written `±` or `a to b`.
    Limits {
        /// The lower limit in SI.
        low_si: f64,
        /// The upper limit in SI.
        high_si: f64,
    },
    /// A normal distribution with this standard uncertainty. Written `u` or `± … (k=2)`.
    Standard {
        /// The standard uncertainty in SI, a difference.
        u_si: f64,
    },
}

/// √3.
const SQRT_3: f64 = 1.732_050_807_568_877_2;

impl Spread {
    /// Half the distance between the limits, in SI. For a standard uncertainty it is that of the rectangular
    /// distribution with the same standard uncertainty, u √3.
    ///
    /// ```
    /// use thimbleworth::quantity::{Kind, read};
    /// let amount = read("12 ± 3 °C", Kind::Temperature)?;
    /// assert_eq!(amount.spread.half_width(), 3.0);
    /// # Ok::<(), thimbleworth::quantity::AmountError>(())
    /// ```
    #[must_use]
    pub fn half_width(&self) -> f64 {
        match *self {
            Self::Exact => 0.0,
            Self::Limits { low_si, high_si } => (high_si - low_si) / 2.0,
            Self::Standard { u_si } => u_si * SQRT_3,
        }
    }

    /// The standard uncertainty in SI. Source: JCGM 100:2008 (GUM), 4.3.7, from memory.
    ///
    /// ```
    /// use thimbleworth::quantity::{Kind, read};
    /// let amount = read("250 ± 4 mL (k=2)", Kind::Volume)?;
    /// assert_eq!(amount.spread.standard_uncertainty(), 2e-6);
    /// # Ok::<(), thimbleworth::quantity::AmountError>(())
    /// ```
    #[must_use]
    pub fn standard_uncertainty(&self) -> f64 {
        match *self {
            Self::Exact => 0.0,
            // u = a/√3, with a the half width of the rectangular distribution
            Self::Limits { .. } => self.half_width() / SQRT_3,
            Self::Standard { u_si } => u_si,
        }
    }
}

/// The base of a fraction, as the text states it.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum ShareBy {
    /// Not stated: `50 %`.
    Unstated,
    /// By volume: `50 % v/v`.
    Volume,
    /// By mass: `50 % w/w`.
    Mass,
}

/// An amount, or the statement that it is not known; distinct from its absence.
#[derive(Clone, Debug, PartialEq)]
pub enum Entry {
    /// An amount.
    Known(Amount),
    /// “not known” is written.
    NotKnown,
}

/// Where a figure comes from.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum Origin {
    /// The plan states it.
    Entered,
    /// A rule computed it.
    Computed,
    /// The plan states it as measured.
    Measured,
    /// A declared default stands in for what the plan leaves out.
    Assumed,
    /// The plan says that it is not known; a declared range stands in.
    NotKnown,
}

impl Origin {
    /// The word shown.
    ///
    /// ```
    /// assert_eq!(thimbleworth::quantity::Origin::NotKnown.word(), "not known");
    /// ```
    #[must_use]
    pub const fn word(self) -> &'static str {
        match self {
            Self::Entered => "entered",
            Self::Computed => "computed",
            Self::Measured => "measured",
            Self::Assumed => "assumed",
            Self::NotKnown => "not known",
        }
    }
}

/// Significant digits in which a reading is given back.
const DIGITS: u32 = 6;

impl Amount {
    /// What was read, in words and in a unit of our choice, so that a wrong reading shows.
    ///
    /// ```
    /// use thimbleworth::quantity::{Kind, read};
    /// assert_eq!(
    ///     read("0.25 l ± 2 %", Kind::Volume)?.understood(),
    ///     "250 mL, between 245 and 255 mL (limits)"
    /// );
    /// assert_eq!(read("68 °F", Kind::Temperature)?.understood(), "20 °C");
    /// assert_eq!(read("50 %", Kind::Fraction)?.understood(), "50 %");
    /// # Ok::<(), thimbleworth::quantity::AmountError>(())
    /// ```
    #[must_use]
    pub fn understood(&self) -> String {
        let Some(unit) = Ladder::of(self.kind).unit_for(self.central_si, self.currency) else {
            return super::shortest(self.central_si);
        };
        let digits = if matches!(self.kind, Kind::Count) { 17 } else { DIGITS };
        let suffix = super::show::suffix(&unit.symbol());
        let by = match self.share_by {
            ShareBy::Unstated => "",
            ShareBy::Volume => " by volume",
            ShareBy::Mass if self.kind == Kind::Fraction => " by mass",
            ShareBy::Mass => "",
        };
        let central = number_in(self.central_si, &unit, digits);
        match self.spread {
            Spread::Exact => format!("{central}{suffix}{by}"),
            Spread::Limits { low_si, high_si } => {
                let low = number_in(low_si, &unit, digits);
                let high = number_in(high_si, &unit, digits);
                format!("{central}{suffix}{by}, between {low} and {high}{suffix} (limits)")
            }
            Spread::Standard { u_si } => {
                // A difference of temperatures is in kelvin, which is its SI unit.
                let u = if self.kind == Kind::Temperature {
                    format!("{} K", super::significant(u_si, digits))
                } else {
                    format!("{}{suffix}", number_in(u_si, &unit, digits))
                };
                format!("{central}{suffix}{by}, standard uncertainty {u}")
            }
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn spreads() {
        let limits = Spread::Limits { low_si: 1.0, high_si: 4.0 };
        assert_eq!(limits.half_width(), 1.5);
        assert!((limits.standard_uncertainty() - 0.866_025_403_784_438_6).abs() < 1e-15);
        let standard = Spread::Standard { u_si: 2.0 };
        assert_eq!(standard.standard_uncertainty(), 2.0);
        let alike = Spread::Limits { low_si: -standard.half_width(), high_si: standard.half_width() };
        assert!((alike.standard_uncertainty() - 2.0).abs() < 1e-15);
        assert_eq!(Spread::Exact.half_width(), 0.0);
    }
}
