//! Setting one field of a plan by its path.
use thimbleworth::plan::{
    Electricity, Field, OtherWaste, Plan, Room, Route, Site, Step, Workload, is_number, keys,
};
use thimbleworth::program::{Fields, ROUTE_FIELDS, SITE_FIELDS};
use thimbleworth::step::{TECHNIQUES, technique};

/// Sets the field at `path`, or clears it; returns whether there is such a field.
pub(super) fn set(plan: &mut Plan, path: &str, value: Option<Field>) -> bool {
    let Some(keys) = keys(path) else { return false };
    let keys: Vec<&str> = keys.iter().map(String::as_str).collect();
    at_plan(plan, &keys, value).is_some()
}

/// A number as the document holds it: bare where JSON can hold it bare.
#[must_use]
pub fn number(text: &str) -> Option<Field> {
    let text = text.trim();
    if text.is_empty() {
        return None;
    }
    Some(if is_number(text) { Field::Number(text.to_owned()) } else { Field::Text(text.to_owned()) })
}

/// A text; nothing where it is empty.
#[must_use]
pub fn text(text: &str) -> Option<Field> {
    (!text.is_empty()).then(|| Field::Text(text.to_owned()))
}

fn words(value: Option<Field>) -> Option<String> {
    match value {
        Some(Field::Text(text) | Field::Number(text)) => Some(text),
        Some(Field::YesNo(_) | Field::Rows(_)) | None => None,
    }
}

fn yes(value: Option<&Field>) -> Option<bool> {
    match value {
        Some(Field::YesNo(yes)) => Some(*yes),
        _ => None,
    }
}

fn rows(value: Option<Field>) -> Vec<(String, String)> {
    match value {
        Some(Field::Rows(rows)) => rows,
        _ => Vec::new(),
    }
}

fn nth<'a, T>(list: &'a mut [T], position: &str) -> Option<&'a mut T> {
    list.get_mut(position.parse::<usize>().ok()?)
}

fn at_plan(plan: &mut Plan, keys: &[&str], value: Option<Field>) -> Option<()> {
    match keys {
        ["title"] => plan.title = words(value).unwrap_or_default(),
        ["notes"] => plan.notes = words(value),
        ["seed"] => plan.seed = value,
        ["site", rest @ ..] => at_site(&mut plan.site, rest, value)?,
        ["materials", name, key] => {
            let material = plan.materials.iter_mut().find(|m| m.name == *name)?;
            put(&mut material.fields, key, value, |_| usize::MAX);
        }
        ["workloads", w, "routes", r, "steps", s, rest @ ..] => {
            let route = nth(&mut nth(&mut plan.workloads, w)?.routes, r)?;
            at_step(nth(&mut route.steps, s)?, rest, value)?;
        }
        ["workloads", w, "routes", r, rest @ ..] => {
            at_route(nth(&mut nth(&mut plan.workloads, w)?.routes, r)?, rest, value)?;
        }
        ["workloads", w, rest @ ..] => at_workload(nth(&mut plan.workloads, w)?, rest, value)?,
        _ => return None,
    }
    Some(())
}

