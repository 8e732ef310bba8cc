//! Exposure limits by substance, jurisdiction and date, from `core/data/exposure_limits.csv`.
//!
//! A limit without its date misleads: which one holds is chosen by the date of the plan, and what is not yet in force, no longer in force,
//! proposed or postponed is listed beside it with its reason, so that nobody takes silence for freedom. The table covers common
//! extraction solvents and carbon dioxide. A substance that is missing has no row, which does not mean that it has no limit.
use super::concentration::fraction_of;
use super::day::Day;
use super::error::RoomError;
use crate::material::table::Table;
use crate::quantity::nearest;
use std::fmt;
use std::sync::OnceLock;

/// Shown beside every limit.
pub const LIMITS_CAUTION: &str = "Help for a licensed person. Limits change, states and nations may be stricter, and most of these values are from \
     memory or secondary texts: check the current text of the rule. A figure for the mean of a room is no measurement in the breathing zone.";

/// A closed list of words in the table.
macro_rules! words {
    ($(#[$about:meta])* $name:ident { $($(#[$doc:meta])* $variant:ident $word:literal $title:literal,)* }) => {
        $(#[$about])*
        #[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
        pub enum $name { $($(#[$doc])* $variant,)* }

        impl $name {
            /// All of them, in the order of a report.
            pub const ALL: &[Self] = &[$(Self::$variant),*];

            /// As a report names it.
            #[must_use]
            pub const fn title(self) -> &'static str {
                match self { $(Self::$variant => $title,)* }
            }

            fn from_word(word: &str) -> Option<Self> {
                match word { $($word => Some(Self::$variant),)* _ => None }
            }
        }
    };
}

words! {
    /// Who sets a limit.
    Jurisdiction {
        /// Occupational Safety and Health Administration: law in the United States.
        UsOsha "US OSHA" "US OSHA",
        /// Existing chemical exposure limits under section 6 of the Toxic Substances Control Act: law in the United States.
        UsTsca "US TSCA" "US TSCA section 6",
        /// Recommended limits and immediately dangerous concentrations of NIOSH; no law.
        UsNiosh "US NIOSH" "US NIOSH (recommended)",
        /// Threshold limit values of ACGIH; no law. Only those that were seen quoted in public texts.
        UsAcgih "US ACGIH" "US ACGIH (recommended)",
        /// Indicative or binding values of the European Union; the nation's own law decides.
        Eu "EU" "European Union",
        /// Workplace exposure limits of EH40: law in Great Britain.
        Uk "UK" "United Kingdom",
    }
}

words! {
    /// What kind of limit, and so which figure is held against it.
    LimitKind {
        /// Mean over eight hours (over ten for recommendations of NIOSH).
        Twa "TWA" "8-hour mean",
        /// Eight-hour mean from which monitoring and other duties begin.
        ActionLevel "action level" "action level, 8-hour mean",
        /// Mean over fifteen minutes.
        Stel "STEL" "15-minute mean",
        /// Never to be passed.
        Ceiling "ceiling" "ceiling",
        /// Immediately dangerous to life or health.
        Idlh "IDLH" "immediately dangerous to life or health",
    }
}

words! {
    /// The unit in which a limit is set.
    LimitUnit {
        /// Parts per million by volume.
        Ppm "ppm" "ppm",
        /// Milligrams in a cubic metre of air at the jurisdiction's temperature.
        MgM3 "mg/m3" "mg/m³",
    }
}

words! {
    /// The uses that a limit is for.
    Uses {
        /// All uses.
        All "all" "all uses",
        /// Use in laboratories.
        Laboratory "laboratory" "laboratory use",
        /// Uses under the workplace programme of the rule; laboratory use is not among them.
        NotLaboratory "not laboratory" "uses under the workplace programme, not laboratory use",
        /// Uses under an exemption from a ban.
        Exempted "exempted" "uses exempted from the ban",
    }
}

words! {
    /// How far a limit has become law or recommendation.
    LimitState {
        /// Holds between its dates.
        InForce "in force" "in force",
        /// Adopted, but its dates are postponed, stayed or proposed to move; check what holds.
        Pending "pending" "adopted, dates open",
        /// Only proposed.
        Proposed "proposed" "proposed",
    }
}

/// One row of the table.
#[derive(Clone, Debug, PartialEq)]
pub struct Limit {
    /// The substance's name in the catalogue.
    pub name: &'static str,
    /// Its CAS number.
    pub cas: &'static str,
    /// Who sets it.
    pub jurisdiction: Jurisdiction,
    /// What is limited.
    pub kind: LimitKind,
    /// The figure, in `unit`.
    pub value: f64,
    /// Its unit.
    pub unit: LimitUnit,
    /// What the rule prints beside a figure in ppm, mg/m³; `None` where that is not known.
    pub printed_mg_m3: Option<f64>,
    /// The uses that it is for.
    pub uses: Uses,
    /// What else bounds its reach; may be empty.
    pub scope: &'static str,
    /// The rule.
    pub citation: &'static str,
    /// First day on which it holds; `None` if that lies before anything a plan asks for, or is not known.
    pub from: Option<Day>,
    /// Last day on which it holds; `None` without end.
    pub until: Option<Day>,
    /// In force, pending or proposed.
    pub state: LimitState,
    /// Key of the bibliography (see [`Catalogue::source`](crate::material::Catalogue::source)).
    pub source: &'static str,
    /// What else must be told.
    pub note: &'static str,
}

impl Limit {
    /// Temperature at which the jurisdiction prints mg/m³, K: 25 °C in the United States, 20 °C elsewhere.
    #[must_use]
    pub const fn reference_temperature_k(&self) -> f64 {
        match self.jurisdiction {
            Jurisdiction::Eu | Jurisdiction::Uk => 293.15,
            Jurisdiction::UsOsha | Jurisdiction::UsTsca | Jurisdiction::UsNiosh | Jurisdiction::UsAcgih => {
                298.15
            }
        }
    }

    /// The limit as a fraction by volume; the molar mass in kg/mol matters only where the unit is mg/m³.
    ///
    /// # Errors
    /// [`RoomError`] for a molar mass that is not positive.
    pub fn by_volume(&self, molar_mass_kg_mol: f64) -> Result<f64, RoomError> {
        match self.unit {
            LimitUnit::Ppm => Ok(self.value * 1e-6),
            LimitUnit::MgM3 => {
                fraction_of(self.value * 1e-6, molar_mass_kg_mol, self.reference_temperature_k(), 101_325.0)
            }
        }
    }
}

/// Why a limit of the substance does not count on the day.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Why {
    /// It holds from a later day.
    NotYet(Day),
    /// It held until an earlier day.
    NoLonger(Day),
    /// Adopted, but its dates are open.
    Pending,
    /// Only proposed.
    Proposed,
}

impl fmt::Display for Why {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            Self::NotYet(day) => write!(f, "holds from {day}"),
            Self::NoLonger(day) => write!(f, "held until {day}"),
            Self::Pending => {
                f.write_str("adopted, but its dates are postponed or proposed to move: check what holds")
            }
            Self::Proposed => f.write_str("only proposed"),
        }
    }
}

/// A limit that does not count on the day, and why.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct LimitNote {
    /// The limit.
    pub limit: &'static Limit,
    /// Why it does not count.
    pub why: Why,
}

