//! The document before it has a meaning: JSON text as a tree that keeps the order of keys, duplicate keys, and numbers
//! as they were written.

use super::parse::{Fault, parse};

/// A JSON value.
#[derive(Clone, Debug, PartialEq, Eq)]
pub(crate) enum Node {
    /// `null`
    Null,
    /// `true` or `false`
    YesNo(bool),
    /// A number, as it was written.
    Number(String),
    /// A text.
    Text(String),
    /// A list.
    List(Vec<Node>),
    /// An object: keys in the order written, duplicates kept.
    Map(Vec<(String, Node)>),
}

/// Lists and objects within one another beyond this depth are refused; a plan needs eight.
pub(super) const DEEPEST: usize = 64;

/// Text that is not JSON: where, what was found there, what would do.
#[derive(Clone, Debug, PartialEq, Eq)]
pub(crate) struct Malformed {
    pub(crate) line: usize,
    pub(crate) column: usize,
    pub(crate) found: String,
    pub(crate) need: String,
}

/// Reads JSON text as a tree.
pub(crate) fn read(text: &str) -> Result<Node, Malformed> {
    parse(text).map_err(|fault| malformed(text, fault))
}

/// Whether a text is a number as JSON writes it, with no white space around it, and within what a double can hold.
///
/// ```
/// use thimbleworth::plan::is_number;
/// assert!(is_number("-0.10e+2") && !is_number("05") && !is_number(" 5") && !is_number("1e999"));
/// ```
#[must_use]
pub fn is_number(text: &str) -> bool {
    // Compared, because white space around a number is not part of it.
    matches!(parse(text), Ok(Node::Number(read)) if read == text)
}

/// What surrounds the place of an error.
struct Context {
    /// Inside a text between quotes.
    in_text: bool,
    /// Brackets open.
    open: usize,
    /// The last character before the place that is not white space.
    before: Option<char>,
    line: usize,
    column: usize,
}

impl Context {
    fn of(text: &str) -> Self {
        let mut here = Self { in_text: false, open: 0, before: None, line: 1, column: 1 };
        let mut escaped = false;
        for c in text.chars() {
            if here.in_text {
                here.in_text = escaped || c != '"';
                escaped = !escaped && c == '\\';
            } else {
                match c {
                    '"' => here.in_text = true,
                    '{' | '[' => here.open += 1,
                    '}' | ']' => here.open = here.open.saturating_sub(1),
                    _ => {}
                }
            }
            if !c.is_ascii_whitespace() {
                here.before = Some(c);
            }
            if c == '\n' {
                here.line += 1;
                here.column = 1;
            } else {
                here.column += 1;
            }
        }
        here
    }
}

/// The error in words, from what stands at its place and before it.
fn malformed(text: &str, fault: Fault) -> Malformed {
    let (Fault::At(mut at) | Fault::Deep(mut at)) = fault;
    while !text.is_char_boundary(at) {
        at = at.saturating_sub(1);
    }
    let (before, after) = text.split_at_checked(at).unwrap_or((text, ""));
    let here = Context::of(before);
    let (found, need) = match after.chars().next() {
        _ if matches!(fault, Fault::Deep(_)) => (
            format!("more than {DEEPEST} lists and objects within one another"),
            "a plan as documented, which needs eight".to_owned(),
        ),
        None if here.in_text => (
            "the document ends inside a text".to_owned(),
            "the closing quote and the rest of the plan".to_owned(),
        ),
        None => (
            format!(
                "the document ends with {} still open",
                match here.open {
                    0 => "its value".to_owned(),
                    1 => "one bracket".to_owned(),
                    open => format!("{open} brackets"),
                }
            ),
            "the rest of the plan; the file may have been cut short".to_owned(),
        ),
        Some(c) => (format!("{} where it cannot stand in JSON", character(c)), remedy(c, &here).to_owned()),
    };
    Malformed { line: here.line, column: here.column, found, need }
}

fn character(c: char) -> String {
    match c {
        '\n' | '\r' => "a line break".to_owned(),
        '\t' => "a tab".to_owned(),
        '`' => "a backtick".to_owned(),
        c if c.is_control() || c.is_whitespace() || c == '\u{feff}' => {
            format!("the character U+{:04X}", u32::from(c))
        }
        c => format!("`{c}`"),
    }
}

