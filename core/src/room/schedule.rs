//! The room, its ventilation by the clock, and releases with their duration.
use super::concentration::gas_volume_m3;
use super::error::{RoomError, fraction, not_negative, positive};

/// A room as a well-mixed box.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Room {
    /// Free volume of air, m³.
    pub volume_m3: f64,
    /// What the incoming air holds of the gas, fraction by volume; about 420e-6 for carbon dioxide outdoors.
    pub background: f64,
    /// Mixing factor k from above 0 to 1: the share of the ventilation that reaches the gas. 1 is perfect mixing; 0.1 to
    /// 0.3 is usual for poor mixing (from memory).
    pub mixing_factor: f64,
}

impl Room {
    pub(super) fn checked(&self) -> Result<(f64, f64, f64), RoomError> {
        let k = positive("mixing factor", fraction("mixing factor", self.mixing_factor)?)?;
        Ok((positive("volume of the room", self.volume_m3)?, fraction("background", self.background)?, k))
    }
}

/// Ventilation from a time on.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Setting {
    /// When it starts, s after the start of the course.
    pub from_s: f64,
    /// Air changes per second (six an hour is 6/3600).
    pub air_changes_per_s: f64,
}

/// Ventilation by the clock: each setting holds until the next, the last one for ever.
#[derive(Clone, Debug, PartialEq)]
pub struct Ventilation {
    settings: Vec<Setting>,
}

impl Ventilation {
    /// Settings in order of time, the first at 0 s.
    ///
    /// # Errors
    /// [`RoomError::NoSetting`], [`RoomError::SettingsOutOfOrder`] or [`RoomError::Negative`] air changes.
    pub fn new(settings: Vec<Setting>) -> Result<Self, RoomError> {
        let mut last = None;
        for setting in &settings {
            let from_s = not_negative("start of a setting", setting.from_s)?;
            not_negative("number of air changes", setting.air_changes_per_s)?;
            if last.map_or(from_s != 0.0, |last| from_s <= last) {
                return Err(RoomError::SettingsOutOfOrder { from_s });
            }
            last = Some(from_s);
        }
        if last.is_none() { Err(RoomError::NoSetting) } else { Ok(Self { settings }) }
    }

    /// The same air changes at all times, per second; 0 is a closed room.
    ///
    /// # Errors
    /// [`RoomError::Negative`].
    pub fn steady(air_changes_per_s: f64) -> Result<Self, RoomError> {
        Self::new(vec![Setting { from_s: 0.0, air_changes_per_s }])
    }

    /// Day setting from `day_from_s` to `day_until_s` (s after midnight), setback at all other times, for so many days; the
    /// course starts at `start_s` after midnight. After the last day the setback stays.
    ///
    /// # Errors
    /// [`RoomError`] for negative values, or a day that does not start, end and lie within one midnight and the next.
    ///
    /// ```
    /// use thimbleworth::room::{Ventilation, HOUR_S as H};
    /// // eight by day from 7 to 19 h, 0.3 at night; the course starts at 17 h
    /// let v = Ventilation::with_setback(8.0 / H, 0.3 / H, 7.0 * H, 19.0 * H, 17.0 * H, 2)?;
    /// let hours: Vec<f64> = v.settings().iter().map(|s| s.from_s / H).collect();
    /// assert_eq!(hours, [0.0, 2.0, 14.0, 26.0]);
    /// # Ok::<(), thimbleworth::room::RoomError>(())
    /// ```
    pub fn with_setback(
        day_per_s: f64,
        night_per_s: f64,
        day_from_s: f64,
        day_until_s: f64,
        start_s: f64,
        days: u16,
    ) -> Result<Self, RoomError> {
        const DAY_S: f64 = 86_400.0;
        let from = not_negative("start of the day setting", day_from_s)?;
        let until = positive("length of the day setting", day_until_s - from)? + from;
        not_negative("time from the end of the day setting to midnight", DAY_S - until)?;
        let start = not_negative("time of day of the start", start_s)?;
        not_negative("time from the start to midnight", DAY_S - start)?;
        let day_now = from <= start && start < until;
        let mut settings = vec![Setting {
            from_s: 0.0,
            air_changes_per_s: if day_now && days > 0 { day_per_s } else { night_per_s },
        }];
        for day in 0..days {
            for (at, air_changes_per_s) in [(from, day_per_s), (until, night_per_s)] {
                let from_s = f64::from(day) * DAY_S + at - start;
                if from_s > 0.0 {
                    settings.push(Setting { from_s, air_changes_per_s });
                }
            }
        }
        Self::new(settings)
    }

