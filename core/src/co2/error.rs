//! Why a state is refused.

use core::fmt;

use super::{HIGHEST_DENSITY_KG_M3, HIGHEST_PRESSURE_PA, HIGHEST_TEMPERATURE_K, TRIPLE_TEMPERATURE_K};

/// Why a state is refused; the values are those found, in base SI.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum StateError {
    /// The temperature is not a number or outside 216.592 K to 1100 K.
    Temperature {
        /// Temperature found, K.
        temperature_k: f64,
    },
    /// The pressure is not a number, not above zero, or above 800 MPa.
    Pressure {
        /// Pressure found, Pa.
        pressure_pa: f64,
    },
    /// The density is not a number, not above zero, or above 1600 kg/m³.
    Density {
        /// Density found, kg/m³.
        density_kg_m3: f64,
    },
    /// The pressure is above the melting line.
    Solid {
        /// Temperature found, K.
        temperature_k: f64,
        /// Pressure found, Pa.
        pressure_pa: f64,
        /// Melting pressure at this temperature, Pa.
        melting_pressure_pa: f64,
    },
    /// The state is on the saturation line: liquid and vapour side by side, in any proportion.
    TwoPhase {
        /// Temperature found, K.
        temperature_k: f64,
        /// Saturation pressure at this temperature, Pa.
        saturation_pressure_pa: f64,
        /// Density of the liquid, kg/m³.
        liquid_kg_m3: f64,
        /// Density of the vapour, kg/m³.
        vapour_kg_m3: f64,
    },
    /// From the critical temperature upwards nothing boils.
    NoSaturation {
        /// Temperature found, K.
        temperature_k: f64,
    },
    /// Outside the triple and the critical pressure nothing boils.
    NoBoiling {
        /// Pressure found, Pa.
        pressure_pa: f64,
    },
    /// No fluid state of the range has this enthalpy at this pressure.
    Enthalpy {
        /// Enthalpy found, J/kg.
        enthalpy_j_kg: f64,
        /// Pressure found, Pa.
        pressure_pa: f64,
        /// Enthalpy at the end of the range, J/kg.
        bound_j_kg: f64,
        /// Temperature at the end of the range, K.
        temperature_k: f64,
        /// Whether it lies below the lower end.
        below: bool,
    },
    /// No fluid state of the range has this entropy at this pressure.
    Entropy {
        /// Entropy found, J/(kg K).
        entropy_j_kg_k: f64,
        /// Pressure found, Pa.
        pressure_pa: f64,
        /// Entropy at the end of the range, J/(kg K).
        bound_j_kg_k: f64,
        /// Temperature at the end of the range, K.
        temperature_k: f64,
        /// Whether it lies below the lower end.
        below: bool,
    },
    /// No pressure up to 800 MPa makes it solid at this temperature.
    NoMelting {
        /// Temperature found, K.
        temperature_k: f64,
    },
    /// So close to the critical point that density and heat capacity have no definite value.
    Critical {
        /// Temperature found, K.
        temperature_k: f64,
        /// Pressure found, Pa.
        pressure_pa: f64,
    },
    /// The temperature is outside the viscosity correlation's 100 K to 10 000 K, or the density outside 0 to
    /// 1600 kg/m³.
    Viscosity {
        /// Temperature found, K.
        temperature_k: f64,
        /// Density found, kg/m³.
        density_kg_m3: f64,
    },
}

/// A temperature in °C and K.
struct Temperature(f64);

impl fmt::Display for Temperature {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        write!(f, "{:.3} °C ({:.3} K)", self.0 - 273.15, self.0)
    }
}

/// A pressure in bar and Pa.
struct Pressure(f64);

impl fmt::Display for Pressure {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        write!(f, "{:.4} bar ({:.0} Pa)", self.0 / 1e5, self.0)
    }
}

/// What lies beyond the end of the range, and what to do.
struct Beyond(bool);

impl fmt::Display for Beyond {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        f.write_str(if self.0 {
            "below that a part of it is solid, which the equation cannot describe: state a higher value or pressure"
        } else {
            "above that is the end of the equation's range: state a lower value"
        })
    }
}

