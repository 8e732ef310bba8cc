//! The plan's JSON Schema (draft 2020-12), from the tables of keys that the reader checks by and from what the
//! techniques declare.

use crate::quantity::Kind;
use crate::step::{Control, Measurable, Need, Param, Rule};

use super::PLAN_VERSION;
use super::keys::{Key, Object, PLAN, STEP, Shape};
use super::print::print;
use super::tree::{self, Node};

/// What the schema needs to know of a technique.
#[derive(Clone, Copy, Debug)]
pub struct TechniqueShape {
    /// The word that stands at `step`.
    pub key: &'static str,
    /// Its title.
    pub title: &'static str,
    /// Its parameters.
    pub params: &'static [Param],
    /// Its rules; the measurable ones may be named under `measured`.
    pub rules: &'static [Rule],
}

/// The JSON Schema of a plan whose steps are of these techniques. The same techniques always give the same bytes.
///
/// An editor that knows JSON Schema completes keys and marks unknown, missing and wrongly typed ones by it. It cannot
/// hold everything that the reader checks: names that refer to one another, units and bounds of amounts, and keys
/// written twice are beyond it.
///
/// ```
/// let schema = thimbleworth::plan::schema(&[]);
/// assert!(schema.contains("\"title\": \"Thimbleworth plan, version 1\""));
/// ```
#[must_use]
pub fn schema(techniques: &[TechniqueShape]) -> String {
    let mut out = vec![
        entry("$schema", text("https://json-schema.org/draft/2020-12/schema")),
        entry("title", text(&format!("Thimbleworth plan, version {PLAN_VERSION}"))),
    ];
    out.extend(object(&PLAN));
    let mut shared = vec![entry("step", step(techniques))];
    for technique in techniques {
        shared.push(entry(&definition(technique), fields(technique)));
    }
    out.push(entry("$defs", Node::Map(shared)));
    print(&Node::Map(out))
}

type Entry = (String, Node);

fn entry(key: &str, value: Node) -> Entry {
    (key.to_owned(), value)
}

fn text(text: &str) -> Node {
    Node::Text(text.to_owned())
}

fn texts<'a>(items: impl Iterator<Item = &'a str>) -> Node {
    Node::List(items.map(text).collect())
}

fn typed(name: &str) -> Entry {
    entry("type", text(name))
}

fn number_or_text() -> Entry {
    entry("type", texts(["number", "string"].into_iter()))
}

/// A text that is not empty.
fn not_blank() -> Entry {
    entry("pattern", text("\\S"))
}

/// An object of names of the user's own.
fn named(value: Vec<Entry>) -> Vec<Entry> {
    vec![
        typed("object"),
        entry("propertyNames", Node::Map(vec![not_blank()])),
        entry("additionalProperties", Node::Map(value)),
    ]
}

fn object(table: &Object) -> Vec<Entry> {
    let mut out = vec![typed("object")];
    let required = table.keys.iter().filter(|key| key.required).map(|key| key.name);
    if required.clone().next().is_some() {
        out.push(entry("required", texts(required)));
    }
    out.push(entry("properties", Node::Map(table.keys.iter().map(property).collect())));
    out.push(match table.fields_after {
        None => entry("additionalProperties", Node::YesNo(false)),
        Some(_) => entry("additionalProperties", Node::Map(field())),
    });
    out
}

/// A field that is declared elsewhere.
fn field() -> Vec<Entry> {
    vec![
        entry("type", texts(["string", "number", "boolean", "object"].into_iter())),
        entry("additionalProperties", Node::Map(vec![typed("string")])),
    ]
}

fn property(key: &Key) -> Entry {
    let mut out = vec![entry("description", text(key.what))];
    out.extend(match key.shape {
        Shape::Version => {
            vec![typed("integer"), entry("const", Node::Number(PLAN_VERSION.to_string()))]
        }
        Shape::Text | Shape::Amount => vec![typed("string")],
        Shape::Name => vec![typed("string"), not_blank()],
        Shape::Count => vec![number_or_text()],
        Shape::Word(words) => vec![entry("enum", texts(words.iter().copied()))],
        Shape::YesNo => vec![typed("boolean")],
        Shape::Rows => named(vec![typed("string")]),
        Shape::Object(table) => object(table),
        Shape::Named(table) => named(object(table)),
        Shape::List(table, least) => {
            let mut list = vec![typed("array")];
            if least > 0 {
                list.push(entry("minItems", Node::Number(least.to_string())));
            }
            // The steps stand apart, because each technique has fields of its own.
            let item = if table.title == STEP.title {
                vec![entry("$ref", text("#/$defs/step"))]
            } else {
                object(table)
            };
            list.push(entry("items", Node::Map(item)));
            list
        }
    });
    if let Ok(example) = tree::read(key.example) {
        out.push(entry("examples", Node::List(vec![example])));
    }
    (key.name.to_owned(), Node::Map(out))
}

fn definition(technique: &TechniqueShape) -> String {
    format!("step-{}", technique.key)
}

/// Any step: the technique's name decides which fields it has.
fn step(techniques: &[TechniqueShape]) -> Node {
    let mut out = vec![
        typed("object"),
        entry("required", texts(["step"].into_iter())),
        entry(
            "properties",
            Node::Map(vec![entry(
                "step",
                Node::Map(vec![entry("enum", texts(techniques.iter().map(|technique| technique.key)))]),
            )]),
        ),
    ];
    let choice = |technique: &TechniqueShape| {
        let is = Node::Map(vec![entry("const", text(technique.key))]);
        let then = text(&format!("#/$defs/{}", definition(technique)));
        Node::Map(vec![
            // Without `required` a step that says no technique would be taken for each of them.
            entry(
                "if",
                Node::Map(vec![
                    entry("required", texts(["step"].into_iter())),
                    entry("properties", Node::Map(vec![entry("step", is)])),
                ]),
            ),
            entry("then", Node::Map(vec![entry("$ref", then)])),
        ])
    };
    if !techniques.is_empty() {
        out.push(entry("allOf", Node::List(techniques.iter().map(choice).collect())));
    }
    Node::Map(out)
}

