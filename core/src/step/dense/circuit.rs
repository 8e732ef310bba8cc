//! The circuit of CO2 around a vessel: vented or recycled, the states on the way, what machines and heaters draw.
//!
//! An open circuit chills, pumps, heats and lets down to the vent; a closed one lets down into a separator, condenses and pumps
//! again. Energies are differences of enthalpy by the equation of state, see [`co2_loop`](crate::co2_loop).

use crate::chance::{Draw, In};
use crate::co2::Memo;
use crate::co2_loop::{
    ClosedLoop, Heating, Kind as Leg, Loop, LoopError, OpenLoop, Recompression, SOURCE, Scratch, Utilities,
};
use crate::dense_gas::study::Circuit as Around;
use crate::heat::Demand;
use crate::ledger::{Bench, Halt, Place, RuleIx};
use crate::program::Reader;
use crate::quantity::{Kind, show};
use crate::source::{COMMON_PRACTICE, DEFINITION, FROM_MEMORY};
use crate::step::{Control, Param, Rule};

pub(in crate::step) const VENTED: &str = "vented";
pub(in crate::step) const RECYCLED: &str = "recycled";
const ELECTRIC: &str = "electric";
const NOT_ELECTRIC: &str = "not electric";

pub(in crate::step) const CIRCUIT: Param =
    Param::new("circuit", "The CO2 is", Control::Choice(&[VENTED, RECYCLED]))
        .default(VENTED, COMMON_PRACTICE)
        .hint("vented behind the trap, or recycled through separator and condenser.");
pub(in crate::step) const VENT_TO: Param = Param::new("vent_to", "Vented to", Control::Place)
    .default("hood", COMMON_PRACTICE)
    .hint("hood, or room where the vent is not led away.");
pub(in crate::step) const LEAK: Param =
    Param::quantity("leak", "Leaks, as a share of what is sent round", Kind::Fraction)
        .default("0.5 %", FROM_MEMORY)
        .physical(0.0, 1.0)
        .usual(0.0, 0.05)
        .when("circuit", &[RECYCLED])
        .hint("Pump, seals and valves; weigh the make-up over a month to know.")
        .source(FROM_MEMORY);
const SUPPLY_TEMPERATURE: Param =
    Param::quantity("supply_temperature", "Temperature of the supply", Kind::Temperature)
        .default("20 °C", COMMON_PRACTICE)
        .physical(216.592, 400.0)
        .when("circuit", &[VENTED])
        .hint("Of the cylinder or tank before the chiller.")
        .source(COMMON_PRACTICE);
const SUPPLY_PRESSURE: Param =
    Param::quantity("supply_pressure", "Pressure of the supply", Kind::Pressure)
        .physical(1e5, 8e8)
        .when("circuit", &[VENTED])
        .hint("Absolute; left out, that of the pump head where it is metered before compression, else the vapour pressure.")
        .source(COMMON_PRACTICE);
pub(in crate::step) const CHILL: Param =
    Param::quantity("chill", "Temperature of the liquid at the pump", Kind::Temperature)
        .default("5 °C", FROM_MEMORY)
        .physical(216.592, 400.0)
        .usual(233.0, 293.2)
        .hint("Of the chilled head, or of what leaves the condenser.")
        .source(FROM_MEMORY);
const VENT_TEMPERATURE: Param =
    Param::quantity("vent_temperature", "Temperature at the vent", Kind::Temperature)
        .default("20 °C", COMMON_PRACTICE)
        .physical(216.592, 1100.0)
        .when("circuit", &[VENTED])
        .hint("To which restrictor and line are heated; the vent is at 1 atm.")
        .source(COMMON_PRACTICE);
const SEPARATOR_TEMPERATURE: Param =
    Param::quantity("separator_temperature", "Temperature of the separator", Kind::Temperature)
        .default("25 °C", FROM_MEMORY)
        .physical(216.592, 1100.0)
        .when("circuit", &[RECYCLED])
        .hint("Of the gas that leaves it.")
        .source(FROM_MEMORY);
const SEPARATOR_PRESSURE: Param =
    Param::quantity("separator_pressure", "Pressure of separator and receiver", Kind::Pressure)
        .default("50 bar", FROM_MEMORY)
        .physical(517_950.0, 8e8)
        .usual(4e6, 9e6)
        .when("circuit", &[RECYCLED])
        .hint("Absolute; the condenser works at it, and the vessel is let down to it.")
        .source(FROM_MEMORY);
const STAGES: Param =
    Param::new("compressor_stages", "Stages of a compressor behind the receiver", Control::Count)
        .default("0", DEFINITION)
        .physical(0.0, 8.0)
        .when("circuit", &[RECYCLED])
        .hint("0 for none: then the vessel cannot be emptied below the receiver's pressure.");
