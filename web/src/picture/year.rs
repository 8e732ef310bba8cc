//! The year of a site's waste: what lies there day by day as it fills and is collected, and what each stream brings month by month.

use super::books::{few, mass, mass_unit, mass_with_unit};
use super::letter::{fit, text_width};
use super::scale::{Linear, ticks};
use super::shape::{Anchor, Hatch, Shape, Trail, line, text};
use super::{Drawing, Head, Picture, Size, Table};
use thimbleworth::account::{Account, SiteDesk};
use thimbleworth::generator::{MONTH_NAMES, MONTHS, date_of};

type Unit = (&'static str, f64);

/// What lies on site through the year, against the limits; `None` where nothing is stored in containers.
#[must_use]
pub fn stock(key: &str, desk: &SiteDesk<'_>) -> Option<Picture> {
    let calendar = &desk.calendar;
    let (day, most) = calendar
        .on_hand_kg
        .iter()
        .copied()
        .enumerate()
        .max_by(|a, b| a.1.total_cmp(&b.1).then(b.0.cmp(&a.0)))?;
    if most <= 0.0 {
        return None;
    }
    let unit = mass_unit(most);
    let mut rows: Vec<(u16, Vec<String>)> = calendar
        .pick_ups
        .iter()
        .map(|p| {
            (p.day, vec![date_of(p.day), format!("pick-up of {} containers", p.containers), mass(p.kg, unit)])
        })
        .collect();
    let mut end = 0;
    for (m, days) in MONTHS.into_iter().enumerate() {
        end += days;
        let kg = calendar.on_hand_kg.get(usize::from(end) - 1).copied().unwrap_or(0.0);
        rows.push((
            end - 1,
            vec![date_of(end - 1), "on hand at the end of the month".to_owned(), mass(kg, unit)],
        ));
        if let Some(limit) = desk.storage.kg.get(m).copied().flatten() {
            rows.push((
                end - 1,
                vec![date_of(end - 1), "most that may be on hand".to_owned(), mass(limit, unit)],
            ));
        }
    }
    let day = u16::try_from(day).unwrap_or(0);
    rows.push((day, vec![date_of(day), "most on hand".to_owned(), mass(most, unit)]));
    rows.sort_by_key(|r| r.0);
    let dates: Vec<String> = calendar.pick_ups.iter().map(|p| date_of(p.day)).collect();
    let collected = if dates.is_empty() {
        "Nothing is collected in the year".to_owned()
    } else {
        format!("Collected on {}", few(&dates))
    };
    let breach = match (calendar.too_long.len(), calendar.too_much.len()) {
        (0, 0) => "every limit is kept".to_owned(),
        (long, much) => format!("{long} containers stay too long, {much} days end with too much"),
    };
    let limit = desk.storage.kg.iter().flatten().fold(None, |least: Option<f64>, kg| match least {
        Some(l) if l <= *kg => Some(l),
        _ => Some(*kg),
    });
    // A limit that would press the year flat is told, not drawn.
    let drawn = limit.is_some_and(|l| l <= 3.0 * most);
    let mut notes = vec![
        "The year begins empty; what a month brings comes in equal parts on each of its days.".to_owned(),
    ];
    if let Some(limit) = limit.filter(|_| !drawn) {
        notes.push(format!(
            "At most {} may lie on site; that is above the drawing.",
            mass_with_unit(limit, unit)
        ));
    }
    let draw = |size| stock_drawing(desk, most, unit, drawn, size);
    Some(Picture {
        key: key.to_owned(),
        title: format!("At most {} lie on site, on {}", mass_with_unit(most, unit), date_of(day)),
        description: format!("{collected}; {breach}."),
        notes,
        tables: vec![Table {
            caption: format!("Waste on site, {}", unit.0),
            head: vec![Head::words("Day"), Head::words("What"), Head::number(unit.0)],
            rows: rows.into_iter().map(|r| r.1).collect(),
        }],
        wide: draw(Size::Wide),
        narrow: draw(Size::Narrow),
    })
}

fn stock_drawing(desk: &SiteDesk<'_>, most: f64, unit: Unit, with_limit: bool, size: Size) -> Drawing {
    let (width, type_size) = (size.width(), size.text());
    let limits = || desk.storage.kg.iter().flatten().filter(|_| with_limit);
    let top_kg = limits().fold(most, |top, kg| if *kg > top && *kg <= 3.0 * most { *kg } else { top });
    let marks = ticks(0.0, top_kg, 5);
    let left = marks
        .iter()
        .map(|t| text_width(&mass(*t, unit), type_size))
        .fold(0.0, |a: f64, b| if b > a { b } else { a })
        + 8.0;
    let (top, bottom) = (24.0, 190.0);
    let y = Linear::new((0.0, top_kg), (bottom, top));
    let x = Linear::new((0.0, 365.0), (left, width - 2.0));
    let mut shapes = vec![text((0.0, 13.0), Anchor::Start, type_size, "soft", unit.0)];
    for t in &marks {
        shapes.push(line((left, y.at(*t)), (width - 2.0, y.at(*t)), "rule"));
        shapes.push(text(
            (left - 6.0, y.at(*t) + type_size * 0.35),
            Anchor::End,
            type_size,
            "scale",
            mass(*t, unit),
        ));
    }
    let mut points = vec![(x.at(0.0), bottom)];
    for (day, kg) in desk.calendar.on_hand_kg.iter().enumerate() {
        points.push((x.at(day as f64 + 1.0), y.at(*kg)));
    }
    points.push((x.at(365.0), bottom));
    shapes.push(Shape::Path { d: Trail::through(&points).closed(), class: "fill-waste", hatch: Hatch::No });
    let mut start = 0.0;
    for (days, limit) in MONTHS.into_iter().zip(desk.storage.kg) {
        let end = start + f64::from(days);
        if let Some(kg) = limit.filter(|kg| with_limit && *kg <= top_kg) {
            shapes.push(line((x.at(start), y.at(kg)), (x.at(end), y.at(kg)), "axis"));
        }
        start = end;
    }
    months(&mut shapes, &x, bottom, type_size);
    Drawing { width, height: bottom + 24.0, shapes }
}

/// The line of months below a drawing.
fn months(shapes: &mut Vec<Shape>, x: &Linear, bottom: f64, type_size: f64) {
    shapes.push(line((x.at(0.0), bottom), (x.at(365.0), bottom), "axis"));
    let mut start = 0.0;
    for (name, days) in MONTH_NAMES.into_iter().zip(MONTHS) {
        let middle = x.at(start + f64::from(days) / 2.0);
        start += f64::from(days);
        let letter = name.get(..1).unwrap_or_default();
        shapes.push(text((middle, bottom + 16.0), Anchor::Middle, type_size, "scale", letter));
    }
}

/// What each stream brings in each month; `None` where nothing is made.
#[must_use]
pub fn load(key: &str, account: &Account, desk: &SiteDesk<'_>) -> Option<Picture> {
    let site = &account.program.as_ref()?.site;
    let mut streams: Vec<(String, [f64; 12])> = Vec::new();
    for s in &desk.streams {
        let mut kg = [0.0; 12];
        for own in desk.lines.iter().filter(|l| l.work.is_some_and(|(_, stream)| stream == s.stream)) {
            for (sum, kg) in kg.iter_mut().zip(own.kg) {
                *sum += kg;
            }
        }
        streams.push((site.streams.get(s.stream).map_or_else(String::new, |u| u.name.clone()), kg));
    }
    let year = |kg: &[f64; 12]| kg.iter().fold(0.0, |sum, kg| sum + kg);
    let (name, largest) = streams.iter().max_by(|a, b| year(&a.1).total_cmp(&year(&b.1)))?;
    let (name, largest) = (name.clone(), year(largest));
    let most = streams.iter().flat_map(|s| &s.1).fold(0.0, |m: f64, kg| if *kg > m { *kg } else { m });
    if most <= 0.0 {
        return None;
    }
    let unit = mass_unit(largest);
    let head = std::iter::once("Stream").chain(MONTH_NAMES).chain(["Year"]);
    let rows = streams.iter().map(|(name, kg)| {
        let cells = kg.iter().chain([&year(kg)]).map(|kg| mass(*kg, unit)).collect::<Vec<_>>();
        std::iter::once(name.clone()).chain(cells).collect()
    });
    let each: Vec<String> =
        streams.iter().map(|(name, kg)| format!("{} of {name}", mass_with_unit(year(kg), unit))).collect();
    let draw = |size| load_drawing(&streams, most, unit, size);
    Some(Picture {
        key: key.to_owned(),
        title: format!("The largest load of a year is {}, {}", name, mass_with_unit(largest, unit)),
        description: format!("With the present routes, in a year: {}.", few(&each)),
        notes: vec![
            "All bars start at zero on one scale; the amount beside each stream is that of the year."
                .to_owned(),
        ],
        tables: vec![Table {
            caption: format!("Waste by stream and month, {}", unit.0),
            head: head
                .enumerate()
                .map(|(i, h)| if i == 0 { Head::words(h) } else { Head::number(h) })
                .collect(),
            rows: rows.collect(),
        }],
        wide: draw(Size::Wide),
        narrow: draw(Size::Narrow),
    })
}

fn load_drawing(streams: &[(String, [f64; 12])], most: f64, unit: Unit, size: Size) -> Drawing {
    let (width, type_size) = (size.width(), size.text());
    let x = Linear::new((0.0, 365.0), (2.0, width - 2.0));
    let mut shapes = Vec::new();
    let mut y = 0.0;
    for (name, kg) in streams {
        let year = mass_with_unit(kg.iter().fold(0.0, |sum, kg| sum + kg), unit);
        let room = width - text_width(&year, type_size) - 14.0;
        shapes.push(text((0.0, y + 14.0), Anchor::Start, type_size, "", fit(name, room, type_size)));
        shapes.push(text((width - 2.0, y + 14.0), Anchor::End, type_size, "amount", year));
        let bottom = y + 62.0;
        let height = Linear::new((0.0, most), (0.0, 40.0));
        let mut start = 0.0;
        for (kg, days) in kg.iter().zip(MONTHS) {
            let (from, to) = (x.at(start), x.at(start + f64::from(days)));
            start += f64::from(days);
            let tall = height.length(*kg);
            if *kg > 0.0 && tall < 1.0 {
                shapes.push(line((from + 2.0, bottom - 0.5), (to - 2.0, bottom - 0.5), "hair"));
            } else if *kg > 0.0 {
                shapes.push(Shape::Rect {
                    x: from + 2.0,
                    y: bottom - tall,
                    width: to - from - 4.0,
                    height: tall,
                    class: "fill-waste",
                    hatch: Hatch::No,
                });
            }
        }
        shapes.push(line((x.at(0.0), bottom), (x.at(365.0), bottom), "rule strong"));
        y = bottom + 6.0;
    }
    months(&mut shapes, &x, y, type_size);
    Drawing { width, height: y + 24.0, shapes }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn bars_of_the_year_are_as_tall_as_their_months() {
        let mut kg = [0.0; 12];
        kg[1] = 4.0;
        kg[4] = 8.0;
        for size in [Size::Wide, Size::Narrow] {
            let drawing = load_drawing(&[("a".into(), kg)], 8.0, ("kg", 1.0), size);
            let tall: Vec<f64> = drawing
                .shapes
                .iter()
                .filter_map(|s| if let Shape::Rect { height, .. } = s { Some(*height) } else { None })
                .collect();
            assert_eq!(tall, [20.0, 40.0]);
        }
    }
}
