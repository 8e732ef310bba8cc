//! The frame: toolbar, contents, what is to be mended, the sections in their order, and the footer.
use crate::browser;
use crate::document::blank;
use crate::edit::{Edit, Item, dom_id, refusal};
use crate::files;
use crate::parts::{ByRc, Export, Mend, Toolbar, Wish, Working};
use crate::reckon::{Book, Reckoned};
use crate::sections::{Contents, Leaves, View, catch_up};
use crate::state::{Action, From, Notice, Opened, State};
use gloo::events::{EventListener, EventListenerOptions};
use gloo::timers::callback::Timeout;
use gloo::utils::{document, window};
use std::rc::Rc;
use thimbleworth::example::EXAMPLES;
use thimbleworth::material::catalogue;
use thimbleworth::plan::{PLAN_VERSION, Plan, Severity, open, save};
use wasm_bindgen::JsCast;
use yew::prelude::*;

/// How long after the last change the finding is read out.
const READ_OUT_AFTER_MS: u32 = 900;
/// How long after the last change the recovery copy is kept.
const KEEP_AFTER_MS: u32 = 400;

/// The most sentences of the finding that stand beside the account.
const IN_SIGHT: usize = 6;

impl Reducible for State {
    type Action = Action;
    fn reduce(self: Rc<Self>, action: Action) -> Rc<Self> {
        let before = Rc::clone(self.document());
        let next = self.after(action);
        if !Rc::ptr_eq(&before, next.document()) {
            // Before anything is drawn: a fault while drawing must find the newest plan here.
            browser::keep_plan(&next.file_name(), &save(next.plan()));
        }
        next
    }
}

/// The plan that the page opens with: the first example, so that there is something to look at and to change.
fn first() -> State {
    let plan = EXAMPLES.first().and_then(|example| open(example.text).plan);
    plan.map_or_else(State::default, State::example)
}

/// How far the page has been put up. Each turn draws what the next one does not have to wait for.
#[derive(Clone, Copy, PartialEq)]
enum Put {
    /// The frame, and what is typed into first.
    First,
    /// All of the question.
    Question,
    /// Everything, with figures.
    Figures,
}

/// The title of the window: the plan's own, marked while there is unsaved work or a list of errors.
fn window_title(state: &State, errors: usize) -> String {
    let name = if state.plan().title.trim().is_empty() { "Untitled plan" } else { state.plan().title.trim() };
    let mark = if state.is_unsaved() { "• " } else { "" };
    let error = if state.view.listed && errors > 0 { "Error: " } else { "" };
    let file = state.file().map_or(String::new(), |file| format!(" ({file})"));
    format!("{error}{mark}{name}{file} – Thimbleworth")
}

/// What a key stroke stands for. Inside a text that is being edited, the browser's own undo wins.
fn shortcut(event: &web_sys::KeyboardEvent) -> Option<Wish> {
    if event.alt_key() || !(event.ctrl_key() || event.meta_key()) {
        return None;
    }
    let in_a_text = event.target().is_some_and(|target| {
        target.has_type::<web_sys::HtmlInputElement>() || target.has_type::<web_sys::HtmlTextAreaElement>()
    });
    match (event.key().to_ascii_lowercase().as_str(), event.shift_key()) {
        ("s", false) => Some(Wish::Save),
        ("o", false) => Some(Wish::Open),
        ("z", false) if !in_a_text => Some(Wish::Undo),
        ("z", true) | ("y", false) if !in_a_text => Some(Wish::Redo),
        _ => None,
    }
}

