//! Files, the report, undo and redo by name, and whether the work is saved.
use yew::prelude::*;

/// What a person asks for; what it takes is the business of the frame.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(crate) enum Wish {
    Blank,
    Example(usize),
    Open,
    Save,
    Print,
    Export(Export),
    Undo,
    Redo,
}

/// A document for people or other programs.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(crate) enum Export {
    Json,
    Csv,
    Markdown,
}

#[derive(Properties, PartialEq)]
pub(crate) struct Props {
    /// The name of the action to take back, if there is one.
    pub(crate) undo: Option<AttrValue>,
    /// The name of the action to do again, if there is one.
    pub(crate) redo: Option<AttrValue>,
    pub(crate) unsaved: bool,
    /// The titles of the shipped examples.
    pub(crate) examples: Vec<AttrValue>,
    pub(crate) wish: Callback<Wish>,
}

#[component]
pub(crate) fn Toolbar(props: &Props) -> Html {
    // A button that stays focusable when it has nothing to do, so that the keyboard does not lose its place.
    let button = |label: String, keys: &'static str, idle: bool, wish: Wish| {
        let on = props.wish.clone();
        let onclick = Callback::from(move |event: MouseEvent| {
            // A menu has done its work once something is chosen.
            let menu =
                event.target_dyn_into::<web_sys::Element>().and_then(|b| b.closest("details").ok().flatten());
            if let Some(menu) = menu {
                // A menu that stays open is no harm.
                let _ = menu.remove_attribute("open");
            }
            on.emit(wish);
        });
        html! {
            <button type="button" aria-disabled={idle.then_some("true")} aria-keyshortcuts={(!keys.is_empty()).then_some(keys)}
                {onclick}>{ label }</button>
        }
    };
    let named = |verb: &str, name: Option<&AttrValue>| {
        name.map_or_else(|| verb.to_owned(), |name| format!("{verb}: {name}"))
    };
    html! {
        <div class="toolbar" role="group" aria-label="Plan">
            { button("Open a file".into(), "Control+O Meta+O", false, Wish::Open) }
            { button("Save".into(), "Control+S Meta+S", false, Wish::Save) }
            <details class="menu">
                <summary>{ "Begin anew" }</summary>
                <div class="choices">
                    { button("Blank plan".into(), "", false, Wish::Blank) }
                    { for props.examples.iter().enumerate().map(|(i, title)| {
                        button(format!("Example: {title}"), "", false, Wish::Example(i))
                    }) }
                </div>
            </details>
            <details class="menu">
                <summary>{ "Hand on" }</summary>
                <div class="choices">
                    { button("Results as JSON, for programs".into(), "", false, Wish::Export(Export::Json)) }
                    { button("Figures as CSV, for spreadsheets".into(), "", false, Wish::Export(Export::Csv)) }
                    { button("Report as Markdown, for documents".into(), "", false, Wish::Export(Export::Markdown)) }
                </div>
            </details>
            { button("Print the report".into(), "", false, Wish::Print) }
            { button(named("Undo", props.undo.as_ref()), "Control+Z Meta+Z", props.undo.is_none(), Wish::Undo) }
            { button(named("Redo", props.redo.as_ref()), "Control+Y Control+Shift+Z Meta+Shift+Z", props.redo.is_none(), Wish::Redo) }
            <p class="saved">{ if props.unsaved { "Unsaved changes" } else { "No unsaved changes" } }</p>
        </div>
    }
}