const CLAIM: Param =
    Param::quantity("recycled_share", "Share of the filling said to come back", Kind::Fraction)
        .physical(0.0, 1.0)
        .when("circuit", &[RECYCLED])
        .hint("As the supplier says; held against what the let-down leaves, and used in no figure.")
        .source(COMMON_PRACTICE);
const PUMP_EFFICIENCY: Param =
    Param::quantity("pump_efficiency", "Isentropic efficiency of the pump", Kind::Fraction)
        .default("70 %", FROM_MEMORY)
        .physical(0.01, 1.0)
        .usual(0.4, 0.9)
        .hint("Work of a loss-free pump over its own; the difference warms the CO2.")
        .source(FROM_MEMORY);
const DRIVE_EFFICIENCY: Param =
    Param::quantity("drive_efficiency", "Efficiency of the drive", Kind::Fraction)
        .default("90 %", FROM_MEMORY)
        .physical(0.01, 1.0)
        .usual(0.6, 0.98)
        .hint("Work at the shaft over electricity: motor, converter, gear.")
        .source(FROM_MEMORY);
const COP: Param = Param::quantity("cop", "Heat removed for each electricity of the chiller", Kind::Number)
    .default("3", FROM_MEMORY)
    .physical(0.05, 50.0)
    .usual(0.8, 6.0)
    .hint("At the coldest cooler: about 3 at 5 °C, about 1 at -40 °C.")
    .source(FROM_MEMORY);
const HEATING: Param = Param::new("heating", "Heaters are", Control::Choice(&[ELECTRIC, NOT_ELECTRIC]))
    .default(ELECTRIC, COMMON_PRACTICE)
    .hint("not electric for steam, hot water or the warmth of the room.");
const POWER: Param = Param::quantity("power", "Power drawn", Kind::Power)
    .physical(0.0, 1e7)
    .usual(300.0, 1e5)
    .with("run_time")
    .hint("Pump, chiller and heaters on average; counts in place of what the states come to.")
    .source(FROM_MEMORY);
const RUN_TIME: Param = Param::quantity("run_time", "Time the unit runs", Kind::Time)
    .physical(0.0, 1e7)
    .usual(600.0, 86_400.0)
    .hint("With static hold, heating up and let-down; needed where a power is given.")
    .source(COMMON_PRACTICE);
/// The parameters of a circuit in the order of the form, all but [`CIRCUIT`], [`VENT_TO`], [`LEAK`] and the temperature at the
/// pump.
pub(in crate::step) const STATES: [Param; 8] = [
    SUPPLY_TEMPERATURE,
    SUPPLY_PRESSURE,
    VENT_TEMPERATURE,
    SEPARATOR_TEMPERATURE,
    SEPARATOR_PRESSURE,
    STAGES,
    CLAIM,
    PUMP_EFFICIENCY,
];
/// The parameters of what is drawn, in the order of the form.
pub(in crate::step) const DRAWN: [Param; 5] = [DRIVE_EFFICIENCY, COP, HEATING, POWER, RUN_TIME];

/// The rules of a circuit, which stand together in a technique's list, from the index that [`Circuit`] is given.
pub(in crate::step) const RULES: [Rule; 7] = [
    Rule::new("chilling", "Q = m (h₂ − h₁)", SOURCE),
    Rule::new("pumping", "W = m (h(s₁, p₂) − h₁)/η", SOURCE),
    Rule::new("preheating", "Q = m (h₂ − h₁)", SOURCE),
    Rule::new("heat of letting down", "Q = m (h₂ − h₁), through a valve h₂ = h₁", SOURCE),
    Rule::new("condensing", "Q = m (h₂ − h₁)", SOURCE),
    Rule::new("recompressing", "W = m Σ (h(s₁, p₂) − h₁)/η, coolers between", SOURCE),
    Rule::new("electricity", "W by the meter, else P t, else Σ W/η_d + Σ |Q_cold|/COP + Q_hot", DEFINITION)
        .metered(),
];

/// The places of [`RULES`].
const CHILLED: u8 = 0;
const PUMPED: u8 = 1;
const PREHEATED: u8 = 2;
const EXPANDED: u8 = 3;
const CONDENSED: u8 = 4;
const RECOMPRESSED: u8 = 5;
const DRAWN_RULE: u8 = 6;

const ATMOSPHERE_PA: f64 = 101_325.0;

/// A temperature, K, and a pressure, Pa, by their slots.
pub(in crate::step) type State = (In, In);

