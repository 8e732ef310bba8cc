//! Writing a tree as text: the same tree always gives the same bytes.

use std::fmt::Write as _;

use super::tree::Node;

/// An object of plain values stands on one line when it ends before this column.
const WIDTH: usize = 110;

/// The text of a tree: two spaces a level, LF, a final newline. An object or a list that holds only plain values
/// stands on one line where it fits.
pub(super) fn print(node: &Node) -> String {
    let mut out = String::new();
    value(node, 0, 0, &mut out);
    out.push('\n');
    out
}

/// A text as JSON writes it, with its quotes.
pub(super) fn quoted(text: &str) -> String {
    let mut out = String::with_capacity(text.len() + 2);
    quote(text, &mut out);
    out
}

/// Writes a text as JSON writes it, with its quotes.
pub(crate) fn quote(text: &str, out: &mut String) {
    out.push('"');
    for c in text.chars() {
        match c {
            '"' => out.push_str("\\\""),
            '\\' => out.push_str("\\\\"),
            '\n' => out.push_str("\\n"),
            '\r' => out.push_str("\\r"),
            '\t' => out.push_str("\\t"),
            // Control characters must be escaped; U+2028 and U+2029 need not be, but editors take them for line ends.
            '\0'..='\x1f' | '\x7f'..='\u{9f}' | '\u{2028}' | '\u{2029}' => {
                // Writing to a String cannot fail.
                let _ = write!(out, "\\u{:04x}", u32::from(c));
            }
            _ => out.push(c),
        }
    }
    out.push('"');
}

fn value(node: &Node, indent: usize, column: usize, out: &mut String) {
    if let Some(plain) = plain(node) {
        out.push_str(&plain);
        return;
    }
    if let Some(line) = on_one_line(node, WIDTH.saturating_sub(column)) {
        out.push_str(&line);
        return;
    }
    let inner = indent + 2;
    match node {
        Node::List(items) => {
            out.push('[');
            for (i, item) in items.iter().enumerate() {
                next_line(i > 0, inner, out);
                value(item, inner, inner, out);
            }
            next_line(false, indent, out);
            out.push(']');
        }
        Node::Map(entries) => {
            out.push('{');
            for (i, (key, item)) in entries.iter().enumerate() {
                next_line(i > 0, inner, out);
                let key = quoted(key);
                out.push_str(&key);
                out.push_str(": ");
                value(item, inner, inner + key.chars().count() + 2, out);
            }
            next_line(false, indent, out);
            out.push('}');
        }
        Node::Null | Node::YesNo(_) | Node::Number(_) | Node::Text(_) => {}
    }
}

fn next_line(comma: bool, indent: usize, out: &mut String) {
    if comma {
        out.push(',');
    }
    out.push('\n');
    out.extend(std::iter::repeat_n(' ', indent));
}

fn plain(node: &Node) -> Option<String> {
    match node {
        Node::Null => Some("null".into()),
        Node::YesNo(yes) => Some(if *yes { "true" } else { "false" }.into()),
        Node::Number(number) => Some(number.clone()),
        Node::Text(text) => Some(quoted(text)),
        Node::List(items) if items.is_empty() => Some("[]".into()),
        Node::Map(entries) if entries.is_empty() => Some("{}".into()),
        Node::List(_) | Node::Map(_) => None,
    }
}

/// The list or object on one line, if it holds only plain values and takes no more than `room` characters, with one
/// kept for the comma after it.
fn on_one_line(node: &Node, room: usize) -> Option<String> {
    let mut out = String::new();
    let mut used = 0;
    let mut put = |part: &str, out: &mut String| {
        used += part.chars().count();
        out.push_str(part);
        used < room
    };
    let end = match node {
        Node::List(items) => {
            put("[", &mut out);
            for (i, item) in items.iter().enumerate() {
                let part = plain(item)?;
                let fits = put(if i > 0 { ", " } else { "" }, &mut out) && put(&part, &mut out);
                if !fits {
                    return None;
                }
            }
            "]"
        }
        Node::Map(entries) => {
            put("{ ", &mut out);
            for (i, (key, item)) in entries.iter().enumerate() {
                let part = plain(item)?;
                let fits = put(if i > 0 { ", " } else { "" }, &mut out)
                    && put(&quoted(key), &mut out)
                    && put(": ", &mut out)
                    && put(&part, &mut out);
                if !fits {
                    return None;
                }
            }
            " }"
        }
        Node::Null | Node::YesNo(_) | Node::Number(_) | Node::Text(_) => return None,
    };
    put(end, &mut out).then_some(out)
}

#[cfg(test)]
mod tests {
    use super::super::tree;
    use super::*;

    #[test]
    fn texts_that_could_break_a_page_or_a_line_come_back_as_they_were() {
        let hostile = "\0\u{1}\u{1f}\"\\/\u{8}\u{c}\n\r\t\u{7f}\u{85}\u{2028}\u{2029}🧪 é </script><!-- \u{feff}\u{fffd}";
        let text = quoted(hostile);
        assert!(!text.chars().any(char::is_control));
        assert_eq!(serde_json::from_str::<String>(&text).unwrap(), hostile);
    }

    #[test]
    fn short_objects_stand_on_one_line_and_long_ones_do_not() {
        let short = r#"{"a": {"b": "c", "d": [1, true, null]}, "e": {}, "f": []}"#;
        let printed = print(&tree::read(short).unwrap());
        assert_eq!(
            printed,
            "{\n  \"a\": {\n    \"b\": \"c\",\n    \"d\": [1, true, null]\n  },\n  \"e\": {},\n  \"f\": []\n}\n"
        );
        for length in 80..120 {
            let node = Node::Map(vec![
                ("key".into(), Node::Map(vec![("inner".into(), Node::Text("é".repeat(length)))])),
                ("list".into(), Node::List(vec![Node::Text("é".repeat(length))])),
            ]);
            let printed = print(&node);
            for line in printed.lines() {
                let alone =
                    line.trim_start().starts_with("\"inner\"") || line.trim_start().starts_with("\"é");
                assert!(alone || line.chars().count() <= WIDTH, "{line}");
            }
        }
    }
}
