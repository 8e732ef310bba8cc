//! Reading a file: bytes of any size in, sums and remarks out.

use super::amount::{self, UnitCell, Value};
use super::column::{Mapping, Register, Role, guess, guess_as, recognised};
use super::day::{day, order_of};
use super::names::{MATERIAL, NONE, Names, ROUTE, STREAM};
use super::tally::{Key, Tally};
use super::text::{Record, Splitter, decoded};
use super::why::quoted;
use super::{Change, Day, Decimals, LogUnit, Remark, Verdict, Why};
use crate::quantity::Kind;

/// The beginning of a file, from which separator, headings and signs are found.
const BEGINNING: usize = 64 * 1024;
/// The first lines among which the headings are sought.
const HEADING_LINES: usize = 20;
/// Changes of one kind that are told one by one; all are counted.
const MOST_TOLD: u64 = 100;

/// Why a whole file cannot be read.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Unreadable {
    /// There is nothing in it.
    Empty,
    /// A workbook or another file that is not text.
    NotText,
    /// Text in UTF-16.
    Utf16,
    /// No line looks like headings.
    NoHeadings,
    /// The headings do not say which register it is.
    WhichRegister,
    /// A column is missing: what it should hold.
    Missing(&'static str),
}

impl Unreadable {
    /// What was found, and what would do.
    #[must_use]
    pub const fn words(self) -> [&'static str; 2] {
        match self {
            Self::Empty => ["the file is empty", "a table with headings"],
            Self::NotText => ["this is not text", "the table saved as CSV"],
            Self::Utf16 => ["the text is UTF-16", "the table saved as CSV in UTF-8"],
            Self::NoHeadings => [
                "none of the first lines looks like headings",
                "headings such as \"Date\" and \"Solvent\", or the columns under \"logs\" in the plan",
            ],
            Self::WhichRegister => [
                "the headings do not say which register this is",
                "say it under \"register\": preparation log, purchases, stock count, waste consignments or cylinder returns",
            ],
            Self::Missing(what) => ["a column is missing", what],
        }
    }
}

/// A file that cannot be read, with what its headings suggest, for the user to say the rest.
#[derive(Clone, Debug, PartialEq)]
pub struct Unread {
    /// Why.
    pub why: Unreadable,
    /// The mapping as far as the headings go; `None` where there are none.
    pub draft: Option<Mapping>,
}

/// How many rows there were, and what became of them. Used and refused rows together are all rows.
#[derive(Clone, Debug, Default, PartialEq, Eq)]
pub struct Rows {
    /// Rows that count.
    pub used: u64,
    /// Rows that count and were changed.
    pub changed: u64,
    /// Rows that do not count.
    pub refused: u64,
    /// Lines without a cell that holds anything, and headings that stand there once more.
    pub blank: u64,
    /// Refusals by reason, in the order of [`Why::ALL`].
    pub by_reason: [u64; Why::ALL.len()],
    /// Changes by kind, in the order of [`Change::ALL`].
    pub by_change: [u64; Change::ALL.len()],
}

/// What was read from a file.
#[derive(Clone, Debug)]
pub struct Reading {
    /// How it was read.
    pub mapping: Mapping,
    /// What separates its cells.
    pub separator: char,
    /// The line of its headings.
    pub heading_line: u64,
    /// How many rows there were.
    pub rows: Rows,
    /// The sums.
    pub tally: Tally,
}

/// What stands in which column, as places.
#[derive(Clone, Copy, Debug, Default)]
struct Places {
    date: usize,
    material: usize,
    cas: usize,
    amount: usize,
    unit: usize,
    packs: usize,
    pack_size: usize,
    stream: usize,
    container: usize,
    batch: usize,
    method: usize,
    sample_type: usize,
    repeat: usize,
    runs: usize,
}

/// Beyond every row: such a cell is empty.
const NOWHERE: usize = usize::MAX;

