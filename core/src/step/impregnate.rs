//! Impregnation from dense CO2: something dissolved in it is taken up by goods, as dye by cloth or a preservative by timber.

use super::caution::{CO2_IN_ROOM, DRY_ICE, PRESSURE_VESSEL, TRAPPED_LIQUID};
use super::dense::circuit::{self, Circuit};
use super::dense::supply::{self, Cylinder};
use super::dense::{self, Chamber, DenseCo2, Rules, SPAN_WAGNER, vessel};
use super::{Control, Group, Param, Rule, Step, Technique};
use crate::chance::{Draw, In};
use crate::ledger::{Bench, Halt, Material, Place, RuleIx, Utility};
use crate::program::Reader;
use crate::quantity::Kind;
use crate::source::{COMMON_PRACTICE, DEFINITION, FROM_MEMORY, MASS_BALANCE};

const CIRCULATION: Param =
    Param::quantity("circulation", "Mass flow of CO2 through the goods", Kind::MassFlow)
        .required()
        .physical(0.0, 1e4)
        .hint("Turned round at pressure, without being let down; \"0 kg/h\" where it stands still.")
        .source(COMMON_PRACTICE);
const TIME: Param = Param::quantity("time", "Time under pressure", Kind::Time)
    .required()
    .physical(0.0, 1e6)
    .usual(600.0, 86_400.0)
    .hint("At the stated state, without filling and letting down.")
    .source(FROM_MEMORY);
const AGENT: Param = Param::new("agent", "What the goods take up", Control::Material)
    .required()
    .hint("Dye, preservative or active substance, as it is put into the vessel.");
const AGENT_MASS: Param = Param::quantity("agent_mass", "Mass put into the vessel", Kind::Mass)
    .required()
    .physical(0.0, 1e5)
    .hint("In one run.")
    .source(COMMON_PRACTICE);
const UPTAKE: Param = Param::quantity("uptake", "Share taken up", Kind::Fraction)
    .required()
    .physical(0.0, 1.0)
    .usual(0.3, 1.0)
    .hint("Of what is put in; weigh the goods, or what is left in the vessel, to know.")
    .source(FROM_MEMORY);
const REST_TO: Param = Param::new("rest_to", "What is not taken up goes to", Control::Place)
    .required()
    .hint("store where it is used again, a stream where it is not.");
const SOLUBILITY: Param =
    Param::quantity("solubility", "Solubility in the CO2 at this state", Kind::MassPerMass)
        .physical(0.0, 10.0)
        .hint("Mass in a mass of CO2, your own figure: held against what is taken up; left out, nothing is.")
        .source(COMMON_PRACTICE);
const EXTRACTS: Param =
    Param::new("extracts", "Taken out of the goods", Control::PerMaterial(Kind::Fraction))
        .physical(0.0, 1.0)
        .hint("Share of each feed material that ends in the separator: spin finish, resin, water.");
const IN_GOODS: Param = Param::quantity("in_goods", "CO2 left in the goods", Kind::MassPerMass)
    .physical(0.0, 1.0)
    .usual(0.0, 0.1)
    .hint(
        "For each mass of goods when the vessel is opened: it leaves them later. Left out, none is counted.",
    )
    .source(FROM_MEMORY);

const FILLED: RuleIx = RuleIx(0);
const FLOWED: RuleIx = RuleIx(1);
const SWEPT: RuleIx = RuleIx(2);
const LEAKED: RuleIx = RuleIx(3);
const PUT_IN: RuleIx = RuleIx(4);
const TAKEN_UP: RuleIx = RuleIx(5);
const EXTRACTED: RuleIx = RuleIx(6);
const LEFT_IN_GOODS: RuleIx = RuleIx(7);
const LET_DOWN: RuleIx = RuleIx(8);
const RETURNED: RuleIx = RuleIx(9);
const REST: RuleIx = RuleIx(10);
const EMPTIED: RuleIx = RuleIx(11);
const CIRCUIT: RuleIx = RuleIx(12);

pub(super) static TECHNIQUE: Technique = Technique {
    key: "impregnate",
    title: "Impregnation from dense CO2",
    about: "Goods in a vessel take up something that is dissolved in dense CO2: dyeing of cloth, preservation of timber. The share \
            taken up is yours; what is not comes out as solid when the vessel is let down. The filling goes round the circuit once; what turns it \
            round at pressure meanwhile is in the electricity only where you state a power. A co-solvent is not counted.",
    group: Group::Extraction,
    takes_feed: Some(Place::MARC),
    params: &dense::params::<38>(&[
        &[dense::TEMPERATURE, dense::PRESSURE],
        &vessel::PARAMS,
        &[AGENT, AGENT_MASS, UPTAKE, REST_TO, SOLUBILITY, CIRCULATION, TIME],
        &[circuit::CIRCUIT, circuit::VENT_TO, circuit::LEAK],
        &vessel::LETTING_DOWN,
        &[EXTRACTS, IN_GOODS, circuit::CHILL],
        &circuit::STATES,
        &circuit::DRAWN,
        &supply::CYLINDERS,
    ]),
    rules: &dense::rules::<19>(&[
        Rule::new("static fill", "m = V_void ρ(T, p) less what is there", SPAN_WAGNER),
        Rule::new("turned round", "m = q_m t", DEFINITION),
        Rule::new("passed on", "what the vessel no longer holds", MASS_BALANCE),
        Rule::new("leaks", "m = s m_flow", FROM_MEMORY),
        Rule::new("put in", "m", MASS_BALANCE),
        Rule::new("taken up", "m = u m_agent", MASS_BALANCE).measurable(),
        Rule::new("extracted", "mᵢ = sᵢ mᵢ(goods)", MASS_BALANCE),
        Rule::new("left in the goods", "m = c m_goods, at most what is there", FROM_MEMORY).measurable(),
        Rule::new(
            "vented at let-down",
            "m = V_void ρ(T_l, p_l); all of it where the CO2 is vented",
            SPAN_WAGNER,
        ),
        Rule::new("returned to supply", "what the let-down recovers", MASS_BALANCE),
        Rule::new("not taken up", "what is left in the vessel", MASS_BALANCE),
        Rule::new("separator emptied", "all that is there", MASS_BALANCE),
    ]),
    cautions: &[PRESSURE_VESSEL, TRAPPED_LIQUID, DRY_ICE, CO2_IN_ROOM],
    example: r#"{ "step": "impregnate", "temperature": "120 °C", "pressure": "250 bar", "vessel": "10 L", "solid_density": "1.38 g/mL",
        "agent": "silica gel", "agent_mass": "1 g", "uptake": "95 %", "rest_to": "elsewhere", "circulation": "60 kg/h", "time": "1 h",
        "circuit": "recycled", "let_down_temperature": "60 °C", "let_down_pressure": "50 bar" }"#,
    read,
};

