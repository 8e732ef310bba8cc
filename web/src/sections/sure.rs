//! Section "How sure": intervals, odds, what matters most, and the case in every draw. Drawn in slices, so that no key
//! stroke waits for it; only routes that were edited are drawn again; dimmed until it has caught up.
use super::{Section, When};
use crate::document::Document;
use crate::parts::{ByRc, words_table};
use crate::show::{unbroken, with_minus};
use gloo::timers::callback::Timeout;
use std::cell::RefCell;
use std::rc::Rc;
use thimbleworth::account::{Account, account};
use thimbleworth::case::{drawn, switch, turning_results};
use thimbleworth::letter::sentence;
use thimbleworth::odds::{MOST_CELLS, Reading, Sampled, Wish, headline};
use thimbleworth::program::WorkloadProgram;
use thimbleworth::report::{PaperTable, money_words, odds_words, turn_words};
use yew::prelude::*;

pub(super) static SECTION: Section = Section {
    id: "sure",
    title: "How sure",
    lead: "Every uncertain amount drawn 10,000 times, by the same numbers for all routes; intervals hold 95\u{202f}% of the draws.",
    when: When::Follows,
    body: |view| html! { <Sure document={view.document.clone()} /> },
};

const DRAWS: u32 = 10_000;
const COVERAGE: f64 = 0.95;
/// So many draws of a route are made in a turn: a few milliseconds.
const SLICE: u32 = 1_000;
/// The figures wait 150 ms after the last change, and this so much more.
const AFTER_MS: u32 = 50;

/// One run, kept through edits.
type Run = Rc<RefCell<Sampled>>;

#[derive(Properties, PartialEq)]
struct SureProps {
    document: ByRc<Document>,
}

/// What stands there, and for which plan.
#[derive(Clone, PartialEq)]
struct Shown {
    document: ByRc<Document>,
    html: Html,
}

#[component]
fn Sure(props: &SureProps) -> Html {
    let run: Run = use_memo((), |()| RefCell::new(Sampled::default()));
    let shown = use_state_eq(|| None::<Shown>);
    {
        let shown = shown.clone();
        use_effect_with(props.document.clone(), move |document| {
            let document = document.clone();
            let timer = Timeout::new(AFTER_MS, move || {
                let account = Rc::new(account(&document.plan));
                run.borrow_mut()
                    .follow(&account, Wish { draws: DRAWS, most_cells: MOST_CELLS, wanted: &headline });
                let generation = run.borrow().generation();
                slice(
                    run,
                    account,
                    generation,
                    Callback::from(move |html| {
                        shown.set(Some(Shown { document: document.clone(), html }));
                    }),
                );
            });
            move || drop(timer)
        });
    }
    let Some(shown) = &*shown else { return html! { <p class="hint">{ "Being drawn …" }</p> } };
    let behind = shown.document != props.document;
    html! {
        <div class={classes!("works", behind.then_some("old"))} aria-busy={behind.then_some("true")}>
            { shown.html.clone() }
        </div>
    }
}

/// A slice, and then the next; a run that turned to another plan meanwhile lets it drop.
fn slice(run: Run, account: Rc<Account>, generation: u64, then: Callback<Html>) {
    if run.borrow().generation() != generation {
        return;
    }
    if run.borrow_mut().advance(&account, SLICE) > 0 {
        Timeout::new(0, move || slice(run, account, generation, then)).forget();
    } else {
        let works = account.program.iter().flat_map(|p| &p.workloads).enumerate();
        then.emit(works.map(|(w, work)| read(&run.borrow(), &account, w, work)).collect());
    }
}

fn read(run: &Sampled, account: &Account, w: usize, work: &WorkloadProgram) -> Html {
    let Some(reading) = Reading::new(account, run, w, COVERAGE) else { return Html::default() };
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
            { words_table(format!("sure-{w}"), &table) }
            { for (0..work.routes.len()).filter(|r| *r != work.present).map(|r| case(run, account, &reading, w, r)) }
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
