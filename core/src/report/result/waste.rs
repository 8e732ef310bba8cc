//! The waste desk in the result document.

use crate::account::{Account, Pouring, SiteDesk, StreamDesk, classified, site_desk};
use crate::code::{CAUTION, Fact, Verdict};
use crate::generator::{MONTH_NAMES, date_of};
use crate::program::SiteUse;
use crate::report::words::si_unit;
use serde::Serialize;

#[derive(Serialize)]
pub(super) struct StreamDocument {
    stream: String,
    standing: &'static str,
    kg_per_year: f64,
    codes: Vec<String>,
    test: Vec<String>,
    verdicts: Vec<VerdictDocument>,
}

#[derive(Serialize)]
struct VerdictDocument {
    code: String,
    answer: &'static str,
    in_force: bool,
    why: String,
    figures: Vec<FactDocument>,
    rule: &'static str,
    cite: &'static str,
    standing: &'static str,
    since: Option<String>,
    until: Option<String>,
    change: String,
}

#[derive(Serialize)]
struct FactDocument {
    what: String,
    value_si: f64,
    limit_si: Option<f64>,
    unit: &'static str,
}

/// The site with the present route of each workload.
#[derive(Serialize)]
pub(super) struct SiteDocument {
    streams: Vec<StreamDocument>,
    months: Vec<MonthDocument>,
    headroom: Vec<HeadroomDocument>,
    pick_ups: Vec<PickUpDocument>,
    containers_begun: usize,
    stayed_too_long: usize,
    days_with_too_much: usize,
    caution: &'static str,
}

#[derive(Serialize)]
struct MonthDocument {
    month: &'static str,
    counted_kg: f64,
    counted_acute_kg: f64,
    category: Option<&'static str>,
    storage_days: Option<u16>,
}

#[derive(Serialize)]
struct HeadroomDocument {
    workload: String,
    month: &'static str,
    results_planned: f64,
    kg_each: f64,
    results_as_vsqg: Option<u64>,
    results_before_lqg: Option<u64>,
}

#[derive(Serialize)]
struct PickUpDocument {
    date: String,
    containers: usize,
    kg: f64,
}

fn fact(f: &Fact) -> FactDocument {
    FactDocument { what: f.what.clone(), value_si: f.value_si, limit_si: f.limit_si, unit: si_unit(f.kind) }
}

fn verdict(v: &Verdict) -> VerdictDocument {
    let cited = v.rule.citation();
    VerdictDocument {
        code: v.code.to_string(),
        answer: v.answer.words(),
        in_force: v.in_force,
        why: v.why.clone(),
        figures: v.facts.iter().map(fact).collect(),
        rule: v.rule.title,
        cite: cited.cite,
        standing: cited.standing.words(),
        since: v.rule.from.map(|d| d.to_string()),
        until: v.rule.until.map(|d| d.to_string()),
        change: v.change.to_string(),
    }
}

fn stream(s: &StreamDesk<'_>, site: &SiteUse) -> StreamDocument {
    let text = |codes: Vec<&str>| codes.into_iter().map(str::to_owned).collect();
    StreamDocument {
        stream: site.streams.get(s.stream).map_or_else(String::new, |u| u.name.clone()),
        standing: s.standing().words(),
        kg_per_year: s.contents.mass_kg(),
        codes: text(s.codes()),
        test: text(s.open()),
        verdicts: s.verdicts.iter().map(verdict).collect(),
    }
}

/// What one route by itself brings to each stream.
pub(super) fn streams(pouring: Pouring<'_>, site: &SiteUse) -> Vec<StreamDocument> {
    classified(&[pouring], site).iter().map(|s| stream(s, site)).collect()
}

/// The whole site; `None` where the plan has no program.
pub(super) fn site(account: &Account) -> Option<SiteDocument> {
    let program = account.program.as_ref()?;
    let desk: SiteDesk<'_> = site_desk(account, &[])?;
    let name = |w: usize| program.workloads.get(w).map_or_else(String::new, |w| w.name.clone());
    let month = |m: usize| MONTH_NAMES.get(m).copied().unwrap_or_default();
    Some(SiteDocument {
        streams: desk.streams.iter().map(|s| stream(s, &program.site)).collect(),
        months: desk
            .made
            .iter()
            .enumerate()
            .map(|(m, made)| MonthDocument {
                month: month(m),
                counted_kg: made.kg,
                counted_acute_kg: made.acute_kg,
                category: desk.categories.and_then(|c| c.get(m).map(|c| c.word())),
                storage_days: desk.storage.days.get(m).copied().flatten(),
            })
            .collect(),
        headroom: desk
            .headroom
            .iter()
            .map(|h| HeadroomDocument {
                workload: name(h.workload),
                month: month(h.month),
                results_planned: h.planned,
                kg_each: h.kg_each,
                results_as_vsqg: h.as_vsqg,
                results_before_lqg: h.as_sqg,
            })
            .collect(),
        pick_ups: desk
            .calendar
            .pick_ups
            .iter()
            .map(|p| PickUpDocument { date: date_of(p.day), containers: p.containers, kg: p.kg })
            .collect(),
        containers_begun: desk.calendar.containers.len(),
        stayed_too_long: desk.calendar.too_long.len(),
        days_with_too_much: desk.calendar.too_much.len(),
        caution: CAUTION,
    })
}
