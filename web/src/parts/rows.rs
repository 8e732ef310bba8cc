//! Several materials, each with an amount: a plain table of inputs in the order of the Tab key.
use super::field::{Patience, Said, message, value_of};
use crate::browser;
use crate::edit::{Edit, dom_id};
use crate::form::understood;
use crate::show::unbroken;
use thimbleworth::plan::{Field as Value, Severity, below};
use thimbleworth::quantity::Kind;
use thimbleworth::step::Need;
use wasm_bindgen::JsCast;
use yew::prelude::*;

#[derive(Properties, PartialEq)]
pub(crate) struct Props {
    pub(crate) path: AttrValue,
    pub(crate) label: AttrValue,
    /// What the amount of a row measures.
    pub(crate) kind: Kind,
    /// What the amount of a row is called: "share", "mass".
    pub(crate) amount: AttrValue,
    #[prop_or_default]
    pub(crate) units: AttrValue,
    #[prop_or_default]
    pub(crate) hint: AttrValue,
    #[prop_or_default]
    pub(crate) margin: AttrValue,
    #[prop_or_default]
    pub(crate) echo: AttrValue,
    #[prop_or_default]
    pub(crate) said: Option<Said>,
    #[prop_or_default]
    pub(crate) show_all: bool,
    #[prop_or_default]
    pub(crate) optional: bool,
    /// What a row names.
    #[prop_or(AttrValue::Static("Material"))]
    pub(crate) names: AttrValue,
    pub(crate) rows: Vec<(String, String)>,
    pub(crate) edit: Callback<Edit>,
}

/// The id of a row: that of its path, unless the row has no name of its own yet.
fn row_id(path: &str, rows: &[(String, String)], i: usize) -> String {
    let name = rows.get(i).map_or("", |row| row.0.as_str());
    let unique = !name.is_empty() && rows.iter().filter(|row| row.0 == name).count() == 1;
    dom_id(&if unique { below(path, name) } else { format!("{path}-row-{i}") })
}

#[component]
pub(crate) fn Rows(props: &Props) -> Html {
    let patience = use_state_eq(Patience::default);
    // The id that takes the focus once it is drawn.
    let wanted = use_mut_ref(|| None::<String>);
    {
        let wanted = wanted.clone();
        use_effect(move || {
            if let Some(id) = wanted.borrow_mut().take() {
                browser::focus_on(&id);
            }
        });
    }
    let shown = props.said.as_ref().filter(|_| patience.shows(props.show_all));
    let wrong = shown.is_some_and(|s| s.severity == Severity::Error);
    let id = dom_id(&props.path);
    let (hint, note) = (format!("{id}-hint"), format!("{id}-said"));

    let put = {
        let (edit, path, label) = (props.edit.clone(), props.path.clone(), props.label.clone());
        move |rows: Vec<(String, String)>, place: Option<String>| {
            let value = (!rows.is_empty()).then_some(Value::Rows(rows));
            edit.emit(Edit { place, ..Edit::set(&path, &label, value) });
        }
    };
    let typed = |i: usize, second: bool| {
        let (put, rows, patience, shown) =
            (put.clone(), props.rows.clone(), patience.clone(), shown.is_some());
        let place = format!("{} {i} {second}", props.path);
        Callback::from(move |event: InputEvent| {
            let Some(value) = value_of(&event) else { return };
            let mut rows = rows.clone();
            if let Some(row) = rows.get_mut(i) {
                if second {
                    row.1 = value;
                } else {
                    row.0 = value;
                }
            }
            patience.set(patience.typed(shown));
            put(rows, Some(place.clone()));
        })
    };
    let onblur = {
        let patience = patience.clone();
        Callback::from(move |event: FocusEvent| {
            // From cell to cell is not yet leaving.
            let rows = |target: Option<web_sys::EventTarget>| {
                target?.dyn_into::<web_sys::Element>().ok()?.closest("fieldset").ok().flatten()
            };
            let (from, to) = (rows(event.target()), rows(event.related_target()));
            if to.is_none() || from != to {
                patience.set(patience.gone());
            }
        })
    };
    let remove = |i: usize| {
        let (put, rows, wanted, path, id) =
            (put.clone(), props.rows.clone(), wanted.clone(), props.path.clone(), id.clone());
        Callback::from(move |_: MouseEvent| {
            let mut rows = rows.clone();
            rows.remove(i);
            let next = if i < rows.len() { i } else { rows.len().saturating_sub(1) };
            *wanted.borrow_mut() =
                Some(if rows.is_empty() { format!("{id}-add") } else { row_id(&path, &rows, next) });
            put(rows, None);
        })
    };
    let add = {
        let (put, rows, wanted, path) = (put.clone(), props.rows.clone(), wanted.clone(), props.path.clone());
        Callback::from(move |_: MouseEvent| {
            let mut rows = rows.clone();
            // One material alone has the whole share; the usual next one fills it up.
            rows.push((String::new(), String::new()));
            *wanted.borrow_mut() = Some(row_id(&path, &rows, rows.len() - 1));
            put(rows, None);
        })
    };
    html! {
        <fieldset class={classes!("field", "rows", wrong.then_some("wrong"))} aria-describedby={note.clone()}>
            <legend>
                { &props.label }
                if props.optional { <span class="optional">{ " (optional)" }</span> }
            </legend>
            <div class="ask">
                if !props.hint.is_empty() { <p class="hint" id={hint}>{ unbroken(&props.hint) }</p> }
                if !props.rows.is_empty() {
                    <table class="inputs">
                        <thead>
                            <tr>
                                <th scope="col">{ &props.names }</th>
                                <th scope="col">{ format!("{} ({})", props.amount, props.units) }</th>
                                <th><span class="unseen">{ "Remove" }</span></th>
                            </tr>
                        </thead>
                        <tbody>
                            { for props.rows.iter().enumerate().map(|(i, (name, amount))| {
                                let row = row_id(&props.path, &props.rows, i);
                                let number = i + 1;
                                let read = understood(amount, props.kind, Need::Required);
                                html! {
                                    <tr key={i}>
                                        <td>
                                            <input id={row} type="text" autocomplete="off" spellcheck="false" list={(props.names == "Material").then_some("catalogue")}
                                                aria-label={format!("{}, row {number}, {}", props.label, props.names.to_lowercase())}
                                                value={name.clone()} oninput={typed(i, false)} onblur={&onblur} />
                                        </td>
                                        <td>
                                            <input type="text" autocomplete="off" spellcheck="false"
                                                aria-label={format!("{}, row {number}, {} ({})", props.label, props.amount, props.units)}
                                                title={read}
                                                value={amount.clone()} oninput={typed(i, true)} onblur={&onblur} />
                                        </td>
                                        <td>
                                            <button type="button" class="small" onclick={remove(i)}
                                                aria-label={format!("Remove {} from {}", if name.is_empty() { "the row" } else { name }, props.label)}>
                                                { "Remove" }
                                            </button>
                                        </td>
                                    </tr>
                                }
                            }) }
                        </tbody>
                    </table>
                }
                <button type="button" class="small" id={format!("{id}-add")} onclick={add}
                    aria-label={format!("Add a {} to {}", props.names.to_lowercase(), props.label)}>{ format!("Add a {}", props.names.to_lowercase()) }</button>
            </div>
            <div class="beside">
                { message(note, shown) }
                <p class="echo">{ unbroken(&props.echo) }</p>
                if !props.margin.is_empty() { <p class="margin">{ unbroken(&props.margin) }</p> }
            </div>
        </fieldset>
    }
}
