//! The double nearest to a decimal, of two equally near the even one, as IEEE 754-2019, 5.12, asks. The standard library reads the
//! same doubles, but brings a table of ten kilobytes for speed that is not needed here.

/// Whole numbers up to this are exact in a double: 2^53.
const EXACT: u128 = 9_007_199_254_740_992;

/// The powers of ten that are exact in a double.
const POWERS: [f64; 23] = [
    1e0, 1e1, 1e2, 1e3, 1e4, 1e5, 1e6, 1e7, 1e8, 1e9, 1e10, 1e11, 1e12, 1e13, 1e14, 1e15, 1e16, 1e17, 1e18,
    1e19, 1e20, 1e21, 1e22,
];

/// So many digits tell every decimal from half-way between two doubles, which has 767 at most; of the rest it counts only whether it
/// is nothing.
const DIGITS: usize = 800;

/// The double nearest to a decimal such as `-12.5e-3`; `None` when `text` is none. Infinite beyond the largest double.
pub(crate) fn nearest(text: &str) -> Option<f64> {
    let (negative, text) = match text.as_bytes() {
        [b'-', rest @ ..] => (true, rest),
        [b'+', rest @ ..] => (false, rest),
        all => (false, all),
    };
    let end = text.iter().position(|b| matches!(b, b'e' | b'E')).unwrap_or(text.len());
    let (digits, power) = text.split_at(end);
    let mut exponent = match power {
        [] => 0,
        [_, b'-', rest @ ..] => whole(rest)?.saturating_neg(),
        [_, b'+', rest @ ..] | [_, rest @ ..] => whole(rest)?,
    };
    let (mut short, mut any, mut point, mut count, mut beyond) = (0_u128, false, false, 0, false);
    let mut long = Big(Vec::new());
    for &byte in digits {
        match byte {
            b'0'..=b'9' => {
                any = true;
                exponent -= i64::from(point);
                let digit = u32::from(byte - b'0');
                if count < DIGITS {
                    // Behind 38 digits the number goes on in as much room as it needs.
                    if count < 38 {
                        short = short * 10 + u128::from(digit);
                    } else {
                        if count == 38 {
                            long = Big::of(short);
                        }
                        long.grow(10, digit);
                    }
                    count += usize::from(count > 0 || digit > 0);
                } else {
                    beyond |= digit > 0;
                    exponent += 1;
                }
            }
            b'.' if !point => point = true,
            _ => return None,
        }
    }
    if !any {
        return None;
    }
    let value = if count <= 38 {
        of_parts(short, exponent)
    } else {
        if beyond {
            long.grow(10, 1);
            exponent -= 1;
        }
        of_big(long, exponent)
    };
    Some(if negative { -value } else { value })
}

/// The double nearest to mantissa × 10^exponent.
pub(super) fn of_parts(mantissa: u128, exponent: i64) -> f64 {
    // One product or quotient of two exact doubles is rounded once.
    let power = usize::try_from(exponent.unsigned_abs()).ok().and_then(|n| POWERS.get(n));
    match power {
        Some(power) if mantissa <= EXACT => {
            let mantissa = mantissa as f64;
            if exponent < 0 { mantissa / power } else { mantissa * power }
        }
        _ => of_big(Big::of(mantissa), exponent),
    }
}

/// Digits alone, at least one; far from every double is far enough.
fn whole(digits: &[u8]) -> Option<i64> {
    if digits.is_empty() {
        return None;
    }
    digits.iter().try_fold(0_i64, |sum, &byte| {
        let sum = if sum > 1_000_000_000_000 { sum } else { sum * 10 + i64::from(byte.wrapping_sub(b'0')) };
        byte.is_ascii_digit().then_some(sum)
    })
}

