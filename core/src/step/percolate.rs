//! Percolation: solvent runs slowly down through a bed of the sample; it may soak first, and run round.

use super::caution::{HEATED_FLAMMABLE, PEROXIDES};
use super::common::{EXTRACTS, Open, SOLVENT, SURFACE, WARM, held_by_marc, loss, lost_to, power, time};
use super::{Group, Mixture, Param, Rule, Step, Technique};
use crate::chance::{Draw, In};
use crate::emission::EIIP;
use crate::ledger::{Bench, Halt, Material, Place, RuleIx};
use crate::quantity::Kind;
use crate::source::{COMMON_PRACTICE, DEFINITION, FROM_MEMORY, MASS_BALANCE, Source, Standing};

const DRUG_TO_EXTRACT: Source = Source::new(
    "percolation of pharmacopoeias: solvent by the mass of the drug, 1 to 10 parts; from memory",
    Standing::FromMemory,
);

const RATIO: Param = Param::quantity("ratio", "Solvent for each mass of sample", Kind::VolumePerMass)
    .physical(0.0, 0.5)
    .usual(1e-3, 0.02)
    .without("charge")
    .hint("All that runs through, what soaks the bed included; stands in place of charge.")
    .source(DRUG_TO_EXTRACT);
const CHARGE: Param = Param::quantity("charge", "Solvent used", Kind::Volume)
    .physical(0.0, 100.0)
    .usual(5e-5, 5.0)
    .hint("All that is poured on, in one run; or ratio in its place.")
    .source(COMMON_PRACTICE);
const TIME: Param = time(
    "Time of running",
    (1800.0, 604_800.0),
    "From opening the tap to the last drop; 1 to 3 mL/min for a kilogram of bed is slow percolation.",
    DRUG_TO_EXTRACT,
);
const POWER: Param =
    power((0.0, 5000.0), "Of pump and jacket on average; left out, no electricity is counted.");
const LOSS: Param = loss(
    "Share lost to air",
    "1 %",
    0.1,
    "Of the solvent, from the open top and the receiver, from experience; with surface it is computed instead.",
)
.without("surface");
const OPEN_TOP: Param = SURFACE.with("time");
const LOST_TO: Param = lost_to("hood, or room where the percolator stands outside it.");
const HOLD_UP: Param = held_by_marc(
    "1.5 mL/g",
    (3e-4, 5e-3),
    "What the drained bed keeps, for each gram of what lies there; pressing halves it.",
);

const CHARGED: RuleIx = RuleIx(0);
const EXTRACTED: RuleIx = RuleIx(1);
const LOST: RuleIx = RuleIx(2);
const HELD: RuleIx = RuleIx(3);
const PUMPED: RuleIx = RuleIx(4);

pub(super) static TECHNIQUE: Technique = Technique {
    key: "percolate",
    title: "Percolation",
    about: "Solvent runs down through a bed of the sample, which keeps what it can hold. How much is taken out is the plan's to say; \
            the loss to air is a share from experience, or that of an open surface in still air.",
    group: Group::Extraction,
    takes_feed: Some(Place::MARC),
    params: &[SOLVENT, CHARGE, RATIO, TIME, POWER, EXTRACTS, LOSS, OPEN_TOP, WARM, LOST_TO, HOLD_UP],
    rules: &[
        Rule::new("charge", "mᵢ = V φᵢ ρᵢ, V = r m_bed where no charge is given", DEFINITION),
        Rule::new("extracted", "mᵢ = sᵢ mᵢ(marc)", MASS_BALANCE),
        Rule::new("lost to air", "mᵢ = s mᵢ(liquor); with a surface mᵢ = Mᵢ Kᵢ A pᵢ t / (R T)", EIIP)
            .measurable(),
        Rule::new("held in the marc", "mᵢ = (h m_marc / V_liquor) mᵢ(liquor)", FROM_MEMORY).measurable(),
        Rule::new("pumping and heating", "W = P t", DEFINITION).metered(),
    ],
    cautions: &[HEATED_FLAMMABLE, PEROXIDES],
    example: r#"{ "step": "percolate", "solvent": { "ethanol": "70 %", "water": "30 %" }, "ratio": "5 mL/g", "time": "24 h",
        "surface": "80 cm2" }"#,
    read: |r| {
        let solvent = r.mixture(&SOLVENT);
        let (charge, ratio) = (r.optional(&CHARGE), r.optional(&RATIO));
        if !r.written("charge") && !r.written("ratio") {
            r.problem(
                "charge",
                "nothing says how much solvent runs through",
                "charge, such as \"2 L\", or ratio, such as \"5 mL/g\"",
            );
        }
        Box::new(Percolate {
            open: Open::read(r, &OPEN_TOP),
            solvent,
            charge,
            ratio,
            time: r.optional(&TIME),
            power: r.power(&POWER),
            extracts: r.taken_out(&EXTRACTS),
            loss: r.optional(&LOSS),
            lost_to: r.place(&LOST_TO),
            hold_up: r.quantity(&HOLD_UP),
        })
    },
};

struct Percolate {
    solvent: Mixture,
    charge: Option<In>,
    ratio: Option<In>,
    time: Option<In>,
    power: Option<In>,
    open: Option<Open>,
    extracts: Vec<(Material, In)>,
    loss: Option<In>,
    lost_to: Place,
    hold_up: In,
}

impl Step for Percolate {
    fn run(&self, x: Draw<'_>, b: &mut Bench<'_>) -> Result<(), Halt> {
        let marc_kg = b.need(Place::MARC)?;
        let volume_m3 = match (self.charge, self.ratio) {
            (None, Some(ratio)) => {
                b.note(CHARGED, "r", x.get(ratio), Kind::VolumePerMass);
                b.note(CHARGED, "m_bed", marc_kg, Kind::Mass);
                // V = r m_bed
                x.get(ratio) * marc_kg
            }
            (charge, _) => charge.map_or(0.0, |c| x.get(c)),
        };
        self.solvent.charge(x, b, Place::LIQUOR, volume_m3, CHARGED)?;
        super::extract(x, b, &self.extracts, Place::MARC, Place::LIQUOR, EXTRACTED)?;
        let time_s = self.time.map(|t| x.get(t));
        Open::lose(self.open.as_ref(), x, b, (Place::LIQUOR, self.lost_to), (self.loss, time_s), LOST)?;
        super::hold_up(b, x.get(self.hold_up), marc_kg, HELD)?;
        super::electricity(x, b, self.power, time_s, None, PUMPED);
        Ok(())
    }
}
