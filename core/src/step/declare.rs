//! What a technique declares, once: its parameters and its rules. The plan's reader, the page's form, the schema and
//! the documentation all come from these tables.

use crate::quantity::Kind;
use crate::source::{SITE, Source};

/// How a parameter is entered.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Control {
    /// An amount with a unit.
    Quantity(Kind),
    /// One of the listed words.
    Choice(&'static [&'static str]),
    /// The name of one material.
    Material,
    /// One material, or several with their shares (by volume unless every share says `w/w`).
    Mixture,
    /// Materials, each with an amount of the given kind: `{ "lavender oil": "92 %" }`.
    PerMaterial(Kind),
    /// Streams of the site, each with an amount of the given kind.
    PerStream(Kind),
    /// Any text.
    Text,
    /// A whole number; exact, never uncertain, so that the sequence of postings is the same in every draw.
    Count,
    /// Yes or no.
    YesNo,
    /// A place where mass may go: a declared stream or one of the book's own places.
    Place,
}

/// Whether a parameter must be written.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Need {
    /// It must be written.
    Required,
    /// It may be left out: then it is simply absent.
    Optional,
    /// It may be left out: then this text is read in its place, and shown as assumed, with the source of the default.
    Default(&'static str, Source),
}

/// One declared parameter of a technique.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Param {
    /// The key in the plan.
    pub key: &'static str,
    /// The label on the form.
    pub label: &'static str,
    /// How it is entered.
    pub control: Control,
    /// Whether it must be written.
    pub need: Need,
    /// Bounds in SI outside which the value is impossible (an error).
    pub physical: (f64, f64),
    /// Bounds in SI outside which the value is unusual (a warning).
    pub usual: (f64, f64),
    /// One sentence of help.
    pub hint: &'static str,
    /// Where the bounds and the usual range come from.
    pub source: Source,
    /// Shown (and read) only when another parameter has one of these values.
    pub shown_when: Option<(&'static str, &'static [&'static str])>,
    /// Shown (and read) only where this other parameter is written: without it there is nothing it could apply to.
    pub with: Option<&'static str>,
    /// Shown (and read) only where this other parameter is not written: that one stands in its place.
    pub without: Option<&'static str>,
}

impl Param {
    /// A parameter with no bounds yet, optional.
    #[must_use]
    pub const fn new(key: &'static str, label: &'static str, control: Control) -> Self {
        Self {
            key,
            label,
            control,
            need: Need::Optional,
            physical: (f64::NEG_INFINITY, f64::INFINITY),
            usual: (f64::NEG_INFINITY, f64::INFINITY),
            hint: "",
            source: SITE,
            shown_when: None,
            with: None,
            without: None,
        }
    }

    /// An amount with a unit.
    #[must_use]
    pub const fn quantity(key: &'static str, label: &'static str, kind: Kind) -> Self {
        Self::new(key, label, Control::Quantity(kind))
    }

    /// It must be written.
    #[must_use]
    pub const fn required(mut self) -> Self {
        self.need = Need::Required;
        self
    }

    /// What is read in its place when it is left out, and where that default comes from.
    #[must_use]
    pub const fn default(mut self, text: &'static str, source: Source) -> Self {
        self.need = Need::Default(text, source);
        self
    }

    /// Bounds in SI outside which the value is impossible.
    #[must_use]
    pub const fn physical(mut self, low: f64, high: f64) -> Self {
        self.physical = (low, high);
        self
    }

    /// Bounds in SI outside which the value is unusual.
    #[must_use]
    pub const fn usual(mut self, low: f64, high: f64) -> Self {
        self.usual = (low, high);
        self
    }

    /// One sentence of help.
    #[must_use]
    pub const fn hint(mut self, hint: &'static str) -> Self {
        self.hint = hint;
        self
    }

    /// Where the usual range comes from.
    #[must_use]
    pub const fn source(mut self, source: Source) -> Self {
        self.source = source;
        self
    }

    /// Shown and read only when the parameter `key` has one of `values`.
    #[must_use]
    pub const fn when(mut self, key: &'static str, values: &'static [&'static str]) -> Self {
        self.shown_when = Some((key, values));
        self
    }

    /// Shown and read only where the parameter `key` is written.
    #[must_use]
    pub const fn with(mut self, key: &'static str) -> Self {
        self.with = Some(key);
        self
    }

    /// Shown and read only where the parameter `key` is not written.
    #[must_use]
    pub const fn without(mut self, key: &'static str) -> Self {
        self.without = Some(key);
        self
    }
}

/// How a rule's computed result may be replaced by the user's own measurement.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Measurable {
    /// It may not.
    No,
    /// By a mass a run, or by a share of what was there.
    MassOrShare,
    /// By the electricity of a run, as a meter reads it.
    Energy,
}

/// One rule by which a technique moves mass or spends a utility.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Rule {
    /// The name under which it appears in the book and under `measured` in the plan.
    pub name: &'static str,
    /// The equation, in the symbols that the working uses.
    pub equation: &'static str,
    /// Where the equation or the share comes from.
    pub source: Source,
    /// Whether a measured figure may take its place.
    pub measurable: Measurable,
}

impl Rule {
    /// A rule that a measured figure may not replace.
    #[must_use]
    pub const fn new(name: &'static str, equation: &'static str, source: Source) -> Self {
        Self { name, equation, source, measurable: Measurable::No }
    }

    /// The same rule, open to a measured mass or share.
    #[must_use]
    pub const fn measurable(mut self) -> Self {
        self.measurable = Measurable::MassOrShare;
        self
    }

    /// The same rule, open to a meter's reading.
    #[must_use]
    pub const fn metered(mut self) -> Self {
        self.measurable = Measurable::Energy;
        self
    }
}
