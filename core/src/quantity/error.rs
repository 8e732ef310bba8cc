//! What is wrong with an amount: what was found, and what would do.

use super::{Bound, Kind, show};
use crate::letter::sentence;
use std::fmt;

/// Why a text could not be read as an amount. Every value carries what was found; `at` is the place in the text in
/// characters from 0. `found()` and `need()` are sentences without a full stop; `Display` joins them.
///
/// ```
/// use thimbleworth::quantity::{Kind, read};
/// let error = read("1,234 mL", Kind::Volume).unwrap_err();
/// assert_eq!(error.to_string(), "“1,234” can be read in two ways; 1234 mL or 1.234 mL?");
/// assert_eq!(error.at(), Some(0));
/// ```
#[derive(Clone, Debug, PartialEq)]
pub enum AmountError {
    /// Nothing is written.
    Empty {
        /// What is needed.
        kind: Kind,
    },
    /// The text is longer than any amount.
    TooLong {
        /// Its length in characters.
        length: usize,
    },
    /// “not known” where an amount is needed.
    NotKnown {
        /// What is needed.
        kind: Kind,
    },
    /// A word that seems to mean “not known”.
    NotKnownWord {
        /// The word.
        found: String,
    },
    /// No number where one is expected.
    NoNumber {
        /// What stands there.
        found: String,
        /// Where.
        at: usize,
        /// What is needed.
        kind: Kind,
    },
    /// A number that is not well formed.
    BadNumber {
        /// The number.
        found: String,
        /// Where.
        at: usize,
    },
    /// A number too large or too small for the arithmetic.
    NumberOutOfRange {
        /// The number.
        found: String,
        /// Where.
        at: usize,
    },
    /// A number whose comma may be a decimal comma or a mark of thousands.
    AmbiguousNumber {
        /// The number.
        found: String,
        /// Where.
        at: usize,
        /// What it is with a mark of thousands, with the unit that follows.
        thousands: String,
        /// What it is with a decimal comma, with the unit that follows.
        decimal: String,
    },
    /// `<`, `>`, `at most` and the like: a bound on one side.
    OneSided {
        /// The sign.
        found: String,
        /// Where.
        at: usize,
    },
    /// `~`, `about` and the like: a doubt without a size.
    Approximate {
        /// The sign.
        found: String,
        /// Where.
        at: usize,
    },
    /// A number without a unit.
    NoUnit {
        /// The number.
        found: String,
        /// Where the unit is missing.
        at: usize,
        /// What is needed.
        kind: Kind,
    },
    /// A spread without a unit beside an amount that has one: is it relative?
    SpreadWithoutUnit {
        /// The number.
        found: String,
        /// Where the unit is missing.
        at: usize,
        /// The unit of the amount.
        unit: String,
    },
    /// A unit that is not known.
    UnknownUnit {
        /// The unit.
        found: String,
        /// Where.
        at: usize,
        /// What is needed.
        kind: Kind,
        /// A unit that may have been meant.
        suggestion: Option<String>,
    },
    /// A unit that is refused for a reason of its own.
    RefusedUnit {
        /// The unit.
        found: String,
        /// Where.
        at: usize,
        /// The reason or the question.
        reply: &'static str,
    },
    /// A unit of another kind.
    OtherKind {
        /// The unit.
        found: String,
        /// Where.
        at: usize,
        /// What it measures.
        is: Kind,
        /// What is needed.
        kind: Kind,
    },
    /// Two currencies, or two bases of a fraction, in one amount.
    Disagree {
        /// The first.
        first: String,
        /// The second.
        second: String,
        /// Where the second stands.
        at: usize,
    },
    /// A fraction such as `0.95 ± 0.5 %`, in which the sign may belong to one number or to both.
    WhoseSign {
        /// The first number.
        found: String,
        /// The second number with its sign.
        spread: String,
        /// The first number times 100.
        hundredfold: String,
        /// Where.
        at: usize,
    },
    /// A negative spread.
    NegativeSpread {
        /// The spread.
        found: String,
        /// Where.
        at: usize,
    },
    /// A lower limit above the upper one.
    ReversedLimits {
        /// The first limit.
        low: String,
        /// The second limit.
        high: String,
        /// The two in order.
        meant: String,
        /// Where the second stands.
        at: usize,
    },
    /// A spread in per cent of a temperature.
    RelativeTemperature {
        /// The spread.
        found: String,
        /// Where.
        at: usize,
    },
    /// A coverage factor that is not a positive number, or one without `±`.
    BadCoverage {
        /// The text.
        found: String,
        /// Where.
        at: usize,
    },
    /// A count with a spread.
    UncertainCount {
        /// Where the spread stands.
        at: usize,
    },
    /// A count that is not whole.
    NotWhole {
        /// The number.
        found: String,
    },
    /// Text after the end of the amount.
    LeftOver {
        /// The text.
        found: String,
        /// Where.
        at: usize,
    },
    /// A plain number above 1 where a fraction is needed.
    PercentMissing {
        /// The number.
        found: String,
    },
    /// The value, or one of its limits, is physically impossible or absurd.
    OutOfBounds {
        /// What is measured.
        kind: Kind,
        /// Whether it is the value itself or one of its limits.
        which: Which,
        /// The value in SI.
        value_si: f64,
        /// The bounds and their phrase.
        bound: &'static Bound,
    },
}

