//! Energy by step and circuits of CO2 as documents.

use super::super::json::{Json, Value};
use super::super::row::written;
use super::posting::step_and_technique;
use crate::account::{Measure, RouteAccount, StepEnergy, by_step};
use crate::ledger::{StepIx, Utility};
use crate::program::RouteProgram;
use crate::step::DenseCo2;

pub(super) fn energy(json: &mut Json, route: &RouteProgram, account: &RouteAccount) {
    json.list("steps", |json| {
        for s in by_step(&account.trace) {
            json.row(|json| step(json, route, &s));
        }
    });
    json.list("co2_circuits", |json| {
        for (step, d) in &account.dense {
            json.row(|json| {
                json.put("step", *step);
                circuit(json, d);
            });
        }
    });
}

fn step(json: &mut Json, route: &RouteProgram, s: &StepEnergy) {
    json.put("step", s.step);
    json.put("technique", step_and_technique(route, StepIx::Step(s.step)).1);
    json.put("electricity_kwh_per_year", written(Measure::Energy, s.of(Utility::Electricity)));
    json.put("counts", s.basis().title());
    for (key, utility) in [
        ("nominal_kwh_per_year", Utility::NominalElectricity),
        ("computed_kwh_per_year", Utility::ComputedElectricity),
        ("measured_kwh_per_year", Utility::MeasuredElectricity),
        ("heat_kwh_per_year", Utility::Heat),
        ("cooling_kwh_per_year", Utility::Cooling),
        ("work_kwh_per_year", Utility::Work),
    ] {
        json.put(key, written(Measure::Energy, s.of(utility)));
    }
    json.put("cooling_water_kg_per_year", s.of(Utility::CoolingWater));
}

fn circuit(json: &mut Json, d: &DenseCo2) {
    json.put("recycled", d.recycled);
    json.put("temperature_k", d.temperature_k);
    json.put("pressure_pa", d.pressure_pa);
    json.put("density_kg_m3", d.density_kg_m3);
    json.put("solubility_parameter_mpa_half", d.strength_mpa_half);
    json.list("states", |json| {
        for p in &d.legs.points {
            let there = p.state().ok();
            json.row(|json| {
                json.put("name", p.name);
                json.put("temperature_k", there.map(|s| s.temperature_k));
                json.put("pressure_pa", p.pressure_pa);
                json.put("density_kg_m3", there.map(|s| s.density_kg_m3));
                json.put("enthalpy_j_kg", p.enthalpy_j_kg);
                json.put("entropy_j_kg_k", there.map(|s| s.entropy_j_kg_k));
            });
        }
    });
    json.list("changes", |json| {
        for leg in &d.legs.legs {
            json.row(|json| {
                json.put("name", leg.name);
                json.put("kind", leg.kind.word());
                json.put("j_per_kg", leg.energy_j_kg + 0.0);
            });
        }
    });
    json.put("left_at_let_down", d.left_share);
    match d.trapped.zip(d.shut_in()) {
        Some((line, (temperature_k, pressure_pa))) => json.object("shut_in", |json| {
            json.put("temperature_k", temperature_k);
            json.put("pressure_pa", pressure_pa);
            json.put("pressure_at_25_c_pa", line.pressure_pa);
            json.put("rise_pa_per_k", line.rise_pa_k);
        }),
        None => json.put("shut_in", Value::Null),
    }
    json.list("metered", |json| {
        for m in &d.metered {
            json.row(|json| {
                json.put("at", m.at);
                json.put("temperature_k", m.temperature_k);
                json.put("pressure_pa", m.pressure_pa);
                json.put("density_kg_m3", m.density_kg_m3);
                json.put("kg_per_run", m.kg);
            });
        }
    });
}
