//! Amounts in the cells of a table: a number, with its unit in the cell, in a column of its own or in the heading.

use super::{Change, Why};
use crate::letter::is_letter;
use crate::quantity::{AmountError, Kind, Spread, known_unit, read};

/// Which sign is the decimal one.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub enum Decimals {
    /// Not known: `1,234` is refused with a question.
    #[default]
    Ask,
    /// `1,234.5`
    Point,
    /// `1.234,5`
    Comma,
}

impl Decimals {
    /// The words in a plan, in the order of the variants.
    pub const WORDS: [&'static str; 3] = ["ask", "point", "comma"];

    /// The sign of this word.
    #[must_use]
    pub fn named(word: &str) -> Option<Self> {
        [Self::Ask, Self::Point, Self::Comma].into_iter().find(|decimals| decimals.word() == word)
    }

    /// Its word.
    #[must_use]
    pub const fn word(self) -> &'static str {
        Self::WORDS[self as usize]
    }
}

/// A unit of mass or volume with its factor to SI.
#[derive(Clone, Debug, PartialEq)]
pub struct LogUnit {
    /// As it was written.
    pub written: String,
    /// Mass or volume.
    pub kind: Kind,
    /// kg or m³ in one of it.
    pub factor: f64,
}

/// No unit is longer.
const LONGEST_UNIT: usize = 24;

impl LogUnit {
    /// The unit of mass or volume of this spelling.
    ///
    /// ```
    /// use thimbleworth::log::LogUnit;
    /// assert_eq!(LogUnit::named("mL").unwrap().factor, 1e-6);
    /// assert!(LogUnit::named("h").is_none() && LogUnit::named("gal").is_none());
    /// ```
    #[must_use]
    pub fn named(spelling: &str) -> Option<Self> {
        // `Kg` and `ML` are typed in purchase ledgers; the latter is refused by the units, as it could be megalitres.
        if spelling.len() > LONGEST_UNIT {
            return None;
        }
        let spelling = match spelling.trim() {
            "Kg" | "KG" | "kgs" => "kg",
            "G" => "g",
            "ltr" | "Ltr" | "lt" | "LTR" => "L",
            other => other,
        };
        [Kind::Mass, Kind::Volume].into_iter().find_map(|kind| {
            let found = known_unit(spelling, kind)?;
            Some(Self { written: spelling.to_owned(), kind, factor: found.to_si(1.0) })
        })
    }
}

/// The units that cells name, kept from row to row because a file names few.
#[derive(Clone, Debug, Default)]
pub(super) struct UnitCell(Vec<(Vec<u8>, Option<LogUnit>)>);

/// Spellings that are kept: more are no units of one file.
const MOST_UNITS: usize = 16;

impl UnitCell {
    pub(super) fn of(&mut self, spelling: &[u8]) -> Option<&LogUnit> {
        let at = self.0.iter().position(|(known, _)| known == spelling).unwrap_or_else(|| {
            if self.0.len() >= MOST_UNITS {
                self.0.clear();
            }
            self.0.push((spelling.to_vec(), LogUnit::named(&super::text::decoded(spelling).0)));
            self.0.len() - 1
        });
        self.0.get(at)?.1.as_ref()
    }
}

/// A value with its kind, SI, and what had to be changed to read it.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) struct Value {
    pub(super) si: f64,
    pub(super) kind: Kind,
    pub(super) change: Option<Change>,
}

/// The powers of ten that divide a number of up to 15 digits into one rounded quotient.
const TENS: [f64; 16] =
    [1e0, 1e1, 1e2, 1e3, 1e4, 1e5, 1e6, 1e7, 1e8, 1e9, 1e10, 1e11, 1e12, 1e13, 1e14, 1e15];