fn at_site(site: &mut Site, keys: &[&str], value: Option<Field>) -> Option<()> {
    match keys {
        ["name"] => site.name = words(value).unwrap_or_default(),
        ["rules"] => site.rules = words(value),
        ["as_of"] => site.as_of = words(value),
        ["bench_temperature"] => site.bench_temperature = words(value),
        ["drain_permit"] => site.drain_permit = words(value),
        ["activity"] => site.activity = words(value),
        ["storage_limit"] => site.storage_limit = words(value),
        ["pick_up_every"] => site.pick_up_every = words(value),
        ["far_receiver"] => site.far_receiver = yes(value.as_ref()),
        ["deviations"] => site.deviations = words(value),
        ["other_waste"] => {
            let mut before = std::mem::take(&mut site.other_waste);
            for (i, (name, each_month)) in rows(value).into_iter().enumerate() {
                // Months and kind stay with the row.
                let old = before.get_mut(i).map(std::mem::take).unwrap_or_default();
                site.other_waste.push(OtherWaste { name, each_month, ..old });
            }
        }
        ["electricity", key] => {
            let mut of = site.electricity.take().unwrap_or_default();
            match *key {
                "climate" => of.climate = words(value),
                "price" => of.price = words(value),
                "year" => of.year = value,
                "boundary" => of.boundary = words(value),
                "source" => of.source = words(value),
                _ => return None,
            }
            site.electricity = (of != Electricity::default()).then_some(of);
        }
        ["money", key] => declared(&mut site.money, SITE_FIELDS, "money", key, value)?,
        ["hours", key] => declared(&mut site.hours, SITE_FIELDS, "hours", key, value)?,
        ["climate", key] => declared(&mut site.climate, SITE_FIELDS, "climate", key, value)?,
        ["room", key] => {
            let mut of = site.room.take().unwrap_or_default();
            if !of.set(key, words(value)) {
                return None;
            }
            site.room = (of != Room::default()).then_some(of);
        }
        ["streams", i, key] => {
            let stream = nth(&mut site.streams, i)?;
            match *key {
                "holds" => stream.holds = words(value),
                "container" => stream.container = words(value),
                "fill" => stream.fill = words(value),
                "bulk_density" => stream.bulk_density = words(value),
                "treatment" => stream.treatment = words(value),
                "ph" => stream.ph = words(value),
                "flash_point" => stream.flash_point = words(value),
                "unused" => stream.unused = yes(value.as_ref()),
                "made_of" => stream.made_of = words(value),
                "density_mark" => stream.density_mark = value,
                "area" => stream.area = words(value),
                "counted" => stream.counted = words(value),
                "saturation" => stream.saturation = words(value),
                "vented_to" => stream.vented_to = words(value),
                "goes_round" => stream.goes_round = words(value),
                _ => return None,
            }
        }
        _ => return None,
    }
    Some(())
}

fn at_workload(work: &mut Workload, keys: &[&str], value: Option<Field>) -> Option<()> {
    match keys {
        ["results_per_year"] => work.results_per_year = value,
        ["batch", "samples"] => work.batch_samples = value,
        ["batch", "controls"] => work.batch_controls = value,
        ["repeats"] => work.repeats = words(value),
        ["repeats_bring_controls"] => work.repeats_bring_controls = yes(value.as_ref()),
        ["controls_carry_feed"] => work.controls_carry_feed = yes(value.as_ref()),
        ["feed"] => work.feed = rows(value),
        ["months"] => work.months = words(value),
        ["present"] => work.present = words(value).unwrap_or_default(),
        _ => return None,
    }
    Some(())
}

fn at_route(route: &mut Route, keys: &[&str], value: Option<Field>) -> Option<()> {
    match keys {
        ["feed"] => route.feed = value.map(|value| rows(Some(value))),
        ["recovery"] => route.recovery = words(value),
        ["equivalence"] => route.equivalence = words(value),
        ["permission"] => route.permission = words(value),
        ["time", key] => declared(&mut route.time, ROUTE_FIELDS, "time", key, value)?,
        ["money", key] => declared(&mut route.money, ROUTE_FIELDS, "money", key, value)?,
        ["ph"] => route.ph = words(value),
        ["ends"] => route.ends = rows(value),
        ["ends", place] => put(&mut route.ends, place, words(value), |_| usize::MAX),
        _ => return None,
    }
    Some(())
}

fn at_step(step: &mut Step, keys: &[&str], value: Option<Field>) -> Option<()> {
    match keys {
        ["per"] => step.per = words(value),
        ["note"] => step.note = words(value),
        ["measured", rule] => put(&mut step.measured, rule, words(value), |_| usize::MAX),
        [key] => {
            let params = technique(&step.technique).map_or(&[][..], |t| t.params);
            put(&mut step.fields, key, value, |key| {
                params.iter().position(|p| p.key == key).unwrap_or(usize::MAX)
            });
        }
        _ => return None,
    }
    Some(())
}

