//! Section "Logs": the site's own records, pasted or from files, beside the plan. Nothing of them leaves the page, and
//! nothing but the mapping is kept.
mod job;

use super::{Section, View, When};
use crate::browser;
use crate::edit::{Change, Edit};
use crate::parts::ByRc;
use gloo::file::callbacks::{FileReader, read_as_bytes};
use job::{Job, Outcome, Source};
use std::rc::Rc;
use thimbleworth::log::{Column, DayOrder, Decimals, Mapping, Register, Role, guess_as};
use thimbleworth::report::DataTable;
use wasm_bindgen::JsCast;
use web_sys::{HtmlInputElement, HtmlSelectElement, HtmlTextAreaElement};
use yew::prelude::*;

pub(super) static SECTION: Section = Section {
    id: "logs",
    title: "Logs",
    lead: "What the site's own records say: preparation log, purchases, stock counts, waste consignments, cylinder returns.",
    when: When::Follows,
    body: |view| html! { <Logs view={view.clone()} /> },
};

/// The largest file that is held in memory; the command reads larger ones as a stream.
const LARGEST: u64 = 64_000_000;
/// Rows of a table that are shown.
const SHOWN: usize = 60;

#[derive(Properties, PartialEq)]
struct Props {
    view: View,
}

#[component]
fn Logs(props: &Props) -> Html {
    let view = &props.view;
    let sources = use_state_eq(Vec::<Source>::new);
    let outcome = use_state(|| None::<Rc<Outcome>>);
    let busy = use_state_eq(|| false);
    let said = use_state_eq(String::new);
    let readers = use_mut_ref(Vec::<FileReader>::new);
    let area = use_node_ref();
    // The newest list, for files that are still being fetched.
    let newest = use_mut_ref(Vec::<Source>::new);
    {
        let (outcome, busy) = (outcome.clone(), busy.clone());
        let book = ByRc(Rc::clone(&view.reckoned.book));
        use_effect_with((view.document.clone(), (*sources).clone()), move |(document, sources)| {
            let job = Job::begin(&document.plan, book, sources.clone());
            busy.set(job.is_some());
            if job.is_none() {
                outcome.set(None);
            }
            let stop = job.map(|job| {
                job::run(job, move |found| {
                    busy.set(false);
                    outcome.set(Some(Rc::new(found)));
                })
            });
            move || drop(stop)
        });
    }
    let put = {
        let (sources, newest) = (sources.clone(), newest.clone());
        Callback::from(move |(name, bytes): (String, Vec<u8>)| {
            let mut list = newest.borrow_mut();
            list.retain(|known| known.name != name);
            list.push(Source { name, bytes: ByRc(Rc::new(bytes)) });
            sources.set(list.clone());
        })
    };
    let onpaste = {
        let (put, area, newest) = (put.clone(), area.clone(), newest.clone());
        Callback::from(move |_: MouseEvent| {
            let Some(area) = area.cast::<HtmlTextAreaElement>() else { return };
            let text = area.value();
            if !text.trim().is_empty() {
                let count = newest.borrow().len() + 1;
                put.emit((format!("pasted {count}"), text.into_bytes()));
                area.set_value("");
            }
        })
    };
    let onfiles = {
        let (put, said, readers) = (put.clone(), said.clone(), readers.clone());
        Callback::from(move |event: Event| {
            let Some(input) = event.target_dyn_into::<HtmlInputElement>() else { return };
            let Some(files) = input.files() else { return };
            for file in gloo::file::FileList::from(files).iter() {
                let name = file.name();
                if file.size() > LARGEST {
                    said.set(format!("{name} is larger than 64 MB: the command thimbleworth log reads it."));
                    continue;
                }
                let (put, said) = (put.clone(), said.clone());
                readers.borrow_mut().push(read_as_bytes(file, move |bytes| match bytes {
                    Ok(bytes) => put.emit((name, bytes)),
                    Err(_) => said.set(format!("{name} could not be read.")),
                }));
            }
            input.set_value("");
        })
    };
    let remove = {
        let (sources, newest) = (sources.clone(), newest.clone());
        Callback::from(move |name: String| {
            let mut list = newest.borrow_mut();
            list.retain(|known| known.name != name);
            sources.set(list.clone());
        })
    };
    html! {
        <div class="logs" aria-busy={busy.then_some("true")}>
            <label class="field-label" for="logs-paste">{ "Rows from a spreadsheet, with their headings" }</label>
            <textarea id="logs-paste" ref={area} rows="5" spellcheck="false" />
            <p>
                <button type="button" onclick={onpaste}>{ "Read the rows" }</button>
                { " " }
                <label>{ "or files: " }<input type="file" multiple={true} accept=".csv,.tsv,.txt,text/*" onchange={onfiles} /></label>
            </p>
            <p class="hint">{ "Nothing of them leaves this page. How a file is read is kept in the plan once you change it; its rows are not." }</p>
            <p role="status">{ if *busy { "Reading." } else { said.as_str() } }</p>
            if let Some(found) = &*outcome {
                <datalist id="logs-roles">
                    { for Role::ALL.map(|role| html! { <option value={role.word()} /> }) }
                </datalist>
                { for found.files.iter().enumerate().map(|(i, file)| {
                    let name = file.mapping().map_or_else(|| file.name.clone(), |m| m.name.clone());
                    let gone = remove.reform(move |_: MouseEvent| name.clone());
                    html! {
                        <section aria-label={file.name.clone()}>
                            <h3>{ &file.name }</h3>
                            <p>{ file.words() }{ " " }<button type="button" onclick={gone}>{ "Take away" }</button></p>
                            if let Some(mapping) = file.mapping() { { mapped(i, mapping, file.read.is_err(), &view.edit) } }
                        </section>
                    }
                }) }
                { for found.tables.iter().map(table) }
            }
        </div>
    }
}

