//! What stands in which column: guessed from the headings, shown, changed by the user, kept in the plan.

use super::{DayOrder, Decimals, LogUnit};
use crate::letter::{is_letter, small, small_text};
use crate::plan::{Log, Problem, below};
use crate::quantity::{Kind, Spread, read};

/// Which of a site's records a file is.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum Register {
    /// Extractions as they were done.
    Preparation,
    /// What was bought.
    Purchases,
    /// What stood on the shelf on a day.
    Stock,
    /// Waste that left the site.
    Consignments,
    /// What went back to the supplier in cylinders.
    Cylinders,
}

impl Register {
    /// All of them.
    pub const ALL: [Self; 5] =
        [Self::Preparation, Self::Purchases, Self::Stock, Self::Consignments, Self::Cylinders];
    /// The words in a plan, in the order of the variants.
    pub const WORDS: [&'static str; 5] =
        ["preparation log", "purchases", "stock count", "waste consignments", "cylinder returns"];

    /// Its word.
    #[must_use]
    pub const fn word(self) -> &'static str {
        Self::WORDS[self as usize]
    }

    /// The register of this word.
    #[must_use]
    pub fn named(word: &str) -> Option<Self> {
        Self::ALL.into_iter().find(|register| register.word() == word)
    }

    /// Words in headings and file names that speak for it.
    const fn hints(self) -> &'static [&'static str] {
        match self {
            Self::Preparation => &[
                "prep",
                "preparation",
                "batch",
                "method",
                "qc",
                "sample",
                "analyst",
                "matrix",
                "charge",
                "probe",
            ],
            Self::Purchases => &[
                "purchase",
                "purchases",
                "purchased",
                "order",
                "ordered",
                "supplier",
                "vendor",
                "price",
                "cost",
                "invoice",
                "po",
                "bought",
                "received",
                "einkauf",
                "bestellung",
                "lieferant",
                "preis",
                "rechnung",
            ],
            Self::Stock => &[
                "stock",
                "inventory",
                "counted",
                "count",
                "hand",
                "shelf",
                "room",
                "location",
                "bestand",
                "inventur",
                "lager",
            ],
            Self::Consignments => &[
                "waste",
                "consignment",
                "consignments",
                "manifest",
                "manifests",
                "carrier",
                "drum",
                "stream",
                "disposal",
                "pickup",
                "transporter",
                "abfall",
                "entsorger",
                "begleitschein",
                "entsorgung",
            ],
            Self::Cylinders => &["cylinder", "cylinders", "heel", "returned", "return", "returns", "gas"],
        }
    }
}

/// What a column holds.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum Role {
    /// The day.
    Date,
    /// A material by name.
    Material,
    /// A CAS number.
    Cas,
    /// A mass or a volume.
    Amount,
    /// The unit of the amount.
    Unit,
    /// How many packs, bottles or cylinders.
    Packs,
    /// What one of them holds.
    PackSize,
    /// A waste stream.
    Stream,
    /// One container, by its number.
    Container,
    /// A batch, by its number.
    Batch,
    /// A method, which stands for a route of the plan.
    Method,
    /// Sample, control or repeat.
    SampleType,
    /// Whether it is done again.
    Repeat,
    /// How many extractions the row stands for.
    Runs,
    /// Nothing that is needed.
    NotUsed,
}

impl Role {
    /// All of them.
    pub const ALL: [Self; 15] = [
        Self::Date,
        Self::Material,
        Self::Cas,
        Self::Amount,
        Self::Unit,
        Self::Packs,
        Self::PackSize,
        Self::Stream,
        Self::Container,
        Self::Batch,
        Self::Method,
        Self::SampleType,
        Self::Repeat,
        Self::Runs,
        Self::NotUsed,
    ];

