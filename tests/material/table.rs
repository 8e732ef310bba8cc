//! Reads a table with double quotes around fields that hold commas.

/// The heading and the rows of a table.
pub(crate) fn read(text: &str) -> (Vec<String>, Vec<Vec<String>>) {
    let mut rows = text.lines().map(|line| {
        let mut fields = vec![String::new()];
        let mut quoted = false;
        for c in line.chars() {
            match c {
                '"' => quoted = !quoted,
                ',' if !quoted => fields.push(String::new()),
                c => fields.last_mut().unwrap().push(c),
            }
        }
        fields
    });
    let heading = rows.next().unwrap();
    (heading, rows.collect())
}

/// The place of a column.
pub(crate) fn column(heading: &[String], name: &str) -> usize {
    heading.iter().position(|column| column == name).unwrap_or_else(|| panic!("no column {name}"))
}
