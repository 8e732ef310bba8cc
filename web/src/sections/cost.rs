//! Section "Cost": hours, lines of cost, and the case for switching by the central figures.
use super::places::lines;
use super::{Section, View, When};
use crate::parts::Sheet;
use thimbleworth::account::Group;
use thimbleworth::letter::sentence;
use yew::prelude::*;

pub(super) static SECTION: Section = Section {
    id: "cost",
    title: "Cost",
    lead: "What each route costs, and what is lost at its full cost. A price that is not given is named, never counted as nothing.",
    when: When::Follows,
    body: draw,
};

/// A table of all figures of a group.
pub(super) fn sheet(view: &View, w: usize, id: &str, caption: &str, group: Group) -> Option<Html> {
    let mut lines = lines(view.book(), w, |f| f.group == group);
    for line in &mut lines {
        line.label = sentence(&line.label);
    }
    (!lines.is_empty()).then(|| {
        Sheet {
            id: format!("{id}-{w}"),
            caption: caption.to_owned(),
            first: "Line",
            lines,
            book: view.book(),
            work: w,
            basis: view.basis,
            beside: true,
        }
        .draw()
    })
}

fn draw(view: &View) -> Html {
    view.works(|w| match sheet(view, w, "cost", "Lines of cost", Group::Cost) {
        Some(cost) => html! { <>{ cost }{ sheet(view, w, "time", "Hours and instruments", Group::Time) }</> },
        None => html! { <p class="empty">{ "The plan names no prices." }</p> },
    })
}
