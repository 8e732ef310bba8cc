//! The waste desk in the result document.

use super::super::json::{Json, Value};
use crate::account::{Account, Pouring, StreamDesk, classified, site_desk};
use crate::code::{CAUTION, Verdict};
use crate::generator::{MONTH_NAMES, date_of};
use crate::program::SiteUse;
use crate::report::words::si_unit;

fn verdict(json: &mut Json, v: &Verdict) {
    let cited = v.rule.citation();
    json.put("code", &*v.code);
    json.put("answer", v.answer.words());
    json.put("in_force", v.in_force);
    json.put("why", &*v.why);
    json.list("figures", |json| {
        for fact in &v.facts {
            json.row(|json| {
                json.put("what", &*fact.what);
                json.put("value_si", fact.value_si);
                json.put("limit_si", fact.limit_si);
                json.put("unit", si_unit(fact.kind));
            });
        }
    });
    json.put("rule", v.rule.title);
    json.put("cite", cited.cite);
    json.put("standing", cited.standing.words());
    json.put("since", v.rule.from.map(|d| d.to_string()).as_deref());
    json.put("until", v.rule.until.map(|d| d.to_string()).as_deref());
    json.put("change", &*v.change);
}

fn stream(json: &mut Json, s: &StreamDesk<'_>, site: &SiteUse) {
    json.put("stream", site.streams.get(s.stream).map_or("", |u| u.name.as_str()));
    json.put("standing", s.standing().words());
    json.put("kg_per_year", s.contents.mass_kg());
    for (key, codes) in [("codes", s.codes()), ("test", s.open())] {
        json.list(key, |json| {
            for code in codes {
                json.item(code);
            }
        });
    }
    json.list("verdicts", |json| {
        for v in &s.verdicts {
            json.row(|json| verdict(json, v));
        }
    });
}

/// What one route by itself brings to each stream.
pub(super) fn streams(json: &mut Json, pouring: Pouring<'_>, site: &SiteUse) {
    for s in classified(&[pouring], site) {
        json.row(|json| stream(json, &s, site));
    }
}

/// The whole site with the present route of each workload, under `waste_desk`; `null` where the plan has no program.
pub(super) fn site(json: &mut Json, account: &Account) {
    let (Some(program), Some(desk)) = (account.program.as_ref(), site_desk(account, &[])) else {
        json.put("waste_desk", Value::Null);
        return;
    };
    let month = |m: usize| MONTH_NAMES.get(m).copied().unwrap_or_default();
    json.object("waste_desk", |json| {
        json.list("streams", |json| {
            for s in &desk.streams {
                json.row(|json| stream(json, s, &program.site));
            }
        });
        json.list("months", |json| {
            for (m, made) in desk.made.iter().enumerate() {
                json.row(|json| {
                    json.put("month", month(m));
                    json.put("counted_kg", made.kg);
                    json.put("counted_acute_kg", made.acute_kg);
                    json.put("category", desk.categories.and_then(|c| c.get(m).map(|c| c.word())));
                    json.put("storage_days", desk.storage.days.get(m).copied().flatten());
                });
            }
        });
        json.list("headroom", |json| {
            for h in &desk.headroom {
                json.row(|json| {
                    json.put("workload", program.workloads.get(h.workload).map_or("", |w| w.name.as_str()));
                    json.put("month", month(h.month));
                    json.put("results_planned", h.planned);
                    json.put("kg_each", h.kg_each);
                    json.put("results_as_vsqg", h.as_vsqg);
                    json.put("results_before_lqg", h.as_sqg);
                });
            }
        });
        json.list("pick_ups", |json| {
            for p in &desk.calendar.pick_ups {
                json.row(|json| {
                    json.put("date", &date_of(p.day));
                    json.put("containers", p.containers);
                    json.put("kg", p.kg);
                });
            }
        });
        json.put("containers_begun", desk.calendar.containers.len());
        json.put("stayed_too_long", desk.calendar.too_long.len());
        json.put("days_with_too_much", desk.calendar.too_much.len());
        json.put("caution", CAUTION);
    });
}
