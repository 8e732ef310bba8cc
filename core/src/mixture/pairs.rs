//! The pairs of one mixture.
use super::{LARGEST, MixtureError, PairLaw, Wilson, find_pair};
use crate::material::{Class, Solubility, Substance};

/// A pair that is taken as ideal because nothing is known of it.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct IdealPair {
    /// One component, its place in the mixture.
    pub first: usize,
    /// The other.
    pub second: usize,
}

/// What holds between each two components of a mixture; made once, when a plan is resolved.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Pairs {
    count: usize,
    /// aᵢⱼ and bᵢⱼ of `ln Λᵢⱼ = aᵢⱼ + bᵢⱼ/T`; zero on the diagonal and for ideal pairs.
    pub(super) a: [[f64; LARGEST]; LARGEST],
    pub(super) b_k: [[f64; LARGEST]; LARGEST],
    /// Whether anything is known of the pair i < j.
    known: [[bool; LARGEST]; LARGEST],
    low_k: f64,
    high_k: f64,
}

impl Pairs {
    /// Every pair ideal; to be set one by one with [`Pairs::set`].
    ///
    /// ```
    /// let pairs = thimbleworth::mixture::Pairs::ideal(3).unwrap();
    /// assert_eq!(pairs.ideal_pairs().count(), 3);
    /// ```
    ///
    /// # Errors
    /// [`MixtureError::Count`] unless there are 1 to [`LARGEST`] components.
    pub const fn ideal(count: usize) -> Result<Self, MixtureError> {
        if count == 0 || count > LARGEST {
            return Err(MixtureError::Count { found: count });
        }
        let zeros = [[0.0; LARGEST]; LARGEST];
        Ok(Self {
            count,
            a: zeros,
            b_k: zeros,
            known: [[false; LARGEST]; LARGEST],
            low_k: 0.0,
            high_k: f64::INFINITY,
        })
    }

    /// The pairs between materials, from the table; those of which nothing is known are ideal, and
    /// [`Pairs::ideal_pairs`] names them.
    ///
    /// ```
    /// use thimbleworth::material::catalogue;
    /// use thimbleworth::mixture::{MixtureError, Pairs};
    /// let find = |name| catalogue().find(name).unwrap();
    /// let pairs = Pairs::between(&[find("hexane"), find("acetone"), find("anisole")]).unwrap();
    /// assert_eq!(pairs.ideal_pairs().map(|p| (p.first, p.second)).collect::<Vec<_>>(), [(0, 2), (1, 2)]);
    /// let error = Pairs::between(&[find("dcm"), find("water")]).unwrap_err();
    /// assert!(matches!(error, MixtureError::TwoLiquids { .. }));
    /// ```
    ///
    /// # Errors
    /// [`MixtureError::TwoLiquids`] where two of them do not mix: by the table, or because the solubility of one in
    /// water is limited and water is there. [`MixtureError::Count`].
    pub fn between(substances: &[&Substance]) -> Result<Self, MixtureError> {
        let mut pairs = Self::ideal(substances.len())?;
        for (j, second) in substances.iter().enumerate() {
            for (i, first) in substances.iter().enumerate().take(j) {
                let splits =
                    || MixtureError::TwoLiquids { first: first.name.clone(), second: second.name.clone() };
                match find_pair(&first.name, &second.name).map(|pair| pair.law) {
                    Some(PairLaw::Wilson(wilson)) => pairs.set(i, j, wilson)?,
                    Some(PairLaw::Splits) => return Err(splits()),
                    None if limited(first, second) || limited(second, first) => return Err(splits()),
                    None => {}
                }
            }
        }
        Ok(pairs)
    }

    /// Sets the constants between components `i` and `j`, which are 1 and 2 of them.
    ///
    /// # Errors
    /// [`MixtureError::Mismatch`] when one of the two is not there or both are the same.
    pub fn set(&mut self, i: usize, j: usize, wilson: Wilson) -> Result<(), MixtureError> {
        if i >= self.count || j >= self.count || i == j {
            let found = if i > j { i + 1 } else { j + 1 };
            return Err(MixtureError::Mismatch { found, components: self.count });
        }
        self.a[i][j] = wilson.a12;
        self.b_k[i][j] = wilson.b12_k;
        self.a[j][i] = wilson.a21;
        self.b_k[j][i] = wilson.b21_k;
        self.known[i][j] = true;
        self.known[j][i] = true;
        if wilson.low_k > self.low_k {
            self.low_k = wilson.low_k;
        }
        if wilson.high_k < self.high_k {
            self.high_k = wilson.high_k;
        }
        Ok(())
    }

    /// The number of components.
    #[must_use]
    pub const fn count(&self) -> usize {
        self.count
    }

    /// The range in which all pairs hold, K.
    #[must_use]
    pub const fn range_k(&self) -> (f64, f64) {
        (self.low_k, self.high_k)
    }

    /// The pairs that are taken as ideal because nothing is known of them; [`ideal_error`](super::ideal_error) says how
    /// far that can be out.
    pub fn ideal_pairs(&self) -> impl Iterator<Item = IdealPair> + '_ {
        (0..self.count).flat_map(move |second| {
            (0..second)
                .filter(move |&first| !self.known[first][second])
                .map(move |first| IdealPair { first, second })
        })
    }
}

fn limited(water: &Substance, other: &Substance) -> bool {
    water.class == Class::Water && matches!(other.solubility_in_water, Solubility::Limited(_))
}