/// The part of a reading that the rows change.
struct State {
    mapping: Mapping,
    places: Places,
    amount_unit: Option<LogUnit>,
    size_unit: Option<LogUnit>,
    /// Of the amounts, the packs and their sizes.
    decimals: [Decimals; 3],
    units: [UnitCell; 3],
    key: Vec<u8>,
    heading_line: u64,
    headings: Vec<u8>,
    rows: Rows,
    tally: Tally,
    remarks: Vec<Remark>,
    dates: super::DayOrder,
    date_cell: Vec<u8>,
    date: Option<Day>,
}

/// Reads one file, as its bytes come.
///
/// ```
/// use thimbleworth::{account::account_text, example::EXAMPLES, log::{Names, Reader}};
/// let account = account_text(EXAMPLES[0].text);
/// let names = Names::of(account.plan.as_ref().unwrap(), account.program.as_ref().unwrap());
/// let mut reader = Reader::new("purchases.csv", names, &[]);
/// for piece in ["Date;Solvent;Volu", "me (L);Supplier\n2026-01-05;acetone;2,5;x\n2026-01-06;", "ether;plenty;x\n"] {
///     reader.feed(piece.as_bytes());
/// }
/// let (reading, names, remarks) = reader.finish();
/// let reading = reading.unwrap();
/// assert_eq!((reading.rows.used, reading.rows.refused), (1, 1));
/// assert_eq!(remarks[0].line, 3);
/// assert_eq!(names.materials[0].name, "acetone");
/// ```
pub struct Reader {
    name: String,
    /// What the plan keeps of earlier readings; the first that fits the headings is taken.
    known: Vec<Mapping>,
    beginning: Vec<u8>,
    names: Names,
    reading: Option<(Splitter, u8, State)>,
    failed: Option<Unread>,
    bytes: u64,
}

impl Reader {
    /// A reader for a file of this name; `known` are the mappings that the plan keeps.
    #[must_use]
    pub fn new(name: &str, names: Names, known: &[Mapping]) -> Self {
        Self {
            name: name.to_owned(),
            known: known.to_vec(),
            beginning: Vec::new(),
            names,
            reading: None,
            failed: None,
            bytes: 0,
        }
    }

    /// Takes in the next bytes.
    pub fn feed(&mut self, bytes: &[u8]) {
        self.bytes += bytes.len() as u64;
        let mut rest = bytes;
        if self.reading.is_none() && self.failed.is_none() {
            let room = BEGINNING - self.beginning.len();
            let (now, later) = rest.split_at(if rest.len() < room { rest.len() } else { room });
            self.beginning.extend_from_slice(now);
            rest = later;
            if self.beginning.len() >= BEGINNING {
                self.begin(false);
            }
        }
        let names = &mut self.names;
        if let Some((splitter, _, state)) = &mut self.reading {
            splitter.feed(rest, &mut |record| state.row(record, names));
        }
    }

    /// Bytes taken in so far.
    #[must_use]
    pub const fn bytes(&self) -> u64 {
        self.bytes
    }

    /// Rows read so far.
    #[must_use]
    pub fn rows(&self) -> u64 {
        self.reading.as_ref().map_or(0, |(_, _, state)| state.rows.used + state.rows.refused)
    }

    /// What there is to say since the last call, so that a long file fills no memory.
    pub fn take_remarks(&mut self) -> Vec<Remark> {
        self.reading.as_mut().map(|(_, _, state)| std::mem::take(&mut state.remarks)).unwrap_or_default()
    }

    /// The file has ended.
    ///
    /// Gives back what was read or why the file cannot be read, the names with the materials that were met, and the
    /// remarks that were not taken yet.
    pub fn finish(mut self) -> (Result<Reading, Unread>, Names, Vec<Remark>) {
        if self.reading.is_none() && self.failed.is_none() {
            self.begin(true);
        }
        let names = &mut self.names;
        let Some((mut splitter, separator, mut state)) = self.reading else {
            return (
                Err(self.failed.unwrap_or(Unread { why: Unreadable::Empty, draft: None })),
                self.names,
                Vec::new(),
            );
        };
        splitter.finish(&mut |record| state.row(record, names));
        state.close();
        names.turn_page();
        let reading = Reading {
            mapping: state.mapping,
            separator: char::from(separator),
            heading_line: state.heading_line,
            rows: state.rows,
            tally: state.tally,
        };
        (Ok(reading), self.names, state.remarks)
    }

