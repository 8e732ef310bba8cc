//! Section "Site": the year of its waste, month by month and container by container.
use super::desk::put_into;
use super::{Section, View, When};
use crate::parts::{Ask, ByRc, Field, folded, unfolded};
use crate::picture;
use crate::reckon::Book;
use std::rc::Rc;
use thimbleworth::account::site_desk;
use thimbleworth::case::{Bound, HAZARDOUS_WASTE};
use thimbleworth::compare::HEADLINES;
use thimbleworth::quantity::{Kind, read};
use thimbleworth::report::{PaperKind, mix_paper, paper};
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
            <Mixes book={ByRc(Rc::clone(&view.reckoned.book))} />
            { for PaperKind::ALL[4..].iter().filter_map(|kind| {
                Some(folded(&["site-", kind.word()].concat(), &paper(account, &desk, *kind)?))
            }) }
        </>
    }
}

#[derive(Properties, PartialEq)]
struct Props {
    book: ByRc<Book>,
}

/// The mix of routes that lowers a figure most for what it costs. What is asked is no part of the plan.
#[component]
fn Mixes(props: &Props) -> Html {
    let asked = use_state_eq(<[String; 4]>::default);
    let put = put_into(&asked, &PATHS);
    let [figure, budget, price, _] = &*asked;
    let figures: Vec<(AttrValue, AttrValue)> = std::iter::once((HAZARDOUS_WASTE, "hazardous waste"))
        .chain(HEADLINES)
        .map(|(id, name)| (id.into(), name.into()))
        .collect();
    let figure = if figure.is_empty() { HAZARDOUS_WASTE } else { figure };
    let number = |text: &str| read(text, Kind::Number).ok().map(|amount| amount.central_si);
    let bound = match (number(budget), number(price)) {
        (Some(more), _) => Bound::Budget(more),
        (None, Some(price)) => Bound::Price(price),
        (None, None) => Bound::None,
    };
    let field = |i: usize, label: &'static str, hint: &'static str, value: &str, ask: Ask| {
        html! { <Field path={PATHS[i]} {label} {hint} value={value.to_owned()} {ask} edit={put.clone()} /> }
    };
    html! {
        <details class="more">
            <summary>{ "The mix of routes that lowers a figure most for what it costs" }</summary>
            <div class="controls">
                { field(0, "Figure to lower", "", figure, Ask::Choice(figures.into())) }
                { field(1, "At most so much more a year", "A sum of the site's money, such as 2500; below zero, so much is to be saved.", budget, Ask::Text) }
                { field(2, "Or paid for each unit less", "For each kg, kWh or the like; read where no sum stands above.", price, Ask::Text) }
            </div>
            <div aria-live="polite">
                { match mix_paper(&props.book.account, figure, bound) {
                    Err(why) => html! { <p class="hint">{ why }</p> },
                    Ok(paper) => unfolded("mix", &paper),
                } }
            </div>
        </details>
    }
}

/// The paths of its fields, which no plan has.
const PATHS: [&str; 4] = ["mix.figure", "mix.budget", "mix.price", ""];
