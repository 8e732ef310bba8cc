//! Fields that are made of declarations: those of a technique, of the site, of a route, of a room and of a material.
use super::View;
use super::question::options;
use crate::form::{left_out, margin, places, rows_of, text_of, understood, units};
use crate::parts::{Ask, Field, Options, Rows, said};
use thimbleworth::plan::{Field as Value, below};
use thimbleworth::program::Fields;
use thimbleworth::quantity::{Kind, read};
use thimbleworth::step::{Control, Need, Param};
use yew::prelude::*;

/// Where mass may go, as the words of a choice.
pub(super) fn choices(view: &View, left_out: &str) -> Options {
    let places = places(view.plan());
    let words: Vec<&str> = places.iter().map(String::as_str).collect();
    options(left_out, &words)
}

/// The units that a label names; money in the plan's own currency.
fn named_units(view: &View, kind: Kind) -> String {
    let units = units(kind);
    let mut money = view.plan().site.money.iter().filter(|(key, _)| kind.is_money() && key == "currency");
    match money.next() {
        Some((_, Value::Text(code))) => units.replace("USD", code).replace("EUR", code),
        _ => units,
    }
}

/// All fields of a declared group below `path`; `value` is what stands under a key.
pub(super) fn group(view: &View, path: &str, group: &Fields, value: &dyn Fn(&str) -> Option<Value>) -> Html {
    let path = if group.0.is_empty() { path.to_owned() } else { below(path, group.0) };
    group.2.iter().map(|p| field(view, &path, p, value(p.key).as_ref())).collect()
}

/// The field of one parameter below `path`.
pub(super) fn field(view: &View, path: &str, p: &'static Param, field: Option<&Value>) -> Html {
    let at = below(path, p.key);
    let value = text_of(field);
    let said = said(&view.reckoned.problems, &at);
    let show_all = view.show_all;
    let optional = p.need == Need::Optional;
    let blank = if field.is_none() { left_out(p.need) } else { String::new() };
    let first = match p.need {
        Need::Default(text, _) => format!("{} (assumed)", crate::form::word(text)),
        Need::Optional => "left out".to_owned(),
        Need::Required => "choose".to_owned(),
    };
    let (ask, units, echo) = match p.control {
        Control::Mixture | Control::PerMaterial(_) | Control::PerStream(_) => {
            let (kind, amount) = match p.control {
                Control::PerMaterial(Kind::Fraction) | Control::PerStream(Kind::Fraction) => {
                    (Kind::Fraction, "share")
                }
                Control::PerMaterial(kind) | Control::PerStream(kind) => {
                    (kind, if kind.is_money() { "price" } else { "amount" })
                }
                _ => (Kind::Fraction, "share, v/v unless w/w is said"),
            };
            let names = if matches!(p.control, Control::PerStream(_)) { "Stream" } else { "Material" };
            let rows = rows_of(field);
            let echo = if blank.is_empty() { rows_words(&rows, kind) } else { blank };
            return html! {
                <Rows key={p.key} label={p.label} {names} {kind} {amount} units={named_units(view, kind)} hint={p.hint} margin={margin(p)} {echo}
                    {rows} {said} {show_all} {optional} path={at} edit={view.edit.clone()} />
            };
        }
        Control::Quantity(Kind::Number) => {
            (Ask::Number, String::new(), understood(&value, Kind::Number, p.need))
        }
        Control::Quantity(kind) => {
            (Ask::Amount(kind), named_units(view, kind), understood(&value, kind, p.need))
        }
        Control::Count => (Ask::Number, String::new(), blank),
        Control::Choice(words) => (Ask::Choice(options(&first, words)), String::new(), blank),
        Control::Place => (Ask::Choice(choices(view, &first)), String::new(), blank),
        Control::YesNo => (Ask::YesNo(first.into()), String::new(), blank),
        Control::Material => (Ask::Material, String::new(), blank),
        Control::Text => (Ask::Text, String::new(), blank),
    };
    html! {
        <Field key={p.key} label={p.label} {units} hint={p.hint} margin={margin(p)} {echo} {said} {show_all} {optional} {value} {ask}
            path={at} edit={view.edit.clone()} />
    }
}

/// What was understood of the rows of a mixture.
fn rows_words(rows: &[(String, String)], kind: Kind) -> String {
    let read: Vec<String> = rows
        .iter()
        .filter_map(|(name, amount)| {
            let amount = read(amount, kind).ok()?;
            Some(format!("{name} {}", amount.understood()))
        })
        .collect();
    if read.is_empty() { String::new() } else { format!("Read as {}.", read.join(", ")) }
}
