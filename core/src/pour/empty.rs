//! When a container that held hazardous waste counts as empty in the United States.

use crate::source::{Source, Standing};

/// The rule.
pub const EMPTY: Source = Source::new("40 CFR 261.7(b)(1)", Standing::Secondary);
/// 119 gal; m³.
const LARGE_M3: f64 = 0.450_464;

/// What is left in a container once everything was removed by the usual means.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Residue {
    /// Depth on the bottom; m.
    Depth(f64),
    /// Share by mass of what the container can hold.
    Share(f64),
}

/// Whether a container of non-acute waste counts as empty: at most 2.5 cm on the bottom, or at most 3 % of its capacity by mass (0.3 %
/// above 119 gal). Acute waste asks for three rinses instead.
///
/// ```
/// use thimbleworth::pour::{Residue, is_empty};
/// // a 55 gal drum
/// let empty = |share| is_empty(Residue::Share(share), 0.2082);
/// assert_eq!((empty(0.029), empty(0.03), empty(0.031)), (true, true, false));
/// ```
#[must_use]
pub fn is_empty(residue: Residue, capacity_m3: f64) -> bool {
    match residue {
        // 1 in = 2.54 cm, which the rule writes as 2.5 cm
        Residue::Depth(m) => m <= 0.0254,
        Residue::Share(share) if capacity_m3 <= LARGE_M3 => share <= 0.03,
        Residue::Share(share) => share <= 0.003,
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn both_sides_of_each_limit() {
        for (residue, m3, empty) in [
            (Residue::Depth(0.025), 0.2, true),
            (Residue::Depth(0.026), 0.2, false),
            (Residue::Share(0.03), 0.45, true),
            (Residue::Share(0.003), 0.46, true),
            (Residue::Share(0.0031), 0.46, false),
        ] {
            assert_eq!(is_empty(residue, m3), empty, "{residue:?}");
        }
    }
}
