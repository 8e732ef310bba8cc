//! The closed loop: what the separator gives up as gas is condensed and pumped again.
use super::error::{above, at};
use super::machine::pump_in;
use super::{Kind, Loop, LoopError, Point};
use crate::co2::{Memo, TRIPLE_PRESSURE_PA};

/// A closed loop with a condenser.
///
/// The default is the worked example of the tests: condenser 5 °C, 300 bar and 60 °C, separator 50 bar and 25 °C.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct ClosedLoop {
    /// Temperature of the liquid that leaves the condenser, K; its pressure is that of the separator.
    pub condenser_temperature_k: f64,
    /// Isentropic efficiency of the pump, above 0 to 1.
    pub pump_efficiency: f64,
    /// Absolute pressure of the extraction, Pa.
    pub extraction_pressure_pa: f64,
    /// Temperature of the extraction, K.
    pub extraction_temperature_k: f64,
    /// Absolute pressure of separator and condenser, Pa.
    pub separator_pressure_pa: f64,
    /// Temperature of the gas that leaves the separator, K.
    pub separator_temperature_k: f64,
}

impl Default for ClosedLoop {
    fn default() -> Self {
        Self {
            condenser_temperature_k: 278.15,
            pump_efficiency: 0.7,
            extraction_pressure_pa: 300e5,
            extraction_temperature_k: 333.15,
            separator_pressure_pa: 50e5,
            separator_temperature_k: 298.15,
        }
    }
}

impl ClosedLoop {
    /// Points `condenser out`, `pump out`, `extractor`, `after valve`, `separator`; legs `pump`, `preheat`, `valve`,
    /// `separator`, `condense`.
    ///
    /// All that passes the extractor is taken to come back: what is vented at let-down, leaks, or leaves with extract
    /// and marc is made up from elsewhere and has to be booked apart. Heat is not passed from the condenser to the
    /// heaters: an installation that does so draws less.
    ///
    /// # Errors
    /// [`LoopError`]; among them a condenser too warm to condense at the separator's pressure.
    ///
    /// ```
    /// use thimbleworth::co2_loop::ClosedLoop;
    /// let energies = ClosedLoop::default().energies().unwrap();
    /// let kj: Vec<f64> = energies.legs.iter().map(|leg| (leg.energy_j_kg / 1e3).round()).collect();
    /// assert_eq!(kj, [38.0, 61.0, 0.0, 133.0, -232.0]);
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
        let low_pa = self.separator_pressure_pa;
        above("extraction pressure", self.extraction_pressure_pa, "separator pressure", low_pa)?;
        // Below it the valve would make solid and gas.
        above("separator pressure", low_pa, "triple pressure", TRIPLE_PRESSURE_PA)?;
        let liquid = states.state(self.condenser_temperature_k, low_pa).map_err(at("condenser outlet"))?;
        let lift = pump_in(states, &liquid, self.extraction_pressure_pa, self.pump_efficiency)?;
        let extractor = states
            .state(self.extraction_temperature_k, self.extraction_pressure_pa)
            .map_err(at("extractor"))?;
        let separator = states.state(self.separator_temperature_k, low_pa).map_err(at("separator"))?;

        legs.begin(Point::at("condenser out", liquid));
        legs.work("pump", "pump out", &lift);
        // q = h₂ − h₁ at constant pressure
        legs.thermal("preheat", Point::at("extractor", extractor));
        // h₂ = h₁ through a valve
        let after = Point::of("after valve", low_pa, extractor.enthalpy_j_kg);
        legs.leg("valve", after, Kind::Throttling, 0.0, None);
        legs.thermal("separator", Point::at("separator", separator));
        legs.close("condense");
        Ok(())
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_condenser_that_does_not_condense_is_refused() {
        let warm = ClosedLoop { condenser_temperature_k: 290.0, ..ClosedLoop::default() };
        assert!(matches!(warm.energies(), Err(LoopError::PumpTakesGas { .. })));
    }

    #[test]
    fn a_separator_that_makes_dry_ice_is_refused() {
        let ice = ClosedLoop { separator_pressure_pa: 5e5, ..ClosedLoop::default() };
        assert!(matches!(ice.energies(), Err(LoopError::NotAbove { .. })));
    }
}
