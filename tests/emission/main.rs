//! Emissions held against recomputed figures, identities and a second way; sources stand beside.
// A check that cannot read its own table must fail loudly, in helper functions too.
#![allow(clippy::expect_used, clippy::panic, clippy::unwrap_used)]
mod episodes;
mod gas_stream;
mod refusals;
mod second_way;

use thimbleworth::emission::Vapour;
use thimbleworth::material::catalogue;

/// Molar mass of a material, kg/mol.
fn molar_mass(name: &str) -> f64 {
    catalogue().find(name).unwrap().molar_mass_kg_mol.as_ref().unwrap().value
}

fn vapour(name: &str, partial_pressure_pa: f64) -> Vapour {
    Vapour { partial_pressure_pa, molar_mass_kg_mol: molar_mass(name) }
}

/// Fails unless `found` is within `allowed` of `wanted`, relatively.
fn close(found: f64, wanted: f64, allowed: f64, what: &str) {
    assert!((found / wanted - 1.0).abs() <= allowed, "{what}: {found} for {wanted}");
}
