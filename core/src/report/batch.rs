//! A liquid on its way down, as a table.

use super::energy::Sheet;
use crate::account::BatchPath;
use crate::quantity::{Kind, show};

/// At most so many rows.
const ROWS: usize = 8;

/// The way down of one step: what is left, how warm, under which pressure, of what liquid and vapour consist.
///
/// `name` is that of the step. The first and the last row are the charge and what is left.
#[must_use]
pub(super) fn batch_sheet(name: &str, path: &BatchPath) -> Sheet {
    let shares = |by_mass: &[f64]| {
        let mut words = String::new();
        for (of, share) in path.names.iter().zip(by_mass) {
            if !words.is_empty() {
                words += ", ";
            }
            words += of;
            words += " ";
            words += &show(*share, Kind::Fraction);
        }
        words
    };
    let last = path.points.len().saturating_sub(1);
    let step = last / ROWS + 1;
    let rows = path.points.iter().enumerate().filter(|(i, _)| i % step == 0 || *i == last).map(|(_, p)| {
        vec![
            show(p.volume_m3, Kind::Volume),
            show(p.temperature_k, Kind::Temperature),
            show(p.pressure_pa, Kind::Pressure),
            shares(&p.liquid),
            shares(&p.vapour),
        ]
    });
    Sheet {
        title: ["Way down: ", name].concat(),
        head: vec!["left", "temperature", "boils under", "liquid by mass", "vapour by mass"],
        rows: rows.collect(),
        notes: vec![
            "One run, a single stage (Rayleigh), activity by Wilson's equation where constants are known; what is dissolved is left out."
                .to_owned(),
        ],
    }
}
