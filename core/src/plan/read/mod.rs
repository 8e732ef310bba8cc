//! Strict reading: every problem at once, each with its exact place, and the plan as far as it could be read.

mod build;
mod check;
mod names;

use super::document::{PLAN_VERSION, Plan};
use super::keys::VERSION_KEY;
use super::migrate::{MIGRATIONS, bring_up};
use super::path::Path;
use super::problem::{Problem, Severity};
use super::tree::{self, Node};

/// At most this many errors are listed; with one more the check ends and says so.
const MOST_PROBLEMS: usize = 1000;

/// A document that was opened: the plan as far as it could be read, and everything that is wrong or doubtful in its
/// form. What it means (techniques, units, bounds, places) is checked elsewhere.
#[derive(Clone, Debug, Default, PartialEq, Eq)]
pub struct Opened {
    /// The plan; with errors too, so that it can be shown and mended: a part that could not be read is empty, and
    /// every list has the length that it has in the document, so that the paths of the problems hold. Nothing when
    /// the document is no plan, or one of a version that this library does not know.
    pub plan: Option<Plan>,
    /// The problems: those of the values in the order of the document, then those of names that refer to one another.
    pub problems: Vec<Problem>,
}

impl Opened {
    /// Whether there is a plan without an error in its form.
    #[must_use]
    pub fn usable(&self) -> bool {
        self.plan.is_some() && self.problems.iter().all(|problem| problem.severity != Severity::Error)
    }
}

/// Problems as they are found.
#[derive(Default)]
struct Problems {
    listed: Vec<Problem>,
    full: bool,
}

impl Problems {
    fn error(&mut self, path: &Path<'_>, found: impl Into<String>, need: impl Into<String>) {
        if self.listed.len() < MOST_PROBLEMS {
            self.listed.push(Problem::error(path.to_string(), found, need));
        } else {
            self.full = true;
        }
    }

    fn note(&mut self, found: impl Into<String>) {
        self.listed.push(Problem::note("", found));
    }

    fn with(mut self, plan: Option<Plan>) -> Opened {
        if self.full {
            let found =
                format!("there are more than these {MOST_PROBLEMS} problems; the others are not listed");
            self.listed.push(Problem::error("", found, "these mended first"));
        }
        Opened { plan, problems: self.listed }
    }
}

/// Opens a plan from the bytes of a file: [`open`], after a look at their encoding.
///
/// ```
/// use thimbleworth::plan::open_bytes;
/// let opened = open_bytes(b"{ \"thimbleworth\": 1, \xff");
/// assert!(!opened.usable());
/// assert_eq!(opened.problems[0].found, "the byte 0xFF at offset 21 is not UTF-8 text");
/// ```
#[must_use]
pub fn open_bytes(bytes: &[u8]) -> Opened {
    match std::str::from_utf8(bytes) {
        Ok(text) => open(text),
        Err(error) => {
            let at = error.valid_up_to();
            let byte = bytes.get(at).copied().unwrap_or_default();
            let two_byte_text = matches!(bytes, [0xff, 0xfe, ..] | [0xfe, 0xff, ..]);
            let mut problems = Problems::default();
            problems.error(
                &Path::Root,
                if two_byte_text {
                    "the file is UTF-16 text, by its first two bytes".to_owned()
                } else {
                    format!("the byte 0x{byte:02X} at offset {at} is not UTF-8 text")
                },
                "a JSON file saved as UTF-8",
            );
            problems.with(None)
        }
    }
}

/// Opens a plan: reads it strictly, brings one of an older version up to the newest, and reports every problem of its
/// form at once.
///
/// Errors are: text that is no JSON (the only kind that hides others); a missing, newer or unknown version; keys that
/// are unknown, missing or written twice; a value of the wrong type; a word that is not one of those allowed; an empty
/// name; two workloads, routes of a workload or streams of one name; a present route that is none of the routes.
///
/// ```
/// use thimbleworth::plan::open;
/// let opened = open(r#"{ "thimbleworth": 1, "title": "Trial", "workloads": [],
///                        "site": { "name": "Mill", "stream": [] } }"#);
/// let said: Vec<String> = opened.problems.iter().map(|p| format!("{}: {}", p.path, p.found)).collect();
/// assert_eq!(said, [
///     "workloads: an empty list",
///     "site.streams: `streams` is missing",
///     "site.stream: the key `stream` is not one that a site has",
/// ]);
/// assert_eq!(opened.plan.map(|plan| plan.title).as_deref(), Some("Trial"));
/// ```
#[must_use]
pub fn open(text: &str) -> Opened {
    let mut problems = Problems::default();
    let text = match text.strip_prefix('\u{feff}') {
        Some(rest) => {
            problems.note("the file starts with a byte order mark; it was skipped, and is not written again");
            rest
        }
        None => text,
    };
    if text.trim_ascii().is_empty() {
        problems.error(
            &Path::Root,
            "the document is empty",
            "a plan: a JSON object that starts with \"thimbleworth\": 1",
        );
        return problems.with(None);
    }
    let tree = match tree::read(text) {
        Ok(tree) => tree,
        Err(bad) => {
            let found = format!("line {}, column {}: {}", bad.line, bad.column, bad.found);
            problems.error(&Path::Root, found, bad.need);
            return problems.with(None);
        }
    };
    let Some(tree) = newest(tree, &mut problems) else { return problems.with(None) };
    check::plan(&tree, &mut problems);
    let plan = build::plan(&tree);
    names::check(&plan, &mut problems);
    problems.with(Some(plan))
}

/// The tree as one of the newest version, or nothing when there is no reading it as a plan.
fn newest(tree: Node, problems: &mut Problems) -> Option<Node> {
    let Node::Map(entries) = &tree else {
        problems.error(
            &Path::Root,
            format!("the document is {}", check::describe(&tree)),
            "a plan: a JSON object that starts with \"thimbleworth\": 1",
        );
        return None;
    };
    let find = |name: &str| entries.iter().find(|(key, _)| key == name).map(|(_, value)| value);
    let path = Path::Root.key(VERSION_KEY);
    let need = format!("\"thimbleworth\": {PLAN_VERSION}");
    let version = match find(VERSION_KEY) {
        None => {
            problems.error(
                &path,
                "`thimbleworth` is missing: this does not look like a Thimbleworth plan",
                format!("{need} as the first key of a plan"),
            );
            // With its main parts there it is most likely a plan all the same, and its other errors are worth knowing.
            return (find("site").is_some() || find("workloads").is_some()).then_some(tree);
        }
        Some(Node::Number(number)) => number.parse::<u64>().ok(),
        Some(_) => None,
    };
    match version {
        // What stands there instead is reported with the types of all the other keys.
        None => Some(tree),
        Some(version) if version > PLAN_VERSION => {
            problems.error(
                &path,
                format!(
                    "this plan is of version {version}, and this program knows plans up to version {PLAN_VERSION}"
                ),
                "a newer Thimbleworth, which opens it as it is",
            );
            None
        }
        Some(version) => match bring_up(tree, version, PLAN_VERSION, MIGRATIONS) {
            Some((tree, notes)) => {
                if version < PLAN_VERSION {
                    problems.note(format!(
                        "the plan was of version {version} and is now of version {PLAN_VERSION}"
                    ));
                }
                for note in notes {
                    problems.note(note);
                }
                Some(tree)
            }
            None => {
                problems.error(&path, format!("there is no version {version} of a plan"), need);
                None
            }
        },
    }
}
