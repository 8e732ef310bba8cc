//! Section "Site": the year of its waste, month by month and container by container.
use super::{Section, View, When};
use crate::parts::folded;
use crate::picture;
use thimbleworth::account::site_desk;
use thimbleworth::report::{PaperKind, paper};
use yew::prelude::*;

pub(super) static SECTION: Section = Section {
    id: "site-year",
    title: "Site",
    lead: "What the whole site makes, stores and hands over in a year, with the present routes.",
    when: When::Follows,
    body: draw,
};

fn draw(view: &View) -> Html {
    let account = &view.book().account;
    let Some(desk) = site_desk(account, &[]).filter(|d| !d.streams.is_empty()) else {
        return html! { <p class="empty">{ "No waste can be laid out over the year yet." }</p> };
    };
    let pictures = [picture::stock("stock", &desk), picture::load("load", account, &desk)];
    html! {
        <>
            { for pictures.iter().flatten().map(picture::to_html) }
            { for PaperKind::ALL[4..].iter().filter_map(|kind| {
                Some(folded(&["site-", kind.word()].concat(), &paper(account, &desk, *kind)?))
            }) }
        </>
    }
}
