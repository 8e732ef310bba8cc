//! The plan: the one document that holds a whole question.
//!
//! [`open`] reads it strictly and [`save`] writes it back byte for byte; [`schema`] describes it to other programs.
//! This room knows the form of the document and nothing of what it means: techniques, units, bounds and places are
//! checked where they are known.
mod differences;
mod document;
mod keys;
mod migrate;
mod nearest;
mod parse;
mod path;
mod print;
mod problem;
mod read;
mod schema;
mod tree;
mod write;

pub use differences::{Change, differences};
pub use document::{
    Electricity, Field, Log, OtherWaste, OwnMaterial, PLAN_VERSION, Plan, Room, Route, Site, Step, Stream,
    Workload,
};
pub(crate) use nearest::nearest;
pub use path::{Path, below, keys};
pub(crate) use print::quote;
pub use problem::{Problem, Severity};
pub use read::{Opened, open, open_bytes};
pub use schema::{TechniqueShape, schema};
pub use tree::is_number;
pub use write::save;
