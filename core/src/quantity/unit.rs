//! From the text of a unit to its factor: rows of the table, and quotients of two of them.

use super::decimal::Decimal;
use super::refuse::{CO2_ALONE, refused};
use super::scan::{is_minus, is_space};
use super::units::{UNITS, UnitRow};
use super::{AmountError, Currency, Kind, ShareBy};
use crate::letter::small_text;

/// A unit that was understood: a row of the table, or a quotient of two.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Unit {
    kind: Kind,
    above: Above,
    below: Option<&'static UnitRow>,
}

/// What stands above the line.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
enum Above {
    One,
    Row(&'static UnitRow),
    Money(Option<Currency>),
}

/// An exact factor: number × 10^power / over.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
struct Ratio {
    number: u128,
    power: i32,
    over: u128,
}

impl Unit {
    /// What it measures.
    #[must_use]
    pub const fn kind(&self) -> Kind {
        self.kind
    }

    /// Its symbol, `mL` or `kg/kWh`; empty for a plain number.
    #[must_use]
    pub fn symbol(&self) -> String {
        let above = match self.above {
            Above::One | Above::Money(None) => "",
            Above::Row(row) => row.symbol,
            Above::Money(Some(ref currency)) => currency.code(),
        };
        match self.below {
            Some(row) => format!("{above}/{}", row.symbol),
            None => above.to_owned(),
        }
    }

    /// The currency, for money.
    #[must_use]
    pub const fn currency(&self) -> Option<Currency> {
        match self.above {
            Above::Money(currency) => currency,
            Above::One | Above::Row(_) => None,
        }
    }

    /// For a fraction: whether the unit says that it is by volume or by mass.
    #[must_use]
    pub const fn share_by(&self) -> ShareBy {
        match (self.kind, self.above, self.below) {
            (Kind::Fraction, Above::Row(row), None) => row.share_by,
            (Kind::Fraction, Above::Row(UnitRow { kind: Kind::Mass, .. }), Some(_)) => ShareBy::Mass,
            (Kind::Fraction, Above::Row(UnitRow { kind: Kind::Volume, .. }), Some(_)) => ShareBy::Volume,
            _ => ShareBy::Unstated,
        }
    }

    /// The value in SI of so many of this unit.
    ///
    /// ```
    /// use thimbleworth::quantity::{Kind, unit};
    /// assert_eq!(unit("°F", Kind::Temperature)?.to_si(68.0), 293.15);
    /// # Ok::<(), thimbleworth::quantity::AmountError>(())
    /// ```
    #[must_use]
    pub fn to_si(&self, value: f64) -> f64 {
        Decimal::of(value).map_or(value, |value| self.exact_to_si(value))
    }

    /// How many of this unit a value in SI is.
    ///
    /// ```
    /// use thimbleworth::quantity::{Kind, unit};
    /// assert_eq!(unit("mL", Kind::Volume)?.from_si(0.00025), 250.0);
    /// # Ok::<(), thimbleworth::quantity::AmountError>(())
    /// ```
    #[must_use]
    pub fn from_si(&self, value_si: f64) -> f64 {
        let ratio = self.ratio();
        let zero = self.zero().to_f64();
        // x = y · over / (number · 10^power) − zero
        let scaled = Decimal::of(value_si).map(|value| {
            let over = Decimal::new(i128::try_from(ratio.over).unwrap_or(i128::MAX), -ratio.power);
            value.times(over)
        });
        match (scaled, self.zero().is_zero()) {
            (Some(scaled), true) => scaled.over(ratio.number),
            (Some(scaled), false) if ratio.number == 1 => scaled.minus(self.zero()).to_f64(),
            (Some(scaled), false) => scaled.over(ratio.number) - zero,
            (None, _) => value_si,
        }
    }

    /// The value in SI, rounded once where the exact arithmetic reaches.
    pub(super) fn exact_to_si(&self, value: Decimal) -> f64 {
        self.scale(value.plus(self.zero()))
    }

    /// A difference in SI: as `exact_to_si`, without the shift of a temperature scale.
    pub(super) fn scale(&self, difference: Decimal) -> f64 {
        let ratio = self.ratio();
        let number = Decimal::new(i128::try_from(ratio.number).unwrap_or(i128::MAX), ratio.power);
        difference.times(number).over(ratio.over)
    }

    /// Whether differences in the two are the same number.
    pub(super) fn same_scale(&self, other: &Self) -> bool {
        self.ratio() == other.ratio()
    }

