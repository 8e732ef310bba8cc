//! Numbers as people write them: `1 400`, `1,234.5`, `0,25`, `1.2×10^3`, `1.2·10³`, `1.2e3`.

use super::AmountError;
use super::decimal::Decimal;
use super::scan::{Scan, is_minus, is_space};

/// A number that was read, or the two ways in which it may be read.
#[derive(Clone, Debug)]
pub(super) enum Numeral {
    One(Decimal),
    /// `1,234`: with a mark of thousands, with a decimal comma.
    Two(Decimal, Decimal),
}

/// Digits kept of a number; a double holds 17. The rest would not change it, but might overflow the exact arithmetic.
const KEPT: usize = 22;

/// Reads the number that starts at this place; `None` when none does.
pub(super) fn numeral(scan: &mut Scan) -> Result<Option<Numeral>, AmountError> {
    let from = scan.at;
    let mut negative = false;
    if let Some(sign) = scan.peek(0).filter(|&c| is_minus(c) || c == '+') {
        let spaces = scan.spaces(1);
        if !starts(scan, 1 + spaces) {
            return Ok(None);
        }
        negative = is_minus(sign);
        scan.step(1 + spaces);
    }
    if !starts(scan, 0) {
        return Ok(None);
    }
    let body = body(scan);
    let bad = |scan: &Scan| AmountError::BadNumber { found: scan.since(from), at: from };
    let Some(forms) = forms(&body) else { return Err(bad(scan)) };
    let bare_ten = body == "10";
    let Some(exponent) = power(scan, bare_ten) else {
        let mut all = scan.clone();
        while all.peek(0).is_some_and(|c| !is_space(c)) {
            all.step(1);
        }
        return Err(bad(&all));
    };
    let found = scan.since(from);
    let build = |form: &Form| -> Result<Decimal, AmountError> {
        let (mantissa, dropped) = mantissa(&form.digits);
        // A bare 10^3 is the power alone.
        let mantissa = if bare_ten && exponent.bare { 1 } else { mantissa };
        let power = i64::from(exponent.value) + dropped - form.decimals;
        match i32::try_from(power) {
            Ok(power) if (-250..=250).contains(&power) => {
                // With up to 22 digits this neither overflows nor vanishes.
                return Ok(Decimal::new(if negative { -mantissa } else { mantissa }, power));
            }
            Ok(power) if (-400..=400).contains(&power) => {
                let number = Decimal::new(if negative { -mantissa } else { mantissa }, power);
                let value = number.to_f64();
                if value.is_finite() && (value != 0.0 || mantissa == 0) {
                    return Ok(number);
                }
            }
            _ if mantissa == 0 => return Ok(Decimal::new(0, 0)),
            _ => {}
        }
        Err(AmountError::NumberOutOfRange { found: found.clone(), at: from })
    };
    Ok(Some(match &forms {
        Forms::One(form) => Numeral::One(build(form)?),
        Forms::Two(thousands, decimal) => Numeral::Two(build(thousands)?, build(decimal)?),
    }))
}

/// Whether a number without its sign starts here: a digit, or a point before a digit.
fn starts(scan: &Scan, ahead: usize) -> bool {
    scan.digit(ahead) || (matches!(scan.peek(ahead), Some('.' | ',')) && scan.digit(ahead + 1))
}

/// The digits with their marks, spaces between thousands written as one space.
fn body(scan: &mut Scan) -> String {
    let mut text = String::new();
    while let Some(c) = scan.peek(0) {
        if c.is_ascii_digit() || matches!(c, '.' | ',') {
            text.push(c);
            scan.step(1);
        } else if group_follows(scan, c) && text.ends_with(|c: char| c.is_ascii_digit()) {
            text.push(' ');
            scan.step(1);
        } else {
            break;
        }
    }
    text
}

/// Whether this is one space or apostrophe before exactly three digits.
fn group_follows(scan: &Scan, mark: char) -> bool {
    (is_space(mark) || matches!(mark, '\'' | '\u{2019}'))
        && (1..=3).all(|ahead| scan.digit(ahead))
        && !scan.digit(4)
}

/// All digits of a number, and how many of them stand after the decimal point.
#[derive(Clone, Debug, PartialEq, Eq)]
struct Form {
    digits: String,
    decimals: i64,
}

#[derive(Clone, Debug, PartialEq, Eq)]
enum Forms {
    One(Form),
    Two(Form, Form),
}

