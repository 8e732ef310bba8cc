//! A gas stream that takes a liquid away: the least gas and time, and how far the liquid cools itself.
use super::error::{above_zero, not_below_zero, within};
use super::{EmissionError, R};
use crate::mixture::MixtureError;

/// Molar heat capacity of nitrogen at constant pressure near room temperature, 7/2 R; J/(mol K).
const NITROGEN_J_MOL_K: f64 = 3.5 * R;

/// Moles of vapour that a mole of gas carries when it leaves saturated: `p/(P − p)`.
///
/// `vapour_pa` is Σp over the liquid, `pressure_pa` that of the gas, both Pa; `temperature_k` in K only names the error.
///
/// # Errors
/// [`EmissionError::Boils`] when the vapour reaches the pressure; [`EmissionError::OutOfRange`].
///
/// ```
/// // dichloromethane at 20 °C: nearly a mole with each mole of nitrogen
/// let share = thimbleworth::emission::saturation_capacity_mol_mol(47_532.0, 101_325.0, 293.15).unwrap();
/// assert!((share - 0.8836).abs() < 1e-4);
/// ```
pub fn saturation_capacity_mol_mol(
    vapour_pa: f64,
    pressure_pa: f64,
    temperature_k: f64,
) -> Result<f64, EmissionError> {
    let vapour = not_below_zero("partial pressure, Pa", vapour_pa)?;
    let pressure = above_zero("pressure, Pa", pressure_pa)?;
    if vapour >= pressure {
        return Err(EmissionError::Boils { vapour_pa: vapour, pressure_pa: pressure, temperature_k });
    }
    // y/(1 − y) = p/(P − p)
    Ok(vapour / (pressure - vapour))
}

/// The least gas, mol, to carry away `evaporated_mol` of one liquid at a constant partial pressure: `n = N (P − p)/p`.
///
/// For a mixture take [`Distillation::carrier_mol`](crate::mixture::Distillation::carrier_mol), which follows the composition.
///
/// # Errors
/// As [`saturation_capacity_mol_mol`]; a vapour pressure of 0 carries nothing and is refused.
///
/// ```
/// let gas_mol = thimbleworth::emission::gas_to_carry_mol(1.0, 16_179.0, 101_325.0, 293.15).unwrap();
/// assert!((gas_mol - 5.2627).abs() < 1e-3);
/// ```
pub fn gas_to_carry_mol(
    evaporated_mol: f64,
    vapour_pa: f64,
    pressure_pa: f64,
    temperature_k: f64,
) -> Result<f64, EmissionError> {
    let evaporated = not_below_zero("amount evaporated, mol", evaporated_mol)?;
    above_zero("partial pressure, Pa", vapour_pa)?;
    // n = N (P − p)/p
    Ok(evaporated / saturation_capacity_mol_mol(vapour_pa, pressure_pa, temperature_k)?)
}

/// The least time, s, for a stream to bring so much gas: `t = n R T/(P F)`.
///
/// `gas_mol` in mol; `flow_m3_s` is F as the meter reads it, at `meter_pa` (Pa) and `meter_k` (K). A real stream over a vial leaves far from saturated, so
/// the real time is several times this one.
///
/// # Errors
/// [`EmissionError::OutOfRange`].
///
/// ```
/// // 5 mol through a meter at 2 L/min, 25 °C
/// let least_s = thimbleworth::emission::least_time_s(5.0, 2e-3 / 60.0, 101_325.0, 298.15).unwrap();
/// assert!((least_s / 60.0 - 61.2).abs() < 0.1);
/// ```
pub fn least_time_s(gas_mol: f64, flow_m3_s: f64, meter_pa: f64, meter_k: f64) -> Result<f64, EmissionError> {
    let gas = not_below_zero("gas, mol", gas_mol)?;
    let flow = above_zero("flow of gas, m³/s", flow_m3_s)?;
    let pressure = above_zero("pressure at the meter, Pa", meter_pa)?;
    let temperature = above_zero("temperature at the meter, K", meter_k)?;
    // t = n R T/(P F)
    Ok(gas * R * temperature / (pressure * flow))
}

