//! `log`: the site's own records beside its plan.

use crate::input;
use crate::output::{Refusal, complain, complain_of, deliver, deliver_bytes, reason};
use crate::workbook;
use clap::ValueEnum;
use std::fs::File;
use std::io::{self, BufWriter, IsTerminal, Read, Write};
use std::path::{Path, PathBuf};
use std::process::ExitCode;
use std::time::{Duration, Instant};
use thimbleworth::account::Account;
use thimbleworth::log::{Mapping, Names, Reader, Reading, Register, Remark, mappings, reconcile};
use thimbleworth::plan::save;
use thimbleworth::report::consigned_year_table;
use thimbleworth::report::{
    DataTable, data_csv, data_json, data_markdown, data_text, log_tables, reconciliation_table, remark_table,
    solvent_balance_table, text_cell, visible,
};

/// Remarks that go into the result; all refused rows go into the file that `--refused` names.
const MOST_REMARKS: usize = 1000;
/// Remarks that a terminal shows.
const SHOWN_REMARKS: usize = 20;
/// Bytes taken in at a time.
const PIECE: usize = 256 * 1024;

#[derive(clap::Args)]
pub(crate) struct Args {
    /// The records as CSV or other delimited text, or - for the standard input
    #[arg(required = true)]
    files: Vec<PathBuf>,
    /// The plan whose routes, streams and materials the records name
    #[arg(long)]
    plan: PathBuf,
    /// What to write
    #[arg(long, value_enum, default_value_t = Format::Table)]
    format: Format,
    /// Which tables; all when left out. CSV holds one, the reconciliation when left out
    #[arg(long, value_name = "TABLE")]
    table: Vec<String>,
    /// Write into this file as a whole, instead of to the standard output
    #[arg(long, value_name = "FILE")]
    output: Option<PathBuf>,
    /// Write every refused row into this CSV file
    #[arg(long, value_name = "FILE")]
    refused: Option<PathBuf>,
    /// Write the plan with the mappings of these files into this file
    #[arg(long, value_name = "FILE")]
    keep: Option<PathBuf>,
}

#[derive(Clone, Copy, PartialEq, Eq, ValueEnum)]
enum Format {
    /// Text for a terminal
    Table,
    /// For other programs
    Json,
    /// One table, for a spreadsheet
    Csv,
    /// A report to print
    Markdown,
    /// A workbook with a sheet a table
    Xlsx,
}

pub(crate) fn run(args: &Args) -> Result<ExitCode, Refusal> {
    if args.format == Format::Xlsx && args.output.is_none() {
        return Err(Refusal::because(workbook::NEEDS_FILE));
    }
    let account = input::account(&args.plan)?;
    let mut problems = Vec::new();
    let known = account.plan.as_ref().map(|plan| mappings(plan, &mut problems)).unwrap_or_default();
    let (Some(plan), Some(program), false, true) =
        (&account.plan, &account.program, account.broken(), problems.is_empty())
    else {
        problems.extend(account.problems);
        complain_of(&problems);
        return Err(Refusal::Said);
    };
    for file in args.files.iter().chain([&args.plan]) {
        for out in [&args.refused, &args.keep, &args.output].into_iter().flatten() {
            let same =
                |a: &Path, b: &Path| matches!((a.canonicalize(), b.canonicalize()), (Ok(a), Ok(b)) if a == b);
            if same(file, out) && (Some(out) != args.keep.as_ref() || *file != args.plan) {
                let name = out.display();
                return Err(Refusal::because(format!("{name} is a file that is read; name another one")));
            }
        }
    }
    let mut refused = Refused::create(args.refused.as_deref())?;
    let mut names = Names::of(plan, program);
    let (mut readings, mut remarks) = (Vec::new(), Vec::new());
    let mut unreadable = false;
    for path in &args.files {
        let (found, back) = read(path, names, &known, &mut remarks, &mut refused)?;
        names = back;
        match found {
            Ok(reading) => readings.push(reading),
            Err(why) => {
                let [found, need] = why.why.words();
                complain(&format!("error: {}: {found}; {need}", path.display()));
                unreadable = true;
            }
        }
    }
    refused.finish()?;
    if unreadable {
        return Err(Refusal::Said);
    }
    let tables = tables(args, &readings, &remarks, &account, program, &mut names)?;
    match args.format {
        Format::Table => deliver(&data_text(&tables), args.output.as_deref(), &args.plan)?,
        Format::Json => deliver(&data_json(&tables), args.output.as_deref(), &args.plan)?,
        Format::Csv => {
            let text = tables.first().map(data_csv).unwrap_or_default();
            deliver(&text, args.output.as_deref(), &args.plan)?;
        }
        Format::Markdown => {
            let title = ["The site's records: ", &plan.title].concat();
            deliver(&data_markdown(&title, &tables), args.output.as_deref(), &args.plan)?;
        }
        Format::Xlsx => {
            let bytes = workbook::bytes(&tables).map_err(Refusal::because)?;
            deliver_bytes(&bytes, args.output.as_deref(), &args.plan)?;
        }
    }
    if let Some(path) = &args.keep {
        let mut plan = plan.clone();
        for reading in &readings {
            plan.logs.retain(|log| log.name != reading.mapping.name);
            plan.logs.push(reading.mapping.kept());
        }
        deliver(&save(&plan), Some(path), Path::new(""))?;
    }
    for reading in readings.iter().filter(|r| r.rows.refused > 0) {
        complain(&format!(
            "warning: {}: {} of {} rows are refused; {}",
            reading.mapping.name,
            reading.rows.refused,
            reading.rows.refused + reading.rows.used,
            if args.refused.is_some() {
                "each stands in the file named"
            } else {
                "--refused FILE lists each"
            }
        ));
    }
    Ok(ExitCode::SUCCESS)
}

