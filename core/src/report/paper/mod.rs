//! Papers of the waste desk: titles, sentences and tables, the same for the page, for Markdown and for a spreadsheet.
//!
//! Each ends with the rules it rests on, the date on which they are read, what is assumed, and what a licensed person decides.

mod codes;
mod drum;
mod label;
mod load;
mod mix;
mod months;
mod pick_ups;
mod pour;
mod reporting;
mod run;

pub use mix::mix_paper;
pub use pour::{Asked, pour_paper};

use super::csv::text_cell;
use super::markdown::escaped;
use super::words::cited;
use crate::account::{Account, SiteDesk, StreamDesk};
use crate::code::{CAUTION, Rules};
use crate::program::{Program, SiteUse, StreamUse};
use crate::quantity::{Kind, show, significant};
use crate::source::Source;

/// One paper.
#[derive(Clone, Debug, Default, PartialEq, Eq)]
pub struct Paper {
    /// Its title.
    pub title: String,
    /// Sentences before the tables.
    pub lead: Vec<String>,
    /// Its tables.
    pub tables: Vec<PaperTable>,
    /// What it rests on, what is assumed, what a licensed person decides.
    pub foot: Vec<String>,
}

/// One table of a paper.
#[derive(Clone, Debug, Default, PartialEq, Eq)]
pub struct PaperTable {
    /// Its title.
    pub title: String,
    /// Headings.
    pub head: &'static [&'static str],
    /// Rows, each as long as the headings.
    pub rows: Vec<Vec<String>>,
}

/// Which paper.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum PaperKind {
    /// Every code held against every stream, with its working.
    Codes,
    /// What one batch and one result leave, by stream.
    Run,
    /// The label of each container.
    Label,
    /// What a full container holds, and a draft of its profile.
    Drum,
    /// What is made month by month, category and headroom.
    Months,
    /// Containers and pick-ups.
    PickUps,
    /// The load of a year by stream, month, code and alternative.
    Load,
    /// What registers and lists may ask for.
    Reporting,
}

impl PaperKind {
    /// All of them, in the order of a report.
    pub const ALL: [Self; 8] = [
        Self::Codes,
        Self::Run,
        Self::Label,
        Self::Drum,
        Self::Months,
        Self::PickUps,
        Self::Load,
        Self::Reporting,
    ];

    /// The word by which the command knows it.
    #[must_use]
    pub const fn word(self) -> &'static str {
        match self {
            Self::Codes => "codes",
            Self::Run => "run",
            Self::Label => "label",
            Self::Drum => "drum",
            Self::Months => "months",
            Self::PickUps => "pick-ups",
            Self::Load => "load",
            Self::Reporting => "reporting",
        }
    }
}

/// A paper of the site; `None` where the plan has no program.
///
/// ```
/// use thimbleworth::{account::{account_text, site_desk}, example::EXAMPLES, report::{PaperKind, paper}};
/// let account = account_text(EXAMPLES[1].text);
/// let desk = site_desk(&account, &[]).unwrap();
/// let codes = paper(&account, &desk, PaperKind::Codes).unwrap();
/// assert!(codes.tables[1].title.contains("halogenated"));
/// ```
#[must_use]
pub fn paper(account: &Account, desk: &SiteDesk<'_>, kind: PaperKind) -> Option<Paper> {
    let program = account.program.as_ref()?;
    let sheet = Sheet { account, program, site: &program.site, desk };
    let mut paper = match kind {
        PaperKind::Codes => codes::paper(&sheet),
        PaperKind::Run => run::paper(&sheet),
        PaperKind::Label => label::paper(&sheet),
        PaperKind::Drum => drum::paper(&sheet),
        PaperKind::Months => months::paper(&sheet),
        PaperKind::PickUps => pick_ups::paper(&sheet),
        PaperKind::Load => load::paper(&sheet),
        PaperKind::Reporting => reporting::paper(&sheet),
    };
    paper.lead.insert(0, sheet.heading());
    sheet.foot(&mut paper.foot);
    Some(paper)
}

/// What every paper is drawn up from.
struct Sheet<'a> {
    account: &'a Account,
    program: &'a Program,
    site: &'a SiteUse,
    desk: &'a SiteDesk<'a>,
}

