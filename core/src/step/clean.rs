//! Cleaning of goods with dense CO2: garments or metal parts in baths of liquid or supercritical CO2, which a still gives back.

use super::caution::{CO2_IN_ROOM, DRY_ICE, FLAMMABLE_VENT, PRESSURE_VESSEL, TRAPPED_LIQUID};
use super::dense::circuit::{self, Circuit};
use super::dense::supply::{self, Cylinder};
use super::dense::{self, Chamber, DenseCo2, Rules, SPAN_WAGNER, vessel};
use super::{Control, Group, Mixture, Param, Rule, Step, Technique};
use crate::chance::{Draw, In};
use crate::ledger::{Bench, Halt, Material, Place, RuleIx};
use crate::program::Reader;
use crate::quantity::Kind;
use crate::source::{COMMON_PRACTICE, DEFINITION, FROM_MEMORY, MASS_BALANCE};

const TEMPERATURE: Param = dense::TEMPERATURE.usual(268.0, 360.0);
const PRESSURE: Param = dense::PRESSURE.usual(3.5e6, 4e7);
const BATHS: Param = Param::new("baths", "Fillings of the vessel", Control::Count)
    .default("2", FROM_MEMORY)
    .physical(1.0, 50.0)
    .hint("Wash and rinse are two; each bath after the first is distilled and comes again.");
const TIME: Param = Param::quantity("time", "Time of all baths", Kind::Time)
    .required()
    .physical(0.0, 1e6)
    .usual(300.0, 14_400.0)
    .hint("Without filling and letting down.")
    .source(FROM_MEMORY);
const DETERGENT: Param = Param::new("detergent", "Detergent or co-solvent", Control::Mixture)
    .hint("One material, or several with shares by volume.");
const DETERGENT_VOLUME: Param = Param::quantity("detergent_volume", "Volume of detergent", Kind::Volume)
    .physical(0.0, 1.0)
    .with("detergent")
    .hint("In one run, as it is poured.")
    .source(COMMON_PRACTICE);
const DETERGENT_LEFT: Param =
    Param::quantity("detergent_left", "Share of it that stays on the goods", Kind::Fraction)
        .default("5 %", FROM_MEMORY)
        .physical(0.0, 1.0)
        .with("detergent")
        .hint("The rest goes to the still with the soil.")
        .source(FROM_MEMORY);
const EXTRACTS: Param = Param::new("extracts", "Cleaned off", Control::PerMaterial(Kind::Fraction))
    .physical(0.0, 1.0)
    .hint("Share of each feed material that ends in the still: oil, grease, wax.");
const DISSOLVED: Param =
    Param::quantity("dissolved", "CO2 drawn off with the still's residue", Kind::MassPerMass)
        .physical(0.0, 10.0)
        .usual(0.0, 0.5)
        .hint("For each mass of residue; left out, none is counted.")
        .source(FROM_MEMORY);
const IN_GOODS: Param = Param::quantity("in_goods", "CO2 left in the goods", Kind::MassPerMass)
    .physical(0.0, 1.0)
    .usual(0.0, 0.05)
    .hint("For each mass of goods when the vessel is opened; metal holds none. Left out, none is counted.")
    .source(FROM_MEMORY);

const FILLED: RuleIx = RuleIx(0);
const FLOWED: RuleIx = RuleIx(1);
const SWEPT: RuleIx = RuleIx(2);
const LEAKED: RuleIx = RuleIx(3);
const DOSED: RuleIx = RuleIx(4);
const LEFT_ON_GOODS: RuleIx = RuleIx(5);
const CLEANED: RuleIx = RuleIx(6);
const DRAWN_OFF: RuleIx = RuleIx(7);
const LEFT_IN_GOODS: RuleIx = RuleIx(8);
const LET_DOWN: RuleIx = RuleIx(9);
const RETURNED: RuleIx = RuleIx(10);
const EMPTIED: RuleIx = RuleIx(11);
const CIRCUIT: RuleIx = RuleIx(12);

