//! The buttons of an entry in a list: copy, move, take away. All of them work by key as well as by pointer.
use crate::edit::{Change, Edit, Item, dom_id};
use thimbleworth::letter::small_text;
use yew::prelude::*;

/// Buttons for `item` at `path`, which is called `name` and has `count` entries in its list.
pub(crate) fn tools(item: Item, path: &str, name: &str, count: usize, edit: &Callback<Edit>) -> Html {
    let button = |words: &'static str, idle: bool, change: Change| {
        let edit = edit.clone();
        let onclick = Callback::from(move |_: MouseEvent| {
            if !idle {
                edit.emit(Edit::list(change.clone()));
            }
        });
        html! {
            <button type="button" class="small" id={dom_id(&format!("{path}-{}", small_text(words).replace(' ', "-")))} aria-disabled={idle.then_some("true")} {onclick}
                aria-label={format!("{words}: {name}")}>{ words }</button>
        }
    };
    let at = item.position();
    html! {
        <div class="tools" role="group" aria-label={format!("Change the list: {name}")}>
            { button("Duplicate", false, Change::Duplicate(item)) }
            { button("Move up", at == 0, Change::Move(item, true)) }
            { button("Move down", at + 1 >= count, Change::Move(item, false)) }
            { button("Remove", false, Change::Remove(item)) }
        </div>
    }
}
