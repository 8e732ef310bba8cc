//! Ultrasonic extraction: one or several portions of solvent, loss to air, hold-up in the marc.

use super::caution::HEATED_FLAMMABLE;
use super::{Control, Group, Mixture, Param, Rule, Step, Technique};
use crate::chance::{Draw, In};
use crate::ledger::{Bench, Halt, Material, Place, RuleIx};
use crate::quantity::Kind;
use crate::source::{COMMON_PRACTICE, DEFINITION, FROM_MEMORY, MASS_BALANCE, Source, Standing};

const SW846_3550C: Source = Source::new(
    "US EPA SW-846 Method 3550C, rev. 3, February 2007; amounts from memory",
    Standing::FromMemory,
);

const SOLVENT: Param = Param::new("solvent", "Solvent", Control::Mixture)
    .required()
    .hint("One material, or several with shares by volume.");
const CHARGE: Param = Param::quantity("charge", "Solvent in one portion", Kind::Volume)
    .required()
    .physical(0.0, 10.0)
    .usual(5e-6, 1e-3)
    .hint("All solvents together, as poured.")
    .source(SW846_3550C);
const PORTIONS: Param = Param::new("portions", "Portions", Control::Count)
    .default("3", SW846_3550C)
    .physical(1.0, 50.0)
    .usual(1.0, 6.0)
    .hint("Each poured on, sonicated and poured off.")
    .source(SW846_3550C);
const TIME: Param = Param::quantity("time", "Time in one portion", Kind::Time)
    .physical(0.0, 2e6)
    .usual(60.0, 3600.0)
    .hint("With the source on.")
    .source(SW846_3550C);
const POWER: Param = Param::quantity("power", "Power drawn", Kind::Power)
    .physical(0.0, 1e6)
    .usual(100.0, 1500.0)
    .with("time")
    .hint("Of bath or probe, averaged over the pulses; left out, no electricity is counted.")
    .source(FROM_MEMORY);
const EXTRACTS: Param =
    Param::new("extracts", "Taken out of the sample", Control::PerMaterial(Kind::Fraction))
        .physical(0.0, 1.0)
        .hint("Share of each feed material that goes into the liquor; leave out for traces.");
const LOSS: Param = Param::quantity("loss", "Share lost to air", Kind::Fraction)
    .default("2 %", FROM_MEMORY)
    .physical(0.0, 1.0)
    .usual(0.0, 0.1)
    .hint("Of all portions together, while sonicating, decanting and filtering.")
    .source(FROM_MEMORY);
const LOST_TO: Param = Param::new("lost_to", "Lost to", Control::Place)
    .default("hood", COMMON_PRACTICE)
    .hint("hood, or room when it is done on the open bench.");
const HOLD_UP: Param = Param::quantity("hold_up", "Solvent held by the marc", Kind::VolumePerMass)
    .default("0.5 mL/g", FROM_MEMORY)
    .physical(0.0, 0.02)
    .usual(1e-4, 3e-3)
    .hint("Volume of liquor that stays with each gram of what lies there, after filtering.")
    .source(FROM_MEMORY);

const CHARGED: RuleIx = RuleIx(0);
const EXTRACTED: RuleIx = RuleIx(1);
const LOST: RuleIx = RuleIx(2);
const HELD: RuleIx = RuleIx(3);
const SONICATED: RuleIx = RuleIx(4);

pub(super) static TECHNIQUE: Technique = Technique {
    key: "ultrasonic",
    title: "Ultrasonic extraction",
    about: "Portions of solvent are sonicated with the sample and poured off. Only the last portion stays in the marc; the \
            loss to air is a stated share, to be replaced by a weighing.",
    group: Group::Extraction,
    takes_feed: Some(Place::MARC),
    params: &[SOLVENT, CHARGE, PORTIONS, TIME, POWER, EXTRACTS, LOSS, LOST_TO, HOLD_UP],
    rules: &[
        Rule::new("charge", "mᵢ = V φᵢ ρᵢ, for each portion", DEFINITION),
        Rule::new("extracted", "mᵢ = sᵢ mᵢ(marc)", MASS_BALANCE),
        Rule::new("lost to air", "mᵢ = s mᵢ(liquor)", FROM_MEMORY).measurable(),
        Rule::new("held in the marc", "mᵢ = (h m_marc / V_liquor) mᵢ(liquor)", FROM_MEMORY).measurable(),
        Rule::new("sonication", "W = P t n", DEFINITION).metered(),
    ],
    cautions: &[HEATED_FLAMMABLE],
    example: r#"{ "step": "ultrasonic", "solvent": { "n-hexane": "50 %", "acetone": "50 %" }, "charge": "100 mL",
        "portions": 3, "time": "3 min", "power": "300 W" }"#,
    read: |r| {
        Box::new(Ultrasonic {
            solvent: r.mixture(&SOLVENT),
            charge: r.quantity(&CHARGE),
            portions: r.count(&PORTIONS),
            time: r.optional(&TIME),
            power: r.power(&POWER),
            extracts: r.taken_out(&EXTRACTS),
            loss: r.quantity(&LOSS),
            lost_to: r.place(&LOST_TO),
            hold_up: r.quantity(&HOLD_UP),
        })
    },
};

struct Ultrasonic {
    solvent: Mixture,
    charge: In,
    portions: u32,
    time: Option<In>,
    power: Option<In>,
    extracts: Vec<(Material, In)>,
    loss: In,
    lost_to: Place,
    hold_up: In,
}

impl Step for Ultrasonic {
    fn run(&self, x: Draw<'_>, b: &mut Bench<'_>) -> Result<(), Halt> {
        let marc_kg = b.need(Place::MARC)?;
        for _ in 0..self.portions {
            self.solvent.charge(x, b, Place::LIQUOR, x.get(self.charge), CHARGED)?;
        }
        if let Some(time) = self.time {
            b.release_over(x.get(time) * f64::from(self.portions));
        }
        let loss = x.get(self.loss);
        b.note(LOST, "s", loss, Kind::Fraction);
        // mᵢ = s mᵢ(liquor)
        b.share_volatile(Place::LIQUOR, self.lost_to, loss, LOST)?;
        super::extract(x, b, &self.extracts, Place::MARC, Place::LIQUOR, EXTRACTED)?;
        super::hold_up(b, x.get(self.hold_up), marc_kg, HELD)?;
        // W = P t n
        let time_s = self.time.map(|t| x.get(t) * f64::from(self.portions));
        super::electricity(x, b, self.power, time_s, None, SONICATED);
        Ok(())
    }
}