/// The limits of a substance on a day.
#[derive(Clone, Debug, PartialEq)]
pub struct Limits {
    /// Those that hold, in the order of the table.
    pub hold: Vec<&'static Limit>,
    /// Those that do not: coming, past, postponed, proposed.
    pub notes: Vec<LimitNote>,
}

/// The limits of a substance by its CAS number on a day. Both lists are empty for a substance that the table does not have, which
/// does not mean that it has no limit.
///
/// ```
/// use thimbleworth::room::{Day, Jurisdiction, LimitKind, limits};
/// let found = limits("75-09-2", Day::parse("2026-12-01")?);
/// // dichloromethane in a US laboratory: 25 ppm by OSHA now, 2 ppm by TSCA from 8 February 2027
/// let osha = found.hold.iter().find(|l| l.jurisdiction == Jurisdiction::UsOsha && l.kind == LimitKind::Twa);
/// assert_eq!(osha.unwrap().value, 25.0);
/// assert!(found.notes.iter().any(|n| n.limit.value == 2.0 && n.why.to_string() == "holds from 2027-02-08"));
/// # Ok::<(), thimbleworth::room::DayError>(())
/// ```
#[must_use]
pub fn limits(cas: &str, as_of: Day) -> Limits {
    let mut found = Limits { hold: Vec::new(), notes: Vec::new() };
    for limit in all_limits().iter().filter(|limit| limit.cas == cas) {
        let why = match (limit.state, limit.from, limit.until) {
            (LimitState::Pending, _, _) => Why::Pending,
            (LimitState::Proposed, _, _) => Why::Proposed,
            (LimitState::InForce, Some(from), _) if as_of < from => Why::NotYet(from),
            (LimitState::InForce, _, Some(until)) if until < as_of => Why::NoLonger(until),
            (LimitState::InForce, _, _) => {
                found.hold.push(limit);
                continue;
            }
        };
        found.notes.push(LimitNote { limit, why });
    }
    found
}

