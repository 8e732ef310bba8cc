//! Evaporation from an open surface and from a pool.
use super::error::{above_zero, not_below_zero, within};
use super::{EmissionError, R};

/// Mass transfer coefficient of water into still room air, m/s: 0.83 cm/s at 25 °C.
const K_WATER_M_S: f64 = 0.0083;
/// Molar mass that goes with it, kg/mol.
const M_WATER_KG_MOL: f64 = 0.018_02;

/// Mass transfer coefficient of a vapour from an open surface, m/s: `K = K₀ (M₀/M)^⅓`, with water's K₀ = 0.83 cm/s and M₀ = 18.02.
///
/// `molar_mass_kg_mol` is M in kg/mol. For rooms without a draught; a hood's air stream gives several times as much, for which
/// [`pool_mackay_kg_s`] asks for the air speed.
///
/// Source: [`EIIP`](super::EIIP).
///
/// # Errors
/// [`EmissionError::OutOfRange`].
///
/// ```
/// let k_m_s = thimbleworth::emission::mass_transfer_m_s(0.084_93).unwrap();
/// assert!((k_m_s - 0.004_95).abs() < 5e-6);
/// ```
pub fn mass_transfer_m_s(molar_mass_kg_mol: f64) -> Result<f64, EmissionError> {
    let molar_mass = above_zero("molar mass, kg/mol", molar_mass_kg_mol)?;
    // K = K₀ (M₀/M)^⅓
    Ok(K_WATER_M_S * libm::cbrt(M_WATER_KG_MOL / molar_mass))
}

/// An open surface of a liquid.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct OpenSurface {
    /// Area; m².
    pub area_m2: f64,
    /// Temperature of the liquid; K. It falls as the liquid evaporates; the room's temperature is an upper limit.
    pub temperature_k: f64,
    /// Partial pressure over the liquid; Pa.
    pub vapour_pa: f64,
    /// Partial pressure in the air of the room, as a rule 0; Pa.
    pub bulk_pa: f64,
    /// Molar mass; kg/mol.
    pub molar_mass_kg_mol: f64,
}

/// Evaporation from an open surface in a room without a draught; kg/s.
///
/// `E = M K A (P − P_bulk)/(R T)`, K as in [`mass_transfer_m_s`]. In imperial units of the guidance 998.9 mmHg ft³/(lbmol K) goes with kelvin, 555.0
/// with degrees Rankine.
///
/// Source: [`EIIP`](super::EIIP).
///
/// # Errors
/// [`EmissionError::OutOfRange`]; air that holds more vapour than the surface is refused.
///
/// ```
/// use thimbleworth::emission::{OpenSurface, open_surface_kg_s};
/// // a dish of 10 cm with acetone at 20 °C
/// let dish = OpenSurface {
///     area_m2: 0.007_854,
///     temperature_k: 293.15,
///     vapour_pa: 24_712.4,
///     bulk_pa: 0.0,
///     molar_mass_kg_mol: 0.058_079,
/// };
/// assert!((open_surface_kg_s(&dish).unwrap() * 3.6e6 - 93.55).abs() < 0.1);
/// ```
pub fn open_surface_kg_s(surface: &OpenSurface) -> Result<f64, EmissionError> {
    let area = not_below_zero("area, m²", surface.area_m2)?;
    let temperature = above_zero("temperature, K", surface.temperature_k)?;
    let vapour = not_below_zero("partial pressure over the liquid, Pa", surface.vapour_pa)?;
    let bulk = within(
        "partial pressure in the room, Pa",
        surface.bulk_pa,
        (0.0..=vapour).contains(&surface.bulk_pa),
        "a pressure from 0 to that over the liquid",
    )?;
    let k = mass_transfer_m_s(surface.molar_mass_kg_mol)?;
    // E = M K A (P − P_bulk)/(R T)
    Ok(surface.molar_mass_kg_mol * k * area * (vapour - bulk) / (R * temperature))
}

/// A pool of spilt liquid in moving air.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Pool {
    /// Area; m².
    pub area_m2: f64,
    /// Temperature of the liquid; K.
    pub temperature_k: f64,
    /// Partial pressure over the liquid; Pa.
    pub vapour_pa: f64,
    /// Molar mass; kg/mol.
    pub molar_mass_kg_mol: f64,
    /// Speed of the air over it; m/s.
    pub air_m_s: f64,
}