/// What a click on a figure or on a button below a table asks for.
fn delegated(event: &MouseEvent, act: &Callback<Action>) {
    let Some(element) = event.target_dyn_into::<web_sys::Element>() else { return };
    let attribute = |name: &str| {
        let holder = element.closest(&format!("[{name}]")).ok().flatten()?;
        holder.get_attribute(name)
    };
    if let Some(figure) = attribute("data-figure") {
        let mut parts = figure.splitn(3, '.');
        let (w, r) = (parts.next().and_then(|p| p.parse().ok()), parts.next().and_then(|p| p.parse().ok()));
        if let (Some(workload), Some(route), Some(figure)) = (w, r, parts.next()) {
            act.emit(Action::Figure(Some(Opened { workload, route, figure: figure.to_owned() })));
        }
    } else if let Some(table) = attribute("data-copy") {
        let act = act.clone();
        browser::copy_table(&table, move |failed| {
            act.emit(Action::Say(if failed.is_empty() {
                Notice::done("The table is copied. Paste it into a spreadsheet.")
            } else {
                Notice::wrong(format!("The table could not be copied: {failed}."))
            }));
        });
    }
}

/// What is left of the last visit, if it can be read.
fn kept_copy() -> (Option<(Option<String>, Plan)>, Option<Notice>) {
    match browser::store_get(files::RECOVERY_KEY).map(|text| files::read_recovery(&text)) {
        None => (None, None),
        Some(Some(kept)) => (Some(kept), None),
        Some(None) => {
            browser::store_put(files::RECOVERY_KEY, None);
            (None, Some(Notice::wrong("A copy kept from an earlier visit could not be read and is removed.")))
        }
    }
}

