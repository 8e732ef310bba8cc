//! Section "Cost": hours, lines of cost, and the case for switching by the central figures.
use super::places::lines;
use super::plates::What;
use super::{Section, View, When};
use crate::draws::{COVERAGE, Drawn, follows, kept};
use crate::parts::{ByRc, Sheet};
use crate::picture::{over_years, to_html};
use crate::reckon::Book;
use std::rc::Rc;
use thimbleworth::account::Group;
use thimbleworth::case::{drawn, switch};
use thimbleworth::letter::sentence;
use thimbleworth::odds::Sampled;
use yew::prelude::*;

pub(super) static SECTION: Section = Section {
    id: "cost",
    title: "Cost",
    lead: "What each route costs, and what is lost at its full cost. A price that is not given is named, never counted as nothing.",
    when: When::Follows,
    body: draw,
};

/// A table of all figures of a group.
pub(super) fn sheet(view: &View, w: usize, id: &str, caption: &str, group: Group) -> Option<Html> {
    let mut lines = lines(view.book(), w, |f| f.group == group);
    for line in &mut lines {
        line.label = sentence(&line.label);
    }
    (!lines.is_empty()).then(|| {
        Sheet {
            id: format!("{id}-{w}"),
            caption: caption.to_owned(),
            first: "Line",
            lines,
            book: view.book(),
            work: w,
            basis: view.basis,
            beside: true,
        }
        .draw()
    })
}

fn draw(view: &View) -> Html {
    view.works(|w| match sheet(view, w, "cost", "Lines of cost", Group::Cost) {
        Some(cost) => {
            let routes = view.book().works.get(w).map_or(0, |work| work.routes.len());
            html! {
                <>
                    <OverYears book={ByRc(Rc::clone(&view.reckoned.book))} {w} />
                    { cost }
                    { for (0..routes).map(|r| view.plate(w, What::Lost(r))) }
                    { sheet(view, w, "time", "Hours and instruments", Group::Time) }
                </>
            }
        }
        None => html! { <p class="empty">{ "The plan names no prices." }</p> },
    })
}

#[derive(Properties, PartialEq)]
struct Props {
    book: ByRc<Book>,
    w: usize,
}

/// The case of every other route over the years, or what is lacking for one.
#[component]
fn OverYears(props: &Props) -> Html {
    let w = props.w;
    let found = use_context::<Drawn>().flatten();
    let last = use_mut_ref(Default::default);
    let html = found.as_ref().map(|draws| kept(&last, draws, "", &|run| years(&draws.book, run, w)));
    follows(found.as_ref().map(|d| &d.book), &props.book, html.unwrap_or_default())
}

/// Every other route over the years.
fn years(book: &Book, run: &Sampled, w: usize) -> Option<Html> {
    let account = &book.account;
    let work = account.program.as_ref()?.workloads.get(w)?;
    let present = work.routes.get(work.present).map_or("", |r| r.name.as_str());
    let mut out = Vec::new();
    for (r, route) in work.routes.iter().enumerate().filter(|(r, _)| *r != work.present) {
        let case = match switch(account, w, r) {
            Ok(case) => case,
            Err(lacking) => {
                out.push(html! { <p>{ format!("No case for {} without {}.", route.name, lacking.join("; ")) }</p> });
                continue;
            }
        };
        let picture = drawn(account, run, w, r, COVERAGE).and_then(|drawn| {
            over_years(&format!("over-years-{w}-{r}"), (&route.name, present), &case, &drawn, COVERAGE)
        });
        out.extend(picture.map(|p| to_html(&p)));
        out.extend(case.conditions.first().map(|c| html! { <p>{ format!("It holds only with: {c}.") }</p> }));
    }
    Some(out.into_iter().collect())
}
