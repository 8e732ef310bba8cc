//! How large a label and its pictograms are at least, by what the package holds.

use crate::source::{Source, Standing};

/// Where the sizes stand. They bind substances and mixtures on the market; waste is neither (Article 1(3), from memory).
pub const LABEL_SIZE: Source =
    Source::new("Regulation (EC) No 1272/2008, Annex I, 1.2.1.4, table 1.3", Standing::Secondary);

/// The least size of a label, short side first, and the least side of each pictogram; mm. Up to 3 L "if possible".
///
/// ```
/// use thimbleworth::hazard::label_size_mm;
/// assert_eq!(label_size_mm(0.003), ([52, 74], 16));
/// assert_eq!(label_size_mm(0.020), ([74, 105], 23));
/// assert_eq!(label_size_mm(0.200), ([105, 148], 32));
/// assert_eq!(label_size_mm(0.501), ([148, 210], 46));
/// ```
#[must_use]
pub const fn label_size_mm(capacity_m3: f64) -> ([u16; 2], u16) {
    // A litre that is a rounding above is that litre.
    match capacity_m3 / (1.0 + 1e-9) {
        v if v <= 0.003 => ([52, 74], 16),
        v if v <= 0.050 => ([74, 105], 23),
        v if v <= 0.500 => ([105, 148], 32),
        _ => ([148, 210], 46),
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn both_sides_of_every_threshold() {
        for (litres, short) in
            [(2.999, 52), (3.0, 52), (3.001, 74), (50.0, 74), (50.01, 105), (500.0, 105), (500.1, 148)]
        {
            assert_eq!(label_size_mm(litres * 1e-3).0[0], short, "{litres} L");
            assert_eq!(label_size_mm(litres / 1000.0).0[0], short, "{litres} L");
        }
    }
}
