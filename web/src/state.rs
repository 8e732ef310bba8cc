//! The state of the page and every action on it, without the document object model: tested natively.
use crate::history::History;
use std::rc::Rc;
use thimbleworth::plan::Plan;

/// What the page knows.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct State {
    history: History<Plan>,
    /// The plan as it was last saved or opened.
    saved: Rc<Plan>,
}

/// Everything a person can do to the state.
#[derive(Clone, Debug, PartialEq, Eq)]
pub enum Action {
    /// Changes one field of the plan.
    Edit(Edit),
    /// Opens another plan, under the name that undo shows.
    Open(&'static str, Box<Plan>),
    /// The present plan has been saved.
    Saved,
    /// Takes the last action back.
    Undo,
    /// Does the last undone action again.
    Redo,
}

/// A change of one field. Adding a field is one variant and one line in each of the three tables below.
#[derive(Clone, Debug, PartialEq, Eq)]
pub enum Edit {
    /// What is asked.
    Title(String),
    /// Free text that prints with the report.
    Notes(String),
    /// The name of the site.
    SiteName(String),
}

impl Edit {
    /// The name of the action: "Undo: change title".
    fn name(&self) -> &'static str {
        match self {
            Self::Title(_) => "change title",
            Self::Notes(_) => "change notes",
            Self::SiteName(_) => "change site",
        }
    }

    /// The path of the field, which is also the id of its control.
    fn place(&self) -> &'static str {
        match self {
            Self::Title(_) => "title",
            Self::Notes(_) => "notes",
            Self::SiteName(_) => "site.name",
        }
    }

    fn apply(self, plan: &mut Plan) {
        match self {
            Self::Title(text) => plan.title = text,
            Self::Notes(text) => plan.notes = if text.is_empty() { None } else { Some(text) },
            Self::SiteName(text) => plan.site.name = text,
        }
    }
}

impl State {
    /// A state that holds `plan`, with nothing to undo and nothing unsaved.
    #[must_use]
    pub fn new(plan: Plan) -> Self {
        let history = History::new(plan);
        let saved = Rc::clone(history.present());
        Self { history, saved }
    }

    /// The plan as it stands.
    #[must_use]
    pub fn plan(&self) -> &Rc<Plan> {
        self.history.present()
    }

    /// The name of the action that undo would take back.
    #[must_use]
    pub fn undo_name(&self) -> Option<&str> {
        self.history.undo_name()
    }

    /// The name of the action that redo would do again.
    #[must_use]
    pub fn redo_name(&self) -> Option<&str> {
        self.history.redo_name()
    }

    /// Whether there is work that no file holds.
    #[must_use]
    pub fn is_unsaved(&self) -> bool {
        !Rc::ptr_eq(self.plan(), &self.saved) && **self.plan() != *self.saved
    }

    /// The state after `action`: the very same one when nothing changes, so that nothing is drawn again.
    #[must_use]
    pub fn after(self: Rc<Self>, action: Action) -> Rc<Self> {
        let mut next = (*self).clone();
        let changed = match action {
            Action::Edit(edit) => {
                let (name, place) = (edit.name(), edit.place());
                let mut plan = Plan::clone(next.plan());
                edit.apply(&mut plan);
                next.history.record(name, Some(place), plan)
            }
            Action::Open(name, plan) => {
                next.history.record(name, None, *plan);
                next.saved = Rc::clone(next.plan());
                true
            }
            Action::Saved => {
                next.history.close_place();
                next.saved = Rc::clone(next.plan());
                true
            }
            Action::Undo => next.history.undo(),
            Action::Redo => next.history.redo(),
        };
        if changed { Rc::new(next) } else { self }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn after(state: &Rc<State>, action: Action) -> Rc<State> {
        Rc::clone(state).after(action)
    }

    fn title(text: &str) -> Action {
        Action::Edit(Edit::Title(text.to_owned()))
    }

    #[test]
    fn an_edit_changes_its_field_alone() {
        let blank = Rc::new(State::new(Plan::default()));
        let edits = [
            (Edit::Title("Which route?".into()), Plan { title: "Which route?".into(), ..Plan::default() }),
            (Edit::Notes("as agreed".into()), Plan { notes: Some("as agreed".into()), ..Plan::default() }),
        ];
        for (edit, expected) in edits {
            assert_eq!(**after(&blank, Action::Edit(edit)).plan(), expected);
        }
        let site = after(&blank, Action::Edit(Edit::SiteName("Aldmoor".into())));
        assert_eq!(site.plan().site.name, "Aldmoor");
        let emptied = after(&site, Action::Edit(Edit::SiteName(String::new())));
        assert_eq!(**emptied.plan(), Plan::default());
    }

    #[test]
    fn undo_and_redo_carry_the_name_of_the_action() {
        let state = after(&Rc::new(State::new(Plan::default())), title("Which route?"));
        assert_eq!((state.undo_name(), state.redo_name()), (Some("change title"), None));
        let state = after(&state, Action::Undo);
        assert_eq!((state.undo_name(), state.redo_name()), (None, Some("change title")));
        assert_eq!(state.plan().title, "");
        let state = after(&state, Action::Redo);
        assert_eq!(state.plan().title, "Which route?");
    }

    #[test]
    fn an_action_without_effect_returns_the_same_state() {
        let blank = Rc::new(State::new(Plan::default()));
        for action in [Action::Undo, Action::Redo, title("")] {
            assert!(Rc::ptr_eq(&blank, &after(&blank, action)));
        }
    }

    #[test]
    fn unsaved_means_different_from_the_file() {
        let blank = Rc::new(State::new(Plan::default()));
        assert!(!blank.is_unsaved());
        let typed = after(&blank, title("x"));
        assert!(typed.is_unsaved());
        assert!(!after(&typed, Action::Undo).is_unsaved());
        assert!(!after(&typed, title("")).is_unsaved(), "typed back by hand");
        let saved = after(&typed, Action::Saved);
        assert!(!saved.is_unsaved());
        assert!(after(&saved, Action::Undo).is_unsaved());
    }

    #[test]
    fn opening_a_plan_can_be_undone() {
        let typed = after(&Rc::new(State::new(Plan::default())), title("mine"));
        let example = Plan { title: "example".into(), ..Plan::default() };
        let opened = after(&typed, Action::Open("open the example", Box::new(example)));
        assert!(!opened.is_unsaved());
        assert_eq!(opened.undo_name(), Some("open the example"));
        assert_eq!(after(&opened, Action::Undo).plan().title, "mine");
    }
}
