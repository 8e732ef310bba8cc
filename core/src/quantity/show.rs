//! Amounts as text for people: a sensible unit and a few significant digits.

use super::{Currency, Kind, Unit, significant, unit, units_of};

/// Significant digits of a figure that is shown.
const DIGITS: u32 = 4;

/// The units of a kind from small to large, each with the least value in SI for which it is taken.
pub(super) struct Ladder {
    kind: Kind,
    rungs: &'static [(f64, &'static str)],
}

impl Ladder {
    pub(super) const fn of(kind: Kind) -> Self {
        let rungs: &'static [(f64, &'static str)] = match kind {
            Kind::Mass => &[(0.0, "ng"), (1e-9, "µg"), (1e-6, "mg"), (1e-3, "g"), (1.0, "kg"), (1e4, "t")],
            Kind::Volume => &[(0.0, "nL"), (1e-9, "µL"), (1e-6, "mL"), (1e-3, "L"), (1.0, "m³")],
            Kind::Time => {
                &[(0.0, "s"), (60.0, "min"), (3600.0, "h"), (172_800.0, "d"), (63_072_000.0, "year")]
            }
            Kind::Pressure => &[(0.0, "Pa"), (100.0, "mbar"), (1e5, "bar")],
            Kind::Power => &[(0.0, "W"), (1e3, "kW")],
            Kind::Energy => &[(0.0, "J"), (1e3, "kJ"), (3.6e5, "kWh")],
            Kind::Density => &[(0.0, "µg/L"), (1e-3, "mg/L"), (1.0, "g/L"), (100.0, "g/mL")],
            // 1 L/min and 1 m³/min in m³/s
            Kind::VolumeFlow => &[(0.0, "mL/min"), (1.666e-5, "L/min"), (1.666e-2, "m³/h")],
            // 0.6 g/min (316 kg/year) and 1 kg/min in kg/s
            Kind::MassFlow => &[(0.0, "kg/year"), (1e-5, "g/min"), (1.666e-2, "kg/min")],
            // once a day, an hour, a minute, a second
            Kind::Frequency => {
                &[(0.0, "/year"), (1.15e-5, "/d"), (2.77e-4, "/h"), (1.66e-2, "/min"), (1.0, "/s")]
            }
            Kind::VolumePerMass => &[(0.0, "mL/g"), (1.0, "m³/kg")],
            Kind::MassPerMass => &[(0.0, "mg/kg"), (1e-4, "g/kg"), (0.1, "g/g")],
            Kind::SpecificEnergy => &[(0.0, "J/kg"), (1e3, "kJ/kg"), (3.6e6, "kWh/kg")],
            Kind::Length => &[(0.0, "nm"), (1e-6, "µm"), (1e-3, "mm"), (1.0, "m"), (1e3, "km")],
            Kind::Area => &[(0.0, "mm²"), (1e-4, "cm²"), (0.1, "m²")],
            // 0.1 kg/kWh in kg/J
            Kind::ClimatePerEnergy => &[(0.0, "g/kWh"), (2.777e-8, "kg/kWh")],
            Kind::PricePerMass => &[(0.0, "/kg")],
            Kind::PricePerVolume => &[(0.0, "/L")],
            Kind::PricePerEnergy => &[(0.0, "/kWh")],
            Kind::Temperature
            | Kind::TemperatureDifference
            | Kind::Fraction
            | Kind::MolarMass
            | Kind::Count
            | Kind::Number
            | Kind::Money => &[],
        };
        Self { kind, rungs }
    }

    /// The unit for a value; zero and what is not finite take the preferred one. `None` for money alone without a
    /// currency.
    pub(super) fn unit_for(&self, value_si: f64, currency: Option<Currency>) -> Option<Unit> {
        let code = currency.map_or_else(String::new, |currency| currency.to_string());
        if self.kind == Kind::Money {
            return unit(&code, self.kind).ok();
        }
        let size = value_si.abs();
        let rung =
            self.rungs.iter().rev().find(|(least, _)| size >= *least && size != 0.0 && size.is_finite());
        let first = if self.kind.is_money() { self.rungs.first().map(|rung| rung.1) } else { None };
        let symbol = rung.map(|rung| rung.1).or(first).or_else(|| units_of(self.kind).first().copied())?;
        if self.kind.is_money() {
            return unit(&format!("{code}{symbol}"), self.kind).ok();
        }
        unit(symbol, self.kind).ok()
    }
}

/// A value in SI as text, in a unit that suits its size, to four significant digits. Minus zero is 0; infinities and
/// NaN are words. Money is shown without a currency: use [`show_money`] where one is known.
///
/// ```
/// use thimbleworth::quantity::{Kind, show};
/// assert_eq!(show(0.00025, Kind::Volume), "250 mL");
/// assert_eq!(show(1234.0, Kind::Mass), "1234 kg");
/// assert_eq!(show(-0.0, Kind::Mass), "0 g");
/// assert_eq!(show(293.15, Kind::Temperature), "20 °C");
/// ```
#[must_use]
pub fn show(value_si: f64, kind: Kind) -> String {
    show_money(value_si, kind, None)
}

