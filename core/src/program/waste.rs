//! What the waste desk needs to know of site, streams and work, read from the plan.

use super::resolve::amount;
use crate::code::{Activity, Flash};
use crate::plan::{Field, Problem, Site, Stream, below};
use crate::quantity::{Kind, Spread, read};

/// The calendar months in which something happens, January first.
pub type Months = [bool; 12];

/// All months.
pub const EVERY_MONTH: Months = [true; 12];

/// How a stream counts towards the month in the United States.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub enum Counted {
    /// In the month in which it is made, satellite containers included.
    #[default]
    WhenMade,
    /// Stored, then reclaimed and used again on site: once a month, its bottoms not again.
    Reclaimed,
    /// Reclaimed on site without having been stored: only its bottoms, where they go.
    ReclaimedAtOnce,
    /// Treated at once in a permitted unit, never stored.
    TreatedAtOnce,
}

impl Counted {
    /// The words of the plan.
    #[must_use]
    pub const fn word(self) -> &'static str {
        match self {
            Self::WhenMade => "when made",
            Self::Reclaimed => "reclaimed",
            Self::ReclaimedAtOnce => "reclaimed at once",
            Self::TreatedAtOnce => "treated at once",
        }
    }
}

/// Hazardous waste that the site makes beside the work of the plan.
#[derive(Clone, Debug, PartialEq)]
pub struct OtherWasteUse {
    /// What it is.
    pub name: String,
    /// Its mass in each of its months; kg.
    pub kg_each_month: f64,
    /// Its months.
    pub months: Months,
    /// Whether it is acutely hazardous.
    pub acute: bool,
}

/// What the waste desk needs to know of a site.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct SiteWaste {
    /// The kind of work.
    pub activity: Activity,
    /// Other waste.
    pub other: Vec<OtherWasteUse>,
    /// The longest that waste may be stored; s.
    pub storage_limit_s: Option<f64>,
    /// The interval of pick-ups; s.
    pub pick_up_every_s: Option<f64>,
    /// Whether the receiving facility lies more than 200 miles away.
    pub far_receiver: bool,
    /// Where state or nation deviate.
    pub deviations: Option<String>,
    /// The permit that opens the drain.
    pub drain_permit: Option<String>,
}

/// What the waste desk needs to know of a stream.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct StreamWaste {
    /// Lowest and highest pH measured in its containers.
    pub ph: Option<(f64, f64)>,
    /// Flash point by test.
    pub flash: Option<Flash>,
    /// Whether what goes in is unused product.
    pub unused: bool,
    /// What its containers are made of.
    pub made_of: Option<String>,
    /// The relative density up to which the mark allows a liquid.
    pub density_mark: Option<f64>,
    /// Whether its containers fill in a satellite area.
    pub satellite: bool,
    /// How it counts.
    pub counted: Counted,
    /// What goes round, where it is reclaimed; kg.
    pub goes_round_kg: Option<f64>,
}

pub(super) fn site(doc: &Site, problems: &mut Vec<Problem>) -> SiteWaste {
    let mut time = |text: &Option<String>, key: &str| {
        let text = text.as_deref()?;
        let path = below("site", key);
        let s = amount(Some(text), "1 d", Kind::Time, &path, problems);
        if s < 86_400.0 {
            problems.push(Problem::error(
                &*path,
                format!("\"{text}\" is less than a day"),
                "a time such as \"90 d\"",
            ));
        }
        Some(s)
    };
    let storage_limit_s = time(&doc.storage_limit, "storage_limit");
    let pick_up_every_s = time(&doc.pick_up_every, "pick_up_every");
    let other = doc.other_waste.iter().enumerate().map(|(i, o)| {
        let path = format!("site.other_waste[{i}]");
        let at = below(&path, "each_month");
        let kg_each_month = amount(Some(&o.each_month), "0 kg", Kind::Mass, &at, problems);
        if kg_each_month < 0.0 {
            problems.push(Problem::error(at, "a mass below zero", "a mass such as \"55 kg\""));
        }
        OtherWasteUse {
            name: o.name.clone(),
            kg_each_month,
            months: months(o.months.as_deref(), &below(&path, "months"), problems),
            acute: o.acute.unwrap_or(false),
        }
    });
    SiteWaste {
        other: other.collect(),
        activity: doc.activity.as_deref().and_then(Activity::of).unwrap_or_default(),
        storage_limit_s,
        pick_up_every_s,
        far_receiver: doc.far_receiver.unwrap_or(false),
        deviations: doc.deviations.clone(),
        drain_permit: doc.drain_permit.clone(),
    }
}

