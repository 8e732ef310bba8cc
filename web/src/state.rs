//! The state of the page and every action on it, without the document object model: tested natively.
use crate::document::{Document, blank};
use crate::edit::{Change, Edit, Item};
use crate::history::History;
use crate::reckon::Basis;
use std::rc::Rc;
use thimbleworth::letter::small;
use thimbleworth::plan::Plan;

/// What the page knows.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct State {
    history: History<Document>,
    /// The document as it was last saved or opened.
    saved: Rc<Document>,
    /// The name of the file that holds the plan.
    file: Option<String>,
    /// What is looked at; never undone, never saved.
    pub view: View,
}

/// What is looked at.
#[derive(Clone, Debug, Default, PartialEq, Eq)]
pub struct View {
    /// The route whose form is open.
    pub route: Option<u32>,
    /// For how much work the figures are shown.
    pub basis: Basis,
    /// The figure that is opened into its working.
    pub opened: Option<Opened>,
    /// Whether every problem shows at its field, and not only those of fields that have been left.
    pub show_all: bool,
    /// Whether the list of what is to be mended stands open.
    pub listed: bool,
    /// The path whose element should take the focus, and a count that makes each request a new one.
    pub focus: Option<(u32, String)>,
    /// What was just done, for the line below the toolbar.
    pub notice: Option<Notice>,
    /// Whether the plan is one of the shipped examples.
    pub example: bool,
}

/// A figure: workload and route as they stand in the plan, and its id.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Opened {
    /// The workload.
    pub workload: usize,
    /// The route.
    pub route: usize,
    /// The figure's id.
    pub figure: String,
}

/// A message about something that was done or could not be done.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Notice {
    /// What happened.
    pub text: String,
    /// Further lines: places, what was found, what would do.
    pub lines: Vec<String>,
    /// Whether something went wrong.
    pub wrong: bool,
}

impl Notice {
    /// Something was done.
    #[must_use]
    pub fn done(text: impl Into<String>) -> Self {
        Self { text: text.into(), lines: Vec::new(), wrong: false }
    }

    /// Something could not be done.
    #[must_use]
    pub fn wrong(text: impl Into<String>) -> Self {
        Self { text: text.into(), lines: Vec::new(), wrong: true }
    }
}

/// Where a plan comes from that is opened.
#[derive(Clone, Debug, PartialEq, Eq)]
pub enum From {
    /// A file of this name.
    File(String),
    /// A shipped example.
    Example,
    /// Nothing: a new plan.
    Blank,
    /// The copy kept against a crash; it is not in any file.
    Recovery(Option<String>),
}

/// Everything a person can do to the state.
#[derive(Clone, Debug, PartialEq, Eq)]
pub enum Action {
    /// Changes the plan.
    Edit(Edit),
    /// Opens another plan in place of the present one, with remarks on what was found while opening.
    Open(From, Box<Plan>, Vec<String>),
    /// The present plan has been saved under this name.
    Saved(String),
    /// Takes the last action back.
    Undo,
    /// Does the last undone action again.
    Redo,
    /// Opens the form of the route with this id, or closes the open one.
    Route(Option<u32>),
    /// Shows the figures for this much work.
    Basis(Basis),
    /// Opens a figure into its working, or closes it.
    Figure(Option<Opened>),
    /// Shows every problem, lists them and goes there.
    Mend,
    /// Opens or closes the list of problems.
    List(bool),
    /// Goes to the field at a path.
    Go(String),
    /// Says something.
    Say(Notice),
}

impl State {
    /// A state that holds `plan`, with nothing to undo and nothing unsaved.
    #[must_use]
    pub fn new(plan: Plan) -> Self {
        let history = History::new(Document::new(plan, 0));
        let saved = Rc::clone(history.present());
        let mut state = Self { history, saved, file: None, view: View::default() };
        state.view.route = state.first_route();
        state
    }

    /// A state that holds a shipped example.
    #[must_use]
    pub fn example(plan: Plan) -> Self {
        let mut state = Self::new(plan);
        state.view.example = true;
        state.view.show_all = true;
        state
    }

    /// The plan as it stands.
    #[must_use]
    pub fn plan(&self) -> &Plan {
        &self.history.present().plan
    }

    /// The plan as it stands with its ids.
    #[must_use]
    pub fn document(&self) -> &Rc<Document> {
        self.history.present()
    }

    /// The name of the file that holds the plan.
    #[must_use]
    pub fn file(&self) -> Option<&str> {
        self.file.as_deref()
    }

    /// A name for the file when the plan is saved: the present one, or one made of the title.
    #[must_use]
    pub fn file_name(&self) -> String {
        self.file.clone().unwrap_or_else(|| format!("{}.json", stem(&self.plan().title)))
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
        !Rc::ptr_eq(self.document(), &self.saved) && self.plan() != &self.saved.plan
    }

    fn first_route(&self) -> Option<u32> {
        self.document().route_id(0, 0)
    }

