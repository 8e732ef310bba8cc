//! The air of the room: what the postings release into it, how it stands through a day of work, against which limits; what a
//! cylinder that lets go does.
//!
//! Catastrophic figures are never softened by averaging: a sudden release stands by itself, at once and mixed.

use crate::ledger::{Material, Place, Posting, Trace};
use crate::material::Substance;
use crate::plan::Problem;
use crate::program::{RoomUse, RouteProgram, SiteUse};
use crate::room::{
    CARBON_DIOXIDE_CAS, Course, Day, Exposure, HOUR_S, Jurisdiction, Limit, LimitKind, Limits, Release,
    RoomError, SensorAdvice, Sudden, Uses, Ventilation, judge, judge_sudden, limits, oxygen_beside,
    sensor_advice,
};

/// The pressure of the air; Pa.
const AIR_PA: f64 = 101_325.0;
/// What outdoor air holds of carbon dioxide, fraction by volume.
const CO2_OUTDOORS: f64 = 420e-6;
/// A shift, s.
pub const SHIFT_S: f64 = 8.0 * HOUR_S;
/// Puffs that are told apart on a day; more are spread evenly.
const MOST_PUFFS: u32 = 48;

/// One posting into the air of hood or room, as it falls on a day of work.
#[derive(Clone, Debug, PartialEq)]
pub struct AirRelease {
    /// The index of the posting in the trace.
    pub posting: usize,
    /// Mass that reaches the room on a day; kg.
    pub room_kg: f64,
    /// How long it lasts on a day, from the start of the work; s. `None` where nobody says: at once.
    pub over_s: Option<f64>,
    /// Runs on that day.
    pub runs: f64,
}

/// A figure beside a limit that holds.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Held {
    /// The limit.
    pub limit: &'static Limit,
    /// What it allows, fraction by volume.
    pub allowed: f64,
    /// The figure by day as the plan ventilates the room, fraction by volume.
    pub found: f64,
    /// The same with ventilation on setback all the time.
    pub on_setback: Option<f64>,
}

impl Held {
    /// Whether either figure is above what the limit allows.
    #[must_use]
    pub fn is_passed(&self) -> bool {
        self.found > self.allowed || self.on_setback.is_some_and(|x| x > self.allowed)
    }
}

