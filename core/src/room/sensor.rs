//! Which sensor sees what, and which is blind, as data.
//!
//! A monitor of oxygen reads 20.8 % when carbon dioxide is at its 8-hour limit and 20.3 % at its 15-minute limit; its first alarm,
//! 19.5 %, comes at 6.7 % of carbon dioxide. So it is no substitute. For gases that harm only by the oxygen they push out it is the right one.
use crate::source::{COMMON_PRACTICE, Source, Standing};

/// CAS number of carbon dioxide.
pub const CARBON_DIOXIDE_CAS: &str = "124-38-9";

/// A kind of sensor.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Sensor {
    /// Infrared sensor of carbon dioxide.
    CarbonDioxide,
    /// Sensor of oxygen.
    Oxygen,
    /// Sensor of combustible gas, in parts of the lower explosion limit.
    Combustible,
    /// Photoionisation detector or a sensor of the substance.
    Vapour,
}

impl Sensor {
    /// As a report names it.
    ///
    /// ```
    /// assert_eq!(thimbleworth::room::Sensor::CarbonDioxide.title(), "carbon dioxide sensor");
    /// ```
    #[must_use]
    pub const fn title(self) -> &'static str {
        match self {
            Self::CarbonDioxide => "carbon dioxide sensor",
            Self::Oxygen => "oxygen sensor",
            Self::Combustible => "combustible gas sensor",
            Self::Vapour => "photoionisation detector or a sensor of the substance",
        }
    }
}

/// What to hang on the wall for a gas or vapour.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct SensorAdvice {
    /// The sensor that sees it.
    pub sensor: Sensor,
    /// Sensors that do not see it in time.
    pub blind: &'static [Sensor],
    /// Alarm levels, fractions by volume, the lowest first; empty where they follow from the limits of the substance.
    pub alarms: &'static [f64],
    /// Where it hangs.
    pub place: &'static str,
    /// Why.
    pub why: &'static str,
    /// Where that comes from.
    pub source: Source,
}

static CARBON_DIOXIDE: SensorAdvice = SensorAdvice {
    sensor: Sensor::CarbonDioxide,
    blind: &[Sensor::Oxygen],
    // 8-hour limit, British and US 15-minute limits
    alarms: &[0.005, 0.015, 0.03],
    place: "near the floor, 30 to 50 cm up, in the room, the cylinder store and every pit, cellar or cold room beside it; readable from outside the door",
    why: "Carbon dioxide is toxic before oxygen falls: at the first alarm of an oxygen sensor, 19.5 %, there is 6.7 % of it, above the \
          4 % that are immediately dangerous. Cold gas pools low, so the mean of the room says too little.",
    source: Source::new(
        "recomputed from 20.9 % oxygen in air; height: common practice",
        Standing::Recomputed,
    ),
};

static ASPHYXIANT: SensorAdvice = SensorAdvice {
    sensor: Sensor::Oxygen,
    blind: &[Sensor::CarbonDioxide, Sensor::Combustible, Sensor::Vapour],
    alarms: &[],
    place: "at breathing height; for gas from the cold liquid and for argon also near the floor, for helium also near the ceiling; readable from outside the door",
    why: "The gas harms by the oxygen that it pushes out: alarms at 19.5 % and 18 % of oxygen.",
    source: COMMON_PRACTICE,
};

static FUEL_GAS: SensorAdvice = SensorAdvice {
    sensor: Sensor::Combustible,
    blind: &[Sensor::Oxygen, Sensor::CarbonDioxide],
    alarms: &[],
    place: "near the floor for propane, butane and dimethyl ether, near the ceiling for methane",
    why: "The gas burns in air long before it pushes out enough oxygen for a sensor to see.",
    source: COMMON_PRACTICE,
};

static VAPOUR: SensorAdvice = SensorAdvice {
    sensor: Sensor::Vapour,
    blind: &[Sensor::Oxygen, Sensor::CarbonDioxide],
    alarms: &[],
    place: "in the breathing zone, and near the floor where a spill can spread",
    why: "Limits for solvents lie at parts per million, where neither oxygen nor the sense of smell tells anything. Not every lamp ionises \
          every solvent: dichloromethane and chloroform need 11.7 eV.",
    source: COMMON_PRACTICE,
};

/// What to hang on the wall for a gas or vapour by its CAS number; a CAS number that is none of the known gases is taken for a
/// solvent's vapour.
///
/// ```
/// use thimbleworth::room::{CARBON_DIOXIDE_CAS, Sensor, sensor_advice};
/// let advice = sensor_advice(CARBON_DIOXIDE_CAS);
/// assert_eq!(advice.sensor, Sensor::CarbonDioxide);
/// assert!(advice.blind.contains(&Sensor::Oxygen));
/// assert_eq!(sensor_advice("7727-37-9").sensor, Sensor::Oxygen);
/// ```
#[must_use]
pub fn sensor_advice(cas: &str) -> &'static SensorAdvice {
    match cas {
        CARBON_DIOXIDE_CAS => &CARBON_DIOXIDE,
        "7727-37-9" | "7440-37-1" | "7440-59-7" => &ASPHYXIANT,
        // nitrogen, argon and helium above; propane, butane, dimethyl ether, methane
        "74-98-6" | "106-97-8" | "115-10-6" | "74-82-8" => &FUEL_GAS,
        _ => &VAPOUR,
    }
}
