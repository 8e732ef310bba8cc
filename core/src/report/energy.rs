//! Energy by step, and the CO2 circuits state by state, as tables for report, terminal and page.

use super::batch::batch_sheet;
use super::words::amount;
use crate::account::{Measure, RouteAccount, batch_paths, by_step};
use crate::co2::Phases;
use crate::co2_loop::{Leg, SOURCE};
use crate::dense_gas::need::Curve;
use crate::dense_gas::search::Window;
use crate::dense_gas::strength::{GIDDINGS, hildebrand_of};
use crate::dense_gas::study::{Needed, Study};
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
    pub(super) fn without_empty_columns(&mut self) {
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

/// The tables of a route's energy: each step by kind, then each circuit of CO2 by state and each mixture on its way down. Empty where nothing is known.
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
        let name = step_name(route, *step);
        sheets.push(circuit(&name, dense));
        if let Some(study) = &dense.study {
            let here = (dense.temperature_k, dense.pressure_pa);
            let title = format!("CO2 for the recovery: {name}");
            sheets.push(need_sheet(title, study, Some(here), dense.window.as_ref()));
        }
    }
    for path in batch_paths(route, account) {
        sheets.push(batch_sheet(&step_name(route, path.step), &path));
    }
    sheets
}

/// What a recovery takes at a state, and where it takes least carbon dioxide and least electricity within a window; `here` is a
/// temperature, K, and an absolute pressure, Pa.
///
/// The searches try some 3000 states each. A state that is refused is told in a note.
#[must_use]
pub fn need_sheet(title: String, study: &Study, here: Option<(f64, f64)>, window: Option<&Window>) -> Sheet {
    let mut sheet = Sheet {
        title,
        head: vec![
            "state",
            "temperature",
            "pressure",
            "density",
            "strength, MPa^½",
            "dissolved in 1 kg",
            "CO2 for 1 kg of solid",
            "electricity for it",
        ],
        rows: Vec::new(),
        notes: vec![format!(
            "{} of {} in 1 kg of solid free of it{}. Solid, CO2 and electricity are those of the extraction alone.",
            show(study.target.recovery, Kind::Fraction),
            show(study.target.solute_kg_kg, Kind::Mass),
            match study.target.curve {
                Curve::Saturated =>
                    ", the CO2 saturated to the end: the least that solubility allows, which no bed does",
                Curve::BrokenAndIntact { .. } =>
                    ", by the curve of Sovová with Z and W kept, which holds near the state of its fit",
            }
        )],
    };
    if let Some((temperature_k, pressure_pa)) = here {
        match study.at(temperature_k, pressure_pa) {
            Ok(needed) => sheet.rows.push(need_row("as stated", &needed)),
            Err(why) => sheet.notes.push(format!("The stated state is refused: {why}.")),
        }
    }
    let Some(window) = window else { return sheet };
    for (what, found) in
        [("least CO2", study.least_solvent(window)), ("least electricity", study.least_electricity(window))]
    {
        match found {
            Ok((optimum, needed)) => {
                sheet.rows.push(need_row(what, &needed));
                for (side, limit) in &optimum.on {
                    sheet.notes.push(format!("{what} lies on the {}: {}.", side.words(), limit.words()));
                }
            }
            Err(why) => sheet.notes.push(format!("{what} is not found: {why}.")),
        }
    }
    sheet.notes.push(
        "Searched from lowest to highest pressure and temperature of the window alone; ratings, relief and interlocks are a matter \
         of local codes and licensed practice."
            .to_owned(),
    );
    sheet
}

fn need_row(what: &str, n: &Needed) -> Vec<String> {
    vec![
        what.to_owned(),
        show(n.temperature_k, Kind::Temperature),
        show(n.pressure_pa, Kind::Pressure),
        show(n.density_kg_m3, Kind::Density),
        significant(n.strength_mpa_half, 3),
        show(n.loading_kg_kg, Kind::Mass),
        show(n.solvent_kg_kg, Kind::Mass),
        show(n.electricity_j_kg, Kind::Energy),
    ]
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
