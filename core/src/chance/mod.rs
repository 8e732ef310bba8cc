//! Uncertainty lives in inputs only. An input has an identity, and a draw of it is a function of that identity and
//! the draw's number alone: draw 17 of "density of n-hexane" is the same number in every route and every plan.

mod draw;
mod input;

pub use draw::{keyed_bits, normal_quantile, unit_interval};
pub use input::{Draw, In, Input, continued_key, identity_key};
