//! Curves over two axes, with a few points that bear names.
use super::co2_map::{around, beside};
use super::label::{Area, Taken};
use super::scale::{Linear, ticks};
use super::shape::{Anchor, Hatch, Shape, Trail, line, text};
use super::{Drawing, Size};

/// One axis.
pub(super) struct Axis<'a> {
    /// What it shows, with its unit.
    pub(super) title: &'a str,
    /// Its ends, in what is drawn.
    pub(super) ends: (f64, f64),
    /// Whether what is drawn is the decimal logarithm of what the scale says.
    pub(super) decades: bool,
}

impl Axis<'_> {
    /// Where the scale has its numbers, and their words.
    fn marks(&self, most: usize) -> Vec<(f64, String)> {
        let (low, high) = self.ends;
        if !self.decades {
            return ticks(low, high, most).into_iter().map(|v| (v, super::letter::written(v, 4))).collect();
        }
        let mut marks = Vec::new();
        for value in [1.0, 10.0, 50.0, 100.0, 200.0, 500.0, 1000.0, 5000.0] {
            let at = f64::log10(value);
            if at >= low - 1e-9 && at <= high + 1e-9 {
                marks.push((at, super::letter::written(value, 4)));
            }
        }
        marks
    }
}

/// A curve through points, or a point with a name where there is one.
pub(super) struct Mark {
    pub(super) points: Vec<(f64, f64)>,
    pub(super) class: &'static str,
    pub(super) name: String,
}

/// Draws marks in order; those of one point as a dot with its name beside it.
pub(super) fn chart(x: &Axis<'_>, y: &Axis<'_>, marks: &[Mark], size: Size) -> Drawing {
    let (width, type_size) = (size.width(), size.text());
    let height = if size.narrow() { 280.0 } else { 380.0 };
    let a = Area {
        left: if size.narrow() { 40.0 } else { 52.0 },
        top: 24.0,
        right: width - 18.0,
        bottom: height - 42.0,
    };
    let across = Linear::new(x.ends, (a.left, a.right));
    let up = Linear::new(y.ends, (a.bottom, a.top));
    let at = |(h, p): (f64, f64)| (across.at(h), up.at(p));
    let mut shapes = vec![
        Shape::Rect {
            x: a.left,
            y: a.top,
            width: a.right - a.left,
            height: a.bottom - a.top,
            class: "frame",
            hatch: Hatch::No,
        },
        text((0.0, 12.0), Anchor::Start, type_size, "soft", y.title),
        text((a.right, a.bottom + 34.0), Anchor::End, type_size, "soft", x.title),
    ];
    for (value, words) in x.marks(if size.narrow() { 5 } else { 8 }) {
        let h = across.at(value);
        shapes.push(line((h, a.bottom), (h, a.bottom + 4.0), "axis"));
        shapes.push(text((h, a.bottom + 18.0), Anchor::Middle, type_size, "scale", words));
    }
    for (value, words) in y.marks(8) {
        let v = up.at(value);
        shapes.push(line((a.left - 4.0, v), (a.left, v), "axis"));
        shapes.push(text((a.left - 6.0, v + type_size * 0.35), Anchor::End, type_size, "scale", words));
    }
    let mut taken = Taken::new(a);
    for mark in marks {
        let drawn: Vec<(f64, f64)> = mark.points.iter().map(|p| at(*p)).collect();
        if drawn.len() > 1 {
            shapes.push(Shape::Path { d: Trail::through(&drawn), class: mark.class, hatch: Hatch::No });
        } else if let Some(point) = drawn.first() {
            taken.take(around(*point, 6.0));
        }
    }
    for mark in marks.iter().filter(|m| m.points.len() == 1) {
        let Some(point) = mark.points.first().map(|p| at(*p)) else { continue };
        shapes.push(Shape::Path {
            d: Trail::circle(point.0, point.1, 4.5),
            class: mark.class,
            hatch: Hatch::No,
        });
        shapes.extend(beside(point, &mark.name, "label", type_size, &mut taken));
    }
    Drawing { width, height, shapes }
}
