//! Words and units that several documents share.

use crate::account::Measure;
use crate::chance::Draw;
use crate::material::{FlashPoint, Law, Solubility, Substance, catalogue};
use crate::order::Index;
use crate::plan::Problem;
use crate::program::{Program, WorkloadProgram};
use crate::quantity::{Kind, significant};
use crate::source::{Source, Standing};

/// The SI unit in which an amount of this kind is held.
pub(super) const fn si_unit(kind: Kind) -> &'static str {
    match kind {
        Kind::Mass => "kg",
        Kind::Volume => "m3",
        Kind::Time => "s",
        Kind::Temperature | Kind::TemperatureDifference => "K",
        Kind::Pressure => "Pa",
        Kind::Power => "W",
        Kind::Energy => "J",
        Kind::Fraction | Kind::Count | Kind::Number => "1",
        Kind::Density => "kg/m3",
        Kind::MolarMass => "kg/mol",
        Kind::VolumeFlow => "m3/s",
        Kind::MassFlow => "kg/s",
        Kind::Frequency => "1/s",
        Kind::VolumePerMass => "m3/kg",
        Kind::MassPerMass => "kg/kg",
        Kind::SpecificEnergy => "J/kg",
        Kind::Length => "m",
        Kind::Area => "m2",
        Kind::ClimatePerEnergy => "kg/J",
        Kind::Money => "money",
        Kind::PricePerMass => "money/kg",
        Kind::PricePerVolume => "money/m3",
        Kind::PricePerEnergy => "money/J",
    }
}

/// A source of the materials on a plan's routes.
#[derive(Clone, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub(super) struct Edition {
    pub(super) key: String,
    pub(super) cite: String,
    pub(super) standing: &'static str,
}

/// The sources of the figures that the materials on all routes bring along, by key.
pub(super) fn editions(program: &Program) -> Vec<Edition> {
    let mut keys = Index::default();
    for work in &program.workloads {
        for route in &work.routes {
            for used in &route.materials {
                sources(&used.substance, &mut keys);
            }
        }
    }
    let mut out = Vec::with_capacity(keys.len());
    for (key, _) in keys.iter().filter(|(key, _)| !key.is_empty()) {
        let (cite, standing) = match catalogue().source(key) {
            Some(source) => (source.cite, source.standing),
            // The plan's own words stand for themselves.
            None => (key, Standing::Site),
        };
        out.push(Edition { key: key.to_owned(), cite: cite.to_owned(), standing: standing.words() });
    }
    out
}

/// The sources behind what the accounts ask of a material: density, hazards, and what scores and lists rest on.
fn sources<'s>(s: &'s Substance, keys: &mut Index<'s>) {
    let density = match &s.density {
        Law::NotKnown => "",
        Law::Constant(figure) => &figure.source,
        Law::Equation(equation) => &equation.source,
    };
    let flash = match &s.flash_point_k {
        FlashPoint::Known(figure) => Some(figure),
        FlashPoint::None | FlashPoint::NotKnown => None,
    };
    let solubility = match &s.solubility_in_water {
        Solubility::Limited(figure) => Some(figure),
        Solubility::NotKnown | Solubility::Miscible => None,
    };
    let figures = [
        flash,
        solubility,
        s.boiling_point_k.as_ref(),
        s.autoignition_k.as_ref(),
        s.unit_mass_kg.as_ref(),
        s.water_capacity_kg_kg.as_ref(),
    ];
    for figure in figures.into_iter().flatten() {
        keys.put(&*figure.source, 0);
    }
    for source in [density, &s.hazard.source, &s.rcra.source] {
        keys.put(source, 0);
    }
}

/// An amount for people: four significant digits and a unit that suits its size.
pub(super) fn amount(value_si: f64, measure: Measure) -> String {
    measure.shown(value_si)
}

/// How much work there is, in words.
pub(super) fn work_words(work: &WorkloadProgram) -> String {
    let runs = work.routes.first().and_then(|r| r.work.runs(Draw(&r.central())).ok());
    runs.map_or_else(
        || "no work".to_owned(),
        |runs| {
            let [results, extractions, batches] =
                [runs.results, runs.extractions, runs.batches].map(|n| significant(n, 4));
            format!("{results} results, {extractions} extractions, {batches} batches a year")
        },
    )
}

/// Whether a figure of the account of mass is that of one material alone.
pub(super) fn is_detail(id: &str) -> bool {
    let parts = id.split('.').count();
    let of = |start: &str| id.starts_with(start);
    of("mass.feed.") || of("mass.drawn.") || of("mass.returned.") || of("mass.to.") && parts > 3
}

/// A source with how far it has been traced.
///
/// ```
/// use thimbleworth::{report::cited, source};
/// assert_eq!(cited(source::MASS_BALANCE), "conservation of mass, by definition");
/// assert_eq!(cited(source::FROM_MEMORY), "from memory");
/// ```
#[must_use]
pub fn cited(source: Source) -> String {
    let standing = source.standing.words();
    if standing.contains(source.cite) { standing.to_owned() } else { format!("{}, {standing}", source.cite) }
}

/// A problem on one line: `warning site.streams[0].fill: what was found; what would do`.
///
/// ```
/// use thimbleworth::plan::Problem;
/// use thimbleworth::report::problem_line;
/// let problem = Problem::error("workloads[0].repeats", "\"-3 %\" is below zero", "a share from 0 to 1");
/// assert_eq!(problem_line(&problem), "error workloads[0].repeats: \"-3 %\" is below zero; a share from 0 to 1");
/// ```
#[must_use]
pub fn problem_line(problem: &Problem) -> String {
    let Problem { path, severity, found, need } = problem;
    let space = if path.is_empty() { "" } else { " " };
    let semicolon = if need.is_empty() { "" } else { "; " };
    visible(&format!("{}{space}{path}: {found}{semicolon}{need}", severity.word()))
}

/// Text with every control character, and every character that turns the direction of writing, made visible, so that a
/// name in a plan cannot steer a terminal or look like another name.
///
/// ```
/// use thimbleworth::report::visible;
/// assert_eq!(visible("red\u{1b}[31m"), "red\\u{1b}[31m");
/// assert_eq!(visible("n-hexane 50 %"), "n-hexane 50 %");
/// ```
#[must_use]
pub fn visible(text: &str) -> String {
    let mut out = String::with_capacity(text.len());
    for c in text.chars() {
        if hidden(c) {
            out.extend(c.escape_unicode());
        } else {
            out.push(c);
        }
    }
    out
}

/// Whether a character shows nothing, or changes how others show.
pub(super) fn hidden(c: char) -> bool {
    c.is_control()
        || matches!(c, '\u{200b}'..='\u{200f}' | '\u{2028}'..='\u{202e}' | '\u{2060}'..='\u{2069}' | '\u{feff}')
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn what_steers_a_terminal_is_shown() {
        for (hostile, shown) in [
            ("\u{1b}]0;x\u{7}", "\\u{1b}]0;x\\u{7}"),
            ("a\rb\nc\td\u{8}", "a\\u{d}b\\u{a}c\\u{9}d\\u{8}"),
            ("\u{9b}31m", "\\u{9b}31m"),
            ("\u{202e}exe.fdp", "\\u{202e}exe.fdp"),
            ("Σ µ ° é 水", "Σ µ ° é 水"),
        ] {
            assert_eq!(visible(hostile), shown);
        }
    }
}
