//! Pressurised liquid extraction: the cell's void filled hot, flushed, blown out with gas.

use super::caution::{HEATED_FLAMMABLE, PRESSURE_VESSEL};
use super::{Control, Group, Mixture, Param, Rule, Step, Technique};
use crate::chance::{Draw, In};
use crate::ledger::{Bench, Halt, Material, Place, RuleIx};
use crate::quantity::Kind;
use crate::source::{COMMON_PRACTICE, DEFINITION, FROM_MEMORY, MASS_BALANCE, Source, Standing};

const SW846_3545A: Source =
    Source::new("US EPA SW-846 Method 3545A, rev. 1; timings and volumes from memory", Standing::FromMemory);

const SOLVENT: Param = Param::new("solvent", "Solvent", Control::Mixture)
    .required()
    .hint("One material, or several with shares by volume.");
const CELL: Param = Param::quantity("cell", "Cell volume", Kind::Volume)
    .required()
    .physical(0.0, 0.1)
    .usual(5e-6, 1e-4)
    .hint("The nominal volume of the cell.")
    .source(SW846_3545A);
const VOID: Param = Param::quantity("void", "Share of the cell that solvent fills", Kind::Fraction)
    .default("50 %", FROM_MEMORY)
    .physical(0.0, 1.0)
    .usual(0.2, 0.8)
    .without("used")
    .hint("What sample and dispersant leave free.")
    .source(FROM_MEMORY);
const FLUSH: Param = Param::quantity("flush", "Flush, as a share of the cell", Kind::Fraction)
    .default("60 %", SW846_3545A)
    .physical(0.0, 5.0)
    .usual(0.3, 1.5)
    .without("used")
    .hint("Fresh solvent pumped through after the static time, all cycles together.")
    .source(SW846_3545A);
const LINES: Param = Param::quantity("lines", "Rinse of pump and lines", Kind::Volume)
    .physical(0.0, 0.1)
    .usual(0.0, 2e-5)
    .without("used")
    .hint("For each cell; it ends with the extract. Left out, none is counted.")
    .source(COMMON_PRACTICE);
const USED: Param = Param::quantity("used", "Solvent used, where it is known", Kind::Volume)
    .physical(0.0, 0.1)
    .usual(5e-6, 2e-4)
    .hint("From the instrument's log or the bottle: stands in place of void, flush and lines.")
    .source(SW846_3545A);
const DISPERSANT: Param = Param::new("dispersant", "Dispersant", Control::Material)
    .hint("Diatomaceous earth, sand or a drying agent that is mixed with the sample.");
const DISPERSANT_MASS: Param = Param::quantity("dispersant_mass", "Mass of dispersant", Kind::Mass)
    .physical(0.0, 10.0)
    .usual(1e-3, 0.05)
    .with("dispersant")
    .hint("For each cell.")
    .source(COMMON_PRACTICE);
const TIME: Param = Param::quantity("time", "Time for a cell", Kind::Time)
    .physical(0.0, 1e6)
    .usual(300.0, 3600.0)
    .hint("Heating, static time, flush and purge.")
    .source(SW846_3545A);
const POWER: Param = Param::quantity("power", "Power drawn", Kind::Power)
    .physical(0.0, 1e6)
    .usual(200.0, 1500.0)
    .with("time")
    .hint("On average; left out, no electricity is counted.")
    .source(FROM_MEMORY);
const EXTRACTS: Param =
    Param::new("extracts", "Taken out of the sample", Control::PerMaterial(Kind::Fraction))
        .physical(0.0, 1.0)
        .hint("Share of each feed material that goes into the liquor; leave out for traces.");
const LOSS: Param = Param::quantity("loss", "Share carried off by the purge gas", Kind::Fraction)
    .default("5 %", FROM_MEMORY)
    .physical(0.0, 1.0)
    .usual(0.0, 0.14)
    .hint("Purge gas can carry up to 14 % of the solvent off the collection vial; weigh the vial to know.")
    .source(FROM_MEMORY);
const LOST_TO: Param = Param::new("lost_to", "Lost to", Control::Place)
    .default("hood", COMMON_PRACTICE)
    .hint("hood, or room when the vials vent into the room.");
const HOLD_UP: Param = Param::quantity("hold_up", "Solvent held by the marc", Kind::VolumePerMass)
    .default("0.1 mL/g", FROM_MEMORY)
    .physical(0.0, 0.02)
    .usual(0.0, 1e-3)
    .hint("After the purge, for each gram of what lies in the cell.")
    .source(FROM_MEMORY);

const CHARGED: RuleIx = RuleIx(0);
const DISPERSED: RuleIx = RuleIx(1);
const EXTRACTED: RuleIx = RuleIx(2);
const LOST: RuleIx = RuleIx(3);
const HELD: RuleIx = RuleIx(4);
const HEATED: RuleIx = RuleIx(5);

