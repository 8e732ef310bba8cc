//! Section "Where it goes": what comes in, and where every mass ends, by place and material, the routes side by side.
use super::plates::What;
use super::{Section, View, When};
use crate::parts::{Line, Sheet};
use crate::reckon::Book;
use thimbleworth::account::{Figure, How, Measure};
use thimbleworth::ledger::Place;
use thimbleworth::letter;
use thimbleworth::order;
use thimbleworth::quantity::significant;
use yew::prelude::*;

pub(super) static SECTION: Section = Section {
    id: "places",
    title: "Where it goes",
    lead: "Every mass, from where it comes to where it ends. A figure opens into the postings behind it.",
    when: When::Follows,
    body: draw,
};

fn draw(view: &View) -> Html {
    let basis = view.basis;
    view.works(|w| {
        let sheet = |id: &str, caption: &str, first, lines| Sheet {
            id: format!("{id}-{w}"),
            caption: caption.to_owned(),
            first,
            lines,
            book: view.book(),
            work: w,
            basis,
            beside: false,
        };
        html! {
            <>
                { view.plate(w, What::Places) }
                { sheet("comes-in", "What comes in", "Material", coming(view.book(), w)).draw() }
                { sheet("goes-to", "Where it ends", "Place and material", going(view.book(), w)).draw() }
                { closure(view.book(), w) }
                { flowing(view, w).map_or_else(Html::default, |r| view.plate(w, What::Flow(r))) }
            </>
        }
    })
}

/// The route whose flow is drawn: the one whose form is open, or the present one.
fn flowing(view: &View, w: usize) -> Option<usize> {
    let open = view.route.and_then(|id| view.document.route(id));
    open.filter(|(work, _)| *work == w).map(|(_, r)| r).or(view.book().works.get(w)?.present)
}

/// The figures of every accounted route of a work, in order.
pub(super) fn all_figures(book: &Book, w: usize) -> impl Iterator<Item = &Figure> {
    let routes = book.works.get(w).map_or(0, |work| work.routes.len());
    (0..routes).filter_map(move |r| book.route(w, r)).flat_map(|(_, account)| &account.figures)
}

/// The figures that `wanted` takes, each once.
pub(super) fn lines(book: &Book, w: usize, wanted: impl Fn(&Figure) -> bool) -> Vec<Line> {
    let mut out: Vec<Line> = Vec::new();
    // What only a later route has stands behind what it follows there, so that totals stay at the end.
    let mut last = 0;
    for figure in all_figures(book, w).filter(|f| wanted(f)) {
        if let Some(at) = out.iter().position(|line| line.id == figure.id) {
            last = at + 1;
            continue;
        }
        let line =
            Line { label: figure.title.clone(), id: figure.id.clone(), measure: figure.measure, part: false };
        out.insert(last, line);
        last += 1;
    }
    out
}

fn coming(book: &Book, w: usize) -> Vec<Line> {
    let starts = |figure: &Figure, with: &str| figure.id.starts_with(with);
    let mut out = lines(book, w, |f| f.id == "mass.in");
    let mut part = lines(book, w, |f| starts(f, "mass.feed."));
    part.extend(lines(book, w, |f| starts(f, "mass.drawn.")));
    for line in &mut part {
        line.part = true;
    }
    out.append(&mut part);
    out.extend(lines(book, w, |f| starts(f, "mass.returned.")));
    out.extend(lines(book, w, |f| f.id == "mass.bought"));
    out
}

/// Totals of places, each with its materials below it.
fn going(book: &Book, w: usize) -> Vec<Line> {
    let mut groups: Vec<(Place, Vec<Line>)> = Vec::new();
    for figure in all_figures(book, w).filter(|f| f.id.starts_with("mass.to.")) {
        let How::Sum(terms) = &figure.how else { continue };
        let Some(place) = terms.first().map(|t| t.place) else { continue };
        let group = match groups.iter().position(|(p, _)| *p == place) {
            Some(i) => i,
            None => {
                groups.push((place, Vec::new()));
                groups.len() - 1
            }
        };
        let lines = &mut groups[group].1;
        if !lines.iter().any(|line| line.id == figure.id) {
            let part = !lines.is_empty();
            let label = if part { figure.title.clone() } else { letter::sentence(&figure.title) };
            lines.push(Line { label, id: figure.id.clone(), measure: Measure::Mass, part });
        }
    }
    let rank = |place: Place| (place.stream_index().is_none(), place);
    order::sort(&mut groups, &|a, b| rank(a.0) < rank(b.0));
    groups.into_iter().flat_map(|(_, lines)| lines).collect()
}

fn closure(book: &Book, w: usize) -> Html {
    let mut worst = 0.0_f64;
    let mut any = false;
    for r in 0..book.works.get(w).map_or(0, |work| work.routes.len()) {
        if let Some((_, account)) = book.route(w, r) {
            any = true;
            if account.closure.abs() > worst {
                worst = account.closure.abs();
            }
        }
    }
    if !any {
        return html! { <p class="empty">{ "Nothing can be accounted yet." }</p> };
    }
    html! {
        <p class="hint">
            { "What comes in and what leaves differ by " }{ significant(worst, 2) }
            { " of what comes in, which is rounding: every posting leaves one place and arrives in another. That shows that the books are kept right, not that the entries are true." }
        </p>
    }
}
