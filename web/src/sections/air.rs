//! Section "Air and room": what reaches the air of the room, how it stands through a day, against which limits; a cylinder that
//! lets go.
use super::plates::What;
use super::{Section, View, When};
use crate::parts::words;
use crate::show::unbroken;
use thimbleworth::report::air_sheets;
use yew::prelude::*;

pub(super) static SECTION: Section = Section {
    id: "air",
    title: "Air and room",
    lead: "What reaches the air that people breathe, through a day of work and when a cylinder lets go.",
    when: When::Follows,
    body: draw,
};

fn draw(view: &View) -> Html {
    let site = view.book().account.program.as_ref().map(|p| &p.site);
    let Some(site) = site.filter(|s| s.room.is_some()) else {
        return html! { <p class="empty">{ "Volume and air changes of the room, asked for with the question, open this account." }</p> };
    };
    html! {
        <>
            { view.works(|w| {
                let routes = view.book().works.get(w).map_or(0, |work| work.routes.len());
                html! {
                    { for (0..routes).filter_map(|r| {
                        let (route, account) = view.book().route(w, r)?;
                        let sheets = air_sheets(site, route, account);
                        let nothing = account.air.as_ref().is_some_and(|air| air.gases.is_empty());
                        Some(html! {
                            <>
                                <h4>{ &route.name }</h4>
                                if nothing { <p class="hint">{ "Nothing of this route reaches the room." }</p> }
                                { view.plate(w, What::Air(r)) }
                                if !sheets.is_empty() {
                                    <details class="more">
                                        <summary>{ format!("{}: day of work, limits, sources, a cylinder", route.name) }</summary>
                                        { for sheets.into_iter().enumerate().map(|(i, sheet)| html! {
                                            <>
                                                { words(format!("air-{w}-{r}-{i}"), &sheet.title, &sheet.head, &sheet.rows) }
                                                { for sheet.notes.into_iter().map(|note| html! { <p class="hint">{ unbroken(&note) }</p> }) }
                                            </>
                                        }) }
                                    </details>
                                }
                            </>
                        })
                    }) }
                }
            }) }
            <p class="caution"><strong>{ "Caution: " }</strong>
                { "CO₂ harms before oxygen falls: a CO₂ sensor low down, and mind pits, cellars, ventilation at night and the cylinder store. Evaporating waste to be rid of it is unpermitted treatment in most places; keep containers closed. Limits are help for a licensed person; measure in the breathing zone." }
            </p>
        </>
    }
}
