//! One figure with its spread and its source.
use std::borrow::Cow;

/// Text that is borrowed from the embedded tables or owned by the plan.
pub type Text = Cow<'static, str>;

/// A figure in SI units, how far other sources lie from it, and where it comes from.
///
/// `low == high == value` means that no second source was compared, not that the figure is exact.
///
/// ```
/// use thimbleworth::material::Figure;
/// let density = Figure::new(659.4, 658.0, 661.0, "site's own pycnometer");
/// assert!(density.low <= density.value && density.value <= density.high);
/// ```
#[derive(Clone, Debug, PartialEq)]
pub struct Figure {
    /// The chosen value, in the SI unit of the field that holds it.
    pub value: f64,
    /// The lowest that the sources compared give.
    pub low: f64,
    /// The highest that the sources compared give.
    pub high: f64,
    /// A key of the bibliography (see [`Catalogue::source`](super::Catalogue::source)), or the plan's own words.
    pub source: Text,
}

impl Figure {
    /// A figure with its spread.
    #[must_use]
    pub fn new(value: f64, low: f64, high: f64, source: impl Into<Text>) -> Self {
        Self { value, low, high, source: source.into() }
    }

    /// A figure from one source alone.
    #[must_use]
    pub fn single(value: f64, source: impl Into<Text>) -> Self {
        Self::new(value, value, value, source)
    }
}
