//! Containers that fill, are dated, moved and picked up, day by day through a year that begins empty.

use super::days::{MONTHS, month_of};

/// Days simulated.
const YEAR: u16 = 365;
/// What a satellite area may hold, all of its streams together: 55 gal of 3.785 411 784 L (NIST SP 811); m³. An area of
/// acutely hazardous waste holds a quart, which is not kept here.
pub const SATELLITE_M3: f64 = 55.0 * 3.785_411_784e-3;
/// Days in which what is above that is moved.
pub const SATELLITE_DAYS: u16 = 3;
/// A container fuller than this share of its content counts as full: what is missing is rounding.
const FULL: f64 = 1.0 - 1e-9;
/// No stream fills more containers in a year: beyond that the plan has gone wrong.
const MOST: usize = 20_000;

/// From when the storage of a container counts.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Clock {
    /// From the first drop.
    FirstDrop,
    /// From the day on which it is full and moves out of the satellite area.
    WhenFull,
}

/// One stream as the calendar needs it.
#[derive(Clone, Debug, PartialEq)]
pub struct Line {
    /// Its name.
    pub name: String,
    /// What it brings in each month; m³.
    pub m3: [f64; 12],
    /// Its mass for each volume; kg/m³.
    pub density_kg_m3: f64,
    /// What one container takes; m³.
    pub takes_m3: f64,
    /// From when its storage counts.
    pub clock: Clock,
}

/// What may be stored.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Storage {
    /// The longest time for what is made in each month; days.
    pub days: [Option<u16>; 12],
    /// The most on site in each month; kg.
    pub kg: [Option<f64>; 12],
}

/// When containers are picked up.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum PickUps {
    /// Every so many days; full containers go, and those that could not wait for the next time.
    Every(u16),
    /// As seldom as every limit allows; part-full containers whose time is running go along.
    Fewest,
}

/// One container.
#[derive(Clone, Debug, PartialEq)]
pub struct Container {
    /// The index of its line.
    pub line: usize,
    /// The day of its first drop.
    pub opened: u16,
    /// The day on which it was full.
    pub closed: Option<u16>,
    /// The day from which its storage counts; `None` while nothing counts.
    pub from: Option<u16>,
    /// The last day on which it may be there; `None` without a limit.
    pub until: Option<u16>,
    /// The day on which it was picked up.
    pub collected: Option<u16>,
    /// What is in it; m³.
    pub m3: f64,
}

/// One pick-up.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct PickUp {
    /// The day.
    pub day: u16,
    /// Containers that went.
    pub containers: usize,
    /// Their mass; kg.
    pub kg: f64,
}

/// A year of containers.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Calendar {
    /// Every container, in the order in which they were opened.
    pub containers: Vec<Container>,
    /// Every pick-up.
    pub pick_ups: Vec<PickUp>,
    /// Mass on site at the end of each day; kg.
    pub on_hand_kg: Vec<f64>,
    /// Days at whose end more lay on site than is allowed.
    pub too_much: Vec<u16>,
    /// Indices of containers that stayed longer than allowed.
    pub too_long: Vec<usize>,
    /// Containers that left the satellite area before they were full, because the area held too much: the day, which is marked
    /// on them, and their indices. They are gone from it three days later at the latest.
    pub excess: Vec<(u16, usize)>,
}

