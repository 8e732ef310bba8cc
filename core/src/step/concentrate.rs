//! Taking an extract down: rotary evaporator, Kuderna-Danish, nitrogen stream; what is caught and what goes to air.

use super::caution::{EVAPORATED_TO_AIR, HEATED_FLAMMABLE, PEROXIDES};
use super::common::{COOLANT, COOLING_WATER, METER_K, NITROGEN_KG_M3};
use super::vapours::{AIR_PA, Down, Masses, Vapours};
use super::{Control, Group, Param, Rule, Step, Technique};
use crate::chance::{Draw, In};
use crate::emission::{BATCH_RULE, check_time, depressurise, least_time_s, self_cooling, vacuum_leak};
use crate::ledger::{Bench, Halt, Material, Place, RuleIx};
use crate::program::Reader;
use crate::quantity::Kind;
use crate::source::{COMMON_PRACTICE, DEFINITION, FROM_MEMORY, MASS_BALANCE, Source, Standing};

const ROTARY: &str = "rotary evaporator";
const KUDERNA: &str = "Kuderna-Danish";
const NITROGEN: &str = "nitrogen stream";
const IDEAL_GAS: Source = Source::new("ideal gas law, R of CODATA 2018", Standing::Definition);
const RAYLEIGH: Source = Source::new(
    "Rayleigh's equation of simple distillation with Wilson's activity coefficients; recomputed",
    Standing::Recomputed,
);

const BY: Param = Param::new("by", "By", Control::Choice(&[ROTARY, KUDERNA, NITROGEN]))
    .required()
    .hint("An open Kuderna-Danish and a nitrogen stream send all they evaporate to air.");
const TO: Param = Param::quantity("to", "Volume left", Kind::Volume)
    .required()
    .physical(0.0, 10.0)
    .usual(1e-7, 0.01)
    .hint("Of liquid; what is dissolved in it stays.")
    .source(COMMON_PRACTICE);
const TEMPERATURE: Param = Param::quantity("temperature", "Temperature of the liquid", Kind::Temperature)
    .default("35 °C", FROM_MEMORY)
    .physical(200.0, 500.0)
    .usual(283.15, 383.15)
    .hint("Not of the bath, which is some 20 K warmer under vacuum. It decides what leaves first, and how much a gas can carry.")
    .source(FROM_MEMORY);
const CONDENSATE: Param = Param::new("condensate", "Condensate goes to", Control::Place)
    .hint("A stream, or store where it is used again.");
const LOSS: Param = super::common::loss(
    "Share past the condenser",
    "5 %",
    0.3,
    "Of what evaporates, from experience; with coolant it is computed instead. Weigh the condensate to know.",
)
.when("by", &[ROTARY])
.without("coolant");
const ROTARY_COOLANT: Param = COOLANT.when("by", &[ROTARY]).with("time");
const VACUUM: Param = Param::quantity("vacuum", "Pressure held", Kind::Pressure)
    .physical(1.0, 1.1e5)
    .usual(500.0, 9e4)
    .with("coolant")
    .hint("In the condenser; left out, that at which the liquor boils at first at the temperature of the liquid.")
    .source(COMMON_PRACTICE);
const EVACUATED: Param = Param::quantity("evacuated", "Volume pumped down", Kind::Volume)
    .default("3 L", FROM_MEMORY)
    .physical(0.0, 10.0)
    .usual(5e-4, 0.02)
    .with("coolant")
    .hint("Flasks and condenser, once in a run: the air drawn off leaves saturated.")
    .source(FROM_MEMORY);
const LEAK: Param = Param::quantity("leak", "Air that leaks in", Kind::MassFlow)
    .default("10 mg/min", FROM_MEMORY)
    .physical(0.0, 1.0)
    .usual(1e-8, 1e-5)
    .with("coolant")
    .hint("A rise of 2 mbar a minute in 3 L with the pump shut off is 7 mg/min.")
    .source(FROM_MEMORY);
const CAUGHT: Param = Param::quantity("caught", "Share caught by a recovery condenser", Kind::Fraction)
    .default("0 %", COMMON_PRACTICE)
    .physical(0.0, 1.0)
    .when("by", &[KUDERNA])
    .hint("An open Snyder column catches nothing; say what a recovery condenser brings back.")
    .source(COMMON_PRACTICE);
const GAS_FLOW: Param = Param::quantity("gas_flow", "Nitrogen flow", Kind::VolumeFlow)
    .physical(0.0, 1.0)
    .usual(1e-6, 1e-3)
    .when("by", &[NITROGEN])
    .with("time")
    .hint("At 25 °C and 1 atm, for one sample; left out, no nitrogen is counted and no time is checked.")
    .source(COMMON_PRACTICE);
