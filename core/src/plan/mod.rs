//! The plan: the one document that holds a whole question.
mod document;
mod problem;
pub use document::{
    Electricity, Field, OwnMaterial, PLAN_VERSION, Plan, Room, Route, Site, Step, Stream, Workload,
};
pub use problem::{Problem, Severity};