    /// Whether amounts in the two are the same number.
    pub(super) fn same_measure(&self, other: &Self) -> bool {
        self.same_scale(other) && self.zero() == other.zero()
    }

    fn zero(&self) -> Decimal {
        match (self.above, self.below) {
            (Above::Row(row), None) => row.zero,
            _ => Decimal::new(0, 0),
        }
    }

    fn ratio(&self) -> Ratio {
        let (number, power, over) = match self.above {
            Above::Row(row) => (row.factor.number, row.factor.power, row.factor.over),
            Above::One | Above::Money(_) => (1, 0, 1),
        };
        let Some(below) = self.below else {
            return Ratio { number: u128::from(number), power, over: u128::from(over) };
        };
        let below = (below.factor.number, below.factor.power, below.factor.over);
        let mut number = u128::from(number) * u128::from(below.2);
        let mut over = u128::from(over) * u128::from(below.0);
        let mut power = power - below.1;
        let common = greatest_common_divisor(number, over);
        number /= common;
        over /= common;
        while over.is_multiple_of(10) {
            over /= 10;
            power -= 1;
        }
        while number.is_multiple_of(10) {
            number /= 10;
            power += 1;
        }
        Ratio { number, power, over }
    }
}

const fn greatest_common_divisor(mut a: u128, mut b: u128) -> u128 {
    while b != 0 {
        (a, b) = (b, a % b);
    }
    if a == 0 { 1 } else { a }
}

/// The unit of that spelling for an amount of that kind.
///
/// # Errors
/// [`AmountError::UnknownUnit`] with the nearest spelling, [`AmountError::RefusedUnit`] with a question,
/// [`AmountError::OtherKind`] when the unit measures something else.
///
/// ```
/// use thimbleworth::quantity::{Kind, unit};
/// assert_eq!(unit("kg CO2e / kWh", Kind::ClimatePerEnergy)?.symbol(), "kg/kWh");
/// assert!(unit("ML", Kind::Volume).is_err());
/// # Ok::<(), thimbleworth::quantity::AmountError>(())
/// ```
pub fn unit(spelling: &str, kind: Kind) -> Result<Unit, AmountError> {
    unit_at(spelling, kind, 0)
}

/// As [`unit`], without looking for what is wrong with a spelling: for long lists.
pub(crate) fn known_unit(spelling: &str, kind: Kind) -> Option<Unit> {
    resolve(spelling, kind).or_else(|| resolve(&normal(spelling), kind))
}

pub(super) fn unit_at(spelling: &str, kind: Kind, at: usize) -> Result<Unit, AmountError> {
    // Most are written as they stand in the table.
    if let Some(unit) = resolve(spelling, kind) {
        return Ok(unit);
    }
    let text = normal(spelling);
    if let Some(unit) = resolve(&text, kind) {
        return Ok(unit);
    }
    let found = spelling.trim().to_owned();
    if let Some(reply) = refusal(&text, kind) {
        return Err(AmountError::RefusedUnit { found, at, reply });
    }
    if let Some(suggestion) = suggestion(&text, kind) {
        return Err(AmountError::UnknownUnit { found, at, kind, suggestion: Some(suggestion) });
    }
    for is in Kind::ALL {
        if !text.is_empty() && resolve(&text, is).is_some() {
            return Err(AmountError::OtherKind { found, at, is, kind });
        }
    }
    // A gauge pressure or a bare gallon is refused for its own reason where another kind is needed, too.
    for is in Kind::ALL {
        if let Some(reply) = refusal(&text, is) {
            return Err(AmountError::RefusedUnit { found, at, reply });
        }
    }
    Err(AmountError::UnknownUnit { found, at, kind, suggestion: None })
}

/// What a derived kind is the quotient of; `None` above stands for 1 or for money.
const fn quotients(kind: Kind) -> &'static [(Option<Kind>, Kind)] {
    match kind {
        Kind::Density => &[(Some(Kind::Mass), Kind::Volume)],
        Kind::VolumeFlow => &[(Some(Kind::Volume), Kind::Time)],
        Kind::MassFlow => &[(Some(Kind::Mass), Kind::Time)],
        Kind::Frequency => &[(None, Kind::Time)],
        Kind::VolumePerMass => &[(Some(Kind::Volume), Kind::Mass)],
        Kind::MassPerMass => &[(Some(Kind::Mass), Kind::Mass)],
        Kind::SpecificEnergy => &[(Some(Kind::Energy), Kind::Mass)],
        Kind::ClimatePerEnergy => &[(Some(Kind::Mass), Kind::Energy)],
        Kind::Fraction => &[(Some(Kind::Mass), Kind::Mass), (Some(Kind::Volume), Kind::Volume)],
        Kind::PricePerMass => &[(None, Kind::Mass)],
        Kind::PricePerVolume => &[(None, Kind::Volume)],
        Kind::PricePerEnergy => &[(None, Kind::Energy)],
        _ => &[],
    }
}