/// Holds a time that was entered against the least one; both s.
///
/// # Errors
/// [`EmissionError::Impossible`] when it is shorter by more than one per cent (the vapour pressure is not better known).
///
/// ```
/// use thimbleworth::emission::check_time;
/// assert!(check_time(3600.0, 1800.0).is_ok());
/// let text = check_time(300.0, 1800.0).unwrap_err().to_string();
/// assert!(text.starts_with("5.0 min were entered, but the gas needs at least 30.0 min"));
/// ```
pub fn check_time(given_s: f64, least_s: f64) -> Result<(), EmissionError> {
    let given = not_below_zero("time, s", given_s)?;
    if given < 0.99 * least_s { Err(EmissionError::Impossible { given_s: given, least_s }) } else { Ok(()) }
}

/// How far a liquid under a gas stream cools itself.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Cooling {
    /// The temperature to which it falls when no heat comes but from the gas: that of adiabatic saturation; K.
    pub adiabatic_k: f64,
    /// Heat that holds it at the gas's temperature while the gas leaves saturated, per mole of gas; J/mol.
    pub heat_j_mol: f64,
}

/// Adiabatic saturation of dry nitrogen over one liquid: an estimate of self-cooling.
///
/// `c_p (T_gas − T) = Δh p(T)/(P − p(T))`, solved for T; c_p of nitrogen 7/2 R. `gas_k` is the temperature of the gas in K, `pressure_pa` P in Pa,
/// `heat_j_mol` Δh in J/mol, taken as constant; `vapour_pressure` gives p in Pa at a temperature in K. The true wet-bulb temperature of a solvent lies some
/// kelvin higher, because its vapour diffuses more slowly than heat (Lewis number above 1). `lowest_k` is where the
/// search ends, K: the lowest temperature of the vapour pressure's equation.
///
/// The cold is a warning, not a number to account with: water condenses on the vial, and the stream takes longer than the least time.
///
/// Source: balance of energy; the estimate is ours.
///
/// # Errors
/// [`EmissionError::OutOfRange`] when it would cool below `lowest_k` or an input is none; [`EmissionError::Mixture`] from `vapour_pressure`;
/// [`EmissionError::Boils`] when the liquid boils at the gas's temperature.
///
/// ```
/// use thimbleworth::material::catalogue;
/// let acetone = catalogue().find("acetone").unwrap();
/// let cooling = thimbleworth::emission::self_cooling(298.15, 101_325.0, 31_300.0, 240.0, |t| {
///     Ok(acetone.vapour_pressure.value(t, &acetone.name, "vapour pressure")?)
/// })
/// .unwrap();
/// // without a bath it goes well below freezing
/// assert!(cooling.adiabatic_k > 253.0 && cooling.adiabatic_k < 268.0);
/// ```
pub fn self_cooling(
    gas_k: f64,
    pressure_pa: f64,
    heat_j_mol: f64,
    lowest_k: f64,
    mut vapour_pressure: impl FnMut(f64) -> Result<f64, MixtureError>,
) -> Result<Cooling, EmissionError> {
    let gas = above_zero("temperature of the gas, K", gas_k)?;
    let heat = above_zero("heat of vaporisation, J/mol", heat_j_mol)?;
    let lowest = within(
        "lowest temperature, K",
        lowest_k,
        lowest_k > 0.0 && lowest_k < gas,
        "a temperature above 0 K and below that of the gas",
    )?;
    let mut needed = |t: f64| -> Result<f64, EmissionError> {
        // q = Δh p/(P − p)
        Ok(heat * saturation_capacity_mol_mol(vapour_pressure(t)?, pressure_pa, t)?)
    };
    let heat_j_mol = needed(gas)?;
    if needed(lowest)? > NITROGEN_J_MOL_K * (gas - lowest) {
        return Err(EmissionError::OutOfRange {
            of: "temperature to which the liquid cools itself, K",
            value: lowest,
            allowed: "a liquid whose vapour pressure is known further down, or a bath that holds it warm",
        });
    }
    // What the gas gives falls with T and what evaporation takes rises, so they cross once.
    let (mut low, mut high) = (lowest, gas);
    for _ in 0..50 {
        let t = 0.5 * (low + high);
        if needed(t)? > NITROGEN_J_MOL_K * (gas - t) {
            high = t;
        } else {
            low = t;
        }
    }
    Ok(Cooling { adiabatic_k: 0.5 * (low + high), heat_j_mol })
}
