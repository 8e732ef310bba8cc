//! What stands on the form of a step: made of the technique's own declarations, without the document object model.
use crate::edit::step_field;
use crate::reckon::Book;
use thimbleworth::ledger::{Place, RuleIx, StepIx};
use thimbleworth::letter;
use thimbleworth::plan::{Field, Plan, Problem, Severity, Step, below};
use thimbleworth::quantity::{Entry, Kind, read_entry, show, units_of};
use thimbleworth::source::{SITE, Source, Standing};
use thimbleworth::step::{Control, Measurable, Need, Param, Technique};

/// The most units that a label lists.
const UNITS_LISTED: usize = 3;

/// Whether a parameter has a meaning on this step: one that hangs on another's choice only where that choice is made.
#[must_use]
pub fn applies(technique: &Technique, step: &Step, param: &Param) -> bool {
    let Some((on, values)) = param.shown_when else { return true };
    let word = match (step_field(step, on), technique.params.iter().find(|q| q.key == on).map(|d| d.need)) {
        (Some(Field::Text(word)), _) => word.as_str(),
        (None, Some(Need::Default(word, _))) => word,
        _ => "",
    };
    values.contains(&word)
}

/// The units that a label names: "mL, L, m³".
#[must_use]
pub fn units(kind: Kind) -> String {
    let mut out: Vec<&str> = Vec::new();
    for example in kind.examples() {
        if let Some((_, unit)) = example.split_once(' ')
            && unit.starts_with(|c: char| c.is_alphabetic() || "°%/µ".contains(c))
            && !out.contains(&unit)
        {
            out.push(unit);
        }
    }
    for unit in units_of(kind) {
        if out.len() < UNITS_LISTED && !out.contains(unit) && !kind.is_plain() && !kind.is_money() {
            out.push(unit);
        }
    }
    out.join(", ")
}

/// What is behind a value as text.
#[must_use]
pub fn text_of(field: Option<&Field>) -> String {
    match field {
        Some(Field::Text(text) | Field::Number(text)) => text.clone(),
        Some(Field::YesNo(true)) => "true".to_owned(),
        Some(Field::YesNo(false)) => "false".to_owned(),
        Some(Field::Rows(_)) | None => String::new(),
    }
}

/// The rows behind a value; a single name is a row of its own with the whole share.
#[must_use]
pub fn rows_of(field: Option<&Field>) -> Vec<(String, String)> {
    match field {
        Some(Field::Rows(rows)) => rows.clone(),
        Some(Field::Text(name) | Field::Number(name)) => vec![(name.clone(), "100 %".to_owned())],
        Some(Field::YesNo(_)) | None => Vec::new(),
    }
}

/// A declared value in words: `true` is "yes".
#[must_use]
pub fn word(text: &str) -> &str {
    match text {
        "true" => "yes",
        "false" => "no",
        other => other,
    }
}

/// A source with how far it has been traced; where the one says the other, once.
#[must_use]
pub fn cited(source: &Source) -> String {
    let standing = source.standing.words();
    if source.cite == "definition" {
        return standing.to_owned();
    }
    if source.cite == standing || matches!(source.standing, Standing::Definition) {
        source.cite.to_owned()
    } else {
        format!("{} ({standing})", source.cite)
    }
}

/// What stands in place of a value that is left out.
#[must_use]
pub fn left_out(need: Need) -> String {
    match need {
        Need::Required => String::new(),
        Need::Optional => "Left out.".to_owned(),
        Need::Default(text, source) => format!("{} is assumed: {}.", word(text), cited(&source)),
    }
}

/// What was understood of an amount, or what stands in its place; nothing where it cannot be read.
#[must_use]
pub fn understood(text: &str, kind: Kind, need: Need) -> String {
    if text.trim().is_empty() {
        return left_out(need);
    }
    match read_entry(text, kind) {
        Ok(Entry::Known(amount)) => format!("Read as {}.", amount.understood()),
        Ok(Entry::NotKnown) => match need {
            Need::Default(default, source) => {
                format!("Not known: {default} stands in for it, {}.", cited(&source))
            }
            Need::Required | Need::Optional => "Not known.".to_owned(),
        },
        Err(_) => String::new(),
    }
}

