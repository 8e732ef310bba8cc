//! How far an ideal mixture can be from a real one.
use super::{Component, Mixture, PairLaw, Pairs, pair_table};
use crate::material::catalogue;
use std::sync::OnceLock;

/// How far Raoult's law lies from the pairs of which something is known, at 20 °C over all compositions.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct IdealError {
    /// The lowest ratio of real to ideal pressure over the liquid; 1.
    pub lowest: f64,
    /// The highest; 1.
    pub highest: f64,
    /// The ratio that half of the pairs exceed at equal moles; 1.
    pub median: f64,
    /// How many pairs were compared, homologues left out.
    pub pairs: usize,
}

/// The temperature of the comparison, K.
const AT_K: f64 = 293.15;

/// By how much the pressure over an ideal pair can be wrong: what the known pairs show.
///
/// For the reader of a figure whose pairs are unknown: the real pressure lies between `lowest` and `highest` times the ideal one for all pairs in the
/// table. A pair that splits can lie higher still. Computed once from the table and the catalogue.
///
/// ```
/// let error = thimbleworth::mixture::ideal_error();
/// assert!(error.lowest < 0.9 && error.highest > 1.5);
/// ```
pub fn ideal_error() -> IdealError {
    static ERROR: OnceLock<IdealError> = OnceLock::new();
    *ERROR.get_or_init(compare)
}

fn compare() -> IdealError {
    let (mut lowest, mut highest) = (1.0, 1.0);
    let mut middle = Vec::new();
    for pair in pair_table() {
        let PairLaw::Wilson(wilson) = pair.law else { continue };
        if wilson.b12_k == 0.0 && wilson.b21_k == 0.0 {
            continue;
        }
        let mut at_equal_moles = None;
        for step in 1..20 {
            let x = f64::from(step) / 20.0;
            let Some(ratio) = ratio(&pair.first, &pair.second, wilson, x) else { break };
            if ratio < lowest {
                lowest = ratio;
            }
            if ratio > highest {
                highest = ratio;
            }
            if step == 10 {
                at_equal_moles = Some(ratio);
            }
        }
        middle.extend(at_equal_moles);
    }
    middle.sort_by(f64::total_cmp);
    let median = middle.get(middle.len() / 2).copied().unwrap_or(1.0);
    IdealError { lowest, highest, median, pairs: middle.len() }
}

fn ratio(first: &str, second: &str, wilson: super::Wilson, x: f64) -> Option<f64> {
    let substances = [catalogue().find(first).ok()?, catalogue().find(second).ok()?];
    let mut pairs = Pairs::ideal(2).ok()?;
    pairs.set(0, 1, wilson).ok()?;
    let [first, second] = substances;
    let components = [Component::of(first, AT_K).ok()?, Component::of(second, AT_K).ok()?];
    let mixture = Mixture::new(&components, &pairs).ok()?;
    let amounts = [x, 1.0 - x];
    let real = mixture.bubble_pressure_pa(&amounts, AT_K).ok()?;
    Some(real / mixture.ideal_bubble_pressure_pa(&amounts, AT_K).ok()?)
}
