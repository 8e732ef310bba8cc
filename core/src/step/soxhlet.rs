//! Soxhlet extraction: charge, condenser loss, what the sample gives up, what the marc holds back, heat and water.

use super::caution::{HEATED_FLAMMABLE, PEROXIDES};
use super::{Control, Group, Mixture, Param, Rule, Step, Technique};
use crate::chance::{Draw, In};
use crate::ledger::{Bench, Halt, Material, Place, RuleIx, Utility};
use crate::quantity::Kind;
use crate::source::{COMMON_PRACTICE, DEFINITION, FROM_MEMORY, MASS_BALANCE, Source, Standing};

const SW846_3540C: Source =
    Source::new("US EPA SW-846 Method 3540C, rev. 3, December 1996", Standing::Secondary);

const SOLVENT: Param = Param::new("solvent", "Solvent", Control::Mixture)
    .required()
    .hint("One material, or several with shares by volume.");
const CHARGE: Param = Param::quantity("charge", "Solvent in the flask", Kind::Volume)
    .required()
    .physical(0.0, 10.0)
    .usual(5e-5, 1e-3)
    .hint("All solvents together, as poured.")
    .source(SW846_3540C);
const TIME: Param = Param::quantity("time", "Extraction time", Kind::Time)
    .required()
    .physical(0.0, 2e6)
    .usual(14_400.0, 90_000.0)
    .hint("From first to last siphoning; 16 to 24 h is usual.")
    .source(SW846_3540C);
const HEATER: Param = Param::quantity("heater", "Heater power drawn", Kind::Power)
    .physical(0.0, 1e6)
    .usual(50.0, 600.0)
    .hint("As drawn on average, not the rating plate; left out, no electricity is counted.")
    .source(FROM_MEMORY);
const COOLING_WATER: Param = Param::quantity("cooling_water", "Cooling water flow", Kind::VolumeFlow)
    .physical(0.0, 1.0)
    .usual(1.6e-6, 5e-5)
    .hint("Of the tap for this condenser; left out for a recirculating chiller.")
    .source(COMMON_PRACTICE);
const LOSS: Param = Param::quantity("loss", "Share lost past the condenser", Kind::Fraction)
    .default("5 %", FROM_MEMORY)
    .physical(0.0, 1.0)
    .usual(0.0, 0.15)
    .hint("Of the charge, over the whole run. Benches lose 5 to 15 %; weigh the flask before and after to know.")
    .source(FROM_MEMORY);
const LOST_TO: Param = Param::new("lost_to", "Lost to", Control::Place)
    .default("hood", COMMON_PRACTICE)
    .hint("hood, or room when the condenser stands outside the hood.");
const HOLD_UP: Param = Param::quantity("hold_up", "Solvent held by the marc", Kind::VolumePerMass)
    .default("1 mL/g", FROM_MEMORY)
    .physical(0.0, 0.02)
    .usual(2e-4, 3e-3)
    .hint("Volume of liquor that stays in the thimble, for each gram that lies there.")
    .source(FROM_MEMORY);
const EXTRACTS: Param =
    Param::new("extracts", "Taken out of the sample", Control::PerMaterial(Kind::Fraction))
        .physical(0.0, 1.0)
        .hint("Share of each feed material that goes into the liquor; leave out for traces.");

const CHARGED: RuleIx = RuleIx(0);
const EXTRACTED: RuleIx = RuleIx(1);
const LOST: RuleIx = RuleIx(2);
const HELD: RuleIx = RuleIx(3);
const HEATED: RuleIx = RuleIx(4);
const COOLED: RuleIx = RuleIx(5);

pub(super) static TECHNIQUE: Technique = Technique {
    key: "soxhlet",
    title: "Soxhlet extraction",
    about: "Solvent is boiled, condensed on to the sample and siphoned back for hours. The loss past the condenser is a \
            stated share of the charge here, to be replaced by a weighing.",
    group: Group::Extraction,
    takes_feed: Some(Place::MARC),
    params: &[SOLVENT, CHARGE, TIME, HEATER, COOLING_WATER, EXTRACTS, LOSS, LOST_TO, HOLD_UP],
    rules: &[
        Rule::new("charge", "mᵢ = V φᵢ ρᵢ", DEFINITION),
        Rule::new("extracted", "mᵢ = sᵢ mᵢ(marc)", MASS_BALANCE),
        Rule::new("condenser loss", "mᵢ = s mᵢ(liquor)", FROM_MEMORY).measurable(),
        Rule::new("held in the marc", "mᵢ = (h m_marc / V_liquor) mᵢ(liquor)", FROM_MEMORY).measurable(),
        Rule::new("heating", "W = P t", DEFINITION).metered(),
        Rule::new("cooling water", "m = q t · 1000 kg/m³", DEFINITION),
    ],
    cautions: &[HEATED_FLAMMABLE, PEROXIDES],
    example: r#"{ "step": "soxhlet", "solvent": { "n-hexane": "50 %", "acetone": "50 %" }, "charge": "300 mL",
        "time": "18 h", "heater": "250 W", "cooling_water": "0.7 L/min", "measured": { "condenser loss": "6 ± 2 g" } }"#,
    read: |r| {
        Box::new(Soxhlet {
            solvent: r.mixture(&SOLVENT),
            charge: r.quantity(&CHARGE),
            time: r.quantity(&TIME),
            heater: r.power(&HEATER),
            cooling_water: r.optional(&COOLING_WATER),
            extracts: r.taken_out(&EXTRACTS),
            loss: r.quantity(&LOSS),
            lost_to: r.place(&LOST_TO),
            hold_up: r.quantity(&HOLD_UP),
        })
    },
};

struct Soxhlet {
    solvent: Mixture,
    charge: In,
    time: In,
    heater: Option<In>,
    cooling_water: Option<In>,
    extracts: Vec<(Material, In)>,
    loss: In,
    lost_to: Place,
    hold_up: In,
}

impl Step for Soxhlet {
    fn run(&self, x: Draw<'_>, b: &mut Bench<'_>) -> Result<(), Halt> {
        let marc_kg = b.need(Place::MARC)?;
        self.solvent.charge(x, b, Place::LIQUOR, x.get(self.charge), CHARGED)?;

        let time_s = x.get(self.time);
        b.release_over(time_s);
        let loss = x.get(self.loss);
        b.note(LOST, "s", loss, Kind::Fraction);
        // mᵢ = s mᵢ(liquor)
        b.share_volatile(Place::LIQUOR, self.lost_to, loss, LOST)?;

        super::extract(x, b, &self.extracts, Place::MARC, Place::LIQUOR, EXTRACTED)?;
        super::hold_up(b, x.get(self.hold_up), marc_kg, HELD)?;

        super::electricity(x, b, self.heater, Some(time_s), None, HEATED);
        if let Some(flow) = self.cooling_water {
            b.note(COOLED, "q", x.get(flow), Kind::VolumeFlow);
            b.note(COOLED, "t", time_s, Kind::Time);
            // m = q t · 1000 kg/m³
            b.spend(Utility::CoolingWater, x.get(flow) * time_s * 1000.0, COOLED);
        }
        Ok(())
    }
}
