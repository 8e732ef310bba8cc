//! Behind the vessel: co-solvent, a liquid trap and its losses, the rinse of a solid one.

use crate::chance::{Draw, In};
use crate::ledger::{Bench, Halt, Place, RuleIx};
use crate::program::Reader;
use crate::quantity::Kind;
use crate::source::{COMMON_PRACTICE, FROM_MEMORY};
use crate::step::{Control, Mixture, Param};

const COSOLVENT: Param = Param::new("cosolvent", "Co-solvent", Control::Mixture)
    .hint("One material, or several with shares by volume.");
const COSOLVENT_FLOW: Param = Param::quantity("cosolvent_flow", "Flow of co-solvent", Kind::VolumeFlow)
    .physical(0.0, 1.0)
    .with("cosolvent")
    .hint("As liquid at the bench's temperature, while CO2 flows: 5 % of 4 mL/min is 0.2 mL/min.")
    .source(COMMON_PRACTICE);
const COSOLVENT_KEPT: Param =
    Param::quantity("cosolvent_kept", "Share of the co-solvent that the trap keeps", Kind::Fraction)
        .default("90 %", FROM_MEMORY)
        .physical(0.0, 1.0)
        .with("cosolvent")
        .hint("The rest leaves with the gas.")
        .source(FROM_MEMORY);
const TRAP_SOLVENT: Param = Param::new("trap_solvent", "Solvent in the trap", Control::Mixture)
    .hint("Where the extract is collected in liquid; left out for a solid trap or a separator.");
const TRAP_VOLUME: Param = Param::quantity("trap_volume", "Volume in the trap", Kind::Volume)
    .physical(0.0, 10.0)
    .usual(1e-6, 1e-4)
    .with("trap_solvent")
    .hint("At the start; 3 to 15 mL is usual.")
    .source(COMMON_PRACTICE);
const TRAP_LOSS: Param = Param::quantity("trap_loss", "Share of the trap solvent blown off", Kind::Fraction)
    .default("20 %", FROM_MEMORY)
    .physical(0.0, 1.0)
    .usual(0.0, 0.6)
    .with("trap_solvent")
    .hint("Of the trap's own solvent, by the gas that bubbles through. Read the level after the run to know.")
    .source(FROM_MEMORY);
const RINSE: Param = Param::new("rinse", "Solvent that rinses the trap", Control::Mixture)
    .hint("1 to 2 mL at a time is usual for a solid trap.");
const RINSE_VOLUME: Param = Param::quantity("rinse_volume", "Volume of the rinse", Kind::Volume)
    .physical(0.0, 10.0)
    .usual(5e-7, 5e-5)
    .with("rinse")
    .hint("All portions together.")
    .source(COMMON_PRACTICE);

pub(super) const COSOLVENTS: [Param; 3] = [COSOLVENT, COSOLVENT_FLOW, COSOLVENT_KEPT];
pub(super) const TRAPPING: [Param; 5] = [TRAP_SOLVENT, TRAP_VOLUME, TRAP_LOSS, RINSE, RINSE_VOLUME];

/// The trap of one step.
pub(super) struct Trap {
    cosolvent: Option<(Mixture, In)>,
    kept: Option<In>,
    solvent: Option<(Mixture, In)>,
    loss: Option<In>,
    rinse: Option<(Mixture, In)>,
}

impl Trap {
    pub(super) fn read(r: &mut Reader<'_, '_>) -> Self {
        let mut pair = |mixture: &'static Param, volume: &'static Param| {
            let (m, v) = (r.optional_mixture(mixture), r.optional(volume));
            if m.is_some() && !r.written(volume.key) {
                let example = if volume.key == COSOLVENT_FLOW.key { "0.2 mL/min" } else { "3 mL" };
                let found = format!("{} is given without its amount", mixture.key);
                r.problem(volume.key, found, format!("{}, such as \"{example}\"", volume.key));
            }
            m.zip(v)
        };
        let cosolvent = pair(&COSOLVENT, &COSOLVENT_FLOW);
        let solvent = pair(&TRAP_SOLVENT, &TRAP_VOLUME);
        let rinse = pair(&RINSE, &RINSE_VOLUME);
        Self { cosolvent, kept: r.optional(&COSOLVENT_KEPT), solvent, loss: r.optional(&TRAP_LOSS), rinse }
    }

    pub(super) fn fill(&self, x: Draw<'_>, b: &mut Bench<'_>, rule: RuleIx) -> Result<(), Halt> {
        if let Some((mixture, volume)) = &self.solvent {
            mixture.charge(x, b, Place::TRAP, x.get(*volume), rule)?;
        }
        Ok(())
    }

    /// Co-solvent pumped while CO2 flows: part of it stays in the trap, the rest leaves with the gas.
    pub(super) fn cosolvent(
        &self,
        x: Draw<'_>,
        b: &mut Bench<'_>,
        time_s: f64,
        vent: Place,
        rule: RuleIx,
    ) -> Result<(), Halt> {
        if let (Some((mixture, flow)), Some(kept)) = (&self.cosolvent, self.kept) {
            let kept = x.get(kept);
            b.note(rule, "q", x.get(*flow), Kind::VolumeFlow);
            b.note(rule, "t", time_s, Kind::Time);
            b.note(rule, "k", kept, Kind::Fraction);
            // mᵢ = q t φᵢ ρᵢ
            let masses_kg = mixture.masses_kg(x, x.get(*flow) * time_s);
            for (part, kg) in mixture.parts.iter().zip(masses_kg) {
                b.charge(Place::STORE, Place::TRAP, part.material, kg * kept, rule)?;
                b.charge(Place::STORE, vent, part.material, kg * (1.0 - kept), rule)?;
            }
        }
        Ok(())
    }

    /// What the gas blows off a liquid trap: a share of all that can evaporate there.
    pub(super) fn blow_off(
        &self,
        x: Draw<'_>,
        b: &mut Bench<'_>,
        vent: Place,
        rule: RuleIx,
    ) -> Result<(), Halt> {
        if let Some(loss) = self.loss {
            b.note(rule, "s", x.get(loss), Kind::Fraction);
            // mᵢ = s mᵢ(trap)
            b.share_volatile(Place::TRAP, vent, x.get(loss), rule)?;
        }
        Ok(())
    }

    pub(super) fn rinse(&self, x: Draw<'_>, b: &mut Bench<'_>, rule: RuleIx) -> Result<(), Halt> {
        if let Some((mixture, volume)) = &self.rinse {
            mixture.charge(x, b, Place::TRAP, x.get(*volume), rule)?;
        }
        Ok(())
    }
}
