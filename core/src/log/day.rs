//! Calendar days as people and programs write them.

use super::{Change, Why};
use crate::letter::{is_letter, small_text};

/// A day of the Gregorian calendar between 1990 and 2099; ordered as time goes.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub struct Day {
    /// The year.
    pub year: u16,
    /// The month, 1 to 12.
    pub month: u8,
    /// The day of the month.
    pub day: u8,
}

/// Which of two numbers is the day where a date is written with strokes, `5/6/2026`.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub enum DayOrder {
    /// Not known: an ambiguous date is refused with a question.
    #[default]
    Ask,
    /// Day, month, year.
    DayFirst,
    /// Month, day, year.
    MonthFirst,
}

impl DayOrder {
    /// The words in a plan, in the order of the variants.
    pub const WORDS: [&'static str; 3] = ["ask", "day first", "month first"];

    /// The order of this word.
    #[must_use]
    pub fn named(word: &str) -> Option<Self> {
        [Self::Ask, Self::DayFirst, Self::MonthFirst].into_iter().find(|order| order.word() == word)
    }

    /// Its word.
    #[must_use]
    pub const fn word(self) -> &'static str {
        Self::WORDS[self as usize]
    }
}

impl Day {
    /// The day, where the calendar has it.
    ///
    /// ```
    /// use thimbleworth::log::Day;
    /// assert!(Day::new(2028, 2, 29).is_some());
    /// assert!(Day::new(2026, 2, 29).is_none());
    /// ```
    #[must_use]
    pub const fn new(year: u16, month: u8, day: u8) -> Option<Self> {
        let leap = year.is_multiple_of(4); // 2000 is one, and 2100 is out of range
        let last = match month {
            2 => 28 + leap as u8,
            4 | 6 | 9 | 11 => 30,
            1..=12 => 31,
            _ => return None,
        };
        if year < 1990 || year > 2099 || day < 1 || day > last {
            return None;
        }
        Some(Self { year, month, day })
    }

    /// Months since the year 0: the same for every day of a month.
    #[must_use]
    pub const fn month_index(self) -> u16 {
        self.year * 12 + self.month as u16 - 1
    }

    /// Days since 1 January 1990.
    ///
    /// ```
    /// use thimbleworth::log::Day;
    /// let day = |y, m, d| Day::new(y, m, d).unwrap().number();
    /// assert_eq!(day(2027, 1, 1) - day(2026, 1, 1), 365);
    /// assert_eq!(day(2028, 3, 1) - day(2028, 2, 1), 29);
    /// ```
    #[must_use]
    pub const fn number(self) -> u32 {
        const BEFORE: [u16; 12] = [0, 31, 59, 90, 120, 151, 181, 212, 243, 273, 304, 334];
        let years = self.year as u32 - 1990;
        // Leap years since 1990: 1992, 1996 ...
        let leaps = (years + 1) / 4 + (self.year.is_multiple_of(4) && self.month > 2) as u32;
        years * 365 + leaps + BEFORE[self.month as usize - 1] as u32 + self.day as u32 - 1
    }
}

/// The day that a spreadsheet counts as this number: days since 30 December 1899 (the 1900 date system from March
/// 1900 on), between 2000 and 2099.
fn of_serial(serial: u32) -> Option<Day> {
    // 1 January 2000 is 36526; 1 January 2100 would be 73051.
    let mut left = serial.checked_sub(36_526)?;
    let mut year = 2000_u16;
    loop {
        let long = if year.is_multiple_of(4) { 366 } else { 365 };
        if left < long {
            break;
        }
        left -= long;
        year += 1;
    }
    let mut month = 1;
    loop {
        let first = Day::new(year, month, 1)?.number();
        let next = if month == 12 { first + 31 } else { Day::new(year, month + 1, 1)?.number() };
        if left < next - first {
            return Day::new(year, month, u8::try_from(left + 1).ok()?);
        }
        left -= next - first;
        month += 1;
    }
}

/// Names of months by their first letters, English and German.
const MONTHS: [&[&str]; 12] = [
    &["jan", "jän"],
    &["feb"],
    &["mar", "mär", "mrz"],
    &["apr"],
    &["may", "mai"],
    &["jun"],
    &["jul"],
    &["aug"],
    &["sep"],
    &["oct", "okt"],
    &["nov"],
    &["dec", "dez"],
];

/// One part of a date: a number with its count of digits, or a month by name.
#[derive(Clone, Copy)]
enum Part {
    Number(u32, u8),
    Month(u8),
}

