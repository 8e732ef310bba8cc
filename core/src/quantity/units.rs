//! The units that are read, in one table. A unit of a derived kind (density, flow, price ...) is a quotient of two of
//! these, so that `mg/kg`, `lb/US gal` or `USD/t` need no row.
//!
//! Symbols tell capital from small letters: `MPa` is not `mPa`. Every factor is exact: a whole number, times a power of
//! ten, over a whole number.

use super::decimal::Decimal;
use super::{Kind, ShareBy};
use crate::source::{DEFINITION, Source, Standing};

/// A unit with its factor to SI.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct UnitRow {
    /// What it measures.
    pub kind: Kind,
    /// The symbol in which it is shown.
    pub symbol: &'static str,
    /// Other ways in which it is read.
    pub aliases: &'static [&'static str],
    /// How many SI units one of it is.
    pub factor: Factor,
    /// Added to a number in this unit before the factor: 273.15 for °C. 0 for all but temperatures.
    pub(super) zero: Decimal,
    /// For fractions: by volume or by mass.
    pub share_by: ShareBy,
    /// Where the factor comes from.
    pub source: Source,
}

/// An exact factor: number × 10^power / over.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Factor {
    /// A whole number.
    pub number: u64,
    /// A power of ten.
    pub power: i32,
    /// A whole number that divides.
    pub over: u64,
}

const fn ten(power: i32) -> Factor {
    Factor { number: 1, power, over: 1 }
}

const fn exact(number: u64, power: i32) -> Factor {
    Factor { number, power, over: 1 }
}

const fn quotient(number: u64, power: i32, over: u64) -> Factor {
    Factor { number, power, over }
}

const fn row(
    kind: Kind,
    symbol: &'static str,
    aliases: &'static [&'static str],
    factor: Factor,
    source: Source,
) -> UnitRow {
    UnitRow { kind, symbol, aliases, factor, zero: Decimal::new(0, 0), share_by: ShareBy::Unstated, source }
}

const fn from_zero(mut row: UnitRow, mantissa: i128, exponent: i32) -> UnitRow {
    row.zero = Decimal::new(mantissa, exponent);
    row
}

const fn by(mut row: UnitRow, share_by: ShareBy) -> UnitRow {
    row.share_by = share_by;
    row
}

/// SI units with their prefixes.
const SI: Source = Source::new(
    "BIPM, The International System of Units, 9th edition (2019), Tables 2, 4 and 7 (units, prefixes)",
    Standing::FromMemory,
);
/// min, h, d, L, t.
const ACCEPTED: Source = Source::new(
    "BIPM, SI Brochure, 8th edition (2006, updated 2014), Table 6 on bipm.org; the same values stand in the 9th edition, Table 8",
    Standing::Primary,
);
/// bar, and degrees Celsius.
const BROCHURE: Source = Source::new(
    "BIPM, SI Brochure, 8th edition, Table 8 (bar) and section 2.1.1.5 (°C)",
    Standing::FromMemory,
);
/// Units outside the SI whose values were seen quoted by others.
const SP_811_QUOTED: Source = Source::new(
    "NIST Special Publication 811 (2008), Appendix B.8, as quoted in public conversion tables",
    Standing::Secondary,
);
const SP_811: Source = Source::new("NIST Special Publication 811 (2008), Appendix B.8", Standing::FromMemory);
/// A calendar year of 365 days, as in SP 811, and its twelfth.
const YEAR: Source = Source::new(
    "NIST Special Publication 811 (2008), Appendix B.8, year (365 days) = 3.1536E+07 s; a month is its twelfth by our own choice",
    Standing::FromMemory,
);

use Kind::{
    Area, Count, Energy, Fraction, Length, Mass, MassPerMass, MolarMass, Number, Power, Pressure,
    Temperature, TemperatureDifference, Time, Volume,
};

