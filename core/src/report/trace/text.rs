//! An opened figure in words and numbers.

use super::super::grid::paragraph;
use super::super::row::MONTHS;
use super::super::words::{amount, cited, visible};
use super::{Entry, Moved, Opened, TracedFigure, working_words};
use crate::account::How;
use crate::quantity::{Kind, Origin, Spread, show, significant};

pub(super) fn text(traced: &TracedFigure<'_>) -> String {
    let mut out = String::new();
    paragraph(&mut out, "", &format!("{}: {}", traced.workload, traced.route));
    opened(&mut out, &traced.opened, "");
    for (name, part) in &traced.parts {
        out.push('\n');
        let words = match *name {
            "over" => "Above the line: ",
            "under" => "Below the line: ",
            _ => "From the volume: ",
        };
        opened(&mut out, part, words);
    }
    if !traced.inputs.is_empty() {
        out.push_str("\nWhat was read for these steps and those before them\n");
    }
    for input in &traced.inputs {
        let spread = match input.spread {
            Spread::Exact => String::new(),
            Spread::Limits { low_si, high_si } => {
                format!(", between {} and {}", show(low_si, input.kind), show(high_si, input.kind))
            }
            Spread::Standard { u_si } => {
                let kind =
                    if input.kind == Kind::Temperature { Kind::TemperatureDifference } else { input.kind };
                format!(", standard uncertainty {}", show(u_si, kind))
            }
        };
        let read = match input.origin {
            Origin::Computed => format!("from {}", input.basis),
            Origin::Entered | Origin::Measured => format!("read from \"{}\"", input.basis),
            Origin::Assumed | Origin::NotKnown => format!("default \"{}\"", input.basis),
        };
        let value = show(input.central_si, input.kind);
        let word = input.origin.word();
        paragraph(&mut out, "  ", &format!("{}: {value}{spread}; {word}, {read}", input.identity));
    }
    out
}

fn opened(out: &mut String, o: &Opened<'_>, before: &str) {
    let (figure, account) = (o.figure, o.account);
    paragraph(out, "", &format!("{before}{} [{}]", figure.title, figure.id));
    let shown = |value: f64| amount(value, figure.measure);
    if figure.measure.extensive() {
        let shared = account.shared(figure, o.value_si);
        let mut line = format!(
            "{} a result, {} a batch, {} a month, {} a year",
            shown(account.per_result(shared)),
            shown(account.per_batch(shared)),
            shown(shared / MONTHS),
            shown(o.value_si)
        );
        if let Some(value) = account.per_kg_product(shared) {
            line.push_str(&format!(", {} a kilogram of product", shown(value)));
        }
        paragraph(out, "  ", &line);
    } else {
        paragraph(out, "  ", &shown(o.value_si));
    }
    paragraph(out, "  ", &format!("Counted: {}", figure.boundary));
    paragraph(out, "  ", &format!("Formula: {} ({})", figure.formula, cited(figure.source)));
    if let How::Containers { of, takes } = figure.how {
        let measure = account.figures.get(of).map_or(figure.measure, |f| f.measure);
        paragraph(out, "  ", &format!("One container takes {}.", amount(takes, measure)));
    }
    let sums = matches!(figure.how, How::Sum(_) | How::Spent(_));
    if sums && o.entries.is_empty() {
        paragraph(out, "  ", "No posting adds to it.");
    }
    for e in &o.entries {
        entry(out, o, e);
    }
}

fn entry(out: &mut String, o: &Opened<'_>, e: &Entry<'_>) {
    let share = if o.value_si > 0.0 {
        format!(" ({} %)", significant(100.0 * e.adds_si / o.value_si, 3))
    } else {
        String::new()
    };
    out.push('\n');
    paragraph(out, "  ", &format!("{} a year{share}: {}", amount(e.adds_si, e.measure), e.what));
    if let Moved::Mass { posting, .. } = &e.moved {
        let measured = if posting.measured { "; measured, in place of what the rule computes" } else { "" };
        let runs = significant(posting.runs_a_year, 4);
        paragraph(
            out,
            "    ",
            &format!("{} a run, {runs} runs a year{measured}", show(posting.kg, Kind::Mass)),
        );
    }
    if let Moved::Utility(spending) = &e.moved {
        let runs = significant(spending.runs_a_year, 4);
        let a_run = amount(spending.amount_si, e.measure);
        paragraph(out, "    ", &format!("{a_run} a run, {runs} runs a year"));
    }
    if let Some(rule) = e.rule {
        paragraph(out, "    ", &format!("Rule {}: {} ({})", rule.name, rule.equation, cited(rule.source)));
    }
    let working: Vec<String> = e.working.iter().map(|n| working_words(n)).collect();
    if !working.is_empty() {
        paragraph(out, "    ", &format!("with {}", visible(&working.join(", "))));
    }
}
