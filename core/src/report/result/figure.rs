//! Figures and differences: flat rows whose keys name the unit.

use super::super::row::{Row, figures, key_unit, written, yearly};
use crate::account::{Figure, Measure, RouteAccount};
use crate::compare::{Cause, Comparison, Difference};
use crate::program::WorkloadProgram;
use serde::Serialize;
use serde::ser::{SerializeMap, Serializer};

/// One figure in every unit of work.
pub(crate) struct FigureRow<'a> {
    figure: &'a Figure,
    row: Row,
}

impl<'a> FigureRow<'a> {
    pub(crate) fn of(account: &RouteAccount, figure: &'a Figure, value_si: f64) -> Self {
        Self { figure, row: Row::of(account, figure.measure, value_si) }
    }

    pub(super) fn all(account: &'a RouteAccount) -> Vec<Self> {
        figures(account).map(|(figure, value_si)| Self::of(account, figure, value_si)).collect()
    }
}

impl Serialize for FigureRow<'_> {
    fn serialize<S: Serializer>(&self, serializer: S) -> Result<S::Ok, S::Error> {
        let Figure { id, title, group, measure, boundary, formula, source, .. } = self.figure;
        let mut map = serializer.serialize_map(None)?;
        map.serialize_entry("id", id)?;
        map.serialize_entry("title", title)?;
        map.serialize_entry("group", group.title())?;
        map.serialize_entry("boundary", boundary)?;
        map.serialize_entry("formula", formula)?;
        map.serialize_entry("source", source.cite)?;
        map.serialize_entry("standing", source.standing.words())?;
        match &self.row {
            Row::Ratio(value) => map.serialize_entry("ratio", value)?,
            Row::Extensive { per_result, per_batch, per_month, per_year, per_kg_product } => {
                let unit = key_unit(*measure);
                map.serialize_entry(&format!("{unit}_per_result"), per_result)?;
                map.serialize_entry(&format!("{unit}_per_batch"), per_batch)?;
                map.serialize_entry(&format!("{unit}_per_month"), per_month)?;
                map.serialize_entry(&format!("{unit}_per_year"), per_year)?;
                map.serialize_entry(&format!("{unit}_per_kg_product"), per_kg_product)?;
            }
        }
        map.end()
    }
}

/// The comparison of one workload: every route beside the present one.
#[derive(Serialize)]
pub(super) struct ComparisonDocument<'a> {
    present: &'a str,
    routes: Vec<RouteDocument<'a>>,
}

#[derive(Serialize)]
struct RouteDocument<'a> {
    name: &'a str,
    finding: String,
    better: Vec<String>,
    worse: Vec<String>,
    doubts: Vec<String>,
    differences: Vec<DifferenceRow>,
}

impl<'a> ComparisonDocument<'a> {
    pub(super) fn of(work: &'a WorkloadProgram, comparison: Comparison) -> Self {
        let name = |i: usize| work.routes.get(i).map_or("", |r| r.name.as_str());
        let routes = comparison.routes.into_iter().map(|r| RouteDocument {
            name: name(r.route),
            finding: r.finding,
            better: r.better,
            worse: r.worse,
            doubts: r.doubts,
            differences: r.differences.into_iter().map(DifferenceRow).collect(),
        });
        Self { present: name(comparison.present), routes: routes.collect() }
    }
}

struct DifferenceRow(Difference);

impl Serialize for DifferenceRow {
    fn serialize<S: Serializer>(&self, serializer: S) -> Result<S::Ok, S::Error> {
        let d = &self.0;
        let unit = yearly(d.measure);
        let value = |si: Option<f64>| si.map(|v| written(d.measure, v));
        let mut map = serializer.serialize_map(None)?;
        map.serialize_entry("id", &d.id)?;
        map.serialize_entry("title", &d.title)?;
        map.serialize_entry(&format!("present_{unit}"), &value(d.present))?;
        map.serialize_entry(&format!("route_{unit}"), &value(d.other))?;
        map.serialize_entry(&format!("change_{unit}"), &value(d.change))?;
        map.serialize_entry("route_over_present", &d.ratio)?;
        let causes: Vec<_> = d.causes.iter().map(|c| CauseRow(c, d.measure)).collect();
        map.serialize_entry("causes", &causes)?;
        map.end()
    }
}

struct CauseRow<'a>(&'a Cause, Measure);

impl Serialize for CauseRow<'_> {
    fn serialize<S: Serializer>(&self, serializer: S) -> Result<S::Ok, S::Error> {
        // Behind a number of containers lies what is behind its volume.
        let measure = if self.1 == Measure::Containers { Measure::Volume } else { self.1 };
        let mut map = serializer.serialize_map(None)?;
        map.serialize_entry("what", &self.0.what)?;
        map.serialize_entry(&format!("change_{}", yearly(measure)), &written(measure, self.0.change))?;
        map.end()
    }
}
