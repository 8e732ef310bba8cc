//! The shape of an amount: numbers, the texts of their units, and what stands between them. What the units mean is
//! decided in `read`. Spaces may stand where they please.
//!
//! ```text
//! amount   = quantity [ ( "±" | "u" ) spread [ "(k=" number ")" ] | ( "to" | "–" ) quantity ]
//! quantity = [ currency ] number [ unit ]
//! spread   = number [ unit | "%" ]
//! ```
//!
//! One unit may stand for both numbers when it follows the second.

use super::decimal::Decimal;
use super::numeral::{Numeral, numeral};
use super::scan::{Scan, is_minus, is_space};
use super::unit::unit_at;
use super::{AmountError, Currency, Kind};

/// A number with the text of its unit.
#[derive(Clone, Debug)]
pub(super) struct Quantity {
    pub(super) number: Numeral,
    /// The number as written.
    pub(super) found: String,
    pub(super) at: usize,
    pub(super) currency: Option<String>,
    pub(super) unit: String,
    pub(super) unit_at: usize,
}

/// What stands between two numbers.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Between {
    PlusMinus,
    Standard,
    To,
}

#[derive(Clone, Debug)]
pub(super) struct Parsed {
    pub(super) first: Quantity,
    pub(super) second: Option<(Between, Quantity)>,
    /// The coverage factor, its text and place.
    pub(super) coverage: Option<(Decimal, String, usize)>,
}

impl Parsed {
    pub(super) fn parse(scan: &mut Scan, kind: Kind) -> Result<Self, AmountError> {
        let first = Quantity::parse(scan, kind)?;
        scan.skip_spaces();
        let mut parsed = Self { first, second: None, coverage: None };
        if let Some((between, length)) = between(scan) {
            scan.step(length);
            scan.skip_spaces();
            parsed.second = Some((between, Quantity::parse(scan, kind)?));
            scan.skip_spaces();
        }
        parsed.coverage = coverage(scan)?;
        scan.skip_spaces();
        if scan.at_end() {
            return Ok(parsed);
        }
        Err(AmountError::LeftOver { found: scan.rest(), at: scan.at })
    }
}

impl Quantity {
    pub(super) fn parse(scan: &mut Scan, kind: Kind) -> Result<Self, AmountError> {
        let currency = currency_before(scan)?;
        let at = scan.at;
        let Some(number) = numeral(scan)? else {
            return Err(AmountError::NoNumber { found: scan.rest(), at, kind });
        };
        let found = scan.since(at);
        scan.skip_spaces();
        let unit_at = scan.at;
        if scan.digit(0) && !(scan.sees("1/") || scan.sees("1 /")) {
            let mut all = scan.clone();
            while all.peek(0).is_some_and(|c| !is_space(c)) {
                all.step(1);
            }
            return Err(AmountError::BadNumber { found: all.since(at), at });
        }
        while !scan.at_end() && between(scan).is_none() && !coverage_starts(scan) {
            scan.step(1);
        }
        Ok(Self { number, found, at, currency, unit: scan.since(unit_at), unit_at })
    }

    /// The number, where it can be read in one way only.
    pub(super) fn decimal(&self, unit: &str) -> Result<Decimal, AmountError> {
        match self.number {
            Numeral::One(number) => Ok(number),
            Numeral::Two(thousands, decimal) => {
                let show = |number: Decimal| {
                    let number = super::shortest(number.to_f64());
                    if unit.is_empty() { number } else { format!("{number} {unit}") }
                };
                Err(AmountError::AmbiguousNumber {
                    found: self.found.clone(),
                    at: self.at,
                    thousands: show(thousands),
                    decimal: show(decimal),
                })
            }
        }
    }

    /// Joins the currency before the number to the unit after it: `USD 12 /L` is `12 USD/L`.
    pub(super) fn join_currency(&mut self) -> Result<(), AmountError> {
        let Some(code) = self.currency.take() else { return Ok(()) };
        if !self.unit.is_empty() && !self.unit.starts_with('/') && !self.unit.starts_with("per ") {
            let named = self.unit.split(['/', ' ']).next().and_then(Currency::named).is_some();
            let (second, at) = (self.unit.clone(), self.unit_at);
            return Err(if named {
                AmountError::Disagree { first: code, second, at }
            } else {
                AmountError::LeftOver { found: second, at }
            });
        }
        let space = if self.unit.starts_with('/') || self.unit.is_empty() { "" } else { " " };
        self.unit = format!("{code}{space}{}", self.unit);
        Ok(())
    }
}