    /// The settings in order of time.
    #[must_use]
    pub fn settings(&self) -> &[Setting] {
        &self.settings
    }

    pub(super) fn at(&self, time_s: f64) -> f64 {
        let after = self.settings.partition_point(|setting| setting.from_s <= time_s);
        let setting = after.checked_sub(1).and_then(|place| self.settings.get(place));
        setting.map_or(0.0, |setting| setting.air_changes_per_s)
    }
}

/// Gas that reaches the air of the room. What a hood takes away is not part of it.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Release {
    /// When it starts, s after the start of the course.
    pub from_s: f64,
    /// How long it lasts, s; 0 is a puff, all at once.
    pub duration_s: f64,
    /// Volume of gas in all at the temperature and pressure of the room, m³.
    pub volume_m3: f64,
}

impl Release {
    /// A mass of gas or vapour let go at a steady rate.
    ///
    /// # Errors
    /// [`RoomError`] for values that are negative or, for molar mass, temperature and pressure, not positive.
    pub fn of_mass(
        from_s: f64,
        duration_s: f64,
        mass_kg: f64,
        molar_mass_kg_mol: f64,
        temperature_k: f64,
        pressure_pa: f64,
    ) -> Result<Self, RoomError> {
        let volume_m3 = gas_volume_m3(mass_kg, molar_mass_kg_mol, temperature_k, pressure_pa)?;
        let release = Self { from_s, duration_s, volume_m3 };
        release.checked()?;
        Ok(release)
    }

    pub(super) fn checked(&self) -> Result<(), RoomError> {
        not_negative("start of a release", self.from_s)?;
        not_negative("duration of a release", self.duration_s)?;
        not_negative("volume of a release", self.volume_m3)?;
        Ok(())
    }

    pub(super) fn until_s(&self) -> f64 {
        self.from_s + self.duration_s
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn settings_are_looked_up_by_time() {
        let v = Ventilation::with_setback(8.0, 0.3, 25_200.0, 68_400.0, 0.0, 1).unwrap();
        assert_eq!(
            [0.0, 25_199.0, 25_200.0, 68_399.0, 68_400.0, 1e9].map(|t| v.at(t)),
            [0.3, 0.3, 8.0, 8.0, 0.3, 0.3]
        );
    }

    #[test]
    fn refuses_what_is_no_schedule() {
        assert_eq!(Ventilation::new(Vec::new()), Err(RoomError::NoSetting));
        let late = vec![Setting { from_s: 5.0, air_changes_per_s: 1.0 }];
        assert_eq!(Ventilation::new(late), Err(RoomError::SettingsOutOfOrder { from_s: 5.0 }));
        assert!(matches!(Ventilation::steady(-1.0), Err(RoomError::Negative { .. })));
        assert!(Ventilation::with_setback(8.0, 0.3, 50_000.0, 40_000.0, 0.0, 1).is_err());
        assert!(Ventilation::with_setback(8.0, 0.3, 50_000.0, 90_000.0, 0.0, 1).is_err());
        let room = Room { volume_m3: 10.0, background: 0.0, mixing_factor: 0.0 };
        assert!(matches!(room.checked(), Err(RoomError::NotPositive { .. })));
    }
}