#[component]
pub(crate) fn App() -> Html {
    let handle = use_reducer(first);
    let dispatcher = handle.dispatcher();
    let state: &State = &handle;
    let act = { use_callback((), move |action: Action, ()| dispatcher.dispatch(action)) };
    let edit = {
        let act = act.clone();
        use_callback((), move |edit: Edit, ()| act.emit(Action::Edit(edit)))
    };
    // The newest state for callbacks that are made once.
    let newest = use_mut_ref(|| handle.clone());
    *newest.borrow_mut() = handle.clone();
    let refusal = {
        let newest = newest.clone();
        use_callback((), move |(item, name): (Item, String), ()| refusal(newest.borrow().plan(), item, &name))
    };

    let put = use_state_eq(|| Put::First);
    let begun = *put != Put::First;
    let kept = use_state(|| None::<(Option<String>, Plan)>);
    {
        let (put, kept, act, newest) = (put.clone(), kept.clone(), act.clone(), newest.clone());
        use_effect_with(*put, move |stage| {
            let stage = *stage;
            let timer = Timeout::new(0, move || match stage {
                Put::First => {
                    let state = newest.borrow().clone();
                    browser::keep_plan(&state.file_name(), &save(state.plan()));
                    let (found, notice) = kept_copy();
                    kept.set(found);
                    if let Some(notice) = notice {
                        act.emit(Action::Say(notice));
                    }
                    browser::watch_files(move |name, size, bytes| {
                        act.emit(files::opened(&name, size, &bytes, newest.borrow().plan()));
                    });
                    put.set(Put::Question);
                }
                Put::Question => put.set(Put::Figures),
                Put::Figures => {}
            });
            move || drop(timer)
        });
    }
    let last = use_mut_ref(|| None::<Rc<Book>>);
    let reckoned = {
        use_memo((ByRc(Rc::clone(state.document())), *put == Put::Figures), move |(document, figures)| {
            if !figures {
                return Reckoned::pending(&document.plan);
            }
            let before = last.borrow().clone();
            let reckoned = Reckoned::new(&document.plan, &save(&document.plan), before.as_ref());
            *last.borrow_mut() = Some(Rc::clone(&reckoned.book));
            reckoned
        })
    };
    let errors = reckoned.count(Severity::Error);

    let wish = {
        let act = act.clone();
        use_callback(errors, move |wish: Wish, errors| grant(wish, *errors, &newest.borrow(), &act))
    };

    use_effect_with((window_title(state, errors), state.is_unsaved()), |(title, unsaved)| {
        document().set_title(title);
        browser::guard_leaving(*unsaved);
    });
    use_effect_with(state.view.focus.clone(), |focus| {
        if let Some((_, path)) = focus {
            browser::focus_on(&dom_id(path));
        }
    });
    {
        let act = act.clone();
        let state = handle.clone();
        use_effect_with((ByRc(Rc::clone(state.document())), state.is_unsaved()), move |(_, unsaved)| {
            let unsaved = *unsaved;
            let timer = Timeout::new(KEEP_AFTER_MS, move || {
                if unsaved {
                    let failed = browser::store_put(files::RECOVERY_KEY, Some(files::recovery(&state)));
                    let told = state.view.notice.as_ref().is_some_and(|n| n.text.starts_with("No copy"));
                    if !failed.is_empty() && !told {
                        act.emit(Action::Say(Notice::wrong(format!(
                            "No copy can be kept against a crash ({failed}). Save the plan to a file now and then."
                        ))));
                    }
                }
            });
            move || drop(timer)
        });
    }
    {
        let wish = wish.clone();
        use_effect_with(wish, move |wish| {
            let wish = wish.clone();
            let options = EventListenerOptions::enable_prevent_default();
            let listener =
                EventListener::new_with_options(&document(), "keydown", options, move |event: &Event| {
                    if let Some(wanted) = event.dyn_ref().and_then(shortcut) {
                        event.prevent_default();
                        wish.emit(wanted);
                    }
                });
            move || drop(listener)
        });
    }

    let onclick = {
        let act = act.clone();
        Callback::from(move |event: MouseEvent| delegated(&event, &act))
    };
    let view = View::new(state, &reckoned, begun, edit, act.clone(), refusal);
    let works = if reckoned.pending { 0 } else { reckoned.book.works.len() };
    let finding: Vec<String> = (0..works).flat_map(|w| reckoned.book.finding(w)).collect();
    let examples: Vec<AttrValue> =
        EXAMPLES.iter().filter(|_| begun).map(|e| AttrValue::from(e.title)).collect();
    html! {
        <>
            <Toolbar undo={state.undo_name().map(|name| AttrValue::from(name.to_owned()))}
                redo={state.redo_name().map(|name| AttrValue::from(name.to_owned()))}
                unsaved={state.is_unsaved()} {examples} wish={wish} />
            { notices(state, &kept, &act) }
            <div class="book" {onclick}>
                <aside class="margin-column" aria-label="Contents and finding">
                    <Contents />
                    <div class={classes!("insight", reckoned.old.then_some("old"))}>
                        <p class="head">{ "The finding as it stands" }</p>
                        { for finding.iter().take(IN_SIGHT).map(|sentence| html! { <p>{ sentence }</p> }) }
                        if finding.len() > IN_SIGHT { <p><a href="#finding">{ format!("and {} more", finding.len() - IN_SIGHT) }</a></p> }
                    </div>
                </aside>
                <main id="main" tabindex="-1">
                    if begun { { report_head(state, &finding) } }
                    <Mend plan={Rc::clone(state.document())} reckoned={ByRc(reckoned.clone())} open={state.view.listed} act={act.clone()} />
                    <Leaves {view} />
                    if !reckoned.pending {
                        <datalist id="catalogue">
                            { for state.plan().materials.iter().map(|m| html! { <option value={m.name.clone()} /> }) }
                            { names() }
                        </datalist>
                    }
                </main>
                if begun { <Working book={ByRc(Rc::clone(&reckoned.book))} opened={state.view.opened.clone()} act={act} /> }
            </div>
            if begun { <ReadOut text={finding.join(" ")} /> }
            <footer class="foot">
                <p>
                    { format!("{} reads and writes plans of version {PLAN_VERSION}. ", crate::PROGRAM) }
                    { "It works without a network, and nothing leaves this page." }
                </p>
                <details class="more">
                    <summary>{ "Keys" }</summary>
                    <ul>
                        <li><kbd>{ "Ctrl Z" }</kbd>{ " undo, " }<kbd>{ "Ctrl Y" }</kbd>{ " redo; inside a text that is being edited, the browser's own undo" }</li>
                        <li><kbd>{ "Ctrl S" }</kbd>{ " save, " }<kbd>{ "Ctrl O" }</kbd>{ " open, " }<kbd>{ "Ctrl P" }</kbd>{ " print" }</li>
                        <li>{ "On a Mac, the command key in place of Ctrl." }</li>
                    </ul>
                </details>
            </footer>
        </>
    }
}

