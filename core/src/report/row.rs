//! One figure in every unit of work, in the unit in which it is written.

use crate::account::{Figure, Measure, RouteAccount};

/// Name and version, as documents show them.
pub const PROGRAM: &str = concat!("Thimbleworth ", env!("CARGO_PKG_VERSION"));

/// A month is a twelfth of the year: an average, not a calendar month.
pub(super) const MONTHS: f64 = 12.0;

/// A figure in the unit in which results are written.
#[derive(Clone, Debug, PartialEq)]
pub(super) enum Row {
    /// It grows with the work.
    Extensive { per_result: f64, per_batch: f64, per_month: f64, per_year: f64, per_kg_product: Option<f64> },
    /// It does not.
    Ratio(f64),
}

impl Row {
    /// The row of a figure whose value is given in SI, for a year.
    pub(super) fn of(account: &RouteAccount, figure: &Figure, value_si: f64) -> Self {
        let measure = figure.measure;
        let value = written(measure, value_si);
        let shared = written(measure, account.shared(figure, value_si));
        if measure.extensive() {
            Self::Extensive {
                per_result: account.per_result(shared),
                per_batch: account.per_batch(shared),
                per_month: shared / MONTHS,
                per_year: value,
                per_kg_product: account.per_kg_product(shared),
            }
        } else {
            Self::Ratio(value)
        }
    }
}

/// A value in SI in the unit in which it is written; never minus zero.
pub(super) fn written(measure: Measure, value_si: f64) -> f64 {
    value_si * measure.written().1 + 0.0
}

/// The figures of a route with their values.
pub(super) fn figures(account: &RouteAccount) -> impl Iterator<Item = (&Figure, f64)> {
    account.figures.iter().zip(account.values.iter().copied())
}

/// The unit as it stands in a key of the result.
pub(super) const fn key_unit(measure: Measure) -> &'static str {
    match measure {
        Measure::Mass => "kg",
        Measure::Volume => "l",
        Measure::Energy => "kwh",
        Measure::Containers => "containers",
        Measure::WeightedMass => "kg_score",
        Measure::Ratio => "ratio",
        Measure::Time => "h",
        Measure::Count => "count",
        Measure::Money(_) => "money",
        Measure::MoneyOnce(_) => "money_once",
        Measure::Climate => "kg_co2e",
    }
}

/// The unit of a yearly figure as it stands in a key of a document.
pub(super) fn yearly(measure: Measure) -> String {
    let unit = key_unit(measure);
    if measure.extensive() { format!("{unit}_per_year") } else { unit.to_owned() }
}
