//! The state at a pressure and an enthalpy or an entropy, liquid and vapour side by side included.

use core::fmt;

use super::boundary::{self, Phase};
use super::coefficients::{CRITICAL_PRESSURE_PA, CRITICAL_TEMPERATURE_K, MELTING, TRIPLE_PRESSURE_PA};
use super::error::StateError;
use super::{
    HIGHEST_PRESSURE_PA, HIGHEST_TEMPERATURE_K, State, TRIPLE_TEMPERATURE_K, saturated_states, state,
};

/// Newton's steps with halving as the fallback; five or six are usual, halving alone would take about 45.
const STEPS: u32 = 120;
/// A temperature is found when the next step would change it by less than this part of itself.
const TEMPERATURE_FOUND: f64 = 1e-12;

/// The same where the pressure does not tell the phase: 1e-9 of the pressure, which rises some sevenfold as fast as T.
const SATURATION_BLUR: f64 = 2e-10;

/// Which phases a state has.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Phases {
    /// One phase.
    Single(Phase),
    /// Liquid and vapour in equilibrium.
    LiquidAndVapour {
        /// Mass of vapour over mass of both, 0 to 1 (the quality).
        vapour_share: f64,
    },
}

impl fmt::Display for Phases {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            Self::Single(phase) => f.write_str(phase.word()),
            Self::LiquidAndVapour { vapour_share } => {
                write!(f, "liquid and vapour, {:.1} % vapour by mass", 100.0 * vapour_share)
            }
        }
    }
}

/// A fluid state that may be liquid and vapour side by side. Zero of enthalpy and entropy: see the
/// [module](super).
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Equilibrium {
    /// Temperature, K.
    pub temperature_k: f64,
    /// Absolute pressure, Pa.
    pub pressure_pa: f64,
    /// Density, kg/m³; of liquid and vapour together where there are both.
    pub density_kg_m3: f64,
    /// Specific enthalpy, J/kg.
    pub enthalpy_j_kg: f64,
    /// Specific entropy, J/(kg K).
    pub entropy_j_kg_k: f64,
    /// Which phases.
    pub phases: Phases,
}

impl From<State> for Equilibrium {
    fn from(state: State) -> Self {
        Self {
            temperature_k: state.temperature_k,
            pressure_pa: state.pressure_pa,
            density_kg_m3: state.density_kg_m3,
            enthalpy_j_kg: state.enthalpy_j_kg,
            entropy_j_kg_k: state.entropy_j_kg_k,
            phases: Phases::Single(state.phase),
        }
    }
}

impl Equilibrium {
    /// Whether any of it is gas below the critical pressure, which a liquid pump cannot take.
    ///
    /// ```
    /// use thimbleworth::co2::{Equilibrium, state};
    /// assert!(Equilibrium::from(state(298.15, 50e5)?).has_gas());
    /// assert!(!Equilibrium::from(state(278.15, 60e5)?).has_gas());
    /// # Ok::<(), thimbleworth::co2::StateError>(())
    /// ```
    #[must_use]
    pub fn has_gas(&self) -> bool {
        match self.phases {
            Phases::Single(phase) => phase == Phase::Gas,
            Phases::LiquidAndVapour { vapour_share } => vapour_share > 0.0,
        }
    }
}

