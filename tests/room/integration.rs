//! The exact solution against numerical integration of the same equation, and the exact worst window against a search.
use super::per_hour;
use thimbleworth::room::{Course, HOUR_S, Release, Room, Setting, Ventilation};

struct Lab {
    room: Room,
    settings: Vec<Setting>,
    releases: Vec<Release>,
}

/// A day with setback, a leak through it, two runs and a puff; every time is a whole number of minutes.
fn lab() -> Lab {
    let setting = |hours: f64, n: f64| Setting { from_s: hours * HOUR_S, air_changes_per_s: per_hour(n) };
    let release = |hours: f64, for_hours: f64, m3: f64| Release {
        from_s: hours * HOUR_S,
        duration_s: for_hours * HOUR_S,
        volume_m3: m3,
    };
    Lab {
        room: Room { volume_m3: 85.0, background: 4.2e-4, mixing_factor: 0.6 },
        settings: vec![setting(0.0, 6.0), setting(9.5, 0.4), setting(20.0, 6.0), setting(30.0, 0.0)],
        releases: vec![
            release(0.0, 28.0, 1.1),
            release(2.0, 3.0, 0.9),
            release(8.25, 6.0, 1.4),
            release(12.0, 0.0, 0.3),
            release(31.0, 1.0, 0.05),
        ],
    }
}

fn solved(lab: &Lab) -> Course {
    Course::new(&lab.room, &Ventilation::new(lab.settings.clone()).unwrap(), &lab.releases).unwrap()
}

/// Fourth-order Runge-Kutta, ten steps a minute, told every minute; between whole minutes nothing changes.
fn integrated(lab: &Lab, minutes: u32) -> Vec<f64> {
    let step = 6.0;
    let mut c = lab.room.background;
    let mut found = Vec::new();
    for minute in 0..=minutes {
        let t = f64::from(minute) * 60.0;
        let puffs = lab.releases.iter().filter(|r| r.duration_s == 0.0 && r.from_s == t);
        c += puffs.map(|r| r.volume_m3).sum::<f64>() / lab.room.volume_m3;
        found.push(c);
        let runs = lab.releases.iter().filter(|r| r.from_s <= t && t < r.from_s + r.duration_s);
        let g: f64 = runs.map(|r| r.volume_m3 / r.duration_s).sum();
        let n = lab.settings.iter().rev().find(|s| s.from_s <= t).unwrap().air_changes_per_s;
        let slope = |c: f64| g / lab.room.volume_m3 - lab.room.mixing_factor * n * (c - lab.room.background);
        for _ in 0..10 {
            let k1 = slope(c);
            let k2 = slope(c + step / 2.0 * k1);
            let k3 = slope(c + step / 2.0 * k2);
            let k4 = slope(c + step * k3);
            c += step / 6.0 * (k1 + 2.0 * k2 + 2.0 * k3 + k4);
        }
    }
    found
}

#[test]
fn course_against_runge_kutta() {
    let lab = lab();
    let course = solved(&lab);
    for (minute, c) in (0_u32..).zip(integrated(&lab, 40 * 60)) {
        let exact = course.at(f64::from(minute) * 60.0);
        assert!((exact / c - 1.0).abs() < 1e-10, "minute {minute}: {exact} and {c}");
    }
}

