//! The known word that someone most likely meant.

use crate::letter::small;

/// The known word nearest to `word`, if any is near enough to be worth suggesting; of equally near ones the first.
/// Case does not count, nor whether words are joined by a space, `-` or `_`.
pub(crate) fn nearest<'a>(word: &str, known: impl IntoIterator<Item = &'a str>) -> Option<&'a str> {
    // Longer than any name that people type: not a slip of the finger, and the distance would cost time.
    if word.len() > 100 {
        return None;
    }
    let word = letters(word);
    let mut best: Option<(usize, &str)> = None;
    for candidate in known {
        let other = letters(candidate);
        let longer = if word.len() > other.len() { word.len() } else { other.len() };
        let allowed = if longer / 3 < 3 { longer / 3 } else { 3 };
        if word.len().abs_diff(other.len()) > allowed {
            continue;
        }
        let found = distance(&word, &other);
        if found <= allowed && best.is_none_or(|(least, _)| found < least) {
            best = Some((found, candidate));
        }
    }
    best.map(|(_, candidate)| candidate)
}

fn letters(word: &str) -> Vec<char> {
    word.trim().chars().map(|c| if matches!(c, ' ' | '-') { '_' } else { small(c) }).collect()
}

/// The number of letters to put in, leave out, replace, or swap with their neighbour (each letter touched once).
fn distance(a: &[char], b: &[char]) -> usize {
    let mut before_last: Vec<usize> = Vec::new();
    let mut last: Vec<usize> = (0..=b.len()).collect();
    let mut previous_x = None;
    for (i, x) in a.iter().enumerate() {
        let mut row = Vec::with_capacity(b.len() + 1);
        row.push(i + 1);
        let mut previous_y = None;
        for (j, y) in b.iter().enumerate() {
            let at = |row: &[usize], j: usize| row.get(j).copied().unwrap_or(usize::MAX - 1);
            let mut least = at(&last, j) + usize::from(x != y);
            for other in [at(&last, j + 1) + 1, at(&row, j) + 1] {
                if other < least {
                    least = other;
                }
            }
            if j > 0 && previous_x == Some(y) && previous_y == Some(x) {
                let swapped = at(&before_last, j - 1) + 1;
                if swapped < least {
                    least = swapped;
                }
            }
            row.push(least);
            previous_y = Some(y);
        }
        before_last = std::mem::replace(&mut last, row);
        previous_x = Some(x);
    }
    last.last().copied().unwrap_or(a.len())
}

#[cfg(test)]
mod tests {
    use super::*;

    fn apart(a: &str, b: &str) -> usize {
        distance(&letters(a), &letters(b))
    }

    #[test]
    fn distances_counted_by_hand() {
        assert_eq!(apart("", ""), 0);
        assert_eq!(apart("charge", ""), 6);
        assert_eq!(apart("charge", "charge"), 0);
        assert_eq!(apart("chrage", "charge"), 1);
        assert_eq!(apart("charg", "charge"), 1);
        assert_eq!(apart("chargee", "charge"), 1);
        assert_eq!(apart("kitten", "sitting"), 3);
    }

    #[test]
    fn slips_find_their_key() {
        let known = ["name", "rules", "as_of", "streams", "bulk_density"];
        assert_eq!(nearest("rulse", known), Some("rules"));
        assert_eq!(nearest("stream", known), Some("streams"));
        assert_eq!(nearest("As of", known), Some("as_of"));
        assert_eq!(nearest("bulk density", known), Some("bulk_density"));
        assert_eq!(nearest("colour", known), None);
        assert_eq!(nearest("", known), None);
        assert_eq!(nearest(&"name".repeat(1000), known), None);
    }
}
