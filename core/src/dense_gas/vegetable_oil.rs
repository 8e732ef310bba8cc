//! Solubility of vegetable oils by del Valle and Aguilera.
use super::DenseGasError;
use super::error::within;
use crate::co2::density_kg_m3;
use crate::source::{Source, Standing};

/// The equation.
pub const SOURCE: Source = Source::new(
    "J. M. del Valle, J. M. Aguilera, Ind. Eng. Chem. Res. 27 (1988) 1551: equation and range",
    Standing::FromMemory,
);

/// Range in temperature, K: 293 K to 353 K in the source, in whole kelvins, so that 20 °C and 80 °C belong to it.
pub const TEMPERATURE_K: [f64; 2] = [292.5, 353.5];
/// Range in absolute pressure, Pa.
pub const PRESSURE_PA: [f64; 2] = [15e6, 88e6];
/// Highest solubility, kg/m³.
pub const HIGHEST_KG_M3: f64 = 100.0;

/// Solubility of a vegetable oil (triglycerides), kg/m³, at a temperature, K, and an absolute pressure, Pa.
///
/// C = exp(40.361 − 18708/T + 2186840/T²) ρ^10.724, with C in g/L and ρ in g/mL. Range: 293 K to 353 K, 15 MPa to 88 MPa,
/// below 100 kg/m³; refused outside. One curve for all vegetable oils: scatter of tens of percent is usual (from memory).
///
/// # Errors
/// [`DenseGasError::OutOfRange`] outside the range, [`DenseGasError::State`].
///
/// ```
/// use thimbleworth::dense_gas::vegetable_oil::solubility_kg_m3;
/// // 40 °C, 300 bar: 6.74 g/L; at 100 bar the equation is outside its range
/// assert!((solubility_kg_m3(313.15, 30e6).unwrap() - 6.74).abs() < 0.01);
/// assert!(solubility_kg_m3(313.15, 10e6).is_err());
/// ```
pub fn solubility_kg_m3(temperature_k: f64, pressure_pa: f64) -> Result<f64, DenseGasError> {
    let inside = |[low, high]: [f64; 2], value: f64| value >= low && value <= high;
    let t = within(
        "temperature of an oil's solubility, K",
        temperature_k,
        inside(TEMPERATURE_K, temperature_k),
        "293 K to 353 K (20 °C to 80 °C), the range of del Valle and Aguilera,",
    )?;
    within(
        "pressure of an oil's solubility, Pa",
        pressure_pa,
        inside(PRESSURE_PA, pressure_pa),
        "15 MPa to 88 MPa (150 bar to 880 bar), the range of del Valle and Aguilera,",
    )?;
    let density_kg_l = density_kg_m3(t, pressure_pa)? / 1e3;
    // ln C = 40.361 − 18708/T + 2186840/T² + 10.724 ln ρ
    let solubility =
        libm::exp(40.361 - 18_708.0 / t + 2_186_840.0 / (t * t) + 10.724 * libm::log(density_kg_l));
    within(
        "solubility of an oil, kg/m³",
        solubility,
        solubility < HIGHEST_KG_M3,
        "a solubility below 100 kg/m³, the range of del Valle and Aguilera,",
    )
}
