//! Distillation of an extract or of collected solvent in a batch: forerun, main cut, residue; what the condenser lets past.

use super::caution::{DISTILLED_WASTE, HEATED_FLAMMABLE, PEROXIDES};
use super::common::{COOLANT, COOLING_WATER, loss, lost_to, power, time};
use super::vapours::{Masses, Vapours};
use super::{Control, Group, Param, Rule, Step, Technique};
use crate::chance::{Draw, In};
use crate::emission::BATCH_RULE;
use crate::ledger::{Bench, Halt, Place, RuleIx};
use crate::quantity::Kind;
use crate::source::{COMMON_PRACTICE, DEFINITION, FROM_MEMORY, MASS_BALANCE, Source, Standing};

const RAYLEIGH: Source = Source::new(
    "Rayleigh's equation of simple distillation with Wilson's activity coefficients; recomputed",
    Standing::Recomputed,
);

const TO: Param = Param::quantity("to", "Residue left", Kind::Volume)
    .required()
    .physical(0.0, 10.0)
    .usual(1e-6, 0.5)
    .hint("Of liquid in the pot when it is stopped; never to dryness.")
    .source(COMMON_PRACTICE);
const TEMPERATURE: Param = Param::quantity("temperature", "Temperature in the pot", Kind::Temperature)
    .default("60 °C", FROM_MEMORY)
    .physical(200.0, 500.0)
    .usual(293.15, 383.15)
    .hint("On average, as it boils; it decides how much more volatile one liquid is than the other.")
    .source(FROM_MEMORY);
const FORERUN: Param = Param::quantity("forerun", "First cut", Kind::Volume)
    .physical(0.0, 10.0)
    .usual(1e-6, 0.5)
    .hint("What goes over first and is kept apart; left out, there is one cut.")
    .source(COMMON_PRACTICE);
const FORERUN_TO: Param = Param::new("forerun_to", "First cut goes to", Control::Place)
    .with("forerun")
    .hint("A stream, as a rule.");
const DISTILLATE: Param = Param::new("distillate", "Distillate goes to", Control::Place)
    .required()
    .hint("store where it is used again; a stream where it is not. What the blank allows decides, not the boiling point.");
const REFLUX: Param = Param::quantity("reflux", "Reflux ratio", Kind::Number)
    .default("0", DEFINITION)
    .physical(0.0, 50.0)
    .usual(0.0, 10.0)
    .hint("Only the heat follows it: separation is that of a single stage, which a column betters.")
    .source(COMMON_PRACTICE);
const DRAUGHT: Param = Param::quantity("draught", "Air through the receiver's vent", Kind::VolumeFlow)
    .default("5 mL/min", FROM_MEMORY)
    .physical(0.0, 1.0)
    .usual(0.0, 1e-5)
    .with("coolant")
    .hint("It leaves saturated at the coolant's temperature; what the distillate displaces in the receiver comes on top.")
    .source(FROM_MEMORY);
const STILL_COOLANT: Param = COOLANT.with("time");
const LOSS: Param = loss(
    "Share past the condenser",
    "2 %",
    0.2,
    "Of what goes over, from experience; with coolant it is computed instead. Weigh pot and receiver to know.",
)
.without("coolant");
const LOST_TO: Param = lost_to("hood, or room where the still vents into it.");
const TIME: Param = time("Time", (1800.0, 43_200.0), "For one run of the step.", COMMON_PRACTICE);
const POWER: Param =
    power((100.0, 5000.0), "Of mantle, pump and chiller on average; left out, no electricity is counted.");
const WATER: Param = COOLING_WATER.with("time");

const BOILED: RuleIx = RuleIx(0);
const LOST: RuleIx = RuleIx(1);
const FIRST: RuleIx = RuleIx(2);
const OVER: RuleIx = RuleIx(3);
const HEATED: RuleIx = RuleIx(4);
const COOLED: RuleIx = RuleIx(5);