/// Decides which mark is the decimal point.
fn forms(body: &str) -> Option<Forms> {
    let spaced = body.contains(' ');
    let points = body.matches('.').count();
    let commas = body.matches(',').count();
    let decimal = match (points, commas) {
        (0, 0) => None,
        // 1234.5 and 1.234: a single point is the decimal point.
        (1, 0) => Some('.'),
        (0, 1) => {
            let (whole, part) = body.split_once(',')?;
            if part.len() == 3 && is_group_head(whole) {
                return Some(Forms::Two(form(body, None)?, form(body, Some(','))?));
            }
            Some(',')
        }
        // 1,234,567 and 1.234.567: thousands.
        (_, 0) | (0, _) => None,
        // The last mark is the decimal one, and stands once.
        (_, 1) if body.rfind(',') > body.rfind('.') => Some(','),
        (1, _) if body.rfind('.') > body.rfind(',') => Some('.'),
        _ => return None,
    };
    if spaced && points + commas > usize::from(decimal.is_some()) {
        return None;
    }
    Some(Forms::One(form(body, decimal)?))
}

/// One to three digits that do not start with 0: what may stand before a mark of thousands.
fn is_group_head(text: &str) -> bool {
    (1..=3).contains(&text.len()) && !text.starts_with('0') && text.chars().all(|c| c.is_ascii_digit())
}

fn form(body: &str, decimal: Option<char>) -> Option<Form> {
    let (whole, part) = match decimal {
        Some(mark) => {
            let (whole, part) = body.split_once(mark)?;
            if part.is_empty() {
                return None;
            }
            (whole, part)
        }
        None => (body, ""),
    };
    if !part.chars().all(|c| c.is_ascii_digit()) {
        return None;
    }
    let mut groups = whole.split([' ', '.', ',']);
    let head = groups.next()?;
    let mut digits = head.to_owned();
    let mut grouped = false;
    for group in groups {
        if group.len() != 3 {
            return None;
        }
        grouped = true;
        digits.push_str(group);
    }
    if grouped && !is_group_head(head) {
        return None;
    }
    digits.push_str(part);
    Some(Form { digits, decimals: i64::try_from(part.len()).ok()? })
}

/// The digits as a whole number, and how many were dropped from its end.
fn mantissa(digits: &str) -> (i128, i64) {
    let digits = digits.trim_start_matches('0');
    let kept: String = digits.chars().take(KEPT).collect();
    let dropped = digits.chars().count().saturating_sub(KEPT);
    (kept.parse().unwrap_or(0), i64::try_from(dropped).unwrap_or(i64::MAX))
}

/// A power of ten after the digits.
struct Exponent {
    value: i32,
    /// Written as 10^3 with nothing before it.
    bare: bool,
}

/// Reads a power of ten; `None` when one is begun and not finished.
fn power(scan: &mut Scan, bare_ten: bool) -> Option<Exponent> {
    let none = Exponent { value: 0, bare: false };
    if matches!(scan.peek(0), Some('e' | 'E')) {
        let signed = scan.peek(1).is_some_and(|c| is_minus(c) || c == '+');
        if scan.digit(1 + usize::from(signed)) {
            scan.step(1);
            return plain_exponent(scan).map(|value| Exponent { value, bare: false });
        }
        return Some(none);
    }
    if bare_ten && (scan.peek(0) == Some('^') || scan.peek(0).and_then(raised).is_some()) {
        return exponent(scan).map(|value| Exponent { value, bare: true });
    }
    let spaces = scan.spaces(0);
    if matches!(scan.peek(spaces), Some('×' | 'x' | 'X' | '·' | '⋅' | '*' | '∙' | '✕')) {
        let more = scan.spaces(spaces + 1);
        let ten = spaces + 1 + more;
        if scan.peek(ten) == Some('1') && scan.peek(ten + 1) == Some('0') && !scan.digit(ten + 2) {
            scan.step(ten + 2);
            return exponent(scan).map(|value| Exponent { value, bare: false });
        }
    }
    Some(none)
}

/// `^3`, `^-3` or raised digits.
fn exponent(scan: &mut Scan) -> Option<i32> {
    if scan.peek(0) == Some('^') {
        scan.step(1);
        return plain_exponent(scan);
    }
    let mut text = String::new();
    while let Some(c) = scan.peek(0).and_then(raised) {
        text.push(c);
        scan.step(1);
    }
    capped(&text)
}

