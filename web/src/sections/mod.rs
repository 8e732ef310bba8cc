//! The numbered sections of the page. Adding one is one line in [`SECTIONS`]; its number is its place there.
mod question;

use crate::state::Edit;
use question::Question;
use std::rc::Rc;
use thimbleworth::plan::Plan;
use yew::prelude::*;

/// What a section may look at, and how it says that something was edited.
#[derive(Clone, PartialEq)]
pub(crate) struct View {
    pub(crate) plan: Rc<Plan>,
    pub(crate) edit: Callback<Edit>,
}

/// One section.
pub(crate) struct Section {
    /// The id of its element, which the contents list links to.
    pub(crate) id: &'static str,
    pub(crate) title: &'static str,
    /// One sentence: what stands here.
    lead: &'static str,
    body: fn(&View) -> Html,
}

/// All sections in the order of the page.
#[rustfmt::skip]
pub(crate) static SECTIONS: [Section; 9] = [
    Section { id: "question", title: "The question", lead: "What is asked, and for which site.", body: |v| html! { <Question view={v.clone()} /> } },
    Section { id: "routes", title: "The routes", lead: "Every way of doing the work, step by step.", body: empty },
    Section { id: "finding", title: "The finding", lead: "The answer in one sentence.", body: empty },
    Section { id: "places", title: "Where it goes", lead: "Every mass, from the place it comes from to the place it ends.", body: empty },
    Section { id: "waste", title: "Waste", lead: "What has to be collected, in which containers, under which code.", body: empty },
    Section { id: "co2", title: "CO₂", lead: "The state of the fluid, what is drawn, returned and vented.", body: empty },
    Section { id: "hazard", title: "Hazard", lead: "What can hurt, beside the figure that it belongs to.", body: empty },
    Section { id: "comparison", title: "The comparison", lead: "The routes beside one another, against the present one.", body: empty },
    Section { id: "assumptions", title: "Assumptions, cautions and sources", lead: "What the figures rest on.", body: empty },
];

impl Section {
    pub(crate) fn draw(&self, number: usize, view: &View) -> Html {
        let heading = format!("{}-heading", self.id);
        html! {
            <section key={self.id} id={self.id} class="leaf" aria-labelledby={heading.clone()}>
                <h2 id={heading}><span class="folio">{ number }</span>{ " " }{ self.title }</h2>
                <div class="lines">
                    <p class="lead">{ self.lead }</p>
                    { (self.body)(view) }
                </div>
            </section>
        }
    }
}

/// The body of a section that has none yet.
fn empty(_: &View) -> Html {
    html! { <p class="empty">{ "Nothing stands here yet: the account is not connected to the page." }</p> }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn every_section_has_its_own_id_title_and_lead() {
        for (i, section) in SECTIONS.iter().enumerate() {
            assert!(
                section.id.bytes().all(|b| b.is_ascii_lowercase() || b.is_ascii_digit()),
                "{}",
                section.id
            );
            assert!(section.lead.ends_with('.'), "{}: a lead is a sentence", section.id);
            for other in &SECTIONS[i + 1..] {
                assert!(section.id != other.id && section.title != other.title, "{} twice", section.id);
            }
        }
    }
}
