//! Renaming what other parts of the plan refer to by name.
use super::Item;
use thimbleworth::plan::{Field, Plan, Step};
use thimbleworth::program::SITE_FIELDS;
use thimbleworth::step::{Control, Param, technique};

/// Gives `item` another name and follows every reference to the old one.
pub(super) fn rename(plan: &mut Plan, item: Item, name: &str) -> Option<()> {
    match item {
        Item::Stream(i) => {
            let stream = plan.site.streams.get_mut(i)?;
            let old = std::mem::replace(&mut stream.name, name.to_owned());
            in_site(plan, &old, name, |control| matches!(control, Control::PerStream(_)));
            for route in plan.workloads.iter_mut().flat_map(|w| &mut w.routes) {
                for (_, place) in &mut route.ends {
                    follow(place, &old, name);
                }
                for step in &mut route.steps {
                    in_fields(step, &old, name, |control| control == Control::Place);
                }
            }
        }
        Item::Material(i) => {
            let material = plan.materials.get_mut(i)?;
            let old = std::mem::replace(&mut material.name, name.to_owned());
            in_site(plan, &old, name, |control| matches!(control, Control::PerMaterial(_)));
            for workload in &mut plan.workloads {
                in_rows(&mut workload.feed, &old, name);
                for route in &mut workload.routes {
                    if let Some(feed) = &mut route.feed {
                        in_rows(feed, &old, name);
                    }
                    for step in &mut route.steps {
                        in_fields(step, &old, name, |control| {
                            matches!(control, Control::Material | Control::Mixture | Control::PerMaterial(_))
                        });
                    }
                }
            }
        }
        Item::Workload(w) => plan.workloads.get_mut(w)?.name = name.to_owned(),
        Item::Route(w, r) => {
            let workload = plan.workloads.get_mut(w)?;
            let route = workload.routes.get_mut(r)?;
            let old = std::mem::replace(&mut route.name, name.to_owned());
            follow(&mut workload.present, &old, name);
        }
        Item::Step(..) => return None,
    }
    Some(())
}

fn follow(reference: &mut String, old: &str, new: &str) {
    if reference == old {
        new.clone_into(reference);
    }
}

fn in_rows(rows: &mut [(String, String)], old: &str, new: &str) {
    for (name, _) in rows {
        follow(name, old, new);
    }
}

fn in_fields(step: &mut Step, old: &str, new: &str, wanted: fn(Control) -> bool) {
    if let Some(technique) = technique(&step.technique) {
        in_declared(&mut step.fields, technique.params, (old, new), wanted);
    }
}

/// Prices, removal of waste, shares burnt and factors of production.
fn in_site(plan: &mut Plan, old: &str, new: &str, wanted: fn(Control) -> bool) {
    for (under, _, params) in SITE_FIELDS {
        let fields = match *under {
            "money" => &mut plan.site.money,
            "climate" => &mut plan.site.climate,
            _ => continue,
        };
        in_declared(fields, params, (old, new), wanted);
    }
}

fn in_declared(
    fields: &mut [(String, Field)],
    params: &[Param],
    (old, new): (&str, &str),
    wanted: fn(Control) -> bool,
) {
    for (key, field) in fields {
        if params.iter().any(|p| p.key == key && wanted(p.control)) {
            match field {
                Field::Text(text) => follow(text, old, new),
                Field::Rows(rows) => in_rows(rows, old, new),
                Field::Number(_) | Field::YesNo(_) => {}
            }
        }
    }
}

/// Why `name` cannot be the name of `item`; nothing where it can.
#[must_use]
pub fn refusal(plan: &Plan, item: Item, name: &str) -> Option<String> {
    let (what, others): (&str, Vec<&str>) = match item {
        Item::Stream(_) => ("stream", plan.site.streams.iter().map(|s| s.name.as_str()).collect()),
        Item::Material(_) => {
            ("material of the plan", plan.materials.iter().map(|m| m.name.as_str()).collect())
        }
        Item::Workload(_) => ("piece of work", plan.workloads.iter().map(|w| w.name.as_str()).collect()),
        Item::Route(w, _) => (
            "route",
            plan.workloads.get(w).map_or(Vec::new(), |w| w.routes.iter().map(|r| r.name.as_str()).collect()),
        ),
        Item::Step(..) => return None,
    };
    let own = item.position();
    if name.trim().is_empty() {
        Some(format!("Enter a name for the {what}."))
    } else if others.iter().enumerate().any(|(i, other)| i != own && *other == name) {
        Some(format!("Another {what} is called “{name}”. Enter a name of its own."))
    } else {
        None
    }
}