struct Impregnate {
    chamber: Chamber,
    cylinder: Cylinder,
    circulation: In,
    time: In,
    agent: Material,
    agent_mass: In,
    uptake: In,
    rest_to: Place,
    solubility: Option<In>,
    extracts: Vec<(Material, In)>,
    in_goods: Option<In>,
}

fn read(r: &mut Reader<'_, '_>) -> Box<dyn Step> {
    let rules = Rules {
        filled: FILLED,
        flowed: FLOWED,
        swept: SWEPT,
        leaked: LEAKED,
        let_down: LET_DOWN,
        returned: RETURNED,
    };
    let co2 = r.known("carbon dioxide").unwrap_or(Material(0));
    let state = (r.quantity(&dense::TEMPERATURE), r.quantity(&dense::PRESSURE));
    let vessel = vessel::Vessel::read(r);
    let circuit = Circuit::read(r, &circuit::CHILL, state, None, CIRCUIT);
    circuit.check_let_down(r, vessel.state);
    Box::new(Impregnate {
        chamber: Chamber { co2, state, vessel, circuit, rules },
        cylinder: Cylinder::read(r),
        circulation: r.quantity(&CIRCULATION),
        time: r.quantity(&TIME),
        agent: r.material(&AGENT),
        agent_mass: r.quantity(&AGENT_MASS),
        uptake: r.quantity(&UPTAKE),
        rest_to: r.place(&REST_TO),
        solubility: r.optional(&SOLUBILITY),
        extracts: r.taken_out(&EXTRACTS),
        in_goods: r.optional(&IN_GOODS),
    })
}

impl Step for Impregnate {
    fn run(&self, x: Draw<'_>, b: &mut Bench<'_>) -> Result<(), Halt> {
        let goods_kg = b.need(Place::MARC)?;
        let chamber = &self.chamber;
        let void_m3 = chamber.vessel.void_m3(x, b, goods_kg, FILLED)?;
        let (flow_kg_s, time_s) = (x.get(self.circulation), x.get(self.time));
        self.cylinder.note(x, b, FILLED);
        b.release_over(time_s);
        let filled_kg = chamber.fill(x, b, void_m3)?;
        b.note(FLOWED, "q_m", flow_kg_s, Kind::MassFlow);
        b.note(FLOWED, "t", time_s, Kind::Time);
        // m = q_m t
        let passed_kg = flow_kg_s * time_s;
        // Turned round at pressure: nothing of it is let down before the end.
        b.spend(Utility::CirculatedCo2, passed_kg, FLOWED);
        chamber.leak(x, b, passed_kg)?;

        let (agent_kg, uptake) = (x.get(self.agent_mass), x.get(self.uptake));
        b.charge(Place::STORE, Place::VAPOUR, self.agent, agent_kg, PUT_IN)?;
        b.note(TAKEN_UP, "u", uptake, Kind::Fraction);
        b.note(TAKEN_UP, "m_agent", agent_kg, Kind::Mass);
        // m = u m_agent
        let taken_kg = b.split(Place::VAPOUR, Place::MARC, &[(self.agent, uptake * agent_kg)], TAKEN_UP)?;
        if let Some(solubility) = self.solubility {
            // What fill and flow carry to the goods at most: m = S (m_fill + m_flow)
            let carried_kg = x.get(solubility) * (filled_kg + passed_kg);
            b.note(TAKEN_UP, "S", x.get(solubility), Kind::MassPerMass);
            if taken_kg > carried_kg {
                b.doubt(
                    TAKEN_UP,
                    "more is taken up than the CO2 can carry, which is at most",
                    carried_kg,
                    Kind::Mass,
                    "more time or flow, another state, or a smaller uptake",
                );
            }
        }
        super::extract(x, b, &self.extracts, Place::MARC, Place::TRAP, EXTRACTED)?;
        chamber.keep(x, b, self.in_goods, Place::MARC, LEFT_IN_GOODS)?;
        b.all(Place::VAPOUR, self.rest_to, self.agent, REST);
        let recovered = if chamber.vessel.let_down { chamber.let_down(x, b, void_m3)? } else { None };
        b.sweep(Place::TRAP, Place::LIQUOR, EMPTIED);
        chamber.circuit.spend(x, b, filled_kg, recovered)
    }

    fn co2_states(&self) -> usize {
        self.chamber.states()
    }

    fn dense(&self, x: Draw<'_>) -> Option<DenseCo2> {
        let mut shown = self.chamber.shown(x)?;
        shown.cylinder = self.cylinder.of(x);
        Some(shown)
    }
}
