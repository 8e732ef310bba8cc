//! What the names in a file mean: materials of the plan and the catalogue, streams of the site, routes of the work.

use super::places::{Places, hash};
use super::why::quoted;
use super::{Change, Why};
use crate::letter::{is_letter, small};
use crate::material::{Class, Substance};
use crate::plan::Plan;
use crate::program::{MaterialBook, Program};
use std::sync::Arc;

/// Names kept so that they are looked up once.
const MOST_KEPT: usize = 50_000;
/// Names that get a suggestion: comparing with the whole catalogue takes time, and nobody reads more.
const MOST_SUGGESTIONS: u32 = 100;

/// Stands for "none" among the indices of materials, streams and routes.
pub const NONE: u16 = u16::MAX;
/// Stands among the streams for what is sent off to be reclaimed, which is no waste stream of the site.
pub const RECLAIMED: u16 = u16::MAX - 1;
/// The name that means it.
const RECLAIMED_NAME: &str = "reclaimed off site";

/// A material that a file names.
#[derive(Clone, Debug)]
pub struct LogMaterial {
    /// Its name in the plan or the catalogue.
    pub name: String,
    /// What it is used as.
    pub class: Class,
    /// Density at the bench's temperature and how far it can be off as a share; `None` when it is not known.
    pub density_kg_m3: Option<(f64, f64)>,
    /// Whether it counts as an organic solvent of Directive 2010/75/EU: a solvent with carbon and at least 0.01 kPa of
    /// vapour pressure at 293.15 K, or of a vapour pressure that is not known.
    pub voc: bool,
}

/// A route that a log can name.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct LogRoute {
    /// The index of the workload.
    pub workload: usize,
    /// The index of the route in it.
    pub route: usize,
    /// `Work / Route`.
    pub label: String,
}

/// What a name was found to be.
#[derive(Clone, Debug)]
pub(super) struct Found {
    pub(super) index: Result<u16, Why>,
    pub(super) change: Option<Change>,
    /// The name that was read, or a suggestion.
    pub(super) detail: String,
    /// Whether a remark has told of the change.
    told: bool,
}

/// Everything in a plan that a file can name.
pub struct Names {
    book: MaterialBook,
    bench_k: f64,
    /// Every material met so far; a [`Tally`](super::Tally) refers to it by its index.
    pub materials: Vec<LogMaterial>,
    /// The streams of the site.
    pub streams: Vec<String>,
    /// The routes of the work.
    pub routes: Vec<LogRoute>,
    /// The site and the date of the plan, as a paper says them.
    pub heading: String,
    /// The present routes, a workload each, as indices of `routes`.
    present: Vec<u16>,
    kept: Places,
    /// The keys of what was looked up.
    keys: Vec<Vec<u8>>,
    found: Vec<Found>,
    suggestions: u32,
}

impl Names {
    /// The names of a plan.
    #[must_use]
    pub fn of(plan: &Plan, program: &Program) -> Self {
        let mut routes = Vec::new();
        let mut present = Vec::new();
        for (workload, work) in program.workloads.iter().enumerate() {
            present.push(u16::try_from(routes.len() + work.present).unwrap_or(NONE));
            for (route, each) in work.routes.iter().enumerate() {
                let mut label = work.name.clone();
                label.push_str(" / ");
                label.push_str(&each.name);
                routes.push(LogRoute { workload, route, label });
            }
        }
        Self {
            // What is wrong with own materials is told where the plan is checked.
            book: MaterialBook::read(&plan.materials, &mut Vec::new()),
            bench_k: program.site.bench_temperature_k,
            materials: Vec::new(),
            streams: program.site.streams.iter().map(|s| s.name.clone()).collect(),
            routes,
            heading: [
                "Site: ",
                &program.site.name,
                "; as of ",
                program.site.as_of.as_deref().unwrap_or("no date"),
                ". Help for a licensed person; local codes and licensed practice decide.",
            ]
            .concat(),
            present,
            kept: Places::default(),
            keys: Vec::new(),
            found: Vec::new(),
            suggestions: 0,
        }
    }

