//! The air of the room as a document.

use super::posting::step_and_technique;
use crate::account::{AirAccount, GasInRoom, Held, RouteAccount, SuddenInRoom};
use crate::program::RouteProgram;
use crate::room::{Course, Exposure, HOUR_S, Limit};
use serde::Serialize;

#[derive(Serialize)]
pub(super) struct AirDocument {
    gases: Vec<GasDocument>,
    sudden: Vec<SuddenDocument>,
}

#[derive(Serialize)]
struct GasDocument {
    gas: String,
    releases: Vec<ReleaseDocument>,
    background_ppm: f64,
    as_ventilated: CourseDocument,
    on_setback: Option<CourseDocument>,
    oxygen_at_highest_percent: f64,
    limits: Vec<HeldDocument>,
    other_limits: Vec<OtherDocument>,
    sensor: &'static str,
    blind: Vec<&'static str>,
}

#[derive(Serialize)]
struct ReleaseDocument {
    step: Option<u16>,
    technique: &'static str,
    posting_kg_per_run: f64,
    kg_into_room_per_day: f64,
    runs_per_day: f64,
    seconds_per_day: Option<f64>,
}

#[derive(Serialize)]
struct CourseDocument {
    mean_8_h_ppm: f64,
    worst_8_h_ppm: f64,
    worst_15_min_ppm: f64,
    highest_ppm: f64,
    highest_after_h: f64,
    /// Each quarter of an hour from the start of the work, for a day.
    ppm_each_15_min: Vec<f64>,
}

#[derive(Serialize)]
struct HeldDocument {
    jurisdiction: &'static str,
    kind: &'static str,
    allowed_ppm: f64,
    found_ppm: f64,
    on_setback_ppm: Option<f64>,
    passed: bool,
    citation: &'static str,
    source: &'static str,
}

#[derive(Serialize)]
struct OtherDocument {
    jurisdiction: &'static str,
    kind: &'static str,
    value: f64,
    unit: &'static str,
    why: String,
    citation: &'static str,
}

#[derive(Serialize)]
struct SuddenDocument {
    place: &'static str,
    gas: String,
    mass_kg: f64,
    gas_m3: f64,
    at_once_percent: f64,
    mixed_percent: f64,
    oxygen_at_once_percent: f64,
    oxygen_mixed_percent: f64,
    times_idlh: Option<f64>,
    limit_percent: Option<f64>,
    hours_to_limit: Option<[f64; 2]>,
    hours_to_limit_on_setback: Option<[f64; 2]>,
}

impl AirDocument {
    pub(super) fn of(route: &RouteProgram, account: &RouteAccount) -> Option<Self> {
        let air: &AirAccount = account.air.as_ref()?;
        Some(Self {
            gases: air.gases.iter().map(|g| gas(route, account, g)).collect(),
            sudden: air.sudden.iter().map(sudden).collect(),
        })
    }
}

const PPM: f64 = 1e6;

fn gas(route: &RouteProgram, account: &RouteAccount, g: &GasInRoom) -> GasDocument {
    let releases = g.releases.iter().filter_map(|r| {
        let p = account.trace.postings.get(r.posting)?;
        let (step, technique) = step_and_technique(route, p.step);
        Some(ReleaseDocument {
            step,
            technique,
            posting_kg_per_run: p.kg,
            kg_into_room_per_day: r.room_kg,
            runs_per_day: r.runs,
            seconds_per_day: r.over_s,
        })
    });
    GasDocument {
        gas: g.name.clone(),
        releases: releases.collect(),
        background_ppm: g.background * PPM,
        as_ventilated: course(&g.course, &g.exposure, g.shift),
        on_setback: g.on_setback.as_ref().map(|(c, e, shift)| course(c, e, *shift)),
        oxygen_at_highest_percent: g.oxygen * 100.0,
        limits: g.held.iter().map(held).collect(),
        other_limits: g.notes.iter().map(|(l, why)| other(l, why)).collect(),
        sensor: g.sensor.sensor.title(),
        blind: g.sensor.blind.iter().map(|s| s.title()).collect(),
    }
}

fn course(c: &Course, e: &Exposure, shift: f64) -> CourseDocument {
    let (at_s, highest) = c.peak();
    CourseDocument {
        mean_8_h_ppm: shift * PPM,
        worst_8_h_ppm: e.worst_8h * PPM,
        worst_15_min_ppm: e.worst_15min * PPM,
        highest_ppm: highest * PPM,
        highest_after_h: at_s / HOUR_S,
        ppm_each_15_min: (0..=96_u32).map(|i| c.at(f64::from(i) * 900.0) * PPM).collect(),
    }
}

fn held(h: &Held) -> HeldDocument {
    HeldDocument {
        jurisdiction: h.limit.jurisdiction.title(),
        kind: h.limit.kind.title(),
        allowed_ppm: h.allowed * PPM,
        found_ppm: h.found * PPM,
        on_setback_ppm: h.on_setback.map(|x| x * PPM),
        passed: h.is_passed(),
        citation: h.limit.citation,
        source: h.limit.source,
    }
}

fn other(l: &Limit, why: &str) -> OtherDocument {
    OtherDocument {
        jurisdiction: l.jurisdiction.title(),
        kind: l.kind.title(),
        value: l.value,
        unit: l.unit.title(),
        why: why.to_owned(),
        citation: l.citation,
    }
}

fn sudden(s: &SuddenInRoom) -> SuddenDocument {
    let hours = |t: [f64; 2]| t.map(|s| s / HOUR_S);
    SuddenDocument {
        place: s.place,
        gas: s.name.clone(),
        mass_kg: s.mass_kg,
        gas_m3: s.sudden.gas_m3,
        at_once_percent: s.sudden.at_once * 100.0,
        mixed_percent: s.sudden.mixed * 100.0,
        oxygen_at_once_percent: s.sudden.oxygen_at_once * 100.0,
        oxygen_mixed_percent: s.sudden.oxygen_mixed * 100.0,
        times_idlh: s.idlh.map(|(_, x)| s.sudden.worst() / x),
        limit_percent: s.clears.map(|c| c.limit * 100.0),
        hours_to_limit: s.clears.and_then(|c| c.by_day).map(hours),
        hours_to_limit_on_setback: s.clears.and_then(|c| c.on_setback).map(hours),
    }
}
