//! `co2`: one state of carbon dioxide, or a file of states.

use crate::output::{Refusal, complain, print};
use crate::states;
use clap::ValueEnum;
use serde::Serialize;
use std::path::PathBuf;
use std::process::ExitCode;
use thimbleworth::co2::{self, State};
use thimbleworth::quantity::{Kind, Spread, read, show, significant};

/// What is said about the zero of enthalpy and entropy.
const ZERO: &str = "Enthalpy and entropy are 0 for the ideal gas at 298.15 K and 101325 Pa, as in Span and Wagner (1996). \
Other tables put 200 kJ/kg and 1 kJ/(kg K) to the saturated liquid at 0 °C: differences are the same in both.";

/// From temperature and absolute pressure: density, phase, heat and viscosity.
#[derive(clap::Args)]
#[command(after_help = ZERO)]
pub(crate) struct Args {
    /// Temperature with its unit, as in "60 °C"
    #[arg(long, allow_hyphen_values = true, requires = "pressure", required_unless_present = "states")]
    temperature: Option<String>,
    /// Absolute pressure with its unit, as in "300 bar"
    #[arg(long, allow_hyphen_values = true, requires = "temperature")]
    pressure: Option<String>,
    /// A CSV file with the columns temperature_k and pressure_pa in any order, or - for the standard input; writes CSV, a
    /// row for each, with the reason in the column error where a state is refused
    #[arg(long, value_name = "FILE", conflicts_with_all = ["temperature", "pressure", "format"])]
    states: Option<PathBuf>,
    /// What to write
    #[arg(long, value_enum, default_value_t = Format::Table)]
    format: Format,
}

#[derive(Clone, Copy, ValueEnum)]
enum Format {
    /// Text for a terminal
    Table,
    /// For other programs; the unit stands in each key
    Json,
}

#[derive(Serialize)]
struct StateDocument {
    temperature_k: f64,
    pressure_pa: f64,
    density_kg_m3: f64,
    phase: &'static str,
    enthalpy_j_kg: f64,
    entropy_j_kg_k: f64,
    heat_capacity_j_kg_k: f64,
    sound_speed_m_s: f64,
    viscosity_pa_s: f64,
}

pub(crate) fn run(args: &Args) -> Result<ExitCode, Refusal> {
    if let Some(path) = &args.states {
        return states::run(path);
    }
    let temperature_k = one("--temperature", args.temperature.as_deref(), Kind::Temperature)?;
    let pressure_pa = one("--pressure", args.pressure.as_deref(), Kind::Pressure)?;
    let state =
        co2::state(temperature_k, pressure_pa).map_err(|error| Refusal::because(error.to_string()))?;
    print(&match args.format {
        Format::Table => table(&state),
        Format::Json => json(&state)?,
    })?;
    if state.viscosity_is_extrapolated() {
        complain(
            "warning: the viscosity is outside the range of its correlation, 220 K to 700 K for what is not a gas",
        );
    }
    Ok(ExitCode::SUCCESS)
}

fn one(option: &str, text: Option<&str>, kind: Kind) -> Result<f64, Refusal> {
    let text = text.unwrap_or_default();
    let amount = read(text, kind)
        .map_err(|e| Refusal::because(format!("{option} \"{text}\": {}; {}", e.found(), e.need())))?;
    match amount.spread {
        Spread::Exact => Ok(amount.central_si),
        Spread::Limits { .. } | Spread::Standard { .. } => {
            Err(Refusal::because(format!("{option} \"{text}\" is a range; a state has one value")))
        }
    }
}

fn json(state: &State) -> Result<String, Refusal> {
    let document = StateDocument {
        temperature_k: state.temperature_k,
        pressure_pa: state.pressure_pa,
        density_kg_m3: state.density_kg_m3,
        phase: state.phase.word(),
        enthalpy_j_kg: state.enthalpy_j_kg,
        entropy_j_kg_k: state.entropy_j_kg_k,
        heat_capacity_j_kg_k: state.heat_capacity_j_kg_k,
        sound_speed_m_s: state.sound_speed_m_s,
        viscosity_pa_s: state.viscosity_pa_s,
    };
    let text = serde_json::to_string_pretty(&document).map_err(|e| Refusal::because(e.to_string()))?;
    Ok(text + "\n")
}

fn table(state: &State) -> String {
    let number = |value: f64| significant(value, 6);
    let rows = [
        (
            "temperature",
            format!("{} ({} K)", show(state.temperature_k, Kind::Temperature), number(state.temperature_k)),
        ),
        ("pressure, absolute", show(state.pressure_pa, Kind::Pressure)),
        ("phase", state.phase.word().to_owned()),
        ("density", format!("{} kg/m³", number(state.density_kg_m3))),
        ("enthalpy", format!("{} J/kg", number(state.enthalpy_j_kg))),
        ("entropy", format!("{} J/(kg K)", number(state.entropy_j_kg_k))),
        ("heat capacity at constant pressure", format!("{} J/(kg K)", number(state.heat_capacity_j_kg_k))),
        ("speed of sound", format!("{} m/s", number(state.sound_speed_m_s))),
        ("viscosity", format!("{} µPa s", number(state.viscosity_pa_s * 1e6))),
    ];
    let mut text = String::new();
    for (what, value) in rows {
        text.push_str(&format!("{what:<36}{value}\n"));
    }
    text.push_str(&format!("{ZERO}\n"));
    text
}
