//! From text to an amount: the units get their meaning, the spread its size, and the bounds are checked.

use super::bounds::check_which;
use super::decimal::Decimal;
use super::error::Which;
use super::grammar::{Between, Parsed, Quantity};
use super::scan::{Scan, is_space};
use super::unit::unit_at;
use super::{Amount, AmountError, Entry, Kind, ShareBy, Spread, Unit};

/// The longest text that is looked at, in characters.
pub const LONGEST: usize = 120;

/// Reads an amount of the given kind.
///
/// # Errors
/// [`AmountError`] when the text is not an amount of that kind, can be read in two ways, or lies outside the bounds of
/// [`super::bound`].
///
/// ```
/// use thimbleworth::quantity::{Kind, ShareBy, read};
/// assert_eq!(read("250 cm³", Kind::Volume)?.central_si, 0.00025);
/// assert_eq!(read("50 % w/w", Kind::Fraction)?.share_by, ShareBy::Mass);
/// assert_eq!(
///     read("12 barg", Kind::Pressure).unwrap_err().found(),
///     "the unit “barg” is not accepted"
/// );
/// # Ok::<(), thimbleworth::quantity::AmountError>(())
/// ```
pub fn read(text: &str, kind: Kind) -> Result<Amount, AmountError> {
    let length = text.chars().take(LONGEST + 1).count();
    if length > LONGEST {
        return Err(AmountError::TooLong { length: text.chars().count() });
    }
    let trimmed = text.trim_matches(is_space);
    if trimmed.is_empty() {
        return Err(AmountError::Empty { kind });
    }
    if is_not_known(trimmed) {
        return Err(AmountError::NotKnown { kind });
    }
    if NOT_KNOWN_WORDS.iter().any(|word| trimmed.eq_ignore_ascii_case(word)) {
        return Err(AmountError::NotKnownWord { found: trimmed.to_owned() });
    }
    let mut scan = Scan::new(text);
    scan.skip_spaces();
    refuse_vague(&scan)?;
    let parsed = Parsed::parse(&mut scan, kind)?;
    parsed.amount(trimmed, kind)
}

/// Reads an amount of the given kind, or “not known”.
///
/// # Errors
/// As [`read`].
///
/// ```
/// use thimbleworth::quantity::{Entry, Kind, read_entry};
/// assert_eq!(read_entry("not known", Kind::PricePerMass), Ok(Entry::NotKnown));
/// ```
pub fn read_entry(text: &str, kind: Kind) -> Result<Entry, AmountError> {
    if is_not_known(text.trim_matches(is_space)) {
        Ok(Entry::NotKnown)
    } else {
        read(text, kind).map(Entry::Known)
    }
}

fn is_not_known(text: &str) -> bool {
    text.eq_ignore_ascii_case("not known")
}

const NOT_KNOWN_WORDS: [&str; 8] = ["unknown", "n/a", "n.a.", "na", "n.k.", "?", "none", "tbd"];

/// Signs and words of a limit on one side, and of a doubt without a size.
fn refuse_vague(scan: &Scan) -> Result<(), AmountError> {
    let found = || scan.rest();
    let at = scan.at;
    if ["<", ">", "≤", "≥", "at most ", "at least ", "up to ", "below ", "above "]
        .iter()
        .any(|s| scan.sees(s))
    {
        return Err(AmountError::OneSided { found: found(), at });
    }
    if ["~", "≈", "∼", "ca ", "ca.", "c. ", "about ", "approx", "around "].iter().any(|s| scan.sees(s)) {
        return Err(AmountError::Approximate { found: found(), at });
    }
    Ok(())
}

