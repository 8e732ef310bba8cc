//! The CHEM21 solvent guide: safety, health and environment from 1 (good) to 10, and the ranking that combines them.
//!
//! Source: Prat, Wells, Hayler, Sneddon, McElroy, Abou-Shehada, Dunn, Green Chem. 2016, 18, 288, Tables 4 to 6. The
//! wording of the rules is from memory; the health, environment and combination rules reproduce every published row
//! at hand (`tests/hazard/`). No table of resistivities was found, so the static point of the published rows was read
//! off their own scores: for safety the check is partly circular.
//!
//! Range: solvents that are liquid at room temperature. The guide's *default* ranking is computed here; its authors
//! moved a third of the classical solvents after discussion, mostly to the worse. Health and environment scores are
//! no exposure assessment.
use super::statement::codes;
use crate::source::{Source, Standing};
use std::fmt;

/// The guide, and how far its rules have been traced.
pub const SOURCE: Source =
    Source::new("Prat et al., Green Chem. 2016, 18, 288, Tables 4 to 6", Standing::FromMemory);

/// A flash point: measured, absent, or not known.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum FlashPoint {
    /// The closed-cup flash point, K.
    AtK(f64),
    /// The substance has none.
    None,
    /// Not known: safety cannot be scored.
    NotKnown,
}

/// How complete the substance's REACH registration is.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Registration {
    /// Fully registered: no statement means none was found.
    Full,
    /// Partly or not registered: no statement may mean nobody looked.
    NotFull,
}

/// What the scores are computed from.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Inputs<'a> {
    /// Flash point.
    pub flash_point: FlashPoint,
    /// Boiling point at 1 atm, K.
    pub boiling_point_k: Option<f64>,
    /// Auto-ignition temperature, K; `None` where it is not known.
    pub autoignition_k: Option<f64>,
    /// Whether it can build up static charge, which the guide takes from a resistivity above 1e8 Ω·m; `None` where
    /// it is not known.
    pub builds_static: Option<bool>,
    /// Decomposition energy above 500 J/g.
    pub decomposes_above_500_j_per_g: bool,
    /// Hazard statements as written, `"H225"`, `"H360FD"`, `"EUH019"`.
    pub statements: &'a [&'a str],
    /// State of the registration.
    pub registration: Registration,
    /// The substance is water, which the guide scores 1 for the environment.
    pub is_water: bool,
}

/// Resistivity above which a liquid builds up static charge, Ω·m.
pub const STATIC_RESISTIVITY_OHM_M: f64 = 1e8;

/// One reason behind a score.
#[derive(Clone, Debug, PartialEq)]
pub enum Reason {
    /// The band of a temperature, with that temperature in K and the points of the band.
    Band {
        /// What was banded, `"flash point"` or `"boiling point"`.
        of: &'static str,
        /// Its value, K.
        value_k: f64,
        /// The band in words, `"0 to 23 °C"`.
        band: &'static str,
        /// The points of the band.
        points: u8,
    },
    /// The hazard statement that decided, and the points of its class.
    Statement {
        /// The code.
        code: String,
        /// The points of its class.
        points: u8,
    },
    /// Points added.
    Added {
        /// How many.
        points: u8,
        /// Why.
        why: &'static str,
    },
    /// A value that the guide sets for the case.
    Set {
        /// The score.
        points: u8,
        /// Why.
        why: &'static str,
    },
    /// Something is not known: the score may be low by so many points.
    MayBeLow {
        /// By how many.
        points: u8,
        /// What is not known.
        why: &'static str,
    },
    /// A statement that the guide's table does not hold, read as the mildest class.
    NotInTable {
        /// The code.
        code: String,
    },
}

