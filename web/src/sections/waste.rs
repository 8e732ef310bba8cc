//! Section "Waste": mass, volume and containers of every stream.
use super::places::{lines, sentence_case};
use super::{Section, View, When};
use crate::parts::Sheet;
use thimbleworth::account::Group;
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
                lines.sort_by_key(|line| line.id.rsplit_once('.').map_or(String::new(), |(stream, _)| stream.to_owned()));
                // The total of all streams stands first.
                lines.sort_by_key(|line| !line.id.starts_with("waste.total."));
                for line in &mut lines {
                    line.label = sentence_case(&line.label);
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
