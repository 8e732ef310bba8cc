//! The book's own rules: those by which mass moves without a technique.

use crate::ledger::RuleIx;
use crate::source::{MASS_BALANCE, SITE};
use crate::step::Rule;

/// The feed taken in.
pub const TAKEN_IN: RuleIx = RuleIx(0);
/// What is left, placed where the plan says.
pub const PLACED: RuleIx = RuleIx(1);
/// What is left, placed where the plan does not say.
pub const PLACED_BY_DEFAULT: RuleIx = RuleIx(2);

/// The rules, in the order of their index.
pub static BOOK_RULES: [Rule; 3] = [
    Rule::new("taken in", "m = m_feed · share of runs that carry feed", SITE),
    Rule::new("placed at the end", "all that is there", MASS_BALANCE),
    Rule::new("placed by default", "all that is there; the plan does not say where", MASS_BALANCE),
];
