//! The lines of the map of carbon dioxide: a line of equal density is the pressure p(T, ρ), which the equation of state
//! gives without a search.

use thimbleworth::co2::{
    CRITICAL_TEMPERATURE_K, StateError, TRIPLE_TEMPERATURE_K, pressure_pa, saturated_densities_kg_m3,
};
use thimbleworth::order;

/// What the map shows; °C and bar.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) struct Frame {
    pub(super) low_c: f64,
    pub(super) high_c: f64,
    pub(super) high_bar: f64,
}
/// The lines of equal density; kg/m³.
pub(super) const LEVELS_KG_M3: [f64; 11] =
    [100.0, 200.0, 300.0, 400.0, 500.0, 600.0, 700.0, 800.0, 900.0, 1000.0, 1100.0];

/// The pressure of a density at each temperature of the rows, bar; and whether it lies on the saturation line there.
fn level(rows_c: &[f64], density: f64) -> Vec<(f64, bool)> {
    rows_c
        .iter()
        .map(|c| match pressure_pa(c + 273.15, density) {
            Ok(pa) => (pa / 1e5, false),
            Err(StateError::TwoPhase { saturation_pressure_pa, .. }) => (saturation_pressure_pa / 1e5, true),
            // Beyond the equation of state: beyond the frame as well.
            Err(_) => (f64::MAX, false),
        })
        .collect()
}

/// The temperatures at which lines are computed: evenly spaced, and those at which a line leaves the saturation line; °C.
fn rows(frame: Frame) -> Vec<f64> {
    let count = 40;
    let even =
        (0..=count).map(|i| frame.low_c + (frame.high_c - frame.low_c) * f64::from(i) / f64::from(count));
    let leave = LEVELS_KG_M3.iter().map(|density| saturated_at_k(*density) - 273.15);
    let mut rows: Vec<f64> =
        even.chain(leave.filter(|c| *c > frame.low_c)).chain([CRITICAL_TEMPERATURE_K - 273.15]).collect();
    order::sort(&mut rows, &|a, b| a < b);
    rows
}

/// The temperature at which the saturated liquid or vapour has this density: halving, since both change steadily.
fn saturated_at_k(density: f64) -> f64 {
    let (mut low_k, mut high_k) = (TRIPLE_TEMPERATURE_K, CRITICAL_TEMPERATURE_K);
    for _ in 0..40 {
        let middle_k = (low_k + high_k) / 2.0;
        let apart = saturated_densities_kg_m3(middle_k)
            .is_ok_and(|(liquid, vapour)| vapour < density && density < liquid);
        if apart {
            low_k = middle_k;
        } else {
            high_k = middle_k;
        }
    }
    low_k
}

/// The part of a line outside the two-phase region and inside the frame, with the point at which it leaves the frame;
/// bar and °C.
pub(super) fn inside(rows_c: &[f64], level: &[(f64, bool)], frame: Frame) -> Vec<(f64, f64)> {
    let all: Vec<(f64, f64, bool)> =
        rows_c.iter().zip(level).map(|(c, (bar, two))| (*bar, *c, *two)).collect();
    let mut out = Vec::new();
    for (i, (bar, c, two_phase)) in all.iter().enumerate() {
        // The last row with two phases is where the line leaves the saturation line.
        if *two_phase && all.get(i + 1).is_none_or(|next| next.2) {
            continue;
        }
        if *bar <= frame.high_bar {
            out.push((*bar, *c));
        } else {
            if let (Some((b, d)), true) = (out.last(), *bar < 1e6) {
                let share = (frame.high_bar - b) / (bar - b);
                out.push((frame.high_bar, d + share * (c - d)));
            }
            break;
        }
    }
    out
}

/// The lines of a map, the same for both drawings.
pub(super) struct Lines {
    /// The temperatures; °C.
    pub(super) rows_c: Vec<f64>,
    /// For each density the pressure at each temperature, bar, and whether two phases exist there.
    pub(super) levels: Vec<Vec<(f64, bool)>>,
}

impl Lines {
    pub(super) fn of(frame: Frame) -> Self {
        let rows_c = rows(frame);
        let levels = LEVELS_KG_M3.iter().map(|l| level(&rows_c, *l)).collect();
        Self { rows_c, levels }
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use thimbleworth::co2::{CRITICAL_DENSITY_KG_M3, density_kg_m3};

    /// Lines come from p(T, ρ), the table from ρ(T, p): two ways through the equation of state.
    #[test]
    fn lines_of_equal_density_are_where_the_density_is() {
        let frame = Frame { low_c: -20.0, high_c: 100.0, high_bar: 400.0 };
        let rows_c = rows(frame);
        for wanted in LEVELS_KG_M3 {
            let line = inside(&rows_c, &level(&rows_c, wanted), frame);
            for (b, c) in &line {
                let found = match density_kg_m3(c + 273.15, b * 1e5) {
                    Err(StateError::TwoPhase { liquid_kg_m3, vapour_kg_m3, .. }) => {
                        if wanted > CRITICAL_DENSITY_KG_M3 { liquid_kg_m3 } else { vapour_kg_m3 }
                    }
                    other => other.unwrap(),
                };
                assert!((found / wanted - 1.0).abs() < 1e-4, "{wanted} at {c} °C, {b} bar: {found}");
            }
        }
    }

    #[test]
    fn no_frame_holds_a_solid() {
        for c in [-30.0, -20.0] {
            assert!(thimbleworth::co2::melting_pressure_pa(c + 273.15).unwrap() > 1000e5);
        }
    }
}
