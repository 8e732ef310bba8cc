//! The accounts: one file each, from the closed book to named figures.
//!
//! A figure is data: a sum over cells of the book, a ratio of two figures, a number of containers. So each opens into the
//! postings behind it, and the same figure can be evaluated for any draw.

mod air;
mod batch;
mod carbon_dioxide;
mod climate;
mod cost;
mod desk;
mod energy;
mod figure;
mod hazard;
mod mass;
mod metric;
mod open;
mod poured;
mod time;
mod waste;
mod working;

pub use air::{AirAccount, AirRelease, Clears, GasInRoom, Held, SHIFT_S, SuddenInRoom};
pub use batch::{BatchPath, BatchPoint, batch_paths};
pub use desk::{Headroom, MonthLine, SiteDesk, Standing, StreamDesk, classified, site_desk};
pub use energy::{StepEnergy, by_step};
pub use figure::{
    Draft, Entry, Factor, Figure, Group, How, Line, Measure, Term, evaluate, evaluate_these,
    with_what_they_rest_on,
};
pub use hazard::{HazardAccount, MaterialHazard};
pub use mass::place_name;
pub use metric::Refusal;
pub use open::{Account, RouteAccount, WorkloadAccount, account, account_text, rule_of};
pub use poured::{Pouring, StreamContents, poured};
pub use working::{Contribution, behind, describe};
