//! Section "Assumptions, cautions and sources".
use super::{Section, View, When};
use crate::form::{cited, sentence, word};
use crate::reckon::{Book, things};
use crate::show::unbroken;
use thimbleworth::material::catalogue;
use thimbleworth::order::Index;
use thimbleworth::plan::Severity;
use thimbleworth::step::Caution;
use yew::prelude::*;

pub(super) static SECTION: Section = Section {
    id: "assumptions",
    title: "Assumptions, cautions and sources",
    lead: "What the figures rest on, and what to mind.",
    when: When::Follows,
    body: draw,
};

fn draw(view: &View) -> Html {
    let notes: Vec<_> = view.reckoned.problems.iter().filter(|p| p.severity == Severity::Note).collect();
    html! {
        <>
            <h3>{ "Cautions" }</h3>
            { cautions(view.book()) }
            { view.works(|w| assumptions(view.book(), w)) }
            if !notes.is_empty() {
                <h3>{ "Worth knowing" }</h3>
                <ul>{ for notes.into_iter().map(|p| html! { <li>{ unbroken(&sentence(p)) }</li> }) }</ul>
            }
            <h3>{ "Methods and sources" }</h3>
            { sources(view.book()) }
            <p class="hint">{ "Codes, limits and classes are help for a licensed person, read as of the date of the plan; state or national rules may be stricter." }</p>
        </>
    }
}

fn each_route(book: &Book) -> impl Iterator<Item = (usize, usize)> {
    book.works.iter().enumerate().flat_map(|(w, work)| (0..work.routes.len()).map(move |r| (w, r)))
}

fn cautions(book: &Book) -> Html {
    let mut met: Vec<&'static Caution> = Vec::new();
    for (w, r) in each_route(book) {
        if let Some((_, account)) = book.route(w, r) {
            for caution in &account.cautions {
                if !met.iter().any(|c| c.key == caution.key) {
                    met.push(caution);
                }
            }
        }
    }
    if met.is_empty() {
        return html! { <p class="empty">{ "No step brings a usual caution." }</p> };
    }
    html! {
        <ul>{ for met.into_iter().map(|c| html! { <li class="caution">{ c.text }<span class="margin">{ format!(" {}.", cited(&c.source)) }</span></li> }) }</ul>
    }
}

fn assumptions(book: &Book, w: usize) -> Html {
    let routes = book.works.get(w).map_or(&[][..], |work| &work.routes);
    html! {
        <>
            <h3>{ "Assumed, because the plan does not say" }</h3>
            { for routes.iter().enumerate().filter_map(|(r, column)| {
                let (route, _) = book.route(w, r)?;
                let items: Vec<Html> = route.assumptions.iter().map(|a| {
                    let step = a.path.rsplit_once("steps[").and_then(|(_, rest)| rest.split_once(']'))
                        .and_then(|(s, _)| s.parse::<usize>().ok())
                        .map_or(String::new(), |s| format!("step {}, ", s + 1));
                    let said = format!("{step}{}: {} ({})", crate::edit::lowered(&a.label), word(&a.value), cited(&a.source));
                    html! { <li>{ unbroken(&said) }</li> }
                }).collect();
                Some(html! {
                    <details class="more">
                        <summary>{ format!("{}: {}", column.name, if items.is_empty() { "nothing".to_owned() } else { things(items.len()) }) }</summary>
                        if !items.is_empty() { <ul>{ for items }</ul> }
                    </details>
                })
            }) }
        </>
    }
}

/// Every citation that the figures rest on: formulas, rules, figures of materials.
fn sources(book: &Book) -> Html {
    let mut cites = Index::default();
    let mut cite = |text: String| {
        cites.put(text, 0);
    };
    for (w, r) in each_route(book) {
        let Some((route, account)) = book.route(w, r) else { continue };
        let rules = route.steps.iter().flat_map(|s| s.technique.rules.iter().map(|rule| &rule.source));
        let params = route.steps.iter().flat_map(|s| s.technique.params.iter().map(|p| &p.source));
        let assumed = route.assumptions.iter().map(|a| &a.source);
        for source in account.figures.iter().map(|f| &f.source).chain(rules).chain(params).chain(assumed) {
            cite(cited(source));
        }
        for input in route.inputs.iter().filter(|i| i.identity.starts_with("material/")) {
            cite(catalogue().source(&input.basis).map_or(input.basis.clone(), |s| s.cite.to_owned()));
        }
        for material in &account.hazard.materials {
            if let Some(source) = catalogue().source(&material.source) {
                cite(source.cite.to_owned());
            }
        }
    }
    if cites.is_empty() {
        return html! { <p class="empty">{ "No figure stands yet." }</p> };
    }
    html! { <ul class="sources">{ for cites.iter().filter(|(c, _)| !c.is_empty()).map(|(c, _)| html! { <li>{ c.to_owned() }</li> }) }</ul> }
}
