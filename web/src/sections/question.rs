//! Section "The question": what is asked, and for which site.
use super::View;
use crate::state::Edit;
use yew::prelude::*;

#[derive(Properties, PartialEq)]
pub(crate) struct Props {
    pub(crate) view: View,
}

#[component]
pub(crate) fn Question(props: &Props) -> Html {
    let View { plan, edit } = &props.view;
    let on_input = |variant: fn(String) -> Edit| {
        let edit = edit.clone();
        Callback::from(move |event: InputEvent| {
            if let Some(input) = event.target_dyn_into::<web_sys::HtmlInputElement>() {
                edit.emit(variant(input.value()));
            }
        })
    };
    let on_notes = {
        let edit = edit.clone();
        Callback::from(move |event: InputEvent| {
            if let Some(area) = event.target_dyn_into::<web_sys::HtmlTextAreaElement>() {
                edit.emit(Edit::Notes(area.value()));
            }
        })
    };
    html! {
        <>
            <div class="field wide">
                <label for="title">{ "Title" }</label>
                <p class="hint" id="title-hint">{ "The question in a few words, as it prints on the report." }</p>
                <input id="title" type="text" autocomplete="off" aria-describedby="title-hint"
                    value={plan.title.clone()} oninput={on_input(Edit::Title)} />
            </div>
            <div class="field">
                <label for="site.name">{ "Site" }</label>
                <input id="site.name" type="text" autocomplete="off"
                    value={plan.site.name.clone()} oninput={on_input(Edit::SiteName)} />
            </div>
            <div class="field wide">
                <label for="notes">{ "Notes (optional)" }</label>
                <textarea id="notes" rows="3" value={plan.notes.clone().unwrap_or_default()} oninput={on_notes} />
            </div>
        </>
    }
}
