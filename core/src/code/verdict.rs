//! A verdict: a code, whether it applies, and everything that it rests on.

use super::rule::{Rule, rule};
use crate::material::Text;
use crate::quantity::{Kind, show};
use crate::room::Day;

/// Whether a code applies.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum Answer {
    /// It applies.
    Yes,
    /// It is put on the container until a test clears it.
    Assumed,
    /// Only a test can tell; the code is neither put on nor cleared.
    Test,
    /// It does not apply to what is known.
    No,
}

impl Answer {
    /// The words shown.
    #[must_use]
    pub const fn words(self) -> &'static str {
        match self {
            Self::Yes => "applies",
            Self::Assumed => "applies unless a test clears it",
            Self::Test => "test, do not assume",
            Self::No => "does not apply",
        }
    }
}

/// One figure held against a rule.
#[derive(Clone, Debug, PartialEq)]
pub struct Fact {
    /// What it is.
    pub what: Text,
    /// Its value; SI.
    pub value_si: f64,
    /// What it measures.
    pub kind: Kind,
    /// The limit of the rule, where there is one; SI.
    pub limit_si: Option<f64>,
}

impl Fact {
    /// The figure in words: `dichloromethane 1.526 % (limit 1 %)`.
    #[must_use]
    pub fn words(&self) -> String {
        let mut out = self.what.to_string();
        out.push(' ');
        out.push_str(&show(self.value_si, self.kind));
        if let Some(limit) = self.limit_si {
            out.push_str(" (limit ");
            out.push_str(&show(limit, self.kind));
            out.push(')');
        }
        out
    }
}

/// One code held against one container.
#[derive(Clone, Debug, PartialEq)]
pub struct Verdict {
    /// The code: `D001`, `14 06 02*`, `HP7`, `UN1992`.
    pub code: Text,
    /// Whether it applies.
    pub answer: Answer,
    /// The rule.
    pub rule: &'static Rule,
    /// Whether the rule is in force on the day of the plan; true without a day.
    pub in_force: bool,
    /// Why, in a sentence without its full stop.
    pub why: Text,
    /// The figures used.
    pub facts: Vec<Fact>,
    /// What would change it.
    pub change: Text,
}

impl Verdict {
    /// Whether the code is put on the container.
    #[must_use]
    pub fn applies(&self) -> bool {
        self.in_force && matches!(self.answer, Answer::Yes | Answer::Assumed)
    }

    /// Whether it stays open until somebody tests.
    #[must_use]
    pub fn open(&self) -> bool {
        self.in_force && self.answer == Answer::Test
    }
}

/// Where verdicts are collected.
pub(super) struct Desk {
    pub(super) verdicts: Vec<Verdict>,
    pub(super) as_of: Option<Day>,
}

impl Desk {
    /// A verdict by the rule of this key, under its own code and with its own change.
    pub(super) fn put(&mut self, key: &str, answer: Answer, why: impl Into<Text>, facts: Vec<Fact>) {
        self.put_text(key, answer, why.into(), facts);
    }

    #[inline(never)]
    fn put_text(&mut self, key: &str, answer: Answer, why: Text, facts: Vec<Fact>) {
        let Some(rule) = rule(key) else { return };
        self.verdicts.push(Verdict {
            code: rule.code.into(),
            answer,
            rule,
            in_force: self.as_of.is_none_or(|day| rule.in_force(day)),
            why,
            facts,
            change: rule.change.into(),
        });
    }

    /// The code of the last verdict.
    pub(super) fn code(&mut self, code: impl Into<Text>) {
        if let Some(last) = self.verdicts.last_mut() {
            last.code = code.into();
        }
    }

    /// What else would change the last verdict.
    pub(super) fn change(&mut self, change: String) {
        if let Some(last) = self.verdicts.last_mut() {
            last.change = change.into();
        }
    }

    /// The codes put on so far.
    pub(super) fn codes(&self) -> Vec<&str> {
        self.verdicts.iter().filter(|v| v.applies()).map(|v| &*v.code).collect()
    }
}

/// Names in a row: `acetone, methanol`.
pub(super) fn list<'a>(names: impl IntoIterator<Item = &'a str>) -> String {
    let mut out = String::new();
    for name in names {
        if !out.is_empty() {
            out.push_str(", ");
        }
        out.push_str(name);
    }
    out
}

/// A share as a figure with its limit.
pub(super) fn share(what: impl Into<Text>, value: f64, limit: f64) -> Fact {
    Fact { what: what.into(), value_si: value, kind: Kind::Fraction, limit_si: Some(limit) }
}
