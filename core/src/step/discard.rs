//! Placing what lies in one bench place before the route ends.

use super::{Control, Group, Param, Rule, Step, Technique};
use crate::chance::Draw;
use crate::ledger::{Bench, Halt, Place, RuleIx};
use crate::source::MASS_BALANCE;

const FROM: Param = Param::new(
    "from",
    "What is placed",
    Control::Choice(&["marc", "liquor", "second phase", "trap", "vapour"]),
)
.required()
.hint("The bench place that is emptied.");
const TO: Param =
    Param::new("to", "Goes to", Control::Place).required().hint("A stream, or product, hood, elsewhere ...");

const PLACED: RuleIx = RuleIx(0);

pub(super) static TECHNIQUE: Technique = Technique {
    key: "discard",
    title: "Place what is left",
    about: "Empties one bench place before the route ends: the marc after extraction, the water after shaking out.",
    group: Group::Around,
    takes_feed: None,
    params: &[FROM, TO],
    rules: &[Rule::new("placed", "all that is there", MASS_BALANCE)],
    cautions: &[],
    example: r#"{ "step": "discard", "from": "marc", "to": "solids" }"#,
    read: |r| Box::new(Discard { from: r.bench_place(&FROM), to: r.place(&TO) }),
};

struct Discard {
    from: Place,
    to: Place,
}

impl Step for Discard {
    fn run(&self, _: Draw<'_>, b: &mut Bench<'_>) -> Result<(), Halt> {
        b.sweep(self.from, self.to, PLACED);
        Ok(())
    }
}
