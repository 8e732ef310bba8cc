//! The finding in words. What falls and what rises are both said; nothing is averaged away.

use super::Difference;
use crate::account::Measure;
use crate::quantity::significant;

/// The figures that a finding speaks of: id, and how the sentence names it. Less of each is better.
pub const HEADLINES: [(&str, &str); 7] = [
    ("waste.total.mass", "waste"),
    ("air.solvents", "solvent to air"),
    ("input.solvent.net", "solvents and gases bought"),
    ("co2.vented", "CO2 vented"),
    ("hazard.air_health", "health-weighted mass to air"),
    ("energy.electricity", "electricity"),
    ("cost.year", "running cost"),
];

/// A change below this share of the larger value is no change.
const SAME: f64 = 0.005;

pub(super) struct Judged {
    pub(super) sentence: String,
    pub(super) better: Vec<String>,
    pub(super) worse: Vec<String>,
}

/// Judges the headline figures; electricity only where both routes state all of it.
pub(super) fn judge(present: &str, other: &str, differences: &[Difference], electricity: bool) -> Judged {
    let (mut falls, mut rises) = (Vec::new(), Vec::new());
    let (mut better, mut worse) = (Vec::new(), Vec::new());
    for (id, name) in HEADLINES {
        if id == "energy.electricity" && !electricity {
            continue;
        }
        let Some(d) = differences.iter().find(|d| d.id == id) else { continue };
        let (Some(before), Some(after)) = (d.present, d.other) else { continue };
        let larger = if before > after { before } else { after };
        if (after - before).abs() <= SAME * larger {
            continue;
        }
        // The weighted mass is listed among what falls or rises, but has no unit that a sentence could carry.
        let spoken = d.measure != Measure::WeightedMass;
        if after < before {
            better.push(name.to_owned());
            if spoken {
                falls.push(clause(name, before, after, d.measure));
            }
        } else {
            worse.push(name.to_owned());
            if spoken {
                rises.push(clause(name, before, after, d.measure));
            }
        }
    }
    let sentence = match (falls.is_empty(), rises.is_empty()) {
        (true, true) => format!("In place of {present}, {other} changes none of the headline figures."),
        (false, true) => format!("In place of {present}, {other} brings {} a year.", list(&falls)),
        (true, false) => format!("In place of {present}, {other} costs {} a year.", list(&rises)),
        (false, false) => format!(
            "In place of {present}, {other} brings {} a year. Against it stand {}.",
            list(&falls),
            list(&rises)
        ),
    };
    Judged { sentence, better, worse }
}

fn clause(name: &str, before: f64, after: f64, measure: Measure) -> String {
    let (after_text, before_text) = (measure.shown(after), measure.shown(before));
    if before <= 0.0 {
        format!("{after_text} of {name} where there was none")
    } else if after <= 0.0 {
        format!("no {name} instead of {before_text}")
    } else if after < before {
        // "100 % less" is only said of nothing at all.
        let percent = (1.0 - after / before) * 100.0;
        let share = if percent < 99.5 { significant(percent, 2) } else { "over 99".to_owned() };
        format!("{after_text} of {name} instead of {before_text} ({share} % less)")
    } else if after < 2.0 * before {
        let share = significant((after / before - 1.0) * 100.0, 2);
        format!("{after_text} of {name} instead of {before_text} ({share} % more)")
    } else {
        format!(
            "{after_text} of {name} instead of {before_text} ({} times as much)",
            significant(after / before, 2)
        )
    }
}

/// "a, b and c".
fn list(items: &[String]) -> String {
    match items {
        [] => String::new(),
        [one] => one.clone(),
        [rest @ .., last] => format!("{} and {last}", rest.join(", ")),
    }
}
