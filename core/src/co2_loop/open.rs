//! The open loop: from the supply through chiller, pump, heater, extractor and restrictor to the vent.
use super::error::{above, at};
use super::machine::pump_in;
use super::{Loop, LoopError, Point};
use crate::co2::{Equilibrium, Memo};

/// An open loop: nothing comes back.
///
/// The default is the worked example of the tests: 20 °C and 60 bar, chilled to 5 °C, 300 bar and 60 °C, pump 0.7.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct OpenLoop {
    /// Temperature of the supply, K.
    pub supply_temperature_k: f64,
    /// Absolute pressure of the supply, Pa; `None` for liquid drawn by a dip tube, at its own vapour pressure.
    pub supply_pressure_pa: Option<f64>,
    /// Temperature of the chilled pump head, K.
    pub chill_temperature_k: f64,
    /// Isentropic efficiency of the pump, above 0 to 1.
    pub pump_efficiency: f64,
    /// Absolute pressure of the extraction, Pa.
    pub extraction_pressure_pa: f64,
    /// Temperature of the extraction, K.
    pub extraction_temperature_k: f64,
    /// Absolute pressure at the vent, Pa.
    pub vent_pressure_pa: f64,
    /// Temperature at the vent, K.
    pub vent_temperature_k: f64,
}

impl Default for OpenLoop {
    fn default() -> Self {
        Self {
            supply_temperature_k: 293.15,
            supply_pressure_pa: Some(60e5),
            chill_temperature_k: 278.15,
            pump_efficiency: 0.7,
            extraction_pressure_pa: 300e5,
            extraction_temperature_k: 333.15,
            vent_pressure_pa: 101_325.0,
            vent_temperature_k: 293.15,
        }
    }
}

impl OpenLoop {
    /// Points `supply`, `chilled`, `pump out`, `extractor`, `vent`; legs `chill`, `pump`, `preheat`, `restrictor`.
    ///
    /// The leg `restrictor` is a valve and the heat that follows: the stream expands without heat and is then, or
    /// meanwhile, brought to the vent temperature. To less than the triple pressure (5.18 bar) it goes through
    /// solid and gas, which the equation cannot describe; only the heat to reach the vent temperature is accounted.
    ///
    /// # Errors
    /// [`LoopError`]; among them a pump inlet that is gas (a warm pump head at supply pressure), and a vent below
    /// the triple temperature, where there would be solid.
    ///
    /// ```
    /// use thimbleworth::co2_loop::OpenLoop;
    /// let energies = OpenLoop::default().energies().unwrap();
    /// let kj: Vec<f64> = energies.legs.iter().map(|leg| (leg.energy_j_kg / 1e3).round()).collect();
    /// assert_eq!(kj, [-44.0, 36.0, 64.0, 192.0]);
    /// ```
    pub fn energies(&self) -> Result<Loop, LoopError> {
        let mut legs = Loop::default();
        self.energies_in(&mut Memo::default(), &mut legs)?;
        Ok(legs)
    }

    /// As [`energies`](Self::energies), with states kept, into a loop that is cleared first: a draw allocates nothing.
    ///
    /// # Errors
    /// As for [`energies`](Self::energies).
    pub fn energies_in(&self, states: &mut Memo, legs: &mut Loop) -> Result<(), LoopError> {
        let supply: Equilibrium = match self.supply_pressure_pa {
            Some(pressure_pa) => {
                states.state(self.supply_temperature_k, pressure_pa).map_err(at("supply"))?
            }
            None => states.saturated_liquid(self.supply_temperature_k).map_err(at("supply"))?,
        };
        let chilled = if self.chill_temperature_k == supply.temperature_k {
            supply
        } else {
            states.state(self.chill_temperature_k, supply.pressure_pa).map_err(at("chilled supply"))?
        };
        above("extraction pressure", self.extraction_pressure_pa, "supply pressure", supply.pressure_pa)?;
        above("extraction pressure", self.extraction_pressure_pa, "vent pressure", self.vent_pressure_pa)?;
        let lift = pump_in(states, &chilled, self.extraction_pressure_pa, self.pump_efficiency)?;
        let extractor = states
            .state(self.extraction_temperature_k, self.extraction_pressure_pa)
            .map_err(at("extractor"))?;
        let vent = states.state(self.vent_temperature_k, self.vent_pressure_pa).map_err(at("vent"))?;

        legs.begin(Point::at("supply", supply));
        // q = h₂ − h₁ at constant pressure
        legs.thermal("chill", Point::at("chilled", chilled));
        legs.work("pump", "pump out", &lift);
        legs.thermal("preheat", Point::at("extractor", extractor));
        legs.thermal("restrictor", Point::at("vent", vent));
        Ok(())
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::co2::saturated_states;

    #[test]
    fn a_warm_pump_head_is_refused_as_gas() {
        let warm = OpenLoop { chill_temperature_k: 303.15, ..OpenLoop::default() };
        assert!(matches!(warm.energies(), Err(LoopError::PumpTakesGas { .. })));
        let off = OpenLoop { chill_temperature_k: 293.15, ..OpenLoop::default() };
        assert_eq!(off.energies().unwrap().legs[0].energy_j_kg, 0.0);
    }

    #[test]
    fn a_dip_tube_draws_saturated_liquid() {
        let dip = OpenLoop { supply_pressure_pa: None, ..OpenLoop::default() }.energies().unwrap();
        let (liquid, _) = saturated_states(293.15).unwrap();
        assert_eq!(dip.points[0].pressure_pa, liquid.pressure_pa);
        assert_eq!(dip.points[0].enthalpy_j_kg, liquid.enthalpy_j_kg);
    }

    #[test]
    fn pressures_have_to_rise_and_fall() {
        let low = OpenLoop { extraction_pressure_pa: 59e5, ..OpenLoop::default() };
        assert!(matches!(low.energies(), Err(LoopError::NotAbove { .. })));
        let frozen = OpenLoop { vent_temperature_k: 200.0, ..OpenLoop::default() };
        assert!(matches!(frozen.energies(), Err(LoopError::State { at: "vent", .. })));
        for pump_efficiency in [0.0, 1.01, f64::NAN] {
            let bad = OpenLoop { pump_efficiency, ..OpenLoop::default() };
            assert!(matches!(bad.energies(), Err(LoopError::OutOfRange { .. })));
        }
    }
}
