//! Soxhlet extraction: charge, condenser loss, what the sample gives up, what the marc holds back, heat and water.

use super::caution::{HEATED_FLAMMABLE, PEROXIDES};
use super::common::{COOLANT, COOLING_WATER, EXTRACTS, SOLVENT, held_by_marc, loss, lost_to, time};
use super::vapours::{Masses, Vapours};
use super::{Group, Mixture, Param, Rule, Step, Technique};
use crate::chance::{Draw, In};
use crate::emission::BATCH_RULE;
use crate::ledger::{Bench, Halt, Material, Place, RuleIx};
use crate::quantity::Kind;
use crate::source::{COMMON_PRACTICE, DEFINITION, FROM_MEMORY, MASS_BALANCE, Source, Standing};

const SW846_3540C: Source =
    Source::new("US EPA SW-846 Method 3540C, rev. 3, December 1996", Standing::Secondary);

const CHARGE: Param = Param::quantity("charge", "Solvent in the flask", Kind::Volume)
    .required()
    .physical(0.0, 10.0)
    .usual(5e-5, 1e-3)
    .hint("All solvents together, as poured.")
    .source(SW846_3540C);
const TIME: Param = time(
    "Extraction time",
    (14_400.0, 90_000.0),
    "From first to last siphoning; 16 to 24 h is usual.",
    SW846_3540C,
)
.required();
const HEATER: Param = Param::quantity("heater", "Heater power drawn", Kind::Power)
    .physical(0.0, 1e6)
    .usual(50.0, 600.0)
    .hint("As drawn on average, not the rating plate; left out, no electricity is counted.")
    .source(FROM_MEMORY);
const SIPHON: Param = Param::quantity("siphon", "Volume siphoned at a time", Kind::Volume)
    .physical(0.0, 10.0)
    .usual(2e-5, 5e-4)
    .with("cycles")
    .hint("With the cycles it says what heat the reflux takes at least.")
    .source(COMMON_PRACTICE);
const CYCLES: Param = Param::quantity("cycles", "Siphonings", Kind::Frequency)
    .physical(0.0, 0.1)
    .usual(5e-4, 6e-3)
    .hint("As in \"5 /h\"; 4 to 6 an hour is usual.")
    .source(SW846_3540C);
const DRAUGHT: Param = Param::quantity("draught", "Air through the condenser's open end", Kind::VolumeFlow)
    .default("5 mL/min", FROM_MEMORY)
    .physical(0.0, 1.0)
    .usual(0.0, 1e-6)
    .with("coolant")
    .hint("What breathes in and out over the run; it leaves saturated at the coolant's temperature. Close the end with a drying tube and it falls.")
    .source(FROM_MEMORY);
const LOSS: Param = loss(
    "Share lost past the condenser",
    "5 %",
    0.15,
    "Of the charge, over the whole run, from experience; with coolant it is computed instead. Benches lose 5 to 15 %; weigh the flask before and after to know.",
)
.without("coolant");
const LOST_TO: Param = lost_to("hood, or room when the condenser stands outside the hood.");
const HOLD_UP: Param = held_by_marc(
    "1 mL/g",
    (2e-4, 3e-3),
    "Volume of liquor that stays in the thimble, for each gram that lies there.",
);

const CHARGED: RuleIx = RuleIx(0);
const EXTRACTED: RuleIx = RuleIx(1);
const LOST: RuleIx = RuleIx(2);
const HELD: RuleIx = RuleIx(3);
const HEATED: RuleIx = RuleIx(4);
const COOLED: RuleIx = RuleIx(5);

/// Where heats of vaporisation are read; K. At the boiling point they are 5 to 10 % lower, about what warming the condensate takes back.
const COLD_K: f64 = 298.15;

