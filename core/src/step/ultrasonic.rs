//! Ultrasonic extraction: one or several portions of solvent, loss to air, hold-up in the marc.

use super::caution::HEATED_FLAMMABLE;
use super::common::{EXTRACTS, Open, SOLVENT, SURFACE, WARM, held_by_marc, loss, lost_to, power, time};
use super::{Control, Group, Mixture, Param, Rule, Step, Technique};
use crate::chance::{Draw, In};
use crate::emission::EIIP;
use crate::ledger::{Bench, Halt, Material, Place, RuleIx};
use crate::quantity::Kind;
use crate::source::{DEFINITION, FROM_MEMORY, MASS_BALANCE, Source, Standing};

const SW846_3550C: Source = Source::new(
    "US EPA SW-846 Method 3550C, rev. 3, February 2007; amounts from memory",
    Standing::FromMemory,
);

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
const TIME: Param = time("Time in one portion", (60.0, 3600.0), "With the source on.", SW846_3550C);
const POWER: Param = power(
    (100.0, 1500.0),
    "Of bath or probe, averaged over the pulses; left out, no electricity is counted.",
);
const LOSS: Param = loss(
    "Share lost to air",
    "2 %",
    0.1,
    "Of all portions together, while sonicating, decanting and filtering, from experience; with surface it is computed instead.",
)
.without("surface");
const SURFACE_OPEN: Param = SURFACE.with("time");
const LOST_TO: Param = lost_to("hood, or room when it is done on the open bench.");
const HOLD_UP: Param = held_by_marc(
    "0.5 mL/g",
    (1e-4, 3e-3),
    "Volume of liquor that stays with each gram of what lies there, after filtering.",
);

const CHARGED: RuleIx = RuleIx(0);
const EXTRACTED: RuleIx = RuleIx(1);
const LOST: RuleIx = RuleIx(2);
const HELD: RuleIx = RuleIx(3);
const SONICATED: RuleIx = RuleIx(4);

pub(super) static TECHNIQUE: Technique = Technique {
    key: "ultrasonic",
    title: "Ultrasonic extraction",
    about: "Portions of solvent are sonicated with the sample and poured off. Only the last portion stays in the marc. The \
            loss to air is a share from experience, or that of an open surface in still air; weigh to know.",
    group: Group::Extraction,
    takes_feed: Some(Place::MARC),
    params: &[SOLVENT, CHARGE, PORTIONS, TIME, POWER, EXTRACTS, LOSS, SURFACE_OPEN, WARM, LOST_TO, HOLD_UP],
    rules: &[
        Rule::new("charge", "mᵢ = V φᵢ ρᵢ, for each portion", DEFINITION),
        Rule::new("extracted", "mᵢ = sᵢ mᵢ(marc)", MASS_BALANCE),
        Rule::new("lost to air", "mᵢ = s mᵢ(liquor); with a surface mᵢ = Mᵢ Kᵢ A pᵢ t / (R T)", EIIP)
            .measurable(),
        Rule::new("held in the marc", "mᵢ = (h m_marc / V_liquor) mᵢ(liquor)", FROM_MEMORY).measurable(),
        Rule::new("sonication", "W = P t n", DEFINITION).metered(),
    ],
    cautions: &[HEATED_FLAMMABLE],
    example: r#"{ "step": "ultrasonic", "solvent": { "n-hexane": "50 %", "acetone": "50 %" }, "charge": "100 mL",
        "portions": 3, "time": "3 min", "power": "300 W" }"#,
    read: |r| {
        let (solvent, charge) = (r.mixture(&SOLVENT), r.quantity(&CHARGE));
        Box::new(Ultrasonic {
            open: Open::read(r, &SURFACE_OPEN),
            solvent,
            charge,
            portions: r.count(&PORTIONS),
            time: r.optional(&TIME),
            power: r.power(&POWER),
            extracts: r.taken_out(&EXTRACTS),
            loss: r.optional(&LOSS),
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
    loss: Option<In>,
    open: Option<Open>,
    lost_to: Place,
    hold_up: In,
}

impl Step for Ultrasonic {
    fn run(&self, x: Draw<'_>, b: &mut Bench<'_>) -> Result<(), Halt> {
        let marc_kg = b.need(Place::MARC)?;
        for _ in 0..self.portions {
            self.solvent.charge(x, b, Place::LIQUOR, x.get(self.charge), CHARGED)?;
        }
        // W = P t n
        let time_s = self.time.map(|t| x.get(t) * f64::from(self.portions));
        Open::lose(self.open.as_ref(), x, b, (Place::LIQUOR, self.lost_to), (self.loss, time_s), LOST)?;
        super::extract(x, b, &self.extracts, Place::MARC, Place::LIQUOR, EXTRACTED)?;
        super::hold_up(b, x.get(self.hold_up), marc_kg, HELD)?;
        super::electricity(x, b, self.power, time_s, None, SONICATED);
        Ok(())
    }
}
