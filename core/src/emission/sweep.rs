//! Gas that passes over a liquid and takes vapour along: a sweep, gas that evolves, air that leaks into a vacuum.
use super::error::{above_zero, not_below_zero};
use super::surface::mass_transfer_m_s;
use super::vapour::{checked_below, emitted};
use super::{EmissionError, Emitted, R, Vapour};
use crate::mixture::PerComponent;

/// Mean molar mass of dry air, kg/mol.
const AIR_KG_MOL: f64 = 0.028_97;

/// What a sweep carried off.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Sweep {
    /// kg of each vapour.
    pub emitted: Emitted,
    /// Saturation factor of each vapour, 0 to 1.
    pub saturation: PerComponent,
}

/// Gas swept through a vessel that holds liquid; kg.
///
/// `Eᵢ = Sᵢ Pᵢ Mᵢ · F t/(R T) · P/(P − Σ Sⱼ Pⱼ)`, with `Sᵢ = Kᵢ A/(Kᵢ A + F_out)` and `F_out = F P/(P − Σ Sⱼ Pⱼ)`: the slower the
/// gas and the larger the surface, the nearer to saturation. Kᵢ as in [`mass_transfer_m_s`]. The rule asks for S to
/// two significant figures; here the equation is solved.
///
/// `flow_m3_s` is F, the gas alone at the vessel's temperature (`temperature_k`, K) and pressure (`pressure_pa`, Pa); `time_s` in s;
/// `surface_m2` is A, the surface of the liquid, or `None` for a gas that leaves saturated (S = 1), which is the upper limit and what
/// bubbling through the liquid comes to.
///
/// Source: [`BATCH_RULE`](super::BATCH_RULE), [`EIIP`](super::EIIP).
///
/// # Errors
/// [`EmissionError`] for inputs out of range or a liquid that boils.
///
/// ```
/// use thimbleworth::emission::{Vapour, sweep};
/// // 1 m³ of nitrogen over hexane at 25 °C, saturated
/// let hexane = Vapour { partial_pressure_pa: 20_186.43, molar_mass_kg_mol: 0.086_175 };
/// let saturated = sweep(1e-3, 1000.0, 298.15, 101_325.0, None, &[hexane]).unwrap();
/// assert!((saturated.emitted.total_kg() - 0.87632).abs() < 1e-4);
/// let over_a_flask = sweep(1e-3, 1000.0, 298.15, 101_325.0, Some(0.01), &[hexane]).unwrap();
/// assert!(over_a_flask.emitted.total_kg() < 0.1);
/// ```
pub fn sweep(
    flow_m3_s: f64,
    time_s: f64,
    temperature_k: f64,
    pressure_pa: f64,
    surface_m2: Option<f64>,
    vapours: &[Vapour],
) -> Result<Sweep, EmissionError> {
    let flow = not_below_zero("flow of gas, m³/s", flow_m3_s)?;
    let time = not_below_zero("time, s", time_s)?;
    let sum = checked_below(vapours, pressure_pa, temperature_k)?;
    let mut saturation = [0.0; crate::mixture::LARGEST];
    for s in saturation.iter_mut().take(vapours.len()) {
        *s = 1.0;
    }
    if let Some(surface) = surface_m2 {
        let surface = not_below_zero("surface, m²", surface)?;
        let mut reach = [0.0; crate::mixture::LARGEST];
        for (reach, vapour) in reach.iter_mut().zip(vapours) {
            // Kᵢ A
            *reach = mass_transfer_m_s(vapour.molar_mass_kg_mol)? * surface;
        }
        if flow > 0.0 {
            // F_out rises with S and S falls with F_out, so the two cross once, between no vapour and saturation.
            let (mut low, mut high) = (flow, flow * pressure_pa / (pressure_pa - sum));
            for _ in 0..60 {
                let out = 0.5 * (low + high);
                let mut carried = 0.0;
                for ((s, reach), vapour) in saturation.iter_mut().zip(reach).zip(vapours) {
                    // Sᵢ = Kᵢ A/(Kᵢ A + F_out)
                    *s = reach / (reach + out);
                    carried += *s * vapour.partial_pressure_pa;
                }
                // F_out = F P/(P − Σ Sⱼ Pⱼ)
                if flow * pressure_pa / (pressure_pa - carried) > out {
                    low = out;
                } else {
                    high = out;
                }
            }
        }
    }
    let mut carried = 0.0;
    for (s, vapour) in saturation.iter().zip(vapours) {
        carried += s * vapour.partial_pressure_pa;
    }
    // Eᵢ = Sᵢ Pᵢ Mᵢ · F t/(R T) · P/(P − Σ Sⱼ Pⱼ)
    let mut out = emitted(vapours, flow * time / (R * temperature_k) * pressure_pa / (pressure_pa - carried));
    for (kg, s) in out.kg.iter_mut().zip(saturation) {
        *kg *= s;
    }
    Ok(Sweep { emitted: out, saturation })
}

