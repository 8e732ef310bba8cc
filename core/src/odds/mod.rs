//! How sure the figures are: the whole plan drawn again and again (JCGM 101:2008), every route by the same draws.
//!
//! | file | what it holds |
//! | --- | --- |
//! | `sampled` | the sampled run of a plan, in slices, followed through edits |
//! | `column` | the draws of one route: a column for each figure |
//! | `reading` | what the columns say: intervals, odds, what matters most, first-order propagation beside them |
//!
//! Draws in which a route stops are counted by step and kind and left out; with more than [`MOST_STOPPED`] of them no
//! interval is given. A gas stream that is too short in a draw goes on until the mark is reached: the draw counts with the longer
//! time, and is told ([`RouteColumns::longer`]); a plan that asks for less than its own gas needs is stopped before.

mod column;
mod name;
mod reading;
mod sampled;

pub use column::{MOST_STOPPED, RouteColumns, Stopped};
pub use name::input_words;
pub use reading::{Brief, FigureReading, Matter, Reading, Rival, Spreading};
pub use sampled::{MOST_CELLS, Sampled, Wish};

use crate::account::{Figure, Group};
use crate::compare::HEADLINES;

/// Whether a figure is one of those that people decide by: the headline figures, what a case rests on, the lines of climate,
/// and E-factor and process mass intensity where there is a product.
#[must_use]
pub fn headline(figure: &Figure) -> bool {
    let id = figure.id.as_str();
    HEADLINES.iter().any(|(h, _)| *h == id)
        || matches!(id, "cost.year" | "cost.once" | "cost.back")
        || figure.group == Group::Climate
        || figure.group == Group::Metric && matches!(id, "metric.e_factor.net" | "metric.pmi.net")
}
