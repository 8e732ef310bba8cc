//! The air of the room as tables for report, terminal and page.

use super::energy::Sheet;
use crate::account::{AirAccount, GasInRoom, RouteAccount, SuddenInRoom, rule_of};
use crate::ledger::StepIx;
use crate::program::{RoomUse, RouteProgram, SiteUse};
use crate::quantity::{Kind, show, significant};
use crate::room::{LIMITS_CAUTION, LimitKind};

/// A fraction by volume as people say it: ppm, and per cent from one per cent on. What is below a thousandth of a ppm is only said to be so.
///
/// ```
/// use thimbleworth::report::by_volume;
/// assert_eq!([0.05, 5e-5, 6.72e-29, 0.0].map(by_volume), ["5 %", "50 ppm", "< 0.001 ppm", "0 ppm"]);
/// ```
#[must_use]
pub fn by_volume(x: f64) -> String {
    if x > 0.0 && x < 1e-9 {
        "< 0.001 ppm".to_owned()
    } else if x >= 0.01 {
        format!("{} %", significant(x * 100.0, 3))
    } else {
        format!("{} ppm", significant(x * 1e6, 4))
    }
}

/// The tables of the room's air on one route: what reaches it, how it stands, against which limits, what a cylinder does. Empty
/// without a room.
///
/// ```
/// use thimbleworth::{account::account_text, example::EXAMPLES, report::air_sheets};
/// let account = account_text(EXAMPLES[0].text);
/// let program = account.program.as_ref().unwrap();
/// let route = &program.workloads[0].routes[0];
/// let sheets = air_sheets(&program.site, route, account.workloads[0].routes[0].as_ref().unwrap());
/// assert_eq!(sheets[0].title, "Air of the room on a day of work");
/// ```
#[must_use]
pub fn air_sheets(site: &SiteUse, route: &RouteProgram, account: &RouteAccount) -> Vec<Sheet> {
    let (Some(room), Some(air)) = (&site.room, &account.air) else { return Vec::new() };
    let mut sheets = Vec::new();
    if !air.gases.is_empty() {
        sheets.push(standing(room, air));
        let limits = against_limits(air);
        if !limits.rows.is_empty() {
            sheets.push(limits);
        }
        sheets.push(reaches(route, account, air));
    }
    if !air.sudden.is_empty() {
        sheets.push(let_go(&air.sudden));
    }
    sheets
}

fn standing(room: &RoomUse, air: &AirAccount) -> Sheet {
    let mut rows = Vec::new();
    let mut notes = vec![format!(
        "Well-mixed box of {} at {} by day{}, mixing factor {}; the hood captures {}. All steps start together and follow run upon run until the \
         day's work is done; what nobody gives a time for goes at once. V dC/dt = G − k Q (C − C₀), solved exactly.",
        show(room.volume_m3, Kind::Volume),
        show(room.air_changes_per_s, Kind::Frequency),
        room.setback_per_s.map_or(String::new(), |n| format!(" and {} on setback", show(n, Kind::Frequency))),
        significant(room.mixing, 2),
        show(room.hood_capture, Kind::Fraction),
    )];
    for gas in &air.gases {
        let mut kg = 0.0;
        for release in &gas.releases {
            kg += release.room_kg;
        }
        let mut row = vec![
            gas.name.clone(),
            show(kg, Kind::Mass),
            by_volume(gas.shift),
            by_volume(gas.exposure.worst_8h),
            by_volume(gas.exposure.worst_15min),
            by_volume(gas.exposure.peak),
        ];
        match &gas.on_setback {
            Some((_, e, shift)) => {
                row.extend([by_volume(*shift), by_volume(e.worst_15min), by_volume(e.peak)]);
            }
            None => row.extend([String::new(), String::new(), String::new()]),
        }
        row.push(show(gas.oxygen, Kind::Fraction));
        rows.push(row);
        notes.extend(said_of(gas));
    }
    notes.push("A person stands nearer to the source than the mean of the room, and heavy vapour and cold gas lie on the floor.".to_owned());
    if let Some(low) = &room.low_spaces {
        notes.push(format!("Low-lying: {low}. Gas gathers there whatever the mean of the room: measure before anybody goes in."));
    }
    let mut sheet = Sheet {
        title: "Air of the room on a day of work".to_owned(),
        head: vec![
            "gas",
            "into the room",
            "mean of 8 h",
            "worst 8 h",
            "worst 15 min",
            "highest",
            "setback: 8 h",
            "15 min",
            "highest ",
            "oxygen then",
        ],
        rows,
        notes,
    };
    sheet.without_empty_columns();
    sheet
}

/// What has to be said of one gas: passed levels that a mean hides, the sensor, what is beyond the equation.
fn said_of(gas: &GasInRoom) -> Vec<String> {
    let mut out = Vec::new();
    let courses =
        [Some((&gas.course, "as ventilated")), gas.on_setback.as_ref().map(|(c, ..)| (c, "on setback"))];
    for (course, how) in courses.into_iter().flatten() {
        let mut level: Option<f64> = None;
        for held in gas.held.iter().filter(|h| h.limit.kind == LimitKind::Twa) {
            if level.is_none_or(|x| held.allowed < x) {
                level = Some(held.allowed);
            }
        }
        if let Some(time_s) = level.and_then(|x| course.first_at(x)) {
            out.push(format!(
                "{}, {how}: the room passes {} after {}, whatever the mean; a longer run would fail it.",
                gas.name,
                level.map_or_else(String::new, by_volume),
                show(time_s, Kind::Time)
            ));
        }
        if course.is_beyond_the_equation() {
            out.push(format!(
                "{}, {how}: beyond what the equation can say; read it as a room full of gas.",
                gas.name
            ));
        }
    }
    let blind: Vec<&str> = gas.sensor.blind.iter().map(|s| s.title()).collect();
    out.push(format!(
        "{}: {} {}, {}. {}{}",
        gas.name,
        article(gas.sensor.sensor.title()),
        gas.sensor.sensor.title(),
        gas.sensor.place,
        gas.sensor.why,
        if blind.is_empty() { String::new() } else { format!(" Blind to it: {}.", blind.join(", ")) }
    ));
    out
}

