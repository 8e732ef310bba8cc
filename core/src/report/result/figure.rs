//! Figures and differences: flat rows whose keys name the unit.

use super::super::json::Json;
use super::super::odds::summary;
use super::super::row::{Row, key_unit, written, yearly};
use crate::account::{Figure, Measure, RouteAccount};
use crate::compare::{Comparison, Difference};
use crate::odds::Reading;
use crate::program::WorkloadProgram;

/// One figure in every unit of work.
pub(crate) fn figure(json: &mut Json, account: &RouteAccount, figure: &Figure, value_si: f64) {
    json.put("id", &figure.id);
    json.put("title", &figure.title);
    json.put("group", figure.group.title());
    json.put("boundary", &figure.boundary);
    json.put("formula", figure.formula);
    json.put("source", figure.source.cite);
    json.put("standing", figure.source.standing.words());
    match Row::of(account, figure, value_si) {
        Row::Ratio(value) => json.put(key_unit(figure.measure), value),
        Row::Extensive { per_result, per_batch, per_month, per_year, per_kg_product } => {
            let unit = key_unit(figure.measure);
            json.put(&format!("{unit}_per_result"), per_result);
            json.put(&format!("{unit}_per_batch"), per_batch);
            json.put(&format!("{unit}_per_month"), per_month);
            json.put(&format!("{unit}_per_year"), per_year);
            json.put(&format!("{unit}_per_kg_product"), per_kg_product);
        }
    }
}

/// The comparison of one workload: every route beside the present one.
pub(super) fn comparison(
    json: &mut Json,
    work: &WorkloadProgram,
    comparison: &Comparison,
    reading: Option<&Reading<'_>>,
) {
    let name = |i: usize| work.routes.get(i).map_or("", |r| r.name.as_str());
    json.put("present", name(comparison.present));
    json.list("routes", |json| {
        for route in &comparison.routes {
            json.row(|json| {
                json.put("name", name(route.route));
                json.put("finding", &route.finding);
                json.texts("better", &route.better);
                json.texts("worse", &route.worse);
                json.texts("doubts", &route.doubts);
                json.list("differences", |json| {
                    for d in &route.differences {
                        json.row(|json| {
                            difference(json, d);
                            if let Some(reading) = reading {
                                let figure = reading.figure(&d.id);
                                let rivals = figure.iter().flat_map(|f| &f.rivals);
                                let rival = rivals.into_iter().find(|x| x.route == route.route);
                                summary(json, "change_", d.measure, rival.and_then(|x| x.difference));
                                json.put("less", rival.map(|x| x.less));
                                json.put("same", rival.map(|x| x.same));
                            }
                        });
                    }
                });
            });
        }
    });
}

fn difference(json: &mut Json, d: &Difference) {
    let unit = yearly(d.measure);
    let value = |si: Option<f64>| si.map(|v| written(d.measure, v));
    json.put("id", &d.id);
    json.put("title", &d.title);
    json.put(&format!("present_{unit}"), value(d.present));
    json.put(&format!("route_{unit}"), value(d.other));
    json.put(&format!("change_{unit}"), value(d.change));
    json.put("route_over_present", d.ratio);
    // Behind a number of containers lies what is behind its volume.
    let measure = if d.measure == Measure::Containers { Measure::Volume } else { d.measure };
    json.list("causes", |json| {
        for cause in &d.causes {
            json.row(|json| {
                json.put("what", &cause.what);
                json.put(&format!("change_{}", yearly(measure)), written(measure, cause.change));
            });
        }
    });
}
