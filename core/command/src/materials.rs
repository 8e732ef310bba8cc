//! `materials`: the catalogue, and all figures of one material with sources and spread.

use crate::output::{Refusal, print};
use clap::ValueEnum;
use serde::Serialize;
use std::process::ExitCode;
use thimbleworth::material::{
    Catalogue, Figure, FlashPoint, Law, PropertyError, Solubility, Substance, catalogue, statement_text,
};
use thimbleworth::quantity::{Kind, show, significant};

/// The temperature at which properties that follow it are listed: 20 °C, in K.
const AT_K: f64 = 293.15;

#[derive(clap::Args)]
pub(crate) struct Args {
    /// The name, a synonym or the CAS number of one material
    name: Option<String>,
    /// What to write
    #[arg(long, value_enum, default_value_t = Format::Table)]
    format: Format,
}

#[derive(Clone, Copy, ValueEnum)]
enum Format {
    /// Text for a terminal
    Table,
    /// For other programs; the unit stands in each key, properties that follow the temperature are at 293.15 K
    Json,
}

#[derive(Serialize)]
struct MaterialDocument<'a> {
    name: &'a str,
    synonyms: Vec<&'a str>,
    cas: Option<&'a str>,
    formula: Option<&'a str>,
    class: &'static str,
    note: &'a str,
    figures: Vec<FigureDocument>,
    flash_point: &'static str,
    solubility_in_water: &'static str,
    hazard: HazardDocument<'a>,
    un: Option<&'a str>,
    transport_class: Option<&'a str>,
    packing_group: Option<&'a str>,
    us_waste_codes: Vec<&'a str>,
    eu_waste_codes: Vec<&'a str>,
}

/// One figure; the unit stands at the end of the key.
#[derive(Serialize)]
struct FigureDocument {
    key: &'static str,
    title: &'static str,
    value: f64,
    low: f64,
    high: f64,
    source: String,
    cite: String,
    standing: &'static str,
    valid_from_k: Option<f64>,
    valid_to_k: Option<f64>,
    #[serde(skip)]
    kind: Kind,
}

#[derive(Serialize)]
struct HazardDocument<'a> {
    statements: Vec<StatementDocument<'a>>,
    supplier_statements: Vec<StatementDocument<'a>>,
    as_of: &'a str,
    source: &'a str,
    standing: Option<&'static str>,
    note: &'a str,
}

#[derive(Serialize)]
struct StatementDocument<'a> {
    code: &'a str,
    text: Option<&'static str>,
}

pub(crate) fn run(args: &Args) -> Result<ExitCode, Refusal> {
    let catalogue = catalogue();
    let one = match &args.name {
        None => None,
        Some(name) => Some(catalogue.find(name).map_err(|unknown| Refusal::because(unknown.to_string()))?),
    };
    print(&match (args.format, one) {
        (Format::Table, None) => list(catalogue),
        (Format::Table, Some(s)) => details(catalogue, s),
        (Format::Json, None) => json(&catalogue.iter().map(|s| document(catalogue, s)).collect::<Vec<_>>())?,
        (Format::Json, Some(s)) => json(&document(catalogue, s))?,
    })?;
    Ok(ExitCode::SUCCESS)
}

fn json<T: Serialize>(document: &T) -> Result<String, Refusal> {
    let text = serde_json::to_string_pretty(document).map_err(|e| Refusal::because(e.to_string()))?;
    Ok(text + "\n")
}

/// A figure, and the range of temperature in which its law holds; K.
type Known = (Option<Figure>, Option<(f64, f64)>);

