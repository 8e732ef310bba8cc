//! What a traced run records: every posting, the numbers put into its rule, every utility spent.

use super::{Material, Place, RuleIx, Utility};
use crate::quantity::Kind;

/// A step of a route, or one of the book's own acts: taking the sample in, placing what is left.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum StepIx {
    /// The feed taken in, before the step with this index.
    Opening,
    /// The step with this index in the route.
    Step(u16),
    /// What is left placed at the end.
    Closing,
}

/// A mass moved from one place to another, because of one step, by one rule.
#[derive(Clone, Debug, PartialEq)]
pub struct Posting {
    /// The step that moved it.
    pub step: StepIx,
    /// The rule, in the table of the step's technique (or of the book itself).
    pub rule: RuleIx,
    /// From here.
    pub from: Place,
    /// To here.
    pub to: Place,
    /// What moved.
    pub material: Material,
    /// How much; kg in one run of the step.
    pub kg: f64,
    /// How often the step runs; a year.
    pub runs_a_year: f64,
    /// How long it takes in one run, where it goes to air and the step says so; s. 0 is all at once.
    pub over_s: Option<f64>,
    /// Whether a measured figure took the place of the computed one.
    pub measured: bool,
}

impl Posting {
    /// How much moves in a year; kg.
    #[must_use]
    pub fn kg_a_year(&self) -> f64 {
        self.kg * self.runs_a_year
    }
}

/// One number put into a rule.
#[derive(Clone, Debug, PartialEq)]
pub struct Note {
    /// The step.
    pub step: StepIx,
    /// The rule.
    pub rule: RuleIx,
    /// The symbol in the rule's equation.
    pub symbol: &'static str,
    /// Its value; SI.
    pub value_si: f64,
    /// What it measures.
    pub kind: Kind,
}

/// Something odd that a step found while it ran, which does not stop it.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Doubt {
    /// The step.
    pub step: StepIx,
    /// The rule.
    pub rule: RuleIx,
    /// What was found; the value follows it.
    pub found: &'static str,
    /// The value; SI.
    pub value_si: f64,
    /// What it measures.
    pub kind: Kind,
    /// What would do.
    pub need: &'static str,
}

/// A utility spent by one step.
#[derive(Clone, Debug, PartialEq)]
pub struct Spending {
    /// The step that spent it.
    pub step: StepIx,
    /// The rule.
    pub rule: RuleIx,
    /// What was spent.
    pub utility: Utility,
    /// How much in one run; SI (J or kg).
    pub amount_si: f64,
    /// How often the step runs; a year.
    pub runs_a_year: f64,
}

/// A liquid mixture that a step takes down, as it lies there before.
#[derive(Clone, Debug, PartialEq)]
pub struct Batch {
    /// The step, by its index in the route.
    pub step: u16,
    /// Masses; kg in a run.
    pub kg: Vec<(Material, f64)>,
    /// The temperature at which volumes are read; K.
    pub volumes_at_k: f64,
    /// Temperature of the liquid; K.
    pub temperature_k: f64,
    /// Volume left at the end; m³.
    pub down_to_m3: f64,
    /// Whether it boils under a held pressure, so that it grows warmer; else the temperature is held.
    pub boils: bool,
}

/// The record of one traced run.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Trace {
    /// Every posting in order, zeros included.
    pub postings: Vec<Posting>,
    /// Every utility spent.
    pub spendings: Vec<Spending>,
    /// The numbers put into the rules.
    pub notes: Vec<Note>,
    /// What is odd, as warnings of the account.
    pub doubts: Vec<Doubt>,
    /// Mixtures taken down.
    pub batches: Vec<Batch>,
}

impl Trace {
    /// The numbers put into one rule of one step, in order.
    pub fn working(&self, step: StepIx, rule: RuleIx) -> impl Iterator<Item = &Note> {
        self.notes.iter().filter(move |n| n.step == step && n.rule == rule)
    }
}
