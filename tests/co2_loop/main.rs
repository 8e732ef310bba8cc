//! Evidence for the energies of loops: another program's cycles, and the same energies by integration.
// Helpers of tests may panic: that is how a test fails.
#![allow(clippy::unwrap_used, clippy::panic)]

mod cycles;
mod second_way;
// The same reading as for the states; not all of it is needed here.
#[path = "../co2/table.rs"]
#[allow(dead_code)]
mod table;
mod vessels;