    /// The word in a plan.
    #[must_use]
    pub const fn word(self) -> &'static str {
        match self {
            Self::Date => "date",
            Self::Material => "material",
            Self::Cas => "CAS number",
            Self::Amount => "amount",
            Self::Unit => "unit",
            Self::Packs => "packs",
            Self::PackSize => "pack size",
            Self::Stream => "stream",
            Self::Container => "container",
            Self::Batch => "batch",
            Self::Method => "method",
            Self::SampleType => "sample type",
            Self::Repeat => "repeat",
            Self::Runs => "runs",
            Self::NotUsed => "not used",
        }
    }

    /// Whether a unit may stand in its heading.
    #[must_use]
    pub const fn has_unit(self) -> bool {
        matches!(self, Self::Amount | Self::PackSize)
    }

    /// Headings that mean it, in English and German, folded; earlier ones weigh more.
    const fn headings(self) -> &'static [&'static str] {
        match self {
            Self::Date => &["date", "day", "datum", "tag"],
            Self::Material => &[
                "material",
                "solvent",
                "chemical",
                "substance",
                "item",
                "product",
                "description",
                "article",
                "contents",
                "lösemittel",
                "lösungsmittel",
                "stoff",
                "artikel",
                "bezeichnung",
                "gas",
                "name",
            ],
            Self::Cas => &["cas", "casno", "casnr", "casnumber"],
            Self::Amount => &[
                "amount", "quantity", "qty", "net", "volume", "vol", "mass", "weight", "level", "menge",
                "volumen", "masse", "gewicht", "heel", "left", "counted", "hand", "bestand",
            ],
            Self::Unit => &["unit", "units", "uom", "einheit"],
            Self::Packs => {
                &["packs", "bottles", "pieces", "cylinders", "number", "stück", "anzahl", "gebinde"]
            }
            Self::PackSize => &["size", "pack", "each", "packung", "größe", "gebindegröße"],
            Self::Stream => &["stream", "waste", "profile", "code", "abfall", "abfallart", "strom"],
            Self::Container => &["container", "drum", "can", "cylinder", "behälter", "fass", "flasche"],
            Self::Batch => &["batch", "charge", "serie"],
            Self::Method => &["method", "route", "procedure", "test", "verfahren", "methode"],
            Self::SampleType => &["type", "qc", "probenart", "probentyp", "art"],
            Self::Repeat => {
                &["repeat", "reextract", "reextraction", "reextracted", "rerun", "redo", "wiederholung"]
            }
            Self::Runs => &["runs", "extractions", "samples", "proben", "extraktionen"],
            Self::NotUsed => &[],
        }
    }
}

/// What a column holds, with the unit that its heading names.
#[derive(Clone, Debug, PartialEq)]
pub struct Column {
    /// What it is.
    pub role: Role,
    /// The unit of every number in it that names none.
    pub unit: Option<LogUnit>,
}

impl Column {
    /// The column of this text: `amount in mL`, `date`.
    ///
    /// ```
    /// use thimbleworth::log::Column;
    /// let column = Column::named("amount in mL").unwrap();
    /// assert_eq!(column.unit.as_ref().unwrap().factor, 1e-6);
    /// assert_eq!(column.text(), "amount in mL");
    /// ```
    #[must_use]
    pub fn named(text: &str) -> Option<Self> {
        let (word, unit) = match text.split_once(" in ") {
            Some((word, spelling)) => (word, Some(LogUnit::named(spelling)?)),
            None => (text, None),
        };
        let role = Role::ALL.into_iter().find(|role| role.word() == word.trim())?;
        (unit.is_none() || role.has_unit()).then_some(Self { role, unit })
    }

    /// As it stands in a plan.
    #[must_use]
    pub fn text(&self) -> String {
        let mut out = self.role.word().to_owned();
        if let Some(unit) = &self.unit {
            out.push_str(" in ");
            out.push_str(&unit.written);
        }
        out
    }
}

/// How a file is read.
#[derive(Clone, Debug, PartialEq)]
pub struct Mapping {
    /// The name of the file, or of the entry in the plan.
    pub name: String,
    /// Which register it is.
    pub register: Register,
    /// The headings with what stands below them, in the order of the file or the plan.
    pub columns: Vec<(String, Column)>,
    /// How dates with strokes are read.
    pub dates: DayOrder,
    /// Which sign is the decimal one.
    pub decimals: Decimals,
    /// How far its amounts can be off, as half a width in shares of the amount; `None` takes the register's usual one.
    pub uncertainty: Option<f64>,
    /// Names in the file with the names in the plan that they mean.
    pub means: Vec<(String, String)>,
}

impl Mapping {
    /// As it is kept in a plan.
    ///
    /// ```
    /// use thimbleworth::log::{Mapping, guess};
    /// let mapping = guess("purchases.csv", &["Date", "Solvent", "Volume (L)", "Supplier"]).unwrap();
    /// let kept = mapping.kept();
    /// assert_eq!(kept.register, "purchases");
    /// assert_eq!(kept.columns[2], ("Volume (L)".to_owned(), "amount in L".to_owned()));
    /// assert_eq!(Mapping::of(&kept, "logs[0]", &mut Vec::new()), Some(mapping));
    /// ```
    #[must_use]
    pub fn kept(&self) -> Log {
        let said = |word: &'static str| (word != "ask").then(|| word.to_owned());
        let mut columns: Vec<(String, String)> = Vec::new();
        for (heading, column) in &self.columns {
            // A plan holds each name once, and none that is empty.
            if !heading.is_empty() && !columns.iter().any(|(known, _)| known == heading) {
                columns.push((heading.clone(), column.text()));
            }
        }
        Log {
            name: self.name.clone(),
            register: self.register.word().to_owned(),
            columns,
            dates: said(self.dates.word()),
            decimals: said(self.decimals.word()),
            uncertainty: self.uncertainty.map(|share| {
                let mut out = crate::quantity::shortest(share * 100.0);
                out.push_str(" %");
                out
            }),
            means: self.means.clone(),
        }
    }

