//! Finding a material by name, synonym or CAS number, and suggesting one that comes close.
use super::load::{Loaded, load};
use super::{Substance, UnknownMaterial};
use crate::letter::small;
use crate::order::{self, Index};
use crate::source::Source;
use std::sync::OnceLock;

/// Names longer than this are not compared with the catalogue: no material has one.
const LONGEST_NAME: usize = 80;
/// How many suggestions an unknown name gets.
const SUGGESTIONS: usize = 3;

/// Every material that Thimbleworth knows, with the bibliography of its figures.
#[derive(Debug)]
pub struct Catalogue {
    substances: Vec<Substance>,
    /// Folded name, synonym or CAS number, and whose it is.
    index: Index<'static>,
    sources: Vec<(&'static str, Source)>,
    faults: Vec<String>,
}

/// The catalogue, read once from the embedded tables.
///
/// ```
/// let catalogue = thimbleworth::material::catalogue();
/// assert_eq!(catalogue.find("dcm").unwrap().name, "dichloromethane");
/// assert_eq!(catalogue.find("75-09-2").unwrap().name, "dichloromethane");
/// assert_eq!(catalogue.find("acetine").unwrap_err().suggestions, ["acetone"]);
/// ```
pub fn catalogue() -> &'static Catalogue {
    static CATALOGUE: OnceLock<Catalogue> = OnceLock::new();
    CATALOGUE.get_or_init(Catalogue::from_tables)
}

impl Catalogue {
    /// Reads the embedded tables anew; [`catalogue`] does it once.
    #[must_use]
    pub fn from_tables() -> Self {
        let Loaded { substances, sources, mut faults } = load();
        let mut index = Index::default();
        for (place, substance) in substances.iter().enumerate() {
            let others = substance.synonyms.iter().chain(&substance.cas);
            for name in std::iter::once(&substance.name).chain(others) {
                if index.put(fold(name), place).is_some_and(|other| other != place) {
                    faults.push(format!(
                        "identity.csv: {}: \"{name}\" names another material too",
                        substance.name
                    ));
                }
            }
        }
        Self { substances, index, sources, faults }
    }

    /// The material with this name, synonym or CAS number. Case, spaces, hyphens and commas do not matter, nor does
    /// `sulph` or `sulf`.
    ///
    /// # Errors
    /// [`UnknownMaterial`] with names that come close.
    pub fn find(&self, name: &str) -> Result<&Substance, UnknownMaterial> {
        let short = name.len() <= LONGEST_NAME;
        let key = if short { fold(name) } else { String::new() };
        self.at(&key).ok_or_else(|| UnknownMaterial {
            asked: name.chars().take(LONGEST_NAME).collect(),
            suggestions: if key.is_empty() { Vec::new() } else { self.suggest(&key) },
        })
    }

    /// As [`Catalogue::find`], without looking for names that come close: for long lists.
    #[must_use]
    pub fn known(&self, name: &str) -> Option<&Substance> {
        if name.len() <= LONGEST_NAME { self.at(&fold(name)) } else { None }
    }

    fn at(&self, key: &str) -> Option<&Substance> {
        self.index.get(key).and_then(|place| self.substances.get(place))
    }

    /// Every material, in the order of the tables.
    pub fn iter(&self) -> std::slice::Iter<'_, Substance> {
        self.substances.iter()
    }

    /// The citation behind a key that stands in [`Figure::source`](super::Figure), and how far it has been traced.
    ///
    /// ```
    /// use thimbleworth::source::Standing;
    /// let source = thimbleworth::material::catalogue().source("VDI 2010").unwrap();
    /// assert_eq!(source.standing, Standing::Secondary);
    /// ```
    #[must_use]
    pub fn source(&self, key: &str) -> Option<&Source> {
        let place = self.sources.binary_search_by(|(entry, _)| (*entry).cmp(key)).ok()?;
        self.sources.get(place).map(|(_, source)| source)
    }

    /// Every key of the bibliography with its citation.
    pub fn sources(&self) -> impl Iterator<Item = (&'static str, &Source)> {
        self.sources.iter().map(|(key, source)| (*key, source))
    }

    /// What in the embedded tables could not be read; empty in a sound build, which a test holds it to.
    #[must_use]
    pub fn faults(&self) -> &[String] {
        &self.faults
    }

    fn suggest(&self, key: &str) -> Vec<String> {
        let asked: Vec<char> = key.chars().collect();
        let furthest = 1 + asked.len() / 4;
        let mut close: Vec<(usize, usize)> = Vec::new();
        let mut scratch = Scratch::default();
        for (entry, place) in self.index.iter() {
            let mut apart = scratch.distance(&asked, entry, furthest);
            // The beginning of a name counts as one slip: "diethyl" means "diethyl ether".
            if asked.len() >= 4 && entry.starts_with(key) {
                apart = Some(apart.map_or(1, |apart| if apart < 1 { apart } else { 1 }));
            }
            if let Some(apart) = apart {
                match close.iter_mut().find(|(_, known)| *known == place) {
                    Some(entry) if entry.0 <= apart => {}
                    Some(entry) => entry.0 = apart,
                    None => close.push((apart, place)),
                }
            }
        }
        order::sort(&mut close, &|a, b| a < b);
        close
            .iter()
            .take(SUGGESTIONS)
            .filter_map(|&(_, place)| self.substances.get(place))
            .map(|substance| substance.name.clone().into_owned())
            .collect()
    }
}

