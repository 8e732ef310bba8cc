//! The techniques: one file each.
mod declare;
pub use declare::{Control, Measurable, Need, Param, Rule};
