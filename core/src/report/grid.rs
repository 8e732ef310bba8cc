//! Plain text laid out in columns of fixed width.

use super::words::visible;

/// The column at which text is wrapped.
pub(super) const WIDTH: usize = 100;

/// A table: the first column to the left and wrapped, the others to the right.
pub(super) struct Grid {
    /// The width of the first column.
    pub(super) first: usize,
    /// The least width of the others.
    pub(super) least: usize,
    rows: Vec<Line>,
}

enum Line {
    Cells(Vec<String>),
    Heading(String),
}

impl Grid {
    pub(super) const fn new(first: usize, least: usize) -> Self {
        Self { first, least, rows: Vec::new() }
    }

    pub(super) fn row(&mut self, cells: Vec<String>) {
        self.rows.push(Line::Cells(cells));
    }

    /// A line that belongs to no column.
    pub(super) fn heading(&mut self, text: &str) {
        self.rows.push(Line::Heading(text.to_owned()));
    }

    /// The table as lines, each with its line end.
    pub(super) fn print(&self, out: &mut String) {
        let mut widths: Vec<usize> = Vec::new();
        for row in &self.rows {
            let Line::Cells(cells) = row else { continue };
            for (i, cell) in cells.iter().skip(1).enumerate() {
                let here = cell.chars().count();
                match widths.get_mut(i) {
                    Some(width) if *width >= here => {}
                    Some(width) => *width = here,
                    None => widths.push(if here > self.least { here } else { self.least }),
                }
            }
        }
        for row in &self.rows {
            match row {
                Line::Heading(text) => {
                    out.push_str(text);
                    out.push('\n');
                }
                Line::Cells(cells) => self.line(cells, &widths, out),
            }
        }
    }

    fn line(&self, cells: &[String], widths: &[usize], out: &mut String) {
        let empty = String::new();
        let title = cells.first().unwrap_or(&empty);
        let hanging = title.chars().take_while(|c| *c == ' ').count();
        // Lines after the first stand two further in.
        let pieces = wrap(title.trim_start(), self.first.saturating_sub(hanging + 2));
        let last = pieces.len().saturating_sub(1);
        for (i, piece) in pieces.iter().enumerate() {
            let indent = hanging + if i > 0 { 2 } else { 0 };
            let mut line = format!("{}{piece}", " ".repeat(indent));
            // The figures stand beside the last line of a wrapped title.
            if i == last {
                line.push_str(&" ".repeat(self.first.saturating_sub(line.chars().count())));
                for (cell, width) in cells.iter().skip(1).zip(widths) {
                    line.push_str("  ");
                    line.push_str(&" ".repeat(width.saturating_sub(cell.chars().count())));
                    line.push_str(cell);
                }
            }
            out.push_str(line.trim_end());
            out.push('\n');
        }
    }
}

/// Words on lines of at most `width` characters; a word that is longer is cut.
pub(super) fn wrap(text: &str, width: usize) -> Vec<String> {
    let width = if width < 8 { 8 } else { width };
    let (mut lines, mut line, mut used) = (Vec::new(), String::new(), 0);
    for word in text.split(' ').filter(|w| !w.is_empty()) {
        let mut rest: Vec<char> = word.chars().collect();
        if used > 0 && used + 1 + rest.len() > width {
            lines.push(std::mem::take(&mut line));
            used = 0;
        }
        while rest.len() > width {
            let tail = rest.split_off(width);
            lines.push(rest.into_iter().collect());
            rest = tail;
        }
        if used > 0 {
            line.push(' ');
            used += 1;
        }
        used += rest.len();
        line.extend(rest);
    }
    if used > 0 || lines.is_empty() {
        lines.push(line);
    }
    lines
}

/// A paragraph: `mark` before the first line, the others indented as far. Control characters are made visible.
pub(super) fn paragraph(out: &mut String, mark: &str, text: &str) {
    let indent = mark.chars().count();
    for (i, line) in wrap(&visible(text), WIDTH.saturating_sub(indent)).iter().enumerate() {
        if i == 0 {
            out.push_str(mark);
        } else {
            out.push_str(&" ".repeat(indent));
        }
        out.push_str(line);
        out.push('\n');
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn text_is_wrapped_at_words_and_long_words_are_cut() {
        assert_eq!(wrap("one two three", 8), ["one two", "three"]);
        assert_eq!(wrap("0123456789abcdef", 8), ["01234567", "89abcdef"]);
        assert_eq!(wrap("a 0123456789", 8), ["a", "01234567", "89"]);
        assert_eq!(wrap("", 8), [""]);
    }

    #[test]
    fn columns_stand_under_one_another() {
        let mut grid = Grid::new(12, 6);
        grid.row(vec![String::new(), "a".into(), "per year".into()]);
        grid.heading("Heading");
        grid.row(vec!["  a title that wraps".into(), "1 kg".into(), "10 kg".into()]);
        let mut out = String::new();
        grid.print(&mut out);
        assert_eq!(
            out,
            "                   a  per year\nHeading\n  a title\n    that\n    wraps       1 kg     10 kg\n"
        );
    }
}