impl fmt::Display for Reason {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            Self::Band { of, value_k, band, points } => {
                write!(f, "{of} {} °C, band {band}: {points}", whole_celsius(*value_k))
            }
            Self::Statement { code, points } => write!(f, "{code}: {points}"),
            Self::Added { points, why } => write!(f, "plus {points}: {why}"),
            Self::Set { points, why } => write!(f, "{points}: {why}"),
            Self::MayBeLow { points, why } => write!(f, "may be {points} low: {why}"),
            Self::NotInTable { code } => {
                write!(f, "{code} is not in the guide's table; read as the mildest class, 2")
            }
        }
    }
}

/// A score with its reasons.
#[derive(Clone, Debug, PartialEq)]
pub struct Score {
    /// 1 to 10, the higher the worse.
    pub value: u8,
    /// What made it, in the order applied.
    pub reasons: Vec<Reason>,
}

impl Score {
    /// How many points the score may be low because something is not known.
    #[must_use]
    pub fn may_be_low_by(&self) -> u8 {
        let missing: u8 = self
            .reasons
            .iter()
            .map(|r| if let Reason::MayBeLow { points, .. } = r { *points } else { 0 })
            .sum();
        missing.min(10_u8.saturating_sub(self.value))
    }
}

/// Why a score cannot be formed.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum NotScored {
    /// The flash point is not known.
    FlashPointNotKnown,
    /// The boiling point is not known.
    BoilingPointNotKnown,
    /// A temperature is not a finite number above 0 K.
    NotATemperature {
        /// What it was given for.
        of: &'static str,
        /// The value, K.
        value_k: f64,
    },
    /// The substance boils below 20 °C: it is a gas, and the guide scores liquids.
    Gas {
        /// Its boiling point, K.
        boiling_point_k: f64,
    },
}

impl fmt::Display for NotScored {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            Self::FlashPointNotKnown => {
                write!(f, "the flash point is not known; give it, or state that there is none")
            }
            Self::BoilingPointNotKnown => write!(f, "the boiling point is not known; give it"),
            Self::NotATemperature { of, value_k } => {
                write!(f, "the {of} is {value_k} K; a finite temperature above 0 K is needed")
            }
            Self::Gas { boiling_point_k } => write!(
                f,
                "it boils at {} °C: a gas at room temperature, and the guide scores liquids only",
                whole_celsius(*boiling_point_k)
            ),
        }
    }
}

impl std::error::Error for NotScored {}

/// The ranking that the three scores combine to.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum Ranking {
    /// Recommended.
    Recommended,
    /// Problematic.
    Problematic,
    /// Hazardous.
    Hazardous,
}

impl Ranking {
    /// The guide's word.
    #[must_use]
    pub const fn word(self) -> &'static str {
        match self {
            Self::Recommended => "recommended",
            Self::Problematic => "problematic",
            Self::Hazardous => "hazardous",
        }
    }
}

/// The three scores and their ranking.
#[derive(Clone, Debug, PartialEq)]
pub struct Assessment {
    /// Safety score.
    pub safety: Score,
    /// Health score.
    pub health: Score,
    /// Environment score.
    pub environment: Score,
    /// The default ranking.
    pub ranking: Ranking,
    /// Which rule of the combination decided.
    pub because: &'static str,
}

/// Safety, health, environment and the default ranking of one solvent.
///
/// # Errors
/// [`NotScored`] where a temperature that a score needs is not known or is none, or the substance is a gas.
///
/// ```
/// use thimbleworth::hazard::chem21::{assess, FlashPoint, Inputs, Ranking, Registration};
/// // Diethyl ether: the guide's Table 7 prints 10, 3, 7, hazardous.
/// let ether = assess(&Inputs {
///     flash_point: FlashPoint::AtK(273.15 - 45.0),
///     boiling_point_k: Some(273.15 + 34.0),
///     autoignition_k: Some(273.15 + 160.0),
///     builds_static: Some(true),
///     decomposes_above_500_j_per_g: false,
///     statements: &["H302", "EUH019"],
///     registration: Registration::Full,
///     is_water: false,
/// }).unwrap();
/// assert_eq!((ether.safety.value, ether.health.value, ether.environment.value), (10, 3, 7));
/// assert_eq!(ether.ranking, Ranking::Hazardous);
/// ```
pub fn assess(inputs: &Inputs<'_>) -> Result<Assessment, NotScored> {
    let (safety, health, environment) = (safety(inputs)?, health(inputs)?, environment(inputs)?);
    let (ranking, because) = combine(safety.value, health.value, environment.value);
    Ok(Assessment { safety, health, environment, ranking, because })
}