/// Temperature at which liquid and vapour are in equilibrium at a pressure, K.
///
/// The inverse of [`saturation_pressure_pa`](super::saturation_pressure_pa), solved to 1e-13 of the temperature.
/// Range: from the triple pressure (0.51795 MPa) to below the critical pressure (7.3773 MPa).
///
/// # Errors
/// [`StateError::NoBoiling`] outside that range.
///
/// ```
/// // A condenser at 50 bar boils at 14.28 °C.
/// let temperature_k = thimbleworth::co2::saturation_temperature_k(50e5)?;
/// assert!((temperature_k - 287.434).abs() < 1e-3);
/// # Ok::<(), thimbleworth::co2::StateError>(())
/// ```
pub fn saturation_temperature_k(pressure_pa: f64) -> Result<f64, StateError> {
    let none = Err(StateError::NoBoiling { pressure_pa });
    if !(TRIPLE_PRESSURE_PA..CRITICAL_PRESSURE_PA).contains(&pressure_pa) {
        return none;
    }
    let ln_pressure = libm::log(pressure_pa);
    let excess = |inverse: f64| -> Result<f64, StateError> {
        Ok(libm::log(super::saturation_pressure_pa(1.0 / inverse)?) - ln_pressure)
    };
    // ln p against 1/T is nearly straight: false position with the stale end's weight halved (Illinois).
    let (mut cold, mut hot) = (1.0 / TRIPLE_TEMPERATURE_K, 1.0 / CRITICAL_TEMPERATURE_K);
    let mut at_cold = excess(cold)?;
    let mut at_hot = libm::log(CRITICAL_PRESSURE_PA) - ln_pressure;
    if at_cold >= 0.0 {
        // The fitted line ends 3e-5 from the published triple pressure.
        return Ok(TRIPLE_TEMPERATURE_K);
    }
    for _ in 0..STEPS {
        let next = (cold * at_hot - hot * at_cold) / (at_hot - at_cold);
        if !(next < cold && next > hot) || (cold - hot) < 1e-14 * hot {
            break;
        }
        let value = excess(next)?;
        if value.abs() < 1e-14 {
            return Ok(1.0 / next);
        }
        if value > 0.0 {
            (hot, at_hot, at_cold) = (next, value, 0.5 * at_cold);
        } else {
            (cold, at_cold, at_hot) = (next, value, 0.5 * at_hot);
        }
    }
    Ok(1.0 / if at_hot < -at_cold { hot } else { cold })
}

/// The state at an enthalpy, J/kg, and an absolute pressure, Pa.
///
/// Range: as for [`state`]; at a pressure between the triple and the critical point the result may be liquid and
/// vapour, with the share of vapour. Temperature to 1e-12 of itself.
///
/// # Errors
/// [`StateError::Pressure`], [`StateError::Enthalpy`] where no fluid state of the range has that enthalpy (below, there
/// is a solid: an expansion to less than the triple pressure ends in solid and gas, which the equation cannot
/// describe), [`StateError::Critical`].
///
/// ```
/// use thimbleworth::co2::{Phases, state, state_from_enthalpy};
/// // Let down from 300 bar and 60 °C to 50 bar through a valve: 40 % of it vapour, at 14.3 °C.
/// let before = state(333.15, 300e5)?;
/// let after = state_from_enthalpy(before.enthalpy_j_kg, 50e5)?;
/// assert!(matches!(after.phases, Phases::LiquidAndVapour { vapour_share } if (vapour_share - 0.4004).abs() < 1e-4));
/// assert!((after.temperature_k - 287.434).abs() < 1e-3);
/// # Ok::<(), thimbleworth::co2::StateError>(())
/// ```
pub fn state_from_enthalpy(enthalpy_j_kg: f64, pressure_pa: f64) -> Result<Equilibrium, StateError> {
    solve(Wanted::Enthalpy(enthalpy_j_kg), pressure_pa, None)
}

/// The state at an entropy, J/(kg K), and an absolute pressure, Pa; otherwise as [`state_from_enthalpy`].
///
/// # Errors
/// [`StateError::Pressure`], [`StateError::Entropy`], [`StateError::Critical`].
///
/// ```
/// use thimbleworth::co2::{state, state_from_entropy};
/// // A loss-free pump from 5 °C and 60 bar to 300 bar warms the liquid to 21.8 °C.
/// let inlet = state(278.15, 60e5)?;
/// let outlet = state_from_entropy(inlet.entropy_j_kg_k, 300e5)?;
/// assert!((outlet.temperature_k - 294.981).abs() < 1e-3);
/// # Ok::<(), thimbleworth::co2::StateError>(())
/// ```
pub fn state_from_entropy(entropy_j_kg_k: f64, pressure_pa: f64) -> Result<Equilibrium, StateError> {
    solve(Wanted::Entropy(entropy_j_kg_k), pressure_pa, None)
}

/// Temperature at an enthalpy, J/kg, and an absolute pressure, Pa, in K: see [`state_from_enthalpy`].
///
/// # Errors
/// As for [`state_from_enthalpy`].
///
/// ```
/// use thimbleworth::co2::{state, temperature_from_enthalpy_k};
/// let there = state(333.15, 300e5)?;
/// assert!((temperature_from_enthalpy_k(there.enthalpy_j_kg, 300e5)? - 333.15).abs() < 1e-8);
/// # Ok::<(), thimbleworth::co2::StateError>(())
/// ```
pub fn temperature_from_enthalpy_k(enthalpy_j_kg: f64, pressure_pa: f64) -> Result<f64, StateError> {
    Ok(state_from_enthalpy(enthalpy_j_kg, pressure_pa)?.temperature_k)
}