    /// Finds separator, headings and mapping in the beginning of the file, and reads it.
    fn begin(&mut self, ended: bool) {
        let beginning = std::mem::take(&mut self.beginning);
        let text = beginning.strip_prefix(b"\xef\xbb\xbf").unwrap_or(&beginning);
        if let Err(why) = is_text(text) {
            self.failed = Some(Unread { why, draft: None });
            return;
        }
        let head = find_headings(text, &self.known);
        let Some((separator, line, cells)) = head else {
            let empty = text.trim_ascii().is_empty();
            let why = if empty { Unreadable::Empty } else { Unreadable::NoHeadings };
            self.failed = Some(Unread { why, draft: None });
            return;
        };
        let headings: Vec<&str> = cells.iter().map(String::as_str).collect();
        // The mapping of this very file first: another one may have the same headings.
        let own = self.known.iter().filter(|m| m.name == self.name);
        let others = self.known.iter().filter(|m| m.name != self.name);
        let kept = own.chain(others).find_map(|m| m.over(&headings));
        let kept = kept.map(|m| Mapping { name: self.name.clone(), ..m });
        let Some(mapping) = kept.or_else(|| guess(&self.name, &headings)) else {
            let draft = Some(guess_as(&self.name, &headings, Register::Purchases));
            self.failed = Some(Unread { why: Unreadable::WhichRegister, draft });
            return;
        };
        let missing = mapping.missing();
        if !missing.is_empty() {
            self.failed = Some(Unread { why: Unreadable::Missing(missing), draft: Some(mapping) });
            return;
        }
        let names = &mut self.names;
        let mut state = State::new(mapping, line);
        state.learn(text, separator, ended);
        let mut splitter = Splitter::new(separator);
        splitter.feed(text, &mut |record| state.row(record, names));
        self.reading = Some((splitter, separator, state));
    }
}

fn is_text(beginning: &[u8]) -> Result<(), Unreadable> {
    if beginning.starts_with(b"\xff\xfe") || beginning.starts_with(b"\xfe\xff") {
        return Err(Unreadable::Utf16);
    }
    // UTF-16 without its mark, and everything binary, has zeros.
    if beginning.starts_with(b"PK\x03\x04")
        || beginning.starts_with(b"\xd0\xcf\x11\xe0")
        || beginning.contains(&0)
    {
        return Err(Unreadable::NotText);
    }
    Ok(())
}

/// The separator with which one of the first lines holds most headings, that line and its cells.
fn find_headings(text: &[u8], known: &[Mapping]) -> Option<(u8, u64, Vec<String>)> {
    let mut best: Option<(usize, u8, u64, Vec<String>)> = None;
    for separator in [b'\t', b';', b',', b'|'] {
        for (line, cells) in first_lines(text, separator) {
            let read: Vec<&str> = cells.iter().map(String::as_str).collect();
            // A mapping of the plan outweighs every guess.
            let kept = known.iter().any(|m| m.over(&read).is_some());
            let score = if kept { 1000 } else { recognised(&read) };
            if score >= 2 && best.as_ref().is_none_or(|(most, ..)| score > *most) {
                best = Some((score, separator, line, cells));
            }
        }
    }
    best.map(|(_, separator, line, cells)| (separator, line, cells))
}

fn first_lines(text: &[u8], separator: u8) -> Vec<(u64, Vec<String>)> {
    let mut out = Vec::new();
    // Enough for twenty lines of any table.
    let part = text.get(..16 * 1024).unwrap_or(text);
    let mut each = |record: &Record<'_>| {
        if out.len() < HEADING_LINES && record.broken.is_none() {
            let cells = (0..record.len()).map(|i| decoded(record.cell(i)).0.into_owned()).collect();
            out.push((record.line, cells));
        }
    };
    let mut splitter = Splitter::new(separator);
    splitter.feed(part, &mut each);
    if part.len() == text.len() {
        splitter.finish(&mut each);
    }
    out
}

