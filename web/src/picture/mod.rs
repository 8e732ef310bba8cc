//! Pictures: pure functions from an account to shapes, a title that states what is to be seen, one sentence, and the same
//! figures as a table.
//!
//! Nothing here measures text in a document or knows an event. Every picture is drawn twice, wide and narrow, and the
//! style sheet shows the drawing that fits its column; so text keeps its size on a narrow screen. Looks are classes in
//! `web/style/picture.css`; there are no inline styles, which the page's policy forbids.
//!
//! All bars and bands are to scale from zero. What would be thinner than a pixel is a hairline, with its amount beside it.

mod air_course;
mod books;
mod chart;
mod circuit;
mod co2_lines;
mod co2_map;
mod cost_flow;
mod difference;
mod draw;
mod flow;
mod intervals;
mod label;
mod letter;
mod mass_by_place;
mod over_years;
mod reconciled;
mod scale;
mod shape;
#[cfg(test)]
mod tests;
mod way_down;
mod year;

pub use air_course::air_course;
pub use books::Per;
pub use circuit::{circuit, extraction};
pub use co2_map::co2_map;
pub use cost_flow::cost_flow;
pub use difference::difference;
pub use draw::{Node, plate, to_html, to_svg_text};
pub use flow::flow;
pub use intervals::intervals;
pub use letter::text_width;
pub use mass_by_place::mass_by_place;
pub use over_years::over_years;
pub use reconciled::reconciled;
pub use shape::{Anchor, Hatch, Shape, Trail};
pub use way_down::way_down;
pub use year::{load, stock};

/// A picture.
#[derive(Clone, Debug, PartialEq)]
pub struct Picture {
    /// What its ids start with; unique on the page.
    pub key: String,
    /// What is to be seen.
    pub title: String,
    /// One sentence, computed from the figures.
    pub description: String,
    /// What the drawing cannot show, and how to read it.
    pub notes: Vec<String>,
    /// The same figures as text.
    pub tables: Vec<Table>,
    /// For a wide column and for paper.
    pub wide: Drawing,
    /// For a narrow column.
    pub narrow: Drawing,
}

/// One drawing.
#[derive(Clone, Debug, PartialEq)]
pub struct Drawing {
    /// Width; pixels.
    pub width: f64,
    /// Height; pixels.
    pub height: f64,
    /// The shapes, the first at the bottom.
    pub shapes: Vec<Shape>,
}

/// The figures of a picture as a table.
#[derive(Clone, Debug, Default, PartialEq, Eq)]
pub struct Table {
    /// What it holds, with its unit where all figures share one.
    pub caption: String,
    /// The columns.
    pub head: Vec<Head>,
    /// The rows; the first cell names the row.
    pub rows: Vec<Vec<String>>,
}

/// The head of a column.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Head {
    /// Its words, with the unit.
    pub text: String,
    /// Whether the column holds numbers.
    pub number: bool,
}

impl Head {
    fn words(text: &str) -> Self {
        Self { text: text.to_owned(), number: false }
    }

    fn number(text: &str) -> Self {
        Self { text: text.to_owned(), number: true }
    }
}

/// For which column a drawing is made.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
enum Size {
    Wide,
    Narrow,
}

impl Size {
    const fn width(self) -> f64 {
        match self {
            Self::Wide => 640.0,
            Self::Narrow => 240.0,
        }
    }

    /// The size of ordinary text.
    const fn text(self) -> f64 {
        match self {
            Self::Wide => 13.0,
            Self::Narrow => 12.0,
        }
    }

    const fn narrow(self) -> bool {
        matches!(self, Self::Narrow)
    }
}
