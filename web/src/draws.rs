//! The draws of the plan on the page: made in turns of a few milliseconds, so that no key stroke waits for them; only routes that
//! were edited are drawn again. Components take them from here by context and are drawn when a run is whole.
use crate::parts::ByRc;
use crate::reckon::Book;
use gloo::timers::callback::Timeout;
use gloo::utils::window;
use std::cell::{Ref, RefCell};
use thimbleworth::odds::{MOST_CELLS, Sampled, Wish, headline};
use yew::prelude::*;

const DRAWS: u32 = 10_000;
/// The share of draws that an interval holds.
pub(crate) const COVERAGE: f64 = 0.95;
/// How long a turn lasts; so many draws of a route are made at once, a millisecond or two.
const TURN_MS: f64 = 8.0;
const SLICE: u32 = 500;
/// The figures wait 150 ms after the last change, and this so much more.
const AFTER_MS: u32 = 200;

/// A run that is whole, and the figures that it is of.
#[derive(Clone, PartialEq)]
pub(crate) struct Draws {
    pub(crate) book: ByRc<Book>,
    run: ByRc<RefCell<Sampled>>,
    generation: u64,
}

impl Draws {
    /// The run; nothing once it has turned to another plan.
    pub(crate) fn run(&self) -> Option<Ref<'_, Sampled>> {
        Some(self.run.borrow()).filter(|run| run.generation() == self.generation)
    }
}

/// What components find: no run yet, or the last that was whole.
pub(crate) type Drawn = Option<Draws>;

#[derive(Properties, PartialEq)]
pub(crate) struct Props {
    pub(crate) book: ByRc<Book>,
    /// Whether the sections stand: nothing is drawn before.
    pub(crate) begin: bool,
    pub(crate) children: Html,
}

/// Makes the draws for all that is below.
#[component]
pub(crate) fn Drawing(props: &Props) -> Html {
    let run = use_memo((), |()| RefCell::new(Sampled::default()));
    let drawn = use_state_eq(|| None::<Draws>);
    {
        let drawn = drawn.clone();
        use_effect_with((props.book.clone(), props.begin), move |(book, begin)| {
            let book = book.clone();
            let timer = begin.then(|| {
                Timeout::new(AFTER_MS, move || {
                    let wish = Wish { draws: DRAWS, most_cells: MOST_CELLS, wanted: &headline };
                    let generation = run.borrow_mut().follow(&book.account, wish);
                    go_on(Draws { book, run: ByRc(run), generation }, drawn);
                })
            });
            move || drop(timer)
        });
    }
    html! { <ContextProvider<Drawn> context={(*drawn).clone()}>{ props.children.clone() }</ContextProvider<Drawn>> }
}

/// A turn, and then the next; a run that has turned to another plan meanwhile lets it drop.
fn go_on(draws: Draws, then: UseStateHandle<Drawn>) {
    if draws.run().is_none() {
        return;
    }
    let done = in_turns(&mut || draws.run.borrow_mut().advance(&draws.book.account, SLICE) > 0);
    if done {
        then.set(Some(draws));
    } else {
        Timeout::new(0, move || go_on(draws, then)).forget();
    }
}

/// Does pieces until there are no more, or until the turn is over; whether there are no more. A piece says whether there is another.
pub(crate) fn in_turns(piece: &mut dyn FnMut() -> bool) -> bool {
    let clock = window().performance();
    let now = || clock.as_ref().map_or(f64::INFINITY, web_sys::Performance::now);
    let until = now() + TURN_MS;
    while piece() {
        if now() >= until {
            return false;
        }
    }
    true
}

/// What was drawn last, and of which run and choice.
pub(crate) type Kept = RefCell<(u64, String, Html)>;

/// Draws again only for another run or choice; a run that has turned to another plan leaves what stands.
pub(crate) fn kept(
    last: &Kept,
    draws: &Draws,
    chosen: &str,
    draw: &dyn Fn(&Sampled) -> Option<Html>,
) -> Html {
    let mut last = last.borrow_mut();
    if (last.0, last.1.as_str()) != (draws.generation, chosen)
        && let Some(html) = draws.run().and_then(|run| draw(&run))
    {
        *last = (draws.generation, chosen.to_owned(), html);
    }
    last.2.clone()
}

/// What is drawn: said before the first run, dimmed until it has caught up. `of` are the figures that it is of.
pub(crate) fn follows(of: Option<&ByRc<Book>>, book: &ByRc<Book>, html: Html) -> Html {
    let Some(of) = of else { return html! { <p class="hint">{ "Being drawn …" }</p> } };
    let behind = of != book;
    html! {
        <div class={classes!("works", behind.then_some("old"))} aria-busy={behind.then_some("true")}>{ html }</div>
    }
}
