//! Reading in slices: no turn of the page waits for a long file.
use crate::parts::ByRc;
use crate::reckon::Book;
use gloo::timers::callback::Timeout;
use std::cell::Cell;
use std::rc::Rc;
use thimbleworth::log::{Mapping, Names, Reader, Reading, Register, Remark, Unread, mappings, reconcile};
use thimbleworth::plan::Plan;
use thimbleworth::report::{
    DataTable, log_tables, reconciliation_table, remark_table, solvent_balance_table,
};

/// How long a slice lasts; ms.
const SLICE_MS: f64 = 8.0;
/// Bytes between two looks at the clock: about a millisecond of work.
const PIECE: usize = 16 * 1024;
/// Remarks that are kept to be shown.
const MOST_REMARKS: usize = 200;

/// Rows that were pasted, or a file.
#[derive(Clone, PartialEq)]
pub(super) struct Source {
    pub(super) name: String,
    pub(super) bytes: ByRc<Vec<u8>>,
}

/// What became of a file.
pub(super) struct Read {
    pub(super) name: String,
    pub(super) read: Result<Reading, Unread>,
}

impl Read {
    pub(super) fn mapping(&self) -> Option<&Mapping> {
        match &self.read {
            Ok(reading) => Some(&reading.mapping),
            Err(unread) => unread.draft.as_ref(),
        }
    }

    pub(super) fn words(&self) -> String {
        match &self.read {
            Ok(reading) => {
                let rows = &reading.rows;
                format!(
                    "{} rows: {} used, {} of them with a change; {} refused.",
                    rows.used + rows.refused,
                    rows.used,
                    rows.changed,
                    rows.refused
                )
            }
            Err(unread) => unread.why.words().join("; ") + ".",
        }
    }
}

/// What all files hold.
pub(super) struct Outcome {
    pub(super) files: Vec<Read>,
    pub(super) tables: Vec<DataTable>,
}

/// Files under way.
pub(super) struct Job {
    book: ByRc<Book>,
    sources: Vec<Source>,
    known: Vec<Mapping>,
    names: Option<Names>,
    reader: Option<Reader>,
    /// Bytes of the present file that are read.
    at: usize,
    files: Vec<Read>,
    remarks: Vec<(String, Remark)>,
}

impl Job {
    /// `None` where there is nothing to read, or no plan that runs to read it by.
    pub(super) fn begin(plan: &Plan, book: ByRc<Book>, sources: Vec<Source>) -> Option<Self> {
        let names = Names::of(plan, book.account.program.as_ref()?);
        let known = mappings(plan, &mut Vec::new());
        (!sources.is_empty()).then_some(Self {
            book,
            sources,
            known,
            names: Some(names),
            reader: None,
            at: 0,
            files: Vec::new(),
            remarks: Vec::new(),
        })
    }

    /// Reads on until `over` says that the slice is over; what was found when all is read.
    pub(super) fn slice(&mut self, over: &dyn Fn() -> bool) -> Option<Outcome> {
        loop {
            let Some(source) = self.sources.get(self.files.len()) else { return Some(self.end()) };
            let names = &mut self.names;
            let reader = match &mut self.reader {
                Some(reader) => reader,
                empty => empty.insert(Reader::new(&source.name, names.take()?, &self.known)),
            };
            let end = if self.at + PIECE < source.bytes.len() { self.at + PIECE } else { source.bytes.len() };
            reader.feed(source.bytes.get(self.at..end).unwrap_or_default());
            self.at = end;
            let mut new = reader.take_remarks();
            if end == source.bytes.len()
                && let Some(reader) = self.reader.take()
            {
                let (read, names, rest) = reader.finish();
                new.extend(rest);
                self.files.push(Read { name: source.name.clone(), read });
                self.names = Some(names);
                self.at = 0;
            }
            let room = MOST_REMARKS.saturating_sub(self.remarks.len());
            self.remarks.extend(new.into_iter().take(room).map(|remark| (source.name.clone(), remark)));
            if over() {
                return None;
            }
        }
    }

    fn end(&mut self) -> Outcome {
        let files = std::mem::take(&mut self.files);
        // A second call finds nothing more to do.
        self.sources.clear();
        let mut tables = Vec::new();
        if let (Some(names), Some(program)) = (&mut self.names, &self.book.account.program) {
            let readings: Vec<Reading> = files.iter().filter_map(|f| f.read.as_ref().ok()).cloned().collect();
            if readings.iter().any(|r| r.mapping.register != Register::Preparation) {
                let found = reconcile(&readings, program, names);
                tables.push(reconciliation_table(&found, names));
                tables.push(solvent_balance_table(&found, names));
            }
            tables.extend([remark_table(&self.remarks, true), remark_table(&self.remarks, false)]);
            tables.extend(log_tables(&readings, names));
            tables.retain(|t| !t.rows.is_empty() && t.key != "columns");
        }
        Outcome { files, tables }
    }
}

/// Runs a job in slices; it stops when what is returned is dropped.
pub(super) fn run(job: Job, done: impl FnOnce(Outcome) + 'static) -> Running {
    let goes = Rc::new(Cell::new(true));
    turn(job, Box::new(done), Rc::clone(&goes));
    Running(goes)
}

/// A job that goes on for as long as this is kept.
pub(super) struct Running(Rc<Cell<bool>>);

impl Drop for Running {
    fn drop(&mut self) {
        self.0.set(false);
    }
}

fn turn(mut job: Job, done: Box<dyn FnOnce(Outcome)>, goes: Rc<Cell<bool>>) {
    Timeout::new(0, move || {
        if !goes.get() {
            return;
        }
        let now = || web_sys::window().and_then(|w| w.performance()).map_or(0.0, |p| p.now());
        let begun = now();
        match job.slice(&|| now() - begun >= SLICE_MS) {
            Some(found) => done(found),
            None => turn(job, done, goes),
        }
    })
    .forget();
}

#[cfg(test)]
mod tests {
    use super::*;
    use thimbleworth::account::account_text;
    use thimbleworth::example::EXAMPLES;

    #[test]
    fn slices_of_any_length_find_the_same() {
        let begin = || {
            let account = account_text(EXAMPLES[0].text);
            let plan = account.plan.clone().unwrap();
            let book = ByRc(Rc::new(Book { account, works: Vec::new() }));
            let mut text = String::from("Order date,Item,Amount (kg)\n");
            for i in 0..50_000 {
                text.push_str(&format!("2026-{:02}-01,acetone,{}\n", i % 12 + 1, i % 9));
            }
            let source =
                |name: &str, text: &str| Source { name: name.into(), bytes: ByRc(Rc::new(text.into())) };
            Job::begin(&plan, book, vec![source("a.csv", &text), source("b", "nonsense")]).unwrap()
        };
        let whole = begin().slice(&|| false).unwrap();
        let mut job = begin();
        let mut turns = 0;
        let found = loop {
            turns += 1;
            if let Some(found) = job.slice(&|| true) {
                break found;
            }
        };
        assert!(turns > 50, "{turns}");
        assert_eq!(found.tables, whole.tables);
        assert_eq!(found.files[0].words(), "50000 rows: 50000 used, 0 of them with a change; 0 refused.");
        assert!(found.files[1].words().starts_with("none of the first lines looks like headings"));
    }
}
