//! Linear scales and their ticks.

/// A straight map from values to pixels.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) struct Linear {
    from: (f64, f64),
    to: (f64, f64),
}

impl Linear {
    /// Maps the first pair onto the second. Where both ends of the first are equal (or not finite), everything maps to the
    /// start of the second.
    #[must_use]
    pub(super) const fn new(from: (f64, f64), to: (f64, f64)) -> Self {
        Self { from, to }
    }

    /// The pixel of a value; the start of the range for what is not finite.
    #[must_use]
    pub(super) fn at(&self, value: f64) -> f64 {
        let share = (value - self.from.0) / (self.from.1 - self.from.0);
        if share.is_finite() { self.to.0 + share * (self.to.1 - self.to.0) } else { self.to.0 }
    }

    /// How long something of this value is; 0 for what is not finite.
    #[must_use]
    pub(super) fn length(&self, value: f64) -> f64 {
        let length = value / (self.from.1 - self.from.0) * (self.to.1 - self.to.0);
        if length.is_finite() { length } else { 0.0 }
    }
}

/// Round numbers from `low` to `high`, both ends included where they are round: 1, 2 or 5 times a power of ten apart, at
/// most `most` of them (and at least 2 are allowed). Empty where there is no range.
#[must_use]
pub(super) fn ticks(low: f64, high: f64, most: usize) -> Vec<f64> {
    let span = high - low;
    if !(span > 0.0 && span.is_finite()) {
        return Vec::new();
    }
    let gaps = if most < 2 { 1.0 } else { (most - 1) as f64 };
    let mut power = 0_i32;
    // The largest power of ten that is not wider than the least step.
    while power > -320 && ten(power) > span / gaps {
        power -= 1;
    }
    while power < 308 && ten(power + 1) <= span / gaps {
        power += 1;
    }
    for round in [1.0, 2.0, 5.0, 10.0, 20.0] {
        let first = (low / (round * ten(power)) - 1e-9).ceil();
        let last = (high / (round * ten(power)) + 1e-9).floor();
        if last - first <= gaps {
            // Whole numbers over or times a power of ten, so that 0.3 is 0.3. A negative zero is a zero.
            let value = |i: f64| match power {
                0.. => i * round * ten(power),
                _ => i * round / ten(-power),
            };
            return (0..=(last - first) as u32).map(|i| value(first + f64::from(i)) + 0.0).collect();
        }
    }
    Vec::new()
}

/// A power of ten as exactly as a double holds it.
fn ten(power: i32) -> f64 {
    let mut whole = 1.0;
    for _ in 0..power.unsigned_abs() {
        whole *= 10.0;
    }
    if power < 0 { 1.0 / whole } else { whole }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn ticks_are_round_and_inside() {
        assert_eq!(ticks(0.0, 10.0, 6), [0.0, 2.0, 4.0, 6.0, 8.0, 10.0]);
        assert_eq!(ticks(-20.0, 100.0, 7), [-20.0, 0.0, 20.0, 40.0, 60.0, 80.0, 100.0]);
        assert_eq!(ticks(0.0, 0.3, 4), [0.0, 0.1, 0.2, 0.3]);
        assert_eq!(ticks(0.0, 1e9, 3), [0.0, 5e8, 1e9]);
        assert_eq!(ticks(0.0, 1e-12, 3), [0.0, 5e-13, 1e-12]);
        for (low, high) in [(0.0, 7.3), (-3.0, 0.4), (1e-12, 3e-12), (999.0, 1001.0), (-1e9, 1e9)] {
            for most in 2..12 {
                let found = ticks(low, high, most);
                assert!(found.len() <= most, "{low} {high} {most}: {found:?}");
                let hair = (high - low) * 1e-8;
                assert!(found.iter().all(|t| *t >= low - hair && *t <= high + hair), "{found:?}");
                assert!(most < 4 || found.len() >= 2, "{low} {high} {most}: {found:?}");
            }
        }
    }

    #[test]
    fn no_range_has_no_ticks() {
        for (low, high) in [(0.0, 0.0), (5.0, 5.0), (1.0, 0.0), (f64::NAN, 1.0), (0.0, f64::INFINITY)] {
            assert!(ticks(low, high, 5).is_empty());
        }
    }

    #[test]
    fn a_scale_maps_its_ends_and_survives_anything() {
        let scale = Linear::new((0.0, 4.0), (100.0, 300.0));
        assert_eq!(
            (scale.at(0.0), scale.at(4.0), scale.at(1.0), scale.length(1.0)),
            (100.0, 300.0, 150.0, 50.0)
        );
        for value in [0.0, 1e-12, 1e9, f64::NAN, f64::INFINITY] {
            let flat = Linear::new((3.0, 3.0), (100.0, 300.0));
            assert_eq!(flat.at(value), 100.0);
            assert_eq!(flat.length(value), 0.0);
            assert!(scale.at(value).is_finite() && scale.length(value).is_finite());
        }
    }
}
