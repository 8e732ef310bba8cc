//! Heat that a charge takes: to be warmed, to be evaporated, to be dried; and heat read from a rise of temperature.
use super::error::{HeatError, not_negative, positive};

/// Heat that warms a charge with its vessel, J: (m c_p + C_vessel) ΔT.
///
/// `heat_capacity_j_kg_k` is that of the charge, `vessel_j_k` the heat capacity of the vessel and what stands in it (m c of steel: about
/// 500 J/(kg K), glass about 800, from memory); 0 leaves it out, which for a thick steel cell leaves out most.
///
/// # Errors
/// [`HeatError`] for values that cannot be; a fall of temperature takes no heat and is refused.
///
/// ```
/// use thimbleworth::heat::sensible_heat_j;
/// // 30 g of acetone from 20 to 100 °C in a steel cell of 0.7 kg: the cell takes five times what the solvent takes
/// let q = sensible_heat_j(0.030, 2170.0, 0.7 * 500.0, 80.0)?;
/// assert!((q - 33_208.0).abs() < 1e-9);
/// # Ok::<(), thimbleworth::heat::HeatError>(())
/// ```
pub fn sensible_heat_j(
    mass_kg: f64,
    heat_capacity_j_kg_k: f64,
    vessel_j_k: f64,
    rise_k: f64,
) -> Result<f64, HeatError> {
    let charge =
        not_negative("mass of the charge", mass_kg)? * positive("heat capacity", heat_capacity_j_kg_k)?;
    let vessel = not_negative("heat capacity of the vessel", vessel_j_k)?;
    // Q = (m c_p + C_vessel) ΔT
    Ok((charge + vessel) * not_negative("rise of temperature", rise_k)?)
}

/// Heat that evaporates a mass of solvent, J: m (Δh_v + q). For a rotary evaporator, a Kuderna-Danish or a nitrogen stream; as much goes
/// into the condenser, where there is one.
///
/// `preheating_j_kg` is q, what a kilogram takes to come to the boil, c_p ΔT; 0 leaves it out.
///
/// # Errors
/// [`HeatError`] for values that cannot be.
///
/// ```
/// use thimbleworth::heat::{J_PER_KWH, evaporation_duty_j};
/// // 300 mL of dichloromethane (398 g, 330 kJ/kg): 0.0365 kWh
/// assert!((evaporation_duty_j(0.3983, 330e3, 0.0)? / J_PER_KWH - 0.0365).abs() < 1e-4);
/// # Ok::<(), thimbleworth::heat::HeatError>(())
/// ```
pub fn evaporation_duty_j(
    mass_kg: f64,
    heat_of_vaporisation_j_kg: f64,
    preheating_j_kg: f64,
) -> Result<f64, HeatError> {
    let heat = positive("heat of vaporisation", heat_of_vaporisation_j_kg)?
        + not_negative("heat to come to the boil", preheating_j_kg)?;
    // Q = m (Δh_v + q)
    Ok(not_negative("mass evaporated", mass_kg)? * heat)
}

/// Heat of an oven over a run, J: load warmed, moisture evaporated, and what its walls lose: (m c_p) ΔT + m_w Δh_v + K ΔT t.
///
/// `wall_loss_w_k` is K in W/K: a bench oven of 50 to 100 L loses about 2 to 4 W/K (from memory), so 105 °C take 0.2 to 0.4 kW.
///
/// # Errors
/// [`HeatError`] for values that cannot be.
///
/// ```
/// use thimbleworth::heat::{J_PER_KWH, oven_duty_j};
/// // 2 kg of soil with 0.4 kg of water, from 20 to 105 °C, 16 h, 3 W/K: the walls lose most
/// let q = oven_duty_j(2.0, 900.0, 0.4, 2.4e6, 3.0, 85.0, 16.0 * 3600.0)?;
/// assert!((q / J_PER_KWH - 4.389).abs() < 0.001);
/// # Ok::<(), thimbleworth::heat::HeatError>(())
/// ```
pub fn oven_duty_j(
    load_kg: f64,
    heat_capacity_j_kg_k: f64,
    evaporated_kg: f64,
    heat_of_vaporisation_j_kg: f64,
    wall_loss_w_k: f64,
    rise_k: f64,
    time_s: f64,
) -> Result<f64, HeatError> {
    let load = sensible_heat_j(load_kg, heat_capacity_j_kg_k, 0.0, rise_k)?;
    let moisture = evaporation_duty_j(evaporated_kg, heat_of_vaporisation_j_kg, 0.0)?;
    // K ΔT t
    let walls =
        not_negative("loss through the walls", wall_loss_w_k)? * rise_k * not_negative("time", time_s)?;
    Ok(load + moisture + walls)
}

/// Heat that ultrasound or a microwave put into a liquid, J, from the rise of its temperature over a short time: m c_p ΔT. The usual way to
/// find how much of the plate power arrives (calorimetry; common practice).
///
/// # Errors
/// [`HeatError`] for values that cannot be.
///
/// ```
/// use thimbleworth::heat::heat_from_rise_j;
/// // a litre of water by 4.3 K in five minutes: 60 W of a bath's 200 W
/// assert!((heat_from_rise_j(1.0, 4184.0, 4.3)? / 300.0 - 59.97).abs() < 0.01);
/// # Ok::<(), thimbleworth::heat::HeatError>(())
/// ```
pub fn heat_from_rise_j(mass_kg: f64, heat_capacity_j_kg_k: f64, rise_k: f64) -> Result<f64, HeatError> {
    sensible_heat_j(mass_kg, heat_capacity_j_kg_k, 0.0, rise_k)
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn an_oven_without_load_loses_only_through_its_walls() {
        assert_eq!(oven_duty_j(0.0, 900.0, 0.0, 2.4e6, 3.0, 85.0, 100.0), Ok(25_500.0));
    }

    #[test]
    fn refuses_what_cannot_be() {
        assert!(matches!(sensible_heat_j(1.0, 4184.0, 0.0, -5.0), Err(HeatError::Negative { .. })));
        assert!(matches!(evaporation_duty_j(1.0, 0.0, 0.0), Err(HeatError::NotPositive { .. })));
        assert!(oven_duty_j(1.0, 900.0, 0.0, 2.4e6, 3.0, 85.0, f64::INFINITY).is_err());
    }
}
