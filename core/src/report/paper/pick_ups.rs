//! The pick-up calendar: when containers are full, by when they must go, when they go.

use super::{Paper, PaperTable, Sheet, kilograms, mass, rests_on, volume};
use crate::generator::{Clock, SATELLITE_DAYS, SATELLITE_M3, STORAGE, date_of};
use crate::quantity::{Kind, show};

pub(super) fn paper(sheet: &Sheet<'_>) -> Paper {
    let (desk, calendar) = (sheet.desk, &sheet.desk.calendar);
    let line = |i: usize| desk.calendar_lines.get(i);
    let pick_ups =
        calendar.pick_ups.iter().map(|p| vec![date_of(p.day), p.containers.to_string(), kilograms(p.kg)]);
    let date = |day: Option<u16>| {
        day.map_or_else(String::new, |d| if d > 364 { "next year".into() } else { date_of(d) })
    };
    let containers = calendar.containers.iter().map(|c| {
        let stayed = c.from.zip(c.collected).map_or_else(String::new, |(from, to)| (to - from).to_string());
        vec![
            line(c.line).map_or_else(String::new, |l| l.name.clone()),
            date_of(c.opened),
            date(c.closed),
            date(c.from),
            date(c.until),
            c.collected.map_or_else(|| "on hand".to_owned(), |d| date(Some(d))),
            stayed,
            volume(c.m3),
        ]
    });
    let mut lead = vec![match sheet.site.waste.pick_up_every_s {
        Some(s) => ["Picked up every ", &show(s, Kind::Time), ": full containers, and those that could not wait for the next time."].concat(),
        None => "As few pick-ups as keep every limit: each on the last day on which something may stay; part-full containers whose time is running go along.".to_owned(),
    }];
    let limits = desk.storage.days.iter().flatten().fold(None, |least: Option<u16>, d| match least {
        Some(l) if l <= *d => Some(l),
        _ => Some(*d),
    });
    lead.push(match limits {
        Some(days) => ["Shortest storage in any month: ", &days.to_string(), " days."].concat(),
        None => "No limit of time holds: name one under site.storage_limit where nation or permit set it."
            .to_owned(),
    });
    if desk.calendar_lines.iter().any(|l| l.clock == Clock::WhenFull) {
        lead.push("Satellite containers count from full, and move within three days; at most 55 gal in one area, all streams together.".into());
        let open: f64 = desk
            .calendar_lines
            .iter()
            .filter(|l| l.clock == Clock::WhenFull)
            .fold(0.0, |s, l| s + l.takes_m3);
        if open > SATELLITE_M3 {
            lead.push(
                [
                    "Together they may reach ",
                    &volume(open),
                    ": more than one satellite area may hold. All of them are taken as one area.",
                ]
                .concat(),
            );
        }
        if !calendar.excess.is_empty() {
            lead.push([&calendar.excess.len().to_string(), " containers leave the area part-full, because it holds more than 55 gal: the day is marked on them, and they are gone from it three days later at the latest."].concat());
        }
    }
    for (days, what) in [
        (calendar.too_long.len(), " containers stay longer than allowed."),
        (calendar.too_much.len(), " days end with more on site than allowed."),
    ] {
        if days > 0 {
            lead.push(["Breach: ", &days.to_string(), what].concat());
        }
    }
    let most = calendar.on_hand_kg.iter().fold(0.0, |most, kg| if *kg > most { *kg } else { most });
    lead.push(
        [
            &calendar.pick_ups.len().to_string(),
            " pick-ups, ",
            &calendar.containers.len().to_string(),
            " containers begun; at most ",
            &mass(most),
            " on hand.",
        ]
        .concat(),
    );
    for s in desk.streams.iter().filter(|s| !desk.stored.contains(&s.stream)) {
        lead.push(
            [sheet.name(s), " is not in it: no container size, or treated or reclaimed at once."].concat(),
        );
    }
    let mut foot = vec!["The year begins empty and has 365 days; what a month brings comes in equal parts on each of its days. Other waste of the site is not stored here.".to_owned()];
    if desk.categories.is_some() {
        foot.extend(rests_on(&[STORAGE, crate::generator::SATELLITE]));
    }
    let mut tables = Vec::new();
    if !calendar.excess.is_empty() {
        let rows = calendar.excess.iter().filter_map(|(day, at)| {
            let c = calendar.containers.get(*at)?;
            Some(vec![
                line(c.line)?.name.clone(),
                date_of(*day),
                date(Some(day + SATELLITE_DAYS)),
                volume(c.m3),
            ])
        });
        tables.push(PaperTable {
            title: "More than 55 gal in the satellite area".into(),
            head: &["Stream", "Marked", "Gone by", "Holds"],
            rows: rows.collect(),
        });
    }
    Paper {
        title: "Pick-up calendar".into(),
        lead,
        tables: [
            vec![
                PaperTable {
                    title: "Pick-ups".into(),
                    head: &["Date", "Containers", "kg"],
                    rows: pick_ups.collect(),
                },
                PaperTable {
                    title: "Containers".into(),
                    head: &[
                        "Stream",
                        "First drop",
                        "Full",
                        "Time counts from",
                        "Must go by",
                        "Goes",
                        "Days",
                        "Holds",
                    ],
                    rows: containers.collect(),
                },
            ],
            tables,
        ]
        .concat(),
        foot,
    }
}
