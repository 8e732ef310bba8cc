//! Electricity that machines draw for a heat, a flow or a time.
use super::error::{HeatError, not_negative, positive, share};

/// Nominal electricity of an apparatus, J: P d t. `duty` is the share of the time in which it draws its power (a thermostat that is on a
/// third of the time: 0.33).
///
/// # Errors
/// [`HeatError`] for values that cannot be.
///
/// ```
/// use thimbleworth::heat::{J_PER_KWH, electricity_j};
/// assert_eq!(electricity_j(1400.0, 0.5, 1800.0)? / J_PER_KWH, 0.35);
/// # Ok::<(), thimbleworth::heat::HeatError>(())
/// ```
pub fn electricity_j(power_w: f64, duty: f64, time_s: f64) -> Result<f64, HeatError> {
    // W = P d t
    Ok(not_negative("power", power_w)? * share("duty", duty)? * not_negative("time", time_s)?)
}

/// Electricity of a chiller for a heat, J: Q/COP. The coefficient of performance falls with the temperature of the coolant: about 3 at 5 °C,
/// 1.5 to 2.5 at -10 °C, about 1 at -40 °C for bench chillers (from memory). Its circulation pump and what it draws while idling come on top.
///
/// # Errors
/// [`HeatError`] for values that cannot be.
///
/// ```
/// use thimbleworth::heat::cooling_electricity_j;
/// // 232 kJ to condense a kilogram of carbon dioxide, at COP 3
/// assert!((cooling_electricity_j(232e3, 3.0)? - 77_333.3).abs() < 0.1);
/// # Ok::<(), thimbleworth::heat::HeatError>(())
/// ```
pub fn cooling_electricity_j(heat_j: f64, cop: f64) -> Result<f64, HeatError> {
    // W = Q/COP
    Ok(not_negative("heat", heat_j)? / positive("coefficient of performance", cop)?)
}

/// Electricity of a pump for a liquid, J: V Δp/η. For liquids that hardly give way; a pump for carbon dioxide takes its enthalpies from the
/// equation of state instead.
///
/// # Errors
/// [`HeatError`] for values that cannot be.
///
/// ```
/// use thimbleworth::heat::pump_electricity_j;
/// // 40 mL of solvent to 103 bar at an efficiency of 0.3: 1.4 kJ, nothing beside the heating of the cell
/// assert!((pump_electricity_j(40e-6, 10.3e6, 0.3)? - 1373.3).abs() < 0.1);
/// # Ok::<(), thimbleworth::heat::HeatError>(())
/// ```
pub fn pump_electricity_j(volume_m3: f64, rise_pa: f64, efficiency: f64) -> Result<f64, HeatError> {
    let work = not_negative("volume pumped", volume_m3)? * not_negative("rise of pressure", rise_pa)?;
    // W = V Δp/η
    Ok(work / share("efficiency of the pump", efficiency)?)
}

/// Electricity of a microwave for a heat in the charge, J: Q/(η_magnetron η_load). A magnetron turns about 0.6 to 0.7 of its electricity into
/// microwaves, and a small or apolar load takes up a part of them only (from memory).
///
/// # Errors
/// [`HeatError`] for values that cannot be.
///
/// ```
/// use thimbleworth::heat::{J_PER_KWH, microwave_electricity_j};
/// // 33 kJ in a vessel, magnetron 0.65, half of it taken up
/// assert!((microwave_electricity_j(33e3, 0.65, 0.5)? / J_PER_KWH - 0.0282).abs() < 1e-4);
/// # Ok::<(), thimbleworth::heat::HeatError>(())
/// ```
pub fn microwave_electricity_j(heat_j: f64, magnetron: f64, taken_up: f64) -> Result<f64, HeatError> {
    let efficiency = share("efficiency of the magnetron", magnetron)? * share("share taken up", taken_up)?;
    // W = Q/(η_magnetron η_load)
    Ok(not_negative("heat", heat_j)? / efficiency)
}

/// Electricity that pressed a gas which a step uses, J: V p₀ ln(p/p₀)/η, with V at p₀, isothermal. For the nitrogen of a stream from a
/// compressor or a generator of nitrogen on site; bottled gas carries its energy with its purchase.
///
/// `volume_m3` is the gas as it leaves at `ambient_pa`.
///
/// # Errors
/// [`HeatError`] for values that cannot be; a pressure below ambient is refused.
///
/// ```
/// use thimbleworth::heat::{J_PER_KWH, compressed_gas_electricity_j};
/// // 0.6 m³ of gas at 8 bar, isothermal efficiency 0.5: 0.07 kWh
/// let w = compressed_gas_electricity_j(0.6, 101_325.0, 800e3, 0.5)?;
/// assert!((w / J_PER_KWH - 0.0698).abs() < 1e-4);
/// # Ok::<(), thimbleworth::heat::HeatError>(())
/// ```
pub fn compressed_gas_electricity_j(
    volume_m3: f64,
    ambient_pa: f64,
    pressure_pa: f64,
    efficiency: f64,
) -> Result<f64, HeatError> {
    let p0 = positive("ambient pressure", ambient_pa)?;
    let ratio = positive("pressure", pressure_pa)? / p0;
    let work = not_negative("volume of gas", volume_m3)?
        * p0
        * not_negative("logarithm of the ratio of pressures", libm::log(ratio))?;
    // W = V p₀ ln(p/p₀)/η
    Ok(work / share("efficiency of the compressor", efficiency)?)
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn refuses_what_cannot_be() {
        assert!(matches!(electricity_j(100.0, 1.2, 1.0), Err(HeatError::NotAShare { .. })));
        assert!(matches!(electricity_j(100.0, 0.0, 1.0), Err(HeatError::NotAShare { .. })));
        assert!(matches!(cooling_electricity_j(1.0, 0.0), Err(HeatError::NotPositive { .. })));
        assert!(pump_electricity_j(1.0, 1.0, f64::NAN).is_err());
        assert!(compressed_gas_electricity_j(1.0, 101_325.0, 50_000.0, 0.5).is_err());
        assert!(microwave_electricity_j(-1.0, 0.6, 0.5).is_err());
    }
}
