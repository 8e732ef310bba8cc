//! Heating a vented vessel: the gas expands, the vapour pushes it out, and it takes vapour along.
use super::error::{above_zero, not_below_zero, within};
use super::{EmissionError, Emitted, R};
use crate::mixture::{LARGEST, MixtureError, PerComponent};

/// A vented vessel that is heated.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Vessel {
    /// Gas space over the liquid; m³.
    pub headspace_m3: f64,
    /// Pressure, held by the vent; Pa.
    pub pressure_pa: f64,
    /// Temperature at the start; K.
    pub from_k: f64,
    /// Temperature at the end; K.
    pub to_k: f64,
}

/// The emission of a heat-up, three ways.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct HeatUp {
    /// `Eᵢ = Mᵢ ∫ (Pᵢ/P_nc) (−dn_nc)`: what the assumptions give without further simplification. Take this.
    pub exact: Emitted,
    /// The guidance's form with the logarithm.
    pub logarithmic: Emitted,
    /// The guidance's form with the average of the two ratios.
    pub average: Emitted,
}

impl HeatUp {
    /// How far the three forms lie apart, as a share of the exact one; 0 when nothing is emitted.
    ///
    /// ```
    /// use thimbleworth::emission::{Emitted, HeatUp};
    /// let one = |kg| Emitted { kg: [kg, 0.0, 0.0, 0.0, 0.0, 0.0, 0.0, 0.0] };
    /// let three = HeatUp { exact: one(1.0), logarithmic: one(1.12), average: one(1.18) };
    /// assert!((three.spread() - 0.18).abs() < 1e-12);
    /// ```
    #[must_use]
    pub fn spread(&self) -> f64 {
        let exact = self.exact.total_kg();
        let (mut low, mut high) = (exact, exact);
        for form in [self.logarithmic.total_kg(), self.average.total_kg()] {
            if form < low {
                low = form;
            }
            if form > high {
                high = form;
            }
        }
        if exact > 0.0 { (high - low) / exact } else { 0.0 }
    }
}

/// Heating a vented vessel; kg, three ways.
///
/// `pressures` gives the partial pressures (Pa) over the liquid at a temperature in K, `molar_masses` (kg/mol) those of the same vapours.
///
/// - exact: `Eᵢ = Mᵢ ∫ (Pᵢ/(P − ΣP)) (−dn)`, `n = (P − ΣP) V/(R T)` the gas that is still there;
/// - logarithmic: `N = N̄ ln((P − ΣP₁)/(P − ΣP₂)) − (n₂ − n₁)` moles of vapour, `N̄ = ½ (P V/(R T₁) + P V/(R T₂))`, `n` the vapour in the
///   gas space;
/// - average: `N = ½ (ΣP₁/(P − ΣP₁) + ΣP₂/(P − ΣP₂)) Δη`, `Δη = (V/R) ((P − ΣP₁)/T₁ − (P − ΣP₂)/T₂)`.
///
/// The guidance's forms are shared among the vapours by the mean of their partial pressures at the two ends. The composition of the liquid
/// is taken as constant, so the step must not evaporate much of it. Valid while the liquid stays below its boiling
/// point; near it the guidance's forms overstate strongly. The integral is Romberg's, on up to 64 panels.
///
/// Source: [`BATCH_RULE`](super::BATCH_RULE) (average), [`EIIP`](super::EIIP) (logarithmic); the integral from the same
/// assumptions by conservation.
///
/// # Errors
/// [`EmissionError::Boils`] when the vapour reaches the vessel's pressure before the end; [`EmissionError::Mixture`] from `pressures`;
/// [`EmissionError::OutOfRange`].
///
/// ```
/// use thimbleworth::emission::{Vessel, heat_up};
/// use thimbleworth::material::catalogue;
/// let toluene = catalogue().find("toluene").unwrap();
/// let vessel = Vessel { headspace_m3: 0.5, pressure_pa: 101_325.0, from_k: 293.15, to_k: 333.15 };
/// let three = heat_up(vessel, &[0.092_138], |t| {
///     let mut p = [0.0; 8];
///     p[0] = toluene.vapour_pressure.value(t, &toluene.name, "vapour pressure")?;
///     Ok(p)
/// })
/// .unwrap();
/// assert!((three.exact.total_kg() - 0.0519).abs() < 5e-4);
/// assert!(three.logarithmic.total_kg() > three.exact.total_kg());
/// ```
pub fn heat_up(
    vessel: Vessel,
    molar_masses: &[f64],
    mut pressures: impl FnMut(f64) -> Result<PerComponent, MixtureError>,
) -> Result<HeatUp, EmissionError> {
    let count = molar_masses.len();
    if count == 0 || count > LARGEST {
        return Err(EmissionError::Count { found: count });
    }
    let mut mass = [0.0; LARGEST];
    for (mass, &given) in mass.iter_mut().zip(molar_masses) {
        *mass = above_zero("molar mass, kg/mol", given)?;
    }
    let volume = not_below_zero("gas space, m³", vessel.headspace_m3)?;
    let pressure = above_zero("pressure, Pa", vessel.pressure_pa)?;
    let from = above_zero("temperature at the start, K", vessel.from_k)?;
    let to = within(
        "temperature at the end, K",
        vessel.to_k,
        vessel.to_k >= from,
        "at least the temperature at the start",
    )?;

    // One state: the ratios Pᵢ/P_nc, and the gas that is there.
    let mut state = |temperature_k: f64| -> Result<State, EmissionError> {
        let p = pressures(temperature_k)?;
        let mut sum = 0.0;
        for &p in p.iter().take(count) {
            sum += not_below_zero("partial pressure, Pa", p)?;
        }
        if sum >= pressure {
            return Err(EmissionError::Boils { vapour_pa: sum, pressure_pa: pressure, temperature_k });
        }
        let mut ratio = [0.0; LARGEST];
        for (ratio, p) in ratio.iter_mut().zip(p).take(count) {
            *ratio = p / (pressure - sum);
        }
        // n = (P − ΣP) V/(R T)
        Ok(State { p, sum, ratio, gas_mol: (pressure - sum) * volume / (R * temperature_k) })
    };

    let (start, end) = (state(from)?, state(to)?);
    let moles = integrate(&mut state, &start, &end, from, to)?;
    let mut exact = Emitted::default();
    for i in 0..LARGEST {
        // Eᵢ = Mᵢ ∫ (Pᵢ/P_nc) (−dn_nc)
        exact.kg[i] = mass[i] * moles[i];
    }
    // N̄ = ½ (P V/(R T₁) + P V/(R T₂))
    let mean_mol = 0.5 * pressure * volume / R * (1.0 / from + 1.0 / to);
    // n = ΣP V/(R T)
    let gained_mol = volume / R * (end.sum / to - start.sum / from);
    // N = N̄ ln((P − ΣP₁)/(P − ΣP₂)) − (n₂ − n₁)
    let logarithmic_mol = mean_mol * libm::log((pressure - start.sum) / (pressure - end.sum)) - gained_mol;
    // N = ½ (ΣP₁/(P − ΣP₁) + ΣP₂/(P − ΣP₂)) Δη
    let average_mol = 0.5
        * (start.sum / (pressure - start.sum) + end.sum / (pressure - end.sum))
        * (start.gas_mol - end.gas_mol);
    let shared = |mol: f64| {
        let mut out = Emitted::default();
        let sum = start.sum + end.sum;
        if sum > 0.0 {
            for (((kg, mass), p1), p2) in out.kg.iter_mut().zip(mass).zip(start.p).zip(end.p).take(count) {
                *kg = mass * mol * (p1 + p2) / sum;
            }
        }
        out
    };
    Ok(HeatUp { exact, logarithmic: shared(logarithmic_mol), average: shared(average_mol) })
}

