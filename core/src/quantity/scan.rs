//! A text seen as characters, with a place in it.

/// The text and the place reached.
#[derive(Clone, Debug)]
pub(super) struct Scan {
    characters: Vec<char>,
    pub(super) at: usize,
}

impl Scan {
    pub(super) fn new(text: &str) -> Self {
        Self { characters: text.chars().collect(), at: 0 }
    }

    /// The character `ahead` places further on.
    pub(super) fn peek(&self, ahead: usize) -> Option<char> {
        self.characters.get(self.at.saturating_add(ahead)).copied()
    }

    /// The character before this place.
    pub(super) fn before(&self) -> Option<char> {
        self.at.checked_sub(1).and_then(|at| self.characters.get(at)).copied()
    }

    pub(super) fn at_end(&self) -> bool {
        self.at >= self.characters.len()
    }

    pub(super) fn digit(&self, ahead: usize) -> bool {
        self.peek(ahead).is_some_and(|c| c.is_ascii_digit())
    }

    pub(super) fn step(&mut self, places: usize) {
        self.at = self.at.saturating_add(places);
    }

    pub(super) fn skip_spaces(&mut self) {
        while self.peek(0).is_some_and(is_space) {
            self.step(1);
        }
    }

    /// How many spaces stand from `ahead` on.
    pub(super) fn spaces(&self, ahead: usize) -> usize {
        let mut count = 0;
        while self.peek(ahead + count).is_some_and(is_space) {
            count += 1;
        }
        count
    }

    /// Whether this text stands here.
    pub(super) fn sees(&self, text: &str) -> bool {
        text.chars().enumerate().all(|(ahead, c)| self.peek(ahead) == Some(c))
    }

    /// The next few characters.
    pub(super) fn characters(&self, count: usize) -> String {
        self.characters.iter().skip(self.at).take(count).collect()
    }

    /// What stands from `from` up to this place, without spaces at either end.
    pub(super) fn since(&self, from: usize) -> String {
        let text: String = self.characters.iter().skip(from).take(self.at.saturating_sub(from)).collect();
        text.trim().to_owned()
    }

    /// What stands from this place to the end.
    pub(super) fn rest(&self) -> String {
        let text: String = self.characters.iter().skip(self.at).collect();
        text.trim().to_owned()
    }
}

/// Spaces as people and word processors write them, the narrow and the unbreakable ones included.
pub(super) fn is_space(c: char) -> bool {
    c.is_whitespace() || c == '\u{2060}' || c == '\u{feff}'
}

pub(super) const fn is_minus(c: char) -> bool {
    // Hyphen-minus, minus sign, and the non-breaking hyphen.
    matches!(c, '-' | '\u{2212}' | '\u{2011}')
}