/// Which value of an amount lies outside the bounds.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Which {
    /// The value itself.
    Value,
    /// The lower limit of its spread.
    LowerLimit,
    /// The upper limit of its spread.
    UpperLimit,
}

impl AmountError {
    /// Where in the text, in characters from 0; `None` where the whole is meant.
    #[must_use]
    pub const fn at(&self) -> Option<usize> {
        match self {
            Self::Empty { .. }
            | Self::TooLong { .. }
            | Self::NotKnown { .. }
            | Self::NotKnownWord { .. }
            | Self::NotWhole { .. }
            | Self::PercentMissing { .. }
            | Self::OutOfBounds { .. } => None,
            Self::NoNumber { at, .. }
            | Self::BadNumber { at, .. }
            | Self::NumberOutOfRange { at, .. }
            | Self::AmbiguousNumber { at, .. }
            | Self::OneSided { at, .. }
            | Self::Approximate { at, .. }
            | Self::NoUnit { at, .. }
            | Self::SpreadWithoutUnit { at, .. }
            | Self::UnknownUnit { at, .. }
            | Self::RefusedUnit { at, .. }
            | Self::OtherKind { at, .. }
            | Self::Disagree { at, .. }
            | Self::WhoseSign { at, .. }
            | Self::NegativeSpread { at, .. }
            | Self::ReversedLimits { at, .. }
            | Self::RelativeTemperature { at, .. }
            | Self::BadCoverage { at, .. }
            | Self::UncertainCount { at }
            | Self::LeftOver { at, .. } => Some(*at),
        }
    }

    /// What was found.
    #[must_use]
    pub fn found(&self) -> String {
        match self {
            Self::Empty { .. } => "nothing is written".to_owned(),
            Self::TooLong { length } => format!("the text has {length} characters"),
            Self::NotKnown { .. } => "“not known” is written".to_owned(),
            Self::NotKnownWord { found } => format!("“{found}” is not an amount"),
            Self::NoNumber { found, .. } if found.is_empty() => "a number is missing".to_owned(),
            Self::NoNumber { found, .. } => format!("“{found}” does not start with a number"),
            Self::BadNumber { found, .. } => format!("“{found}” is not a well-formed number"),
            Self::NumberOutOfRange { found, .. } => format!("the number “{found}” is beyond any amount"),
            Self::AmbiguousNumber { found, .. } => format!("“{found}” can be read in two ways"),
            Self::OneSided { found, .. } => format!("“{found}” gives a limit on one side only"),
            Self::Approximate { found, .. } => format!("“{found}” gives a doubt without a size"),
            Self::NoUnit { found, .. } => format!("“{found}” has no unit"),
            Self::SpreadWithoutUnit { found, .. } => format!("the spread “{found}” has no unit"),
            Self::UnknownUnit { found, .. } => format!("the unit “{found}” is not known here"),
            Self::RefusedUnit { found, .. } => format!("the unit “{found}” is not accepted"),
            Self::OtherKind { found, is, .. } => format!("“{found}” measures {}", is.words()),
            Self::Disagree { first, second, .. } => {
                format!("“{first}” and “{second}” stand in one amount")
            }
            Self::WhoseSign { found, spread, .. } => format!("“{found} ± {spread}” can be read in two ways"),
            Self::NegativeSpread { found, .. } => format!("the spread “{found}” is negative"),
            Self::ReversedLimits { low, high, .. } => {
                format!("the limits are reversed: “{low}” is above “{high}”")
            }
            Self::RelativeTemperature { found, .. } => {
                format!("the spread “{found}” of a temperature is relative")
            }
            Self::BadCoverage { found, .. } => format!("the coverage factor “{found}” cannot be used"),
            Self::UncertainCount { .. } => "a whole number has a spread".to_owned(),
            Self::NotWhole { found } => format!("“{found}” is not a whole number"),
            Self::PercentMissing { found } => format!("“{found}” is above 1, and a fraction is not"),
            Self::LeftOver { found, .. } => format!("“{found}” stands after the amount"),
            Self::OutOfBounds { kind, which, value_si, bound } => {
                let value = show(*value_si, *kind);
                let which = match which {
                    Which::Value => String::new(),
                    Which::LowerLimit => "the lower limit, ".to_owned(),
                    Which::UpperLimit => "the upper limit, ".to_owned(),
                };
                let comma = if which.is_empty() { "" } else { "," };
                let side = if bound.is_below(*value_si) { "too low" } else { "too high" };
                format!("{which}{value}{comma} is {side}")
            }
        }
    }

