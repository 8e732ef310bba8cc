//! Why a row is refused, and what was changed in one that is used.

/// Why a row is refused.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum Why {
    /// A quote opens and is never closed.
    OpenQuote,
    /// Text follows a closing quote.
    StrayQuote,
    /// The line is longer than any row is.
    LongLine,
    /// The text ends before the row does.
    CutOff,
    /// More cells than headings.
    TooManyCells,
    /// The cell of the date is empty.
    NoDate,
    /// The cell is no date.
    NotADate,
    /// The calendar has no such day.
    NoSuchDay,
    /// Either number could be the day.
    DayOrMonth,
    /// No material is named, or no stream.
    NoName,
    /// No material of this name is known.
    UnknownMaterial,
    /// The check digit of a CAS number is wrong.
    CasDigit,
    /// Name and CAS number are of two materials.
    CasDiffers,
    /// The plan has no stream of this name.
    UnknownStream,
    /// The plan has no route of this name.
    UnknownRoute,
    /// The cell of the amount is empty.
    NoAmount,
    /// The cell is no amount.
    NotAnAmount,
    /// A comma could be a decimal comma or a mark of thousands.
    CommaOrThousands,
    /// The amount has no unit.
    NoUnit,
    /// The unit is none of mass or volume.
    OtherUnit,
    /// A count must be a whole number.
    NotWhole,
    /// A stock cannot be negative.
    Negative,
    /// The amount is larger than any that people handle.
    TooLarge,
    /// The sample type is not one that is known.
    SampleType,
    /// The cell is neither yes nor no.
    YesOrNo,
}

impl Why {
    /// All of them.
    pub const ALL: [Self; 25] = [
        Self::OpenQuote,
        Self::StrayQuote,
        Self::LongLine,
        Self::CutOff,
        Self::TooManyCells,
        Self::NoDate,
        Self::NotADate,
        Self::NoSuchDay,
        Self::DayOrMonth,
        Self::NoName,
        Self::UnknownMaterial,
        Self::CasDigit,
        Self::CasDiffers,
        Self::UnknownStream,
        Self::UnknownRoute,
        Self::NoAmount,
        Self::NotAnAmount,
        Self::CommaOrThousands,
        Self::NoUnit,
        Self::OtherUnit,
        Self::NotWhole,
        Self::Negative,
        Self::TooLarge,
        Self::SampleType,
        Self::YesOrNo,
    ];

    /// What was found, and what would do.
    #[must_use]
    pub const fn words(self) -> [&'static str; 2] {
        match self {
            Self::OpenQuote => ["a quote opens here and is not closed", "a quote before and after the cell"],
            Self::StrayQuote => ["text follows a closing quote", "quotes inside of a cell written twice"],
            Self::LongLine => ["the line is longer than 16 kB", "one row a line"],
            Self::CutOff => ["the last line has fewer cells than headings: it may be cut", "the whole file"],
            Self::TooManyCells => [
                "there are more cells than headings",
                "a decimal comma or a separator inside of a cell in quotes",
            ],
            Self::NoDate => ["there is no date", "a day, such as 2026-06-05"],
            Self::NotADate => ["this is no date", "a day, such as 2026-06-05"],
            Self::NoSuchDay => {
                ["the calendar has no such day from 1990 to 2099", "a day, such as 2026-06-05"]
            }
            Self::DayOrMonth => [
                "either number could be the day",
                "say which comes first: \"dates\": \"day first\" or \"month first\"",
            ],
            Self::NoName => ["nothing says of what", "a name or a CAS number"],
            Self::UnknownMaterial => [
                "no material of this name is known",
                "say under \"means\" which one is meant, or add it to the plan's materials",
            ],
            Self::CasDigit => ["the check digit of this CAS number is wrong", "the number as on the label"],
            Self::CasDiffers => ["name and CAS number are of two materials", "one of them corrected"],
            Self::UnknownStream => [
                "the plan has no stream of this name",
                "say under \"means\" which of the site's streams is meant",
            ],
            Self::UnknownRoute => [
                "the plan has no route or workload of this name",
                "say under \"means\" which one is meant, as in \"Work / Route\"",
            ],
            Self::NoAmount => ["there is no amount", "an amount, such as 2.5 L"],
            Self::NotAnAmount => ["this is no amount", "an amount, such as 2.5 L"],
            Self::CommaOrThousands => [
                "the comma could be a decimal comma or a mark of thousands",
                "say which: \"decimals\": \"comma\" or \"point\"",
            ],
            Self::NoUnit => ["the amount has no unit", "a unit in the cell, the heading or the mapping"],
            Self::OtherUnit => ["the unit is none of mass or volume", "a unit such as kg, g, L or mL"],
            Self::NotWhole => ["this is no whole number", "a count"],
            Self::Negative => ["a stock cannot be negative", "what stands on the shelf"],
            Self::TooLarge => ["the amount is larger than any that a site handles", "its unit checked"],
            Self::SampleType => [
                "this type of sample is not known",
                "say under \"means\": \"sample\", \"control\" or \"repeat\"",
            ],
            Self::YesOrNo => ["this is neither yes nor no", "yes, no, or an empty cell"],
        }
    }
}

