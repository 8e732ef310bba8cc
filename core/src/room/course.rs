//! The well-mixed box, solved exactly between the times at which something changes.
//!
//! V dC/dt = G − k Q (C − C₀). With λ = k Q/V and the rise r = C − C₀, from a time at which nothing changes until the next:
//! r(t) = r₀ e^{−λt} + (G/V)(1 − e^{−λt})/λ. No time steps, so no step to choose and none to get wrong.
//!
//! The equation leaves out the air that the released gas itself pushes out. It therefore overstates, by up to the rise itself: by at
//! most 1 % of the figure at 1 % by volume and 10 % of it at 10 %, in a closed room by half of that. A long release into a closed room
//! can pass 100 %, which [`Course::is_beyond_the_equation`] tells; for what is let go at once see [`super::Sudden`].
use super::error::RoomError;
use super::schedule::{Release, Room, Ventilation};

/// From one change to the next; the last one has no end.
#[derive(Clone, Copy, Debug)]
struct Segment {
    from_s: f64,
    /// Rise over the background at the start, after any puff.
    rise: f64,
    /// G/V, 1/s.
    source_per_s: f64,
    /// λ = k Q/V, 1/s.
    decay_per_s: f64,
    /// ∫ rise dt from zero to the start, s.
    area_s: f64,
}

/// The time course of one gas in a room, from 0 s on and without end.
#[derive(Clone, Debug)]
pub struct Course {
    background: f64,
    segments: Vec<Segment>,
}

/// ∫₀^τ e^{−λs} ds.
fn phi1(decay: f64, tau: f64) -> f64 {
    // (1 − e^{−λτ})/λ, and τ in a closed room
    if decay > 0.0 { -libm::expm1(-decay * tau) / decay } else { tau }
}

/// ∫₀^τ (1 − e^{−λs})/λ ds.
fn phi2(decay: f64, tau: f64) -> f64 {
    let x = decay * tau;
    if x < 1e-3 {
        // τ²(1/2 − x/6 + x²/24 − x³/120): the difference below would lose its digits
        tau * tau * (0.5 - x * (1.0 / 6.0 - x * (1.0 / 24.0 - x / 120.0)))
    } else {
        // (τ − (1 − e^{−λτ})/λ)/λ
        (tau - phi1(decay, tau)) / decay
    }
}

impl Segment {
    fn rise_at(&self, time_s: f64) -> f64 {
        let tau = time_s - self.from_s;
        // r = r₀ e^{−λτ} + (G/V)(1 − e^{−λτ})/λ
        self.rise * libm::exp(-self.decay_per_s * tau) + self.source_per_s * phi1(self.decay_per_s, tau)
    }

    fn area_at(&self, time_s: f64) -> f64 {
        let tau = time_s - self.from_s;
        // ∫ r = r₀ (1 − e^{−λτ})/λ + (G/V) ∫ (1 − e^{−λs})/λ ds
        self.area_s
            + self.rise * phi1(self.decay_per_s, tau)
            + self.source_per_s * phi2(self.decay_per_s, tau)
    }

    /// dr/dt at a time.
    fn slope_at(&self, time_s: f64) -> f64 {
        // dr/dt = (G/V − λ r₀) e^{−λτ}
        (self.source_per_s - self.decay_per_s * self.rise)
            * libm::exp(-self.decay_per_s * (time_s - self.from_s))
    }

    /// When the rise of this segment, run on without end, comes to a level on the other side of or beyond its start.
    fn reaches(&self, level: f64) -> Option<f64> {
        let (s, d, r) = (self.source_per_s, self.decay_per_s, self.rise);
        let tau = if d > 0.0 {
            let steady = s / d;
            // r₀ → level → steady: τ = −ln((level − r∞)/(r₀ − r∞))/λ
            let left = (level - steady) / (r - steady);
            if left > 0.0 && left <= 1.0 { -libm::log(left) / d } else { return None }
        } else if s > 0.0 && level >= r {
            // closed room: τ = (level − r₀)/(G/V)
            (level - r) / s
        } else {
            return None;
        };
        Some(self.from_s + tau)
    }
}

