//! Label elements from hazard statements: pictogram codes and the signal word.
//!
//! The codes are text (`GHS02`); no symbol is drawn anywhere. The label of a bottle in hand, or its safety data
//! sheet, is the later word: a supplier may classify beyond the harmonised minimum.
use super::statement::codes;
use crate::source::{Source, Standing};

/// Where the map and the precedence rules come from. Precedence was read in full copies of the article; the map of
/// single codes agrees with public tables for the codes that solvents carry, the rarer physical hazards are from
/// memory.
pub const SOURCE: Source = Source::new(
    "Regulation (EC) No 1272/2008 (CLP), Annex I, Annex V and Article 26; UN GHS 1.4.10.5.3",
    Standing::Secondary,
);

/// A GHS pictogram, by its code.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum Pictogram {
    /// Exploding bomb
    Ghs01,
    /// Flame
    Ghs02,
    /// Flame over circle
    Ghs03,
    /// Gas cylinder
    Ghs04,
    /// Corrosion
    Ghs05,
    /// Skull and crossbones
    Ghs06,
    /// Exclamation mark
    Ghs07,
    /// Health hazard
    Ghs08,
    /// Environment
    Ghs09,
}

impl Pictogram {
    /// All nine, in the order of their codes.
    pub const ALL: [Self; 9] = [
        Self::Ghs01,
        Self::Ghs02,
        Self::Ghs03,
        Self::Ghs04,
        Self::Ghs05,
        Self::Ghs06,
        Self::Ghs07,
        Self::Ghs08,
        Self::Ghs09,
    ];

    /// The code, `GHS02`.
    #[must_use]
    pub const fn code(self) -> &'static str {
        match self {
            Self::Ghs01 => "GHS01",
            Self::Ghs02 => "GHS02",
            Self::Ghs03 => "GHS03",
            Self::Ghs04 => "GHS04",
            Self::Ghs05 => "GHS05",
            Self::Ghs06 => "GHS06",
            Self::Ghs07 => "GHS07",
            Self::Ghs08 => "GHS08",
            Self::Ghs09 => "GHS09",
        }
    }

    /// What the symbol shows, in words.
    #[must_use]
    pub const fn words(self) -> &'static str {
        match self {
            Self::Ghs01 => "exploding bomb",
            Self::Ghs02 => "flame",
            Self::Ghs03 => "flame over circle",
            Self::Ghs04 => "gas cylinder",
            Self::Ghs05 => "corrosion",
            Self::Ghs06 => "skull and crossbones",
            Self::Ghs07 => "exclamation mark",
            Self::Ghs08 => "health hazard",
            Self::Ghs09 => "environment",
        }
    }
}

/// The signal word of a label.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum SignalWord {
    /// No signal word.
    None,
    /// Warning: the less severe.
    Warning,
    /// Danger: the more severe.
    Danger,
}

impl SignalWord {
    /// The word as it stands on a label; `"none"` where there is none.
    #[must_use]
    pub const fn word(self) -> &'static str {
        match self {
            Self::None => "none",
            Self::Warning => "Warning",
            Self::Danger => "Danger",
        }
    }
}

/// What hazard statements bring to a label.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Label {
    /// The pictograms after precedence, in the order of their codes, each once.
    pub pictograms: Vec<Pictogram>,
    /// The most severe signal word.
    pub signal_word: SignalWord,
    /// Pictograms in `pictograms` that Article 26 makes optional beside another one.
    pub optional: Vec<Pictogram>,
    /// Pictograms that precedence took away, with the reason.
    pub dropped: Vec<(Pictogram, &'static str)>,
    /// Codes that stand for more than one category, read as the most severe of them.
    pub read_as_worst: Vec<String>,
    /// Codes that are not in the table; a label that has any is not complete.
    pub unknown: Vec<String>,
}

