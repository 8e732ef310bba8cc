//! Section "Waste": mass, volume and containers of every stream.
use super::places::lines;
use super::{Section, View, When};
use crate::parts::{Line, Sheet};
use thimbleworth::account::Group;
use thimbleworth::letter::sentence;
use thimbleworth::order;
use yew::prelude::*;

pub(super) static SECTION: Section = Section {
    id: "waste",
    title: "Waste",
    lead: "What has to be collected, and in how many containers.",
    when: When::Follows,
    body: draw,
};

fn draw(view: &View) -> Html {
    html! {
        <>
            { view.works(|w| {
                let mut lines = lines(view.book(), w, |f| f.group == Group::Waste);
                if lines.is_empty() {
                    return html! { <p class="empty">{ "No waste can be accounted yet." }</p> };
                }
                // The total of all streams stands first, then stream by stream.
                let rank = |line: &Line| !line.id.starts_with("waste.total.");
                let stream = |line: &Line| line.id.rfind('.').unwrap_or(0);
                order::sort(&mut lines, &|a, b| (rank(a), &a.id[..stream(a)]) < (rank(b), &b.id[..stream(b)]));
                for line in &mut lines {
                    line.label = sentence(&line.label);
                }
                Sheet {
                    id: format!("waste-{w}"),
                    caption: "Waste streams".to_owned(),
                    first: "Stream",
                    lines,
                    book: view.book(),
                    work: w,
                    basis: view.basis,
                    beside: true,
                }.draw()
            }) }
            <p class="caution"><strong>{ "Caution: " }</strong>
                { "Which code and which container a waste takes is for a licensed person to say; state and national rules may be stricter. Never pour together what the streams keep apart." }
            </p>
        </>
    }
}
