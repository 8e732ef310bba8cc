//! Undo and redo by name, and whether the work is saved.
use crate::state::Action;
use yew::prelude::*;

#[derive(Properties, PartialEq)]
pub(crate) struct Props {
    /// The name of the action to take back, if there is one.
    pub(crate) undo: Option<AttrValue>,
    /// The name of the action to do again, if there is one.
    pub(crate) redo: Option<AttrValue>,
    pub(crate) unsaved: bool,
    pub(crate) act: Callback<Action>,
}

/// A button that stays focusable when it has nothing to do, so that the keyboard does not lose its place.
fn button(verb: &str, name: Option<&AttrValue>, keys: &'static str, on: Callback<MouseEvent>) -> Html {
    let label = name.map_or_else(|| verb.to_owned(), |name| format!("{verb}: {name}"));
    let idle = name.is_none().then_some("true");
    html! {
        <button type="button" aria-disabled={idle} aria-keyshortcuts={keys} onclick={on}>{ label }</button>
    }
}

#[component]
pub(crate) fn Toolbar(props: &Props) -> Html {
    let on = |action: Action| {
        let act = props.act.clone();
        Callback::from(move |_| act.emit(action.clone()))
    };
    html! {
        <div class="toolbar" role="group" aria-label="Plan">
            { button("Undo", props.undo.as_ref(), "Control+Z Meta+Z", on(Action::Undo)) }
            { button("Redo", props.redo.as_ref(), "Control+Y Control+Shift+Z Meta+Shift+Z", on(Action::Redo)) }
            <p role="status">{ if props.unsaved { "Unsaved changes" } else { "No unsaved changes" } }</p>
        </div>
    }
}
