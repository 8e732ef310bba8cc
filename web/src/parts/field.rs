//! One field: label with its unit, hint, control, and beside it what was understood, what is wrong, and where the usual
//! range comes from. The margin beside the control has room for all of it, so that nothing moves while someone types.
use crate::edit::{Edit, dom_id, lowered, number, text};
use crate::form::{problem_at, sentence};
use crate::show::unbroken;
use std::rc::Rc;
use thimbleworth::plan::{Field as Value, Problem, Severity};
use thimbleworth::quantity::{Kind, in_unit};
use yew::prelude::*;

/// The words of a choice: value and what is shown.
pub(crate) type Options = Rc<[(AttrValue, AttrValue)]>;

/// How a field is asked for.
#[derive(Clone, Debug, PartialEq)]
pub(crate) enum Ask {
    /// Any text.
    Text,
    /// An amount with its unit. No keypad is asked for: it would have no letters for the unit.
    Amount(Kind),
    /// A plain number, held bare in the plan where it can be.
    Number,
    /// Several lines.
    Area,
    /// The name of a material, with the catalogue's names offered.
    Material,
    /// One of several.
    Choice(Options),
    /// Yes or no, or left out with these words.
    YesNo(AttrValue),
}

/// What is said at a field.
#[derive(Clone, Debug, PartialEq)]
pub(crate) struct Said {
    pub(crate) severity: Severity,
    pub(crate) text: AttrValue,
    pub(crate) path: AttrValue,
}

/// What is to be said at a path.
pub(crate) fn said(problems: &[Problem], path: &str) -> Option<Said> {
    problem_at(problems, path).map(|p| Said {
        severity: p.severity,
        text: sentence(p).into(),
        path: p.path.clone().into(),
    })
}

#[derive(Properties, PartialEq)]
pub(crate) struct Props {
    pub(crate) path: AttrValue,
    pub(crate) label: AttrValue,
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
    pub(crate) value: AttrValue,
    #[prop_or(Ask::Text)]
    pub(crate) ask: Ask,
    pub(crate) edit: Callback<Edit>,
}

/// Whether something wrong is shown: only after a field has been left, and gone as soon as it is mended.
#[derive(Clone, Copy, Default, PartialEq)]
pub(crate) struct Patience {
    typing: bool,
    left: bool,
}

impl Patience {
    pub(crate) fn shows(self, show_all: bool) -> bool {
        (show_all || self.left) && !self.typing
    }
    /// After a stroke: what was shown goes on being shown, what is new waits.
    pub(crate) fn typed(self, shown: bool) -> Self {
        Self { typing: !shown, ..self }
    }
    pub(crate) fn gone(self) -> Self {
        Self { typing: false, left: true }
    }
}

/// The message of a problem, with words and a sign beside the colour.
pub(crate) fn message(id: String, said: Option<&Said>) -> Html {
    html! {
        <p id={id} class={classes!("said", said.map(|s| if s.severity == Severity::Error { "wrong" } else { "doubt" }))}>
            if let Some(said) = said {
                if said.severity == Severity::Error {
                    <span class="sign" aria-hidden="true">{ "✕" }</span><span class="unseen">{ "Error: " }</span>
                } else {
                    <span class="sign" aria-hidden="true">{ "?" }</span><span class="unseen">{ "Warning: " }</span>
                }
                { unbroken(&said.text) }
            }
        </p>
    }
}

/// The value of whatever control an event comes from.
pub(crate) fn value_of(event: &Event) -> Option<String> {
    if let Some(input) = event.target_dyn_into::<web_sys::HtmlInputElement>() {
        return Some(input.value());
    }
    if let Some(area) = event.target_dyn_into::<web_sys::HtmlTextAreaElement>() {
        return Some(area.value());
    }
    event.target_dyn_into::<web_sys::HtmlSelectElement>().map(|select| select.value())
}

fn read(ask: &Ask, value: &str) -> Option<Value> {
    match ask {
        Ask::Number => number(value),
        Ask::YesNo(_) => match value {
            "true" => Some(Value::YesNo(true)),
            "false" => Some(Value::YesNo(false)),
            _ => None,
        },
        Ask::Text | Ask::Amount(_) | Ask::Area | Ask::Material | Ask::Choice(_) => text(value),
    }
}