/// As [`show`], with the currency of money and prices.
///
/// ```
/// use thimbleworth::quantity::{Currency, Kind, show_money};
/// assert_eq!(show_money(17_000.0, Kind::PricePerVolume, Currency::new("USD")), "17 USD/L");
/// ```
#[must_use]
pub fn show_money(value_si: f64, kind: Kind, currency: Option<Currency>) -> String {
    // Counts are exact.
    let digits = if kind == Kind::Count { 17 } else { DIGITS };
    match Ladder::of(kind).unit_for(value_si, currency) {
        Some(unit) => format!("{}{}", number_in(value_si, &unit, digits), suffix(&unit.symbol())),
        None => significant(value_si, digits),
    }
}

/// A value in SI as text in the unit given, to four significant digits.
///
/// ```
/// use thimbleworth::quantity::{Kind, show_in, unit};
/// assert_eq!(show_in(0.00025, &unit("L", Kind::Volume)?), "0.25 L");
/// # Ok::<(), thimbleworth::quantity::AmountError>(())
/// ```
#[must_use]
pub fn show_in(value_si: f64, unit: &Unit) -> String {
    format!("{}{}", number_in(value_si, unit, DIGITS), suffix(&unit.symbol()))
}

/// The number alone.
pub(super) fn number_in(value_si: f64, unit: &Unit, digits: u32) -> String {
    let value = unit.from_si(value_si);
    // 273.15 + 1e-14 K is 0 °C: what rounding leaves of a shifted scale is not shown.
    let shift = value_si - value;
    let noise = unit.kind() == Kind::Temperature && value.abs() < 1e-12 * shift.abs();
    significant(if noise { 0.0 } else { value }, digits)
}

/// The symbol with the space that stands before it.
pub(super) fn suffix(symbol: &str) -> String {
    if symbol.is_empty() { String::new() } else { format!(" {symbol}") }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn sensible_units() {
        for (value, kind, text) in [
            (0.000_25, Kind::Volume, "250 mL"),
            (0.0003, Kind::Volume, "300 mL"),
            (2.5, Kind::Volume, "2.5 m³"),
            (0.0025, Kind::Volume, "2.5 L"),
            (1234.0, Kind::Mass, "1234 kg"),
            (12_340.0, Kind::Mass, "12.34 t"),
            (0.0, Kind::Mass, "0 g"),
            (-0.0, Kind::Mass, "0 g"),
            (-0.002, Kind::Mass, "-2 g"),
            (3e-12, Kind::Mass, "3 ng"),
            (64_800.0, Kind::Time, "18 h"),
            (285.15, Kind::Temperature, "12 °C"),
            (273.15, Kind::Temperature, "0 °C"),
            (3.0, Kind::TemperatureDifference, "3 K"),
            (33_500.0, Kind::Pressure, "335 mbar"),
            (3e7, Kind::Pressure, "300 bar"),
            (0.5, Kind::Fraction, "50 %"),
            (0.97, Kind::Fraction, "97 %"),
            (659.0, Kind::Density, "0.659 g/mL"),
            (0.086_18, Kind::MolarMass, "86.18 g/mol"),
            (5.0 / 3600.0, Kind::Frequency, "5 /h"),
            (1.0 / 3600.0, Kind::Frequency, "1 /h"),
            (0.37 / 3.6e6, Kind::ClimatePerEnergy, "0.37 kg/kWh"),
            (365_000.0, Kind::SpecificEnergy, "365 kJ/kg"),
            (1.44e6, Kind::Energy, "0.4 kWh"),
            (1.0 / 60.0 / 1e3, Kind::VolumeFlow, "1 L/min"),
            (20.0 / 60.0 / 1e3, Kind::MassFlow, "20 g/min"),
            (1400.0, Kind::Count, "1400"),
            (123_456.0, Kind::Count, "123456"),
            (-0.5, Kind::Number, "-0.5"),
            (12.0, Kind::Money, "12"),
            (17_000.0, Kind::PricePerVolume, "17 /L"),
        ] {
            assert_eq!(show(value, kind), text);
        }
    }

    #[test]
    fn any_value_of_any_kind_is_shown() {
        for kind in Kind::ALL {
            for value in [
                f64::NAN,
                f64::INFINITY,
                f64::NEG_INFINITY,
                f64::MAX,
                f64::MIN_POSITIVE,
                -0.0,
                5e-324,
                -1e300,
            ] {
                let text = show(value, kind);
                assert!(!text.is_empty() && !text.starts_with("-0 ") && text != "-0", "{text}");
            }
        }
    }
}
