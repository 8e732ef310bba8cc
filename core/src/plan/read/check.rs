//! The check of a tree against the tables of keys: it walks everything and stops at nothing.

use super::super::PLAN_VERSION;
use super::super::keys::{Key, Object, PLAN, Shape, VERSION_KEY};
use super::super::nearest::nearest;
use super::super::path::Path;
use super::super::tree::Node;
use super::Problems;
use crate::order::Index;

/// Longer texts are cut where a sentence quotes them.
const LONGEST_QUOTE: usize = 40;

pub(super) fn plan(tree: &Node, problems: &mut Problems) {
    object(tree, &PLAN, &Path::Root, problems);
}

/// What a value is, in a sentence.
pub(super) fn describe(node: &Node) -> String {
    match node {
        Node::Null => "null".into(),
        Node::YesNo(yes) => format!("{yes}"),
        Node::Number(number) => format!("the number {}", shortened(number)),
        Node::Text(text) => format!("the text {}", quote(text)),
        Node::List(items) if items.is_empty() => "an empty list".into(),
        Node::List(items) => format!("a list of {}", items.len()),
        Node::Map(entries) if entries.is_empty() => "an empty object".into(),
        Node::Map(entries) if entries.len() == 1 => "an object with 1 key".into(),
        Node::Map(entries) => format!("an object with {} keys", entries.len()),
    }
}

/// A text in a sentence, on one line and cut when long.
pub(super) fn quote(text: &str) -> String {
    super::super::print::quoted(&shortened(text))
}

fn shortened(text: &str) -> String {
    match text.char_indices().nth(LONGEST_QUOTE) {
        Some((end, _)) => format!("{}…", text.get(..end).unwrap_or_default()),
        None => text.into(),
    }
}

/// A key in a sentence: as the user wrote it, or as JSON text where that would be hard to read.
fn named(key: &str) -> String {
    let readable = !key.is_empty() && key.trim() == key && !key.chars().any(|c| c.is_control() || c == '`');
    if readable { format!("`{}`", shortened(key)) } else { quote(key) }
}

fn object(node: &Node, table: &Object, path: &Path<'_>, problems: &mut Problems) {
    let Node::Map(entries) = node else {
        problems.error(path, describe(node), format!("{}: an object in braces", table.title));
        return;
    };
    let seen = repeated(entries, path, problems);
    for key in table.keys.iter().filter(|key| key.required && seen.get(key.name).is_none()) {
        // That one has been said, in words of its own.
        if key.name != VERSION_KEY {
            problems.error(&path.key(key.name), format!("`{}` is missing", key.name), wanted(key));
        }
    }
    for (name, value) in entries {
        // Each loop ends here, so that a damaged file of millions of keys does not cost a sentence for each.
        if problems.full {
            return;
        }
        let here = path.key(name);
        match table.keys.iter().find(|key| key.name == name) {
            Some(key) => at_key(value, key, &here, problems),
            None if table.fields_after.is_some() => field(value, &here, problems),
            None => unknown(name, table, &here, problems),
        }
    }
}

/// How often each key is written; more than once is an error.
fn repeated<'n>(entries: &'n [(String, Node)], path: &Path<'_>, problems: &mut Problems) -> Index<'n> {
    let mut seen = Index::default();
    for (name, _) in entries {
        let times = seen.get(name).unwrap_or(0) + 1;
        seen.put(name.as_str(), times);
        if times == 2 {
            problems.error(
                &path.key(name),
                format!("the key {} is written more than once", named(name)),
                "each key once",
            );
        }
    }
    seen
}

fn unknown(name: &str, table: &Object, here: &Path<'_>, problems: &mut Problems) {
    let known = || table.keys.iter().map(|key| key.name);
    let list = known().map(|key| format!("`{key}`")).collect::<Vec<_>>().join(", ");
    let need = match nearest(name, known()) {
        Some(near) => format!("perhaps `{near}`; {} has {list}", table.title),
        None => format!("one of {list}"),
    };
    problems.error(here, format!("the key {} is not one that {} has", named(name), table.title), need);
}

/// What should stand at a key, in a sentence.
fn wanted(key: &Key) -> String {
    if key.example.is_empty() { key.what.into() } else { format!("{}, such as {}", key.what, key.example) }
}