impl Pool {
    fn checked(&self) -> Result<Self, EmissionError> {
        not_below_zero("area, m²", self.area_m2)?;
        above_zero("temperature, K", self.temperature_k)?;
        not_below_zero("partial pressure over the liquid, Pa", self.vapour_pa)?;
        above_zero("molar mass, kg/mol", self.molar_mass_kg_mol)?;
        within(
            "speed of the air, m/s",
            self.air_m_s,
            (0.0..=30.0).contains(&self.air_m_s),
            "a speed from 0 to 30 m/s",
        )?;
        Ok(*self)
    }
}

/// Evaporation of a pool by Mackay and Matsugu; kg/s.
///
/// `E = k M P A/(R T)`, `k = 0.00482 U^0.78 X^(−0.11) Sc^(−0.67)` in m/s, with U the speed of the air in m/s, X the diameter in m
/// (that of a circle of the same area) and Sc the Schmidt number of the vapour in air (`schmidt`, 1; about 1.5 to 2 for solvents). Found for
/// pools of 1 m and more out of doors at 2 to 7 m/s; in a hood's 0.5 m/s it is an estimate. Still air gives 0: take [`open_surface_kg_s`].
///
/// Source: [`MACKAY`](super::MACKAY).
///
/// # Errors
/// [`EmissionError::OutOfRange`].
///
/// ```
/// use thimbleworth::emission::{Pool, pool_mackay_kg_s};
/// let spill = Pool { area_m2: 1.0, temperature_k: 293.15, vapour_pa: 24_712.4, molar_mass_kg_mol: 0.058_079, air_m_s: 0.5 };
/// let rate_kg_s = pool_mackay_kg_s(&spill, 1.6).unwrap();
/// assert!(rate_kg_s > 5e-4 && rate_kg_s < 3e-3);
/// ```
pub fn pool_mackay_kg_s(pool: &Pool, schmidt: f64) -> Result<f64, EmissionError> {
    let pool = pool.checked()?;
    let schmidt = above_zero("Schmidt number", schmidt)?;
    if pool.area_m2 == 0.0 || pool.air_m_s == 0.0 {
        return Ok(0.0);
    }
    // X = 2 √(A/π)
    let diameter = 2.0 * (pool.area_m2 / core::f64::consts::PI).sqrt();
    // k = 0.00482 U^0.78 X^(−0.11) Sc^(−0.67)
    let k = 0.004_82 * libm::pow(pool.air_m_s, 0.78) * libm::pow(diameter, -0.11) * libm::pow(schmidt, -0.67);
    // E = k M P A/(R T)
    Ok(k * pool.molar_mass_kg_mol * pool.vapour_pa * pool.area_m2 / (R * pool.temperature_k))
}

/// Evaporation of a pool by the quick equation of EPA's offsite consequence guidance; kg/s.
///
/// `Q = 0.284 U^0.78 M^⅔ A P/(82.05 T)` in lb/min, with U in m/s, M in g/mol, A in ft², P in mmHg, T in K; converted here. Written for spills at
/// 1.5 m/s and above.
///
/// Source: [`EPA_OFFSITE`](super::EPA_OFFSITE).
///
/// # Errors
/// [`EmissionError::OutOfRange`].
///
/// ```
/// use thimbleworth::emission::{Pool, pool_epa_kg_s, pool_mackay_kg_s};
/// let spill = Pool { area_m2: 10.0, temperature_k: 298.15, vapour_pa: 3789.0, molar_mass_kg_mol: 0.092_14, air_m_s: 3.0 };
/// let ratio = pool_epa_kg_s(&spill).unwrap() / pool_mackay_kg_s(&spill, 1.8).unwrap();
/// assert!(ratio > 0.7 && ratio < 1.6, "{ratio}");
/// ```
pub fn pool_epa_kg_s(pool: &Pool) -> Result<f64, EmissionError> {
    const SQUARE_FOOT_M2: f64 = 0.3048 * 0.3048;
    const MMHG_PA: f64 = 101_325.0 / 760.0;
    const POUND_PER_MINUTE_KG_S: f64 = 0.453_592_37 / 60.0;
    let pool = pool.checked()?;
    let root = libm::cbrt(1000.0 * pool.molar_mass_kg_mol);
    let pounds_per_minute = 0.284
        * libm::pow(pool.air_m_s, 0.78)
        * root
        * root
        * (pool.area_m2 / SQUARE_FOOT_M2)
        * (pool.vapour_pa / MMHG_PA)
        / (82.05 * pool.temperature_k);
    // Q = 0.284 U^0.78 M^⅔ A P/(82.05 T)
    Ok(pounds_per_minute * POUND_PER_MINUTE_KG_S)
}
