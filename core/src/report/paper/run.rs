//! The waste report of one run: what one batch and one result leave, by route and stream.

use super::{Paper, PaperTable, Sheet, mass, percent, volume};
use crate::account::{Group, Pouring, classified};
use crate::code::CAUTION;

pub(super) fn paper(sheet: &Sheet<'_>) -> Paper {
    let mut tables = Vec::new();
    for (work, pouring) in sheet.program.workloads.iter().zip(&sheet.desk.routes) {
        if let Some(pouring) = pouring {
            streams(sheet, &work.name, pouring, &mut tables);
            elsewhere(&work.name, pouring, &mut tables);
        }
    }
    Paper {
        title: "Waste of one batch".into(),
        lead: vec!["For whoever does the work: what a batch and a reported result leave, controls and repeats counted in.".into()],
        tables,
        foot: vec![["Codes of one route by itself; the container's own paper counts what others pour in. ", CAUTION].concat()],
    }
}

fn streams(sheet: &Sheet<'_>, work: &str, pouring: &Pouring<'_>, tables: &mut Vec<PaperTable>) {
    let per = |a_year: f64| {
        [mass(pouring.account.per_batch(a_year)), mass(pouring.account.per_result(a_year)), mass(a_year)]
    };
    for s in classified(&[*pouring], sheet.site) {
        let kg = s.contents.mass_kg();
        let mut rows = Vec::new();
        for p in &s.contents.parts {
            let [batch, result, year] = per(p.kg);
            rows.push(vec![p.substance.name.to_string(), batch, result, year, percent(p.kg / kg)]);
        }
        let [batch, result, year] = per(kg);
        rows.push(vec!["all of it".into(), batch, result, year, String::new()]);
        if s.contents.volume_m3() > 0.0 && !s.contents.solid {
            let m3 = s.contents.volume_m3();
            let account = pouring.account;
            rows.push(vec![
                "volume of its liquids".into(),
                volume(account.per_batch(m3)),
                volume(account.per_result(m3)),
                volume(m3),
                String::new(),
            ]);
        }
        let (codes, open) = (s.codes().join(" "), s.open().join(" "));
        let mut title = [work, ", ", &pouring.route.name, ": ", sheet.name(&s)].concat();
        for (what, codes) in [("; codes ", codes), ("; test ", open)] {
            if !codes.is_empty() {
                title.push_str(what);
                title.push_str(&codes);
            }
        }
        tables.push(PaperTable {
            title,
            head: &["Material", "In a batch", "For a result", "In a year", "Share by mass"],
            rows,
        });
    }
}

/// Where else mass goes: air, drain, what is destroyed or leaves by other ways.
fn elsewhere(work: &str, pouring: &Pouring<'_>, tables: &mut Vec<PaperTable>) {
    let account = pouring.account;
    let mut rows = Vec::new();
    for (figure, a_year) in account.figures.iter().zip(&account.values) {
        let place = figure.id.strip_prefix("mass.to.").unwrap_or("");
        if figure.group == Group::Mass && ["hood", "room", "drain", "destroyed", "elsewhere"].contains(&place)
        {
            let per = [account.per_batch(*a_year), account.per_result(*a_year), *a_year].map(mass);
            rows.push(std::iter::once(figure.title.clone()).chain(per).collect());
        }
    }
    if !rows.is_empty() {
        let head = &["Place", "In a batch", "For a result", "In a year"];
        tables.push(PaperTable {
            title: [work, ", ", &pouring.route.name, ": elsewhere"].concat(),
            head,
            rows,
        });
    }
}
