//! The room of the site as the account of its air needs it.

use crate::material::{Substance, catalogue};
use crate::plan::{Problem, Room, below};
use crate::quantity::{Kind, read, show};
use crate::room::{HOUR_S, Room as Box, RoomError, Ventilation};
use crate::source::{COMMON_PRACTICE, DEFINITION, FROM_MEMORY};
use crate::step::{Control, Need, Param};

/// What a plan may give of its room; the keys are those of the plan.
pub static ROOM_FIELDS: &[Param] = &[
    Param::quantity("volume", "Volume of the room", Kind::Volume).physical(1.0, 1e6).usual(20.0, 5000.0),
    Param::quantity("air_changes", "Air changes by day", Kind::Frequency)
        .physical(0.0, 0.1)
        .usual(0.2 / HOUR_S, 20.0 / HOUR_S)
        .hint("4 to 12 an hour is usual for laboratories; measure it, or ask who runs the plant."),
    Param::quantity("hood_capture", "Share that the hood captures", Kind::Fraction)
        .default("100 %", DEFINITION)
        .physical(0.0, 1.0)
        .usual(0.5, 1.0)
        .hint("The rest reaches the room."),
    Param::quantity("setback", "Air changes on setback", Kind::Frequency)
        .physical(0.0, 0.1)
        .usual(0.0, 12.0 / HOUR_S)
        .hint("By night and at weekends; left out, it is ventilated as by day."),
    Param::quantity("day_from", "Ventilated in full from", Kind::Time)
        .default("7 h", FROM_MEMORY)
        .physical(0.0, 86_400.0)
        .usual(0.0, 86_400.0)
        .hint("Hours after midnight."),
    Param::quantity("day_until", "Ventilated in full until", Kind::Time)
        .default("19 h", FROM_MEMORY)
        .physical(0.0, 86_400.0)
        .usual(0.0, 86_400.0)
        .hint("Hours after midnight."),
    Param::quantity("work_from", "Work starts at", Kind::Time)
        .default("8 h", COMMON_PRACTICE)
        .physical(0.0, 86_399.0)
        .usual(0.0, 86_399.0)
        .hint("Hours after midnight; \"18 h\" for a run that is left on overnight."),
    Param::quantity("work_days", "Days of work a year", Kind::Number)
        .default("230", COMMON_PRACTICE)
        .physical(1.0, 366.0)
        .usual(1.0, 366.0)
        .hint("The year's runs are spread over them."),
    Param::quantity("at_once", "Runs of a step side by side", Kind::Number)
        .default("1", DEFINITION)
        .physical(1.0, 1000.0)
        .usual(1.0, 100.0)
        .hint("Six Soxhlets on a bench are 6."),
    Param::quantity("mixing", "Mixing factor", Kind::Number)
        .default("1", DEFINITION)
        .physical(0.01, 1.0)
        .usual(0.1, 1.0)
        .hint("0.1 where air short-circuits from inlet to outlet, 1 where it mixes well."),
    Param::new("low_spaces", "Pits, ducts, cellars, cold rooms", Control::Text)
        .hint("Where heavy vapour and cold gas gather; it prints with the warning."),
    Param::quantity("cylinder", "Largest cylinder", Kind::Mass)
        .physical(0.0, 1e5)
        .usual(0.1, 1000.0)
        .hint("Its gas let go at once is held against what is immediately dangerous."),
    Param::new("cylinder_of", "Gas in it", Control::Material).default("carbon dioxide", DEFINITION),
    Param::quantity("store", "Volume of the cylinder store", Kind::Volume)
        .physical(0.1, 1e6)
        .usual(1.0, 1000.0)
        .hint("Where the same cylinder may let go too."),
];

/// A room whose air can be reckoned with.
#[derive(Clone, Debug, PartialEq)]
pub struct RoomUse {
    /// Volume of its air; m³.
    pub volume_m3: f64,
    /// Air changes by day; 1/s.
    pub air_changes_per_s: f64,
    /// Share of a release at the hood that the hood captures.
    pub hood_capture: f64,
    /// Air changes on setback; 1/s.
    pub setback_per_s: Option<f64>,
    /// From and until which time of the day it is ventilated in full; s.
    pub day_s: (f64, f64),
    /// At which time of the day the work starts; s.
    pub work_from_s: f64,
    /// Days of work a year.
    pub work_days: f64,
    /// Runs of a step side by side.
    pub at_once: f64,
    /// Mixing factor, 0 to 1.
    pub mixing: f64,
    /// Where heavy gas gathers, in the plan's words.
    pub low_spaces: Option<String>,
    /// The largest cylinder: mass in kg and what is in it.
    pub cylinder: Option<(f64, Substance)>,
    /// Volume of the store in which it stands; m³.
    pub store_m3: Option<f64>,
}