pub(super) static TECHNIQUE: Technique = Technique {
    key: "pressurised-liquid",
    title: "Pressurised liquid extraction",
    about: "Hot solvent under pressure fills the cell's void, is flushed through and blown out with gas. Volumes are those \
            of cold solvent; that solvent expands in the cell on heating is not counted here.",
    group: Group::Extraction,
    takes_feed: Some(Place::MARC),
    params: &[
        SOLVENT,
        CELL,
        VOID,
        FLUSH,
        LINES,
        USED,
        DISPERSANT,
        DISPERSANT_MASS,
        TIME,
        POWER,
        EXTRACTS,
        LOSS,
        LOST_TO,
        HOLD_UP,
    ],
    rules: &[
        Rule::new("charge", "mᵢ = V φᵢ ρᵢ, V = V_cell (ε + f) + V_lines", SW846_3545A),
        Rule::new("dispersant", "m", MASS_BALANCE),
        Rule::new("extracted", "mᵢ = sᵢ mᵢ(marc)", MASS_BALANCE),
        Rule::new("carried off by the purge", "mᵢ = s mᵢ(liquor)", FROM_MEMORY).measurable(),
        Rule::new("held in the marc", "mᵢ = (h m_marc / V_liquor) mᵢ(liquor)", FROM_MEMORY).measurable(),
        Rule::new("heating and pumping", "W = P t", DEFINITION).metered(),
    ],
    cautions: &[PRESSURE_VESSEL, HEATED_FLAMMABLE],
    example: r#"{ "step": "pressurised-liquid", "solvent": { "n-hexane": "50 %", "acetone": "50 %" }, "cell": "33 mL",
        "dispersant": "diatomaceous earth", "dispersant_mass": "8 g", "lines": "5 mL", "time": "20 min", "power": "700 W" }"#,
    read: |r| {
        let dispersant = r.optional_material(&DISPERSANT);
        let mass = r.optional(&DISPERSANT_MASS);
        if dispersant.is_some() && mass.is_none() {
            r.problem("dispersant_mass", "a dispersant without its mass", "its mass, such as \"8 g\"");
        }
        Box::new(PressurisedLiquid {
            solvent: r.mixture(&SOLVENT),
            cell: r.quantity(&CELL),
            void: r.quantity(&VOID),
            flush: r.quantity(&FLUSH),
            lines: r.optional(&LINES),
            used: r.optional(&USED),
            dispersant: dispersant.zip(mass),
            time: r.optional(&TIME),
            power: r.power(&POWER),
            extracts: r.taken_out(&EXTRACTS),
            loss: r.quantity(&LOSS),
            lost_to: r.place(&LOST_TO),
            hold_up: r.quantity(&HOLD_UP),
        })
    },
};

struct PressurisedLiquid {
    solvent: Mixture,
    cell: In,
    void: In,
    flush: In,
    lines: Option<In>,
    used: Option<In>,
    dispersant: Option<(Material, In)>,
    time: Option<In>,
    power: Option<In>,
    extracts: Vec<(Material, In)>,
    loss: In,
    lost_to: Place,
    hold_up: In,
}

impl Step for PressurisedLiquid {
    fn run(&self, x: Draw<'_>, b: &mut Bench<'_>) -> Result<(), Halt> {
        b.need(Place::MARC)?;
        if let Some((material, mass)) = self.dispersant {
            b.charge(Place::STORE, Place::MARC, material, x.get(mass), DISPERSED)?;
        }
        let marc_kg = b.mass_kg(Place::MARC);
        let volume_m3 = match self.used {
            Some(used) => x.get(used),
            None => {
                let lines_m3 = self.lines.map_or(0.0, |l| x.get(l));
                b.note(CHARGED, "V_cell", x.get(self.cell), Kind::Volume);
                b.note(CHARGED, "ε", x.get(self.void), Kind::Fraction);
                b.note(CHARGED, "f", x.get(self.flush), Kind::Fraction);
                b.note(CHARGED, "V_lines", lines_m3, Kind::Volume);
                // V = V_cell (ε + f) + V_lines
                x.get(self.cell) * (x.get(self.void) + x.get(self.flush)) + lines_m3
            }
        };
        self.solvent.charge(x, b, Place::LIQUOR, volume_m3, CHARGED)?;
        super::extract(x, b, &self.extracts, Place::MARC, Place::LIQUOR, EXTRACTED)?;
        let loss = x.get(self.loss);
        b.note(LOST, "s", loss, Kind::Fraction);
        // mᵢ = s mᵢ(liquor)
        b.share_volatile(Place::LIQUOR, self.lost_to, loss, LOST)?;
        super::hold_up(b, x.get(self.hold_up), marc_kg, HELD)?;
        super::electricity(x, b, self.power, self.time.map(|t| x.get(t)), None, HEATED);
        Ok(())
    }
}