const LOST_TO: Param = Param::new("lost_to", "To air by", Control::Place)
    .default("hood", COMMON_PRACTICE)
    .hint("hood, room, or destroyed where an abatement device takes it.");
const TIME: Param =
    super::common::time("Time", (60.0, 14_400.0), "For one run of the step.", COMMON_PRACTICE);
const POWER: Param = super::common::power(
    (0.0, 3000.0),
    "Bath, rotation, pump and chiller on average; \"0 W\" for an unheated stream; left out, electricity is not compared.",
);
const WATER: Param = COOLING_WATER.when("by", &[ROTARY]).with("time");

const EVAPORATED: RuleIx = RuleIx(0);
const LOST: RuleIx = RuleIx(1);
const CONDENSED: RuleIx = RuleIx(2);
const BLOWN: RuleIx = RuleIx(3);
const HEATED: RuleIx = RuleIx(4);
const COOLED: RuleIx = RuleIx(5);

pub(super) static TECHNIQUE: Technique = Technique {
    key: "concentrate",
    title: "Concentration",
    about: "Solvent is evaporated until the stated volume is left, each liquid as its vapour pressure over the mixture has it, so \
            that what is left is the least volatile. With a coolant the loss past the condenser is that of the air drawn \
            off, a floor; without one it is a share from experience. A nitrogen stream is held against what it can carry.",
    group: Group::Extract,
    takes_feed: None,
    params: &[
        BY, TO, TEMPERATURE, CONDENSATE, LOSS, ROTARY_COOLANT, VACUUM, EVACUATED, LEAK, CAUGHT, GAS_FLOW, LOST_TO, TIME, POWER, WATER,
    ],
    rules: &[
        Rule::new("evaporated", "dnᵢ/dθ = −γᵢ pᵢ,sat nᵢ until Σ nᵢ Mᵢ / ρᵢ = V_left", RAYLEIGH),
        Rule::new(
            "lost past the condenser",
            "mᵢ = s mᵢ(vapour); with a coolant mᵢ = Mᵢ pᵢ (V/(R T) ln((P₀ − Σp)/(P − Σp)) + L t/(M_air (P − Σp)))",
            BATCH_RULE,
        )
        .measurable(),
        Rule::new("condensed", "what is left of the vapour", MASS_BALANCE),
        Rule::new("nitrogen blown through", "m = q t p M / (R T), 25 °C and 1 atm", IDEAL_GAS),
        Rule::new("heating and pumping", "W = P t, no less than Σ mᵢ Δhᵢ", DEFINITION).metered(),
        Rule::new("cooling water", "m = q t · 1000 kg/m³", DEFINITION),
    ],
    cautions: &[HEATED_FLAMMABLE, PEROXIDES, EVAPORATED_TO_AIR],
    example: r#"{ "step": "concentrate", "by": "rotary evaporator", "to": "5 mL", "condensate": "elsewhere", "coolant": "5 °C",
        "time": "20 min", "power": "1.3 kW" }"#,
    read,
};

struct Concentrate {
    to: In,
    temperature: In,
    vapours: Vapours,
    condensate: Place,
    loss: Loss,
    gas: Option<(Material, In)>,
    /// Nothing says that a bath holds it warm.
    no_bath: bool,
    lost_to: Place,
    time: Option<In>,
    power: Option<In>,
    water: Option<In>,
    heated: bool,
}

/// What of the vapour goes to air.
enum Loss {
    Share(In),
    AllBut(In),
    All,
    /// With the air that is drawn off past a condenser.
    Drawn(Vacuum),
}

struct Vacuum {
    coolant: In,
    pressure: Option<In>,
    evacuated: In,
    leak: In,
    time: In,
}

