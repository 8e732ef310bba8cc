//! One route beside the present one: how far each headline figure falls to the left or rises to the right of no change.

use super::letter::{BOLD, fit, signed_percent, text_width};
use super::scale::Linear;
use super::shape::{Anchor, Hatch, Shape, line, text};
use super::{Drawing, Head, Picture, Size, Table};
use thimbleworth::account::Measure;
use thimbleworth::compare::{HEADLINES, RouteComparison};
use thimbleworth::program::{Program, WorkloadProgram};
use thimbleworth::quantity::{Kind, show};

/// How a figure changes.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) enum Change {
    /// By this share of what it was.
    Share(f64),
    /// There was none.
    New,
    /// There is none in either.
    None,
}

/// One line of the picture.
pub(super) struct Row {
    pub(super) name: String,
    pub(super) change: Change,
    pub(super) before: String,
    pub(super) after: String,
}

/// The picture of one route of a comparison; `None` where none of the headline figures stands in both accounts.
#[must_use]
pub fn difference(
    key: &str,
    program: &Program,
    workload: usize,
    beside: &RouteComparison,
) -> Option<Picture> {
    let work = program.workloads.get(workload)?;
    let rows: Vec<Row> = HEADLINES
        .iter()
        .filter_map(|(id, name)| {
            let d = beside.differences.iter().find(|d| d.id == *id)?;
            let (before, after) = d.present.zip(d.other)?;
            let change = match (before > 0.0, after > 0.0) {
                (true, _) => Change::Share(after / before - 1.0),
                (false, true) => Change::New,
                (false, false) => Change::None,
            };
            let amount = |value| amount(value, d.measure);
            Some(Row { name: (*name).to_owned(), change, before: amount(before), after: amount(after) })
        })
        .collect();
    let (present, other) = names(work, beside.route)?;
    picture(key, present, other, &rows)
}

fn names(work: &WorkloadProgram, route: usize) -> Option<(&str, &str)> {
    Some((work.routes.get(work.present)?.name.as_str(), work.routes.get(route)?.name.as_str()))
}

fn amount(value_si: f64, measure: Measure) -> String {
    let text = match measure {
        Measure::Mass => show(value_si, Kind::Mass),
        // A mass times a score is no mass.
        Measure::WeightedMass => format!("{} kg·score", super::letter::written(value_si, 3)),
        Measure::Volume => show(value_si, Kind::Volume),
        Measure::Energy => show(value_si, Kind::Energy),
        other => other.shown(value_si),
    };
    text.replace(' ', "\u{a0}").replace('-', "−")
}

pub(super) fn picture(key: &str, present: &str, other: &str, rows: &[Row]) -> Option<Picture> {
    if rows.is_empty() {
        return None;
    }
    let clauses: Vec<String> = rows.iter().map(|r| format!("{} {}", r.name, said(r))).collect();
    let falls = rows.iter().filter(|r| matches!(r.change, Change::Share(s) if s < -SAME)).count();
    let rises = rows
        .iter()
        .filter(|r| matches!(r.change, Change::Share(s) if s > SAME) || r.change == Change::New)
        .count();
    let title = format!(
        "{other} in place of {present}: {falls} of {} headline figures fall, {rises} rise",
        rows.len()
    );
    let description = format!("Against {present}: {}.", clauses.join("; "));
    let table = Table {
        caption: format!("{other} beside {present}, a year"),
        head: vec![Head::words("Figure"), Head::number(present), Head::number(other), Head::number("Change")],
        rows: rows.iter().map(|r| vec![r.name.clone(), r.before.clone(), r.after.clone(), said(r)]).collect(),
    };
    let mut notes = vec![
        "Each figure is measured against its own value on the present route: a bar to the left is less, to the right (slanting lines) more; less of each is better."
            .to_owned(),
    ];
    if rows.iter().any(|r| r.change == Change::New) {
        notes.push(
            "“New” is what the present route does not have: no change in per cent can be given.".to_owned(),
        );
    }
    Some(Picture {
        key: key.to_owned(),
        title,
        description,
        notes,
        tables: vec![table],
        wide: draw(rows, Size::Wide),
        narrow: draw(rows, Size::Narrow),
    })
}

/// Below this share nothing has changed, as in the finding.
const SAME: f64 = 0.005;

fn said(row: &Row) -> String {
    match row.change {
        Change::Share(share) if share.abs() <= SAME => "no change".to_owned(),
        Change::Share(share) => signed_percent(share),
        Change::New => "new".to_owned(),
        Change::None => "none in either".to_owned(),
    }
}

