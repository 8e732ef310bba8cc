//! A year of 365 days, the first of January as day 0.

/// Days of each month.
pub const MONTHS: [u16; 12] = [31, 28, 31, 30, 31, 30, 31, 31, 30, 31, 30, 31];
/// Their names, short.
pub const MONTH_NAMES: [&str; 12] =
    ["Jan", "Feb", "Mar", "Apr", "May", "Jun", "Jul", "Aug", "Sep", "Oct", "Nov", "Dec"];

/// The month, counted from 0, in which a day lies, and the day of the month counted from 1.
///
/// ```
/// use thimbleworth::generator::month_of;
/// assert_eq!((month_of(0), month_of(31), month_of(364)), ((0, 1), (1, 1), (11, 31)));
/// ```
#[must_use]
pub fn month_of(day: u16) -> (usize, u16) {
    let mut left = day % 365;
    for (m, days) in MONTHS.into_iter().enumerate() {
        if left < days {
            return (m, left + 1);
        }
        left -= days;
    }
    (11, 31)
}

/// A day as a date without its year: `31 Mar`.
///
/// ```
/// assert_eq!(thimbleworth::generator::date_of(89), "31 Mar");
/// ```
#[must_use]
pub fn date_of(day: u16) -> String {
    let (m, d) = month_of(day);
    let mut out = d.to_string();
    out.push(' ');
    out.push_str(MONTH_NAMES.get(m).copied().unwrap_or_default());
    out
}