/// What comes back of a vessel's filling below the receiver's pressure, and from which state at last.
#[derive(Clone, Copy)]
pub(in crate::step) struct Recovered {
    pub(in crate::step) kg: f64,
    pub(in crate::step) temperature_k: f64,
    pub(in crate::step) pressure_pa: f64,
}

/// The circuit of one step.
pub(in crate::step) struct Circuit {
    pub(in crate::step) recycled: bool,
    pub(in crate::step) vent_to: Place,
    pub(in crate::step) leak: Option<In>,
    pub(in crate::step) stages: u32,
    pub(in crate::step) claim: Option<In>,
    first_rule: u8,
    /// Temperature and pressure of the extraction.
    state: State,
    /// Where the flow is metered as liquid: temperature and pressure of the head.
    head: Option<State>,
    supply: Option<In>,
    supply_pressure: Option<In>,
    chill: Option<In>,
    vent: Option<In>,
    separator: Option<State>,
    efficiency: In,
    drive: In,
    cop: In,
    electric: bool,
    nominal: Option<(In, In)>,
}

impl Circuit {
    /// Reads a circuit; `chill` as the technique declares it, `head` where the flow is metered as liquid.
    pub(in crate::step) fn read(
        r: &mut Reader<'_, '_>,
        chill: &'static Param,
        state: State,
        head: Option<State>,
        first_rule: RuleIx,
    ) -> Self {
        let recycled = r.choice(&CIRCUIT) == RECYCLED;
        let (vent_to, leak) = (r.place(&VENT_TO), r.optional(&LEAK));
        let (supply, supply_pressure) = (r.optional(&SUPPLY_TEMPERATURE), r.optional(&SUPPLY_PRESSURE));
        let (chill, vent) = (r.optional(chill), r.optional(&VENT_TEMPERATURE));
        let (hot, pressed) = (r.optional(&SEPARATOR_TEMPERATURE), r.optional(&SEPARATOR_PRESSURE));
        // A count hands out 1 where it has no meaning.
        let (stages, claim) = (r.count(&STAGES), r.optional(&CLAIM));
        let stages = if recycled { stages } else { 0 };
        let (efficiency, drive, cop) =
            (r.quantity(&PUMP_EFFICIENCY), r.quantity(&DRIVE_EFFICIENCY), r.quantity(&COP));
        let electric = r.choice(&HEATING) == ELECTRIC;
        let (power, run_time) = (r.optional(&POWER), r.optional(&RUN_TIME));
        Self {
            recycled,
            vent_to,
            leak,
            stages,
            claim,
            first_rule: first_rule.0,
            state,
            head,
            supply,
            supply_pressure,
            chill,
            vent,
            separator: hot.zip(pressed),
            efficiency,
            drive,
            cop,
            electric,
            nominal: power.zip(run_time),
        }
    }

    /// Where what the vessel gives up goes.
    pub(in crate::step) fn passed_to(&self) -> Place {
        if self.recycled { Place::STORE } else { self.vent_to }
    }

    /// Pressure of the receiver, Pa.
    pub(in crate::step) fn receiver_pa(&self, x: Draw<'_>) -> Option<f64> {
        self.separator.map(|(_, p)| x.get(p))
    }

    /// Says where a let-down cannot be: below the receiver without a compressor, or with more coming back than the states allow.
    pub(in crate::step) fn check_let_down(&self, r: &mut Reader<'_, '_>, let_down: Option<State>) {
        let (Some((_, receiver)), Some((t, p))) = (self.separator, let_down) else { return };
        let (receiver_pa, t, p) = (r.value(receiver), r.value(t), r.value(p));
        let receiver = show(receiver_pa, Kind::Pressure);
        if self.stages == 0 && p < receiver_pa * (1.0 - 1e-9) {
            let found = format!(
                "the vessel is let down to {}, below the receiver's {receiver}, and no compressor takes the rest",
                show(p, Kind::Pressure)
            );
            let need = "a let-down pressure not below separator_pressure, or compressor_stages";
            if r.written("separator_pressure") {
                r.problem("let_down_pressure", found, need);
            } else {
                r.doubt("let_down_pressure", found, need);
            }
        }
        let (Some(claim), extraction) = (self.claim, self.state) else { return };
        let full = (r.value(extraction.0), r.value(extraction.1));
        // A state that is refused is refused again, with its reason, when the route runs.
        if let Ok(left) = crate::co2_loop::letdown_left_share(full, (t, p))
            && r.value(claim) > 1.0 - left + 0.005
        {
            r.problem(
                "recycled_share",
                format!(
                    "{} of the filling cannot come back: at {} and {} the vessel still holds {} of what it held at {} and {}",
                    show(r.value(claim), Kind::Fraction),
                    show(t, Kind::Temperature),
                    show(p, Kind::Pressure),
                    show(left, Kind::Fraction),
                    show(full.0, Kind::Temperature),
                    show(full.1, Kind::Pressure),
                ),
                format!("at most {}, or a let-down to a lower density", show(1.0 - left, Kind::Fraction)),
            );
        }
    }

