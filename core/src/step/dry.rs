//! Drying an extract over an agent: water taken up, extract held back, the agent to solid waste.

use super::{Control, Group, Param, Rule, Step, Technique};
use crate::chance::{Draw, In};
use crate::ledger::{Bench, Halt, Material, Place, RuleIx};
use crate::quantity::Kind;
use crate::source::{COMMON_PRACTICE, FROM_MEMORY, MASS_BALANCE};

const AGENT: Param = Param::new("agent", "Drying agent", Control::Material)
    .default("sodium sulphate", COMMON_PRACTICE)
    .hint("From the catalogue, or the plan's own.");
const MASS: Param = Param::quantity("mass", "Mass of the agent", Kind::Mass)
    .required()
    .physical(0.0, 100.0)
    .usual(1e-3, 0.5)
    .hint("For one run of the step.")
    .source(COMMON_PRACTICE);
const CAPACITY: Param = Param::quantity("capacity", "Water taken up by the agent", Kind::MassPerMass)
    .physical(0.0, 10.0)
    .usual(0.05, 1.3)
    .hint("Mass of water for each mass of agent; left out, the catalogue's figure.")
    .source(FROM_MEMORY);
const HOLD_UP: Param = Param::quantity("hold_up", "Extract held by the agent", Kind::VolumePerMass)
    .default("0.4 mL/g", FROM_MEMORY)
    .physical(0.0, 0.02)
    .usual(0.0, 2e-3)
    .hint("After rinsing; without a rinse, more.")
    .source(FROM_MEMORY);
const GOES_TO: Param = Param::new("to", "The agent goes to", Control::Place)
    .required()
    .hint("A solid waste stream: it inherits what it holds.");

const AGENT_USED: RuleIx = RuleIx(0);
const TAKEN_UP: RuleIx = RuleIx(1);
const HELD: RuleIx = RuleIx(2);

pub(super) static TECHNIQUE: Technique = Technique {
    key: "dry",
    title: "Drying",
    about: "The extract is run over a drying agent, which takes up water as far as its capacity reaches and holds back some \
            extract. The agent with both goes to the stated stream.",
    group: Group::Extract,
    takes_feed: None,
    params: &[AGENT, MASS, CAPACITY, HOLD_UP, GOES_TO],
    rules: &[
        Rule::new("drying agent", "m", MASS_BALANCE),
        Rule::new("water taken up", "m = c m_agent, at most what is there", COMMON_PRACTICE).measurable(),
        Rule::new("held by the agent", "mᵢ = (h m_agent / V_liquor) mᵢ(liquor)", FROM_MEMORY).measurable(),
    ],
    cautions: &[],
    example: r#"{ "step": "dry", "agent": "sodium sulphate", "mass": "20 g", "to": "elsewhere" }"#,
    read: |r| {
        let agent = r.material(&AGENT);
        let own = r.optional(&CAPACITY);
        let capacity = own.or_else(|| {
            r.property(agent, "water capacity", Kind::MassPerMass, |s| {
                s.water_capacity_kg_kg.as_ref().map(|f| (f.value, f.low, f.high))
            })
        });
        if capacity.is_none() {
            let name = r.name_of(agent).to_owned();
            r.problem(
                "capacity",
                format!("nobody knows how much water {name} takes up"),
                "its capacity, such as \"0.5 g/g\"",
            );
        }
        Box::new(Dry {
            agent,
            water: r.known("water"),
            mass: r.quantity(&MASS),
            capacity: capacity.unwrap_or(In(0)),
            hold_up: r.quantity(&HOLD_UP),
            to: r.place(&GOES_TO),
        })
    },
};

struct Dry {
    agent: Material,
    water: Option<Material>,
    mass: In,
    capacity: In,
    hold_up: In,
    to: Place,
}

impl Step for Dry {
    fn run(&self, x: Draw<'_>, b: &mut Bench<'_>) -> Result<(), Halt> {
        b.need(Place::LIQUOR)?;
        let agent_kg = x.get(self.mass);
        b.charge(Place::STORE, self.to, self.agent, agent_kg, AGENT_USED)?;
        if let Some(water) = self.water {
            let there_kg = b.there(Place::LIQUOR, water);
            b.note(TAKEN_UP, "c", x.get(self.capacity), Kind::MassPerMass);
            b.note(TAKEN_UP, "m_agent", agent_kg, Kind::Mass);
            // m = c m_agent, at most what is there
            let kg = x.get(self.capacity) * agent_kg;
            b.split(Place::LIQUOR, self.to, &[(water, if kg > there_kg { there_kg } else { kg })], TAKEN_UP)?;
        }
        let liquor_m3 = b.liquid_volume_m3(Place::LIQUOR);
        b.note(HELD, "h", x.get(self.hold_up), Kind::VolumePerMass);
        b.note(HELD, "m_agent", agent_kg, Kind::Mass);
        b.note(HELD, "V_liquor", liquor_m3, Kind::Volume);
        // s = h m_agent / V_liquor, at most all
        let share = if liquor_m3 > 0.0 { x.get(self.hold_up) * agent_kg / liquor_m3 } else { 0.0 };
        b.share_all(Place::LIQUOR, self.to, if share < 1.0 { share } else { 1.0 }, HELD)?;
        Ok(())
    }
}
