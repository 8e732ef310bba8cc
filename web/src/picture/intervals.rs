//! One figure on every route as the draws have it: the interval with its median, and below it how often a route has less of it
//! than the present one.

use super::books::{few, percent};
use super::letter::{fit, text_width};
use super::scale::Linear;
use super::shape::{Anchor, Hatch, Shape, Trail, line, text};
use super::{Drawing, Head, Picture, Size, Table};
use crate::show::{grouped, unbroken, with_minus};
use thimbleworth::letter::sentence;
use thimbleworth::odds::Brief;
use thimbleworth::program::WorkloadProgram;
use thimbleworth::report::odds_words;

/// One line of the picture.
struct Row {
    name: String,
    words: String,
    /// The limits of an interval; a second line where it is narrow.
    limits: String,
    mark: Mark,
}

#[derive(Clone, Copy)]
enum Mark {
    /// Low, median, high.
    Interval(f64, f64, f64),
    /// The share of draws with less, and that with the same.
    Odds(f64, f64),
    /// There is none.
    None,
}

/// The picture of a figure, as it is on each route; `None` where no route has draws of it.
#[must_use]
pub fn intervals(
    key: &str,
    work: &WorkloadProgram,
    briefs: &[Option<Brief<'_>>],
    coverage: f64,
) -> Option<Picture> {
    let figure = briefs.iter().flatten().next()?.figure;
    let spaced = |text: String| with_minus(&unbroken(&text)).replace(' ', "\u{a0}");
    let title = sentence(&figure.title);
    let present = work.routes.get(work.present).map_or("", |route| route.name.as_str());
    let (mut rows, mut odds, mut table, mut said) = (Vec::new(), Vec::new(), Vec::new(), Vec::new());
    let (mut draws, mut heading, mut best) = (0, title.clone(), -1.0);
    for (route, brief) in work.routes.iter().zip(briefs) {
        let (name, Some(brief)) = (route.name.clone(), brief) else { continue };
        let (words, limits, mark, cells) = match brief.drawn {
            Some(s) => {
                draws = s.draws;
                let (low, middle, high) = (s.symmetric.low, s.median, s.symmetric.high);
                let show = |v: f64| spaced(figure.measure.shown_within(v, (low, high)));
                let limits = format!("from {} to {}", show(low), show(high));
                let cells = [show(middle), show(low), show(high)];
                (show(middle), limits, Mark::Interval(low, middle, high), cells)
            }
            None => {
                let none = "no interval: too few draws ran".to_owned();
                (
                    none,
                    String::new(),
                    Mark::None,
                    [spaced(figure.measure.shown(brief.central)), "not known".to_owned(), String::new()],
                )
            }
        };
        said.push(format!("{name} {words} {limits}").trim_end().to_owned());
        let mut than = String::new();
        if let Some((less, same)) = brief.odds {
            than = unbroken(&odds_words(less, same));
            if less > best {
                best = less;
                heading = format!("{title}: {name} has {than} than {present}");
            }
            odds.push(Row {
                name: name.clone(),
                words: than.clone(),
                limits: String::new(),
                mark: Mark::Odds(less, same),
            });
        }
        table.push([name.clone()].into_iter().chain(cells).chain([than]).collect());
        rows.push(Row { name, words, limits, mark });
    }
    if draws == 0 {
        return None;
    }
    rows.extend(odds);
    Some(Picture {
        key: key.to_owned(),
        title: heading,
        description: format!(
            "{title}, a year, median and {} coverage interval, {} draws: {}.",
            percent(coverage),
            grouped(&draws.to_string()),
            few(&said)
        ),
        notes: vec!["A line is the interval, its diamond the median, all on one scale from zero. Below, of all draws: plain, those with less than the present route; dots, the same; slanting lines, more.".to_owned()],
        tables: vec![Table {
            caption: format!("{title}, a year"),
            head: ["Median", "From", "To", "Than the present"].iter().fold(vec![Head::words("Route")], |mut head, words| {
                head.push(Head { text: (*words).to_owned(), number: head.len() < 4 });
                head
            }),
            rows: table,
        }],
        wide: draw(&rows, Size::Wide),
        narrow: draw(&rows, Size::Narrow),
    })
}

fn draw(rows: &[Row], size: Size) -> Drawing {
    let (width, type_size) = (size.width(), size.text());
    let wider = |a: f64, b: f64| if b > a { b } else { a };
    let names = rows.iter().map(|r| text_width(&r.name, type_size)).fold(0.0, wider);
    let names = if names > 170.0 { 170.0 } else { names };
    let joined =
        |row: &Row| [row.words.as_str(), if row.limits.is_empty() { "" } else { ", " }, &row.limits].concat();
    let widest = rows.iter().map(|r| text_width(&joined(r), type_size)).fold(0.0, wider);
    let widest = if widest > 310.0 { 310.0 } else { widest };
    let (left, right, row_height) = match size {
        Size::Wide => (names + 14.0, width - widest - 16.0, 30.0),
        Size::Narrow => (6.0, width - 6.0, 68.0),
    };
    let (mut low, mut high) = (0.0, 0.0);
    for row in rows {
        if let Mark::Interval(from, _, to) = row.mark {
            low = if from < low { from } else { low };
            high = if to > high { to } else { high };
        }
    }
    let scale = Linear::new((low, high), (left, right));
    let odds = Linear::new((0.0, 1.0), (left, right));
    let mut shapes = Vec::new();
    let (mut y, mut first) = (1.0, true);
    for row in rows {
        if matches!(row.mark, Mark::Odds(..)) && first {
            first = false;
            shapes.push(text((0.0, y + 24.0), Anchor::Start, type_size, "soft", "than the present route"));
            y += 32.0;
        }
        shapes.push(line((0.0, y), (width, y), "rule"));
        let room = if size.narrow() { width } else { names };
        shapes.push(text((0.0, y + 19.0), Anchor::Start, type_size, "", fit(&row.name, room, type_size)));
        let mut lines = vec![];
        let (at, anchor, middle) = match size {
            Size::Wide => {
                lines.push((19.0, fit(&joined(row), widest + 1.0, type_size)));
                (width - 2.0, Anchor::End, y + 15.0)
            }
            Size::Narrow => {
                lines.push((33.0, fit(&row.words, width, type_size)));
                lines.push((47.0, fit(&row.limits, width, type_size)));
                (0.0, Anchor::Start, y + 58.0)
            }
        };
        for (below, words) in lines.into_iter().filter(|l| !l.1.is_empty()) {
            shapes.push(text((at, y + below), anchor, type_size, "soft amount", words));
        }
        match row.mark {
            Mark::None => {}
            Mark::Interval(from, at, to) => {
                let (from, at, to, zero) = (scale.at(from), scale.at(at), scale.at(to), scale.at(0.0));
                shapes.push(line((zero, middle - 9.0), (zero, middle + 9.0), "axis"));
                shapes.push(line((from, middle), (to, middle), "course"));
                for end in [from, to] {
                    shapes.push(line((end, middle - 5.0), (end, middle + 5.0), "course"));
                }
                let d = Trail::from(at - 5.0, middle)
                    .to(at, middle - 5.0)
                    .to(at + 5.0, middle)
                    .to(at, middle + 5.0);
                shapes.push(Shape::Path { d: d.closed(), class: "mark", hatch: Hatch::No });
            }
            Mark::Odds(less, same) => {
                let parts = [
                    (less, "fill-less", Hatch::No),
                    (same, "fill-other", Hatch::Dots),
                    (1.0 - less - same, "fill-more", Hatch::Lines),
                ];
                let mut x = left;
                for (share, class, hatch) in parts {
                    let length = odds.length(share);
                    if length >= 0.5 {
                        shapes.push(Shape::Rect {
                            x,
                            y: middle - 6.0,
                            width: length,
                            height: 12.0,
                            class,
                            hatch,
                        });
                    }
                    x += length;
                }
            }
        }
        y += row_height;
    }
    shapes.push(line((0.0, y), (width, y), "rule"));
    Drawing { width, height: y + 1.0, shapes }
}
