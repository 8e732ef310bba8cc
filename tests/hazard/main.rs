//! Hazard scores held against published rows and constructed cases; data and their sources stand beside.
// A check that cannot read its own table must fail loudly, in helper functions too.
#![allow(clippy::expect_used, clippy::panic, clippy::unwrap_used)]
mod chem21;
mod eco_scale;
mod labels;
mod nemi;
mod table;
