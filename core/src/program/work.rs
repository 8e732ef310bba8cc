//! How much work there is: from reported results to extractions and batches.

use crate::chance::{Draw, In};
use crate::ledger::Halt;

/// How often a step happens.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum Basis {
    /// Once for each extraction: samples, their repeats and the controls that go with them.
    Sample,
    /// Once for each batch.
    Batch,
    /// Once a calendar month.
    Month,
    /// Once a year.
    Year,
}

impl Basis {
    /// The words of the plan, in order.
    pub const WORDS: [&'static str; 4] = ["sample", "batch", "month", "year"];

    /// The basis of this word.
    #[must_use]
    pub fn named(word: &str) -> Option<Self> {
        Some(match word {
            "sample" => Self::Sample,
            "batch" => Self::Batch,
            "month" => Self::Month,
            "year" => Self::Year,
            _ => return None,
        })
    }

    /// Its word.
    #[must_use]
    pub const fn word(self) -> &'static str {
        Self::WORDS[self as usize]
    }
}

/// The slots from which the number of runs follows.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Work {
    /// Results reported in a year.
    pub results: In,
    /// Samples in a batch as batches really leave, without the controls.
    pub batch_samples: In,
    /// Controls that go with a batch.
    pub batch_controls: In,
    /// Share of results done again.
    pub repeats: In,
    /// Whether repeats fill batches of their own and so bring controls.
    pub repeats_bring_controls: bool,
    /// Whether controls carry feed as samples do.
    pub controls_carry_feed: bool,
}

/// How often things happen in a year.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Runs {
    /// Results reported.
    pub results: f64,
    /// Extractions: samples, repeats and controls.
    pub extractions: f64,
    /// Batches.
    pub batches: f64,
    /// Share of extractions that carry feed.
    pub feed_share: f64,
}

impl Work {
    /// The number of runs in a year.
    ///
    /// `S` results of which the share `r` is done again, `n` samples and `c` controls in a batch. Batches are as full on
    /// average as the plan says they leave, so their number need not be whole.
    ///
    /// # Errors
    /// [`Halt::NoRuns`] when there is no work, or not a finite amount of it.
    pub fn runs(&self, x: Draw<'_>) -> Result<Runs, Halt> {
        let (results, n, c, r) =
            (x.get(self.results), x.get(self.batch_samples), x.get(self.batch_controls), x.get(self.repeats));
        // S (1 + r)
        let samples = results * (1.0 + r);
        // batches = S (1 + r) / n, or S / n when repeats ride along in batches that leave anyway
        let batches = if self.repeats_bring_controls { samples / n } else { results / n };
        // extractions = S (1 + r) + c · batches
        let extractions = samples + c * batches;
        let feed_share = if self.controls_carry_feed { 1.0 } else { samples / extractions };
        if results > 0.0 && extractions.is_finite() && batches > 0.0 && batches.is_finite() {
            Ok(Runs { results, extractions, batches, feed_share })
        } else {
            Err(Halt::NoRuns)
        }
    }
}

impl Runs {
    /// How often a step of this basis happens in a year.
    #[must_use]
    pub fn of(&self, basis: Basis) -> f64 {
        match basis {
            Basis::Sample => self.extractions,
            Basis::Batch => self.batches,
            Basis::Month => 12.0,
            Basis::Year => 1.0,
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    /// 1 400 results, batches of 13 with 4 controls, 3 % repeats that bring their own controls: 1 886 extractions
    /// (worked example of the trade's quality control, recomputed: 1400 · 1.03 · 17 / 13 = 1885.69).
    #[test]
    fn controls_and_part_full_batches_are_counted() {
        let work = Work {
            results: In(0),
            batch_samples: In(1),
            batch_controls: In(2),
            repeats: In(3),
            repeats_bring_controls: true,
            controls_carry_feed: false,
        };
        let x = [1400.0, 13.0, 4.0, 0.03];
        let runs = work.runs(Draw(&x)).unwrap();
        assert!((runs.extractions - 1_885.692_307_692_307_7).abs() < 1e-9);
        assert!((runs.batches - 110.923_076_923_076_92).abs() < 1e-9);
        assert!((runs.feed_share - 13.0 / 17.0).abs() < 1e-15);
        let shared = Work { repeats_bring_controls: false, ..work }.runs(Draw(&x)).unwrap();
        assert!((shared.extractions - (1442.0 + 4.0 * 1400.0 / 13.0)).abs() < 1e-9);
    }
}
