//! JSON text as a tree, in one pass over its bytes: RFC 8259, with the order of keys, duplicate keys and numbers kept as
//! they were written.

use super::tree::{DEEPEST, Node};
use crate::quantity::nearest;

/// Why a text is no JSON, and the byte at which that shows; the length of the text where it ends too early.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Fault {
    /// What stands there cannot stand there.
    At(usize),
    /// Lists and objects within one another beyond [`DEEPEST`].
    Deep(usize),
}

/// Reads a whole text.
pub(super) fn parse(text: &str) -> Result<Node, Fault> {
    let mut reader = Reader { text, at: 0 };
    let node = reader.value(0)?;
    match reader.next() {
        None => Ok(node),
        Some(_) => reader.fault(),
    }
}

/// The JSON text in quotes with which this text starts, and what follows it.
pub(super) fn leading_text(text: &str) -> Option<(String, &str)> {
    let mut reader = Reader { text, at: 0 };
    let read = (reader.byte() == Some(b'"')).then(|| reader.quoted().ok()).flatten()?;
    Some((read, text.get(reader.at..)?))
}

struct Reader<'t> {
    text: &'t str,
    at: usize,
}

impl<'t> Reader<'t> {
    fn byte(&self) -> Option<u8> {
        self.text.as_bytes().get(self.at).copied()
    }

    fn fault<T>(&self) -> Result<T, Fault> {
        Err(Fault::At(self.at))
    }

    /// The next byte that is no white space, without taking it.
    fn next(&mut self) -> Option<u8> {
        while matches!(self.byte(), Some(b' ' | b'\t' | b'\n' | b'\r')) {
            self.at += 1;
        }
        self.byte()
    }

    fn value(&mut self, depth: usize) -> Result<Node, Fault> {
        match self.next() {
            Some(b'"') => Ok(Node::Text(self.quoted()?)),
            Some(b'{' | b'[') if depth == DEEPEST => Err(Fault::Deep(self.at)),
            Some(b'{') => self.map(depth + 1),
            Some(b'[') => self.list(depth + 1),
            Some(b'-' | b'0'..=b'9') => Ok(Node::Number(self.number()?.to_owned())),
            Some(b't') => self.word("true", Node::YesNo(true)),
            Some(b'f') => self.word("false", Node::YesNo(false)),
            Some(b'n') => self.word("null", Node::Null),
            _ => self.fault(),
        }
    }

    fn word(&mut self, word: &str, node: Node) -> Result<Node, Fault> {
        for letter in word.bytes() {
            if self.byte() != Some(letter) {
                return self.fault();
            }
            self.at += 1;
        }
        Ok(node)
    }

    fn list(&mut self, depth: usize) -> Result<Node, Fault> {
        self.at += 1;
        let mut items = Vec::new();
        if self.next() == Some(b']') {
            self.at += 1;
            return Ok(Node::List(items));
        }
        loop {
            items.push(self.value(depth)?);
            if self.ends(b']')? {
                return Ok(Node::List(items));
            }
        }
    }

    fn map(&mut self, depth: usize) -> Result<Node, Fault> {
        self.at += 1;
        let mut entries = Vec::new();
        if self.next() == Some(b'}') {
            self.at += 1;
            return Ok(Node::Map(entries));
        }
        loop {
            if self.next() != Some(b'"') {
                return self.fault();
            }
            let key = self.quoted()?;
            if self.next() != Some(b':') {
                return self.fault();
            }
            self.at += 1;
            entries.push((key, self.value(depth)?));
            if self.ends(b'}')? {
                return Ok(Node::Map(entries));
            }
        }
    }

    /// Takes a comma, or the bracket that ends a list or an object; returns whether it was the bracket.
    fn ends(&mut self, bracket: u8) -> Result<bool, Fault> {
        match self.next() {
            Some(found) if found == b',' || found == bracket => {
                self.at += 1;
                Ok(found == bracket)
            }
            _ => self.fault(),
        }
    }

    fn digits(&mut self) -> Result<(), Fault> {
        if !self.byte().is_some_and(|b| b.is_ascii_digit()) {
            return self.fault();
        }
        while self.byte().is_some_and(|b| b.is_ascii_digit()) {
            self.at += 1;
        }
        Ok(())
    }

