//! Extraction with dense CO2: the vessel filled, CO2 passed through, the extract trapped, the vessel let down.
//!
//! Masses follow from the equation of state: the fill from the void at extraction state, the flow from the state at which
//! it is metered, what the let-down vents from the void at let-down state.

mod flow;
mod trap;
mod vessel;

use super::caution::{CO2_IN_ROOM, DRY_ICE, FLAMMABLE_VENT, PRESSURE_VESSEL, TRAPPED_LIQUID};
use super::{Control, Group, Param, Rule, Step, Technique};
use crate::chance::{Draw, In};
use crate::ledger::{Bench, Halt, Material, Place, RuleIx, Utility};
use crate::program::Reader;
use crate::quantity::Kind;
use crate::source::{COMMON_PRACTICE, DEFINITION, FROM_MEMORY, MASS_BALANCE, Source, Standing};

const SPAN_WAGNER: Source =
    Source::new("Span and Wagner 1996, J. Phys. Chem. Ref. Data 25, 1509", Standing::Secondary);

const VENTED: &str = "vented";
const RECYCLED: &str = "recycled";

const TEMPERATURE: Param = Param::quantity("temperature", "Temperature in the vessel", Kind::Temperature)
    .required()
    .physical(216.592, 1100.0)
    .usual(304.0, 400.0)
    .hint("Of the CO2 while it extracts.")
    .source(SPAN_WAGNER);
const PRESSURE: Param = Param::quantity("pressure", "Pressure in the vessel", Kind::Pressure)
    .required()
    .physical(1e5, 8e8)
    .usual(7.4e6, 6e7)
    .hint("Absolute.")
    .source(SPAN_WAGNER);
const CIRCUIT: Param = Param::new("circuit", "The CO2 is", Control::Choice(&[VENTED, RECYCLED]))
    .default(VENTED, COMMON_PRACTICE)
    .hint("vented behind the trap, or recycled through separator and condenser.");
const VENT_TO: Param = Param::new("vent_to", "Vented to", Control::Place)
    .default("hood", COMMON_PRACTICE)
    .hint("hood, or room where the vent is not led away.");
const EXTRACTS: Param =
    Param::new("extracts", "Taken out of the sample", Control::PerMaterial(Kind::Fraction))
        .physical(0.0, 1.0)
        .hint("Share of each feed material that ends in the trap; leave out for traces.");
const LEAK: Param = Param::quantity("leak", "Leaks, as a share of what is sent round", Kind::Fraction)
    .default("0.5 %", FROM_MEMORY)
    .physical(0.0, 1.0)
    .usual(0.0, 0.05)
    .when("circuit", &[RECYCLED])
    .hint("Pump, seals and valves; weigh the make-up over a month to know.")
    .source(FROM_MEMORY);
const DISSOLVED: Param = Param::quantity("dissolved", "CO2 drawn off with the extract", Kind::MassPerMass)
    .physical(0.0, 10.0)
    .usual(0.0, 0.5)
    .hint("For each mass in the trap; left out, none is counted.")
    .source(FROM_MEMORY);
const IN_MARC: Param = Param::quantity("in_marc", "CO2 left in the marc", Kind::MassPerMass)
    .physical(0.0, 1.0)
    .usual(0.0, 0.05)
    .hint("For each mass of what lies in the vessel; left out, none is counted.")
    .source(FROM_MEMORY);
const POWER: Param = Param::quantity("power", "Power drawn", Kind::Power)
    .physical(0.0, 1e7)
    .usual(300.0, 1e5)
    .with("run_time")
    .hint("Pump, chiller and heaters on average; left out, no electricity is counted.")
    .source(FROM_MEMORY);
const RUN_TIME: Param = Param::quantity("run_time", "Time the unit runs", Kind::Time)
    .physical(0.0, 1e7)
    .usual(600.0, 86_400.0)
    .hint("With static hold, heating up and let-down; needed where a power is given.")
    .source(COMMON_PRACTICE);

const FILLED: RuleIx = RuleIx(0);
const FLOWED: RuleIx = RuleIx(1);
const SWEPT: RuleIx = RuleIx(2);
const LEAKED: RuleIx = RuleIx(3);
const COSOLVENT: RuleIx = RuleIx(4);
const EXTRACTED: RuleIx = RuleIx(5);
const TRAP_FILLED: RuleIx = RuleIx(6);
const BLOWN_OFF: RuleIx = RuleIx(7);
const RINSED: RuleIx = RuleIx(8);
const DRAWN_OFF: RuleIx = RuleIx(9);
const LEFT_IN_MARC: RuleIx = RuleIx(10);
const LET_DOWN: RuleIx = RuleIx(11);
const RETURNED: RuleIx = RuleIx(12);
const EMPTIED: RuleIx = RuleIx(13);
const PUMPED: RuleIx = RuleIx(14);