impl RoomUse {
    /// The room as a well-mixed box, with what the incoming air holds of a gas.
    #[must_use]
    pub const fn as_box(&self, background: f64) -> Box {
        Box { volume_m3: self.volume_m3, background, mixing_factor: self.mixing }
    }

    /// Its ventilation by the clock, from the start of the work on.
    ///
    /// # Errors
    /// [`RoomError`] where the hours of the day are none.
    pub fn ventilation(&self) -> Result<Ventilation, RoomError> {
        match self.setback_per_s {
            Some(setback) => Ventilation::with_setback(
                self.air_changes_per_s,
                setback,
                self.day_s.0,
                self.day_s.1,
                self.work_from_s,
                3,
            ),
            None => Ventilation::steady(self.air_changes_per_s),
        }
    }
}

/// Reads the room of a plan; what is wrong is told.
pub(super) fn room(doc: &Room, problems: &mut Vec<Problem>) -> Option<RoomUse> {
    let mut found = [None; 14];
    let mut sound = true;
    for (slot, p) in found.iter_mut().zip(ROOM_FIELDS) {
        let Control::Quantity(kind) = p.control else { continue };
        let path = below("site.room", p.key);
        let text = match (doc.get(p.key), p.need) {
            (Some(text), _) => text,
            (None, Need::Default(text, _)) => text,
            (None, _) => continue,
        };
        match read(text, kind) {
            Ok(amount) => {
                let si = amount.central_si;
                let limits =
                    |(low, high): (f64, f64)| format!("between {} and {}", show(low, kind), show(high, kind));
                if si < p.physical.0 || si > p.physical.1 {
                    let found = format!("{} is outside what is possible", amount.understood());
                    problems.push(Problem::error(path, found, limits(p.physical)));
                    sound = false;
                } else if si < p.usual.0 || si > p.usual.1 {
                    let found = format!("{} is unusual for {}", amount.understood(), p.label.to_lowercase());
                    problems.push(Problem::warning(
                        path,
                        found,
                        format!("{} is usual; leave it if it is right", limits(p.usual)),
                    ));
                }
                *slot = Some(si);
            }
            Err(e) => {
                problems.push(Problem::error(path, format!("\"{text}\": {}", e.found()), e.need()));
                sound = false;
            }
        }
    }
    let [volume, air, capture, setback, from, until, work_from, days, at_once, mixing, _, cylinder, _, store] =
        found;
    let gas = doc.get("cylinder_of").unwrap_or("carbon dioxide");
    let substance = catalogue().find(gas).ok().filter(|s| s.molar_mass_kg_mol.is_some()).cloned();
    if cylinder.is_some() && substance.is_none() {
        let found = format!("nothing is known of \"{gas}\" that would say how much room it takes");
        problems.push(Problem::error("site.room.cylinder_of", found, "a gas of the catalogue"));
        sound = false;
    }
    if let (Some(setback_from), Some(until)) = (from, until)
        && until <= setback_from
    {
        problems.push(Problem::error(
            "site.room.day_until",
            "the room is ventilated in full until an hour before it begins",
            "an hour after day_from",
        ));
        sound = false;
    }
    let (Some(volume_m3), Some(air_changes_per_s)) = (volume, air) else {
        if sound {
            problems.push(Problem::note(
                "site.room",
                "without volume and air_changes no figure of the room's air is given",
            ));
        }
        return None;
    };
    sound.then(|| RoomUse {
        volume_m3,
        air_changes_per_s,
        hood_capture: capture.unwrap_or(1.0),
        setback_per_s: setback,
        day_s: (from.unwrap_or(0.0), until.unwrap_or(86_400.0)),
        work_from_s: work_from.unwrap_or(0.0),
        work_days: days.unwrap_or(230.0),
        at_once: at_once.unwrap_or(1.0),
        mixing: mixing.unwrap_or(1.0),
        low_spaces: doc.get("low_spaces").map(str::to_owned),
        cylinder: cylinder.zip(substance),
        store_m3: store,
    })
}
