//! The names by which parts of a plan refer to one another: each its own, each reference to one that is there.

use super::super::document::Plan;
use super::super::nearest::nearest;
use super::super::path::Path;
use super::Problems;
use super::check::quote;
use crate::order::Index;

/// At most this many names are listed in a sentence.
const MOST_NAMES: usize = 6;

pub(super) fn check(plan: &Plan, problems: &mut Problems) {
    let site = Path::Root.key("site");
    own(
        plan.site.streams.iter().map(|stream| stream.name.as_str()),
        "stream",
        &site.key("streams"),
        problems,
    );
    let workloads = Path::Root.key("workloads");
    own(plan.workloads.iter().map(|workload| workload.name.as_str()), "workload", &workloads, problems);
    for (position, workload) in plan.workloads.iter().enumerate() {
        if problems.full {
            return;
        }
        let here = workloads.index(position);
        let names = || workload.routes.iter().map(|route| route.name.as_str());
        own(names(), "route", &here.key("routes"), problems);
        let present = workload.present.as_str();
        let mut named = names().filter(|name| !name.trim().is_empty());
        let mut list = named.by_ref().take(MOST_NAMES).map(quote).collect::<Vec<_>>().join(", ");
        // What is empty has been reported as missing or empty.
        if present.trim().is_empty() || list.is_empty() || names().any(|name| name == present) {
            continue;
        }
        if named.next().is_some() {
            list.push_str(" …");
        }
        let need = match nearest(present, names()) {
            Some(near) => format!("perhaps {}; the routes are {list}", quote(near)),
            None => format!("the name of one of the routes: {list}"),
        };
        let found = format!("{} is not a route of this workload", quote(present));
        problems.error(&here.key("present"), found, need);
    }
}

fn own<'a>(names: impl Iterator<Item = &'a str>, what: &str, list: &Path<'_>, problems: &mut Problems) {
    let mut first = Index::default();
    for (position, name) in names.enumerate() {
        // An empty name has been reported.
        if name.trim().is_empty() {
            continue;
        }
        match first.get(name) {
            None => {
                first.put(name, position);
            }
            Some(earlier) => {
                let found = format!("{} is already the name of {}", quote(name), list.index(earlier));
                let need = format!(
                    "a name of its own for each {what}, because other parts of the plan refer to it by name"
                );
                problems.error(&list.index(position).key("name"), found, need);
            }
        }
    }
}
