//! The four yes/no rules of the NEMI profile of an analytical method.
//!
//! Source: Keith, Gron, Young, Chem. Rev. 2007, 107, 2695: (1) no reagent is on the list of persistent,
//! bioaccumulative, toxic chemicals of the US Toxics Release Inventory; (2) no reagent is a listed RCRA hazardous
//! waste (D, F, P or U); (3) pH stays above 2 and below 12; (4) less than 50 g of waste a sample. A rule that cannot
//! be judged is "not known", never a pass. The lists change: the caller states what is listed, and as of when.
use crate::source::{Source, Standing};

/// The profile's rules.
pub const SOURCE: Source = Source::new("Keith, Gron, Young, Chem. Rev. 2007, 107, 2695", Standing::Secondary);

/// The waste of a sample from which rule 4 fails, kg: exactly 50 g fails.
pub const WASTE_LIMIT_KG: f64 = 0.050;

/// Whether a rule is met.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Answer {
    /// The rule is met.
    Yes,
    /// The rule is not met.
    No,
    /// Not enough is known to judge.
    NotKnown,
}

impl Answer {
    /// The word shown.
    #[must_use]
    pub const fn word(self) -> &'static str {
        match self {
            Self::Yes => "yes",
            Self::No => "no",
            Self::NotKnown => "not known",
        }
    }
}

/// The acidity that a procedure goes through.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Acidity {
    /// No water phase, so no pH: counted as met, which is our reading; the paper speaks of pH only.
    NoWaterPhase,
    /// The lowest and the highest pH.
    Range {
        /// Lowest pH.
        lowest: f64,
        /// Highest pH.
        highest: f64,
    },
    /// Not known.
    NotKnown,
}

/// What the rules are judged from.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Inputs<'a> {
    /// The reagents on the PBT list, by name; empty where none is; `None` where nobody has looked.
    pub pbt: Option<&'a [&'a str]>,
    /// The reagents that become a listed RCRA waste, each with its code; empty where none does; `None` where nobody
    /// has looked.
    pub rcra: Option<&'a [&'a str]>,
    /// The pH that the procedure goes through.
    pub acidity: Acidity,
    /// All waste of one sample, kg; `None` where it is not known.
    pub waste_kg_per_sample: Option<f64>,
}

/// One rule, whether it is met, and why.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Criterion {
    /// The rule in a few words.
    pub rule: &'static str,
    /// Whether it is met.
    pub met: Answer,
    /// Why, as a sentence without a full stop.
    pub why: String,
}

/// The four rules in the order of the paper.
///
/// ```
/// use thimbleworth::hazard::nemi::{profile, Acidity, Answer, Inputs};
/// let extraction = profile(&Inputs {
///     pbt: Some(&[]),
///     rcra: Some(&["dichloromethane (F002)"]),
///     acidity: Acidity::Range { lowest: 1.8, highest: 7.0 },
///     waste_kg_per_sample: Some(0.050),
/// });
/// let met: Vec<_> = extraction.iter().map(|c| c.met).collect();
/// assert_eq!(met, [Answer::Yes, Answer::No, Answer::No, Answer::No]);
/// ```
#[must_use]
pub fn profile(inputs: &Inputs<'_>) -> [Criterion; 4] {
    let (acid_met, acid_why) = acidity(inputs.acidity);
    let (waste_met, waste_why) = waste(inputs.waste_kg_per_sample);
    let (pbt_met, pbt_why) = listed(inputs.pbt, "the PBT list");
    let (rcra_met, rcra_why) = listed(inputs.rcra, "the RCRA lists");
    [
        Criterion { rule: "no reagent on the PBT list", met: pbt_met, why: pbt_why },
        Criterion { rule: "no reagent a listed RCRA waste", met: rcra_met, why: rcra_why },
        Criterion { rule: "pH above 2 and below 12", met: acid_met, why: acid_why },
        Criterion { rule: "less than 50 g of waste a sample", met: waste_met, why: waste_why },
    ]
}

fn listed(found: Option<&[&str]>, list: &str) -> (Answer, String) {
    match found {
        None => (Answer::NotKnown, format!("the reagents were not held against {list}")),
        Some([]) => (Answer::Yes, format!("no reagent is on {list}")),
        Some(names) => (Answer::No, format!("on {list}: {}", names.join(", "))),
    }
}

fn acidity(acidity: Acidity) -> (Answer, String) {
    match acidity {
        Acidity::NoWaterPhase => (Answer::Yes, "there is no water phase, so no pH".to_owned()),
        Acidity::NotKnown => (Answer::NotKnown, "the pH is not known".to_owned()),
        Acidity::Range { lowest, highest } if !(lowest.is_finite() && highest.is_finite()) => {
            (Answer::NotKnown, format!("the pH range {lowest} to {highest} is no range"))
        }
        Acidity::Range { lowest, highest } if highest < lowest => {
            (Answer::NotKnown, format!("the lowest pH, {lowest}, is above the highest, {highest}"))
        }
        Acidity::Range { lowest, .. } if lowest <= 2.0 => {
            (Answer::No, format!("the pH falls to {lowest}, which is not above 2"))
        }
        Acidity::Range { highest, .. } if highest >= 12.0 => {
            (Answer::No, format!("the pH rises to {highest}, which is not below 12"))
        }
        Acidity::Range { lowest, highest } => {
            (Answer::Yes, format!("the pH stays from {lowest} to {highest}"))
        }
    }
}

fn waste(waste_kg: Option<f64>) -> (Answer, String) {
    let Some(waste_kg) = waste_kg else {
        return (Answer::NotKnown, "the waste of a sample is not known".to_owned());
    };
    if !waste_kg.is_finite() || waste_kg < 0.0 {
        return (Answer::NotKnown, format!("the waste of a sample is given as {waste_kg} kg"));
    }
    let grams = waste_kg * 1000.0;
    // A sum of postings may end a rounding error below 50 g; the rule counts that as 50 g.
    if waste_kg < WASTE_LIMIT_KG * (1.0 - 1e-9) {
        (Answer::Yes, format!("{grams:.1} g, below 50 g"))
    } else {
        (Answer::No, format!("{grams:.1} g, not below 50 g"))
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn exactly_fifty_grams_fails_and_rounding_does_not_save_it() {
        assert_eq!(waste(Some(0.0499)).0, Answer::Yes);
        assert_eq!(waste(Some(0.05)).0, Answer::No);
        assert_eq!(waste(Some(0.05 - 1e-15)).0, Answer::No);
    }

    #[test]
    fn what_nobody_looked_up_is_no_pass() {
        let blank = Inputs { pbt: None, rcra: None, acidity: Acidity::NotKnown, waste_kg_per_sample: None };
        assert!(profile(&blank).iter().all(|c| c.met == Answer::NotKnown && !c.why.is_empty()));
    }

    #[test]
    fn ends_of_the_ph_range_fail() {
        let met = |lowest, highest| acidity(Acidity::Range { lowest, highest }).0;
        assert_eq!(met(2.0, 7.0), Answer::No);
        assert_eq!(met(7.0, 12.0), Answer::No);
        assert_eq!(met(2.1, 11.9), Answer::Yes);
        assert_eq!(met(f64::NAN, 7.0), Answer::NotKnown);
        assert_eq!(met(9.0, 7.0), Answer::NotKnown);
    }
}
