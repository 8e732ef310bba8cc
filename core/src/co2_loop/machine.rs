//! Pump and compressor by isentropic efficiency.
use super::LoopError;
use super::error::{above, at, efficiency};
use crate::co2::{Equilibrium, Memo, Phase, Phases};

/// What a machine does to the stream.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Lift {
    /// Absolute pressure at the outlet, Pa.
    pub pressure_pa: f64,
    /// Enthalpy at the outlet, J/kg.
    pub enthalpy_j_kg: f64,
    /// Work into the stream, J/kg.
    pub work_j_kg: f64,
    /// Work of a loss-free machine, J/kg.
    pub ideal_j_kg: f64,
}

/// A liquid pump from `inlet` to an absolute pressure, Pa.
///
/// `isentropic_efficiency` is the work of a loss-free pump over that of this one, above 0 to 1; the difference warms
/// the stream. Losses of drive and gear outside the stream belong to [`Utilities`](super::Utilities). The pump is taken as
/// adiabatic: a cooled head takes up a part of the difference, which then counts as cooling instead.
///
/// # Errors
/// [`LoopError::PumpTakesGas`], [`LoopError::NotAbove`], [`LoopError::OutOfRange`], [`LoopError::State`].
///
/// ```
/// use thimbleworth::{co2::state, co2_loop::pump};
/// let inlet = state(278.15, 50e5).unwrap().into();
/// let lift = pump(&inlet, 300e5, 0.7).unwrap();
/// assert!((lift.ideal_j_kg - 26_501.0).abs() < 1.0);
/// assert!((lift.work_j_kg - 37_859.0).abs() < 1.0);
/// ```
pub fn pump(
    inlet: &Equilibrium,
    outlet_pressure_pa: f64,
    isentropic_efficiency: f64,
) -> Result<Lift, LoopError> {
    pump_in(&mut Memo::default(), inlet, outlet_pressure_pa, isentropic_efficiency)
}

/// As [`pump`], with states kept.
pub(super) fn pump_in(
    states: &mut Memo,
    inlet: &Equilibrium,
    outlet_pressure_pa: f64,
    isentropic_efficiency: f64,
) -> Result<Lift, LoopError> {
    if inlet.has_gas() {
        return Err(LoopError::PumpTakesGas { inlet: *inlet });
    }
    // Some 0.7 K for each 10 bar: only where the search starts.
    let warmer = inlet.temperature_k + 7e-7 * (outlet_pressure_pa - inlet.pressure_pa);
    lift(states, inlet, outlet_pressure_pa, isentropic_efficiency, warmer, "after a loss-free pump")
}

/// A gas compressor from `inlet` to an absolute pressure, Pa; otherwise as [`pump`].
///
/// # Errors
/// [`LoopError::CompressorTakesLiquid`], [`LoopError::NotAbove`], [`LoopError::OutOfRange`], [`LoopError::State`].
///
/// ```
/// use thimbleworth::{co2::state, co2_loop::compress};
/// let inlet = state(298.15, 50e5).unwrap().into();
/// assert!((compress(&inlet, 100e5, 0.7).unwrap().work_j_kg - 40_982.0).abs() < 1.0);
/// ```
pub fn compress(
    inlet: &Equilibrium,
    outlet_pressure_pa: f64,
    isentropic_efficiency: f64,
) -> Result<Lift, LoopError> {
    compress_in(&mut Memo::default(), inlet, outlet_pressure_pa, isentropic_efficiency)
}

/// As [`compress`], with states kept.
pub(super) fn compress_in(
    states: &mut Memo,
    inlet: &Equilibrium,
    outlet_pressure_pa: f64,
    isentropic_efficiency: f64,
) -> Result<Lift, LoopError> {
    if matches!(inlet.phases, Phases::LiquidAndVapour { .. } | Phases::Single(Phase::Liquid)) {
        return Err(LoopError::CompressorTakesLiquid { inlet: *inlet });
    }
    // T₂/T₁ = (p₂/p₁)^0.22, near that of the thin gas: only where the search starts.
    let ratio = outlet_pressure_pa / inlet.pressure_pa;
    let warmer = inlet.temperature_k * if ratio > 0.0 { libm::pow(ratio, 0.22) } else { 1.0 };
    lift(states, inlet, outlet_pressure_pa, isentropic_efficiency, warmer, "after a loss-free compressor")
}

fn lift(
    states: &mut Memo,
    inlet: &Equilibrium,
    outlet_pressure_pa: f64,
    isentropic_efficiency: f64,
    near_k: f64,
    name: &'static str,
) -> Result<Lift, LoopError> {
    let eta = efficiency("isentropic efficiency", isentropic_efficiency)?;
    above("outlet pressure", outlet_pressure_pa, "inlet pressure", inlet.pressure_pa)?;
    let ideal_end_j_kg = states
        .enthalpy_from_entropy_near(inlet.entropy_j_kg_k, outlet_pressure_pa, near_k)
        .map_err(at(name))?;
    // w_s = h(s₁, p₂) − h₁
    let ideal_j_kg = ideal_end_j_kg - inlet.enthalpy_j_kg;
    // w = w_s/η
    let work_j_kg = ideal_j_kg / eta;
    Ok(Lift {
        pressure_pa: outlet_pressure_pa,
        enthalpy_j_kg: inlet.enthalpy_j_kg + work_j_kg,
        work_j_kg,
        ideal_j_kg,
    })
}
