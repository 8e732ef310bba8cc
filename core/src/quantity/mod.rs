//! Amounts as people write them.
mod kind;
pub use kind::Kind;
