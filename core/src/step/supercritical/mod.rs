//! Extraction with dense CO2: the vessel filled, CO2 passed through, the extract trapped, the vessel let down.
//!
//! Masses follow from the equation of state: the fill from the void at extraction state, the flow from the state at which
//! it is metered, what the let-down vents from the void at let-down state.

mod flow;
mod soluble;
mod trap;

use super::caution::{CO2_IN_ROOM, DRY_ICE, FLAMMABLE_VENT, PRESSURE_VESSEL, TRAPPED_LIQUID};
use super::dense::circuit::{self, Circuit};
use super::dense::supply::{self, Cylinder, Snow};
use super::dense::{self, Chamber, DenseCo2, Rules, SPAN_WAGNER, vessel};
use super::{Control, Group, Param, Rule, Step, Technique};
use crate::chance::{Draw, In};
use crate::dense_gas::need::Target;
use crate::dense_gas::study::Study;
use crate::ledger::{Bench, Halt, Material, Place, RuleIx};
use crate::program::Reader;
use crate::quantity::Kind;
use crate::source::{DEFINITION, FROM_MEMORY, MASS_BALANCE};

const CHILL: Param = circuit::CHILL.when("metered", &[flow::VENT, flow::MASS]);
const EXTRACTS: Param =
    Param::new("extracts", "Taken out of the sample", Control::PerMaterial(Kind::Fraction))
        .physical(0.0, 1.0)
        .hint("Share of each feed material that ends in the trap; leave out for traces.");
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
const SNOWED: RuleIx = RuleIx(14);
const CIRCUIT: RuleIx = RuleIx(15);

pub(super) static TECHNIQUE: Technique = Technique {
    key: "supercritical",
    title: "Supercritical CO2 extraction",
    about: "The vessel's void is filled with CO2 at the stated state, CO2 is passed through as metered, the extract is caught \
            in a trap and the vessel is let down. Vented: all CO2 goes to air. Recycled: only leaks, what the let-down vents \
            and what stays dissolved are lost. Stages follow as several steps, with let_down false for all but the last.",
    group: Group::Extraction,
    takes_feed: Some(Place::MARC),
    params: &dense::params::<61>(&[
        &[dense::TEMPERATURE, dense::PRESSURE],
        &vessel::PARAMS,
        &flow::PARAMS,
        &trap::COSOLVENTS,
        &[circuit::CIRCUIT, circuit::VENT_TO, circuit::LEAK],
        &vessel::LETTING_DOWN,
        &[EXTRACTS, DISSOLVED, IN_MARC],
        &trap::TRAPPING,
        &[CHILL],
        &circuit::STATES,
        &circuit::DRAWN,
        &supply::CYLINDERS,
        &supply::SNOWS,
        &soluble::PARAMS,
    ]),
    rules: &dense::rules::<22>(&[
        Rule::new("static fill", "m = V_void ρ(T, p) less what is there", SPAN_WAGNER),
        Rule::new("dynamic flow", "m = q t ρ(T_m, p_m), or q_m t", SPAN_WAGNER),
        Rule::new("passed through", "what flowed, and what the vessel no longer holds", MASS_BALANCE),
        Rule::new("leaks", "m = s m_flow", FROM_MEMORY),
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
        Rule::new("dry-ice snow", "m = r (m_s/ρ_s) ρ_snow", DEFINITION),
    ]),
    cautions: &[PRESSURE_VESSEL, TRAPPED_LIQUID, DRY_ICE, CO2_IN_ROOM, FLAMMABLE_VENT],
    example: r#"{ "step": "supercritical", "temperature": "80 °C", "pressure": "305 bar", "vessel": "7 mL",
        "filler": "1 mL", "metered": "pump head", "flow": "2.5 mL/min", "meter_temperature": "4 °C",
        "meter_pressure": "60 bar", "time": "40 min", "rinse": "n-heptane", "rinse_volume": "3.2 mL" }"#,
    read,
};

struct Supercritical {
    chamber: Chamber,
    flow: flow::Flow,
    trap: trap::Trap,
    soluble: soluble::Soluble,
    cylinder: Cylinder,
    snow: Snow,
    extracts: Vec<(Material, In)>,
    dissolved: Option<In>,
    in_marc: Option<In>,
}

