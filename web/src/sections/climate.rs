//! Section "Climate": lines with their scope, never added up.
use super::cost::sheet;
use super::{Section, View, When};
use thimbleworth::account::Group;
use yew::prelude::*;

pub(super) static SECTION: Section = Section {
    id: "climate",
    title: "Climate",
    lead: "What warms the climate, line by line: each has a scope of its own, so that they are never added up.",
    when: When::Follows,
    body: draw,
};

fn draw(view: &View) -> Html {
    view.works(|w| {
        sheet(view, w, "climate", "Lines of climate", Group::Climate)
            .unwrap_or_else(|| html! { <p class="empty">{ "The plan gives no factor of climate." }</p> })
    })
}