    /// The mapping that a plan keeps at `path`; `None` where it cannot be used, with the reasons among the problems.
    #[must_use]
    pub fn of(kept: &Log, path: &str, problems: &mut Vec<Problem>) -> Option<Self> {
        let before = problems.len();
        let mut wrong = |key: &str, found: &str, need: String| {
            problems.push(Problem::error(below(path, key), format!("\"{found}\" cannot be used here"), need));
        };
        let register = Register::named(&kept.register);
        if register.is_none() {
            wrong("register", &kept.register, format!("one of: {}", Register::WORDS.join(", ")));
        }
        let mut columns = Vec::new();
        for (heading, text) in &kept.columns {
            match Column::named(text) {
                Some(column) => columns.push((heading.clone(), column)),
                None => wrong(
                    "columns",
                    text,
                    format!(
                        "one of: {}; with a unit, as in \"amount in mL\"",
                        Role::ALL.map(Role::word).join(", ")
                    ),
                ),
            }
        }
        let dates = kept.dates.as_deref().map_or(Some(DayOrder::Ask), DayOrder::named);
        let decimals = kept.decimals.as_deref().map_or(Some(Decimals::Ask), Decimals::named);
        for (key, kept, read, words) in [
            ("dates", &kept.dates, dates.is_none(), DayOrder::WORDS),
            ("decimals", &kept.decimals, decimals.is_none(), Decimals::WORDS),
        ] {
            if read {
                wrong(key, kept.as_deref().unwrap_or_default(), format!("one of: {}", words.join(", ")));
            }
        }
        let mut uncertainty = None;
        if let Some(text) = &kept.uncertainty {
            match read(text, Kind::Fraction) {
                Ok(amount) if amount.spread == Spread::Exact && amount.central_si >= 0.0 => {
                    uncertainty = Some(amount.central_si);
                }
                Ok(_) => wrong("uncertainty", text, "one share, such as 2 %".to_owned()),
                Err(error) => wrong("uncertainty", text, error.need()),
            }
        }
        let mapping = Self {
            name: kept.name.clone(),
            register: register?,
            columns,
            dates: dates?,
            decimals: decimals?,
            uncertainty,
            means: kept.means.clone(),
        };
        (problems.len() == before).then_some(mapping)
    }

    /// The place of a role among the headings of a file, where one column holds it.
    #[must_use]
    pub fn place(&self, role: Role) -> Option<usize> {
        self.columns.iter().position(|(_, column)| column.role == role)
    }

    /// What the register needs and no column holds, in words; empty where it can be read.
    #[must_use]
    pub fn missing(&self) -> &'static str {
        let has = |role| self.place(role).is_some();
        let amount = has(Role::Amount) || (has(Role::Packs) && has(Role::PackSize));
        let named = has(Role::Material) || has(Role::Cas);
        match self.register {
            _ if !has(Role::Date) => "a column with the date",
            Register::Preparation => "",
            _ if !amount => "a column with the amount, or two with packs and pack size",
            Register::Consignments if !(named || has(Role::Stream)) => {
                "a column with the stream or the material"
            }
            Register::Purchases | Register::Stock | Register::Cylinders if !named => {
                "a column with the material or its CAS number"
            }
            _ => "",
        }
    }

    /// The same mapping laid over the headings of a file, whose columns may stand in another order; headings that the
    /// mapping does not know are not used. `None` where a heading of the mapping is not there.
    #[must_use]
    pub fn over(&self, headings: &[&str]) -> Option<Self> {
        let there = |heading: &str| headings.iter().any(|h| h.trim() == heading);
        if !self.columns.iter().all(|(heading, column)| column.role == Role::NotUsed || there(heading)) {
            return None;
        }
        let column = |heading: &&str| {
            let known = self.columns.iter().find(|(h, _)| h == heading.trim());
            let none = Column { role: Role::NotUsed, unit: None };
            (heading.trim().to_owned(), known.map_or(none, |(_, column)| column.clone()))
        };
        Some(Self { columns: headings.iter().map(column).collect(), ..self.clone() })
    }
}

