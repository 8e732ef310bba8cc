//! Energy by step, and the CO2 circuits state by state, as tables for report, terminal and page.

use super::words::amount;
use crate::account::{Measure, RouteAccount, by_step};
use crate::co2::Phases;
use crate::co2_loop::{Leg, SOURCE};
use crate::dense_gas::strength::{GIDDINGS, hildebrand_of};
use crate::heat::Basis;
use crate::ledger::Utility;
use crate::material::catalogue;
use crate::program::RouteProgram;
use crate::quantity::{Kind, show, significant};
use crate::step::DenseCo2;

/// A table with words around it; all cells are plain text.
#[derive(Clone, Debug, PartialEq)]
pub struct Sheet {
    /// Its title.
    pub title: String,
    /// The heads of its columns; the first names the row.
    pub head: Vec<&'static str>,
    /// Its rows, as many cells in each as there are heads.
    pub rows: Vec<Vec<String>>,
    /// What has to be said beside it.
    pub notes: Vec<String>,
}

impl Sheet {
    fn without_empty_columns(&mut self) {
        for column in (1..self.head.len()).rev() {
            if self.rows.iter().all(|row| row.get(column).is_none_or(String::is_empty)) {
                self.head.remove(column);
                for row in &mut self.rows {
                    row.remove(column);
                }
            }
        }
    }
}

/// The tables of a route's energy: each step by kind, then each circuit of CO2 by state. Empty where nothing is known.
///
/// ```
/// use thimbleworth::{account::account_text, example::EXAMPLES, report::energy_sheets};
/// let account = account_text(EXAMPLES[0].text);
/// let work = &account.program.as_ref().unwrap().workloads[0];
/// let sheets = energy_sheets(&work.routes[0], account.workloads[0].routes[0].as_ref().unwrap());
/// assert_eq!(sheets[0].title, "Energy by step, a year");
/// ```
#[must_use]
pub fn energy_sheets(route: &RouteProgram, account: &RouteAccount) -> Vec<Sheet> {
    let mut sheets = Vec::new();
    let mut rows = Vec::new();
    for step in by_step(&account.trace) {
        let mut row = vec![step_name(route, usize::from(step.step))];
        let electric = step.of(Utility::Electricity) > 0.0;
        for utility in COLUMNS {
            let value = step.of(utility);
            row.push(if value > 0.0 { amount(value, Measure::Energy) } else { String::new() });
            if utility == Utility::Electricity {
                row.push(if electric {
                    match step.basis() {
                        Basis::Measured => "meter",
                        Basis::Nominal => "stated",
                        Basis::Computed => "computed",
                    }
                    .to_owned()
                } else {
                    String::new()
                });
            }
        }
        let water = step.of(Utility::CoolingWater);
        row.push(if water > 0.0 { amount(water, Measure::Mass) } else { String::new() });
        if row.iter().skip(1).any(|cell| !cell.is_empty()) {
            rows.push(row);
        }
    }
    if !rows.is_empty() {
        let mut sheet = Sheet {
            title: "Energy by step, a year".to_owned(),
            head: vec![
                "step",
                "electricity",
                "by",
                "stated",
                "computed",
                "meter",
                "heat",
                "cooling",
                "work",
                "cooling water",
            ],
            rows,
            notes: vec![
                "Electricity counts by the meter, else by stated power and time, else as computed; heat, cooling and work go \
                 into streams or out of them, and what delivers them is in the electricity."
                    .to_owned(),
            ],
        };
        sheet.without_empty_columns();
        sheets.push(sheet);
    }
    for (step, dense) in &account.dense {
        sheets.push(circuit(&step_name(route, *step), dense));
    }
    sheets
}

const COLUMNS: [Utility; 7] = [
    Utility::Electricity,
    Utility::NominalElectricity,
    Utility::ComputedElectricity,
    Utility::MeasuredElectricity,
    Utility::Heat,
    Utility::Cooling,
    Utility::Work,
];

fn step_name(route: &RouteProgram, step: usize) -> String {
    format!("{} {}", step + 1, route.steps.get(step).map_or("", |s| s.technique.title))
}

