//! Pressure and temperature of least need, within what the vessel is rated for.
//!
//! A grid over the window, then ever finer grids around the best point so far: the same points in the same order every
//! time, no derivatives, no chance. A second valley narrower than a thirty-second of the window can be missed.
//!
//! **Caution.** The window's highest pressure and temperature are the vessel's rating less the margin to its relief, and
//! ratings fall with temperature: state the one that holds at the highest temperature of the window.
use super::DenseGasError;
use super::error::within;
use super::need::{Solubility, Target};
use crate::co2_loop::{ClosedLoop, Utilities};

/// Where to search.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Window {
    /// Lowest and highest temperature, K; equal for a fixed one.
    pub temperature_k: [f64; 2],
    /// Lowest and highest absolute pressure, Pa; equal for a fixed one.
    pub pressure_pa: [f64; 2],
}

/// A side of the window.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum Side {
    /// Lowest temperature.
    LowestTemperature,
    /// Highest temperature.
    HighestTemperature,
    /// Lowest pressure.
    LowestPressure,
    /// Highest pressure.
    HighestPressure,
}

impl Side {
    /// As a report names it.
    #[must_use]
    pub const fn words(self) -> &'static str {
        match self {
            Self::LowestTemperature => "lowest temperature",
            Self::HighestTemperature => "highest temperature",
            Self::LowestPressure => "lowest pressure",
            Self::HighestPressure => "highest pressure",
        }
    }
}

impl Limit {
    /// What a report says of it.
    #[must_use]
    pub const fn words(self) -> &'static str {
        match self {
            Self::Window => "the window ends there, and beyond it there may be less",
            Self::Range => "next to it the solubility or the equation of state is out of its range",
        }
    }
}

/// What ends the search on a side.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum Limit {
    /// The window: beyond it there may be less.
    Window,
    /// Next to the point a state was refused: the end of the solubility's or the equation's range, not an optimum.
    Range,
}

/// The best point.
#[derive(Clone, Debug, PartialEq)]
pub struct Optimum {
    /// Temperature, K.
    pub temperature_k: f64,
    /// Absolute pressure, Pa.
    pub pressure_pa: f64,
    /// What was made least, in the unit of the function.
    pub least: f64,
    /// Sides on which the point sits; empty for an optimum inside.
    pub on: Vec<(Side, Limit)>,
    /// Points tried.
    pub tried: u32,
    /// Points refused.
    pub refused: u32,
}

/// Intervals of the first grid, each way.
const COARSE: u32 = 32;
/// Intervals of a finer grid, half as wide, over two intervals of the last one to each side.
const FINE: u32 = 8;
const HALVINGS: u32 = 12;
/// Rounds at most; some 25 are usual.
const ROUNDS: u32 = 100;

/// The values of a grid over a range; one value where the ends are equal.
fn grid([low, high]: [f64; 2], intervals: u32) -> impl Iterator<Item = f64> + Clone {
    let intervals = if low < high { intervals } else { 0 };
    (0..=intervals).map(move |n| {
        if n == intervals { high } else { low + (high - low) * (f64::from(n) / f64::from(intervals)) }
    })
}

/// A range around a value, cut to another.
fn around([low, high]: [f64; 2], middle: f64, reach: f64) -> [f64; 2] {
    let (from, to) = (middle - reach, middle + reach);
    [if from > low { from } else { low }, if to < high { to } else { high }]
}

struct Search<F> {
    cost: F,
    best: Option<(f64, f64, f64)>,
    tried: u32,
    refused: u32,
}

impl<F: FnMut(f64, f64) -> Option<f64>> Search<F> {
    fn value(&mut self, temperature_k: f64, pressure_pa: f64) -> Option<f64> {
        self.tried += 1;
        let value = (self.cost)(temperature_k, pressure_pa).filter(|value| value.is_finite());
        self.refused += u32::from(value.is_none());
        value
    }

    fn over(
        &mut self,
        temperatures: impl Iterator<Item = f64>,
        pressures: &(impl Iterator<Item = f64> + Clone),
    ) {
        for temperature_k in temperatures {
            for pressure_pa in pressures.clone() {
                let Some(value) = self.value(temperature_k, pressure_pa) else { continue };
                // Of equals the first stays: the lower temperature, then the lower pressure.
                if self.best.is_none_or(|(.., least)| value < least) {
                    self.best = Some((temperature_k, pressure_pa, value));
                }
            }
        }
    }
}

