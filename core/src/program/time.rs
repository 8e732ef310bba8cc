//! The time that a route takes of instruments and of people, as the plan says it.

use super::money::text;
use super::resolve::RouteBuilder;
use crate::chance::In;
use crate::plan::{Field, Problem, Route, Site, below};
use crate::quantity::{Kind, Origin};

/// What a route takes of instruments and people, as far as the plan says.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub struct TimeUse {
    /// How long an instrument is taken by one run; s.
    pub run_s: Option<In>,
    /// How many extractions one run of one instrument holds.
    pub at_once: Option<In>,
    /// Working time of people for each extraction; s.
    pub attended_s: Option<In>,
    /// Working time of people for each batch, beside it; s.
    pub attended_batch_s: Option<In>,
    /// Whether it may run with nobody there.
    pub unattended: bool,
    /// How many instruments are there.
    pub instruments: Option<In>,
    /// Hours of a year in which someone is there; s.
    pub attended_year_s: Option<In>,
    /// Further hours of a year in which instruments may run alone; s.
    pub unattended_year_s: Option<In>,
}

impl TimeUse {
    /// Whether the plan says how long people attend.
    #[must_use]
    pub const fn attends(&self) -> bool {
        self.attended_s.is_some() || self.attended_batch_s.is_some()
    }
}

impl RouteBuilder<'_> {
    pub(super) fn time(&mut self, site: &Site, route: &Route, path: &str) -> TimeUse {
        let at = below(path, "time");
        let doc = &route.time;
        let mut read = |doc: &[(String, Field)], key: &str, at: &str| {
            self.read_optional(text(doc, key), Kind::Time, &below(at, key))
        };
        let mut out = TimeUse {
            run_s: read(doc, "run", &at),
            attended_s: read(doc, "attended", &at),
            attended_batch_s: read(doc, "attended_batch", &at),
            attended_year_s: read(&site.hours, "attended", "site.hours"),
            unattended_year_s: read(&site.hours, "unattended", "site.hours"),
            unattended: matches!(field(doc, "unattended"), Some(Field::YesNo(true))),
            ..TimeUse::default()
        };
        out.at_once = self.count(doc, "at_once", &at);
        out.instruments = self.count(doc, "instruments", &at);
        if out.at_once.is_some_and(|n| self.value(n) < 1.0) {
            let found = "a run that holds no extraction";
            self.problems.push(Problem::error(below(&at, "at_once"), found, "a number from 1"));
        }
        let there = |slot: Option<In>, b: &Self| slot.map_or(0.0, |s| b.value(s));
        let year_s = there(out.attended_year_s, self) + there(out.unattended_year_s, self);
        // What may not run alone has the attended hours only.
        let alone = if out.unattended { there(out.unattended_year_s, self) } else { 0.0 };
        let hours_s = there(out.attended_year_s, self) + alone;
        if out.attended_year_s.is_some() && hours_s <= 0.0 && there(out.run_s, self) > 0.0 {
            self.problems.push(Problem::error(
                "site.hours.attended",
                format!("no hour of the year in which {} can run", route.name),
                "hours in which someone is there, such as \"1300 h\", or a route that may run unattended",
            ));
        }
        // 365 days
        if year_s > 31_536_000.0 {
            self.problems.push(Problem::error(
                "site.hours",
                format!("{} hours in a year", crate::quantity::significant(year_s / 3600.0, 5)),
                "attended and unattended hours that come to at most 8760",
            ));
        }
        out
    }

    /// A number of things, bare or as text.
    pub(super) fn count(&mut self, doc: &[(String, Field)], key: &str, at: &str) -> Option<In> {
        let text = number_of(field(doc, key)?)?;
        let path = below(at, key);
        match self.amounts.read(text, Kind::Number) {
            Ok(amount) if amount.central_si >= 0.0 => Some(self.input(path, &amount, Origin::Entered)),
            Ok(_) => {
                self.problems.push(Problem::error(
                    path,
                    format!("{text} is below zero"),
                    "a number, such as 4",
                ));
                None
            }
            Err(e) => {
                self.problems.push(Problem::error(path, format!("\"{text}\": {}", e.found()), e.need()));
                None
            }
        }
    }
}

pub(super) fn field<'d>(doc: &'d [(String, Field)], key: &str) -> Option<&'d Field> {
    doc.iter().find(|(k, _)| k == key).map(|(_, f)| f)
}

pub(super) fn number_of(field: &Field) -> Option<&str> {
    match field {
        Field::Text(text) | Field::Number(text) => Some(text),
        Field::YesNo(_) | Field::Rows(_) => None,
    }
}
