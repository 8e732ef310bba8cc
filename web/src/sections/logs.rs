//! Section "Logs": the site's own records, pasted or from files, beside the plan. Nothing of them leaves the page, and
//! nothing but how they are read is kept.
mod job;

use super::{Section, View, When};
use crate::browser;
use crate::edit::{Change, Edit};
use crate::form::sentence;
use crate::parts::{ByRc, MOST_ROWS, framed, value_of};
use crate::picture::to_html;
use crate::show::with_minus;
use job::{Job, Outcome, Running, Source};
use std::rc::Rc;
use thimbleworth::log::{DayOrder, Decimals, Mapping, Register, Role, guess_as};
use thimbleworth::plan::Log;
use thimbleworth::report::{DataCell, data_csv};
use wasm_bindgen::JsCast;
use web_sys::{ClipboardEvent, Element, HtmlInputElement, HtmlTextAreaElement};
use yew::prelude::*;

pub(super) static SECTION: Section = Section {
    id: "logs",
    title: "Logs",
    lead: "What the site's own records say: preparation log, purchases, stock counts, waste consignments, cylinder returns.",
    when: When::Follows,
    body: |view| html! { <Logs view={view.clone()} /> },
};

#[derive(Properties, PartialEq)]
struct Props {
    view: View,
}

/// The records that are held, and what was found in them. No part of the plan.
#[derive(Default)]
struct Logs {
    sources: Vec<Source>,
    found: Option<Rc<Outcome>>,
    /// The job under way; it stops with its end here.
    running: Option<Running>,
    said: String,
    /// Tables that are unfolded.
    open: Vec<&'static str>,
}

enum Message {
    /// A file in place of that of the same name, or none in its place.
    Put(String, Option<Vec<u8>>),
    Pasted(String),
    Done(Outcome),
    Said(String),
    Folded(&'static str, bool),
}

impl Logs {
    fn begin(&mut self, ctx: &Context<Self>) {
        let view = &ctx.props().view;
        let book = ByRc(Rc::clone(&view.reckoned.book));
        let link = ctx.link().clone();
        let job = Job::begin(view.plan(), book, self.sources.clone());
        if job.is_none() {
            self.found = None;
        }
        self.running = job.map(|job| job::run(job, move |found| link.send_message(Message::Done(found))));
    }

    fn put(&mut self, ctx: &Context<Self>, name: String, bytes: Option<Vec<u8>>) {
        self.sources.retain(|known| known.name != name);
        self.sources.extend(bytes.map(|bytes| Source { name, bytes: Rc::new(bytes) }));
        self.said.clear();
        self.begin(ctx);
    }
}

impl Component for Logs {
    type Message = Message;
    type Properties = Props;

    fn create(_: &Context<Self>) -> Self {
        Self::default()
    }

    fn changed(&mut self, ctx: &Context<Self>, before: &Props) -> bool {
        let other = ctx.props().view.document != before.view.document;
        if other {
            self.begin(ctx);
        }
        other
    }

    fn update(&mut self, ctx: &Context<Self>, message: Message) -> bool {
        match message {
            Message::Put(name, bytes) => self.put(ctx, name, bytes),
            Message::Pasted(text) => {
                let mut name = String::from("pasted 1");
                let mut count = 1;
                while self.sources.iter().any(|known| known.name == name) {
                    count += 1;
                    name = ["pasted ", &count.to_string()].concat();
                }
                self.put(ctx, name, Some(text.into_bytes()));
            }
            Message::Done(found) => {
                self.found = Some(Rc::new(found));
                self.running = None;
            }
            Message::Said(said) => self.said = said,
            Message::Folded(key, open) => {
                self.open.retain(|known| *known != key);
                if open {
                    self.open.push(key);
                }
            }
        }
        true
    }