/// Long division of whole numbers.
fn of_big(mut above: Big, exponent: i64) -> f64 {
    let size = above.bits();
    // The highest digit lies between 10^(0.3 size - 2) and 10^(0.31 size + 1); doubles between 10^-324 and 10^309.
    if size == 0 || exponent + size / 3 + 1 < -330 {
        return 0.0;
    }
    if exponent > 310 {
        return f64::INFINITY;
    }
    let mut below = Big::of(1);
    let scaled = if exponent < 0 { &mut below } else { &mut above };
    for _ in 0..exponent.unsigned_abs() {
        scaled.grow(10, 0);
    }
    // above / below = quotient × 2^-shift, and the quotient has 64 or 65 bits.
    let shift = below.bits() - above.bits() + 64;
    if shift > 0 {
        above.double(shift);
    } else {
        below.double(-shift);
    }
    below.double(65);
    let mut quotient = 0_u128;
    for _ in 0..66 {
        quotient <<= 1;
        if above.take(&below) {
            quotient |= 1;
        }
        below.halve();
    }
    let rest = above.bits() > 0;
    let bits = i64::from(128 - quotient.leading_zeros());
    // The exponent of the highest bit; below 2^-1022 doubles have less than 53 bits.
    let high = bits - 1 - shift;
    let kept = if high < -1022 { 53 + 1022 + high } else { 53 };
    if kept < 0 {
        return 0.0;
    }
    if high > 1023 {
        return f64::INFINITY;
    }
    let cut = bits - kept;
    let (mut mantissa, left, half) = (quotient >> cut, quotient & ((1 << cut) - 1), 1_u128 << (cut - 1));
    if left > half || left == half && (rest || mantissa & 1 == 1) {
        mantissa += 1;
    }
    // A mantissa that was rounded up to the next power of two carries into the exponent, where it belongs.
    let exponent = if high < -1022 { 0 } else { ((high + 1022) as u64) << 52 };
    f64::from_bits(exponent + mantissa as u64)
}

/// A whole number of any size, lowest 32 bits first, without zeros at its end.
struct Big(Vec<u32>);

impl Big {
    fn of(mut value: u128) -> Self {
        let mut limbs = Vec::new();
        while value > 0 {
            limbs.push(value as u32);
            value >>= 32;
        }
        Self(limbs)
    }

    fn bits(&self) -> i64 {
        self.0.last().map_or(0, |high| self.0.len() as i64 * 32 - i64::from(high.leading_zeros()))
    }

    /// Times `factor`, and `more` to it.
    fn grow(&mut self, factor: u32, more: u32) {
        let mut carry = u64::from(more);
        for limb in &mut self.0 {
            carry += u64::from(*limb) * u64::from(factor);
            *limb = carry as u32;
            carry >>= 32;
        }
        if carry > 0 {
            self.0.push(carry as u32);
        }
    }

    /// Times 2^bits.
    fn double(&mut self, bits: i64) {
        self.grow(1 << (bits % 32), 0);
        let mut limbs = vec![0; (bits / 32) as usize];
        limbs.append(&mut self.0);
        self.0 = limbs;
    }

    /// Half of it, rounded down.
    fn halve(&mut self) {
        let mut carry = 0;
        for limb in self.0.iter_mut().rev() {
            let low = *limb & 1;
            *limb = *limb >> 1 | carry << 31;
            carry = low;
        }
        self.trim();
    }

    /// Takes `other` away where that leaves something or nothing; whether it did.
    fn take(&mut self, other: &Self) -> bool {
        let order =
            self.0.len().cmp(&other.0.len()).then_with(|| self.0.iter().rev().cmp(other.0.iter().rev()));
        if order.is_lt() {
            return false;
        }
        let mut borrow = false;
        for (i, limb) in self.0.iter_mut().enumerate() {
            let (less, first) = limb.overflowing_sub(other.0.get(i).copied().unwrap_or(0));
            let (less, second) = less.overflowing_sub(u32::from(borrow));
            *limb = less;
            borrow = first || second;
        }
        self.trim();
        true
    }

