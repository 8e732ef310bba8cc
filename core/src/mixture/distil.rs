//! A batch boiled or blown down to a volume, with the vapour taken away as it rises (Rayleigh).
use super::equilibrium::{fractions_of, positive, sum};
use super::{LARGEST, Mixture, MixtureError, PerComponent};

/// What is held while the batch goes down.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Hold {
    /// The pressure, Pa: the liquid boils, and its temperature rises as the volatile leaves.
    Pressure(f64),
    /// The temperature of the liquid, K: a rotary evaporator whose vacuum follows, or a gas stream over a warmed vial.
    Temperature(f64),
}

/// The batch at one moment.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Point {
    /// Volume of the liquid left, as if volumes added; m³.
    pub volume_m3: f64,
    /// Amounts left in the liquid; mol.
    pub left_mol: PerComponent,
    /// Mole fractions of the vapour that rises; 1.
    pub vapour: PerComponent,
    /// Temperature of the liquid; K.
    pub temperature_k: f64,
    /// Pressure of the vapour over it, Σ Pᵢ; Pa.
    pub pressure_pa: f64,
}

/// What a batch distillation comes to.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Distillation {
    /// Amounts left in the liquid; mol.
    pub left_mol: PerComponent,
    /// Amounts in all the vapour that rose; mol.
    pub distillate_mol: PerComponent,
    /// At the beginning.
    pub first: Point,
    /// At the end.
    pub last: Point,
    /// ∫ dN/Σp over the vapour that rose; mol/Pa. A carrier gas at the pressure P that leaves saturated takes
    /// P ∫ dN/Σp − N mol of gas for it.
    pub per_pressure_mol_pa: f64,
}

impl Distillation {
    /// Gas needed to carry the vapour away when it leaves saturated, mol; `pressure_pa` in Pa is that of the gas.
    ///
    /// `n_gas = ∫ (P − Σp)/Σp dN`. Below zero the liquid boils at this pressure and needs no gas: 0 is given.
    #[must_use]
    pub fn carrier_mol(&self, pressure_pa: f64) -> f64 {
        // n_gas = P ∫ dN/Σp − N
        let gas = pressure_pa * self.per_pressure_mol_pa - sum(&self.distillate_mol);
        if gas > 0.0 { gas } else { 0.0 }
    }
}

/// The error allowed in one step, in the logarithm of an amount times its share of the volume.
const TOLERANCE: f64 = 1e-4;
/// How near a bubble point is sought on the way, in ln p: only ratios of pressures enter, so 3 mK are near enough.
const NEAR: f64 = 1e-4;
/// The longest step in ln V: paths that need no short steps still have points to draw.
const LONGEST: f64 = 1.0;
/// Steps after which the path is given up; those of the evidence take fewer than 40.
const MOST_STEPS: usize = 4000;

