//! The flow of one route: what comes in at the left, where it ends at the right, every band as wide as its mass. What returns
//! to the store is folded back under the rest.

use super::books::{
    End, Per, few, fills, into_places, mass, mass_unit, mass_with_unit, material_name, money_unit, percent,
    place_name,
};
use super::letter::{text_width, wrap};
use super::shape::{Anchor, Hatch, Shape, Trail, line, text};
use super::{Drawing, Head, Picture, Size, Table};
use thimbleworth::account::Account;
use thimbleworth::ledger::{Material, Place};
use thimbleworth::letter::small_text;
use thimbleworth::order;
use thimbleworth::quantity::Currency;

/// What flows; masses in kg, or money.
pub(super) struct Flow {
    pub(super) route: String,
    /// In which currency, where it is money that flows.
    pub(super) currency: Option<Currency>,
    pub(super) per: &'static str,
    /// Name, how it came ("drawn", "feed"), mass.
    pub(super) sources: Vec<(String, &'static str, f64)>,
    /// Name, kind, mass. What returns to the store is the last, where there is any.
    pub(super) ends: Vec<(String, End, f64)>,
    /// From which source to which end, and how much.
    pub(super) links: Vec<(usize, usize, f64)>,
}

/// The picture of one route; `None` where it has no account, nothing moves, or there is nothing to give amounts for.
#[must_use]
pub fn flow(key: &str, account: &Account, workload: usize, route: usize, per: Per) -> Option<Picture> {
    let program = account.program.as_ref()?;
    let routed = program.workloads.get(workload)?.routes.get(route)?;
    let book = account.workloads.get(workload)?.routes.get(route)?.as_ref()?;
    per.of(book, 1.0)?;
    let scaled = |kg: f64| per.of(book, kg).unwrap_or(0.0);

    // A material that is both fed and drawn is one source: whose gram ends where cannot be told.
    let mut came: Vec<(Material, f64, f64)> = Vec::new();
    for p in &book.trace.postings {
        let kg = p.kg_a_year();
        if !(kg > 0.0 && kg.is_finite()) || (p.from != Place::FEED && p.from != Place::STORE) {
            continue;
        }
        let (fed, drawn) = if p.from == Place::FEED { (kg, 0.0) } else { (0.0, kg) };
        match came.iter_mut().find(|(m, ..)| *m == p.material) {
            Some((_, f, d)) => (*f, *d) = (*f + fed, *d + drawn),
            None => came.push((p.material, fed, drawn)),
        }
    }
    // The largest first, then in the order of the book.
    order::sort(&mut came, &|a, b| (b.1 + b.2, a.0) < (a.1 + a.2, b.0));
    let mut places = into_places(book);
    order::sort(&mut places, &|a, b| (a.0 == Place::STORE, b.1, a.0) < (b.0 == Place::STORE, a.1, b.0));
    let mut links = Vec::new();
    for (s, (material, ..)) in came.iter().enumerate() {
        for (e, (place, _)) in places.iter().enumerate() {
            let mut kg = 0.0;
            for p in book.trace.postings.iter().filter(|p| p.material == *material) {
                if p.to == *place {
                    kg += p.kg_a_year();
                } else if p.from == *place && place.stream_index().is_some() {
                    kg -= p.kg_a_year();
                }
            }
            if kg > 0.0 && kg.is_finite() {
                links.push((s, e, scaled(kg)));
            }
        }
    }
    let how = |fed: f64, drawn: f64| match (fed > 0.0, drawn > 0.0) {
        (true, true) => "fed and drawn",
        (true, false) => "feed",
        _ => "drawn",
    };
    let flow = Flow {
        currency: None,
        route: routed.name.clone(),
        per: per.words(),
        sources: came
            .iter()
            .map(|(m, f, d)| (material_name(routed, *m).to_owned(), how(*f, *d), scaled(f + d)))
            .collect(),
        ends: places
            .iter()
            .map(|(p, kg)| {
                let name = if *p == Place::STORE { BACK.to_owned() } else { place_name(&program.site, *p) };
                (name, End::of(*p), scaled(*kg))
            })
            .collect(),
        links,
    };
    picture(key, &flow)
}

const BACK: &str = "back to the store";

pub(super) fn picture(key: &str, flow: &Flow) -> Option<Picture> {
    let total = sum(flow.sources.iter().map(|s| s.2));
    if !(total > 0.0 && total.is_finite()) {
        return None;
    }
    let largest = flow.ends.iter().max_by(|a, b| a.2.total_cmp(&b.2))?;
    let money = flow.currency.map(|currency| money_unit(total, currency));
    let unit = money.as_ref().map_or_else(|| mass_unit(total), |(words, over)| (words.as_str(), *over));
    let what = if flow.currency.is_some() { "Cost" } else { "Mass" };
    let title = format!(
        "{}: {} of what comes in goes {}",
        flow.route,
        percent(largest.2 / total),
        whither(&largest.0, largest.1)
    );
    let ends: Vec<String> = flow
        .ends
        .iter()
        .map(|(name, end, kg)| format!("{} {}", mass_with_unit(*kg, unit), whither(name, *end)))
        .collect();
    let description = format!(
        "What comes in, {} {}, goes to these places: {}.",
        mass_with_unit(total, unit),
        flow.per,
        few(&ends)
    );
    let heading = format!("{} {}", unit.0, flow.per);
    let mut rows: Vec<Vec<String>> = flow
        .links
        .iter()
        .map(|(s, e, kg)| {
            let source = &flow.sources[*s];
            let end = &flow.ends[*e];
            vec![source.0.clone(), source.1.to_owned(), end.0.clone(), mass(*kg, unit), percent(kg / total)]
        })
        .collect();
    for (name, how, kg) in &flow.sources {
        rows.push(vec![
            name.clone(),
            (*how).to_owned(),
            "all places".into(),
            mass(*kg, unit),
            percent(kg / total),
        ]);
    }
    for (name, _, kg) in &flow.ends {
        rows.push(vec![
            "all materials".into(),
            String::new(),
            name.clone(),
            mass(*kg, unit),
            percent(kg / total),
        ]);
    }
    let all = ["all materials", "", "all places"].map(str::to_owned).into_iter();
    rows.push(all.chain([mass(total, unit), percent(1.0)]).collect());
    let kinds: Vec<End> = flow.ends.iter().map(|e| e.1).collect();
    Some(Picture {
        key: key.to_owned(),
        title,
        description,
        notes: vec![format!(
            "Bands are as wide as their {}; what would be thinner than a pixel is a thin line. {}",
            small_text(what),
            fills(&kinds)
        )],
        tables: vec![Table {
            caption: format!("Flow of {}, {heading}", flow.route),
            head: vec![
                Head::words("Material"),
                Head::words("Comes as"),
                Head::words("Goes to"),
                Head::number(&format!("{what} ({heading})")),
                Head::number("Share of all that comes in"),
            ],
            rows,
        }],
        wide: draw(flow, total, unit, Size::Wide),
        narrow: draw(flow, total, unit, Size::Narrow),
    })
}

/// "to hood", "back to the store".
fn whither(name: &str, end: End) -> String {
    if end == End::Back { name.to_owned() } else { format!("to {name}") }
}

fn sum(values: impl Iterator<Item = f64>) -> f64 {
    values.fold(0.0, |a, b| a + b)
}

/// A node at one side: its top and height, and its label.
struct Stop {
    top: f64,
    height: f64,
    label: Vec<String>,
}

/// A band: the tops at both sides, and its width.
struct Band {
    from: f64,
    to: f64,
    width: f64,
    end: usize,
}

const STOP: f64 = 7.0;

/// Stops one under another, each with room for its label; returns them and the bottom.
fn stops(labels: Vec<(Vec<String>, f64)>, step: f64, top: f64) -> (Vec<Stop>, f64) {
    let mut y = top;
    let mut out = Vec::new();
    for (label, height) in labels {
        let room = label.len() as f64 * step;
        let slot = if height > room { height } else { room };
        out.push(Stop { top: y + (slot - height) / 2.0, height, label });
        y += slot + 8.0;
    }
    (out, y)
}

fn bands(flow: &Flow, left: &[Stop], right: &[Stop], scale: f64) -> Vec<Band> {
    let mut out_at: Vec<f64> = left.iter().map(|s| s.top).collect();
    let mut in_at: Vec<f64> = right.iter().map(|s| s.top).collect();
    let mut bands = Vec::new();
    // In the order of sources and ends, so that bands beside each other do not cross at their stops.
    for (s, e, kg) in &flow.links {
        let (Some(from), Some(to)) = (out_at.get_mut(*s), in_at.get_mut(*e)) else { continue };
        let width = kg * scale;
        bands.push(Band { from: *from, to: *to, width, end: *e });
        *from += width;
        *to += width;
    }
    bands
}

fn draw(flow: &Flow, total: f64, unit: (&str, f64), size: Size) -> Drawing {
    let (width, type_size) = (size.width(), size.text());
    let (column, height) = if size.narrow() { (88.0, 200.0) } else { (176.0, 240.0) };
    let step = type_size + 3.0;
    let (x_left, x_right) = (column, width - column - STOP);
    let scale = height / total;
    let words = column - 8.0;
    let labelled = |name: &str, how: &str, kg: f64| {
        let mut lines = wrap(name, words, type_size, 2);
        let amount = mass_with_unit(kg, unit);
        let longer = format!("{how} {amount}");
        let fits = !how.is_empty() && text_width(&longer, type_size) <= words;
        match (how.is_empty(), fits) {
            (_, true) => lines.push(longer),
            (true, false) if text_width(&amount, type_size) <= words => lines.push(amount),
            (true, false) => lines.extend([mass(kg, unit), unit.0.to_owned()]),
            (false, false) => lines.extend([how.to_owned(), amount]),
        }
        lines
    };
    let top = step + 10.0;
    let (left, left_bottom) = stops(
        flow.sources.iter().map(|(n, how, kg)| (labelled(n, how, *kg), kg * scale)).collect(),
        step,
        top,
    );
    let back = flow.ends.iter().position(|e| e.1 == End::Back);
    let forward = || flow.ends.iter().filter(|e| e.1 != End::Back);
    let (mut right, right_bottom) =
        stops(forward().map(|(n, _, kg)| (labelled(n, "", *kg), kg * scale)).collect(), step, top);
    let mut bottom = if left_bottom > right_bottom { left_bottom } else { right_bottom };
    let mut shapes = vec![
        text((x_left + STOP, type_size), Anchor::End, type_size, "soft", "comes in"),
        text((x_right, type_size), Anchor::Start, type_size, "soft", "goes to"),
    ];
    if let Some(back) = back {
        let (name, _, kg) = &flow.ends[back];
        let thick = kg * scale;
        let label = labelled(name, "", *kg);
        let room = label.len() as f64 * step;
        // The way back runs under every source.
        let above = left_bottom + 4.0 - thick;
        let fold = if right_bottom > above { right_bottom } else { above };
        right.push(Stop { top: fold, height: thick, label });
        let under = fold + thick + 2.0;
        let end = under + if thick > 1.0 { thick } else { 1.0 };
        shapes.extend(way_back(x_left, x_right, under, thick));
        // The fold itself, from the band that arrives to the band that leaves.
        shapes.push(Shape::Rect {
            x: x_right,
            y: fold,
            width: STOP,
            height: end - fold,
            class: "stop",
            hatch: Hatch::No,
        });
        let base = (under + end) / 2.0 + type_size * 0.35;
        shapes.push(text((x_left - 6.0, base), Anchor::End, type_size, "soft", "drawn again"));
        bottom = [end + step, fold + room + 8.0].into_iter().fold(bottom, |a, b| if b > a { b } else { a });
    }
    let mut bands = bands(flow, &left, &right, scale);
    // The thin ones on top.
    order::sort(&mut bands, &|a, b| a.width > b.width);
    for band in bands {
        let kind = flow.ends.get(band.end).map_or(End::Other, |e| e.1);
        shapes.push(band_shape(&band, kind, x_left + STOP, x_right));
    }
    for stop in &left {
        shapes.extend(stop_shapes(stop, x_left, Anchor::End, x_left - 6.0, (type_size, step)));
    }
    for stop in &right {
        shapes.extend(stop_shapes(stop, x_right, Anchor::Start, x_right + STOP + 6.0, (type_size, step)));
    }
    Drawing { width, height: bottom, shapes }
}

fn band_shape(band: &Band, kind: End, x0: f64, x1: f64) -> Shape {
    let (from, to) = (band.from + band.width / 2.0, band.to + band.width / 2.0);
    if band.width < 1.0 {
        let d = Trail::from(x0, from).level_to(x0, from, x1, to);
        return Shape::Path { d, class: "hair", hatch: Hatch::No };
    }
    let (low_from, low_to) = (band.from + band.width, band.to + band.width);
    let d = Trail::from(x0, band.from)
        .level_to(x0, band.from, x1, band.to)
        .to(x1, low_to)
        .level_to(x1, low_to, x0, low_from)
        .closed();
    let class = match kind {
        End::Kept => "band fill-kept",
        End::Waste => "band fill-waste",
        End::Air => "band fill-air",
        End::Other => "band fill-other",
        End::Back => "band fill-back",
    };
    Shape::Path { d, class, hatch: kind.hatch() }
}

/// The straight band that leads back to the left, with a head.
fn way_back(x_left: f64, x_right: f64, y: f64, thick: f64) -> Vec<Shape> {
    let head = if thick > 24.0 { 12.0 } else { thick / 2.0 };
    let head = if head < 4.0 { 4.0 } else { head };
    let middle = y + thick / 2.0;
    let arrow = |half: f64| {
        Trail::from(x_left, middle).to(x_left + head, middle - half).to(x_left + head, middle + half).closed()
    };
    if thick < 1.0 {
        return vec![
            line((x_left + head, middle), (x_right, middle), "hair"),
            Shape::Path { d: arrow(head), class: "stop", hatch: Hatch::No },
        ];
    }
    let d = Trail::from(x_left, middle)
        .to(x_left + head, y)
        .to(x_right, y)
        .to(x_right, y + thick)
        .to(x_left + head, y + thick)
        .closed();
    vec![Shape::Path { d, class: "band fill-back", hatch: Hatch::No }]
}

fn stop_shapes(stop: &Stop, x: f64, anchor: Anchor, label_x: f64, (size, step): (f64, f64)) -> Vec<Shape> {
    let middle = stop.top + stop.height / 2.0;
    let mut shapes = vec![if stop.height < 1.0 {
        line((x, middle), (x + STOP, middle), "hair")
    } else {
        Shape::Rect { x, y: stop.top, width: STOP, height: stop.height, class: "stop", hatch: Hatch::No }
    }];
    let first = middle - (stop.label.len() as f64 - 1.0) * step / 2.0 + size * 0.35;
    let last = stop.label.len().saturating_sub(1);
    for (i, words) in stop.label.iter().enumerate() {
        let class = if i == last { "amount" } else { "" };
        shapes.push(text((label_x, first + i as f64 * step), anchor, size, class, words.clone()));
    }
    shapes
}

#[cfg(test)]
mod tests {
    use super::*;