    /// The index of a material, which is added where it is new.
    pub(super) fn add(&mut self, substance: &Substance) -> u16 {
        let place = self.materials.iter().position(|m| m.name == *substance.name).unwrap_or_else(|| {
            let density = substance.density_kg_m3(self.bench_k).ok();
            let known = density.map(|d| {
                let off = (d.high - d.low) / 2.0 / d.value;
                (d.value, if off > 0.0 { off } else { 0.0 })
            });
            self.materials.push(LogMaterial {
                name: substance.name.to_string(),
                class: substance.class,
                density_kg_m3: known,
                voc: is_voc(substance),
            });
            self.materials.len() - 1
        });
        u16::try_from(place).unwrap_or(NONE)
    }

    /// Looks a name up once. `ask` begins the key that it is kept under: the same text can be a material and a stream.
    pub(super) fn look_up(
        &mut self,
        ask: u8,
        (first, second): (&[u8], &[u8]),
        means: &[(String, String)],
        key: &mut Vec<u8>,
    ) -> &mut Found {
        key.clear();
        key.push(ask);
        key.extend_from_slice(first);
        key.push(0);
        key.extend_from_slice(second);
        let hash = hash(key, &[]);
        let at = self.kept.find(hash, &|at| self.keys.get(at) == Some(key)).unwrap_or_else(|| {
            let found = self.resolve(ask, first, second, means);
            if self.found.len() >= MOST_KEPT {
                self.turn_page();
            }
            self.found.push(found);
            self.keys.push(key.clone());
            self.kept.add(hash)
        });
        &mut self.found[at]
    }

    /// Whether anything in the plan or the catalogue has this name.
    pub(super) fn has(&mut self, name: &str) -> bool {
        let name = name.as_bytes();
        [MATERIAL, STREAM, ROUTE].iter().any(|ask| self.resolve(*ask, name, b"", &[]).index.is_ok())
    }

    /// The present routes, a workload each.
    pub(super) fn present(&self) -> &[u16] {
        &self.present
    }

    /// Forgets what names mean in the file that was read: the next one has its own mapping.
    pub(super) fn turn_page(&mut self) {
        self.kept.clear();
        self.keys.clear();
        self.found.clear();
    }

    fn resolve(&mut self, ask: u8, first: &[u8], second: &[u8], means: &[(String, String)]) -> Found {
        let text = super::text::decoded(first).0;
        let text = text.trim();
        let meant = means.iter().find(|(from, _)| from.trim() == text && !text.is_empty());
        let name = meant.map_or(text, |(_, to)| to.trim());
        match ask {
            MATERIAL => {
                let cas = super::text::decoded(second).0;
                self.material(name, cas.trim())
            }
            STREAM => {
                if same(RECLAIMED_NAME, name) {
                    return Found::plain(RECLAIMED);
                }
                let place = self.streams.iter().position(|s| same(s, name));
                let index = place.and_then(|p| u16::try_from(p).ok());
                match index {
                    Some(index) => Found::plain(index),
                    None => Found::refused(Why::UnknownStream, &self.streams.join(", ")),
                }
            }
            _ => self.route(name),
        }
    }

    fn route(&self, name: &str) -> Found {
        let of = |fits: &dyn Fn(&LogRoute) -> bool| {
            let mut all = self.routes.iter().enumerate().filter(|(_, r)| fits(r)).map(|(i, _)| i);
            match (all.next(), all.next()) {
                (Some(one), None) => u16::try_from(one).ok(),
                _ => None,
            }
        };
        // No method at all means the one piece of work as it is done.
        if name.is_empty() {
            return match self.present.as_slice() {
                [one] => Found::plain(*one),
                _ => Found::refused(Why::UnknownRoute, ""),
            };
        }
        let route = of(&|r| same(&r.label, name))
            .or_else(|| of(&|r| r.label.rsplit_once(" / ").is_some_and(|(_, route)| same(route, name))))
            .or_else(|| {
                let work = of(&|r| {
                    let first = self.present.get(r.workload).copied().map(usize::from);
                    r.label.split_once(" / ").is_some_and(|(work, _)| same(work, name))
                        && first.and_then(|p| self.routes.get(p)).is_some_and(|p| p == r)
                })?;
                Some(work)
            });
        let labels = || self.routes.iter().take(6).map(|r| r.label.as_str()).collect::<Vec<_>>().join(", ");
        route.map_or_else(|| Found::refused(Why::UnknownRoute, &labels()), Found::plain)
    }