pub(super) static TECHNIQUE: Technique = Technique {
    key: "distil",
    title: "Distillation",
    about: "What lies in the liquor is boiled and condensed, in one or two cuts, until a residue is left: each liquid as its vapour pressure \
            over the mixture has it, in a single stage. With a coolant the loss is what leaves saturated with the air, a floor.",
    group: Group::Extract,
    takes_feed: None,
    params: &[
        TO,
        TEMPERATURE,
        FORERUN,
        FORERUN_TO,
        DISTILLATE,
        REFLUX,
        STILL_COOLANT,
        DRAUGHT,
        LOSS,
        LOST_TO,
        TIME,
        POWER,
        WATER,
    ],
    rules: &[
        Rule::new("boiled off", "dnᵢ/dθ = −γᵢ pᵢ,sat nᵢ until Σ nᵢ Mᵢ / ρᵢ = V_left", RAYLEIGH),
        Rule::new(
            "lost past the condenser",
            "mᵢ = s mᵢ(vapour); with a coolant mᵢ = (F t + V) pᵢ Mᵢ / (R T) · P / (P − Σp)",
            BATCH_RULE,
        )
        .measurable(),
        Rule::new("first cut", "all that is there of it", MASS_BALANCE),
        Rule::new("distillate", "what is left of the vapour", MASS_BALANCE),
        Rule::new("heating", "W = P t, no less than (1 + r) Σ mᵢ Δhᵢ", DEFINITION).metered(),
        Rule::new("cooling water", "m = q t · 1000 kg/m³", DEFINITION),
    ],
    cautions: &[HEATED_FLAMMABLE, PEROXIDES, DISTILLED_WASTE],
    example: r#"{ "step": "distil", "to": "5 mL", "forerun": "5 mL", "forerun_to": "elsewhere", "distillate": "store", "coolant": "15 °C",
        "time": "2 h", "power": "400 W" }"#,
    read: |r| {
        let (forerun, forerun_to) = (r.optional(&FORERUN), r.optional_place(&FORERUN_TO));
        if forerun.is_some() && !r.written("forerun_to") {
            r.problem(
                "forerun_to",
                "nothing says where the first cut goes",
                "a stream, or store where it is used again",
            );
        }
        let (coolant, draught, time) = (r.optional(&STILL_COOLANT), r.optional(&DRAUGHT), r.optional(&TIME));
        let vapours = Vapours::read(r, coolant.map(|t| r.value(t)));
        vapours.warn_unknown(r, "to");
        Box::new(Distil {
            to: r.quantity(&TO),
            temperature: r.quantity(&TEMPERATURE),
            vapours,
            forerun: forerun.zip(forerun_to),
            distillate: r.place(&DISTILLATE),
            reflux: r.quantity(&REFLUX),
            condenser: coolant.zip(draught),
            loss: r.optional(&LOSS),
            lost_to: r.place(&LOST_TO),
            time,
            power: r.power(&POWER),
            water: r.optional(&WATER),
        })
    },
};

struct Distil {
    to: In,
    temperature: In,
    vapours: Vapours,
    forerun: Option<(In, Place)>,
    distillate: Place,
    reflux: In,
    /// The coolant and the air through the vent.
    condenser: Option<(In, In)>,
    loss: Option<In>,
    lost_to: Place,
    time: Option<In>,
    power: Option<In>,
    water: Option<In>,
}

