//! States kept from one draw to the next.
//!
//! A state is a pure function of its temperature and pressure: where the bits of both are those of a draw before, so is the
//! state, bit for bit. The calls of a run come in the same order in every draw, so each call keeps one state in a place of
//! its own: what is exact is solved once, what is uncertain takes no other's place.
use super::{
    Equilibrium, Phase, StateError, boundary, density_kg_m3, equilibrium, inverse, saturation_pressure_pa,
    thermal,
};

/// Values by the bits of what they follow from, one place for each call of a run.
#[derive(Clone, Debug)]
struct Kept<const N: usize, V> {
    rows: Vec<Option<([u64; N], V)>>,
    next: usize,
}

impl<const N: usize, V> Default for Kept<N, V> {
    fn default() -> Self {
        Self { rows: Vec::new(), next: 0 }
    }
}

impl<const N: usize, V: Copy> Kept<N, V> {
    fn find(&mut self, of: [f64; N], make: impl FnOnce() -> Result<V, StateError>) -> Result<V, StateError> {
        let key = of.map(f64::to_bits);
        let place = self.next;
        self.next += 1;
        if self.rows.len() <= place {
            self.rows.resize(place + 1, None);
        }
        // Another call of the same run may have met the same state.
        for (found, value) in self.rows.iter().flatten() {
            if *found == key {
                return Ok(*value);
            }
        }
        let value = make()?;
        if let Some(row) = self.rows.get_mut(place) {
            *row = Some((key, value));
        }
        Ok(value)
    }
}

/// States of carbon dioxide that a route has met, with the bits of what they were asked for.
///
/// Gives what [`state`](super::state) and its kin give, to the last bit. It grows where a run makes more calls than it has room for, and allocates nothing else.
///
/// ```
/// use thimbleworth::co2::{Memo, state};
/// let mut memo = Memo::default();
/// for _ in 0..3 {
///     memo.begin();
///     assert_eq!(memo.state(313.15, 30e6), state(313.15, 30e6).map(Into::into));
/// }
/// ```
#[derive(Clone, Debug, Default)]
pub struct Memo {
    densities: Kept<2, f64>,
    states: Kept<2, Equilibrium>,
    liquids: Kept<1, Equilibrium>,
    lifts: Kept<3, f64>,
}

impl Memo {
    /// Room for so many calls of a run.
    #[must_use]
    pub fn with_room(calls: usize) -> Self {
        let mut memo = Self::default();
        memo.densities.rows.resize(calls, None);
        memo.states.rows.resize(calls, None);
        memo.liquids.rows.resize(calls, None);
        memo.lifts.rows.resize(calls, None);
        memo
    }

    /// Begins a run: the next call is its first.
    pub fn begin(&mut self) {
        self.densities.next = 0;
        self.states.next = 0;
        self.liquids.next = 0;
        self.lifts.next = 0;
    }

    /// As [`state`](super::state), without heat capacities, speed of sound and viscosity; temperature in K, absolute
    /// pressure in Pa.
    ///
    /// # Errors
    /// As for [`state`](super::state).
    pub fn state(&mut self, temperature_k: f64, pressure_pa: f64) -> Result<Equilibrium, StateError> {
        self.states.find([temperature_k, pressure_pa], || Ok(equilibrium(temperature_k, pressure_pa)?.0))
    }

    /// The density there, kg/m³: for a state of which nothing else is asked, at half the cost of [`Memo::state`].
    ///
    /// # Errors
    /// As for [`state`](super::state).
    pub fn density_kg_m3(&mut self, temperature_k: f64, pressure_pa: f64) -> Result<f64, StateError> {
        self.densities.find([temperature_k, pressure_pa], || density_kg_m3(temperature_k, pressure_pa))
    }

    /// The liquid of [`saturated_states`](super::saturated_states) at a temperature, K.
    ///
    /// # Errors
    /// As for [`saturated_states`](super::saturated_states).
    pub fn saturated_liquid(&mut self, temperature_k: f64) -> Result<Equilibrium, StateError> {
        self.liquids.find([temperature_k], || {
            let pressure_pa = saturation_pressure_pa(temperature_k)?;
            let liquid = boundary::OnSaturation::new(temperature_k).liquid();
            Ok(thermal(temperature_k, pressure_pa, liquid, Phase::Liquid)?.0)
        })
    }

    /// The enthalpy at an entropy and a pressure, sought from a temperature, J/kg.
    pub(crate) fn enthalpy_from_entropy_near(
        &mut self,
        entropy_j_kg_k: f64,
        pressure_pa: f64,
        near_k: f64,
    ) -> Result<f64, StateError> {
        self.lifts.find([entropy_j_kg_k, pressure_pa, near_k], || {
            inverse::enthalpy_from_entropy_near(entropy_j_kg_k, pressure_pa, near_k)
        })
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::co2::{saturated_states, state};

    #[test]
    fn what_is_kept_is_what_is_solved() {
        let mut memo = Memo::default();
        for draw in 0..40 {
            memo.begin();
            let t = 310.0 + f64::from(draw % 3);
            // An exact state between two that change, one of which is asked for twice.
            for (t, p) in [(t, 30e6), (278.15, 6e6), (t, 30e6), (t + 5.0, 5e6)] {
                assert_eq!(memo.state(t, p), state(t, p).map(Into::into));
                assert_eq!(memo.density_kg_m3(t, p), density_kg_m3(t, p));
            }
            assert_eq!(
                memo.saturated_liquid(280.0 + t / 100.0),
                Ok(saturated_states(280.0 + t / 100.0).unwrap().0.into())
            );
        }
        assert!(memo.states.rows.len() == 4 && memo.liquids.rows.len() == 1);
    }

    #[test]
    fn a_refusal_is_kept_from_nobody() {
        let mut memo = Memo::default();
        for _ in 0..2 {
            memo.begin();
            assert_eq!(memo.state(100.0, 1e5), state(100.0, 1e5).map(Into::into));
            assert!(memo.state(300.0, 1e5).is_ok());
        }
    }
}
