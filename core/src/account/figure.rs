//! Figures as data, and their evaluation over one run.

use crate::chance::{Draw, In};
use crate::ledger::{Cells, Direction, Material, Place, Trace, Utility};
use crate::program::Desk;
use crate::source::Source;

/// What a figure measures, and so in which unit it is shown.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum Measure {
    /// kg
    Mass,
    /// m³ in the core; shown in litres
    Volume,
    /// J in the core; shown in kWh
    Energy,
    /// Whole containers
    Containers,
    /// kg multiplied by a score from 1 to 10
    WeightedMass,
    /// A ratio of two figures
    Ratio,
}

impl Measure {
    /// The unit in which results are written, and what to multiply an SI value with to get there.
    #[must_use]
    pub const fn written(self) -> (&'static str, f64) {
        match self {
            Self::Mass => ("kg", 1.0),
            Self::Volume => ("L", 1000.0),
            Self::Energy => ("kWh", 1.0 / 3.6e6),
            Self::Containers => ("containers", 1.0),
            Self::WeightedMass => ("kg_score", 1.0),
            Self::Ratio => ("ratio", 1.0),
        }
    }

    /// Whether a figure grows with the amount of work.
    #[must_use]
    pub const fn extensive(self) -> bool {
        !matches!(self, Self::Ratio)
    }
}

/// Under which account a figure stands.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum Group {
    /// Where every gram goes.
    Mass,
    /// What leaves as waste.
    Waste,
    /// Carbon dioxide used, vented, recycled.
    CarbonDioxide,
    /// E-factor, process mass intensity and their kin.
    Metric,
    /// Hazard-weighted mass.
    Hazard,
    /// Electricity and water.
    Energy,
}

impl Group {
    /// All, in the order in which they are shown.
    pub const ALL: [Self; 6] =
        [Self::Mass, Self::Waste, Self::CarbonDioxide, Self::Metric, Self::Hazard, Self::Energy];

    /// The title shown.
    #[must_use]
    pub const fn title(self) -> &'static str {
        match self {
            Self::Mass => "Where the mass goes",
            Self::Waste => "Waste",
            Self::CarbonDioxide => "Carbon dioxide",
            Self::Metric => "Mass metrics",
            Self::Hazard => "Hazard-weighted mass",
            Self::Energy => "Electricity and water",
        }
    }
}

/// What a cell is multiplied with.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Factor {
    /// As it stands.
    One,
    /// Subtracted.
    Minus,
    /// Multiplied with a constant.
    Times(f64),
    /// Divided by an input, as a mass by a density.
    Over(In),
}

impl Factor {
    /// What to multiply with, where it is a number; 1 where it is a division.
    const fn number(self) -> f64 {
        match self {
            Self::One | Self::Over(_) => 1.0,
            Self::Minus => -1.0,
            Self::Times(factor) => factor,
        }
    }
}

/// One cell of the book with its factor.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Term {
    /// The place outside the bench.
    pub place: Place,
    /// Which way the mass passed it.
    pub direction: Direction,
    /// The material.
    pub material: Material,
    /// What the cell is multiplied with.
    pub factor: Factor,
    /// Where the cell lies in the book of its route, and the factor as a number, once that is known.
    ready: Option<(u32, f64)>,
}

impl Term {
    /// What has come into a place.
    #[must_use]
    pub const fn into(place: Place, material: Material) -> Self {
        Self { place, direction: Direction::Into, material, factor: Factor::One, ready: None }
    }

    /// What has gone out of a place.
    #[must_use]
    pub const fn out_of(place: Place, material: Material) -> Self {
        Self { place, direction: Direction::OutOf, material, factor: Factor::One, ready: None }
    }

    /// The same cell with another factor.
    #[must_use]
    pub const fn times(mut self, factor: Factor) -> Self {
        self.factor = factor;
        self
    }
}

/// How a figure follows from the book.
#[derive(Clone, Debug, PartialEq)]
pub enum How {
    /// A sum over cells; a year.
    Sum(Vec<Term>),
    /// A utility spent; a year.
    Spent(Utility),
    /// Containers filled or emptied in a year: the volume or mass of another figure over what one container takes, carried over through
    /// the year and rounded up once.
    Containers {
        /// The index of the figure with the volume, or the mass.
        of: usize,
        /// What one container takes; SI.
        takes: f64,
    },
    /// Another figure times a constant.
    Times {
        /// The index of that figure.
        of: usize,
        /// What it is multiplied with; SI.
        factor: f64,
    },
    /// One figure over another.
    Ratio {
        /// The index of the figure above the line.
        over: usize,
        /// The index of the figure below the line.
        under: usize,
    },
}

