//! The catalogue of materials against figures from outside the project, and checksums of meaning over its tables.
// The readers of the tables stand outside the test functions, where the leave for tests does not reach.
#![allow(clippy::unwrap_used, clippy::panic)]

mod figures;
mod table;
mod tables;
