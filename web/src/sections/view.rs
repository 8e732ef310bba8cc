//! What a section may look at.
use super::plates::{Plate, What};
use crate::document::Document;
use crate::edit::{Edit, Item};
use crate::parts::ByRc;
use crate::reckon::{Basis, Book, Reckoned};
use crate::state::{Action, State};
use std::rc::Rc;
use thimbleworth::plan::Plan;
use yew::prelude::*;

/// What a section may look at, and how it says that something was edited or asked for. Two views are the same when
/// nothing that any section shows has changed.
#[derive(Clone, PartialEq)]
pub(crate) struct View {
    pub(crate) document: ByRc<Document>,
    pub(crate) reckoned: ByRc<Reckoned>,
    /// Whether more is drawn than what the page begins with: the fields of the question that are in sight.
    pub(crate) whole: bool,
    /// For how much work figures are shown.
    pub(crate) basis: Basis,
    /// The route whose form is open.
    pub(crate) route: Option<u32>,
    /// Whether every problem shows at its field, and not only those of fields that have been left.
    pub(crate) show_all: bool,
    pub(crate) edit: Callback<Edit>,
    pub(crate) act: Callback<Action>,
    /// Why a name cannot be taken.
    pub(crate) refusal: Callback<(Item, String), Option<String>>,
}

impl View {
    pub(crate) fn new(
        state: &State,
        reckoned: &Rc<Reckoned>,
        whole: bool,
        edit: Callback<Edit>,
        act: Callback<Action>,
        refusal: Callback<(Item, String), Option<String>>,
    ) -> Self {
        let shown = &state.view;
        Self {
            document: ByRc(Rc::clone(state.document())),
            reckoned: ByRc(Rc::clone(reckoned)),
            whole,
            basis: shown.basis,
            route: shown.route,
            show_all: shown.show_all,
            edit,
            act,
            refusal,
        }
    }

    pub(crate) fn plan(&self) -> &Plan {
        &self.document.plan
    }

    pub(crate) fn book(&self) -> &Book {
        &self.reckoned.book
    }

    /// A picture of a piece of work.
    pub(super) fn plate(&self, work: usize, what: What) -> Html {
        let book = ByRc(Rc::clone(&self.reckoned.book));
        html! { <Plate {book} {work} basis={self.basis} {what} /> }
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
