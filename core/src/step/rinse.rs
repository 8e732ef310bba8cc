//! Rinsing glassware, lines or a column with solvent.

use super::mixture::LARGEST;
use super::{Control, Group, Mixture, Param, Rule, Step, Technique};
use crate::chance::{Draw, In};
use crate::ledger::{Bench, Halt, Material, Place, RuleIx};
use crate::quantity::Kind;
use crate::source::{COMMON_PRACTICE, DEFINITION, FROM_MEMORY};

const SOLVENT: Param = Param::new("solvent", "Solvent", Control::Mixture)
    .required()
    .hint("One material, or several with shares by volume.");
const CHARGE: Param = Param::quantity("charge", "Solvent used", Kind::Volume)
    .required()
    .physical(0.0, 10.0)
    .usual(1e-6, 5e-4)
    .hint("All rinses of one run together; 50 to 100 mL a sample is usual for glassware and columns.")
    .source(COMMON_PRACTICE);
const GOES_TO: Param = Param::new("to", "Goes to", Control::Place)
    .required()
    .hint("A stream; or liquor, where the rinse joins the extract.");
const LOSS: Param = Param::quantity("loss", "Share lost to air", Kind::Fraction)
    .default("2 %", FROM_MEMORY)
    .physical(0.0, 1.0)
    .usual(0.0, 0.3)
    .hint("From wet walls and open vessels.")
    .source(FROM_MEMORY);
const LOST_TO: Param = Param::new("lost_to", "Lost to", Control::Place)
    .default("hood", COMMON_PRACTICE)
    .hint("hood, or room when it is done at the sink.");

const CHARGED: RuleIx = RuleIx(0);
const LOST: RuleIx = RuleIx(1);
const POURED: RuleIx = RuleIx(2);

pub(super) static TECHNIQUE: Technique = Technique {
    key: "rinse",
    title: "Rinsing",
    about: "Solvent for rinsing glassware, lines or a column. A stated share dries off to air, the rest goes where it is \
            said to go; a rinse poured into a drum brings its codes along.",
    group: Group::Around,
    takes_feed: None,
    params: &[SOLVENT, CHARGE, GOES_TO, LOSS, LOST_TO],
    rules: &[
        Rule::new("charge", "mᵢ = V φᵢ ρᵢ", DEFINITION),
        Rule::new("lost to air", "mᵢ = s mᵢ", FROM_MEMORY).measurable(),
        Rule::new("poured", "what is left of it", DEFINITION),
    ],
    cautions: &[],
    example: r#"{ "step": "rinse", "solvent": "acetone", "charge": "40 mL", "to": "elsewhere" }"#,
    read: |r| {
        Box::new(Rinse {
            solvent: r.mixture(&SOLVENT),
            charge: r.quantity(&CHARGE),
            to: r.place(&GOES_TO),
            loss: r.quantity(&LOSS),
            lost_to: r.place(&LOST_TO),
        })
    },
};

struct Rinse {
    solvent: Mixture,
    charge: In,
    to: Place,
    loss: In,
    lost_to: Place,
}

impl Step for Rinse {
    fn run(&self, x: Draw<'_>, b: &mut Bench<'_>) -> Result<(), Halt> {
        // The rinse wets walls, not the extract: it passes through the vapour place, beside whatever lies there.
        let volume_m3 = x.get(self.charge);
        self.solvent.charge(x, b, Place::VAPOUR, volume_m3, CHARGED)?;
        let share = x.get(self.loss);
        b.note(LOST, "s", share, Kind::Fraction);
        let masses_kg = self.solvent.masses_kg(x, volume_m3);
        let mut lost = [(Material(0), 0.0); LARGEST];
        for ((row, part), kg) in lost.iter_mut().zip(&self.solvent.parts).zip(masses_kg) {
            // mᵢ = s mᵢ
            *row = (part.material, share * kg);
        }
        b.split(Place::VAPOUR, self.lost_to, &lost[..self.solvent.parts.len()], LOST)?;
        for part in &self.solvent.parts {
            b.all(Place::VAPOUR, self.to, part.material, POURED);
        }
        Ok(())
    }
}
