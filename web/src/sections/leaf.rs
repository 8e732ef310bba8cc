//! The sections as leaves of the book. They are put down one after the other, each in a turn of its own, so that the first
//! can be used at once and nothing that stands is moved; and those with figures follow what is typed.
use super::{SECTIONS, View, When};
use crate::draws::Drawing;
use crate::parts::ByRc;
use gloo::events::EventListener;
use gloo::timers::callback::Timeout;
use gloo::utils::window;
use std::rc::Rc;
use yew::prelude::*;

/// How long after the last change of the plan the figures follow.
const FOLLOW_AFTER_MS: u32 = 150;

/// What the browser says before it prints.
const BEFORE_PRINT: &str = "beforeprint";

/// Lets every section show the newest figures, as before printing.
pub(crate) fn catch_up() {
    if let Ok(event) = web_sys::Event::new(BEFORE_PRINT) {
        // That nobody prevented it is no news.
        let _ = window().dispatch_event(&event);
    }
}

/// The contents list.
#[component]
pub(crate) fn Contents() -> Html {
    html! {
        <nav class="contents" aria-label="Contents">
            <ol>
                { for SECTIONS.iter().enumerate().map(|(i, section)| html! {
                    <li><a href={format!("#{}", section.id)}><span class="folio">{ i + 1 }</span>{ " " }{ section.title }</a></li>
                }) }
            </ol>
        </nav>
    }
}

#[derive(Properties, PartialEq)]
pub(crate) struct LeavesProps {
    pub(crate) view: View,
}

/// All sections.
#[component]
pub(crate) fn Leaves(props: &LeavesProps) -> Html {
    let stand = use_state_eq(|| 1_usize);
    {
        let stand = stand.clone();
        use_effect_with((*stand, props.view.reckoned.pending), move |(n, pending)| {
            let next = n + 1;
            let timer =
                (!pending && next <= SECTIONS.len()).then(|| Timeout::new(0, move || stand.set(next)));
            move || drop(timer)
        });
    }
    html! {
        <div class="leaves" aria-busy={(*stand < SECTIONS.len()).then_some("true")}>
            <Drawing book={ByRc(Rc::clone(&props.view.reckoned.book))} begin={*stand >= SECTIONS.len()}>
                { for (0..*stand).map(|at| match SECTIONS.get(at).map(|section| section.when) {
                    Some(When::Follows) => html! { <Follower key={at} {at} view={props.view.clone()} /> },
                    _ => html! { <Leaf key={at} {at} view={props.view.clone()} behind={false} /> },
                }) }
            </Drawing>
        </div>
    }
}

#[derive(Properties, PartialEq)]
struct FollowerProps {
    at: usize,
    view: View,
}

/// A section that shows the view as it was when nothing had changed for a moment.
#[component]
fn Follower(props: &FollowerProps) -> Html {
    let shown = use_state_eq(|| props.view.clone());
    let newest = use_mut_ref(|| props.view.clone());
    *newest.borrow_mut() = props.view.clone();
    {
        let shown = shown.clone();
        use_effect_with(props.view.clone(), move |view| {
            // What is asked for with a click is not waited for.
            let after = if view.document == shown.document { 0 } else { FOLLOW_AFTER_MS };
            let timer = (*view != *shown).then(|| {
                let view = view.clone();
                Timeout::new(after, move || shown.set(view))
            });
            move || drop(timer)
        });
    }
    {
        let shown = shown.clone();
        use_effect_with((), move |()| {
            let listener = EventListener::new(&window(), BEFORE_PRINT, move |_| {
                let view = newest.borrow().clone();
                shown.set(view);
            });
            move || drop(listener)
        });
    }
    html! { <Leaf at={props.at} view={(*shown).clone()} behind={*shown != props.view} /> }
}

#[derive(Properties, PartialEq)]
struct LeafProps {
    at: usize,
    view: View,
    /// Whether the plan has changed since.
    behind: bool,
}

/// One section under its number and title.
#[component]
fn Leaf(props: &LeafProps) -> Html {
    let Some(section) = SECTIONS.get(props.at) else { return Html::default() };
    let heading = format!("{}-heading", section.id);
    html! {
        <section id={section.id} class="leaf" aria-labelledby={heading.clone()} aria-busy={props.behind.then_some("true")}>
            <h2 id={heading}><span class="folio">{ props.at + 1 }</span>{ " " }{ section.title }</h2>
            <div class="lines">
                <p class="lead">{ section.lead }</p>
                <Body at={props.at} view={props.view.clone()} />
            </div>
        </section>
    }
}

#[derive(Properties, PartialEq)]
struct BodyProps {
    at: usize,
    view: View,
}

/// What stands in a section, drawn again only for another view.
#[component]
fn Body(props: &BodyProps) -> Html {
    SECTIONS.get(props.at).map_or_else(Html::default, |section| (section.body)(&props.view))
}
