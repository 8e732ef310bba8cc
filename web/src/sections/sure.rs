//! Section "How sure": intervals, odds, what matters most, and the case in every draw. Drawn in slices, so that no key
//! stroke waits for it; only routes that were edited are drawn again; dimmed until it has caught up.
use super::{Section, When};
use crate::parts::{ByRc, words_table};
use crate::reckon::Book;
use crate::show::{unbroken, with_minus};
use gloo::timers::callback::Timeout;
use gloo::utils::window;
use std::cell::RefCell;
use std::rc::Rc;
use thimbleworth::account::Account;
use thimbleworth::case::{drawn, switch, turning_results};
use thimbleworth::letter::sentence;
use thimbleworth::odds::{Brief, MOST_CELLS, Reading, Sampled, Wish, headline};
use thimbleworth::report::{PaperTable, money_words, odds_words, turn_words};
use yew::prelude::*;

pub(super) static SECTION: Section = Section {
    id: "sure",
    title: "How sure",
    lead: "Every uncertain amount drawn 10,000 times, by the same numbers for all routes; intervals hold 95\u{202f}% of the draws.",
    when: When::Follows,
    body: |view| html! { <Sure book={ByRc(Rc::clone(&view.reckoned.book))} /> },
};

const DRAWS: u32 = 10_000;
const COVERAGE: f64 = 0.95;
/// How long a turn lasts; so many draws of a route are made at once, a millisecond or two.
const TURN_MS: f64 = 8.0;
const SLICE: u32 = 500;
/// The figures wait 150 ms after the last change, and this so much more.
const AFTER_MS: u32 = 50;

/// One run, kept through edits.
type Run = Rc<RefCell<Sampled>>;

#[derive(Properties, PartialEq)]
struct SureProps {
    book: ByRc<Book>,
}

/// What stands there, and for which figures.
#[derive(Clone, PartialEq)]
struct Shown {
    book: ByRc<Book>,
    html: Html,
}

#[component]
fn Sure(props: &SureProps) -> Html {
    let run: Run = use_memo((), |()| RefCell::new(Sampled::default()));
    let shown = use_state_eq(|| None::<Shown>);
    {
        let shown = shown.clone();
        use_effect_with(props.book.clone(), move |book| {
            let book = book.clone();
            let timer = Timeout::new(AFTER_MS, move || {
                let wish = Wish { draws: DRAWS, most_cells: MOST_CELLS, wanted: &headline };
                let generation = run.borrow_mut().follow(&book.account, wish);
                let read = Vec::new();
                Reader {
                    run,
                    book,
                    generation,
                    rows: Vec::new(),
                    at: (0, 0),
                    cased: false,
                    read,
                    then: Callback::from(move |s| shown.set(Some(s))),
                }
                .go_on();
            });
            move || drop(timer)
        });
    }
    let Some(shown) = &*shown else { return html! { <p class="hint">{ "Being drawn …" }</p> } };
    let behind = shown.book != props.book;
    html! {
        <div class={classes!("works", behind.then_some("old"))} aria-busy={behind.then_some("true")}>
            { shown.html.clone() }
        </div>
    }
}

/// Draws, then reads what the draws say piece by piece, so that no turn takes long.
struct Reader {
    run: Run,
    book: ByRc<Book>,
    generation: u64,
    /// Of the table of the piece of work that is being read.
    rows: Vec<Vec<String>>,
    /// The piece of work and the piece of it that comes next.
    at: (usize, usize),
    /// Whether the route that was read last has a case.
    cased: bool,
    read: Vec<Html>,
    then: Callback<Shown>,
}

impl Reader {
    /// A turn, and then the next; a run that has turned to another plan meanwhile lets it drop.
    fn go_on(mut self) {
        if self.run.borrow().generation() != self.generation {
            return;
        }
        let clock = window().performance();
        let now = || clock.as_ref().map_or(f64::INFINITY, web_sys::Performance::now);
        let until = now() + TURN_MS;
        loop {
            if self.run.borrow_mut().advance(&self.book.account, SLICE) == 0 && !self.piece() {
                let html = self.read.into_iter().collect();
                self.then.emit(Shown { book: self.book, html });
                return;
            }
            if now() >= until {
                break;
            }
        }
        Timeout::new(0, move || self.go_on()).forget();
    }

