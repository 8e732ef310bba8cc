//! Example plans in invented places.

/// One example plan.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Example {
    /// A short key.
    pub key: &'static str,
    /// Its title.
    pub title: &'static str,
    /// What it shows.
    pub about: &'static str,
    /// The plan's text.
    pub text: &'static str,
}

/// All examples; the first is the demo.
pub static EXAMPLES: &[Example] = &[Example {
    key: "harbour-sediment",
    title: "Harbour sediment",
    about: "Soxhlet extraction beside supercritical CO2 on an invented harbour's sediment.",
    text: include_str!("../../plans/harbour-sediment.json"),
}];