/// The unit in which an amount is written, and the others that its label lists: choosing one writes the amount again in
/// it and says so. Nothing where there is no amount to write again.
fn unit_choice(props: &Props, kind: Kind, converted: &UseStateHandle<AttrValue>) -> Html {
    let units: Vec<&str> = props.units.split(", ").collect();
    let written = units.iter().filter(|u| props.value.trim_end().ends_with(**u)).max_by_key(|u| u.len());
    let Some(written) = written.filter(|u| units.len() > 1 && in_unit(&props.value, kind, u).is_some())
    else {
        return Html::default();
    };
    let onchange = {
        let (edit, path, label) = (props.edit.clone(), props.path.clone(), props.label.clone());
        let (value, converted) = (props.value.clone(), converted.clone());
        Callback::from(move |event: Event| {
            let Some(text) = value_of(&event).and_then(|unit| in_unit(&value, kind, &unit)) else { return };
            converted.set(format!("{value} is {text}.").into());
            // An action of its own, so that undo gives back what was typed.
            edit.emit(Edit {
                place: None,
                ..Edit::set(&path, &format!("unit of {}", lowered(&label)), Some(Value::Text(text)))
            });
        })
    };
    html! {
        <>
            <select class="unit" aria-label={format!("Unit of {}", lowered(&props.label))} {onchange}>
                { for units.iter().map(|u| html! { <option value={(*u).to_owned()} selected={u == written}>{ *u }</option> }) }
            </select>
            <span class="unseen" aria-live="polite">{ &**converted }</span>
        </>
    }
}

#[component]
pub(crate) fn Field(props: &Props) -> Html {
    let patience = use_state_eq(Patience::default);
    let shown = props.said.as_ref().filter(|_| patience.shows(props.show_all));
    let wrong = shown.is_some_and(|s| s.severity == Severity::Error);
    let typed = {
        let (patience, shown) = (patience.clone(), shown.is_some());
        let (edit, path, label, ask) =
            (props.edit.clone(), props.path.clone(), props.label.clone(), props.ask.clone());
        move |value: String| {
            patience.set(patience.typed(shown));
            edit.emit(Edit::set(&path, &label, read(&ask, &value)));
        }
    };
    let oninput = {
        let typed = typed.clone();
        Callback::from(move |event: InputEvent| {
            if let Some(value) = value_of(&event) {
                typed(value);
            }
        })
    };
    let onchange = Callback::from(move |event: Event| {
        if let Some(value) = value_of(&event) {
            typed(value);
        }
    });
    let onblur = Callback::from(move |_: FocusEvent| patience.set(patience.gone()));
    let converted = use_state_eq(AttrValue::default);

    let id = dom_id(&props.path);
    let (hint, note) = (format!("{id}-hint"), format!("{id}-said"));
    let described = if props.hint.is_empty() { note.clone() } else { format!("{hint} {note}") };
    let invalid = wrong.then_some("true");
    let value = props.value.clone();
    let select = |options: Vec<Html>| {
        html! {
            <select id={id.clone()} aria-describedby={described.clone()} aria-invalid={invalid} {onchange} onblur={&onblur}>
                { for options }
            </select>
        }
    };
    let option = |word: &str, shown: &str| {
        html! {
            <option value={word.to_owned()} selected={*word == *value}>{ shown }</option>
        }
    };
    let control = match &props.ask {
        Ask::Area => html! {
            <textarea id={id.clone()} rows="3" aria-describedby={described} aria-invalid={invalid} {value} {oninput} {onblur} />
        },
        Ask::Choice(options) => {
            let strange = !options.iter().any(|(word, _)| *word == value);
            let mut drawn: Vec<Html> = options.iter().map(|(word, shown)| option(word, shown)).collect();
            if strange {
                drawn.push(option(&value, &value));
            }
            select(drawn)
        }
        Ask::YesNo(left_out) => select(
            [("", &**left_out), ("true", "yes"), ("false", "no")].iter().map(|(w, s)| option(w, s)).collect(),
        ),
        Ask::Text | Ask::Amount(_) | Ask::Number | Ask::Material => html! {
            <input id={id.clone()} type="text" autocomplete="off" spellcheck="false"
                inputmode={(props.ask == Ask::Number).then_some("decimal")}
                list={(props.ask == Ask::Material).then_some("catalogue")}
                aria-describedby={described} aria-invalid={invalid} {value} {oninput} {onblur} />
        },
    };
    let unit = match props.ask {
        Ask::Amount(kind) => unit_choice(props, kind, &converted),
        _ => Html::default(),
    };
    html! {
        <div class={classes!("field", (!props.units.is_empty()).then_some("reads"), wrong.then_some("wrong"))}>
            <div class="ask">
                <label for={id.clone()}>
                    { &props.label }
                    if !props.units.is_empty() { <span class="unit">{ format!(" ({})", props.units) }</span> }
                    if props.optional { <span class="optional">{ " (optional)" }</span> }
                </label>
                if !props.hint.is_empty() { <p class="hint" id={hint}>{ unbroken(&props.hint) }</p> }
                <div class="control">{ control }{ unit }</div>
            </div>
            <div class="beside">
                { message(note, shown) }
                <p class="echo">{ unbroken(&props.echo) }</p>
                if !props.margin.is_empty() { <p class="margin">{ unbroken(&props.margin) }</p> }
            </div>
        </div>
    }
}
