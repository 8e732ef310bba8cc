//! Where the mass of each route ends: one ruled line a place, a bar from zero, the amount in the column right of a double rule.

use super::books::{End, Per, few, fills, into_places, mass, mass_unit, mass_with_unit, place_name};
use super::letter::{BOLD, fit, text_width};
use super::scale::Linear;
use super::shape::{Anchor, Shape, line, text};
use super::{Drawing, Head, Picture, Size, Table};
use thimbleworth::account::Account;
use thimbleworth::ledger::Place;
use thimbleworth::order;

/// The masses of some routes, all over the same places.
pub(super) struct Masses {
    /// Name and kind of each place, that with the largest mass first.
    pub(super) places: Vec<(String, End)>,
    /// Name of each route, and its mass at each place; kg.
    pub(super) routes: Vec<(String, Vec<f64>)>,
    /// The words after an amount.
    pub(super) per: &'static str,
}

/// The picture of a workload; `None` where no route has an account, or none has what amounts are given for.
#[must_use]
pub fn mass_by_place(key: &str, account: &Account, workload: usize, per: Per) -> Option<Picture> {
    let program = account.program.as_ref()?;
    let work = program.workloads.get(workload)?;
    let accounts = &account.workloads.get(workload)?.routes;
    let mut places: Vec<(Place, f64)> = Vec::new();
    let mut routes: Vec<(&str, Vec<(Place, f64)>)> = Vec::new();
    for (route, account) in work.routes.iter().zip(accounts) {
        let Some(account) = account else { continue };
        let mut here = Vec::new();
        // What returns to the store has not ended anywhere.
        for (place, kg) in into_places(account).into_iter().filter(|(p, _)| *p != Place::STORE) {
            let Some(kg) = per.of(account, kg) else { continue };
            here.push((place, kg));
            match places.iter_mut().find(|(p, _)| *p == place) {
                Some((_, most)) if *most < kg => *most = kg,
                Some(_) => {}
                None => places.push((place, kg)),
            }
        }
        routes.push((&route.name, here));
    }
    order::sort(&mut places, &|a, b| (b.1, a.0) < (a.1, b.0));
    let at = |here: &[(Place, f64)], place| here.iter().find(|(p, _)| *p == place).map_or(0.0, |(_, kg)| *kg);
    let masses = Masses {
        routes: routes
            .iter()
            .map(|(name, here)| ((*name).to_owned(), places.iter().map(|(p, _)| at(here, *p)).collect()))
            .collect(),
        places: places.iter().map(|(p, _)| (place_name(&program.site, *p), End::of(*p))).collect(),
        per: per.words(),
    };
    picture(key, &masses)
}

pub(super) fn picture(key: &str, masses: &Masses) -> Option<Picture> {
    let all = || {
        masses.routes.iter().flat_map(|(route, at)| {
            masses.places.iter().zip(at).map(move |((place, _), kg)| (route.as_str(), place.as_str(), *kg))
        })
    };
    let largest = all().max_by(|a, b| a.2.total_cmp(&b.2))?;
    let unit = mass_unit(largest.2);
    let totals: Vec<f64> = masses.routes.iter().map(|(_, at)| total(at)).collect();
    let title = format!(
        "The largest mass is {} {}, from {} to {}",
        mass_with_unit(largest.2, unit),
        masses.per,
        largest.0,
        largest.1
    );
    let each: Vec<String> = masses
        .routes
        .iter()
        .zip(&totals)
        .map(|((name, _), kg)| format!("{} from {name}", mass_with_unit(*kg, unit)))
        .collect();
    let description = format!("Everything that ends anywhere, {}: {}.", masses.per, few(&each));
    let heading = format!("{} {}", unit.0, masses.per);
    let mut rows = Vec::new();
    for ((route, at), total) in masses.routes.iter().zip(&totals) {
        for ((place, end), kg) in masses.places.iter().zip(at) {
            rows.push(vec![route.clone(), place.clone(), end.words().to_owned(), mass(*kg, unit)]);
        }
        rows.push(vec![route.clone(), TOGETHER.to_owned(), String::new(), mass(*total, unit)]);
    }
    let table = Table {
        caption: format!("Mass by place, {heading}"),
        head: vec![
            Head::words("Route"),
            Head::words("Place"),
            Head::words("Kind"),
            Head::number(&format!("Mass ({heading})")),
        ],
        rows,
    };
    let ends: Vec<End> = masses.places.iter().map(|p| p.1).collect();
    Some(Picture {
        key: key.to_owned(),
        title,
        description,
        notes: vec![format!("All bars start at zero on one scale. {}", fills(&ends))],
        tables: vec![table],
        wide: draw(masses, &totals, unit, Size::Wide),
        narrow: draw(masses, &totals, unit, Size::Narrow),
    })
}

const TOGETHER: &str = "together";

fn total(at: &[f64]) -> f64 {
    at.iter().fold(0.0, |sum, kg| sum + kg)
}