/// What the cells of a column say of their decimal sign, as long as they agree.
#[derive(Clone, Copy, Default)]
struct Agreed {
    said: Option<Decimals>,
    differ: bool,
}

impl Agreed {
    fn hear(&mut self, said: Option<Decimals>) {
        if said.is_some() {
            self.differ |= self.said.is_some() && self.said != said;
            self.said = said;
        }
    }

    fn settled(self) -> Decimals {
        if self.differ { Decimals::Ask } else { self.said.unwrap_or_default() }
    }
}

impl State {
    fn new(mapping: Mapping, heading_line: u64) -> Self {
        let place = |role| mapping.place(role).unwrap_or(NOWHERE);
        let unit = |role| {
            let at = mapping.place(role)?;
            mapping.columns.get(at)?.1.unit.clone()
        };
        Self {
            places: Places {
                date: place(Role::Date),
                material: place(Role::Material),
                cas: place(Role::Cas),
                amount: place(Role::Amount),
                unit: place(Role::Unit),
                packs: place(Role::Packs),
                pack_size: place(Role::PackSize),
                stream: place(Role::Stream),
                container: place(Role::Container),
                batch: place(Role::Batch),
                method: place(Role::Method),
                sample_type: place(Role::SampleType),
                repeat: place(Role::Repeat),
                runs: place(Role::Runs),
            },
            amount_unit: unit(Role::Amount),
            size_unit: unit(Role::PackSize),
            decimals: [mapping.decimals; 3],
            dates: mapping.dates,
            mapping,
            units: Default::default(),
            key: Vec::new(),
            heading_line,
            headings: Vec::new(),
            rows: Rows::default(),
            tally: Tally::default(),
            remarks: Vec::new(),
            date_cell: Vec::new(),
            date: None,
        }
    }

