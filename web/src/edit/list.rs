//! Adding, copying, moving and taking away: the lists of the plan and the ids beside them.
use super::Item;
use super::set::new_step;
use crate::document::{Document, blank_workload};
use thimbleworth::plan::{OwnMaterial, Plan, Route, Stream};

/// How many entries the list of `item` has.
pub(super) fn count(document: &Document, item: Item) -> usize {
    let plan = &document.plan;
    match item {
        Item::Stream(_) => plan.site.streams.len(),
        Item::Material(_) => plan.materials.len(),
        Item::Workload(_) => plan.workloads.len(),
        Item::Route(w, _) => plan.workloads.get(w).map_or(0, |w| w.routes.len()),
        Item::Step(w, r, _) => {
            plan.workloads.get(w).and_then(|w| w.routes.get(r)).map_or(0, |route| route.steps.len())
        }
    }
}

/// The path of what holds the list of `item`.
pub(super) fn above(item: Item) -> String {
    match item {
        Item::Stream(_) => "site.streams".to_owned(),
        Item::Material(_) => "materials".to_owned(),
        Item::Workload(_) => "workloads".to_owned(),
        Item::Route(w, _) => format!("workloads[{w}].routes"),
        Item::Step(w, r, _) => format!("workloads[{w}].routes[{r}].steps"),
    }
}

/// The name of an entry; a step has its technique's key.
#[must_use]
pub fn name_of(plan: &Plan, item: Item) -> Option<&str> {
    Some(match item {
        Item::Stream(i) => plan.site.streams.get(i)?.name.as_str(),
        Item::Material(i) => plan.materials.get(i)?.name.as_str(),
        Item::Workload(w) => plan.workloads.get(w)?.name.as_str(),
        Item::Route(w, r) => plan.workloads.get(w)?.routes.get(r)?.name.as_str(),
        Item::Step(w, r, s) => plan.workloads.get(w)?.routes.get(r)?.steps.get(s)?.technique.as_str(),
    })
}

/// A name that none of `taken` is: `base` itself, or with the first number from 2 that is free.
fn free_name<'a>(base: &str, taken: &(impl Iterator<Item = &'a str> + Clone)) -> String {
    let mut name = base.to_owned();
    let mut n = 2;
    while taken.clone().any(|other| other == name) {
        name = format!("{base} {n}");
        n += 1;
    }
    name
}

pub(super) fn add(document: &mut Document, item: Item, what: &str) -> Option<()> {
    let Document { plan, ids } = document;
    match item {
        Item::Stream(_) => {
            let name = free_name("stream", &plan.site.streams.iter().map(|s| s.name.as_str()));
            plan.site.streams.push(Stream { name, ..Stream::default() });
            let id = ids.give();
            ids.streams.push(id);
        }
        Item::Material(_) => {
            let name = free_name("material", &plan.materials.iter().map(|m| m.name.as_str()));
            plan.materials.push(OwnMaterial { name, fields: Vec::new() });
            let id = ids.give();
            ids.materials.push(id);
        }
        Item::Workload(_) => {
            let name = free_name("Work", &plan.workloads.iter().map(|w| w.name.as_str()));
            let workload = blank_workload(&name);
            let given = ids.give_workload(&workload);
            ids.workloads.push(given);
            plan.workloads.push(workload);
        }
        Item::Route(w, _) => {
            let workload = plan.workloads.get_mut(w)?;
            let name = free_name("Route", &workload.routes.iter().map(|r| r.name.as_str()));
            if workload.routes.is_empty() {
                name.clone_into(&mut workload.present);
            }
            workload.routes.push(Route { name, ..Route::default() });
            let given = ids.give_route(0);
            ids.workloads.get_mut(w)?.routes.push(given);
        }
        Item::Step(w, r, _) => {
            let step = new_step(what)?;
            plan.workloads.get_mut(w)?.routes.get_mut(r)?.steps.push(step);
            let id = ids.give();
            ids.workloads.get_mut(w)?.routes.get_mut(r)?.steps.push(id);
        }
    }
    Some(())
}

