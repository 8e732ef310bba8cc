//! What a vessel holds and vents, and what liquid between closed valves does.
use super::LoopError;
use super::error::{above, at, within};
use crate::co2::{density_kg_m3, isochoric_pressure_pa, isochoric_temperature_k};

/// Volume of a vessel that carbon dioxide can fill, m³: V − m/ρ_s − V_f.
///
/// `solid_density_kg_m3` is that of the solid itself, without its pores; `filler_m3` what frits, rods or glass take up.
///
/// # Errors
/// [`LoopError::OutOfRange`] also where nothing would be left.
///
/// ```
/// // 7 mL cell, 2 g of soil of 2.6 g/mL, 1 mL of filler: 5.23 mL
/// let void = thimbleworth::co2_loop::void_m3(7e-6, 2e-3, 2600.0, 1e-6).unwrap();
/// assert!((void - 5.231e-6).abs() < 1e-9);
/// ```
pub fn void_m3(
    vessel_m3: f64,
    solid_kg: f64,
    solid_density_kg_m3: f64,
    filler_m3: f64,
) -> Result<f64, LoopError> {
    let density = solid_density_kg_m3;
    within("volume of the vessel, m³", vessel_m3, vessel_m3 > 0.0, "a volume above 0")?;
    within("mass of solid, kg", solid_kg, solid_kg >= 0.0, "a mass of 0 or more")?;
    within("density of the solid, kg/m³", density, density > 0.0, "a density above 0")?;
    within("volume of filler, m³", filler_m3, filler_m3 >= 0.0, "a volume of 0 or more")?;
    // V_void = V − m/ρ_s − V_f
    let void = vessel_m3 - solid_kg / density - filler_m3;
    within("void, m³", void, void > 0.0, "less solid and filler than the vessel holds, so a void above 0")
}

/// Mass that a vessel vents when it is opened, kg: the void times the density at the *let-down* state.
///
/// The void, not the vessel; and the density after let-down into the receiver, not that of the extraction. `void_m3` in m³,
/// `temperature_k` of the vessel's content (as a rule the jacket), absolute `pressure_pa` at which the vent is opened.
/// What stays at 1 bar is left out, as are pockets in the solid that give way later.
///
/// # Errors
/// [`LoopError`].
///
/// ```
/// use thimbleworth::co2_loop::vent_kg;
/// // 100 L of void, let down from 300 bar to 50 bar at 40 °C before the vent is opened: 11 kg and not 91
/// assert!((vent_kg(0.1, 313.15, 50e5).unwrap() - 11.3).abs() < 0.1);
/// assert!((vent_kg(0.1, 313.15, 300e5).unwrap() - 91.0).abs() < 0.1);
/// ```
pub fn vent_kg(void_m3: f64, temperature_k: f64, pressure_pa: f64) -> Result<f64, LoopError> {
    within("void, m³", void_m3, void_m3 >= 0.0, "a volume of 0 or more")?;
    // m = V_void ρ(T, p)
    Ok(void_m3 * density_kg_m3(temperature_k, pressure_pa).map_err(at("let-down"))?)
}

/// Share of the vessel's filling that let-down into a receiver leaves in the vessel: ρ(let-down)/ρ(extraction).
///
/// No installation without a compressor behind the receiver recovers more than the rest. Temperatures in K of the
/// vessel's content, absolute pressures in Pa.
///
/// # Errors
/// [`LoopError`].
///
/// ```
/// use thimbleworth::co2_loop::letdown_left_share;
/// // From 250 bar to a receiver at 55 bar, both at 40 °C: 15 % stays, so "95 % recycled" cannot be.
/// let left = letdown_left_share((313.15, 250e5), (313.15, 55e5)).unwrap();
/// assert!((left - 0.147).abs() < 0.002, "{left}");
/// ```
pub fn letdown_left_share(
    (extraction_k, extraction_pa): (f64, f64),
    (letdown_k, letdown_pa): (f64, f64),
) -> Result<f64, LoopError> {
    above("extraction pressure", extraction_pa, "let-down pressure", letdown_pa)?;
    let full = density_kg_m3(extraction_k, extraction_pa).map_err(at("extraction"))?;
    let left = density_kg_m3(letdown_k, letdown_pa).map_err(at("let-down"))?;
    // ρ(T₂, p₂)/ρ(T₁, p₁)
    within("share left", left / full, left <= full, "a let-down to a lower density")
}