/// What one statement brings.
struct Brings {
    code: &'static str,
    pictograms: &'static [Pictogram],
    word: SignalWord,
    /// The code is shared by categories with different elements; the row holds the most severe.
    shared: bool,
}

/// Pictograms and signal word that follow from hazard statements.
///
/// `statements` are codes as written in a data sheet: `"H225"`, `"H361fd"`, `"H301+H311"`, `"EUH066"`. Precedence:
/// with GHS06 the exclamation mark is dropped for health hazards; with GHS05 for skin and eye irritation (H315, H319,
/// H320); with GHS08 for respiratory sensitisation (H334) for skin sensitisation and irritation (H315, H317, H319,
/// H320). GHS04 beside GHS02 or GHS06, and GHS02 and GHS03 beside GHS01, are optional and kept.
///
/// The exclamation mark of the ozone statement H420 is kept beside GHS06: the UN text confines precedence to health
/// hazards. Article 26(1)(b) read to the letter would drop it, so the sterner reading is taken.
///
/// Source: see [`SOURCE`].
///
/// ```
/// use thimbleworth::hazard::{label, Pictogram, SignalWord};
/// let hexane = label(&["H225", "H361f", "H304", "H373", "H315", "H336", "H411"]);
/// let codes: Vec<_> = hexane.pictograms.iter().map(|p| p.code()).collect();
/// assert_eq!(codes, ["GHS02", "GHS07", "GHS08", "GHS09"]);
/// assert_eq!(hexane.signal_word, SignalWord::Danger);
/// let methanol = label(&["H225", "H301+H311+H331", "H370"]);
/// assert!(!methanol.pictograms.contains(&Pictogram::Ghs07));
/// ```
#[must_use]
pub fn label(statements: &[&str]) -> Label {
    let mut word = SignalWord::None;
    let mut present = [false; 9];
    let mut marks: Vec<&'static str> = Vec::new();
    let (mut read_as_worst, mut unknown) = (Vec::new(), Vec::new());
    let mut respiratory = false;
    for code in codes(statements) {
        let Some(row) = TABLE.iter().find(|row| row.code == code) else {
            if !NO_ELEMENTS.contains(&code.as_str()) && !is_supplemental(&code) && !unknown.contains(&code) {
                unknown.push(code);
            }
            continue;
        };
        if word < row.word {
            word = row.word;
        }
        respiratory = respiratory || row.code == "H334";
        if row.shared && !read_as_worst.contains(&code) {
            read_as_worst.push(code);
        }
        for (slot, pictogram) in present.iter_mut().zip(Pictogram::ALL) {
            if row.pictograms.contains(&pictogram) {
                *slot = true;
                if pictogram == Pictogram::Ghs07 {
                    marks.push(row.code);
                }
            }
        }
    }
    let has = |wanted: Pictogram| Pictogram::ALL.iter().zip(present).any(|(p, here)| here && *p == wanted);
    let mut dropped = Vec::new();
    if let Some(reason) =
        exclamation_dropped(&marks, has(Pictogram::Ghs06), has(Pictogram::Ghs05), respiratory)
    {
        dropped.push((Pictogram::Ghs07, reason));
    }
    let mut optional = Vec::new();
    if has(Pictogram::Ghs01) && !codes(statements).iter().any(|code| code == "H241") {
        optional.extend([Pictogram::Ghs02, Pictogram::Ghs03].into_iter().filter(|p| has(*p)));
    }
    if has(Pictogram::Ghs04) && (has(Pictogram::Ghs02) || has(Pictogram::Ghs06)) {
        optional.push(Pictogram::Ghs04);
    }
    let pictograms = Pictogram::ALL
        .into_iter()
        .filter(|p| has(*p) && !dropped.iter().any(|(gone, _)| gone == p))
        .collect();
    Label { pictograms, signal_word: word, optional, dropped, read_as_worst, unknown }
}

