//! Electricity, heat, cooling, work and cooling water: yearly figures, and what each step takes, by kind.
//!
//! Electricity has three faces: by stated power and time, computed from physics and efficiencies, and by a meter. One of them
//! counts; the others stand beside it.

use super::figure::{Draft, Figure, Group, How, Measure};
use crate::chance::Draw;
use crate::co2_loop;
use crate::heat::Basis;
use crate::ledger::{Note, StepIx, Trace, Utility};
use crate::program::{Desk, RouteProgram};
use crate::source::{SITE, Source};
use crate::step::DenseCo2;

struct Entry {
    utility: Utility,
    id: &'static str,
    title: &'static str,
    measure: Measure,
    boundary: &'static str,
    formula: &'static str,
    source: Source,
}

const STREAMS: &str =
    "into or out of the streams of the work by change of state; not losses of vessels, nor warming them up";

static FIGURES: [Entry; 8] = [
    Entry {
        utility: Utility::Electricity,
        id: "electricity",
        title: "electricity",
        measure: Measure::Energy,
        boundary: "steps for which the plan states a power or a reading, or whose states give it; hoods, lighting and instruments are not counted",
        formula: "by the meter, else Σ P t, else computed",
        source: SITE,
    },
    Entry {
        utility: Utility::NominalElectricity,
        id: "electricity.nominal",
        title: "electricity by stated power",
        measure: Measure::Energy,
        boundary: "steps with a power, whether or not it is the figure that counts",
        formula: "W = Σ P t",
        source: SITE,
    },
    Entry {
        utility: Utility::ComputedElectricity,
        id: "electricity.computed",
        title: "electricity computed",
        measure: Measure::Energy,
        boundary: "steps whose states give it, whether or not it is the figure that counts; no standby, no losses",
        formula: "W = Σ W/η_d + Σ |Q_cold|/COP + Q_hot",
        source: co2_loop::SOURCE,
    },
    Entry {
        utility: Utility::MeasuredElectricity,
        id: "electricity.measured",
        title: "electricity by a meter",
        measure: Measure::Energy,
        boundary: "steps with a reading",
        formula: "Σ of the readings",
        source: SITE,
    },
    Entry {
        utility: Utility::Heat,
        id: "heat",
        title: "heat into streams",
        measure: Measure::Energy,
        boundary: STREAMS,
        formula: "Σ m (h₂ − h₁)",
        source: co2_loop::SOURCE,
    },
    Entry {
        utility: Utility::Cooling,
        id: "cooling",
        title: "heat out of streams",
        measure: Measure::Energy,
        boundary: STREAMS,
        formula: "Σ m (h₁ − h₂)",
        source: co2_loop::SOURCE,
    },
    Entry {
        utility: Utility::Work,
        id: "work",
        title: "work of pumps and compressors",
        measure: Measure::Energy,
        boundary: "into the streams; losses of drives come on top",
        formula: "Σ m (h(s₁, p₂) − h₁)/η",
        source: co2_loop::SOURCE,
    },
    Entry {
        utility: Utility::CoolingWater,
        id: "cooling_water",
        title: "cooling water",
        measure: Measure::Mass,
        boundary: "run through condensers; never part of a mass intensity",
        formula: "m = Σ q t ρ",
        source: SITE,
    },
];

/// Draws up the account of utilities.
pub(super) fn draw_up(draft: &mut Draft, desk: &Desk) {
    for e in &FIGURES {
        if desk.spent[e.utility as usize] > 0.0 {
            draft.add(Figure {
                id: format!("energy.{}", e.id),
                title: e.title.into(),
                group: Group::Energy,
                measure: e.measure,
                boundary: e.boundary.into(),
                formula: e.formula,
                source: e.source,
                how: How::Spent(e.utility),
            });
        }
    }
}

/// What one step spends in a year, by utility in the order of [`Utility::ALL`]; SI.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct StepEnergy {
    /// The index of the step in the route.
    pub step: u16,
    /// Amounts; J or kg a year.
    pub a_year: [f64; Utility::COUNT],
}

impl StepEnergy {
    /// What the step spends of a utility in a year; J or kg.
    #[must_use]
    pub const fn of(&self, utility: Utility) -> f64 {
        self.a_year[utility as usize]
    }

    /// Which face of electricity counts.
    #[must_use]
    pub fn basis(&self) -> Basis {
        if self.of(Utility::MeasuredElectricity) > 0.0 {
            Basis::Measured
        } else if self.of(Utility::NominalElectricity) > 0.0
            && self.of(Utility::NominalElectricity) == self.of(Utility::Electricity)
        {
            Basis::Nominal
        } else {
            Basis::Computed
        }
    }
}

/// What each step spends, for those that spend anything.
#[must_use]
pub fn by_step(trace: &Trace) -> Vec<StepEnergy> {
    let mut all: Vec<StepEnergy> = Vec::new();
    for s in &trace.spendings {
        let StepIx::Step(step) = s.step else { continue };
        if s.amount_si == 0.0 {
            continue;
        }
        if all.last().is_none_or(|last| last.step != step) {
            all.push(StepEnergy { step, a_year: [0.0; Utility::COUNT] });
        }
        if let Some(last) = all.last_mut() {
            last.a_year[s.utility as usize] += s.amount_si * s.runs_a_year;
        }
    }
    all
}

/// The steps with dense CO2, by their index in the route.
pub(super) fn dense(route: &RouteProgram, x: Draw<'_>, trace: &Trace) -> Vec<(usize, DenseCo2)> {
    let mut all = Vec::new();
    for (i, step) in route.steps.iter().enumerate() {
        let Some(mut dense) = step.step.dense(x) else { continue };
        let noted = |symbol: &str| {
            let here = |n: &&Note| {
                n.symbol == symbol && n.step == StepIx::Step(u16::try_from(i).unwrap_or(u16::MAX))
            };
            trace.notes.iter().find(here).map(|n| n.value_si)
        };
        // What the sample holds is known on the bench alone.
        if let (Some(study), Some(solute), Some(recovery)) = (&mut dense.study, noted("x₀"), noted("R")) {
            study.target.solute_kg_kg = solute;
            study.target.recovery = recovery;
        } else {
            dense.study = None;
        }
        all.push((i, dense));
    }
    all
}