/// Every figure that is known, properties at 20 °C.
fn figures(catalogue: &Catalogue, s: &Substance) -> Vec<FigureDocument> {
    let fixed = |figure: Option<&Figure>| (figure.cloned(), None);
    let law = |law: &Law, at: Result<Figure, PropertyError>| (at.ok(), law.range_k());
    let solubility = match &s.solubility_in_water {
        Solubility::Limited(figure) => Some(figure),
        Solubility::Miscible | Solubility::NotKnown => None,
    };
    let all = [
        ("molar_mass_kg_mol", "molar mass", Kind::MolarMass, fixed(s.molar_mass_kg_mol.as_ref())),
        (
            "density_kg_m3",
            "density of the liquid at 20 °C",
            Kind::Density,
            law(&s.density, s.density_kg_m3(AT_K)),
        ),
        (
            "vapour_pressure_pa",
            "vapour pressure at 20 °C",
            Kind::Pressure,
            law(&s.vapour_pressure, s.vapour_pressure_pa(AT_K)),
        ),
        (
            "heat_of_vaporisation_j_kg",
            "heat of vaporisation at 20 °C",
            Kind::SpecificEnergy,
            law(&s.heat_of_vaporisation, s.heat_of_vaporisation_j_kg(AT_K)),
        ),
        ("boiling_point_k", "boiling point", Kind::Temperature, fixed(s.boiling_point_k.as_ref())),
        ("flash_point_k", "flash point", Kind::Temperature, fixed(s.flash_point_k.figure())),
        ("autoignition_k", "auto-ignition", Kind::Temperature, fixed(s.autoignition_k.as_ref())),
        (
            "critical_temperature_k",
            "critical temperature",
            Kind::Temperature,
            fixed(s.critical_temperature_k.as_ref()),
        ),
        ("solubility_in_water_kg_m3", "solubility in water", Kind::Density, fixed(solubility)),
        ("gwp100_ar4_kg_kg", "GWP100, IPCC 2007 (AR4)", Kind::Number, fixed(s.gwp100.ar4.as_ref())),
        ("gwp100_ar5_kg_kg", "GWP100, IPCC 2013 (AR5)", Kind::Number, fixed(s.gwp100.ar5.as_ref())),
        ("gwp100_ar6_kg_kg", "GWP100, IPCC 2021 (AR6)", Kind::Number, fixed(s.gwp100.ar6.as_ref())),
        ("odp_kg_kg", "ozone depletion potential", Kind::Number, fixed(s.odp.as_ref())),
        ("bulk_density_kg_m3", "bulk density", Kind::Density, fixed(s.bulk_density_kg_m3.as_ref())),
        ("unit_mass_kg", "mass of one piece", Kind::Mass, fixed(s.unit_mass_kg.as_ref())),
        ("water_capacity_kg_kg", "water taken up", Kind::MassPerMass, fixed(s.water_capacity_kg_kg.as_ref())),
    ];
    let known = |(key, title, kind, (figure, range)): (_, _, _, Known)| {
        let figure = figure?;
        let source = catalogue.source(&figure.source);
        Some(FigureDocument {
            key,
            title,
            value: figure.value,
            low: figure.low,
            high: figure.high,
            cite: source.map_or_else(String::new, |s| s.cite.to_owned()),
            standing: source.map_or("", |s| s.standing.words()),
            source: figure.source.into_owned(),
            valid_from_k: range.map(|r| r.0),
            valid_to_k: range.map(|r| r.1),
            kind,
        })
    };
    all.into_iter().filter_map(known).collect()
}

fn flash_word(s: &Substance) -> &'static str {
    match s.flash_point_k {
        FlashPoint::NotKnown => "not known",
        FlashPoint::None => "none",
        FlashPoint::Known(_) => "known",
    }
}

fn solubility_word(s: &Substance) -> &'static str {
    match s.solubility_in_water {
        Solubility::NotKnown => "not known",
        Solubility::Miscible => "miscible",
        Solubility::Limited(_) => "limited",
    }
}

fn us_codes(s: &Substance) -> Vec<&str> {
    let r = &s.rcra;
    let all = r.characteristic.iter().chain(&r.toxicity).chain(&r.spent).chain(&r.spent_in_degreasing);
    all.map(String::as_str).chain(r.unused.as_deref()).collect()
}

fn document<'a>(catalogue: &Catalogue, s: &'a Substance) -> MaterialDocument<'a> {
    let statements = |codes: &'a [String]| {
        codes.iter().map(|code| StatementDocument { code, text: statement_text(code) }).collect()
    };
    MaterialDocument {
        name: &s.name,
        synonyms: s.synonyms.iter().map(|n| &**n).collect(),
        cas: s.cas.as_deref(),
        formula: s.formula.as_deref(),
        class: s.class.word(),
        note: &s.note,
        figures: figures(catalogue, s),
        flash_point: flash_word(s),
        solubility_in_water: solubility_word(s),
        hazard: HazardDocument {
            statements: statements(&s.hazard.statements),
            supplier_statements: statements(&s.hazard.supplier_statements),
            as_of: &s.hazard.as_of,
            source: &s.hazard.source,
            standing: s.hazard.standing.map(thimbleworth::source::Standing::words),
            note: &s.hazard.note,
        },
        un: s.transport.as_ref().map(|t| &*t.un),
        transport_class: s.transport.as_ref().map(|t| &*t.class),
        packing_group: s.transport.as_ref().map(|t| &*t.packing_group),
        us_waste_codes: us_codes(s),
        eu_waste_codes: [&s.eu_low.spent, &s.eu_low.laboratory]
            .into_iter()
            .filter_map(|c| c.as_deref())
            .collect(),
    }
}