/// Liquid shut in between two closed valves and warmed.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Trapped {
    /// Density at which it was shut in, kg/m³.
    pub density_kg_m3: f64,
    /// Absolute pressure when warm, Pa.
    pub pressure_pa: f64,
    /// Mean rise, Pa/K.
    pub rise_pa_k: f64,
    /// Temperature at which a relief set to the given pressure opens, K.
    pub relief_opens_k: Option<f64>,
    /// Share of the mass that has to leave through it for the pressure not to pass its setting; 0 where it stays shut.
    pub relieved_share: f64,
}

/// What liquid does that is shut in at a temperature and pressure and warms to another, in a volume that does not give way.
///
/// `shut_in_k`, `warm_k` in K, absolute pressures in Pa. `relief_pa` is the set pressure of a relief in that length, if there
/// is one. **Caution:** some 7 bar a kelvin from 5 °C and 60 bar: every length that valves can shut in needs its own
/// relief; what it blows off is cold, turns to dry ice in the outlet and displaces air. Setting, size and outlet are a matter
/// of local codes and licensed practice, and no size is given here.
///
/// # Errors
/// [`LoopError`].
///
/// ```
/// use thimbleworth::co2_loop::trapped_liquid;
/// let line = trapped_liquid(278.15, 60e5, 298.15, Some(100e5)).unwrap();
/// assert!((line.pressure_pa / 1e5 - 205.0).abs() < 1.0);
/// assert!((line.rise_pa_k / 1e5 - 7.25).abs() < 0.05);
/// assert!((line.relief_opens_k.unwrap() - 273.15 - 10.9).abs() < 0.5);
/// assert!((line.relieved_share - 0.108).abs() < 0.005, "{line:?}");
/// ```
pub fn trapped_liquid(
    shut_in_k: f64,
    shut_in_pa: f64,
    warm_k: f64,
    relief_pa: Option<f64>,
) -> Result<Trapped, LoopError> {
    within("warm temperature, K", warm_k, warm_k > shut_in_k, "a temperature above that of shutting in")?;
    let density = density_kg_m3(shut_in_k, shut_in_pa).map_err(at("liquid shut in"))?;
    let pressure_pa = isochoric_pressure_pa(density, warm_k).map_err(at("liquid warmed"))?;
    let mut trapped = Trapped {
        density_kg_m3: density,
        pressure_pa,
        rise_pa_k: (pressure_pa - shut_in_pa) / (warm_k - shut_in_k),
        relief_opens_k: None,
        relieved_share: 0.0,
    };
    if let Some(relief_pa) = relief_pa {
        above("relief setting", relief_pa, "pressure when shut in", shut_in_pa)?;
        let opens_k = isochoric_temperature_k(density, relief_pa).map_err(at("relief"))?;
        trapped.relief_opens_k = Some(opens_k);
        if pressure_pa > relief_pa {
            // 1 − ρ(T, p_set)/ρ₁
            let left = density_kg_m3(warm_k, relief_pa).map_err(at("relief"))?;
            trapped.relieved_share = 1.0 - left / density;
        }
    }
    Ok(trapped)
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn an_overfull_vessel_is_refused() {
        assert!(matches!(void_m3(1e-6, 3e-3, 2600.0, 0.0), Err(LoopError::OutOfRange { .. })));
        assert!(matches!(vent_kg(-1.0, 300.0, 1e5), Err(LoopError::OutOfRange { .. })));
    }

    #[test]
    fn let_down_cannot_add() {
        // Colder at the lower pressure, the receiver would hold more than the vessel did.
        let found = letdown_left_share((373.15, 80e5), (278.15, 60e5));
        assert!(matches!(found, Err(LoopError::OutOfRange { .. })));
    }

    #[test]
    fn a_relief_above_the_warm_pressure_stays_shut() {
        let line = trapped_liquid(278.15, 60e5, 288.15, Some(300e5)).unwrap();
        assert_eq!(line.relieved_share, 0.0);
        assert!(line.relief_opens_k.unwrap() > 288.15);
    }
}