impl Sheet<'_> {
    fn rules(&self) -> Rules {
        Rules::of(&self.site.rules)
    }

    fn stream(&self, s: &StreamDesk<'_>) -> Option<&StreamUse> {
        self.site.streams.get(s.stream)
    }

    fn name(&self, s: &StreamDesk<'_>) -> &str {
        self.stream(s).map_or("", |u| u.name.as_str())
    }

    /// The mass of one full container; kg.
    fn container_kg(&self, s: &StreamDesk<'_>) -> Option<f64> {
        let stream = self.stream(s)?;
        let density = if stream.solid { stream.bulk_density_kg_m3 } else { s.contents.density_kg_m3()? };
        Some(stream.container_m3? * stream.fill * density)
    }

    fn heading(&self) -> String {
        let as_of = self.site.as_of.as_deref().unwrap_or("no date");
        let mut out =
            ["Site: ", &self.site.name, "; rules: ", &self.site.rules, "; as of ", as_of, "; routes:"]
                .concat();
        for (work, route) in self.program.workloads.iter().zip(&self.desk.routes) {
            let name = route.as_ref().map_or("no account", |p| p.route.name.as_str());
            out.push_str(&[" ", &work.name, ": ", name, ";"].concat());
        }
        out.pop();
        out.push('.');
        out
    }

    fn foot(&self, foot: &mut Vec<String>) {
        if self.site.as_of.is_none() {
            foot.push("The plan has no date: rules are read as if all of them were in force.".into());
        }
        if self.rules() == Rules::Us && self.site.waste.other.is_empty() {
            foot.push("The plan names no other waste of the site: a category counts all hazardous waste of one EPA identification number, so any shown here is too low.".into());
        }
        if let Some(text) = &self.site.waste.deviations {
            foot.push(["State or national deviations, as the site notes: ", text, "."].concat());
        }
        foot.push("Central values of the plan; each stream is taken as mixed through the year.".into());
        foot.push(CAUTION.into());
    }
}

/// A mass in words.
fn mass(kg: f64) -> String {
    show(kg, Kind::Mass)
}

/// A bare number of kilograms.
fn kilograms(kg: f64) -> String {
    significant(kg, 4)
}

fn percent(share: f64) -> String {
    show(share, Kind::Fraction)
}

fn volume(m3: f64) -> String {
    show(m3, Kind::Volume)
}

fn rests_on(sources: &[Source]) -> Vec<String> {
    sources.iter().map(|s| ["Rule: ", &cited(*s), "."].concat()).collect()
}

/// A paper as Markdown.
#[must_use]
pub fn paper_markdown(paper: &Paper) -> String {
    let mut out = ["# ", &escaped(&paper.title), "\n\n"].concat();
    for line in &paper.lead {
        out.push_str(&escaped(line));
        out.push_str("\n\n");
    }
    for table in &paper.tables {
        if !table.title.is_empty() {
            out.push_str(&["## ", &escaped(&table.title), "\n\n"].concat());
        }
        let mut row = |cells: &mut dyn Iterator<Item = String>| {
            for cell in cells {
                out.push_str("| ");
                out.push_str(&cell);
                out.push(' ');
            }
            out.push_str("|\n");
        };
        row(&mut table.head.iter().map(|h| escaped(h)));
        row(&mut table.head.iter().map(|_| "---".to_owned()));
        for cells in &table.rows {
            row(&mut cells.iter().map(|c| escaped(c)));
        }
        out.push('\n');
    }
    for line in &paper.foot {
        out.push_str(&["- ", &escaped(line), "\n"].concat());
    }
    out
}

fn csv_row(out: &mut String, cells: &mut dyn Iterator<Item = &str>) {
    for (i, cell) in cells.enumerate() {
        if i > 0 {
            out.push(',');
        }
        out.push_str(&text_cell(cell));
    }
    out.push_str("\r\n");
}

/// A table of words as CSV (RFC 4180), a line of headings first. A text that a spreadsheet would take for a formula gets an
/// apostrophe before it.
#[must_use]
pub fn words_csv(head: &[&str], rows: &[Vec<String>]) -> String {
    let mut out = String::new();
    csv_row(&mut out, &mut head.iter().copied());
    for cells in rows {
        csv_row(&mut out, &mut cells.iter().map(String::as_str));
    }
    out
}

/// A paper as CSV (RFC 4180): title, sentences, tables with a line of headings each, an empty line between them. A text that a
/// spreadsheet would take for a formula gets an apostrophe before it.
#[must_use]
pub fn paper_csv(paper: &Paper) -> String {
    let mut out = String::new();
    let lines = |out: &mut String, lines: &[String]| {
        for line in lines {
            csv_row(out, &mut std::iter::once(line.as_str()));
        }
    };
    lines(&mut out, std::slice::from_ref(&paper.title));
    lines(&mut out, &paper.lead);
    for table in &paper.tables {
        out.push_str("\r\n");
        lines(&mut out, std::slice::from_ref(&table.title));
        out.push_str(&words_csv(table.head, &table.rows));
    }
    out.push_str("\r\n");
    lines(&mut out, &paper.foot);
    out
}