/// One figure of a route.
#[derive(Clone, Debug, PartialEq)]
pub struct Figure {
    /// Its name for other programs; never reused for another meaning.
    pub id: String,
    /// Its title.
    pub title: String,
    /// Its account.
    pub group: Group,
    /// What it measures.
    pub measure: Measure,
    /// What is counted and what is not.
    pub boundary: String,
    /// The formula in words or symbols.
    pub formula: &'static str,
    /// Where the formula comes from.
    pub source: Source,
    /// How it follows from the book.
    pub how: How,
}

/// The figures of a route while the accounts are drawn up.
#[derive(Debug, Default)]
pub struct Draft {
    pub(super) figures: Vec<Figure>,
}

impl Draft {
    /// Adds a figure and returns its index.
    pub fn add(&mut self, figure: Figure) -> usize {
        self.figures.push(figure);
        self.figures.len() - 1
    }

    /// The figures without the cells that no posting touches. The sequence of postings is the same in every draw, so that
    /// those cells are empty in every draw too.
    pub(super) fn kept_to(mut self, trace: &Trace, cells: &Cells) -> Vec<Figure> {
        let mut touched: Vec<bool> = Vec::new();
        for p in &trace.postings {
            for (place, direction) in [(p.from, Direction::OutOf), (p.to, Direction::Into)] {
                let i = cells.cell(place, direction, p.material) as usize;
                if touched.len() <= i {
                    touched.resize(i + 1, false);
                }
                touched[i] = true;
            }
        }
        for figure in &mut self.figures {
            if let How::Sum(terms) = &mut figure.how {
                terms.retain_mut(|t| {
                    let cell = cells.cell(t.place, t.direction, t.material);
                    t.ready = Some((cell, t.factor.number()));
                    touched.get(cell as usize) == Some(&true)
                });
            }
        }
        self.figures
    }
}

/// Evaluates figures over one run, into `out`: a year for those that grow with the work, SI.
///
/// A ratio over nothing gives 0: such figures are not drawn up in the first place.
pub fn evaluate(figures: &[Figure], desk: &Desk, x: Draw<'_>, out: &mut [f64]) {
    for (i, figure) in figures.iter().enumerate() {
        out[i] = value(figure, desk, x, out);
    }
}

/// As [`evaluate`], of the figures with these indices alone, which have to stand in ascending order with all that they
/// rest on among them: see [`with_what_they_rest_on`].
pub fn evaluate_these(figures: &[Figure], which: &[usize], desk: &Desk, x: Draw<'_>, out: &mut [f64]) {
    for &i in which {
        out[i] = value(&figures[i], desk, x, out);
    }
}

/// The indices of these figures and of those from which they follow, in ascending order.
#[must_use]
pub fn with_what_they_rest_on(figures: &[Figure], wanted: &[usize]) -> Vec<usize> {
    let mut needed = vec![false; figures.len()];
    for &i in wanted {
        needed[i] = true;
    }
    // A figure rests on earlier ones only.
    for i in (0..figures.len()).rev() {
        if needed[i] {
            match figures[i].how {
                How::Containers { of, .. } | How::Times { of, .. } => needed[of] = true,
                How::Ratio { over, under } => (needed[over], needed[under]) = (true, true),
                How::Sum(_) | How::Spent(_) => {}
            }
        }
    }
    (0..figures.len()).filter(|i| needed[*i]).collect()
}

fn value(figure: &Figure, desk: &Desk, x: Draw<'_>, out: &[f64]) -> f64 {
    let value = match &figure.how {
        How::Sum(terms) => {
            let mut sum = 0.0;
            for term in terms {
                let (kg, number) = match term.ready {
                    Some((cell, number)) => (desk.cells.passed_at(cell), number),
                    None => {
                        (desk.cells.passed(term.place, term.direction, term.material), term.factor.number())
                    }
                };
                sum += match term.factor {
                    Factor::Over(slot) => kg / x.get(slot),
                    Factor::One | Factor::Minus | Factor::Times(_) => kg * number,
                };
            }
            sum
        }
        How::Spent(utility) => desk.spent[*utility as usize],
        // n = ⌈V / (V_c · fill)⌉; a hair above a whole number is that number
        How::Containers { of, takes } => libm::ceil(out[*of] / takes - 1e-9),
        How::Times { of, factor } => out[*of] * factor,
        How::Ratio { over, under } => {
            let under = out[*under];
            if under > 0.0 { out[*over] / under } else { 0.0 }
        }
    };
    // A negative zero is a zero.
    value + 0.0
}