impl Course {
    /// Solves the box for a room, its ventilation and what is released into it. At 0 s the room stands at the background.
    ///
    /// # Errors
    /// [`RoomError`] for a room or a release that cannot be.
    pub fn new(room: &Room, ventilation: &Ventilation, releases: &[Release]) -> Result<Self, RoomError> {
        let (volume, background, k) = room.checked()?;
        let mut times = vec![0.0];
        times.extend(ventilation.settings().iter().map(|setting| setting.from_s));
        for release in releases {
            release.checked()?;
            times.extend([release.from_s, release.until_s()]);
        }
        times.sort_unstable_by(f64::total_cmp);
        times.dedup();
        let mut segments: Vec<Segment> = Vec::with_capacity(times.len());
        for &from_s in &times {
            let (mut rise, area_s) =
                segments.last().map_or((0.0, 0.0), |last| (last.rise_at(from_s), last.area_at(from_s)));
            let mut rate_m3_s = 0.0;
            for release in releases {
                if release.until_s() > release.from_s {
                    if release.from_s <= from_s && from_s < release.until_s() {
                        rate_m3_s += release.volume_m3 / release.duration_s;
                    }
                } else if release.from_s == from_s {
                    rise += release.volume_m3 / volume;
                }
            }
            segments.push(Segment {
                from_s,
                rise,
                source_per_s: rate_m3_s / volume,
                decay_per_s: k * ventilation.at(from_s),
                area_s,
            });
        }
        Ok(Self { background, segments })
    }

    fn segment(&self, time_s: f64) -> Option<&Segment> {
        let after = self.segments.partition_point(|segment| segment.from_s <= time_s);
        after.checked_sub(1).and_then(|place| self.segments.get(place))
    }

    fn area(&self, time_s: f64) -> f64 {
        self.segment(time_s).map_or(0.0, |segment| segment.area_at(time_s))
    }

    /// The fraction by volume at a time in s; the background before 0 s.
    ///
    /// ```
    /// use thimbleworth::room::{Course, Release, Room, Ventilation, HOUR_S};
    /// // a closed room of 100 m³ and 1 m³ of gas within an hour: half of it after half an hour
    /// let room = Room { volume_m3: 100.0, background: 0.0, mixing_factor: 1.0 };
    /// let gas = Release { from_s: 0.0, duration_s: HOUR_S, volume_m3: 1.0 };
    /// let course = Course::new(&room, &Ventilation::steady(0.0)?, &[gas])?;
    /// assert!((course.at(1800.0) - 0.005).abs() < 1e-15);
    /// # Ok::<(), thimbleworth::room::RoomError>(())
    /// ```
    #[must_use]
    pub fn at(&self, time_s: f64) -> f64 {
        self.background + self.segment(time_s).map_or(0.0, |segment| segment.rise_at(time_s))
    }

    /// What the fraction would come to if what happens at a time went on without end; `None` in a closed room with a
    /// release, where it has no end.
    #[must_use]
    pub fn steady(&self, time_s: f64) -> Option<f64> {
        let Some(segment) = self.segment(time_s) else { return Some(self.background) };
        if segment.decay_per_s > 0.0 {
            // C∞ = C₀ + G/(k Q)
            Some(self.background + segment.source_per_s / segment.decay_per_s)
        } else if segment.source_per_s > 0.0 {
            None
        } else {
            Some(self.background + segment.rise)
        }
    }

    /// Mean from one time to another in s, fraction by volume; the figure at the time where both are the same.
    #[must_use]
    pub fn mean(&self, from_s: f64, until_s: f64) -> f64 {
        let length = until_s - from_s;
        if length > 0.0 {
            // C̄ = C₀ + (∫ r dt)/(t₂ − t₁)
            self.background + (self.area(until_s) - self.area(from_s)) / length
        } else {
            self.at(from_s)
        }
    }

