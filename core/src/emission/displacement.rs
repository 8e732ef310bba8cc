//! Vapour pushed out by what takes its place: filling, purging an empty vessel, letting pressure down.
use super::error::{above_zero, not_below_zero, within};
use super::vapour::{checked_below, emitted};
use super::{EmissionError, Emitted, R, Vapour};

/// Filling: the liquid that comes in displaces gas saturated with its vapour; kg.
///
/// `Eᵢ = V/(R T) Pᵢ Mᵢ`, with V the volume filled in m³ (`volume_m3`), T the temperature of the liquid in K (`temperature_k`). Valid
/// below the boiling point at `pressure_pa` (Pa). A dip pipe emits less than this, splash filling can emit more (mist).
///
/// Source: [`BATCH_RULE`](super::BATCH_RULE), [`EIIP`](super::EIIP).
///
/// # Errors
/// [`EmissionError`] for inputs out of range or a liquid that boils.
///
/// ```
/// use thimbleworth::emission::{Vapour, fill};
/// // 1 m³ of hexane at 25 °C
/// let hexane = Vapour { partial_pressure_pa: 20_186.43, molar_mass_kg_mol: 0.086_175 };
/// assert!((fill(1.0, 298.15, 101_325.0, &[hexane]).unwrap().total_kg() - 0.70174).abs() < 1e-4);
/// ```
pub fn fill(
    volume_m3: f64,
    temperature_k: f64,
    pressure_pa: f64,
    vapours: &[Vapour],
) -> Result<Emitted, EmissionError> {
    let volume = not_below_zero("volume filled, m³", volume_m3)?;
    checked_below(vapours, pressure_pa, temperature_k)?;
    // Eᵢ = V/(R T) Pᵢ Mᵢ
    Ok(emitted(vapours, volume / (R * temperature_k)))
}

/// Purge of an empty vessel that was full of saturated vapour; kg.
///
/// `Eᵢ = V/(R T) Pᵢ Mᵢ (1 − e^(−F t/V))`: the gas mixes with what is there. V is the vessel's volume in m³ (`volume_m3`),
/// `gas_m3` = F t the purge gas at the vessel's temperature (`temperature_k`, K) and pressure (`pressure_pa`, Pa). No liquid may be left;
/// where some is, take [`sweep`](super::sweep()).
///
/// Source: [`BATCH_RULE`](super::BATCH_RULE).
///
/// # Errors
/// As [`fill`].
///
/// ```
/// use thimbleworth::emission::{Vapour, purge_empty};
/// // 100 L that held dichloromethane at 20 °C, three changes of gas
/// let dcm = Vapour { partial_pressure_pa: 47_532.0, molar_mass_kg_mol: 0.084_93 };
/// assert!((purge_empty(0.1, 0.3, 293.15, 101_325.0, &[dcm]).unwrap().total_kg() - 0.15738).abs() < 1e-4);
/// ```
pub fn purge_empty(
    volume_m3: f64,
    gas_m3: f64,
    temperature_k: f64,
    pressure_pa: f64,
    vapours: &[Vapour],
) -> Result<Emitted, EmissionError> {
    let volume = above_zero("volume of the vessel, m³", volume_m3)?;
    let gas = not_below_zero("purge gas, m³", gas_m3)?;
    checked_below(vapours, pressure_pa, temperature_k)?;
    // Eᵢ = V/(R T) Pᵢ Mᵢ (1 − exp(−F t/V))
    Ok(emitted(vapours, -volume / (R * temperature_k) * libm::expm1(-gas / volume)))
}

/// Letting the pressure of a vessel with liquid down: the gas that leaves takes vapour along; kg.
///
/// `Eᵢ = V/(R T) Pᵢ Mᵢ ln((P₁ − ΣP)/(P₂ − ΣP))`, V the gas space in m³ (`headspace_m3`), from P₁ (`from_pa`) to P₂ (`to_pa`) in Pa at
/// constant T (`temperature_k`, K). The liquid keeps its temperature and the gas stays saturated.
///
/// Source: [`BATCH_RULE`](super::BATCH_RULE), [`EIIP`](super::EIIP).
///
/// # Errors
/// As [`fill`]; P₂ must be above the sum of the partial pressures.
///
/// ```
/// use thimbleworth::emission::{Vapour, depressurise};
/// // 100 L of gas over acetone at 25 °C, from one atmosphere to half of it
/// let acetone = Vapour { partial_pressure_pa: 30_779.17, molar_mass_kg_mol: 0.058_079 };
/// assert!((depressurise(0.1, 298.15, 101_325.0, 50_000.0, &[acetone]).unwrap().total_kg() - 0.09376).abs() < 1e-4);
/// ```
pub fn depressurise(
    headspace_m3: f64,
    temperature_k: f64,
    from_pa: f64,
    to_pa: f64,
    vapours: &[Vapour],
) -> Result<Emitted, EmissionError> {
    let volume = not_below_zero("gas space, m³", headspace_m3)?;
    let sum = checked_below(vapours, to_pa, temperature_k)?;
    let from =
        within("pressure at the start, Pa", from_pa, from_pa >= to_pa, "at least the pressure at the end")?;
    // Eᵢ = V/(R T) Pᵢ Mᵢ ln((P₁ − ΣP)/(P₂ − ΣP))
    Ok(emitted(vapours, volume / (R * temperature_k) * libm::log((from - sum) / (to_pa - sum))))
}
