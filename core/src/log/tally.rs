//! Sums over the rows of a file. Each says on how many rows it stands.

use super::places::{Places, hash, mixed};
use super::{Day, NONE, Reading};
use std::collections::BTreeMap;

/// Rows that are compared with one another, and containers that get a sum of their own.
const MOST_COMPARED: usize = 4_000_000;
const MOST_CONTAINERS: usize = 20_000;
/// Batches kept before equal ones are dropped.
const MOST_BATCHES: usize = 1_000_000;

/// A sum of amounts.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub struct Sum {
    /// The rows it stands on.
    pub rows: u64,
    /// How many of them are negative: corrections, credits.
    pub negative: u64,
    /// Mass; kg.
    pub kg: f64,
    /// Volume of what has no density here, which is in no mass; m³.
    pub m3: f64,
    /// How many rows that volume stands on.
    pub rows_by_volume: u64,
}

impl Sum {
    fn add(&mut self, kg: f64, m3: Option<f64>) {
        self.rows += 1;
        match m3 {
            Some(m3) => {
                self.m3 += m3;
                self.rows_by_volume += 1;
                self.negative += u64::from(m3 < 0.0);
            }
            None => {
                self.kg += kg;
                self.negative += u64::from(kg < 0.0);
            }
        }
    }

    /// Both sums together.
    pub fn join(&mut self, other: &Self) {
        self.rows += other.rows;
        self.negative += other.negative;
        self.kg += other.kg;
        self.m3 += other.m3;
        self.rows_by_volume += other.rows_by_volume;
    }
}

/// Extractions of a route.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub struct Done {
    /// The rows they stand on.
    pub rows: u64,
    /// Extractions, controls and repeats among them.
    pub extractions: f64,
    /// Blanks and other controls.
    pub controls: f64,
    /// What was done again.
    pub repeats: f64,
    /// Batches, by their numbers; 0 where the log has none.
    pub batches: u64,
}

/// To what something is added up: indices of [`Names`](super::Names), or [`NONE`]. In the order of its fields.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub struct Key {
    /// Months since the year 0.
    pub month: u16,
    /// The day of the month where it matters, as for stock; 0 elsewhere.
    pub day: u8,
    /// The material; in a preparation log the route.
    pub material: u16,
    /// The stream.
    pub stream: u16,
}

impl Key {
    /// The day of a stock count.
    #[must_use]
    pub fn date(&self) -> Option<Day> {
        Day::new(self.month / 12, u8::try_from(self.month % 12).ok()? + 1, self.day)
    }

    /// A number in the order of keys.
    const fn packed(self) -> u64 {
        (self.month as u64) << 40
            | (self.day as u64) << 32
            | (self.material as u64) << 16
            | self.stream as u64
    }
}

/// Sums by key, in the order of the keys once the file has ended.
#[derive(Clone, Debug)]
struct Keyed<V> {
    places: Places,
    rows: Vec<(Key, V)>,
}

impl<V> Default for Keyed<V> {
    fn default() -> Self {
        Self { places: Places::default(), rows: Vec::new() }
    }
}

impl<V: Copy + Default> Keyed<V> {
    fn at(&mut self, key: Key) -> &mut V {
        // No two keys have one hash.
        let hash = mixed(key.packed());
        let at = self.places.find(hash, &|_| true).unwrap_or_else(|| {
            self.rows.push((key, V::default()));
            self.places.add(hash)
        });
        &mut self.rows[at].1
    }

    fn in_order(self) -> Vec<(Key, V)> {
        let mut order: Vec<(u64, u32)> = Vec::with_capacity(self.rows.len());
        for (key, _) in &self.rows {
            order.push((key.packed(), u32::try_from(order.len()).unwrap_or(0)));
        }
        order.sort_unstable();
        let mut out = Vec::with_capacity(order.len());
        for (_, at) in order {
            out.extend(self.rows.get(at as usize).copied());
        }
        out
    }
}

/// The sums of all files of a register put together under other keys; the register stands in the place of the day.
pub(crate) fn rolled(readings: &[Reading], other: fn(&Key) -> (u16, u16, u16)) -> Vec<(Key, Sum)> {
    let mut out = Keyed::<Sum>::default();
    for r in readings {
        for (key, sum) in &r.tally.sums {
            let (month, material, stream) = other(key);
            out.at(Key { month, day: r.mapping.register as u8, material, stream }).join(sum);
        }
    }
    out.in_order()
}

