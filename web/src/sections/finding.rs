//! Section "The finding": the answer in sentences, and for how much work figures are shown.
use super::{Section, View, When};
use crate::parts::basis_of;
use crate::reckon::Basis;
use crate::state::Action;
use yew::prelude::*;

pub(super) static SECTION: Section = Section {
    id: "finding",
    title: "The finding",
    lead: "What each route would change in place of the present one.",
    when: When::Follows,
    body: draw,
};

fn draw(view: &View) -> Html {
    let basis = view.basis;
    let onchange = {
        let act = view.act.clone();
        Callback::from(move |event: Event| {
            if let Some(basis) = basis_of(&event) {
                act.emit(Action::Basis(basis));
            }
        })
    };
    html! {
        <>
            { view.works(|w| html! {
                <div class="findings">
                    { for view.book().finding(w).into_iter().map(|sentence| html! { <p class="finding">{ sentence }</p> }) }
                </div>
            }) }
            <div class="field controls">
                <div class="ask">
                    <label for="basis">{ "Show the figures below for" }</label>
                    <select id="basis" {onchange}>
                        { for Basis::ALL.into_iter().map(|b| html! {
                            <option value={b.words()} selected={b == basis}>{ b.words() }</option>
                        }) }
                    </select>
                </div>
            </div>
        </>
    }
}
