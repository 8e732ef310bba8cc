//! Microwave extraction: closed vessels heated together, opened cold; what the sample gives up, what the marc holds.

use super::caution::{HEATED_FLAMMABLE, PRESSURE_VESSEL};
use super::common::{EXTRACTS, SOLVENT, held_by_marc, loss, lost_to, time};
use super::vapours::{AIR_PA, Masses, Vapours};
use super::{Control, Group, Mixture, Param, Rule, Step, Technique};
use crate::chance::{Draw, In};
use crate::emission::{BATCH_RULE, fill};
use crate::ledger::{Bench, Halt, Material, Place, RuleIx};
use crate::quantity::Kind;
use crate::source::{DEFINITION, FROM_MEMORY, MASS_BALANCE, Source, Standing};

const SW846_3546: Source = Source::new(
    "US EPA SW-846 Method 3546, rev. 0, February 2007; amounts from memory",
    Standing::FromMemory,
);

const CHARGE: Param = Param::quantity("charge", "Solvent in a vessel", Kind::Volume)
    .required()
    .physical(0.0, 1.0)
    .usual(1e-5, 1e-4)
    .hint("All solvents together, as poured; 25 to 30 mL for 2 to 20 g is usual. An apolar solvent alone takes up no microwaves.")
    .source(SW846_3546);
const TIME: Param = time(
    "Time under power",
    (300.0, 3600.0),
    "Heating up and holding, cooling left out; 10 to 20 min is usual.",
    SW846_3546,
);
const VESSELS: Param = Param::new("vessels", "Vessels heated together", Control::Count)
    .default("1", DEFINITION)
    .physical(1.0, 100.0)
    .usual(1.0, 40.0)
    .hint("The power is shared between them.")
    .source(SW846_3546);
const POWER: Param = Param::quantity("power", "Power drawn by the oven", Kind::Power)
    .physical(0.0, 1e5)
    .usual(300.0, 4000.0)
    .with("time")
    .hint("From the socket, for all vessels together; a magnetron turns 60 to 70 % of it into microwaves. Left out, no electricity is counted.")
    .source(FROM_MEMORY);
const RINSE: Param = Param::quantity("rinse", "Rinse of a vessel", Kind::Volume)
    .physical(0.0, 0.1)
    .usual(2e-6, 3e-5)
    .hint("Fresh solvent of the same mixture, which joins the extract; left out, none is counted.")
    .source(SW846_3546);
const HEADSPACE: Param = Param::quantity("headspace", "Gas space of a vessel", Kind::Volume)
    .physical(0.0, 1.0)
    .usual(2e-5, 1e-4)
    .hint("Of the closed vessel, above the liquid; with it the loss on opening is computed.")
    .source(SW846_3546);
const OPENED: Param = Param::quantity("opened_at", "Temperature on opening", Kind::Temperature)
    .default("25 °C", SW846_3546)
    .physical(200.0, 450.0)
    .usual(278.15, 313.15)
    .with("headspace")
    .hint("Cooled to the room's before it is opened: near the boiling point it would spray.")
    .source(SW846_3546);
const LOSS: Param = loss(
    "Share lost to air",
    "1 %",
    0.05,
    "On opening and filtering, from experience; with headspace that of opening is computed instead. Weigh vessels before and after to know.",
)
.without("headspace");
const LOST_TO: Param = lost_to("hood, or room where vessels are opened outside it.");
const HOLD_UP: Param = held_by_marc(
    "0.4 mL/g",
    (1e-4, 3e-3),
    "Volume of liquor that stays with each gram of what lies there, after filtering.",
);

const CHARGED: RuleIx = RuleIx(0);
const EXTRACTED: RuleIx = RuleIx(1);
const LOST: RuleIx = RuleIx(2);
const HELD: RuleIx = RuleIx(3);
const HEATED: RuleIx = RuleIx(4);
const RINSED: RuleIx = RuleIx(5);

