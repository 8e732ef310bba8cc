//! Uncertainty lives in inputs only. An input has an identity, and a draw of it is a function of that identity and
//! the draw's number alone: draw 17 of "density of n-hexane" is the same number in every route and every plan.
//!
//! Here are the draws and what columns of them say; which routes are drawn, and what is compared, is decided in
//! [`odds`](crate::odds).

mod draw;
mod input;
mod propagate;
mod share;
mod summary;

pub use draw::{keyed_bits, normal_quantile, unit_interval};
pub use input::{Draw, In, Input, continued_key, identity_key};
pub use propagate::{combined_uncertainty, contribution};
pub use share::{FEWEST_FOR_SHARES, variance_share};
pub use summary::{FEWEST_DRAWS, Interval, Summary, mean_and_deviation, summary};
