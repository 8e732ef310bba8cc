//! An extraction as a question: what a state dissolves, how much carbon dioxide and electricity a recovery takes there, and at
//! which state it takes least.
use super::DenseGasError;
use super::need::{Curve, Solubility, Target};
use super::search::{Optimum, Window, least};
use super::sovova::Sovova;
use super::strength::giddings_mpa_half;
use crate::co2::density_kg_m3;
use crate::co2_loop::{ClosedLoop, Loop, LoopError, OpenLoop, Scratch, Utilities};

/// The circuit of which the extraction state is varied.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Circuit {
    /// Nothing comes back.
    Open(OpenLoop),
    /// Separator and condenser.
    Closed(ClosedLoop),
}

impl Circuit {
    /// The same circuit around an extraction at a temperature, K, and an absolute pressure, Pa; its energies into `scratch`.
    ///
    /// # Errors
    /// [`LoopError`].
    pub fn energies_at(
        &self,
        extraction_temperature_k: f64,
        extraction_pressure_pa: f64,
        scratch: &mut Scratch,
    ) -> Result<(), LoopError> {
        let Scratch { states, legs } = scratch;
        states.begin();
        match *self {
            Self::Open(around) => OpenLoop { extraction_temperature_k, extraction_pressure_pa, ..around }
                .energies_in(states, legs),
            Self::Closed(around) => ClosedLoop { extraction_temperature_k, extraction_pressure_pa, ..around }
                .energies_in(states, legs),
        }
    }
}

/// What is asked.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Study {
    /// How much dissolves.
    pub solubility: Solubility,
    /// What is to come out.
    pub target: Target,
    /// The circuit.
    pub circuit: Circuit,
    /// The machines around it.
    pub machines: Utilities,
}

/// What a recovery takes at one state.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Needed {
    /// Temperature, K.
    pub temperature_k: f64,
    /// Absolute pressure, Pa.
    pub pressure_pa: f64,
    /// Density, kg/m³.
    pub density_kg_m3: f64,
    /// Solubility parameter by Giddings, MPa^½.
    pub strength_mpa_half: f64,
    /// Solute in saturated carbon dioxide, kg/kg.
    pub loading_kg_kg: f64,
    /// Carbon dioxide, kg per kg of solid free of solute.
    pub solvent_kg_kg: f64,
    /// Electricity, J per kg of solid free of solute.
    pub electricity_j_kg: f64,
}

impl Study {
    /// What the recovery takes at a temperature, K, and an absolute pressure, Pa.
    ///
    /// # Errors
    /// [`DenseGasError`], among them a state outside the range of the solubility.
    ///
    /// ```
    /// use thimbleworth::co2_loop::{ClosedLoop, Heating, Utilities};
    /// use thimbleworth::dense_gas::need::{Curve, Solubility, Target};
    /// use thimbleworth::dense_gas::study::{Circuit, Study};
    /// let oil = Study {
    ///     solubility: Solubility::VegetableOil,
    ///     target: Target { solute_kg_kg: 0.2, recovery: 0.95, curve: Curve::Saturated },
    ///     circuit: Circuit::Closed(ClosedLoop::default()),
    ///     machines: Utilities { drive_efficiency: 0.9, cooling_cop: 3.0, heating: Heating::Electric { ratio: 1.0 } },
    /// };
    /// let found = oil.at(313.15, 30e6).unwrap();
    /// // 135 kg of carbon dioxide for a kilogram of oil
    /// assert!((found.solvent_kg_kg / (0.95 * 0.2) - 135.0).abs() < 0.5);
    /// ```
    pub fn at(&self, temperature_k: f64, pressure_pa: f64) -> Result<Needed, DenseGasError> {
        self.at_with(temperature_k, pressure_pa, &mut Scratch::default())
    }

    fn at_with(
        &self,
        temperature_k: f64,
        pressure_pa: f64,
        scratch: &mut Scratch,
    ) -> Result<Needed, DenseGasError> {
        let density_kg_m3 = density_kg_m3(temperature_k, pressure_pa)?;
        let loading_kg_kg = self.solubility.loading_kg_kg(temperature_k, pressure_pa)?;
        let solvent_kg_kg = self.target.solvent_kg_kg(loading_kg_kg)?;
        self.circuit.energies_at(temperature_k, pressure_pa, scratch)?;
        let drawn = self.machines.drawn(&scratch.legs)?.total_j_kg();
        Ok(Needed {
            temperature_k,
            pressure_pa,
            density_kg_m3,
            strength_mpa_half: giddings_mpa_half(density_kg_m3)?,
            loading_kg_kg,
            solvent_kg_kg,
            electricity_j_kg: solvent_kg_kg * drawn,
        })
    }