pub(super) static TECHNIQUE: Technique = Technique {
    key: "clean",
    title: "Cleaning with dense CO2",
    about: "Goods are washed in baths of liquid or supercritical CO2; a still takes the soil and gives the CO2 back, or it is \
            vented. How much comes off is yours to state: no model of soil is in it.",
    group: Group::Extraction,
    takes_feed: Some(Place::MARC),
    params: &dense::params::<37>(&[
        &[TEMPERATURE, PRESSURE],
        &vessel::PARAMS,
        &[BATHS, TIME, DETERGENT, DETERGENT_VOLUME, DETERGENT_LEFT],
        &[circuit::CIRCUIT, circuit::VENT_TO, circuit::LEAK],
        &vessel::LETTING_DOWN,
        &[EXTRACTS, DISSOLVED, IN_GOODS, circuit::CHILL],
        &circuit::STATES,
        &circuit::DRAWN,
        &supply::CYLINDERS,
    ]),
    rules: &dense::rules::<19>(&[
        Rule::new("static fill", "m = V_void ρ(T, p) less what is there", SPAN_WAGNER),
        Rule::new("baths", "m = (n − 1) V_void ρ(T, p)", SPAN_WAGNER),
        Rule::new("passed through", "what flowed, and what the vessel no longer holds", MASS_BALANCE),
        Rule::new("leaks", "m = s m_flow", FROM_MEMORY),
        Rule::new("detergent", "mᵢ = V φᵢ ρᵢ", DEFINITION),
        Rule::new("left on the goods", "mᵢ = s mᵢ(detergent)", FROM_MEMORY).measurable(),
        Rule::new("cleaned off", "mᵢ = sᵢ mᵢ(goods)", MASS_BALANCE),
        Rule::new("drawn off with the residue", "m = c m_residue, at most what is there", FROM_MEMORY)
            .measurable(),
        Rule::new("left in the goods", "m = c m_goods, at most what is there", FROM_MEMORY).measurable(),
        Rule::new(
            "vented at let-down",
            "m = V_void ρ(T_l, p_l); all of it where the CO2 is vented",
            SPAN_WAGNER,
        ),
        Rule::new("returned to supply", "what the let-down recovers", MASS_BALANCE),
        Rule::new("still emptied", "all that is there", MASS_BALANCE),
    ]),
    cautions: &[PRESSURE_VESSEL, TRAPPED_LIQUID, DRY_ICE, CO2_IN_ROOM, FLAMMABLE_VENT],
    example: r#"{ "step": "clean", "temperature": "15 °C", "pressure": "60 bar", "vessel": "100 L", "solid_density": "1.3 g/mL",
        "baths": 2, "time": "30 min", "circuit": "recycled", "separator_pressure": "48 bar", "separator_temperature": "15 °C",
        "let_down_temperature": "15 °C", "let_down_pressure": "48 bar" }"#,
    read,
};

struct Clean {
    chamber: Chamber,
    cylinder: Cylinder,
    baths: u32,
    time: In,
    detergent: Option<(Mixture, In, In)>,
    extracts: Vec<(Material, In)>,
    dissolved: Option<In>,
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
    let state = (r.quantity(&TEMPERATURE), r.quantity(&PRESSURE));
    let vessel = vessel::Vessel::read(r);
    let circuit = Circuit::read(r, &circuit::CHILL, state, None, CIRCUIT);
    circuit.check_let_down(r, vessel.state);
    let (mixture, volume) = (r.optional_mixture(&DETERGENT), r.optional(&DETERGENT_VOLUME));
    let left = r.optional(&DETERGENT_LEFT);
    if mixture.is_some() && !r.written("detergent_volume") {
        r.problem(
            "detergent_volume",
            "a detergent without its volume",
            "detergent_volume, such as \"50 mL\"",
        );
    }
    let detergent = match (mixture, volume, left) {
        (Some(mixture), Some(volume), Some(left)) => Some((mixture, volume, left)),
        _ => None,
    };
    Box::new(Clean {
        chamber: Chamber { co2, state, vessel, circuit, rules },
        cylinder: Cylinder::read(r),
        baths: r.count(&BATHS),
        time: r.quantity(&TIME),
        detergent,
        extracts: r.taken_out(&EXTRACTS),
        dissolved: r.optional(&DISSOLVED),
        in_goods: r.optional(&IN_GOODS),
    })
}

impl Step for Clean {
    fn run(&self, x: Draw<'_>, b: &mut Bench<'_>) -> Result<(), Halt> {
        let goods_kg = b.need(Place::MARC)?;
        let chamber = &self.chamber;
        let void_m3 = chamber.vessel.void_m3(x, b, goods_kg, FILLED)?;
        self.cylinder.note(x, b, FILLED);
        b.release_over(x.get(self.time));
        let filled_kg = chamber.fill(x, b, void_m3)?;
        let again = f64::from(self.baths) - 1.0;
        let density_kg_m3 = b.states().state(x.get(chamber.state.0), x.get(chamber.state.1))?.density_kg_m3;
        b.note(FLOWED, "n − 1", again, Kind::Number);
        b.note(FLOWED, "t", x.get(self.time), Kind::Time);
        b.note(FLOWED, "V_void", void_m3, Kind::Volume);
        // m = (n − 1) V_void ρ(T, p)
        let passed_kg = again * void_m3 * density_kg_m3;
        chamber.pass(x, b, passed_kg)?;
        if let Some((mixture, volume, left)) = &self.detergent {
            mixture.charge(x, b, Place::TRAP, x.get(*volume), DOSED)?;
            b.note(LEFT_ON_GOODS, "s", x.get(*left), Kind::Fraction);
            // mᵢ = s mᵢ(detergent)
            b.share_all(Place::TRAP, Place::MARC, x.get(*left), LEFT_ON_GOODS)?;
        }
        super::extract(x, b, &self.extracts, Place::MARC, Place::TRAP, CLEANED)?;
        chamber.keep(x, b, self.dissolved, Place::TRAP, DRAWN_OFF)?;
        chamber.keep(x, b, self.in_goods, Place::MARC, LEFT_IN_GOODS)?;
        let recovered = if chamber.vessel.let_down { chamber.let_down(x, b, void_m3)? } else { None };
        b.sweep(Place::TRAP, Place::LIQUOR, EMPTIED);
        chamber.circuit.spend(x, b, filled_kg + passed_kg, recovered)
    }

    fn co2_states(&self) -> usize {
        self.chamber.states() + 1
    }

    fn dense(&self, x: Draw<'_>) -> Option<DenseCo2> {
        let mut shown = self.chamber.shown(x)?;
        shown.cylinder = self.cylinder.of(x);
        Some(shown)
    }
}