/// The row of that spelling; symbols with raised digits have the plain ones among their aliases.
fn find(text: &str, kind: Kind) -> Option<&'static UnitRow> {
    UNITS.iter().find(|row| row.kind == kind && (row.symbol == text || row.aliases.contains(&text)))
}

/// The unit of a text that was brought to its normal form.
fn resolve(text: &str, kind: Kind) -> Option<Unit> {
    if let Some(row) = find(text, kind) {
        return Some(Unit { kind, above: Above::Row(row), below: None });
    }
    if kind == Kind::Money {
        return Currency::named(text).map(|c| Unit { kind, above: Above::Money(Some(c)), below: None });
    }
    if kind == Kind::Frequency && text == "Hz" {
        return find("s", Kind::Time).map(|row| Unit { kind, above: Above::One, below: Some(row) });
    }
    let (above, below) = text.split_once('/')?;
    quotients(kind).iter().find_map(|&(above_kind, below_kind)| {
        let below = Some(find(below, below_kind)?);
        let above = match above_kind {
            Some(of) => Above::Row(find(without_co2e(above, kind), of)?),
            None if kind.is_money() && above.is_empty() => Above::Money(None),
            None if kind.is_money() => Above::Money(Some(Currency::named(above)?)),
            None if above.is_empty() || above == "1" => Above::One,
            None => return None,
        };
        Some(Unit { kind, above, below })
    })
}

/// The mass of a climate factor without the words for CO2-equivalent.
fn without_co2e(text: &str, kind: Kind) -> &str {
    if kind != Kind::ClimatePerEnergy {
        return text;
    }
    let words = [
        "CO2e",
        "CO2-e",
        "CO2eq",
        "CO2-eq",
        "CO2 eq",
        "CO2-eq.",
        "CO2 eq.",
        "CO2-equivalent",
        "CO2 equivalent",
    ];
    words.iter().find_map(|word| text.strip_suffix(word)).map_or(text, str::trim_end)
}

/// The reply to a spelling, or to a part of a quotient, that is refused.
fn refusal(text: &str, kind: Kind) -> Option<&'static str> {
    if let Some(reply) = refused(text, kind) {
        return Some(reply);
    }
    let (above, below) = text.split_once('/')?;
    if kind == Kind::ClimatePerEnergy && (above.ends_with("CO2") || above.ends_with("CO2 ")) {
        return Some(CO2_ALONE);
    }
    quotients(kind).iter().find_map(|&(above_kind, below_kind)| {
        let of = if kind.is_money() { Some(Kind::Money) } else { above_kind };
        of.and_then(|of| refused(above, of)).or_else(|| refused(below, below_kind))
    })
}

/// A spelling that differs in capital and small letters only, where there is one.
fn suggestion(text: &str, kind: Kind) -> Option<String> {
    if let Some(symbol) = alike(text, kind) {
        return Some(symbol);
    }
    let (above, below) = text.split_once('/')?;
    quotients(kind).iter().find_map(|&(above_kind, below_kind)| {
        let below = alike(below, below_kind)?;
        let above = match above_kind {
            Some(of) => alike(without_co2e(above, kind), of)?,
            None if kind.is_money() => alike(above, Kind::Money)?,
            None if above.is_empty() || above == "1" => String::new(),
            None => return None,
        };
        Some(format!("{above}/{below}"))
    })
}

fn alike(text: &str, kind: Kind) -> Option<String> {
    if text.is_empty() {
        return None;
    }
    let small = small_text(text);
    if kind == Kind::Money && small.len() == 3 && small.chars().all(|c| c.is_ascii_lowercase()) {
        return Some(text.to_ascii_uppercase());
    }
    let same = |row: &&UnitRow| {
        let mut spellings = std::iter::once(row.symbol).chain(row.aliases.iter().copied());
        row.kind == kind && spellings.any(|spelling| small_text(&normal(spelling)) == small)
    };
    UNITS.iter().find(same).map(|row| row.symbol.to_owned())
}

