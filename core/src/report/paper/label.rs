//! The label of each container: words that the rules ask for, the rest left to be written in.

use super::{Paper, PaperTable, Sheet, mass, rests_on, volume};
use crate::account::StreamDesk;
use crate::code::Rules;
use crate::hazard::{LABEL_SIZE, label, label_size_mm};
use crate::order;
use crate::source::{Source, Standing};

/// Below this share a substance does not stand on a label; our own.
const NAMED: f64 = 0.01;
/// A line to write on.
const BLANK: &str = "__________";

const US: [Source; 3] = [
    Source::new("40 CFR 262.15(a)(5), satellite label", Standing::FromMemory),
    Source::new("40 CFR 262.16(b)(6), 262.17(a)(5), label of central accumulation", Standing::FromMemory),
    Source::new("40 CFR 262.32; 49 CFR 172.301, marking before transport", Standing::FromMemory),
];
const EU: [Source; 2] = [
    Source::new("Directive 2008/98/EC Article 19, labelling of hazardous waste", Standing::FromMemory),
    Source::new("ADR 2025 5.2, marking and labelling of packages", Standing::FromMemory),
];

/// Where the marks of transport stand, whose letters have a size of their own.
const MARKS: Source = Source::new(
    "49 CFR 172.301(a)(1), letters of 12 mm, 6 mm up to 30 L; 49 CFR 172.407, diamonds of 100 mm",
    Standing::FromMemory,
);

pub(super) fn paper(sheet: &Sheet<'_>) -> Paper {
    let us = sheet.rules() == Rules::Us;
    let mut tables: Vec<PaperTable> = sheet.desk.streams.iter().map(|s| one(sheet, s, us)).collect();
    let mut lead = vec![
        "One table a container. Lines are filled in by hand; diamonds of transport are labels of their own."
            .to_owned(),
    ];
    let mut foot = rests_on(if us { &US } else { &EU });
    if us {
        foot.extend(rests_on(&[MARKS]));
    } else {
        lead.push("The sizes at the end are the least of the Union's rules for chemicals on the market; waste is not bound by them, and they are taken as a measure. Pictograms are put on.".to_owned());
        foot.extend(rests_on(&[LABEL_SIZE]));
        tables.push(sizes(sheet));
    }
    Paper { title: "Container labels".into(), lead, tables, foot }
}

/// The least size for each container.
fn sizes(sheet: &Sheet<'_>) -> PaperTable {
    let mut rows = Vec::new();
    for s in &sheet.desk.streams {
        let Some(m3) = sheet.stream(s).and_then(|u| u.container_m3) else { continue };
        let ([short, long], side) = label_size_mm(m3);
        let by = |a: u16, b: u16| [&a.to_string(), " × ", &b.to_string()].concat();
        rows.push(vec![sheet.name(s).to_owned(), volume(m3), by(short, long), by(side, side)]);
    }
    PaperTable {
        title: "Least sizes".into(),
        head: &["Container", "Holds", "Label, mm", "Each pictogram, mm"],
        rows,
    }
}

fn one(sheet: &Sheet<'_>, s: &StreamDesk<'_>, us: bool) -> PaperTable {
    let stream = sheet.stream(s);
    let satellite = us && stream.is_some_and(|u| u.waste.satellite);
    let mut rows: Vec<Vec<String>> = Vec::new();
    let mut put = |what: &str, text: String| {
        if !text.is_empty() {
            rows.push(vec![what.to_owned(), text]);
        }
    };
    let kg = s.contents.mass_kg();
    let mut parts: Vec<_> = s.contents.parts.iter().filter(|p| p.kg / kg >= NAMED).collect();
    order::sort(&mut parts, &|a, b| a.kg > b.kg);
    let contents: Vec<String> =
        parts.iter().map(|p| [&*p.substance.name, " ", &super::percent(p.kg / kg)].concat()).collect();
    let plain = s.standing() == crate::account::Standing::NotKnownHazardous;
    put("", if plain { "WASTE" } else { "HAZARDOUS WASTE" }.to_owned());
    put("Contents", contents.join(", "));
    put("Hazards", hazards(s, us));
    if !us {
        let statements: Vec<&str> =
            parts.iter().flat_map(|p| p.substance.hazard.statements.iter().map(String::as_str)).collect();
        let label = label(&statements);
        let mut codes: Vec<&str> = statements;
        order::sort(&mut codes, &|a, b| a < b);
        codes.dedup();
        let pictograms: Vec<&str> = label.pictograms.iter().map(|p| p.code()).collect();
        put("Signal word, pictograms", [label.signal_word.word(), " ", &pictograms.join(" ")].concat());
        put("Statements of its substances", codes.join(" "));
    }
    put(if us { "Codes before transport" } else { "Codes" }, s.codes().join(" "));
    put("Open until tested", s.open().join(" "));
    if let Some(v) = s.transport() {
        put("Transport", v.why.to_string());
    }
    if us {
        put("Reportable quantity", reportable(sheet, s));
    }
    put(
        "Site",
        [sheet.site.name.as_str(), if us { ", EPA ID " } else { ", producer number " }, BLANK].concat(),
    );
    put(if satellite { "Full since (move within three days)" } else { "First drop on" }, BLANK.into());
    if us {
        put("Manifest tracking number", BLANK.into());
    }
    let size =
        stream.and_then(|u| u.container_m3).map_or_else(String::new, |m3| [", ", &volume(m3)].concat());
    PaperTable { title: [sheet.name(s), &size].concat(), head: &["", ""], rows }
}

/// The hazards in words.
fn hazards(s: &StreamDesk<'_>, us: bool) -> String {
    if !us {
        let named = s.verdicts.iter().filter(|v| v.applies() && v.rule.code.starts_with("HP"));
        return named.map(|v| [v.rule.code, " ", v.rule.title].concat()).collect::<Vec<_>>().join(", ");
    }
    let mut words: Vec<&str> = Vec::new();
    for v in s.verdicts.iter().filter(|v| v.applies() || v.open()) {
        let word = match v.rule.key {
            "ignitable" | "F003" => "ignitable",
            "corrosive" => "corrosive",
            "reactive" => "reactive",
            "toxic" | "F001" | "F002" | "F004" | "F005" | "unused" => "toxic",
            _ => continue,
        };
        if !words.contains(&word) {
            words.push(word);
        }
    }
    words.join(", ")
}

/// Whether a full container reaches a reportable quantity of its codes.
fn reportable(sheet: &Sheet<'_>, s: &StreamDesk<'_>) -> String {
    let Some(kg) = sheet.container_kg(s) else { return String::new() };
    // 1 lb = 0.45359237 kg
    let pounds = kg / 0.453_592_37;
    let reached =
        s.verdicts.iter().filter(|v| v.applies() && v.rule.reportable_lb.is_some_and(|rq| pounds >= rq));
    let codes: Vec<&str> = reached.map(|v| &*v.code).collect();
    if codes.is_empty() {
        String::new()
    } else {
        ["RQ mark when full (", &mass(kg), "): ", &codes.join(" "), " (40 CFR 302.4, from memory)"].concat()
    }
}
