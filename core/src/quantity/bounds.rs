//! What is physically possible, in one table. A technique declares its own, narrower bounds beside each parameter.

use super::error::Which;
use super::{AmountError, Kind};

/// The bounds of a kind in SI and the phrase that states them.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Bound {
    /// The kind.
    pub kind: Kind,
    /// The lowest value in SI.
    pub low: f64,
    /// Whether the lowest value itself is excluded.
    pub low_excluded: bool,
    /// The highest value in SI: where a slip is surer than a plan.
    pub high: f64,
    /// The bounds in words, without a full stop.
    pub phrase: &'static str,
}

impl Bound {
    /// Whether the value lies below the lower bound.
    #[must_use]
    pub fn is_below(&self, si: f64) -> bool {
        si < self.low || (self.low_excluded && si == self.low)
    }

    /// Whether the value lies within; NaN does not.
    #[must_use]
    pub fn holds(&self, si: f64) -> bool {
        si.is_finite() && !self.is_below(si) && si <= self.high
    }
}

const fn from(kind: Kind, low: f64, high: f64, phrase: &'static str) -> Bound {
    Bound { kind, low, low_excluded: false, high, phrase }
}

const fn above(kind: Kind, low: f64, high: f64, phrase: &'static str) -> Bound {
    Bound { kind, low, low_excluded: true, high, phrase }
}

/// The bounds of every kind, in the order of [`Kind::ALL`]. Lower bounds are physical law or definition; upper bounds
/// are our own, far beyond any plant, to catch a slip of the unit.
pub static BOUNDS: [Bound; 26] = [
    from(Kind::Mass, 0.0, 1e9, "a mass lies from 0 to 1e9 kg"),
    from(Kind::Volume, 0.0, 1e9, "a volume lies from 0 to 1e9 m³"),
    from(Kind::Time, 0.0, 1e10, "a time lies from 0 to 1e10 s, about 317 years"),
    above(Kind::Temperature, 0.0, 1e4, "a temperature lies above 0 K (-273.15 °C) and up to 10000 K"),
    from(Kind::TemperatureDifference, -1e4, 1e4, "a temperature difference lies from -10000 to 10000 K"),
    from(Kind::Pressure, 0.0, 1e10, "an absolute pressure lies from 0 to 1e10 Pa (100000 bar)"),
    from(Kind::Power, 0.0, 1e9, "a power lies from 0 to 1e9 W"),
    from(Kind::Energy, 0.0, 1e15, "an energy lies from 0 to 1e15 J"),
    from(Kind::Fraction, 0.0, 1.0, "a fraction lies from 0 to 1 (100 %)"),
    from(Kind::Density, 0.0, 25_000.0, "a density or concentration lies from 0 to 25000 kg/m³ (25 g/mL)"),
    from(Kind::MolarMass, 1e-3, 1e4, "a molar mass lies from 1 g/mol to 1e7 g/mol"),
    from(Kind::VolumeFlow, 0.0, 1e4, "a volume flow lies from 0 to 1e4 m³/s"),
    from(Kind::MassFlow, 0.0, 1e6, "a mass flow lies from 0 to 1e6 kg/s"),
    from(Kind::Frequency, 0.0, 1e9, "a frequency lies from 0 to 1e9 per second"),
    from(Kind::VolumePerMass, 0.0, 1e6, "a volume per mass lies from 0 to 1e6 m³/kg"),
    from(Kind::MassPerMass, 0.0, 1e9, "a mass per mass lies from 0 to 1e9"),
    from(Kind::SpecificEnergy, 0.0, 1e12, "an energy per mass lies from 0 to 1e12 J/kg"),
    from(Kind::Length, 0.0, 1e7, "a length lies from 0 to 1e7 m"),
    from(Kind::Area, 0.0, 1e10, "an area lies from 0 to 1e10 m²"),
    from(Kind::Count, 0.0, 1e12, "a count lies from 0 to 1e12"),
    from(Kind::Number, -1e15, 1e15, "a plain number lies from -1e15 to 1e15"),
    from(Kind::ClimatePerEnergy, 0.0, 1e-3, "a climate factor lies from 0 to 3600 kg/kWh"),
    from(Kind::Money, -1e12, 1e12, "an amount of money lies from -1e12 to 1e12; a credit is negative"),
    from(
        Kind::PricePerMass,
        -1e15,
        1e15,
        "a price per mass lies from -1e15 to 1e15 per kg; a credit is negative",
    ),
    from(
        Kind::PricePerVolume,
        -1e15,
        1e15,
        "a price per volume lies from -1e15 to 1e15 per m³; a credit is negative",
    ),
    from(Kind::PricePerEnergy, -1.0, 1.0, "a price per energy lies from -1 to 1 per J; a credit is negative"),
];

/// The bounds of a kind.
///
/// ```
/// use thimbleworth::quantity::{Kind, bound};
/// assert_eq!((bound(Kind::Fraction).low, bound(Kind::Fraction).high), (0.0, 1.0));
/// ```
#[must_use]
pub fn bound(kind: Kind) -> &'static Bound {
    // A test holds the table complete; the first row is never taken for another kind.
    BOUNDS.iter().find(|bound| bound.kind == kind).unwrap_or(&BOUNDS[0])
}

/// Checks a value in SI against the bounds of its kind.
///
/// # Errors
/// [`AmountError::OutOfBounds`] when it lies outside or is not finite.
///
/// ```
/// use thimbleworth::quantity::{Kind, check};
/// assert!(check(Kind::Mass, 0.3).is_ok());
/// assert_eq!(check(Kind::Mass, -0.3).unwrap_err().to_string(), "-300 g is too low; a mass lies from 0 to 1e9 kg");
/// ```
pub fn check(kind: Kind, si: f64) -> Result<(), AmountError> {
    check_which(kind, si, Which::Value)
}

pub(super) fn check_which(kind: Kind, si: f64, which: Which) -> Result<(), AmountError> {
    let bound = bound(kind);
    if bound.holds(si) { Ok(()) } else { Err(AmountError::OutOfBounds { kind, which, value_si: si, bound }) }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn every_kind_has_its_bounds() {
        for (kind, bound) in Kind::ALL.iter().zip(&BOUNDS) {
            assert_eq!(bound.kind, *kind);
            assert!(bound.low < bound.high);
            assert!(bound.phrase.starts_with("a ") || bound.phrase.starts_with("an "), "{}", bound.phrase);
        }
    }

    #[test]
    fn edges() {
        assert!(check(Kind::Temperature, 0.0).is_err());
        assert!(check(Kind::Temperature, 1e-9).is_ok());
        assert!(check(Kind::Fraction, 1.0).is_ok());
        assert!(check(Kind::Fraction, 1.000_000_1).is_err());
        assert!(check(Kind::Mass, f64::NAN).is_err());
        assert!(check(Kind::Number, f64::INFINITY).is_err());
    }
}
