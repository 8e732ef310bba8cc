//! The book's own rules: those by which mass moves without a technique.

use crate::emission::BATCH_RULE;
use crate::ledger::RuleIx;
use crate::source::{MASS_BALANCE, SITE};
use crate::step::Rule;

/// The feed taken in.
pub const TAKEN_IN: RuleIx = RuleIx(0);
/// What is left, placed where the plan says.
pub const PLACED: RuleIx = RuleIx(1);
/// What is left, placed where the plan does not say.
pub const PLACED_BY_DEFAULT: RuleIx = RuleIx(2);

/// Vapour that filling pushes out of a container of waste.
pub const PUSHED_OUT: RuleIx = RuleIx(3);

/// The rules, in the order of their index.
pub static BOOK_RULES: [Rule; 4] = [
    Rule::new("taken in", "m = m_feed · share of runs that carry feed", SITE),
    Rule::new("placed at the end", "all that is there", MASS_BALANCE),
    Rule::new("placed by default", "all that is there; the plan does not say where", MASS_BALANCE),
    Rule::new("pushed out by filling", "mᵢ = S V pᵢ Mᵢ / (R T), over what the year brings", BATCH_RULE),
];
