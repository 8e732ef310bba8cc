//! Disposables: thimbles, filters, gloves, gas. What is used goes where it is said to go.

use super::{Control, Group, Param, Rule, Step, Technique};
use crate::chance::{Draw, In};
use crate::ledger::{Bench, Halt, Material, Place, RuleIx};
use crate::quantity::Kind;
use crate::source::{COMMON_PRACTICE, DEFINITION, MASS_BALANCE};

const MATERIAL: Param = Param::new("material", "What is used", Control::Material)
    .required()
    .hint("From the catalogue, or the plan's own.");
const MASS: Param = Param::quantity("mass", "Mass used each time", Kind::Mass)
    .required()
    .physical(0.0, 1e5)
    .usual(1e-6, 10.0)
    .hint("Of all pieces together.")
    .source(COMMON_PRACTICE);
const TO: Param = Param::new("to", "Goes to", Control::Place)
    .default("marc", DEFINITION)
    .hint("A waste stream; left out, it stays with the marc and shares its fate.");

const USED: RuleIx = RuleIx(0);

pub(super) static TECHNIQUE: Technique = Technique {
    key: "consume",
    title: "Disposables",
    about: "Draws a disposable from the store and places it: thimbles, filters, glass wool, gloves, gas.",
    group: Group::Around,
    takes_feed: None,
    params: &[MATERIAL, MASS, TO],
    rules: &[Rule::new("used up", "m", MASS_BALANCE)],
    cautions: &[],
    example: r#"{ "step": "consume", "material": "cellulose thimble", "mass": "4.1 g", "to": "marc" }"#,
    read: |r| {
        Box::new(Consume { material: r.material(&MATERIAL), mass: r.quantity(&MASS), to: r.place(&TO) })
    },
};

struct Consume {
    material: Material,
    mass: In,
    to: Place,
}

impl Step for Consume {
    fn run(&self, x: Draw<'_>, b: &mut Bench<'_>) -> Result<(), Halt> {
        let mass_kg = x.get(self.mass);
        b.note(USED, "m", mass_kg, Kind::Mass);
        b.charge(Place::STORE, self.to, self.material, mass_kg, USED)?;
        Ok(())
    }
}