fn list(catalogue: &Catalogue) -> String {
    let mut out = format!(
        "{:<34}{:<13}{:<14}{:>12}{:>10}{:>10}  statements\n",
        "material", "CAS", "class", "density", "boils", "flash"
    );
    for s in catalogue {
        let shown = |figure: Option<&Figure>, kind| figure.map_or_else(String::new, |f| show(f.value, kind));
        let flash = match &s.flash_point_k {
            FlashPoint::None => "none".to_owned(),
            FlashPoint::Known(figure) => show(figure.value, Kind::Temperature),
            FlashPoint::NotKnown => String::new(),
        };
        let line = format!(
            "{:<34}{:<13}{:<14}{:>12}{:>10}{:>10}  {}",
            s.name,
            s.cas.as_deref().unwrap_or_default(),
            s.class.word(),
            shown(s.density_kg_m3(AT_K).ok().as_ref(), Kind::Density),
            shown(s.boiling_point_k.as_ref(), Kind::Temperature),
            flash,
            s.hazard.statements.join(" ")
        );
        out.push_str(line.trim_end());
        out.push('\n');
    }
    out.push_str("\nDensity at 20 °C. Empty: not known. `materials NAME` gives every figure with its source and spread.\n");
    out
}

fn details(catalogue: &Catalogue, s: &Substance) -> String {
    let mut out = format!("{} ({})\n", s.name, s.class.word());
    let mut line = |text: String| {
        out.push_str("  ");
        out.push_str(&text);
        out.push('\n');
    };
    if !s.synonyms.is_empty() {
        line(format!("also: {}", s.synonyms.join(", ")));
    }
    if let Some(cas) = &s.cas {
        line(format!("CAS {cas}"));
    }
    if let Some(formula) = &s.formula {
        line(format!("formula {formula}"));
    }
    if !s.note.is_empty() {
        line(s.note.to_string());
    }
    for f in figures(catalogue, s) {
        let shown = |value| if f.kind == Kind::Number { significant(value, 4) } else { show(value, f.kind) };
        let spread = if f.low < f.high {
            format!(", sources from {} to {}", shown(f.low), shown(f.high))
        } else {
            String::new()
        };
        let range = match (f.valid_from_k, f.valid_to_k) {
            (Some(low), Some(high)) if high.is_finite() => {
                format!("; holds from {} to {}", show(low, Kind::Temperature), show(high, Kind::Temperature))
            }
            _ => String::new(),
        };
        line(format!(
            "{}: {}{spread}{range} [{}: {}; {}]",
            f.title,
            shown(f.value),
            f.source,
            f.cite,
            f.standing
        ));
    }
    if matches!(s.flash_point_k, FlashPoint::None) {
        line("flash point: none by the standard test; the vapour may still burn".to_owned());
    }
    if matches!(s.solubility_in_water, Solubility::Miscible) {
        line("mixes with water in every ratio".to_owned());
    }
    hazard(&mut line, s);
    if let Some(t) = &s.transport {
        let group = if t.packing_group.is_empty() {
            String::new()
        } else {
            format!(", packing group {}", t.packing_group)
        };
        line(format!("transport: {}, class {}{group} [{}]", t.un, t.class, t.source));
    }
    if !us_codes(s).is_empty() {
        line(format!(
            "US waste codes: {} [{}]; a licensed person decides",
            us_codes(s).join(", "),
            s.rcra.source
        ));
    }
    let eu: Vec<&str> =
        [&s.eu_low.spent, &s.eu_low.laboratory].into_iter().filter_map(|c| c.as_deref()).collect();
    if !eu.is_empty() {
        line(format!("EU list of waste: {} [{}]; national practice differs", eu.join(", "), s.eu_low.source));
    }
    out
}

fn hazard(line: &mut impl FnMut(String), s: &Substance) {
    let h = &s.hazard;
    if h.source.is_empty() {
        line("hazards: nothing is known".to_owned());
        return;
    }
    let standing = h.standing.map_or("", thimbleworth::source::Standing::words);
    line(format!("hazard statements as of {} [{}; {standing}]", h.as_of, h.source));
    if h.statements.is_empty() {
        line("  none".to_owned());
    }
    for code in &h.statements {
        line(format!("  {code} {}", statement_text(code).unwrap_or_default()));
    }
    let more: Vec<&str> =
        h.supplier_statements.iter().filter(|c| !h.statements.contains(c)).map(String::as_str).collect();
    if !more.is_empty() {
        line(format!("  a usual supplier label has also {}", more.join(" ")));
    }
    if !h.note.is_empty() {
        line(format!("  {}", h.note));
    }
}
