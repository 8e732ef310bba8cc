//! Section "The comparison": the figures that decide, better and worse, doubts, and what makes the difference.
use super::places::lines;
use super::plates::What;
use super::{Section, View, When};
use crate::parts::Sheet;
use crate::show::{Scale, unbroken};
use thimbleworth::account::{Figure, Group};
use thimbleworth::compare::{HEADLINES, RouteComparison};
use thimbleworth::letter::sentence;
use yew::prelude::*;

/// Up to so many routes each difference is drawn; beyond, the table alone can be read.
const DRAWN: usize = 8;

pub(super) static SECTION: Section = Section {
    id: "comparison",
    title: "The comparison",
    lead: "The routes beside one another on the same work, against the present one.",
    when: When::Follows,
    body: draw,
};

fn draw(view: &View) -> Html {
    view.works(|w| {
        let mut lines = lines(view.book(), w, decides);
        if lines.is_empty() {
            return html! { <p class="empty">{ "Nothing can be compared yet." }</p> };
        }
        for line in &mut lines {
            line.label = sentence(&line.label);
        }
        let routes = view.book().works.get(w).map_or(0, |work| work.routes.len());
        let drawn =
            |r: usize| if routes <= DRAWN { view.plate(w, What::Difference(r)) } else { Html::default() };
        html! {
            <>
                { Sheet {
                    id: format!("comparison-{w}"),
                    caption: "The routes on the same work".to_owned(),
                    first: "Figure",
                    lines,
                    book: view.book(),
                    work: w,
                    basis: view.basis,
                    beside: true,
                }.draw() }
                { for (0..routes).filter_map(|r| {
                    let beside = view.book().beside(w, r)?;
                    Some(one(&view.book().works[w].routes[r].name, beside, drawn(r)))
                }) }
                { refusals(view, w) }
            </>
        }
    })
}

/// Whether a figure belongs in the comparison: not every material at every place, which stands in another table.
fn decides(figure: &Figure) -> bool {
    match figure.group {
        Group::Mass => figure.id == "mass.in" || figure.id == "mass.bought" || figure.id == "air.solvents",
        Group::Waste => !figure.id.ends_with(".volume"),
        Group::CarbonDioxide => figure.id == "co2.vented" || figure.id == "co2.make_up",
        Group::Metric | Group::Hazard | Group::Energy | Group::Climate => true,
        Group::Time => figure.id == "time.attended" || figure.id == "time.instruments",
        Group::Cost => figure.id == "cost.year" || figure.id == "cost.known" || figure.id == "cost.once",
    }
}

fn one(name: &str, beside: &RouteComparison, drawn: Html) -> Html {
    let list = |title: &'static str, items: &[String]| {
        if items.is_empty() {
            return Html::default();
        }
        html! { <><dt>{ title }</dt><dd>{ unbroken(&items.join("; ")) }</dd></> }
    };
    let causes: Vec<Html> = beside
        .differences
        .iter()
        .filter(|d| HEADLINES.iter().any(|(id, _)| *id == d.id) && !d.causes.is_empty())
        .map(|d| {
            let scale = Scale::of(d.measure, d.causes.iter().map(|c| c.change));
            html! {
                <li>{ sentence(&d.title) }
                    <ul>
                        { for d.causes.iter().map(|c| html! {
                            <li>{ format!("{}{} {} a year: {}", if c.change > 0.0 { "+" } else { "" }, scale.write(c.change), scale.unit(), c.what) }</li>
                        }) }
                    </ul>
                </li>
            }
        })
        .collect();
    html! {
        <div class="besides">
            <h4>{ format!("{name} beside the present route") }</h4>
            { drawn }
            <dl>
                { list("Falls", &beside.better) }
                { list("Rises", &beside.worse) }
                { list("Doubts", &beside.doubts) }
            </dl>
            if !causes.is_empty() {
                <details class="more">
                    <summary>{ "What makes the difference" }</summary>
                    <ul>{ for causes }</ul>
                </details>
            }
        </div>
    }
}

fn refusals(view: &View, w: usize) -> Html {
    let mut out: Vec<Html> = Vec::new();
    for (r, column) in view.book().works.get(w).map_or(&[][..], |work| &work.routes).iter().enumerate() {
        let Some((_, account)) = view.book().route(w, r) else { continue };
        for refusal in &account.refusals {
            out.push(
                html! { <li>{ format!("{}, {}: {}", column.name, refusal.metrics, refusal.reason) }</li> },
            );
        }
    }
    if out.is_empty() {
        return Html::default();
    }
    html! { <><h4>{ "Metrics that are not given" }</h4><ul>{ for out }</ul></> }
}
