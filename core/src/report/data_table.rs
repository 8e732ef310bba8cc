//! Tables of text and numbers, the same for a terminal, Markdown, CSV, JSON and a workbook.

use super::csv::text_cell;
use super::json::{Json, Value};
use super::markdown::escaped;
use super::words::visible;
use crate::quantity::{shortest, significant};

/// One cell.
#[derive(Clone, Debug, PartialEq)]
pub enum DataCell {
    /// Text, which is never a formula.
    Text(String),
    /// How many, or which line.
    Count(u64),
    /// A number in the unit that the heading names.
    Number(f64),
    /// Nothing: not known, or without meaning here.
    Empty,
}

/// One table.
#[derive(Clone, Debug, PartialEq)]
pub struct DataTable {
    /// The name by which programs ask for it.
    pub key: &'static str,
    /// Its title.
    pub title: &'static str,
    /// Each column's key, which names the unit, and its heading.
    pub head: Vec<[&'static str; 2]>,
    /// Rows, each as long as the headings.
    pub rows: Vec<Vec<DataCell>>,
    /// What the table rests on, and what it leaves out.
    pub notes: Vec<String>,
}

impl DataCell {
    /// As people read it: four significant digits.
    #[must_use]
    pub fn shown(&self) -> String {
        match self {
            Self::Text(text) => text.clone(),
            Self::Number(value) => significant(*value, 4),
            Self::Count(count) => count.to_string(),
            Self::Empty => String::new(),
        }
    }