fn draw(masses: &Masses, totals: &[f64], unit: (&'static str, f64), size: Size) -> Drawing {
    let (width, type_size) = (size.width(), size.text());
    let most = masses.routes.iter().flat_map(|(_, at)| at).fold(0.0, |a: f64, b| if *b > a { *b } else { a });
    let amounts = |kg: f64| mass(kg, unit);
    let heading = format!("{} {}", unit.0, masses.per);
    // The amount column is as wide as its widest amount.
    let widest = masses
        .routes
        .iter()
        .flat_map(|(_, at)| at)
        .chain(totals)
        .map(|kg| text_width(&amounts(*kg), type_size) * BOLD)
        .fold(0.0, |a: f64, b| if b > a { b } else { a });
    let names = masses
        .places
        .iter()
        .map(|(name, _)| text_width(name, type_size))
        .chain([100.0])
        .fold(0.0, |a: f64, b| if b > a { b } else { a });
    let names = if names > 230.0 { 230.0 } else { names };
    let rule = width - widest - 14.0;
    let (bars, row) = match size {
        Size::Wide => (Linear::new((0.0, most), (names + 10.0, rule - 10.0)), 24.0),
        Size::Narrow => (Linear::new((0.0, most), (2.0, width - 2.0)), 34.0),
    };
    let mut shapes = Vec::new();
    let mut y = 0.0;
    for ((name, at), total) in masses.routes.iter().zip(totals) {
        let heading_width = text_width(&heading, type_size);
        shapes.push(text(
            (0.0, y + 17.0),
            Anchor::Start,
            type_size + 1.0,
            "name",
            fit(name, (width - heading_width - 12.0) / BOLD, type_size + 1.0),
        ));
        shapes.push(text((width - 2.0, y + 17.0), Anchor::End, type_size, "soft", heading.clone()));
        y += 25.0;
        let top = y;
        shapes.push(line((0.0, y), (width, y), "rule strong"));
        for ((place, end), kg) in masses.places.iter().zip(at) {
            let amount = amounts(*kg);
            let (words, bar, thick) = match size {
                Size::Wide => (names, y + 6.0, 12.0),
                Size::Narrow => (width - text_width(&amount, type_size) - 12.0, y + 20.0, 9.0),
            };
            let base = if size.narrow() { y + 14.0 } else { y + 16.5 };
            shapes.push(text((0.0, base), Anchor::Start, type_size, "", fit(place, words, type_size)));
            shapes.push(text((width - 2.0, base), Anchor::End, type_size, "amount", amount));
            shapes.extend(bar_shape(&bars, *kg, (bar, thick), *end));
            y += row;
            shapes.push(line((0.0, y), (width, y), "rule"));
        }
        if !size.narrow() {
            shapes.push(line((bars.at(0.0), top), (bars.at(0.0), y), "axis"));
            for x in [rule - 1.5, rule + 1.5] {
                shapes.push(line((x, top), (x, y + 24.0), "margin"));
            }
        }
        let base = y + 16.5;
        shapes.push(text((0.0, base), Anchor::Start, type_size, "soft", TOGETHER));
        shapes.push(text((width - 2.0, base), Anchor::End, type_size, "amount name", amounts(*total)));
        for below in [y + 22.0, y + 25.0] {
            shapes.push(line((rule + 6.0, below), (width, below), "rule strong"));
        }
        y += 44.0;
    }
    Drawing { width, height: y - 16.0, shapes }
}

/// A bar from zero, a hairline where it would be thinner than that, nothing for nothing.
fn bar_shape(bars: &Linear, kg: f64, (y, height): (f64, f64), end: End) -> Option<Shape> {
    let (x, width) = (bars.at(0.0), bars.length(kg));
    (kg > 0.0).then_some(if width < 1.0 {
        line((x + 0.5, y), (x + 0.5, y + height), "hair")
    } else {
        Shape::Rect { x, y, width, height, class: end.class(), hatch: end.hatch() }
    })
}

#[cfg(test)]
mod tests {
    use super::*;

    pub(super) fn masses(kg: &[f64]) -> Masses {
        Masses {
            places: kg.iter().enumerate().map(|(i, _)| (format!("place {i}"), End::Waste)).collect(),
            routes: vec![("A".into(), kg.to_vec()), ("B".into(), kg.iter().map(|k| k / 4.0).collect())],
            per: "a year",
        }
    }

    #[test]
    fn bars_are_as_long_as_their_values() {
        let kg = [8.0, 4.0, 1.0, 0.0];
        for size in [Size::Wide, Size::Narrow] {
            let totals = [13.0, 3.25];
            let drawing = draw(&masses(&kg), &totals, ("kg", 1.0), size);
            let widths: Vec<f64> = drawing
                .shapes
                .iter()
                .filter_map(|s| if let Shape::Rect { width, .. } = s { Some(*width) } else { None })
                .collect();
            assert_eq!(widths.len(), 6, "three bars a route, and none for zero");
            for (w, v) in widths.iter().zip([8.0, 4.0, 1.0, 2.0, 1.0, 0.25]) {
                assert!((w / widths[0] - v / 8.0).abs() < 1e-12);
            }
        }
    }

    #[test]
    fn a_huge_value_leaves_hairlines_and_zeros_leave_nothing() {
        let picture = picture("k", &masses(&[1e9, 1e-3, 0.0])).unwrap();
        let hairs =
            |d: &Drawing| d.shapes.iter().filter(|s| matches!(s, Shape::Line { class: "hair", .. })).count();
        assert_eq!((hairs(&picture.wide), hairs(&picture.narrow)), (2, 2));
        let nothing = super::picture("k", &masses(&[0.0, 0.0])).unwrap();
        assert!(!nothing.wide.shapes.iter().any(|s| matches!(s, Shape::Rect { .. })));
        assert!(super::picture("k", &masses(&[])).is_none());
    }
}
