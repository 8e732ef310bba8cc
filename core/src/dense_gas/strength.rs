//! Solvent strength: the solubility parameter of the dense gas beside those of liquids.
//!
//! A rough guide: like dissolves like when the parameters are close. It says nothing about polarity and hydrogen bonds,
//! for which carbon dioxide is a poor solvent at any density.
use super::DenseGasError;
use super::error::{positive, within};
use crate::co2::{CRITICAL_DENSITY_KG_M3, CRITICAL_PRESSURE_PA, GAS_CONSTANT_J_MOL_K, HIGHEST_DENSITY_KG_M3};
use crate::material::Substance;
use crate::source::{Source, Standing};

/// Giddings' parameter.
pub const GIDDINGS: Source = Source::new(
    "J. C. Giddings, M. N. Myers, J. W. King, J. Chromatogr. Sci. 7 (1969) 276: form of the equation",
    Standing::FromMemory,
);
/// Hildebrand's parameter.
pub const HILDEBRAND: Source =
    Source::new("J. H. Hildebrand: square root of the cohesive energy density", Standing::Definition);

/// The atmosphere in which the form gives the critical pressure, Pa.
const ATMOSPHERE_PA: f64 = 101_325.0;
/// (cal/cm³)^½ in MPa^½: √4.184.
const CALORIES: f64 = 2.045_482_828_087_295;
/// Reduced density of a liquid at which the dense gas would be as strong as the liquid.
const LIQUID_REDUCED_DENSITY: f64 = 2.66;

/// Solubility parameter of carbon dioxide by Giddings, MPa^½, from its density, kg/m³: δ = 1.25 √p_c ρ_r/2.66, with p_c in atm
/// and δ in (cal/cm³)^½ in the source.
///
/// Range: densities above 0 up to 1600 kg/m³. An estimate for comparing states with one another, good to a unit or two.
///
/// # Errors
/// [`DenseGasError::OutOfRange`].
///
/// ```
/// use thimbleworth::{co2::density_kg_m3, dense_gas::strength::giddings_mpa_half};
/// // 40 °C, 200 bar: 14.7 MPa^½, about that of hexane
/// let delta = giddings_mpa_half(density_kg_m3(313.15, 20e6).unwrap()).unwrap();
/// assert!((delta - 14.7).abs() < 0.05);
/// ```
pub fn giddings_mpa_half(density_kg_m3: f64) -> Result<f64, DenseGasError> {
    let ok = density_kg_m3 > 0.0 && density_kg_m3 <= HIGHEST_DENSITY_KG_M3;
    let density = within("density, kg/m³", density_kg_m3, ok, "a density above 0 and up to 1600 kg/m³")?;
    let reduced = density / CRITICAL_DENSITY_KG_M3;
    // δ = 1.25 √p_c ρ_r/2.66
    Ok(CALORIES * 1.25 * (CRITICAL_PRESSURE_PA / ATMOSPHERE_PA).sqrt() * reduced / LIQUID_REDUCED_DENSITY)
}

/// Solubility parameter of a liquid by Hildebrand's definition, MPa^½: δ = √(ρ (Δh_v − R T/M)).
///
/// `heat_j_kg` is the heat of vaporisation, J/kg; `density_kg_m3` that of the liquid, kg/m³; `molar_mass_kg_mol` in kg/mol;
/// `temperature_k` in K, well below boiling, because the vapour is taken as ideal.
///
/// # Errors
/// [`DenseGasError::OutOfRange`].
///
/// ```
/// use thimbleworth::dense_gas::strength::hildebrand_mpa_half;
/// // toluene at 25 °C: 18.2 MPa^½ (tables, from memory)
/// let delta = hildebrand_mpa_half(412.5e3, 862.2, 0.092139, 298.15).unwrap();
/// assert!((delta - 18.2).abs() < 0.1, "{delta}");
/// ```
pub fn hildebrand_mpa_half(
    heat_j_kg: f64,
    density_kg_m3: f64,
    molar_mass_kg_mol: f64,
    temperature_k: f64,
) -> Result<f64, DenseGasError> {
    let density = positive("density of the liquid, kg/m³", density_kg_m3)?;
    let work = GAS_CONSTANT_J_MOL_K * positive("temperature, K", temperature_k)?
        / positive("molar mass, kg/mol", molar_mass_kg_mol)?;
    let allowed = "a heat above R T/M, the work of expanding the vapour";
    within("heat of vaporisation, J/kg", heat_j_kg, heat_j_kg > work, allowed)?;
    // δ² = ρ (Δh_v − R T/M), in Pa
    Ok((density * (heat_j_kg - work)).sqrt() / 1e3)
}

/// Hildebrand's parameter of a material of the catalogue at a temperature, K, in MPa^½; `None` where density, heat of
/// vaporisation or molar mass are not known there.
///
/// ```
/// use thimbleworth::{dense_gas::strength::hildebrand_of, material::catalogue};
/// let of = |name| hildebrand_of(catalogue().find(name).unwrap(), 298.15).unwrap();
/// assert!(of("hexane") < of("toluene") && of("toluene") < of("acetone") && of("acetone") < of("ethanol"));
/// ```
#[must_use]
pub fn hildebrand_of(material: &Substance, temperature_k: f64) -> Option<f64> {
    let heat = material.heat_of_vaporisation_j_kg(temperature_k).ok()?.value;
    let density = material.density_kg_m3(temperature_k).ok()?.value;
    let molar_mass = material.molar_mass_kg_mol.as_ref()?.value;
    hildebrand_mpa_half(heat, density, molar_mass, temperature_k).ok()
}
