//! Electricity and water run through condensers, as far as the plan states power, flow and time.

use super::figure::{Draft, Figure, Group, How, Measure};
use crate::ledger::Utility;
use crate::program::Desk;
use crate::source::SITE;

/// Draws up the account of utilities.
pub(super) fn draw_up(draft: &mut Draft, desk: &Desk) {
    if desk.spent[Utility::Electricity as usize] > 0.0 {
        draft.add(Figure {
            id: "energy.electricity".into(),
            title: "electricity".into(),
            group: Group::Energy,
            measure: Measure::Energy,
            boundary:
                "steps for which the plan states a power; hoods, lighting and instruments are not counted"
                    .into(),
            formula: "W = Σ P t",
            source: SITE,
            how: How::Spent(Utility::Electricity),
        });
    }
    if desk.spent[Utility::CoolingWater as usize] > 0.0 {
        draft.add(Figure {
            id: "energy.cooling_water".into(),
            title: "cooling water".into(),
            group: Group::Energy,
            measure: Measure::Mass,
            boundary: "run through condensers; never part of a mass intensity".into(),
            formula: "m = Σ q t ρ",
            source: SITE,
            how: How::Spent(Utility::CoolingWater),
        });
    }
}