/// The safety score: the band of the flash point, and a point each for auto-ignition below 200 °C, static charge and
/// peroxides (EUH019); 10 where the substance decomposes violently; at most 10.
///
/// What is not known of the added points is in the reasons as [`Reason::MayBeLow`].
///
/// # Errors
/// [`NotScored::FlashPointNotKnown`], [`NotScored::NotATemperature`], [`NotScored::Gas`].
pub fn safety(inputs: &Inputs<'_>) -> Result<Score, NotScored> {
    checked_boiling_point(inputs)?;
    let mut reasons = Vec::new();
    let base = match inputs.flash_point {
        FlashPoint::NotKnown => return Err(NotScored::FlashPointNotKnown),
        FlashPoint::None => {
            reasons.push(Reason::Set { points: 1, why: "no flash point" });
            1
        }
        FlashPoint::AtK(value_k) => {
            let (points, band) = match whole_celsius(checked("flash point", value_k)?) {
                c if c > 60.0 => (1, "above 60 °C"),
                c if c >= 24.0 => (3, "24 to 60 °C"),
                c if c >= 0.0 => (4, "0 to 23 °C"),
                c if c >= -20.0 => (5, "-20 to -1 °C"),
                _ => (7, "below -20 °C"),
            };
            reasons.push(Reason::Band { of: "flash point", value_k, band, points });
            points
        }
    };
    if inputs.decomposes_above_500_j_per_g {
        reasons.push(Reason::Set { points: 10, why: "decomposition energy above 500 J/g" });
        return Ok(Score { value: 10, reasons });
    }
    let mut value = base;
    let mut add = |points: u8, why: &'static str, reasons: &mut Vec<Reason>| {
        value += points;
        reasons.push(Reason::Added { points, why });
    };
    match inputs.autoignition_k {
        Some(k) if whole_celsius(checked("auto-ignition temperature", k)?) < 200.0 => {
            add(1, "auto-ignition below 200 °C", &mut reasons);
        }
        Some(_) => {}
        // What does not flash is not asked for its auto-ignition.
        None if inputs.flash_point == FlashPoint::None => {}
        None => {
            reasons.push(Reason::MayBeLow { points: 1, why: "the auto-ignition temperature is not known" });
        }
    }
    match inputs.builds_static {
        Some(true) => add(1, "builds up static charge (resistivity above 1e8 Ω·m)", &mut reasons),
        Some(false) => {}
        None => reasons.push(Reason::MayBeLow { points: 1, why: "the resistivity is not known" }),
    }
    if codes(inputs.statements).iter().any(|c| c == "EUH019") {
        add(1, "EUH019: forms peroxides", &mut reasons);
    }
    Ok(Score { value: value.min(10), reasons })
}

/// Points of a health statement in the guide's table; 0 where the table does not hold it.
fn health_points(code: &str) -> u8 {
    match code {
        "H340" | "H350" | "H360" | "H300" | "H310" | "H330" => 9,
        "H314" => 7,
        "H341" | "H351" | "H361" | "H370" | "H372" | "H301" | "H311" | "H331" => 6,
        "H318" | "H334" => 4,
        "H302" | "H304" | "H312" | "H315" | "H317" | "H319" | "H332" | "H335" | "H336" | "H371" | "H373"
        | "EUH066" | "EUH070" => 2,
        _ => 0,
    }
}

