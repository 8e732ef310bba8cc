//! Results for other programs and for people: nothing here computes a figure, and nothing reads or writes a file.
//!
//! | file | what it writes |
//! | --- | --- |
//! | [`result_json`] | the result document, JSON: a contract for other programs |
//!
//! The same account gives the same bytes everywhere: numbers for programs are the shortest text that reads back, keys
//! stand in their declared order.
mod result;
mod row;
mod words;

pub use result::{RESULT_VERSION, result_json};
pub use row::PROGRAM;
pub use words::{problem_line, visible};
