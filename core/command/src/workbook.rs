//! Tables as a workbook (Office Open XML): one sheet a table.

use rust_xlsxwriter::{Format, Workbook, Worksheet, XlsxError};
use thimbleworth::report::{DataCell, DataTable, Paper};

/// The longest name of a sheet that spreadsheets take.
const LONGEST_NAME: usize = 31;
/// The longest text of a cell that spreadsheets take.
const LONGEST_TEXT: usize = 32_767;

/// What is said where no file is named.
pub(crate) const NEEDS_FILE: &str = "a workbook is no text for a terminal; name a file with --output";

/// The workbook as bytes. Every text is written as text, so that none is ever a formula; numbers are numbers.
pub(crate) fn bytes(tables: &[DataTable]) -> Result<Vec<u8>, String> {
    told(build(tables))
}

/// Papers as a workbook, a sheet each, under the same rules; the sheets have these names.
pub(crate) fn papers(papers: &[(&str, Paper)]) -> Result<Vec<u8>, String> {
    told(build_papers(papers))
}

fn told(built: Result<Vec<u8>, XlsxError>) -> Result<Vec<u8>, String> {
    built.map_err(|error| format!("the workbook cannot be made: {error}"))
}

fn begun() -> Result<Workbook, XlsxError> {
    let mut book = Workbook::new();
    // Without this the day of writing would stand in the file, and the same records give other bytes.
    let day = rust_xlsxwriter::ExcelDateTime::from_ymd(2026, 1, 1)?;
    book.set_properties(&rust_xlsxwriter::DocProperties::new().set_creation_datetime(&day));
    Ok(book)
}

fn sheet<'b>(book: &'b mut Workbook, name: &str) -> Result<&'b mut Worksheet, XlsxError> {
    let name: String = name.chars().take(LONGEST_NAME).collect();
    let sheet = book.add_worksheet();
    sheet.set_name(name)?;
    Ok(sheet)
}

/// As much of a text as a cell takes.
fn short(text: &str) -> String {
    text.chars().take(LONGEST_TEXT).collect()
}

fn build(tables: &[DataTable]) -> Result<Vec<u8>, XlsxError> {
    let mut book = begun()?;
    let bold = Format::new().set_bold();
    for table in tables {
        let sheet = sheet(&mut book, table.key)?;
        for (column, [_, heading]) in (0..).zip(&table.head) {
            sheet.write_string_with_format(0, column, *heading, &bold)?;
        }
        sheet.set_freeze_panes(1, 0)?;
        for (at, row) in (1..).zip(&table.rows) {
            for (column, cell) in (0..).zip(row) {
                match cell {
                    DataCell::Text(text) => {
                        sheet.write_string(at, column, short(text))?;
                    }
                    DataCell::Number(value) if value.is_finite() => {
                        sheet.write_number(at, column, *value)?;
                    }
                    // Exact up to 2^53, which no count here reaches.
                    DataCell::Count(count) => {
                        sheet.write_number(at, column, *count as f64)?;
                    }
                    DataCell::Number(_) | DataCell::Empty => {}
                }
            }
        }
        let below = u32::try_from(table.rows.len()).unwrap_or(u32::MAX - 4) + 2;
        for (at, note) in (below..).zip(&table.notes) {
            sheet.write_string(at, 0, note)?;
        }
        sheet.autofit();
    }
    book.save_to_buffer()
}

fn build_papers(papers: &[(&str, Paper)]) -> Result<Vec<u8>, XlsxError> {
    let mut book = begun()?;
    let bold = Format::new().set_bold();
    for (name, paper) in papers {
        let sheet = sheet(&mut book, name)?;
        // Columns are as wide as their cells ask, within reason; sentences run over them.
        for (column, width) in (0..).zip(widths(paper)) {
            sheet.set_column_width(column, width)?;
        }
        let mut at = 0;
        sheet.write_string_with_format(at, 0, short(&paper.title), &bold)?;
        at += 1;
        for line in &paper.lead {
            sheet.write_string(at, 0, short(line))?;
            at += 1;
        }
        for table in &paper.tables {
            at += 1;
            sheet.write_string_with_format(at, 0, short(&table.title), &bold)?;
            at += 1;
            if table.head.iter().any(|heading| !heading.is_empty()) {
                for (column, heading) in (0..).zip(table.head) {
                    sheet.write_string_with_format(at, column, *heading, &bold)?;
                }
                at += 1;
            }
            for row in &table.rows {
                for (column, cell) in (0..).zip(row) {
                    match number(cell) {
                        Some(value) => sheet.write_number(at, column, value)?,
                        None => sheet.write_string(at, column, short(cell))?,
                    };
                }
                at += 1;
            }
        }
        at += 1;
        for line in &paper.foot {
            sheet.write_string(at, 0, short(line))?;
            at += 1;
        }
    }
    book.save_to_buffer()
}

/// What a cell holds where it is a bare number, so that a spreadsheet can add it up. A code such as 070704 is none.
fn number(cell: &str) -> Option<f64> {
    let digits = cell.strip_prefix('-').unwrap_or(cell);
    let code = digits.len() > 1 && digits.starts_with('0') && !digits.starts_with("0.");
    let plain = !code && digits.bytes().all(|b| b.is_ascii_digit() || b == b'.');
    if plain { cell.parse().ok() } else { None }
}

/// How wide each column is, in digits.
fn widths(paper: &Paper) -> Vec<f64> {
    let mut out: Vec<f64> = Vec::new();
    for row in paper.tables.iter().flat_map(|table| &table.rows) {
        for (column, cell) in row.iter().enumerate() {
            let here = (cell.chars().count() as f64 + 2.0).clamp(10.0, 48.0);
            match out.get_mut(column) {
                Some(width) if *width >= here => {}
                Some(width) => *width = here,
                None => out.push(here),
            }
        }
    }
    out
}
