//! What differs between two plans, entry by entry.

use super::document::Plan;
use super::path::Path;
use super::tree::Node;
use super::write;

/// One entry that differs.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Change {
    /// Its path in the newer plan, or in the older one where it has gone.
    pub path: String,
    /// What stood there; nothing where the entry is new.
    pub before: Option<String>,
    /// What stands there now; nothing where it has gone.
    pub after: Option<String>,
}

/// Every plain entry that differs between two plans. Objects in a list that have a name are the same where the name is; the
/// others by their place.
///
/// ```
/// use thimbleworth::plan::{Plan, differences};
/// let old = Plan { title: "Trial".into(), ..Plan::default() };
/// let new = Plan { title: "Second trial".into(), ..Plan::default() };
/// let changes = differences(&old, &new);
/// assert_eq!((changes.len(), changes[0].path.as_str()), (1, "title"));
/// ```
#[must_use]
pub fn differences(old: &Plan, new: &Plan) -> Vec<Change> {
    let mut out = Vec::new();
    walk(Some(&write::tree(old)), Some(&write::tree(new)), &Path::Root, &mut out);
    out
}

fn walk(old: Option<&Node>, new: Option<&Node>, path: &Path<'_>, out: &mut Vec<Change>) {
    if old == new {
        return;
    }
    let entries = |node: Option<&Node>| match node {
        Some(Node::Map(entries)) => entries.clone(),
        _ => Vec::new(),
    };
    let items = |node: Option<&Node>| match node {
        Some(Node::List(items)) => items.clone(),
        _ => Vec::new(),
    };
    match (old, new) {
        (Some(Node::Map(_)) | None, Some(Node::Map(_))) | (Some(Node::Map(_)), None) => {
            let (old, new) = (entries(old), entries(new));
            let at = |list: &[(String, Node)], key: &str| list.iter().position(|(k, _)| k == key);
            for (key, value) in &new {
                walk(at(&old, key).map(|i| &old[i].1), Some(value), &path.key(key), out);
            }
            for (key, value) in old.iter().filter(|(key, _)| at(&new, key).is_none()) {
                walk(Some(value), None, &path.key(key), out);
            }
        }
        (Some(Node::List(_)) | None, Some(Node::List(_))) | (Some(Node::List(_)), None) => {
            let (old, new) = (items(old), items(new));
            let mut met = vec![false; old.len()];
            for (i, item) in new.iter().enumerate() {
                let same = match name(item) {
                    Some(wanted) => old.iter().position(|o| name(o) == Some(wanted)),
                    None => (i < old.len()).then_some(i),
                };
                if let Some(same) = same {
                    met[same] = true;
                }
                walk(same.map(|s| &old[s]), Some(item), &path.index(i), out);
            }
            for (i, item) in old.iter().enumerate().filter(|(i, _)| !met[*i]) {
                walk(Some(item), None, &path.index(i), out);
            }
        }
        _ => out.push(Change { path: path.to_string(), before: old.map(plain), after: new.map(plain) }),
    }
}

/// The name by which an object of a list is known.
fn name(node: &Node) -> Option<&str> {
    let Node::Map(entries) = node else { return None };
    entries.iter().find(|(key, _)| key == "name").and_then(|(_, value)| match value {
        Node::Text(text) => Some(text.as_str()),
        _ => None,
    })
}

fn plain(node: &Node) -> String {
    match node {
        Node::Null => "null".to_owned(),
        Node::YesNo(yes) => yes.to_string(),
        Node::Number(text) | Node::Text(text) => text.clone(),
        Node::List(items) => format!("a list of {}", items.len()),
        Node::Map(entries) => format!("an object with {} keys", entries.len()),
    }
}
