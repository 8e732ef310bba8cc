//! Reading a path back into its keys: the inverse of how [`thimbleworth::plan::Path`] is written.

/// The keys and positions of a path, or nothing where it is no path: `a[0]["b c"].d` is `a`, `0`, `b c`, `d`.
#[must_use]
pub fn keys(path: &str) -> Option<Vec<String>> {
    let mut out = Vec::new();
    let mut rest = path;
    while !rest.is_empty() {
        if let Some(inside) = rest.strip_prefix('[') {
            if inside.starts_with('"') {
                let mut stream = serde_json::Deserializer::from_str(inside).into_iter::<String>();
                let key = stream.next()?.ok()?;
                rest = inside.get(stream.byte_offset()..)?.strip_prefix(']')?;
                out.push(key);
            } else {
                let (position, after) = inside.split_once(']')?;
                position.parse::<usize>().ok()?;
                out.push(position.to_owned());
                rest = after;
            }
        } else {
            rest = rest.strip_prefix('.').unwrap_or(rest);
            let end = rest.find(['.', '[']).unwrap_or(rest.len());
            let (key, after) = rest.split_at(end);
            if key.is_empty() {
                return None;
            }
            out.push(key.to_owned());
            rest = after;
        }
    }
    Some(out)
}

/// A path as the id of an element: ids hold no blanks, and lists of ids are separated by them.
#[must_use]
pub fn dom_id(path: &str) -> String {
    path.chars().map(|c| if c.is_whitespace() { '_' } else { c }).collect()
}

#[cfg(test)]
mod tests {
    use super::*;
    use thimbleworth::plan::{Path, below};

    #[test]
    fn what_is_written_is_read_back() {
        for key in ["charge", "n-hexane", "2-propanol", "", "a.b", "x\"]", "Δ\n", "[0]", "condenser loss"] {
            let steps = Path::Root.key("steps");
            let step = steps.index(2);
            let path = below(&step.key("measured").to_string(), key);
            assert_eq!(keys(&path).expect("a path"), ["steps", "2", "measured", key]);
        }
        assert_eq!(keys(""), Some(Vec::new()));
        for bad in ["a[", "a[x]", "a[\"b]", "..", "a[\"b\"x"] {
            assert_eq!(keys(bad), None, "{bad}");
        }
    }

    #[test]
    fn an_id_has_no_blank() {
        assert_eq!(dom_id("a[\"b c\u{a0}d\"]"), "a[\"b_c_d\"]");
    }
}
