//! Usual powers of bench apparatus. All of them are from memory: they help to see that a stated power is of the right size, and stand in
//! for it only where a report says so.
use crate::source::{FROM_MEMORY, Source};

/// The usual range of an apparatus.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Power {
    /// A short, stable key.
    pub key: &'static str,
    /// Its name.
    pub title: &'static str,
    /// The lower end of what is usual, W.
    pub low_w: f64,
    /// The upper end, W.
    pub high_w: f64,
    /// What the range covers.
    pub covers: &'static str,
    /// Where it comes from.
    pub source: Source,
}

impl Power {
    /// The middle of the range, W.
    ///
    /// ```
    /// assert_eq!(thimbleworth::heat::power("rotary evaporator").unwrap().middle_w(), 1400.0);
    /// ```
    #[must_use]
    pub fn middle_w(&self) -> f64 {
        (self.low_w + self.high_w) / 2.0
    }

    /// Whether a stated power is within the range.
    #[must_use]
    pub fn holds(&self, power_w: f64) -> bool {
        self.low_w <= power_w && power_w <= self.high_w
    }
}

const fn usual(key: &'static str, title: &'static str, range_w: [f64; 2], covers: &'static str) -> Power {
    let [low_w, high_w] = range_w;
    Power { key, title, low_w, high_w, covers, source: FROM_MEMORY }
}

const AT_FULL: &str = "plate power at full draw; a thermostat draws it for a part of the time";

/// The apparatus, in the order of a report.
///
/// ```
/// use thimbleworth::heat::POWERS;
/// assert!(POWERS.iter().all(|p| p.low_w <= p.high_w && p.source.standing.words() == "from memory"));
/// ```
pub static POWERS: [Power; 13] = [
    usual("heating mantle", "Heating mantle, 500 mL", [150.0, 300.0], AT_FULL),
    usual("rotary evaporator", "Rotary evaporator with its bath", [1300.0, 1500.0], AT_FULL),
    usual(
        "chiller",
        "Recirculating chiller",
        [500.0, 1500.0],
        "compressor and circulation pump at full draw",
    ),
    usual("vacuum pump", "Vacuum pump", [200.0, 400.0], "running"),
    usual(
        "ultrasonic bath",
        "Ultrasonic bath",
        [100.0, 400.0],
        "plate power; a part of it arrives in the vessel",
    ),
    usual(
        "ultrasonic probe",
        "Ultrasonic probe",
        [300.0, 750.0],
        "plate power; pulses draw it for a part of the time",
    ),
    usual("microwave", "Microwave oven for extraction", [1000.0, 1600.0], "magnetron at full power"),
    usual("pressurised liquid extractor", "Pressurised liquid extractor", [500.0, 800.0], AT_FULL),
    usual(
        "supercritical extractor",
        "Carbon dioxide pump, chiller and oven together",
        [1000.0, 2000.0],
        AT_FULL,
    ),
    usual("nitrogen evaporator", "Nitrogen evaporator with its block", [500.0, 800.0], AT_FULL),
    usual("oven", "Drying oven", [800.0, 1500.0], AT_FULL),
    usual("water bath", "Water bath", [500.0, 1500.0], AT_FULL),
    usual("shaker", "Shaker or stirrer", [20.0, 150.0], "running"),
];

/// The usual range by its key.
///
/// ```
/// let mantle = thimbleworth::heat::power("heating mantle").unwrap();
/// assert!(mantle.holds(250.0) && !mantle.holds(2500.0));
/// assert!(thimbleworth::heat::power("cyclotron").is_none());
/// ```
#[must_use]
pub fn power(key: &str) -> Option<&'static Power> {
    POWERS.iter().find(|power| power.key == key)
}