/// A heading as words, with the unit that it names: `Volume (mL)`, `amount_kg`, `Menge in L`, `Amount, kg`.
fn taken_apart(heading: &str) -> (Vec<String>, Option<LogUnit>) {
    let mut words: Vec<String> = Vec::new();
    let mut unit = None;
    for word in
        heading.split([' ', '_', '(', ')', '[', ']', ',', '/', '.', ':', '#']).filter(|w| !w.is_empty())
    {
        match LogUnit::named(word) {
            // The first word says what it is: "g" alone is no heading.
            Some(found) if !words.is_empty() => unit = Some(found),
            _ => words.push(word.chars().filter(|c| *c != '-').map(small).collect()),
        }
    }
    (words, unit)
}

/// How well a heading fits a role: 0 for not at all.
fn fit(words: &[String], role: Role) -> usize {
    let known = role.headings();
    let best = words
        .iter()
        .enumerate()
        .filter_map(|(at, word)| known.iter().position(|k| k == word).map(|rank| (at, rank)))
        .map(|(at, rank)| 100 + known.len() - rank - at.saturating_mul(10))
        .fold(0, |most, here| if here > most { here } else { most });
    // A heading that is this word alone fits best.
    if best > 0 && words.len() == 1 { best + 50 } else { best }
}

/// How many of a line's cells are headings of something.
pub(super) fn recognised(cells: &[&str]) -> usize {
    let one = |cell: &&&str| {
        let words = taken_apart(cell).0;
        words.len() <= 6 && Role::ALL.into_iter().any(|role| fit(&words, role) > 0)
    };
    cells.iter().filter(one).count()
}

/// The mapping that headings and the file's name suggest; `None` where they do not say which register it is.
#[must_use]
pub fn guess(name: &str, headings: &[&str]) -> Option<Mapping> {
    let apart: Vec<(Vec<String>, Option<LogUnit>)> = headings.iter().map(|h| taken_apart(h)).collect();
    let named: Vec<String> = name
        .split(|c: char| !(is_letter(c) || c.is_ascii_digit()))
        .filter(|w| !w.is_empty())
        .map(small_text)
        .collect();
    let mut best: Option<(Register, usize)> = None;
    let mut even = false;
    for register in Register::ALL {
        let spoken =
            |words: &[String]| words.iter().filter(|w| register.hints().contains(&w.as_str())).count();
        let votes = apart.iter().map(|(words, _)| spoken(words)).sum::<usize>() + 3 * spoken(&named);
        match best {
            Some((_, most)) if votes < most => {}
            Some((_, most)) if votes == most => even = true,
            _ => {
                even = false;
                best = Some((register, votes));
            }
        }
    }
    best.filter(|(_, votes)| *votes > 0 && !even).map(|(register, _)| guess_as(name, headings, register))
}

/// The mapping that headings suggest for a register.
#[must_use]
pub fn guess_as(name: &str, headings: &[&str], register: Register) -> Mapping {
    let apart: Vec<(Vec<String>, Option<LogUnit>)> = headings.iter().map(|h| taken_apart(h)).collect();
    // The best fit of all takes its column first, so that "Waste stream" beside "Waste code" is the stream.
    let mut columns: Vec<Option<Role>> = vec![None; headings.len()];
    loop {
        let mut next: Option<(usize, usize, Role)> = None;
        for (at, (words, unit)) in apart.iter().enumerate() {
            for role in Role::ALL {
                let taken = columns.get(at).copied().flatten().is_some() || columns.contains(&Some(role));
                let fit = fit(words, role) + usize::from(unit.is_some() && role.has_unit()) * 30;
                let any = fit > 30 || (unit.is_some() && fit > 0 && role == Role::Amount);
                if !taken && any && useful(register, role) && next.is_none_or(|(most, ..)| fit > most) {
                    next = Some((fit, at, role));
                }
            }
        }
        let Some((_, at, role)) = next else { break };
        if let Some(column) = columns.get_mut(at) {
            *column = Some(role);
        }
    }
    let has = |role| columns.contains(&Some(role));
    let packed = has(Role::PackSize) && !has(Role::Packs) && has(Role::Amount) && !has(Role::Unit);
    let columns = headings
        .iter()
        .zip(columns)
        .zip(apart)
        .map(|((heading, role), (_, unit))| {
            let role = match role {
                // "Qty" beside "Pack size" counts packs.
                Some(Role::Amount) if packed && unit.is_none() => Role::Packs,
                Some(role) => role,
                None => Role::NotUsed,
            };
            (heading.trim().to_owned(), Column { role, unit: unit.filter(|_| role.has_unit()) })
        })
        .collect();
    Mapping {
        name: name.to_owned(),
        register,
        columns,
        dates: DayOrder::Ask,
        decimals: Decimals::Ask,
        uncertainty: None,
        means: Vec::new(),
    }
}