/// A plain number at the start of a cell, and what follows it. `None` for all that needs a closer look.
fn plain(cell: &[u8], decimals: Decimals) -> Option<(f64, &[u8])> {
    let (negative, digits) = match cell {
        [b'-', rest @ ..] => (true, rest),
        [b'+', rest @ ..] => (false, rest),
        all => (false, all),
    };
    let (mut mantissa, mut count, mut part, mut at) = (0_u64, 0, None, 0);
    while let Some(&b) = digits.get(at) {
        match b {
            b'0'..=b'9' => {
                mantissa = mantissa * 10 + u64::from(b - b'0');
                count += 1;
                if count > 15 {
                    return None;
                }
            }
            b'.' if part.is_none() && decimals != Decimals::Comma => part = Some(count),
            b',' if part.is_none() && decimals == Decimals::Comma => part = Some(count),
            b'.' | b',' => return None,
            _ => break,
        }
        at += 1;
    }
    let places: usize = count - part.unwrap_or(count);
    let rest = digits.get(at..)?.trim_ascii_start();
    // A power of ten, a group of thousands or a spread follows.
    let more = rest.first().is_some_and(|b| !b.is_ascii_alphabetic() && *b < 0x80) || rest.starts_with(b"e");
    if count == 0 || (part.is_some() && places == 0) || more {
        return None;
    }
    // m / 10^n: both exact, rounded once
    let value = mantissa as f64 / TENS.get(places)?;
    Some((if negative { -value } else { value }, rest))
}

/// Reads an amount of mass or volume; `beside` is the unit that stands outside of the cell.
///
/// # Errors
/// [`Why`] the cell is not such an amount.
pub(super) fn amount(
    cell: &[u8],
    decimals: Decimals,
    units: &mut UnitCell,
    beside: Option<&LogUnit>,
) -> Result<Value, Why> {
    let (number, unit) = match plain(cell, decimals) {
        Some((number, [])) => (number, beside.ok_or(Why::NoUnit)?),
        Some((number, spelling)) => match units.of(spelling) {
            Some(unit) => (number, unit),
            // 4 x 2.5 L, 245 to 255 mL, 250 u 2 mL; all else is no unit, and saying so at once keeps long files quick.
            None if spelling.starts_with(b"x")
                || spelling.starts_with(b"X")
                || spelling.starts_with(b"to ")
                || spelling.starts_with(b"u ")
                || spelling.first().is_some_and(|b| *b >= 0x80) =>
            {
                return close_look(cell, decimals, beside);
            }
            None => return Err(Why::OtherUnit),
        },
        None => return close_look(cell, decimals, beside),
    };
    let si = number * unit.factor;
    if si.abs() > LARGEST_SI { Err(Why::TooLarge) } else { Ok(Value { si, kind: unit.kind, change: None }) }
}

/// kg or m³: more than this is a slip.
const LARGEST_SI: f64 = 1e8;

/// Reads a count, which may be negative where something is taken back.
pub(super) fn count(cell: &[u8], decimals: Decimals) -> Result<f64, Why> {
    match plain(cell, decimals) {
        Some((number, [])) if libm::floor(number) == number => Ok(number),
        Some((_, [])) => Err(Why::NotWhole),
        _ => {
            let text = super::text::decoded(cell).0;
            let (sign, text, _) = signed(&text);
            let text = without_thousands(text, decimals).0;
            match read(&text, Kind::Count) {
                Ok(amount) => Ok(sign * amount.central_si),
                Err(AmountError::NotWhole { .. }) => Err(Why::NotWhole),
                Err(AmountError::AmbiguousNumber { .. }) => Err(Why::CommaOrThousands),
                Err(_) => Err(Why::NotAnAmount),
            }
        }
    }
}

/// The sign of a number and the rest: `-5`, `−5`, `(5)`, `5-`.
fn signed(text: &str) -> (f64, &str, bool) {
    let text = text.trim();
    if let Some(inner) = text.strip_prefix('(').and_then(|t| t.strip_suffix(')')) {
        return (-1.0, inner.trim(), true);
    }
    for minus in ['-', '−', '–'] {
        if let Some(rest) = text.strip_prefix(minus) {
            return (-1.0, rest.trim_start(), false);
        }
        if let Some(rest) = text.strip_suffix(minus) {
            return (-1.0, rest.trim_end(), true);
        }
    }
    (1.0, text.strip_prefix('+').unwrap_or(text), false)
}