    /// What would do.
    #[must_use]
    pub fn need(&self) -> String {
        match self {
            Self::Empty { kind } => like(*kind),
            Self::TooLong { .. } => format!("an amount has at most {} characters", super::LONGEST),
            Self::NotKnown { kind } => format!("a value is needed here{}", examples(*kind)),
            Self::NotKnownWord { .. } => "write “not known” if that is meant".to_owned(),
            Self::NoNumber { kind, .. } => like(*kind),
            Self::BadNumber { .. } => "write it like 1234.5, 1 234.5, 1.2e3 or 1.2×10^3".to_owned(),
            Self::NumberOutOfRange { .. } => "check the power of ten".to_owned(),
            Self::AmbiguousNumber { thousands, decimal, .. } => format!("{thousands} or {decimal}?"),
            Self::OneSided { .. } => "write both limits, like 0 to 5 mL".to_owned(),
            Self::Approximate { .. } => "write the size of the doubt, like 250 ± 25 mL".to_owned(),
            Self::NoUnit { kind, .. } => like(*kind),
            Self::SpreadWithoutUnit { found, unit, .. } if unit.starts_with('%') => {
                format!("{found} {unit}?")
            }
            Self::SpreadWithoutUnit { found, unit, .. } => format!("{found} {unit} or {found} %?"),
            Self::UnknownUnit { kind, suggestion, .. } => match suggestion {
                Some(unit) => format!("is “{unit}” meant? {}", sentence(&accepted(*kind))),
                None => accepted(*kind),
            },
            Self::RefusedUnit { reply, .. } => (*reply).to_owned(),
            Self::OtherKind { kind, .. } => format!("{} is needed{}", kind.words(), examples(*kind)),
            Self::Disagree { .. } => "write one of them throughout".to_owned(),
            Self::WhoseSign { found, spread, hundredfold, .. } => {
                format!("{found} % ± {spread} or {hundredfold} % ± {spread}?")
            }
            Self::NegativeSpread { .. } => "write it without the minus sign".to_owned(),
            Self::ReversedLimits { meant, .. } => format!("is {meant} meant?"),
            Self::RelativeTemperature { .. } => "write it in kelvin, like 12 ± 3 °C".to_owned(),
            Self::BadCoverage { .. } => "write it after ±, above 0, like 250 ± 4 mL (k=2)".to_owned(),
            Self::UncertainCount { .. } => "write the number alone; a count is exact".to_owned(),
            Self::NotWhole { .. } => like(Kind::Count),
            Self::LeftOver { .. } => {
                "write one amount: 250 mL, 250 ± 5 mL, 250 mL u 2 mL, 250 ± 4 mL (k=2) or 245 to 255 mL"
                    .to_owned()
            }
            Self::PercentMissing { found } => format!("write {found} % if per cent is meant"),
            Self::OutOfBounds { bound, .. } => bound.phrase.to_owned(),
        }
    }
}

fn like(kind: Kind) -> String {
    format!("write {}{}", kind.words(), examples(kind))
}

fn examples(kind: Kind) -> String {
    let [one, other] = kind.examples();
    format!(", like {one} or {other}")
}

fn accepted(kind: Kind) -> String {
    let units = super::units_of(kind);
    if units.iter().all(|unit| unit.is_empty()) {
        return format!("{} takes no unit", kind.words());
    }
    let listed: Vec<&str> = units.iter().copied().filter(|unit| !unit.is_empty()).collect();
    format!("{} is written in {}", kind.words(), listed.join(", "))
}

impl fmt::Display for AmountError {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        write!(f, "{}; {}", self.found(), self.need())
    }
}

impl std::error::Error for AmountError {}