/// Whether a register has a use for the role.
const fn useful(register: Register, role: Role) -> bool {
    match role {
        Role::Date => true,
        Role::Batch | Role::Method | Role::SampleType | Role::Repeat | Role::Runs => {
            matches!(register, Register::Preparation)
        }
        Role::Stream => matches!(register, Register::Consignments),
        Role::NotUsed => false,
        _ => !matches!(register, Register::Preparation),
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn roles(name: &str, headings: &[&str]) -> (Register, Vec<String>) {
        let mapping = guess(name, headings).unwrap();
        assert_eq!(mapping.missing(), "", "{headings:?}");
        (mapping.register, mapping.columns.iter().map(|(_, c)| c.text()).collect())
    }

    #[test]
    fn headings_of_the_trade_are_understood() {
        assert_eq!(
            roles(
                "prep.csv",
                &["Prep date", "Batch", "Method", "Matrix", "QC type", "Re-extract", "Analyst"]
            ),
            (
                Register::Preparation,
                ["date", "batch", "method", "not used", "sample type", "repeat", "not used"]
                    .map(str::to_owned)
                    .to_vec()
            )
        );
        assert_eq!(
            roles("x.csv", &["Order date", "Item", "CAS No.", "Qty", "Pack size", "Price", "Cost centre"]),
            (
                Register::Purchases,
                ["date", "material", "CAS number", "packs", "pack size", "not used", "not used"]
                    .map(str::to_owned)
                    .to_vec()
            )
        );
        assert_eq!(
            roles("Bestand.csv", &["Datum", "Lösemittel", "Menge [L]"]),
            (Register::Stock, ["date", "material", "amount in L"].map(str::to_owned).to_vec())
        );
        assert_eq!(
            roles("m.csv", &["Ship date", "Manifest", "Waste stream", "Drum", "Net weight kg"]),
            (
                Register::Consignments,
                ["date", "not used", "stream", "container", "amount in kg"].map(str::to_owned).to_vec()
            )
        );
        assert_eq!(
            roles("cylinder returns.csv", &["Date", "Cylinder", "Gas", "Heel_kg"]),
            (
                Register::Cylinders,
                ["date", "container", "material", "amount in kg"].map(str::to_owned).to_vec()
            )
        );
    }

    #[test]
    fn what_headings_leave_open_is_asked() {
        assert_eq!(guess("data.csv", &["Date", "Solvent", "Amount"]), None, "bought or counted?");
        assert!(guess("stock.csv", &["Date", "Solvent", "Amount"]).is_some());
        let no_date = guess("stock.csv", &["Solvent", "Amount"]).unwrap();
        assert_eq!(no_date.missing(), "a column with the date");
    }

    #[test]
    fn a_mapping_is_kept_and_finds_its_columns_in_any_order() {
        let mapping = guess("stock.csv", &["Date", "Solvent", "Amount (L)"]).unwrap();
        let kept = mapping.kept();
        let again = Mapping::of(&kept, "logs[0]", &mut Vec::new()).unwrap();
        let over = again.over(&["Amount (L)", "Room", "Solvent", "Date"]).unwrap();
        assert_eq!(
            [Role::Date, Role::Material, Role::Amount].map(|role| over.place(role)),
            [Some(3), Some(2), Some(0)]
        );
        assert_eq!(again.over(&["Amount (L)", "Date"]), None);
    }

    #[test]
    fn a_mapping_that_cannot_be_used_says_why() {
        let kept = Log {
            name: "x".into(),
            register: "shopping".into(),
            columns: vec![("A".into(), "date in mL".into())],
            dates: Some("sideways".into()),
            decimals: None,
            uncertainty: Some("lots".into()),
            means: Vec::new(),
        };
        let mut problems = Vec::new();
        assert_eq!(Mapping::of(&kept, "logs[0]", &mut problems), None);
        let paths: Vec<&str> = problems.iter().map(|p| p.path.as_str()).collect();
        assert_eq!(paths, ["logs[0].register", "logs[0].columns", "logs[0].dates", "logs[0].uncertainty"]);
    }
}
