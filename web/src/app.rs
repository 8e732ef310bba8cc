//! The frame: toolbar, contents, the sections in their order, and the footer.
use crate::contents::Contents;
use crate::sections::{SECTIONS, View};
use crate::state::{Action, Edit, State};
use crate::toolbar::Toolbar;
use gloo::events::{EventListener, EventListenerOptions};
use gloo::utils::document;
use std::rc::Rc;
use thimbleworth::plan::{PLAN_VERSION, Plan};
use wasm_bindgen::JsCast;
use yew::prelude::*;

impl Reducible for State {
    type Action = Action;
    fn reduce(self: Rc<Self>, action: Action) -> Rc<Self> {
        self.after(action)
    }
}

/// The title of the window: the plan's own, marked while there is unsaved work.
fn window_title(state: &State) -> String {
    let name = if state.plan().title.trim().is_empty() { "Untitled plan" } else { state.plan().title.trim() };
    let mark = if state.is_unsaved() { "• " } else { "" };
    format!("{mark}{name} – Thimbleworth")
}

/// The action that a key stroke stands for. Inside a field that is being edited, the browser's own undo wins.
fn shortcut(event: &web_sys::KeyboardEvent) -> Option<Action> {
    let in_a_field = event.target().is_some_and(|target| {
        target.has_type::<web_sys::HtmlInputElement>() || target.has_type::<web_sys::HtmlTextAreaElement>()
    });
    if in_a_field || event.alt_key() || !(event.ctrl_key() || event.meta_key()) {
        return None;
    }
    match (event.key().to_ascii_lowercase().as_str(), event.shift_key()) {
        ("z", false) => Some(Action::Undo),
        ("z", true) | ("y", false) => Some(Action::Redo),
        _ => None,
    }
}

#[component]
pub(crate) fn App() -> Html {
    let state = use_reducer(|| State::new(Plan::default()));
    let edit = {
        let dispatcher = state.dispatcher();
        use_callback((), move |edit: Edit, ()| dispatcher.dispatch(Action::Edit(edit)))
    };
    let act = {
        let dispatcher = state.dispatcher();
        use_callback((), move |action: Action, ()| dispatcher.dispatch(action))
    };
    use_effect_with(window_title(&state), |title| document().set_title(title));
    use_effect_with((), {
        let act = act.clone();
        move |()| {
            let options = EventListenerOptions::enable_prevent_default();
            let listener =
                EventListener::new_with_options(&document(), "keydown", options, move |event: &Event| {
                    if let Some(action) = event.dyn_ref().and_then(shortcut) {
                        event.prevent_default();
                        act.emit(action);
                    }
                });
            move || drop(listener)
        }
    });

    let undo = state.undo_name().map(|name| AttrValue::from(name.to_owned()));
    let redo = state.redo_name().map(|name| AttrValue::from(name.to_owned()));
    let view = View { plan: Rc::clone(state.plan()), edit };
    html! {
        <>
            <Toolbar {undo} {redo} unsaved={state.is_unsaved()} {act} />
            <div class="book">
                <Contents />
                <main id="main" tabindex="-1">
                    { for SECTIONS.iter().enumerate().map(|(i, section)| section.draw(i + 1, &view)) }
                </main>
            </div>
            <footer class="foot">
                <p>
                    { format!("{} reads and writes plans of version {PLAN_VERSION}. ", crate::PROGRAM) }
                    { "It works without a network, and nothing leaves this page." }
                </p>
            </footer>
        </>
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn the_window_names_the_plan_and_marks_unsaved_work() {
        let blank = Rc::new(State::new(Plan::default()));
        assert_eq!(window_title(&blank), "Untitled plan – Thimbleworth");
        let typed = Rc::clone(&blank).after(Action::Edit(Edit::Title(" Hop oil ".into())));
        assert_eq!(window_title(&typed), "• Hop oil – Thimbleworth");
        assert_eq!(window_title(&typed.after(Action::Saved)), "Hop oil – Thimbleworth");
    }
}
