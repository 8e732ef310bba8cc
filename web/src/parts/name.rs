//! A name that other parts of the plan refer to: taken over when the field is left, so that references never follow half
//! a name; refused at the field when it is empty or taken.
use super::field::{Said, message, value_of};
use crate::edit::{Edit, Item, dom_id};
use thimbleworth::plan::Severity;
use yew::prelude::*;

#[derive(Properties, PartialEq)]
pub(crate) struct Props {
    pub(crate) item: Item,
    /// The id of the control.
    pub(crate) id: AttrValue,
    pub(crate) label: AttrValue,
    #[prop_or_default]
    pub(crate) hint: AttrValue,
    pub(crate) value: AttrValue,
    /// Why a name cannot be taken.
    pub(crate) refusal: Callback<(Item, String), Option<String>>,
    pub(crate) edit: Callback<Edit>,
}

#[component]
pub(crate) fn Name(props: &Props) -> Html {
    let refused = use_state_eq(|| None::<(String, String)>);
    {
        let refused = refused.clone();
        use_effect_with((props.value.clone(), props.item), move |_| refused.set(None));
    }
    let onchange = {
        let (refused, refusal, edit, item) =
            (refused.clone(), props.refusal.clone(), props.edit.clone(), props.item);
        Callback::from(move |event: Event| {
            let Some(value) = value_of(&event) else { return };
            match refusal.emit((item, value.clone())) {
                Some(why) => refused.set(Some((value, why))),
                None => {
                    refused.set(None);
                    edit.emit(Edit::rename(item, &value));
                }
            }
        })
    };
    let id = dom_id(&props.id);
    let (hint, note) = (format!("{id}-hint"), format!("{id}-said"));
    let said = refused.as_ref().map(|(_, why)| Said {
        severity: Severity::Error,
        text: why.clone().into(),
        path: props.id.clone(),
    });
    let value = refused.as_ref().map_or_else(|| props.value.clone(), |(typed, _)| typed.clone().into());
    html! {
        <div class={classes!("field", said.is_some().then_some("wrong"))}>
            <div class="ask">
                <label for={id.clone()}>{ &props.label }</label>
                if !props.hint.is_empty() { <p class="hint" id={hint.clone()}>{ &props.hint }</p> }
                <input {id} type="text" autocomplete="off" spellcheck="false" aria-invalid={said.is_some().then_some("true")}
                    aria-describedby={if props.hint.is_empty() { note.clone() } else { format!("{hint} {note}") }}
                    {value} {onchange} />
            </div>
            <div class="beside">{ message(note, said.as_ref()) }</div>
        </div>
    }
}
