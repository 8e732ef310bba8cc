//! Section "How sure": intervals, odds, what matters most, and the case in every draw.
use super::{Section, View, When};
use crate::document::Document;
use crate::draws::{COVERAGE, Drawn, follows};
use crate::parts::{ByRc, words_table};
use crate::picture::{intervals, to_html};
use crate::show::{unbroken, with_minus};
use thimbleworth::account::Account;
use thimbleworth::case::{drawn, switch, turning_results};
use thimbleworth::letter::sentence;
use thimbleworth::odds::{Reading, Sampled};
use thimbleworth::program::WorkloadProgram;
use thimbleworth::report::{PaperTable, money_words, odds_words, stopped_words, turn_words};
use yew::prelude::*;

pub(super) static SECTION: Section = Section {
    id: "sure",
    title: "How sure",
    lead: "Every uncertain amount drawn 10,000 times, by the same numbers for all routes; intervals hold 95\u{202f}% of the draws.",
    when: When::Follows,
    body: draw,
};

fn draw(view: &View) -> Html {
    let works = 0..view.plan().workloads.len();
    works.map(|w| html! { <Sure key={w} document={view.document.clone()} {w} /> }).collect()
}

#[derive(Properties, PartialEq)]
struct SureProps {
    document: ByRc<Document>,
    w: usize,
}

#[component]
fn Sure(props: &SureProps) -> Html {
    let w = props.w;
    let drawn = use_context::<Drawn>().flatten();
    let chosen = use_state_eq(String::new);
    // A run that has turned to another plan leaves what stands.
    let last = use_mut_ref(Html::default);
    let html = use_memo((drawn.clone(), (*chosen).clone()), |(drawn, id)| {
        let chosen = chosen.clone();
        let found = drawn.as_ref().and_then(|d| {
            d.read(|run, account| {
                let work = account.program.as_ref()?.workloads.get(w)?;
                let reading = Reading::new(account, run, w, COVERAGE)?;
                Some(html! { <>{ picture(&reading, work, w, id, chosen) }{ read(run, account, &reading, w, work) }</> })
            })
        });
        if let Some(found) = found {
            *last.borrow_mut() = found;
        }
        last.borrow().clone()
    });
    follows(&drawn, &props.document, (*html).clone())
}

/// The picture of one figure, and the choice of it.
fn picture(
    reading: &Reading<'_>,
    work: &WorkloadProgram,
    w: usize,
    id: &str,
    chosen: UseStateHandle<String>,
) -> Html {
    let figures: Vec<_> = reading.ids().into_iter().filter_map(|id| reading.figure(id)).collect();
    let Some(shown) = figures.iter().find(|f| f.id == id).or_else(|| figures.first()) else {
        return Html::default();
    };
    let onchange = Callback::from(move |event: Event| {
        if let Some(select) = event.target_dyn_into::<web_sys::HtmlSelectElement>() {
            chosen.set(select.value());
        }
    });
    let field = format!("sure-figure-{w}");
    html! {
        <>
            <div class="field">
                <label for={field.clone()}>{ format!("Figure of {}", work.name) }</label>
                <select id={field} {onchange}>
                    { for figures.iter().map(|f| html! { <option value={f.id.clone()} selected={f.id == shown.id}>{ sentence(&f.title) }</option> }) }
                </select>
            </div>
            { for intervals(&format!("intervals-{w}"), work, shown, COVERAGE).map(|p| to_html(&p)) }
        </>
    }
}

fn read(run: &Sampled, account: &Account, reading: &Reading<'_>, w: usize, work: &WorkloadProgram) -> Html {
    let mut rows: Vec<Vec<String>> = Vec::new();
    for figure in reading.ids().into_iter().filter_map(|id| reading.figure(id)) {
        for (r, spread) in figure.routes.iter().enumerate() {
            let Some(spread) = spread else { continue };
            let show = |v: f64| figure.measure.shown(v);
            let (low, high) = spread.drawn.map_or(("not known".to_owned(), String::new()), |s| {
                (show(s.symmetric.low), show(s.symmetric.high))
            });
            let rival = figure.rivals.iter().find(|x| x.route == r);
            let odds = rival.map_or(String::new(), |x| odds_words(x.less, x.same));
            rows.push(vec![
                sentence(&figure.title),
                work.routes[r].name.clone(),
                show(spread.central),
                low,
                high,
                odds,
            ]);
        }
    }
    let head = &["Figure, a year", "Route", "Central", "From", "To", "Than the present"];
    let table = PaperTable { title: "Intervals and odds".to_owned(), head, rows };
    html! {
        <>
            { for stopped_words(work, reading).into_iter().map(|text| html! { <p>{ unbroken(&text) }</p> }) }
            { words_table(format!("sure-{w}"), &table) }
            { for (0..work.routes.len()).filter(|r| *r != work.present).map(|r| case(run, account, reading, w, r)) }
        </>
    }
}

/// The case of a route: in words, where it turns, and what matters most as bars.
fn case(run: &Sampled, account: &Account, reading: &Reading<'_>, w: usize, r: usize) -> Html {
    let Some(work) = account.program.as_ref().and_then(|p| p.workloads.get(w)) else {
        return Html::default();
    };
    let name = &work.routes[r].name;
    let (id, words) = match (switch(account, w, r), drawn(account, run, w, r, COVERAGE)) {
        (Ok(case), Some(drawn)) => {
            let mut words = vec![money_words(name, &case, &drawn, COVERAGE)];
            words.extend(case.not_ranked.iter().map(|why| format!("Shown, but not ranked: {why}.")));
            words.extend(turning_results(account, w, r).map(|turn| sentence(&turn_words(turn)) + "."));
            ("cost.year", words)
        }
        _ => ("waste.total.mass", Vec::new()),
    };
    let matters = reading.matters(id, r, Some(work.present));
    html! {
        <>
            <h4>{ format!("{name} in place of {}", work.routes[work.present].name) }</h4>
            { for words.into_iter().map(|text| html! { <p>{ with_minus(&unbroken(&text)) }</p> }) }
            if !matters.is_empty() {
                <p>{ if id == "cost.year" { "What matters most for what it saves:" } else { "What matters most for the difference in waste:" } }</p>
                <ul>
                    { for matters.iter().take(5).map(|m| {
                        let percent = format!("{} %", thimbleworth::quantity::significant(m.share * 100.0, 2));
                        html! { <li><meter value={m.share.to_string()} aria-label={m.words.clone()}>{ &percent }</meter>{ unbroken(&format!(" {percent} {}", m.words)) }</li> }
                    }) }
                </ul>
            }
        </>
    }
}
