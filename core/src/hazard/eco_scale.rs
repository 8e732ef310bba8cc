//! The Analytical Eco-Scale: 100 minus penalty points, every penalty a line.
//!
//! Source: Gałuszka, Migaszewski, Konieczka, Namieśnik, TrAC 2012, 37, 61. That the score is 100 minus penalties for
//! reagents, energy, occupational hazard and waste was seen in secondary sources; the points of each band are from
//! memory. No published worked example with full inputs was found.
//!
//! The paper leaves four things open, and two procedures scored under different readings must not be compared: which
//! band exactly 10 and 100 g (mL) fall in, whether water and inert gases count, and whether amounts and waste are
//! those of a sample or of the whole procedure. They are [`Options`], and the result carries them.
use super::pictogram::SignalWord;
use crate::quantity::{Kind, show, significant};
use crate::source::{Source, Standing};
use std::fmt;

/// The method, and how far its table has been traced.
pub const SOURCE: Source = Source::new("Gałuszka et al., TrAC 2012, 37, 61", Standing::FromMemory);

/// An amount of reagent or waste; the method reads grams and millilitres alike.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Amount {
    /// A mass, kg.
    MassKg(f64),
    /// A volume, m³.
    VolumeM3(f64),
}

impl Amount {
    /// Grams or millilitres.
    fn g_or_ml(self) -> f64 {
        match self {
            Self::MassKg(kg) => kg * 1e3,
            Self::VolumeM3(m3) => m3 * 1e6,
        }
    }
}

impl fmt::Display for Amount {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        f.write_str(&match *self {
            Self::MassKg(kg) => show(kg, Kind::Mass),
            Self::VolumeM3(m3) => show(m3, Kind::Volume),
        })
    }
}

/// A reagent of the procedure.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Reagent<'a> {
    /// Its name.
    pub name: &'a str,
    /// How much of it.
    pub amount: Amount,
    /// Number of pictograms on its label.
    pub pictograms: u32,
    /// Signal word of its label.
    pub signal_word: SignalWord,
    /// Water or an inert gas such as nitrogen or CO2.
    pub water_or_inert_gas: bool,
}

/// What becomes of the waste.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Treatment {
    /// Recycled.
    Recycling,
    /// Degraded.
    Degradation,
    /// Passivated.
    Passivation,
    /// Nothing is done to it.
    None,
}

impl Treatment {
    const fn penalty(self) -> (u32, &'static str) {
        match self {
            Self::Recycling => (0, "the waste is recycled"),
            Self::Degradation => (1, "the waste is degraded"),
            Self::Passivation => (2, "the waste is passivated"),
            Self::None => (3, "the waste is not treated"),
        }
    }
}

/// Which band an amount exactly on an edge falls in.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Edge {
    /// The middle band: exactly 10 and exactly 100 both count 2; of waste, exactly 1 and exactly 10 both count 3.
    Middle,
    /// The outer bands: exactly 10 counts 1 and exactly 100 counts 3; of waste, exactly 1 counts 1, exactly 10
    /// counts 5.
    Outer,
}

/// What amounts are amounts of.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Basis {
    /// One sample.
    Sample,
    /// The whole procedure, with what its calibration and blanks take.
    Procedure,
}

/// How the open points of the paper are read.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Options {
    /// Amounts exactly on the edge of a band.
    pub edge: Edge,
    /// Whether water and inert gases are reagents; if not, they stand in the table with 0.
    pub count_water_and_inert_gas: bool,
    /// What the reagents' amounts belong to; carried to the result, not computed with.
    pub reagents: Basis,
    /// What the amount of waste belongs to; carried to the result, not computed with.
    pub waste: Basis,
}

impl Default for Options {
    fn default() -> Self {
        Self {
            edge: Edge::Middle,
            count_water_and_inert_gas: false,
            reagents: Basis::Sample,
            waste: Basis::Sample,
        }
    }
}

/// The procedure to score.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Procedure<'a> {
    /// Its reagents.
    pub reagents: &'a [Reagent<'a>],
    /// Electricity for one sample, J.
    pub energy_j_per_sample: f64,
    /// Whether any vapour or gas goes to air: solvent vapour, and vented CO2 too. A trap that vents is not hermetic.
    pub emits_to_air: bool,
    /// The waste; `None` where there is none.
    pub waste: Option<Amount>,
    /// What becomes of it.
    pub treatment: Treatment,
}

