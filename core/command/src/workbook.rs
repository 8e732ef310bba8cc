//! Tables as a workbook (Office Open XML): one sheet a table.

use rust_xlsxwriter::{Format, Workbook, XlsxError};
use thimbleworth::report::{DataCell, DataTable};

/// The longest name of a sheet that spreadsheets take.
const LONGEST_NAME: usize = 31;
/// The longest text of a cell that spreadsheets take.
const LONGEST_TEXT: usize = 32_767;

/// The workbook as bytes. Every text is written as text, so that none is ever a formula; numbers are numbers.
pub(crate) fn bytes(tables: &[DataTable]) -> Result<Vec<u8>, String> {
    build(tables).map_err(|error| format!("the workbook cannot be made: {error}"))
}

fn build(tables: &[DataTable]) -> Result<Vec<u8>, XlsxError> {
    let mut book = Workbook::new();
    // Without this the day of writing would stand in the file, and the same records give other bytes.
    let day = rust_xlsxwriter::ExcelDateTime::from_ymd(2026, 1, 1)?;
    book.set_properties(&rust_xlsxwriter::DocProperties::new().set_creation_datetime(&day));
    let bold = Format::new().set_bold();
    for table in tables {
        let name: String = table.key.chars().take(LONGEST_NAME).collect();
        let sheet = book.add_worksheet();
        sheet.set_name(name)?;
        for (column, [_, heading]) in (0..).zip(&table.head) {
            sheet.write_string_with_format(0, column, *heading, &bold)?;
        }
        sheet.set_freeze_panes(1, 0)?;
        for (at, row) in (1..).zip(&table.rows) {
            for (column, cell) in (0..).zip(row) {
                match cell {
                    DataCell::Text(text) => {
                        let short: String = text.chars().take(LONGEST_TEXT).collect();
                        sheet.write_string(at, column, short)?;
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
