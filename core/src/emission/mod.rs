//! Vapour lost to air by batch operations: the published batch equations as pure functions of stated inputs.
//!
//! | file | what it holds |
//! | --- | --- |
//! | `displacement` | filling a vessel, purging an empty one, letting its pressure down |
//! | `sweep` | gas over a liquid: sweep with saturation factor, gas that evolves, vacuum with a leak |
//! | `heat_up` | heating a vented vessel: the exact integral and the two forms of the guidance |
//! | `drying` | solvent driven from a solid by air |
//! | `surface` | evaporation from an open surface and from a pool |
//! | `blow_down` | a gas stream over a vial: the least gas and time, and how far the liquid cools itself |
//!
//! The equations are those of 40 CFR 63.1257(d)(2)(i) and 63.11950 and of EPA's EIIP volume II chapter 16 (2007). Their wording was
//! read in part; the printed equations were not, so the forms are from memory, checked by dimensions and against one
//! another. They assume an ideal gas and vapour in equilibrium with the liquid, which is an upper limit unless a
//! saturation factor says otherwise. They are accounting equations: what a permit or a limit asks is the local
//! authority's to say.
//!
//! Partial pressures are inputs: `xᵢ γᵢ Pᵢ,sat` of the liquid, from [`mixture`](crate::mixture) or from the site.
//!
//! ```
//! use thimbleworth::emission::{Vapour, fill};
//! // a 200 L drum filled with dichloromethane at 20 °C pushes out a third of a kilogram
//! let vapour = Vapour { partial_pressure_pa: 47_532.0, molar_mass_kg_mol: 0.084_93 };
//! let emitted = fill(0.2, 293.15, 101_325.0, &[vapour])?;
//! assert!((emitted.total_kg() - 0.3313).abs() < 1e-4);
//! # Ok::<(), thimbleworth::emission::EmissionError>(())
//! ```
mod blow_down;
mod displacement;
mod drying;
mod error;
mod heat_up;
mod surface;
mod sweep;
mod vapour;

pub use blow_down::{
    Cooling, check_time, gas_to_carry_mol, least_time_s, saturation_capacity_mol_mol, self_cooling,
};
pub use displacement::{depressurise, fill, purge_empty};
pub use drying::air_drying_kg;
pub use error::EmissionError;
pub use heat_up::{HeatUp, Vessel, heat_up};
pub use surface::{OpenSurface, Pool, mass_transfer_m_s, open_surface_kg_s, pool_epa_kg_s, pool_mackay_kg_s};
pub use sweep::{Sweep, evolved_gas_m3, sweep, vacuum_leak};
pub use vapour::{Emitted, Vapour};

use crate::source::{Source, Standing};

/// Molar gas constant, J/(mol K), 2019 SI.
pub(crate) const R: f64 = 8.314_462_618;

/// The batch equations of the federal rule.
pub const BATCH_RULE: Source = Source::new(
    "40 CFR 63.1257(d)(2)(i) and 63.11950, batch process emission episodes; wording read in part, form of the equations from memory",
    Standing::FromMemory,
);
/// The same set in EPA's guidance.
pub const EIIP: Source = Source::new(
    "EPA, Emission Inventory Improvement Program, vol. II, chapter 16 (2007), seen in secondary texts",
    Standing::Secondary,
);
/// Evaporation of pools.
pub const MACKAY: Source = Source::new(
    "Mackay and Matsugu, Can. J. Chem. Eng. 51 (1973) 434; Kawamura and Mackay, J. Hazard. Mater. 15 (1987) 343",
    Standing::FromMemory,
);
/// The quick estimate of the offsite consequence guidance.
pub const EPA_OFFSITE: Source = Source::new(
    "EPA, Risk Management Program Guidance for Offsite Consequence Analysis, equation D-1",
    Standing::FromMemory,
);