fn draw(rows: &[Row], size: Size) -> Drawing {
    let (width, type_size) = (size.width(), size.text());
    let wider = |a: f64, b: f64| if b > a { b } else { a };
    let label = rows.iter().map(|r| text_width(&said(r), type_size) * BOLD).fold(0.0, wider) + 7.0;
    let amounts: Vec<String> = rows.iter().map(|r| format!("{} → {}", r.before, r.after)).collect();
    let widest = amounts.iter().map(|a| text_width(a, type_size)).fold(0.0, wider);
    let names = rows.iter().map(|r| text_width(&r.name, type_size)).fold(0.0, wider);
    let names = if names > 250.0 { 250.0 } else { names };
    let (mut low, mut high) = (0.0, 0.0);
    for row in rows {
        if let Change::Share(share) = row.change {
            low = if share < low { share } else { low };
            high = if share > high { share } else { high };
        }
    }
    // One scale for all lines, with room for a label at both ends; a mark of its own where nothing changes at all.
    let (left, right) = match size {
        Size::Wide => (names + 14.0, width - wider(widest, 60.0) - 16.0),
        Size::Narrow => (0.0, width),
    };
    let (from, to) = (if low < 0.0 { low } else { -1e-9 }, if high > 0.0 { high } else { 1e-9 });
    let bars = Linear::new((from, to), (left + label, right - label));
    let zero = bars.at(0.0);
    let row_height = if size.narrow() { 54.0 } else { 30.0 };
    let top = 22.0;
    let mut shapes = vec![];
    let caption =
        if text_width("as now", type_size) / 2.0 < zero - left { Anchor::Middle } else { Anchor::Start };
    shapes.push(text((zero, 14.0), caption, type_size, "soft", "as now"));
    let mut y = top;
    shapes.push(line((0.0, y), (width, y), "rule strong"));
    for (row, amounts) in rows.iter().zip(&amounts) {
        let (bar_y, base) = match size {
            Size::Wide => {
                shapes.push(text(
                    (0.0, y + 19.5),
                    Anchor::Start,
                    type_size,
                    "",
                    fit(&row.name, names, type_size),
                ));
                shapes.push(text(
                    (width - 2.0, y + 19.5),
                    Anchor::End,
                    type_size,
                    "soft amount",
                    fit(amounts, width - right - 4.0, type_size),
                ));
                (y + 8.0, y + 19.5)
            }
            Size::Narrow => {
                shapes.push(text(
                    (0.0, y + 15.0),
                    Anchor::Start,
                    type_size,
                    "",
                    fit(&row.name, width, type_size),
                ));
                shapes.push(text(
                    (0.0, y + 29.0),
                    Anchor::Start,
                    type_size - 1.0,
                    "soft amount",
                    fit(amounts, width, type_size - 1.0),
                ));
                (y + 35.0, y + 46.0)
            }
        };
        shapes.extend(bar(row, &bars, (bar_y, if size.narrow() { 13.0 } else { 14.0 })));
        let (at, anchor) = match row.change {
            Change::Share(share) if share < -SAME => (bars.at(share) - 5.0, Anchor::End),
            Change::Share(share) if share > SAME => (bars.at(share) + 5.0, Anchor::Start),
            _ => {
                // Beside the line, where there is more room.
                if right - zero >= label { (zero + 7.0, Anchor::Start) } else { (zero - 7.0, Anchor::End) }
            }
        };
        shapes.push(text((at, base), anchor, type_size, "amount name", said(row)));
        y += row_height;
        shapes.push(line((0.0, y), (width, y), "rule"));
    }
    shapes.push(line((zero, top), (zero, y), "axis"));
    Drawing { width, height: y + 1.0, shapes }
}

fn bar(row: &Row, bars: &Linear, (y, height): (f64, f64)) -> Option<Shape> {
    let zero = bars.at(0.0);
    let diamond = || {
        let middle = y + height / 2.0;
        let d = super::Trail::from(zero, middle - 5.0)
            .to(zero + 5.0, middle)
            .to(zero, middle + 5.0)
            .to(zero - 5.0, middle)
            .closed();
        Shape::Path { d, class: "open", hatch: Hatch::No }
    };
    match row.change {
        Change::New => Some(diamond()),
        Change::None => None,
        Change::Share(share) => {
            let length = bars.length(share.abs());
            let x = if share < 0.0 { zero - length } else { zero };
            let (class, hatch) =
                if share < 0.0 { ("fill-less", Hatch::No) } else { ("fill-more", Hatch::Lines) };
            (length > 0.0).then_some(if length < 1.0 {
                line((zero, y), (zero, y + height), "hair")
            } else {
                Shape::Rect { x, y, width: length, height, class, hatch }
            })
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn rows(changes: &[Change]) -> Vec<Row> {
        changes
            .iter()
            .map(|c| Row {
                name: "waste".into(),
                change: *c,
                before: "10\u{a0}kg".into(),
                after: "2\u{a0}kg".into(),
            })
            .collect()
    }

    #[test]
    fn bars_are_as_long_as_the_change_and_start_at_no_change() {
        let shares = [-1.0, -0.5, 0.25, 3.0];
        let rows = rows(&shares.map(Change::Share));
        for size in [Size::Wide, Size::Narrow] {
            let drawing = draw(&rows, size);
            let found: Vec<(f64, f64)> = drawing
                .shapes
                .iter()
                .filter_map(|s| if let Shape::Rect { x, width, .. } = s { Some((*x, *width)) } else { None })
                .collect();
            assert_eq!(found.len(), 4);
            let zero = found[3].0;
            for ((x, width), share) in found.iter().zip(shares) {
                assert!((width / found[0].1 - share.abs()).abs() < 1e-9);
                assert!((if share < 0.0 { x + width } else { *x } - zero).abs() < 1e-9);
            }
        }
    }

    #[test]
    fn new_and_unchanged_have_no_bar() {
        for changes in [
            vec![Change::New],
            vec![Change::None],
            vec![Change::Share(0.0)],
            vec![Change::New, Change::Share(-1.0)],
        ] {
            let picture = picture("k", "A", "B", &rows(&changes)).unwrap();
            let bars = picture.wide.shapes.iter().filter(|s| matches!(s, Shape::Rect { .. })).count();
            assert_eq!(bars, changes.iter().filter(|c| matches!(c, Change::Share(s) if *s != 0.0)).count());
            assert_eq!(picture.notes.len(), 1 + usize::from(changes.contains(&Change::New)));
        }
        assert!(picture("k", "A", "B", &[]).is_none());
    }
}