/// Runs a year.
///
/// What a month brings comes in equal parts on each of its days. A container takes what it may and is closed on the day on which
/// it is full. The longest time is the shortest allowed by any month in which it filled.
///
/// With [`PickUps::Fewest`] a pick-up waits until one more day would break a limit. Every container then has a day by which it
/// must go, and going last to each such day needs the fewest pick-ups (the usual argument for points that stab intervals).
///
/// ```
/// use thimbleworth::generator::{Clock, Line, PickUps, Storage, simulate};
/// // 20 L a month into 20 L cans, 90 days from the first drop: four pick-ups a year
/// let line = Line { name: "flammable".into(), m3: [0.020; 12], density_kg_m3: 800.0, takes_m3: 0.018, clock: Clock::FirstDrop };
/// let storage = Storage { days: [Some(90); 12], kg: [None; 12] };
/// let year = simulate(&[line], &storage, PickUps::Fewest);
/// assert_eq!(year.pick_ups.len(), 4);
/// assert!(year.too_long.is_empty());
/// ```
#[must_use]
pub fn simulate(lines: &[Line], storage: &Storage, pick_ups: PickUps) -> Calendar {
    let mut out = Calendar::default();
    let mut open: Vec<Option<usize>> = vec![None; lines.len()];
    for day in 0..YEAR {
        let (month, _) = month_of(day);
        let interval = match pick_ups {
            PickUps::Every(days) => Some(if days == 0 { 1 } else { days }),
            PickUps::Fewest => None,
        };
        let due = match interval {
            Some(days) => day > 0 && day % days == 0,
            None => must_go(&out, lines, storage, day),
        };
        if due {
            collect(&mut out, lines, &mut open, day, interval);
        }
        for (l, line) in lines.iter().enumerate() {
            fill(&mut out, (l, line), storage, &mut open, day);
        }
        excess(&mut out, lines, storage, &mut open, day);
        let kg = on_hand(&out, lines);
        out.on_hand_kg.push(kg);
        if storage.kg.get(month).copied().flatten().is_some_and(|most| kg > most) {
            out.too_much.push(day);
        }
    }
    for (i, c) in out.containers.iter().enumerate() {
        if c.until.is_some_and(|until| c.collected.unwrap_or(YEAR) > until) && !out.too_long.contains(&i) {
            out.too_long.push(i);
        }
    }
    out
}

/// Moves the fullest containers out of a satellite area that holds more than it may: their time counts from this day.
fn excess(year: &mut Calendar, lines: &[Line], storage: &Storage, open: &mut [Option<usize>], day: u16) {
    loop {
        let (mut all, mut fullest): (f64, Option<(usize, f64)>) = (0.0, None);
        for (line, slot) in lines.iter().zip(open.iter()) {
            let Some(at) = slot.filter(|_| line.clock == Clock::WhenFull) else { continue };
            let m3 = year.containers.get(at).map_or(0.0, |c| c.m3);
            all += m3;
            if fullest.is_none_or(|(_, most)| m3 > most) {
                fullest = Some((at, m3));
            }
        }
        let Some((at, _)) = fullest.filter(|_| all > SATELLITE_M3 * (1.0 + 1e-9)) else { return };
        let Some(c) = year.containers.get_mut(at) else { return };
        (c.closed, c.from) = (Some(day), Some(day));
        c.until = storage.days.get(month_of(day).0).copied().flatten().map(|days| day.saturating_add(days));
        if let Some(slot) = open.get_mut(c.line) {
            *slot = None;
        }
        year.excess.push((day, at));
    }
}

fn rate(line: &Line, day: u16) -> f64 {
    let (month, _) = month_of(day);
    let days = MONTHS.get(month).copied().unwrap_or(30);
    line.m3.get(month).copied().unwrap_or(0.0) / f64::from(days)
}

fn on_hand(year: &Calendar, lines: &[Line]) -> f64 {
    let mut kg = 0.0;
    for c in year.containers.iter().filter(|c| c.collected.is_none()) {
        kg += c.m3 * lines.get(c.line).map_or(0.0, |l| l.density_kg_m3);
    }
    kg
}

/// Whether waiting one more day would break a limit.
fn must_go(year: &Calendar, lines: &[Line], storage: &Storage, day: u16) -> bool {
    let there = || year.containers.iter().filter(|c| c.collected.is_none());
    if there().any(|c| c.until.is_some_and(|until| until <= day)) {
        return true;
    }
    let Some(most) = storage.kg.get(month_of(day).0).copied().flatten() else { return false };
    let mut kg = on_hand(year, lines);
    for line in lines {
        kg += rate(line, day) * line.density_kg_m3;
    }
    kg > most && there().next().is_some()
}

