//! Section "How sure": intervals, odds, what matters most, and the case in every draw. Read in turns, so that no key stroke
//! waits for it; dimmed until it has caught up.
use super::{Section, When};
use crate::draws::{COVERAGE, Drawn, Draws, follows, in_turns, kept};
use crate::parts::{ByRc, words_table};
use crate::picture::{intervals, to_html};
use crate::reckon::Book;
use crate::show::{unbroken, with_minus};
use gloo::timers::callback::Timeout;
use std::rc::Rc;
use thimbleworth::account::Account;
use thimbleworth::case::{drawn, switch, turning_results};
use thimbleworth::letter::sentence;
use thimbleworth::odds::{Brief, Reading, Sampled};
use thimbleworth::report::{PaperTable, money_words, odds_words, stopped_words, turn_words};
use yew::prelude::*;

pub(super) static SECTION: Section = Section {
    id: "sure",
    title: "How sure",
    lead: "Every uncertain amount drawn 10,000 times, by the same numbers for all routes; intervals hold 95\u{202f}% of the draws.",
    when: When::Follows,
    body: |view| html! { <Sure book={ByRc(Rc::clone(&view.reckoned.book))} /> },
};

#[derive(Properties, PartialEq)]
struct SureProps {
    book: ByRc<Book>,
}

/// What stands there, and for which figures.
#[derive(Clone, PartialEq)]
struct Shown {
    book: ByRc<Book>,
    pieces: Vec<ByRc<Html>>,
}

#[derive(Properties, PartialEq)]
struct PieceProps {
    html: ByRc<Html>,
}

/// A piece of what stands there, drawn again only for another one.
#[component]
fn Piece(props: &PieceProps) -> Html {
    (*props.html).clone()
}

#[component]
fn Sure(props: &SureProps) -> Html {
    let shown = use_state_eq(|| None::<Shown>);
    let drawn = use_context::<Drawn>().flatten();
    {
        let shown = shown.clone();
        use_effect_with(drawn, move |drawn| {
            if let Some(draws) = drawn.clone() {
                // What stands goes piece by piece, so that no turn draws much.
                let before = (*shown).clone();
                let then = Callback::from(move |s| shown.set(Some(s)));
                Reader { draws, rows: Vec::new(), at: (0, 0), cased: false, read: Vec::new(), before, then }
                    .go_on();
            }
        });
    }
    let (of, html) = match &*shown {
        Some(shown) => {
            (Some(&shown.book), shown.pieces.iter().cloned().map(|html| html! { <Piece {html} /> }).collect())
        }
        None => (None, Html::default()),
    };
    follows(of, &props.book, html)
}

#[derive(Properties, PartialEq)]
struct ChosenProps {
    draws: Draws,
    w: usize,
}

/// The picture of one figure, and the choice of it.
#[component]
fn Chosen(props: &ChosenProps) -> Html {
    let chosen = use_state_eq(String::new);
    let w = props.w;
    let onchange = {
        let chosen = chosen.clone();
        Callback::from(move |event: Event| {
            if let Some(select) = event.target_dyn_into::<web_sys::HtmlSelectElement>() {
                chosen.set(select.value());
            }
        })
    };
    let last = use_mut_ref(Default::default);
    let draws = &props.draws;
    kept(&last, draws, &chosen, &|run| {
        let account = &draws.book.account;
        let work = account.program.as_ref()?.workloads.get(w)?;
        let reading = Reading::new(account, run, w, COVERAGE)?;
        let ids = reading.ids();
        let shown = ids.iter().find(|i| **i == *chosen).or_else(|| ids.first()).copied()?;
        let routes = 0..work.routes.len();
        let mut options = Vec::new();
        for id in &ids {
            let found = account
                .workloads
                .get(w)?
                .routes
                .iter()
                .flatten()
                .find_map(|r| r.figures.iter().find(|f| f.id == *id));
            let title = sentence(&found?.title);
            options
                .push(html! { <option value={(*id).to_owned()} selected={*id == shown}>{ title }</option> });
        }
        let briefs: Vec<_> = routes.map(|r| reading.brief(shown, r)).collect();
        let field = format!("sure-figure-{w}");
        Some(html! {
            <>
                <div class="field">
                    <label for={field.clone()}>{ format!("Figure of {}", work.name) }</label>
                    <select id={field} onchange={&onchange}>{ for options }</select>
                </div>
                { for intervals(&format!("intervals-{w}"), work, &briefs, COVERAGE).map(|p| to_html(&p)) }
            </>
        })
    })
}

/// Reads what the draws say piece by piece, so that no turn takes long.
struct Reader {
    draws: Draws,
    /// Of the table of the piece of work that is being read.
    rows: Vec<Vec<String>>,
    /// The piece of work and the piece of it that comes next.
    at: (usize, usize),
    /// Whether the route that was read last has a case.
    cased: bool,
    read: Vec<ByRc<Html>>,
    /// What the run before this one left, until it is replaced.
    before: Option<Shown>,
    then: Callback<Shown>,
}

impl Reader {
    /// A turn, and then the next; a run that has turned to another plan meanwhile lets it drop.
    fn go_on(mut self) {
        if self.draws.run().is_none() {
            return;
        }
        let told = self.read.len();
        let done = in_turns(&mut || self.piece());
        if done {
            self.then.emit(Shown { book: self.draws.book.clone(), pieces: self.read.clone() });
        } else if let Some(before) = self.before.as_ref().filter(|_| self.read.len() > told) {
            // Still of the figures before, so that it stays dimmed until all is of the new ones.
            let pieces =
                self.read.iter().chain(before.pieces.iter().skip(self.read.len())).cloned().collect();
            self.then.emit(Shown { book: before.book.clone(), pieces });
        }
        if !done {
            Timeout::new(0, move || self.go_on()).forget();
        }
    }

    /// Reads the next piece; whether there was one.
    fn piece(&mut self) -> bool {
        let (account, (w, at)) = (&self.draws.book.account, self.at);
        let Some(work) = account.program.as_ref().and_then(|p| p.workloads.get(w)) else { return false };
        let Some(run) = self.draws.run() else { return false };
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
            self.read.push(ByRc(Rc::new(html! {
                <>
                    <Chosen key={w} draws={self.draws.clone()} {w} />
                    { for stopped_words(work, reading).into_iter().map(|text| html! { <p>{ unbroken(&text) }</p> }) }
                    { words_table(format!("sure-{w}"), &table) }
                </>
            })));
        }
        match at / 2 {
            r if r >= routes => self.at = (w + 1, 0),
            r if r == work.present => {}
            r if at.is_multiple_of(2) => {
                let words = case(&run, account, w, r);
                self.cased = !words.is_empty();
                let title = format!("{} in place of {}", work.routes[r].name, work.routes[work.present].name);
                self.read.push(ByRc(Rc::new(html! {
                    <>
                        <h4>{ title }</h4>
                        { for words.into_iter().map(|text| html! { <p>{ with_minus(&unbroken(&text)) }</p> }) }
                    </>
                })));
            }
            r => self.read.push(ByRc(Rc::new(matters(reading, self.cased, work.present, r)))),
        }
        true
    }
}

fn row(brief: &Brief<'_>, route: &str) -> Vec<String> {
    let limits = brief.drawn.map_or((0.0, 0.0), |s| (s.symmetric.low, s.symmetric.high));
    let show = |v: f64| brief.figure.measure.shown_within(v, limits);
    let (low, high) = match brief.drawn {
        Some(_) => (show(limits.0), show(limits.1)),
        None => ("not known".to_owned(), String::new()),
    };
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