pub(super) fn stream(doc: &Stream, path: &str, problems: &mut Vec<Problem>) -> StreamWaste {
    let flash = doc.flash_point.as_deref().map(|text| match text.trim() {
        "none" => Flash::None,
        text => {
            Flash::AtK(amount(Some(text), "60 °C", Kind::Temperature, &below(path, "flash_point"), problems))
        }
    });
    let density_mark = match &doc.density_mark {
        Some(Field::Text(text) | Field::Number(text)) => {
            Some(amount(Some(text), "1.2", Kind::Number, &below(path, "density_mark"), problems))
        }
        _ => None,
    };
    StreamWaste {
        ph: doc.ph.as_deref().and_then(|text| ph(text, &below(path, "ph"), problems)),
        flash,
        unused: doc.unused.unwrap_or(false),
        made_of: doc.made_of.clone(),
        density_mark,
        satellite: doc.area.as_deref() == Some("satellite"),
        counted: match doc.counted.as_deref() {
            Some("reclaimed") => Counted::Reclaimed,
            Some("reclaimed at once") => Counted::ReclaimedAtOnce,
            Some("treated at once") => Counted::TreatedAtOnce,
            _ => Counted::WhenMade,
        },
        goes_round_kg: doc.goes_round.as_deref().map(|text| goes_round(doc, text, path, problems)),
    }
}

/// What goes round of a reclaimed stream; kg.
fn goes_round(doc: &Stream, text: &str, path: &str, problems: &mut Vec<Problem>) -> f64 {
    let at = below(path, "goes_round");
    let kg = amount(Some(text), "1 kg", Kind::Mass, &at, problems);
    if kg <= 0.0 {
        problems.push(Problem::error(
            at,
            format!("\"{text}\" goes round"),
            "a mass above zero, such as \"20 kg\"",
        ));
    } else if doc.counted.as_deref() != Some("reclaimed") {
        problems.push(Problem::warning(
            at,
            "only what is reclaimed goes round",
            "\"counted\": \"reclaimed\" beside it",
        ));
    }
    kg
}

/// A pH or the range of one.
pub(super) fn ph(text: &str, path: &str, problems: &mut Vec<Problem>) -> Option<(f64, f64)> {
    match read(text, Kind::Number) {
        Ok(amount) => {
            let (low, high) = match amount.spread {
                Spread::Limits { low_si, high_si } => (low_si, high_si),
                Spread::Exact | Spread::Standard { .. } => (amount.central_si, amount.central_si),
            };
            if low < -2.0 || high > 16.0 {
                problems.push(Problem::error(
                    path,
                    format!("\"{text}\" is no pH that water reaches"),
                    "pH between -2 and 16, such as \"2 to 7\"",
                ));
                return None;
            }
            Some((low, high))
        }
        Err(e) => {
            problems.push(Problem::error(
                path,
                format!("\"{text}\": {}", e.found()),
                "pH, such as \"2 to 7\"",
            ));
            None
        }
    }
}

/// Months as people list them: `5`, `2-5, 9`, `11-2` over the turn of the year. All of them where nothing is said.
pub(super) fn months(text: Option<&str>, path: &str, problems: &mut Vec<Problem>) -> Months {
    let Some(text) = text else { return EVERY_MONTH };
    read_months(text).unwrap_or_else(|| {
        let found = format!("\"{text}\" is no list of months");
        problems.push(Problem::error(path, found, "months from 1 to 12, such as \"5\" or \"9-12, 2\""));
        EVERY_MONTH
    })
}

fn read_months(text: &str) -> Option<Months> {
    let mut out = [false; 12];
    for part in text.split(',') {
        let (first, last) = part.split_once('-').unwrap_or((part, part));
        let month = |word: &str| word.trim().parse::<usize>().ok().filter(|m| (1..=12).contains(m));
        let (first, last) = (month(first)?, month(last)?);
        let mut m = first;
        loop {
            *out.get_mut(m - 1)? = true;
            if m == last {
                break;
            }
            m = m % 12 + 1;
        }
    }
    Some(out)
}

#[cfg(test)]
mod tests {
    use super::read_months;

    fn listed(text: &str) -> Option<Vec<usize>> {
        read_months(text).map(|m| (1..=12).filter(|i| m[i - 1]).collect())
    }

    #[test]
    fn months_are_read_as_people_list_them() {
        assert_eq!(listed("5"), Some(vec![5]));
        assert_eq!(listed("2-4, 9"), Some(vec![2, 3, 4, 9]));
        assert_eq!(listed("11-2"), Some(vec![1, 2, 11, 12]));
        for bad in ["", "0", "13", "May", "1-", "1--3", "1,,2"] {
            assert_eq!(listed(bad), None, "{bad}");
        }
    }
}
