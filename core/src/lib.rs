//! Thimbleworth: the account of every extraction route, kept like a set of books.
//!
//! ```text
//!  plan ──► program ──► bench ──► ledger ──► accounts ──► comparison ──► report / page
//! ```
//!
//! Data flows one way. Everything is computed from *postings*: a posting moves a mass of one material from one
//! place to another, because of one step, by one stated rule. The library reads no files, has no clock and gives
//! the same bits natively and in WebAssembly.
#![deny(missing_docs)]

pub mod account;
pub mod case;
pub mod chance;
pub mod climate;
pub mod co2;
pub mod co2_loop;
pub mod code;
pub mod compare;
pub mod dense_gas;
pub mod emission;
pub mod example;
mod exponential;
pub mod generator;
pub mod hazard;
pub mod heat;
pub mod ledger;
pub mod letter;
pub mod log;
pub mod material;
pub mod metric;
pub mod mixture;
pub mod money;
pub mod odds;
pub mod order;
pub mod plan;
pub mod pour;
pub mod program;
pub mod quantity;
pub mod report;
pub mod room;
pub mod source;
pub mod step;