pub(super) static TECHNIQUE: Technique = Technique {
    key: "microwave",
    title: "Microwave extraction",
    about: "Sample and solvent are heated in closed vessels under pressure, cooled, opened and filtered. With the gas space the loss is the \
            saturated vapour that leaves it on opening, a floor; without it a share from experience.",
    group: Group::Extraction,
    takes_feed: Some(Place::MARC),
    params: &[
        SOLVENT, CHARGE, TIME, VESSELS, POWER, RINSE, EXTRACTS, LOSS, HEADSPACE, OPENED, LOST_TO, HOLD_UP,
    ],
    rules: &[
        Rule::new("charge", "mᵢ = V φᵢ ρᵢ", DEFINITION),
        Rule::new("extracted", "mᵢ = sᵢ mᵢ(marc)", MASS_BALANCE),
        Rule::new("lost to air", "mᵢ = s mᵢ(liquor); with a gas space mᵢ = V pᵢ Mᵢ / (R T)", BATCH_RULE)
            .measurable(),
        Rule::new("held in the marc", "mᵢ = (h m_marc / V_liquor) mᵢ(liquor)", FROM_MEMORY).measurable(),
        Rule::new("heating", "W = P t / N", DEFINITION).metered(),
        Rule::new("rinse", "mᵢ = V φᵢ ρᵢ", DEFINITION),
    ],
    cautions: &[PRESSURE_VESSEL, HEATED_FLAMMABLE],
    example: r#"{ "step": "microwave", "solvent": { "n-hexane": "50 %", "acetone": "50 %" }, "charge": "25 mL", "time": "20 min",
        "vessels": 16, "power": "1.8 kW", "rinse": "5 mL", "headspace": "60 mL" }"#,
    read: |r| {
        let (solvent, charge) = (r.mixture(&SOLVENT), r.quantity(&CHARGE));
        let (headspace, opened) = (r.optional(&HEADSPACE), r.optional(&OPENED));
        let vapours = Vapours::read(r, None);
        if headspace.is_some() {
            vapours.warn_unknown(r, "headspace");
        }
        Box::new(Microwave {
            solvent,
            charge,
            vapours,
            headspace: headspace.zip(opened),
            time: r.optional(&TIME),
            vessels: r.count(&VESSELS),
            power: r.power(&POWER),
            rinse: r.optional(&RINSE),
            extracts: r.taken_out(&EXTRACTS),
            loss: r.optional(&LOSS),
            lost_to: r.place(&LOST_TO),
            hold_up: r.quantity(&HOLD_UP),
        })
    },
};

struct Microwave {
    solvent: Mixture,
    charge: In,
    vapours: Vapours,
    /// The gas space and the temperature at which it is opened.
    headspace: Option<(In, In)>,
    time: Option<In>,
    vessels: u32,
    power: Option<In>,
    rinse: Option<In>,
    extracts: Vec<(Material, In)>,
    loss: Option<In>,
    lost_to: Place,
    hold_up: In,
}

impl Step for Microwave {
    fn run(&self, x: Draw<'_>, b: &mut Bench<'_>) -> Result<(), Halt> {
        let marc_kg = b.need(Place::MARC)?;
        self.solvent.charge(x, b, Place::LIQUOR, x.get(self.charge), CHARGED)?;
        super::extract(x, b, &self.extracts, Place::MARC, Place::LIQUOR, EXTRACTED)?;
        // A vessel is opened at once.
        b.release_over(0.0);
        if let Some((volume, opened)) = self.headspace {
            let lost = self.on_opening(x, b, x.get(volume), x.get(opened))?;
            let (parts, count) = self.vapours.parts(&lost);
            b.split(Place::LIQUOR, self.lost_to, &parts[..count], LOST)?;
        } else {
            let loss = self.loss.map_or(0.0, |s| x.get(s));
            b.note(LOST, "s", loss, Kind::Fraction);
            // mᵢ = s mᵢ(liquor)
            b.share_volatile(Place::LIQUOR, self.lost_to, loss, LOST)?;
        }
        if let Some(rinse) = self.rinse {
            self.solvent.charge(x, b, Place::LIQUOR, x.get(rinse), RINSED)?;
        }
        super::hold_up(b, x.get(self.hold_up), marc_kg, HELD)?;
        b.note(HEATED, "N", f64::from(self.vessels), Kind::Count);
        // W = P t / N: a run of the step is one vessel
        let time_s = self.time.map(|t| x.get(t) / f64::from(self.vessels));
        super::electricity(x, b, self.power, time_s, None, HEATED);
        Ok(())
    }
}

impl Microwave {
    /// The saturated vapour of the gas space, no more than there is; kg.
    fn on_opening(
        &self,
        x: Draw<'_>,
        b: &mut Bench<'_>,
        volume_m3: f64,
        temperature_k: f64,
    ) -> Result<Masses, Halt> {
        let liquor = self.vapours.lying(b, Place::LIQUOR);
        self.vapours.tell(b, &liquor, LOST);
        let vapours = self.vapours.over(x, &liquor, temperature_k)?;
        b.note(LOST, "V", volume_m3, Kind::Volume);
        b.note(LOST, "T", temperature_k, Kind::Temperature);
        b.note(LOST, "Σp", Vapours::sum_pa(&vapours), Kind::Pressure);
        // mᵢ = V pᵢ Mᵢ / (R T)
        let mut lost = fill(volume_m3, temperature_k, AIR_PA, &vapours)?.kg;
        for (lost, there) in lost.iter_mut().zip(&liquor) {
            if *lost > *there {
                *lost = *there;
            }
        }
        Ok(lost)
    }
}
