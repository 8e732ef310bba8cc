//! Waste codes of containers against worked classifications, and routes against the waste that practice expects of them.
#![allow(missing_docs, clippy::unwrap_used, clippy::expect_used, clippy::panic)]

mod cases;
mod desk;