fn at_key(value: &Node, key: &Key, here: &Path<'_>, problems: &mut Problems) {
    let form = match key.shape {
        Shape::Version => {
            if !matches!(value, Node::Number(number) if number.parse::<u64>().is_ok()) {
                problems.error(here, describe(value), format!("the whole number {PLAN_VERSION}"));
            }
            return;
        }
        Shape::Text if matches!(value, Node::Text(_)) => return,
        Shape::Text => "text in quotes",
        Shape::Name => match value {
            Node::Text(name) if name.trim().is_empty() => {
                problems.error(here, "an empty name", wanted(key));
                return;
            }
            Node::Text(_) => return,
            _ => "a name in quotes",
        },
        Shape::Amount if matches!(value, Node::Text(_)) => return,
        Shape::Amount => "an amount in quotes, with its unit",
        Shape::Count if matches!(value, Node::Text(_) | Node::Number(_)) => return,
        Shape::Count => "a number",
        Shape::Word(words) => match value {
            Node::Text(word) if words.contains(&word.as_str()) => return,
            Node::Text(word) => {
                let list = words.iter().map(|word| format!("\"{word}\"")).collect::<Vec<_>>().join(", ");
                let need = match nearest(word, words.iter().copied()) {
                    Some(near) => format!("perhaps \"{near}\"; one of {list}"),
                    None => format!("one of {list}"),
                };
                problems.error(here, describe(value), need);
                return;
            }
            _ => "a word in quotes",
        },
        Shape::YesNo if matches!(value, Node::YesNo(_)) => return,
        Shape::YesNo => "true or false, without quotes",
        Shape::Rows if matches!(value, Node::Map(_)) => return rows(value, here, problems),
        Shape::Rows => "names with their values",
        Shape::Object(table) => return object(value, table, here, problems),
        Shape::Named(table) => match value {
            Node::Map(entries) => {
                repeated(entries, here, problems);
                for (name, value) in entries {
                    if problems.full {
                        return;
                    }
                    let here = here.key(name);
                    if name.trim().is_empty() {
                        problems.error(&here, "an empty name", format!("{} with a name", table.title));
                    }
                    object(value, table, &here, problems);
                }
                return;
            }
            _ => "names with their values",
        },
        Shape::List(table, least) => match value {
            Node::List(items) => {
                if items.len() < least {
                    problems.error(here, describe(value), key.what);
                }
                for (position, item) in items.iter().enumerate() {
                    if problems.full {
                        return;
                    }
                    object(item, table, &here.index(position), problems);
                }
                return;
            }
            _ => "a list in square brackets",
        },
    };
    problems.error(here, describe(value), format!("{form}: {}", wanted(key)));
}

/// A field that is declared elsewhere: any plain value, or names with texts.
fn field(value: &Node, here: &Path<'_>, problems: &mut Problems) {
    match value {
        Node::Text(_) | Node::Number(_) | Node::YesNo(_) => {}
        Node::Map(_) => rows(value, here, problems),
        Node::Null => problems.error(
            here,
            "null",
            "a value; leave the key out where there is none, and write \"not known\" where there is one that nobody knows",
        ),
        Node::List(_) => problems.error(
            here,
            describe(value),
            "one value; or several in braces, each with its name, such as { \"n-hexane\": \"50 %\", \"acetone\": \"50 %\" }",
        ),
    }
}

fn rows(value: &Node, here: &Path<'_>, problems: &mut Problems) {
    let Node::Map(entries) = value else { return };
    repeated(entries, here, problems);
    for (name, value) in entries {
        if problems.full {
            return;
        }
        let here = here.key(name);
        if name.trim().is_empty() {
            problems.error(&here, "an empty name", "a name with its value");
        }
        match value {
            Node::Text(_) => {}
            Node::Number(number) => problems.error(&here, describe(value), {
                let number = shortened(number);
                format!("an amount in quotes, with its unit, such as \"{number} g\" or \"{number} %\"")
            }),
            Node::Null | Node::YesNo(_) | Node::List(_) | Node::Map(_) => {
                problems.error(&here, describe(value), "text in quotes, such as \"10 g\"");
            }
        }
    }
}