/// One gas or vapour in the room.
#[derive(Clone, Debug)]
pub struct GasInRoom {
    /// The material.
    pub material: Material,
    /// Its name.
    pub name: String,
    /// What of it is released on a day of work.
    pub releases: Vec<AirRelease>,
    /// What the incoming air holds, fraction by volume.
    pub background: f64,
    /// The time course from the start of the work.
    pub course: Course,
    /// Its figures.
    pub exposure: Exposure,
    /// Mean over the first eight hours.
    pub shift: f64,
    /// The same with ventilation on setback all the time, where the plan has a setback: course, figures, mean over the first eight hours.
    pub on_setback: Option<(Course, Exposure, f64)>,
    /// Oxygen at the highest figure, fraction by volume.
    pub oxygen: f64,
    /// Limits that hold on the plan's date.
    pub held: Vec<Held>,
    /// Limits on other dates or not in force, each with its reason.
    pub notes: Vec<(&'static Limit, String)>,
    /// What sees it, and what is blind.
    pub sensor: &'static SensorAdvice,
}

/// A cylinder that lets go in a closed room.
#[derive(Clone, Debug)]
pub struct SuddenInRoom {
    /// Where: the room, or the store of cylinders.
    pub place: &'static str,
    /// The gas.
    pub name: String,
    /// Its mass; kg.
    pub mass_kg: f64,
    /// What the air holds then.
    pub sudden: Sudden,
    /// The level that is immediately dangerous, where the table has one: fraction by volume.
    pub idlh: Option<(&'static Limit, f64)>,
    /// How long ventilation takes, where there is any and a limit to come under.
    pub clears: Option<Clears>,
}

/// How long ventilation takes to bring a room under a limit: from the mixed figure and from the one at once; s. `None` where it never does.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Clears {
    /// The lowest 8-hour mean that holds, fraction by volume.
    pub limit: f64,
    /// By day.
    pub by_day: Option<[f64; 2]>,
    /// On setback.
    pub on_setback: Option<[f64; 2]>,
}

/// The air of the room on one route.
#[derive(Clone, Debug)]
pub struct AirAccount {
    /// Gases and vapours, in the order of the route's materials.
    pub gases: Vec<GasInRoom>,
    /// What a cylinder does.
    pub sudden: Vec<SuddenInRoom>,
}

/// What has to be told of the air: limits that are passed, gas that is immediately dangerous when a cylinder lets go.
pub(super) fn tell(air: &AirAccount, route: &str, problems: &mut Vec<Problem>) {
    for gas in &air.gases {
        // One line a gas: the limit that is passed by most.
        let mut worst: Option<(&Held, f64)> = None;
        for held in gas.held.iter().filter(|h| h.is_passed()) {
            let found = held.on_setback.filter(|x| *x > held.found).unwrap_or(held.found);
            if worst.is_none_or(|(_, share)| found / held.allowed > share) {
                worst = Some((held, found / held.allowed));
            }
        }
        if let Some((held, share)) = worst {
            let found = format!(
                "{route}: {} in the air of the room comes to {} times what {} allows as {}{}",
                gas.name,
                crate::quantity::significant(share, 2),
                held.limit.jurisdiction.title(),
                held.limit.kind.title(),
                if held.found > held.allowed { "" } else { " while ventilation is set back" }
            );
            problems.push(Problem::warning(
                "site.room",
                found,
                "a hood or a duct for the vent, more air, fewer runs at once, or another hour; then a measurement in the breathing zone",
            ));
        }
    }
    for s in &air.sudden {
        if let Some((_, idlh)) = s.idlh.filter(|(_, idlh)| s.sudden.worst() > *idlh) {
            let found = format!(
                "a cylinder of {} that lets go in {} brings {} times what is immediately dangerous to life",
                s.name,
                s.place,
                crate::quantity::significant(s.sudden.worst() / idlh, 2)
            );
            let warning = Problem::warning(
                "site.room.cylinder",
                found,
                "cylinders outside or in a ventilated store, a sensor low down that alarms before anybody enters; an oxygen alarm is blind to carbon dioxide",
            );
            // The same for every route.
            if !problems.contains(&warning) {
                problems.push(warning);
            }
        }
    }
}

/// Draws up the air of the room; `None` without a room.
pub(super) fn air(route: &RouteProgram, site: &SiteUse, trace: &Trace) -> Option<AirAccount> {
    let room = site.room.as_ref()?;
    let as_of = site.as_of.as_deref().and_then(|text| Day::parse(text).ok());
    let gases = (0..route.materials.len())
        .filter_map(|i| u16::try_from(i).ok().map(Material))
        .filter_map(|m| gas(route, site, room, as_of, trace, m))
        .collect();
    let mut sudden = Vec::new();
    if let Some((mass_kg, substance)) = &room.cylinder {
        let mut add = |place, volume_m3, ventilated| {
            sudden.extend(let_go((place, volume_m3, ventilated), site, room, as_of, *mass_kg, substance));
        };
        add("the room", room.volume_m3, true);
        if let Some(store_m3) = room.store_m3 {
            add("the cylinder store", store_m3, false);
        }
    }
    Some(AirAccount { gases, sudden })
}

fn gas(
    route: &RouteProgram,
    site: &SiteUse,
    room: &RoomUse,
    as_of: Option<Day>,
    trace: &Trace,
    material: Material,
) -> Option<GasInRoom> {
    let used = route.materials.get(material.0 as usize)?;
    let molar_mass = used.substance.molar_mass_kg_mol.as_ref()?.value;
    let cas = used.substance.cas.as_deref().unwrap_or_default();
    let mut releases = Vec::new();
    let mut into = Vec::new();
    for (posting, p) in trace.postings.iter().enumerate() {
        let reaches = match p.to {
            Place::ROOM => 1.0,
            Place::HOOD => 1.0 - room.hood_capture,
            _ => 0.0,
        };
        if p.material != material || p.kg <= 0.0 || reaches <= 0.0 {
            continue;
        }
        let release = on_a_day(p, posting, room, reaches);
        spread(&release, room, (molar_mass, site.bench_temperature_k), &mut into).ok()?;
        releases.push(release);
    }
    if releases.is_empty() {
        return None;
    }
    let background = if cas == CARBON_DIOXIDE_CAS { CO2_OUTDOORS } else { 0.0 };
    let as_box = room.as_box(background);
    let course = Course::new(&as_box, &room.ventilation().ok()?, &into).ok()?;
    let exposure = Exposure::of(&course);
    let on_setback = room.setback_per_s.and_then(|n| {
        let course = Course::new(&as_box, &Ventilation::steady(n).ok()?, &into).ok()?;
        let exposure = Exposure::of(&course);
        let shift = course.mean(0.0, SHIFT_S);
        Some((course, exposure, shift))
    });
    let all = as_of.map_or(Limits { hold: Vec::new(), notes: Vec::new() }, |day| limits(cas, day));
    let concerns = |l: &&'static Limit| concerns(site, l);
    let mut held = Vec::new();
    for limit in all.hold.into_iter().filter(concerns) {
        let (Ok(by_day), other) = (
            judge(limit, molar_mass, &exposure),
            on_setback.as_ref().map(|(_, e, _)| judge(limit, molar_mass, e)),
        ) else {
            continue;
        };
        held.push(Held {
            limit,
            allowed: by_day.allowed,
            found: by_day.found,
            on_setback: other.and_then(Result::ok).map(|j| j.found),
        });
    }
    let notes = all
        .notes
        .iter()
        .filter(|n| self::concerns(site, n.limit))
        .map(|n| (n.limit, n.why.to_string()))
        .collect();
    let highest = on_setback
        .as_ref()
        .map_or(exposure.peak, |(_, e, _)| if e.peak > exposure.peak { e.peak } else { exposure.peak });
    Some(GasInRoom {
        material,
        name: used.name.clone(),
        releases,
        background,
        shift: course.mean(0.0, SHIFT_S),
        exposure,
        course,
        on_setback,
        oxygen: oxygen_beside(if highest < 1.0 { highest } else { 1.0 }).ok()?,
        held,
        notes,
        sensor: sensor_advice(cas),
    })
}

/// Limits of the jurisdictions of the site's rules, for its kind of work.
fn concerns(site: &SiteUse, limit: &Limit) -> bool {
    let us = !matches!(limit.jurisdiction, Jurisdiction::Eu | Jurisdiction::Uk);
    let here = match site.rules.as_str() {
        "US" => us,
        "EU" => !us,
        _ => true,
    };
    let laboratory = site.waste.activity == crate::code::Activity::Laboratory;
    here && !(laboratory && matches!(limit.uses, Uses::NotLaboratory | Uses::Exempted))
}

/// How a posting falls on a day: the year's runs spread over the days of work, never less than one run where it happens at all.
fn on_a_day(p: &Posting, posting: usize, room: &RoomUse, reaches: f64) -> AirRelease {
    let a_day = p.runs_a_year / room.work_days;
    let runs = if a_day < 1.0 { 1.0 } else { a_day };
    let side = if runs < room.at_once { runs } else { room.at_once };
    // rounds one after another, each as long as a run
    let over_s = p.over_s.filter(|s| *s > 0.0).map(|s| s * runs / side);
    AirRelease { posting, room_kg: p.kg * reaches * runs, over_s, runs }
}

/// The releases of a day as the box takes them: evenly over their time, or as puffs, one for each round over the shift.
fn spread(
    release: &AirRelease,
    room: &RoomUse,
    (molar_mass, temperature_k): (f64, f64),
    into: &mut Vec<Release>,
) -> Result<(), RoomError> {
    let mut add = |from_s, duration_s, kg| {
        into.push(Release::of_mass(from_s, duration_s, kg, molar_mass, temperature_k, AIR_PA)?);
        Ok(())
    };
    if let Some(over_s) = release.over_s {
        return add(0.0, over_s, release.room_kg);
    }
    let side = if release.runs < room.at_once { release.runs } else { room.at_once };
    let rounds = libm::ceil(release.runs / side - 1e-9);
    let each_kg = release.room_kg / rounds;
    if rounds > f64::from(MOST_PUFFS) {
        // More than need be told apart: one puff of a round, the rest evenly.
        add(0.0, 0.0, each_kg)?;
        return add(0.0, SHIFT_S, release.room_kg - each_kg);
    }
    for i in (0..MOST_PUFFS).map(f64::from).take_while(|i| *i < rounds) {
        add(SHIFT_S * i / rounds, 0.0, each_kg)?;
    }
    Ok(())
}

fn let_go(
    (place, volume_m3, ventilated): (&'static str, f64, bool),
    site: &SiteUse,
    room: &RoomUse,
    as_of: Option<Day>,
    mass_kg: f64,
    substance: &Substance,
) -> Option<SuddenInRoom> {
    let molar_mass = substance.molar_mass_kg_mol.as_ref()?.value;
    let cas = substance.cas.as_deref().unwrap_or_default();
    let sudden = Sudden::of_mass(mass_kg, molar_mass, site.bench_temperature_k, AIR_PA, volume_m3).ok()?;
    let all = as_of.map_or(Limits { hold: Vec::new(), notes: Vec::new() }, |day| limits(cas, day));
    let mut idlh: Option<(&'static Limit, f64)> = None;
    let mut lowest: Option<f64> = None;
    for limit in all.hold.iter().copied().filter(|l| concerns(site, l) || l.kind == LimitKind::Idlh) {
        let Ok(j) = judge_sudden(limit, molar_mass, &sudden) else { continue };
        match limit.kind {
            LimitKind::Idlh if idlh.is_none_or(|(_, x)| j.allowed < x) => idlh = Some((limit, j.allowed)),
            LimitKind::Twa if lowest.is_none_or(|x| j.allowed < x) => lowest = Some(j.allowed),
            _ => {}
        }
    }
    let background = if cas == CARBON_DIOXIDE_CAS { CO2_OUTDOORS } else { 0.0 };
    let clears = lowest.filter(|_| ventilated).map(|limit| {
        let time = |n: f64| sudden.time_to_fall_under_s(limit, background, room.mixing * n).ok().flatten();
        Clears { limit, by_day: time(room.air_changes_per_s), on_setback: room.setback_per_s.and_then(time) }
    });
    Some(SuddenInRoom { place, name: substance.name.to_string(), mass_kg, sudden, idlh, clears })
}