    /// The highest fraction by volume, with its time in s. Between changes the course only rises or only falls, so it is at one of them.
    #[must_use]
    pub fn peak(&self) -> (f64, f64) {
        let mut peak = (0.0, 0.0);
        for segment in &self.segments {
            if segment.rise > peak.1 {
                peak = (segment.from_s, segment.rise);
            }
        }
        (peak.0, self.background + peak.1)
    }

    /// The highest mean over a window of that length in s, wherever it lies: the start of the window in s and the
    /// fraction by volume. Exact: the mean is highest where a window begins or ends at a change, or where the course
    /// stands equally high at both of its ends.
    #[must_use]
    pub fn worst_mean(&self, window_s: f64) -> (f64, f64) {
        let mut starts: Vec<f64> = Vec::with_capacity(self.segments.len() * 2);
        for segment in &self.segments {
            starts.push(segment.from_s);
            if segment.from_s > window_s {
                starts.push(segment.from_s - window_s);
            }
        }
        starts.sort_unstable_by(f64::total_cmp);
        starts.dedup();
        let mut worst = (0.0, self.mean(0.0, window_s));
        let mut keep = |start: f64| {
            let mean = self.mean(start, start + window_s);
            if mean > worst.1 {
                worst = (start, mean);
            }
        };
        for (place, &start) in starts.iter().enumerate() {
            keep(start);
            // After the last change the course only falls: no window that starts there is worse than the first.
            if let Some(&next) = starts.get(place + 1) {
                self.level_ends(start, next, window_s, &mut keep);
            }
        }
        worst
    }

    /// Windows that start between two neighbouring candidates and have the same height at both ends, falling through it.
    fn level_ends(&self, from: f64, until: f64, window_s: f64, keep: &mut impl FnMut(f64)) {
        let middle = from + (until - from) / 2.0;
        let (Some(head), Some(tail)) = (self.segment(middle), self.segment(middle + window_s)) else {
            return;
        };
        // f = r(t + w) − r(t): the mean rises while it is above zero
        let f = |t: f64| tail.rise_at(t + window_s) - head.rise_at(t);
        let mut edges = [from, until, until];
        // f has at most one turn, where both slopes agree: e^{−(λ₂ − λ₁) u} = slope₁/slope₂
        let (slope_1, slope_2) = (head.slope_at(from), tail.slope_at(from + window_s));
        let apart = tail.decay_per_s - head.decay_per_s;
        if apart != 0.0 && slope_1 * slope_2 > 0.0 {
            let turn = from + libm::log(slope_2 / slope_1) / apart;
            if from < turn && turn < until {
                edges = [from, turn, until];
            }
        }
        for pair in edges.windows(2) {
            let &[mut low, mut high] = pair else { continue };
            if !(f(low) > 0.0 && f(high) < 0.0) {
                continue;
            }
            // Halving to the last place of the time: 80 halvings of any interval that matters.
            for _ in 0..80 {
                let half = low + (high - low) / 2.0;
                if f(half) > 0.0 {
                    low = half;
                } else {
                    high = half;
                }
            }
            keep(low);
        }
    }

    /// When the course first comes to a fraction by volume, s; `None` if it never does.
    #[must_use]
    pub fn first_at(&self, limit: f64) -> Option<f64> {
        let level = limit - self.background;
        for (place, segment) in self.segments.iter().enumerate() {
            if segment.rise >= level {
                return Some(segment.from_s);
            }
            let end = self.segments.get(place + 1).map_or(f64::INFINITY, |next| next.from_s);
            if let Some(time) = segment.reaches(level)
                && time <= end
            {
                return Some(time);
            }
        }
        None
    }

