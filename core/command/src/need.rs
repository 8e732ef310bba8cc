//! `need`: the carbon dioxide that a recovery takes at a state, and the state that takes least.

use crate::input;
use crate::output::{Refusal, print};
use clap::ValueEnum;
use serde::Serialize;
use std::path::{Path, PathBuf};
use std::process::ExitCode;
use thimbleworth::co2::density_kg_m3;
use thimbleworth::co2_loop::{ClosedLoop, Heating, OpenLoop, Utilities};
use thimbleworth::dense_gas::chrastil::{Chrastil, Measured, fit};
use thimbleworth::dense_gas::need::{Curve, Solubility, Target};
use thimbleworth::dense_gas::search::{Optimum, Window};
use thimbleworth::dense_gas::study::{Circuit, Needed, Study};
use thimbleworth::quantity::{Kind, Spread, read, significant};
use thimbleworth::report::need_sheet;

/// What is said at the end of the help.
const AFTER: &str = "One state, or a range of each to search: --temperature \"35 °C to 80 °C\" --pressure \"150 bar to 400 bar\". The highest \
pressure and temperature are the vessel's rating less the margin to its relief. Points: a CSV file with the columns temperature_k, \
pressure_pa or density_kg_m3, and solubility_kg_m3 (g/L); constants of Chrastil's equation are fitted to them and hold within them alone. \
No constants of solutes are shipped.";

/// The CO2 that a recovery takes, and the pressure and temperature that take least CO2 or least electricity.
#[derive(clap::Args)]
#[command(after_help = AFTER)]
pub(crate) struct Args {
    /// Where the solubility comes from
    #[command(flatten)]
    law: LawArgs,
    /// Solute for each mass of solid free of it, as in "0.2 g/g"
    #[arg(long)]
    solute: String,
    /// Share of it that is to come out, as in "95 %"
    #[arg(long)]
    recovery: String,
    /// Share in intact cells, Z of the fast and W of the slow period by Sovová, as in "0.3,2,0.2"; left out, the CO2 is
    /// saturated to the end
    #[arg(long)]
    curve: Option<String>,
    /// Temperature with its unit, or a range
    #[arg(long, allow_hyphen_values = true)]
    temperature: String,
    /// Absolute pressure with its unit, or a range
    #[arg(long)]
    pressure: String,
    /// The CO2 is vented, not recycled
    #[arg(long)]
    vented: bool,
    /// Temperature of the liquid at the pump
    #[arg(long, default_value = "5 °C", allow_hyphen_values = true)]
    chill: String,
    /// Absolute pressure of the separator
    #[arg(long, default_value = "50 bar")]
    separator: String,
    /// Isentropic efficiency of the pump
    #[arg(long, default_value = "70 %")]
    efficiency: String,
    /// Heat removed for each electricity of the chiller
    #[arg(long, default_value = "3")]
    cop: String,
    /// What to write
    #[arg(long, value_enum, default_value_t = Format::Table)]
    format: Format,
}

#[derive(clap::Args)]
#[group(required = true, multiple = false)]
struct LawArgs {
    /// A vegetable oil by del Valle and Aguilera, in their range alone
    #[arg(long)]
    oil: bool,
    /// k, a (in K) and b of S = ρᵏ exp(a/T + b), S and ρ in kg/m³
    #[arg(long, value_name = "K,A,B", allow_hyphen_values = true)]
    chrastil: Option<String>,
    /// Measured points to fit k, a and b to
    #[arg(long, value_name = "FILE")]
    points: Option<PathBuf>,
}

#[derive(Clone, Copy, ValueEnum)]
enum Format {
    /// Text for a terminal
    Table,
    /// For other programs; the unit stands in each key
    Json,
}

#[derive(Serialize)]
struct Document {
    chrastil: Option<ConstantsDocument>,
    stated: Option<NeededDocument>,
    least_co2: Option<NeededDocument>,
    least_electricity: Option<NeededDocument>,
}

#[derive(Serialize)]
struct ConstantsDocument {
    k: f64,
    a_k: f64,
    b: f64,
    standard_deviation_ln: Option<f64>,
}

#[derive(Serialize)]
struct NeededDocument {
    temperature_k: f64,
    pressure_pa: f64,
    density_kg_m3: f64,
    solubility_parameter_mpa_half: f64,
    dissolved_kg_per_kg_co2: f64,
    co2_kg_per_kg_solid: f64,
    electricity_j_per_kg_solid: f64,
    /// Sides of the window on which it lies.
    on: Vec<&'static str>,
}

