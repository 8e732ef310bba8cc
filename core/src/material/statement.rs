//! The texts of the hazard statements.
use super::table::Table;
use std::sync::OnceLock;

const STATEMENTS: Table =
    Table { name: "statements_ghs.csv", text: include_str!("../../data/statements_ghs.csv") };

/// The text of a hazard statement: the official wording, as remembered; `None` for a code that the table does not hold.
///
/// ```
/// use thimbleworth::material::statement_text;
/// assert_eq!(statement_text("H225"), Some("Highly flammable liquid and vapour"));
/// assert_eq!(statement_text("H999"), None);
/// ```
pub fn statement_text(code: &str) -> Option<&'static str> {
    static TEXTS: OnceLock<Vec<[&'static str; 2]>> = OnceLock::new();
    let texts = TEXTS.get_or_init(|| STATEMENTS.rows(["code", "text"], &mut Vec::new()));
    texts.iter().find(|[known, _]| *known == code).map(|[_, text]| *text)
}