fn circuit(name: &str, dense: &DenseCo2) -> Sheet {
    let legs = &dense.legs;
    let row = |leg: Option<&Leg>, point: usize| {
        let mut cells = Vec::new();
        let (what, energy) = leg.map_or((String::new(), String::new()), |leg| {
            (
                leg.name.to_owned(),
                format!("{} {}", show(leg.energy_j_kg, Kind::SpecificEnergy), leg.kind.word()),
            )
        });
        if let Some(point) = legs.points.get(point) {
            cells.push(point.name.to_owned());
            match point.state() {
                Ok(s) => cells.extend([
                    show(s.temperature_k, Kind::Temperature),
                    show(s.pressure_pa, Kind::Pressure),
                    show(s.density_kg_m3, Kind::Density),
                    match s.phases {
                        Phases::Single(phase) => phase.word().to_owned(),
                        Phases::LiquidAndVapour { vapour_share } => {
                            format!("{} vapour", show(vapour_share, Kind::Fraction))
                        }
                    },
                ]),
                Err(_) => {
                    cells.extend([String::new(), show(point.pressure_pa, Kind::Pressure)]);
                    cells.extend([String::new(), String::new()]);
                }
            }
            cells.push(show(point.enthalpy_j_kg, Kind::SpecificEnergy));
        }
        cells.extend([what, energy]);
        cells
    };
    let mut rows = Vec::new();
    if !legs.closed {
        rows.push(row(None, 0));
    }
    rows.extend(legs.legs.iter().map(|leg| row(Some(leg), leg.to)));
    Sheet {
        title: format!(
            "CO2 {}: {name}",
            if dense.recycled { "in a closed circuit" } else { "in an open circuit" }
        ),
        head: vec![
            "state",
            "temperature",
            "pressure",
            "density",
            "phase",
            "enthalpy",
            "by",
            "for each kilogram",
        ],
        rows,
        notes: dense_words(dense),
    }
}

/// What the states of a step with dense CO2 have to say: strength, metering, let-down, and the caution of liquid between valves.
#[must_use]
pub fn dense_words(dense: &DenseCo2) -> Vec<String> {
    let mut notes = vec![format!(
        "Enthalpies are 0 for the ideal gas at 25 °C and 1 atm; each step of the circuit is a difference of two ({}).",
        SOURCE.cite
    )];
    let strength = significant(dense.strength_mpa_half, 3);
    if let Some((solvent, own)) = nearest_solvent(dense.strength_mpa_half) {
        notes.push(format!(
            "Solvent strength of CO2 at {}: {strength} MPa^½ by Giddings ({}); nearest of the usual liquids is {solvent} with \
             {} by Hildebrand. A rough guide: it says nothing of polarity.",
            show(dense.density_kg_m3, Kind::Density),
            GIDDINGS.standing.words(),
            significant(own, 3)
        ));
    }
    if let Some((stated, others)) = dense.metered.split_first() {
        let mut text = format!(
            "The flow is metered at {} and {}: {}. The same volume would be",
            show(stated.temperature_k, Kind::Temperature),
            show(stated.pressure_pa, Kind::Pressure),
            show(stated.kg, Kind::Mass)
        );
        for (i, m) in others.iter().enumerate() {
            let change = 100.0 * (m.kg / stated.kg - 1.0);
            text.push_str(&format!(
                "{} {} at {} and {} ({}, {}{} %)",
                if i == 0 { "" } else { ", and" },
                show(m.kg, Kind::Mass),
                show(m.temperature_k, Kind::Temperature),
                show(m.pressure_pa, Kind::Pressure),
                m.at,
                if change > 0.0 { "+" } else { "" },
                significant(change, 2)
            ));
        }
        text.push_str(": say where the meter stands.");
        notes.push(text);
    }
    if let Some(left) = dense.left_share {
        notes.push(format!(
            "At let-down the vessel still holds {} of its filling: no more than {} of it can come back.",
            show(left, Kind::Fraction),
            show(1.0 - left, Kind::Fraction)
        ));
    }
    if let (Some(line), Some((cold_k, cold_pa))) = (dense.trapped, dense.shut_in()) {
        notes.push(format!(
            "Caution: liquid shut in between two closed valves at {} and {} comes to {} at 25 °C, {} for each kelvin. Every \
             length that valves can shut in needs its own relief; setting and size are for local codes and licensed practice.",
            show(cold_k, Kind::Temperature),
            show(cold_pa, Kind::Pressure),
            show(line.pressure_pa, Kind::Pressure),
            show(line.rise_pa_k, Kind::Pressure)
        ));
    }
    notes
}

/// Liquids that everybody knows, from weak to strong.
const LIQUIDS: [&str; 6] = ["n-hexane", "cyclohexane", "toluene", "ethyl acetate", "acetone", "ethanol"];

/// That of them with the nearest solubility parameter at 25 °C, MPa^½.
fn nearest_solvent(strength_mpa_half: f64) -> Option<(&'static str, f64)> {
    let mut best: Option<(&'static str, f64)> = None;
    for name in LIQUIDS {
        let Some(own) = catalogue().find(name).ok().and_then(|s| hildebrand_of(s, 298.15)) else { continue };
        let apart = (own - strength_mpa_half).abs();
        if best.is_none_or(|(_, b)| apart < (b - strength_mpa_half).abs()) {
            best = Some((name, own));
        }
    }
    best
}
