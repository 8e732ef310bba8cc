//! What matters most: the share of a column's variance that one input explains, from the same draws.

use super::draw::keyed_bits;
use super::summary::as_f64;

/// Bins of equal probability into which an input's draws fall.
const BINS: usize = 32;

/// With fewer draws no share is given: each bin would hold less than ten.
pub const FEWEST_FOR_SHARES: usize = 10 * BINS;

/// The share of the variance of a column that the input with this key explains by itself: its first-order index.
///
/// `values` holds draw `d` under the number that `draws` gives beside it. The draws fall into 32 bins by the input's own
/// uniform number, which is a function of key, seed and draw; the variance of the bins' means is the part explained. It
/// sees effects that are not monotone, which a rank correlation misses, and needs no further draws.
///
/// ```text
/// S = (Q_between − (B − 1) Q_within / (N − B)) / Q,   Q = Σ (y − ȳ)²
/// ```
///
/// The second term is what bins of a number without influence would show by chance. From 0 to 1; `None` below
/// [`FEWEST_FOR_SHARES`] draws and where the column does not vary.
///
/// Source: the correlation ratio, with the correction that is known as ε² (from memory; tested against the Ishigami
/// function).
///
/// ```
/// use thimbleworth::chance::{keyed_bits, unit_interval, variance_share};
/// let draw = |key: u64, d: u64| unit_interval(keyed_bits(key, d));
/// let values: Vec<f64> = (0..20_000).map(|d| draw(1, d) + 2.0 * draw(2, d)).collect();
/// // V = 1/12 + 4/12
/// let share = variance_share(0..20_000, &values, 2, 0).unwrap();
/// assert!((share - 0.8).abs() < 0.01);
/// ```
#[must_use]
pub fn variance_share(draws: impl Iterator<Item = u64>, values: &[f64], key: u64, seed: u64) -> Option<f64> {
    if values.len() < FEWEST_FOR_SHARES {
        return None;
    }
    let count = as_f64(values.len());
    let mut sum = 0.0;
    for v in values {
        sum += v;
    }
    let mean = sum / count;
    let (mut sums, mut counts, mut all) = ([0.0_f64; BINS], [0_u32; BINS], 0.0);
    for (draw, v) in draws.zip(values) {
        // The five highest bits of 64 choose one of 32 bins.
        let bin = (keyed_bits(key ^ seed, draw) >> 59) as usize;
        let from_mean = v - mean;
        sums[bin] += from_mean;
        counts[bin] += 1;
        all += from_mean * from_mean;
    }
    if !(all > 0.0 && all.is_finite()) {
        return None;
    }
    let (mut between, mut filled) = (0.0, 0.0);
    for (sum, count) in sums.iter().zip(counts) {
        if count > 0 {
            // Q_between = Σ n_b (ȳ_b − ȳ)²
            between += sum * sum / f64::from(count);
            filled += 1.0;
        }
    }
    let by_chance = (filled - 1.0) * (all - between) / (count - filled);
    let share = (between - by_chance) / all;
    Some(if share > 0.0 { share } else { 0.0 })
}