/// The part of the table that a line belongs to.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Block {
    /// A reagent.
    Reagent,
    /// Energy.
    Energy,
    /// Occupational hazard.
    Occupational,
    /// Amount of waste.
    Waste,
    /// Treatment of waste.
    Treatment,
}

/// One line of the penalty table.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Line {
    /// The part of the table.
    pub block: Block,
    /// What is penalised.
    pub what: String,
    /// How much of it, with its unit; empty where there is no amount.
    pub amount: String,
    /// Penalty points.
    pub penalty: u32,
    /// Why, as a sentence without a full stop.
    pub why: String,
}

/// The paper's word for a score.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum Verdict {
    /// 50 or less: inadequate green analysis. The paper says below 50; 50 itself is in neither of its ranges.
    Inadequate,
    /// Above 50: acceptable green analysis.
    Acceptable,
    /// Above 75: excellent green analysis.
    Excellent,
}

impl Verdict {
    /// The verdict on a score.
    ///
    /// ```
    /// use thimbleworth::hazard::eco_scale::Verdict;
    /// assert_eq!(Verdict::of(76), Verdict::Excellent);
    /// assert_eq!(Verdict::of(75), Verdict::Acceptable);
    /// assert_eq!(Verdict::of(50), Verdict::Inadequate);
    /// ```
    #[must_use]
    pub const fn of(score: i64) -> Self {
        if score > 75 {
            Self::Excellent
        } else if score > 50 {
            Self::Acceptable
        } else {
            Self::Inadequate
        }
    }

    /// The paper's word.
    #[must_use]
    pub const fn word(self) -> &'static str {
        match self {
            Self::Inadequate => "inadequate",
            Self::Acceptable => "acceptable",
            Self::Excellent => "excellent",
        }
    }
}

/// The scored procedure.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct EcoScale {
    /// Every line, those of 0 points too.
    pub lines: Vec<Line>,
    /// The sum of the penalties.
    pub penalty: u64,
    /// 100 minus the penalties; may be negative.
    pub score: i64,
    /// The paper's word.
    pub verdict: Verdict,
    /// The reading of the open points that was used.
    pub options: Options,
}

/// What cannot be scored.
#[derive(Clone, Debug, PartialEq)]
pub enum EcoScaleError {
    /// An amount or the energy is negative or not a number.
    NotAnAmount {
        /// Of what.
        of: String,
        /// The value, in SI units.
        value: f64,
    },
}

impl fmt::Display for EcoScaleError {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            Self::NotAnAmount { of, value } => {
                write!(f, "the amount of {of} is {value}; a finite amount of 0 or more is needed")
            }
        }
    }
}

impl std::error::Error for EcoScaleError {}

