//! Hazard statement codes as they are written in data sheets.

/// The bare codes of a list of statements: combined codes are parted, suffix letters dropped, spaces removed, so that
/// `"H360FD"`, `"H301 + H311"` and `" EUH066 "` give `H360`, `H301`, `H311`, `EUH066`. Order and repeats are kept.
pub(super) fn codes(statements: &[&str]) -> Vec<String> {
    let mut found = Vec::new();
    for part in statements.iter().flat_map(|s| s.split('+')) {
        let text: String = part.chars().filter(|c| !c.is_whitespace() && *c != '*').collect();
        if text.is_empty() {
            continue;
        }
        let upper = text.to_ascii_uppercase();
        let digits = if upper.starts_with("EUH") { 6 } else { 4 };
        // "H360FD" → "H360"; anything that is not letters and three digits stays as it was, to be named as unknown
        let bare = match upper.get(..digits) {
            Some(head) if is_code(head) && upper.get(digits..).is_some_and(is_suffix) => head.to_owned(),
            _ => upper,
        };
        found.push(bare);
    }
    found
}

fn is_code(text: &str) -> bool {
    let number = text.strip_prefix("EUH").or_else(|| text.strip_prefix('H'));
    number.is_some_and(|n| n.len() == 3 && n.bytes().all(|b| b.is_ascii_digit()))
}

fn is_suffix(text: &str) -> bool {
    text.bytes().all(|b| b.is_ascii_alphabetic())
}

#[cfg(test)]
mod tests {
    use super::codes;

    #[test]
    fn parts_combined_codes_and_drops_suffixes() {
        let found = codes(&["H360FD", "H301 + H311", " euh066 ", "H373**", "H350i"]);
        assert_eq!(found, ["H360", "H301", "H311", "EUH066", "H373", "H350"]);
    }

    #[test]
    fn keeps_what_it_cannot_read() {
        assert_eq!(codes(&["R45", "H31", "H3011", ""]), ["R45", "H31", "H3011"]);
    }
}
