//! What is wrong or doubtful in a plan: where, what was found, what would do.

/// How much a problem weighs.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum Severity {
    /// The plan cannot be accounted as it stands.
    Error,
    /// Possible but unusual, assumed, or not stated.
    Warning,
    /// Worth knowing; nothing need be done.
    Note,
}

impl Severity {
    /// The word shown.
    #[must_use]
    pub const fn word(self) -> &'static str {
        match self {
            Self::Error => "error",
            Self::Warning => "warning",
            Self::Note => "note",
        }
    }
}

/// One problem of a plan.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Problem {
    /// The exact path, `workloads[0].routes[1].steps[2].charge`; empty for the document as a whole.
    pub path: String,
    /// How much it weighs.
    pub severity: Severity,
    /// What was found, as a sentence without a full stop.
    pub found: String,
    /// What would do, as a sentence without a full stop; may be empty for notes.
    pub need: String,
}

impl Problem {
    /// An error.
    #[must_use]
    pub fn error(path: impl Into<String>, found: impl Into<String>, need: impl Into<String>) -> Self {
        Self { path: path.into(), severity: Severity::Error, found: found.into(), need: need.into() }
    }

    /// A warning.
    #[must_use]
    pub fn warning(path: impl Into<String>, found: impl Into<String>, need: impl Into<String>) -> Self {
        Self { path: path.into(), severity: Severity::Warning, found: found.into(), need: need.into() }
    }

    /// A note.
    #[must_use]
    pub fn note(path: impl Into<String>, found: impl Into<String>) -> Self {
        Self { path: path.into(), severity: Severity::Note, found: found.into(), need: String::new() }
    }
}
