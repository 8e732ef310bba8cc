//! What the evidence shares: tolerances, and reading of the tables beside each check.

/// The Rust in the README compiles and runs.
#[cfg(doctest)]
#[doc = include_str!("../README.md")]
struct Readme;

/// The Rust in the page for developers compiles and runs.
#[cfg(doctest)]
#[doc = include_str!("../DEVELOPERS.md")]
struct Developers;
