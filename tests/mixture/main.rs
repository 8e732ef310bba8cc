//! Vapour and liquid of mixtures held against handbooks, other models, another program and a second way; sources stand beside.
// A check that cannot read its own table must fail loudly, in helper functions too.
#![allow(clippy::expect_used, clippy::panic, clippy::unwrap_used)]
mod azeotropes;
mod consistency;
mod distillation;
mod fits;
mod held;
mod models;
mod practice;
mod refusals;

use thimbleworth::material::{Substance, catalogue};
use thimbleworth::mixture::{Component, Mixture, Pairs};

/// The rows of a table, without comments and head.
fn rows(text: &'static str) -> Vec<Vec<&'static str>> {
    text.lines().filter(|line| !line.starts_with('#')).skip(1).map(|line| line.split(',').collect()).collect()
}

fn number(text: &str) -> f64 {
    text.parse().unwrap_or_else(|_| panic!("{text:?} is not a number"))
}

fn find(names: &[&str]) -> Vec<&'static Substance> {
    names.iter().map(|name| catalogue().find(name).unwrap()).collect()
}

/// Calls `with` with the mixture of these materials, volumes read at 20 °C.
fn mixed<T>(names: &[&str], with: impl FnOnce(&Mixture<'_>) -> T) -> T {
    let substances = find(names);
    let pairs = Pairs::between(&substances).unwrap();
    let components: Vec<Component<'_>> =
        substances.iter().map(|s| Component::of(s, 293.15).unwrap()).collect();
    with(&Mixture::new(&components, &pairs).unwrap())
}

fn molar_mass(name: &str) -> f64 {
    catalogue().find(name).unwrap().molar_mass_kg_mol.as_ref().unwrap().value
}

/// Mole fraction of the first of two from its share of the mass.
fn mole_fraction(first: &str, second: &str, mass_fraction: f64) -> f64 {
    let (a, b) = (mass_fraction / molar_mass(first), (1.0 - mass_fraction) / molar_mass(second));
    a / (a + b)
}