    /// The state of a window that takes least carbon dioxide; see [`least`].
    ///
    /// # Errors
    /// As for [`least`].
    pub fn least_solvent(&self, window: &Window) -> Result<(Optimum, Needed), DenseGasError> {
        self.least_of(window, |needed| needed.solvent_kg_kg)
    }

    /// The state of a window that takes least electricity; see [`least`].
    ///
    /// # Errors
    /// As for [`least`].
    pub fn least_electricity(&self, window: &Window) -> Result<(Optimum, Needed), DenseGasError> {
        self.least_of(window, |needed| needed.electricity_j_kg)
    }

    fn least_of(&self, window: &Window, of: fn(&Needed) -> f64) -> Result<(Optimum, Needed), DenseGasError> {
        let mut scratch = Scratch::default();
        let found = least(window, |t, p| self.at_with(t, p, &mut scratch).ok().map(|needed| of(&needed)))?;
        let needed = self.at_with(found.temperature_k, found.pressure_pa, &mut scratch)?;
        Ok((found, needed))
    }

    /// The extraction curve at a loading, kg/kg: carbon dioxide and what has come out of it, both kg per kg of solid free of
    /// solute, at `points` steps up to `solvent_kg_kg`.
    ///
    /// # Errors
    /// [`DenseGasError::OutOfRange`].
    pub fn curve(
        &self,
        loading_kg_kg: f64,
        solvent_kg_kg: f64,
        points: u32,
    ) -> Result<Vec<(f64, f64)>, DenseGasError> {
        let start_kg_kg = self.target.solute_kg_kg;
        let mut curve = Vec::new();
        for i in 0..=points {
            let q = solvent_kg_kg * f64::from(i) / f64::from(points);
            let out = match self.target.curve {
                Curve::Saturated => {
                    // e = q y, at most x₀
                    let out = q * loading_kg_kg;
                    if out < start_kg_kg { out } else { start_kg_kg }
                }
                Curve::BrokenAndIntact { intact_share, fast, slow } => {
                    let intact_kg_kg = intact_share * start_kg_kg;
                    Sovova { start_kg_kg, intact_kg_kg, loading_kg_kg, fast, slow }.extracted_kg_kg(q)?
                }
            };
            curve.push((q, out));
        }
        Ok(curve)
    }

    /// The circuit around a state, by points and changes.
    ///
    /// # Errors
    /// [`LoopError`].
    pub fn circuit_at(&self, temperature_k: f64, pressure_pa: f64) -> Result<Loop, LoopError> {
        let mut scratch = Scratch::default();
        self.circuit.energies_at(temperature_k, pressure_pa, &mut scratch)?;
        Ok(scratch.legs)
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::co2_loop::Heating;
    use crate::dense_gas::search::{least_energy, least_solvent};

    const OIL: Study = Study {
        solubility: Solubility::VegetableOil,
        target: Target { solute_kg_kg: 0.2, recovery: 0.95, curve: Curve::Saturated },
        circuit: Circuit::Closed(ClosedLoop {
            condenser_temperature_k: 278.15,
            pump_efficiency: 0.7,
            extraction_pressure_pa: 300e5,
            extraction_temperature_k: 333.15,
            separator_pressure_pa: 50e5,
            separator_temperature_k: 298.15,
        }),
        machines: Utilities { drive_efficiency: 0.9, cooling_cop: 3.0, heating: Heating::NotElectric },
    };

    #[test]
    fn the_least_is_what_the_plain_searches_find() {
        let window = Window { temperature_k: [308.15, 353.15], pressure_pa: [15e6, 40e6] };
        let plain = least_solvent(&window, &OIL.solubility, &OIL.target).unwrap();
        assert_eq!(OIL.least_solvent(&window).unwrap().0, plain);
        let Circuit::Closed(around) = OIL.circuit else { panic!() };
        let plain = least_energy(&window, &OIL.solubility, &OIL.target, &around, &OIL.machines).unwrap();
        let (found, needed) = OIL.least_electricity(&window).unwrap();
        assert!((found.least / plain.least - 1.0).abs() < 1e-9 && found.on == plain.on);
        assert_eq!(needed.electricity_j_kg, found.least);
    }

    #[test]
    fn a_curve_rises_to_what_the_target_asks() {
        let curve = Curve::BrokenAndIntact { intact_share: 1.0 / 3.0, fast: 2.0, slow: 0.2 };
        let study = Study { target: Target { curve, ..OIL.target }, ..OIL };
        let q = study.target.solvent_kg_kg(0.007).unwrap();
        for study in [study, OIL] {
            let q = if study == OIL { 0.95 * 0.2 / 0.007 } else { q };
            let points = study.curve(0.007, q, 40).unwrap();
            assert!(points.windows(2).all(|w| w[0].1 <= w[1].1));
            let last = points.last().unwrap();
            assert!((last.1 / (0.95 * 0.2) - 1.0).abs() < 1e-9, "{last:?}");
        }
    }
}