/// The fields of one technique, between those that every step has.
fn fields(technique: &TechniqueShape) -> Node {
    let common = |key: &Key| match key.name {
        "step" => entry("step", Node::Map(vec![entry("const", text(technique.key))])),
        "measured" => entry("measured", measured(key, technique.rules)),
        _ => property(key),
    };
    let (before, after) = STEP.keys.split_at(STEP.fields_after.unwrap_or_default());
    let properties = before.iter().map(common).chain(technique.params.iter().map(parameter));
    let properties = properties.chain(after.iter().map(common)).collect();
    // A parameter that is asked for only beside another's value is not required as such.
    let needed = technique.params.iter().filter(|p| p.need == Need::Required && p.shown_when.is_none());
    Node::Map(vec![
        entry("title", text(technique.title)),
        typed("object"),
        entry("required", texts(["step"].into_iter().chain(needed.map(|param| param.key)))),
        entry("properties", Node::Map(properties)),
        entry("additionalProperties", Node::YesNo(false)),
    ])
}

fn measured(key: &Key, rules: &[Rule]) -> Node {
    let open = rules.iter().filter(|rule| rule.measurable != Measurable::No);
    let property = |rule: &Rule| {
        entry(rule.name, Node::Map(vec![entry("description", text(rule.equation)), typed("string")]))
    };
    Node::Map(vec![
        entry("description", text(key.what)),
        typed("object"),
        entry("properties", Node::Map(open.map(property).collect())),
        entry("additionalProperties", Node::YesNo(false)),
    ])
}

fn parameter(param: &Param) -> Entry {
    let mut description = param.hint.to_owned();
    if let Some((key, values)) = param.shown_when {
        let space = if description.is_empty() { "" } else { " " };
        description.push_str(&format!("{space}Only where `{key}` is {}.", values.join(" or ")));
    }
    let mut out = vec![entry("title", text(param.label))];
    if !description.is_empty() {
        out.push(entry("description", text(&description)));
    }
    match param.control {
        // These have no unit, so a bare number says all.
        Control::Quantity(Kind::Fraction | Kind::Count | Kind::Number) | Control::Count => {
            out.push(number_or_text());
        }
        Control::Quantity(_) | Control::Material | Control::Place | Control::Text => {
            out.push(typed("string"));
        }
        Control::Choice(words) => out.push(entry("enum", texts(words.iter().copied()))),
        Control::Mixture => {
            out.push(entry("type", texts(["string", "object"].into_iter())));
            out.push(entry("additionalProperties", Node::Map(vec![typed("string")])));
        }
        Control::PerMaterial(_) | Control::PerStream(_) => out.extend(named(vec![typed("string")])),
        Control::YesNo => out.push(typed("boolean")),
    }
    if let Need::Default(words, _) = param.need {
        let default = match (param.control, words) {
            (Control::YesNo, "true" | "yes") => Node::YesNo(true),
            (Control::YesNo, "false" | "no") => Node::YesNo(false),
            _ => text(words),
        };
        out.push(entry("default", default));
    }
    (param.key.to_owned(), Node::Map(out))
}

#[cfg(test)]
mod tests {
    use super::super::keys::ALL;
    use super::super::open;
    use super::*;
    use std::collections::BTreeSet;

    #[test]
    fn examples_are_json_of_the_right_shape_and_keys_are_declared_once() {
        for table in ALL {
            let keys: BTreeSet<&str> = table.keys.iter().map(|key| key.name).collect();
            assert_eq!(keys.len(), table.keys.len(), "{}", table.title);
            for key in table.keys {
                assert!(!key.what.is_empty() && !key.what.ends_with('.'), "{}", key.name);
                if key.example.is_empty() {
                    assert!(matches!(key.shape, Shape::List(..)), "{} has no example", key.name);
                    continue;
                }
                let example = tree::read(key.example).unwrap();
                let fits = match key.shape {
                    Shape::Word(words) => {
                        matches!(&example, Node::Text(word) if words.contains(&word.as_str()))
                    }
                    Shape::Version | Shape::Count => matches!(example, Node::Number(_)),
                    Shape::Text | Shape::Name | Shape::Amount => matches!(example, Node::Text(_)),
                    Shape::YesNo => matches!(example, Node::YesNo(_)),
                    Shape::Rows | Shape::Object(_) | Shape::Named(_) => matches!(example, Node::Map(_)),
                    Shape::List(..) => matches!(example, Node::List(_)),
                };
                assert!(fits, "{}", key.name);
            }
        }
    }

    #[test]
    fn the_examples_of_the_tables_make_a_plan_without_a_problem() {
        fn filled(table: &Object) -> String {
            let value = |key: &Key| match key.shape {
                Shape::List(inner, _) if key.example.is_empty() => format!("[{}]", filled(inner)),
                _ => key.example.to_owned(),
            };
            let keys: Vec<String> =
                table.keys.iter().map(|key| format!("\"{}\": {}", key.name, value(key))).collect();
            format!("{{{}}}", keys.join(", "))
        }
        assert_eq!(open(&filled(&PLAN)).problems, []);
    }
}