    fn trim(&mut self) {
        while self.0.last() == Some(&0) {
            self.0.pop();
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn same(text: &str) {
        let expected = text.parse::<f64>().unwrap();
        let read = nearest(text).unwrap_or_else(|| panic!("{text} is a number"));
        assert_eq!(read.to_bits(), expected.to_bits(), "{text}: {read:e}, expected {expected:e}");
    }

    /// The witness is the reading of the standard library, which is correctly rounded.
    #[test]
    fn doubles_are_those_of_the_standard_library() {
        for text in [
            "0",
            "-0",
            "1",
            "+1",
            ".5",
            "5.",
            "-12.5e-3",
            "1E5",
            "1e+5",
            "0.1",
            "9007199254740993",
            "1e22",
            "1e23",
            "8.5e-23",
            "179769313486231570000e289",
            "1.7976931348623158e308",
            "1.7976931348623159e308",
            "1e309",
            "1e400",
            "123e-400",
            "2.2250738585072011e-308",
            "2.2250738585072014e-308",
            "4.9406564584124654e-324",
            "2.4703282292062327e-324",
            "2.4703282292062328e-324",
            "1e-324",
            "0e999999999999999999999",
            "1e-99999999999999999999",
            "1e99999999999999999999",
            "0000000000000000000000000000000000000000000012.5",
            "0.00000000000000000000000000000000000000000000000000125",
            "340282366920938463463374607431768211456",
            "99999999999999999999999999999999999999999999999999",
        ] {
            same(text);
        }
        let zeros = "0".repeat(900);
        for text in [
            format!("1{zeros}e-900"),
            format!("0.{zeros}1e901"),
            format!("3{zeros}.5e-900"),
            format!("{zeros}7"),
        ] {
            same(&text);
        }
    }

    /// Exactly half-way between two doubles, and a little to each side, far behind the digits that a machine number holds.
    #[test]
    fn half_way_goes_to_the_even_one() {
        for (bits, exponent) in [
            (0x10_0000_0000_0000_u64, 0),
            (0x10_0000_0000_0001, -30),
            (0x1f_ffff_ffff_ffff, -60),
            (0x15_5555_5555_5555, -1074),
            (1, -1074),
            (7, -1074),
        ] {
            // (2 bits + 1) × 2^(exponent - 1) in decimal: × 5^n with the point moved by n.
            let n = 1 - exponent;
            let mut digits = vec![0_u8];
            let number = (2 * bits + 1).to_string();
            digits.splice(.., number.bytes().rev().map(|b| b - b'0'));
            for _ in 0..n {
                let mut carry = 0;
                for digit in &mut digits {
                    carry += *digit * 5;
                    *digit = carry % 10;
                    carry /= 10;
                }
                if carry > 0 {
                    digits.push(carry);
                }
            }
            let half: String = digits.iter().rev().map(|d| char::from(d + b'0')).collect();
            same(&format!("{half}e-{n}"));
            same(&format!("{half}{}1e-{}", "0".repeat(400), n + 401));
            let mut less = half.clone().into_bytes();
            let last = less.iter_mut().rev().find(|b| **b > b'0').unwrap();
            *last -= 1;
            same(&format!("{}{}e-{}", String::from_utf8(less).unwrap(), "9".repeat(400), n + 400));
        }
    }

    #[test]
    fn many_decimals_of_all_sizes_agree() {
        // A linear congruential generator; its numbers need only be different.
        let mut state = 1_u64;
        let mut next = || {
            state = state.wrapping_mul(6_364_136_223_846_793_005).wrapping_add(1_442_695_040_888_963_407);
            state >> 11
        };
        for _ in 0..20_000 {
            let bits = next() << 11 | next() & 0x7ff;
            let value = f64::from_bits(bits);
            if value.is_finite() {
                same(&format!("{value:e}"));
                same(&format!("{value:.25e}"));
            }
            let (a, b) = (next(), next());
            same(&format!("{a}{b}e{}", a as i64 % 330 - 20));
            same(&format!("{}.{b}e-{}", a % 1000, b % 330));
            let mantissa = u128::from(a) << (b % 70);
            let exponent = (b % 700) as i64 - 360;
            let expected = format!("{mantissa}e{exponent}").parse::<f64>().unwrap();
            assert_eq!(of_parts(mantissa, exponent).to_bits(), expected.to_bits(), "{mantissa}e{exponent}");
        }
    }

    #[test]
    fn what_is_no_decimal_is_none() {
        for text in [
            "", "-", ".", "e5", "1e", "1e+", "1,5", "1.2.3", " 1", "1 ", "inf", "nan", "0x10", "1e5.0",
            "--1", "+-1",
        ] {
            assert_eq!(nearest(text), None, "{text}");
        }
    }
}