    fn view(&self, ctx: &Context<Self>) -> Html {
        let link = ctx.link();
        // What is pasted never stands in the field: a browser takes seconds to lay out 50 000 lines.
        let onpaste = link.batch_callback(|event: Event| {
            let data = event.dyn_ref::<ClipboardEvent>()?.clipboard_data()?;
            let text = data.get_data("text").ok().filter(|text| !text.is_empty())?;
            event.prevent_default();
            Some(Message::Pasted(text))
        });
        // What is typed or put there in another way is read when the field is left.
        let onchange = link.batch_callback(|event: Event| {
            let area = event.target_dyn_into::<HtmlTextAreaElement>()?;
            let text = area.value();
            area.set_value("");
            (!text.trim().is_empty()).then_some(Message::Pasted(text))
        });
        let onfiles = {
            let link = link.clone();
            Callback::from(move |event: Event| {
                let (Some(input), link) = (event.target_dyn_into::<HtmlInputElement>(), link.clone()) else {
                    return;
                };
                browser::read_files(&input, move |name, bytes| {
                    link.send_message(match bytes {
                        Some(bytes) => Message::Put(name, Some(bytes)),
                        None => Message::Said(name + " is larger than 64 MB or cannot be read. The command thimbleworth log reads a file of any size."),
                    });
                });
            })
        };
        html! {
            <div aria-busy={self.running.is_some().then_some("true")}>
                <label for="logs-paste">{ "Paste rows with their headings, as a spreadsheet copies them" }</label>
                <textarea id="logs-paste" rows="2" spellcheck="false" {onpaste} {onchange} />
                <p><label>{ "or open files " }<input type="file" multiple={true} accept=".csv,.tsv,.txt,text/*" onchange={onfiles} /></label></p>
                <p class="hint">{ "Nothing of them leaves this page. How a file is read is kept in the plan once you change it; its rows are not." }</p>
                <p role="status">{ if self.running.is_some() { "Reading." } else { self.said.as_str() } }</p>
                { for self.found.as_ref().map(|found| self.drawn(ctx, found)) }
            </div>
        }
    }
}

impl Logs {
    fn drawn(&self, ctx: &Context<Self>, found: &Rc<Outcome>) -> Html {
        let link = ctx.link();
        html! {
            <>
                <datalist id="logs-roles">{ for Role::ALL.map(|role| html! { <option value={role.word()} /> }) }</datalist>
                { for found.files.iter().enumerate().map(|(i, file)| {
                    let name = file.source.clone();
                    html! {
                        <section aria-label={name.clone()}>
                            <h3>{ &name }</h3>
                            <p>{ &file.words }{ " " }
                                <button type="button" class="small" onclick={link.callback(move |_: MouseEvent| Message::Put(name.clone(), None))}>{ "Take away" }</button>
                            </p>
                            { for file.mapping.as_ref().map(|mapping| mapped(i, mapping, file.failed, &ctx.props().view.edit)) }
                        </section>
                    }
                }) }
                { for found.picture.as_ref().map(to_html) }
                { for found.tables.iter().enumerate().map(|(at, table)| {
                    let key = table.key;
                    let ontoggle = link.batch_callback(move |event: Event| {
                        let open = event.target_dyn_into::<Element>()?.has_attribute("open");
                        Some(Message::Folded(key, open))
                    });
                    let open = self.open.contains(&key);
                    html! {
                        <details class="more" {open} {ontoggle}>
                            <summary>{ table.title }{ " (" }{ table.rows.len() }{ ")" }</summary>
                            if open { { data(found, at) } }
                        </details>
                    }
                }) }
            </>
        }
    }
}

/// A table of what was found.
fn data(found: &Rc<Outcome>, at: usize) -> Html {
    let Some(table) = found.tables.get(at) else { return Html::default() };
    let mut drawn = Vec::new();
    for row in table.rows.iter().take(MOST_ROWS) {
        let mut cells = Vec::new();
        for cell in row {
            cells.push(match cell {
                DataCell::Text(text) => html! { <td>{ text }</td> },
                cell => html! { <td class="num">{ with_minus(&[" ", &cell.shown()].concat()) }</td> },
            });
        }
        drawn.push(html! { <tr>{ cells }</tr> });
    }
    let whole = {
        let found = Rc::clone(found);
        Callback::from(move |id: String| {
            let text = found.tables.get(at).map(data_csv).unwrap_or_default();
            browser::save_file(&(id + ".csv"), &text, "text/csv", |_| {});
        })
    };
    let head = table.head.iter().map(|[_, heading]| *heading).collect();
    html! {
        <>
            { framed(["logs-", table.key].concat(), table.title, head, drawn, table.rows.len(), Some(whole)) }
            <ul class="foot">{ for table.notes.iter().map(|note| html! { <li>{ note }</li> }) }</ul>
        </>
    }
}

/// What of a mapping one control changes.
type Set = fn(&mut Log, &str, String);

/// How a file is read, each part of which can be changed.
fn mapped(file: usize, mapping: &Mapping, open: bool, edit: &Callback<Edit>) -> Html {
    let log = mapping.kept();
    // What cannot be used is marked, and changes nothing.
    let changed = |of: &str, set: Set| {
        let (log, edit, of) = (log.clone(), edit.clone(), of.to_owned());
        Callback::from(move |event: Event| {
            let Some(value) = value_of(&event) else { return };
            let (mut log, mut problems) = (log.clone(), Vec::new());
            set(&mut log, &of, value);
            let usable = Mapping::of(&log, "", &mut problems).is_some();
            if let Some(input) = event.target_dyn_into::<HtmlInputElement>() {
                input.set_custom_validity(&problems.first().map(sentence).unwrap_or_default());
                input.report_validity();
            }
            if usable {
                edit.emit(Edit::list(Change::Log(Box::new(log))));
            }
        })
    };
    let choice = |label: &str, words: &[&'static str], now: &str, set: Set| {
        html! {
            <label>{ label }{ " " }
                <select onchange={changed("", set)}>
                    { for words.iter().map(|word| html! { <option value={*word} selected={*word == now}>{ *word }</option> }) }
                </select>
            </label>
        }
    };
    let means: Vec<String> = log.means.iter().map(|(name, plan)| [name, " = ", plan].concat()).collect();
    html! {
        <details class="more" {open}>
            <summary>{ "How it is read" }</summary>
            <p>{ choice("As", &Register::WORDS, &log.register, |log, _, word| {
                let headings: Vec<&str> = log.columns.iter().map(|(heading, _)| heading.as_str()).collect();
                if let Some(register) = Register::named(&word) {
                    log.columns = guess_as("", &headings, register).kept().columns;
                }
                log.register = word;
            }) }</p>
            <p>{ choice("Dates with strokes", &DayOrder::WORDS, mapping.dates.word(), |log, _, word| log.dates = Some(word)) }</p>
            <p>{ choice("Decimals", &Decimals::WORDS, mapping.decimals.word(), |log, _, word| log.decimals = Some(word)) }</p>
            <table class="figures words">
                <thead><tr><th scope="col">{ "Heading" }</th><th scope="col">{ "Read as" }</th></tr></thead>
                <tbody>{ for log.columns.iter().enumerate().map(|(at, (heading, column))| {
                    let id = ["logs", &file.to_string(), &at.to_string()].join("-");
                    html! {
                        <tr>
                            <th scope="row"><label for={id.clone()}>{ heading }</label></th>
                            <td><input {id} list="logs-roles" value={column.clone()} onchange={changed(heading, |log, heading, text| {
                                if let Some(place) = log.columns.iter_mut().find(|(known, _)| known == heading) {
                                    place.1 = text.trim().to_owned();
                                }
                            })} /></td>
                        </tr>
                    }
                }) }</tbody>
            </table>
            <p><label>{ "How far its amounts can be off " }
                <input size="8" value={log.uncertainty.clone().unwrap_or_default()}
                    onchange={changed("", |log, _, text| log.uncertainty = Some(text).filter(|t| !t.trim().is_empty()))} />
            </label></p>
            <label>{ "What names in it mean in the plan, one a line, as in Aceton roh = acetone" }
                <textarea rows="3" spellcheck="false" value={means.join("\n")} onchange={changed("", |log, _, text| {
                    let pairs = text.lines().filter_map(|line| line.rsplit_once('='));
                    log.means = pairs.map(|(name, plan)| (name.trim().to_owned(), plan.trim().to_owned())).collect();
                })} />
            </label>
        </details>
    }
}
