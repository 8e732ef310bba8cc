//! Reads the comma-separated tables beside the checks: a header, quoted fields, no line breaks inside a field.
use std::collections::BTreeMap;

pub(crate) type Row = BTreeMap<String, String>;

/// The rows of a table by column name; a row with a missing or extra field is a failure.
pub(crate) fn rows(text: &str) -> Vec<Row> {
    let mut lines = text.lines();
    let header = fields(lines.next().expect("a header"));
    lines
        .map(|line| {
            let values = fields(line);
            assert_eq!(values.len(), header.len(), "fields of {line}");
            header.iter().cloned().zip(values).collect()
        })
        .collect()
}

pub(crate) fn number(row: &Row, column: &str) -> f64 {
    row[column].parse().unwrap_or_else(|_| panic!("{column} of {row:?}"))
}

fn fields(line: &str) -> Vec<String> {
    let (mut fields, mut quoted) = (vec![String::new()], false);
    for c in line.chars() {
        match c {
            '"' => quoted = !quoted,
            ',' if !quoted => fields.push(String::new()),
            _ => fields.last_mut().expect("at least one").push(c),
        }
    }
    assert!(!quoted, "unclosed quote in {line}");
    fields
}
