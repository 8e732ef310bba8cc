//! Filling the containers of waste: each liquid that comes in pushes out as much air, and the air carries vapour.
//!
//! Not a technique but a rule of the book: it looks at what a year has brought into each stream's containers, whichever steps
//! poured it there, and takes what is pushed out from the stream.

use super::vapours::{AIR_PA, Masses, Vapours};
use crate::chance::{Draw, In};
use crate::emission::fill;
use crate::ledger::{Bench, Halt, Place, RuleIx};
use crate::mixture::LARGEST;
use crate::program::Reader;
use crate::quantity::Kind;

/// How long pouring takes in a run, s: common practice, no source. It only says how fast the vapour reaches the room.
const POURING_S: f64 = 60.0;

/// The containers that a route may fill.
pub(crate) struct Filling {
    vapours: Vapours,
    containers: Vec<Container>,
    temperature_k: f64,
}

/// The containers of one stream.
pub(crate) struct Container {
    /// The stream.
    pub(crate) stream: Place,
    /// How far the air that leaves is saturated.
    pub(crate) saturation: In,
    /// Hood or room.
    pub(crate) air: Place,
}

impl Filling {
    /// To be read after all steps, so that every liquid of the route is known.
    pub(crate) fn read(r: &mut Reader<'_, '_>, containers: Vec<Container>) -> Option<Self> {
        if containers.is_empty() {
            return None;
        }
        let temperature_k = r.bench_temperature_k();
        Some(Self { vapours: Vapours::read(r, Some(temperature_k)), containers, temperature_k })
    }

    /// Posts what is pushed out of each stream's containers.
    pub(crate) fn run(&self, x: Draw<'_>, b: &mut Bench<'_>, rule: RuleIx) -> Result<(), Halt> {
        for container in &self.containers {
            let poured = self.vapours.poured(b, container.stream);
            let volume_m3 = b.poured_m3(container.stream);
            let mut out: Masses = [0.0; LARGEST];
            if volume_m3 > 0.0 {
                let (s, t) = (x.get(container.saturation), self.temperature_k);
                let vapours = self.vapours.over_layers(x, &poured, t)?;
                b.note(rule, "S", s, Kind::Number);
                b.note(rule, "V", volume_m3, Kind::Volume);
                b.note(rule, "T", t, Kind::Temperature);
                b.note(rule, "Σp", Vapours::sum_pa(&vapours), Kind::Pressure);
                // mᵢ = S V pᵢ Mᵢ/(R T), no more than there is
                let saturated = fill(volume_m3, t, AIR_PA, &vapours)?;
                for ((out, kg), there) in out.iter_mut().zip(saturated.kg).zip(&poured) {
                    *out = if s * kg < *there { s * kg } else { *there };
                }
            }
            b.release_over(POURING_S);
            let (parts, count) = self.vapours.parts(&out);
            for (material, kg) in &parts[..count] {
                b.charge(container.stream, container.air, *material, *kg, rule)?;
            }
        }
        Ok(())
    }
}
