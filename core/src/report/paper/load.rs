//! The load of a year by stream, month and code.

use super::months::months;
use super::{Paper, PaperTable, Sheet, kilograms};
use crate::account::{Pouring, Standing, classified};

const HEAD: [&str; 15] = [
    "Stream",
    "Jan",
    "Feb",
    "Mar",
    "Apr",
    "May",
    "Jun",
    "Jul",
    "Aug",
    "Sep",
    "Oct",
    "Nov",
    "Dec",
    "Year",
    "Containers begun",
];

pub(super) fn paper(sheet: &Sheet<'_>) -> Paper {
    let desk = sheet.desk;
    let mut rows = Vec::new();
    for s in &desk.streams {
        let mut kg = [0.0; 12];
        for line in desk.lines.iter().filter(|l| l.work.is_some_and(|(_, stream)| stream == s.stream)) {
            for (sum, kg) in kg.iter_mut().zip(line.kg) {
                *sum += kg;
            }
        }
        let mut row = months(sheet.name(s), &kg);
        let at = desk.stored.iter().position(|stream| *stream == s.stream);
        row.push(at.map_or_else(String::new, |at| {
            desk.calendar.containers.iter().filter(|c| c.line == at).count().to_string()
        }));
        rows.push(row);
    }
    let mut codes: Vec<(String, f64, String)> = Vec::new();
    for s in &desk.streams {
        for code in s.codes() {
            let kg = s.contents.mass_kg();
            match codes.iter_mut().find(|c| c.0 == code) {
                Some(known) => {
                    known.1 += kg;
                    known.2.push_str(", ");
                    known.2.push_str(sheet.name(s));
                }
                None => codes.push((code.to_owned(), kg, sheet.name(s).to_owned())),
            }
        }
    }
    let by_code = codes.into_iter().map(|(code, kg, streams)| vec![code, kilograms(kg), streams]);
    Paper {
        title: "Load of a year".into(),
        lead: vec![
            "A stream with several codes stands under each of them, so the codes do not add up.".into(),
        ],
        tables: vec![
            PaperTable { title: "By stream and month, kg".into(), head: &HEAD, rows },
            PaperTable {
                title: "By code".into(),
                head: &["Code", "kg a year", "Streams"],
                rows: by_code.collect(),
            },
            alternatives(sheet),
        ],
        foot: Vec::new(),
    }
}

/// Hazardous waste of each route of each workload, and the mix of routes with the least of it. Waste of different workloads adds, so that
/// the least of the site is the least of each.
fn alternatives(sheet: &Sheet<'_>) -> PaperTable {
    let mut rows = Vec::new();
    let (mut present_kg, mut least_kg) = (0.0, 0.0);
    let mut mix: Vec<String> = Vec::new();
    for (work, accounts) in sheet.program.workloads.iter().zip(&sheet.account.workloads) {
        let mut least: Option<(f64, &str)> = None;
        let hazardous = |r: usize| {
            let (route, account) = (work.routes.get(r)?, accounts.routes.get(r)?.as_ref()?);
            let mut kg = 0.0;
            for s in classified(&[Pouring { route, account }], sheet.site) {
                if s.standing() != Standing::NotKnownHazardous {
                    kg += s.contents.mass_kg();
                }
            }
            Some((kg, route.name.as_str()))
        };
        let present = hazardous(work.present);
        for r in 0..work.routes.len() {
            let Some((kg, name)) = hazardous(r) else { continue };
            if least.is_none_or(|(l, _)| kg < l) {
                least = Some((kg, name));
            }
            let change = present.map_or_else(String::new, |(before, _)| kilograms(kg - before));
            rows.push(vec![work.name.clone(), name.to_owned(), kilograms(kg), change]);
        }
        if let (Some((kg, name)), Some((before, _))) = (least, present) {
            present_kg += before;
            least_kg += kg;
            mix.push([work.name.as_str(), ": ", name].concat());
        }
    }
    rows.push(vec![
        "least for the site".into(),
        mix.join("; "),
        kilograms(least_kg),
        kilograms(least_kg - present_kg),
    ]);
    PaperTable {
        title: "Hazardous waste of each route, kg a year".into(),
        head: &["Work", "Route", "kg a year", "Change from present"],
        rows,
    }
}