/// A currency before a number, `USD 12` or `€12`.
fn currency_before(scan: &mut Scan) -> Result<Option<String>, AmountError> {
    let number_at = |ahead: usize| {
        let ahead = ahead + scan.spaces(ahead);
        let sign = usize::from(scan.peek(ahead).is_some_and(is_minus));
        scan.digit(ahead + sign) || scan.peek(ahead + sign) == Some('.')
    };
    let capitals = scan.characters(3);
    let code = if scan.sees("US$") {
        "US$".to_owned()
    } else if let Some(sign @ ('€' | '£' | '$' | '¥')) = scan.peek(0) {
        sign.to_string()
    } else if Currency::new(&capitals).is_some() {
        capitals
    } else {
        return Ok(None);
    };
    let length = code.chars().count();
    if !number_at(length) {
        return Ok(None);
    }
    if Currency::named(&code).is_none() {
        unit_at(&code, Kind::Money, scan.at)?;
    }
    scan.step(length);
    scan.skip_spaces();
    Ok(Some(code))
}

/// What separates two numbers at this place, and its length.
fn between(scan: &Scan) -> Option<(Between, usize)> {
    let spaced = scan.before().is_none_or(is_space);
    match scan.peek(0)? {
        '±' => Some((Between::PlusMinus, 1)),
        '+' if scan.peek(1) == Some('/') && scan.peek(2).is_some_and(is_minus) => {
            Some((Between::PlusMinus, 3))
        }
        '+' if scan.peek(1).is_some_and(is_minus) => Some((Between::PlusMinus, 2)),
        'u' if spaced => {
            let mut ahead = 1 + scan.spaces(1);
            let equals = scan.peek(ahead) == Some('=');
            if equals {
                ahead += 1 + scan.spaces(ahead + 1);
            }
            (number_starts(scan, ahead) && (equals || ahead > 1)).then_some((Between::Standard, ahead))
        }
        't' if spaced && scan.sees("to") && scan.peek(2).is_some_and(is_space) => Some((Between::To, 2)),
        '–' | '—' | '‒' => Some((Between::To, 1)),
        '-' => {
            // `h-1` and `m-3` belong to a unit, `12-22 mL` is a range.
            let letter = scan.before().is_some_and(char::is_alphabetic);
            let inverse = letter
                && matches!(scan.peek(1), Some('1'..='3'))
                && !matches!(scan.peek(2), Some('0'..='9' | '.' | ','));
            (!inverse && number_starts(scan, 1 + scan.spaces(1))).then_some((Between::To, 1))
        }
        _ => None,
    }
}

/// Whether a number, with or without its sign, starts so far ahead.
fn number_starts(scan: &Scan, ahead: usize) -> bool {
    let sign = usize::from(scan.peek(ahead).is_some_and(|c| is_minus(c) || c == '+'));
    scan.digit(ahead + sign) || (scan.peek(ahead + sign) == Some('.') && scan.digit(ahead + sign + 1))
}

/// Whether `(k=`, `, k=` or ` k=` stands here.
fn coverage_starts(scan: &Scan) -> bool {
    let mut ahead = 0;
    let mark = matches!(scan.peek(0), Some('(' | ',' | ';'));
    if mark {
        ahead = 1 + scan.spaces(1);
    } else if !scan.before().is_none_or(is_space) {
        return false;
    }
    if !matches!(scan.peek(ahead), Some('k' | 'K')) {
        return false;
    }
    ahead += 1;
    scan.peek(ahead + scan.spaces(ahead)) == Some('=')
}

/// Reads the coverage factor, where one stands here.
fn coverage(scan: &mut Scan) -> Result<Option<(Decimal, String, usize)>, AmountError> {
    if !coverage_starts(scan) {
        return Ok(None);
    }
    let from = scan.at;
    let bracket = scan.peek(0) == Some('(');
    while scan.peek(0).is_some_and(|c| c != '=') {
        scan.step(1);
    }
    scan.step(1);
    scan.skip_spaces();
    let number = match numeral(scan)? {
        Some(Numeral::One(number)) => number,
        Some(Numeral::Two(..)) | None => {
            return Err(AmountError::BadCoverage {
                found: {
                    scan.at = from;
                    scan.rest()
                },
                at: from,
            });
        }
    };
    scan.skip_spaces();
    let closed = scan.peek(0) == Some(')');
    if bracket && closed {
        scan.step(1);
    }
    let found = scan.since(from);
    if number.is_negative() || number.is_zero() || bracket != closed {
        return Err(AmountError::BadCoverage { found, at: from });
    }
    Ok(Some((number, found, from)))
}

impl Quantity {
    pub(super) fn with_unit(&self) -> String {
        if self.unit.is_empty() { self.found.clone() } else { format!("{} {}", self.found, self.unit) }
    }

    /// The number as a spread, which is not negative.
    pub(super) fn spread(&self, unit: &str) -> Result<Decimal, AmountError> {
        let number = self.decimal(unit)?;
        if number.is_negative() {
            return Err(AmountError::NegativeSpread { found: self.with_unit(), at: self.at });
        }
        Ok(number)
    }

    /// Above 0 and up to 1: what may be a fraction without a per cent sign.
    pub(super) fn is_share(&self) -> bool {
        match self.number {
            Numeral::One(number) => (0.0..=1.0).contains(&number.to_f64()) && !number.is_zero(),
            Numeral::Two(..) => false,
        }
    }
}