/// Why the exclamation mark goes, if every statement that asks for it is outranked.
fn exclamation_dropped(
    marks: &[&str],
    skull: bool,
    corrosion: bool,
    respiratory: bool,
) -> Option<&'static str> {
    const IRRITATION: [&str; 3] = ["H315", "H319", "H320"];
    const OZONE: &str = "H420";
    if marks.is_empty() {
        return None;
    }
    if skull && marks.iter().all(|m| *m != OZONE) {
        return Some("GHS06 applies");
    }
    let outranked = |m: &&str| {
        (skull && *m != OZONE)
            || ((corrosion || respiratory) && IRRITATION.contains(m))
            || (respiratory && *m == "H317")
    };
    if marks.iter().all(outranked) {
        return Some(if corrosion {
            "GHS05 applies: not for skin or eye irritation"
        } else {
            "GHS08 applies for respiratory sensitisation: not for skin sensitisation or irritation"
        });
    }
    None
}

/// Statements of the GHS or of CLP that bring neither pictogram nor signal word.
const NO_ELEMENTS: [&str; 5] = ["H362", "H401", "H402", "H412", "H413"];

/// EU statements that only add a sentence.
fn is_supplemental(code: &str) -> bool {
    const ADDED: [&str; 9] =
        ["EUH014", "EUH018", "EUH019", "EUH029", "EUH031", "EUH032", "EUH066", "EUH070", "EUH071"];
    ADDED.contains(&code) || code.starts_with("EUH2")
}

const fn row(code: &'static str, pictograms: &'static [Pictogram], word: SignalWord, shared: bool) -> Brings {
    Brings { code, pictograms, word, shared }
}

use Pictogram::{Ghs01, Ghs02, Ghs03, Ghs04, Ghs05, Ghs06, Ghs07, Ghs08, Ghs09};
use SignalWord::{Danger, Warning};

/// Code, pictograms, signal word, shared by categories that differ.
#[rustfmt::skip]
const TABLE: &[Brings] = &[
    row("H200", &[Ghs01], Danger, false),
    row("H201", &[Ghs01], Danger, false),
    row("H202", &[Ghs01], Danger, false),
    row("H203", &[Ghs01], Danger, false),
    row("H204", &[Ghs01], Warning, false),
    row("H205", &[], Danger, false),
    row("H206", &[Ghs02], Danger, false),
    row("H207", &[Ghs02], Danger, true),
    row("H208", &[Ghs02], Warning, false),
    row("H220", &[Ghs02], Danger, false),
    row("H221", &[Ghs02], Danger, true),
    row("H222", &[Ghs02], Danger, false),
    row("H223", &[Ghs02], Warning, false),
    row("H224", &[Ghs02], Danger, false),
    row("H225", &[Ghs02], Danger, false),
    row("H226", &[Ghs02], Warning, false),
    row("H227", &[], Warning, false),
    row("H228", &[Ghs02], Danger, true),
    row("H229", &[], Warning, false),
    row("H230", &[Ghs02], Danger, false),
    row("H231", &[Ghs02], Danger, false),
    row("H232", &[Ghs02], Danger, false),
    row("H240", &[Ghs01], Danger, false),
    row("H241", &[Ghs01, Ghs02], Danger, false),
    row("H242", &[Ghs02], Danger, true),
    row("H250", &[Ghs02], Danger, false),
    row("H251", &[Ghs02], Danger, false),
    row("H252", &[Ghs02], Warning, false),
    row("H260", &[Ghs02], Danger, false),
    row("H261", &[Ghs02], Danger, true),
    row("H270", &[Ghs03], Danger, false),
    row("H271", &[Ghs03], Danger, false),
    row("H272", &[Ghs03], Danger, true),
    row("H280", &[Ghs04], Warning, false),
    row("H281", &[Ghs04], Warning, false),
    row("H290", &[Ghs05], Warning, false),
    row("H300", &[Ghs06], Danger, false),
    row("H301", &[Ghs06], Danger, false),
    row("H302", &[Ghs07], Warning, false),
    row("H303", &[], Warning, false),
    row("H304", &[Ghs08], Danger, false),
    row("H305", &[Ghs08], Warning, false),
    row("H310", &[Ghs06], Danger, false),
    row("H311", &[Ghs06], Danger, false),
    row("H312", &[Ghs07], Warning, false),
    row("H313", &[], Warning, false),
    row("H314", &[Ghs05], Danger, false),
    row("H315", &[Ghs07], Warning, false),
    row("H316", &[], Warning, false),
    row("H317", &[Ghs07], Warning, false),
    row("H318", &[Ghs05], Danger, false),
    row("H319", &[Ghs07], Warning, false),
    row("H320", &[], Warning, false),
    row("H330", &[Ghs06], Danger, false),
    row("H331", &[Ghs06], Danger, false),
    row("H332", &[Ghs07], Warning, false),
    row("H333", &[], Warning, false),
    row("H334", &[Ghs08], Danger, false),
    row("H335", &[Ghs07], Warning, false),
    row("H336", &[Ghs07], Warning, false),
    row("H340", &[Ghs08], Danger, false),
    row("H341", &[Ghs08], Warning, false),
    row("H350", &[Ghs08], Danger, false),
    row("H351", &[Ghs08], Warning, false),
    row("H360", &[Ghs08], Danger, false),
    row("H361", &[Ghs08], Warning, false),
    row("H370", &[Ghs08], Danger, false),
    row("H371", &[Ghs08], Warning, false),
    row("H372", &[Ghs08], Danger, false),
    row("H373", &[Ghs08], Warning, false),
    row("H400", &[Ghs09], Warning, false),
    row("H410", &[Ghs09], Warning, false),
    row("H411", &[Ghs09], SignalWord::None, false),
    row("H420", &[Ghs07], Warning, false),
];

