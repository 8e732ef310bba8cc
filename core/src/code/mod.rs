//! Waste codes of one container, from everything that was poured in: United States, European Union, transport.
//!
//! Pure functions over [`Contents`]: what lies in the container, and which solvents came to it as they were before use. Each
//! [`Verdict`] carries the rule with its citation and dates, the figures held against it, and what would change it. Where only a
//! test can clear a code the answer is [`Answer::Test`] or [`Answer::Assumed`], never "no".
//!
//! Help for a licensed person: states and nations may be stricter, and most rules here are from memory or secondary texts.

mod contents;
mod eu;
mod hp;
mod rule;
mod transport;
mod us;
mod us_spent;
mod verdict;

pub use contents::{Activity, Charge, Contents, Flash, Part};
pub(crate) use contents::{is_halogenated, is_hydrocarbon, is_water};
pub use rule::{CAUTION, Rule, rule};
pub use transport::Description;
pub use verdict::{Answer, Fact, Verdict};

use crate::room::Day;

/// Whose rules are read.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub enum Rules {
    /// None: only transport is classified.
    #[default]
    None,
    /// Federal rules of the United States.
    Us,
    /// Rules of the European Union.
    Eu,
}

impl Rules {
    /// The rules that a plan's word means.
    ///
    /// ```
    /// use thimbleworth::code::Rules;
    /// assert_eq!(Rules::of("US"), Rules::Us);
    /// ```
    #[must_use]
    pub fn of(word: &str) -> Self {
        match word {
            "US" => Self::Us,
            "EU" => Self::Eu,
            _ => Self::None,
        }
    }
}

/// Classifies a container under these rules on this day; transport is classified under any rules.
///
/// ```
/// use thimbleworth::code::{Charge, Contents, Part, Rules, classify};
/// use thimbleworth::material::catalogue;
/// let toluene = catalogue().find("toluene").unwrap();
/// let hexane = catalogue().find("hexane").unwrap();
/// // 10 % toluene by volume before use brings F005
/// let drum = Contents {
///     parts: vec![Part::new(toluene, 8.7, 867.0), Part::new(hexane, 59.0, 659.0)],
///     charges: vec![Charge { what: "Soxhlet".into(), volumes_m3: vec![(toluene, 1e-5), (hexane, 9e-5)] }],
///     ..Contents::default()
/// };
/// let verdicts = classify(&drum, Rules::Us, None);
/// let codes: Vec<&str> = verdicts.iter().filter(|v| v.applies()).map(|v| &*v.code).collect();
/// assert!(codes.contains(&"F005") && codes.contains(&"D001") && !codes.contains(&"F003"));
/// ```
#[must_use]
pub fn classify(contents: &Contents<'_>, rules: Rules, as_of: Option<Day>) -> Vec<Verdict> {
    let mut desk = verdict::Desk { verdicts: Vec::new(), as_of };
    if contents.mass_kg() > 0.0 {
        match rules {
            Rules::Us => us::read(contents, &mut desk),
            Rules::Eu => eu::read(contents, &mut desk),
            Rules::None => {}
        }
        transport::read(contents, rules, &mut desk);
    }
    desk.verdicts
}
