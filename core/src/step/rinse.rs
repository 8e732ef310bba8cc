//! Rinsing glassware, lines or a column with solvent.

use super::common::{Open, SOLVENT, SURFACE, WARM, loss, lost_to, time};
use super::mixture::LARGEST;
use super::{Control, Group, Mixture, Param, Rule, Step, Technique};
use crate::chance::{Draw, In};
use crate::emission::EIIP;
use crate::ledger::{Bench, Halt, Material, Place, RuleIx};
use crate::quantity::Kind;
use crate::source::{COMMON_PRACTICE, DEFINITION};

const CHARGE: Param = Param::quantity("charge", "Solvent used", Kind::Volume)
    .required()
    .physical(0.0, 10.0)
    .usual(1e-6, 5e-4)
    .hint("All rinses of one run together; 50 to 100 mL a sample is usual for glassware and columns.")
    .source(COMMON_PRACTICE);
const GOES_TO: Param = Param::new("to", "Goes to", Control::Place)
    .required()
    .hint("A stream; or liquor, where the rinse joins the extract.");
const LOSS: Param = loss(
    "Share lost to air",
    "2 %",
    0.3,
    "From wet walls and open vessels, from experience; with surface it is computed instead.",
)
.without("surface");
const TIME: Param = time(
    "How long it lies open",
    (1.0, 3600.0),
    "Until it is poured away and the walls are dry.",
    COMMON_PRACTICE,
);
const SURFACE_OPEN: Param = SURFACE.with("time");
const LOST_TO: Param = lost_to("hood, or room when it is done at the sink.");

const CHARGED: RuleIx = RuleIx(0);
const LOST: RuleIx = RuleIx(1);
const POURED: RuleIx = RuleIx(2);

pub(super) static TECHNIQUE: Technique = Technique {
    key: "rinse",
    title: "Rinsing",
    about: "Solvent for rinsing glassware, lines or a column. A share from experience dries off to air, or \
            what an open surface in still air loses in the time; the rest goes where it is \
            said to go; a rinse poured into a drum brings its codes along.",
    group: Group::Around,
    takes_feed: None,
    params: &[SOLVENT, CHARGE, GOES_TO, TIME, LOSS, SURFACE_OPEN, WARM, LOST_TO],
    rules: &[
        Rule::new("charge", "mᵢ = V φᵢ ρᵢ", DEFINITION),
        Rule::new("lost to air", "mᵢ = s mᵢ; with a surface mᵢ = Mᵢ Kᵢ A pᵢ t / (R T)", EIIP).measurable(),
        Rule::new("poured", "what is left of it", DEFINITION),
    ],
    cautions: &[],
    example: r#"{ "step": "rinse", "solvent": "acetone", "charge": "40 mL", "to": "elsewhere" }"#,
    read: |r| {
        let (solvent, charge) = (r.mixture(&SOLVENT), r.quantity(&CHARGE));
        Box::new(Rinse {
            open: Open::read(r, &SURFACE_OPEN),
            solvent,
            charge,
            time: r.optional(&TIME),
            to: r.place(&GOES_TO),
            loss: r.optional(&LOSS),
            lost_to: r.place(&LOST_TO),
        })
    },
};

struct Rinse {
    solvent: Mixture,
    charge: In,
    to: Place,
    time: Option<In>,
    loss: Option<In>,
    open: Option<Open>,
    lost_to: Place,
}

impl Step for Rinse {
    fn run(&self, x: Draw<'_>, b: &mut Bench<'_>) -> Result<(), Halt> {
        // The rinse wets walls, not the extract: it passes through the vapour place, beside whatever lies there.
        let volume_m3 = x.get(self.charge);
        self.solvent.charge(x, b, Place::VAPOUR, volume_m3, CHARGED)?;
        let masses_kg = self.solvent.masses_kg(x, volume_m3);
        let time_s = self.time.map(|t| x.get(t));
        if let Some(time_s) = time_s {
            b.release_over(time_s);
        }
        let mut lost = [(Material(0), 0.0); LARGEST];
        if let (Some(open), Some(time_s)) = (&self.open, time_s) {
            let mut poured = [0.0; LARGEST];
            for (part, kg) in self.solvent.parts.iter().zip(masses_kg) {
                open.vapours.add(&mut poured, part.material, kg);
            }
            let gone = open.gone(x, b, &poured, time_s, LOST)?;
            for (row, part) in lost.iter_mut().zip(&self.solvent.parts) {
                *row = (part.material, open.vapours.of(&gone, part.material));
            }
        } else {
            let share = self.loss.map_or(0.0, |s| x.get(s));
            b.note(LOST, "s", share, Kind::Fraction);
            for ((row, part), kg) in lost.iter_mut().zip(&self.solvent.parts).zip(masses_kg) {
                // mᵢ = s mᵢ
                *row = (part.material, share * kg);
            }
        }
        b.split(Place::VAPOUR, self.lost_to, &lost[..self.solvent.parts.len()], LOST)?;
        for part in &self.solvent.parts {
            b.all(Place::VAPOUR, self.to, part.material, POURED);
        }
        Ok(())
    }
}