/// Reads a date. A time of day after it is left out.
///
/// ISO 8601 `2026-01-05`, `2026-01-05T09:30`, `20260105`; `2026/01/05`, `2026.1.5`; with points day first, `5.1.2026`
/// (common practice where points are used, no source); with strokes or hyphens as `order` says, or by itself where one
/// number is above 12; with the month's name in English or German; a spreadsheet's day number.
///
/// # Errors
/// [`Why`] the cell is no date, or which question it leaves open.
pub(super) fn day(text: &str, order: DayOrder) -> Result<(Day, Option<Change>), Why> {
    if let Some(day) = iso(text.as_bytes()) {
        return Ok((day, None));
    }
    let (mut parts, mut count, mut mark) = ([Part::Number(0, 0); 3], 0, ' ');
    let mut rest = text.trim();
    while count < 3 && !rest.is_empty() {
        let digits = rest.bytes().take_while(u8::is_ascii_digit).count();
        let part = if digits > 0 {
            let number = rest.get(..digits).and_then(|d| d.parse().ok()).ok_or(Why::NotADate)?;
            rest = rest.get(digits..).unwrap_or_default();
            Part::Number(number, u8::try_from(digits).unwrap_or(u8::MAX))
        } else {
            let letters: usize = rest.chars().take_while(|c| is_letter(*c)).map(char::len_utf8).sum();
            let name = small_text(rest.get(..letters).unwrap_or_default());
            let month = MONTHS.iter().position(|names| names.iter().any(|n| name.starts_with(n)));
            rest = rest.get(letters..).unwrap_or_default();
            Part::Month(u8::try_from(month.ok_or(Why::NotADate)? + 1).unwrap_or(0))
        };
        if let Some(slot) = parts.get_mut(count) {
            *slot = part;
        }
        count += 1;
        if count < 3 {
            let marks = rest.trim_start_matches([' ', '.', '/', '-', ',', '\u{a0}']);
            let between = rest.get(..rest.len() - marks.len()).unwrap_or_default();
            mark = between.chars().find(|c| !matches!(c, ' ' | '\u{a0}')).unwrap_or(mark);
            rest = marks;
        }
    }
    let time = rest.starts_with([' ', 'T', ',']) || rest.is_empty();
    if !time
        || rest
            .chars()
            .any(|c| !(c.is_ascii_alphanumeric() || matches!(c, ' ' | ':' | '.' | ',' | '+' | '-')))
    {
        return Err(Why::NotADate);
    }
    use Part::{Month, Number};
    let mut change = None;
    let mut full = |year: u32, digits: u8| match digits {
        4 => year,
        _ => {
            change = Some(Change::TwoDigitYear);
            2000 + year
        }
    };
    let (year, month, day) = match (count, parts) {
        (1, [Number(serial, 5), ..]) => {
            return of_serial(serial).map(|day| (day, Some(Change::DayNumber))).ok_or(Why::NotADate);
        }
        (1, [Number(all, 8), ..]) => (all / 10_000, all / 100 % 100, all % 100),
        (3, [Number(y, 4), Number(m, _), Number(d, _)]) => (y, m, d),
        (3, [Number(d, 1 | 2), Month(m), Number(y, n @ (2 | 4))]) => (full(y, n), u32::from(m), d),
        (3, [Month(m), Number(d, 1 | 2), Number(y, 4)]) => (y, u32::from(m), d),
        (3, [Number(y, 4), Month(m), Number(d, _)]) => (y, u32::from(m), d),
        (3, [Number(a, 1 | 2), Number(b, 1 | 2), Number(y, n @ (2 | 4))]) => {
            let year = full(y, n);
            match (order, mark) {
                (_, '.') => (year, b, a),
                _ if a > 12 && n == 4 => (year, b, a),
                _ if b > 12 && n == 4 => (year, a, b),
                (DayOrder::DayFirst, _) => (year, b, a),
                (DayOrder::MonthFirst, _) => (year, a, b),
                _ if a == b && n == 4 => (year, a, b),
                (DayOrder::Ask, _) => return Err(Why::DayOrMonth),
            }
        }
        _ => return Err(Why::NotADate),
    };
    let small = |n: u32| u8::try_from(n).unwrap_or(0);
    match Day::new(u16::try_from(year).unwrap_or(0), small(month), small(day)) {
        Some(day) => Ok((day, change)),
        None => Err(Why::NoSuchDay),
    }
}

