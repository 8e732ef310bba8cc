//! How a liquid changes while it is taken down: what is left, at which temperature it boils, under which pressure.

use super::open::RouteAccount;
use crate::ledger::Batch;
use crate::mixture::{Component, Hold, LARGEST, Mixture, Pairs};
use crate::program::RouteProgram;

/// The liquid at one moment of its way down.
#[derive(Clone, Debug, PartialEq)]
pub struct BatchPoint {
    /// Volume left; m³.
    pub volume_m3: f64,
    /// Temperature of the liquid; K.
    pub temperature_k: f64,
    /// Pressure under which it boils; Pa.
    pub pressure_pa: f64,
    /// Shares of the liquid's mass, in the order of the names.
    pub liquid: Vec<f64>,
    /// Shares of the vapour's mass.
    pub vapour: Vec<f64>,
}

/// The way down of one concentration or distillation, central values.
#[derive(Clone, Debug, PartialEq)]
pub struct BatchPath {
    /// The step, by its index in the route.
    pub step: usize,
    /// What lies there, by the names of the book.
    pub names: Vec<String>,
    /// From the charge to what is left.
    pub points: Vec<BatchPoint>,
}

/// The ways down of a route's mixtures, by Rayleigh's equation with control of its error; a draw takes the quick way
/// (see [`Held::take_down`](crate::mixture::Held::take_down)).
///
/// A concentration holds its temperature, and the pressure under which the liquid boils falls; a distillation holds the pressure under
/// which the charge boils at the stated temperature of the pot. Left out are single liquids, those that do not mix, and ways
/// that leave the range of an equation.
///
/// ```
/// use thimbleworth::{account::{account_text, batch_paths}, example::EXAMPLES};
/// let account = account_text(EXAMPLES[0].text);
/// let work = &account.program.as_ref().unwrap().workloads[0];
/// let paths = batch_paths(&work.routes[0], account.workloads[0].routes[0].as_ref().unwrap());
/// // hexane and acetone 1:1 end as hexane
/// let (first, last) = (&paths[0].points[0], paths[0].points.last().unwrap());
/// assert!(last.liquid[0] > 0.98 && first.liquid[0] < 0.6 && last.volume_m3 < first.volume_m3);
/// ```
#[must_use]
pub fn batch_paths(route: &RouteProgram, account: &RouteAccount) -> Vec<BatchPath> {
    account.trace.batches.iter().filter_map(|batch| path(route, batch)).collect()
}

fn path(route: &RouteProgram, batch: &Batch) -> Option<BatchPath> {
    let there: Vec<_> = batch
        .kg
        .iter()
        .filter(|(_, kg)| *kg > 0.0)
        .filter_map(|(m, kg)| Some((route.materials.get(m.0 as usize)?, *kg)))
        .collect();
    if there.len() < 2 || there.len() > LARGEST {
        return None;
    }
    let substances: Vec<_> = there.iter().map(|(m, _)| &*m.substance).collect();
    let pairs = Pairs::between(&substances).ok()?;
    let mut components = Vec::new();
    for (material, _) in &there {
        components.push(Component::of(&material.substance, batch.volumes_at_k).ok()?);
    }
    let mixture = Mixture::new(&components, &pairs).ok()?;
    let amounts: Vec<f64> =
        there.iter().zip(&components).map(|((_, kg), c)| kg / c.molar_mass_kg_mol).collect();
    let hold = if batch.boils {
        Hold::Pressure(mixture.bubble_pressure_pa(&amounts, batch.temperature_k).ok()?)
    } else {
        Hold::Temperature(batch.temperature_k)
    };
    let by_mass = |parts: &[f64; LARGEST]| {
        let kg: Vec<f64> = parts.iter().zip(&components).map(|(n, c)| n * c.molar_mass_kg_mol).collect();
        let all = kg.iter().fold(0.0, |sum, kg| sum + kg);
        kg.into_iter().map(|kg| kg / all).collect()
    };
    let mut points = Vec::new();
    mixture
        .distil_along(&amounts, batch.down_to_m3, hold, |p| {
            points.push(BatchPoint {
                volume_m3: p.volume_m3,
                temperature_k: p.temperature_k,
                pressure_pa: p.pressure_pa,
                liquid: by_mass(&p.left_mol),
                vapour: by_mass(&p.vapour),
            });
        })
        .ok()?;
    let names = there.iter().map(|(m, _)| m.name.clone()).collect();
    Some(BatchPath { step: usize::from(batch.step), names, points })
}
