//! The draws of the plan on the page: made in slices, so that no key stroke waits for them; only routes that were edited are
//! drawn again. Components take them from here by context and are drawn when a run is whole.
use crate::document::Document;
use crate::parts::ByRc;
use gloo::timers::callback::Timeout;
use std::cell::RefCell;
use std::rc::Rc;
use thimbleworth::account::{Account, account};
use thimbleworth::odds::{MOST_CELLS, Sampled, Wish, headline};
use yew::prelude::*;

const DRAWS: u32 = 10_000;
/// The share of draws that an interval holds.
pub(crate) const COVERAGE: f64 = 0.95;
/// So many draws of a route are made in a turn: a few milliseconds.
const SLICE: u32 = 1_000;
/// The figures wait 150 ms after the last change, and this so much more.
const AFTER_MS: u32 = 200;

/// A run that is whole, and the plan that it is of.
#[derive(Clone, PartialEq)]
pub(crate) struct Draws {
    pub(crate) document: ByRc<Document>,
    pub(crate) account: ByRc<Account>,
    run: ByRc<RefCell<Sampled>>,
    generation: u64,
}

impl Draws {
    /// What a reader of the run says; nothing while it has turned to another plan.
    pub(crate) fn read<T>(&self, of: impl FnOnce(&Sampled, &Account) -> Option<T>) -> Option<T> {
        let run = self.run.borrow();
        (run.generation() == self.generation).then(|| of(&run, &self.account)).flatten()
    }
}

/// What components find: no run yet, or the last that was whole.
pub(crate) type Drawn = Option<Draws>;

#[derive(Properties, PartialEq)]
pub(crate) struct Props {
    pub(crate) document: ByRc<Document>,
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
        use_effect_with((props.document.clone(), props.begin), move |(document, begin)| {
            let document = document.clone();
            let timer = begin.then(|| {
                Timeout::new(AFTER_MS, move || {
                    let account = ByRc(Rc::new(account(&document.plan)));
                    // What is to be mended first leaves what was drawn before.
                    if account.broken() {
                        return;
                    }
                    let wish = Wish { draws: DRAWS, most_cells: MOST_CELLS, wanted: &headline };
                    let generation = run.borrow_mut().follow(&account, wish);
                    slice(Draws { document, account, run: ByRc(run), generation }, drawn);
                })
            });
            move || drop(timer)
        });
    }
    html! { <ContextProvider<Drawn> context={(*drawn).clone()}>{ props.children.clone() }</ContextProvider<Drawn>> }
}

/// A slice, and then the next; a run that turned to another plan meanwhile lets it drop.
fn slice(draws: Draws, then: UseStateHandle<Drawn>) {
    if draws.run.borrow().generation() != draws.generation {
        return;
    }
    let left = draws.run.borrow_mut().advance(&draws.account, SLICE);
    if left > 0 {
        Timeout::new(0, move || slice(draws, then)).forget();
    } else {
        then.set(Some(draws));
    }
}

/// What stands in place of what is drawn, or around it: said before the first run, dimmed until it has caught up.
pub(crate) fn follows(drawn: &Drawn, document: &ByRc<Document>, html: Html) -> Html {
    let Some(draws) = drawn else { return html! { <p class="hint">{ "Being drawn …" }</p> } };
    let behind = draws.document != *document;
    html! {
        <div class={classes!("works", behind.then_some("old"))} aria-busy={behind.then_some("true")}>{ html }</div>
    }
}
