//! The solvent balance of Directive 2010/75/EU, Annex VII, Part 7.

use super::{Line, Names, Posted, Reconciliation, SolventAccount};
use crate::source::{Source, Standing};

/// Where the balance is laid down.
pub const SOLVENT_BALANCE: Source =
    Source::new("Directive 2010/75/EU, Annex VII, Part 7; Article 3(45) and (46)", Standing::Secondary);

/// The solvent balance of a period: inputs and outputs by the directive's names.
///
/// ```
/// use thimbleworth::log::{Line, SolventBalance};
/// let kg = |kg| Line { kg, u_kg: 0.0, rows: 1 };
/// let mut balance = SolventBalance { i1: kg(1000.0), ..SolventBalance::default() };
/// balance.o[0] = kg(200.0); // O1, stacks
/// balance.o[5] = kg(650.0); // O6, waste
/// balance.o[7] = kg(50.0); // O8, off to be reclaimed
/// assert_eq!(balance.fugitive().kg, 100.0);
/// assert_eq!(balance.consumption().kg, 950.0);
/// assert_eq!(balance.emission().kg, 300.0);
/// ```
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub struct SolventBalance {
    /// Bought and used.
    pub i1: Line,
    /// Recovered and used again, each time it is used.
    pub i2: Line,
    /// O1 to O9.
    pub o: [Line; 9],
}

/// What each output is, in the order of its number.
pub const OUTPUTS: [&str; 9] = [
    "emissions in waste gases",
    "lost in water",
    "left in products",
    "uncaptured emissions to air",
    "destroyed or bound",
    "in collected waste",
    "sold in products",
    "recovered for reuse, not as input here",
    "released in other ways",
];

impl SolventBalance {
    fn output(&self, number: usize) -> Line {
        self.o.get(number - 1).copied().unwrap_or_default()
    }

    /// Fugitive emission by what is left: F = I1 − O1 − O5 − O6 − O7 − O8.
    #[must_use]
    pub fn fugitive(&self) -> Line {
        let mut parts = vec![(1.0, self.i1)];
        parts.extend([1, 5, 6, 7, 8].map(|number| (-1.0, self.output(number))));
        Line::joined(&parts)
    }

    /// Fugitive emission by its parts, as the ledger posts them: F = O2 + O3 + O4 + O9.
    #[must_use]
    pub fn fugitive_posted(&self) -> Line {
        Line::joined(&[2, 3, 4, 9].map(|number| (1.0, self.output(number))))
    }

    /// What the postings do not explain of the fugitive emission: the finding.
    #[must_use]
    pub fn unexplained(&self) -> Line {
        Line::joined(&[(1.0, self.fugitive()), (-1.0, self.fugitive_posted())])
    }

    /// Total emission: E = F + O1.
    #[must_use]
    pub fn emission(&self) -> Line {
        // O1 is in F with the other sign: E = I1 − O5 − O6 − O7 − O8
        let mut parts = vec![(1.0, self.i1)];
        parts.extend([5, 6, 7, 8].map(|number| (-1.0, self.output(number))));
        Line::joined(&parts)
    }

    /// Consumption: C = I1 − O8.
    #[must_use]
    pub fn consumption(&self) -> Line {
        Line::joined(&[(1.0, self.i1), (-1.0, self.output(8))])
    }

    /// The balance of one solvent; `None` where a register of it is missing.
    #[must_use]
    pub fn of(account: &SolventAccount) -> Option<Self> {
        let used = account.used().filter(|_| account.recorded.consignments)?;
        let posted = |account_of| account.posted(account_of);
        let mut collected = account.consigned;
        collected.add_dependent(&posted(Posted::Elsewhere));
        Some(Self {
            i1: used,
            i2: posted(Posted::Reused),
            o: [
                posted(Posted::Hood),
                posted(Posted::Drain),
                posted(Posted::Product),
                posted(Posted::Room),
                posted(Posted::Destroyed),
                collected,
                posted(Posted::ByProduct),
                account.reclaimed,
                posted(Posted::Held),
            ],
        })
    }

    /// Adds another solvent. Their figures come from the same scales, so their uncertainties are added up.
    pub fn add(&mut self, other: &Self) {
        self.i1.add_dependent(&other.i1);
        self.i2.add_dependent(&other.i2);
        for (mine, theirs) in self.o.iter_mut().zip(&other.o) {
            mine.add_dependent(theirs);
        }
    }
}

/// The balance of each organic solvent over the whole time, and of all of them; empty where there is none
/// or a register is missing.
///
/// Organic solvents are the solvents of the catalogue and the plan with carbon and a vapour pressure of at least 0.01 kPa
/// at 293.15 K (Article 3(45)), and those whose vapour pressure is not known.
#[must_use]
pub fn solvent_balance(
    found: &Reconciliation,
    names: &Names,
) -> (Vec<(usize, SolventBalance)>, SolventBalance) {
    let accounts = if found.whole.is_empty() { &found.quarters } else { &found.whole };
    let mut all = SolventBalance::default();
    let mut out = Vec::new();
    for account in accounts {
        if names.materials.get(account.material).is_some_and(|m| m.voc)
            && let Some(balance) = SolventBalance::of(account)
        {
            all.add(&balance);
            out.push((account.material, balance));
        }
    }
    (out, all)
}
