//! Currencies, by the three letters of ISO 4217. No rate of exchange is known here.

/// A currency code of three capital letters. It is not checked against the list of codes in force.
///
/// ```
/// use thimbleworth::quantity::Currency;
/// assert_eq!(Currency::new("EUR").map(|c| c.to_string()), Some("EUR".to_owned()));
/// assert_eq!(Currency::new("eur"), None);
/// ```
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub struct Currency([u8; 3]);

impl Currency {
    /// The currency of that code; `None` when it is not three capital letters.
    #[must_use]
    pub fn new(code: &str) -> Option<Self> {
        let letters: [u8; 3] = code.as_bytes().try_into().ok()?;
        letters.iter().all(u8::is_ascii_uppercase).then_some(Self(letters))
    }

    /// The currency that a text names: a code, or one of the signs that stand for one currency only.
    pub(super) fn named(text: &str) -> Option<Self> {
        match text {
            "€" => Some(Self(*b"EUR")),
            "£" => Some(Self(*b"GBP")),
            "US$" => Some(Self(*b"USD")),
            code => Self::new(code),
        }
    }

    /// The code.
    #[must_use]
    pub fn code(&self) -> &str {
        std::str::from_utf8(&self.0).unwrap_or("")
    }
}

impl std::fmt::Display for Currency {
    fn fmt(&self, f: &mut std::fmt::Formatter<'_>) -> std::fmt::Result {
        f.write_str(self.code())
    }
}
