//! What a column of draws says: mean, standard uncertainty, median and coverage intervals by the rules of JCGM 101:2008.

/// A pair of limits.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Interval {
    /// The lower limit.
    pub low: f64,
    /// The upper limit.
    pub high: f64,
}

/// A column of draws in six numbers, in the unit of the column.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Summary {
    /// How many draws it rests on.
    pub draws: usize,
    /// Their mean (JCGM 101:2008, 7.6).
    pub mean: f64,
    /// Their standard deviation, which is the standard uncertainty (7.6).
    pub u: f64,
    /// The value that half of them lie below.
    pub median: f64,
    /// The probabilistically symmetric coverage interval: as many draws below it as above (7.7.2).
    pub symmetric: Interval,
    /// The shortest coverage interval (7.7.3).
    pub shortest: Interval,
}

/// With fewer draws nothing is said about an interval: its limits would be two or three single draws.
pub const FEWEST_DRAWS: usize = 200;

/// Draws up the summary of a column; `coverage` is a probability above one half, such as 0.95.
///
/// The values are left in another order. Limits are found by selection, so that only the two tails are sorted. `None`
/// below [`FEWEST_DRAWS`], for a coverage outside 0.5 to 1 and where a value is not finite.
///
/// Source: JCGM 101:2008, 7.6 and 7.7 (seen in a secondary source).
///
/// ```
/// use thimbleworth::chance::summary;
/// // 0, 1, ... 999: 95 % of a thousand are 950, so 25 lie on each side
/// let mut values: Vec<f64> = (0..1000).map(f64::from).collect();
/// let found = summary(&mut values, 0.95).unwrap();
/// assert_eq!((found.mean, found.median), (499.5, 499.5));
/// assert_eq!((found.symmetric.low, found.symmetric.high), (24.0, 974.0));
/// ```
#[must_use]
pub fn summary(values: &mut [f64], coverage: f64) -> Option<Summary> {
    let count = values.len();
    let inside = coverage > 0.5 && coverage < 1.0;
    if count < FEWEST_DRAWS || !inside || !values.iter().all(|v| v.is_finite()) {
        return None;
    }
    let (mean, u) = mean_and_deviation(values);
    // q = p M to the nearest whole number; M − q draws lie outside.
    let q = least(nearest(coverage * as_f64(count)), count - 1);
    let tail = count - q;
    let (low_tail, _, rest) = values.select_nth_unstable_by(tail, f64::total_cmp);
    // `rest` begins at index tail + 1; the upper tail begins at index q.
    if q > tail + 1 {
        rest.select_nth_unstable_by(q - tail - 1, f64::total_cmp);
    }
    low_tail.sort_unstable_by(f64::total_cmp);
    if let Some(high_tail) = values.get_mut(q..) {
        high_tail.sort_unstable_by(f64::total_cmp);
    }
    let at = |values: &[f64], i: usize| values.get(i).copied().unwrap_or(0.0);
    // r = (M − q)/2, or (M − q + 1)/2 where that is no whole number; counted from 1.
    let r = tail.div_ceil(2) - 1;
    let symmetric = Interval { low: at(values, r), high: at(values, r + q) };
    // The r for which y(r + q) − y(r) is least.
    let mut shortest = symmetric;
    for i in 0..tail {
        let here = Interval { low: at(values, i), high: at(values, i + q) };
        if here.high - here.low < shortest.high - shortest.low {
            shortest = here;
        }
    }
    let half = count / 2;
    let (below, middle, _) = values.select_nth_unstable_by(half, f64::total_cmp);
    let mut median = *middle;
    if count.is_multiple_of(2) {
        let mut largest = f64::NEG_INFINITY;
        for v in below.iter() {
            if *v > largest {
                largest = *v;
            }
        }
        median = 0.5 * (largest + median);
    }
    Some(Summary { draws: count, mean, u, median, symmetric, shortest })
}

/// Mean and sample standard deviation, in the order of the draws; 0 and 0 of nothing.
///
/// ```
/// assert_eq!(thimbleworth::chance::mean_and_deviation(&[1.0, 2.0, 3.0]), (2.0, 1.0));
/// ```
#[must_use]
pub fn mean_and_deviation(values: &[f64]) -> (f64, f64) {
    if values.is_empty() {
        return (0.0, 0.0);
    }
    let count = as_f64(values.len());
    // From the first value on, so that equal values have a deviation of exactly 0.
    let first = values.first().copied().unwrap_or(0.0);
    let mut sum = 0.0;
    for v in values {
        sum += v - first;
    }
    let mean = first + sum / count;
    let mut squares = 0.0;
    for v in values {
        squares += (v - mean) * (v - mean);
    }
    // s² = Σ (y − ȳ)² / (M − 1)
    let deviation = if values.len() > 1 { (squares / (count - 1.0)).sqrt() } else { 0.0 };
    (mean, deviation)
}

#[expect(clippy::cast_precision_loss, reason = "no column holds 2⁵² draws")]
pub(super) fn as_f64(count: usize) -> f64 {
    count as f64
}

#[expect(clippy::cast_possible_truncation, clippy::cast_sign_loss, reason = "a number of draws, above 0")]
fn nearest(x: f64) -> usize {
    (x + 0.5) as usize
}

const fn least(a: usize, b: usize) -> usize {
    if a < b { a } else { b }
}

#[cfg(test)]
mod tests {
    use super::super::{keyed_bits, unit_interval};
    use super::*;

    /// Second way: everything sorted, and every interval of q draws looked at.
    #[test]
    fn selection_finds_what_sorting_finds() {
        for count in [200_usize, 201, 999, 1000, 5003] {
            for coverage in [0.6, 0.9, 0.95, 0.99] {
                let mut values: Vec<f64> = (0..count as u64)
                    .map(|d| {
                        let p = unit_interval(keyed_bits(count as u64, d));
                        p * p * p
                    })
                    .collect();
                let mut sorted = values.clone();
                sorted.sort_unstable_by(f64::total_cmp);
                let found = summary(&mut values, coverage).unwrap();
                let q = (coverage * count as f64 + 0.5).floor() as usize;
                let r = (count - q).div_ceil(2);
                assert_eq!(found.symmetric.low, sorted[r - 1], "{count} {coverage}");
                assert_eq!(found.symmetric.high, sorted[r + q - 1]);
                let widths = (0..count - q).map(|i| sorted[i + q] - sorted[i]);
                let least = widths.min_by(f64::total_cmp).unwrap();
                assert_eq!(found.shortest.high - found.shortest.low, least);
                let middle = (sorted[(count - 1) / 2] + sorted[count / 2]) / 2.0;
                assert_eq!(found.median, middle);
            }
        }
    }

    #[test]
    fn too_little_or_not_a_number_says_nothing() {
        assert_eq!(summary(&mut [1.0; 199], 0.95), None);
        assert_eq!(summary(&mut [1.0; 300], 1.0), None);
        assert_eq!(summary(&mut [1.0; 300], f64::NAN), None);
        let mut odd = [1.0; 300];
        odd[7] = f64::INFINITY;
        assert_eq!(summary(&mut odd, 0.95), None);
        let same = summary(&mut [3.0; 300], 0.95).unwrap();
        assert_eq!((same.u, same.symmetric.low, same.shortest.high), (0.0, 3.0, 3.0));
    }
}