/// The mapping of a file, each part of which can be changed.
fn mapped(file: usize, mapping: &Mapping, open: bool, edit: &Callback<Edit>) -> Html {
    let keep = {
        let edit = edit.clone();
        move |mapping: &Mapping| edit.emit(Edit::list(Change::Log(Box::new(mapping.kept()))))
    };
    let choice = |label: &'static str,
                  words: &'static [&'static str],
                  now: &'static str,
                  set: fn(&mut Mapping, &str)| {
        let (mapping, keep) = (mapping.clone(), keep.clone());
        let onchange = move |event: Event| {
            let Some(select) = event.target_dyn_into::<HtmlSelectElement>() else { return };
            let mut mapping = mapping.clone();
            set(&mut mapping, &select.value());
            keep(&mapping);
        };
        html! {
            <label>{ label }{ " " }
                <select {onchange}>
                    { for words.iter().map(|word| html! { <option value={*word} selected={*word == now}>{ *word }</option> }) }
                </select>
            </label>
        }
    };
    let rows = mapping.columns.iter().enumerate().map(|(at, (heading, column))| {
        let (mapping, keep) = (mapping.clone(), keep.clone());
        let onchange = move |event: Event| {
            let Some(input) = event.target().and_then(|t| t.dyn_into::<HtmlInputElement>().ok()) else {
                return;
            };
            let (mut mapping, read) = (mapping.clone(), Column::named(input.value().trim()));
            // What cannot be read is marked, and changes nothing.
            input.set_custom_validity(if read.is_some() {
                ""
            } else {
                "As in: date, material, amount in mL"
            });
            input.report_validity();
            if let (Some(read), Some(place)) = (read, mapping.columns.get_mut(at)) {
                place.1 = read;
                keep(&mapping);
            }
        };
        let id = format!("logs-{file}-{at}");
        html! {
            <tr>
                <th scope="row"><label for={id.clone()}>{ heading }</label></th>
                <td><input {id} list="logs-roles" value={column.text()} {onchange} /></td>
            </tr>
        }
    });
    html! {
        <details {open}>
            <summary>{ "How it is read" }</summary>
            <p>
                { choice("As", &Register::WORDS, mapping.register.word(), |m, word| {
                    if let Some(register) = Register::named(word) {
                        let headings: Vec<&str> = m.columns.iter().map(|(heading, _)| heading.as_str()).collect();
                        m.columns = guess_as("", &headings, register).columns;
                        m.register = register;
                    }
                }) }
                { " " }
                { choice("Dates with strokes", &DayOrder::WORDS, mapping.dates.word(), |m, word| m.dates = DayOrder::named(word).unwrap_or_default()) }
                { " " }
                { choice("Decimals", &Decimals::WORDS, mapping.decimals.word(), |m, word| m.decimals = Decimals::named(word).unwrap_or_default()) }
            </p>
            <table class="figures"><thead><tr><th scope="col">{ "Heading" }</th><th scope="col">{ "Read as" }</th></tr></thead>
                <tbody>{ for rows }</tbody></table>
        </details>
    }
}

/// A table of what was found.
fn table(table: &DataTable) -> Html {
    let id = format!("logs-{}", table.key);
    let copied = {
        let id = id.clone();
        move |_: MouseEvent| browser::copy_table(&id, |_| {})
    };
    let more = table.rows.len().saturating_sub(SHOWN);
    html! {
        <details class="sheet" open={table.key == "reconciliation"}>
            <summary>{ table.title }{ format!(" ({})", table.rows.len()) }</summary>
            <div class="scroll" tabindex="0" role="region" aria-label={table.title}>
                <table class="figures" {id}>
                    <caption><span>{ table.title }</span></caption>
                    <thead><tr>{ for table.head.iter().map(|[_, heading]| html! { <th scope="col">{ *heading }</th> }) }</tr></thead>
                    <tbody>{ for table.rows.iter().take(SHOWN).map(|row| html! {
                        <tr>{ for row.iter().map(|cell| html! {
                            <td class={cell.is_number().then_some("num")}>{ cell.shown() }</td>
                        }) }</tr>
                    }) }</tbody>
                </table>
            </div>
            if more > 0 { <p class="hint">{ format!("{more} more rows; the command lists them all.") }</p> }
            { for table.notes.iter().map(|note| html! { <p class="hint">{ note }</p> }) }
            <button type="button" onclick={copied}>{ "Copy for a spreadsheet" }</button>
        </details>
    }
}
