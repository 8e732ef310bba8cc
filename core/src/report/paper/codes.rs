//! Every code held against every stream, with rule, figures and what would change it.

use super::{Paper, PaperTable, Sheet, mass};
use crate::code::Verdict;
use crate::report::words::cited;

/// The headings of a table of verdicts.
pub(super) const HEAD: [&str; 6] = ["Code", "Verdict", "Why", "Figures", "Rule", "What would change it"];

pub(super) fn paper(sheet: &Sheet<'_>) -> Paper {
    let table = |s: &crate::account::StreamDesk<'_>| PaperTable {
        title: [sheet.name(s), ": ", s.standing().words(), ", ", &mass(s.contents.mass_kg()), " a year"]
            .concat(),
        head: &HEAD,
        rows: s.verdicts.iter().map(row).collect(),
    };
    let glance = PaperTable {
        title: "At a glance".into(),
        head: &["Stream", "Standing", "Codes", "Test, do not assume", "Transport", "kg a year"],
        rows: sheet
            .desk
            .streams
            .iter()
            .map(|s| {
                let transport = s.transport().map_or_else(String::new, |v| v.why.to_string());
                let kg = super::kilograms(s.contents.mass_kg());
                vec![
                    sheet.name(s).into(),
                    s.standing().words().into(),
                    s.codes().join(", "),
                    s.open().join(", "),
                    transport,
                    kg,
                ]
            })
            .collect(),
    };
    Paper {
        title: "Waste codes by container".into(),
        lead: vec![
            "By everything poured in; marc, drying agents, filters and disposables inherit from the solvent that wets them.".into(),
        ],
        tables: std::iter::once(glance).chain(sheet.desk.streams.iter().map(table)).collect(),
        foot: Vec::new(),
    }
}

pub(super) fn row(v: &Verdict) -> Vec<String> {
    let mut figures = String::new();
    for fact in &v.facts {
        if !figures.is_empty() {
            figures.push_str("; ");
        }
        figures.push_str(&fact.words());
    }
    let rule = [v.rule.title, ": ", &cited(v.rule.citation()), "; ", &rule_dates(v)].concat();
    vec![v.code.to_string(), v.answer.words().into(), v.why.to_string(), figures, rule, v.change.to_string()]
}

fn rule_dates(v: &Verdict) -> String {
    let dates = v.rule.dates();
    let text = if v.rule.until.is_some() {
        ["in force ", &dates].concat()
    } else {
        ["in force since ", &dates].concat()
    };
    if v.in_force { text } else { [&text, ", not on this date"].concat() }
}
