//! Reading of the embedded tables: comma-separated, double quotes around fields with commas, one heading line.

/// An embedded table with its name, for the messages.
#[derive(Clone, Copy)]
pub(crate) struct Table {
    /// The file's name.
    pub(crate) name: &'static str,
    /// The file's text.
    pub(crate) text: &'static str,
}

/// One row: its fields in the order of the columns that were asked for.
pub(crate) type Row<const N: usize> = [&'static str; N];

impl Table {
    /// Every row, reduced to the named columns; a fault for every row or column that is not as it should be.
    pub(crate) fn rows<const N: usize>(self, columns: [&str; N], faults: &mut Vec<String>) -> Vec<Row<N>> {
        let mut lines = self.text.lines();
        let mut fields = Vec::new();
        split(lines.next().unwrap_or(""), &mut fields);
        let width = fields.len();
        let mut places = [0; N];
        for (place, column) in places.iter_mut().zip(columns) {
            match fields.iter().position(|field| *field == column) {
                Some(found) => *place = found,
                None => {
                    faults.push(format!("{}: no column {column}", self.name));
                    return Vec::new();
                }
            }
        }
        let mut rows = Vec::new();
        for (index, line) in lines.enumerate() {
            split(line, &mut fields);
            if fields.len() == width {
                rows.push(places.map(|place| fields.get(place).copied().unwrap_or("")));
            } else {
                faults.push(format!(
                    "{}: line {}: {} fields, not {width}",
                    self.name,
                    index + 2,
                    fields.len()
                ));
            }
        }
        rows
    }
}

fn split(line: &'static str, fields: &mut Vec<&'static str>) {
    fields.clear();
    let mut rest = line;
    loop {
        let (field, after) = match rest.strip_prefix('"') {
            Some(quoted) => {
                let (field, after) = quoted.split_once('"').unwrap_or((quoted, ""));
                (field, after.strip_prefix(','))
            }
            // A field is a few bytes long: a plain loop beats a search made for long texts.
            None => match rest.bytes().position(|byte| byte == b',').and_then(|at| rest.split_at_checked(at))
            {
                Some((field, after)) => (field, after.strip_prefix(',')),
                None => (rest, None),
            },
        };
        fields.push(field);
        match after {
            Some(after) => rest = after,
            None => return,
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn quotes_empty_fields_and_faults() {
        let mut faults = Vec::new();
        let table = Table { name: "t", text: "name,a,b\n\"1,4-dioxane\",,2\nx,1\n" };
        assert_eq!(table.rows(["b", "name"], &mut faults), vec![["2", "1,4-dioxane"]]);
        assert_eq!(faults, ["t: line 3: 2 fields, not 3"]);
        faults.clear();
        assert!(table.rows(["c"], &mut faults).is_empty());
        assert_eq!(faults, ["t: no column c"]);
    }
}
