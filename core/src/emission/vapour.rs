//! The vapours over a liquid, and what of them went to air.
use super::EmissionError;
use super::error::{above_zero, not_below_zero};
use crate::mixture::{LARGEST, PerComponent};

/// One vapour over the liquid.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Vapour {
    /// Its partial pressure in equilibrium, `xᵢ γᵢ Pᵢ,sat`; Pa.
    pub partial_pressure_pa: f64,
    /// Its molar mass; kg/mol.
    pub molar_mass_kg_mol: f64,
}

/// What went to air, vapour by vapour in the order handed over.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub struct Emitted {
    /// kg of each; zero behind the last one.
    pub kg: PerComponent,
}

impl Emitted {
    /// All vapours together, kg.
    #[must_use]
    pub fn total_kg(&self) -> f64 {
        self.kg.iter().fold(0.0, |sum, kg| sum + kg)
    }
}

/// What every equation asks of its vapours: how many, and that each is a pressure and a molar mass. Gives their sum, Pa.
pub(super) fn checked_sum_pa(vapours: &[Vapour]) -> Result<f64, EmissionError> {
    if vapours.is_empty() || vapours.len() > LARGEST {
        return Err(EmissionError::Count { found: vapours.len() });
    }
    let mut sum = 0.0;
    for vapour in vapours {
        sum += not_below_zero("partial pressure, Pa", vapour.partial_pressure_pa)?;
        above_zero("molar mass, kg/mol", vapour.molar_mass_kg_mol)?;
    }
    Ok(sum)
}

/// As [`checked_sum_pa`], and refuses a sum that leaves no room for gas in `pressure_pa`.
pub(super) fn checked_below(
    vapours: &[Vapour],
    pressure_pa: f64,
    temperature_k: f64,
) -> Result<f64, EmissionError> {
    above_zero("temperature, K", temperature_k)?;
    above_zero("pressure, Pa", pressure_pa)?;
    let vapour_pa = checked_sum_pa(vapours)?;
    if vapour_pa >= pressure_pa {
        return Err(EmissionError::Boils { vapour_pa, pressure_pa, temperature_k });
    }
    Ok(vapour_pa)
}

/// kg of each vapour from `moles_per_pa`, the moles that leave for each Pa of partial pressure.
pub(super) fn emitted(vapours: &[Vapour], moles_per_pa: f64) -> Emitted {
    let mut out = Emitted::default();
    for (kg, vapour) in out.kg.iter_mut().zip(vapours) {
        // Eᵢ = Mᵢ Pᵢ (mol/Pa)
        *kg = vapour.molar_mass_kg_mol * vapour.partial_pressure_pa * moles_per_pa;
    }
    out
}
