//! How a gas stands in the air of the room through a day of work, beside the limits that hold.

use super::letter::{fit, written};
use super::scale::{Linear, ticks};
use super::shape::{Anchor, Hatch, Shape, Trail, line, text};
use super::{Drawing, Head, Picture, Size, Table};
use thimbleworth::account::{AirAccount, GasInRoom, Held};
use thimbleworth::order;
use thimbleworth::report::by_volume;
use thimbleworth::room::{Course, HOUR_S};

const DAY_H: f64 = 24.0;

/// The course of the gas that comes nearest to one of its limits (or stands highest, where none has a limit); `None` where nothing
/// reaches the room.
#[must_use]
pub fn air_course(key: &str, route: &str, air: &AirAccount) -> Option<Picture> {
    let share = |g: &GasInRoom| g.held.iter().fold(0.0, |most: f64, h| most.max(worst(h) / h.allowed));
    let mut gases: Vec<&GasInRoom> = air.gases.iter().collect();
    order::sort(&mut gases, &|a, b| (share(a), peak(a)) > (share(b), peak(b)));
    let gas = *gases.first()?;
    let limits = limits(gas);
    let shown =
        limits.iter().filter(|(x, _)| *x <= 4.0 * peak(gas)).map(|(x, _)| *x).fold(peak(gas), f64::max);
    let unit = if shown >= 0.01 { ("%", 100.0) } else { ("ppm", 1e6) };
    let mut description = format!("{} comes to {} on a day of work", gas.name, spaced(gas.exposure.peak));
    if let Some((_, on_setback, _)) = &gas.on_setback {
        description += &format!(", to {} where ventilation stays set back", spaced(on_setback.peak));
    }
    let mut notes = vec![
        "Mean of a well-mixed room from the start of the work, as the plan ventilates it; broken line: ventilation set back all the time. A person stands nearer to the source."
            .to_owned(),
    ];
    let beyond: Vec<String> =
        limits.iter().filter(|(x, _)| *x > shown).map(|(x, name)| format!("{name} {}", spaced(*x))).collect();
    if !beyond.is_empty() {
        notes.push(crate::show::unbroken(&format!("Limits above the frame: {}.", beyond.join("; "))));
    }
    Some(Picture {
        key: key.to_owned(),
        title: format!("{route}: {} in the air of the room", gas.name),
        description: description + ".",
        notes,
        tables: vec![hours(gas, unit), limits_table(&limits)],
        wide: draw(gas, &limits, shown, unit, Size::Wide),
        narrow: draw(gas, &limits, shown, unit, Size::Narrow),
    })
}

fn spaced(x: f64) -> String {
    by_volume(x).replace(' ', "\u{a0}")
}

fn worst(h: &Held) -> f64 {
    h.on_setback.map_or(h.found, |x| x.max(h.found))
}

fn peak(g: &GasInRoom) -> f64 {
    g.on_setback.as_ref().map_or(g.exposure.peak, |(_, e, _)| e.peak.max(g.exposure.peak))
}

/// Each level once, the lowest first, with the limits that stand at it.
fn limits(gas: &GasInRoom) -> Vec<(f64, String)> {
    let mut out: Vec<(f64, String)> = Vec::new();
    for h in &gas.held {
        let name = format!("{}, {}", h.limit.jurisdiction.title(), h.limit.kind.title());
        match out.iter_mut().find(|(x, _)| (*x / h.allowed - 1.0).abs() < 1e-3) {
            Some((_, names)) => *names += &format!("; {name}"),
            None => out.push((h.allowed, name)),
        }
    }
    order::sort(&mut out, &|a, b| a.0 < b.0);
    out
}

