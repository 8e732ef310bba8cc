//! Reading in slices: no turn of the page waits for a long file.
use crate::parts::ByRc;
use crate::picture::{Picture, reconciled};
use crate::reckon::Book;
use gloo::timers::callback::Timeout;
use std::cell::Cell;
use std::rc::Rc;
use thimbleworth::log::{Mapping, Names, Reader, Reading, Reconciling, Register, Remark, mappings};
use thimbleworth::plan::Plan;
use thimbleworth::report::{
    DataTable, consigned_year_table, log_tables, reconciliation_table, remark_table, solvent_balance_table,
};

/// How long a slice lasts; ms.
const SLICE_MS: f64 = 8.0;
/// Bytes between two looks at the clock: about a millisecond of work.
const PIECE: usize = 16 * 1024;
/// Remarks that are kept.
const MOST_REMARKS: usize = 50_000;

/// Rows that were pasted, or a file.
#[derive(Clone)]
pub(super) struct Source {
    pub(super) name: String,
    pub(super) bytes: Rc<Vec<u8>>,
}

/// What became of a file.
pub(super) struct Read {
    pub(super) source: String,
    pub(super) words: String,
    pub(super) failed: bool,
    pub(super) mapping: Option<Mapping>,
}

/// What all files hold.
pub(super) struct Outcome {
    pub(super) files: Vec<Read>,
    pub(super) picture: Option<Picture>,
    pub(super) tables: Vec<DataTable>,
}

/// Files under way.
pub(super) struct Job {
    /// Until the first slice: naming all that a plan holds takes a turn of its own.
    plan: Option<Plan>,
    book: ByRc<Book>,
    sources: Vec<Source>,
    known: Vec<Mapping>,
    names: Option<Names>,
    reader: Option<Reader>,
    /// Bytes of the present file that are read.
    at: usize,
    files: Vec<Read>,
    readings: Vec<Reading>,
    remarks: Vec<(String, Remark)>,
    reconciling: Option<Reconciling>,
    /// Tables that stand on the sums alone.
    sums: Vec<DataTable>,
}

impl Job {
    /// `None` where there is nothing to read, or no plan that runs to read it by.
    pub(super) fn begin(plan: &Plan, book: ByRc<Book>, sources: Vec<Source>) -> Option<Self> {
        book.account.program.as_ref()?;
        (!sources.is_empty()).then(|| Self {
            plan: Some(plan.clone()),
            book,
            sources,
            known: Vec::new(),
            names: None,
            reader: None,
            at: 0,
            files: Vec::new(),
            readings: Vec::new(),
            remarks: Vec::new(),
            reconciling: None,
            sums: Vec::new(),
        })
    }

    /// Goes on until `over` says that the slice is over; what was found when all is done.
    pub(super) fn slice(&mut self, over: &dyn Fn() -> bool) -> Option<Outcome> {
        loop {
            if let Some(plan) = self.plan.take() {
                self.known = mappings(&plan, &mut Vec::new());
                self.names = self.book.account.program.as_ref().map(|program| Names::of(&plan, program));
            } else if self.files.len() < self.sources.len() {
                self.piece();
            } else if self.step() {
                return Some(self.end());
            }
            if over() {
                return None;
            }
        }
    }

    /// Reads the next bytes.
    fn piece(&mut self) -> Option<()> {
        let source = self.sources.get(self.files.len())?;
        if self.reader.is_none() {
            self.reader = Some(Reader::new(&source.name, self.names.take()?, &self.known));
        }
        let reader = self.reader.as_mut()?;
        let size = source.bytes.len();
        let end = if self.at + PIECE < size { self.at + PIECE } else { size };
        reader.feed(source.bytes.get(self.at..end).unwrap_or_default());
        self.at = end;
        let mut new = reader.take_remarks();
        if end == size {
            let (read, names, rest) = self.reader.take()?.finish();
            new.extend(rest);
            let failed = read.is_err();
            let (words, mapping) = match read {
                Ok(reading) => {
                    let rows = &reading.rows;
                    let words = [
                        &(rows.used + rows.refused).to_string(),
                        " rows: ",
                        &rows.used.to_string(),
                        " used, ",
                        &rows.changed.to_string(),
                        " of them with a change; ",
                        &rows.refused.to_string(),
                        " refused.",
                    ];
                    let found = (words.concat(), Some(reading.mapping.clone()));
                    self.readings.push(reading);
                    found
                }
                Err(unread) => (unread.why.words().join("; ") + ".", unread.draft),
            };
            self.files.push(Read { source: source.name.clone(), words, failed, mapping });
            self.names = Some(names);
            self.at = 0;
        }
        let room = MOST_REMARKS.saturating_sub(self.remarks.len());
        let name = &source.name;
        self.remarks.extend(new.into_iter().take(room).map(|remark| (name.clone(), remark)));
        Some(())
    }

    /// Goes on with the reconciliation; `true` once there is nothing more to do.
    fn step(&mut self) -> bool {
        let (Some(names), Some(program)) = (&mut self.names, &self.book.account.program) else { return true };
        match &mut self.reconciling {
            _ if self.readings.iter().all(|r| r.mapping.register == Register::Preparation) => true,
            Some(reconciling) => reconciling.step(program),
            None => {
                self.reconciling = Some(Reconciling::begin(&self.readings, program, names));
                self.sums = log_tables(&self.readings, names);
                false
            }
        }
    }

    fn end(&mut self) -> Outcome {
        let mut tables = Vec::new();
        let mut picture = None;
        if let Some(names) = &self.names {
            match self.reconciling.take() {
                Some(reconciling) => {
                    let found = reconciling.end(&self.readings, names);
                    let table = reconciliation_table(&found, names);
                    picture = reconciled("reconciled", &table);
                    tables.extend([table, solvent_balance_table(&found, names)]);
                }
                None => self.sums = log_tables(&self.readings, names),
            }
            tables.extend([remark_table(&self.remarks, true), remark_table(&self.remarks, false)]);
            tables.push(consigned_year_table(&self.readings, names, &self.book.account));
            tables.append(&mut self.sums);
            tables.retain(|t| !t.rows.is_empty() && t.key != "columns");
        }
        Outcome { files: std::mem::take(&mut self.files), picture, tables }
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
            // What is drawn has a turn of its own.
            Some(found) => {
                Timeout::new(0, move || {
                    if goes.get() {
                        done(found);
                    }
                })
                .forget();
            }
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
            let source = |name: &str, text: &str| Source { name: name.into(), bytes: Rc::new(text.into()) };
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
        assert_eq!(found.files[0].words, "50000 rows: 50000 used, 0 of them with a change; 0 refused.");
        assert!(found.files[1].words.starts_with("none of the first lines looks like headings"));
    }
}