fn read(r: &mut Reader<'_, '_>) -> Box<dyn Step> {
    let by = r.choice(&BY);
    let to = r.quantity(&TO);
    let temperature = r.quantity(&TEMPERATURE);
    let condensate = r.optional_place(&CONDENSATE);
    let (share, caught, flow) = (r.optional(&LOSS), r.optional(&CAUGHT), r.optional(&GAS_FLOW));
    let coolant = r.optional(&ROTARY_COOLANT);
    let (pressure, evacuated, leak) = (r.optional(&VACUUM), r.optional(&EVACUATED), r.optional(&LEAK));
    let time = r.optional(&TIME);
    let catches = caught.is_some_and(|c| r.value(c) > 0.0);
    if !r.written("condensate") && (by == ROTARY || catches) {
        r.problem(
            "condensate",
            "nothing says where the condensate goes",
            "a stream, or store where it is used again",
        );
    }
    let loss = match (by, coolant.zip(time), evacuated.zip(leak), share, caught) {
        (ROTARY, Some((coolant, time)), Some((evacuated, leak)), ..) => {
            Loss::Drawn(Vacuum { coolant, pressure, evacuated, leak, time })
        }
        (ROTARY, _, _, Some(share), _) => Loss::Share(share),
        (KUDERNA, .., Some(caught)) => Loss::AllBut(caught),
        _ => Loss::All,
    };
    let lost_to = r.place(&LOST_TO);
    let gas = flow.and_then(|flow| r.known("nitrogen").map(|m| (m, flow)));
    let vapours = Vapours::read(r, Some(r.value(temperature)));
    vapours.warn_unknown(r, "to");
    Box::new(Concentrate {
        to,
        temperature,
        vapours,
        condensate: condensate.unwrap_or(lost_to),
        loss,
        gas,
        no_bath: by == NITROGEN && !r.written("temperature"),
        lost_to,
        time,
        power: r.power(&POWER),
        water: r.optional(&WATER),
        heated: by != NITROGEN,
    })
}

impl Step for Concentrate {
    fn run(&self, x: Draw<'_>, b: &mut Bench<'_>) -> Result<(), Halt> {
        b.need(Place::LIQUOR)?;
        // What evaporates passes the vapour place: CO2 still in a vessel must not end in the condensate.
        b.need_empty(Place::VAPOUR)?;
        let (there_m3, wanted_m3) = (b.liquid_volume_m3(Place::LIQUOR), x.get(self.to));
        if wanted_m3 > there_m3 {
            return Err(Halt::NotReached { wanted_m3, there_m3 });
        }
        let temperature_k = x.get(self.temperature);
        b.note(EVAPORATED, "V_left", wanted_m3, Kind::Volume);
        b.note(EVAPORATED, "V", there_m3, Kind::Volume);
        b.note(EVAPORATED, "T", temperature_k, Kind::Temperature);
        let v = &self.vapours;
        let there = v.lying(b, Place::LIQUOR);
        v.tell(b, &there, EVAPORATED);
        let share_left = if there_m3 > 0.0 { wanted_m3 / there_m3 } else { 1.0 };
        // What cannot be reckoned with leaves in proportion, and takes its part of the volume.
        let known_m3 = wanted_m3 - share_left * v.other_m3(b, Place::LIQUOR);
        v.note_way_down(b, &there, (temperature_k, known_m3), false);
        let down = v.take_down(x, &there, known_m3, temperature_k)?;
        let time_s = self.time.map(|t| self.enough_s(x, b, x.get(t), &down)).transpose()?;
        if let Some(time_s) = time_s {
            b.release_over(time_s);
        }
        let gone = v.evaporate(b, &there, &down.left_kg, (share_left, self.lost_to), EVAPORATED)?;
        match &self.loss {
            Loss::Drawn(vacuum) => {
                let lost = vacuum.lost(x, b, v, (&there, &gone), temperature_k)?;
                let (parts, count) = v.parts(&lost);
                b.split(Place::VAPOUR, self.lost_to, &parts[..count], LOST)?;
            }
            share => {
                let lost = match share {
                    Loss::Share(share) => x.get(*share),
                    Loss::AllBut(caught) => 1.0 - x.get(*caught),
                    Loss::All | Loss::Drawn(_) => 1.0,
                };
                b.note(LOST, "s", lost, Kind::Fraction);
                // mᵢ = s mᵢ(vapour)
                b.share_volatile(Place::VAPOUR, self.lost_to, lost, LOST)?;
            }
        }
        b.sweep(Place::VAPOUR, self.condensate, CONDENSED);

        if let (Some((nitrogen, flow)), Some(time_s)) = (self.gas, time_s) {
            self.blow(x, b, nitrogen, (x.get(flow), time_s), &there)?;
        }
        let heat_j = v.heat_j(&gone, temperature_k);
        super::electricity(x, b, self.power, time_s, heat_j.filter(|_| self.heated), HEATED);
        if let (Some(water), Some(time_s)) = (self.water, time_s) {
            super::cooling_water(x, b, water, time_s, heat_j, COOLED);
        }
        Ok(())
    }
}

