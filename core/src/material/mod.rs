//! The catalogue of materials: properties, hazards, and where each figure comes from.
//!
//! The figures stand in `core/data/`, one table a publication or kind, with a source on every row; `SOURCES.md` beside them is the
//! bibliography and says which source is preferred and how far each has been verified. Each figure carries
//! the spread between sources. A property is a published equation with its range, and outside that range there is an
//! error, never an extrapolation. What is not known says so.
//!
//! Density is that of the liquid. The catalogue has no density, vapour pressure or heat of vaporisation for carbon
//! dioxide: the module [`co2`](crate::co2) has the equation of state.
//!
//! ```
//! use thimbleworth::material::catalogue;
//! let hexane = catalogue().find("hexane")?;
//! let pressure = hexane.vapour_pressure_pa(293.15).unwrap();
//! assert!(pressure.low < 16_179.0 && 16_179.0 < pressure.high);
//! assert_eq!(hexane.cas.as_deref(), Some("110-54-3"));
//! assert!(hexane.hazard.statements.iter().any(|code| code == "H372"));
//! # Ok::<(), thimbleworth::material::UnknownMaterial>(())
//! ```
mod catalogue;
mod error;
mod figure;
mod formula;
mod law;
mod load;
mod statement;
mod substance;
pub(crate) mod table;

pub use catalogue::{Catalogue, catalogue};
pub use error::{PropertyError, UnknownMaterial};
pub use figure::{Figure, Text};
pub use formula::{Composition, FormulaError, parse_formula};
pub use law::{Equation, Form, Law, WagnerPowers};
pub use statement::statement_text;
pub use substance::{
    Class, EuLow, FlashPoint, Gwp100, Hazard, Rcra, Registration, Solubility, Substance, Transport,
};