    fn sample() -> Flow {
        Flow {
            currency: None,
            route: "A".into(),
            per: "a year",
            sources: vec![
                ("hexane".into(), "drawn", 90.0),
                ("soil".into(), "feed", 10.0),
                ("ink".into(), "drawn", 1e-6),
            ],
            ends: vec![
                ("waste".into(), End::Waste, 40.0),
                ("hood".into(), End::Air, 10.000_001),
                (BACK.into(), End::Back, 50.0),
            ],
            links: vec![(0, 0, 30.0), (0, 1, 10.0), (0, 2, 50.0), (1, 0, 10.0), (2, 1, 1e-6)],
        }
    }

    #[test]
    fn bands_fill_their_stops_on_both_sides() {
        let flow = sample();
        let scale = 2.4;
        let label = |_: &()| vec!["x".to_owned()];
        let (left, _) = stops(flow.sources.iter().map(|s| (label(&()), s.2 * scale)).collect(), 16.0, 0.0);
        let (right, _) = stops(flow.ends.iter().map(|e| (label(&()), e.2 * scale)).collect(), 16.0, 0.0);
        let found = bands(&flow, &left, &right, scale);
        let all = sum(found.iter().map(|b| b.width));
        assert!((all - sum(left.iter().map(|s| s.height))).abs() < 1e-9);
        assert!((all - sum(right.iter().map(|s| s.height))).abs() < 1e-9);
        for (s, stop) in left.iter().enumerate() {
            let widths = flow.links.iter().zip(&found).filter(|(l, _)| l.0 == s).map(|(_, b)| b.width);
            assert!((sum(widths) - stop.height).abs() < 1e-9);
        }
        for band in &found {
            let stop = &right[band.end];
            assert!(band.to >= stop.top - 1e-9 && band.to + band.width <= stop.top + stop.height + 1e-9);
        }
    }

    #[test]
    fn what_is_thinner_than_a_pixel_is_a_hairline_and_nothing_is_no_picture() {
        let picture = picture("k", &sample()).unwrap();
        let hairs = |s: &&Shape| matches!(s, Shape::Path { class: "hair", .. });
        assert_eq!(picture.wide.shapes.iter().filter(hairs).count(), 1);
        assert!(picture.title.contains("50\u{202f}%"));
        let nothing = Flow { sources: Vec::new(), ends: Vec::new(), links: Vec::new(), ..sample() };
        assert!(super::picture("k", &nothing).is_none());
    }
}
