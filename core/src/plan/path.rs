//! Where something stands in a plan, `workloads[0].routes[1].steps[2].measured["condenser loss"]`.

use std::fmt::{self, Write as _};

use super::parse::leading_text;
use super::print::quoted;

/// A key longer than this many characters is cut in a path: a file of one endless key must not make a list of
/// problems that is larger than the file.
const LONGEST_KEY: usize = 1000;

/// A place in the document: built on the way down from borrowed parts, written out only when something is to be
/// said about it.
///
/// A key of letters, digits, `_` and `-` that does not start with a digit or `-` follows a dot; any other key stands
/// in square brackets as a JSON text, and a position in a list in square brackets as a number. So two places never
/// have the same path (save for keys beyond 1,000 characters, which are cut).
///
/// ```
/// use thimbleworth::plan::Path;
/// let steps = Path::Root.key("steps");
/// let step = steps.index(2);
/// assert_eq!(step.key("charge").to_string(), "steps[2].charge");
/// let measured = step.key("measured");
/// assert_eq!(measured.key("condenser loss").to_string(), r#"steps[2].measured["condenser loss"]"#);
/// ```
#[derive(Clone, Copy, Debug)]
pub enum Path<'a> {
    /// The document as a whole; written as the empty text.
    Root,
    /// A place whose path has been written out already.
    At(&'a str),
    /// The value of a key of the object at the given place.
    Key(&'a Path<'a>, &'a str),
    /// The value at a position, counted from 0, of the list at the given place.
    Index(&'a Path<'a>, usize),
}

impl<'a> Path<'a> {
    /// The value of a key of the object that is here.
    #[must_use]
    pub const fn key(&'a self, key: &'a str) -> Self {
        Self::Key(self, key)
    }

    /// The value at a position, counted from 0, of the list that is here.
    #[must_use]
    pub const fn index(&'a self, position: usize) -> Self {
        Self::Index(self, position)
    }
}

/// The path of a key of the object at a path that has been written out already.
#[must_use]
pub fn below(path: &str, key: &str) -> String {
    Path::At(path).key(key).to_string()
}

/// The keys and positions of a path that has been written out, or nothing where it is no path.
///
/// ```
/// use thimbleworth::plan::keys;
/// assert_eq!(keys(r#"steps[2].measured["condenser loss"]"#).unwrap(), ["steps", "2", "measured", "condenser loss"]);
/// assert_eq!(keys("steps["), None);
/// ```
#[must_use]
pub fn keys(path: &str) -> Option<Vec<String>> {
    let mut out = Vec::new();
    let mut rest = path;
    while !rest.is_empty() {
        if let Some(inside) = rest.strip_prefix('[') {
            if let Some((key, after)) = leading_text(inside) {
                out.push(key);
                rest = after.strip_prefix(']')?;
            } else {
                let (position, after) = inside.split_once(']')?;
                position.parse::<usize>().ok()?;
                out.push(position.to_owned());
                rest = after;
            }
        } else {
            rest = rest.strip_prefix('.').unwrap_or(rest);
            let end = rest.find(['.', '[']).unwrap_or(rest.len());
            let (key, after) = rest.split_at_checked(end)?;
            if key.is_empty() {
                return None;
            }
            out.push(key.to_owned());
            rest = after;
        }
    }
    Some(out)
}

impl fmt::Display for Path<'_> {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            Self::Root => Ok(()),
            Self::At(path) => f.write_str(path),
            Self::Index(parent, position) => write!(f, "{parent}[{position}]"),
            Self::Key(parent, key) if is_plain(key) => {
                parent.fmt(f)?;
                if !matches!(parent, Self::Root | Self::At("")) {
                    f.write_char('.')?;
                }
                f.write_str(key)
            }
            Self::Key(parent, key) => {
                let cut = key.char_indices().nth(LONGEST_KEY).and_then(|(end, _)| key.get(..end));
                match cut {
                    None => write!(f, "{parent}[{}]", quoted(key)),
                    Some(start) => write!(f, "{parent}[{}…]", quoted(start)),
                }
            }
        }
    }
}

fn is_plain(key: &str) -> bool {
    key.len() <= LONGEST_KEY
        && key.bytes().next().is_some_and(|b| b.is_ascii_alphabetic() || b == b'_')
        && key.bytes().all(|b| b.is_ascii_alphanumeric() || b == b'_' || b == b'-')
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn odd_keys_are_quoted() {
        let at = |key: &str| Path::Root.key("a").key(key).to_string();
        assert_eq!(at("n-hexane"), "a.n-hexane");
        assert_eq!(at("air_changes"), "a.air_changes");
        assert_eq!(at("2-propanol"), r#"a["2-propanol"]"#);
        assert_eq!(at(""), r#"a[""]"#);
        assert_eq!(at("x.y"), r#"a["x.y"]"#);
        assert_eq!(at("x\"]"), r#"a["x\"]"]"#);
        assert_eq!(at("Δ\n"), r#"a["Δ\n"]"#);
    }

    #[test]
    fn the_root_is_empty_and_needs_no_dot() {
        assert_eq!(Path::Root.to_string(), "");
        assert_eq!(Path::Root.key("site").to_string(), "site");
        assert_eq!(Path::Root.index(0).to_string(), "[0]");
        assert_eq!(Path::Root.key("condenser loss").to_string(), r#"["condenser loss"]"#);
    }

    #[test]
    fn different_places_have_different_paths() {
        let keys = ["a", "b", "a.b", "[0]", "", "\"", "a\"", "0", " "];
        let mut seen = std::collections::BTreeSet::new();
        let mut count = 0;
        for first in keys {
            let one = Path::Root.key(first);
            count += 2;
            seen.insert(one.to_string());
            seen.insert(one.index(0).to_string());
            for second in keys {
                count += 1;
                seen.insert(one.key(second).to_string());
            }
        }
        assert_eq!(seen.len(), count);
    }

    #[test]
    fn an_endless_key_is_cut() {
        assert!(Path::Root.key(&"x".repeat(5_000_000)).to_string().len() < 1100);
    }

    #[test]
    fn what_is_written_is_read_back() {
        for key in ["charge", "n-hexane", "2-propanol", "", "a.b", "x\"]", "Δ\n", "[0]", "condenser loss"] {
            let steps = Path::Root.key("steps");
            let step = steps.index(2);
            let path = below(&step.key("measured").to_string(), key);
            assert_eq!(keys(&path).unwrap(), ["steps", "2", "measured", key]);
        }
        assert_eq!(keys(""), Some(Vec::new()));
        for bad in ["a[", "a[x]", "a[\"b]", "..", "a[\"b\"x"] {
            assert_eq!(keys(bad), None, "{bad}");
        }
    }
}
