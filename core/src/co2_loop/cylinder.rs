//! Heel of a cylinder, number of cylinders, and dry-ice snow.
use super::LoopError;
use super::error::{at, within};
use crate::co2::saturated_densities_kg_m3;

fn share(heel_share: f64) -> Result<f64, LoopError> {
    within("heel", heel_share, (0.0..1.0).contains(&heel_share), "a share from 0 to below 1")
}

/// What goes back to the supplier in `cylinders` cylinders, kg: n m_fill x.
///
/// `fill_kg` is the filling of one, kg; `heel_share` the share that cannot be used. 10 % to 15 % of a cylinder with dip tube is
/// common (from memory). It is bought and not emitted here.
///
/// # Errors
/// [`LoopError::OutOfRange`].
///
/// ```
/// // Ten cylinders of 22.7 kg with a heel of 12 %: 27.2 kg
/// assert!((thimbleworth::co2_loop::heel_kg(10, 22.7, 0.12).unwrap() - 27.24).abs() < 1e-9);
/// ```
pub fn heel_kg(cylinders: u64, fill_kg: f64, heel_share: f64) -> Result<f64, LoopError> {
    let fill = within("filling of a cylinder, kg", fill_kg, fill_kg > 0.0, "a mass above 0")?;
    // m = n m_fill x
    Ok(cylinders as f64 * fill * share(heel_share)?)
}

/// Vapour that is left in a cylinder when the last liquid has gone up the dip tube, kg: V ρ″(T).
///
/// At constant temperature: a cylinder that is drawn fast is colder, and holds less. Range: 216.592 K to below 304.128 K.
///
/// # Errors
/// [`LoopError`].
///
/// ```
/// // 30 L at 20 °C: 5.8 kg of the 22.5 kg that it holds when filled to 0.75 kg/L
/// let left = thimbleworth::co2_loop::last_liquid_heel_kg(0.030, 293.15).unwrap();
/// assert!((left - 5.826).abs() < 1e-3);
/// ```
pub fn last_liquid_heel_kg(cylinder_m3: f64, temperature_k: f64) -> Result<f64, LoopError> {
    within("volume of the cylinder, m³", cylinder_m3, cylinder_m3 > 0.0, "a volume above 0")?;
    let (_, vapour) = saturated_densities_kg_m3(temperature_k).map_err(at("cylinder"))?;
    // m = V ρ″(T)
    Ok(cylinder_m3 * vapour)
}

/// Cylinders that a need takes: ⌈m/(m_fill (1 − x))⌉. A remainder below a millionth of a cylinder is rounding.
///
/// `need_kg` and `fill_kg` in kg, `heel_share` as for [`heel_kg`].
///
/// # Errors
/// [`LoopError::OutOfRange`].
///
/// ```
/// // 181.6 kg a year from cylinders of 22.7 kg with a heel of 12 %: 9.09, so 10
/// assert_eq!(thimbleworth::co2_loop::cylinders(181.6, 22.7, 0.12), Ok(10));
/// ```
pub fn cylinders(need_kg: f64, fill_kg: f64, heel_share: f64) -> Result<u64, LoopError> {
    within("need, kg", need_kg, need_kg >= 0.0, "a mass of 0 or more")?;
    let fill = within("filling of a cylinder, kg", fill_kg, fill_kg > 0.0, "a mass above 0")?;
    let number = need_kg / (fill * (1.0 - share(heel_share)?));
    within("number of cylinders", number, number <= 1e15, "at most 1e15")?;
    // ⌈m/(m_fill (1 − x))⌉
    let whole = libm::floor(number);
    Ok(whole as u64 + u64::from(number - whole > 1e-6))
}

/// Dry-ice snow that goes into a sample for grinding, kg: (m/ρ) r ρ_snow.
///
/// `sample_kg` in kg, `sample_density_kg_m3` in kg/m³ (bulk), `snow_density_kg_m3` that of the loose snow, kg/m³ (600 to 900, from
/// memory), `volume_ratio` of snow over sample; SW-846 method 3562 homogenises with an equal volume. All of it goes to air.
/// Snow made from liquid on the spot takes more liquid than it weighs: the rest leaves as gas at once and is not in it.
/// **Caution:** never close dry ice into a vessel.
///
/// # Errors
/// [`LoopError::OutOfRange`].
///
/// ```
/// use thimbleworth::co2_loop::snow_kg;
/// // 100 g of 1.4 g/mL with an equal volume of snow of 0.6 to 0.9 g/mL: 43 g to 64 g
/// assert!((snow_kg(0.1, 1400.0, 600.0, 1.0).unwrap() - 0.0429).abs() < 1e-4);
/// assert!((snow_kg(0.1, 1400.0, 900.0, 1.0).unwrap() - 0.0643).abs() < 1e-4);
/// ```
pub fn snow_kg(
    sample_kg: f64,
    sample_density_kg_m3: f64,
    snow_density_kg_m3: f64,
    volume_ratio: f64,
) -> Result<f64, LoopError> {
    let density = sample_density_kg_m3;
    within("mass of the sample, kg", sample_kg, sample_kg >= 0.0, "a mass of 0 or more")?;
    within("density of the sample, kg/m³", density, density > 0.0, "a density above 0")?;
    let snow = snow_density_kg_m3;
    // Dry ice without pores has 1560 kg/m³ (from memory).
    within("density of the snow, kg/m³", snow, snow > 0.0 && snow <= 1600.0, "above 0 and up to 1600 kg/m³")?;
    within("volume of snow over sample", volume_ratio, volume_ratio >= 0.0, "a number of 0 or more")?;
    // m_snow = (m/ρ) r ρ_snow
    Ok(sample_kg / density * volume_ratio * snow)
}
