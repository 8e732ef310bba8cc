//! Viscosity: Laesecke and Muzny's reference correlation of 2017.

use super::HIGHEST_DENSITY_KG_M3;
use super::coefficients::{
    AVOGADRO, DILUTE, INITIAL_DENSITY, LENGTH_M, RESIDUAL, RESIDUAL_GAMMA, TRIPLE_TEMPERATURE_K,
    VISCOSITY_DENSITY_KG_M3, VISCOSITY_GAS_CONSTANT, VISCOSITY_MOLAR_MASS_KG_MOL, WELL_DEPTH_K,
};
use super::error::StateError;

/// Viscosity at a temperature and density, Pa s, without the critical enhancement.
///
/// η = η₀(T) + η₁(T) ρ + Δη(T, ρ), from A. Laesecke, C. D. Muzny, J. Phys. Chem. Ref. Data 46 (2017) 013107. Stated
/// range: 100 K to 2000 K for the gas, 220 K to 700 K up to the melting line for the compressed and supercritical
/// fluid; the zero-density part extrapolates correctly to 10 000 K (abstract of the source). What is asked for outside the
/// compressed fluid's 220 K to 700 K is extrapolated there: see
/// [`State::viscosity_is_extrapolated`](super::State::viscosity_is_extrapolated).
///
/// # Errors
/// [`StateError::Viscosity`] outside 100 K to 10 000 K or 0 to 1600 kg/m³.
///
/// ```
/// // The source's own check value: 33.112 µPa s at 700 K and 100 kg/m³.
/// let viscosity_pa_s = thimbleworth::co2::viscosity_pa_s(700.0, 100.0)?;
/// assert!((viscosity_pa_s * 1e6 - 33.112).abs() < 0.0005);
/// # Ok::<(), thimbleworth::co2::StateError>(())
/// ```
pub fn viscosity_pa_s(temperature_k: f64, density_kg_m3: f64) -> Result<f64, StateError> {
    let warm = (100.0..=10_000.0).contains(&temperature_k);
    let sparse = (0.0..=HIGHEST_DENSITY_KG_M3).contains(&density_kg_m3);
    if !(warm && sparse) {
        return Err(StateError::Viscosity { temperature_k, density_kg_m3 });
    }
    Ok(correlation_pa_s(temperature_k, density_kg_m3))
}

pub(super) fn correlation_pa_s(temperature_k: f64, density_kg_m3: f64) -> f64 {
    let root = temperature_k.sqrt();
    let sixth = libm::cbrt(root);
    let third = sixth * sixth;
    let a = DILUTE;
    // η₀ = 1.0055 √T / (a₀ + a₁ T^⅙ + a₂ e^(a₃ T^⅓) + (a₄ + a₅ T^⅓) e^(−T^⅓) + a₆ √T), mPa s
    let dilute = 1.0055 * root
        / (a[0]
            + a[1] * sixth
            + a[2] * libm::exp(a[3] * third)
            + (a[4] + a[5] * third) * libm::exp(-third)
            + a[6] * root);

    // η₁ ρ = η₀ ρ (N_A σ³/M) Σ bᵢ (T/ε)^(−tᵢ)
    let log = libm::log(temperature_k / WELL_DEPTH_K);
    let mut virial = 0.0;
    for (b, t) in INITIAL_DENSITY {
        virial += b * libm::exp(-t * log);
    }
    let volume = AVOGADRO * LENGTH_M * LENGTH_M * LENGTH_M / VISCOSITY_MOLAR_MASS_KG_MOL;
    let linear = dilute * density_kg_m3 * volume * virial;

    // Δη = η_t [c₁ Tᵣ ρᵣ³ + (ρᵣ² + ρᵣ^γ)/(Tᵣ − c₂)], Tᵣ = T/Tₜ, ρᵣ = ρ/1178.53
    let t = temperature_k / TRIPLE_TEMPERATURE_K;
    let r = density_kg_m3 / VISCOSITY_DENSITY_KG_M3;
    // η_t = 10³ ρ_t^⅔ √(R Tₜ) / (M^⅙ N_A^⅓), mPa s
    let unit = 1e3
        * libm::cbrt(VISCOSITY_DENSITY_KG_M3 * VISCOSITY_DENSITY_KG_M3)
        * (VISCOSITY_GAS_CONSTANT * TRIPLE_TEMPERATURE_K).sqrt()
        / (libm::cbrt(VISCOSITY_MOLAR_MASS_KG_MOL.sqrt()) * libm::cbrt(AVOGADRO));
    let residual =
        unit * (RESIDUAL[0] * t * r * r * r + (r * r + libm::pow(r, RESIDUAL_GAMMA)) / (t - RESIDUAL[1]));

    (dilute + linear + residual) * 1e-3
}