impl Parsed {
    /// Gives the numbers their units and checks everything.
    fn amount(mut self, text: &str, kind: Kind) -> Result<Amount, AmountError> {
        self.share_units()?;
        if let Some((_, found, at)) = self.coverage.as_ref().filter(|_| !self.has(Between::PlusMinus)) {
            return Err(AmountError::BadCoverage { found: found.clone(), at: *at });
        }
        let relative = self.is_relative(kind);
        let first = &self.first;
        let spelling = match &self.second {
            Some((_, second)) if first.unit.is_empty() && !relative => (second.unit.as_str(), second.unit_at),
            _ => (first.unit.as_str(), first.unit_at),
        };
        let number = first.decimal(spelling.0)?;
        let unit = unit_of(first, spelling, kind)?;
        if kind == Kind::Count {
            if let Some((_, second)) = &self.second {
                return Err(AmountError::UncertainCount { at: second.at });
            }
            if !is_whole(number) {
                return Err(AmountError::NotWhole { found: first.found.clone() });
            }
        }
        let mut amount = Amount {
            text: text.to_owned(),
            kind,
            central_si: unit.exact_to_si(number),
            spread: Spread::Exact,
            share_by: unit.share_by(),
            currency: unit.currency(),
        };
        match &self.second {
            None => {}
            Some((Between::To, second)) => between_limits(&mut amount, (first, number, unit), second)?,
            Some((_, second)) if relative => {
                if kind == Kind::Temperature {
                    return Err(AmountError::RelativeTemperature {
                        found: second.with_unit(),
                        at: second.at,
                    });
                }
                let share = second.spread(&second.unit)?;
                let size = if number.is_negative() { number.negated() } else { number };
                // half width = |x| · p/100
                let half = size.times(share).times(Decimal::new(1, -2));
                self.around(&mut amount, number, unit, (half, unit));
            }
            Some((_, second)) => {
                let half = second.spread(if second.unit.is_empty() { spelling.0 } else { &second.unit })?;
                let half_unit = self.spread_unit(second, spelling, unit, kind)?;
                agree(&mut amount, half_unit, first, second)?;
                self.around(&mut amount, number, unit, (half, half_unit));
            }
        }
        if kind == Kind::Fraction
            && spelling.0.is_empty()
            && (1.0..=100.0).contains(&amount.central_si)
            && amount.central_si != 1.0
        {
            return Err(AmountError::PercentMissing { found: first.found.clone() });
        }
        check_which(kind, amount.central_si, Which::Value)?;
        if let Spread::Limits { low_si, high_si } = amount.spread {
            check_which(kind, low_si, Which::LowerLimit)?;
            check_which(kind, high_si, Which::UpperLimit)?;
        }
        Ok(amount)
    }

    fn has(&self, between: Between) -> bool {
        self.second.as_ref().is_some_and(|second| second.0 == between)
    }

    /// Joins currencies to their units; a unit `/L` after the second number belongs to the first currency, too.
    fn share_units(&mut self) -> Result<(), AmountError> {
        if let Some((_, second)) = &mut self.second {
            let code = self.first.currency.clone();
            let alone = self.first.unit.is_empty() && second.currency.is_none();
            if alone && code.is_some() && (second.unit.is_empty() || second.unit.starts_with('/')) {
                second.currency = code;
            }
            if self.first.currency.is_some() && self.first.unit.is_empty() && second.unit.starts_with('/') {
                self.first.unit.clone_from(&second.unit);
            }
            second.join_currency()?;
        }
        self.first.join_currency()
    }

    /// Whether the spread is in per cent of the amount. For a fraction it is in the fraction's own unit.
    fn is_relative(&self, kind: Kind) -> bool {
        let Some((between, second)) = &self.second else { return false };
        let percent = matches!(second.unit.as_str(), "%" | "percent" | "per cent");
        *between != Between::To
            && percent
            && kind != Kind::Fraction
            && !(kind == Kind::MassPerMass && self.first.unit.starts_with('%'))
    }

    /// The unit of an absolute spread.
    fn spread_unit(
        &self,
        second: &Quantity,
        spelling: (&str, usize),
        unit: Unit,
        kind: Kind,
    ) -> Result<Unit, AmountError> {
        if second.unit.is_empty() {
            if self.first.unit.is_empty() {
                return Ok(unit);
            }
            return Err(AmountError::SpreadWithoutUnit {
                found: second.found.clone(),
                at: second.unit_at,
                unit: spelling.0.to_owned(),
            });
        }
        let one_sign = self.first.unit.is_empty() && kind == Kind::Fraction && second.unit.starts_with('%');
        if one_sign && self.first.is_share() {
            return Err(AmountError::WhoseSign {
                found: self.first.found.clone(),
                spread: second.with_unit(),
                hundredfold: super::significant(self.first.decimal("")?.to_f64() * 100.0, 15),
                at: self.first.at,
            });
        }
        let kind = if kind == Kind::Temperature { Kind::TemperatureDifference } else { kind };
        unit_at(&second.unit, kind, second.unit_at)
    }

