//! Money in hand year by year after a switch: the middle of the draws, the band that holds most of them, and when it has paid.

use super::books::percent;
use super::chart::{Axis, Mark, chart};
use super::letter::written;
use super::{Head, Picture, Size, Table};
use crate::show::grouped;
use thimbleworth::case::{DrawnCase, Switch};

/// The picture of a case; `None` where too few draws ran. `names` are those of the route and of the present one.
#[must_use]
pub fn over_years(
    key: &str,
    names: (&str, &str),
    case: &Switch,
    drawn: &DrawnCase,
    coverage: f64,
) -> Option<Picture> {
    let hands: Option<Vec<_>> = drawn.cumulative.iter().copied().collect();
    let hands = hands.filter(|h| !h.is_empty())?;
    let (mut low, mut high) = (0.0, 0.0);
    for hand in &hands {
        low = if hand.symmetric.low < low { hand.symmetric.low } else { low };
        high = if hand.symmetric.high > high { hand.symmetric.high } else { high };
    }
    let most = if high > -low { high } else { -low };
    // At most three digits beside the scale.
    let (mut words, mut over) = ("", 1.0);
    for of in ["thousand ", "million ", "thousand million ", "million million "] {
        if most * over >= 1e3 {
            (words, over) = (of, over * 1e-3);
        }
    }
    let unit = format!("{words}{}", case.currency);
    let points = |of: &dyn Fn(usize) -> f64| -> Vec<(f64, f64)> {
        (0..hands.len()).map(|year| (year as f64, of(year) * over)).collect()
    };
    let mut band = points(&|y| hands[y].symmetric.low);
    band.extend(points(&|y| hands[y].symmetric.high).into_iter().rev());
    let years = (hands.len() - 1) as f64;
    let line = |points, class| Mark { points, class, name: String::new() };
    let mut marks = vec![
        line(band, "step step-5"),
        line(vec![(0.0, 0.0), (years, 0.0)], "axis"),
        line(points(&|y| hands[y].median), "course"),
    ];
    let pays = drawn.median_payback.filter(|at| *at > 0.0);
    let said = match drawn.median_payback {
        Some(at) if at > 0.0 => format!("half of the draws have paid after {}\u{a0}years", written(at, 3)),
        Some(_) => "nothing has to be paid back".to_owned(),
        None => format!("half of the draws have not paid within {}\u{a0}years", written(years, 3)),
    };
    marks.extend(pays.map(|at| Mark {
        points: vec![(at, 0.0)],
        class: "mark",
        name: format!("{}\u{a0}years", written(at, 3)),
    }));
    let room = 0.05 * (high - low) * over;
    let title = format!("money in hand ({unit})");
    let x = Axis { title: "years after the switch", ends: (0.0, years), decades: false };
    let y = Axis { title: &title, ends: (low * over - room, high * over + room), decades: false };
    let amount = |v: f64| written(v * over, 3);
    let head = |words: &str| Head::number(&format!("{words} ({unit})"));
    let last = hands.last()?;
    Some(Picture {
        key: key.to_owned(),
        title: format!("{} in place of {}: {said}", names.0, names.1),
        description: format!(
            "Money in hand after {}\u{a0}years: {}, from {} to {} ({unit}; median and {} coverage interval, {} draws).",
            written(years, 3),
            amount(last.median),
            amount(last.symmetric.low),
            amount(last.symmetric.high),
            percent(coverage),
            grouped(&drawn.draws.to_string())
        ),
        notes: vec!["Below the level line the switch has cost more than it has saved; the band holds the interval of each year, the thick line its median. Not discounted.".to_owned()],
        tables: vec![Table {
            caption: format!("Money in hand of {}; {said}", names.0),
            head: vec![Head::number("Year"), head("From"), head("Median"), head("To"), Head::number("Paid by then in")],
            rows: hands
                .iter()
                .zip(&drawn.paid_within)
                .enumerate()
                .map(|(year, (h, paid))| {
                    vec![
                        year.to_string(),
                        amount(h.symmetric.low),
                        amount(h.median),
                        amount(h.symmetric.high),
                        percent(*paid),
                    ]
                })
                .collect(),
        }],
        wide: chart(&x, &y, &marks, Size::Wide),
        narrow: chart(&x, &y, &marks, Size::Narrow),
    })
}