/// Sets or clears a field that is declared, in the order of its declaration.
fn declared(
    list: &mut Vec<(String, Field)>,
    groups: &[Fields],
    under: &str,
    key: &str,
    value: Option<Field>,
) -> Option<()> {
    let fields = groups.iter().find(|g| g.0 == under)?.2;
    let rank = |key: &str| fields.iter().position(|p| p.key == key);
    rank(key)?;
    put(list, key, value, |key| rank(key).unwrap_or(usize::MAX));
    Some(())
}

/// Sets, adds or clears one of several named values; a new one goes before the first that ranks behind it.
fn put<T>(list: &mut Vec<(String, T)>, key: &str, value: Option<T>, rank: impl Fn(&str) -> usize) {
    match (list.iter().position(|(k, _)| k == key), value) {
        (Some(i), Some(value)) => list[i].1 = value,
        (Some(i), None) => {
            list.remove(i);
        }
        (None, Some(value)) => {
            let at = list.iter().position(|(k, _)| rank(k) > rank(key)).unwrap_or(list.len());
            list.insert(at, (key.to_owned(), value));
        }
        (None, None) => {}
    }
}

/// The value that stands at a field of a step.
#[must_use]
pub fn step_field<'a>(step: &'a Step, key: &str) -> Option<&'a Field> {
    step.fields.iter().find(|(k, _)| k == key).map(|(_, field)| field)
}

