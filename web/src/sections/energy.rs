//! Section "Energy": electricity, heat and cooling by step, and the circuits of CO2 state by state.
use super::places::lines;
use super::plates::What;
use super::{Section, View, When};
use crate::parts::Sheet;
use crate::show::{unbroken, with_minus};
use thimbleworth::account::Group;
use thimbleworth::letter::sentence;
use thimbleworth::report::energy_sheets;
use yew::prelude::*;

pub(super) static SECTION: Section = Section {
    id: "energy",
    title: "Energy",
    lead: "Electricity by meter, by stated power or by the states of the CO₂; heat, cooling and water.",
    when: When::Follows,
    body: draw,
};

fn draw(view: &View) -> Html {
    view.works(|w| {
        let book = view.book();
        let mut lines = lines(book, w, |f| f.group == Group::Energy);
        if lines.is_empty() {
            return html! { <p class="empty">{ "No route that can be accounted states a power or works with carbon dioxide." }</p> };
        }
        for line in &mut lines {
            line.label = sentence(&line.label);
        }
        let routes = book.works.get(w).map_or(0, |work| work.routes.len());
        html! {
            <>
                { Sheet { id: format!("energy-{w}"), caption: "Energy".to_owned(), first: "What is used", lines, book,
                    work: w, basis: view.basis, beside: false }.draw() }
                { for (0..routes).map(|r| by_step(view, w, r)) }
                <p class="caution"><strong>{ "Caution: " }</strong>
                    { "Vessels and lines are rated, relieved and interlocked under local codes. Restrictor and vent can plug with dry ice and let go at once; steel turns brittle where it is chilled, and seals tear after fast decompression. A flammable co-solvent makes vent and separator an ignition zone. Reflux that nobody watches needs a cut-off for failing water." }
                </p>
            </>
        }
    })
}

/// One route: its tables, and its pictures where it works with dense CO2.
fn by_step(view: &View, w: usize, r: usize) -> Html {
    let book = view.book();
    let found = book.in_account(w, r).and_then(|(at, route)| {
        let program = book.account.program.as_ref()?.workloads.get(at)?.routes.get(route)?;
        Some((program, book.account.workloads.get(at)?.routes.get(route)?.as_ref()?))
    });
    let Some((route, account)) = found else { return Html::default() };
    html! {
        <details class="picture-data" open={!account.dense.is_empty()}>
            <summary>{ format!("{}, step by step", route.name) }</summary>
            { for energy_sheets(route, account).into_iter().map(|sheet| html! {
                <>
                    <div class="picture-scroll" tabindex="0" role="region" aria-label={sheet.title.clone()}><table>
                        <caption>{ &sheet.title }</caption>
                        <thead><tr>{ for sheet.head.iter().map(|h| html! { <th scope="col">{ h }</th> }) }</tr></thead>
                        <tbody>{ for sheet.rows.iter().map(|row| html! { <tr>{ for row.iter().enumerate().map(|(i, cell)| if i == 0 {
                            html! { <th scope="row">{ with_minus(&unbroken(cell)) }</th> }
                        } else {
                            html! { <td>{ with_minus(&unbroken(cell)) }</td> }
                        }) }</tr> }) }</tbody>
                    </table></div>
                    { for sheet.notes.iter().map(|note| html! { <p class="picture-note">{ with_minus(&unbroken(note)) }</p> }) }
                </>
            }) }
            if !account.dense.is_empty() {
                { view.plate(w, What::Circuit(r)) }
                { view.plate(w, What::Extraction(r)) }
            }
            if !account.trace.batches.is_empty() {
                { view.plate(w, What::WayDown(r)) }
            }
        </details>
    }
}