impl Mixture<'_> {
    /// Takes a batch down to a volume: what is left, and what has gone over.
    ///
    /// The vapour leaves as it rises, without reflux, in equilibrium with the liquid. With V the volume of the liquid as if volumes
    /// added: `d ln nᵢ / d ln V = κᵢ V / Σ vⱼ nⱼ κⱼ`, with `κᵢ = γᵢ Pᵢ,sat` and `v = M/ρ`. Integrated by the Runge-Kutta pair of
    /// Bogacki and Shampine (orders 3 and 2) in ln V, so that it ends at the volume asked for, with amounts that stay positive.
    ///
    /// `amounts_mol` in mol; `down_to_m3` in m³, 0 for everything. A volume that is not below that of the batch leaves it as it is.
    ///
    /// ```
    /// use thimbleworth::material::catalogue;
    /// use thimbleworth::mixture::{Component, Hold, Mixture, Pairs};
    /// let solvents = [catalogue().find("hexane")?, catalogue().find("acetone")?];
    /// let pairs = Pairs::between(&solvents)?;
    /// let components = [Component::of(solvents[0], 293.15)?, Component::of(solvents[1], 293.15)?];
    /// let mixture = Mixture::new(&components, &pairs)?;
    /// // 150 mL of each, down to 5 mL
    /// let amounts = components.map(|c| 150e-6 / c.molar_volume_m3_mol());
    /// let end = mixture.distil_batch(&amounts, 5e-6, Hold::Temperature(293.15))?;
    /// assert!(end.left_mol[0] / (end.left_mol[0] + end.left_mol[1]) > 0.99);
    /// # Ok::<(), Box<dyn std::error::Error>>(())
    /// ```
    ///
    /// Source: Rayleigh's equation of simple distillation, conservation of mass; integration as stated.
    ///
    /// # Errors
    /// [`MixtureError`] when an equation leaves its range on the way, or for amounts that are none.
    pub fn distil_batch(
        &self,
        amounts_mol: &[f64],
        down_to_m3: f64,
        hold: Hold,
    ) -> Result<Distillation, MixtureError> {
        self.distil_along(amounts_mol, down_to_m3, hold, |_| ())
    }

    /// As [`Mixture::distil_batch`], and `each` is shown every point of the path, the first and the last included.
    ///
    /// # Errors
    /// As [`Mixture::distil_batch`].
    pub fn distil_along(
        &self,
        amounts_mol: &[f64],
        down_to_m3: f64,
        hold: Hold,
        mut each: impl FnMut(&Point),
    ) -> Result<Distillation, MixtureError> {
        let start = self.amounts(amounts_mol)?;
        if !(down_to_m3.is_finite() && down_to_m3 >= 0.0) {
            return Err(MixtureError::NotPositive { of: "volume left, m³", value: down_to_m3 });
        }
        let mut clock = Clock::new(self, hold)?;
        let mut rate = clock.rate(&start)?;
        let first = rate.point(&start);
        each(&first);
        let mut n = start;
        let mut last = first;
        let mut per_pressure = 0.0;
        // Everything is asked for: stop at a millionth, and send the rest after it with the pressure it has there.
        let floor_m3 = if down_to_m3 > 0.0 { down_to_m3 } else { first.volume_m3 * 1e-6 };
        // s = ln(V₀/V) runs from 0 to the end
        let end = libm::log(first.volume_m3 / floor_m3);
        let (mut s, mut h) = (0.0, 0.1);
        for _ in 0..MOST_STEPS {
            if s >= end {
                break;
            }
            let whole = h >= end - s;
            let step = if whole { end - s } else { h };
            let tried = clock.step(&n, &rate, step)?;
            // The third-order error of the pair grows with the cube of the step.
            let ratio = libm::cbrt(TOLERANCE / (tried.error + 1e-30));
            h = step * 0.9 * ratio;
            // no more than five times longer or shorter at once
            if h > 5.0 * step {
                h = 5.0 * step;
            }
            if h < 0.2 * step {
                h = 0.2 * step;
            }
            if h > LONGEST {
                h = LONGEST;
            }
            if tried.error <= TOLERANCE {
                s = if whole { end } else { s + step };
                per_pressure += tried.per_pressure;
                n = tried.amounts;
                rate = tried.rate;
                last = rate.point(&n);
                each(&last);
            }
        }
        if s < end {
            return Err(MixtureError::NotReached { wanted_m3: down_to_m3, reached_m3: last.volume_m3 });
        }
        if down_to_m3 <= 0.0 {
            per_pressure += sum(&n) / last.pressure_pa;
            n = [0.0; LARGEST];
            last = Point { volume_m3: 0.0, left_mol: n, ..last };
            each(&last);
        }
        let mut distillate_mol = start;
        for (gone, left) in distillate_mol.iter_mut().zip(n) {
            // what has gone over = what was there − what is left
            *gone -= left;
        }
        Ok(Distillation { left_mol: n, distillate_mol, first, last, per_pressure_mol_pa: per_pressure })
    }
}

/// How the amounts go down at one composition.
#[derive(Clone, Copy)]
struct Rate {
    /// φᵢ = d ln nᵢ / d ln V
    phi: PerComponent,
    /// Mole fractions of the vapour.
    vapour: PerComponent,
    /// All that is left, mol.
    left_mol: f64,
    volume_m3: f64,
    temperature_k: f64,
    pressure_pa: f64,
}

impl Rate {
    fn point(&self, n: &PerComponent) -> Point {
        Point {
            volume_m3: self.volume_m3,
            left_mol: *n,
            vapour: self.vapour,
            temperature_k: self.temperature_k,
            pressure_pa: self.pressure_pa,
        }
    }
}

struct Tried {
    amounts: PerComponent,
    rate: Rate,
    error: f64,
    per_pressure: f64,
}

struct Clock<'m> {
    mixture: &'m Mixture<'m>,
    count: usize,
    volumes: PerComponent,
    hold: Hold,
    /// At a held temperature, what does not change.
    warm: Option<super::equilibrium::Warm>,
    range_k: (f64, f64),
    /// The last bubble point.
    boiling: Option<super::equilibrium::Boiling>,
}

impl<'m> Clock<'m> {
    fn new(mixture: &'m Mixture<'m>, hold: Hold) -> Result<Self, MixtureError> {
        let mut volumes = [0.0; LARGEST];
        for (volume, component) in volumes.iter_mut().zip(mixture.components) {
            *volume = component.molar_volume_m3_mol();
        }
        let warm = match hold {
            Hold::Temperature(t) => Some(mixture.warm(t)?),
            Hold::Pressure(p) => {
                positive("pressure, Pa", p)?;
                None
            }
        };
        Ok(Self {
            mixture,
            count: mixture.components.len(),
            volumes,
            hold,
            warm,
            range_k: mixture.range_k(),
            boiling: None,
        })
    }

