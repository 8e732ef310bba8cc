//! Gas that is let go at once: a cylinder that bursts or empties through its relief, a spill that evaporates.
//!
//! Two figures and no average. *At once*: the gas takes the place of its own volume of air, V_g/V_r. *Mixed*: it mixes with the air while air
//! is pushed out, 1 − e^{−V_g/V_r}. Near the source and on the floor it can be pure gas before either is reached. People die in the
//! first minutes, so these figures are held against limits as they stand, never over 15 minutes or 8 hours.
use super::concentration::{gas_volume_m3, saturation_fraction};
use super::error::{RoomError, fraction, not_negative, positive};
use super::oxygen::{oxygen_at_once, oxygen_mixed};

/// What a room holds after gas was let go at once.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Sudden {
    /// Volume of the gas at the temperature and pressure of the room, m³.
    pub gas_m3: f64,
    /// Fraction by volume when it takes the place of air: V_g/V_r, at most 1.
    pub at_once: f64,
    /// Fraction by volume when it mixes while air is pushed out: 1 − e^{−V_g/V_r}.
    pub mixed: f64,
    /// Oxygen beside the first, fraction by volume.
    pub oxygen_at_once: f64,
    /// Oxygen beside the second, fraction by volume.
    pub oxygen_mixed: f64,
}

impl Sudden {
    /// A mass of gas let go at once into a closed room. Background air is not counted.
    ///
    /// # Errors
    /// [`RoomError`] for values that are negative or, for all but the mass, not positive.
    ///
    /// ```
    /// use thimbleworth::room::Sudden;
    /// // 22.7 kg of carbon dioxide in a store of 30 m³: a third of the air and more
    /// let s = Sudden::of_mass(22.7, 0.044_009_5, 293.15, 101_325.0, 30.0)?;
    /// assert!((s.at_once - 0.414).abs() < 0.001 && (s.mixed - 0.339).abs() < 0.001);
    /// # Ok::<(), thimbleworth::room::RoomError>(())
    /// ```
    pub fn of_mass(
        mass_kg: f64,
        molar_mass_kg_mol: f64,
        temperature_k: f64,
        pressure_pa: f64,
        room_m3: f64,
    ) -> Result<Self, RoomError> {
        let gas_m3 = gas_volume_m3(mass_kg, molar_mass_kg_mol, temperature_k, pressure_pa)?;
        let share = gas_m3 / positive("volume of the room", room_m3)?;
        Ok(Self {
            gas_m3,
            at_once: if share < 1.0 { share } else { 1.0 },
            // 1 − e^{−V_g/V_r}
            mixed: -libm::expm1(-share),
            oxygen_at_once: oxygen_at_once(room_m3, gas_m3)?,
            oxygen_mixed: oxygen_mixed(room_m3, gas_m3)?,
        })
    }

    /// A mass of liquid spilt that evaporates as far as its vapour pressure lets it: both figures end at saturation.
    ///
    /// # Errors
    /// [`RoomError`] as for [`Sudden::of_mass`], and for a vapour pressure that is not positive.
    ///
    /// ```
    /// use thimbleworth::room::Sudden;
    /// // 2.5 L of dichloromethane (3.3 kg) in a store of 1.5 m³ at 20 °C: saturated, liquid is left
    /// let s = Sudden::of_spill(3.32, 0.084_932_6, 47_500.0, 293.15, 101_325.0, 1.5)?;
    /// assert!((s.at_once - 0.4688).abs() < 1e-4);
    /// # Ok::<(), thimbleworth::room::RoomError>(())
    /// ```
    pub fn of_spill(
        mass_kg: f64,
        molar_mass_kg_mol: f64,
        vapour_pressure_pa: f64,
        temperature_k: f64,
        pressure_pa: f64,
        room_m3: f64,
    ) -> Result<Self, RoomError> {
        let most = saturation_fraction(vapour_pressure_pa, pressure_pa)?;
        let all = Self::of_mass(mass_kg, molar_mass_kg_mol, temperature_k, pressure_pa, room_m3)?;
        let capped = |x: f64| if x < most { x } else { most };
        let (at_once, mixed) = (capped(all.at_once), capped(all.mixed));
        Ok(Self {
            gas_m3: all.gas_m3,
            at_once,
            mixed,
            oxygen_at_once: super::oxygen_beside(at_once)?,
            oxygen_mixed: super::oxygen_beside(mixed)?,
        })
    }

    /// The higher of the two figures, which is the one at once.
    #[must_use]
    pub fn worst(&self) -> f64 {
        self.at_once
    }

    /// How long ventilation takes to bring the room under a limit, s: from the mixed figure and from that at once, the
    /// longer. `background` is what the incoming air holds. `None` if it never does: no ventilation, or a limit at the background.
    ///
    /// t = ln((x − C₀)/(limit − C₀))/(k N)
    ///
    /// # Errors
    /// [`RoomError`] for values that are no fractions or air changes.
    ///
    /// ```
    /// use thimbleworth::room::{Sudden, HOUR_S};
    /// let s = Sudden::of_mass(22.7, 0.044_009_5, 293.15, 101_325.0, 140.0)?;
    /// let [mixed, at_once] = s.time_to_fall_under_s(0.005, 420e-6, 8.0 / HOUR_S)?.unwrap();
    /// assert!((mixed / HOUR_S - 0.365).abs() < 0.001 && at_once > mixed);
    /// # Ok::<(), thimbleworth::room::RoomError>(())
    /// ```
    pub fn time_to_fall_under_s(
        &self,
        limit: f64,
        background: f64,
        effective_air_changes_per_s: f64,
    ) -> Result<Option<[f64; 2]>, RoomError> {
        let room_under = fraction("limit", limit)? - fraction("background", background)?;
        let n = not_negative("number of effective air changes", effective_air_changes_per_s)?;
        let time = |x: f64| {
            // The release joins what the room held before; what it pushed out of that is left out, on the safe side.
            if x <= room_under { 0.0 } else { libm::log(x / room_under) / n }
        };
        if room_under <= 0.0 || (n == 0.0 && self.at_once > room_under) {
            return Ok(None);
        }
        Ok(Some([time(self.mixed), time(self.at_once)]))
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_cylinder_larger_than_the_room_fills_it() {
        let s = Sudden::of_mass(22.7, 0.0440095, 293.15, 101_325.0, 5.0).unwrap();
        assert_eq!((s.at_once, s.oxygen_at_once), (1.0, 0.0));
        assert!(s.mixed < 1.0 && s.mixed > 0.9);
    }

    #[test]
    fn no_ventilation_never_clears_the_room() {
        let s = Sudden::of_mass(22.7, 0.0440095, 293.15, 101_325.0, 140.0).unwrap();
        assert_eq!(s.time_to_fall_under_s(0.005, 0.0, 0.0), Ok(None));
        assert_eq!(s.time_to_fall_under_s(420e-6, 420e-6, 1.0), Ok(None));
        assert_eq!(s.time_to_fall_under_s(0.2, 0.0, 0.0), Ok(Some([0.0, 0.0])));
    }

    #[test]
    fn a_small_spill_evaporates_whole() {
        let whole = Sudden::of_mass(0.01, 0.0861754, 293.15, 101_325.0, 40.0).unwrap();
        let spill = Sudden::of_spill(0.01, 0.0861754, 16_179.0, 293.15, 101_325.0, 40.0).unwrap();
        assert_eq!((whole.at_once, whole.mixed), (spill.at_once, spill.mixed));
    }
}
