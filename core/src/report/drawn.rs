//! A sampled run beside an account: the interval of each figure for reports that show central values.

use crate::account::Measure;
use crate::chance::Summary;
use crate::odds::{RouteColumns, Sampled};

/// A sampled run, and which share of the draws an interval holds.
#[derive(Clone, Copy)]
pub struct Drawn<'a> {
    /// The run; its figures are those for which an interval is shown.
    pub sampled: &'a Sampled,
    /// The share, such as 0.95.
    pub coverage: f64,
}

/// The draws of one route, or none.
#[derive(Clone, Copy)]
pub(super) struct Spreads<'a>(Option<(&'a RouteColumns, f64)>);

impl<'a> Spreads<'a> {
    pub(super) fn of(drawn: Option<Drawn<'a>>, workload: usize, route: usize) -> Self {
        Self(drawn.and_then(|d| Some((d.sampled.route(workload, route)?, d.coverage))))
    }

    /// Whether there are draws.
    pub(super) const fn there(self) -> bool {
        self.0.is_some()
    }

    /// What the draws of a figure say; `None` without draws, and where too few ran.
    pub(super) fn get(self, id: &str) -> Option<Summary> {
        let (columns, coverage) = self.0?;
        columns.summary(id, coverage)
    }

    /// Lower and upper limit in words; "not known" for the first where there are draws, but no interval.
    pub(super) fn limits(self, id: &str, measure: Measure) -> [String; 2] {
        self.get(id).map_or_else(
            || ["not known".to_owned(), String::new()],
            |s| {
                let limits = (s.symmetric.low, s.symmetric.high);
                [limits.0, limits.1].map(|limit| measure.shown_within(limit, limits))
            },
        )
    }
}