/// The usual range and where it comes from.
#[must_use]
pub fn margin(param: &Param) -> String {
    let kind = match param.control {
        Control::Quantity(kind) | Control::PerMaterial(kind) => kind,
        Control::Count => Kind::Count,
        _ => return String::new(),
    };
    let (low, high) = param.usual;
    let range = match (low.is_finite(), high.is_finite()) {
        (true, true) => format!("Usual: {} to {}", show(low, kind), show(high, kind)),
        (true, false) => format!("Usual: {} or more", show(low, kind)),
        (false, true) => format!("Usual: {} or less", show(high, kind)),
        (false, false) => match param.physical {
            (low, high) if low.is_finite() && high.is_finite() => {
                format!("Possible: {} to {}", show(low, kind), show(high, kind))
            }
            _ => return String::new(),
        },
    };
    if param.source == SITE { format!("{range}.") } else { format!("{range}; {}.", cited(&param.source)) }
}

/// The problem at a field, or at one of the rows in it: the worst.
#[must_use]
pub fn problem_at<'a>(problems: &'a [Problem], path: &str) -> Option<&'a Problem> {
    problems
        .iter()
        .filter(|p| p.severity != Severity::Note)
        .filter(|p| {
            p.path.strip_prefix(path).is_some_and(|rest| rest.is_empty() || rest.starts_with(['.', '[']))
        })
        .min_by_key(|p| (p.severity, p.path.len()))
}

/// A problem as sentences.
#[must_use]
pub fn sentence(problem: &Problem) -> String {
    let mut out = letter::sentence(&problem.found);
    if !problem.need.is_empty() {
        out = format!("{out}. {}", letter::sentence(&problem.need));
    }
    if out.ends_with(['.', '?', '!']) { out } else { format!("{out}.") }
}

/// Where mass may go: the site's streams, then the book's own places.
#[must_use]
pub fn places(plan: &Plan) -> Vec<String> {
    let own = Place::OUTSIDE.into_iter().filter(|p| *p != Place::FEED).chain(Place::BENCH);
    let streams = plan.site.streams.iter().map(|s| s.name.clone());
    streams.chain(own.filter_map(Place::name).map(str::to_owned)).collect()
}

/// A rule of a step that a measurement may replace, with what was computed.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct MeasuredLine {
    /// The name of the rule.
    pub rule: &'static str,
    /// The path of the measured figure.
    pub path: String,
    /// What the plan gives.
    pub value: String,
    /// What was computed, and by which rule.
    pub computed: String,
}

/// The measured figures that a step may carry.
#[must_use]
pub fn measured_lines(
    technique: &'static Technique,
    step: &Step,
    path: &str,
    book: &Book,
    at: (usize, usize, usize),
) -> Vec<MeasuredLine> {
    let under = below(path, "measured");
    let open = technique.rules.iter().enumerate().filter(|(_, r)| r.measurable != Measurable::No);
    open.map(|(i, rule)| {
        let value =
            step.measured.iter().find(|(k, _)| k == rule.name).map_or(String::new(), |(_, v)| v.clone());
        let kind = if rule.measurable == Measurable::Energy { Kind::Energy } else { Kind::Mass };
        let computed = computed_si(book, at, i).map_or_else(
            || "Not computed yet.".to_owned(),
            |si| {
                let beside = if value.trim().is_empty() { "Computed" } else { "Computed in its place" };
                format!("{beside}: {} a run, by {}.", show(si, kind), rule.equation)
            },
        );
        MeasuredLine { rule: rule.name, path: below(&under, rule.name), value, computed }
    })
    .collect()
}

/// What a rule moves or spends in one run of a step by its own equation; kg or J.
fn computed_si(book: &Book, (w, r, s): (usize, usize, usize), rule: usize) -> Option<f64> {
    let (_, account) = book.route(w, r)?;
    let (step, rule) = (StepIx::Step(u16::try_from(s).ok()?), RuleIx(u8::try_from(rule).ok()?));
    let mut notes = account.trace.working(step, rule).filter(|n| n.symbol == "computed in its place");
    if let Some(note) = notes.next() {
        return Some(note.value_si);
    }
    let mut found = None;
    for posting in account.trace.postings.iter().filter(|p| p.step == step && p.rule == rule) {
        found = Some(found.unwrap_or(0.0) + posting.kg);
    }
    for spending in account.trace.spendings.iter().filter(|s| s.step == step && s.rule == rule) {
        found = Some(found.unwrap_or(0.0) + spending.amount_si);
    }
    found
}

