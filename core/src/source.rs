//! Where a figure or a formula comes from, and how far that has been traced.

/// How far a source has been traced.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum Standing {
    /// True by definition or by conservation of mass; needs no witness.
    Definition,
    /// Read in the primary text.
    Primary,
    /// Seen in a secondary text that quotes the primary one.
    Secondary,
    /// Recomputed from the stated formula; agrees with itself, not with print.
    Recomputed,
    /// From memory: a default, never proof.
    FromMemory,
    /// A fact of the trade: common practice, no source.
    CommonPractice,
    /// Entered by the user of the plan.
    Site,
}

impl Standing {
    /// The words shown beside a figure.
    ///
    /// ```
    /// assert_eq!(thimbleworth::source::Standing::FromMemory.words(), "from memory");
    /// ```
    #[must_use]
    pub const fn words(self) -> &'static str {
        match self {
            Self::Definition => "by definition",
            Self::Primary => "read in the source",
            Self::Secondary => "seen in a secondary source",
            Self::Recomputed => "recomputed",
            Self::FromMemory => "from memory",
            Self::CommonPractice => "common practice, no source",
            Self::Site => "entered in the plan",
        }
    }
}

/// A citation with its standing.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Source {
    /// The citation, with edition, section or table where there is one.
    pub cite: &'static str,
    /// How far it has been traced.
    pub standing: Standing,
}

impl Source {
    /// A citation with its standing.
    #[must_use]
    pub const fn new(cite: &'static str, standing: Standing) -> Self {
        Self { cite, standing }
    }
}

/// True by definition.
pub const DEFINITION: Source = Source::new("definition", Standing::Definition);
/// Conservation of mass.
pub const MASS_BALANCE: Source = Source::new("conservation of mass", Standing::Definition);
/// A fact of the trade without a source.
pub const COMMON_PRACTICE: Source = Source::new("common practice, no source", Standing::CommonPractice);
/// A default from memory.
pub const FROM_MEMORY: Source = Source::new("from memory", Standing::FromMemory);
/// What the plan's own site states.
pub const SITE: Source = Source::new("the site's own figure", Standing::Site);
