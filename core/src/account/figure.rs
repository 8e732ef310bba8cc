//! Figures as data, and their evaluation over one run.

use crate::chance::{Draw, In};
use crate::ledger::{Cells, Direction, Material, Place, Trace, Utility};
use crate::program::Desk;
use crate::quantity::{Currency, Kind, show, significant};
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
    /// s in the core; shown in hours
    Time,
    /// Whole things
    Count,
    /// Money in a currency, a year
    Money(Currency),
    /// Money in a currency, once
    MoneyOnce(Currency),
    /// kg of CO2-equivalent
    Climate,
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
            Self::Time => ("h", 1.0 / 3600.0),
            Self::Count => ("count", 1.0),
            Self::Money(_) => ("money", 1.0),
            Self::MoneyOnce(_) => ("money_once", 1.0),
            Self::Climate => ("kg_co2e", 1.0),
        }
    }

    /// An amount for people: four significant digits and a unit that suits its size.
    ///
    /// ```
    /// use thimbleworth::account::Measure;
    /// use thimbleworth::quantity::Currency;
    /// assert_eq!(Measure::Mass.shown(0.25), "250 g");
    /// assert_eq!(Measure::Money(Currency::new("USD").unwrap()).shown(12_345.6), "12350 USD");
    /// ```
    #[must_use]
    pub fn shown(self, value_si: f64) -> String {
        match self {
            Self::Mass => show(value_si, Kind::Mass),
            Self::WeightedMass => show(value_si, Kind::Mass) + "·score",
            Self::Climate => show(value_si, Kind::Mass) + " CO2e",
            Self::Volume => show(value_si, Kind::Volume),
            Self::Energy => show(value_si, Kind::Energy),
            Self::Time => significant(value_si / 3600.0, 4) + " h",
            Self::Money(currency) | Self::MoneyOnce(currency) => {
                significant(value_si, 4) + " " + currency.code()
            }
            Self::Containers | Self::Ratio | Self::Count => show(value_si, Kind::Number),
        }
    }

    /// An amount of an interval, its middle or a limit, for people: as [`Measure::shown`], without the digits that the
    /// interval leaves open.
    ///
    /// ```
    /// use thimbleworth::account::Measure;
    /// let shown = [54.65, 39.91, 69.31].map(|kg| Measure::Mass.shown_within(kg, (39.91, 69.31)));
    /// assert_eq!(shown, ["55 kg", "40 kg", "69 kg"]);
    /// ```
    #[must_use]
    pub fn shown_within(self, value_si: f64, (low_si, high_si): (f64, f64)) -> String {
        self.shown(self.rounded(value_si, (high_si - low_si) / 2.0))
    }

    /// A value beside its uncertainty: rounded to the place of the second significant digit of the half width of its
    /// interval, so that no digit is shown that the interval leaves open. As it is where there is no width. Source: JCGM
    /// 100:2008, 7.2.6 (from memory).
    fn rounded(self, value_si: f64, half_width_si: f64) -> f64 {
        // Below a tenth of a kilowatt hour energies are shown in joules.
        let factor = if self == Self::Energy && value_si.abs() < 3.6e5 { 1.0 } else { self.written().1 };
        let width = half_width_si * factor;
        if !(width.is_finite() && width > 0.0) {
            return value_si;
        }
        let mut steps = value_si * factor;
        let (mut width, mut tens) = (width, 0_i32);
        // 9.95 would round to 10 and has its second digit there.
        while width >= 99.5 {
            (width, steps, tens) = (width / 10.0, steps / 10.0, tens + 1);
        }
        while width < 9.95 && tens > -30 {
            (width, steps, tens) = (width * 10.0, steps * 10.0, tens - 1);
        }
        let mut value = libm::rint(steps);
        for _ in 0..tens.abs() {
            value = if tens > 0 { value * 10.0 } else { value / 10.0 };
        }
        value / factor
    }

    /// Whether a figure grows with the amount of work.
    #[must_use]
    pub const fn extensive(self) -> bool {
        !matches!(self, Self::Ratio | Self::Count | Self::MoneyOnce(_))
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
    /// Hours of instruments and people.
    Time,
    /// What it costs.
    Cost,
    /// What warms the climate.
    Climate,
}

impl Group {
    /// All, in the order in which they are shown.
    pub const ALL: [Self; 9] = [
        Self::Mass,
        Self::Waste,
        Self::CarbonDioxide,
        Self::Metric,
        Self::Hazard,
        Self::Energy,
        Self::Time,
        Self::Cost,
        Self::Climate,
    ];

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
            Self::Time => "Time",
            Self::Cost => "Cost",
            Self::Climate => "Climate",
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

/// What a line takes its amount from.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Entry {
    /// One.
    One,
    /// What has passed an outside place; kg a year.
    Cell(Place, Direction, Material),
    /// A utility; a year.
    Spent(Utility),
    /// Extractions a year.
    Extractions,
    /// Batches a year.
    Batches,
    /// An earlier figure, by its index.
    Figure(usize),
    /// The product of two earlier figures.
    Both(usize, usize),
}