/// Every unit that is read, without the quotients.
pub static UNITS: &[UnitRow] = &[
    row(Mass, "ng", &["nanogram", "nanograms"], ten(-12), SI),
    row(Mass, "µg", &["ug", "mcg", "microgram", "micrograms"], ten(-9), SI),
    row(Mass, "mg", &["milligram", "milligrams"], ten(-6), SI),
    row(Mass, "g", &["gram", "grams"], ten(-3), SI),
    row(Mass, "kg", &["kilogram", "kilograms", "kilo", "kilos"], ten(0), SI),
    row(Mass, "t", &["tonne", "tonnes"], ten(3), ACCEPTED),
    // The avoirdupois pound; 1 oz = lb/16.
    row(Mass, "lb", &["lbs", "pound", "pounds"], exact(45_359_237, -8), SP_811_QUOTED),
    row(Mass, "oz", &["ounce", "ounces"], quotient(45_359_237, -8, 16), SP_811),
    row(Volume, "nL", &["nl"], ten(-12), ACCEPTED),
    row(Volume, "µL", &["µl", "uL", "ul", "mm3", "microlitre", "microliter"], ten(-9), ACCEPTED),
    row(
        Volume,
        "mL",
        &["ml", "cm3", "millilitre", "millilitres", "milliliter", "milliliters"],
        ten(-6),
        ACCEPTED,
    ),
    row(Volume, "cL", &["cl"], ten(-5), ACCEPTED),
    row(Volume, "dL", &["dl"], ten(-4), ACCEPTED),
    row(Volume, "L", &["l", "dm3", "litre", "litres", "liter", "liters"], ten(-3), ACCEPTED),
    row(Volume, "m³", &["m3", "cubic metre", "cubic metres", "cubic meter", "cubic meters"], ten(0), SI),
    // 231 cubic inches of 2.54 cm; the quart is its quarter.
    row(
        Volume,
        "US gal",
        &["USgal", "US gallon", "US gallons", "gal (US)"],
        exact(3_785_411_784, -12),
        SP_811_QUOTED,
    ),
    row(
        Volume,
        "US qt",
        &["USqt", "US quart", "US quarts", "qt (US)"],
        quotient(3_785_411_784, -12, 4),
        SP_811,
    ),
    row(Time, "ms", &["millisecond", "milliseconds"], ten(-3), SI),
    row(Time, "s", &["sec", "secs", "second", "seconds"], ten(0), SI),
    row(Time, "min", &["mins", "minute", "minutes"], exact(60, 0), ACCEPTED),
    row(Time, "h", &["hr", "hrs", "hour", "hours"], exact(3600, 0), ACCEPTED),
    row(Time, "d", &["day", "days"], exact(86_400, 0), ACCEPTED),
    row(Time, "week", &["weeks", "wk"], exact(604_800, 0), DEFINITION),
    row(Time, "month", &["months"], exact(2_628_000, 0), YEAR),
    row(Time, "year", &["years", "yr", "yrs"], exact(31_536_000, 0), YEAR),
    row(Temperature, "K", &["kelvin", "kelvins"], ten(0), SI),
    from_zero(
        row(
            Temperature,
            "°C",
            &["C", "degC", "deg C", "° C", "Celsius", "degrees Celsius"],
            ten(0),
            BROCHURE,
        ),
        27_315,
        -2,
    ),
    // T = (t + 459.67) × 5/9
    from_zero(
        row(
            Temperature,
            "°F",
            &["F", "degF", "deg F", "° F", "Fahrenheit", "degrees Fahrenheit"],
            quotient(5, 0, 9),
            SP_811,
        ),
        45_967,
        -2,
    ),
    row(TemperatureDifference, "K", &["kelvin", "kelvins"], ten(0), SI),
    row(TemperatureDifference, "°C", &["C", "degC", "deg C", "° C", "Celsius"], ten(0), BROCHURE),
    row(TemperatureDifference, "°F", &["F", "degF", "deg F", "° F", "Fahrenheit"], quotient(5, 0, 9), SP_811),
    row(Pressure, "Pa", &["pascal", "pascals"], ten(0), SI),
    row(Pressure, "hPa", &[], ten(2), SI),
    row(Pressure, "kPa", &[], ten(3), SI),
    row(Pressure, "MPa", &[], ten(6), SI),
    row(Pressure, "mbar", &["millibar"], ten(2), BROCHURE),
    row(Pressure, "bar", &["bara", "bar a", "bar(a)", "bar (a)", "bar abs", "bars"], ten(5), BROCHURE),
    row(Pressure, "atm", &[], exact(101_325, 0), SP_811_QUOTED),
    // 1 psi = 0.453 592 37 kg × 9.806 65 m/s² / (0.0254 m)²
    row(
        Pressure,
        "psi",
        &["psia", "psi a", "psi(a)", "psi (a)", "lbf/in2"],
        quotient(44_482_216_152_605, -5, 64_516),
        SP_811_QUOTED,
    ),
    // 1 Torr = 1 atm / 760
    row(Pressure, "Torr", &["torr"], quotient(101_325, 0, 760), SP_811),
    // Conventional: 13 595.1 kg/m³ × 9.806 65 m/s² × 1 mm
    row(Pressure, "mmHg", &["mm Hg"], exact(133_322_387_415, -9), SP_811_QUOTED),
    row(Power, "W", &["watt", "watts"], ten(0), SI),
    row(Power, "kW", &["kilowatt", "kilowatts"], ten(3), SI),
    row(Energy, "J", &["joule", "joules"], ten(0), SI),
    row(Energy, "kJ", &["kilojoule", "kilojoules"], ten(3), SI),
    row(Energy, "MJ", &["megajoule", "megajoules"], ten(6), SI),
    row(Energy, "GJ", &["gigajoule", "gigajoules"], ten(9), SI),
    row(Energy, "Wh", &["W h", "W·h"], exact(36, 2), SP_811),
    row(Energy, "kWh", &["kW h", "kW·h"], exact(36, 5), SP_811),
    row(Energy, "MWh", &["MW h", "MW·h"], exact(36, 8), SP_811),
    row(Fraction, "", &["1"], ten(0), DEFINITION),
    row(Fraction, "%", &["percent", "per cent"], ten(-2), DEFINITION),
    by(
        row(
            Fraction,
            "% v/v",
            &["%v/v", "% (v/v)", "%(v/v)", "% V/V", "vol%", "vol %", "% vol", "%vol"],
            ten(-2),
            DEFINITION,
        ),
        ShareBy::Volume,
    ),
    by(
        row(
            Fraction,
            "% w/w",
            &["%w/w", "% (w/w)", "%(w/w)", "% m/m", "%m/m", "% (m/m)", "wt%", "wt %", "% wt"],
            ten(-2),
            DEFINITION,
        ),
        ShareBy::Mass,
    ),
    row(Fraction, "‰", &["per mille"], ten(-3), DEFINITION),
    row(Fraction, "ppm", &[], ten(-6), DEFINITION),
    by(
        row(MassPerMass, "% w/w", &["%w/w", "% (w/w)", "% m/m", "wt%", "wt %"], ten(-2), DEFINITION),
        ShareBy::Mass,
    ),
    row(MolarMass, "g/mol", &[], ten(-3), SI),
    row(MolarMass, "kg/mol", &[], ten(0), SI),
    row(MolarMass, "kg/kmol", &[], ten(-3), SI),
    row(Length, "nm", &[], ten(-9), SI),
    row(Length, "µm", &["um", "micron", "microns"], ten(-6), SI),
    row(Length, "mm", &["millimetre", "millimetres", "millimeter", "millimeters"], ten(-3), SI),
    row(Length, "cm", &["centimetre", "centimetres", "centimeter", "centimeters"], ten(-2), SI),
    row(Length, "m", &["metre", "metres", "meter", "meters"], ten(0), SI),
    row(Length, "km", &[], ten(3), SI),
    row(Length, "in", &["inch", "inches"], exact(254, -4), SP_811),
    row(Length, "ft", &["foot", "feet"], exact(3048, -4), SP_811),
    row(Area, "mm²", &["mm2"], ten(-6), SI),
    row(Area, "cm²", &["cm2"], ten(-4), SI),
    row(Area, "m²", &["m2"], ten(0), SI),
    row(Count, "", &["1"], ten(0), DEFINITION),
    row(Number, "", &["1"], ten(0), DEFINITION),
];

