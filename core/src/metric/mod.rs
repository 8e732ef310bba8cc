//! Published mass metrics as pure functions of stated inputs.
//!
//! | file | what it holds |
//! | --- | --- |
//! | `inputs` | the masses that every metric is formed from, and what belongs in each |
//! | `about` | title, formula, boundary and source of each metric, and the list of those a report can loop over |
//! | `mass` | E-factor, process mass intensity and their kin |
//! | `reaction` | atom economy and carbon efficiency, from amounts of substance |
//! | `staged` | extraction in portions by Nernst's law |
//! | `incineration` | CO2 and HCl of a solvent burnt |
//! | `container` | degree of filling, and how many containers a volume takes |
//!
//! A metric is only as good as its boundary: a figure is shown with the boundary of its [`Metric`] beside it, or not
//! at all. Where there is no product, as in analysis, the metrics per product are refused and those per result are
//! meant.
pub mod about;
pub mod container;
mod error;
pub mod incineration;
mod inputs;
pub mod mass;
pub mod reaction;
pub mod staged;

pub use about::{MASS_METRICS, MassMetric, Metric};
pub use error::MetricError;
pub use inputs::Inputs;