    /// Sets limits or a standard uncertainty around the central value.
    fn around(&self, amount: &mut Amount, number: Decimal, unit: Unit, half: (Decimal, Unit)) {
        let (half, half_unit) = half;
        if half.is_zero() {
            return;
        }
        let half_si = half_unit.scale(half);
        if let Some((k, _, _)) = self.coverage {
            // u = U/k
            amount.spread = Spread::Standard { u_si: half_si / k.to_f64() };
        } else if self.has(Between::Standard) {
            amount.spread = Spread::Standard { u_si: half_si };
        } else if unit.same_scale(&half_unit) {
            let low_si = unit.exact_to_si(number.minus(half));
            let high_si = unit.exact_to_si(number.plus(half));
            amount.spread = Spread::Limits { low_si, high_si };
        } else {
            let (low_si, high_si) = (amount.central_si - half_si, amount.central_si + half_si);
            amount.spread = Spread::Limits { low_si, high_si };
        }
    }
}

/// The unit of the first number; where none is written and one is needed, that is the error.
fn unit_of(first: &Quantity, spelling: (&str, usize), kind: Kind) -> Result<Unit, AmountError> {
    if spelling.0.is_empty() && !kind.is_plain() {
        return Err(AmountError::NoUnit { found: first.found.clone(), at: spelling.1, kind });
    }
    unit_at(spelling.0, kind, spelling.1)
}

/// Reads `a to b`.
fn between_limits(
    amount: &mut Amount,
    first: (&Quantity, Decimal, Unit),
    second: &Quantity,
) -> Result<(), AmountError> {
    let (low, low_number, unit) = first;
    let kind = amount.kind;
    let high_number = second.decimal(if second.unit.is_empty() { &low.unit } else { &second.unit })?;
    let high_unit = unit_of(second, (&second.unit, second.unit_at), kind)?;
    agree(amount, high_unit, low, second)?;
    let (low_si, high_si) = (unit.exact_to_si(low_number), high_unit.exact_to_si(high_number));
    if low_si > high_si {
        let meant = if low.unit.is_empty() {
            format!("{} to {} {}", second.found, low.found, second.unit)
        } else {
            format!("{} to {}", second.with_unit(), low.with_unit())
        };
        let (low, high) = (low.with_unit(), second.with_unit());
        return Err(AmountError::ReversedLimits { low, high, meant, at: second.at });
    }
    // The limits are told apart from the midpoint before anything is computed from them.
    check_which(kind, low_si, Which::LowerLimit)?;
    check_which(kind, high_si, Which::UpperLimit)?;
    // x = (a + b)/2
    amount.central_si = if unit.same_measure(&high_unit) {
        unit.exact_to_si(low_number.plus(high_number).times(Decimal::new(5, -1)))
    } else {
        low_si + (high_si - low_si) / 2.0
    };
    if low_si < high_si {
        amount.spread = Spread::Limits { low_si, high_si };
    }
    Ok(())
}

/// Holds the currency and the base of a fraction to one for both numbers.
fn agree(amount: &mut Amount, other: Unit, first: &Quantity, second: &Quantity) -> Result<(), AmountError> {
    let bases = (amount.share_by, other.share_by());
    let base_differs = bases.0 != bases.1 && bases.0 != ShareBy::Unstated && bases.1 != ShareBy::Unstated;
    if amount.currency != other.currency() || base_differs {
        return Err(AmountError::Disagree {
            first: first.with_unit(),
            second: second.with_unit(),
            at: second.at,
        });
    }
    if amount.share_by == ShareBy::Unstated {
        amount.share_by = bases.1;
    }
    Ok(())
}

fn is_whole(number: Decimal) -> bool {
    let value = number.to_f64();
    value.is_finite() && libm::floor(value) == value
}