/// The units in which such an amount is best written, the preferred one first; for forms, hints and error messages.
/// An empty symbol is a plain number; money is shown with an example of a currency.
///
/// ```
/// use thimbleworth::quantity::{Kind, units_of};
/// assert_eq!(units_of(Kind::Volume).first(), Some(&"mL"));
/// ```
#[must_use]
pub const fn units_of(kind: Kind) -> &'static [&'static str] {
    match kind {
        Mass => &["g", "mg", "µg", "ng", "kg", "t", "lb", "oz"],
        Volume => &["mL", "L", "µL", "nL", "cL", "dL", "m³", "US gal", "US qt"],
        Time => &["h", "min", "s", "d", "week", "month", "year"],
        Temperature => &["°C", "K", "°F"],
        TemperatureDifference => &["K", "°C", "°F"],
        Pressure => &["bar", "mbar", "Pa", "hPa", "kPa", "MPa", "atm", "psi", "Torr", "mmHg"],
        Power => &["W", "kW"],
        Energy => &["kWh", "Wh", "J", "kJ", "MJ"],
        Fraction => &["%", "% v/v", "% w/w", "‰", "ppm", ""],
        Kind::Density => &["g/mL", "kg/L", "kg/m³", "g/L", "mg/L", "µg/L"],
        MolarMass => &["g/mol", "kg/mol"],
        Kind::VolumeFlow => &["mL/min", "L/min", "L/h", "m³/h"],
        Kind::MassFlow => &["g/min", "kg/min", "kg/h"],
        Kind::Frequency => &["/h", "/min", "/s", "/d"],
        Kind::VolumePerMass => &["mL/g", "L/kg", "m³/kg"],
        MassPerMass => &["g/g", "g/kg", "mg/kg", "kg/kg", "kg/t", "% w/w"],
        Kind::SpecificEnergy => &["kJ/kg", "kWh/kg", "J/g", "MJ/kg"],
        Length => &["mm", "cm", "m", "µm", "in", "ft"],
        Area => &["cm²", "mm²", "m²"],
        Count | Number => &[""],
        Kind::ClimatePerEnergy => &["kg/kWh", "g/kWh", "kg/MJ"],
        Kind::Money => &["USD", "EUR"],
        Kind::PricePerMass => &["USD/kg", "USD/g", "USD/t"],
        Kind::PricePerVolume => &["USD/L", "USD/m³"],
        Kind::PricePerEnergy => &["USD/kWh", "USD/MJ"],
    }
}