fn tables(
    args: &Args,
    readings: &[Reading],
    remarks: &[(String, Remark)],
    account: &Account,
    program: &thimbleworth::program::Program,
    names: &mut Names,
) -> Result<Vec<DataTable>, Refusal> {
    let mut out = log_tables(readings, names);
    out.extend(Some(consigned_year_table(readings, names, account)).filter(|t| !t.rows.is_empty()));
    for refused in [true, false] {
        let mut table = remark_table(remarks, refused);
        if args.format == Format::Table && table.rows.len() > SHOWN_REMARKS {
            table.rows.truncate(SHOWN_REMARKS);
            table.notes.push("these are the first; the sums above say how many there are".to_owned());
        }
        if !table.rows.is_empty() {
            out.push(table);
        }
    }
    // A preparation log alone has nothing that could be held against it.
    if readings.iter().any(|r| r.mapping.register != Register::Preparation) {
        let found = reconcile(readings, program, names);
        out.push(reconciliation_table(&found, names));
        out.push(solvent_balance_table(&found, names));
    }
    let keys: Vec<&str> = out.iter().map(|t| t.key).collect();
    for asked in &args.table {
        if !keys.contains(&asked.as_str()) {
            return Err(Refusal::because(format!(
                "there is no table {asked}; there are {}",
                keys.join(", ")
            )));
        }
    }
    if args.format == Format::Csv && args.table.len() > 1 {
        return Err(Refusal::because("CSV holds one table; name one, or take another format"));
    }
    let reconciled = keys.contains(&"reconciliation");
    if !args.table.is_empty() {
        out.retain(|t| args.table.iter().any(|asked| asked == t.key));
    } else if args.format == Format::Csv {
        out.retain(|t| t.key == if reconciled { "reconciliation" } else { "work" });
    }
    Ok(out)
}

type Found = (Result<Reading, thimbleworth::log::Unread>, Names);

