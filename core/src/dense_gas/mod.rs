//! What dense carbon dioxide dissolves, how fast it comes out, and at what pressure and temperature it takes least.
//!
//! | file | what it holds |
//! | --- | --- |
//! | `strength` | solubility parameters: Giddings for the dense gas, Hildebrand for liquids beside it |
//! | `chrastil` | solubility by Chrastil's equation, and its fit to measured points |
//! | `vegetable_oil` | solubility of vegetable oils by del Valle and Aguilera |
//! | `hot_ball` | extraction curve of a sphere by diffusion (Bartle and others) |
//! | `sovova` | extraction curve with broken and intact cells (Sovová) |
//! | `need` | carbon dioxide that a target recovery takes |
//! | `study` | an extraction as a question: solubility, target, circuit and machines together |
//! | `search` | pressure and temperature of least need or least energy within a vessel's rating |
//!
//! **No constants of solutes are shipped.** Chrastil's constants printed for the same solute disagree widely; they are
//! entered, or fitted to the user's own points. Every correlation holds only in the range it was fitted in, and says when
//! it is asked beyond.
//!
//! Densities are those of pure carbon dioxide: dissolved extract and co-solvents change them, and are not in it.
pub mod chrastil;
mod error;
pub mod hot_ball;
pub mod need;
pub mod search;
pub mod sovova;
pub mod strength;
pub mod study;
pub mod vegetable_oil;

pub use error::DenseGasError;