    /// After the document has changed under the view: the open form is one that exists.
    fn settle(&mut self) {
        let document = self.document();
        if self.view.route.is_some_and(|id| document.route(id).is_none()) {
            self.view.route = self.first_route();
        }
        self.view.opened = None;
    }

    fn focus(&mut self, path: String) {
        let count = self.view.focus.as_ref().map_or(0, |(count, _)| *count);
        self.view.focus = Some((count + 1, path));
    }

    /// The form of the route that a path lies in is opened, so that there is something to go to.
    fn go(&mut self, path: String) {
        let keys = thimbleworth::plan::keys(&path).unwrap_or_default();
        if let [workloads, w, routes, r, ..] = keys.as_slice()
            && (workloads.as_str(), routes.as_str()) == ("workloads", "routes")
            && let (Ok(w), Ok(r)) = (w.parse(), r.parse())
        {
            self.view.route = self.document().route_id(w, r).or(self.view.route);
        }
        self.focus(path);
    }

    fn edit(&mut self, edit: &Edit) -> bool {
        let mut document = Document::clone(self.document());
        if !edit.apply(&mut document) || !self.history.record(&edit.name, edit.place.as_deref(), document) {
            return false;
        }
        let target = edit.focus(self.document());
        self.settle();
        if let Change::Add(Item::Route(w, _), _) | Change::Duplicate(Item::Route(w, _)) = edit.change {
            let r = match edit.change {
                Change::Duplicate(item) => item.position() + 1,
                _ => self.plan().workloads.get(w).map_or(0, |w| w.routes.len().saturating_sub(1)),
            };
            self.view.route = self.document().route_id(w, r);
        }
        if let Change::Remove(_) = edit.change {
            self.view.notice = Some(Notice::done(format!("Done: {}. Undo takes it back.", edit.name)));
        } else if !self.view.notice.as_ref().is_some_and(|n| n.wrong) {
            self.view.notice = None;
        }
        if let Some(path) = target {
            self.focus(path);
        }
        true
    }

    fn open(&mut self, from: &From, plan: Plan, lines: Vec<String>) {
        let (name, text, file) = match from {
            From::File(name) => (format!("open {name}"), format!("{name} is open."), Some(name.clone())),
            From::Example => {
                ("open the example".to_owned(), format!("The example “{}” is open.", plan.title), None)
            }
            From::Blank => ("start blank".to_owned(), "A blank plan is open.".to_owned(), None),
            From::Recovery(file) => (
                "open the kept copy".to_owned(),
                "The kept copy is open. Save it to a file.".to_owned(),
                file.clone(),
            ),
        };
        let document = Document::new(plan, self.document().ids.next);
        self.history.record(&name, None, document);
        if !matches!(from, From::Recovery(_)) {
            self.saved = Rc::clone(self.document());
        }
        self.file = file;
        self.view = View {
            route: self.first_route(),
            basis: self.view.basis,
            show_all: *from != From::Blank,
            example: *from == From::Example,
            notice: Some(Notice { text, lines, wrong: false }),
            focus: self.view.focus.take(),
            ..View::default()
        };
    }

    /// The state after `action`: the very same one when nothing changes, so that nothing is drawn again.
    #[must_use]
    pub fn after(self: Rc<Self>, action: Action) -> Rc<Self> {
        let mut next = (*self).clone();
        let changed = match action {
            Action::Edit(edit) => next.edit(&edit),
            Action::Open(from, plan, lines) => {
                next.open(&from, *plan, lines);
                true
            }
            Action::Saved(name) => {
                next.history.close_place();
                next.saved = Rc::clone(next.document());
                next.view.notice = Some(Notice::done(format!("{name} is saved.")));
                next.file = Some(name);
                true
            }
            Action::Undo | Action::Redo => {
                let undo = action == Action::Undo;
                let name = if undo { self.undo_name() } else { self.redo_name() };
                let done = if undo { next.history.undo() } else { next.history.redo() };
                if let (true, Some(name)) = (done, name) {
                    next.settle();
                    let verb = if undo { "Undone" } else { "Done again" };
                    next.view.notice = Some(Notice::done(format!("{verb}: {name}.")));
                }
                done
            }
            Action::Route(id) => {
                next.view.route = id;
                true
            }
            Action::Basis(basis) => {
                next.view.basis = basis;
                true
            }
            Action::Figure(opened) => {
                next.view.opened = opened;
                true
            }
            Action::Mend => {
                next.view.show_all = true;
                next.view.listed = true;
                next.focus("mend".to_owned());
                true
            }
            Action::List(open) => {
                next.view.listed = open;
                true
            }
            Action::Go(path) => {
                next.view.show_all = true;
                next.go(path);
                true
            }
            Action::Say(notice) => {
                next.view.notice = Some(notice);
                true
            }
        };
        if changed && next != *self { Rc::new(next) } else { self }
    }
}

impl Default for State {
    fn default() -> Self {
        Self::new(blank())
    }
}

