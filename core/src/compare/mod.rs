//! Each route beside the present one, on the same work.

mod difference;
mod finding;

pub use difference::{Cause, Comparison, Difference, RouteComparison, compare};
pub use finding::HEADLINES;
