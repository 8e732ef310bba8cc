//! Figures in columns: one unit and the same decimals for a whole table, so that the points stand below one another.
use thimbleworth::account::Measure;
use thimbleworth::quantity::{Currency, shortest};

/// No-break space of less than a digit's width, between groups of three digits.
const THIN: char = '\u{202f}';

/// How the values of a table are written.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Scale {
    unit: &'static str,
    /// The unit where it is money.
    currency: Option<Currency>,
    /// Written = SI × this.
    factor: f64,
    decimals: usize,
}

impl Scale {
    /// A scale on which the largest of `values` (SI) shows five digits and the others as many decimals.
    #[must_use]
    pub fn of(measure: Measure, values: impl Iterator<Item = f64>) -> Self {
        let (mut largest, mut whole_numbers) = (0.0_f64, true);
        for value in values.filter(|v| v.is_finite()) {
            whole_numbers &= value.fract() == 0.0;
            if value.abs() > largest {
                largest = value.abs();
            }
        }
        let (unit, factor) = match measure {
            Measure::Mass if largest > 0.0 && largest < 1e-4 => ("mg", 1e6),
            Measure::Mass if largest > 0.0 && largest < 0.1 => ("g", 1e3),
            Measure::Mass => ("kg", 1.0),
            Measure::Volume if largest > 0.0 && largest < 1e-4 => ("mL", 1e6),
            Measure::Volume => ("L", 1e3),
            Measure::Energy if largest > 0.0 && largest < 3.6e4 => ("kJ", 1e-3),
            Measure::Energy => ("kWh", 1.0 / 3.6e6),
            Measure::Containers => ("containers", 1.0),
            Measure::WeightedMass => ("kg × score", 1.0),
            Measure::Ratio | Measure::Count => ("", 1.0),
            Measure::Time => ("h", 1.0 / 3600.0),
            Measure::Money(_) | Measure::MoneyOnce(_) => ("", 1.0), // the currency says it
            Measure::Climate => ("kg CO2e", 1.0),
        };
        let (mut shown, mut whole) = (largest * factor, 1);
        while shown >= 10.0 && whole < 12 {
            shown /= 10.0;
            whole += 1;
        }
        let decimals = match measure {
            Measure::Containers | Measure::Count if whole_numbers => 0,
            _ if largest <= 0.0 => 0,
            _ if largest * factor < 1.0 => 3,
            _ => 4_usize.saturating_sub(whole).min(3),
        };
        let currency = match measure {
            Measure::Money(currency) | Measure::MoneyOnce(currency) => Some(currency),
            _ => None,
        };
        Self { unit, currency, factor, decimals }
    }

    /// The unit; empty for a bare number.
    #[must_use]
    pub fn unit(&self) -> &str {
        self.currency.as_ref().map_or(self.unit, Currency::code)
    }

    /// A value (SI) as it stands in the column. What is there but too small to show is said to be less.
    #[must_use]
    pub fn write(&self, value_si: f64) -> String {
        let value = value_si * self.factor;
        if !value.is_finite() {
            return "not finite".to_owned();
        }
        let text = format!("{:.*}", self.decimals, value.abs());
        let zero = text.bytes().all(|b| b == b'0' || b == b'.');
        if zero && value != 0.0 {
            let least =
                format!("{:.*}", self.decimals, 10_f64.powi(-i32::try_from(self.decimals).unwrap_or(0)));
            return format!("< {least}");
        }
        let sign = if value < 0.0 && !zero { "\u{2212}" } else { "" };
        format!("{sign}{}", grouped(&text))
    }

    /// The whole value with its unit, for those who need every digit.
    #[must_use]
    pub fn full(&self, value_si: f64) -> String {
        let unit = self.unit();
        format!("{}{}{unit}", shortest(value_si * self.factor), if unit.is_empty() { "" } else { " " })
    }

    /// The whole value alone, for a spreadsheet.
    #[must_use]
    pub fn plain(&self, value_si: f64) -> String {
        shortest(value_si * self.factor)
    }
}

/// Digits in groups of three from five on, as in ISO 80000-1 (clause from memory).
#[must_use]
pub fn grouped(text: &str) -> String {
    let (whole, rest) = text.split_once('.').map_or((text, ""), |(whole, rest)| (whole, rest));
    let mut out = String::new();
    for (i, digit) in whole.chars().enumerate() {
        if whole.len() > 4 && i > 0 && (whole.len() - i) % 3 == 0 {
            out.push(THIN);
        }
        out.push(digit);
    }
    if !rest.is_empty() {
        out.push('.');
        out.push_str(rest);
    }
    out
}

