//! Section "Waste desk": codes of every stream, labels, contents, and whether something may be poured.
use super::{Section, View, When};
use crate::parts::{ByRc, folded, unfolded, words_table};
use crate::reckon::Book;
use std::rc::Rc;
use thimbleworth::account::site_desk;
use thimbleworth::report::{Asked, PaperKind, paper, pour_paper};
use web_sys::{HtmlInputElement, HtmlSelectElement};
use yew::prelude::*;

pub(super) static SECTION: Section = Section {
    id: "waste-desk",
    title: "Waste desk",
    lead: "Which codes each container takes with the present routes, and what may go into it.",
    when: When::Follows,
    body: draw,
};

fn draw(view: &View) -> Html {
    let account = &view.book().account;
    let Some(desk) = site_desk(account, &[]).filter(|d| !d.streams.is_empty()) else {
        return html! { <p class="empty">{ "No waste can be classified yet." }</p> };
    };
    let book = ByRc(Rc::clone(&view.reckoned.book));
    html! {
        <>
            { for PaperKind::ALL[..4].iter().filter_map(|kind| {
                let mut paper = paper(account, &desk, *kind)?;
                let key = ["desk-", kind.word()].concat();
                // What is read first stands open.
                let glance = (*kind == PaperKind::Codes).then(|| paper.tables.remove(0));
                Some(html! {
                    <>
                        if let Some(table) = glance { { words_table("desk-glance".into(), &table) } }
                        { folded(&key, &paper) }
                    </>
                })
            }) }
            <Pour {book} />
            <p class="caution"><strong>{ "Caution: " }</strong>{ thimbleworth::code::CAUTION }
                { " Where only a test can clear a code, it says so. Never pour together what the streams keep apart." }</p>
        </>
    }
}

#[derive(Properties, PartialEq)]
struct Props {
    book: ByRc<Book>,
}

/// What is asked of a pour: into which stream, what, and how full the container is.
#[component]
fn Pour(props: &Props) -> Html {
    let asked = use_state_eq(|| [String::new(), String::new(), String::new()]);
    let put = |i: usize| {
        let asked = asked.clone();
        Callback::from(move |event: Event| {
            let value = match event.target_dyn_into::<HtmlSelectElement>() {
                Some(select) => select.value(),
                None => event.target_dyn_into::<HtmlInputElement>().map(|i| i.value()).unwrap_or_default(),
            };
            let mut next = (*asked).clone();
            next[i] = value;
            asked.set(next);
        })
    };
    let account = &props.book.account;
    let streams = account.program.as_ref().map_or(&[][..], |p| &p.site.streams);
    let [into, what, held] = &*asked;
    let into = if into.is_empty() { streams.first().map_or("drain", |s| s.name.as_str()) } else { into };
    let parts: Vec<(String, String)> = what
        .split(';')
        .filter(|p| !p.trim().is_empty())
        .map(|p| {
            p.split_once('=')
                .map_or((p.trim().into(), String::new()), |(a, b)| (a.trim().into(), b.trim().into()))
        })
        .collect();
    let found = site_desk(account, &[]).filter(|_| !parts.is_empty()).map(|desk| {
        let held = Some(held.trim()).filter(|h| !h.is_empty());
        pour_paper(account, &desk, &Asked { into, parts: &parts, held })
    });
    html! {
        <section aria-labelledby="pour-heading">
            <h3 id="pour-heading">{ "May this go into that container?" }</h3>
            <p class="tools">
                <label>{ "Container " }<select onchange={put(0)}>
                    { for streams.iter().map(|s| s.name.as_str()).chain(["drain"]).map(|name| html! {
                        <option value={name.to_owned()} selected={name == into}>{ name }</option>
                    }) }
                </select></label>
                <label>{ "Poured, as one mixture " }<input type="text" value={what.clone()} placeholder="acetone = 40 mL; water = 1 L" onchange={put(1)} /></label>
                <label>{ "In it already " }<input type="text" value={held.clone()} placeholder="12 L" onchange={put(2)} /></label>
            </p>
            <div aria-live="polite">
                { match &found {
                    None => Html::default(),
                    Some(Err(why)) => html! { <p class="hint">{ why }</p> },
                    Some(Ok(paper)) => html! { <><p><strong>{ &paper.title }</strong></p>{ unfolded("pour", paper) }</> },
                } }
            </div>
        </section>
    }
}
