//! Energy by step and circuits of CO2 as documents.

use super::super::row::written;
use super::posting::step_and_technique;
use crate::account::{Measure, RouteAccount, StepEnergy, by_step};
use crate::ledger::{StepIx, Utility};
use crate::program::RouteProgram;
use crate::step::DenseCo2;
use serde::Serialize;

#[derive(Serialize)]
pub(super) struct EnergyDocument {
    steps: Vec<StepDocument>,
    co2_circuits: Vec<CircuitDocument>,
}

#[derive(Serialize)]
struct StepDocument {
    step: u16,
    technique: &'static str,
    electricity_kwh_per_year: f64,
    counts: &'static str,
    nominal_kwh_per_year: f64,
    computed_kwh_per_year: f64,
    measured_kwh_per_year: f64,
    heat_kwh_per_year: f64,
    cooling_kwh_per_year: f64,
    work_kwh_per_year: f64,
    cooling_water_kg_per_year: f64,
}

#[derive(Serialize)]
struct CircuitDocument {
    step: usize,
    recycled: bool,
    temperature_k: f64,
    pressure_pa: f64,
    density_kg_m3: f64,
    solubility_parameter_mpa_half: f64,
    states: Vec<StateDocument>,
    changes: Vec<ChangeDocument>,
    left_at_let_down: Option<f64>,
    shut_in: Option<ShutInDocument>,
    metered: Vec<MeteredDocument>,
}

#[derive(Serialize)]
struct StateDocument {
    name: &'static str,
    temperature_k: Option<f64>,
    pressure_pa: f64,
    density_kg_m3: Option<f64>,
    enthalpy_j_kg: f64,
    entropy_j_kg_k: Option<f64>,
}

#[derive(Serialize)]
struct ChangeDocument {
    name: &'static str,
    kind: &'static str,
    j_per_kg: f64,
}

#[derive(Serialize)]
struct ShutInDocument {
    temperature_k: f64,
    pressure_pa: f64,
    pressure_at_25_c_pa: f64,
    rise_pa_per_k: f64,
}

#[derive(Serialize)]
struct MeteredDocument {
    at: &'static str,
    temperature_k: f64,
    pressure_pa: f64,
    density_kg_m3: f64,
    kg_per_run: f64,
}

impl EnergyDocument {
    pub(super) fn of(route: &RouteProgram, account: &RouteAccount) -> Self {
        Self {
            steps: by_step(&account.trace).iter().map(|s| step(route, s)).collect(),
            co2_circuits: account.dense.iter().map(|(i, d)| circuit(*i, d)).collect(),
        }
    }
}

fn step(route: &RouteProgram, s: &StepEnergy) -> StepDocument {
    let kwh = |utility| written(Measure::Energy, s.of(utility));
    StepDocument {
        step: s.step,
        technique: step_and_technique(route, StepIx::Step(s.step)).1,
        electricity_kwh_per_year: kwh(Utility::Electricity),
        counts: s.basis().title(),
        nominal_kwh_per_year: kwh(Utility::NominalElectricity),
        computed_kwh_per_year: kwh(Utility::ComputedElectricity),
        measured_kwh_per_year: kwh(Utility::MeasuredElectricity),
        heat_kwh_per_year: kwh(Utility::Heat),
        cooling_kwh_per_year: kwh(Utility::Cooling),
        work_kwh_per_year: kwh(Utility::Work),
        cooling_water_kg_per_year: s.of(Utility::CoolingWater),
    }
}

fn circuit(step: usize, d: &DenseCo2) -> CircuitDocument {
    let states = d.legs.points.iter().map(|p| {
        let there = p.state().ok();
        StateDocument {
            name: p.name,
            temperature_k: there.map(|s| s.temperature_k),
            pressure_pa: p.pressure_pa,
            density_kg_m3: there.map(|s| s.density_kg_m3),
            enthalpy_j_kg: p.enthalpy_j_kg,
            entropy_j_kg_k: there.map(|s| s.entropy_j_kg_k),
        }
    });
    let change = |l: &crate::co2_loop::Leg| ChangeDocument {
        name: l.name,
        kind: l.kind.word(),
        j_per_kg: l.energy_j_kg + 0.0,
    };
    let shut_in = d.trapped.zip(d.shut_in()).map(|(line, (temperature_k, pressure_pa))| ShutInDocument {
        temperature_k,
        pressure_pa,
        pressure_at_25_c_pa: line.pressure_pa,
        rise_pa_per_k: line.rise_pa_k,
    });
    let metered = d.metered.iter().map(|m| MeteredDocument {
        at: m.at,
        temperature_k: m.temperature_k,
        pressure_pa: m.pressure_pa,
        density_kg_m3: m.density_kg_m3,
        kg_per_run: m.kg,
    });
    CircuitDocument {
        step,
        recycled: d.recycled,
        temperature_k: d.temperature_k,
        pressure_pa: d.pressure_pa,
        density_kg_m3: d.density_kg_m3,
        solubility_parameter_mpa_half: d.strength_mpa_half,
        states: states.collect(),
        changes: d.legs.legs.iter().map(change).collect(),
        left_at_let_down: d.left_share,
        shut_in,
        metered: metered.collect(),
    }
}
