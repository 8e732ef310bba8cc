//! Carbon dioxide: density, phase, heat and viscosity from temperature and pressure.
//!
//! R. Span, W. Wagner, J. Phys. Chem. Ref. Data 25 (1996) 1509 for everything thermodynamic; A. Laesecke, C. D. Muzny,
//! J. Phys. Chem. Ref. Data 46 (2017) 013107 for the viscosity. Temperatures are absolute, pressures too.
//!
//! **Range.** 216.592 K (the triple point) to 1100 K, above 0 to 800 MPa, fluid only. Below the triple point there is
//! solid and gas, which the equation does not describe: it is refused, as is anything above the melting line. An
//! expansion to about 1 bar ends there; account for it up to the vent temperature only.
//!
//! **Names of phases.** Below the critical temperature: gas below the saturation pressure and liquid above it,
//! also above the critical pressure. From the critical temperature upwards: supercritical from the critical pressure
//! upwards, gas below it. See [`Phase`].
//!
//! **The saturation line.** A pressure within 1e-9 of the saturation pressure does not say which phase is meant and is
//! refused with both densities; [`saturated_states`] gives both sides.
//!
//! **Zero of enthalpy and entropy.** The ideal gas at 298.15 K and 101 325 Pa, as in the tables of 1996. Other tables put
//! 200 kJ/kg and 1 kJ/(kg K) to the saturated liquid at 0 °C (the convention of the International Institute of
//! Refrigeration): add [`TO_IIR_ENTHALPY_J_KG`] and [`TO_IIR_ENTROPY_J_KG_K`]. Differences are the same in both.
//!
//! ```
//! use thimbleworth::co2::{Phase, state};
//! let extraction = state(323.15, 30e6)?; // 50 °C, 300 bar
//! assert_eq!(extraction.phase, Phase::Supercritical);
//! assert!((extraction.density_kg_m3 - 870.4).abs() < 0.1);
//! # Ok::<(), thimbleworth::co2::StateError>(())
//! ```

mod boundary;
mod closed;
mod coefficients;
mod critical;
mod density;
mod error;
mod fits;
mod helmholtz;
mod inverse;
mod isotherm;
mod memo;
mod start;
mod viscosity;

pub use boundary::{Phase, melting_pressure_pa, saturated_densities_kg_m3, saturation_pressure_pa};
pub use closed::{isochoric_pressure_pa, isochoric_temperature_k};
pub use coefficients::{
    CRITICAL_DENSITY_KG_M3, CRITICAL_PRESSURE_PA, CRITICAL_TEMPERATURE_K, GAS_CONSTANT_J_MOL_K,
    MOLAR_MASS_KG_MOL, TRIPLE_PRESSURE_PA, TRIPLE_TEMPERATURE_K,
};
pub use density::{density_and_phase, density_kg_m3, pressure_pa};
pub use error::StateError;
pub use inverse::{
    Equilibrium, Phases, saturation_temperature_k, state_from_enthalpy, state_from_entropy,
    temperature_from_enthalpy_k, temperature_from_entropy_k,
};
pub use memo::Memo;
pub use viscosity::viscosity_pa_s;

/// Highest temperature of the equation of state, K.
pub const HIGHEST_TEMPERATURE_K: f64 = 1100.0;
/// Highest pressure of the equation of state, Pa.
pub const HIGHEST_PRESSURE_PA: f64 = 800e6;
/// Highest density accepted, kg/m³; the densest fluid state of the range has 1496 kg/m³.
pub const HIGHEST_DENSITY_KG_M3: f64 = 1600.0;
/// Added to an enthalpy of this module gives the enthalpy with 200 kJ/kg for the saturated liquid at 0 °C, J/kg.
pub const TO_IIR_ENTHALPY_J_KG: f64 = 506_779.925_839_376_64;
/// Added to an entropy of this module gives the entropy with 1 kJ/(kg K) for the saturated liquid at 0 °C, J/(kg K).
pub const TO_IIR_ENTROPY_J_KG_K: f64 = 2_739.005_049_372_327_4;

/// A fluid state of carbon dioxide. Enthalpy and entropy are 0 for the ideal gas at 298.15 K and 101 325 Pa.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct State {
    /// Temperature, K.
    pub temperature_k: f64,
    /// Absolute pressure, Pa.
    pub pressure_pa: f64,
    /// Density, kg/m³.
    pub density_kg_m3: f64,
    /// Phase.
    pub phase: Phase,
    /// Specific enthalpy, J/kg.
    pub enthalpy_j_kg: f64,
    /// Specific entropy, J/(kg K).
    pub entropy_j_kg_k: f64,
    /// Heat capacity at constant pressure, J/(kg K).
    pub heat_capacity_j_kg_k: f64,
    /// Heat capacity at constant volume, J/(kg K).
    pub isochoric_heat_capacity_j_kg_k: f64,
    /// Speed of sound, m/s.
    pub sound_speed_m_s: f64,
    /// Dynamic viscosity, Pa s.
    pub viscosity_pa_s: f64,
}

