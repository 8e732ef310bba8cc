//! May this go into that container? Codes gained, what must not meet, the mark for density, headspace, the container's material; and
//! the drain, which is closed unless the site names a permit.
//!
//! Pure functions. A "no finding" is no permission: help for whoever knows the waste.

mod check;
mod empty;
mod meet;

pub use check::{DRAIN, Finding, PourCheck, Severity, Vessel, drain, into_vessel};
pub use empty::{EMPTY, Residue, is_empty};