/// The unit in which such an amount is best written.
///
/// ```
/// use thimbleworth::quantity::{Kind, preferred_unit};
/// assert_eq!(preferred_unit(Kind::ClimatePerEnergy), "kg/kWh");
/// ```
#[must_use]
pub const fn preferred_unit(kind: Kind) -> &'static str {
    match units_of(kind) {
        [first, ..] => first,
        [] => "",
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn no_spelling_is_taken_twice_in_a_kind() {
        for (index, row) in UNITS.iter().enumerate() {
            let spellings = || std::iter::once(row.symbol).chain(row.aliases.iter().copied());
            for other in UNITS.iter().skip(index + 1).filter(|other| other.kind == row.kind) {
                for spelling in spellings() {
                    assert!(other.symbol != spelling && !other.aliases.contains(&spelling), "{spelling}");
                }
            }
            assert_eq!(
                row.share_by != ShareBy::Unstated,
                row.symbol.contains("/v") || row.symbol.contains("/w")
            );
        }
    }

    #[test]
    fn the_preferred_units_are_read() {
        for kind in Kind::ALL {
            for &symbol in units_of(kind) {
                let unit = super::super::unit(symbol, kind).unwrap();
                assert_eq!(unit.symbol(), symbol);
                assert_eq!(unit.kind(), kind);
            }
        }
    }
}