/// What was changed in a row that is used.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum Change {
    /// Bytes that are not UTF-8 were read as Windows-1252.
    Windows1252,
    /// A spreadsheet's day number was read as a date.
    DayNumber,
    /// A year of two digits was taken to be after 2000.
    TwoDigitYear,
    /// An amount in brackets, or with its sign behind it, was read as negative.
    Bracketed,
    /// A mark of thousands was left out.
    Thousands,
    /// A decimal point was read among decimal commas.
    PointAmongCommas,
    /// The `±` of an amount was left aside.
    SpreadLeft,
    /// Words such as a purity were left out of a name.
    NameRead,
    /// Another name of a material was read.
    Synonym,
    /// The same row stands there before; both count.
    Repeated,
    /// The headings stand there once more.
    HeadingsAgain,
}

impl Change {
    /// All of them.
    pub const ALL: [Self; 11] = [
        Self::Windows1252,
        Self::DayNumber,
        Self::TwoDigitYear,
        Self::Bracketed,
        Self::Thousands,
        Self::PointAmongCommas,
        Self::SpreadLeft,
        Self::NameRead,
        Self::Synonym,
        Self::Repeated,
        Self::HeadingsAgain,
    ];

    /// What was done, in words.
    #[must_use]
    pub const fn words(self) -> &'static str {
        match self {
            Self::Windows1252 => "not UTF-8: read as Windows-1252",
            Self::DayNumber => "a spreadsheet's day number read as a date",
            Self::TwoDigitYear => "a year of two digits taken to be after 2000",
            Self::Bracketed => "brackets, or a sign behind it, read as a negative amount",
            Self::Thousands => "a mark of thousands left out",
            Self::PointAmongCommas => "a decimal point read among decimal commas",
            Self::SpreadLeft => "what follows ± left aside",
            Self::NameRead => "words such as a purity left out of the name",
            Self::Synonym => "another name of the material",
            Self::Repeated => "the same row stands there before; both count",
            Self::HeadingsAgain => "the headings stand there once more",
        }
    }
}

/// A row that is refused, or one that was changed.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Remark {
    /// The line of the file, from 1.
    pub line: u64,
    /// The heading of the column; empty for the row as a whole.
    pub heading: String,
    /// The cell, cut when it is long.
    pub cell: String,
    /// Why it is refused, or what was changed.
    pub what: Verdict,
    /// A suggestion, the name that was read, or the line that it repeats; may be empty.
    pub detail: String,
}

/// Refused or changed.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Verdict {
    /// The row does not count.
    Refused(Why),
    /// The row counts.
    Changed(Change),
}

impl Remark {
    /// Whether the row does not count.
    #[must_use]
    pub const fn refused(&self) -> bool {
        matches!(self.what, Verdict::Refused(_))
    }

    /// What was found or done, with the cell.
    #[must_use]
    pub fn found(&self) -> String {
        let words = match self.what {
            Verdict::Refused(why) => why.words()[0],
            Verdict::Changed(change) => change.words(),
        };
        let mut out = String::from(words);
        for (mark, part) in [(": ", &self.cell), (" → ", &self.detail)] {
            // The detail of a refusal is a suggestion, which stands with the need.
            if !part.is_empty() && (mark == ": " || !self.refused()) {
                out.push_str(mark);
                out.push_str(part);
            }
        }
        out
    }

    /// What would do; empty for a change.
    #[must_use]
    pub fn need(&self) -> String {
        match self.what {
            Verdict::Refused(why) if self.detail.is_empty() => why.words()[1].to_owned(),
            Verdict::Refused(why) => {
                let mut out = String::from("perhaps ");
                out.push_str(&self.detail);
                out.push_str("; ");
                out.push_str(why.words()[1]);
                out
            }
            Verdict::Changed(_) => String::new(),
        }
    }
}

/// A cell as it is quoted: cut when it is long.
pub(super) fn quoted(text: &str) -> String {
    const LONGEST: usize = 40;
    match text.char_indices().nth(LONGEST) {
        Some((end, _)) => {
            let mut out = text.get(..end).unwrap_or_default().to_owned();
            out.push('…');
            out
        }
        None => text.to_owned(),
    }
}