fn plain_exponent(scan: &mut Scan) -> Option<i32> {
    let mut text = String::new();
    if let Some(sign) = scan.peek(0).filter(|&c| is_minus(c) || c == '+') {
        text.push(if is_minus(sign) { '-' } else { '+' });
        scan.step(1);
    }
    while let Some(c) = scan.peek(0).filter(char::is_ascii_digit) {
        text.push(c);
        scan.step(1);
    }
    capped(&text)
}

/// The exponent; what has more than six digits is as good as a million.
fn capped(text: &str) -> Option<i32> {
    let digits = text.trim_start_matches(['+', '-']);
    if digits.is_empty() || !digits.chars().all(|c| c.is_ascii_digit()) {
        return None;
    }
    let size = digits.trim_start_matches('0');
    let value = if size.len() > 6 { 1_000_000 } else { size.parse().unwrap_or(0) };
    Some(if text.starts_with('-') { -value } else { value })
}

const fn raised(c: char) -> Option<char> {
    Some(match c {
        '⁰' => '0',
        '¹' => '1',
        '²' => '2',
        '³' => '3',
        '⁴' => '4',
        '⁵' => '5',
        '⁶' => '6',
        '⁷' => '7',
        '⁸' => '8',
        '⁹' => '9',
        '⁻' => '-',
        '⁺' => '+',
        _ => return None,
    })
}

#[cfg(test)]
mod tests {
    use super::*;

    fn one(text: &str) -> f64 {
        let mut scan = Scan::new(text);
        match numeral(&mut scan).unwrap().unwrap() {
            Numeral::One(number) if scan.at_end() => number.to_f64(),
            Numeral::One(_) => panic!("“{}” left of “{text}”", scan.rest()),
            Numeral::Two(..) => panic!("“{text}” read in two ways"),
        }
    }

    #[test]
    fn one_number_in_many_writings() {
        for text in [
            "1234.5",
            "1234,5",
            "1 234.5",
            "1 234,5",
            "1,234.5",
            "1.234,5",
            "1\u{a0}234.5",
            "1\u{2009}234,5",
            "1\u{202f}234.5",
            "1'234.5",
            "1.2345e3",
            "1.2345E+3",
            "1.2345×10^3",
            "1.2345x10^3",
            "1.2345·10³",
            "1.2345 × 10^3",
            "1.2345*10^3",
            "12345×10⁻¹",
            "12345e-1",
            "12345×10^\u{2212}1",
            "+1234.5",
            "01234.50",
        ] {
            assert_eq!(one(text), 1234.5, "{text}");
        }
        assert_eq!(one("\u{2212}5"), -5.0);
        assert_eq!(one("- 5"), -5.0);
        assert_eq!(one(".5"), 0.5);
        assert_eq!(one("10^3"), 1000.0);
        assert_eq!(one("10³"), 1000.0);
        assert_eq!(one("1,234,567"), 1_234_567.0);
        assert_eq!(one("1.234.567,8"), 1_234_567.8);
        assert_eq!(one("0,250"), 0.25);
        assert_eq!(one("1234,567"), 1234.567);
        assert_eq!(one("0e999999999"), 0.0);
    }

    #[test]
    fn two_ways() {
        for text in ["1,234", "12,345", "123,456", "1,234e3", "-1,234"] {
            assert!(matches!(numeral(&mut Scan::new(text)), Ok(Some(Numeral::Two(..)))), "{text}");
        }
    }

    #[test]
    fn malformed() {
        for text in
            ["1,23,456", "1.2.3", "1,2.3,4", "5.", "5,", "1..2", "1 234 567,8.9", "1.5×10^", "1,234.567.8"]
        {
            assert!(
                matches!(numeral(&mut Scan::new(text)), Err(AmountError::BadNumber { .. })),
                "{text} {:?}",
                numeral(&mut Scan::new(text))
            );
        }
        for text in ["1e400", "1e-400", "1e99999999999"] {
            assert!(
                matches!(numeral(&mut Scan::new(text)), Err(AmountError::NumberOutOfRange { .. })),
                "{text}"
            );
        }
        for text in ["", "x", "-", "- x", ".", "mL 5"] {
            assert!(matches!(numeral(&mut Scan::new(text)), Ok(None)), "{text}");
        }
    }
}
