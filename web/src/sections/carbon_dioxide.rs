//! Section "CO₂": drawn, returned, made up, vented.
use super::places::lines;
use super::plates::What;
use super::{Section, View, When};
use crate::parts::Sheet;
use thimbleworth::account::Group;
use thimbleworth::letter::sentence;
use yew::prelude::*;

pub(super) static SECTION: Section = Section {
    id: "co2",
    title: "CO₂",
    lead: "What is drawn, returned and vented where a route works with carbon dioxide.",
    when: When::Follows,
    body: draw,
};

fn draw(view: &View) -> Html {
    view.works(|w| {
        let mut lines = lines(view.book(), w, |f| f.group == Group::CarbonDioxide);
        if lines.is_empty() {
            return html! { <p class="empty">{ "No route that can be accounted works with carbon dioxide." }</p> };
        }
        for line in &mut lines {
            line.label = sentence(&line.label);
        }
        html! {
            <>
                { Sheet {
                    id: format!("co2-{w}"),
                    caption: "Carbon dioxide".to_owned(),
                    first: "What happens to it",
                    lines,
                    book: view.book(),
                    work: w,
                    basis: view.basis,
                    beside: false,
                }.draw() }
                { view.plate(w, What::Co2) }
                <p class="caution"><strong>{ "Caution: " }</strong>
                    { "CO₂ harms before oxygen falls: a CO₂ sensor low down, not an oxygen alarm. Pressure vessels are rated, inspected and relieved under local codes." }
                </p>
            </>
        }
    })
}
