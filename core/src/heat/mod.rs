//! Heat and utilities of a step: what physics asks for, what the apparatus draws, and cooling water.
//!
//! | file | what it holds |
//! | --- | --- |
//! | `reflux` | duty of a reflux from its cycles; cooling water by flow and by the latent floor |
//! | `duty` | heating a charge, evaporating, drying in an oven; heat measured from a rise of temperature |
//! | `machine` | electricity of heaters, chillers, pumps, microwave and ultrasound |
//! | `demand` | nominal, computed and measured electricity of one step beside one another |
//! | `power` | usual powers of bench apparatus, all from memory |
//!
//! Three figures are kept apart, because they differ by a factor of ten and more. *Nominal* is plate power by time and duty. *Computed* is the
//! floor that thermodynamics sets: no apparatus comes below it. *Measured* is a meter's reading, and overrides both.
//!
//! ```
//! use thimbleworth::heat::{Demand, Basis, electricity_j, reflux_duty_j, siphoned_m3, J_PER_KWH};
//! // 85 mL siphoned five times an hour for 20 h: 8.5 L of hexane evaporated, 0.52 kWh; a 250 W mantle draws 5 kWh
//! let duty = reflux_duty_j(siphoned_m3(100.0, 85e-6)?, 659.4, 335e3, 0.0)?;
//! let demand = Demand { nominal_j: electricity_j(250.0, 1.0, 72_000.0)?, computed_j: Some(duty), measured_j: None };
//! assert!((duty / J_PER_KWH - 0.52).abs() < 0.005);
//! assert_eq!(demand.chosen(), (5.0 * J_PER_KWH, Basis::Nominal));
//! # Ok::<(), thimbleworth::heat::HeatError>(())
//! ```
mod demand;
mod duty;
mod error;
mod machine;
mod power;
mod reflux;

pub use demand::{Basis, Demand, DemandDoubt};
pub use duty::{evaporation_duty_j, heat_from_rise_j, oven_duty_j, sensible_heat_j};
pub use error::HeatError;
pub use machine::{
    compressed_gas_electricity_j, cooling_electricity_j, electricity_j, microwave_electricity_j,
    pump_electricity_j,
};
pub use power::{POWERS, Power, power};
pub use reflux::{
    cooling_water_by_flow_kg, cooling_water_floor_kg, latent_heat_j_m3, reflux_duty_j, siphoned_m3,
};

/// Joules in a kilowatt-hour, by definition.
pub const J_PER_KWH: f64 = 3.6e6;
/// Specific heat capacity of liquid water near room temperature, J/(kg K); within 0.2 % from 10 to 60 °C (common
/// handbook value, from memory).
pub const WATER_HEAT_CAPACITY_J_KG_K: f64 = 4184.0;
