//! An amount written again in another unit, as someone would write it who chose that unit.

use super::{Entry, Kind, ShareBy, Spread, read, read_entry, significant, unit};

/// Significant digits of a converted number: enough that nobody's figure changes, too few for what binary
/// arithmetic leaves behind; of a spread, which is a difference, fewer.
const DIGITS: (u32, u32) = (12, 9);

/// `text` in the unit `symbol`, with its spread; nothing where the text is no amount of this kind, where it is money or
/// a fraction by volume or mass (the words behind it would be lost), or where what would be written reads as something
/// else.
///
/// ```
/// use thimbleworth::quantity::{Kind, in_unit};
/// assert_eq!(in_unit("250 ± 5 mL", Kind::Volume, "L").as_deref(), Some("0.25 ± 0.005 L"));
/// assert_eq!(in_unit("68 °F", Kind::Temperature, "°C").as_deref(), Some("20 °C"));
/// assert_eq!(in_unit("a litre", Kind::Volume, "L"), None);
/// ```
#[must_use]
pub fn in_unit(text: &str, kind: Kind, symbol: &str) -> Option<String> {
    let Ok(Entry::Known(amount)) = read_entry(text, kind) else { return None };
    if amount.share_by != ShareBy::Unstated || amount.currency.is_some() {
        return None;
    }
    let unit = unit(symbol, kind).ok()?;
    let (central, number) = (unit.from_si(amount.central_si), |value| significant(value, DIGITS.0));
    let written = match amount.spread {
        Spread::Exact => number(central),
        Spread::Limits { low_si, high_si } => {
            let (low, high) = (unit.from_si(low_si), unit.from_si(high_si));
            let half = significant((high - low) / 2.0, DIGITS.1);
            if significant(central - low, DIGITS.1) == half {
                format!("{} ± {half}", number(central))
            } else {
                format!("{} to {}", number(low), number(high))
            }
        }
        // A difference: the zero of a temperature scale falls out.
        Spread::Standard { u_si } => {
            let u = significant(unit.from_si(amount.central_si + u_si) - central, DIGITS.1);
            format!("{} {symbol} u {u}", number(central))
        }
    };
    let written = format!("{written} {symbol}");
    let again = read(&written, kind).ok()?;
    let near = |a: f64, b: f64, size: f64| (a - b).abs() <= 1e-8 * size.abs();
    let same = near(again.central_si, amount.central_si, amount.central_si)
        && near(again.spread.half_width(), amount.spread.half_width(), amount.central_si);
    same.then_some(written)
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn every_way_of_writing_a_spread_is_kept() {
        for (text, kind, symbol, expected) in [
            ("250mL", Kind::Volume, "L", "0.25 L"),
            ("0,25 l", Kind::Volume, "mL", "250 mL"),
            ("250 mL ± 2 %", Kind::Volume, "mL", "250 ± 5 mL"),
            ("245 to 255 mL", Kind::Volume, "L", "0.25 ± 0.005 L"),
            ("250 mL u 2 mL", Kind::Volume, "L", "0.25 L u 0.002 L"),
            ("250 ± 4 mL (k=2)", Kind::Volume, "L", "0.25 L u 0.002 L"),
            ("20 ± 2 °C", Kind::Temperature, "K", "293.15 ± 2 K"),
            ("20 ± 2 °C", Kind::Temperature, "°F", "68 ± 3.6 °F"),
            ("0 °C", Kind::Temperature, "K", "273.15 K"),
            ("18 h", Kind::Time, "min", "1080 min"),
            ("300 bar", Kind::Pressure, "MPa", "30 MPa"),
            ("0 mL", Kind::Volume, "L", "0 L"),
        ] {
            assert_eq!(in_unit(text, kind, symbol).as_deref(), Some(expected), "{text}");
        }
    }

    #[test]
    fn what_cannot_be_kept_is_left_alone() {
        for (text, kind, symbol) in [
            ("", Kind::Volume, "L"),
            ("not known", Kind::Volume, "L"),
            ("1,234 mL", Kind::Volume, "L"),
            ("50 % v/v", Kind::Fraction, "%"),
            ("12 USD/L", Kind::PricePerVolume, "USD/L"),
            ("5 mL", Kind::Volume, "g"),
        ] {
            assert_eq!(in_unit(text, kind, symbol), None, "{text}");
        }
    }

    #[test]
    fn it_is_the_same_amount_in_every_unit() {
        let mut told = 0;
        for kind in Kind::ALL.into_iter().filter(|k| !k.is_money()) {
            for symbol in super::super::units_of(kind) {
                let Ok(first) = unit(symbol, kind) else { continue };
                if first.share_by() != ShareBy::Unstated {
                    continue;
                }
                let text = format!("0.5 {symbol}");
                for other in super::super::units_of(kind) {
                    if let Some(there) = in_unit(&text, kind, other) {
                        let (there, here) = (read(&there, kind).unwrap(), read(&text, kind).unwrap());
                        assert!(
                            (there.central_si / here.central_si - 1.0).abs() < 1e-11,
                            "{text} in {other}"
                        );
                        told += 1;
                    }
                }
            }
        }
        assert!(told > 200, "only {told} pairs of units");
    }
}