impl NeededDocument {
    fn of(n: &Needed, found: Option<&Optimum>) -> Self {
        Self {
            temperature_k: n.temperature_k,
            pressure_pa: n.pressure_pa,
            density_kg_m3: n.density_kg_m3,
            solubility_parameter_mpa_half: n.strength_mpa_half,
            dissolved_kg_per_kg_co2: n.loading_kg_kg,
            co2_kg_per_kg_solid: n.solvent_kg_kg,
            electricity_j_per_kg_solid: n.electricity_j_kg,
            on: found.map_or_else(Vec::new, |f| f.on.iter().map(|(side, _)| side.words()).collect()),
        }
    }
}

pub(crate) fn run(args: &Args) -> Result<ExitCode, Refusal> {
    let (solubility, fitted) = law(&args.law)?;
    let curve = match args.curve.as_deref().map(|text| numbers("--curve", text)).transpose()? {
        None => Curve::Saturated,
        Some([intact_share, fast, slow]) => Curve::BrokenAndIntact { intact_share, fast, slow },
    };
    let one = |option: &str, text: &str, kind| {
        let [low, high] = range(option, text, kind)?;
        if low < high {
            Err(Refusal::because(format!("{option} \"{text}\" is a range; one value would do")))
        } else {
            Ok(low)
        }
    };
    let (chill_k, efficiency) = (
        one("--chill", &args.chill, Kind::Temperature)?,
        one("--efficiency", &args.efficiency, Kind::Fraction)?,
    );
    let circuit = if args.vented {
        Circuit::Open(OpenLoop {
            supply_pressure_pa: None,
            chill_temperature_k: chill_k,
            pump_efficiency: efficiency,
            ..OpenLoop::default()
        })
    } else {
        Circuit::Closed(ClosedLoop {
            condenser_temperature_k: chill_k,
            pump_efficiency: efficiency,
            separator_pressure_pa: one("--separator", &args.separator, Kind::Pressure)?,
            ..ClosedLoop::default()
        })
    };
    let study = Study {
        solubility,
        target: Target {
            solute_kg_kg: one("--solute", &args.solute, Kind::MassPerMass)?,
            recovery: one("--recovery", &args.recovery, Kind::Fraction)?,
            curve,
        },
        circuit,
        machines: Utilities {
            drive_efficiency: 0.9,
            cooling_cop: one("--cop", &args.cop, Kind::Number)?,
            heating: Heating::Electric { ratio: 1.0 },
        },
    };
    let window = Window {
        temperature_k: range("--temperature", &args.temperature, Kind::Temperature)?,
        pressure_pa: range("--pressure", &args.pressure, Kind::Pressure)?,
    };
    let ([cold, hot], [low, high]) = (window.temperature_k, window.pressure_pa);
    let here = (cold == hot && low == high).then_some((cold, low));
    let searched = here.is_none().then_some(&window);
    let refused = |e: thimbleworth::dense_gas::DenseGasError| Refusal::because(e.to_string());
    let text = match args.format {
        Format::Json => {
            let least = |found: Result<(Optimum, Needed), _>| {
                found.map(|(o, n)| Some(NeededDocument::of(&n, Some(&o)))).map_err(refused)
            };
            let document = Document {
                chrastil: fitted.map(|(c, deviation)| ConstantsDocument {
                    k: c.k,
                    a_k: c.a_k,
                    b: c.b,
                    standard_deviation_ln: deviation,
                }),
                stated: match here {
                    Some((t, p)) => Some(NeededDocument::of(&study.at(t, p).map_err(refused)?, None)),
                    None => None,
                },
                least_co2: searched.map_or(Ok(None), |w| least(study.least_solvent(w)))?,
                least_electricity: searched.map_or(Ok(None), |w| least(study.least_electricity(w)))?,
            };
            serde_json::to_string_pretty(&document).map_err(|e| Refusal::because(e.to_string()))? + "\n"
        }
        Format::Table => {
            if let Some((t, p)) = here {
                study.at(t, p).map_err(refused)?;
            }
            let sheet = need_sheet("CO2 for the recovery".to_owned(), &study, here, searched);
            let mut text = String::new();
            if let Some((c, deviation)) = fitted {
                let number = |value| significant(value, 6);
                let spread = deviation.map_or_else(
                    || "three points, which any fit meets".to_owned(),
                    |d| format!("standard deviation {} %", significant(100.0 * d, 2)),
                );
                text.push_str(&format!(
                    "Chrastil's constants fitted: k = {}, a = {} K, b = {}; {spread}\n",
                    number(c.k),
                    number(c.a_k),
                    number(c.b)
                ));
            }
            for row in &sheet.rows {
                for (head, cell) in sheet.head.iter().zip(row) {
                    text.push_str(&format!("{head:<24}{cell}\n"));
                }
                text.push('\n');
            }
            for note in &sheet.notes {
                text.push_str(&format!("{note}\n"));
            }
            text
        }
    };
    print(&text)?;
    Ok(ExitCode::SUCCESS)
}

