//! Category of a generator in one calendar month, and how far it is to the next.

use crate::source::{Source, Standing};

/// The table of categories.
pub const CATEGORY: Source = Source::new("40 CFR 262.13 Table 1, since 2017-05-30", Standing::Secondary);
/// Limits of time and mass on site.
pub const STORAGE: Source =
    Source::new("40 CFR 262.14(a), 262.16(b), 262.17(a), since 2017-05-30", Standing::Secondary);
/// Satellite areas.
pub const SATELLITE: Source = Source::new(
    "40 CFR 262.15, since 2017-05-30; 55 gal in an area; the three days to move the excess are from memory",
    Standing::Secondary,
);

/// Category of a generator.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum Category {
    /// Very small quantity generator.
    Vsqg,
    /// Small quantity generator.
    Sqg,
    /// Large quantity generator.
    Lqg,
}

impl Category {
    /// The letters by which it is known.
    #[must_use]
    pub const fn word(self) -> &'static str {
        match self {
            Self::Vsqg => "VSQG",
            Self::Sqg => "SQG",
            Self::Lqg => "LQG",
        }
    }

    /// The longest that waste may be stored; days; `None` without a limit of time.
    #[must_use]
    pub const fn storage_days(self, far_receiver: bool) -> Option<u16> {
        match self {
            Self::Vsqg => None,
            Self::Sqg => Some(if far_receiver { 270 } else { 180 }),
            Self::Lqg => Some(90),
        }
    }

    /// The most that may lie on site; kg; `None` without such a limit.
    #[must_use]
    pub const fn on_site_kg(self) -> Option<f64> {
        match self {
            Self::Vsqg => Some(1000.0),
            Self::Sqg => Some(6000.0),
            Self::Lqg => None,
        }
    }
}

/// Hazardous waste made in one calendar month by one site; kg.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub struct Made {
    /// Not acute.
    pub kg: f64,
    /// Acutely hazardous.
    pub acute_kg: f64,
    /// Residue from cleaning up spills of acutely hazardous waste.
    pub acute_residue_kg: f64,
}

/// The category of a month.
///
/// ```
/// use thimbleworth::generator::{Category, Made, category};
/// let of = |kg| category(Made { kg, ..Made::default() });
/// assert_eq!((of(100.0), of(100.1), of(999.9), of(1000.0)), (Category::Vsqg, Category::Sqg, Category::Sqg, Category::Lqg));
/// ```
#[must_use]
pub fn category(made: Made) -> Category {
    if made.acute_kg > 1.0 || made.kg >= 1000.0 || made.acute_residue_kg > 100.0 {
        Category::Lqg
    } else if made.kg > 100.0 {
        Category::Sqg
    } else {
        Category::Vsqg
    }
}

/// How many samples a month may bring, each `kg_each`, on top of what is made anyway, before the category passes `most`; `None`
/// where samples bring nothing, or where no number of them passes it.
///
/// ```
/// use thimbleworth::generator::{Category, Made, headroom};
/// let base = Made { kg: 95.0, ..Made::default() };
/// assert_eq!(headroom(base, 1.27275, Category::Sqg), Some(711));
/// assert_eq!(headroom(base, 1.27275, Category::Vsqg), Some(3));
/// ```
#[must_use]
pub fn headroom(base: Made, kg_each: f64, most: Category) -> Option<u64> {
    if kg_each <= 0.0 || kg_each.is_nan() || most == Category::Lqg {
        return None;
    }
    if category(base) > most {
        return Some(0);
    }
    let limit = if most == Category::Vsqg { 100.0 } else { 1000.0 };
    // n = ⌊(limit − base) / each⌋, one less where that many stand at a limit that may not be reached
    let mut n = libm::floor((limit - base.kg) / kg_each);
    while n > 0.0 && category(Made { kg: base.kg + n * kg_each, ..base }) > most {
        n -= 1.0;
    }
    Some(n as u64)
}

#[cfg(test)]
mod tests {
    use super::*;

    /// 40 CFR 262.13 Table 1, both sides of each line.
    #[test]
    fn the_table_of_categories() {
        for (kg, acute_kg, acute_residue_kg, word) in [
            (0.0, 0.0, 0.0, "VSQG"),
            (100.0, 0.0, 0.0, "VSQG"),
            (100.1, 0.0, 0.0, "SQG"),
            (999.9, 0.0, 0.0, "SQG"),
            (1000.0, 0.0, 0.0, "LQG"),
            (50.0, 1.0, 0.0, "VSQG"),
            (50.0, 1.01, 0.0, "LQG"),
            (10.0, 0.0, 100.0, "VSQG"),
            (10.0, 0.0, 100.1, "LQG"),
            (500.0, 1.0, 100.0, "SQG"),
        ] {
            assert_eq!(category(Made { kg, acute_kg, acute_residue_kg }).word(), word);
        }
    }

    #[test]
    fn a_limit_that_may_not_be_reached_is_not() {
        let base = Made::default();
        assert_eq!(headroom(base, 10.0, Category::Sqg), Some(99));
        assert_eq!(headroom(base, 10.0, Category::Vsqg), Some(10));
        assert_eq!(headroom(Made { kg: 120.0, ..base }, 10.0, Category::Vsqg), Some(0));
        assert_eq!(headroom(base, 0.0, Category::Sqg), None);
        assert_eq!(headroom(base, f64::NAN, Category::Sqg), None);
    }
}
