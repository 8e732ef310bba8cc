//! Section "Waste desk": codes of every stream, labels, contents, and whether something may be poured.
use super::labels::{SIZES, labels};
use super::{Section, View, When};
use crate::edit::{Change, Edit};
use crate::form::text_of;
use crate::parts::{Ask, ByRc, Field, folded, unfolded, words_table};
use crate::reckon::Book;
use std::rc::Rc;
use thimbleworth::account::site_desk;
use thimbleworth::report::{Asked, PaperKind, paper, pour_paper};
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

/// What is asked of a pour: into which stream, what, and how full the container is. It is no part of the plan.
#[component]
fn Pour(props: &Props) -> Html {
    let asked = use_state_eq(<[String; 4]>::default);
    let put = put_into(&asked, &PATHS);
    let account = &props.book.account;
    let streams = account.program.as_ref().map_or(&[][..], |p| &p.site.streams);
    let [into, what, held, size] = &*asked;
    let names: Vec<&str> = streams.iter().map(|s| s.name.as_str()).chain(["drain"]).collect();
    let into = names.iter().find(|n| *n == into).or(names.first()).copied().unwrap_or_default();
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
    let choice = |names: &[&str]| {
        let both = |n: &&str| (AttrValue::from((*n).to_owned()), AttrValue::from((*n).to_owned()));
        Ask::Choice(names.iter().map(both).collect())
    };
    let size = SIZES.iter().find(|s| s.word == size).unwrap_or(&SIZES[0]);
    let field = |i: usize, label: &'static str, hint: &'static str, value: &str, ask: Ask| {
        html! { <Field path={PATHS[i]} {label} {hint} value={value.to_owned()} {ask} edit={put.clone()} /> }
    };
    html! {
        <>
        <details class="more controls">
            <summary>{ "Labels to print" }</summary>
            { field(3, "Size of the labels", "Of the paper where it is a label each.", size.word, choice(&SIZES.map(|s| s.word))) }
            { for site_desk(account, &[]).and_then(|desk| labels(account, &desk, size)) }
        </details>
        <section class={(!matches!(found, Some(Ok(_)))).then_some("controls")} aria-labelledby="pour-heading">
            <h3 id="pour-heading">{ "May this go into that container?" }</h3>
            <div class="controls">
                { field(0, "Container", "A stream of the site, or the drain.", into, choice(&names)) }
                { field(1, "Poured, as one mixture", "Such as acetone = 40 mL; water = 1 L.", what, Ask::Text) }
                { field(2, "In the container already", "Such as 12 L; half of what it may hold when left out.", held, Ask::Text) }
            </div>
            <div aria-live="polite">
                { match &found {
                    None => Html::default(),
                    Some(Err(why)) => html! { <p class="hint">{ why }</p> },
                    Some(Ok(paper)) => html! { <><p><strong>{ &paper.title }</strong></p>{ unfolded("pour", paper) }</> },
                } }
            </div>
        </section>
        </>
    }
}

/// Takes what is typed into fields of these paths, which are no part of the plan.
pub(super) fn put_into(
    asked: &UseStateHandle<[String; 4]>,
    paths: &'static [&'static str; 4],
) -> Callback<Edit> {
    let asked = asked.clone();
    Callback::from(move |edit: Edit| {
        let Change::Set(path, value) = edit.change else { return };
        let mut next = (*asked).clone();
        if let Some(slot) = paths.iter().position(|p| *p == path).and_then(|i| next.get_mut(i)) {
            *slot = text_of(value.as_ref());
        }
        asked.set(next);
    })
}

/// The paths of its fields, which no plan has.
const PATHS: [&str; 4] = ["pour.into", "pour.what", "pour.held", "labels.size"];
