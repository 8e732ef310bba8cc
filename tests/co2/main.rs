//! Evidence for carbon dioxide: published tables, a solution with many digits, and the equation term by term.
// Helpers of tests may panic: that is how a test fails.
#![allow(clippy::unwrap_used, clippy::panic)]

mod consistency;
mod inverse;
mod naive;
mod refusals;
mod saturation;
mod states;
mod table;
mod viscosity;
