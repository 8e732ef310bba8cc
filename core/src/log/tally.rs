//! Sums over the rows of a file. Each says on how many rows it stands.

use super::{Day, NONE};
use std::collections::{BTreeMap, BTreeSet};

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

/// To what an amount is added up: indices of [`Names`](super::Names), or [`NONE`].
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub struct Key {
    /// Months since the year 0.
    pub month: u16,
    /// The material.
    pub material: u16,
    /// The stream.
    pub stream: u16,
}

/// The sums of one file.
#[derive(Clone, Debug, Default)]
pub struct Tally {
    /// Amounts by month, material and stream.
    pub sums: BTreeMap<Key, Sum>,
    /// What stood on the shelf, by material and day.
    pub stock: BTreeMap<(u16, Day), Sum>,
    /// Amounts by container.
    pub containers: BTreeMap<String, Sum>,
    /// Whether there were more containers than get a sum.
    pub more_containers: bool,
    /// Extractions by month and route.
    pub done: BTreeMap<(u16, u16), Done>,
    /// The first and the last day.
    pub days: Option<(Day, Day)>,
    /// Rows that were compared with one another.
    pub compared: u64,
    seen: Vec<(u64, u32)>,
    batches: Vec<(u64, u16, u16)>,
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

    pub(super) fn amount(&mut self, key: Key, kg: f64, m3: Option<f64>) {
        self.sums.entry(key).or_default().add(kg, m3);
    }

    pub(super) fn shelf(&mut self, material: u16, day: Day, kg: f64, m3: Option<f64>) {
        self.stock.entry((material, day)).or_default().add(kg, m3);
    }

    pub(super) fn container(&mut self, name: &str, kg: f64, m3: Option<f64>) {
        let room = self.containers.len() < MOST_CONTAINERS;
        match self.containers.get_mut(name) {
            Some(sum) => sum.add(kg, m3),
            None if room => {
                self.containers.entry(name.to_owned()).or_default().add(kg, m3);
            }
            None => self.more_containers = true,
        }
    }

    pub(super) fn extraction(&mut self, month: u16, route: u16, runs: f64, control: bool, repeat: bool) {
        let done = self.done.entry((month, route)).or_default();
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
        let batch = (hash(name, &[]), month, route);
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

    /// Counts batches and finds equal rows, told as the line and the earlier line that it repeats.
    pub(super) fn close(&mut self, mut each: impl FnMut(u32, u32)) {
        self.batches.sort_unstable();
        // A batch that runs over the end of a month counts in the month in which it began.
        self.batches.dedup_by_key(|(name, _, route)| (*name, *route));
        for &(_, month, route) in &self.batches {
            self.done.entry((month, route)).or_default().batches += 1;
        }
        self.batches = Vec::new();
        self.compared = self.seen.len() as u64;
        self.seen.sort_unstable();
        let mut first: Option<(u64, u32)> = None;
        let mut again: Vec<(u32, u32)> = Vec::new();
        for &(row, line) in &self.seen {
            match first {
                Some((same, earlier)) if same == row => again.push((line, earlier)),
                _ => first = Some((row, line)),
            }
        }
        self.seen = Vec::new();
        again.sort_unstable();
        for (line, earlier) in again {
            each(line, earlier);
        }
    }

    /// Months between the first and the last without a row.
    #[must_use]
    pub fn empty_months(&self) -> Vec<u16> {
        let Some((first, last)) = self.days else { return Vec::new() };
        let mut there: BTreeSet<u16> = self.sums.keys().map(|k| k.month).collect();
        there.extend(self.done.keys().map(|(month, _)| *month));
        there.extend(self.stock.keys().map(|(_, day)| day.month_index()));
        (first.month_index()..=last.month_index()).filter(|month| !there.contains(month)).collect()
    }

    /// Rows that count.
    #[must_use]
    pub fn rows(&self) -> u64 {
        let amounts = self.sums.values().chain(self.stock.values()).map(|s| s.rows);
        amounts.chain(self.done.values().map(|d| d.rows)).sum()
    }

    /// The sum over all keys that fit.
    #[must_use]
    pub fn over(&self, fits: impl Fn(&Key) -> bool) -> Sum {
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

/// FNV-1a over eight bytes at a time, mixed at the end: tells rows apart, keeps no secret.
fn hash(bytes: &[u8], ends: &[u32]) -> u64 {
    const PRIME: u64 = 0x0000_0100_0000_01b3;
    let mut state = 0xcbf2_9ce4_8422_2325_u64;
    let mut chunks = bytes.chunks_exact(8);
    for chunk in &mut chunks {
        let word = chunk.iter().fold(0_u64, |word, b| word << 8 | u64::from(*b));
        state = (state ^ word).wrapping_mul(PRIME);
        state ^= state >> 29;
    }
    for b in chunks.remainder() {
        state = (state ^ u64::from(*b)).wrapping_mul(PRIME);
    }
    for end in ends {
        state = (state ^ u64::from(*end)).wrapping_mul(PRIME);
    }
    // The last steps of SplitMix64.
    state = (state ^ (state >> 30)).wrapping_mul(0xbf58_476d_1ce4_e5b9);
    state = (state ^ (state >> 27)).wrapping_mul(0x94d0_49bb_1331_11eb);
    state ^ (state >> 31)
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
        tally.close(|line, earlier| found.push((line, earlier)));
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
        tally.close(|_, _| {});
        let batches = |month, route| tally.done.get(&(month, route)).map_or(0, |d| d.batches);
        assert_eq!((batches(10, 0), batches(11, 0), batches(11, 1)), (2, 0, 1));
    }

    #[test]
    fn sums_tell_volume_without_density_from_mass() {
        let mut tally = Tally::default();
        let key = Key { month: 3, material: 0, stream: NONE };
        tally.amount(key, 2.0, None);
        tally.amount(key, -0.5, None);
        tally.amount(key, 0.0, Some(0.01));
        let sum = tally.over(|k| k.month == 3);
        assert_eq!(sum, Sum { rows: 3, negative: 1, kg: 1.5, m3: 0.01, rows_by_volume: 1 });
        assert_eq!(tally.by(|k| k.stream).len(), 0);
    }
}