/// Scores a procedure.
///
/// Reagents: points of the amount times points of the hazard, the latter the number of pictograms times the signal
/// word (none 0, Warning 1, Danger 2). Energy a sample: up to 0.1 kWh 0, up to 1.5 kWh 1, more 2. Vapours or gases to
/// air 3. Waste: none 0, below 1 g (mL) 1, up to 10 g 3, more 5; its treatment 0 to 3, where there is waste.
///
/// # Errors
/// [`EcoScaleError`] for an amount or energy that is negative or not finite.
///
/// ```
/// use thimbleworth::hazard::{eco_scale::*, SignalWord};
/// let acetone = Reagent {
///     name: "acetone",
///     amount: Amount::VolumeM3(30e-6),
///     pictograms: 2,
///     signal_word: SignalWord::Danger,
///     water_or_inert_gas: false,
/// };
/// let scored = score(
///     &Procedure {
///         reagents: &[acetone],
///         energy_j_per_sample: 0.5 * 3.6e6,
///         emits_to_air: true,
///         waste: Some(Amount::VolumeM3(30e-6)),
///         treatment: Treatment::None,
///     },
///     Options::default(),
/// ).unwrap();
/// // 2 × 4 for the acetone, 1 energy, 3 air, 5 waste, 3 untreated
/// assert_eq!((scored.penalty, scored.score, scored.verdict.word()), (20, 80, "excellent"));
/// ```
pub fn score(procedure: &Procedure<'_>, options: Options) -> Result<EcoScale, EcoScaleError> {
    let mut lines = Vec::with_capacity(procedure.reagents.len() + 4);
    for reagent in procedure.reagents {
        lines.push(reagent_line(reagent, options)?);
    }
    lines.push(energy_line(procedure.energy_j_per_sample)?);
    lines.push(Line {
        block: Block::Occupational,
        what: "air".to_owned(),
        amount: String::new(),
        penalty: if procedure.emits_to_air { 3 } else { 0 },
        why: if procedure.emits_to_air { "vapours or gases go to air" } else { "nothing goes to air" }
            .to_owned(),
    });
    let waste = waste_line(procedure.waste, options.edge)?;
    let (treated, treated_why) =
        if waste.penalty == 0 { (0, "there is no waste to treat") } else { procedure.treatment.penalty() };
    lines.push(waste);
    lines.push(Line {
        block: Block::Treatment,
        what: "waste treatment".to_owned(),
        amount: String::new(),
        penalty: treated,
        why: treated_why.to_owned(),
    });
    let penalty: u64 = lines.iter().map(|l| u64::from(l.penalty)).sum();
    let score = 100_i64.saturating_sub(i64::try_from(penalty).unwrap_or(i64::MAX));
    Ok(EcoScale { lines, penalty, score, verdict: Verdict::of(score), options })
}

/// Penalty points of an amount: below 10 g (mL) 1, from 10 to 100 2, above 100 3.
///
/// ```
/// use thimbleworth::hazard::eco_scale::{amount_points, Amount, Edge};
/// let points = |ml: f64, edge| amount_points(Amount::VolumeM3(ml * 1e-6), edge);
/// assert_eq!([9.99, 10.0, 100.0, 100.1].map(|ml| points(ml, Edge::Middle)), [1, 2, 2, 3]);
/// assert_eq!([9.99, 10.0, 100.0, 100.1].map(|ml| points(ml, Edge::Outer)), [1, 1, 3, 3]);
/// ```
#[must_use]
pub fn amount_points(amount: Amount, edge: Edge) -> u32 {
    banded(amount.g_or_ml(), 10.0, 100.0, edge, [1, 2, 3])
}

fn reagent_line(reagent: &Reagent<'_>, options: Options) -> Result<Line, EcoScaleError> {
    checked(reagent.name, reagent.amount)?;
    let line = |penalty, why| Line {
        block: Block::Reagent,
        what: reagent.name.to_owned(),
        amount: reagent.amount.to_string(),
        penalty,
        why,
    };
    if reagent.water_or_inert_gas && !options.count_water_and_inert_gas {
        return Ok(line(0, "water or an inert gas, not counted as a reagent".to_owned()));
    }
    if is_none(reagent.amount) {
        return Ok(line(0, "none is used".to_owned()));
    }
    let amount = amount_points(reagent.amount, options.edge);
    let word = match reagent.signal_word {
        SignalWord::None => 0,
        SignalWord::Warning => 1,
        SignalWord::Danger => 2,
    };
    // PP = PP(amount) × pictograms × signal word
    let penalty = amount.saturating_mul(reagent.pictograms).saturating_mul(word);
    let shown = reagent.signal_word.word();
    let (pictograms, plural) = (reagent.pictograms, if reagent.pictograms == 1 { "" } else { "s" });
    Ok(line(penalty, format!("amount {amount} × {pictograms} pictogram{plural} × {shown} {word}")))
}

fn energy_line(energy_j: f64) -> Result<Line, EcoScaleError> {
    if !energy_j.is_finite() || energy_j < 0.0 {
        return Err(EcoScaleError::NotAnAmount { of: "energy".to_owned(), value: energy_j });
    }
    let kwh = energy_j / 3.6e6;
    let (penalty, why) = if up_to(kwh, 0.1) {
        (0, "at most 0.1 kWh a sample")
    } else if up_to(kwh, 1.5) {
        (1, "above 0.1 and at most 1.5 kWh a sample")
    } else {
        (2, "above 1.5 kWh a sample")
    };
    Ok(Line {
        block: Block::Energy,
        what: "energy".to_owned(),
        amount: significant(kwh, 4) + " kWh",
        penalty,
        why: why.to_owned(),
    })
}

