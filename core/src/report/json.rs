//! JSON as it is written: two spaces a level, keys in the order in which they are put, numbers as the shortest text that
//! reads back as the same double.
//!
//! Results are put straight into their text, without a copy in between and without code for each kind of row.

use crate::plan::quote;
use std::fmt::Write as _;

/// A JSON text in the making.
pub(super) struct Json {
    text: String,
    depth: usize,
}

/// A plain value.
pub(super) enum Value<'a> {
    Null,
    YesNo(bool),
    Count(u64),
    Whole(i64),
    Number(f64),
    Text(&'a str),
}

impl From<bool> for Value<'_> {
    fn from(yes: bool) -> Self {
        Self::YesNo(yes)
    }
}

impl From<f64> for Value<'_> {
    fn from(number: f64) -> Self {
        Self::Number(number)
    }
}

macro_rules! counts {
    ($($whole:ty)*) => {
        $(impl From<$whole> for Value<'_> {
            fn from(count: $whole) -> Self {
                Self::Count(count as u64)
            }
        })*
    };
}

counts!(u8 u16 u32 u64 usize);

impl From<i64> for Value<'_> {
    fn from(number: i64) -> Self {
        Self::Whole(number)
    }
}

impl<'a> From<&'a str> for Value<'a> {
    fn from(text: &'a str) -> Self {
        Self::Text(text)
    }
}

impl<'a> From<&'a String> for Value<'a> {
    fn from(text: &'a String) -> Self {
        Self::Text(text)
    }
}

impl<'a, T: Into<Value<'a>>> From<Option<T>> for Value<'a> {
    fn from(value: Option<T>) -> Self {
        value.map_or(Self::Null, Into::into)
    }
}

impl Json {
    /// The text of an object with what `fill` puts into it, and a final newline.
    pub(super) fn document(fill: impl FnOnce(&mut Self)) -> String {
        let mut json = Self { text: String::new(), depth: 0 };
        json.open('{');
        fill(&mut json);
        json.close('}');
        json.text.push('\n');
        json.text
    }

    /// A key of an object with a plain value.
    pub(super) fn put<'a>(&mut self, key: &str, value: impl Into<Value<'a>>) {
        self.key(key);
        self.value(&value.into());
    }

    /// A plain value of a list.
    pub(super) fn item<'a>(&mut self, value: impl Into<Value<'a>>) {
        self.next_line();
        self.value(&value.into());
    }

    /// A key of an object with an object.
    pub(super) fn object(&mut self, key: &str, fill: impl FnOnce(&mut Self)) {
        self.key(key);
        self.open('{');
        fill(self);
        self.close('}');
    }

    /// A key of an object with a list.
    pub(super) fn list(&mut self, key: &str, fill: impl FnOnce(&mut Self)) {
        self.key(key);
        self.open('[');
        fill(self);
        self.close(']');
    }

    /// An object of a list.
    pub(super) fn row(&mut self, fill: impl FnOnce(&mut Self)) {
        self.next_line();
        self.open('{');
        fill(self);
        self.close('}');
    }

    /// A key of an object with a list of texts.
    pub(super) fn texts(&mut self, key: &str, texts: &[String]) {
        self.list(key, |json| {
            for text in texts {
                json.item(text);
            }
        });
    }

    fn open(&mut self, bracket: char) {
        self.text.push(bracket);
        self.depth += 1;
    }

    fn close(&mut self, bracket: char) {
        self.depth -= 1;
        if !self.text.ends_with(['{', '[']) {
            self.line();
        }
        self.text.push(bracket);
    }

    fn key(&mut self, key: &str) {
        self.next_line();
        quote(key, &mut self.text);
        self.text.push_str(": ");
    }

    fn next_line(&mut self) {
        // No value ends in an opening bracket: a text ends in its quote.
        if !self.text.ends_with(['{', '[']) {
            self.text.push(',');
        }
        self.line();
    }

    fn line(&mut self) {
        self.text.push('\n');
        for _ in 0..self.depth {
            self.text.push_str("  ");
        }
    }

    fn value(&mut self, value: &Value<'_>) {
        // Writing to a String cannot fail.
        let _ = match *value {
            Value::Text(text) => {
                quote(text, &mut self.text);
                Ok(())
            }
            Value::YesNo(yes) => write!(self.text, "{yes}"),
            Value::Count(count) => write!(self.text, "{count}"),
            Value::Whole(number) => write!(self.text, "{number}"),
            // JSON has no word for what is not finite.
            Value::Number(number) if number.is_finite() => {
                let size = number.abs();
                // From 1e-5 up to 1e16 without a power of ten; whole numbers show that they are measured: 300.0.
                if (1e-5..1e-4).contains(&size) {
                    write!(self.text, "{number}")
                } else {
                    write!(self.text, "{number:?}")
                }
            }
            Value::Number(_) | Value::Null => {
                self.text.push_str("null");
                Ok(())
            }
        };
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    // Witness: serde_json, which read and wrote these documents in independent programs for years.
    #[test]
    fn numbers_and_layout_are_those_of_a_reference_library() {
        let mut state = 7_u64;
        let mut values =
            vec![0.0, -0.0, 300.0, 1e-5, 9.999e-6, 1.5e-5, 1e-4, 1e15, 9e15, 1e16, 1.25e17, 5e-324];
        for _ in 0..20_000 {
            state = state.wrapping_mul(6_364_136_223_846_793_005).wrapping_add(1_442_695_040_888_963_407);
            values.push(f64::from_bits(state));
            values.push((state >> 40) as f64 * 1e-9);
        }
        values.push(f64::NAN);
        let text = "\"q\" \\ \n\t é 🧪";
        let ours = Json::document(|json| {
            json.list("numbers", |json| {
                for &value in &values {
                    json.item(value);
                }
            });
            json.list("none", |_| {});
            json.object("empty", |_| {});
            json.list("rows", |json| json.row(|json| json.put("a", text)));
            json.put("yes", true);
            json.put("count", u64::MAX);
            json.put("nothing", None::<&str>);
            json.texts("texts", &["x".to_owned(), String::new()]);
        });
        let value = serde_json::json!({
            "numbers": values, "none": [], "empty": {}, "rows": [{ "a": text }], "yes": true, "count": u64::MAX,
            "nothing": null, "texts": ["x", ""],
        });
        let read: serde_json::Value = serde_json::from_str(&ours).unwrap();
        assert_eq!(read["rows"], value["rows"]);
        let order = ["numbers", "none", "empty", "rows", "yes", "count", "nothing", "texts"];
        let theirs: Vec<String> = order
            .iter()
            .map(|key| {
                let text = serde_json::to_string_pretty(&value[key]).unwrap();
                // It writes a plus before the exponent of a large number; that is one sign more than need be.
                format!("  \"{key}\": {}", text.replace('\n', "\n  ").replace("e+", "e"))
            })
            .collect();
        let theirs = format!("{{\n{}\n}}\n", theirs.join(",\n"));
        assert_eq!(ours.lines().count(), theirs.lines().count());
        for (our, their) in ours.lines().zip(theirs.lines()) {
            // Halfway between two shortest texts either will do.
            let number = |line: &str| line.trim().trim_end_matches(',').parse::<f64>().ok();
            let tie = our.len() == their.len() && number(our).is_some_and(|n| n.abs() > 1e14);
            assert!(our == their || tie && number(our) == number(their), "{our} {their}");
        }
    }
}