    fn material(&mut self, name: &str, cas: &str) -> Found {
        if name.is_empty() && cas.is_empty() {
            return Found::refused(Why::NoName, "");
        }
        let inside = cas_in(name);
        let number = if cas.is_empty() { inside.unwrap_or_default() } else { cas };
        if !number.is_empty() && !cas_holds(number) {
            return Found::refused(Why::CasDigit, "");
        }
        let by_cas = if number.is_empty() { None } else { self.book.known(number) };
        let whole = self.book.known(name);
        let by_name = whole.clone().or_else(|| self.shortened(name));
        let found = match (by_cas, by_name) {
            (Some(cas), Some(named)) if cas.name != named.name => {
                let mut detail = named.name.to_string();
                detail.push_str(" or ");
                detail.push_str(&cas.name);
                return Found::refused(Why::CasDiffers, &detail);
            }
            (Some(found), _) | (None, Some(found)) => found,
            (None, None) => return self.unknown(name),
        };
        let index = self.add(&found);
        let change = if same(&found.name, name) || name.is_empty() {
            None
        } else if whole.is_some() {
            Some(Change::Synonym)
        } else {
            Some(Change::NameRead)
        };
        Found { index: Ok(index), change, detail: found.name.to_string(), told: false }
    }

    /// The material whose name stands before a purity, a grade, a size or a bracket.
    fn shortened(&self, name: &str) -> Option<Arc<Substance>> {
        let words: Vec<&str> = name.split([' ', ',', ';', '(', ')', '/']).filter(|w| !w.is_empty()).collect();
        (1..words.len()).rev().find_map(|count| {
            let rest = words.get(count..)?;
            if !rest.iter().all(|word| is_grade(word)) {
                return None;
            }
            self.book.known(&words.get(..count)?.join(" "))
        })
    }

    fn unknown(&mut self, name: &str) -> Found {
        // What names several things is never guessed, nor answered with what is merely spelt alike.
        if let Some((_, several)) = SEVERAL.iter().find(|(word, _)| same(word, name)) {
            return Found { detail: (*several).to_owned(), ..Found::refused(Why::UnknownMaterial, "") };
        }
        if self.suggestions >= MOST_SUGGESTIONS {
            return Found::refused(Why::UnknownMaterial, "");
        }
        self.suggestions += 1;
        let near = crate::material::catalogue().find(name).err().map(|u| u.suggestions.join(", "));
        Found::refused(Why::UnknownMaterial, &near.unwrap_or_default())
    }
}

/// Words of ledgers that stand for several materials, with those that may be meant (common practice, no source). German
/// "Benzin" is petrol, and no benzene.
const SEVERAL: [(&str, &str); 14] = [
    ("benzin", "petroleum ether, n-hexane or n-heptane"),
    ("benzine", "petroleum ether, n-hexane or n-heptane"),
    ("waschbenzin", "petroleum ether, n-hexane or n-heptane"),
    ("naphtha", "petroleum ether, n-hexane or n-heptane"),
    ("white spirit", "a material of your own: it is a boiling range"),
    ("alcohol", "ethanol, methanol or 2-propanol"),
    ("alkohol", "ethanol, methanol or 2-propanol"),
    ("spiritus", "ethanol, or a material of your own where it is denatured"),
    ("propanol", "1-propanol or 2-propanol"),
    ("butanol", "1-butanol, 2-butanol, isobutanol or tert-butanol"),
    ("tri", "trichloroethylene or 1,1,1-trichloroethane"),
    ("per", "tetrachloroethylene"),
    ("dichloroethane", "1,2-dichloroethane, or 1,1-dichloroethane as a material of your own"),
    ("glycol", "ethylene glycol, or another one as a material of your own"),
];

fn is_voc(substance: &Substance) -> bool {
    let carbon = substance.elements().is_none_or(|e| e.is_ok_and(|e| e.count("C") > 0));
    let volatile = substance.vapour_pressure_pa(293.15).map_or(true, |p| p.value >= 10.0);
    substance.class == Class::Solvent && carbon && volatile
}