fn collect(year: &mut Calendar, lines: &[Line], open: &mut [Option<usize>], day: u16, interval: Option<u16>) {
    let (mut containers, mut kg) = (0, 0.0);
    let running = |c: &Container| match interval {
        // It could not wait for the next time.
        Some(days) => c.until.is_some_and(|until| until < day.saturating_add(days)),
        None => c.until.is_some(),
    };
    // Where only mass presses and nothing is full, what is open has to go.
    let any_full =
        year.containers.iter().any(|c| c.collected.is_none() && (c.closed.is_some() || running(c)));
    for c in year.containers.iter_mut().filter(|c| c.collected.is_none()) {
        if c.closed.is_none() && !running(c) && (any_full || interval.is_some()) {
            continue;
        }
        c.collected = Some(day);
        containers += 1;
        kg += c.m3 * lines.get(c.line).map_or(0.0, |l| l.density_kg_m3);
        if c.closed.is_none()
            && let Some(slot) = open.get_mut(c.line)
        {
            *slot = None;
        }
    }
    if containers > 0 {
        year.pick_ups.push(PickUp { day, containers, kg });
    }
}

fn fill(
    year: &mut Calendar,
    (l, line): (usize, &Line),
    storage: &Storage,
    open: &mut [Option<usize>],
    day: u16,
) {
    let limit = storage.days.get(month_of(day).0).copied().flatten();
    let mut left = rate(line, day);
    let Some(slot) = open.get_mut(l) else { return };
    if line.takes_m3 <= 0.0 || line.takes_m3.is_nan() {
        return;
    }
    while left > line.takes_m3 * (1.0 - FULL) {
        if year.containers.len() >= MOST {
            return;
        }
        let at = *slot.get_or_insert_with(|| {
            let from = (line.clock == Clock::FirstDrop).then_some(day);
            year.containers.push(Container {
                line: l,
                opened: day,
                closed: None,
                from,
                until: None,
                collected: None,
                m3: 0.0,
            });
            year.containers.len() - 1
        });
        let Some(c) = year.containers.get_mut(at) else { return };
        let room = line.takes_m3 - c.m3;
        let poured = if left < room { left } else { room };
        c.m3 += poured;
        left -= poured;
        if c.m3 >= line.takes_m3 * FULL {
            c.closed = Some(day);
            c.from = c.from.or(Some(day));
            *slot = None;
        }
        // The shortest limit of any month in which it filled.
        if let (Some(from), Some(days)) = (c.from, limit) {
            let until = from.saturating_add(days);
            c.until = Some(c.until.map_or(until, |known| if known < until { known } else { until }));
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn line(m3_a_month: f64, takes_m3: f64, clock: Clock) -> Line {
        Line { name: "x".into(), m3: [m3_a_month; 12], density_kg_m3: 1000.0, takes_m3, clock }
    }

    const NONE: Storage = Storage { days: [None; 12], kg: [None; 12] };

    /// 737 L a year in 20 L cans filled to 90 %: 40.9, so 41 containers, not twelve times four.
    #[test]
    fn containers_are_carried_over_the_months() {
        let year = simulate(&[line(0.737 / 12.0, 0.018, Clock::FirstDrop)], &NONE, PickUps::Every(30));
        assert_eq!(year.containers.len(), 41);
        let held: f64 = year.containers.iter().map(|c| c.m3).sum();
        assert!((held - 0.737).abs() < 1e-9);
    }

    /// A 200 L drum that takes 180 L at 90 L a month is full after about 61 days. With two pick-ups a year and only full drums sent,
    /// the first drop of a drum can be more than 180 days old: the interval must show it.
    #[test]
    fn an_interval_longer_than_the_limit_is_a_breach() {
        let storage = Storage { days: [Some(180); 12], kg: [None; 12] };
        let late = simulate(&[line(0.09, 0.18, Clock::FirstDrop)], &storage, PickUps::Every(182));
        assert!(!late.too_long.is_empty());
        let fewest = simulate(&[line(0.09, 0.18, Clock::FirstDrop)], &storage, PickUps::Fewest);
        assert!(fewest.too_long.is_empty());
        // 365 days from the first drop at 180 days each: two pick-ups, on days 180 and 360
        assert_eq!(fewest.pick_ups.iter().map(|p| p.day).collect::<Vec<_>>(), [180, 360]);
    }

    /// In a satellite area time counts from the full container: filled on day 60, it may stay until day 240.
    #[test]
    fn a_satellite_container_counts_from_full() {
        let storage = Storage { days: [Some(180); 12], kg: [None; 12] };
        let year = simulate(&[line(0.09, 0.18, Clock::WhenFull)], &storage, PickUps::Fewest);
        let first = &year.containers[0];
        assert_eq!((first.opened, first.from, first.until), (0, first.closed, first.closed.map(|d| d + 180)));
        assert_eq!(year.pick_ups[0].day, first.until.unwrap());
    }

    /// Three streams, none of which fills its 200 L drum before together they hold 55 gal = 208.2 L: the fullest leaves then.
    #[test]
    fn more_than_55_gallons_leave_the_satellite_area() {
        let storage = Storage { days: [Some(180); 12], kg: [None; 12] };
        let lines = [0.03, 0.02, 0.01].map(|m3| line(m3, 0.19, Clock::WhenFull));
        let year = simulate(&lines, &storage, PickUps::Fewest);
        // 0.06 m³ a month: 0.2082 m³ are there after about 3.5 months, day 105
        let (day, at) = year.excess[0];
        assert!((102..=108).contains(&day), "{day}");
        let first = &year.containers[at];
        assert_eq!((first.line, first.from, first.until), (0, Some(day), Some(day + 180)));
        // On no day do open containers hold more at its end.
        for day in 0..YEAR {
            let mut open = 0.0;
            for c in year
                .containers
                .iter()
                .filter(|c| c.closed.is_none_or(|closed| closed > day) && c.opened <= day)
            {
                // What it holds by then, in equal parts of a month.
                let (mut m3, mut d) = (0.0, c.opened);
                while d <= day {
                    m3 += rate(&lines[c.line], d);
                    d += 1;
                }
                open += if m3 < 0.19 { m3 } else { 0.19 };
            }
            assert!(open <= SATELLITE_M3 + 2e-3, "{open} on day {day}");
        }
        // One drum alone is full before: nothing is in excess.
        assert_eq!(simulate(&lines[..1], &storage, PickUps::Fewest).excess, []);
        // At first drop there is no satellite area.
        let central = lines.map(|l| Line { clock: Clock::FirstDrop, ..l });
        assert_eq!(simulate(&central, &storage, PickUps::Fewest).excess, []);
    }

    /// 1000 kg on site at 300 kg a month is reached in the fourth month, whatever the time.
    #[test]
    fn mass_on_site_asks_for_a_pick_up() {
        let storage = Storage { days: [None; 12], kg: [Some(1000.0); 12] };
        let year = simulate(&[line(0.3, 0.05, Clock::FirstDrop)], &storage, PickUps::Fewest);
        assert!(year.too_much.is_empty());
        let most = year.on_hand_kg.iter().fold(0.0, |most, kg| if *kg > most { *kg } else { most });
        assert!(most <= 1000.0 && most > 950.0, "{most}");
        // 3 600 kg a year, at most about 1 000 kg at a time
        assert_eq!(year.pick_ups.len(), 3);
    }

    /// The greedy calendar against every calendar with fewer pick-ups, by brute force over coarse days.
    #[test]
    fn nobody_does_with_fewer() {
        let storage = Storage { days: [Some(90); 12], kg: [None; 12] };
        let lines = [line(0.01, 0.018, Clock::WhenFull), line(0.013, 0.018, Clock::WhenFull)];
        let greedy = simulate(&lines, &storage, PickUps::Fewest);
        let must: Vec<(u16, u16)> = greedy
            .containers
            .iter()
            .filter_map(|c| Some((c.closed?, c.until?)))
            .filter(|(_, until)| *until < YEAR)
            .collect();
        assert!(must.len() > 10 && greedy.too_long.is_empty());
        let fewer = greedy.pick_ups.len() - 1;
        let stabs = |days: &[u16]| must.iter().all(|(a, b)| days.iter().any(|d| a < d && d <= b));
        // Only last days need be tried: any calendar can be moved later to them.
        let last: Vec<u16> = must.iter().map(|m| m.1).collect();
        let mut tried = 0_u32;
        let mut pick = vec![0_usize; fewer];
        loop {
            let days: Vec<u16> = pick.iter().map(|i| last[*i]).collect();
            assert!(!stabs(&days), "{days:?}");
            tried += 1;
            let Some(i) = (0..fewer).rev().find(|i| pick[*i] + 1 < last.len()) else { break };
            pick[i] += 1;
            let from = pick[i];
            pick[i + 1..].fill(from);
        }
        assert!(tried > 50, "{tried}");
    }
}