#[cfg(test)]
mod tests {
    use super::*;

    fn shown(statements: &[&str]) -> Vec<&'static str> {
        label(statements).pictograms.iter().map(|p| p.code()).collect()
    }

    #[test]
    fn skull_outranks_exclamation_but_not_for_ozone() {
        assert_eq!(shown(&["H301", "H315", "H336"]), ["GHS06"]);
        assert_eq!(shown(&["H301", "H420"]), ["GHS06", "GHS07"]);
    }

    #[test]
    fn corrosion_outranks_exclamation_for_irritation_only() {
        assert_eq!(shown(&["H318", "H315"]), ["GHS05"]);
        assert_eq!(shown(&["H318", "H315", "H336"]), ["GHS05", "GHS07"]);
        assert_eq!(shown(&["H314", "H317"]), ["GHS05", "GHS07"]);
    }

    #[test]
    fn respiratory_sensitiser_outranks_exclamation_for_skin_but_other_ghs08_does_not() {
        assert_eq!(shown(&["H334", "H317", "H319"]), ["GHS08"]);
        assert_eq!(shown(&["H351", "H317", "H319"]), ["GHS07", "GHS08"]);
        assert_eq!(shown(&["H334", "H335"]), ["GHS07", "GHS08"]);
    }

    #[test]
    fn optional_pictograms_are_kept_and_named() {
        let propane = label(&["H220", "H280"]);
        assert_eq!(propane.pictograms, [Ghs02, Ghs04]);
        assert_eq!(propane.optional, [Ghs04]);
        assert!(label(&["H241"]).optional.is_empty(), "both are compulsory for H241");
    }

    #[test]
    fn unknown_and_shared_codes_are_named() {
        let odd = label(&["H999", "H242", "H412", "EUH066", "EUH208"]);
        assert_eq!(odd.unknown, ["H999"]);
        assert_eq!(odd.read_as_worst, ["H242"]);
    }

    #[test]
    fn table_has_each_code_once_in_order() {
        assert!(TABLE.windows(2).all(|w| w.iter().map(|r| r.code).is_sorted_by(|a, b| a < b)));
    }
}
