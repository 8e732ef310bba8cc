//! The air of a room: how much of a gas or vapour stands in it, for how long, and against which limits.
//!
//! | file | what it holds |
//! | --- | --- |
//! | `concentration` | ppm, mg/m³ and volumes of gas by temperature and pressure |
//! | `schedule` | the room, its ventilation by the clock, and releases with their duration |
//! | `course` | the well-mixed box solved exactly, piece by piece: time course, averages, peak, times |
//! | `oxygen` | oxygen displaced: at once, mixed, ventilated |
//! | `sudden` | a cylinder or a spill let go at once; never averaged |
//! | `day` | calendar days |
//! | `limits` | exposure limits by substance, jurisdiction and date |
//! | `judge` | a figure held against a limit |
//! | `sensor` | which sensor sees what, and which is blind |
//!
//! A real room is not well mixed: cold carbon dioxide and solvent vapours lie on the floor and pool in pits, and a person
//! stands nearer to the source than the mean of the room. The mixing factor and the figures at once are there for that; none of
//! this replaces measurement in the breathing zone. Limits are help for a licensed person.
//!
//! ```
//! use thimbleworth::room::{Course, Release, Room, Ventilation, HOUR_S};
//! // 20 g of carbon dioxide a minute for an hour into 75 m³ at six air changes an hour, 20 °C
//! let room = Room { volume_m3: 75.0, background: 420e-6, mixing_factor: 1.0 };
//! let vent = Release::of_mass(0.0, HOUR_S, 1.2, 0.044_009_5, 293.15, 101_325.0)?;
//! let course = Course::new(&room, &Ventilation::steady(6.0 / HOUR_S)?, &[vent])?;
//! assert!((course.peak().1 * 1e6 - 1874.0).abs() < 1.0); // 420 + 1458 (1 − e⁻⁶)
//! # Ok::<(), thimbleworth::room::RoomError>(())
//! ```
mod concentration;
mod course;
mod day;
mod error;
mod judge;
mod limits;
mod oxygen;
mod schedule;
mod sensor;
mod sudden;

pub use concentration::{
    GAS_CONSTANT_J_MOL_K, fraction_of, gas_volume_m3, mass_concentration_kg_m3, saturation_fraction,
};
pub use course::Course;
pub use day::{Day, DayError};
pub use error::RoomError;
pub use judge::{Exposure, Judgement, judge, judge_sudden};
pub use limits::{
    Jurisdiction, LIMITS_CAUTION, Limit, LimitKind, LimitNote, LimitState, LimitUnit, Limits, Uses, Why,
    all_limits, limit_faults, limits,
};
pub use oxygen::{
    OXYGEN_ALARM_FIRST, OXYGEN_ALARM_SECOND, OXYGEN_DISPLACED, OXYGEN_VENTILATED, gas_fraction_at_oxygen,
    oxygen_at_once, oxygen_beside, oxygen_mixed, oxygen_ventilated,
};
pub use schedule::{Release, Room, Setting, Ventilation};
pub use sensor::{CARBON_DIOXIDE_CAS, Sensor, SensorAdvice, sensor_advice};
pub use sudden::Sudden;

/// Seconds in an hour, by definition: air changes are told by the hour and kept by the second.
pub const HOUR_S: f64 = 3600.0;
