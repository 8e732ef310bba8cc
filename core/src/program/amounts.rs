//! Amounts read once for a whole plan: a plan of many workloads writes the same few texts again and again.

use crate::order::Index;
use crate::quantity::{Amount, AmountError, Entry, Kind, read_entry};

/// The most texts that are kept.
const MOST: usize = 4096;

/// What has been read so far.
#[derive(Default)]
pub(super) struct Amounts {
    known: Vec<(Kind, Index<'static>)>,
    amounts: Vec<Amount>,
}

impl Amounts {
    /// As [`crate::quantity::read_entry`].
    pub(super) fn entry(&mut self, text: &str, kind: Kind) -> Result<Entry, AmountError> {
        let known = self.known.iter_mut().find(|(of, _)| *of == kind);
        if let Some(amount) = known.as_ref().and_then(|(_, texts)| self.amounts.get(texts.get(text)?)) {
            return Ok(Entry::Known(amount.clone()));
        }
        let entry = read_entry(text, kind)?;
        if let (Entry::Known(amount), true) = (&entry, self.amounts.len() < MOST) {
            let place = self.amounts.len();
            self.amounts.push(amount.clone());
            match known {
                Some((_, texts)) => {
                    texts.put(text.to_owned(), place);
                }
                None => {
                    let mut texts = Index::default();
                    texts.put(text.to_owned(), place);
                    self.known.push((kind, texts));
                }
            }
        }
        Ok(entry)
    }

    /// As [`crate::quantity::read`].
    pub(super) fn read(&mut self, text: &str, kind: Kind) -> Result<Amount, AmountError> {
        match self.entry(text, kind)? {
            Entry::Known(amount) => Ok(amount),
            Entry::NotKnown => Err(AmountError::NotKnown { kind }),
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::quantity::read;

    #[test]
    fn what_is_kept_is_what_would_be_read() {
        let mut amounts = Amounts::default();
        for text in ["5 %", "5 % w/w", "not known", "", "5", "250 mL", "-1 %"] {
            for kind in [Kind::Fraction, Kind::Volume, Kind::Number] {
                for _ in 0..2 {
                    assert_eq!(amounts.read(text, kind), read(text, kind), "{text}");
                    assert_eq!(amounts.entry(text, kind), read_entry(text, kind), "{text}");
                }
            }
        }
        assert!(amounts.amounts.len() > 3);
    }
}