/// `2026-01-05` and nothing else, the form that most files hold.
fn iso(text: &[u8]) -> Option<Day> {
    let &[y1, y2, y3, y4, b'-', m1, m2, b'-', d1, d2] = text else { return None };
    let digit = |b: u8| b.is_ascii_digit().then(|| b - b'0');
    let two = |a: u8, b: u8| Some(digit(a)? * 10 + digit(b)?);
    Day::new(u16::from(two(y1, y2)?) * 100 + u16::from(two(y3, y4)?), two(m1, m2)?, two(d1, d2)?)
}

/// What a date with strokes says of the order, where it is plain.
pub(super) fn order_of(text: &str) -> Option<DayOrder> {
    let mut parts = text.trim().split(['/', '-']);
    let (a, b, rest) = (parts.next()?.parse::<u8>().ok()?, parts.next()?.parse::<u8>().ok()?, parts.next()?);
    let year = rest.bytes().take_while(u8::is_ascii_digit).count() == 4;
    match (year, a, b) {
        (true, 13..=31, 1..=12) => Some(DayOrder::DayFirst),
        (true, 1..=12, 13..=31) => Some(DayOrder::MonthFirst),
        _ => None,
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn one_day_in_many_forms() {
        let expected = Day::new(2026, 6, 5).unwrap();
        for text in [
            "2026-06-05",
            "2026-06-05T09:30:00Z",
            "2026-06-05 09:30",
            "20260605",
            "2026/06/05",
            "2026.6.5",
            "5.6.2026",
            "05.06.2026 09:30",
            "5 June 2026",
            "5-Jun-2026",
            "05 JUN 2026",
            "June 5, 2026",
            "5. Juni 2026",
            "2026 Jun 05",
        ] {
            assert_eq!(day(text, DayOrder::Ask), Ok((expected, None)), "{text}");
        }
        assert_eq!(day("05/06/2026", DayOrder::DayFirst), Ok((expected, None)));
        assert_eq!(day("06/05/2026", DayOrder::MonthFirst), Ok((expected, None)));
        assert_eq!(day("5.6.26", DayOrder::Ask), Ok((expected, Some(Change::TwoDigitYear))));
        // 5 June 2026 is 46178 in the 1900 date system (LibreOffice Calc and the date arithmetic of Python agree).
        assert_eq!(day("46178", DayOrder::Ask), Ok((expected, Some(Change::DayNumber))));
    }

    #[test]
    fn what_is_open_is_asked_and_what_is_plain_is_not() {
        assert_eq!(day("05/06/2026", DayOrder::Ask), Err(Why::DayOrMonth));
        assert_eq!(day("05-06-26", DayOrder::Ask), Err(Why::DayOrMonth));
        let thirteenth = Day::new(2026, 6, 13).unwrap();
        for text in ["13/06/2026", "06/13/2026"] {
            assert_eq!(day(text, DayOrder::Ask), Ok((thirteenth, None)));
            assert_eq!(day(text, DayOrder::DayFirst), Ok((thirteenth, None)), "plain stays plain");
        }
        assert_eq!(day("06/06/2026", DayOrder::Ask).unwrap().0, Day::new(2026, 6, 6).unwrap());
        assert_eq!(order_of("13/06/2026"), Some(DayOrder::DayFirst));
        assert_eq!(order_of("06/13/2026 10:00"), Some(DayOrder::MonthFirst));
        assert_eq!((order_of("06/05/2026"), order_of("2026-06-13")), (None, None));
    }

    #[test]
    fn days_that_are_none() {
        for text in ["2026-02-29", "31.4.2026", "2026-13-01", "0.1.2026", "1.1.1889", "2026-00-10"] {
            assert_eq!(day(text, DayOrder::Ask), Err(Why::NoSuchDay), "{text}");
        }
        for text in
            ["", "soon", "=TODAY()", "12", "5.6.", "1/2/3/4", "2026-06-05<script>", "😀", "46178,5", "99999"]
        {
            assert_eq!(day(text, DayOrder::Ask), Err(Why::NotADate), "{text}");
        }
        assert!(day("2028-02-29", DayOrder::Ask).is_ok());
    }

    #[test]
    fn numbers_of_days_follow_one_another() {
        let mut expected = 0;
        for year in 1990..=2099 {
            for month in 1..=12 {
                for d in 1..=31 {
                    if let Some(day) = Day::new(year, month, d) {
                        assert_eq!(day.number(), expected);
                        if year >= 2000 {
                            assert_eq!(of_serial(36_526 + expected - 3652), Some(day));
                        }
                        expected += 1;
                    }
                }
            }
        }
        // Days of 110 years with 27 leap years among them (1992 to 2096).
        assert_eq!(expected, 110 * 365 + 27);
    }
}