impl Step for Distil {
    fn run(&self, x: Draw<'_>, b: &mut Bench<'_>) -> Result<(), Halt> {
        b.need(Place::LIQUOR)?;
        b.need_empty(Place::VAPOUR)?;
        let (there_m3, left_m3) = (b.liquid_volume_m3(Place::LIQUOR), x.get(self.to));
        let first_m3 = self.forerun.map_or(0.0, |(v, _)| x.get(v));
        if first_m3 + left_m3 > there_m3 {
            return Err(Halt::NotReached { wanted_m3: first_m3 + left_m3, there_m3 });
        }
        let time_s = self.time.map(|t| x.get(t));
        if let Some(time_s) = time_s {
            b.release_over(time_s);
        }
        let charged = self.vapours.lying(b, Place::LIQUOR);
        self.vapours.tell(b, &charged, BOILED);
        self.vapours.note_way_down(b, &charged, (x.get(self.temperature), left_m3), true);
        let mut gone = [0.0; super::LARGEST];
        if let Some((_, to)) = self.forerun {
            self.boil(x, b, there_m3 - first_m3, &mut gone)?;
            b.sweep(Place::VAPOUR, to, FIRST);
        }
        let main = self.boil(x, b, left_m3, &mut gone)?;
        self.lose(x, b, &main, there_m3 - left_m3)?;
        b.sweep(Place::VAPOUR, self.distillate, OVER);

        let reflux = x.get(self.reflux);
        b.note(HEATED, "r", reflux, Kind::Number);
        // Q = (1 + r) Σ mᵢ Δhᵢ
        let heat_j = self.vapours.heat_j(&gone, x.get(self.temperature)).map(|q| q * (1.0 + reflux));
        super::electricity(x, b, self.power, time_s, heat_j, HEATED);
        if let (Some(water), Some(time_s)) = (self.water, time_s) {
            super::cooling_water(x, b, water, time_s, heat_j, COOLED);
        }
        Ok(())
    }
}

impl Distil {
    /// Boils one cut off, down to a volume left in the pot. Returns what has gone of what can be reckoned with; kg.
    fn boil(&self, x: Draw<'_>, b: &mut Bench<'_>, left_m3: f64, all: &mut Masses) -> Result<Masses, Halt> {
        let v = &self.vapours;
        let temperature_k = x.get(self.temperature);
        let there_m3 = b.liquid_volume_m3(Place::LIQUOR);
        b.note(BOILED, "V_left", left_m3, Kind::Volume);
        b.note(BOILED, "T", temperature_k, Kind::Temperature);
        let there = v.lying(b, Place::LIQUOR);
        let share_left = if there_m3 > 0.0 { left_m3 / there_m3 } else { 1.0 };
        let known_m3 = left_m3 - share_left * v.other_m3(b, Place::LIQUOR);
        let down = v.take_down(x, &there, known_m3, temperature_k)?;
        let gone = v.evaporate(b, &there, &down.left_kg, (share_left, self.lost_to), BOILED)?;
        for (all, gone) in all.iter_mut().zip(gone) {
            *all += gone;
        }
        Ok(gone)
    }

    /// What passes the condenser, reckoned over the main cut for the whole run.
    fn lose(&self, x: Draw<'_>, b: &mut Bench<'_>, main: &Masses, whole_m3: f64) -> Result<(), Halt> {
        if let (Some((coolant, draught)), Some(time)) = (self.condenser, self.time) {
            let coolant_k = x.get(coolant);
            // Air through the vent, and what the distillate displaces in the receivers: F t + V
            let gas_m3 = x.get(draught) * x.get(time) + whole_m3;
            let (lost, sum_pa) = self.vapours.carried_off(x, main, gas_m3, coolant_k)?;
            b.note(LOST, "F t + V", gas_m3, Kind::Volume);
            b.note(LOST, "T", coolant_k, Kind::Temperature);
            b.note(LOST, "Σp", sum_pa, Kind::Pressure);
            let (parts, count) = self.vapours.parts(&lost);
            b.split(Place::VAPOUR, self.lost_to, &parts[..count], LOST)?;
        } else {
            let loss = self.loss.map_or(0.0, |s| x.get(s));
            b.note(LOST, "s", loss, Kind::Fraction);
            // mᵢ = s mᵢ(vapour)
            b.share_volatile(Place::VAPOUR, self.lost_to, loss, LOST)?;
        }
        Ok(())
    }
}