    /// What the beginning of the file says of its decimal sign and of the order of its dates, where the mapping leaves
    /// them open. Where cells speak against one another, they stay open.
    fn learn(&mut self, text: &[u8], separator: u8, ended: bool) {
        let places = self.places;
        let (mut decimals, mut dates) = ([Agreed::default(); 3], Vec::new());
        let numbers = [places.amount, places.packs, places.pack_size];
        let heading = self.heading_line;
        let mut each = |record: &Record<'_>| {
            if record.line <= heading {
                return;
            }
            for (agreed, place) in decimals.iter_mut().zip(numbers) {
                agreed.hear(amount::decimals_of(&decoded(record.cell(place)).0));
            }
            dates.extend(order_of(&decoded(record.cell(places.date)).0));
        };
        let mut splitter = Splitter::new(separator);
        splitter.feed(text, &mut each);
        if ended {
            splitter.finish(&mut each);
        }
        if self.mapping.decimals == Decimals::Ask {
            // A column is settled by its own rows. The mapping says it for all columns, so only where none is open.
            let mut all = Agreed::default();
            let mut open = false;
            for ((mine, agreed), place) in self.decimals.iter_mut().zip(decimals).zip(numbers) {
                *mine = agreed.settled();
                open |= place != NOWHERE && *mine == Decimals::Ask;
                all.hear(agreed.said);
            }
            if !open {
                self.mapping.decimals = all.settled();
            }
        }
        if let (super::DayOrder::Ask, Some((first, rest))) = (self.dates, dates.split_first())
            && rest.iter().all(|d| d == first)
        {
            self.dates = *first;
        }
        // Shown, and kept with the mapping.
        self.mapping.dates = self.dates;
    }

    fn remark(&mut self, line: u64, place: usize, cell: &[u8], what: Verdict, detail: &str) {
        let heading = self.mapping.columns.get(place).map(|(heading, _)| quoted(heading)).unwrap_or_default();
        let cell = quoted(&decoded(cell).0);
        self.remarks.push(Remark { line, heading, cell, what, detail: detail.to_owned() });
    }

    fn changed(&mut self, record: &Record<'_>, place: usize, change: Change, detail: &str) {
        let count = self.rows.by_change.get_mut(change as usize).map_or(0, |count| {
            *count += 1;
            *count
        });
        if count <= MOST_TOLD {
            self.remark(record.line, place, record.cell(place), Verdict::Changed(change), detail);
        }
    }

    fn row(&mut self, record: &Record<'_>, names: &mut Names) {
        if record.line <= self.heading_line {
            if record.line == self.heading_line {
                self.headings = record.all().0.to_vec();
            }
            return;
        }
        let (bytes, ends) = record.all();
        if record.broken.is_none() {
            if bytes.iter().all(u8::is_ascii_whitespace) {
                self.rows.blank += 1;
                return;
            }
            if bytes == self.headings {
                self.rows.blank += 1;
                self.changed(record, NOWHERE, Change::HeadingsAgain, "");
                return;
            }
        }
        let before = self.rows.by_change;
        match self.counted(record, names) {
            Ok(()) => {
                self.rows.used += 1;
                self.rows.changed += u64::from(self.rows.by_change != before);
                self.tally.compare(bytes, ends, record.line);
            }
            Err((why, place, detail)) => {
                self.rows.refused += 1;
                if let Some(count) = self.rows.by_reason.get_mut(why as usize) {
                    *count += 1;
                }
                // Its month has rows, though none that counts.
                let dated = if record.broken.is_none() { self.date(record).ok() } else { None };
                match dated {
                    Some((date, _)) => self.tally.refuse(date.month_index()),
                    None => self.tally.undated += 1,
                }
                self.remark(record.line, place, record.cell(place), Verdict::Refused(why), &detail);
            }
        }
    }

    fn counted(&mut self, record: &Record<'_>, names: &mut Names) -> Result<(), (Why, usize, String)> {
        let whole = |why| (why, NOWHERE, String::new());
        if let Some(why) = record.broken {
            return Err(whole(why));
        }
        let columns = self.mapping.columns.len();
        if record.len() > columns && (columns..record.len()).any(|i| !record.cell(i).is_empty()) {
            return Err(whole(Why::TooManyCells));
        }
        if record.unfinished && record.len() < columns {
            return Err(whole(Why::CutOff));
        }
        let (date, date_change) = self.date(record)?;
        // Names and amounts first: a row counts as a whole or not at all.
        let mut changes: [(usize, Option<Change>); 3] =
            [(self.places.date, date_change), (0, None), (0, None)];
        match self.mapping.register {
            Register::Preparation => self.extraction(record, names, date)?,
            register => {
                let index = self.named(record, names, register)?;
                let (value, places) = self.amount(record)?;
                changes = [changes[0], places[0], places[1]];
                if register == Register::Stock && value.si < 0.0 {
                    return Err((Why::Negative, self.places.amount, String::new()));
                }
                let (kg, m3) = as_mass(names, index.0, value);
                let stock = register == Register::Stock;
                let day = if stock { date.day } else { 0 };
                let key = Key { month: date.month_index(), day, material: index.0, stream: index.1 };
                if stock {
                    self.tally.shelf(key, kg, m3);
                } else {
                    self.tally.amount(key, kg, m3);
                }
                let container = record.cell(self.places.container);
                if !container.is_empty() {
                    self.tally.container(&decoded(container).0, kg, m3);
                }
            }
        }
        self.tally.day(date);
        for (place, change) in changes {
            if let Some(change) = change {
                self.changed(record, place, change, "");
            }
        }
        for place in [self.places.material, self.places.stream, self.places.container, self.places.method] {
            if decoded(record.cell(place)).1 {
                self.changed(record, place, Change::Windows1252, "");
            }
        }
        Ok(())
    }

    fn date(&mut self, record: &Record<'_>) -> Result<(Day, Option<Change>), (Why, usize, String)> {
        let cell = record.cell(self.places.date);
        // Rows of one day stand together as a rule.
        if let Some(date) = self.date.filter(|_| cell == self.date_cell) {
            return Ok((date, None));
        }
        let refused = |why| (why, self.places.date, String::new());
        if cell.is_empty() {
            return Err(refused(Why::NoDate));
        }
        let (date, change) = day(&decoded(cell).0, self.dates).map_err(refused)?;
        if change.is_none() {
            self.date = Some(date);
            self.date_cell.clear();
            self.date_cell.extend_from_slice(cell);
        }
        Ok((date, change))
    }

    /// Material and stream of a row.
    fn named(
        &mut self,
        record: &Record<'_>,
        names: &mut Names,
        register: Register,
    ) -> Result<(u16, u16), (Why, usize, String)> {
        let places = self.places;
        let (material, cas) = (record.cell(places.material), record.cell(places.cas));
        let stream_cell = record.cell(places.stream);
        let mut index = (NONE, NONE);
        if !(material.is_empty() && cas.is_empty()) {
            let found = names.look_up(MATERIAL, (material, cas), &self.mapping.means, &mut self.key);
            let place = if material.is_empty() { places.cas } else { places.material };
            match found.index {
                Ok(at) => index.0 = at,
                Err(why) => return Err((why, place, found.detail.clone())),
            }
            if let Some(change) = found.tell_once() {
                let detail = found.detail.clone();
                self.changed(record, place, change, &detail);
            }
        }
        if register == Register::Consignments && !stream_cell.is_empty() {
            let found = names.look_up(STREAM, (stream_cell, b""), &self.mapping.means, &mut self.key);
            match found.index {
                Ok(at) => index.1 = at,
                // A known material needs no stream.
                Err(why) if index.0 == NONE => return Err((why, places.stream, found.detail.clone())),
                Err(_) => {}
            }
        }
        if index == (NONE, NONE) {
            let place = if places.material == NOWHERE { places.stream } else { places.material };
            return Err((Why::NoName, place, String::new()));
        }
        Ok(index)
    }

    #[expect(
        clippy::type_complexity,
        reason = "the places of the cells that were changed, told by the caller"
    )]
    fn amount(
        &mut self,
        record: &Record<'_>,
    ) -> Result<(Value, [(usize, Option<Change>); 2]), (Why, usize, String)> {
        let places = self.places;
        let [amounts, counts, sizes] = self.decimals;
        let [own, beside, size] = &mut self.units;
        let cell = record.cell(places.amount);
        if !cell.is_empty() {
            let column = record.cell(places.unit);
            let unit = if column.is_empty() { self.amount_unit.as_ref() } else { beside.of(column) };
            let value = amount::amount(cell, amounts, own, unit).map_err(|why| {
                // A unit that cannot be used stands in its own column.
                let odd = why == Why::NoUnit && !column.is_empty();
                let (why, place) = if odd { (Why::OtherUnit, places.unit) } else { (why, places.amount) };
                (why, place, String::new())
            })?;
            return Ok((value, [(places.amount, value.change), (0, None)]));
        }
        let packs = record.cell(places.packs);
        if packs.is_empty() {
            let place = if places.amount == NOWHERE { places.packs } else { places.amount };
            return Err((Why::NoAmount, place, String::new()));
        }
        let count = amount::count(packs, counts).map_err(|why| (why, places.packs, String::new()))?;
        let each = record.cell(places.pack_size);
        let column = record.cell(places.unit);
        let unit = if column.is_empty() { self.size_unit.as_ref() } else { beside.of(column) };
        let value =
            amount::amount(each, sizes, size, unit).map_err(|why| (why, places.pack_size, String::new()))?;
        Ok((Value { si: count * value.si, ..value }, [(places.pack_size, value.change), (0, None)]))
    }

    fn extraction(
        &mut self,
        record: &Record<'_>,
        names: &mut Names,
        date: Day,
    ) -> Result<(), (Why, usize, String)> {
        let places = self.places;
        let found =
            names.look_up(ROUTE, (record.cell(places.method), b""), &self.mapping.means, &mut self.key);
        let route = match found.index {
            Ok(route) => route,
            Err(why) => return Err((why, places.method, found.detail.clone())),
        };
        let runs = match record.cell(places.runs) {
            [] => 1.0,
            cell => {
                amount::count(cell, self.mapping.decimals).map_err(|why| (why, places.runs, String::new()))?
            }
        };
        let (control, typed_repeat) = sample_type(record.cell(places.sample_type), &self.mapping.means)
            .ok_or((Why::SampleType, places.sample_type, String::new()))?;
        let repeat = yes(record.cell(places.repeat)).ok_or((Why::YesOrNo, places.repeat, String::new()))?;
        let month = date.month_index();
        self.tally.extraction(month, route, runs, control, repeat || typed_repeat);
        let batch = record.cell(places.batch);
        if !batch.is_empty() {
            self.tally.batch(batch, month, route);
        }
        Ok(())
    }

    fn close(&mut self) {
        let mut again: Vec<(u32, u32)> = Vec::new();
        let mut count = 0;
        self.tally.close(&mut |line, earlier| {
            count += 1;
            if count <= MOST_TOLD {
                again.push((line, earlier));
            }
        });
        if let Some(all) = self.rows.by_change.get_mut(Change::Repeated as usize) {
            *all = count;
        }
        for (line, earlier) in again {
            let detail = earlier.to_string();
            self.remark(u64::from(line), NOWHERE, b"", Verdict::Changed(Change::Repeated), &detail);
        }
    }
}

