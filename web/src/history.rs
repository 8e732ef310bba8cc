//! What was done and can be undone: two stacks of named documents.
use std::rc::Rc;

/// Steps kept; older ones are forgotten first.
const DEPTH: usize = 200;

/// One action that can be undone or redone: its name, and the document on its far side.
#[derive(Clone, Debug, PartialEq, Eq)]
struct Entry<T> {
    name: String,
    document: Rc<T>,
}

/// A document with its past and its future.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct History<T> {
    past: Vec<Entry<T>>,
    present: Rc<T>,
    future: Vec<Entry<T>>,
    /// The field whose edits are being merged into one action.
    open_place: Option<String>,
}

impl<T: PartialEq> History<T> {
    /// A document with no past.
    #[must_use]
    pub fn new(document: T) -> Self {
        Self { past: Vec::new(), present: Rc::new(document), future: Vec::new(), open_place: None }
    }

    /// The document as it stands.
    #[must_use]
    pub fn present(&self) -> &Rc<T> {
        &self.present
    }

    /// Puts `document` in place of the present one as the action `name`. Consecutive actions with the same `place`
    /// (the path of a field) count as one. An action that changes nothing leaves no trace: returns whether it did.
    pub fn record(&mut self, name: &str, place: Option<&str>, document: T) -> bool {
        if *self.present == document {
            return false;
        }
        let before = std::mem::replace(&mut self.present, Rc::new(document));
        let merges = place.is_some() && self.open_place.as_deref() == place;
        if !merges {
            self.past.push(Entry { name: name.to_owned(), document: before });
            if self.past.len() > DEPTH {
                self.past.remove(0);
            }
        }
        self.future.clear();
        self.open_place = place.map(str::to_owned);
        true
    }

    /// The name of the action that [`undo`](Self::undo) would take back.
    #[must_use]
    pub fn undo_name(&self) -> Option<&str> {
        self.past.last().map(|entry| entry.name.as_str())
    }

    /// The name of the action that [`redo`](Self::redo) would do again.
    #[must_use]
    pub fn redo_name(&self) -> Option<&str> {
        self.future.last().map(|entry| entry.name.as_str())
    }

    /// Takes the last action back; returns whether there was one.
    pub fn undo(&mut self) -> bool {
        Self::step(&mut self.past, &mut self.present, &mut self.future, &mut self.open_place)
    }

    /// Does the last undone action again; returns whether there was one.
    pub fn redo(&mut self) -> bool {
        Self::step(&mut self.future, &mut self.present, &mut self.past, &mut self.open_place)
    }

    /// The next edit starts an action of its own, even in the same field (after a save, say).
    pub fn close_place(&mut self) {
        self.open_place = None;
    }

    fn step(
        from: &mut Vec<Entry<T>>,
        present: &mut Rc<T>,
        to: &mut Vec<Entry<T>>,
        open_place: &mut Option<String>,
    ) -> bool {
        let Some(Entry { name, document }) = from.pop() else {
            return false;
        };
        to.push(Entry { name, document: std::mem::replace(present, document) });
        *open_place = None;
        true
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn typed(history: &mut History<String>, place: &str, text: &str) -> bool {
        history.record(&format!("change {place}"), Some(place), text.to_owned())
    }

    #[test]
    fn undo_and_redo_walk_the_same_documents_and_names() {
        let mut history = History::new("a".to_owned());
        typed(&mut history, "title", "b");
        typed(&mut history, "notes", "c");
        assert_eq!(history.undo_name(), Some("change notes"));
        assert!(history.undo());
        assert_eq!((history.present().as_str(), history.undo_name()), ("b", Some("change title")));
        assert_eq!(history.redo_name(), Some("change notes"));
        assert!(history.undo());
        assert_eq!((history.present().as_str(), history.undo_name()), ("a", None));
        assert!(!history.undo());
        assert!(history.redo());
        assert!(history.redo());
        assert!(!history.redo());
        assert_eq!(history.present().as_str(), "c");
    }

    #[test]
    fn consecutive_edits_of_one_field_are_one_action() {
        let mut history = History::new(String::new());
        for text in ["2", "25", "250"] {
            typed(&mut history, "charge", text);
        }
        assert!(history.undo());
        assert_eq!(history.present().as_str(), "");
        assert!(history.redo());
        typed(&mut history, "charge", "2500");
        history.undo();
        assert_eq!(history.present().as_str(), "250", "an undo or redo in between ends the merge");
    }

    #[test]
    fn closing_the_place_ends_the_merge() {
        let mut history = History::new(String::new());
        typed(&mut history, "charge", "2");
        history.close_place();
        typed(&mut history, "charge", "25");
        history.undo();
        assert_eq!(history.present().as_str(), "2");
    }

    #[test]
    fn a_new_action_forgets_what_was_undone() {
        let mut history = History::new("a".to_owned());
        typed(&mut history, "title", "b");
        history.undo();
        typed(&mut history, "title", "c");
        assert_eq!(history.redo_name(), None);
    }

    #[test]
    fn an_action_without_effect_leaves_no_trace() {
        let mut history = History::new("a".to_owned());
        assert!(!typed(&mut history, "title", "a"));
        assert_eq!(history.undo_name(), None);
    }

    #[test]
    fn the_oldest_action_is_forgotten_first() {
        let mut history = History::new(0);
        for n in 1..=DEPTH + 3 {
            history.record("count", None, n);
        }
        while history.undo() {}
        assert_eq!(**history.present(), 3);
    }
}