pub(super) static TECHNIQUE: Technique = Technique {
    key: "supercritical",
    title: "Supercritical CO2 extraction",
    about: "The vessel's void is filled with CO2 at the stated state, CO2 is passed through as metered, the extract is caught \
            in a trap and the vessel is let down. Vented: all CO2 goes to air. Recycled: only leaks, what the let-down vents \
            and what stays dissolved are lost. Stages follow as several steps, with let_down false for all but the last.",
    group: Group::Extraction,
    takes_feed: Some(Place::MARC),
    params: &[
        TEMPERATURE,
        PRESSURE,
        vessel::VESSEL,
        vessel::VOID,
        vessel::SOLID_DENSITY,
        vessel::FILLER,
        flow::METERED,
        flow::FLOW,
        flow::MASS_FLOW,
        flow::METER_TEMPERATURE,
        flow::METER_PRESSURE,
        flow::TIME,
        trap::COSOLVENT,
        trap::COSOLVENT_FLOW,
        trap::COSOLVENT_KEPT,
        CIRCUIT,
        VENT_TO,
        LEAK,
        vessel::LET_DOWN,
        vessel::LET_DOWN_TEMPERATURE,
        vessel::LET_DOWN_PRESSURE,
        EXTRACTS,
        DISSOLVED,
        IN_MARC,
        trap::TRAP_SOLVENT,
        trap::TRAP_VOLUME,
        trap::TRAP_LOSS,
        trap::RINSE,
        trap::RINSE_VOLUME,
        POWER,
        RUN_TIME,
    ],
    rules: &[
        Rule::new("static fill", "m = V_void ρ(T, p) less what is there", SPAN_WAGNER),
        Rule::new("dynamic flow", "m = q t ρ(T_m, p_m), or q_m t", SPAN_WAGNER),
        Rule::new("passed through", "what flowed, and what the vessel no longer holds", MASS_BALANCE),
        Rule::new("leaks", "m = s q t ρ(T_m, p_m)", FROM_MEMORY),
        Rule::new("co-solvent", "mᵢ = q t φᵢ ρᵢ; the share k stays in the trap", DEFINITION),
        Rule::new("extracted", "mᵢ = sᵢ mᵢ(marc)", MASS_BALANCE),
        Rule::new("trap solvent", "mᵢ = V φᵢ ρᵢ", DEFINITION),
        Rule::new("blown off the trap", "mᵢ = s mᵢ(trap)", FROM_MEMORY).measurable(),
        Rule::new("trap rinse", "mᵢ = V φᵢ ρᵢ", DEFINITION),
        Rule::new("drawn off with the extract", "m = c m_trap, at most what is there", FROM_MEMORY)
            .measurable(),
        Rule::new("left in the marc", "m = c m_marc, at most what is there", FROM_MEMORY).measurable(),
        Rule::new(
            "vented at let-down",
            "m = V_void ρ(T_l, p_l); all of it where the CO2 is vented",
            SPAN_WAGNER,
        ),
        Rule::new("returned to supply", "what the let-down recovers", MASS_BALANCE),
        Rule::new("trap emptied", "all that is there", MASS_BALANCE),
        Rule::new("pumping, chilling and heating", "W = P t", DEFINITION).metered(),
    ],
    cautions: &[PRESSURE_VESSEL, TRAPPED_LIQUID, DRY_ICE, CO2_IN_ROOM, FLAMMABLE_VENT],
    example: r#"{ "step": "supercritical", "temperature": "80 °C", "pressure": "305 bar", "vessel": "7 mL",
        "filler": "1 mL", "metered": "pump head", "flow": "2.5 mL/min", "meter_temperature": "4 °C",
        "meter_pressure": "60 bar", "time": "40 min", "rinse": "n-heptane", "rinse_volume": "3.2 mL" }"#,
    read,
};

struct Supercritical {
    co2: Material,
    temperature: In,
    pressure: In,
    vessel: vessel::Vessel,
    flow: flow::Flow,
    trap: trap::Trap,
    recycled: bool,
    vent_to: Place,
    leak: Option<In>,
    extracts: Vec<(Material, In)>,
    dissolved: Option<In>,
    in_marc: Option<In>,
    power: Option<(In, In)>,
}

fn read(r: &mut Reader<'_, '_>) -> Box<dyn Step> {
    let recycled = r.choice(&CIRCUIT) == RECYCLED;
    let (power, run_time) = (r.power(&POWER), r.optional(&RUN_TIME));
    Box::new(Supercritical {
        co2: r.known("carbon dioxide").unwrap_or(Material(0)),
        temperature: r.quantity(&TEMPERATURE),
        pressure: r.quantity(&PRESSURE),
        vessel: vessel::Vessel::read(r),
        flow: flow::Flow::read(r),
        trap: trap::Trap::read(r),
        recycled,
        vent_to: r.place(&VENT_TO),
        leak: r.optional(&LEAK),
        extracts: r.taken_out(&EXTRACTS),
        dissolved: r.optional(&DISSOLVED),
        in_marc: r.optional(&IN_MARC),
        power: power.zip(run_time),
    })
}

