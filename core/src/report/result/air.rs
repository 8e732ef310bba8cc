//! The air of the room as a document.

use super::super::json::{Json, Value};
use super::posting::step_and_technique;
use crate::account::{GasInRoom, RouteAccount, SuddenInRoom};
use crate::program::RouteProgram;
use crate::room::{Course, Exposure, HOUR_S};

const PPM: f64 = 1e6;

pub(super) fn air(json: &mut Json, route: &RouteProgram, account: &RouteAccount) {
    let Some(air) = &account.air else { return json.put("air", Value::Null) };
    json.object("air", |json| {
        json.list("gases", |json| {
            for g in &air.gases {
                json.row(|json| gas(json, route, account, g));
            }
        });
        json.list("sudden", |json| {
            for s in &air.sudden {
                json.row(|json| sudden(json, s));
            }
        });
    });
}

fn gas(json: &mut Json, route: &RouteProgram, account: &RouteAccount, g: &GasInRoom) {
    json.put("gas", &g.name);
    json.list("releases", |json| {
        for r in &g.releases {
            let Some(p) = account.trace.postings.get(r.posting) else { continue };
            let (step, technique) = step_and_technique(route, p.step);
            json.row(|json| {
                json.put("step", step);
                json.put("technique", technique);
                json.put("kg_per_run", p.kg);
                json.put("kg_into_room_per_day", r.room_kg);
                json.put("runs_per_day", r.runs);
                json.put("seconds_per_day", r.over_s);
            });
        }
    });
    json.put("background_ppm", g.background * PPM);
    json.object("as_ventilated", |json| course(json, &g.course, &g.exposure, g.shift));
    match &g.on_setback {
        Some((c, e, shift)) => json.object("on_setback", |json| course(json, c, e, *shift)),
        None => json.put("on_setback", Value::Null),
    }
    json.put("oxygen_at_highest_percent", g.oxygen * 100.0);
    json.list("limits", |json| {
        for h in &g.held {
            json.row(|json| {
                json.put("jurisdiction", h.limit.jurisdiction.title());
                json.put("kind", h.limit.kind.title());
                json.put("allowed_ppm", h.allowed * PPM);
                json.put("found_ppm", h.found * PPM);
                json.put("on_setback_ppm", h.on_setback.map(|x| x * PPM));
                json.put("passed", h.is_passed());
                json.put("citation", h.limit.citation);
                json.put("source", h.limit.source);
            });
        }
    });
    json.list("other_limits", |json| {
        for (limit, why) in &g.notes {
            json.row(|json| {
                json.put("jurisdiction", limit.jurisdiction.title());
                json.put("kind", limit.kind.title());
                json.put("value", limit.value);
                json.put("unit", limit.unit.title());
                json.put("why", why);
                json.put("citation", limit.citation);
            });
        }
    });
    json.put("sensor", g.sensor.sensor.title());
    json.list("blind", |json| {
        for sensor in g.sensor.blind {
            json.item(sensor.title());
        }
    });
}

/// A time course: its figures, and each quarter of an hour from the start of the work, for a day.
fn course(json: &mut Json, c: &Course, e: &Exposure, shift: f64) {
    let (at_s, highest) = c.peak();
    json.put("mean_8_h_ppm", shift * PPM);
    json.put("worst_8_h_ppm", e.worst_8h * PPM);
    json.put("worst_15_min_ppm", e.worst_15min * PPM);
    json.put("highest_ppm", highest * PPM);
    json.put("highest_after_h", at_s / HOUR_S);
    json.list("ppm_each_15_min", |json| {
        for i in 0..=96_u32 {
            json.item(c.at(f64::from(i) * 900.0) * PPM);
        }
    });
}

fn sudden(json: &mut Json, s: &SuddenInRoom) {
    json.put("place", s.place);
    json.put("gas", &s.name);
    json.put("mass_kg", s.mass_kg);
    json.put("gas_m3", s.sudden.gas_m3);
    json.put("at_once_percent", s.sudden.at_once * 100.0);
    json.put("mixed_percent", s.sudden.mixed * 100.0);
    json.put("oxygen_at_once_percent", s.sudden.oxygen_at_once * 100.0);
    json.put("oxygen_mixed_percent", s.sudden.oxygen_mixed * 100.0);
    json.put("times_idlh", s.idlh.map(|(_, x)| s.sudden.worst() / x));
    json.put("limit_percent", s.clears.map(|c| c.limit * 100.0));
    for (key, found) in [
        ("hours_to_limit", s.clears.and_then(|c| c.by_day)),
        ("hours_to_limit_on_setback", s.clears.and_then(|c| c.on_setback)),
    ] {
        match found {
            Some(both) => json.list(key, |json| {
                for s in both {
                    json.item(s / HOUR_S);
                }
            }),
            None => json.put(key, Value::Null),
        }
    }
}