    /// Temperature, K, of the liquid at the pump.
    pub(in crate::step) fn pump_temperature_k(&self, x: Draw<'_>) -> f64 {
        match (self.head, self.chill) {
            (Some((t, _)), _) | (None, Some(t)) => x.get(t),
            (None, None) => f64::NAN,
        }
    }

    /// The circuit with its numbers.
    fn around_with(&self, x: Draw<'_>, states: &mut Memo) -> Result<Around, LoopError> {
        let (extraction_temperature_k, extraction_pressure_pa) = (x.get(self.state.0), x.get(self.state.1));
        let (pump_efficiency, cold_k) = (x.get(self.efficiency), self.pump_temperature_k(x));
        if let Some((t, p)) = self.separator {
            return Ok(Around::Closed(ClosedLoop {
                condenser_temperature_k: cold_k,
                pump_efficiency,
                extraction_pressure_pa,
                extraction_temperature_k,
                separator_pressure_pa: x.get(p),
                separator_temperature_k: x.get(t),
            }));
        }
        let supply_temperature_k = self.supply.map_or(f64::NAN, |t| x.get(t));
        let supply_pressure_pa = match (self.supply_pressure, self.head) {
            (Some(p), _) => Some(x.get(p)),
            // Metered before compression: the head is at the pressure of the supply, where that can be liquid.
            (None, Some((_, p))) if x.get(p) < extraction_pressure_pa * (1.0 - 1e-9) => {
                let own = states.saturated_liquid(supply_temperature_k);
                let own = own.map_err(|error| LoopError::State { at: "supply", error })?;
                (x.get(p) > own.pressure_pa * (1.0 + 1e-6)).then_some(x.get(p))
            }
            (None, _) => None,
        };
        Ok(Around::Open(OpenLoop {
            supply_temperature_k,
            supply_pressure_pa,
            chill_temperature_k: cold_k,
            pump_efficiency,
            extraction_pressure_pa,
            extraction_temperature_k,
            vent_pressure_pa: ATMOSPHERE_PA,
            vent_temperature_k: self.vent.map_or(f64::NAN, |t| x.get(t)),
        }))
    }

    /// The circuit with its numbers, for a single run.
    pub(in crate::step) fn around(&self, x: Draw<'_>) -> Option<Around> {
        self.around_with(x, &mut Memo::default()).ok()
    }

    /// The machines around it.
    pub(in crate::step) fn machines(&self, x: Draw<'_>) -> Utilities {
        Utilities {
            drive_efficiency: x.get(self.drive),
            cooling_cop: x.get(self.cop),
            heating: if self.electric { Heating::Electric { ratio: 1.0 } } else { Heating::NotElectric },
        }
    }

    /// The legs of the circuit, per kilogram passed through, into a loop that is cleared first.
    pub(in crate::step) fn legs(&self, x: Draw<'_>, scratch: &mut Scratch) -> Result<(), LoopError> {
        let Scratch { states, legs } = scratch;
        match self.around_with(x, states)? {
            Around::Open(open) => open.energies_in(states, legs),
            Around::Closed(closed) => closed.energies_in(states, legs),
        }
    }

    /// The compressor's legs from a state up to the receiver, per kilogram.
    fn recompression(&self, x: Draw<'_>, from: &Recovered) -> Option<Recompression> {
        let (t, p) = self.separator?;
        Some(Recompression {
            inlet_temperature_k: from.temperature_k,
            inlet_pressure_pa: from.pressure_pa,
            outlet_pressure_pa: x.get(p),
            stages: self.stages,
            stage_efficiency: x.get(self.efficiency),
            cooler_temperature_k: Some(x.get(t)),
            condensed_temperature_k: Some(self.pump_temperature_k(x)),
        })
    }