/// The sums of one file.
#[derive(Clone, Debug, Default)]
pub struct Tally {
    /// Amounts by month, material and stream.
    pub sums: Vec<(Key, Sum)>,
    /// What stood on the shelf, by day and material.
    pub stock: Vec<(Key, Sum)>,
    /// Amounts by container, in the order in which the file names them.
    pub containers: Vec<(String, Sum)>,
    /// Whether there were more containers than get a sum.
    pub more_containers: bool,
    /// Extractions by month and route.
    pub done: Vec<(Key, Done)>,
    /// The first and the last day.
    pub days: Option<(Day, Day)>,
    /// Months with refused rows, in order once the file has ended.
    pub refused: Vec<u16>,
    /// Refused rows of which no month is known.
    pub undated: u64,
    /// Rows that were compared with one another.
    pub compared: u64,
    amounts: Keyed<Sum>,
    shelves: Keyed<Sum>,
    extractions: Keyed<Done>,
    container_places: Places,
    seen: Vec<(u64, u32)>,
    /// The hash of a batch; its route and month in one number.
    batches: Vec<(u64, u32)>,
}

impl Tally {
    pub(super) fn day(&mut self, day: Day) {
        self.days = Some(match self.days {
            None => (day, day),
            Some((first, last)) => {
                (if day < first { day } else { first }, if day > last { day } else { last })
            }
        });
    }

    /// A row of this month is refused.
    pub(super) fn refuse(&mut self, month: u16) {
        // Days of a hundred years have few months.
        if !self.refused.contains(&month) {
            self.refused.push(month);
        }
    }

    pub(super) fn amount(&mut self, key: Key, kg: f64, m3: Option<f64>) {
        self.amounts.at(key).add(kg, m3);
    }

    pub(super) fn shelf(&mut self, key: Key, kg: f64, m3: Option<f64>) {
        self.shelves.at(key).add(kg, m3);
    }

    pub(super) fn container(&mut self, name: &str, kg: f64, m3: Option<f64>) {
        let hash = hash(name.as_bytes(), &[]);
        let same = |at: usize| self.containers.get(at).is_some_and(|(known, _)| known == name);
        let at = self.container_places.find(hash, &same).or_else(|| {
            (self.containers.len() < MOST_CONTAINERS).then(|| {
                self.containers.push((name.to_owned(), Sum::default()));
                self.container_places.add(hash)
            })
        });
        match at.and_then(|at| self.containers.get_mut(at)) {
            Some((_, sum)) => sum.add(kg, m3),
            None => self.more_containers = true,
        }
    }

    pub(super) fn extraction(&mut self, month: u16, route: u16, runs: f64, control: bool, repeat: bool) {
        let done = self.extractions.at(of_route(month, route));
        done.rows += 1;
        done.extractions += runs;
        if control {
            done.controls += runs;
        }
        if repeat {
            done.repeats += runs;
        }
    }

    pub(super) fn batch(&mut self, name: &[u8], month: u16, route: u16) {
        let batch = (hash(name, &[]), u32::from(route) << 16 | u32::from(month));
        // The rows of a batch stand together as a rule.
        if self.batches.last() != Some(&batch) {
            self.batches.push(batch);
            if self.batches.len() >= MOST_BATCHES {
                self.batches.sort_unstable();
                self.batches.dedup();
            }
        }
    }

    /// Keeps a row for the search for equal ones.
    pub(super) fn compare(&mut self, cells: &[u8], ends: &[u32], line: u64) {
        if self.seen.len() < MOST_COMPARED {
            self.seen.push((hash(cells, ends), u32::try_from(line).unwrap_or(u32::MAX)));
        }
    }

    /// Counts batches, puts sums in order and finds equal rows, told as the line and the earlier line that it repeats.
    pub(super) fn close(&mut self, each: &mut dyn FnMut(u32, u32)) {
        let mut batches = std::mem::take(&mut self.batches);
        batches.sort_unstable();
        // A batch that runs over the end of a month counts in the month in which it began.
        let mut before = None;
        for (name, at) in batches {
            if before != Some((name, at >> 16)) {
                before = Some((name, at >> 16));
                self.extractions.at(of_route(at as u16, (at >> 16) as u16)).batches += 1;
            }
        }
        self.refused.sort_unstable();
        self.sums = std::mem::take(&mut self.amounts).in_order();
        self.stock = std::mem::take(&mut self.shelves).in_order();
        self.done = std::mem::take(&mut self.extractions).in_order();
        self.compared = self.seen.len() as u64;
        let mut seen = std::mem::take(&mut self.seen);
        seen.sort_unstable();
        let mut first: Option<(u64, u32)> = None;
        let mut again: Vec<(u64, u32)> = Vec::new();
        for &(row, line) in &seen {
            match first {
                Some((same, earlier)) if same == row => again.push((u64::from(line), earlier)),
                _ => first = Some((row, line)),
            }
        }
        drop(seen);
        again.sort_unstable();
        for (line, earlier) in again {
            each(line as u32, earlier);
        }
    }

