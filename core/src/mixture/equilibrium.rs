//! Partial pressures over a liquid mixture, its bubble point and the vapour that rises from it.
use super::wilson::Lambda;
use super::{LARGEST, MixtureError, Pairs, PerComponent};
use crate::material::{Law, Substance, Text};

/// One volatile component of a liquid.
#[derive(Clone, Copy, Debug)]
pub struct Component<'a> {
    /// Its name; it only names errors.
    pub name: &'a Text,
    /// Vapour pressure as it follows the temperature, Pa.
    pub vapour_pressure: &'a Law,
    /// A factor on the vapour pressure: 1, or what a draw of its spread gives.
    pub vapour_pressure_factor: f64,
    /// Molar mass, kg/mol.
    pub molar_mass_kg_mol: f64,
    /// Density of the liquid at the temperature at which volumes are read, kg/m³; used for nothing but volumes.
    pub density_kg_m3: f64,
}

impl<'a> Component<'a> {
    /// A material of the catalogue, with its volume read at `volume_temperature_k` in K.
    ///
    /// # Errors
    /// [`MixtureError::NoMolarMass`] or [`MixtureError::Property`] when a figure is not known.
    pub fn of(substance: &'a Substance, volume_temperature_k: f64) -> Result<Self, MixtureError> {
        let mass = substance.molar_mass_kg_mol.as_ref();
        let mass = mass.ok_or_else(|| MixtureError::NoMolarMass { material: substance.name.clone() })?;
        let density =
            substance.density.value(volume_temperature_k, &substance.name, "density of the liquid")?;
        Ok(Self {
            name: &substance.name,
            vapour_pressure: &substance.vapour_pressure,
            vapour_pressure_factor: 1.0,
            molar_mass_kg_mol: mass.value,
            density_kg_m3: density,
        })
    }

    /// Vapour pressure at `temperature_k` in K, with the factor; Pa.
    ///
    /// # Errors
    /// [`MixtureError::Property`] outside the range of the equation.
    pub fn vapour_pressure_pa(&self, temperature_k: f64) -> Result<f64, MixtureError> {
        let pressure = self.vapour_pressure.value(temperature_k, self.name, "vapour pressure")?;
        Ok(self.vapour_pressure_factor * pressure)
    }

    /// Volume of a mole of the liquid, m³/mol.
    #[must_use]
    pub fn molar_volume_m3_mol(&self) -> f64 {
        // v = M/ρ
        self.molar_mass_kg_mol / self.density_kg_m3
    }
}

/// A liquid of up to [`LARGEST`] volatile components with what holds between each two of them.
///
/// Compositions are handed over as amounts of substance, in mol and in the order of the components; only their ratio
/// counts, so mole fractions do as well.
#[derive(Clone, Copy, Debug)]
pub struct Mixture<'a> {
    pub(super) components: &'a [Component<'a>],
    pairs: &'a Pairs,
}

/// A mixture at one temperature: what does not change with the composition.
#[derive(Clone, Copy, Debug)]
pub(super) struct Warm {
    count: usize,
    vapour_pressure_pa: PerComponent,
    lambda: Lambda,
}

/// A mixture at its bubble point.
#[derive(Clone, Copy, Debug)]
pub(super) struct Boiling {
    pub(super) temperature_k: f64,
    /// d ln p / d(1/T), from which the next search starts.
    slope_k: f64,
    pub(super) warm: Warm,
}

impl Warm {
    /// γᵢ Pᵢ, the pressure of each component over its mole fraction.
    pub(super) fn escaping_pa(&self, x: &PerComponent) -> PerComponent {
        let mut out = self.lambda.activity_coefficients(x);
        for (escaping, pressure) in out.iter_mut().zip(self.vapour_pressure_pa).take(self.count) {
            *escaping *= pressure;
        }
        out
    }

    /// Pᵢ = xᵢ γᵢ Pᵢ,sat
    fn partial_pressures_pa(&self, x: &PerComponent) -> PerComponent {
        let mut out = self.escaping_pa(x);
        for (pressure, x) in out.iter_mut().zip(x) {
            *pressure *= x;
        }
        out
    }
}

