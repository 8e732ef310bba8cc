//! Things in order, with little code: one map from texts to places for the whole program, and one plain sort.
//!
//! Every kind of map and every kind of sort is compiled anew and takes kilobytes of the page. These two do for a few
//! hundred things; what has many thousands sorts with the standard library.

use std::borrow::Cow;
use std::collections::BTreeMap;

/// Texts, each with a number: as a rule the place in a list where what belongs to it stands.
///
/// ```
/// use thimbleworth::order::Index;
/// let mut index = Index::default();
/// assert_eq!(index.put("marc", 0), None);
/// assert_eq!(index.put(String::from("liquor"), 1), None);
/// assert_eq!(index.put("marc", 7), Some(0));
/// assert_eq!(index.get("marc"), Some(7));
/// assert_eq!(index.iter().map(|(text, _)| text).collect::<Vec<_>>(), ["liquor", "marc"]);
/// ```
#[derive(Clone, Debug, Default)]
pub struct Index<'a> {
    places: BTreeMap<Cow<'a, str>, usize>,
}

impl<'a> Index<'a> {
    /// The number of a text.
    #[must_use]
    pub fn get(&self, text: &str) -> Option<usize> {
        self.places.get(text).copied()
    }

    /// Gives a text its number; returns the one that it had.
    pub fn put(&mut self, text: impl Into<Cow<'a, str>>, place: usize) -> Option<usize> {
        self.places.insert(text.into(), place)
    }

    /// Every text with its number, in the order of the texts.
    pub fn iter(&self) -> impl Iterator<Item = (&str, usize)> {
        self.places.iter().map(|(text, place)| (&**text, *place))
    }

    /// How many texts there are.
    #[must_use]
    pub fn len(&self) -> usize {
        self.places.len()
    }

    /// Whether there is none.
    #[must_use]
    pub fn is_empty(&self) -> bool {
        self.places.is_empty()
    }
}

/// Sorts a short list: each is put behind all that need not stand behind it, so that equals keep their order.
///
/// Takes about `n log n` comparisons and `n²/4` moves.
///
/// ```
/// let mut masses_kg = [2.0_f64, 1.0, 3.0];
/// thimbleworth::order::sort(&mut masses_kg, &|a, b| a > b);
/// assert_eq!(masses_kg, [3.0, 2.0, 1.0]);
/// ```
pub fn sort<T>(items: &mut [T], stands_before: &dyn Fn(&T, &T) -> bool) {
    for next in 1..items.len() {
        // The first place whose holder has to stand behind the next one.
        let (mut low, mut high) = (0, next);
        while low < high {
            let middle = usize::midpoint(low, high);
            if stands_before(&items[next], &items[middle]) {
                high = middle;
            } else {
                low = middle + 1;
            }
        }
        for place in (low..next).rev() {
            items.swap(place, place + 1);
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    // Witness: the stable sort of the standard library.
    #[test]
    fn sorts_as_the_standard_library_does() {
        let mut state = 1_u32;
        for length in 0..60 {
            let mut items: Vec<(u32, usize)> = (0..length)
                .map(|place| {
                    state = state.wrapping_mul(1_664_525).wrapping_add(1_013_904_223);
                    (state >> 28, place)
                })
                .collect();
            let mut expected = items.clone();
            expected.sort_by_key(|item| item.0);
            sort(&mut items, &|a, b| a.0 < b.0);
            assert_eq!(items, expected);
        }
    }

    #[test]
    fn what_cannot_be_compared_does_no_harm() {
        let mut values = [1.0, f64::NAN, 0.0, f64::NAN, -1.0];
        sort(&mut values, &|a, b| a < b);
        assert_eq!(values.iter().filter(|v| v.is_nan()).count(), 2);
    }
}
