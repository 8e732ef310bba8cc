//! One step read by itself, to see what its technique asks for.

use super::amounts::Amounts;
use super::materials::MaterialBook;
use super::resolve::RouteBuilder;
use super::{Reader, SiteUse, SiteWaste};
use crate::plan::{Problem, Step as StepDoc};
use crate::step::Technique;

/// The parameters that a technique asks for when it reads a step, each once and in the order asked, and the problems met.
///
/// A technique has to ask for every parameter that it declares, whatever the step says: what it does not ask for is
/// never checked. The site has no streams here, so that only the book's own places are known.
///
/// ```
/// use thimbleworth::plan::{Field, Step};
/// use thimbleworth::{program::asked, step::technique};
/// let discard = technique("discard").unwrap();
/// let text = |key: &str, word: &str| (key.to_owned(), Field::Text(word.to_owned()));
/// let step = Step { technique: "discard".to_owned(), fields: vec![text("from", "marc"), text("to", "product")], ..Step::default() };
/// let (keys, problems) = asked(discard, &step);
/// assert_eq!((keys, problems.len()), (vec!["from", "to"], 0));
/// ```
#[must_use]
pub fn asked(technique: &'static Technique, step: &StepDoc) -> (Vec<&'static str>, Vec<Problem>) {
    let mut problems = Vec::new();
    let mut book = MaterialBook::read(&[], &mut problems);
    let site = SiteUse {
        name: String::new(),
        rules: "none".to_owned(),
        as_of: None,
        bench_temperature_k: 293.15,
        streams: Vec::new(),
        waste: SiteWaste::default(),
        room: None,
    };
    let mut amounts = Amounts::default();
    let mut route = RouteBuilder::new(&mut book, &mut amounts, &site, false, &mut problems);
    let mut reader = Reader::new(&mut route, technique, step, "step".to_owned());
    (technique.read)(&mut reader);
    let mut keys: Vec<&'static str> = Vec::new();
    for key in reader.asked() {
        if !keys.contains(key) {
            keys.push(key);
        }
    }
    reader.finish();
    (keys, problems)
}
