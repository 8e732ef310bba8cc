//! Inputs and the view of one draw that the physics sees.

use super::draw::{keyed_bits, normal_quantile, unit_interval};
use crate::quantity::{Kind, Origin, Spread};

/// The slot of an input in a draw.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub struct In(pub u32);

/// One number that a route rests on.
#[derive(Clone, Debug, PartialEq)]
pub struct Input {
    /// The identity, `material/n-hexane/density` or the path in the plan.
    pub identity: String,
    /// The key of the identity, with the names of workload and route in place of their numbers, so that no input draws
    /// other numbers because a route was added before it or moved. Equal keys draw equal numbers.
    pub key: u64,
    /// What it measures.
    pub kind: Kind,
    /// The central value; SI.
    pub central_si: f64,
    /// How unsure it is.
    pub spread: Spread,
    /// Whether it was entered, computed, measured, assumed or is not known.
    pub origin: Origin,
    /// What was read, or where the figure comes from.
    pub basis: String,
}

impl Input {
    /// The value at the cumulative probability `p`, which lies in the open interval (0, 1); SI.
    ///
    /// Limits are those of a rectangular distribution, a standard uncertainty that of a normal one (JCGM 101:2008, 6.4.2
    /// and 6.4.7).
    #[must_use]
    pub fn at(&self, p: f64) -> f64 {
        match self.spread {
            Spread::Exact => self.central_si,
            // x = a + (b − a) p
            Spread::Limits { low_si, high_si } => low_si + (high_si - low_si) * p,
            // x = μ + u Φ⁻¹(p)
            Spread::Standard { u_si } => self.central_si + u_si * normal_quantile(p),
        }
    }

    /// The value in draw `draw` under `seed`; SI.
    #[must_use]
    pub fn draw(&self, seed: u64, draw: u64) -> f64 {
        match self.spread {
            Spread::Exact => self.central_si,
            Spread::Limits { .. } | Spread::Standard { .. } => {
                self.at(unit_interval(keyed_bits(self.key ^ seed, draw)))
            }
        }
    }
}

/// One draw of all inputs of a route, as the physics sees it.
#[derive(Clone, Copy, Debug)]
pub struct Draw<'a>(pub &'a [f64]);

impl Draw<'_> {
    /// The value of an input; SI.
    #[inline]
    #[must_use]
    pub fn get(self, slot: In) -> f64 {
        self.0[slot.0 as usize]
    }
}

/// The key of an identity: FNV-1a, 64 bits.
///
/// ```
/// // The offset basis is the hash of nothing (Fowler, Noll, Vo; IETF draft-eastlake-fnv, from memory).
/// assert_eq!(thimbleworth::chance::identity_key(""), 0xcbf2_9ce4_8422_2325);
/// ```
#[must_use]
pub fn identity_key(identity: &str) -> u64 {
    continued_key(0xcbf2_9ce4_8422_2325, identity)
}

/// The key of an identity whose beginning already has a key: `continued_key(identity_key(a), b)` is that of `ab`.
#[must_use]
pub fn continued_key(beginning: u64, rest: &str) -> u64 {
    let mut hash = beginning;
    for byte in rest.bytes() {
        hash = (hash ^ u64::from(byte)).wrapping_mul(0x0100_0000_01b3);
    }
    hash
}