thread_local! {
    /// The catalogue's names as options: made once, never drawn anew.
    static NAMES: Html = html! {
        <>{ for catalogue().iter().map(|s| html! { <option value={s.name.to_string()} /> }) }</>
    };
}

fn names() -> Html {
    NAMES.with(Clone::clone)
}

/// Does what was wished for.
fn grant(wish: Wish, errors: usize, state: &State, act: &Callback<Action>) {
    match wish {
        Wish::Blank => act.emit(Action::Open(From::Blank, Box::new(blank()), Vec::new())),
        Wish::Example(i) => {
            if let Some(plan) = EXAMPLES.get(i).and_then(|example| open(example.text).plan) {
                act.emit(Action::Open(From::Example, Box::new(plan), Vec::new()));
            }
        }
        Wish::Open => browser::choose_file(),
        Wish::Save => {
            let act = act.clone();
            browser::save_file(
                &state.file_name(),
                &save(state.plan()),
                "application/json",
                move |name: Option<String>| {
                    if let Some(name) = name {
                        browser::store_put(files::RECOVERY_KEY, None);
                        act.emit(Action::Saved(name));
                    }
                },
            );
        }
        Wish::Print | Wish::Export(_) if errors > 0 => act.emit(Action::Mend),
        Wish::Print => {
            // What follows what is typed has to be drawn first, which cannot happen while the browser prints.
            catch_up();
            let act = act.clone();
            Timeout::new(0, move || {
                if window().print().is_err() {
                    act.emit(Action::Say(Notice::wrong("The browser did not print. Its own menu can.")));
                }
            })
            .forget();
        }
        Wish::Export(export) => {
            let (extension, media_type, text) = exported(export, state.plan());
            let name = format!("{}.{extension}", state.file_name().trim_end_matches(".json"));
            let act = act.clone();
            browser::save_file(&name, &text, media_type, move |name: Option<String>| {
                if let Some(name) = name {
                    act.emit(Action::Say(Notice::done(format!("{name} is saved."))));
                }
            });
        }
        Wish::Undo => act.emit(Action::Undo),
        Wish::Redo => act.emit(Action::Redo),
    }
}

/// A document of the plan for people or other programs: extension, media type, text.
fn exported(export: Export, plan: &Plan) -> (&'static str, &'static str, String) {
    let text = |format| crate::account(&save(plan), format);
    match export {
        Export::Json => ("results.json", "application/json", text("json")),
        Export::Csv => ("csv", "text/csv", text("csv")),
        Export::Markdown => ("md", "text/markdown", text("markdown")),
    }
}