/// kg, or m³ where no density is known.
fn as_mass(names: &Names, material: u16, value: Value) -> (f64, Option<f64>) {
    if value.kind == Kind::Mass {
        return (value.si, None);
    }
    match names.materials.get(usize::from(material)).and_then(|m| m.density_kg_m3) {
        // m = V ρ
        Some((density, _)) => (value.si * density, None),
        None => (0.0, Some(value.si)),
    }
}

/// Control or not, repeat or not; `None` where the word is not known. The words are those of the trade (common
/// practice, no source).
fn sample_type(cell: &[u8], means: &[(String, String)]) -> Option<(bool, bool)> {
    const SAMPLES: [&str; 8] = ["", "sample", "smp", "s", "probe", "field sample", "unknown", "normal"];
    const CONTROLS: [&str; 26] = [
        "control",
        "qc",
        "blank",
        "method blank",
        "mb",
        "blk",
        "lcs",
        "lcsd",
        "ms",
        "msd",
        "matrix spike",
        "spike",
        "duplicate",
        "dup",
        "crm",
        "srm",
        "reference",
        "ccv",
        "icv",
        "solvent blank",
        "field blank",
        "blindwert",
        "kontrolle",
        "laboratory control sample",
        "matrix spike duplicate",
        "prep blank",
    ];
    const REPEATS: [&str; 7] =
        ["repeat", "re-extract", "reextract", "rerun", "re-extraction", "redo", "wiederholung"];
    let text = decoded(cell).0;
    let meant = means.iter().find(|(from, _)| from.trim() == text && !text.is_empty());
    let word = meant.map_or(&*text, |(_, to)| to).trim();
    let is = |list: &[&str]| list.iter().any(|known| known.eq_ignore_ascii_case(word));
    if is(&SAMPLES) {
        Some((false, false))
    } else if is(&CONTROLS) {
        Some((true, false))
    } else if is(&REPEATS) {
        Some((false, true))
    } else {
        None
    }
}

fn yes(cell: &[u8]) -> Option<bool> {
    let is = |list: &[&[u8]]| list.iter().any(|known| known.eq_ignore_ascii_case(cell));
    if is(&[b"", b"no", b"n", b"false", b"0", b"-", b"nein"]) {
        Some(false)
    } else if is(&[b"yes", b"y", b"true", b"1", b"x", b"re", b"ja", b"j", b"re-extract", b"repeat"]) {
        Some(true)
    } else {
        None
    }
}
