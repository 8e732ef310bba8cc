//! Calendar days, by which limits are chosen. The core has no clock: the plan carries its date.
use std::fmt;

/// A calendar day.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub struct Day {
    year: u16,
    month: u8,
    day: u8,
}

/// A text that is no calendar day.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct DayError {
    /// The text, cut after 40 characters.
    pub text: String,
}

impl fmt::Display for DayError {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        write!(f, "\"{}\" is no calendar day; write it as 2026-12-01", self.text)
    }
}

impl std::error::Error for DayError {}

impl Day {
    /// Reads `YYYY-MM-DD`.
    ///
    /// # Errors
    /// [`DayError`].
    ///
    /// ```
    /// use thimbleworth::room::Day;
    /// assert!(Day::parse("2027-02-08")? > Day::parse("2026-12-01")?);
    /// assert!(Day::parse("2027-02-29").is_err());
    /// # Ok::<(), thimbleworth::room::DayError>(())
    /// ```
    pub fn parse(text: &str) -> Result<Self, DayError> {
        let fault = || DayError { text: text.chars().take(40).collect() };
        let digits = |part: &str, width: usize| {
            let sound = part.len() == width && part.bytes().all(|b| b.is_ascii_digit());
            if sound { part.parse::<u16>().ok() } else { None }
        };
        let mut parts = text.split('-');
        let (Some(y), Some(m), Some(d), None) = (parts.next(), parts.next(), parts.next(), parts.next())
        else {
            return Err(fault());
        };
        let (Some(year), Some(month), Some(day)) = (digits(y, 4), digits(m, 2), digits(d, 2)) else {
            return Err(fault());
        };
        let leap = year % 4 == 0 && (year % 100 != 0 || year % 400 == 0);
        let length = match month {
            2 if leap => 29,
            2 => 28,
            4 | 6 | 9 | 11 => 30,
            1..=12 => 31,
            _ => return Err(fault()),
        };
        if !(1..=length).contains(&day) {
            return Err(fault());
        }
        match (u8::try_from(month), u8::try_from(day)) {
            (Ok(month), Ok(day)) => Ok(Self { year, month, day }),
            _ => Err(fault()),
        }
    }
}

impl fmt::Display for Day {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        write!(f, "{:04}-{:02}-{:02}", self.year, self.month, self.day)
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn days_are_days() {
        for good in ["2024-02-29", "2000-02-29", "2026-12-31"] {
            assert_eq!(Day::parse(good).unwrap().to_string(), good);
        }
        for bad in [
            "2023-02-29",
            "1900-02-29",
            "2026-13-01",
            "2026-00-10",
            "2026-04-31",
            "2026-1-1",
            "",
            "2026-12-01-1",
        ] {
            assert!(Day::parse(bad).is_err(), "{bad}");
        }
    }
}
