//! Evidence for dense carbon dioxide: solvent strength, solubility, extraction curves, search.
// Helpers of tests may panic: that is how a test fails.
#![allow(clippy::unwrap_used, clippy::panic)]

mod curves;
mod searching;
mod solubility;
#[path = "../co2/table.rs"]
mod table;
