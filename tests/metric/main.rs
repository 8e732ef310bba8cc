//! Mass metrics and their kin held against published, recomputed and independent values; sources stand beside.
// A check that cannot read its own table must fail loudly, in helper functions too.
#![allow(clippy::expect_used, clippy::panic, clippy::unwrap_used)]
mod combustion;
mod container;
mod mass;
mod staged;
#[path = "../hazard/table.rs"]
mod table;