/// "a" or "an", by the first letter, which the titles of sensors keep to.
fn article(title: &str) -> &'static str {
    if title.starts_with(['a', 'e', 'i', 'o', 'u']) { "an" } else { "a" }
}

fn against_limits(air: &AirAccount) -> Sheet {
    let (mut rows, mut notes) = (Vec::new(), vec![LIMITS_CAUTION.to_owned()]);
    for gas in &air.gases {
        for held in &gas.held {
            let limit = held.limit;
            rows.push(vec![
                gas.name.clone(),
                format!("{}, {}", limit.jurisdiction.title(), limit.kind.title()),
                by_volume(held.allowed),
                by_volume(held.found),
                held.on_setback.map_or_else(String::new, by_volume),
                if held.is_passed() { "passed" } else { "kept" }.to_owned(),
                limit.citation.to_owned(),
            ]);
        }
        if gas.held.is_empty() {
            notes.push(format!("{}: the table has no limit that holds here on this date, which does not mean that there is none.", gas.name));
        }
        for (limit, why) in &gas.notes {
            notes.push(format!(
                "{}: {}, {} of {} {} {why} ({}).",
                gas.name,
                limit.jurisdiction.title(),
                limit.kind.title(),
                significant(limit.value, 3),
                limit.unit.title(),
                limit.citation
            ));
        }
    }
    let mut sheet = Sheet {
        title: "Against exposure limits".to_owned(),
        head: vec!["gas", "limit", "allows", "as ventilated", "on setback", "verdict", "rule"],
        rows,
        notes,
    };
    sheet.without_empty_columns();
    sheet
}

fn reaches(route: &RouteProgram, account: &RouteAccount, air: &AirAccount) -> Sheet {
    let mut rows = Vec::new();
    for gas in &air.gases {
        for release in &gas.releases {
            let Some(p) = account.trace.postings.get(release.posting) else { continue };
            let step = match p.step {
                StepIx::Step(i) => {
                    format!("{} {}", i + 1, route.steps.get(usize::from(i)).map_or("", |s| s.technique.title))
                }
                StepIx::Opening | StepIx::Closing => "at the end".to_owned(),
            };
            rows.push(vec![
                gas.name.clone(),
                step,
                rule_of(route, p.step, p.rule).map_or("", |r| r.name).to_owned(),
                show(p.kg, Kind::Mass),
                p.over_s.map_or_else(|| "not said: at once".to_owned(), |s| show(s, Kind::Time)),
                significant(release.runs, 3),
                show(release.room_kg, Kind::Mass),
            ]);
        }
    }
    Sheet {
        title: "What reaches the room".to_owned(),
        head: vec!["gas", "step", "by", "to air in a run", "lasts", "runs a day", "into the room a day"],
        rows,
        notes: Vec::new(),
    }
}

fn let_go(sudden: &[SuddenInRoom]) -> Sheet {
    let mut rows = Vec::new();
    for s in sudden {
        let clears =
            |t: Option<[f64; 2]>| t.map_or_else(|| "never".to_owned(), |[mixed, _]| show(mixed, Kind::Time));
        rows.push(vec![
            s.place.to_owned(),
            format!("{} of {}", show(s.mass_kg, Kind::Mass), s.name),
            show(s.sudden.gas_m3, Kind::Volume),
            by_volume(s.sudden.at_once),
            by_volume(s.sudden.mixed),
            format!(
                "{} to {}",
                show(s.sudden.oxygen_at_once, Kind::Fraction),
                show(s.sudden.oxygen_mixed, Kind::Fraction)
            ),
            s.idlh.map_or_else(String::new, |(_, x)| {
                format!("{} times {}", significant(s.sudden.worst() / x, 2), by_volume(x))
            }),
            s.clears.map_or_else(String::new, |c| clears(c.by_day)),
            s.clears.map_or_else(String::new, |c| clears(c.on_setback)),
        ]);
    }
    let mut sheet = Sheet {
        title: "If a cylinder lets go".to_owned(),
        head: vec![
            "where", "what", "gas", "at once", "mixed", "oxygen", "against IDLH", "below the limit after", "on setback after",
        ],
        rows,
        notes: vec![
            "At once: the gas takes the place of its own volume of air; mixed: it mixes while air is pushed out. Never averaged over 15 minutes or 8 hours: people \
             die in the first minutes. Near the source and on the floor it can be pure gas."
                .to_owned(),
            "19.5 % of oxygen, the first alarm of an oxygen sensor, is 6.7 % of carbon dioxide: a carbon dioxide sensor near the floor, readable from outside, is \
             asked for."
                .to_owned(),
        ],
    };
    sheet.without_empty_columns();
    sheet
}

#[cfg(test)]
mod tests {
    use super::article;
    use crate::room::Sensor;

    #[test]
    fn a_sensor_has_its_article() {
        let of = |s: Sensor| article(s.title());
        assert_eq!([Sensor::Oxygen, Sensor::CarbonDioxide, Sensor::Vapour].map(of), ["an", "a", "a"]);
    }
}