    /// Whether a row of this month counts.
    fn has(&self, month: u16) -> bool {
        let keys = self.sums.iter().chain(&self.stock).map(|(k, _)| k.month);
        keys.chain(self.done.iter().map(|(k, _)| k.month)).any(|known| known == month)
    }

    /// Months between the first and the last without a row, used or refused.
    #[must_use]
    pub fn empty_months(&self) -> Vec<u16> {
        let Some((first, last)) = self.days else { return Vec::new() };
        let mut out = Vec::new();
        for month in first.month_index()..=last.month_index() {
            if !self.has(month) && !self.refused.contains(&month) {
                out.push(month);
            }
        }
        out
    }

    /// Months of which all rows were refused.
    #[must_use]
    pub fn refused_months(&self) -> Vec<u16> {
        let mut out = self.refused.clone();
        out.retain(|month| !self.has(*month));
        out
    }

    /// Rows that count.
    #[must_use]
    pub fn rows(&self) -> u64 {
        let amounts = self.sums.iter().chain(&self.stock).map(|(_, s)| s.rows);
        amounts.chain(self.done.iter().map(|(_, d)| d.rows)).sum()
    }

    /// The sum over all keys that fit.
    #[must_use]
    pub fn over(&self, fits: &dyn Fn(&Key) -> bool) -> Sum {
        let mut all = Sum::default();
        for (_, sum) in self.sums.iter().filter(|(key, _)| fits(key)) {
            all.join(sum);
        }
        all
    }

    /// The sums by one thing: a month, a quarter, a material, a stream; in order.
    #[must_use]
    pub fn by(&self, what: fn(&Key) -> u16) -> BTreeMap<u16, Sum> {
        let mut out: BTreeMap<u16, Sum> = BTreeMap::new();
        for (key, sum) in &self.sums {
            out.entry(what(key)).or_default().join(sum);
        }
        out.remove(&NONE);
        out
    }
}

/// The key of a month's extractions.
const fn of_route(month: u16, route: u16) -> Key {
    Key { month, day: 0, material: route, stream: NONE }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn equal_rows_are_found_wherever_they_stand() {
        let mut tally = Tally::default();
        for (line, cells) in [(2, "a1b"), (3, "c"), (4, "a1b"), (5, "d"), (6, "a1b"), (7, "c")] {
            tally.compare(cells.as_bytes(), &[1, 3], line);
        }
        // The same bytes cut elsewhere are another row.
        tally.compare(b"a1b", &[2, 3], 8);
        let mut found = Vec::new();
        tally.close(&mut |line, earlier| found.push((line, earlier)));
        assert_eq!(found, [(4, 2), (6, 2), (7, 3)]);
        assert_eq!(tally.compared, 7);
    }

    #[test]
    fn a_batch_counts_once_for_a_route() {
        let mut tally = Tally::default();
        for (name, month, route) in
            [("B1", 10, 0), ("B1", 10, 0), ("B2", 10, 0), ("B1", 11, 0), ("B1", 11, 1), ("B2", 10, 0)]
        {
            tally.batch(name.as_bytes(), month, route);
        }
        tally.close(&mut |_, _| {});
        let batches = |month, route| {
            let done = tally.done.iter().find(|(k, _)| *k == of_route(month, route));
            done.map_or(0, |(_, d)| d.batches)
        };
        assert_eq!((batches(10, 0), batches(11, 0), batches(11, 1)), (2, 0, 1));
    }

    #[test]
    fn sums_tell_volume_without_density_from_mass() {
        let mut tally = Tally::default();
        let key = Key { month: 3, day: 0, material: 0, stream: NONE };
        tally.amount(key, 2.0, None);
        tally.amount(key, -0.5, None);
        tally.amount(key, 0.0, Some(0.01));
        tally.close(&mut |_, _| {});
        let sum = tally.over(&|k| k.month == 3);
        assert_eq!(sum, Sum { rows: 3, negative: 1, kg: 1.5, m3: 0.01, rows_by_volume: 1 });
        assert_eq!(tally.by(|k| k.stream).len(), 0);
    }
}
