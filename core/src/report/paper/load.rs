//! The load of a year by stream, month and code.

use super::months::months;
use super::{Paper, PaperTable, Sheet, kilograms};

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
            PaperTable { title: "By stream and month, kg".into(), head: HEAD.to_vec(), rows },
            PaperTable {
                title: "By code".into(),
                head: vec!["Code", "kg a year", "Streams"],
                rows: by_code.collect(),
            },
        ],
        foot: Vec::new(),
    }
}
