//! From bytes to records: the lines of a delimited text, cell by cell, whatever the size of the pieces that come in.
//!
//! RFC 4180 with the separator found elsewhere: a quoted cell may hold the separator, line ends and doubled quotes.
//! A quote that is never closed would swallow the rest of the file; here it is refused with the line on which it
//! stands, and reading goes on with the next line.

use super::Why;
use std::borrow::Cow;

/// The longest record, and the most line ends within quotes: more is a quote that nobody closed.
const LONGEST_RECORD: usize = 16 * 1024;
const MOST_LINES: u64 = 8;
/// After so many quotes that were never closed, quotes are taken as plain characters.
const MOST_OPEN_QUOTES: u32 = 100;
/// Pieces are taken in by so much at a time.
const PIECE: usize = 64 * 1024;

/// One line of the text, or what is wrong with it.
pub(super) struct Record<'r> {
    /// The number of its first line, from 1.
    pub(super) line: u64,
    bytes: &'r [u8],
    ends: &'r [u32],
    /// Whether the text ended before its line did.
    pub(super) unfinished: bool,
    /// Why it cannot be split into cells.
    pub(super) broken: Option<Why>,
}

impl<'r> Record<'r> {
    pub(super) const fn len(&self) -> usize {
        self.ends.len()
    }

    /// The bytes of a cell, without the white space around it; empty beyond the last cell.
    pub(super) fn cell(&self, place: usize) -> &'r [u8] {
        let from = match place.checked_sub(1) {
            None => 0,
            Some(before) => self.ends.get(before).copied().unwrap_or(u32::MAX) as usize,
        };
        let to = self.ends.get(place).copied().unwrap_or(0) as usize;
        self.bytes.get(from..to).unwrap_or_default().trim_ascii()
    }

    /// All bytes of all cells, for telling rows apart.
    pub(super) const fn all(&self) -> (&'r [u8], &'r [u32]) {
        (self.bytes, self.ends)
    }
}

/// Splits bytes into records, holding no more than one record and one piece.
pub(super) struct Splitter {
    separator: u8,
    held: Vec<u8>,
    line: u64,
    cells: Vec<u8>,
    ends: Vec<u32>,
    open_quotes: u32,
    skipping: bool,
}

/// How one attempt at a record ended.
enum Cut {
    /// A record up to this place, over so many lines.
    Whole { next: usize, lines: u64 },
    /// The bytes end first.
    More,
    /// The quotes do not fit.
    Broken(Why),
}

impl Splitter {
    pub(super) const fn new(separator: u8) -> Self {
        Self {
            separator,
            held: Vec::new(),
            line: 1,
            cells: Vec::new(),
            ends: Vec::new(),
            open_quotes: 0,
            skipping: false,
        }
    }

