//! The few shapes that pictures are made of, and a path as it is drawn.

use std::fmt::Write;

/// Where a text stands beside its point.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Anchor {
    /// It starts there.
    Start,
    /// Its middle is there.
    Middle,
    /// It ends there.
    End,
}

/// Lines over a fill, so that it differs from its neighbours without colour.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Hatch {
    /// The fill alone.
    No,
    /// Slanting lines.
    Lines,
    /// Dots.
    Dots,
}

/// One shape. How it looks is said by its class alone (see `web/style/picture.css`).
#[derive(Clone, Debug, PartialEq)]
pub enum Shape {
    /// An upright rectangle.
    Rect {
        /// Left edge.
        x: f64,
        /// Top edge.
        y: f64,
        /// Width.
        width: f64,
        /// Height.
        height: f64,
        /// Class.
        class: &'static str,
        /// Lines over the fill.
        hatch: Hatch,
    },
    /// A straight line.
    Line {
        /// From here.
        from: (f64, f64),
        /// To here.
        to: (f64, f64),
        /// Class.
        class: &'static str,
    },
    /// A path.
    Path {
        /// The path.
        d: Trail,
        /// Class.
        class: &'static str,
        /// Lines over the fill.
        hatch: Hatch,
    },
    /// One line of text.
    Text {
        /// Where it is anchored, on its baseline.
        at: (f64, f64),
        /// How it stands beside that point.
        anchor: Anchor,
        /// Type size.
        size: f64,
        /// Class.
        class: &'static str,
        /// The text.
        text: String,
    },
}

/// A text.
#[must_use]
pub(super) fn text(
    at: (f64, f64),
    anchor: Anchor,
    size: f64,
    class: &'static str,
    text: impl Into<String>,
) -> Shape {
    Shape::Text { at, anchor, size, class, text: text.into() }
}

/// A line.
#[must_use]
pub(super) const fn line(from: (f64, f64), to: (f64, f64), class: &'static str) -> Shape {
    Shape::Line { from, to, class }
}

/// A path under construction.
#[derive(Clone, Debug, Default, PartialEq, Eq)]
pub struct Trail(String);

impl Trail {
    /// A path that starts here.
    #[must_use]
    pub fn from(x: f64, y: f64) -> Self {
        Self(format!("M{} {}", pixel(x), pixel(y)))
    }

    /// Straight through these points; empty without any.
    #[must_use]
    pub fn through(points: &[(f64, f64)]) -> Self {
        let Some(((x, y), rest)) = points.split_first() else { return Self::default() };
        rest.iter().fold(Self::from(*x, *y), |trail, (x, y)| trail.to(*x, *y))
    }

    /// Straight on to here.
    #[must_use]
    pub fn to(mut self, x: f64, y: f64) -> Self {
        // Writing to a string cannot fail.
        let _ = write!(self.0, "L{} {}", pixel(x), pixel(y));
        self
    }

    /// To here in an S that leaves and arrives level.
    #[must_use]
    pub fn level_to(mut self, from_x: f64, from_y: f64, x: f64, y: f64) -> Self {
        let middle = pixel((from_x + x) / 2.0);
        let _ = write!(self.0, "C{middle} {} {middle} {} {} {}", pixel(from_y), pixel(y), pixel(x), pixel(y));
        self
    }

    /// Back to the start.
    #[must_use]
    pub fn closed(mut self) -> Self {
        self.0.push('Z');
        self
    }

    /// A circle.
    #[must_use]
    pub fn circle(x: f64, y: f64, r: f64) -> Self {
        let (left, right, r, y) = (pixel(x - r), pixel(x + r), pixel(r), pixel(y));
        Self(format!("M{left} {y}A{r} {r} 0 1 1 {right} {y}A{r} {r} 0 1 1 {left} {y}Z"))
    }

    /// As SVG writes it.
    #[must_use]
    pub fn as_str(&self) -> &str {
        &self.0
    }
}

/// A number of pixels to two decimals, without a negative zero.
#[must_use]
pub(super) fn pixel(value: f64) -> String {
    let hundredths = (value * 100.0).round() + 0.0;
    format!("{}", hundredths / 100.0)
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn pixels_are_short() {
        for (value, text) in [(0.0, "0"), (-0.001, "0"), (1.0, "1"), (1.256, "1.26"), (-3.5, "-3.5")] {
            assert_eq!(pixel(value), text);
        }
    }

    #[test]
    fn trails() {
        assert_eq!(Trail::through(&[]).as_str(), "");
        assert_eq!(Trail::from(0.0, 1.0).to(2.0, 3.0).closed().as_str(), "M0 1L2 3Z");
        assert_eq!(Trail::from(0.0, 0.0).level_to(0.0, 0.0, 10.0, 4.0).as_str(), "M0 0C5 0 5 4 10 4");
    }
}
