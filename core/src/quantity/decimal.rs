//! Decimal numbers as they are written, so that `250 mL` becomes the double nearest to 0.00025 and not the product
//! of two rounded ones.
use super::nearest::of_parts;

/// mantissa × 10^exponent.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) struct Decimal {
    pub(super) mantissa: i128,
    pub(super) exponent: i32,
}

/// Whole numbers up to this are exact in a double: 2^53.
const EXACT: u128 = 9_007_199_254_740_992;

impl Decimal {
    pub(super) const fn new(mantissa: i128, exponent: i32) -> Self {
        Self { mantissa, exponent }
    }

    /// The shortest decimal that reads back as `value`; `None` when it is not finite.
    pub(super) fn of(value: f64) -> Option<Self> {
        if !value.is_finite() {
            return None;
        }
        let text = format!("{value:e}");
        let (digits, exponent) = text.split_once('e')?;
        let (whole, part) = digits.split_once('.').unwrap_or((digits, ""));
        let mantissa = format!("{whole}{part}").parse::<i128>().ok()?;
        let exponent = exponent.parse::<i32>().ok()?;
        Some(Self::new(mantissa, exponent - i32::try_from(part.len()).ok()?))
    }

    /// The same number without trailing zeros in the mantissa.
    fn trimmed(mut self) -> Self {
        if self.mantissa == 0 {
            return Self::new(0, 0);
        }
        while self.mantissa % 10 == 0 {
            self.mantissa /= 10;
            self.exponent += 1;
        }
        self
    }

    /// The mantissa at a lower exponent; `None` when it does not fit.
    fn mantissa_at(self, exponent: i32) -> Option<i128> {
        let shift = u32::try_from(self.exponent.checked_sub(exponent)?).ok()?;
        self.mantissa.checked_mul(10_i128.checked_pow(shift)?)
    }

    /// The sum. Where the two lie so far apart that it does not fit 38 digits, the smaller is beyond the reach of a
    /// double and the larger is returned.
    pub(super) fn plus(self, other: Self) -> Self {
        if self.mantissa == 0 {
            return other;
        }
        if other.mantissa == 0 {
            return self;
        }
        let (a, b) = (self.trimmed(), other.trimmed());
        let exponent = if a.exponent < b.exponent { a.exponent } else { b.exponent };
        let sum = match (a.mantissa_at(exponent), b.mantissa_at(exponent)) {
            (Some(x), Some(y)) => x.checked_add(y),
            _ => None,
        };
        match sum {
            Some(mantissa) => Self::new(mantissa, exponent),
            None if a.to_f64().abs() < b.to_f64().abs() => b,
            None => a,
        }
    }

    pub(super) fn minus(self, other: Self) -> Self {
        self.plus(other.negated())
    }

    pub(super) const fn negated(self) -> Self {
        Self::new(self.mantissa.wrapping_neg(), self.exponent)
    }

    pub(super) const fn is_negative(self) -> bool {
        self.mantissa < 0
    }

    pub(super) const fn is_zero(self) -> bool {
        self.mantissa == 0
    }

    /// The product; where it does not fit 38 digits, that of the nearest doubles.
    pub(super) fn times(self, other: Self) -> Self {
        if let Some(mantissa) = self.mantissa.checked_mul(other.mantissa) {
            return Self::new(mantissa, self.exponent.saturating_add(other.exponent));
        }
        let (a, b) = (self.trimmed(), other.trimmed());
        match a.mantissa.checked_mul(b.mantissa) {
            Some(mantissa) => Self::new(mantissa, a.exponent.saturating_add(b.exponent)),
            None => Self::of(a.to_f64() * b.to_f64()).unwrap_or(a),
        }
    }

    /// The nearest double.
    pub(super) fn to_f64(self) -> f64 {
        let value = of_parts(self.mantissa.unsigned_abs(), i64::from(self.exponent));
        if self.is_negative() { -value } else { value }
    }

    /// The number divided by a whole number, rounded once where both sides are exact in a double.
    pub(super) fn over(self, divisor: u128) -> f64 {
        if divisor == 1 {
            return self.to_f64();
        }
        let (mut divisor, mut number) = (divisor, self.trimmed());
        while divisor != 0 && divisor.is_multiple_of(10) {
            divisor /= 10;
            number.exponent = number.exponent.saturating_sub(1);
        }
        if divisor == 1 {
            return number.to_f64();
        }
        let scale = 10_u128.checked_pow(number.exponent.unsigned_abs());
        let (above, below) = match (scale, number.exponent < 0) {
            (Some(scale), true) => (Some(number.mantissa.unsigned_abs()), divisor.checked_mul(scale)),
            (Some(scale), false) => (number.mantissa.unsigned_abs().checked_mul(scale), Some(divisor)),
            (None, _) => (None, None),
        };
        match (above, below) {
            (Some(above), Some(below)) if above <= EXACT && below <= EXACT => {
                let quotient = above as f64 / below as f64;
                if number.is_negative() { -quotient } else { quotient }
            }
            _ => number.to_f64() / divisor as f64,
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn sums_and_products_are_exact() {
        let a = Decimal::new(1, -1);
        let b = Decimal::new(2, -1);
        assert_eq!(a.plus(b).to_f64(), 0.3, "0.1 + 0.2, which two doubles miss");
        assert_eq!(Decimal::new(11, -1).times(Decimal::new(11, -1)).to_f64(), 1.21);
        assert_eq!(Decimal::new(1, 30).plus(Decimal::new(1, -30)).to_f64(), 1e30);
        assert_eq!(Decimal::new(5, 0).minus(Decimal::new(50, -1)).to_f64().to_bits(), 0.0_f64.to_bits());
    }

    #[test]
    fn a_quotient_is_rounded_once() {
        // 0.37 / 3.6e6 as one quotient of whole numbers.
        assert_eq!(Decimal::new(37, -2).over(3_600_000), 37.0 / 360_000_000.0);
        assert_eq!(Decimal::new(-1, 0).over(3), -1.0 / 3.0);
    }

    #[test]
    fn short_numbers_are_as_the_standard_library_reads_them() {
        for mantissa in [1_i128, 3, 25, 12_345, 999_999_999, 9_007_199_254_740_991, 9_007_199_254_740_993] {
            for exponent in -30..30 {
                let read = format!("{mantissa}e{exponent}").parse::<f64>().unwrap();
                assert_eq!(Decimal::new(mantissa, exponent).to_f64().to_bits(), read.to_bits());
            }
        }
    }

    #[test]
    fn of_reads_the_shortest_decimal() {
        assert_eq!(Decimal::of(0.00025), Some(Decimal::new(25, -5)));
        assert_eq!(Decimal::of(-1234.5), Some(Decimal::new(-12345, -1)));
        assert_eq!(Decimal::of(f64::NAN), None);
    }
}
