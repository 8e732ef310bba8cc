//! Paths of a plan as the page uses them.

/// A path as the id of an element: ids hold no blanks, and lists of ids are separated by them.
#[must_use]
pub fn dom_id(path: &str) -> String {
    path.chars().map(|c| if c.is_whitespace() { '_' } else { c }).collect()
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn an_id_has_no_blank() {
        assert_eq!(dom_id("a[\"b c\u{a0}d\"]"), "a[\"b_c_d\"]");
    }
}
