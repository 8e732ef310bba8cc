//! Reflux: the heat that cycles carry from the flask to the condenser, and the water that takes it away.
use super::WATER_HEAT_CAPACITY_J_KG_K;
use super::error::{HeatError, not_negative, positive};

/// Latent heat of a volume of liquid, J/m³: ρ Δh_v. The density is that of the liquid as its volume was read, the heat of vaporisation
/// that at the boiling point.
///
/// # Errors
/// [`HeatError::NotPositive`].
///
/// ```
/// use thimbleworth::heat::{J_PER_KWH, latent_heat_j_m3};
/// // methanol, textbook figures: 0.242 kWh for a litre
/// let per_litre = latent_heat_j_m3(791.0, 1100e3)? / 1000.0 / J_PER_KWH;
/// assert!((per_litre - 0.242).abs() < 0.001);
/// # Ok::<(), thimbleworth::heat::HeatError>(())
/// ```
pub fn latent_heat_j_m3(density_kg_m3: f64, heat_of_vaporisation_j_kg: f64) -> Result<f64, HeatError> {
    // ρ Δh_v
    Ok(positive("density", density_kg_m3)? * positive("heat of vaporisation", heat_of_vaporisation_j_kg)?)
}

/// Volume that a Soxhlet siphons in all, m³: cycles times the volume of the siphon.
///
/// # Errors
/// [`HeatError`] for a negative number of cycles or a siphon that is not positive.
///
/// ```
/// use thimbleworth::heat::siphoned_m3;
/// // five an hour for 20 h, 85 mL each
/// assert!((siphoned_m3(5.0 * 20.0, 85e-6)? - 8.5e-3).abs() < 1e-15);
/// # Ok::<(), thimbleworth::heat::HeatError>(())
/// ```
pub fn siphoned_m3(cycles: f64, siphon_m3: f64) -> Result<f64, HeatError> {
    // n V_siphon
    Ok(not_negative("number of cycles", cycles)? * positive("volume of the siphon", siphon_m3)?)
}

/// Heat that a volume of solvent takes to be evaporated once, J: V ρ (Δh_v + q). It is the floor of the heater, and all of it goes into the
/// condenser. For a Soxhlet V is what it siphons, [`siphoned_m3`].
///
/// `reheating_j_kg` is q, what a kilogram of condensate takes to come back to the boil, c_p (T_b − T_condensate); 0 leaves it out.
///
/// # Errors
/// [`HeatError`] for values that cannot be.
///
/// ```
/// use thimbleworth::heat::{J_PER_KWH, reflux_duty_j};
/// // 8.5 L of hexane
/// assert!((reflux_duty_j(8.5e-3, 659.4, 335e3, 0.0)? / J_PER_KWH - 0.52).abs() < 0.005);
/// # Ok::<(), thimbleworth::heat::HeatError>(())
/// ```
pub fn reflux_duty_j(
    evaporated_m3: f64,
    density_kg_m3: f64,
    heat_of_vaporisation_j_kg: f64,
    reheating_j_kg: f64,
) -> Result<f64, HeatError> {
    let mass = not_negative("volume evaporated", evaporated_m3)? * positive("density", density_kg_m3)?;
    let latent = positive("heat of vaporisation", heat_of_vaporisation_j_kg)?;
    // Q = n V_siphon ρ (Δh_v + q)
    Ok(mass * (latent + not_negative("heat to reheat condensate", reheating_j_kg)?))
}

/// The least cooling water that can take away a heat, kg: Q/(c_p ΔT). No tap runs so sparingly: see
/// [`cooling_water_by_flow_kg`].
///
/// # Errors
/// [`HeatError`] for a negative heat or a rise that is not positive.
///
/// ```
/// use thimbleworth::heat::{J_PER_KWH, cooling_water_floor_kg};
/// // 0.52 kWh at a rise of 10 K: 45 kg
/// assert!((cooling_water_floor_kg(0.52 * J_PER_KWH, 10.0)? - 44.7).abs() < 0.1);
/// # Ok::<(), thimbleworth::heat::HeatError>(())
/// ```
pub fn cooling_water_floor_kg(heat_j: f64, rise_k: f64) -> Result<f64, HeatError> {
    // m = Q/(c_p ΔT)
    Ok(not_negative("heat", heat_j)?
        / (WATER_HEAT_CAPACITY_J_KG_K * positive("rise of the cooling water", rise_k)?))
}

/// Cooling water that a tap runs, kg: flow times time, at 1000 kg/m³. This is what is used; the floor says how
/// little would do.
///
/// # Errors
/// [`HeatError::Negative`].
///
/// ```
/// use thimbleworth::heat::cooling_water_by_flow_kg;
/// // 0.7 L a minute for 18 h: 756 L, seventeen times the floor of the example above
/// assert!((cooling_water_by_flow_kg(0.7e-3 / 60.0, 18.0 * 3600.0)? - 756.0).abs() < 1e-9);
/// # Ok::<(), thimbleworth::heat::HeatError>(())
/// ```
pub fn cooling_water_by_flow_kg(flow_m3_s: f64, time_s: f64) -> Result<f64, HeatError> {
    const WATER_KG_M3: f64 = 1000.0;
    // m = q t ρ
    Ok(not_negative("flow of cooling water", flow_m3_s)? * not_negative("time", time_s)? * WATER_KG_M3)
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn reheating_adds_to_the_latent_heat() {
        let cold = reflux_duty_j(1e-3, 700.0, 300e3, 2000.0 * 40.0).unwrap();
        assert_eq!(cold, 0.7 * (300e3 + 80e3));
        assert_eq!(reflux_duty_j(0.0, 700.0, 300e3, 0.0), Ok(0.0));
    }

    #[test]
    fn refuses_what_cannot_be() {
        assert!(matches!(cooling_water_floor_kg(1.0, 0.0), Err(HeatError::NotPositive { .. })));
        assert!(matches!(cooling_water_by_flow_kg(-1.0, 1.0), Err(HeatError::Negative { .. })));
        assert!(reflux_duty_j(f64::NAN, 700.0, 300e3, 0.0).is_err());
    }
}