impl<'a> Mixture<'a> {
    /// A mixture of these components.
    ///
    /// # Errors
    /// [`MixtureError::Count`] or [`MixtureError::Mismatch`] when the pairs are not those of so many components;
    /// [`MixtureError::NotPositive`] for a molar mass, a density or a factor that is none.
    pub fn new(components: &'a [Component<'a>], pairs: &'a Pairs) -> Result<Self, MixtureError> {
        let count = components.len();
        if count == 0 || count > LARGEST {
            return Err(MixtureError::Count { found: count });
        }
        if pairs.count() != count {
            return Err(MixtureError::Mismatch { found: pairs.count(), components: count });
        }
        for c in components {
            positive("molar mass, kg/mol", c.molar_mass_kg_mol)?;
            positive("density of the liquid, kg/m³", c.density_kg_m3)?;
            positive("factor on the vapour pressure", c.vapour_pressure_factor)?;
        }
        Ok(Self { components, pairs })
    }

    /// The components.
    #[must_use]
    pub const fn components(&self) -> &'a [Component<'a>] {
        self.components
    }

    /// The pairs, some of which may be ideal for want of constants.
    #[must_use]
    pub const fn pairs(&self) -> &'a Pairs {
        self.pairs
    }

    /// The range of temperature in which every equation of the mixture holds, K.
    #[must_use]
    pub fn range_k(&self) -> (f64, f64) {
        let (mut low, mut high) = self.pairs.range_k();
        for component in self.components {
            if let Some((from, to)) = component.vapour_pressure.range_k() {
                if from > low {
                    low = from;
                }
                if to < high {
                    high = to;
                }
            }
        }
        (low, high)
    }

    /// Activity coefficients γᵢ at `temperature_k` in K; 1 for ideal pairs. `amounts` in mol.
    ///
    /// Source: Wilson's equation, see [`Wilson`](super::Wilson).
    ///
    /// # Errors
    /// [`MixtureError::ActivityOutOfRange`], or amounts that are none.
    pub fn activity_coefficients(
        &self,
        amounts: &[f64],
        temperature_k: f64,
    ) -> Result<PerComponent, MixtureError> {
        let x = self.fractions(amounts)?;
        self.check_range(temperature_k)?;
        Ok(Lambda::at(self.pairs, temperature_k).activity_coefficients(&x))
    }

    /// Partial pressures over the liquid at `temperature_k` in K; Pa: `Pᵢ = xᵢ γᵢ Pᵢ,sat`. `amounts` in mol.
    ///
    /// # Errors
    /// [`MixtureError`] outside the range of an equation, or for amounts that are none.
    pub fn partial_pressures_pa(
        &self,
        amounts: &[f64],
        temperature_k: f64,
    ) -> Result<PerComponent, MixtureError> {
        let x = self.fractions(amounts)?;
        // Pᵢ = xᵢ γᵢ Pᵢ,sat
        Ok(self.warm(temperature_k)?.partial_pressures_pa(&x))
    }

    /// The pressure at which the liquid begins to boil at `temperature_k` in K; Pa: `Σ Pᵢ`. `amounts` in mol.
    ///
    /// # Errors
    /// As [`Mixture::partial_pressures_pa`].
    pub fn bubble_pressure_pa(&self, amounts: &[f64], temperature_k: f64) -> Result<f64, MixtureError> {
        Ok(sum(&self.partial_pressures_pa(amounts, temperature_k)?))
    }

    /// The bubble pressure by Raoult's law, all activity coefficients 1, for comparison; Pa. `amounts` in mol,
    /// `temperature_k` in K.
    ///
    /// # Errors
    /// As [`Mixture::partial_pressures_pa`].
    pub fn ideal_bubble_pressure_pa(&self, amounts: &[f64], temperature_k: f64) -> Result<f64, MixtureError> {
        let x = self.fractions(amounts)?;
        let mut pressure = 0.0;
        for (component, x) in self.components.iter().zip(x) {
            // p = Σ xᵢ Pᵢ,sat
            pressure += x * component.vapour_pressure_pa(temperature_k)?;
        }
        Ok(pressure)
    }

    /// Mole fractions of the vapour over the liquid at `temperature_k` in K: `yᵢ = Pᵢ / Σ Pⱼ`. `amounts` in mol.
    ///
    /// # Errors
    /// As [`Mixture::partial_pressures_pa`].
    pub fn vapour_composition(
        &self,
        amounts: &[f64],
        temperature_k: f64,
    ) -> Result<PerComponent, MixtureError> {
        let mut y = self.partial_pressures_pa(amounts, temperature_k)?;
        let total = sum(&y);
        for y in &mut y {
            // yᵢ = Pᵢ / Σ Pⱼ
            *y /= total;
        }
        Ok(y)
    }

    /// The temperature at which the liquid begins to boil under `pressure_pa` in Pa; K. `amounts` in mol.
    ///
    /// ```
    /// use thimbleworth::material::catalogue;
    /// use thimbleworth::mixture::{Component, Mixture, Pairs};
    /// let solvents = [catalogue().find("ethanol")?, catalogue().find("water")?];
    /// let pairs = Pairs::between(&solvents)?;
    /// let components = [Component::of(solvents[0], 293.15)?, Component::of(solvents[1], 293.15)?];
    /// let boiling_k = Mixture::new(&components, &pairs)?.bubble_temperature_k(&[0.89, 0.11], 101_325.0)?;
    /// // the azeotrope, 78.1 °C
    /// assert!((boiling_k - 351.25).abs() < 0.2);
    /// # Ok::<(), Box<dyn std::error::Error>>(())
    /// ```
    ///
    /// # Errors
    /// [`MixtureError::NoBubblePoint`] when it does not boil in the range of its equations; otherwise as
    /// [`Mixture::partial_pressures_pa`].
    pub fn bubble_temperature_k(&self, amounts: &[f64], pressure_pa: f64) -> Result<f64, MixtureError> {
        let x = self.fractions(amounts)?;
        positive("pressure, Pa", pressure_pa)?;
        Ok(self.boil(&x, pressure_pa, self.range_k(), None, 1e-13)?.temperature_k)
    }

    /// The bubble temperature of mole fractions with the mixture at it, to `near` in ln p, from the last one near it if there is one.
    ///
    /// A secant in 1/T, in which ln p is nearly straight, kept inside a shrinking bracket.
    pub(super) fn boil(
        &self,
        x: &PerComponent,
        pressure_pa: f64,
        (low_k, high_k): (f64, f64),
        before: Option<&Boiling>,
        near: f64,
    ) -> Result<Boiling, MixtureError> {
        let missed = || MixtureError::NoBubblePoint { pressure_pa, low_k, high_k };
        // A constant law and no known pair leave the temperature without bounds: there is no bubble point to find.
        if !(low_k < high_k && high_k.is_finite()) {
            return Err(missed());
        }
        let (mut below, mut above) = (low_k, high_k);
        // Without a second point the slope is Trouton's: d ln p / d(1/T) = −Δh/R ≈ −10.6 T
        let (mut t, mut slope) = match before {
            Some(before) => (before.temperature_k, before.slope_k),
            None => (0.5 * (low_k + high_k), -5.3 * (low_k + high_k)),
        };
        let mut last: Option<(f64, f64)> = None;
        for _ in 0..200 {
            let warm = self.warm(t)?;
            // f = ln(Σ Pᵢ / p)
            let f = libm::log(sum(&warm.partial_pressures_pa(x)) / pressure_pa);
            let u = 1.0 / t;
            if let Some((u0, f0)) = last
                && u != u0
                && f != f0
            {
                slope = (f - f0) / (u - u0);
            }
            if f.abs() <= near {
                return Ok(Boiling { temperature_k: t, slope_k: slope, warm });
            }
            if f > 0.0 {
                above = t;
            } else {
                below = t;
            }
            last = Some((u, f));
            if above - below <= 4.0 * f64::EPSILON * t {
                // Closed in on an end of the range: it does not boil there. Closed in elsewhere: the last bit is reached.
                let at_an_end = below <= low_k || above >= high_k;
                return if at_an_end {
                    Err(missed())
                } else {
                    Ok(Boiling { temperature_k: t, slope_k: slope, warm })
                };
            }
            let next = 1.0 / (u - f / slope);
            t = if next > below && next < above { next } else { 0.5 * (below + above) };
        }
        Err(missed())
    }

    pub(super) fn warm(&self, temperature_k: f64) -> Result<Warm, MixtureError> {
        self.check_range(temperature_k)?;
        let mut vapour_pressure_pa = [0.0; LARGEST];
        for (pressure, component) in vapour_pressure_pa.iter_mut().zip(self.components) {
            *pressure = component.vapour_pressure_pa(temperature_k)?;
        }
        let lambda = Lambda::at(self.pairs, temperature_k);
        Ok(Warm { count: self.components.len(), vapour_pressure_pa, lambda })
    }

    fn check_range(&self, temperature_k: f64) -> Result<(), MixtureError> {
        let (low_k, high_k) = self.pairs.range_k();
        if low_k <= temperature_k && temperature_k <= high_k {
            Ok(())
        } else {
            Err(MixtureError::ActivityOutOfRange { temperature_k, low_k, high_k })
        }
    }

    /// The amounts as an array, checked.
    pub(super) fn amounts(&self, amounts: &[f64]) -> Result<PerComponent, MixtureError> {
        if amounts.len() != self.components.len() {
            return Err(MixtureError::Mismatch { found: amounts.len(), components: self.components.len() });
        }
        let mut out = [0.0; LARGEST];
        for (component, (out, &value)) in out.iter_mut().zip(amounts).enumerate() {
            if !(value.is_finite() && value >= 0.0) {
                return Err(MixtureError::NotAnAmount { component, value });
            }
            *out = value;
        }
        let total = sum(&out);
        if total > 0.0 && total.is_finite() { Ok(out) } else { Err(MixtureError::NothingThere) }
    }

    fn fractions(&self, amounts: &[f64]) -> Result<PerComponent, MixtureError> {
        Ok(fractions_of(&self.amounts(amounts)?))
    }
}

pub(super) fn positive(of: &'static str, value: f64) -> Result<f64, MixtureError> {
    if value.is_finite() && value > 0.0 { Ok(value) } else { Err(MixtureError::NotPositive { of, value }) }
}

pub(super) fn sum(values: &PerComponent) -> f64 {
    values.iter().fold(0.0, |sum, value| sum + value)
}

pub(super) fn fractions_of(amounts: &PerComponent) -> PerComponent {
    let total = sum(amounts);
    amounts.map(|amount| amount / total)
}