fn remedy(found: char, here: &Context) -> &'static str {
    let after_value =
        here.before.is_some_and(|c| c == '"' || c == '}' || c == ']' || c.is_ascii_alphanumeric());
    if here.in_text {
        return if found.is_ascii_control() {
            "the closing quote on the line where the text starts, or \\n for a line break and \\t for a tab"
        } else {
            "one of \\\" \\\\ \\/ \\b \\f \\n \\r \\t or \\u with four hexadecimal digits (a pair of them for \
             characters beyond U+FFFF); a backslash itself is written \\\\"
        };
    }
    match found {
        '}' | ']' if here.before == Some(',') => "no comma after the last entry",
        '}' | ']' => "the bracket that closes the one last opened, after a complete entry",
        ',' => "one comma between two entries, none before the first and none after the last",
        '\'' | '‘' | '’' | '“' | '”' | '„' => "straight double quotes, \", around keys and texts",
        '/' | '#' => "no comments in JSON; a plan has `notes`, and a step `note`, for them",
        _ if here.open == 0 && after_value => "nothing after the bracket that closes the plan",
        c if c.is_alphabetic() && here.before.is_some_and(|c| c.is_ascii_digit()) => {
            "an amount in double quotes, such as \"250 mL\""
        }
        c if c.is_ascii_digit() || matches!(c, '+' | '-' | '.') => {
            "a number as JSON writes it, such as 0.5 (not .5, 05 or +5) and below 1e308; or a text in double quotes"
        }
        _ if here.before == Some('"') => "a colon between a key and its value, a comma between two entries",
        _ if after_value => "a comma between two entries",
        _ => "a key or a text in double quotes, a number, true, false, { or [",
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn number(text: &str) -> Node {
        Node::Number(text.into())
    }

    #[test]
    fn order_duplicates_and_numbers_are_kept_as_written() {
        let text =
            r#"{"b": 0.10, "a": [1, -0, 1E+2, 12345678901234567890123, "7\"8\\", 5e-1], "b": null, "9": 3}"#;
        let list = vec![number("1"), number("-0"), number("1E+2"), number("12345678901234567890123")]
            .into_iter()
            .chain([Node::Text("7\"8\\".into()), number("5e-1")]);
        assert_eq!(
            read(text).unwrap(),
            Node::Map(vec![
                ("b".into(), number("0.10")),
                ("a".into(), Node::List(list.collect())),
                ("b".into(), Node::Null),
                ("9".into(), number("3")),
            ])
        );
    }

    #[test]
    fn the_place_and_the_remedy_of_common_slips() {
        let cases = [
            ("{\"a\": 1,}", 1, 9, "`}`", "no comma after the last"),
            ("{\n  \"a\": 1\n  \"b\": 2\n}", 3, 3, "`\"`", "a comma between"),
            ("{\"a\": 'x'}", 1, 7, "`'`", "straight double quotes"),
            ("{\"a\": “x”}", 1, 7, "`“`", "straight double quotes"),
            ("{\"é\": 250 mL}", 1, 11, "`m`", "an amount in double quotes"),
            ("{\"a\": \"x\" \"b\": 2}", 1, 11, "`\"`", "a colon between"),
            ("{\"a\": .5}", 1, 7, "`.`", "a number as JSON"),
            ("{\"a\": 05}", 1, 8, "`5`", "a number as JSON"),
            ("{\"a\": 1} // x", 1, 10, "`/`", "no comments"),
            ("{\"a\": 1} {", 1, 10, "`{`", "nothing after"),
            ("{\"a\": \"x\ny\"}", 1, 9, "a line break", "the closing quote"),
            ("{\"a\": \"\\q\"}", 1, 9, "`q`", "one of"),
            ("{\"a\": NaN}", 1, 7, "`N`", "a key or a text"),
            ("{a: 1}", 1, 2, "`a`", "a key or a text"),
            ("{\"a\": [1, 2}", 1, 12, "`}`", "the bracket"),
            ("{\"a\" 1}", 1, 6, "`1`", ""),
            ("{\"a\": \"x", 1, 9, "the document ends inside", "the closing quote"),
            ("{\"a\": [", 1, 8, "the document ends with 2 brackets", "the rest"),
            ("{\"a\": 1e999}", 1, 11, "`9`", "a number as JSON"),
        ];
        for (text, line, column, found, need) in cases {
            let error = read(text).unwrap_err();
            assert_eq!((error.line, error.column), (line, column), "{text}: {error:?}");
            assert!(error.found.starts_with(found) && error.need.starts_with(need), "{text}: {error:?}");
        }
    }

    #[test]
    fn depth_has_a_limit() {
        let nested = |depth: usize| format!("{}{}", "[".repeat(depth), "]".repeat(depth));
        assert!(read(&nested(DEEPEST)).is_ok());
        for depth in [DEEPEST + 1, 127, 128, 129, 1_000_000] {
            assert!(read(&nested(depth)).unwrap_err().found.starts_with("more than 64"), "{depth}");
        }
    }
}