    /// Reads the next piece; whether there was one.
    fn piece(&mut self) -> bool {
        let (account, (w, at)) = (&self.book.account, self.at);
        let Some(work) = account.program.as_ref().and_then(|p| p.workloads.get(w)) else { return false };
        let run = self.run.borrow();
        let reading = Reading::new(account, &run, w, COVERAGE);
        let ids = reading.as_ref().map_or(Vec::new(), Reading::ids);
        let routes = work.routes.len();
        self.at.1 += 1;
        let Some(reading) = &reading else {
            self.at = (w + 1, 0);
            return true;
        };
        if let Some(id) = at.checked_div(routes).and_then(|i| ids.get(i)) {
            self.rows.extend(
                reading.brief(id, at % routes).map(|brief| row(&brief, &work.routes[at % routes].name)),
            );
            return true;
        }
        let at = at - ids.len() * routes;
        if at == 0 {
            let head = &["Figure, a year", "Route", "Central", "From", "To", "Than the present"];
            let title = "Intervals and odds".to_owned();
            let table = PaperTable { title, head, rows: std::mem::take(&mut self.rows) };
            self.read.push(words_table(format!("sure-{w}"), &table));
        }
        match at / 2 {
            r if r >= routes => self.at = (w + 1, 0),
            r if r == work.present => {}
            r if at.is_multiple_of(2) => {
                let words = case(&run, account, w, r);
                self.cased = !words.is_empty();
                let title = format!("{} in place of {}", work.routes[r].name, work.routes[work.present].name);
                self.read.push(html! {
                    <>
                        <h4>{ title }</h4>
                        { for words.into_iter().map(|text| html! { <p>{ with_minus(&unbroken(&text)) }</p> }) }
                    </>
                });
            }
            r => self.read.push(matters(reading, self.cased, work.present, r)),
        }
        true
    }
}

fn row(brief: &Brief<'_>, route: &str) -> Vec<String> {
    let show = |v: f64| brief.figure.measure.shown(v);
    let (low, high) = brief
        .drawn
        .map_or(("not known".to_owned(), String::new()), |s| (show(s.symmetric.low), show(s.symmetric.high)));
    vec![
        sentence(&brief.figure.title),
        route.to_owned(),
        show(brief.central),
        low,
        high,
        brief.odds.map_or(String::new(), |(less, same)| odds_words(less, same)),
    ]
}

/// The case of a route in words, and where it turns; empty where there is none.
fn case(run: &Sampled, account: &Account, w: usize, r: usize) -> Vec<String> {
    let (Ok(case), Some(drawn)) = (switch(account, w, r), drawn(account, run, w, r, COVERAGE)) else {
        return Vec::new();
    };
    let name = account.program.as_ref().and_then(|p| Some(p.workloads.get(w)?.routes.get(r)?.name.as_str()));
    let mut words = vec![money_words(name.unwrap_or_default(), &case, &drawn, COVERAGE)];
    words.extend(case.not_ranked.iter().map(|why| format!("Shown, but not ranked: {why}.")));
    words.extend(turning_results(account, w, r).map(|turn| sentence(&turn_words(turn)) + "."));
    words
}

/// What matters most, as bars: for what a route saves where it has a case, else for the difference in waste.
fn matters(reading: &Reading<'_>, cased: bool, present: usize, r: usize) -> Html {
    let (id, lead) = if cased {
        ("cost.year", "What matters most for what it saves:")
    } else {
        ("waste.total.mass", "What matters most for the difference in waste:")
    };
    let matters = reading.matters(id, r, Some(present));
    if matters.is_empty() {
        return Html::default();
    }
    html! {
        <>
            <p>{ lead }</p>
            <ul>
                { for matters.iter().take(5).map(|m| {
                    let percent = format!("{} %", thimbleworth::quantity::significant(m.share * 100.0, 2));
                    html! { <li><meter value={m.share.to_string()} aria-label={m.words.clone()}>{ &percent }</meter>{ unbroken(&format!(" {percent} {}", m.words)) }</li> }
                }) }
            </ul>
        </>
    }
}