impl<'a> IntoIterator for &'a Catalogue {
    type Item = &'a Substance;
    type IntoIter = std::slice::Iter<'a, Substance>;

    fn into_iter(self) -> Self::IntoIter {
        self.iter()
    }
}

/// Letters and digits in lower case, `ph` of `sulph` as `f`: what two spellings of one name share.
fn fold(name: &str) -> String {
    let mut folded: String = name.chars().filter(|c| c.is_alphanumeric()).map(small).collect();
    if folded.contains("sulph") {
        folded = folded.replace("sulph", "sulf");
    }
    folded
}

/// Room for the comparison of two names, lent from one comparison to the next.
#[derive(Default)]
struct Scratch {
    entry: Vec<char>,
    before: Vec<usize>,
    last: Vec<usize>,
    row: Vec<usize>,
}

impl Scratch {
    /// Slips between the two names: letters added, left out, mistaken or swapped with a neighbour (optimal string
    /// alignment); `None` when there are more than `furthest`.
    fn distance(&mut self, asked: &[char], entry: &str, furthest: usize) -> Option<usize> {
        self.entry.clear();
        self.entry.extend(entry.chars());
        if asked.len().abs_diff(self.entry.len()) > furthest {
            return None;
        }
        self.before.clear();
        self.last.clear();
        self.last.extend(0..=self.entry.len());
        for (i, &a) in asked.iter().enumerate() {
            let cell = |row: &[usize], place: usize| row.get(place).copied().unwrap_or(usize::MAX / 2);
            self.row.clear();
            self.row.push(i + 1);
            let mut previous = None;
            let mut nearest = i + 1;
            for (j, &b) in self.entry.iter().enumerate() {
                let mut least = cell(&self.last, j) + usize::from(a != b);
                for step in [cell(&self.last, j + 1) + 1, cell(&self.row, j) + 1] {
                    if step < least {
                        least = step;
                    }
                }
                let swapped = i > 0 && j > 0 && previous == Some(a) && asked.get(i - 1) == Some(&b);
                if swapped && cell(&self.before, j - 1) + 1 < least {
                    least = cell(&self.before, j - 1) + 1;
                }
                if least < nearest {
                    nearest = least;
                }
                self.row.push(least);
                previous = Some(b);
            }
            // A swap may still reach back over one row, so give up one slip later than the row alone would allow.
            if nearest > furthest + 1 {
                return None;
            }
            std::mem::swap(&mut self.before, &mut self.last);
            std::mem::swap(&mut self.last, &mut self.row);
        }
        self.last.last().copied().filter(|&slips| slips <= furthest)
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn the_tables_are_sound() {
        assert_eq!(catalogue().faults(), [""; 0]);
    }

    #[test]
    fn finds_what_people_write() {
        for (asked, name) in [
            ("hexane", "n-hexane"),
            ("N-Hexane", "n-hexane"),
            ("DCM", "dichloromethane"),
            ("methylene chloride", "dichloromethane"),
            ("MeOH", "methanol"),
            ("iso-octane", "isooctane"),
            ("2,2,4-trimethylpentane", "isooctane"),
            ("ether", "diethyl ether"),
            ("methyl ethyl ketone", "butanone"),
            ("MEK", "butanone"),
            (" Ethyl  Acetate ", "ethyl acetate"),
            ("anhydrous sodium sulphate", "sodium sulfate"),
            ("7732-18-5", "water"),
            ("CO2", "carbon dioxide"),
            ("1,4 dioxane", "1,4-dioxane"),
        ] {
            assert_eq!(catalogue().find(asked).unwrap().name, name, "{asked}");
        }
    }

    #[test]
    fn suggests_what_comes_close() {
        let suggestions = |asked: &str| catalogue().find(asked).unwrap_err().suggestions;
        assert_eq!(suggestions("metahnol")[0], "methanol");
        assert_eq!(suggestions("cyclohexxane")[0], "cyclohexane");
        assert_eq!(suggestions("67-64-2")[0], "acetone");
        assert_eq!(suggestions("diethyl")[0], "diethyl ether");
        assert!(suggestions("unobtainium").is_empty());
        assert!(suggestions("").is_empty());
        assert!(suggestions("---").is_empty());
        let long = catalogue().find(&"x".repeat(1_000_000)).unwrap_err();
        assert_eq!((long.asked.len(), long.suggestions.len()), (LONGEST_NAME, 0));
    }

    #[test]
    fn counts_slips() {
        let mut scratch = Scratch::default();
        let mut slips = |a: &str, b: &str| scratch.distance(&a.chars().collect::<Vec<_>>(), b, 9);
        assert_eq!(slips("acetone", "acetone"), Some(0));
        assert_eq!(slips("actone", "acetone"), Some(1));
        assert_eq!(slips("acteone", "acetone"), Some(1));
        assert_eq!(slips("toluene", "xylene"), Some(3));
        assert_eq!(scratch.distance(&['a'], "abcdef", 2), None);
    }
}
