//! Numbers as text: so many significant digits for people, the shortest text that reads back for programs. Both
//! are laid out here from the shortest decimal digits, so that the same value gives the same text everywhere.

use super::decimal::Decimal;

/// `value` rounded to `digits` significant digits (1 to 17), for people. Halves of the shortest decimal are rounded
/// away from zero, so that 0.125 to two digits is 0.13, as taught, and trailing zeros are left out. Below 1e-6 and
/// from 1e15 on it is written with a power of ten. Minus zero is 0; infinities and NaN are words.
///
/// ```
/// use thimbleworth::quantity::significant;
/// assert_eq!(significant(0.012_345, 3), "0.0123");
/// assert_eq!(significant(-0.0, 3), "0");
/// assert_eq!(significant(1.25e-9, 2), "1.3×10⁻⁹");
/// ```
#[must_use]
pub fn significant(value: f64, digits: u32) -> String {
    match Decimal::of(value) {
        Some(decimal) => layout(rounded(decimal, digits), Power::Raised),
        None => not_finite(value).to_owned(),
    }
}

/// The shortest text that reads back as the same double, for programs: `0.00025`, `1.2e-9`.
///
/// ```
/// use thimbleworth::quantity::shortest;
/// assert_eq!(shortest(0.1 + 0.2), "0.30000000000000004");
/// assert_eq!(shortest(-0.0), "0");
/// ```
#[must_use]
pub fn shortest(value: f64) -> String {
    match Decimal::of(value) {
        Some(decimal) => layout(decimal, Power::Letter),
        None => not_finite(value).to_owned(),
    }
}

const fn not_finite(value: f64) -> &'static str {
    if value.is_nan() {
        "not a number"
    } else if value < 0.0 {
        "minus infinity"
    } else {
        "infinity"
    }
}

/// How a power of ten is written.
#[derive(Clone, Copy)]
enum Power {
    /// `×10⁻⁹`
    Raised,
    /// `e-9`
    Letter,
}

/// Rounds to `digits` significant digits, halves away from zero.
fn rounded(number: Decimal, digits: u32) -> Decimal {
    let kept = if digits == 0 { 1 } else { digits };
    let mut mantissa = number.mantissa.unsigned_abs();
    let mut exponent = number.exponent;
    let length = count_digits(mantissa);
    if length > kept {
        let cut = length - kept;
        let unit = 10_u128.checked_pow(cut).unwrap_or(u128::MAX);
        // ⌊(m + u/2) / u⌋
        mantissa = (mantissa + unit / 2) / unit;
        exponent = exponent.saturating_add_unsigned(cut);
    }
    let signed = i128::try_from(mantissa).unwrap_or(i128::MAX);
    Decimal::new(if number.is_negative() { -signed } else { signed }, exponent)
}

fn count_digits(mut number: u128) -> u32 {
    let mut count = 1;
    while number >= 10 {
        number /= 10;
        count += 1;
    }
    count
}

/// Lays out the digits of a number.
fn layout(number: Decimal, power: Power) -> String {
    if number.mantissa == 0 {
        return "0".to_owned();
    }
    let sign = if number.is_negative() { "-" } else { "" };
    let all = number.mantissa.unsigned_abs().to_string();
    let digits = all.trim_end_matches('0');
    let length = i32::try_from(all.len()).unwrap_or(i32::MAX);
    // The place of the decimal point, counted from the first digit.
    let point = number.exponent.saturating_add(length);
    let head: String = digits.chars().take(usize::try_from(point).unwrap_or(0)).collect();
    let tail: String = digits.chars().skip(usize::try_from(point).unwrap_or(0)).collect();
    if (1..=15).contains(&point) {
        let zeros = usize::try_from(point).unwrap_or(0).saturating_sub(digits.len());
        let dot = if tail.is_empty() { "" } else { "." };
        return format!("{sign}{head}{}{dot}{tail}", "0".repeat(zeros));
    }
    if (-5..=0).contains(&point) {
        let zeros = usize::try_from(-point).unwrap_or(0);
        return format!("{sign}0.{}{tail}", "0".repeat(zeros));
    }
    let first: String = digits.chars().take(1).collect();
    let rest: String = digits.chars().skip(1).collect();
    let dot = if rest.is_empty() { "" } else { "." };
    let exponent = point.saturating_sub(1);
    match power {
        Power::Letter => format!("{sign}{first}{dot}{rest}e{exponent}"),
        Power::Raised => format!("{sign}{first}{dot}{rest}×10{}", raised(exponent)),
    }
}

fn raised(exponent: i32) -> String {
    let up = |character| match character {
        '-' => '⁻',
        '0' => '⁰',
        '1' => '¹',
        '2' => '²',
        '3' => '³',
        '4' => '⁴',
        '5' => '⁵',
        '6' => '⁶',
        '7' => '⁷',
        '8' => '⁸',
        _ => '⁹',
    };
    exponent.to_string().chars().map(up).collect()
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn significant_digits() {
        for (value, digits, text) in [
            (250.0, 4, "250"),
            (1234.0, 4, "1234"),
            (12_345.0, 4, "12350"),
            (0.000_25, 3, "0.00025"),
            (999.96, 4, "1000"),
            (0.125, 2, "0.13"),
            (-0.125, 2, "-0.13"),
            (1.005, 3, "1.01"),
            (0.0, 3, "0"),
            (-0.0, 3, "0"),
            (1e-6, 3, "0.000001"),
            (9.99e-7, 3, "9.99×10⁻⁷"),
            (1e15, 3, "1×10¹⁵"),
            (1.5e300, 0, "2×10³⁰⁰"),
            (f64::NAN, 3, "not a number"),
            (f64::NEG_INFINITY, 3, "minus infinity"),
        ] {
            assert_eq!(significant(value, digits), text);
        }
    }

    #[test]
    fn the_shortest_text_reads_back() {
        let mut state = 1_u64;
        for _ in 0..20_000 {
            state = state.wrapping_mul(6_364_136_223_846_793_005).wrapping_add(1_442_695_040_888_963_407);
            let value = f64::from_bits(state);
            if value.is_finite() {
                assert_eq!(shortest(value).parse::<f64>().unwrap(), value);
            }
        }
        assert_eq!(shortest(f64::MIN_POSITIVE).parse::<f64>().unwrap(), f64::MIN_POSITIVE);
        assert_eq!(shortest(1e22), "1e22");
    }
}