/// A solubility; where it was fitted its constants too, with the standard deviation of ln S.
type Law = (Solubility, Option<(Chrastil, Option<f64>)>);

fn law(args: &LawArgs) -> Result<Law, Refusal> {
    if args.oil {
        return Ok((Solubility::VegetableOil, None));
    }
    if let Some(text) = &args.chrastil {
        let [k, a_k, b] = numbers("--chrastil", text)?;
        return Ok((Solubility::Chrastil(Chrastil { k, a_k, b, range: None }), None));
    }
    let Some(path) = &args.points else { return Err(Refusal::because("no solubility is given")) };
    let found = fit(&points(path)?).map_err(|e| Refusal::because(e.to_string()))?;
    Ok((Solubility::Chrastil(found.constants), Some((found.constants, found.deviation))))
}

/// Points of a CSV file, plain numbers.
fn points(path: &Path) -> Result<Vec<Measured>, Refusal> {
    let bytes = input::bytes(path)?;
    let text = String::from_utf8_lossy(&bytes);
    let mut lines = text.trim_start_matches('\u{feff}').lines();
    let head: Vec<&str> = lines.next().unwrap_or_default().split(',').map(str::trim).collect();
    let column = |name: &str| head.iter().position(|h| *h == name);
    let (t, s) = (column("temperature_k"), column("solubility_kg_m3"));
    let (p, d) = (column("pressure_pa"), column("density_kg_m3"));
    let (Some(t), Some(s), true) = (t, s, p.is_some() || d.is_some()) else {
        let need =
            "a first line with temperature_k, pressure_pa or density_kg_m3, and solubility_kg_m3 would do";
        return Err(Refusal::because(format!("the points lack a column; {need}")));
    };
    let mut all = Vec::new();
    for (i, line) in lines.enumerate().filter(|(_, line)| !line.trim().is_empty()) {
        let cells: Vec<&str> = line.split(',').map(str::trim).collect();
        let number = |at: usize| {
            let cell = cells.get(at).copied().unwrap_or_default();
            let wrong = format!(
                "line {}: \"{cell}\" is no number; a plain number with a decimal point would do",
                i + 2
            );
            cell.parse::<f64>().map_err(|_| Refusal::because(wrong))
        };
        let temperature_k = number(t)?;
        let density_kg_m3 = match (d, p) {
            (Some(d), _) => number(d)?,
            (None, Some(p)) => density_kg_m3(temperature_k, number(p)?)
                .map_err(|e| Refusal::because(format!("line {}: {e}", i + 2)))?,
            (None, None) => f64::NAN,
        };
        all.push(Measured { density_kg_m3, temperature_k, solubility_kg_m3: number(s)? });
    }
    Ok(all)
}

/// Three plain numbers with commas between them.
fn numbers(option: &str, text: &str) -> Result<[f64; 3], Refusal> {
    let all: Vec<f64> = text.split(',').filter_map(|n| n.trim().parse().ok()).collect();
    let wrong =
        || Refusal::because(format!("{option} \"{text}\" is not three numbers with commas between them"));
    all.try_into().map_err(|_| wrong())
}

/// An amount with its limits, or twice the same.
fn range(option: &str, text: &str, kind: Kind) -> Result<[f64; 2], Refusal> {
    let amount = read(text, kind)
        .map_err(|e| Refusal::because(format!("{option} \"{text}\": {}; {}", e.found(), e.need())))?;
    match amount.spread {
        Spread::Limits { low_si, high_si } => Ok([low_si, high_si]),
        Spread::Exact => Ok([amount.central_si; 2]),
        Spread::Standard { .. } => Err(Refusal::because(format!(
            "{option} \"{text}\" is an uncertainty; a value or \"A to B\" would do"
        ))),
    }
}