/// An entry times factors: entry · number · Π by / over.
#[derive(Clone, Debug, PartialEq)]
pub struct Line {
    /// The entry.
    pub of: Entry,
    /// A constant.
    pub number: f64,
    /// Inputs that it is multiplied with.
    pub by: Vec<In>,
    /// An input that it is divided by.
    pub over: Option<In>,
}

impl Line {
    /// An entry as it stands.
    #[must_use]
    pub const fn of(of: Entry) -> Self {
        Self { of, number: 1.0, by: Vec::new(), over: None }
    }

    /// Multiplied with an input.
    #[must_use]
    pub fn by(mut self, slot: In) -> Self {
        self.by.push(slot);
        self
    }

    /// Divided by an input.
    #[must_use]
    pub const fn over(mut self, slot: In) -> Self {
        self.over = Some(slot);
        self
    }

    /// Multiplied with a constant.
    #[must_use]
    pub const fn times(mut self, number: f64) -> Self {
        self.number *= number;
        self
    }

    /// What the entry is multiplied with.
    pub(super) fn factor(&self, x: Draw<'_>) -> f64 {
        let mut factor = self.number;
        for slot in &self.by {
            factor *= x.get(*slot);
        }
        if let Some(slot) = self.over { factor / x.get(slot) } else { factor }
    }

    fn value(&self, desk: &Desk, x: Draw<'_>, out: &[f64]) -> f64 {
        let entry = match self.of {
            Entry::One => 1.0,
            Entry::Cell(place, direction, material) => desk.cells.passed(place, direction, material),
            Entry::Spent(utility) => desk.spent[utility as usize],
            Entry::Extractions => desk.runs.extractions,
            Entry::Batches => desk.runs.batches,
            Entry::Figure(i) => out[i],
            Entry::Both(i, j) => out[i] * out[j],
        };
        entry * self.factor(x)
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
    /// A sum of entries times factors.
    Lines(Vec<Line>),
    /// Another figure rounded up to a whole number, and not below 0.
    Whole(usize),
    /// One figure over another.
    Ratio {
        /// The index of the figure above the line.
        over: usize,
        /// The index of the figure below the line.
        under: usize,
    },
}

impl How {
    /// The indices of the figures that it follows from, in the order of the formula; none where it follows from the book.
    #[must_use]
    pub fn rests_on(&self) -> Vec<usize> {
        match self {
            Self::Containers { of, .. } | Self::Times { of, .. } | Self::Whole(of) => vec![*of],
            Self::Ratio { over, under } => vec![*over, *under],
            Self::Lines(lines) => {
                let of = |line: &Line| match line.of {
                    Entry::Figure(i) => [Some(i), None],
                    Entry::Both(i, j) => [Some(i), Some(j)],
                    _ => [None, None],
                };
                lines.iter().flat_map(of).flatten().collect()
            }
            Self::Sum(_) | Self::Spent(_) => Vec::new(),
        }
    }
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
            for of in figures[i].how.rests_on() {
                needed[of] = true;
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
        How::Lines(lines) => {
            let mut sum = 0.0;
            for line in lines {
                sum += line.value(desk, x, out);
            }
            sum
        }
        How::Whole(of) => {
            let whole = libm::ceil(out[*of] - 1e-9);
            if whole > 0.0 { whole } else { 0.0 }
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

#[cfg(test)]
mod tests {
    use super::Measure;

    #[test]
    fn what_is_rounded_beside_its_uncertainty_keeps_two_digits_of_it() {
        for (value, width, expected) in [
            (9_507.0, 1_516.0, 9_500.0),
            (12_345.0, 994.9, 12_340.0),
            (12_345.0, 996.0, 12_300.0),
            (0.012_345_6, 0.000_123_4, 0.012_35),
            (-39_430.0, 50_000.0, -39_000.0),
            (0.125, 0.5, 0.12),
            (7.0, f64::NAN, 7.0),
            (7.0, f64::INFINITY, 7.0),
            (0.0, 3.0, 0.0),
        ] {
            let rounded = Measure::Mass.rounded(value, width);
            assert!((rounded - expected).abs() <= 1e-12 * value.abs(), "{value} ± {width}: {rounded}");
        }
        // In kilowatt hours, as they are shown.
        let (kwh, width) = (9_507.3 * 3.6e6, 1_516.0 * 3.6e6);
        assert_eq!(Measure::Energy.shown(Measure::Energy.rounded(kwh, width)), "9500 kWh");
    }
}