/// Reads one file as it comes.
fn read(
    path: &Path,
    names: Names,
    known: &[Mapping],
    remarks: &mut Vec<(String, Remark)>,
    refused: &mut Refused,
) -> Result<Found, Refusal> {
    let standard = path.as_os_str() == "-";
    let name = if standard {
        "standard input".to_owned()
    } else {
        path.file_name().map(|n| n.to_string_lossy().into_owned()).unwrap_or_default()
    };
    let cannot =
        |error: &io::Error| Refusal::because(format!("{} cannot be read: {}", path.display(), reason(error)));
    let mut reader = Reader::new(&name, names, known);
    let (mut source, size): (Box<dyn Read>, Option<u64>) = if standard {
        (Box::new(io::stdin().lock()), None)
    } else {
        let file = File::open(path).map_err(|e| cannot(&e))?;
        let size = file.metadata().ok().map(|m| m.len()).filter(|size| *size > 0);
        (Box::new(file), size)
    };
    let mut progress = Progress::begin(&name, size);
    let mut piece = vec![0; PIECE];
    loop {
        let count = match source.read(&mut piece) {
            Ok(0) => break,
            Ok(count) => count,
            Err(error) if error.kind() == io::ErrorKind::Interrupted => continue,
            Err(error) => return Err(cannot(&error)),
        };
        reader.feed(piece.get(..count).unwrap_or_default());
        keep(&name, reader.take_remarks(), remarks, refused)?;
        progress.tell(&reader);
    }
    progress.end();
    let (found, names, rest) = reader.finish();
    keep(&name, rest, remarks, refused)?;
    Ok((found, names))
}

fn keep(
    name: &str,
    new: Vec<Remark>,
    remarks: &mut Vec<(String, Remark)>,
    refused: &mut Refused,
) -> Result<(), Refusal> {
    for remark in new {
        refused.write(name, &remark)?;
        if remarks.len() < MOST_REMARKS {
            remarks.push((name.to_owned(), remark));
        }
    }
    Ok(())
}

/// The file of all refused rows, written as they come.
struct Refused(Option<(BufWriter<File>, PathBuf)>);

impl Refused {
    fn create(path: Option<&Path>) -> Result<Self, Refusal> {
        let Some(path) = path else { return Ok(Self(None)) };
        let file = File::create(path).map_err(|e| Self::cannot(path, &e))?;
        let mut file = BufWriter::new(file);
        file.write_all(b"file,line,column,cell,found,need\r\n").map_err(|e| Self::cannot(path, &e))?;
        Ok(Self(Some((file, path.to_owned()))))
    }

    fn cannot(path: &Path, error: &io::Error) -> Refusal {
        Refusal::because(format!("{} cannot be written: {}", path.display(), reason(error)))
    }

    fn write(&mut self, name: &str, remark: &Remark) -> Result<(), Refusal> {
        let Some((file, path)) = self.0.as_mut().filter(|_| remark.refused()) else { return Ok(()) };
        let cells =
            [name, &remark.line.to_string(), &remark.heading, &remark.cell, &remark.found(), &remark.need()]
                .map(text_cell)
                .join(",");
        write!(file, "{cells}\r\n").map_err(|e| Self::cannot(path, &e))
    }

    fn finish(self) -> Result<(), Refusal> {
        let Some((mut file, path)) = self.0 else { return Ok(()) };
        file.flush().map_err(|e| Self::cannot(&path, &e))
    }
}

/// How far a file has been read, on the standard error, where it takes longer than a moment.
struct Progress<'n> {
    name: &'n str,
    size: Option<u64>,
    told: Instant,
    every: Duration,
    line: bool,
}

impl<'n> Progress<'n> {
    fn begin(name: &'n str, size: Option<u64>) -> Self {
        // A terminal shows one line that moves on; a file of messages gets few.
        let terminal = io::stderr().is_terminal();
        let every = Duration::from_millis(if terminal { 250 } else { 1000 });
        Self { name, size, told: Instant::now(), every, line: terminal }
    }

    fn tell(&mut self, reader: &Reader) {
        if self.told.elapsed() < self.every {
            return;
        }
        self.told = Instant::now();
        let share = self.size.map_or(String::new(), |size| format!("{} %, ", reader.bytes() * 100 / size));
        let text = format!("{}: {share}{} rows", visible(self.name), reader.rows());
        let end = if self.line { "\r" } else { "\n" };
        let _ = write!(io::stderr().lock(), "{text}{end}");
    }

    fn end(&self) {
        if self.line {
            // Clears the line.
            let _ = write!(io::stderr().lock(), "\r{}\r", " ".repeat(self.name.chars().count() + 40));
        }
    }
}