    /// Spends what the circuit takes for a mass passed through it, kg, and for what a compressor recovers.
    pub(in crate::step) fn spend(
        &self,
        x: Draw<'_>,
        b: &mut Bench<'_>,
        kg: f64,
        recovered: Option<Recovered>,
    ) -> Result<(), Halt> {
        self.legs(x, b.co2())?;
        let mut drawn = Drawn::default();
        let mut legs = std::mem::take(&mut b.co2().legs);
        self.post(b, &legs, kg, None, &mut drawn);
        if let Some(from) = recovered
            && let Some(machine) = self.recompression(x, &from)
        {
            let done = if from.kg > 0.0 {
                machine.energies_in(b.states(), &mut legs)
            } else {
                legs.legs.clear();
                Ok(())
            };
            self.post(b, &legs, from.kg, Some(RECOMPRESSED), &mut drawn);
            done?;
        }
        b.co2().legs = legs;
        self.draw(x, b, &drawn);
        Ok(())
    }

    /// Posts legs under their rules, or all of them under one.
    fn post(&self, b: &mut Bench<'_>, path: &Loop, kg: f64, rule: Option<u8>, drawn: &mut Drawn) {
        let (mut work_j, mut heat_j, mut cold_j) = (0.0, 0.0, 0.0);
        for leg in &path.legs {
            let energy_j = kg * leg.energy_j_kg;
            match leg.kind {
                Leg::Work => work_j += energy_j,
                Leg::Cooling => cold_j -= energy_j,
                Leg::Heat | Leg::Throttling => heat_j += energy_j,
            }
            if rule.is_some() {
                continue;
            }
            let rule = self.rule(match leg.name {
                "chill" => CHILLED,
                "pump" => PUMPED,
                "preheat" => PREHEATED,
                "condense" => CONDENSED,
                _ => EXPANDED,
            });
            if leg.kind == Leg::Throttling {
                continue;
            }
            let enthalpy = |i: usize| path.points.get(i).map_or(f64::NAN, |p| p.enthalpy_j_kg);
            b.note(rule, "m", kg, Kind::Mass);
            b.note(rule, "h₁", enthalpy(leg.from), Kind::SpecificEnergy);
            b.note(rule, "h₂", enthalpy(leg.to), Kind::SpecificEnergy);
            if let Some(ideal) = leg.ideal_j_kg {
                b.note(rule, "h(s₁, p₂) − h₁", ideal, Kind::SpecificEnergy);
                b.spend(crate::ledger::Utility::Work, energy_j, rule);
            } else {
                b.spend_heat(energy_j, rule);
            }
        }
        if let Some(rule) = rule.map(|r| self.rule(r)) {
            b.note(rule, "m", kg, Kind::Mass);
            b.spend(crate::ledger::Utility::Work, work_j, rule);
            b.spend_heat(-cold_j, rule);
        }
        drawn.work_j += work_j;
        drawn.heat_j += heat_j;
        drawn.cold_j += cold_j;
    }

    /// The electricity that counts, with the others beside it.
    fn draw(&self, x: Draw<'_>, b: &mut Bench<'_>, drawn: &Drawn) {
        let rule = self.rule(DRAWN_RULE);
        let (drive, cop) = (x.get(self.drive), x.get(self.cop));
        b.note(rule, "Σ W", drawn.work_j, Kind::Energy);
        b.note(rule, "Σ |Q_cold|", drawn.cold_j, Kind::Energy);
        b.note(rule, "Q_hot", drawn.heat_j, Kind::Energy);
        b.note(rule, "η_d", drive, Kind::Fraction);
        b.note(rule, "COP", cop, Kind::Number);
        let heaters_j = if self.electric { drawn.heat_j } else { 0.0 };
        // W = Σ W/η_d + Σ |Q_cold|/COP + Q_hot
        let computed_j = drawn.work_j / drive + drawn.cold_j / cop + heaters_j;
        let mut nominal_j = 0.0;
        if let Some((power, time)) = self.nominal {
            b.note(rule, "P", x.get(power), Kind::Power);
            b.note(rule, "t", x.get(time), Kind::Time);
            // W = P t
            nominal_j = x.get(power) * x.get(time);
            if nominal_j < computed_j {
                b.doubt(
                    rule,
                    "the stated power over the time comes to less than the states of the CO2 take,",
                    computed_j,
                    Kind::Energy,
                    "look at power and run_time; where heat is passed from condenser to heaters, leave it",
                );
            }
        }
        let measured_j = b.metered_j(rule);
        let stated_j = if self.nominal.is_some() { nominal_j } else { computed_j };
        let demand = Demand { nominal_j, computed_j: Some(computed_j), measured_j };
        b.spend_electricity(measured_j.unwrap_or(stated_j), &demand, rule);
    }

    fn rule(&self, of: u8) -> RuleIx {
        RuleIx(self.first_rule + of)
    }
}

/// What is drawn in all; J in a run.
#[derive(Default)]
struct Drawn {
    work_j: f64,
    heat_j: f64,
    cold_j: f64,
}