impl State {
    /// Whether the viscosity is outside the stated range of its correlation: not a gas, and below 220 K or above 700 K.
    ///
    /// ```
    /// use thimbleworth::co2::state;
    /// assert!(!state(323.15, 30e6)?.viscosity_is_extrapolated());
    /// assert!(state(218.15, 30e5)?.viscosity_is_extrapolated());
    /// # Ok::<(), thimbleworth::co2::StateError>(())
    /// ```
    #[must_use]
    pub fn viscosity_is_extrapolated(&self) -> bool {
        self.phase != Phase::Gas && !(self.temperature_k >= 220.0 && self.temperature_k <= 700.0)
    }

    fn new(temperature_k: f64, pressure_pa: f64, delta: f64, phase: Phase) -> Result<Self, StateError> {
        let (there, caloric) = thermal(temperature_k, pressure_pa, delta, phase)?;
        Ok(Self {
            temperature_k,
            pressure_pa,
            density_kg_m3: there.density_kg_m3,
            phase,
            enthalpy_j_kg: there.enthalpy_j_kg,
            entropy_j_kg_k: there.entropy_j_kg_k,
            heat_capacity_j_kg_k: GAS_CONSTANT * caloric.isobaric,
            isochoric_heat_capacity_j_kg_k: GAS_CONSTANT * caloric.isochoric,
            sound_speed_m_s: (GAS_CONSTANT * temperature_k * caloric.sound_squared).sqrt(),
            viscosity_pa_s: viscosity::correlation_pa_s(temperature_k, there.density_kg_m3),
        })
    }
}

/// Of carbon dioxide, J/(kg K).
const GAS_CONSTANT: f64 = GAS_CONSTANT_J_MOL_K / MOLAR_MASS_KG_MOL;

/// What an account of energy needs of a state, without the rest.
fn thermal(
    temperature_k: f64,
    pressure_pa: f64,
    delta: f64,
    phase: Phase,
) -> Result<(Equilibrium, helmholtz::Caloric), StateError> {
    let caloric = helmholtz::Caloric::new(CRITICAL_TEMPERATURE_K / temperature_k, delta);
    // Where the isotherm is flat to rounding, heat capacity and density are noise.
    if !(caloric.stiffness > 1e-9 && caloric.isochoric > 0.0) {
        return Err(StateError::Critical { temperature_k, pressure_pa });
    }
    let there = Equilibrium {
        temperature_k,
        pressure_pa,
        density_kg_m3: delta * CRITICAL_DENSITY_KG_M3,
        enthalpy_j_kg: GAS_CONSTANT * temperature_k * caloric.enthalpy,
        entropy_j_kg_k: GAS_CONSTANT * caloric.entropy,
        phases: Phases::Single(phase),
    };
    Ok((there, caloric))
}

/// As [`state`], with what an account of energy needs of it, and the heat capacity at constant pressure, J/(kg K).
fn equilibrium(temperature_k: f64, pressure_pa: f64) -> Result<(Equilibrium, f64), StateError> {
    let (delta, phase) = density::reduced_density(temperature_k, pressure_pa)?;
    let (there, caloric) = thermal(temperature_k, pressure_pa, delta, phase)?;
    Ok((there, GAS_CONSTANT * caloric.isobaric))
}

/// The state at a temperature, K, and an absolute pressure, Pa.
///
/// Range, phases and zero of enthalpy: see the [module](self). Without the caloric properties and the viscosity
/// [`density_kg_m3`] costs about half.
///
/// # Errors
/// As for [`density_kg_m3`], and [`StateError::Critical`] where the isotherm is flat to rounding.
///
/// ```
/// // Liquid at the pump head at 4 °C and 60 bar.
/// let metered = thimbleworth::co2::state(277.15, 6e6)?;
/// assert_eq!(metered.phase.word(), "liquid");
/// assert!((metered.density_kg_m3 - 923.66).abs() < 0.01);
/// # Ok::<(), thimbleworth::co2::StateError>(())
/// ```
pub fn state(temperature_k: f64, pressure_pa: f64) -> Result<State, StateError> {
    let (delta, phase) = density::reduced_density(temperature_k, pressure_pa)?;
    State::new(temperature_k, pressure_pa, delta, phase)
}

/// The states of the liquid and of the vapour in equilibrium at a temperature, K, in this order.
///
/// Range: as for [`saturation_pressure_pa`].
///
/// # Errors
/// As for [`saturation_pressure_pa`], and [`StateError::Critical`] in the last fraction of a millikelvin.
///
/// ```
/// // Heat of vaporisation at 5 °C, about 215 kJ/kg
/// let (liquid, vapour) = thimbleworth::co2::saturated_states(278.15)?;
/// let heat_j_kg = vapour.enthalpy_j_kg - liquid.enthalpy_j_kg;
/// assert!((heat_j_kg - 215e3).abs() < 1e3);
/// # Ok::<(), thimbleworth::co2::StateError>(())
/// ```
pub fn saturated_states(temperature_k: f64) -> Result<(State, State), StateError> {
    let pressure_pa = saturation_pressure_pa(temperature_k)?;
    let at = boundary::OnSaturation::new(temperature_k);
    Ok((
        State::new(temperature_k, pressure_pa, at.liquid(), Phase::Liquid)?,
        State::new(temperature_k, pressure_pa, at.vapour(), Phase::Gas)?,
    ))
}
