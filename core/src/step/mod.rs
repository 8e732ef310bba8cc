//! The techniques: one file each. A technique declares its parameters and rules once, reads itself from a plan's step
//! through a [`Reader`], and runs on the [`Bench`]. Adding one is a new file and one line in [`TECHNIQUES`].

mod caution;
mod clean;
mod common;
mod concentrate;
mod consume;
mod declare;
mod dense;
mod discard;
mod distil;
mod dry;
mod filling;
mod impregnate;
mod liquid_liquid;
mod microwave;
mod mixture;
mod percolate;
mod pressurised_liquid;
mod rinse;
mod solid_phase;
mod soxhlet;
mod supercritical;
mod ultrasonic;
mod vapours;

pub use caution::Caution;
pub use declare::{Control, Measurable, Need, Param, Rule};
pub use dense::{DenseCo2, Metered};
pub(crate) use filling::{Container, Filling};
pub use mixture::{LARGEST, Mixture, Part};
pub use solid_phase::Poured;

use common::{cooling_water, electricity, extract, hold_up};

use crate::chance::Draw;
use crate::ledger::{Bench, Halt, Place};
use crate::program::Reader;

/// A step that has been read from a plan and can run.
pub trait Step {
    /// Moves the mass of one run on the bench.
    ///
    /// # Errors
    /// A [`Halt`] where the step cannot go on: something is short, a state does not exist.
    fn run(&self, x: Draw<'_>, b: &mut Bench<'_>) -> Result<(), Halt>;

    /// How many states of CO2 a run of it asks for at most.
    fn co2_states(&self) -> usize {
        0
    }

    /// What is shown of a step with dense CO2 beside its postings; `None` for all others.
    fn dense(&self, _: Draw<'_>) -> Option<DenseCo2> {
        None
    }
}

/// Under which heading a technique stands on forms and in lists.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum Group {
    /// Takes something out of the sample or the raw material.
    Extraction,
    /// Works on the extract.
    Extract,
    /// What goes with it: glassware, disposables, placing what is left.
    Around,
}

/// A technique: everything the reader, the form, the schema, the documentation and the bench need to know.
pub struct Technique {
    /// The key in the plan.
    pub key: &'static str,
    /// The title shown.
    pub title: &'static str,
    /// What it does, in a sentence or two, and what it leaves out.
    pub about: &'static str,
    /// Its heading.
    pub group: Group,
    /// Where the sample lies when the technique starts, for those that take it in.
    pub takes_feed: Option<Place>,
    /// Its parameters, in the order of the form.
    pub params: &'static [Param],
    /// Its rules; a posting names one by its index.
    pub rules: &'static [Rule],
    /// What can hurt someone, shown beside the step.
    pub cautions: &'static [Caution],
    /// An example step as JSON, read by tests and shown in the documentation.
    pub example: &'static str,
    /// Builds the step. Problems are kept by the reader, so that all of a plan's errors are found at once.
    pub read: fn(&mut Reader<'_, '_>) -> Box<dyn Step>,
}

/// All techniques, in the order in which they are listed.
pub static TECHNIQUES: &[&Technique] = &[
    &soxhlet::TECHNIQUE,
    &ultrasonic::TECHNIQUE,
    &percolate::TECHNIQUE,
    &microwave::TECHNIQUE,
    &pressurised_liquid::TECHNIQUE,
    &supercritical::TECHNIQUE,
    &impregnate::TECHNIQUE,
    &clean::TECHNIQUE,
    &liquid_liquid::TECHNIQUE,
    &solid_phase::TECHNIQUE,
    &concentrate::TECHNIQUE,
    &distil::TECHNIQUE,
    &dry::TECHNIQUE,
    &rinse::TECHNIQUE,
    &consume::TECHNIQUE,
    &discard::TECHNIQUE,
];

/// The technique with this key.
///
/// ```
/// assert_eq!(thimbleworth::step::technique("soxhlet").map(|t| t.title), Some("Soxhlet extraction"));
/// ```
#[must_use]
pub fn technique(key: &str) -> Option<&'static Technique> {
    TECHNIQUES.iter().copied().find(|t| t.key == key)
}