/// Temperature at an entropy, J/(kg K), and an absolute pressure, Pa, in K: see [`state_from_entropy`].
///
/// # Errors
/// As for [`state_from_entropy`].
///
/// ```
/// use thimbleworth::co2::{state, temperature_from_entropy_k};
/// let there = state(278.15, 60e5)?;
/// assert!((temperature_from_entropy_k(there.entropy_j_kg_k, 60e5)? - 278.15).abs() < 1e-8);
/// # Ok::<(), thimbleworth::co2::StateError>(())
/// ```
pub fn temperature_from_entropy_k(entropy_j_kg_k: f64, pressure_pa: f64) -> Result<f64, StateError> {
    Ok(state_from_entropy(entropy_j_kg_k, pressure_pa)?.temperature_k)
}

/// The enthalpy, J/kg, of [`state_from_entropy`], sought from a temperature, K: for a machine's outlet, of which no more is
/// needed, at half the cost. It agrees with the long way to 1e-5 J/kg.
pub(crate) fn enthalpy_from_entropy_near(
    entropy_j_kg_k: f64,
    pressure_pa: f64,
    near_k: f64,
) -> Result<f64, StateError> {
    let mut temperature_k = near_k;
    for _ in 0..4 {
        let Ok((here, cp)) = super::equilibrium(temperature_k, pressure_pa) else { break };
        let excess = entropy_j_kg_k - here.entropy_j_kg_k;
        let step = excess * temperature_k / cp;
        // Near the critical point the heat capacity changes too fast for the series.
        if step.abs() < 1e-4 * temperature_k && cp < 1e4 {
            // h(s) at constant pressure: dh = T ds, d²h = (T/c_p) ds²
            return Ok(here.enthalpy_j_kg + temperature_k * excess * (1.0 + 0.5 * excess / cp));
        }
        temperature_k += step;
    }
    Ok(solve(Wanted::Entropy(entropy_j_kg_k), pressure_pa, Some(near_k))?.enthalpy_j_kg)
}

/// What the state must have.
#[derive(Clone, Copy)]
enum Wanted {
    Enthalpy(f64),
    Entropy(f64),
}

impl Wanted {
    fn value(self) -> f64 {
        match self {
            Self::Enthalpy(value) | Self::Entropy(value) => value,
        }
    }

    fn of(self, state: &State) -> f64 {
        match self {
            Self::Enthalpy(_) => state.enthalpy_j_kg,
            Self::Entropy(_) => state.entropy_j_kg_k,
        }
    }

    fn slope(self, state: &State) -> f64 {
        match self {
            // (∂h/∂T)_p = c_p
            Self::Enthalpy(_) => state.heat_capacity_j_kg_k,
            // (∂s/∂T)_p = c_p/T
            Self::Entropy(_) => state.heat_capacity_j_kg_k / state.temperature_k,
        }
    }

    fn refused(self, pressure_pa: f64, at: &State) -> StateError {
        let bound = self.of(at);
        let (temperature_k, below) = (at.temperature_k, self.value() < bound);
        match self {
            Self::Enthalpy(enthalpy_j_kg) => {
                StateError::Enthalpy { enthalpy_j_kg, pressure_pa, bound_j_kg: bound, temperature_k, below }
            }
            Self::Entropy(entropy_j_kg_k) => {
                StateError::Entropy { entropy_j_kg_k, pressure_pa, bound_j_kg_k: bound, temperature_k, below }
            }
        }
    }
}

/// Where the temperature is sought, K, and the saturated state on one of its ends, if one is.
struct Branch {
    low: f64,
    high: f64,
    saturated: Option<State>,
    guess: f64,
}