/// A step in one line: what is entered, as label and value.
#[must_use]
pub fn summary(technique: Option<&Technique>, step: &Step) -> Vec<(String, String)> {
    let mut out = Vec::new();
    for (key, field) in &step.fields {
        let label = technique
            .and_then(|t| t.params.iter().find(|p| p.key == key))
            .map_or_else(|| key.clone(), |p| p.label.to_owned());
        let value = match field {
            Field::Rows(rows) => {
                let rows: Vec<String> =
                    rows.iter().map(|(name, amount)| format!("{name} {amount}")).collect();
                rows.join(", ")
            }
            other => word(&text_of(Some(other))).to_owned(),
        };
        out.push((label, crate::show::unbroken(&value)));
    }
    for (rule, value) in &step.measured {
        out.push((format!("measured {rule}"), crate::show::unbroken(value)));
    }
    if let Some(note) = &step.note {
        out.push(("note".to_owned(), note.clone()));
    }
    out
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::edit::new_step;
    use thimbleworth::step::{TECHNIQUES, technique};

    #[test]
    fn a_label_names_units_that_can_be_read() {
        assert_eq!(units(Kind::Volume).split(", ").next(), Some("mL"));
        assert_eq!(units(Kind::Fraction), "%");
        assert_eq!(units(Kind::Count), "");
        for kind in Kind::ALL.into_iter().filter(|k| !k.is_plain() && !k.is_money()) {
            let units = units(kind);
            assert!(!units.is_empty(), "{kind:?}");
            for unit in units.split(", ") {
                assert!(thimbleworth::quantity::unit(unit, kind).is_ok(), "{kind:?} {unit}");
            }
        }
    }

    #[test]
    fn what_was_understood_is_said_or_what_stands_in_its_place() {
        let default = Need::Default("5 %", thimbleworth::source::FROM_MEMORY);
        assert_eq!(understood("", Kind::Fraction, default), "5 % is assumed: from memory.");
        assert_eq!(
            understood("not known", Kind::Fraction, default),
            "Not known: 5 % stands in for it, from memory."
        );
        assert_eq!(understood("250mL", Kind::Volume, Need::Required), "Read as 250 mL.");
        assert_eq!(understood("0.25 l", Kind::Volume, Need::Required), "Read as 250 mL.");
        assert_eq!(understood("250 m", Kind::Volume, Need::Required), "");
        assert_eq!(understood(" ", Kind::Volume, Need::Optional), "Left out.");
    }

    #[test]
    fn a_parameter_shows_only_where_it_has_a_meaning() {
        let supercritical = technique("supercritical").expect("a technique");
        let leak = supercritical.params.iter().find(|p| p.key == "leak").expect("a parameter");
        let mut step = new_step("supercritical").expect("a step");
        assert!(!applies(supercritical, &step, leak), "vented is the default");
        step.fields.push(("circuit".into(), Field::Text("recycled".into())));
        assert!(applies(supercritical, &step, leak));
    }

    #[test]
    fn every_parameter_of_every_technique_can_be_drawn() {
        for technique in TECHNIQUES {
            for param in technique.params {
                assert!(
                    !param.label.is_empty() && param.label.starts_with(char::is_uppercase),
                    "{}",
                    param.label
                );
                let quantity = matches!(param.control, Control::Quantity(kind) if !kind.is_plain());
                if let (Control::Quantity(kind), true) = (param.control, quantity) {
                    assert!(!units(kind).is_empty(), "{}: no unit in the label", param.key);
                }
                let margin = margin(param);
                assert!(!margin.contains("NaN") && !margin.contains("inf"), "{margin}");
            }
        }
    }

    #[test]
    fn a_problem_is_said_in_sentences() {
        let problem = Problem::error(
            "x",
            "\"300 m\": a length where a volume should stand",
            "a volume, such as \"250 mL\"",
        );
        assert_eq!(
            sentence(&problem),
            "\"300 m\": a length where a volume should stand. A volume, such as \"250 mL\"."
        );
    }

    #[test]
    fn a_problem_in_a_row_shows_at_its_field() {
        let problems =
            [Problem::error("a.solvent[\"2-propanol\"]", "x", "y"), Problem::warning("a.solvent", "z", "")];
        assert_eq!(problem_at(&problems, "a.solvent").map(|p| p.found.as_str()), Some("x"));
        assert_eq!(problem_at(&problems, "a.solv"), None);
    }
}