impl Concentrate {
    /// The stated time, held against the least in which the gas can carry the vapour away.
    ///
    /// A plan whose own numbers need longer is stopped: nobody has seen that bench. In a draw around a plan that is possible
    /// the bench goes on blowing until the mark is reached, so that the step takes the longer time, which is told.
    fn enough_s(&self, x: Draw<'_>, b: &mut Bench<'_>, time_s: f64, down: &Down) -> Result<f64, Halt> {
        let flow_m3_s = self.gas.map_or(0.0, |(_, flow)| x.get(flow));
        if flow_m3_s <= 0.0 {
            return Ok(time_s);
        }
        let least_s = least_time_s(down.carrier_mol(), flow_m3_s, AIR_PA, METER_K)?;
        b.note(BLOWN, "least time, saturated", least_s, Kind::Time);
        match check_time(time_s, least_s) {
            Ok(()) => Ok(time_s),
            Err(short) if b.traced() => Err(short.into()),
            Err(_) => {
                b.takes_longer();
                Ok(least_s)
            }
        }
    }

    /// Posts the nitrogen.
    fn blow(
        &self,
        x: Draw<'_>,
        b: &mut Bench<'_>,
        nitrogen: Material,
        (flow_m3_s, time_s): (f64, f64),
        there: &Masses,
    ) -> Result<(), Halt> {
        b.note(BLOWN, "q", flow_m3_s, Kind::VolumeFlow);
        b.note(BLOWN, "t", time_s, Kind::Time);
        // m = q t p M / (R T)
        let kg = flow_m3_s * time_s * NITROGEN_KG_M3;
        b.charge(Place::STORE, self.lost_to, nitrogen, kg, BLOWN)?;
        if b.traced() && self.no_bath {
            self.tell_of_cold(x.get(self.temperature), b, there);
        }
        Ok(())
    }

    /// How far the liquid cools itself where no bath holds it warm.
    fn tell_of_cold(&self, gas_k: f64, b: &mut Bench<'_>, there: &Masses) {
        let Some(s) = self.vapours.most(there) else { return };
        let heat = s.heat_of_vaporisation.value(gas_k, &s.name, "heat of vaporisation");
        let (Ok(heat_j_kg), Some(mass), Some((lowest_k, _))) =
            (heat, &s.molar_mass_kg_mol, s.vapour_pressure.range_k())
        else {
            return;
        };
        let lowest_k = if lowest_k > 200.0 { lowest_k } else { 200.0 };
        let cooling = self_cooling(gas_k, AIR_PA, heat_j_kg * mass.value, lowest_k, |t| {
            Ok(s.vapour_pressure.value(t, &s.name, "vapour pressure")?)
        });
        if let Ok(cooling) = cooling {
            b.doubt(
                BLOWN,
                "no temperature of the liquid is stated; without a bath it cools itself, at the least to about",
                cooling.adiabatic_k,
                Kind::Temperature,
                "the temperature that the bath holds: cold liquid evaporates slowly and takes up water",
            );
        }
    }
}

impl Vacuum {
    /// What the air that is drawn off past the condenser carries, no more than evaporates; kg.
    fn lost(
        &self,
        x: Draw<'_>,
        b: &mut Bench<'_>,
        v: &Vapours,
        (there, gone): (&Masses, &Masses),
        temperature_k: f64,
    ) -> Result<Masses, Halt> {
        let (coolant_k, leak_kg_s, time_s) = (x.get(self.coolant), x.get(self.leak), x.get(self.time));
        let vapours = v.over(x, gone, coolant_k)?;
        let pressure_pa = match self.pressure {
            Some(pressure) => x.get(pressure),
            // The vacuum follows: at first the liquor boils at it. It falls later, and the loss with it grows, so this is a floor.
            None => Vapours::sum_pa(&v.over(x, there, temperature_k)?),
        };
        let pressure_pa = if pressure_pa < AIR_PA { pressure_pa } else { AIR_PA };
        b.note(LOST, "T", coolant_k, Kind::Temperature);
        b.note(LOST, "P", pressure_pa, Kind::Pressure);
        b.note(LOST, "Σp", Vapours::sum_pa(&vapours), Kind::Pressure);
        b.note(LOST, "V", x.get(self.evacuated), Kind::Volume);
        b.note(LOST, "L", leak_kg_s, Kind::MassFlow);
        b.note(LOST, "t", time_s, Kind::Time);
        // Eᵢ = V/(R T) pᵢ Mᵢ ln((P₀ − Σp)/(P − Σp)) + (L t/M_air) pᵢ/(P − Σp) Mᵢ
        let drawn = depressurise(x.get(self.evacuated), coolant_k, AIR_PA, pressure_pa, &vapours)?;
        let leaked = vacuum_leak(leak_kg_s, time_s, coolant_k, pressure_pa, &vapours)?;
        let mut lost = drawn.kg;
        for ((lost, more), gone) in lost.iter_mut().zip(leaked.kg).zip(gone) {
            *lost += more;
            if *lost > *gone {
                *lost = *gone;
            }
        }
        Ok(lost)
    }
}