pub(super) fn duplicate(document: &mut Document, item: Item) -> Option<()> {
    let Document { plan, ids } = document;
    let behind = item.position() + 1;
    match item {
        Item::Stream(i) => {
            let mut copy = plan.site.streams.get(i)?.clone();
            copy.name = free_name(&copy.name, &plan.site.streams.iter().map(|s| s.name.as_str()));
            plan.site.streams.insert(behind, copy);
            let id = ids.give();
            ids.streams.insert(behind, id);
        }
        Item::Material(i) => {
            let mut copy = plan.materials.get(i)?.clone();
            copy.name = free_name(&copy.name, &plan.materials.iter().map(|m| m.name.as_str()));
            plan.materials.insert(behind, copy);
            let id = ids.give();
            ids.materials.insert(behind, id);
        }
        Item::Workload(w) => {
            let mut copy = plan.workloads.get(w)?.clone();
            copy.name = free_name(&copy.name, &plan.workloads.iter().map(|w| w.name.as_str()));
            let given = ids.give_workload(&copy);
            plan.workloads.insert(behind, copy);
            ids.workloads.insert(behind, given);
        }
        Item::Route(w, r) => {
            let workload = plan.workloads.get_mut(w)?;
            let mut copy = workload.routes.get(r)?.clone();
            copy.name = free_name(&copy.name, &workload.routes.iter().map(|r| r.name.as_str()));
            let given = ids.give_route(copy.steps.len());
            workload.routes.insert(behind, copy);
            ids.workloads.get_mut(w)?.routes.insert(behind, given);
        }
        Item::Step(w, r, s) => {
            let steps = &mut plan.workloads.get_mut(w)?.routes.get_mut(r)?.steps;
            let copy = steps.get(s)?.clone();
            steps.insert(behind, copy);
            let id = ids.give();
            ids.workloads.get_mut(w)?.routes.get_mut(r)?.steps.insert(behind, id);
        }
    }
    Some(())
}

pub(super) fn remove(document: &mut Document, item: Item) -> Option<()> {
    if item.position() >= count(document, item) {
        return None;
    }
    let Document { plan, ids } = document;
    match item {
        Item::Stream(i) => {
            plan.site.streams.remove(i);
            ids.streams.remove(i);
        }
        Item::Material(i) => {
            plan.materials.remove(i);
            ids.materials.remove(i);
        }
        Item::Workload(w) => {
            plan.workloads.remove(w);
            ids.workloads.remove(w);
        }
        Item::Route(w, r) => {
            let workload = plan.workloads.get_mut(w)?;
            let gone = workload.routes.remove(r);
            // Without the present route nothing could be compared: the first of those left takes its place.
            if gone.name == workload.present {
                workload.present = workload.routes.first().map_or(String::new(), |first| first.name.clone());
            }
            ids.workloads.get_mut(w)?.routes.remove(r);
        }
        Item::Step(w, r, s) => {
            plan.workloads.get_mut(w)?.routes.get_mut(r)?.steps.remove(s);
            ids.workloads.get_mut(w)?.routes.get_mut(r)?.steps.remove(s);
        }
    }
    Some(())
}

pub(super) fn shift(document: &mut Document, item: Item, up: bool) -> Option<()> {
    let i = item.position();
    let j = if up { i.checked_sub(1)? } else { i + 1 };
    let len = count(document, item);
    if i >= len || j >= len {
        return None;
    }
    let Document { plan, ids } = document;
    match item {
        Item::Stream(_) => {
            plan.site.streams.swap(i, j);
            ids.streams.swap(i, j);
        }
        Item::Material(_) => {
            plan.materials.swap(i, j);
            ids.materials.swap(i, j);
        }
        Item::Workload(_) => {
            plan.workloads.swap(i, j);
            ids.workloads.swap(i, j);
        }
        Item::Route(w, _) => {
            plan.workloads.get_mut(w)?.routes.swap(i, j);
            ids.workloads.get_mut(w)?.routes.swap(i, j);
        }
        Item::Step(w, r, _) => {
            plan.workloads.get_mut(w)?.routes.get_mut(r)?.steps.swap(i, j);
            ids.workloads.get_mut(w)?.routes.get_mut(r)?.steps.swap(i, j);
        }
    }
    Some(())
}