/// The volume of a gas that evolves in the liquid, to be put into [`sweep`](sweep()) as F t with S = 1; m³.
///
/// `F t = W R T/(P M)`, W the mass of the gas in kg (`mass_kg`), M its molar mass in kg/mol, T in K, P in Pa.
///
/// Source: ideal gas law; [`BATCH_RULE`](super::BATCH_RULE).
///
/// # Errors
/// [`EmissionError::OutOfRange`].
///
/// ```
/// // 44 g of CO2 at 0 °C and 1 atm are 22.4 L
/// let volume_m3 = thimbleworth::emission::evolved_gas_m3(0.044_01, 0.044_01, 273.15, 101_325.0).unwrap();
/// assert!((volume_m3 - 0.022_414).abs() < 1e-6);
/// ```
pub fn evolved_gas_m3(
    mass_kg: f64,
    molar_mass_kg_mol: f64,
    temperature_k: f64,
    pressure_pa: f64,
) -> Result<f64, EmissionError> {
    let mass = not_below_zero("mass of gas, kg", mass_kg)?;
    let molar_mass = above_zero("molar mass, kg/mol", molar_mass_kg_mol)?;
    let temperature = above_zero("temperature, K", temperature_k)?;
    let pressure = above_zero("pressure, Pa", pressure_pa)?;
    // F t = W R T/(P M)
    Ok(mass * R * temperature / (pressure * molar_mass))
}

/// Air that leaks into a vessel under vacuum and leaves through the pump saturated; kg.
///
/// `Eᵢ = (L t/28.97) Pᵢ/(P − ΣPⱼ) Mᵢ`. `leak_kg_s` is L, the air that leaks in, in kg/s; `time_s` in s; P (`pressure_pa`) in Pa.
/// The partial pressures are those where the gas leaves for the pump: with a condenser, those at the condenser's
/// temperature over the condensate.
///
/// Source: [`BATCH_RULE`](super::BATCH_RULE), [`EIIP`](super::EIIP).
///
/// # Errors
/// [`EmissionError`] for inputs out of range, or when the vapour reaches the pressure of the system: then the condenser is too warm for the
/// vacuum and everything goes to the pump.
///
/// ```
/// use thimbleworth::emission::{Vapour, vacuum_leak};
/// // toluene, 1 kg of air an hour, 20 kPa
/// let toluene = Vapour { partial_pressure_pa: 3789.04, molar_mass_kg_mol: 0.092_138 };
/// let hour = vacuum_leak(1.0 / 3600.0, 3600.0, 298.15, 20_000.0, &[toluene]).unwrap();
/// assert!((hour.total_kg() - 0.74338).abs() < 1e-4);
/// ```
pub fn vacuum_leak(
    leak_kg_s: f64,
    time_s: f64,
    temperature_k: f64,
    pressure_pa: f64,
    vapours: &[Vapour],
) -> Result<Emitted, EmissionError> {
    let leak = not_below_zero("air that leaks in, kg/s", leak_kg_s)?;
    let time = not_below_zero("time, s", time_s)?;
    let sum = checked_below(vapours, pressure_pa, temperature_k)?;
    // Eᵢ = (L t/M_air) Pᵢ/(P − ΣPⱼ) Mᵢ
    Ok(emitted(vapours, leak * time / AIR_KG_MOL / (pressure_pa - sum)))
}