/// The health score: the worst H3xx statement, a point more where the solvent boils below 85 °C.
///
/// The guide's rule reads "below 85 °C"; its row for 1,2-dimethoxyethane, tabulated at 85, has the point and the one
/// at 86 has not, so the boiling point is rounded to whole degrees and 85 included. The point is not added to 1 (no
/// statement) or to the 5 of an incomplete registration, which no published row tests.
///
/// # Errors
/// [`NotScored::BoilingPointNotKnown`] where there is a statement, [`NotScored::NotATemperature`],
/// [`NotScored::Gas`].
pub fn health(inputs: &Inputs<'_>) -> Result<Score, NotScored> {
    let boiling_point_k = checked_boiling_point(inputs)?;
    let mut reasons = Vec::new();
    let mut worst: Option<(u8, String)> = None;
    for code in codes(inputs.statements) {
        let points = match health_points(&code) {
            0 if code.starts_with("H3") || code == "EUH071" => {
                reasons.push(Reason::NotInTable { code: code.clone() });
                2
            }
            0 => continue,
            points => points,
        };
        if worst.as_ref().is_none_or(|(most, _)| points > *most) {
            worst = Some((points, code));
        }
    }
    let mut value = 1;
    match worst {
        Some((points, code)) => {
            value = points;
            reasons.push(Reason::Statement { code, points });
            let boiling_point_k = boiling_point_k.ok_or(NotScored::BoilingPointNotKnown)?;
            if whole_celsius(boiling_point_k) <= 85.0 {
                value += 1;
                reasons.push(Reason::Added { points: 1, why: "boils at 85 °C or below" });
            }
        }
        None if inputs.registration == Registration::Full => {
            reasons.push(Reason::Set { points: 1, why: "no H3xx statement after full registration" });
        }
        None => {}
    }
    if inputs.registration == Registration::NotFull && value < 5 {
        value = 5;
        reasons.push(Reason::Set { points: 5, why: "no full registration" });
    }
    Ok(Score { value: value.min(10), reasons })
}

/// The environment score: the higher of the band of the boiling point and the worst H4xx statement; at least 5
/// without full registration; water 1.
///
/// # Errors
/// [`NotScored::BoilingPointNotKnown`], [`NotScored::NotATemperature`], [`NotScored::Gas`].
pub fn environment(inputs: &Inputs<'_>) -> Result<Score, NotScored> {
    if inputs.is_water {
        return Ok(Score { value: 1, reasons: vec![Reason::Set { points: 1, why: "water" }] });
    }
    let value_k = checked_boiling_point(inputs)?.ok_or(NotScored::BoilingPointNotKnown)?;
    let (points, band) = match whole_celsius(value_k) {
        c if c < 50.0 => (7, "below 50 °C"),
        c if c < 70.0 => (5, "50 to 69 °C"),
        c if c < 140.0 => (3, "70 to 139 °C"),
        c if c <= 200.0 => (5, "140 to 200 °C"),
        _ => (7, "above 200 °C"),
    };
    let mut value = points;
    let mut reasons = vec![Reason::Band { of: "boiling point", value_k, band, points }];
    for code in codes(inputs.statements) {
        let points = match code.as_str() {
            "H420" | "EUH059" => 10,
            "H400" | "H410" | "H411" => 7,
            "H412" | "H413" => 5,
            _ => continue,
        };
        if points > value {
            value = points;
        }
        reasons.push(Reason::Statement { code, points });
    }
    if inputs.registration == Registration::NotFull {
        reasons.push(Reason::Set { points: 5, why: "no full registration: at least 5" });
        value = value.max(5);
    }
    Ok(Score { value, reasons })
}