impl Found {
    fn plain(index: u16) -> Self {
        Self { index: Ok(index), change: None, detail: String::new(), told: false }
    }

    fn refused(why: Why, detail: &str) -> Self {
        Self { index: Err(why), change: None, detail: quoted(detail), told: false }
    }

    /// The change, the first time that it is asked for.
    pub(super) fn tell_once(&mut self) -> Option<Change> {
        let change = self.change.filter(|_| !self.told);
        self.told = true;
        change
    }
}

pub(super) const MATERIAL: u8 = b'm';
pub(super) const STREAM: u8 = b's';
pub(super) const ROUTE: u8 = b'r';

/// Whether two names are the same but for case, spaces and marks.
fn same(a: &str, b: &str) -> bool {
    let letters = |text: &str| -> String {
        text.chars().filter(|c| is_letter(*c) || c.is_ascii_digit()).map(small).collect()
    };
    let a = letters(a);
    !a.is_empty() && a == letters(b)
}

/// Whether a word says how pure something is, for what, or how much: `HPLC`, `≥99.9%`, `p.a.`, `2.5`, `L`.
fn is_grade(word: &str) -> bool {
    const GRADES: [&str; 34] = [
        "hplc",
        "lc",
        "ms",
        "gc",
        "lcms",
        "gcms",
        "grade",
        "acs",
        "ar",
        "pa",
        "puriss",
        "purum",
        "pure",
        "reagent",
        "analytical",
        "analysis",
        "residue",
        "pesticide",
        "technical",
        "tech",
        "extra",
        "dry",
        "anhydrous",
        "stabilised",
        "stabilized",
        "inhibited",
        "for",
        "zur",
        "analyse",
        "rein",
        "bottle",
        "can",
        "drum",
        "uhplc",
    ];
    let letters: String = word.chars().filter(|c| is_letter(*c)).map(small).collect();
    letters.is_empty()
        || GRADES.contains(&letters.as_str())
        || (word.contains(|c: char| c.is_ascii_digit()) && super::LogUnit::named(&letters).is_some())
        || super::LogUnit::named(word).is_some()
}

/// A CAS number within a text, `Dichloromethane (75-09-2)`.
fn cas_in(text: &str) -> Option<&str> {
    text.split(|c: char| !(c.is_ascii_digit() || c == '-')).find(|word| is_cas(word))
}

/// Whether the text has the form of a CAS number: 2 to 7 digits, 2 digits, 1 digit.
fn is_cas(text: &str) -> bool {
    let mut parts = text.split('-');
    let lengths = [2..=7, 2..=2, 1..=1];
    let fits = lengths.into_iter().all(|length| {
        parts.next().is_some_and(|p| length.contains(&p.len()) && p.bytes().all(|b| b.is_ascii_digit()))
    });
    fits && parts.next().is_none()
}

