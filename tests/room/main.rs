//! The air of a room against printed examples, a realistic case worked by hand, and itself a second way.
// The readers of the data stand outside the test functions, where the leave for tests does not reach.
#![allow(clippy::unwrap_used, clippy::panic)]

mod cylinder;
mod integration;
mod laboratory;
mod limits;
mod plan;
mod printed;

use thimbleworth::room::HOUR_S;

/// Molar mass of carbon dioxide, kg/mol, as the cases state it.
const CO2_KG_MOL: f64 = 0.044_009_8;
/// 20 °C.
const T_K: f64 = 293.15;
/// One atmosphere.
const P_PA: f64 = 101_325.0;

/// Air changes an hour, per second.
fn per_hour(n: f64) -> f64 {
    n / HOUR_S
}

/// Within a relative tolerance.
#[track_caller]
fn near(found: f64, wanted: f64, relative: f64) {
    assert!((found / wanted - 1.0).abs() <= relative, "{found}, not {wanted} within {relative}");
}
