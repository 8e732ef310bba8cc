//! Every change that can be made to a plan, by name: without the document object model, tested natively.
mod list;
mod path;
mod rename;
mod set;

pub use list::name_of;
pub use path::dom_id;
pub use rename::refusal;
pub use set::{new_step, number, step_field, text};

use crate::document::Document;
use thimbleworth::letter;
use thimbleworth::plan::{Field, Log};

/// One entry of one of the plan's lists.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Item {
    /// A waste stream.
    Stream(usize),
    /// A material of the plan's own.
    Material(usize),
    /// A piece of work.
    Workload(usize),
    /// A route of a piece of work.
    Route(usize, usize),
    /// A step of a route.
    Step(usize, usize, usize),
}

impl Item {
    /// Its place in its own list.
    #[must_use]
    pub const fn position(self) -> usize {
        match self {
            Self::Stream(i)
            | Self::Material(i)
            | Self::Workload(i)
            | Self::Route(_, i)
            | Self::Step(_, _, i) => i,
        }
    }

    /// The same list, another place.
    #[must_use]
    pub const fn at(self, i: usize) -> Self {
        match self {
            Self::Stream(_) => Self::Stream(i),
            Self::Material(_) => Self::Material(i),
            Self::Workload(_) => Self::Workload(i),
            Self::Route(w, _) => Self::Route(w, i),
            Self::Step(w, r, _) => Self::Step(w, r, i),
        }
    }

    /// Its path in the plan. A material has its name for a path, so the plan is looked into.
    #[must_use]
    pub fn path(self, plan: &thimbleworth::plan::Plan) -> String {
        match self {
            Self::Stream(i) => format!("site.streams[{i}]"),
            Self::Material(i) => {
                let name = plan.materials.get(i).map_or("", |m| m.name.as_str());
                thimbleworth::plan::below("materials", name)
            }
            Self::Workload(w) => format!("workloads[{w}]"),
            Self::Route(w, r) => format!("workloads[{w}].routes[{r}]"),
            Self::Step(w, r, s) => format!("workloads[{w}].routes[{r}].steps[{s}]"),
        }
    }

    const fn noun(self) -> &'static str {
        match self {
            Self::Stream(_) => "stream",
            Self::Material(_) => "material",
            Self::Workload(_) => "work",
            Self::Route(..) => "route",
            Self::Step(..) => "step",
        }
    }
}

/// What a change does.
#[derive(Clone, Debug, PartialEq, Eq)]
pub enum Change {
    /// Sets the field at a path, or clears it.
    Set(String, Option<Field>),
    /// Gives an entry another name; references follow.
    Rename(Item, String),
    /// Adds an entry behind the others of its list; a step by the key of its technique.
    Add(Item, String),
    /// Puts a copy of an entry behind it.
    Duplicate(Item),
    /// Takes an entry away.
    Remove(Item),
    /// Moves an entry one place up or down.
    Move(Item, bool),
    /// Keeps how one of the site's records is read.
    Log(Box<Log>),
}

/// A change with the name that undo shows.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Edit {
    /// The name: "change flow".
    pub name: String,
    /// Edits of the same place that follow one another are one action.
    pub place: Option<String>,
    /// What it does.
    pub change: Change,
}

impl Edit {
    /// A field set or cleared; `label` is what the field is called.
    #[must_use]
    pub fn set(path: &str, label: &str, value: Option<Field>) -> Self {
        let change = Change::Set(path.to_owned(), value);
        Self { name: format!("change {}", lowered(label)), place: Some(path.to_owned()), change }
    }

    /// Another name.
    #[must_use]
    pub fn rename(item: Item, name: &str) -> Self {
        Self {
            name: format!("rename {}", item.noun()),
            place: None,
            change: Change::Rename(item, name.to_owned()),
        }
    }

    /// One of the changes to lists.
    #[must_use]
    pub fn list(change: Change) -> Self {
        let (verb, item) = match &change {
            Change::Add(item, _) => ("add", *item),
            Change::Duplicate(item) => ("duplicate", *item),
            Change::Remove(item) => ("remove", *item),
            Change::Move(item, true) => ("move up", *item),
            Change::Move(item, false) => ("move down", *item),
            Change::Rename(item, _) => ("rename", *item),
            Change::Log(log) => {
                let name = format!("change how {} is read", log.name);
                return Self { name, place: None, change };
            }
            Change::Set(path, _) => {
                return Self { name: "change field".to_owned(), place: Some(path.clone()), change };
            }
        };
        let name = match verb.split_once(' ') {
            Some((verb, way)) => format!("{verb} {} {way}", item.noun()),
            None => format!("{verb} {}", item.noun()),
        };
        Self { name, place: None, change }
    }

    /// The path that should have the keyboard's focus afterwards; nothing where it stays.
    #[must_use]
    pub fn focus(&self, after: &Document) -> Option<String> {
        match &self.change {
            Change::Set(..) | Change::Rename(..) | Change::Log(_) => None,
            Change::Add(item, _) => {
                Some(item.at(list::count(after, *item).saturating_sub(1)).path(&after.plan))
            }
            Change::Duplicate(item) => Some(item.at(item.position() + 1).path(&after.plan)),
            Change::Remove(item) => {
                let left = list::count(after, *item);
                if left == 0 {
                    return Some(list::above(*item));
                }
                let i = item.position();
                Some(item.at(if i < left { i } else { left - 1 }).path(&after.plan))
            }
            // What is moved in the document loses the focus; the same button gets it back.
            Change::Move(item, up) => {
                let i = item.position();
                let moved = item.at(if *up { i.saturating_sub(1) } else { i + 1 });
                Some(format!("{}-move-{}", moved.path(&after.plan), if *up { "up" } else { "down" }))
            }
        }
    }

    /// Does it; returns whether it could be done.
    pub fn apply(&self, document: &mut Document) -> bool {
        match &self.change {
            Change::Set(path, value) => set::set(&mut document.plan, path, value.clone()),
            Change::Rename(item, name) => rename::rename(&mut document.plan, *item, name).is_some(),
            Change::Add(item, what) => list::add(document, *item, what).is_some(),
            Change::Duplicate(item) => list::duplicate(document, *item).is_some(),
            Change::Remove(item) => list::remove(document, *item).is_some(),
            Change::Move(item, up) => list::shift(document, *item, *up).is_some(),
            Change::Log(log) => {
                let logs = &mut document.plan.logs;
                match logs.iter_mut().find(|known| known.name == log.name) {
                    Some(known) => *known = (**log).clone(),
                    None => logs.push((**log).clone()),
                }
                true
            }
        }
    }
}

/// A label inside a sentence: its first letter small, unless it is an abbreviation or a formula.
#[must_use]
pub fn lowered(label: &str) -> String {
    let mut letters = label.chars();
    match (letters.next(), letters.next()) {
        (Some(first), Some(second)) if letter::capital(second) != second || second == ' ' => {
            format!("{}{}", letter::small(first), &label[first.len_utf8()..])
        }
        _ => label.to_owned(),
    }
}

#[cfg(test)]
mod tests;