#[cfg(test)]
mod tests {
    use super::*;

    /// A deterministic stream of numbers.
    struct Dice(u64);

    impl Dice {
        fn roll(&mut self, faces: usize) -> usize {
            self.0 = self.0.wrapping_mul(6_364_136_223_846_793_005).wrapping_add(1_442_695_040_888_963_407);
            usize::try_from(self.0 >> 33).unwrap() % faces
        }
    }

    const PIECES: [&str; 64] = [
        "250",
        "1,234",
        "1.5",
        "0",
        "-",
        "−",
        "+",
        "±",
        "+/-",
        " ",
        "  ",
        "\u{a0}",
        "mL",
        "m",
        "L",
        "/",
        "kg",
        "kWh",
        "%",
        "‰",
        " u ",
        "u",
        " to ",
        "–",
        "(k=2)",
        "k=",
        "(",
        ")",
        "e",
        "e9",
        "e99999999999999",
        "×10^",
        "×10³",
        "10",
        "^",
        "³",
        "°",
        "C",
        "°F",
        "USD",
        "€",
        "$",
        "per",
        " per ",
        "-1",
        "not known",
        ".",
        ",",
        "'",
        "1",
        "/h",
        "µ",
        "μ",
        "9999999999999999999999999999999999999999",
        "0.0000000000000000000000000000001",
        "v/v",
        "w/w",
        "CO2e",
        "\u{0}",
        "😀",
        "e\u{301}",
        "K",
        "g",
        "~",
    ];

    #[test]
    fn no_text_makes_it_panic() {
        let mut dice = Dice(7);
        let mut read_at_all = 0_u32;
        for _ in 0..60_000 {
            let kind = Kind::ALL[dice.roll(Kind::ALL.len())];
            let mut text: String = (0..dice.roll(9)).map(|_| PIECES[dice.roll(PIECES.len())]).collect();
            if dice.roll(2) == 0 {
                // Every other text starts as an amount.
                text = format!("{}{text}", kind.examples()[dice.roll(2)]);
            }
            match read(&text, kind) {
                Ok(amount) => {
                    read_at_all += 1;
                    assert!(amount.central_si.is_finite() && !amount.understood().is_empty(), "{text}");
                    assert!(super::super::check(kind, amount.central_si).is_ok(), "{text}");
                }
                Err(error) => {
                    assert!(!error.found().is_empty() && !error.need().is_empty(), "{text}");
                    assert!(error.at().is_none_or(|at| at <= text.chars().count()), "{text}: {error}");
                }
            }
        }
        assert!(read_at_all > 500, "the pieces hardly ever make an amount: {read_at_all}");
    }

    #[test]
    fn no_characters_make_it_panic() {
        let mut dice = Dice(11);
        for _ in 0..20_000 {
            let text: String = (0..dice.roll(24))
                .filter_map(|_| char::from_u32(u32::try_from(dice.roll(0x2_0000)).unwrap()))
                .collect();
            let _ = read(&text, Kind::ALL[dice.roll(Kind::ALL.len())]);
            let _ = read(&format!("250{text}"), Kind::ALL[dice.roll(Kind::ALL.len())]);
        }
        assert!(matches!(
            read(&"9".repeat(1_000_000), Kind::Mass),
            Err(AmountError::TooLong { length: 1_000_000 })
        ));
    }

    #[test]
    fn the_reading_of_what_was_shown_is_the_same() {
        let mut dice = Dice(13);
        for kind in Kind::ALL.into_iter().filter(|kind| !kind.is_money()) {
            for &symbol in super::super::units_of(kind) {
                let text = format!("{} {symbol}", 1 + dice.roll(99));
                let Ok(amount) = read(&text, kind) else { continue };
                let back = read(&super::super::show(amount.central_si, kind), kind).unwrap();
                let error = (back.central_si - amount.central_si).abs();
                // Four digits; of a temperature, four digits in °C.
                let allowed = if kind == Kind::Temperature { 0.06 } else { 1e-3 * amount.central_si.abs() };
                assert!(error <= allowed, "{text}");
            }
        }
    }
}
