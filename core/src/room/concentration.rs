//! ppm, mg/m³ and volumes of gas by temperature and pressure.
//!
//! A concentration is kept as a fraction by volume (1 ppm = 1e-6). Limits are printed in ppm and mg/m³ at a reference temperature:
//! 25 °C in the United States (24.465 L/mol), 20 °C in the European Union and Britain (24.055 L/mol); so a limit in mg/m³ means
//! nothing without its temperature.
use super::error::{RoomError, fraction, not_negative, positive};

/// The gas constant, J/(mol K), by definition of the SI since 2019.
pub const GAS_CONSTANT_J_MOL_K: f64 = 8.314_462_618;

/// Mass in a volume of air of a gas that stands at a fraction by volume, kg/m³: x M p/(R T). Ideal gas; within
/// 1 % for gases and vapours at room conditions.
///
/// `molar_mass_kg_mol` in kg/mol, temperature in K, pressure in Pa.
///
/// # Errors
/// [`RoomError`] for a fraction outside 0 to 1 or values that are not positive.
///
/// ```
/// use thimbleworth::room::mass_concentration_kg_m3;
/// // 50 ppm of dichloromethane at 25 °C: 173.6 mg/m³
/// let c = mass_concentration_kg_m3(50e-6, 0.084_932_6, 298.15, 101_325.0)?;
/// assert!((c * 1e6 - 173.58).abs() < 0.01);
/// # Ok::<(), thimbleworth::room::RoomError>(())
/// ```
pub fn mass_concentration_kg_m3(
    by_volume: f64,
    molar_mass_kg_mol: f64,
    temperature_k: f64,
    pressure_pa: f64,
) -> Result<f64, RoomError> {
    let x = fraction("fraction by volume", by_volume)?;
    let (m, t, p) = state(molar_mass_kg_mol, temperature_k, pressure_pa)?;
    // c = x M p/(R T)
    Ok(x * m * p / (GAS_CONSTANT_J_MOL_K * t))
}

/// Fraction by volume of a gas of which a volume of air holds a mass: c R T/(M p). The inverse of
/// [`mass_concentration_kg_m3`].
///
/// # Errors
/// [`RoomError`] for values that are not positive, or a concentration above that of the pure gas.
///
/// ```
/// use thimbleworth::room::fraction_of;
/// // 9000 mg/m³ of carbon dioxide at 20 °C, as printed beside 5000 ppm
/// let x = fraction_of(9000e-6, 0.044_009_5, 293.15, 101_325.0)?;
/// assert!((x * 1e6 - 4919.0).abs() < 1.0);
/// # Ok::<(), thimbleworth::room::RoomError>(())
/// ```
pub fn fraction_of(
    concentration_kg_m3: f64,
    molar_mass_kg_mol: f64,
    temperature_k: f64,
    pressure_pa: f64,
) -> Result<f64, RoomError> {
    let c = not_negative("concentration", concentration_kg_m3)?;
    let (m, t, p) = state(molar_mass_kg_mol, temperature_k, pressure_pa)?;
    // x = c R T/(M p)
    fraction("fraction by volume that this concentration is", c * GAS_CONSTANT_J_MOL_K * t / (m * p))
}

/// Volume that a mass of gas takes, m³: m R T/(M p). Ideal gas.
///
/// # Errors
/// [`RoomError`] for a negative mass or values that are not positive.
///
/// ```
/// use thimbleworth::room::gas_volume_m3;
/// // 30 kg of carbon dioxide at 20 °C
/// let v = gas_volume_m3(30.0, 0.044_009_5, 293.15, 101_325.0)?;
/// assert!((v - 16.398).abs() < 0.001);
/// # Ok::<(), thimbleworth::room::RoomError>(())
/// ```
pub fn gas_volume_m3(
    mass_kg: f64,
    molar_mass_kg_mol: f64,
    temperature_k: f64,
    pressure_pa: f64,
) -> Result<f64, RoomError> {
    let mass = not_negative("mass of gas", mass_kg)?;
    let (m, t, p) = state(molar_mass_kg_mol, temperature_k, pressure_pa)?;
    // V_g = m R T/(M p)
    Ok(mass * GAS_CONSTANT_J_MOL_K * t / (m * p))
}

/// The most that a vapour can stand at above its liquid, fraction by volume: p_sat/p, never above 1. A course or a
/// spill of solvent cannot pass it, whatever mass is let go: at 20 °C 47 % for dichloromethane and 16 % for hexane.
///
/// # Errors
/// [`RoomError`] for pressures that are not positive.
///
/// ```
/// use thimbleworth::room::saturation_fraction;
/// assert!((saturation_fraction(47_500.0, 101_325.0)? - 0.4688).abs() < 1e-4);
/// # Ok::<(), thimbleworth::room::RoomError>(())
/// ```
pub fn saturation_fraction(vapour_pressure_pa: f64, pressure_pa: f64) -> Result<f64, RoomError> {
    let x = positive("vapour pressure", vapour_pressure_pa)? / positive("pressure", pressure_pa)?;
    Ok(if x > 1.0 { 1.0 } else { x })
}

fn state(m: f64, t: f64, p: f64) -> Result<(f64, f64, f64), RoomError> {
    Ok((positive("molar mass", m)?, positive("temperature", t)?, positive("pressure", p)?))
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn there_and_back() {
        for x in [0.0, 2e-6, 0.005, 0.4, 1.0] {
            let c = mass_concentration_kg_m3(x, 0.0861754, 301.0, 98_000.0).unwrap();
            // A pure gas may come back a last place above 1, and is refused then.
            if x < 1.0 {
                assert!((fraction_of(c, 0.0861754, 301.0, 98_000.0).unwrap() - x).abs() < 1e-15);
            }
        }
        assert!(matches!(fraction_of(10.0, 0.044, 293.15, 101_325.0), Err(RoomError::NotAFraction { .. })));
    }

    #[test]
    fn a_litre_of_gas_weighs_its_concentration() {
        let v = gas_volume_m3(0.001, 0.0449, 293.15, 101_325.0).unwrap();
        let c = mass_concentration_kg_m3(1.0, 0.0449, 293.15, 101_325.0).unwrap();
        assert!((v * c - 0.001).abs() < 1e-18);
    }
}