#[test]
fn peak_and_times_against_the_minutes() {
    let lab = lab();
    let course = solved(&lab);
    let minutes = integrated(&lab, 60 * 60);
    let highest = minutes.iter().fold(0.0, |a: f64, b| a.max(*b));
    assert!((course.peak().1 / highest - 1.0).abs() < 1e-10);
    for limit in [6e-4, 2e-3, 5e-3, 8e-3, 1.5e-2] {
        let first = minutes.iter().position(|c| *c >= limit);
        let last = minutes.iter().rposition(|c| *c >= limit);
        match (course.first_at(limit), first) {
            (Some(t), Some(minute)) => {
                assert!((t / 60.0 - minute as f64).abs() <= 1.0, "{limit}: {t} and {minute}");
            }
            (found, wanted) => assert!(found.is_none() && wanted.is_none(), "{limit}: {found:?} {wanted:?}"),
        }
        match (course.under_from(limit), last) {
            (Some(t), Some(minute)) => {
                assert!((t / 60.0 - minute as f64).abs() <= 1.0, "{limit}: {t} and {minute}");
            }
            // at the end, in the closed room, it stays above
            (None, Some(minute)) => assert_eq!(minute, 3600, "{limit}"),
            (found, wanted) => assert!(found == Some(0.0) && wanted.is_none(), "{limit}: {found:?}"),
        }
    }
}

#[test]
fn means_against_simpsons_rule() {
    let course = solved(&lab());
    // Between changes the course is smooth: a span within each, and one over all by pieces.
    let simpson = |from: f64, until: f64| {
        let n = 2000;
        let h = (until - from) / f64::from(n);
        let weight = |i: i32| if i == 0 || i == n { 1.0 } else { f64::from(2 + 2 * (i % 2)) };
        (0..=n).map(|i| weight(i) * course.at(from + h * f64::from(i))).sum::<f64>() * h / 3.0
    };
    let changes: Vec<f64> = course.changes_s().chain([40.0 * HOUR_S]).collect();
    let mut whole = 0.0;
    for pair in changes.windows(2) {
        // the last point of a span belongs to the next one, which may start with a puff
        let until = pair[1] - 1e-6;
        let mean = course.mean(pair[0], until);
        let area = simpson(pair[0], until);
        assert!((mean * (until - pair[0]) / area - 1.0).abs() < 1e-9, "{pair:?}");
        whole += area;
    }
    assert!((course.mean(0.0, 40.0 * HOUR_S) * 40.0 * HOUR_S / whole - 1.0).abs() < 1e-8);
}

// A search that tries a window every six seconds finds none worse than the exact one, and one nearly as bad.
#[test]
fn worst_window_against_a_search() {
    let course = solved(&lab());
    for window in [900.0, HOUR_S, 8.0 * HOUR_S, 24.0 * HOUR_S] {
        let (start, worst) = course.worst_mean(window);
        assert!((course.mean(start, start + window) / worst - 1.0).abs() < 1e-15);
        let mut best = 0.0;
        for step in 0..30_000 {
            let from = f64::from(step) * 6.0;
            let mean = course.mean(from, from + window);
            assert!(mean <= worst * (1.0 + 1e-12), "{window}: {mean} at {from}, {worst} at {start}");
            if mean > best {
                best = mean;
            }
        }
        assert!(best > worst * (1.0 - 1e-3), "{window}");
    }
}

// With the air that the gas pushes out: V dC/dt = G (1 − C) − k Q (C − C₀). The simple box is on the safe side, by
// the rise at most.
#[test]
fn the_neglect_of_air_pushed_out_is_on_the_safe_side() {
    let room = Room { volume_m3: 30.0, background: 0.0, mixing_factor: 1.0 };
    for (m3, n) in [(0.3, 0.0), (3.0, 0.0), (3.0, 2.0), (1.0, 12.0)] {
        let gas = Release { from_s: 0.0, duration_s: HOUR_S, volume_m3: m3 };
        let course = Course::new(&room, &Ventilation::steady(per_hour(n)).unwrap(), &[gas]).unwrap();
        let g = m3 / HOUR_S / 30.0;
        // C = (G/V)/(G/V + N) (1 − e^{−(G/V + N) t})
        let full = g / (g + per_hour(n)) * (1.0 - (-(g + per_hour(n)) * HOUR_S).exp());
        let simple = course.at(HOUR_S);
        assert!(simple >= full && simple / full - 1.0 <= simple, "{m3} {n}: {simple} {full}");
    }
}
