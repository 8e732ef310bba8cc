//! Gas back to a store: compression in stages with cooling between them, and condensing.
use super::error::{above, at, within};
use super::machine::compress_in;
use super::{Loop, LoopError, Point};
use crate::co2::{Equilibrium, Memo};

/// Recompression of gas in stages of equal pressure ratio.
///
/// The default is the worked example of the tests: from 1 atm and 20 °C to 60 bar in three stages, liquid at 15 °C.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Recompression {
    /// Temperature of the gas, K.
    pub inlet_temperature_k: f64,
    /// Absolute pressure of the gas, Pa.
    pub inlet_pressure_pa: f64,
    /// Absolute pressure at the end, Pa.
    pub outlet_pressure_pa: f64,
    /// Number of stages, 1 to 8.
    pub stages: u32,
    /// Isentropic efficiency of every stage, above 0 to 1.
    pub stage_efficiency: f64,
    /// Temperature after the cooler behind each stage, K; `None` for no coolers.
    pub cooler_temperature_k: Option<f64>,
    /// Temperature of the liquid into which the gas is condensed at the end, K; `None` to stop as gas.
    pub condensed_temperature_k: Option<f64>,
}

impl Default for Recompression {
    fn default() -> Self {
        Self {
            inlet_temperature_k: 293.15,
            inlet_pressure_pa: 101_325.0,
            outlet_pressure_pa: 60e5,
            stages: 3,
            stage_efficiency: 0.7,
            cooler_temperature_k: Some(298.15),
            condensed_temperature_k: Some(288.15),
        }
    }
}

const STAGE: [&str; 8] =
    ["stage 1", "stage 2", "stage 3", "stage 4", "stage 5", "stage 6", "stage 7", "stage 8"];
const COOLER: [&str; 8] =
    ["cooler 1", "cooler 2", "cooler 3", "cooler 4", "cooler 5", "cooler 6", "cooler 7", "cooler 8"];

impl Recompression {
    /// Points `gas`, then `stage n` and `cooler n` for each stage, then `condensed`; legs by the same names.
    ///
    /// Range of use: a compressor without oil or wear, no pressure drop in coolers. Outlet temperatures above some
    /// 150 °C to 180 °C are what valves and lubricants are seldom made for (common practice, no source): more stages.
    ///
    /// # Errors
    /// [`LoopError`]; among them a cooler that would send liquid into the next stage.
    ///
    /// ```
    /// use thimbleworth::co2_loop::{Kind, Recompression};
    /// let loop_ = Recompression::default().energies().unwrap();
    /// assert!((loop_.sum_j_kg(Kind::Work) - 365_578.0).abs() < 1.0);
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
        above("outlet pressure", self.outlet_pressure_pa, "inlet pressure", self.inlet_pressure_pa)?;
        let stages = f64::from(self.stages);
        within("number of stages", stages, (1.0..=8.0).contains(&stages), "a number from 1 to 8")?;
        let first: Equilibrium =
            states.state(self.inlet_temperature_k, self.inlet_pressure_pa).map_err(at("gas"))?;
        legs.begin(Point::at("gas", first));
        let mut inlet = first;
        // p_n = p₀ (p_N/p₀)^(n/N)
        let ln_ratio = libm::log(self.outlet_pressure_pa / self.inlet_pressure_pa) / stages;
        let mut done = 0.0;
        for (stage, cooler) in STAGE.into_iter().zip(COOLER).take(self.stages as usize) {
            done += 1.0;
            let pressure_pa = if done < stages {
                self.inlet_pressure_pa * libm::exp(ln_ratio * done)
            } else {
                self.outlet_pressure_pa
            };
            let lift = compress_in(states, &inlet, pressure_pa, self.stage_efficiency)?;
            legs.work(stage, stage, &lift);
            inlet = match self.cooler_temperature_k {
                Some(cold_k) => {
                    let cooled: Equilibrium = states.state(cold_k, pressure_pa).map_err(at(cooler))?;
                    legs.thermal(cooler, Point::at(cooler, cooled));
                    cooled
                }
                None if done < stages => {
                    Point::of(stage, pressure_pa, lift.enthalpy_j_kg).state().map_err(at(stage))?
                }
                None => inlet,
            };
        }
        if let Some(liquid_k) = self.condensed_temperature_k {
            let liquid = states.state(liquid_k, self.outlet_pressure_pa).map_err(at("condensed"))?;
            legs.thermal("condense", Point::at("condensed", liquid));
        }
        Ok(())
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::co2_loop::Kind;

    #[test]
    fn a_cooler_that_condenses_between_stages_is_refused() {
        let cold = Recompression {
            cooler_temperature_k: Some(250.0),
            outlet_pressure_pa: 100e5,
            ..Recompression::default()
        };
        assert!(matches!(cold.energies(), Err(LoopError::CompressorTakesLiquid { .. })));
    }

    #[test]
    fn coolers_save_work() {
        let with = Recompression::default().energies().unwrap().sum_j_kg(Kind::Work);
        let without = Recompression { cooler_temperature_k: None, ..Recompression::default() };
        assert!(without.energies().unwrap().sum_j_kg(Kind::Work) > 1.1 * with);
        for stages in [0, 9] {
            let bad = Recompression { stages, ..Recompression::default() };
            assert!(matches!(bad.energies(), Err(LoopError::OutOfRange { .. })));
        }
    }
}