/// The text with a decimal point and no marks of thousands, as far as `decimals` says which is which.
fn without_thousands(text: &str, decimals: Decimals) -> (String, Option<Change>) {
    let end = text.find(|c: char| !(c.is_ascii_digit() || matches!(c, '.' | ','))).unwrap_or(text.len());
    let (number, rest) = text.split_at(end);
    let (mark, point) = match decimals {
        Decimals::Ask => return (text.to_owned(), None),
        Decimals::Point => (',', '.'),
        Decimals::Comma => ('.', ','),
    };
    let groups = |whole: &str| whole.split(mark).skip(1).all(|g| g.len() == 3);
    let whole = number.split(point).next().unwrap_or_default();
    if decimals == Decimals::Comma
        && number.matches('.').count() == 1
        && !number.contains(',')
        && !groups(whole)
    {
        // 12.5 has one reading only, whatever its neighbours look like.
        return (text.to_owned(), Some(Change::PointAmongCommas));
    }
    if !groups(whole) || number.matches(point).count() > 1 {
        return (text.to_owned(), None);
    }
    let changed = number.contains(mark).then_some(Change::Thousands);
    let mut out: String =
        number.chars().filter(|c| *c != mark).map(|c| if c == point { '.' } else { c }).collect();
    out.push_str(rest);
    (out, changed)
}

fn close_look(cell: &[u8], decimals: Decimals, beside: Option<&LogUnit>) -> Result<Value, Why> {
    let text = super::text::decoded(cell).0;
    if text.trim().is_empty() {
        return Err(Why::NoAmount);
    }
    // 4 x 2.5 L
    if let Some((pieces, each)) = text.split_once(['x', '×', 'X'])
        && let Ok(pieces) = count(pieces.trim().as_bytes(), decimals)
    {
        let mut units = UnitCell::default();
        let mut value = amount(each.trim().as_bytes(), decimals, &mut units, beside)?;
        value.si *= pieces;
        return Ok(value);
    }
    let (sign, number, bracketed) = signed(&text);
    let (number, change) = without_thousands(number, decimals);
    let bare = !number.contains(|c: char| is_letter(c) && c != 'e' && c != 'E');
    let number = match beside {
        Some(unit) if bare => {
            let mut with = number;
            with.push(' ');
            with.push_str(&unit.written);
            with
        }
        _ => number,
    };
    let mut last = Why::NotAnAmount;
    for kind in [Kind::Mass, Kind::Volume] {
        match read(&number, kind) {
            Ok(amount) => {
                let spread = (amount.spread != Spread::Exact).then_some(Change::SpreadLeft);
                let bracketed = bracketed.then_some(Change::Bracketed);
                let si = sign * amount.central_si;
                return if si.abs() > LARGEST_SI {
                    Err(Why::TooLarge)
                } else {
                    Ok(Value { si, kind, change: bracketed.or(spread).or(change) })
                };
            }
            Err(error) => {
                let why = match error {
                    AmountError::AmbiguousNumber { .. } => Why::CommaOrThousands,
                    AmountError::NoUnit { .. } => Why::NoUnit,
                    AmountError::OutOfBounds { .. } | AmountError::NumberOutOfRange { .. } => Why::TooLarge,
                    AmountError::UnknownUnit { .. }
                    | AmountError::RefusedUnit { .. }
                    | AmountError::OtherKind { .. } => Why::OtherUnit,
                    _ => Why::NotAnAmount,
                };
                // What is wrong with the number weighs more than that a mass is no volume.
                if matches!(last, Why::NotAnAmount | Why::OtherUnit) {
                    last = why;
                }
            }
        }
    }
    Err(last)
}

