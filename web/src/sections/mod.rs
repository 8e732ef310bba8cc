//! The numbered sections of the page. Adding one is one line in [`SECTIONS`]; its number is its place there.
mod assumptions;
mod carbon_dioxide;
mod comparison;
mod finding;
mod hazard;
mod places;
mod plates;
mod question;
mod routes;
mod waste;

use crate::edit::Edit;
use crate::parts::ByRc;
use crate::reckon::{Book, Reckoned};
use crate::state::{Action, State};
use std::rc::Rc;
use thimbleworth::plan::Plan;
use yew::prelude::*;

/// What a section may look at, and how it says that something was edited or asked for.
#[derive(Clone, PartialEq)]
pub(crate) struct View {
    pub(crate) state: Rc<State>,
    pub(crate) reckoned: ByRc<Reckoned>,
    pub(crate) edit: Callback<Edit>,
    pub(crate) act: Callback<Action>,
    /// Why a name cannot be taken.
    pub(crate) refusal: Callback<(crate::edit::Item, String), Option<String>>,
}

impl View {
    pub(crate) fn plan(&self) -> &Plan {
        self.state.plan()
    }

    pub(crate) fn book(&self) -> &Book {
        &self.reckoned.book
    }

    /// A picture of a piece of work.
    fn plate(&self, work: usize, what: plates::What) -> Html {
        let book = ByRc(Rc::clone(&self.reckoned.book));
        html! { <plates::Plate {book} {work} basis={self.state.view.basis} {what} /> }
    }

    /// Draws something for each piece of work, under its name where there are several.
    pub(crate) fn works(&self, draw: impl Fn(usize) -> Html) -> Html {
        let works = &self.book().works;
        let several = works.len() > 1;
        html! {
            <div class={classes!("works", self.reckoned.old.then_some("old"))}>
                if self.reckoned.old {
                    <p class="hint">{ "These are the figures before the last change: it holds something that is to be mended first." }</p>
                }
                { for works.iter().enumerate().map(|(w, work)| html! {
                    <>
                        if several { <h3 class="work">{ &work.name }</h3> }
                        { draw(w) }
                    </>
                }) }
            </div>
        }
    }
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
    Section { id: "question", title: "The question", lead: "What is asked, for which site, and how much work there is.", body: question::draw },
    Section { id: "routes", title: "The routes", lead: "Every way of doing the work, step by step.", body: routes::draw },
    Section { id: "finding", title: "The finding", lead: "What each route would change in place of the present one.", body: finding::draw },
    Section { id: "places", title: "Where it goes", lead: "Every mass, from where it comes to where it ends. A figure opens into the postings behind it.", body: places::draw },
    Section { id: "waste", title: "Waste", lead: "What has to be collected, and in how many containers.", body: waste::draw },
    Section { id: "co2", title: "CO₂", lead: "What is drawn, returned and vented where a route works with carbon dioxide.", body: carbon_dioxide::draw },
    Section { id: "hazard", title: "Hazard", lead: "What can hurt people and water, with the reasons behind every score.", body: hazard::draw },
    Section { id: "comparison", title: "The comparison", lead: "The routes beside one another on the same work, against the present one.", body: comparison::draw },
    Section { id: "assumptions", title: "Assumptions, cautions and sources", lead: "What the figures rest on, and what to mind.", body: assumptions::draw },
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
