//! Amounts as people write them: read strictly, given back in words, shown in a sensible unit.
//!
//! ```
//! use thimbleworth::quantity::{Kind, Spread, read};
//!
//! let charge = read("250 ± 5 mL", Kind::Volume)?;
//! assert_eq!(charge.central_si, 0.00025);
//! assert_eq!(charge.spread, Spread::Limits { low_si: 0.000245, high_si: 0.000255 });
//! assert_eq!(charge.understood(), "250 mL, between 245 and 255 mL (limits)");
//! # Ok::<(), thimbleworth::quantity::AmountError>(())
//! ```
//!
//! | written | read as |
//! | --- | --- |
//! | `250 mL`, `250mL`, `0.25 l`, `250 cm³`, `1 400 g`, `1.2×10^3 g`, `1,5 mL` | one value |
//! | `250 ± 5 mL`, `250 mL ± 2 %`, `245 to 255 mL`, `245–255 mL` | limits of a rectangular distribution |
//! | `250 mL u 2 mL`, `250 ± 4 mL (k=2)` | a standard uncertainty of 2 mL, normal distribution |
//! | `50 %`, `50 % v/v`, `50 % w/w` | a fraction with its base unstated, by volume, by mass |
//! | `12 USD/L`, `USD 12/L`, `€3/kg` | a price in its currency |
//! | `not known` | that the amount is not known ([`read_entry`]) |
//!
//! `1,234 mL` is refused with a question; so are units that differ from place to place.
mod amount;
mod bounds;
mod convert;
mod currency;
mod decimal;
mod error;
mod grammar;
mod kind;
mod nearest;
mod number;
mod numeral;
mod read;
mod refuse;
mod scan;
mod show;
mod unit;
mod units;
pub use amount::{Amount, Entry, Origin, ShareBy, Spread};
pub use bounds::{BOUNDS, Bound, bound, check};
pub use convert::in_unit;
pub use currency::Currency;
pub use error::{AmountError, Which};
pub use kind::Kind;
pub(crate) use nearest::nearest;
pub use number::{shortest, significant};
pub use read::{LONGEST, read, read_entry};
pub use show::{show, show_in, show_money};
pub(crate) use unit::known_unit;
pub use unit::{Unit, unit};
pub use units::{Factor, UNITS, UnitRow, preferred_unit, units_of};
