//! The rules by which containers are classified, from `core/data/waste_rules.csv`.

use crate::material::catalogue;
use crate::material::table::Table;
use crate::quantity::nearest;
use crate::room::Day;
use crate::source::Source;
use std::sync::OnceLock;

/// Shown beside all codes and categories.
pub const CAUTION: &str = "Help for a licensed person: state or national rules may be stricter, and local codes and licensed practice decide.";

const RULES: Table = Table { name: "waste_rules.csv", text: include_str!("../../data/waste_rules.csv") };

/// One rule with its citation and dates.
#[derive(Clone, Debug, PartialEq)]
pub struct Rule {
    /// Its key, stable across versions.
    pub key: &'static str,
    /// The code that it brings.
    pub code: &'static str,
    /// Its title.
    pub title: &'static str,
    /// The text of the law.
    pub cite: &'static str,
    /// First day on which it holds; `None` before anything a plan asks for.
    pub from: Option<Day>,
    /// Last day on which it holds; `None` without end.
    pub until: Option<Day>,
    /// Key of the bibliography.
    pub source: &'static str,
    /// Reportable quantity of 40 CFR 302.4, lb; `None` where the rule has none.
    pub reportable_lb: Option<f64>,
    /// What would change a verdict by it.
    pub change: &'static str,
}

impl Rule {
    /// Whether it is in force on this day.
    #[must_use]
    pub fn in_force(&self, day: Day) -> bool {
        self.from.is_none_or(|from| from <= day) && self.until.is_none_or(|until| day <= until)
    }

    /// The citation with the standing of our reading of it.
    #[must_use]
    pub fn citation(&self) -> Source {
        let standing = catalogue().source(self.source).map(|s| s.standing);
        Source::new(self.cite, standing.unwrap_or(crate::source::Standing::FromMemory))
    }

    /// When it holds, in words: `since 2015-06-01`, `2025-01-01 to 2027-06-30`.
    #[must_use]
    pub fn dates(&self) -> String {
        let text = |day: Option<Day>| day.map(|d| d.to_string()).unwrap_or_default();
        match self.until {
            None => text(self.from),
            Some(_) => [text(self.from), text(self.until)].join(" to "),
        }
    }
}

/// The rule with this key.
///
/// ```
/// assert_eq!(thimbleworth::code::rule("F002").unwrap().cite, "40 CFR 261.31(a)");
/// ```
#[must_use]
pub fn rule(key: &str) -> Option<&'static Rule> {
    static READ: OnceLock<Vec<Rule>> = OnceLock::new();
    let rules = READ.get_or_init(|| {
        let columns = ["key", "code", "title", "cite", "from", "until", "source", "rq_lb", "change"];
        let row = |[key, code, title, cite, from, until, source, rq, change]: [&'static str; 9]| Rule {
            key,
            code,
            title,
            cite,
            from: Day::parse(from).ok(),
            until: Day::parse(until).ok(),
            source,
            reportable_lb: nearest(rq),
            change,
        };
        RULES.rows(columns, &mut Vec::new()).into_iter().map(row).collect()
    });
    rules.iter().find(|r| r.key == key)
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn every_rule_is_read_with_its_dates_and_source() {
        let rows = RULES.text.lines().count() - 1;
        let keys: Vec<&str> = RULES.text.lines().skip(1).filter_map(|l| l.split(',').next()).collect();
        assert_eq!(keys.len(), rows);
        for key in keys {
            let rule = rule(key).unwrap();
            assert!(rule.from.is_some() && catalogue().source(rule.source).is_some(), "{key}");
        }
        let adr = rule("transport").unwrap();
        assert!(
            !adr.in_force(Day::parse("2027-07-01").unwrap())
                && adr.in_force(Day::parse("2027-06-30").unwrap())
        );
    }
}