    /// Takes in bytes and hands each record that is complete to `each`.
    pub(super) fn feed(&mut self, bytes: &[u8], each: &mut dyn FnMut(&Record<'_>)) {
        for piece in bytes.chunks(PIECE) {
            self.held.extend_from_slice(piece);
            self.split(false, each);
        }
    }

    /// The text has ended: what is held is the last record.
    pub(super) fn finish(&mut self, each: &mut dyn FnMut(&Record<'_>)) {
        self.split(true, each);
    }

    fn split(&mut self, ended: bool, each: &mut dyn FnMut(&Record<'_>)) {
        let mut at = 0;
        loop {
            let rest = self.held.get(at..).unwrap_or_default();
            if rest.is_empty() {
                break;
            }
            if self.skipping {
                // What is left of a line that was too long.
                match rest.iter().position(|b| *b == b'\n') {
                    Some(end) => {
                        at += end + 1;
                        self.line += 1;
                        self.skipping = false;
                        continue;
                    }
                    None => {
                        at += rest.len();
                        break;
                    }
                }
            }
            self.cells.clear();
            self.ends.clear();
            let quotes = self.open_quotes < MOST_OPEN_QUOTES;
            let cut = cut(rest, self.separator, quotes, ended, &mut self.cells, &mut self.ends);
            let unfinished = ended && !rest.ends_with(b"\n") && !rest.ends_with(b"\r");
            let mut tell = |cells: &[u8], ends: &[u32], line, unfinished, broken| {
                each(&Record { line, bytes: cells, ends, unfinished, broken });
            };
            match cut {
                Cut::Whole { next, lines } => {
                    let last = next >= rest.len();
                    tell(&self.cells, &self.ends, self.line, unfinished && last, None);
                    at += next;
                    self.line += lines;
                }
                Cut::More => break,
                Cut::Broken(why) => {
                    if why != Why::LongLine {
                        self.open_quotes += 1;
                    }
                    tell(&self.cells, &[], self.line, false, Some(why));
                    // Reading goes on with the next line.
                    match rest.iter().position(|b| *b == b'\n') {
                        Some(end) => {
                            at += end + 1;
                            self.line += 1;
                        }
                        None => {
                            self.skipping = true;
                            at += rest.len();
                        }
                    }
                }
            }
        }
        self.held.drain(..at);
    }
}

fn cut(
    rest: &[u8],
    separator: u8,
    quotes: bool,
    ended: bool,
    cells: &mut Vec<u8>,
    ends: &mut Vec<u32>,
) -> Cut {
    let (mut at, mut lines) = (0, 0);
    let close = |cells: &[u8], ends: &mut Vec<u32>| ends.push(u32::try_from(cells.len()).unwrap_or(u32::MAX));
    loop {
        // At the start of a cell.
        let mut start = at;
        while quotes && rest.get(start) == Some(&b' ') {
            start += 1;
        }
        if quotes && rest.get(start) == Some(&b'"') {
            at = start + 1;
            loop {
                let Some(&b) = rest.get(at) else {
                    return if ended { Cut::Broken(Why::OpenQuote) } else { long(at, Why::OpenQuote) };
                };
                at += 1;
                if b == b'"' {
                    match rest.get(at) {
                        Some(b'"') => {
                            cells.push(b'"');
                            at += 1;
                        }
                        None if !ended => return Cut::More,
                        _ => break,
                    }
                } else {
                    if b == b'\n' {
                        lines += 1;
                    }
                    if lines > MOST_LINES || at > LONGEST_RECORD {
                        return Cut::Broken(Why::OpenQuote);
                    }
                    cells.push(b);
                }
            }
            while rest.get(at) == Some(&b' ') {
                at += 1;
            }
        } else {
            let from = at;
            while let Some(&b) = rest.get(at) {
                if b == separator || b == b'\n' || b == b'\r' {
                    break;
                }
                at += 1;
            }
            if at > LONGEST_RECORD {
                return Cut::Broken(Why::LongLine);
            }
            cells.extend_from_slice(rest.get(from..at).unwrap_or_default());
        }
        match rest.get(at) {
            Some(&b) if b == separator => {
                close(cells, ends);
                at += 1;
            }
            Some(b'\n') => {
                close(cells, ends);
                return Cut::Whole { next: at + 1, lines: lines + 1 };
            }
            Some(b'\r') => match rest.get(at + 1) {
                None if !ended => return long(at, Why::LongLine),
                Some(b'\n') => {
                    close(cells, ends);
                    return Cut::Whole { next: at + 2, lines: lines + 1 };
                }
                _ => {
                    close(cells, ends);
                    return Cut::Whole { next: at + 1, lines: lines + 1 };
                }
            },
            Some(_) => return Cut::Broken(Why::StrayQuote),
            None if ended => {
                close(cells, ends);
                return Cut::Whole { next: at, lines: lines + 1 };
            }
            None => return long(at, Why::LongLine),
        }
    }
}

/// More bytes are needed, unless the record is too long already.
const fn long(length: usize, why: Why) -> Cut {
    if length > LONGEST_RECORD { Cut::Broken(why) } else { Cut::More }
}

/// The characters of Windows-1252 from 0x80 to 0x9F; the five that it leaves free stand for themselves.
const WINDOWS: [char; 32] = [
    '€', '\u{81}', '‚', 'ƒ', '„', '…', '†', '‡', 'ˆ', '‰', 'Š', '‹', 'Œ', '\u{8d}', 'Ž', '\u{8f}', '\u{90}',
    '‘', '’', '“', '”', '•', '–', '—', '˜', '™', 'š', '›', 'œ', '\u{9d}', 'ž', 'Ÿ',
];

/// A cell as text: UTF-8, or Windows-1252 where it is not (WHATWG Encoding Standard, index windows-1252). The second
/// value says that it was the latter.
pub(super) fn decoded(cell: &[u8]) -> (Cow<'_, str>, bool) {
    match std::str::from_utf8(cell) {
        Ok(text) => (Cow::Borrowed(text), false),
        Err(_) => {
            let text = cell.iter().map(|&b| match b {
                0x80..=0x9f => WINDOWS.get(usize::from(b - 0x80)).copied().unwrap_or('\u{fffd}'),
                _ => char::from(b),
            });
            (Cow::Owned(text.collect()), true)
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    type Line = (u64, Vec<String>, Option<Why>, bool);

    fn records(text: &[u8], piece: usize) -> Vec<Line> {
        let mut splitter = Splitter::new(b';');
        let mut out = Vec::new();
        let mut each = |r: &Record<'_>| {
            let cells = (0..r.len()).map(|i| decoded(r.cell(i)).0.into_owned()).collect();
            out.push((r.line, cells, r.broken, r.unfinished));
        };
        for piece in text.chunks(piece) {
            splitter.feed(piece, &mut each);
        }
        splitter.finish(&mut each);
        out
    }

    #[test]
    fn any_size_of_piece_gives_the_same_records() {
        let text = b"a;b\r\n1;\"x;\"\"y\r\nz\"\r\n\r\n2; \"q\" \n3;\"open\n4;d\r5;\"st\"ray\n6;\xe4\xf6";
        let whole = records(text, text.len());
        for piece in 1..text.len() {
            assert_eq!(records(text, piece), whole, "{piece}");
        }
        let seen: Vec<(u64, Vec<&str>, Option<Why>, bool)> =
            whole.iter().map(|(l, c, w, u)| (*l, c.iter().map(String::as_str).collect(), *w, *u)).collect();
        assert_eq!(
            seen,
            [
                (1, vec!["a", "b"], None, false),
                (2, vec!["1", "x;\"y\r\nz"], None, false),
                (4, vec![""], None, false),
                (5, vec!["2", "q"], None, false),
                (6, vec![], Some(Why::StrayQuote), false),
                (7, vec!["4", "d"], None, false),
                (8, vec![], Some(Why::StrayQuote), false),
                (9, vec!["6", "äö"], None, true),
            ]
        );
    }

    #[test]
    fn a_quote_that_nobody_closes_costs_one_line() {
        let mut text = b"1;\"never\n".to_vec();
        for i in 0..50 {
            text.extend(format!("{i};x\n").bytes());
        }
        let all = records(&text, 7);
        assert_eq!(all[0].2, Some(Why::OpenQuote));
        assert_eq!(all.len(), 51);
        assert_eq!(all[50], (51, vec!["49".into(), "x".into()], None, false));
    }

    #[test]
    fn a_line_without_end_is_refused_and_memory_stays_small() {
        let mut splitter = Splitter::new(b',');
        let mut seen = Vec::new();
        for _ in 0..200 {
            splitter.feed(&[b'x'; 10_000], &mut |r| seen.push((r.line, r.broken)));
            assert!(splitter.held.len() <= LONGEST_RECORD + PIECE);
        }
        splitter.feed(b"\n1,2\n", &mut |r| seen.push((r.line, r.broken)));
        assert_eq!(seen, [(1, Some(Why::LongLine)), (2, None)]);
    }

    #[test]
    fn windows_1252_is_read_where_utf_8_is_not() {
        assert_eq!(decoded(b"\x80 \x96 \xb5L"), (Cow::Owned("€ – µL".to_owned()), true));
        assert_eq!(decoded("Äther".as_bytes()), (Cow::Borrowed("Äther"), false));
    }
}