impl Step for Supercritical {
    fn run(&self, x: Draw<'_>, b: &mut Bench<'_>) -> Result<(), Halt> {
        let marc_kg = b.need(Place::MARC)?;
        let void_m3 = self.vessel.void_m3(x, b, marc_kg, FILLED)?;
        let passed_to = if self.recycled { Place::STORE } else { self.vent_to };

        self.fill(x, b, void_m3, passed_to)?;
        self.trap.fill(x, b, TRAP_FILLED)?;
        self.pass(x, b)?;
        let time_s = self.flow.time_s(x);
        self.trap.cosolvent(x, b, time_s, self.vent_to, COSOLVENT)?;
        super::extract(x, b, &self.extracts, Place::MARC, Place::TRAP, EXTRACTED)?;
        self.trap.blow_off(x, b, self.vent_to, BLOWN_OFF)?;
        self.keep(x, b, self.dissolved, Place::TRAP, DRAWN_OFF)?;
        self.keep(x, b, self.in_marc, Place::MARC, LEFT_IN_MARC)?;
        if self.vessel.let_down {
            self.let_down(x, b, void_m3)?;
        }
        self.trap.rinse(x, b, RINSED)?;
        b.sweep(Place::TRAP, Place::LIQUOR, EMPTIED);
        let (power, time) = self.power.unzip();
        super::electricity(x, b, power, time.map(|t| x.get(t)), None, PUMPED);
        Ok(())
    }
}

impl Supercritical {
    /// Brings the vessel to its state; what it held more of in the stage before passes on.
    fn fill(&self, x: Draw<'_>, b: &mut Bench<'_>, void_m3: f64, passed_to: Place) -> Result<(), Halt> {
        let (temperature_k, pressure_pa) = (x.get(self.temperature), x.get(self.pressure));
        let density_kg_m3 = crate::co2::density_kg_m3(temperature_k, pressure_pa)?;
        b.note(FILLED, "T", temperature_k, Kind::Temperature);
        b.note(FILLED, "p", pressure_pa, Kind::Pressure);
        b.note(FILLED, "ρ", density_kg_m3, Kind::Density);
        // m = V_void ρ(T, p) less what is there
        let missing_kg = void_m3 * density_kg_m3 - b.there(Place::VAPOUR, self.co2);
        let (drawn_kg, over_kg) = if missing_kg > 0.0 { (missing_kg, 0.0) } else { (0.0, -missing_kg) };
        b.charge(Place::STORE, Place::VAPOUR, self.co2, drawn_kg, FILLED)?;
        b.take(Place::VAPOUR, passed_to, self.co2, over_kg, SWEPT)?;
        Ok(())
    }

    /// Passes CO2 through the vessel: drawn and vented, or sent round with its leaks.
    fn pass(&self, x: Draw<'_>, b: &mut Bench<'_>) -> Result<(), Halt> {
        let passed_kg = self.flow.mass_kg(x, b, FLOWED)?;
        b.spend(Utility::CirculatedCo2, passed_kg, FLOWED);
        if self.recycled {
            let share = self.leak.map_or(0.0, |s| x.get(s));
            b.note(LEAKED, "s", share, Kind::Fraction);
            // m = s q t ρ(T_m, p_m)
            b.charge(Place::STORE, self.vent_to, self.co2, share * passed_kg, LEAKED)?;
        } else {
            b.charge(Place::STORE, Place::VAPOUR, self.co2, passed_kg, FLOWED)?;
            b.take(Place::VAPOUR, self.vent_to, self.co2, passed_kg, SWEPT)?;
        }
        Ok(())
    }

    /// CO2 that stays with the extract or in the marc: a mass for each mass that lies there.
    fn keep(
        &self,
        x: Draw<'_>,
        b: &mut Bench<'_>,
        share: Option<In>,
        with: Place,
        rule: RuleIx,
    ) -> Result<(), Halt> {
        let Some(share) = share else { return Ok(()) };
        let lying_kg = b.mass_kg(with);
        let there_kg = b.there(Place::VAPOUR, self.co2);
        b.note(rule, "c", x.get(share), Kind::MassPerMass);
        b.note(rule, "m", lying_kg, Kind::Mass);
        // m = c m_lying, at most what is there
        let kg = x.get(share) * lying_kg;
        b.split(Place::VAPOUR, with, &[(self.co2, if kg > there_kg { there_kg } else { kg })], rule)?;
        Ok(())
    }

    /// Lets the vessel down: vented as a whole, or recovered down to the let-down state and vented from there.
    fn let_down(&self, x: Draw<'_>, b: &mut Bench<'_>, void_m3: f64) -> Result<(), Halt> {
        if self.recycled {
            let kg = self.vessel.vented_kg(x, b, void_m3, LET_DOWN)?;
            b.up_to(Place::VAPOUR, self.vent_to, self.co2, kg, LET_DOWN)?;
            b.all(Place::VAPOUR, Place::STORE, self.co2, RETURNED);
        } else {
            b.note(LET_DOWN, "m(vessel)", b.there(Place::VAPOUR, self.co2), Kind::Mass);
            b.all(Place::VAPOUR, self.vent_to, self.co2, LET_DOWN);
        }
        Ok(())
    }
}