/// What was just done, what was kept from an earlier visit, and that an example is an example. The line has its place
/// whether or not something stands in it.
fn notices(
    state: &State,
    kept: &UseStateHandle<Option<(Option<String>, Plan)>>,
    act: &Callback<Action>,
) -> Html {
    let notice = state.view.notice.as_ref();
    let offer = kept.as_ref().map(|(file, plan)| {
        let take = {
            let (kept, act, file, plan) = (kept.clone(), act.clone(), file.clone(), plan.clone());
            Callback::from(move |_: MouseEvent| {
                act.emit(Action::Open(From::Recovery(file.clone()), Box::new(plan.clone()), Vec::new()));
                kept.set(None);
            })
        };
        let leave = {
            let kept = kept.clone();
            Callback::from(move |_: MouseEvent| {
                browser::store_put(files::RECOVERY_KEY, None);
                kept.set(None);
            })
        };
        let title = if plan.title.trim().is_empty() { "Untitled plan" } else { plan.title.trim() };
        html! {
            <div class="notice offer" role="group" aria-label="Kept copy">
                <p>{ format!("Work that was not saved is kept from an earlier visit: “{title}”.") }</p>
                <button type="button" class="small" onclick={take}>{ "Open the kept copy" }</button>
                <button type="button" class="small" onclick={leave}>{ "Remove it" }</button>
            </div>
        }
    });
    html! {
        <div class="notices">
            <div role="status" class={classes!("said-line", notice.filter(|n| n.wrong).map(|_| "wrong"))}>
                if let Some(notice) = notice {
                    <p>{ &notice.text }</p>
                    if !notice.lines.is_empty() {
                        <ul>{ for notice.lines.iter().map(|line| html! { <li>{ line }</li> }) }</ul>
                    }
                } else if state.view.example {
                    <p>{ "This is an example: the laboratory and its figures are invented. Change anything, open your own file, or begin anew." }</p>
                }
            </div>
            { for offer }
        </div>
    }
}

/// What stands at the top of the printed report.
fn report_head(state: &State, finding: &[String]) -> Html {
    let plan = state.plan();
    let title = if plan.title.trim().is_empty() { "Untitled plan" } else { plan.title.trim() };
    html! {
        <section class="onpaper reporthead" aria-label="Report">
            <h2>{ title }</h2>
            <p>
                { format!("{}; date of the plan: {}; file: {}; {}.", plan.site.name,
                    plan.site.as_of.as_deref().unwrap_or("not stated"), state.file().unwrap_or("not saved"), crate::PROGRAM) }
                if state.view.example { { " This is an example; laboratory and figures are invented." } }
                if state.is_unsaved() { { " Printed with changes that no file holds." } }
            </p>
            { for finding.iter().map(|sentence| html! { <p class="finding">{ sentence }</p> }) }
            <p class="signed">{ "Drawn up by ____________________ on ____________   Checked by ____________________ on ____________" }</p>
        </section>
    }
}

#[derive(Properties, PartialEq)]
struct ReadOutProps {
    text: String,
}

/// The finding for those who listen: once, some time after the last change, without moving the focus.
#[component]
fn ReadOut(props: &ReadOutProps) -> Html {
    let said = use_state_eq(String::new);
    // What the page opens with is read in its place; only changes are read out.
    let first = use_mut_ref(|| true);
    {
        let said = said.clone();
        use_effect_with(props.text.clone(), move |text| {
            let text = text.clone();
            let opening = if text.is_empty() { true } else { first.replace(false) };
            let timer = (!opening).then(|| Timeout::new(READ_OUT_AFTER_MS, move || said.set(text)));
            move || drop(timer)
        });
    }
    html! { <p id="read-out" class="unseen" aria-live="polite">{ (*said).clone() }</p> }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn the_window_names_the_plan_and_marks_unsaved_work() {
        let set = |title: &str| Action::Edit(Edit::set("title", "Title", crate::edit::text(title)));
        let blank = Rc::new(State::default());
        assert_eq!(window_title(&blank, 0), "Untitled plan – Thimbleworth");
        let typed = Rc::clone(&blank).after(set(" Hop oil "));
        assert_eq!(window_title(&typed, 0), "• Hop oil – Thimbleworth");
        let saved = typed.after(Action::Saved("hops.json".into()));
        assert_eq!(window_title(&saved, 0), "Hop oil (hops.json) – Thimbleworth");
        let listed = saved.after(Action::Mend);
        assert_eq!(window_title(&listed, 2), "Error: Hop oil (hops.json) – Thimbleworth");
        assert_eq!(window_title(&listed, 0), "Hop oil (hops.json) – Thimbleworth");
    }
}
