//! What is shown of a step with dense CO2 beside its postings: states, strength, what liquid between valves would do.

use crate::co2::density_kg_m3;
use crate::co2_loop::{Loop, Trapped, letdown_left_share, trapped_liquid};
use crate::dense_gas::search::Window;
use crate::dense_gas::strength::giddings_mpa_half;
use crate::dense_gas::study::Study;

/// To this a length of line warms in a room, K.
const WARM_K: f64 = 298.15;

/// A reading of the flow at one state.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Metered {
    /// In words.
    pub at: &'static str,
    /// Temperature, K.
    pub temperature_k: f64,
    /// Absolute pressure, Pa.
    pub pressure_pa: f64,
    /// Density there, kg/m³.
    pub density_kg_m3: f64,
    /// What the same volume would be; kg in a run.
    pub kg: f64,
}

/// A step with dense CO2 as its states are; central values.
#[derive(Clone, Debug, PartialEq)]
pub struct DenseCo2 {
    /// Whether the CO2 comes back.
    pub recycled: bool,
    /// Temperature in the vessel, K.
    pub temperature_k: f64,
    /// Absolute pressure in the vessel, Pa.
    pub pressure_pa: f64,
    /// Density in the vessel, kg/m³.
    pub density_kg_m3: f64,
    /// Solubility parameter by Giddings, MPa^½.
    pub strength_mpa_half: f64,
    /// The circuit per kilogram passed through.
    pub legs: Loop,
    /// Share of the filling that the let-down leaves in the vessel, where it is recycled and let down.
    pub left_share: Option<f64>,
    /// What the liquid at the pump does when it is shut in and warms to 25 °C; `None` where it is no colder.
    pub trapped: Option<Trapped>,
    /// The flow as it is metered, and as the same volume would be elsewhere; empty unless it is metered as liquid.
    pub metered: Vec<Metered>,
    /// Solubility and target, where the plan states a solubility and takes something out.
    pub study: Option<Study>,
    /// Where a better state may be sought, where the plan states the ratings.
    pub window: Option<Window>,
    /// Filling of a cylinder, kg, and the share of it that cannot be used, where the plan says.
    pub cylinder: Option<(f64, f64)>,
}

impl DenseCo2 {
    pub(super) fn of(
        recycled: bool,
        (temperature_k, pressure_pa): (f64, f64),
        let_down: Option<(f64, f64)>,
        legs: Loop,
    ) -> Option<Self> {
        let density_kg_m3 = density_kg_m3(temperature_k, pressure_pa).ok()?;
        let pump = legs.point(if recycled { "condenser out" } else { "chilled" })?;
        let cold = pump.state().ok()?;
        Some(Self {
            recycled,
            temperature_k,
            pressure_pa,
            density_kg_m3,
            strength_mpa_half: giddings_mpa_half(density_kg_m3).ok()?,
            left_share: let_down.and_then(|to| letdown_left_share((temperature_k, pressure_pa), to).ok()),
            trapped: trapped_liquid(cold.temperature_k, cold.pressure_pa, WARM_K, None).ok(),
            legs,
            metered: Vec::new(),
            study: None,
            window: None,
            cylinder: None,
        })
    }

    /// Sets what a volume metered at a pump's head, m³, is there, after compression, and with the chiller off.
    pub(in crate::step) fn meter(&mut self, (temperature_k, pressure_pa): (f64, f64), volume_m3: f64) {
        let supply = self.legs.point("supply").and_then(|p| p.state().ok());
        let after = pressure_pa < 0.999 * self.pressure_pa;
        let low_pa = if after { pressure_pa } else { supply.map_or(f64::NAN, |s| s.pressure_pa) };
        let other =
            if after { ("after compression", self.pressure_pa) } else { ("before compression", low_pa) };
        let warm_k = supply.map_or(f64::NAN, |s| s.temperature_k);
        let states = [
            ("as metered", temperature_k, pressure_pa),
            (other.0, temperature_k, other.1),
            ("chiller off", warm_k, low_pa),
        ];
        for (at, temperature_k, pressure_pa) in states {
            // A state that does not exist is no reading.
            if let Ok(density_kg_m3) = density_kg_m3(temperature_k, pressure_pa) {
                let kg = volume_m3 * density_kg_m3;
                self.metered.push(Metered { at, temperature_k, pressure_pa, density_kg_m3, kg });
            }
        }
    }

    /// The cold liquid at the pump: temperature, K, and absolute pressure, Pa.
    #[must_use]
    pub fn shut_in(&self) -> Option<(f64, f64)> {
        let point = self.legs.point(if self.recycled { "condenser out" } else { "chilled" })?;
        Some((point.state().ok()?.temperature_k, point.pressure_pa))
    }
}
