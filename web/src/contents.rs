//! The contents list, which stays in sight.
use crate::sections::SECTIONS;
use yew::prelude::*;

#[component]
pub(crate) fn Contents() -> Html {
    html! {
        <nav class="contents" aria-label="Contents">
            <ol>
                { for SECTIONS.iter().enumerate().map(|(i, section)| html! {
                    <li>
                        <a href={format!("#{}", section.id)}>
                            <span class="folio">{ i + 1 }</span>{ " " }{ section.title }
                        </a>
                    </li>
                }) }
            </ol>
        </nav>
    }
}
