//! What a mixture of solvents comes to while it is taken down.
use super::chart::{Axis, Mark, chart};
use super::letter::written;
use super::{Head, Picture, Size, Table};
use thimbleworth::account::BatchPath;
use thimbleworth::quantity::{Kind, show};

/// The shares of the liquid over what is left of it.
#[must_use]
pub fn way_down(key: &str, route: &str, path: &BatchPath) -> Option<Picture> {
    let (first, last) = (path.points.first()?, path.points.last()?);
    let left = |volume_m3: f64| 100.0 * volume_m3 / first.volume_m3;
    let spaced = |value, kind| show(value, kind).replace(' ', "\u{a0}");
    let mut marks = Vec::new();
    let mut words = Vec::new();
    for (i, name) in path.names.iter().enumerate() {
        let at = |p: &thimbleworth::account::BatchPoint| {
            (f64::log10(left(p.volume_m3)), 100.0 * p.liquid.get(i).copied().unwrap_or(0.0))
        };
        marks.push(Mark {
            points: path.points.iter().map(at).collect(),
            class: "saturation",
            name: String::new(),
        });
        marks.push(Mark { points: vec![at(last)], class: "mark", name: name.clone() });
        words.push(format!("{name} from {} to {}\u{202f}%", written(at(first).1, 3), written(at(last).1, 3)));
    }
    let x =
        Axis { title: "volume left (%)", ends: (f64::log10(left(last.volume_m3)) - 0.1, 2.0), decades: true };
    let y = Axis { title: "of the liquid's mass (%)", ends: (0.0, 105.0), decades: false };
    let mut head = vec![Head::number("Left (%)"), Head::number("°C"), Head::number("mbar")];
    head.extend(path.names.iter().map(|name| Head::number(name)));
    let rows = path.points.iter().map(|p| {
        let mut row = vec![
            written(left(p.volume_m3), 3),
            written(p.temperature_k - 273.15, 3),
            written(p.pressure_pa / 100.0, 3),
        ];
        row.extend(p.liquid.iter().map(|x| written(100.0 * x, 3)));
        row
    });
    Some(Picture {
        key: key.to_owned(),
        title: format!(
            "{route}: {} taken down to {}",
            spaced(first.volume_m3, Kind::Volume),
            spaced(last.volume_m3, Kind::Volume)
        ),
        description: format!(
            "By mass, {}; it boils at {} under {} at first, at {} under {} at last.",
            words.join(", "),
            spaced(first.temperature_k, Kind::Temperature),
            spaced(first.pressure_pa, Kind::Pressure),
            spaced(last.temperature_k, Kind::Temperature),
            spaced(last.pressure_pa, Kind::Pressure)
        ),
        notes: vec!["A single stage: what a column parts better ends purer.".to_owned()],
        tables: vec![Table {
            caption: "On the way down, liquid in % by mass".to_owned(),
            head,
            rows: rows.collect(),
        }],
        wide: chart(&x, &y, &marks, Size::Wide),
        narrow: chart(&x, &y, &marks, Size::Narrow),
    })
}