/// A title as the stem of a file's name: letters and digits in lower case, joined by hyphens.
#[must_use]
pub fn stem(title: &str) -> String {
    let mut out = String::new();
    for c in title.chars().take(60) {
        if c.is_alphanumeric() {
            out.push(small(c));
        } else if !out.is_empty() && !out.ends_with('-') {
            out.push('-');
        }
    }
    let out = out.trim_end_matches('-');
    if out.is_empty() { "plan".to_owned() } else { out.to_owned() }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::edit::text;

    fn after(state: &Rc<State>, action: Action) -> Rc<State> {
        Rc::clone(state).after(action)
    }

    fn set(path: &str, label: &str, value: &str) -> Action {
        Action::Edit(Edit::set(path, label, text(value)))
    }

    fn start() -> Rc<State> {
        Rc::new(State::default())
    }

    #[test]
    fn undo_and_redo_carry_the_name_of_the_action() {
        let state = after(&start(), set("title", "Title", "Which route?"));
        assert_eq!((state.undo_name(), state.redo_name()), (Some("change title"), None));
        let state = after(&state, Action::Undo);
        assert_eq!((state.undo_name(), state.redo_name()), (None, Some("change title")));
        assert_eq!(state.plan().title, "");
        let state = after(&state, Action::Redo);
        assert_eq!(state.plan().title, "Which route?");
    }

    #[test]
    fn twenty_edits_can_be_taken_back_one_by_one() {
        let first = start();
        let mut state = Rc::clone(&first);
        for n in 0..20 {
            let field = if n % 2 == 0 { ("title", "Title") } else { ("site.name", "Site") };
            state = after(&state, set(field.0, field.1, &format!("text {n}")));
        }
        for _ in 0..20 {
            state = after(&state, Action::Undo);
        }
        assert_eq!(state.plan(), first.plan());
        assert_eq!(state.undo_name(), None);
        for _ in 0..20 {
            state = after(&state, Action::Redo);
        }
        assert_eq!(state.plan().site.name, "text 19");
    }

    #[test]
    fn an_action_without_effect_returns_the_same_state() {
        let blank = start();
        let actions = [
            Action::Undo,
            Action::Redo,
            set("title", "Title", ""),
            set("no.such", "x", "y"),
            Action::List(false),
        ];
        for action in actions {
            assert!(Rc::ptr_eq(&blank, &after(&blank, action.clone())), "{action:?}");
        }
    }

    #[test]
    fn unsaved_means_different_from_the_file() {
        let blank = start();
        assert!(!blank.is_unsaved());
        let typed = after(&blank, set("title", "Title", "x"));
        assert!(typed.is_unsaved());
        assert!(!after(&typed, Action::Undo).is_unsaved());
        assert!(!after(&typed, set("title", "Title", "")).is_unsaved(), "typed back by hand");
        let saved = after(&typed, Action::Saved("x.json".into()));
        assert!(!saved.is_unsaved());
        assert_eq!(saved.file(), Some("x.json"));
        assert!(after(&saved, Action::Undo).is_unsaved());
    }

    #[test]
    fn opening_a_plan_can_be_undone_and_a_kept_copy_is_unsaved() {
        let typed = after(&start(), set("title", "Title", "mine"));
        let example = Plan { title: "example".into(), ..blank() };
        let opened = after(&typed, Action::Open(From::Example, Box::new(example.clone()), Vec::new()));
        assert!(!opened.is_unsaved());
        assert!(opened.view.example);
        assert_eq!(opened.undo_name(), Some("open the example"));
        assert_eq!(after(&opened, Action::Undo).plan().title, "mine");
        let kept = after(&typed, Action::Open(From::Recovery(None), Box::new(example), Vec::new()));
        assert!(kept.is_unsaved());
    }

    #[test]
    fn the_open_form_is_always_one_that_exists() {
        let state = start();
        let first = state.view.route;
        let added = after(&state, Action::Edit(Edit::list(Change::Add(Item::Route(0, 0), String::new()))));
        assert_ne!(added.view.route, first, "a route that is added is opened");
        let undone = after(&added, Action::Undo);
        assert_eq!(undone.view.route, first);
    }

    #[test]
    fn going_to_a_path_opens_its_route() {
        let state = after(&start(), Action::Edit(Edit::list(Change::Add(Item::Route(0, 0), String::new()))));
        let first = state.document().route_id(0, 0);
        let gone = after(&state, Action::Go("workloads[0].routes[0].steps".into()));
        assert_eq!(gone.view.route, first);
        assert_eq!(gone.view.focus.as_ref().map(|f| f.1.as_str()), Some("workloads[0].routes[0].steps"));
        assert!(
            !Rc::ptr_eq(&gone, &after(&gone, Action::Go("workloads[0].routes[0].steps".into()))),
            "asked again"
        );
    }

    #[test]
    fn a_file_is_named_after_the_title() {
        assert_eq!(
            stem("Harbour sediment: leave the Soxhlet bench?"),
            "harbour-sediment-leave-the-soxhlet-bench"
        );
        assert_eq!(stem(" ../\u{0} "), "plan");
    }
}