fn hours(gas: &GasInRoom, unit: (&str, f64)) -> Table {
    let mut head =
        vec![Head::words("Hours from the start"), Head::number(&format!("As ventilated ({})", unit.0))];
    if gas.on_setback.is_some() {
        head.push(Head::number(&format!("On setback ({})", unit.0)));
    }
    let cell = |c: &Course, h: f64| match c.at(h * HOUR_S) {
        x if x > 0.0 && x < 1e-9 => spaced(x),
        x => written(x * unit.1, 3),
    };
    let mut rows: Vec<Vec<String>> = (0..=12_u32)
        .map(|i| f64::from(2 * i))
        .map(|h| {
            let mut row = vec![written(h, 3), cell(&gas.course, h)];
            row.extend(gas.on_setback.as_ref().map(|(c, ..)| cell(c, h)));
            row
        })
        .collect();
    // The figure of the heading, which may stand between two hours.
    let mut highest = vec!["Highest of the day".to_owned(), spaced(gas.exposure.peak)];
    highest.extend(gas.on_setback.as_ref().map(|(_, e, _)| spaced(e.peak)));
    rows.push(highest);
    Table { caption: format!("{} in the air of the room", gas.name), head, rows }
}

fn limits_table(limits: &[(f64, String)]) -> Table {
    Table {
        caption: "Limits that hold".into(),
        head: vec![Head::words("Limit"), Head::number("Allows")],
        rows: limits.iter().map(|(x, name)| vec![name.clone(), spaced(*x)]).collect(),
    }
}

fn draw(gas: &GasInRoom, limits: &[(f64, String)], shown: f64, unit: (&str, f64), size: Size) -> Drawing {
    let (width, type_size) = (size.width(), size.text());
    let height = if size.narrow() { 220.0 } else { 280.0 };
    let (left, right, top, bottom) = (46.0, width - 14.0, 30.0, height - 42.0);
    let high = shown * 1.15;
    let x = Linear::new((0.0, DAY_H), (left, right));
    let y = Linear::new((0.0, high), (bottom, top));
    let mut shapes = vec![
        text((0.0, 12.0), Anchor::Start, type_size, "soft", unit.0),
        text((right, bottom + 36.0), Anchor::End, type_size, "soft", "hours from the start of the work"),
        line((left, bottom), (right, bottom), "axis"),
    ];
    for h in ticks(0.0, DAY_H, if size.narrow() { 4 } else { 7 }) {
        shapes.push(text((x.at(h), bottom + 18.0), Anchor::Middle, type_size, "scale", written(h, 3)));
    }
    for v in ticks(0.0, high * unit.1, 5) {
        let at = y.at(v / unit.1);
        shapes.push(line((left, at), (right, at), "rule"));
        shapes.push(text(
            (left - 6.0, at + type_size * 0.35),
            Anchor::End,
            type_size,
            "scale",
            written(v, 3),
        ));
    }
    let mut last = bottom;
    for (level, name) in limits.iter().filter(|(level, _)| *level <= shown) {
        let at = y.at(*level);
        shapes.push(line((left, at), (right, at), "margin"));
        // A name stands above its line, where it has room below the one before.
        if last - at > type_size * 1.4 {
            let words = fit(&format!("{} {name}", spaced(*level)), right - left - 4.0, type_size);
            shapes.push(text((right, at - 4.0), Anchor::End, type_size, "soft", words));
            last = at;
        }
    }
    if let Some((course, ..)) = &gas.on_setback {
        shapes.push(Shape::Path { d: trail(course, &x, &y), class: "course back", hatch: Hatch::No });
    }
    shapes.push(Shape::Path { d: trail(&gas.course, &x, &y), class: "course", hatch: Hatch::No });
    Drawing { width, height, shapes }
}

/// Every ten minutes, and on both sides of each change, where a puff may stand.
fn trail(course: &Course, x: &Linear, y: &Linear) -> Trail {
    let mut times: Vec<f64> = (0..=144_u32).map(|i| f64::from(i) * 600.0).collect();
    times.extend(course.changes_s().flat_map(|t| [t - 1e-3, t]).filter(|t| *t > 0.0 && *t < DAY_H * HOUR_S));
    order::sort(&mut times, &|a, b| a < b);
    let points: Vec<(f64, f64)> = times.iter().map(|t| (x.at(t / HOUR_S), y.at(course.at(*t)))).collect();
    Trail::through(&points)
}
