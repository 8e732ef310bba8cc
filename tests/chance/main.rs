//! Draws, what columns of them say, propagation to first order, and the sampled run of a plan.
//!
//! Witnesses: the examples of JCGM 101:2008, clause 9, and of JCGM 100:2008, H.2 and H.3; the Ishigami function, whose
//! indices are known exactly; exact moments of sums and products; the library `rand_distr`. Where the printed numbers
//! could not be read in the standards themselves, it is said beside them.
#![allow(clippy::unwrap_used, clippy::panic, reason = "functions shared by tests stand outside them")]

mod gum;
mod indices;
mod samplers;
mod supplement;
mod whole_plan;

use thimbleworth::chance::{Input, Summary, identity_key, summary};
use thimbleworth::quantity::{Kind, Origin, Spread};

/// As many draws as the examples of JCGM 101 take.
const DRAWS: u64 = 1_000_000;

fn input(name: &str, central_si: f64, spread: Spread) -> Input {
    Input {
        identity: name.to_owned(),
        key: identity_key(name),
        kind: Kind::Number,
        central_si,
        spread,
        origin: Origin::Entered,
        basis: String::new(),
    }
}

fn normal(name: &str, mean: f64, u: f64) -> Input {
    input(name, mean, Spread::Standard { u_si: u })
}

fn rectangular(name: &str, low: f64, high: f64) -> Input {
    input(name, 0.5 * (low + high), Spread::Limits { low_si: low, high_si: high })
}

/// What a model of these inputs comes to over `DRAWS` draws.
fn drawn(inputs: &[Input], coverage: f64, model: impl Fn(&[f64]) -> f64) -> Summary {
    let mut x = vec![0.0; inputs.len()];
    let mut values = Vec::new();
    for draw in 0..DRAWS {
        for (slot, input) in x.iter_mut().zip(inputs) {
            *slot = input.draw(1, draw);
        }
        values.push(model(&x));
    }
    summary(&mut values, coverage).unwrap()
}

#[track_caller]
fn near(found: f64, expected: f64, within: f64) {
    assert!((found - expected).abs() <= within, "{found} is not {expected} ± {within}");
}