/// A text of the core with minus signs in place of its hyphens before numbers.
#[must_use]
pub fn with_minus(text: &str) -> String {
    let mut out = String::with_capacity(text.len() + 8);
    let mut before = ' ';
    let mut rest = text.chars().peekable();
    while let Some(c) = rest.next() {
        let negative = c == '-'
            && matches!(before, ' ' | '(' | '\u{202f}')
            && rest.peek().is_some_and(char::is_ascii_digit);
        out.push(if negative { '\u{2212}' } else { c });
        before = c;
    }
    out
}

/// A text as it is shown: a number and its per cent sign never stand on two lines.
#[must_use]
pub fn unbroken(text: &str) -> String {
    text.replace(" %", "\u{202f}%").replace("\u{a0}%", "\u{202f}%")
}

/// A change in per cent of what was there, as text with its sign; nothing where there was nothing.
#[must_use]
pub fn change(before: f64, after: f64) -> Option<String> {
    if before <= 0.0 {
        return None;
    }
    let percent = (after / before - 1.0) * 100.0;
    let shown = format!("{:.0}", percent.abs());
    Some(match shown.as_str() {
        "0" => "no change".to_owned(),
        _ if percent > 900.0 => format!("{:.0} times as much", after / before),
        _ if percent < 0.0 => format!("{shown}\u{202f}% less"),
        _ => format!("{shown}\u{202f}% more"),
    })
}

#[cfg(test)]
mod tests {
    use super::*;

    fn written(measure: Measure, values: &[f64]) -> (&'static str, Vec<String>) {
        let scale = Scale::of(measure, values.iter().copied());
        (scale.unit, values.iter().map(|v| scale.write(*v)).collect())
    }

    #[test]
    fn one_unit_and_the_same_decimals_for_a_column() {
        let (unit, texts) = written(Measure::Mass, &[566.123_4, 4.1, 0.004, 0.0]);
        assert_eq!(unit, "kg");
        assert_eq!(texts, ["566.1", "4.1", "< 0.1", "0.0"]);
        assert_eq!(written(Measure::Mass, &[0.0047, 0.0001]), ("g", vec!["4.700".into(), "0.100".into()]));
        assert_eq!(written(Measure::Mass, &[12_345.6]), ("kg", vec!["12\u{202f}346".into()]));
        assert_eq!(written(Measure::Containers, &[48.0, 3.0]), ("containers", vec!["48".into(), "3".into()]));
        assert_eq!(written(Measure::Count, &[2.0, 0.0]).1, ["2", "0"]);
        assert_eq!(written(Measure::Count, &[2.0, 1.056]).1, ["2.000", "1.056"]);
    }

    #[test]
    fn there_is_no_minus_zero_and_no_hyphen_for_a_minus() {
        let (_, texts) = written(Measure::Mass, &[100.0, -0.0, -12.5]);
        assert_eq!(texts, ["100.0", "0.0", "\u{2212}12.5"]);
    }

    #[test]
    fn the_full_value_has_every_digit() {
        let scale = Scale::of(Measure::Mass, [0.1 + 0.2].into_iter());
        assert_eq!(scale.full(0.1 + 0.2), "0.30000000000000004 kg");
    }

    #[test]
    fn a_change_is_said_in_words() {
        assert_eq!(change(100.0, 18.0).as_deref(), Some("82\u{202f}% less"));
        assert_eq!(change(100.0, 150.0).as_deref(), Some("50\u{202f}% more"));
        assert_eq!(change(1.0, 20.0).as_deref(), Some("20 times as much"));
        assert_eq!(change(1.0, 1.0001).as_deref(), Some("no change"));
        assert_eq!(change(0.0, 2.0), None);
    }

    #[test]
    fn money_has_its_currency_and_a_negative_number_its_sign() {
        let usd = Currency::new("USD").expect("a code");
        assert_eq!(Scale::of(Measure::Money(usd), [12.0].into_iter()).unit(), "USD");
        assert_eq!(
            with_minus("-5383 USD (-2 to 9), 8-hour mean, F001-F005, - none"),
            "\u{2212}5383 USD (\u{2212}2 to 9), 8-hour mean, F001-F005, - none"
        );
    }
}