    /// From when on the course stays under a fraction by volume, s: 0 if it is never at it, `None` if it never falls
    /// under it for good.
    #[must_use]
    pub fn under_from(&self, limit: f64) -> Option<f64> {
        let level = limit - self.background;
        // The last segment that starts at the limit or above; from there it falls and nothing lifts it again.
        match self.segments.iter().rev().find(|segment| segment.rise >= level) {
            Some(segment) if level > 0.0 => segment.reaches(level),
            Some(_) => None,
            None => Some(0.0),
        }
    }

    /// The times at which something changes, s, in order: for a drawing, which needs points between them too.
    pub fn changes_s(&self) -> impl Iterator<Item = f64> + '_ {
        self.segments.iter().map(|segment| segment.from_s)
    }

    /// Whether the course passes 100 % by volume, which only the neglect of the air pushed out makes possible. Its figures
    /// are then no concentrations: the room is full of the gas, or nearly so.
    #[must_use]
    pub fn is_beyond_the_equation(&self) -> bool {
        self.peak().1 > 1.0
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::room::{HOUR_S, Setting};

    const ROOM: Room = Room { volume_m3: 50.0, background: 1e-4, mixing_factor: 0.5 };

    #[test]
    fn integrals_join_at_the_switch_of_formula() {
        for decay in [1e-4, 1e-7, 0.3] {
            let tau = 1e-3 / decay;
            let (below, above) = (phi2(decay, tau * (1.0 - 1e-12)), phi2(decay, tau * (1.0 + 1e-12)));
            assert!((below / above - 1.0).abs() < 1e-11, "{decay}");
        }
    }

    #[test]
    fn a_puff_decays_and_falls_under() {
        let puff = Release { from_s: 100.0, duration_s: 0.0, volume_m3: 0.5 };
        let course = Course::new(&ROOM, &Ventilation::steady(4.0 / HOUR_S).unwrap(), &[puff]).unwrap();
        assert_eq!(course.at(99.0), 1e-4);
        assert_eq!(course.peak(), (100.0, 0.0101));
        // k N = 2 an hour, so half is left after ln 2/2 h
        let half = 100.0 + HOUR_S * libm::log(2.0) / 2.0;
        assert!((course.at(half) - 0.0051).abs() < 1e-15);
        assert!((course.under_from(0.0051).unwrap() - half).abs() < 1e-8);
        assert_eq!(course.first_at(0.0051), Some(100.0));
        assert_eq!(course.under_from(0.02), Some(0.0));
        assert_eq!(course.under_from(1e-4), None);
    }

    #[test]
    fn overlapping_releases_add_up() {
        let v = Ventilation::new(vec![
            Setting { from_s: 0.0, air_changes_per_s: 1e-3 },
            Setting { from_s: 700.0, air_changes_per_s: 0.0 },
        ])
        .unwrap();
        let one = Release { from_s: 50.0, duration_s: 900.0, volume_m3: 0.2 };
        let two = Release { from_s: 300.0, duration_s: 100.0, volume_m3: 0.1 };
        let course = |list: &[Release]| Course::new(&ROOM, &v, list).unwrap();
        let (both, a, b) = (course(&[one, two]), course(&[one]), course(&[two]));
        for t in [0.0, 60.0, 350.0, 800.0, 5000.0] {
            assert!((both.at(t) - (a.at(t) + b.at(t) - 1e-4)).abs() < 1e-15, "{t}");
        }
        // closed after 700 s: what is in stays in
        assert_eq!(both.at(1e4), both.at(2e4));
        assert_eq!(both.under_from(both.at(1e4) - 1e-9), None);
        assert_eq!(both.steady(800.0), None);
    }

    #[test]
    fn a_long_release_into_a_closed_room_says_that_it_leaves_the_equation() {
        let gas = Release { from_s: 0.0, duration_s: HOUR_S, volume_m3: 60.0 };
        let course = Course::new(&ROOM, &Ventilation::steady(0.0).unwrap(), &[gas]).unwrap();
        assert!(course.is_beyond_the_equation());
    }
}