/// Every row of the table.
#[must_use]
pub fn all_limits() -> &'static [Limit] {
    &loaded().0
}

/// What in the table could not be read; empty in a sound build, which a test holds it to.
#[must_use]
pub fn limit_faults() -> &'static [String] {
    &loaded().1
}

const LIMITS: Table = Table {
    name: "exposure_limits.csv",
    text: include_str!(concat!(env!("CARGO_MANIFEST_DIR"), "/data/exposure_limits.csv")),
};

fn loaded() -> &'static (Vec<Limit>, Vec<String>) {
    static LOADED: OnceLock<(Vec<Limit>, Vec<String>)> = OnceLock::new();
    LOADED.get_or_init(|| load(LIMITS))
}

fn load(table: Table) -> (Vec<Limit>, Vec<String>) {
    const COLUMNS: [&str; 15] = [
        "name",
        "cas",
        "jurisdiction",
        "kind",
        "value",
        "unit",
        "mg_m3",
        "uses",
        "scope",
        "citation",
        "from",
        "until",
        "state",
        "source",
        "note",
    ];
    let mut faults = Vec::new();
    let mut rows = Vec::new();
    for cells in table.rows(COLUMNS, &mut faults) {
        let [
            name,
            cas,
            jurisdiction,
            kind,
            value,
            unit,
            mg_m3,
            uses,
            scope,
            citation,
            from,
            until,
            state,
            source,
            note,
        ] = cells;
        let amount = |cell: &str| nearest(cell).filter(|v| v.is_finite() && *v > 0.0);
        let day = |cell: &str| if cell.is_empty() { Some(None) } else { Day::parse(cell).ok().map(Some) };
        let read = || {
            Some(Limit {
                name,
                cas,
                jurisdiction: Jurisdiction::from_word(jurisdiction)?,
                kind: LimitKind::from_word(kind)?,
                value: amount(value)?,
                unit: LimitUnit::from_word(unit)?,
                printed_mg_m3: if mg_m3.is_empty() { None } else { Some(amount(mg_m3)?) },
                uses: Uses::from_word(uses)?,
                scope,
                citation,
                from: day(from)?,
                until: day(until)?,
                state: LimitState::from_word(state)?,
                source,
                note,
            })
        };
        match read() {
            Some(limit) => rows.push(limit),
            None => faults.push(format!(
                "{}: a cell of this row cannot be read: {}",
                table.name,
                cells.join(" | ")
            )),
        }
    }
    (rows, faults)
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_row_that_cannot_be_read_is_a_fault_and_no_limit() {
        let head =
            "name,cas,jurisdiction,kind,value,unit,mg_m3,uses,scope,citation,from,until,state,source,note";
        for row in [
            "a,1-1-1,MARS,TWA,1,ppm,,all,,x,,,in force,s,",
            "a,1-1-1,EU,TWA,-1,ppm,,all,,x,,,in force,s,",
            "a,1-1-1,EU,TWA,1,ppm,,all,,x,2026-02-30,,in force,s,",
            "a,1-1-1,EU,TWA,1,ppm,none,all,,x,,,in force,s,",
        ] {
            let text: &'static str = Box::leak(format!("{head}\n{row}").into_boxed_str());
            let (limits, faults) = load(Table { name: "t", text });
            assert_eq!((limits.len(), faults.len()), (0, 1), "{row}");
        }
    }
}