fn solve(wanted: Wanted, pressure_pa: f64, near_k: Option<f64>) -> Result<Equilibrium, StateError> {
    if !(pressure_pa > 0.0 && pressure_pa <= HIGHEST_PRESSURE_PA) {
        return Err(StateError::Pressure { pressure_pa });
    }
    let coldest = coldest_fluid_k(pressure_pa);
    let mut branch = Branch { low: coldest, high: HIGHEST_TEMPERATURE_K, saturated: None, guess: 310.0 };
    if (TRIPLE_PRESSURE_PA..CRITICAL_PRESSURE_PA).contains(&pressure_pa) {
        let boiling_k = saturation_temperature_k(pressure_pa)?;
        let (liquid, vapour) = saturated_states(boiling_k)?;
        let (at_liquid, at_vapour) = (wanted.of(&liquid), wanted.of(&vapour));
        let value = wanted.value();
        if value >= at_liquid && value <= at_vapour {
            // x = (h − h′)/(h″ − h′)
            let share = (value - at_liquid) / (at_vapour - at_liquid);
            return Ok(both(pressure_pa, &liquid, &vapour, share));
        }
        // Round figures of the heat capacities for a start.
        let distance = |side: &State, heat: f64| match wanted {
            Wanted::Enthalpy(value) => (value - side.enthalpy_j_kg) / heat,
            Wanted::Entropy(value) => (value - side.entropy_j_kg_k) * side.temperature_k / heat,
        };
        branch = if value > at_vapour {
            let guess = boiling_k + distance(&vapour, 1000.0);
            Branch { low: boiling_k, high: HIGHEST_TEMPERATURE_K, saturated: Some(vapour), guess }
        } else {
            let guess = boiling_k + distance(&liquid, 2500.0);
            Branch { low: coldest, high: boiling_k, saturated: Some(liquid), guess }
        };
    }
    if let Some(near_k) = near_k {
        branch.guess = near_k;
    }
    single(wanted, pressure_pa, &branch)
}

/// The temperature in one phase: Newton inside a bracket, because the heat capacity is without bound at the critical
/// point.
fn single(wanted: Wanted, pressure_pa: f64, branch: &Branch) -> Result<Equilibrium, StateError> {
    let (mut low, mut high) = (branch.low, branch.high);
    let (mut low_seen, mut high_seen) = (false, false);
    let mut temperature_k = branch.guess;
    if !(temperature_k > low && temperature_k < high) {
        temperature_k = 0.5 * (low + high);
    }
    let mut last_step = f64::INFINITY;
    for _ in 0..STEPS {
        let (here, found) = match (state(temperature_k, pressure_pa), branch.saturated) {
            (Ok(here), _) => (here, TEMPERATURE_FOUND),
            // So close to the saturation line that the pressure does not tell the phase: the branch does.
            (Err(StateError::TwoPhase { .. }), Some(saturated)) => (saturated, SATURATION_BLUR),
            (Err(error), _) => return Err(error),
        };
        temperature_k = here.temperature_k;
        let excess = wanted.of(&here) - wanted.value();
        let step = -excess / wanted.slope(&here);
        if step.abs() <= found * temperature_k {
            return Ok(beside(&here, step));
        }
        // At the end of the range and still pointing out of it.
        if (temperature_k >= branch.high && excess < 0.0) || (temperature_k <= branch.low && excess > 0.0) {
            return Err(wanted.refused(pressure_pa, &here));
        }
        if excess > 0.0 {
            (high, high_seen) = (temperature_k, true);
        } else {
            (low, low_seen) = (temperature_k, true);
        }
        let newton = temperature_k + step;
        let next = if newton >= high && !high_seen {
            high
        } else if newton <= low && !low_seen {
            low
        } else if newton > low && newton < high && step.abs() < 0.7 * last_step {
            newton
        } else {
            0.5 * (low + high)
        };
        last_step = (next - temperature_k).abs();
        if last_step <= 1e-15 * temperature_k || !next.is_finite() {
            return if excess.is_finite() {
                Ok(beside(&here, step))
            } else {
                Err(wanted.refused(pressure_pa, &here))
            };
        }
        temperature_k = next;
    }
    // 120 halvings of 900 K are far below rounding, so this is not reached with finite numbers.
    Ok(state(temperature_k, pressure_pa)?.into())
}

/// The state a last, small step in temperature away at the same pressure.
fn beside(here: &State, step_k: f64) -> Equilibrium {
    let heat_j_kg = here.heat_capacity_j_kg_k * step_k;
    Equilibrium {
        temperature_k: here.temperature_k + step_k,
        enthalpy_j_kg: here.enthalpy_j_kg + heat_j_kg,
        // ds = dh/T at constant pressure
        entropy_j_kg_k: here.entropy_j_kg_k + heat_j_kg / here.temperature_k,
        ..(*here).into()
    }
}

