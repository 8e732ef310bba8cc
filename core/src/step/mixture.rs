//! A solvent of one or several materials, measured out by volume.

use crate::chance::{Draw, In};
use crate::ledger::{Bench, Halt, Material, Place, RuleIx};
use crate::quantity::{Kind, ShareBy};

/// The most materials in one mixture: masses are kept on the stack.
pub const LARGEST: usize = 8;

/// One material of a mixture.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Part {
    /// The material.
    pub material: Material,
    /// Its share; by volume before mixing or by mass.
    pub share: In,
    /// Its density at the bench's temperature; kg/m³.
    pub density: In,
}

/// A solvent as it is measured out: at most [`LARGEST`] materials.
#[derive(Clone, Debug, PartialEq)]
pub struct Mixture {
    /// Its materials in the order written.
    pub parts: Vec<Part>,
    /// Whether the shares are by volume (of the parts before mixing) or by mass.
    pub by: ShareBy,
}

impl Mixture {
    /// The mass of each part in a volume of the mixture; kg, in the order of the parts.
    ///
    /// By volume: mᵢ = V φᵢ ρᵢ / Σφ, as if the parts were measured out one by one. By mass: mᵢ = V wᵢ / Σ(wⱼ/ρⱼ).
    #[must_use]
    pub fn masses_kg(&self, x: Draw<'_>, volume_m3: f64) -> [f64; LARGEST] {
        let mut below = 0.0;
        for part in &self.parts {
            below += match self.by {
                // Σ wⱼ / ρⱼ
                ShareBy::Mass => x.get(part.share) / x.get(part.density),
                // Σ φⱼ
                ShareBy::Unstated | ShareBy::Volume => x.get(part.share),
            };
        }
        let mut out = [0.0; LARGEST];
        for (kg, part) in out.iter_mut().zip(&self.parts) {
            let share = x.get(part.share);
            *kg = match self.by {
                // mᵢ = V wᵢ / Σ(wⱼ/ρⱼ)
                ShareBy::Mass => volume_m3 * share / below,
                // mᵢ = V φᵢ ρᵢ / Σφ
                ShareBy::Unstated | ShareBy::Volume => volume_m3 * share * x.get(part.density) / below,
            };
        }
        out
    }

    /// Draws a volume of the mixture from the store.
    ///
    /// # Errors
    /// As [`Bench::charge`].
    pub fn charge(
        &self,
        x: Draw<'_>,
        b: &mut Bench<'_>,
        to: Place,
        volume_m3: f64,
        rule: RuleIx,
    ) -> Result<(), Halt> {
        let masses_kg = self.masses_kg(x, volume_m3);
        b.note(rule, "V", volume_m3, Kind::Volume);
        for (part, kg) in self.parts.iter().zip(masses_kg) {
            b.note(rule, "φᵢ", x.get(part.share), Kind::Fraction);
            b.note(rule, "ρᵢ", x.get(part.density), Kind::Density);
            b.charge(Place::STORE, to, part.material, kg, rule)?;
        }
        Ok(())
    }
}
