//! Warming potentials by edition, and where CO2 comes from. Each kind of emission is a line of its own; nothing here nets
//! one against another.

use crate::source::{Source, Standing};

/// The assessment report whose 100-year warming potentials are read.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub enum Edition {
    /// IPCC Fourth Assessment Report, 2007.
    Ar4,
    /// Fifth, 2013.
    Ar5,
    /// Sixth, 2021.
    #[default]
    Ar6,
}

impl Edition {
    /// The words of all.
    pub const WORDS: &'static [&'static str] = &["AR4", "AR5", "AR6"];

    /// The edition of the plan's word.
    #[must_use]
    pub fn named(word: &str) -> Option<Self> {
        match word {
            "AR4" => Some(Self::Ar4),
            "AR5" => Some(Self::Ar5),
            "AR6" => Some(Self::Ar6),
            _ => None,
        }
    }

    /// The plan's word.
    #[must_use]
    pub const fn word(self) -> &'static str {
        match self {
            Self::Ar4 => "AR4",
            Self::Ar5 => "AR5",
            Self::Ar6 => "AR6",
        }
    }
}

/// Where CO2 that is bought and vented comes from: four states, because no single switch is right for all of them.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Origin {
    /// Caught from a fossil process that would have vented it.
    FossilByProduct,
    /// From fermentation and the like.
    Biogenic,
    /// From a natural well: additional to the last gram.
    NaturalWell,
    /// Taken out of the air.
    AirCapture,
}

impl Origin {
    /// The words of all.
    pub const WORDS: &'static [&'static str] =
        &["fossil by-product", "biogenic", "natural well", "air capture"];

    /// The origin of the plan's word.
    #[must_use]
    pub fn named(word: &str) -> Option<Self> {
        match word {
            "fossil by-product" => Some(Self::FossilByProduct),
            "biogenic" => Some(Self::Biogenic),
            "natural well" => Some(Self::NaturalWell),
            "air capture" => Some(Self::AirCapture),
            _ => None,
        }
    }

    /// The plan's word.
    #[must_use]
    pub const fn word(self) -> &'static str {
        match self {
            Self::FossilByProduct => "fossil by-product",
            Self::Biogenic => "biogenic",
            Self::NaturalWell => "natural well",
            Self::AirCapture => "air capture",
        }
    }

    /// Where an inventory lists it, and why.
    #[must_use]
    pub const fn scope(self) -> &'static str {
        match self {
            Self::FossilByProduct => {
                "scope 1 of a corporate inventory; under emissions trading the plant that caught it has as a rule paid for it already, so that a national sum would count it twice"
            }
            Self::Biogenic => "outside the scopes, listed by itself",
            Self::NaturalWell => "scope 1, fully additional",
            Self::AirCapture => "listed by itself: what is vented had been taken out of the air",
        }
    }
}

/// IPCC tables as held by a general property library; figures of AR6 for ethers and the like are not complete.
pub const GWP_SOURCE: Source = Source::new(
    "IPCC assessment reports AR4, AR5, AR6: 100-year global warming potentials",
    Standing::Secondary,
);

/// CAS number and 100-year potentials by AR4, AR5 and AR6; 0 where that report gives none.
static GWP100: [(&str, [f64; 3]); 9] = [
    ("75-09-2", [8.7, 9.0, 11.2]),
    ("67-66-3", [0.0, 16.0, 20.6]),
    ("56-23-5", [1400.0, 1730.0, 2200.0]),
    ("811-97-2", [1430.0, 1300.0, 1530.0]),
    ("71-55-6", [146.0, 160.0, 161.0]),
    ("127-18-4", [0.0, 0.0, 6.34]),
    ("107-06-2", [0.0, 0.899, 1.3]),
    ("74-82-8", [25.0, 28.0, 27.9]),
    ("10024-97-2", [298.0, 265.0, 273.0]),
];

/// The 100-year warming potential of a gas by its CAS number; `None` where that edition gives none.
///
/// ```
/// use thimbleworth::climate::{Edition, gwp100};
/// assert_eq!(gwp100("75-09-2", Edition::Ar6), Some(11.2));
/// assert_eq!(gwp100("67-66-3", Edition::Ar4), None);
/// ```
#[must_use]
pub fn gwp100(cas: &str, edition: Edition) -> Option<f64> {
    let (_, potentials) = GWP100.iter().find(|(c, _)| *c == cas)?;
    let [ar4, ar5, ar6] = *potentials;
    let value = match edition {
        Edition::Ar4 => ar4,
        Edition::Ar5 => ar5,
        Edition::Ar6 => ar6,
    };
    (value > 0.0).then_some(value)
}