/// Liquid and vapour in the given proportion.
fn both(pressure_pa: f64, liquid: &State, vapour: &State, share: f64) -> Equilibrium {
    let mixed = |of: fn(&State) -> f64| of(liquid) + share * (of(vapour) - of(liquid));
    Equilibrium {
        temperature_k: liquid.temperature_k,
        pressure_pa,
        // 1/ρ = (1 − x)/ρ′ + x/ρ″
        density_kg_m3: 1.0 / mixed(|side| 1.0 / side.density_kg_m3),
        enthalpy_j_kg: mixed(|side| side.enthalpy_j_kg),
        entropy_j_kg_k: mixed(|side| side.entropy_j_kg_k),
        phases: Phases::LiquidAndVapour { vapour_share: share },
    }
}

/// Lowest temperature at which it is fluid at a pressure, K: on the melting line, or at the triple point.
fn coldest_fluid_k(pressure_pa: f64) -> f64 {
    let x = pressure_pa / TRIPLE_PRESSURE_PA - 1.0;
    if x <= 0.0 {
        return TRIPLE_TEMPERATURE_K;
    }
    // p/pₜ − 1 = a₁ θ + a₂ θ², θ = T/Tₜ − 1, by the form that keeps its digits for small x
    let theta = 2.0 * x / (MELTING[0] + (MELTING[0] * MELTING[0] + 4.0 * MELTING[1] * x).sqrt());
    let temperature_k = TRIPLE_TEMPERATURE_K * (1.0 + theta);
    debug_assert!((boundary::melting_line_pa(temperature_k) / pressure_pa - 1.0).abs() < 1e-9);
    temperature_k
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::co2::saturation_pressure_pa;

    #[test]
    fn the_saturation_temperature_is_the_inverse() {
        for n in 0..200 {
            let temperature_k = 216.6 + 87.528 * f64::from(n) / 199.0;
            let pressure_pa = saturation_pressure_pa(temperature_k).unwrap();
            let found = saturation_temperature_k(pressure_pa).unwrap();
            assert!((found / temperature_k - 1.0).abs() < 1e-12, "{temperature_k}: {found}");
        }
        for refused in [0.0, 4e5, CRITICAL_PRESSURE_PA, 1e7, f64::NAN] {
            assert!(matches!(saturation_temperature_k(refused), Err(StateError::NoBoiling { .. })));
        }
    }

    #[test]
    fn the_coldest_fluid_lies_on_the_melting_line() {
        for pressure_pa in [5.2e5, 1e6, 1e7, 1e8, 8e8] {
            let found = coldest_fluid_k(pressure_pa);
            assert!((boundary::melting_line_pa(found) / pressure_pa - 1.0).abs() < 1e-10);
        }
        assert_eq!(coldest_fluid_k(1e5), TRIPLE_TEMPERATURE_K);
    }

    /// Over liquid, gas, the neighbourhood of the saturation line and of the critical point.
    #[test]
    fn the_short_way_is_the_long_way() {
        for t in 0..60 {
            let inlet_k = 220.0 + 3.0 * f64::from(t);
            for (from_pa, to_pa) in [(1e5, 6e5), (6e5, 40e5), (40e5, 74e5), (60e5, 73.7e5), (60e5, 500e5)] {
                let Ok(inlet) = state(inlet_k, from_pa) else { continue };
                let Ok(long) = state_from_entropy(inlet.entropy_j_kg_k, to_pa) else { continue };
                for off in [-3.0, 0.0, 0.02, 10.0] {
                    let near_k = long.temperature_k + off;
                    let short = enthalpy_from_entropy_near(inlet.entropy_j_kg_k, to_pa, near_k).unwrap();
                    let apart = (short - long.enthalpy_j_kg).abs();
                    assert!(apart < 1e-5, "{inlet_k} K, {from_pa} to {to_pa} Pa, off {off} K: {apart:e}");
                }
            }
        }
    }

    #[test]
    fn any_start_ends_at_the_same_state() {
        for pressure_pa in [1e5, 45e5, 73e5, 74e5, 80e5, 300e5] {
            let wanted = state(320.0, pressure_pa).unwrap();
            for near_k in [200.0, 217.0, 250.0, 300.0, 304.2, 310.0, 400.0, 1100.0, f64::NAN] {
                let found = solve(Wanted::Entropy(wanted.entropy_j_kg_k), pressure_pa, Some(near_k)).unwrap();
                assert!((found.temperature_k - 320.0).abs() < 1e-8, "{pressure_pa} {near_k}: {found:?}");
                let short = enthalpy_from_entropy_near(wanted.entropy_j_kg_k, pressure_pa, near_k).unwrap();
                assert!((short - wanted.enthalpy_j_kg).abs() < 1e-5, "{pressure_pa} {near_k}: {short}");
            }
        }
    }
}