/// What a cell says of the decimal sign, where it is plain.
pub(super) fn decimals_of(text: &str) -> Option<Decimals> {
    let end = text.find(|c: char| !(c.is_ascii_digit() || matches!(c, '.' | ','))).unwrap_or(text.len());
    let number = text.get(..end)?;
    let part = |mark: char| number.rsplit_once(mark).map_or(0, |(_, part)| part.len());
    let (points, commas) = (number.matches('.').count(), number.matches(',').count());
    match (points, commas) {
        (1.., 1..) => {
            Some(if number.rfind(',') > number.rfind('.') { Decimals::Comma } else { Decimals::Point })
        }
        (2.., 0) => Some(Decimals::Comma),
        (0, 2..) => Some(Decimals::Point),
        (0, 1) if part(',') != 3 || number.starts_with('0') => Some(Decimals::Comma),
        (1, 0) if part('.') != 3 || number.starts_with('0') => Some(Decimals::Point),
        _ => None,
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn one(text: &str, decimals: Decimals, beside: &str) -> Result<(f64, Option<Change>), Why> {
        let beside = LogUnit::named(beside);
        amount(text.as_bytes(), decimals, &mut UnitCell::default(), beside.as_ref()).map(|v| (v.si, v.change))
    }

    #[test]
    fn plain_amounts() {
        for text in
            ["2.5", "2.5 L", "2500 mL", "2,5 L", "+2.5", "2.5l", "0.0025 m³", "2.5×10^3 mL", "2.5e3 mL"]
        {
            assert_eq!(one(text, Decimals::Ask, "L"), Ok((0.0025, None)), "{text}");
        }
        assert_eq!(one("2,5", Decimals::Comma, "kg"), Ok((2.5, None)));
        assert_eq!(one("-2.5 kg", Decimals::Ask, ""), Ok((-2.5, None)));
        assert_eq!(one("4 x 2.5 L", Decimals::Ask, ""), Ok((0.01, None)));
        assert_eq!(one("1 400 g", Decimals::Ask, ""), Ok((1.4, None)));
    }

    #[test]
    fn what_is_changed_is_told() {
        for (text, decimals, si, change) in [
            ("(2.5 L)", Decimals::Ask, -0.0025, Change::Bracketed),
            ("2.5-", Decimals::Ask, -0.0025, Change::Bracketed),
            ("1,234.5", Decimals::Point, 1.2345, Change::Thousands),
            ("1,234", Decimals::Point, 1.234, Change::Thousands),
            ("1.234,5", Decimals::Comma, 1.2345, Change::Thousands),
            ("12.5", Decimals::Comma, 0.0125, Change::PointAmongCommas),
            ("250 ± 5 mL", Decimals::Ask, 0.00025, Change::SpreadLeft),
        ] {
            assert_eq!(one(text, decimals, "L"), Ok((si, Some(change))), "{text}");
        }
    }

    #[test]
    fn what_cannot_be_read_is_refused_with_its_reason() {
        for (text, why) in [
            ("1,234", Why::CommaOrThousands),
            ("", Why::NoAmount),
            ("=1+1", Why::NotAnAmount),
            ("@SUM(A1:A9)", Why::NotAnAmount),
            ("+cmd|' /C calc'!A0", Why::NotAnAmount),
            ("five", Why::NotAnAmount),
            ("1.2.3", Why::NotAnAmount),
            ("5 gal", Why::OtherUnit),
            ("5 h", Why::OtherUnit),
            ("1e30", Why::TooLarge),
            ("NaN", Why::NotAnAmount),
            ("inf", Why::NotAnAmount),
            ("999999999999", Why::TooLarge),
        ] {
            assert_eq!(one(text, Decimals::Ask, "kg"), Err(why), "{text}");
        }
        assert_eq!(one("5", Decimals::Ask, ""), Err(Why::NoUnit));
        assert_eq!(
            one("1,234", Decimals::Comma, "kg"),
            Ok((1.234, None)),
            "the mapping answers the question"
        );
    }

    #[test]
    fn the_quick_way_reads_as_the_slow_one() {
        let mut state = 7_u64;
        for _ in 0..20_000 {
            state = state.wrapping_mul(6_364_136_223_846_793_005).wrapping_add(1_442_695_040_888_963_407);
            let (whole, part) = (state >> 44, (state >> 20) % 1000);
            let text = format!("{whole}.{part:03} mL");
            let quick = one(&text, Decimals::Ask, "").unwrap().0;
            let slow = read(&text, Kind::Volume).unwrap().central_si;
            assert!((quick - slow).abs() <= slow.abs() * 2.3e-16, "{text}: {quick} {slow}");
        }
    }

    #[test]
    fn counts() {
        assert_eq!(count(b"12", Decimals::Ask), Ok(12.0));
        assert_eq!(count(b"-1", Decimals::Ask), Ok(-1.0));
        assert_eq!(count(b"1.5", Decimals::Ask), Err(Why::NotWhole));
        assert_eq!(count(b"1 400", Decimals::Ask), Ok(1400.0));
        assert_eq!(count(b"many", Decimals::Ask), Err(Why::NotAnAmount));
    }

    #[test]
    fn the_sign_of_decimals_shows_in_some_cells() {
        for (text, expected) in [
            ("2,5", Some(Decimals::Comma)),
            ("2.5 L", Some(Decimals::Point)),
            ("0,250", Some(Decimals::Comma)),
            ("1.234,5", Some(Decimals::Comma)),
            ("1,234.5", Some(Decimals::Point)),
            ("1.234.567", Some(Decimals::Comma)),
            ("1,234", None),
            ("1.234", None),
            ("250", None),
        ] {
            assert_eq!(decimals_of(text), expected, "{text}");
        }
    }
}
