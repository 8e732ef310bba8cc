//! Published hazard scores as pure functions of stated inputs.
//!
//! | file | what it scores | whose rule |
//! | --- | --- | --- |
//! | `pictogram` | the label elements that hazard statements bring | GHS, CLP Annex I and Article 26 |
//! | `label_size` | how large a label is at least | CLP Annex I, table 1.3 |
//! | `chem21` | a solvent's safety, health and environment, 1 to 10 | CHEM21 solvent guide, 2016 |
//! | `eco_scale` | an analytical procedure, 100 minus penalties | Analytical Eco-Scale, 2012 |
//! | `nemi` | an analytical procedure, four yes/no rules | NEMI profile, 2007 |
//! | `weight` | a mass times a score | our own weighting, nobody's method |
//!
//! Nothing here knows the catalogue or the ledger. Each score is returned with the reasons that made it, so that a
//! reader can follow the working. None of them replaces a safety data sheet, a risk assessment or local codes.
pub mod chem21;
pub mod eco_scale;
mod label_size;
pub mod nemi;
pub mod pictogram;
mod statement;
pub mod weight;

pub use label_size::{LABEL_SIZE, label_size_mm};
pub use pictogram::{Label, Pictogram, SignalWord, label};