fn waste_line(waste: Option<Amount>, edge: Edge) -> Result<Line, EcoScaleError> {
    let line = |amount: String, penalty, why: &str| Line {
        block: Block::Waste,
        what: "waste".to_owned(),
        amount,
        penalty,
        why: why.to_owned(),
    };
    let Some(amount) = waste else { return Ok(line(String::new(), 0, "no waste")) };
    checked("waste", amount)?;
    if is_none(amount) {
        return Ok(line(amount.to_string(), 0, "no waste"));
    }
    let penalty = banded(amount.g_or_ml(), 1.0, 10.0, edge, [1, 3, 5]);
    let why = match penalty {
        1 => "below 1 g or mL",
        3 => "1 to 10 g or mL",
        _ => "above 10 g or mL",
    };
    Ok(line(amount.to_string(), penalty, why))
}

fn checked(of: &str, amount: Amount) -> Result<(), EcoScaleError> {
    let (Amount::MassKg(value) | Amount::VolumeM3(value)) = amount;
    if value.is_finite() && value >= 0.0 {
        Ok(())
    } else {
        Err(EcoScaleError::NotAnAmount { of: of.to_owned(), value })
    }
}

fn is_none(amount: Amount) -> bool {
    let (Amount::MassKg(value) | Amount::VolumeM3(value)) = amount;
    value <= 0.0
}

/// Three bands with two edges.
fn banded(value: f64, low: f64, high: f64, edge: Edge, points: [u32; 3]) -> u32 {
    let [below, middle, above] = points;
    match edge {
        Edge::Middle if on(value, low) || on(value, high) => middle,
        Edge::Outer if on(value, low) => below,
        Edge::Outer if on(value, high) => above,
        _ if value < low => below,
        _ if value > high => above,
        _ => middle,
    }
}

/// Whether a value is on an edge. The shift from SI to millilitres leaves the last digits uncertain, so what is within
/// 1e-9 of an edge is on it.
fn on(value: f64, edge: f64) -> bool {
    (value - edge).abs() <= 1e-9 * edge
}

fn up_to(value: f64, edge: f64) -> bool {
    value <= edge || on(value, edge)
}

#[cfg(test)]
mod tests {
    use super::*;

    const NOTHING: Procedure<'static> = Procedure {
        reagents: &[],
        energy_j_per_sample: 0.0,
        emits_to_air: false,
        waste: None,
        treatment: Treatment::None,
    };

    #[test]
    fn nothing_scores_a_hundred_and_still_lists_its_lines() {
        let scored = score(&NOTHING, Options::default()).unwrap();
        assert_eq!((scored.score, scored.lines.len()), (100, 4));
    }

    #[test]
    fn no_waste_needs_no_treatment() {
        let with = |waste| score(&Procedure { waste, ..NOTHING }, Options::default()).unwrap().penalty;
        assert_eq!(with(Some(Amount::MassKg(0.0))), 0);
        assert_eq!(with(Some(Amount::MassKg(0.0005))), 1 + 3);
        assert_eq!(with(Some(Amount::MassKg(0.001))), 3 + 3);
        assert_eq!(with(Some(Amount::MassKg(0.010))), 3 + 3);
        assert_eq!(with(Some(Amount::MassKg(0.011))), 5 + 3);
    }

    #[test]
    fn edges_survive_the_shift_from_si() {
        // 10 × 1e-6 m³ is a hair below 10 mL when shifted back.
        assert_eq!(amount_points(Amount::VolumeM3(10.0 * 1e-6), Edge::Middle), 2);
        assert_eq!(energy_line(0.1 * 3.6e6).unwrap().penalty, 0);
        assert_eq!(energy_line(1.5 * 3.6e6).unwrap().penalty, 1);
        assert_eq!(Amount::VolumeM3(10.0 * 1e-6).to_string(), "10 mL");
    }

    #[test]
    fn refuses_what_is_no_amount() {
        assert!(score(&Procedure { energy_j_per_sample: -1.0, ..NOTHING }, Options::default()).is_err());
        let waste = Some(Amount::MassKg(f64::NAN));
        assert!(score(&Procedure { waste, ..NOTHING }, Options::default()).is_err());
    }
}
