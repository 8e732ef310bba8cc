//! `technique`: what a step may say, from the same declarations that the reader, the form and the schema use.

use crate::output::{Refusal, print};
use std::process::ExitCode;
use thimbleworth::quantity::{Kind, show};
use thimbleworth::report::cited;
use thimbleworth::step::{Control, Measurable, Need, Param, TECHNIQUES, Technique, technique};

#[derive(clap::Args)]
pub(crate) struct Args {
    /// The key of a technique
    key: Option<String>,
}

pub(crate) fn run(args: &Args) -> Result<ExitCode, Refusal> {
    let text = match &args.key {
        None => TECHNIQUES.iter().map(|t| format!("{:<20}{}\n", t.key, t.title)).collect(),
        Some(key) => {
            let keys = || TECHNIQUES.iter().map(|t| t.key).collect::<Vec<_>>().join(", ");
            let found = technique(key)
                .ok_or_else(|| Refusal::because(format!("no technique \"{key}\"; there are: {}", keys())))?;
            described(found)
        }
    };
    print(&text)?;
    Ok(ExitCode::SUCCESS)
}

fn described(t: &Technique) -> String {
    let mut out = format!("{} ({})\n{}\n", t.title, t.key, words(t.about));
    if let Some(place) = t.takes_feed.and_then(thimbleworth::ledger::Place::name) {
        out.push_str(&format!("Takes in the feed, which lies in the {place} then.\n"));
    }
    out.push_str("\nParameters\n");
    for p in t.params {
        parameter(&mut out, p);
    }
    out.push_str("\nRules\n");
    for rule in t.rules {
        let open = match rule.measurable {
            Measurable::No => "",
            Measurable::MassOrShare => "; a measured mass or share may take its place",
            Measurable::Energy => "; a meter's reading may take its place",
        };
        out.push_str(&format!("  {}: {} ({}){open}\n", rule.name, rule.equation, cited(rule.source)));
    }
    if !t.cautions.is_empty() {
        out.push_str("\nCautions; local codes and licensed practice decide\n");
        for caution in t.cautions {
            out.push_str(&format!("  {} ({})\n", caution.text, cited(caution.source)));
        }
    }
    let example: Vec<&str> = t.example.lines().map(str::trim).collect();
    out.push_str(&format!("\nExample\n  {}\n", example.join("\n    ")));
    out
}

/// Declared over several source lines: one line.
fn words(text: &str) -> String {
    text.split_whitespace().collect::<Vec<_>>().join(" ")
}

fn parameter(out: &mut String, p: &Param) {
    let need = match p.need {
        Need::Required => "required".to_owned(),
        Need::Optional => "may be left out".to_owned(),
        Need::Default(text, source) => format!("{text} when left out ({})", cited(source)),
    };
    out.push_str(&format!("  {}: {}; {}; {need}\n", p.key, p.label, control(p.control)));
    if let Control::Quantity(kind) | Control::PerMaterial(kind) = p.control {
        let mut said = Vec::new();
        said.extend(limits(p.physical, kind).map(|l| format!("possible: {l}")));
        said.extend(limits(p.usual, kind).map(|l| format!("usual: {l} ({})", cited(p.source))));
        if !said.is_empty() {
            out.push_str(&format!("    {}\n", said.join("; ")));
        }
    }
    if let Some((key, values)) = p.shown_when {
        out.push_str(&format!("    only where {key} is {}\n", values.join(" or ")));
    }
    if !p.hint.is_empty() {
        out.push_str(&format!("    {}\n", words(p.hint)));
    }
}

fn control(control: Control) -> String {
    match control {
        Control::Quantity(kind) => format!("{}, as in \"{}\"", kind.words(), kind.examples()[0]),
        Control::Choice(words) => format!("one of {}", words.join(", ")),
        Control::Material => "a material".to_owned(),
        Control::Mixture => "a material, or several with shares".to_owned(),
        Control::PerMaterial(kind) => format!("{} for each material", kind.words()),
        Control::PerStream(kind) => format!("{} for each stream", kind.words()),
        Control::Text => "a text".to_owned(),
        Control::Count => "a whole number".to_owned(),
        Control::YesNo => "true or false".to_owned(),
        Control::Place => "a stream of the site, or a place of the book".to_owned(),
    }
}

fn limits((low, high): (f64, f64), kind: Kind) -> Option<String> {
    match (low.is_finite(), high.is_finite()) {
        (true, true) => Some(format!("{} to {}", show(low, kind), show(high, kind))),
        (true, false) => Some(format!("from {}", show(low, kind))),
        (false, true) => Some(format!("up to {}", show(high, kind))),
        (false, false) => None,
    }
}