fn read(r: &mut Reader<'_, '_>) -> Box<dyn Step> {
    let co2 = r.known("carbon dioxide").unwrap_or(Material(0));
    let state = (r.quantity(&dense::TEMPERATURE), r.quantity(&dense::PRESSURE));
    let (vessel, flow) = (vessel::Vessel::read(r), flow::Flow::read(r));
    let trap = trap::Trap::read(r);
    let circuit = Circuit::read(r, &CHILL, state, flow.head(), CIRCUIT);
    circuit.check_let_down(r, vessel.state);
    let rules = Rules {
        filled: FILLED,
        flowed: FLOWED,
        swept: SWEPT,
        leaked: LEAKED,
        let_down: LET_DOWN,
        returned: RETURNED,
    };
    Box::new(Supercritical {
        chamber: Chamber { co2, state, vessel, circuit, rules },
        flow,
        trap,
        soluble: soluble::Soluble::read(r, state),
        cylinder: Cylinder::read(r),
        snow: Snow::read(r),
        extracts: r.taken_out(&EXTRACTS),
        dissolved: r.optional(&DISSOLVED),
        in_marc: r.optional(&IN_MARC),
    })
}

impl Step for Supercritical {
    fn run(&self, x: Draw<'_>, b: &mut Bench<'_>) -> Result<(), Halt> {
        let marc_kg = b.need(Place::MARC)?;
        let (chamber, vent_to) = (&self.chamber, self.chamber.circuit.vent_to);
        let void_m3 = chamber.vessel.void_m3(x, b, marc_kg, FILLED)?;
        let time_s = self.flow.time_s(x);

        self.cylinder.note(x, b, FILLED);
        self.snow.run(x, b, chamber.co2, vent_to, SNOWED)?;
        b.release_over(time_s);
        let filled_kg = chamber.fill(x, b, void_m3)?;
        self.trap.fill(x, b, TRAP_FILLED)?;
        let passed_kg = self.flow.mass_kg(x, b, FLOWED)?;
        chamber.pass(x, b, passed_kg)?;
        self.trap.cosolvent(x, b, time_s, vent_to, COSOLVENT)?;
        let here = (x.get(chamber.state.0), x.get(chamber.state.1));
        self.soluble.hold(x, b, &self.extracts, here, filled_kg + passed_kg, EXTRACTED);
        self.soluble.diffuse(x, b, &self.extracts, (time_s, passed_kg), EXTRACTED);
        super::extract(x, b, &self.extracts, Place::MARC, Place::TRAP, EXTRACTED)?;
        self.trap.blow_off(x, b, vent_to, BLOWN_OFF)?;
        chamber.keep(x, b, self.dissolved, Place::TRAP, DRAWN_OFF)?;
        chamber.keep(x, b, self.in_marc, Place::MARC, LEFT_IN_MARC)?;
        let recovered = if chamber.vessel.let_down { chamber.let_down(x, b, void_m3)? } else { None };
        self.trap.rinse(x, b, RINSED)?;
        b.sweep(Place::TRAP, Place::LIQUOR, EMPTIED);
        chamber.circuit.spend(x, b, filled_kg + passed_kg, recovered)
    }

    fn co2_states(&self) -> usize {
        self.chamber.states()
    }

    fn dense(&self, x: Draw<'_>) -> Option<DenseCo2> {
        let mut shown = self.chamber.shown(x)?;
        shown.cylinder = self.cylinder.of(x);
        if let Some((t, p)) = self.flow.head() {
            shown.meter((x.get(t), x.get(p)), self.flow.volume_m3(x));
        }
        let here = (shown.temperature_k, shown.pressure_pa);
        shown.window = self.soluble.window(x, here);
        if let (Some((solubility, curve)), Some(circuit)) =
            (self.soluble.target(x), self.chamber.circuit.around(x))
        {
            let machines = self.chamber.circuit.machines(x);
            let target = Target { solute_kg_kg: f64::NAN, recovery: f64::NAN, curve };
            shown.study = Some(Study { solubility, target, circuit, machines });
        }
        Some(shown)
    }
}