pub(super) static TECHNIQUE: Technique = Technique {
    key: "soxhlet",
    title: "Soxhlet extraction",
    about: "Solvent is boiled, condensed on to the sample and siphoned back for hours. With a coolant the loss past the condenser \
            is what the air through its open end carries, a floor; without one it is a share from experience. Weigh to know.",
    group: Group::Extraction,
    takes_feed: Some(Place::MARC),
    params: &[
        SOLVENT,
        CHARGE,
        TIME,
        HEATER,
        CYCLES,
        SIPHON,
        COOLANT,
        DRAUGHT,
        COOLING_WATER,
        EXTRACTS,
        LOSS,
        LOST_TO,
        HOLD_UP,
    ],
    rules: &[
        Rule::new("charge", "mᵢ = V φᵢ ρᵢ", DEFINITION),
        Rule::new("extracted", "mᵢ = sᵢ mᵢ(marc)", MASS_BALANCE),
        Rule::new(
            "condenser loss",
            "mᵢ = s mᵢ(liquor); with a coolant mᵢ = F t pᵢ Mᵢ / (R T) · P / (P − Σp)",
            BATCH_RULE,
        )
        .measurable(),
        Rule::new("held in the marc", "mᵢ = (h m_marc / V_liquor) mᵢ(liquor)", FROM_MEMORY).measurable(),
        Rule::new("heating", "W = P t, no less than n V_siphon ρ Δh", DEFINITION).metered(),
        Rule::new("cooling water", "m = q t · 1000 kg/m³", DEFINITION),
    ],
    cautions: &[HEATED_FLAMMABLE, PEROXIDES],
    example: r#"{ "step": "soxhlet", "solvent": { "n-hexane": "50 %", "acetone": "50 %" }, "charge": "300 mL",
        "time": "18 h", "heater": "250 W", "coolant": "15 °C", "cooling_water": "0.7 L/min", "measured": { "condenser loss": "6 ± 2 g" } }"#,
    read: |r| {
        let solvent = r.mixture(&SOLVENT);
        let (coolant, draught) = (r.optional(&COOLANT), r.optional(&DRAUGHT));
        let (cycles, siphon) = (r.optional(&CYCLES), r.optional(&SIPHON));
        if r.written("cycles") && siphon.is_none() && !r.written("siphon") {
            r.problem("siphon", "cycles without the volume siphoned", "its volume, such as \"85 mL\"");
        }
        let charge = r.quantity(&CHARGE);
        let vapours = Vapours::read(r, coolant.map(|t| r.value(t)));
        if coolant.is_some() {
            vapours.warn_unknown(r, "coolant");
        }
        Box::new(Soxhlet {
            solvent,
            charge,
            vapours,
            time: r.quantity(&TIME),
            heater: r.power(&HEATER),
            cycles: cycles.zip(siphon),
            condenser: coolant.zip(draught),
            cooling_water: r.optional(&COOLING_WATER),
            extracts: r.taken_out(&EXTRACTS),
            loss: r.optional(&LOSS),
            lost_to: r.place(&LOST_TO),
            hold_up: r.quantity(&HOLD_UP),
        })
    },
};

struct Soxhlet {
    solvent: Mixture,
    charge: In,
    vapours: Vapours,
    time: In,
    heater: Option<In>,
    /// How often it siphons, and how much at a time.
    cycles: Option<(In, In)>,
    /// The coolant and the air through the open end.
    condenser: Option<(In, In)>,
    cooling_water: Option<In>,
    extracts: Vec<(Material, In)>,
    loss: Option<In>,
    lost_to: Place,
    hold_up: In,
}

impl Step for Soxhlet {
    fn run(&self, x: Draw<'_>, b: &mut Bench<'_>) -> Result<(), Halt> {
        let marc_kg = b.need(Place::MARC)?;
        self.solvent.charge(x, b, Place::LIQUOR, x.get(self.charge), CHARGED)?;
        let time_s = x.get(self.time);
        let charged = self.vapours.lying(b, Place::LIQUOR);

        b.release_over(time_s);
        if let Some((coolant, draught)) = self.condenser {
            let (coolant_k, flow_m3_s) = (x.get(coolant), x.get(draught));
            self.vapours.tell(b, &charged, LOST);
            let (lost, sum_pa) = self.vapours.carried_off(x, &charged, flow_m3_s * time_s, coolant_k)?;
            b.note(LOST, "F", flow_m3_s, Kind::VolumeFlow);
            b.note(LOST, "t", time_s, Kind::Time);
            b.note(LOST, "T", coolant_k, Kind::Temperature);
            b.note(LOST, "Σp", sum_pa, Kind::Pressure);
            let (parts, count) = self.vapours.parts(&lost);
            b.split(Place::LIQUOR, self.lost_to, &parts[..count], LOST)?;
        } else {
            let loss = self.loss.map_or(0.0, |s| x.get(s));
            b.note(LOST, "s", loss, Kind::Fraction);
            // mᵢ = s mᵢ(liquor)
            b.share_volatile(Place::LIQUOR, self.lost_to, loss, LOST)?;
        }

        super::extract(x, b, &self.extracts, Place::MARC, Place::LIQUOR, EXTRACTED)?;
        super::hold_up(b, x.get(self.hold_up), marc_kg, HELD)?;

        let heat_j = self.reflux_j(x, b, &charged, time_s);
        super::electricity(x, b, self.heater, Some(time_s), heat_j, HEATED);
        if let Some(flow) = self.cooling_water {
            super::cooling_water(x, b, flow, time_s, heat_j, COOLED);
        }
        Ok(())
    }
}

impl Soxhlet {
    /// Heat that the cycles carry from the flask to the condenser; J. It is the floor of the heater.
    fn reflux_j(&self, x: Draw<'_>, b: &mut Bench<'_>, charged: &Masses, time_s: f64) -> Option<f64> {
        let (cycles, siphon) = self.cycles?;
        let mut charged_kg = 0.0;
        for kg in charged {
            charged_kg += kg;
        }
        let siphoned_m3 = x.get(cycles) * time_s * x.get(siphon);
        b.note(HEATED, "n", x.get(cycles) * time_s, Kind::Number);
        b.note(HEATED, "V_siphon", x.get(siphon), Kind::Volume);
        // Q = n V_siphon ρ Δh, with ρ and Δh of the solvent as charged, cold; the sensible heat is left out
        let latent_j = self.vapours.heat_j(charged, COLD_K)?;
        (charged_kg > 0.0).then(|| siphoned_m3 / x.get(self.charge) * latent_j)
    }
}
