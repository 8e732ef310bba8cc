//! The schema of the document, kept beside the tests for a plan of two made-up techniques.

use thimbleworth::plan::{TechniqueShape, schema};
use thimbleworth::quantity::Kind;
use thimbleworth::source::{COMMON_PRACTICE, MASS_BALANCE};
use thimbleworth::step::{Control, Param, Rule};

use super::same_as_kept;

static TECHNIQUES: [TechniqueShape; 2] = [
    TechniqueShape {
        key: "pour",
        title: "Pouring",
        params: &[
            Param::new("solvent", "Solvent", Control::Mixture).required().hint("What is poured."),
            Param::quantity("charge", "Charge", Kind::Volume).required().hint("As poured."),
            Param::new("by", "By", Control::Choice(&["hand", "pump"])).default("hand", COMMON_PRACTICE),
            Param::quantity("flow", "Flow", Kind::VolumeFlow).required().when("by", &["pump"]),
            Param::new("portions", "Portions", Control::Count).default("1", COMMON_PRACTICE),
            Param::new("lid", "Lid", Control::YesNo).default("true", COMMON_PRACTICE),
            Param::new("kept", "Kept", Control::PerMaterial(Kind::Fraction)),
        ],
        rules: &[
            Rule::new("poured", "m = ρ V", MASS_BALANCE),
            Rule::new("lid loss", "m = x V", COMMON_PRACTICE).measurable(),
        ],
    },
    TechniqueShape {
        key: "place",
        title: "Placing",
        params: &[Param::new("to", "To", Control::Place).required()],
        rules: &[],
    },
];

#[test]
fn the_schema_is_the_one_that_is_kept() {
    let text = schema(&TECHNIQUES);
    same_as_kept("schema.json", &text);
    let value: serde_json::Value = serde_json::from_str(&text).unwrap();
    assert_eq!(value["$defs"]["step-pour"]["required"], serde_json::json!(["step", "solvent", "charge"]));
    assert_eq!(
        value["$defs"]["step-pour"]["properties"]["measured"]["properties"].as_object().unwrap().len(),
        1
    );
    assert_eq!(
        value["properties"]["site"]["properties"]["rules"]["enum"],
        serde_json::json!(["US", "EU", "none"])
    );
}
