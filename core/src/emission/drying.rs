//! Solvent driven from a solid by air.
use super::EmissionError;
use super::error::{not_below_zero, within};

/// Solvent that leaves a solid in drying; kg.
///
/// `E = B (PS₁/(100 − PS₁) − PS₂/(100 − PS₂))`, B the dry solid in kg (`dry_solids_kg`), PS the solvent in per cent of the wet mass before and
/// after. Here the shares are fractions of the wet mass: `before` and `after`, 0 up to but not 1. A balance of mass: it
/// holds for any dryer, and everything counts as emitted unless a condenser brings it back.
///
/// Source: [`BATCH_RULE`](super::BATCH_RULE).
///
/// # Errors
/// [`EmissionError::OutOfRange`]; more solvent after than before is refused.
///
/// ```
/// // 10 kg dry, from 20 % to 0.5 %
/// let emitted_kg = thimbleworth::emission::air_drying_kg(10.0, 0.20, 0.005).unwrap();
/// assert!((emitted_kg - 2.44975).abs() < 1e-5);
/// ```
pub fn air_drying_kg(dry_solids_kg: f64, before: f64, after: f64) -> Result<f64, EmissionError> {
    let solids = not_below_zero("dry solids, kg", dry_solids_kg)?;
    let before = within(
        "share of solvent before",
        before,
        (0.0..1.0).contains(&before),
        "a fraction from 0 to below 1",
    )?;
    let after = within(
        "share of solvent after",
        after,
        (0.0..=before).contains(&after),
        "a fraction from 0 to the share before",
    )?;
    // E = B (w₁/(1 − w₁) − w₂/(1 − w₂))
    Ok(solids * (before / (1.0 - before) - after / (1.0 - after)))
}
