//! Each route beside the present one, on the same work.

mod difference;
mod finding;

pub use difference::{Cause, Comparison, Difference, RouteComparison, absent_is_zero, compare};
pub use finding::HEADLINES;