/// One form for the many ways in which word processors and people write the same unit.
fn normal(text: &str) -> String {
    let mut plain = String::new();
    for c in text.chars() {
        match c {
            '\u{3bc}' => plain.push('µ'),
            '⁰' | '₀' => plain.push('0'),
            '¹' | '₁' => plain.push('1'),
            '²' | '₂' => plain.push('2'),
            '³' | '₃' => plain.push('3'),
            '⁻' => plain.push('-'),
            c if is_minus(c) => plain.push('-'),
            'º' | '˚' => plain.push('°'),
            '℃' => plain.push_str("°C"),
            '℉' => plain.push_str("°F"),
            'ℓ' => plain.push('L'),
            '∕' | '⁄' | '÷' => plain.push('/'),
            '⋅' | '∙' | '•' => plain.push('·'),
            '％' => plain.push('%'),
            '^' => {}
            c if is_space(c) => plain.push(' '),
            c => plain.push(c),
        }
    }
    let mut text = plain.split(' ').filter(|word| !word.is_empty()).collect::<Vec<_>>().join(" ");
    text = text.replace(" per ", "/");
    if let Some(rest) = text.strip_prefix("per ").filter(|rest| *rest != "cent" && *rest != "mille") {
        text = format!("/{rest}");
    }
    for (wide, narrow) in [(" /", "/"), ("/ ", "/"), (" ·", "·"), ("· ", "·")] {
        text = text.replace(wide, narrow);
    }
    // g·mL-1 and g mL-1 are g/mL; kg m-3 is kg/m3; h-1 is /h.
    for (inverse, power) in [("-1", ""), ("-2", "2"), ("-3", "3")] {
        let Some(rest) = text.strip_suffix(inverse).filter(|rest| !rest.contains('/')) else { continue };
        text = match rest.rfind(['·', ' ']).map(|cut| rest.split_at(cut)) {
            Some((above, below)) => format!("{above}/{}{power}", below.trim_start_matches(['·', ' '])),
            None => format!("/{rest}{power}"),
        };
        break;
    }
    text
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn spellings_meet() {
        for (spelling, kind, symbol) in [
            ("\u{3bc}L", Kind::Volume, "µL"),
            ("\u{b5}L", Kind::Volume, "µL"),
            ("uL", Kind::Volume, "µL"),
            ("cm³", Kind::Volume, "mL"),
            ("cm^3", Kind::Volume, "mL"),
            ("US  gal", Kind::Volume, "US gal"),
            ("g·mL⁻¹", Kind::Density, "g/mL"),
            ("g mL-1", Kind::Density, "g/mL"),
            ("g / cm3", Kind::Density, "g/mL"),
            ("mL per min", Kind::VolumeFlow, "mL/min"),
            ("h⁻¹", Kind::Frequency, "/h"),
            ("h-1", Kind::Frequency, "/h"),
            ("1/h", Kind::Frequency, "/h"),
            ("per hour", Kind::Frequency, "/h"),
            ("Hz", Kind::Frequency, "/s"),
            ("℃", Kind::Temperature, "°C"),
            ("ºC", Kind::Temperature, "°C"),
            ("per cent", Kind::Fraction, "%"),
            ("% (w/w)", Kind::Fraction, "% w/w"),
            ("mL/L", Kind::Fraction, "mL/L"),
            ("kg CO₂e/kWh", Kind::ClimatePerEnergy, "kg/kWh"),
            ("gCO2-eq/kWh", Kind::ClimatePerEnergy, "g/kWh"),
            ("€/kg", Kind::PricePerMass, "EUR/kg"),
            ("£", Kind::Money, "GBP"),
            ("USD per US gal", Kind::PricePerVolume, "USD/US gal"),
        ] {
            assert_eq!(unit(spelling, kind).map(|unit| unit.symbol()), Ok(symbol.to_owned()), "{spelling}");
        }
    }

    #[test]
    fn a_value_returns_from_its_unit() {
        for kind in Kind::ALL {
            for &symbol in super::super::units_of(kind) {
                let unit = unit(symbol, kind).unwrap();
                for value in [0.0, 1.0, 0.37, 250.0, 1234.5] {
                    let back = unit.from_si(unit.to_si(value));
                    assert!((back - value).abs() <= 1e-12 * (500.0 + value), "{value} {symbol} {back}");
                }
            }
        }
    }
}