/// Whether the check digit of a CAS number holds: the last digit is the sum of the others, each times its place from
/// the right, modulo 10 (CAS registry, check digit verification).
fn cas_holds(text: &str) -> bool {
    if !is_cas(text) {
        return false;
    }
    let mut digits = text.bytes().rev().filter(u8::is_ascii_digit).map(|b| u32::from(b - b'0'));
    let check = digits.next();
    // Σ i dᵢ mod 10
    let sum: u32 = (1..).zip(digits).map(|(i, d)| i * d).sum();
    check == Some(sum % 10)
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::account::account_text;
    use crate::example::EXAMPLES;

    fn names() -> Names {
        let account = account_text(EXAMPLES[0].text);
        Names::of(account.plan.as_ref().unwrap(), account.program.as_ref().unwrap())
    }

    fn material(names: &mut Names, name: &str, cas: &str) -> (Result<String, Why>, Option<Change>) {
        let found = names.look_up(MATERIAL, (name.as_bytes(), cas.as_bytes()), &[], &mut Vec::new()).clone();
        (found.index.map(|i| names.materials[usize::from(i)].name.clone()), found.change)
    }

    #[test]
    fn materials_are_found_as_ledgers_write_them() {
        let mut names = names();
        for (name, cas, is, change) in [
            ("acetone", "", "acetone", None),
            ("Acetone", "67-64-1", "acetone", None),
            ("", "67-64-1", "acetone", None),
            ("DCM", "", "dichloromethane", Some(Change::Synonym)),
            ("Acetone HPLC grade, 2.5 L", "", "acetone", Some(Change::NameRead)),
            ("Dichlormethan", "", "dichloromethane", Some(Change::Synonym)),
            ("Essigsäureethylester zur Analyse", "", "ethyl acetate", Some(Change::NameRead)),
            ("n-Hexan", "", "n-hexane", Some(Change::Synonym)),
            ("Toluol", "", "toluene", Some(Change::Synonym)),
            ("Isopropanol", "", "2-propanol", Some(Change::Synonym)),
            ("Dichloromethane (75-09-2) for residue analysis", "", "dichloromethane", Some(Change::NameRead)),
            ("n-Hexane >=99% GC", "", "n-hexane", Some(Change::NameRead)),
            ("Toluol p.a.", "108-88-3", "toluene", Some(Change::NameRead)),
        ] {
            assert_eq!(material(&mut names, name, cas), (Ok(is.to_owned()), change), "{name} {cas}");
        }
        for (name, cas, why) in [
            ("", "", Why::NoName),
            ("acetone oxime", "", Why::UnknownMaterial),
            ("unobtainium", "", Why::UnknownMaterial),
            ("=HYPERLINK(1)", "", Why::UnknownMaterial),
            ("acetone", "67-64-2", Why::CasDigit),
            ("acetone", "hello", Why::CasDigit),
            ("acetone", "75-09-2", Why::CasDiffers),
        ] {
            assert_eq!(material(&mut names, name, cas).0, Err(why), "{name} {cas}");
        }
    }

    /// CAS numbers of the catalogue's own table, whose source is another one: all of them hold.
    #[test]
    fn check_digits() {
        let mut count = 0;
        for cas in crate::material::catalogue().iter().filter_map(|s| s.cas.as_deref()) {
            assert!(cas_holds(cas), "{cas}");
            count += 1;
        }
        assert!(count > 40);
        assert!(!cas_holds("67-64-2") && !cas_holds("67641") && !cas_holds("1-2-3-4") && !cas_holds(""));
    }

    #[test]
    fn a_word_for_several_things_is_asked_and_never_guessed() {
        let mut names = names();
        for (word, several) in SEVERAL {
            // The catalogue must not know it, or it would be taken before.
            let found = names.look_up(MATERIAL, (word.as_bytes(), b""), &[], &mut Vec::new()).clone();
            assert_eq!((found.index, found.detail.as_str()), (Err(Why::UnknownMaterial), several));
        }
        let petrol = names.look_up(MATERIAL, ("Benzin".as_bytes(), b""), &[], &mut Vec::new()).detail.clone();
        assert!(!petrol.contains("benzene"), "{petrol}");
    }

    #[test]
    fn routes_are_found_by_route_or_work() {
        let mut names = names();
        let mut of = |text: &str| {
            let found = names.look_up(ROUTE, (text.as_bytes(), b""), &[], &mut Vec::new()).index;
            found.map(|i| names.routes[usize::from(i)].label.clone())
        };
        let soxhlet = of("soxhlet").unwrap();
        assert!(soxhlet.ends_with("/ Soxhlet"));
        assert_eq!(of(&soxhlet), Ok(soxhlet.clone()));
        assert_eq!(
            of(soxhlet.split(" / ").next().unwrap()),
            Ok(soxhlet.clone()),
            "the work is done by its present route"
        );
        assert_eq!(of(""), Ok(soxhlet));
        assert_eq!(of("SW-846 9999"), Err(Why::UnknownRoute));
    }

    #[test]
    fn what_the_user_says_comes_first() {
        let mut names = names();
        let means =
            [("SOX-1".to_owned(), "Soxhlet".to_owned()), ("Hexanes".to_owned(), "n-hexane".to_owned())];
        assert!(names.look_up(ROUTE, (b"SOX-1", b""), &means, &mut Vec::new()).index.is_ok());
        let found = names.look_up(MATERIAL, (b"Hexanes", b""), &means, &mut Vec::new());
        assert_eq!((found.index, found.detail.as_str()), (Ok(0), "n-hexane"));
    }
}