    /// Whether it is a number.
    #[must_use]
    pub const fn is_number(&self) -> bool {
        matches!(self, Self::Count(_) | Self::Number(_))
    }
}

/// The table as CSV (RFC 4180), with the columns' keys as its first line. Text that a spreadsheet would take for a formula
/// is defused.
///
/// ```
/// use thimbleworth::report::{DataCell, DataTable, data_csv};
/// let table = DataTable {
///     key: "sums",
///     title: "Sums",
///     head: vec![["material", "material"], ["bought_kg", "bought, kg"]],
///     rows: vec![vec![DataCell::Text("=1+1".into()), DataCell::Number(2.5)]],
///     notes: Vec::new(),
/// };
/// assert_eq!(data_csv(&table), "material,bought_kg\r\n'=1+1,2.5\r\n");
/// ```
#[must_use]
pub fn data_csv(table: &DataTable) -> String {
    let mut out = table.head.iter().map(|[key, _]| *key).collect::<Vec<_>>().join(",");
    out.push_str("\r\n");
    for row in &table.rows {
        for (i, cell) in row.iter().enumerate() {
            if i > 0 {
                out.push(',');
            }
            match cell {
                DataCell::Text(text) => out.push_str(&text_cell(text)),
                DataCell::Number(value) if value.is_finite() => out.push_str(&shortest(*value)),
                DataCell::Count(count) => out.push_str(&count.to_string()),
                DataCell::Number(_) | DataCell::Empty => {}
            }
        }
        out.push_str("\r\n");
    }
    out
}

/// The tables as Markdown, each under its title, with its notes.
#[must_use]
pub fn data_markdown(title: &str, tables: &[DataTable]) -> String {
    let mut out = ["# ", &escaped(title), "\n\n"].concat();
    for table in tables {
        out.push_str(&["## ", table.title, "\n\n"].concat());
        if !table.rows.is_empty() {
            let numeric = numeric(table);
            for line in 0..2 {
                for (i, [_, heading]) in table.head.iter().enumerate() {
                    out.push_str("| ");
                    out.push_str(match (line, numeric.get(i)) {
                        (0, _) => heading,
                        (_, Some(true)) => "---:",
                        _ => "---",
                    });
                    out.push(' ');
                }
                out.push_str("|\n");
            }
            for row in &table.rows {
                for cell in row {
                    out.push_str("| ");
                    out.push_str(&escaped(&cell.shown()));
                    out.push(' ');
                }
                out.push_str("|\n");
            }
            out.push('\n');
        }
        for note in &table.notes {
            out.push_str(&["- ", &escaped(note), "\n"].concat());
        }
        if !table.notes.is_empty() {
            out.push('\n');
        }
    }
    out
}

/// The tables as text for a terminal.
#[must_use]
pub fn data_text(tables: &[DataTable]) -> String {
    let mut out = String::new();
    for table in tables {
        out.push_str(&[table.title, "\n\n"].concat());
        if !table.rows.is_empty() {
            laid_out(&mut out, table);
            out.push('\n');
        }
        for note in &table.notes {
            super::grid::paragraph(&mut out, "- ", note);
        }
        if !table.notes.is_empty() {
            out.push('\n');
        }
    }
    out
}

/// The widest table that is laid out in columns; a wider one has a block a row.
const WIDEST: usize = 140;

fn laid_out(out: &mut String, table: &DataTable) {
    let rows: Vec<Vec<String>> =
        table.rows.iter().map(|row| row.iter().map(|c| visible(&c.shown())).collect()).collect();
    let head: Vec<String> = table.head.iter().map(|[_, heading]| (*heading).to_owned()).collect();
    let numeric = numeric(table);
    let longer = |most: usize, text: &String| {
        let here = text.chars().count();
        if here > most { here } else { most }
    };
    let mut widths: Vec<usize> = head.iter().map(|h| longer(0, h)).collect();
    for row in &rows {
        for (width, cell) in widths.iter_mut().zip(row) {
            *width = longer(*width, cell);
        }
    }
    let pad = |out: &mut String, text: &str, width: usize, right: bool| {
        let spaces = " ".repeat(width.saturating_sub(text.chars().count()));
        out.push_str(if right { &spaces } else { "" });
        out.push_str(text);
        out.push_str(if right { "" } else { &spaces });
    };
    if widths.iter().fold(0, |all, width| all + width + 2) <= WIDEST {
        for row in std::iter::once(&head).chain(&rows) {
            let mut line = String::new();
            for ((cell, width), right) in row.iter().zip(&widths).zip(&numeric) {
                pad(&mut line, cell, *width, *right);
                line.push_str("  ");
            }
            out.push_str(line.trim_end());
            out.push('\n');
        }
        return;
    }
    let widest = head.iter().fold(0, longer);
    for (i, row) in rows.iter().enumerate() {
        if i > 0 {
            out.push('\n');
        }
        for (heading, cell) in head.iter().zip(row).filter(|(_, cell)| !cell.is_empty()) {
            pad(out, heading, widest, false);
            out.push_str("  ");
            out.push_str(cell);
            out.push('\n');
        }
    }
}

/// The tables as one JSON document: `{"thimbleworth_log": 1, "tables": {key: {"rows": [{column: value}], "notes": []}}}`.
/// What is not known is `null`.
#[must_use]
pub fn data_json(tables: &[DataTable]) -> String {
    Json::document(|json| {
        json.put("thimbleworth_log", 1_u64);
        json.object("tables", |json| {
            for table in tables {
                json.object(table.key, |json| {
                    json.list("rows", |json| {
                        for row in &table.rows {
                            json.row(|json| {
                                for (cell, [key, _]) in row.iter().zip(&table.head) {
                                    match cell {
                                        DataCell::Text(text) => json.put(key, text),
                                        DataCell::Count(count) => json.put(key, *count),
                                        DataCell::Number(value) => {
                                            json.put(key, Some(*value).filter(|v| v.is_finite()));
                                        }
                                        DataCell::Empty => json.put(key, Value::Null),
                                    }
                                }
                            });
                        }
                    });
                    json.texts("notes", &table.notes);
                });
            }
        });
    })
}

/// Which columns hold numbers.
fn numeric(table: &DataTable) -> Vec<bool> {
    (0..table.head.len())
        .map(|i| {
            let mut cells = table.rows.iter().filter_map(|row| row.get(i));
            cells.any(|c| c.is_number())
        })
        .collect()
}