impl fmt::Display for StateError {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match *self {
            Self::Temperature { temperature_k } => {
                write!(
                    f,
                    "CO2 at {} is outside the equation of state, which holds from {} to {}",
                    Temperature(temperature_k),
                    Temperature(TRIPLE_TEMPERATURE_K),
                    Temperature(HIGHEST_TEMPERATURE_K),
                )?;
                if temperature_k < TRIPLE_TEMPERATURE_K {
                    write!(
                        f,
                        "; below it there is only solid and gas, and no liquid: state a higher temperature"
                    )
                } else {
                    write!(f, "; state a temperature between them")
                }
            }
            Self::Pressure { pressure_pa } => write!(
                f,
                "CO2 at a pressure of {} is outside the equation of state, which holds above 0 and up to {}; \
                 state an absolute pressure in between",
                Pressure(pressure_pa),
                Pressure(HIGHEST_PRESSURE_PA),
            ),
            Self::Density { density_kg_m3 } => write!(
                f,
                "a CO2 density of {density_kg_m3:.2} kg/m³ is outside the equation of state, which holds above 0 and \
                 up to {HIGHEST_DENSITY_KG_M3:.0} kg/m³; state a density in between"
            ),
            Self::Solid { temperature_k, pressure_pa, melting_pressure_pa } => write!(
                f,
                "CO2 at {} and {} is solid: at this temperature it freezes at {}; state a lower pressure or a higher \
                 temperature",
                Temperature(temperature_k),
                Pressure(pressure_pa),
                Pressure(melting_pressure_pa),
            ),
            Self::TwoPhase { temperature_k, saturation_pressure_pa, liquid_kg_m3, vapour_kg_m3 } => write!(
                f,
                "CO2 at {} boils at {}: liquid of {liquid_kg_m3:.2} kg/m³ and vapour of {vapour_kg_m3:.2} kg/m³ are \
                 both possible; state a pressure above it for the liquid or below it for the gas, or ask for the \
                 saturated liquid or vapour",
                Temperature(temperature_k),
                Pressure(saturation_pressure_pa),
            ),
            Self::NoSaturation { temperature_k } => write!(
                f,
                "CO2 at {} has no saturation pressure, since nothing boils from the critical temperature of {} upwards; \
                 state a lower temperature",
                Temperature(temperature_k),
                Temperature(super::CRITICAL_TEMPERATURE_K),
            ),
            Self::NoBoiling { pressure_pa } => write!(
                f,
                "CO2 at {} has no boiling temperature: it boils from {} to below {}; state a pressure in between",
                Pressure(pressure_pa),
                Pressure(super::TRIPLE_PRESSURE_PA),
                Pressure(super::CRITICAL_PRESSURE_PA),
            ),
            Self::Enthalpy { enthalpy_j_kg, pressure_pa, bound_j_kg, temperature_k, below } => write!(
                f,
                "no fluid CO2 at {} has an enthalpy of {:.2} kJ/kg: at {} it has {:.2} kJ/kg; {}",
                Pressure(pressure_pa),
                enthalpy_j_kg / 1e3,
                Temperature(temperature_k),
                bound_j_kg / 1e3,
                Beyond(below),
            ),
            Self::Entropy { entropy_j_kg_k, pressure_pa, bound_j_kg_k, temperature_k, below } => write!(
                f,
                "no fluid CO2 at {} has an entropy of {:.4} kJ/(kg K): at {} it has {:.4} kJ/(kg K); {}",
                Pressure(pressure_pa),
                entropy_j_kg_k / 1e3,
                Temperature(temperature_k),
                bound_j_kg_k / 1e3,
                Beyond(below),
            ),
            Self::NoMelting { temperature_k } => write!(
                f,
                "CO2 at {} stays fluid up to {}, the highest pressure of the equation of state; state a temperature \
                 below 54.5 °C (327.7 K)",
                Temperature(temperature_k),
                Pressure(HIGHEST_PRESSURE_PA),
            ),
            Self::Critical { temperature_k, pressure_pa } => write!(
                f,
                "CO2 at {} and {} is at the critical point, where its density and heat capacity have no definite \
                 value; state a temperature or pressure further from {} and {}",
                Temperature(temperature_k),
                Pressure(pressure_pa),
                Temperature(super::CRITICAL_TEMPERATURE_K),
                Pressure(super::CRITICAL_PRESSURE_PA),
            ),
            Self::Viscosity { temperature_k, density_kg_m3 } => write!(
                f,
                "the viscosity of CO2 at {} and {density_kg_m3:.2} kg/m³ is outside the correlation, which holds from \
                 100 K to 10 000 K and from 0 to {HIGHEST_DENSITY_KG_M3:.0} kg/m³; state values between these",
                Temperature(temperature_k),
            ),
        }
    }
}

impl core::error::Error for StateError {}