/// A step with nothing but its technique.
#[must_use]
pub fn new_step(key: &str) -> Option<Step> {
    TECHNIQUES.iter().find(|t| t.key == key).map(|t| Step { technique: t.key.into(), ..Step::default() })
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::document::blank;

    fn plan() -> Plan {
        let mut plan = blank();
        plan.workloads[0].routes[0].steps.push(new_step("soxhlet").expect("a technique"));
        plan.materials
            .push(thimbleworth::plan::OwnMaterial { name: "sorbent mix".into(), fields: Vec::new() });
        plan
    }

    /// Every field that the page offers can be set, is then not what it was, and can be cleared again.
    #[test]
    fn every_field_is_set_and_cleared() {
        let texts = [
            "title",
            "notes",
            "site.name",
            "site.rules",
            "site.as_of",
            "site.bench_temperature",
            "site.drain_permit",
            "site.electricity.climate",
            "site.electricity.price",
            "site.electricity.source",
            "site.room.volume",
            "site.room.air_changes",
            "site.room.hood_capture",
            "site.streams[0].holds",
            "site.streams[0].fill",
            "site.streams[0].bulk_density",
            "site.streams[0].treatment",
            "site.streams[0].ph",
            "site.streams[0].flash_point",
            "site.streams[0].made_of",
            "site.streams[0].density_mark",
            "site.streams[0].area",
            "site.streams[0].counted",
            "site.streams[0].goes_round",
            "site.streams[0].saturation",
            "site.streams[0].vented_to",
            "site.activity",
            "site.storage_limit",
            "site.pick_up_every",
            "site.deviations",
            "workloads[0].months",
            r#"materials["sorbent mix"].density"#,
            "workloads[0].results_per_year",
            "workloads[0].batch.controls",
            "workloads[0].repeats",
            "workloads[0].routes[0].recovery",
            "workloads[0].routes[0].equivalence",
            "workloads[0].routes[0].permission",
            "seed",
            "workloads[0].routes[0].ph",
            "workloads[0].routes[0].ends.marc",
            r#"workloads[0].routes[0].ends["second phase"]"#,
            "workloads[0].routes[0].steps[0].per",
            "workloads[0].routes[0].steps[0].note",
            "workloads[0].routes[0].steps[0].charge",
            r#"workloads[0].routes[0].steps[0].measured["condenser loss"]"#,
        ];
        for path in texts {
            let (before, mut after) = (plan(), plan());
            assert!(set(&mut after, path, text("12 g")), "{path}");
            assert_ne!(after, before, "{path}");
            assert!(set(&mut after, path, None));
            assert_eq!(after, before, "{path}");
        }
    }

    /// The same of all that is declared for site and routes; what is not declared is refused.
    #[test]
    fn every_declared_field_is_set_and_cleared() {
        let mut count = 0;
        for (at, groups) in [("site", SITE_FIELDS), ("workloads[0].routes[0]", ROUTE_FIELDS)] {
            for (under, _, fields) in groups {
                let below = if under.is_empty() { at.to_owned() } else { format!("{at}.{under}") };
                for p in *fields {
                    let path = format!("{below}.{}", p.key);
                    let (before, mut after) = (plan(), plan());
                    assert!(set(&mut after, &path, text("12 g")), "{path}");
                    assert_ne!(after, before, "{path}");
                    assert!(set(&mut after, &path, None));
                    assert_eq!(after, before, "{path}");
                    count += 1;
                }
                assert!(!set(&mut plan(), &format!("{below}.nothing"), text("1")), "{below}");
            }
        }
        assert!(count > 35, "{count}");
        // The order of the declaration, whatever is typed first.
        let mut after = plan();
        for key in ["years", "discount", "currency"] {
            assert!(set(&mut after, &format!("site.money.{key}"), text("1")));
        }
        let keys: Vec<&str> = after.site.money.iter().map(|(k, _)| k.as_str()).collect();
        assert_eq!(keys, ["currency", "discount", "years"]);
    }

    #[test]
    fn rows_and_yes_no_have_their_own_form() {
        let mut after = plan();
        let feed = vec![("sediment".to_owned(), "10 g".to_owned())];
        assert!(set(&mut after, "workloads[0].feed", Some(Field::Rows(feed.clone()))));
        assert!(set(&mut after, "workloads[0].routes[0].feed", Some(Field::Rows(feed.clone()))));
        assert!(set(&mut after, "workloads[0].controls_carry_feed", Some(Field::YesNo(false))));
        assert_eq!(after.workloads[0].feed, feed);
        assert_eq!(after.workloads[0].routes[0].feed.as_ref(), Some(&feed));
        assert_eq!(after.workloads[0].controls_carry_feed, Some(false));
        assert!(set(&mut after, "workloads[0].routes[0].feed", None));
        assert_eq!(after.workloads[0].routes[0].feed, None);
    }

    #[test]
    fn a_path_to_nothing_is_refused() {
        for path in [
            "",
            "nothing",
            "site.nothing",
            "workloads[9].repeats",
            "workloads[0].routes[0].steps[7].charge",
            "a[",
        ] {
            let mut after = plan();
            assert!(!set(&mut after, path, text("x")), "{path}");
            assert_eq!(after, plan());
        }
    }

    #[test]
    fn fields_of_a_step_keep_the_order_of_the_technique() {
        let mut after = plan();
        for key in ["loss", "time", "charge"] {
            set(&mut after, &format!("workloads[0].routes[0].steps[0].{key}"), text("1"));
        }
        let keys: Vec<&str> =
            after.workloads[0].routes[0].steps[0].fields.iter().map(|(k, _)| k.as_str()).collect();
        assert_eq!(keys, ["charge", "time", "loss"]);
    }

    #[test]
    fn numbers_stay_bare_where_json_can_hold_them() {
        assert_eq!(number("1400"), Some(Field::Number("1400".into())));
        assert_eq!(number("1 400"), Some(Field::Text("1 400".into())));
        assert_eq!(number("1400 ± 100"), Some(Field::Text("1400 ± 100".into())));
        assert_eq!(number(" "), None);
    }
}
