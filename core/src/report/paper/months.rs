//! The generation log: what is made month by month, the category, and how many results each month still takes.

use super::{Paper, PaperTable, Sheet, kilograms, mass, rests_on};
use crate::generator::{CATEGORY, MONTH_NAMES};
use crate::quantity::significant;

const HEAD: [&str; 16] = [
    "Source", "Jan", "Feb", "Mar", "Apr", "May", "Jun", "Jul", "Aug", "Sep", "Oct", "Nov", "Dec", "Year",
    "Counts", "Why",
];

/// A row of months with its year.
pub(super) fn months(what: &str, kg: &[f64; 12]) -> Vec<String> {
    let mut year = 0.0;
    let mut out = vec![what.to_owned()];
    for kg in kg {
        year += kg;
        out.push(kilograms(*kg));
    }
    out.push(kilograms(year));
    out
}

pub(super) fn paper(sheet: &Sheet<'_>) -> Paper {
    let desk = sheet.desk;
    let mut rows = Vec::new();
    for line in &desk.lines {
        let mut row = months(&line.what, &line.kg);
        let counts = match (line.counted, line.counts_kg == line.kg) {
            (false, _) => "no",
            (true, true) => "yes",
            (true, false) => "in part",
        };
        row.extend([counts.to_owned(), line.why.to_owned()]);
        rows.push(row);
        if counts == "in part" {
            let mut row = months(&[&line.what, ", of it counted"].concat(), &line.counts_kg);
            row.extend([String::new(), "what goes round, once in each month".to_owned()]);
            rows.push(row);
        }
    }
    let mut total = |what: &str, of: fn(&crate::generator::Made) -> f64| {
        let mut row = months(what, &desk.made.map(|m| of(&m)));
        row.extend([String::new(), String::new()]);
        rows.push(row);
    };
    total("counted", |m| m.kg);
    if desk.made.iter().any(|m| m.acute_kg > 0.0) {
        total("counted, acute", |m| m.acute_kg);
    }
    if let Some(categories) = desk.categories {
        let mut row = vec!["category".to_owned()];
        row.extend(categories.iter().map(|c| c.word().to_owned()));
        row.extend([
            String::new(),
            String::new(),
            "by calendar month and whole site; an average of the year proves nothing".to_owned(),
        ]);
        rows.push(row);
    }
    let mut tables = vec![PaperTable { title: "Made in each month, kg".into(), head: &HEAD, rows }];
    if !desk.headroom.is_empty() {
        tables.push(headroom(sheet));
    }
    let mut lead = Vec::new();
    if desk.categories.is_some() {
        lead.push("Waste counts when it is made, satellite containers included; the kilograms of manifests are another series. Waste of different months must be told apart by its date.".into());
        lead.push("An episodic event (262.230 to 262.233) is no part of normal operation: whether a contract of routine analyses qualifies is a question for the authority.".into());
    }
    let foot = if desk.categories.is_some() { rests_on(&[CATEGORY]) } else { Vec::new() };
    Paper { title: "Waste month by month".into(), lead, tables, foot }
}

fn headroom(sheet: &Sheet<'_>) -> PaperTable {
    let count = |n: Option<u64>| n.map_or_else(String::new, |n| n.to_string());
    let mut rows: Vec<Vec<String>> = Vec::new();
    let mut last = 0;
    for h in &sheet.desk.headroom {
        let name = sheet.program.workloads.get(h.workload).map_or("", |w| w.name.as_str());
        let month = MONTH_NAMES.get(h.month).copied().unwrap_or_default();
        let cells = [significant(h.planned, 4), mass(h.kg_each), count(h.as_vsqg), count(h.as_sqg)];
        // Months that say the same as the one before stand in its row.
        if let Some(row) = rows.last_mut().filter(|r| r[0] == name && r[2..] == cells && last + 1 == h.month)
        {
            let first = row[1].split(' ').next().unwrap_or_default().to_owned();
            row[1] = [first.as_str(), "to", month].join(" ");
        } else {
            rows.push([name.to_owned(), month.to_owned()].into_iter().chain(cells).collect());
        }
        last = h.month;
    }
    PaperTable {
        title: "Results that a month takes before the category rises".into(),
        head: &["Work", "Month", "Planned", "Each adds", "As VSQG at most", "Before LQG at most"],
        rows,
    }
}