/// The point of a window, temperature in K and pressure in Pa, at which `cost` is least; `None` of it is a refusal.
///
/// Temperature and pressure to a 130 000th of the window, unless 100 rounds in a bent valley did not suffice.
///
/// # Errors
/// [`DenseGasError::OutOfRange`] for a window that is none, [`DenseGasError::NothingFound`] where all points are refused.
///
/// ```
/// use thimbleworth::dense_gas::search::{Window, least};
/// let window = Window { temperature_k: [300.0, 350.0], pressure_pa: [10e6, 50e6] };
/// let bowl = |t: f64, p: f64| Some((t - 331.7) * (t - 331.7) + (p / 1e6 - 23.4) * (p / 1e6 - 23.4));
/// let found = least(&window, bowl).unwrap();
/// assert!((found.temperature_k - 331.7).abs() < 1e-3 && (found.pressure_pa - 23.4e6).abs() < 1e3);
/// assert!(found.on.is_empty());
/// ```
pub fn least(window: &Window, cost: impl FnMut(f64, f64) -> Option<f64>) -> Result<Optimum, DenseGasError> {
    let ([cold, hot], [low, high]) = (window.temperature_k, window.pressure_pa);
    let (temperature_spread, pressure_spread) = (hot - cold, high - low);
    within("lowest temperature of the window, K", cold, cold > 0.0, "a temperature above 0 K")?;
    within("highest temperature of the window, K", hot, hot >= cold, "a temperature not below the lowest")?;
    within("lowest pressure of the window, Pa", low, low > 0.0, "a pressure above 0")?;
    within("highest pressure of the window, Pa", high, high >= low, "a pressure not below the lowest")?;
    let mut search = Search { cost, best: None, tried: 0, refused: 0 };
    search.over(grid(window.temperature_k, COARSE), &grid(window.pressure_pa, COARSE));
    let mut step = 1.0 / f64::from(COARSE);
    let finest = step / f64::from(1 << HALVINGS);
    for _ in 0..ROUNDS {
        let Some((t, p, before)) = search.best else { break };
        let temperatures = grid(around(window.temperature_k, t, 2.0 * step * temperature_spread), FINE);
        let pressures = grid(around(window.pressure_pa, p, 2.0 * step * pressure_spread), FINE);
        search.over(temperatures, &pressures);
        // Only where the point stayed: a bent valley is followed to its end first.
        if search.best.is_some_and(|(.., after)| after < before) {
            continue;
        }
        step *= 0.5;
        if step <= finest {
            break;
        }
    }
    let Some((temperature_k, pressure_pa, least)) = search.best else {
        return Err(DenseGasError::NothingFound { tried: search.tried });
    };
    let (warmer, higher) = (step * temperature_spread, step * pressure_spread);
    let mut on = Vec::new();
    for (side, room, spread, t, p) in [
        (Side::LowestTemperature, temperature_k - cold, warmer, temperature_k - warmer, pressure_pa),
        (Side::HighestTemperature, hot - temperature_k, warmer, temperature_k + warmer, pressure_pa),
        (Side::LowestPressure, pressure_pa - low, higher, temperature_k, pressure_pa - higher),
        (Side::HighestPressure, high - pressure_pa, higher, temperature_k, pressure_pa + higher),
    ] {
        // A fixed temperature or pressure has no sides.
        if spread > 0.0 {
            if room < spread {
                on.push((side, Limit::Window));
            } else if search.value(t, p).is_none() {
                on.push((side, Limit::Range));
            }
        }
    }
    Ok(Optimum { temperature_k, pressure_pa, least, on, tried: search.tried, refused: search.refused })
}

/// Least carbon dioxide for a target, kg per kg of solid.
///
/// # Errors
/// As for [`least`].
///
/// ```
/// use thimbleworth::dense_gas::need::{Curve, Solubility, Target};
/// use thimbleworth::dense_gas::search::{Limit, Side, Window, least_solvent};
/// // An oil in a vessel rated to 400 bar and 80 °C: the pressure goes to the rating.
/// let window = Window { temperature_k: [308.15, 353.15], pressure_pa: [15e6, 40e6] };
/// let oil = Target { solute_kg_kg: 0.2, recovery: 0.95, curve: Curve::Saturated };
/// let found = least_solvent(&window, &Solubility::VegetableOil, &oil).unwrap();
/// assert!(found.on.contains(&(Side::HighestPressure, Limit::Window)));
/// ```
pub fn least_solvent(
    window: &Window,
    solubility: &Solubility,
    target: &Target,
) -> Result<Optimum, DenseGasError> {
    least(window, |t, p| target.solvent_kg_kg(solubility.loading_kg_kg(t, p).ok()?).ok())
}

/// Least electricity of a closed loop for a target, J per kg of solid: its extraction state is varied, all else kept.
///
/// # Errors
/// As for [`least`]; and [`DenseGasError::Loop`] for machines that cannot be.
///
/// ```
/// use thimbleworth::co2_loop::{ClosedLoop, Heating, Utilities};
/// use thimbleworth::dense_gas::need::{Curve, Solubility, Target};
/// use thimbleworth::dense_gas::search::{Window, least_energy};
/// let window = Window { temperature_k: [308.15, 353.15], pressure_pa: [15e6, 40e6] };
/// let oil = Target { solute_kg_kg: 0.2, recovery: 0.95, curve: Curve::Saturated };
/// let machines =
///     Utilities { drive_efficiency: 0.9, cooling_cop: 3.0, heating: Heating::Electric { ratio: 1.0 } };
/// let found =
///     least_energy(&window, &Solubility::VegetableOil, &oil, &ClosedLoop::default(), &machines).unwrap();
/// assert!(found.least > 0.0);
/// ```
pub fn least_energy(
    window: &Window,
    solubility: &Solubility,
    target: &Target,
    around: &ClosedLoop,
    machines: &Utilities,
) -> Result<Optimum, DenseGasError> {
    // Machines that are refused would be refused at every point, and without the reason.
    machines.drawn(&ClosedLoop::default().energies()?)?;
    least(window, |temperature_k, pressure_pa| {
        let solvent =
            target.solvent_kg_kg(solubility.loading_kg_kg(temperature_k, pressure_pa).ok()?).ok()?;
        let state = ClosedLoop {
            extraction_temperature_k: temperature_k,
            extraction_pressure_pa: pressure_pa,
            ..*around
        };
        Some(solvent * machines.drawn(&state.energies().ok()?).ok()?.total_j_kg())
    })
}