    fn rate(&mut self, n: &PerComponent) -> Result<Rate, MixtureError> {
        let x = fractions_of(n);
        let (temperature_k, held_pa, kappa) = match (self.hold, &self.warm) {
            (Hold::Temperature(t), Some(warm)) => (t, None, warm.escaping_pa(&x)),
            (Hold::Temperature(t), None) => (t, None, self.mixture.warm(t)?.escaping_pa(&x)),
            (Hold::Pressure(p), _) => {
                let boiling = self.mixture.boil(&x, p, self.range_k, self.boiling.as_ref(), NEAR)?;
                let kappa = boiling.warm.escaping_pa(&x);
                self.boiling = Some(boiling);
                (boiling.temperature_k, Some(p), kappa)
            }
        };
        let (mut volume, mut escaping_volume, mut pressure_pa) = (0.0, 0.0, 0.0);
        for i in 0..self.count {
            let part = self.volumes[i] * n[i];
            // V = Σ vᵢ nᵢ
            volume += part;
            escaping_volume += part * kappa[i];
            // Σp = Σ xᵢ κᵢ
            pressure_pa += x[i] * kappa[i];
        }
        let (mut phi, mut vapour) = ([0.0; LARGEST], [0.0; LARGEST]);
        let (scale, over) = (volume / escaping_volume, 1.0 / pressure_pa);
        for i in 0..self.count {
            // φᵢ = κᵢ V / Σ vⱼ nⱼ κⱼ
            phi[i] = kappa[i] * scale;
            vapour[i] = x[i] * kappa[i] * over;
        }
        let pressure_pa = held_pa.unwrap_or(pressure_pa);
        Ok(Rate { phi, vapour, left_mol: sum(n), volume_m3: volume, temperature_k, pressure_pa })
    }

    /// One step of the pair of Bogacki and Shampine in ln nᵢ.
    fn step(&mut self, n: &PerComponent, k1: &Rate, h: f64) -> Result<Tried, MixtureError> {
        let count = self.count;
        let along = |phi: &PerComponent, h: f64| {
            let mut out = *n;
            for (out, phi) in out.iter_mut().zip(phi).take(count) {
                if *out > 0.0 {
                    // nᵢ(s + h) = nᵢ exp(−h φᵢ)
                    *out *= libm::exp(-h * phi);
                }
            }
            out
        };
        let k2 = self.rate(&along(&k1.phi, 0.5 * h))?;
        let k3 = self.rate(&along(&k2.phi, 0.75 * h))?;
        let mut mean = [0.0; LARGEST];
        for (((mean, a), b), c) in mean.iter_mut().zip(k1.phi).zip(k2.phi).zip(k3.phi).take(count) {
            // φ̄ = 2/9 k₁ + 1/3 k₂ + 4/9 k₃
            *mean = (2.0 * a + 3.0 * b + 4.0 * c) / 9.0;
        }
        let amounts = along(&mean, h);
        let k4 = self.rate(&amounts)?;
        let mut error = 0.0;
        let stages = k1.phi.iter().zip(k2.phi).zip(k3.phi).zip(k4.phi);
        for ((n, volume), (((a, b), c), d)) in n.iter().zip(self.volumes).zip(stages).take(count) {
            // the difference to the second-order member: h (−5/72 k₁ + 1/12 k₂ + 1/9 k₃ − 1/8 k₄)
            let off = h * (-5.0 / 72.0 * a + b / 12.0 + c / 9.0 - d / 8.0).abs();
            // A component that is all but gone need not be followed to the last digit.
            error += off * volume * n / k1.volume_m3;
        }
        let per_pressure = per_pressure(k1, &k2, &k4);
        Ok(Tried { amounts, rate: k4, error, per_pressure })
    }
}

/// ∫ dN/Σp over a step, mol/Pa: the parabola through beginning, middle and end, over the moles that leave.
fn per_pressure(begin: &Rate, middle: &Rate, end: &Rate) -> f64 {
    let (a, b) = (begin.left_mol - middle.left_mol, middle.left_mol - end.left_mol);
    if a > 0.0 && b > 0.0 {
        // (a+b)/6 · [(2 − b/a) f₀ + (a+b)²/(ab) f₁ + (2 − a/b) f₂], f = 1/Σp
        (a + b) / 6.0
            * ((2.0 - b / a) / begin.pressure_pa
                + (a + b) * (a + b) / (a * b) / middle.pressure_pa
                + (2.0 - a / b) / end.pressure_pa)
    } else {
        0.5 * (a + b) * (1.0 / begin.pressure_pa + 1.0 / end.pressure_pa)
    }
}