    fn number(&mut self) -> Result<&'t str, Fault> {
        let start = self.at;
        if self.byte() == Some(b'-') {
            self.at += 1;
        }
        if self.byte() == Some(b'0') {
            self.at += 1;
            if self.byte().is_some_and(|b| b.is_ascii_digit()) {
                return self.fault();
            }
        } else {
            self.digits()?;
        }
        if self.byte() == Some(b'.') {
            self.at += 1;
            self.digits()?;
        }
        if matches!(self.byte(), Some(b'e' | b'E')) {
            self.at += 1;
            if matches!(self.byte(), Some(b'+' | b'-')) {
                self.at += 1;
            }
            self.digits()?;
        }
        let number = self.text.get(start..self.at).unwrap_or("");
        // What no double can hold is refused at its last digit.
        if nearest(number).is_some_and(f64::is_finite) { Ok(number) } else { Err(Fault::At(self.at - 1)) }
    }

    fn quoted(&mut self) -> Result<String, Fault> {
        self.at += 1;
        let mut out = String::new();
        loop {
            let start = self.at;
            while self.byte().is_some_and(|b| b >= b' ' && b != b'"' && b != b'\\') {
                self.at += 1;
            }
            out.push_str(self.text.get(start..self.at).unwrap_or(""));
            match self.byte() {
                Some(b'"') => {
                    self.at += 1;
                    return Ok(out);
                }
                Some(b'\\') => {
                    self.at += 1;
                    out.push(self.escaped()?);
                }
                _ => return self.fault(),
            }
        }
    }

    fn escaped(&mut self) -> Result<char, Fault> {
        let c = match self.byte() {
            Some(b @ (b'"' | b'\\' | b'/')) => char::from(b),
            Some(b'b') => '\u{8}',
            Some(b'f') => '\u{c}',
            Some(b'n') => '\n',
            Some(b'r') => '\r',
            Some(b't') => '\t',
            Some(b'u') => return self.by_number(),
            _ => return self.fault(),
        };
        self.at += 1;
        Ok(c)
    }

    /// `\u` with four hexadecimal digits, or a pair of them for what lies beyond U+FFFF.
    fn by_number(&mut self) -> Result<char, Fault> {
        let first = self.hexadecimal()?;
        if let Some(c) = char::from_u32(first) {
            return Ok(c);
        }
        // A high surrogate asks for a low one.
        if first >= 0xdc00 {
            return Err(Fault::At(self.at - 1));
        }
        for expected in [b'\\', b'u'] {
            if self.byte() != Some(expected) {
                return self.fault();
            }
            self.at += 1;
        }
        self.at -= 1;
        let second = self.hexadecimal()?;
        let low = second.checked_sub(0xdc00).filter(|low| *low < 0x400);
        // 0x10000 + 2¹⁰ (high − 0xd800) + (low − 0xdc00)
        low.and_then(|low| char::from_u32(0x1_0000 + ((first - 0xd800) << 10) + low))
            .ok_or(Fault::At(self.at - 1))
    }

    /// The four digits behind the `u` that is next.
    fn hexadecimal(&mut self) -> Result<u32, Fault> {
        let mut number = 0;
        for _ in 0..4 {
            self.at += 1;
            let Some(digit) = self.byte().and_then(|b| char::from(b).to_digit(16)) else {
                return self.fault();
            };
            number = number * 16 + digit;
        }
        self.at += 1;
        Ok(number)
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    /// The same value as another reader understands it.
    fn same(node: &Node, value: &serde_json::Value) -> bool {
        match node {
            Node::Null => value.is_null(),
            Node::YesNo(yes) => value.as_bool() == Some(*yes),
            Node::Number(_) => value.is_number(),
            Node::Text(text) => value.as_str() == Some(text),
            Node::List(items) => value.as_array().is_some_and(|values| {
                values.len() == items.len() && items.iter().zip(values).all(|(item, value)| same(item, value))
            }),
            Node::Map(entries) => value.as_object().is_some_and(|values| {
                entries.iter().enumerate().all(|(at, (key, node))| {
                    // Of a key written twice the other reader keeps the last.
                    let later = entries.iter().skip(at + 1).any(|(other, _)| other == key);
                    later || values.get(key).is_some_and(|value| same(node, value))
                })
            }),
        }
    }

    // Witness: serde_json reads what we read, refuses what we refuse, and at the same byte.
    #[test]
    fn reads_what_a_reference_library_reads() {
        const PIECES: [&str; 34] = [
            "{",
            "}",
            "[",
            "]",
            ",",
            ":",
            "\"a\"",
            "\"",
            "\\",
            "\\u00e9",
            "\\ud83e\\uddea",
            "\\ud800",
            "\\udc00",
            "\\n",
            "\\q",
            "é",
            "\n",
            " ",
            "\t",
            "0",
            "1",
            "-",
            ".",
            "5e3",
            "E+2",
            "e999",
            "true",
            "false",
            "null",
            "nul",
            "tr",
            "x",
            "\u{1}",
            "12345678901234567890",
        ];
        let mut state = 3_u64;
        let mut chance = |below: usize| {
            state = state.wrapping_mul(6_364_136_223_846_793_005).wrapping_add(1_442_695_040_888_963_407);
            (state >> 33) as usize % below
        };
        let (mut read, mut refused) = (0, 0);
        for _ in 0..60_000 {
            let (kind, count) = (chance(4), chance(9));
            let inner: String = (0..count).map(|_| PIECES[chance(PIECES.len())]).collect();
            let text = match kind {
                0 => inner,
                1 => format!("\"{inner}\""),
                2 => format!("[1, {inner}]"),
                _ => format!("{{\"k\": {inner}}}"),
            };
            match (parse(&text), serde_json::from_str::<serde_json::Value>(&text)) {
                (Ok(node), Ok(value)) => {
                    assert!(same(&node, &value), "{text:?}");
                    read += 1;
                }
                (Err(Fault::At(at)), Err(error)) => {
                    assert_eq!(error.is_eof(), at == text.len(), "{text:?}: {error}");
                    refused += 1;
                }
                (ours, theirs) => panic!("{text:?}: {ours:?}, {theirs:?}"),
            }
        }
        assert!(read > 3000 && refused > 3000, "{read} {refused}");
    }

    #[test]
    fn a_text_ends_at_its_quote() {
        assert_eq!(leading_text("\"b c\"].d"), Some(("b c".to_owned(), "].d")));
        for none in ["", "b", "\"b", "\"\\q\"", " \"b\""] {
            assert_eq!(leading_text(none), None);
        }
    }
}
