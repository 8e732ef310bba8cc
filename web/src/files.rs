//! Opening what a file or the browser's storage holds. Nothing here touches the present work unless there is a plan to
//! take its place.
use crate::form::sentence;
use crate::state::{Action, From, Notice, State};
use thimbleworth::plan::{Plan, Problem, Severity, open, open_bytes, save};

/// The key under which unsaved work is kept: a name of our own, with a version, because other pages opened from the disk
/// may share the storage.
pub const RECOVERY_KEY: &str = "thimbleworth/recovery/1";

/// The most problems of a file that are listed.
const LISTED: usize = 12;

/// What opening a file leads to: its plan in place of the present one, or a message.
#[must_use]
pub fn opened(name: &str, size: f64, bytes: &[u8], present: &Plan) -> Action {
    if bytes.is_empty() && size > 0.0 {
        let mut notice = Notice::wrong(format!("{name} is too large to be a plan; your work is as it was."));
        notice.lines.push(format!("Found {:.0} million bytes; a plan may have 8.", size / 1e6));
        return Action::Say(notice);
    }
    let opened = open_bytes(bytes);
    let errors = opened.problems.iter().filter(|p| p.severity == Severity::Error).count();
    let lines: Vec<String> = opened.problems.iter().take(LISTED).map(line).collect();
    let lines = match opened.problems.len().checked_sub(LISTED) {
        Some(more) if more > 0 => lines.into_iter().chain([format!("and {more} more")]).collect(),
        _ => lines,
    };
    match opened.plan {
        Some(plan) if errors == 0 => {
            // What was migrated or is worth knowing is said.
            Action::Open(From::File(name.to_owned()), Box::new(plan), lines)
        }
        _ => {
            let mut notice = Notice::wrong(format!("{name} could not be opened; your work is as it was."));
            notice.lines = lines;
            // The present plan stays; it is named so that nobody wonders which.
            if !present.title.trim().is_empty() {
                notice.text = format!("{name} could not be opened; “{}” is as it was.", present.title.trim());
            }
            Action::Say(notice)
        }
    }
}

fn line(problem: &Problem) -> String {
    if problem.path.is_empty() {
        sentence(problem)
    } else {
        format!("{}: {}", problem.path, sentence(problem))
    }
}

/// The unsaved work as text for the browser's storage: the name of its file on a line of its own, empty where it has
/// none, then the plan.
#[must_use]
pub fn recovery(state: &State) -> String {
    let file = state.file().unwrap_or_default();
    let name: String = file.chars().filter(|c| *c != '\n').collect();
    name + "\n" + &save(state.plan())
}

/// Reads what [`recovery`] wrote; nothing where it is damaged or no plan of ours.
#[must_use]
pub fn read_recovery(text: &str) -> Option<(Option<String>, Plan)> {
    let (file, plan) = text.split_once('\n')?;
    Some(((!file.is_empty()).then(|| file.to_owned()), open(plan).plan?))
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::document::blank;
    use std::rc::Rc;

    fn said(bytes: &[u8]) -> Notice {
        match opened("work.json", 10.0, bytes, &Plan { title: "Mine".into(), ..blank() }) {
            Action::Say(notice) => notice,
            other => panic!("{other:?}"),
        }
    }

    #[test]
    fn a_file_that_is_no_plan_leaves_the_work_alone_and_is_named() {
        for bytes in [&b"{"[..], b"[]", b"\xff\xfe{", b"{ \"thimbleworth\": 99 }", b"null"] {
            let notice = said(bytes);
            assert!(notice.wrong && !notice.lines.is_empty());
            assert_eq!(notice.text, "work.json could not be opened; “Mine” is as it was.");
        }
    }

    #[test]
    fn a_problem_is_given_with_its_place() {
        let notice = said(br#"{ "thimbleworth": 1, "title": "x", "site": { "name": "y", "streams": [] }, "workloads": [{ "name": 3 }] }"#);
        assert!(notice.lines.iter().any(|l| l.starts_with("workloads[0].name: ")), "{:?}", notice.lines);
        assert!(notice.lines.len() <= LISTED + 1);
    }

    #[test]
    fn a_file_that_is_too_large_is_refused_before_it_is_read() {
        let action = opened("all.json", 3e9, &[], &blank());
        assert!(
            matches!(action, Action::Say(Notice { wrong: true, ref text, .. }) if text.starts_with("all.json is too large"))
        );
    }

    #[test]
    fn what_is_kept_is_read_back_and_what_is_damaged_is_not() {
        let state = Rc::new(State::default()).after(Action::Saved("a.json".into()));
        assert_eq!(read_recovery(&recovery(&state)), Some((Some("a.json".into()), blank())));
        for text in ["", "{", "{}", "\n", "\n{", "a.json\n{}", "a.json"] {
            assert_eq!(read_recovery(text), None, "{text}");
        }
    }
}