/// The default ranking of three scores, and the rule that decided.
///
/// Hazardous: any score of 8 or more, or two of 7 or more. Problematic: one 7, or two from 4 to 6. Otherwise
/// recommended.
///
/// ```
/// use thimbleworth::hazard::chem21::{combine, Ranking};
/// assert_eq!(combine(4, 7, 5).0, Ranking::Problematic); // methanol
/// assert_eq!(combine(5, 3, 3).0, Ranking::Recommended); // ethyl acetate
/// ```
#[must_use]
pub fn combine(safety: u8, health: u8, environment: u8) -> (Ranking, &'static str) {
    let scores = [safety, health, environment];
    let count = |from: u8, to: u8| scores.iter().filter(|s| (from..=to).contains(*s)).count();
    if count(8, u8::MAX) > 0 {
        (Ranking::Hazardous, "a score of 8 or more")
    } else if count(7, 7) >= 2 {
        (Ranking::Hazardous, "two scores of 7")
    } else if count(7, 7) == 1 {
        (Ranking::Problematic, "one score of 7")
    } else if count(4, 6) >= 2 {
        (Ranking::Problematic, "two scores from 4 to 6")
    } else {
        (Ranking::Recommended, "at most one score above 3, and none above 6")
    }
}

/// The guide bands whole degrees Celsius, so a temperature is rounded before it is banded; this also takes away the
/// rounding of the shift between the two scales.
fn whole_celsius(kelvin: f64) -> f64 {
    libm::round(kelvin - 273.15) + 0.0
}

fn checked(of: &'static str, value_k: f64) -> Result<f64, NotScored> {
    if value_k.is_finite() && value_k > 0.0 {
        Ok(value_k)
    } else {
        Err(NotScored::NotATemperature { of, value_k })
    }
}

fn checked_boiling_point(inputs: &Inputs<'_>) -> Result<Option<f64>, NotScored> {
    let Some(boiling_point_k) = inputs.boiling_point_k else { return Ok(None) };
    if whole_celsius(checked("boiling point", boiling_point_k)?) < 20.0 {
        return Err(NotScored::Gas { boiling_point_k });
    }
    Ok(Some(boiling_point_k))
}

#[cfg(test)]
mod tests {
    use super::*;

    const PLAIN: Inputs<'static> = Inputs {
        flash_point: FlashPoint::AtK(300.0),
        boiling_point_k: Some(373.15),
        autoignition_k: Some(700.0),
        builds_static: Some(false),
        decomposes_above_500_j_per_g: false,
        statements: &[],
        registration: Registration::Full,
        is_water: false,
    };

    #[test]
    fn flash_bands_meet_at_whole_degrees() {
        let at =
            |c: f64| safety(&Inputs { flash_point: FlashPoint::AtK(c + 273.15), ..PLAIN }).unwrap().value;
        let found = [60.6, 60.4, 24.0, 23.4, 0.0, -0.6, -20.0, -21.0].map(at);
        assert_eq!(found, [1, 3, 3, 4, 4, 5, 5, 7]);
    }

    #[test]
    fn what_is_not_known_is_said() {
        let score = safety(&Inputs { autoignition_k: None, builds_static: None, ..PLAIN }).unwrap();
        assert_eq!((score.value, score.may_be_low_by()), (3, 2));
        assert_eq!(
            safety(&Inputs { flash_point: FlashPoint::NotKnown, ..PLAIN }),
            Err(NotScored::FlashPointNotKnown)
        );
        assert_eq!(
            environment(&Inputs { boiling_point_k: None, ..PLAIN }),
            Err(NotScored::BoilingPointNotKnown)
        );
    }

    #[test]
    fn a_gas_is_refused() {
        let refused = assess(&Inputs { boiling_point_k: Some(194.7), ..PLAIN });
        assert_eq!(refused, Err(NotScored::Gas { boiling_point_k: 194.7 }));
    }

    #[test]
    fn incomplete_registration_is_a_floor_not_a_ceiling() {
        let with = |statements| {
            health(&Inputs { statements, registration: Registration::NotFull, ..PLAIN }).unwrap()
        };
        assert_eq!(with(&["H319"]).value, 5);
        assert_eq!(with(&["H350"]).value, 9);
    }

    #[test]
    fn statements_outside_the_table_are_named() {
        let score = health(&Inputs { statements: &["H362"], ..PLAIN }).unwrap();
        assert_eq!(score.value, 2);
        assert!(score.reasons.contains(&Reason::NotInTable { code: "H362".into() }));
    }
}