#[derive(Clone, Copy)]
struct State {
    p: PerComponent,
    sum: f64,
    ratio: PerComponent,
    gas_mol: f64,
}

/// ∫ ratioᵢ (−dn) from one temperature to the other, mol: trapezoids over n on equal steps of T, extrapolated.
fn integrate(
    state: &mut impl FnMut(f64) -> Result<State, EmissionError>,
    start: &State,
    end: &State,
    from: f64,
    to: f64,
) -> Result<PerComponent, EmissionError> {
    const LEVELS: usize = 5;
    // Panels double from 4 to 64; the error of the trapezoids has even powers of the step only.
    let mut table = [[0.0; LARGEST]; LEVELS];
    let mut panels = 4_u32;
    let mut found = [0.0; LARGEST];
    for level in 0..LEVELS {
        let mut sum = [0.0; LARGEST];
        let mut last = *start;
        for step in 1..=panels {
            let next = if step == panels {
                *end
            } else {
                state(from + (to - from) * f64::from(step) / f64::from(panels))?
            };
            for ((sum, a), b) in sum.iter_mut().zip(last.ratio).zip(next.ratio) {
                *sum += 0.5 * (a + b) * (last.gas_mol - next.gas_mol);
            }
            last = next;
        }
        let mut carried = sum;
        let mut power = 1.0;
        for entry in table.iter_mut().take(level) {
            power *= 4.0;
            let older = *entry;
            *entry = carried;
            for i in 0..LARGEST {
                // T(h/2) + (T(h/2) − T(h))/(4ᵏ − 1)
                carried[i] += (carried[i] - older[i]) / (power - 1.0);
            }
        }
        table[level] = carried;
        let mut off = 0.0;
        for i in 0..LARGEST {
            off += (carried[i] - found[i]).abs();
        }
        let whole = carried.iter().fold(0.0, |sum: f64, mol| sum + mol.abs());
        found = carried;
        if level > 0 && off <= 1e-9 * whole {
            break;
        }
        panels *= 2;
    }
    Ok(found)
}
