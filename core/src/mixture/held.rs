//! A liquid at one temperature, ready for the inside of a draw: partial pressures and the way down to a volume, cheaply.
use super::equilibrium::{positive, sum};
use super::wilson::Lambda;
use super::{LARGEST, MixtureError, Pairs, PerComponent};
use crate::exponential::exp;

/// A liquid mixture at a held temperature, with all that does not change with the composition worked out.
///
/// What [`Mixture::distil_batch`](super::Mixture::distil_batch) does with control of its error, this does in a few fixed steps:
/// for runs that are repeated a hundred thousand times.
#[derive(Clone, Copy, Debug)]
pub struct Held {
    count: usize,
    vapour_pressure_pa: PerComponent,
    volume_m3_mol: PerComponent,
    lambda: Lambda,
}

/// What [`Held::take_down`] comes to.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct TakenDown {
    /// Amounts left in the liquid; mol.
    pub left_mol: PerComponent,
    /// ∫ dN/Σp over the vapour that rose; mol/Pa. See [`Distillation::per_pressure_mol_pa`](super::Distillation).
    pub per_pressure_mol_pa: f64,
}

/// The volume falls by about this much, in ln V, in one step; and there are at least so many steps.
const STEP: f64 = 0.45;
const LEAST_STEPS: f64 = 4.0;
/// While the escaping tendencies change by less than this in a step, the next one is twice as long.
const STEADY: f64 = 4e-3;
/// Steps after which the path is given up; those of the evidence take fewer than 30.
const MOST_STEPS: usize = 400;
/// How near the last step comes to the volume before the rest is taken in proportion.
const NEAR: f64 = 1e-4;

impl Held {
    /// A mixture at `temperature_k` in K: vapour pressure of each component at it in Pa, volume of a mole of each as liquid in m³/mol.
    ///
    /// `which` says which component of `pairs` each number belongs to, so that components which are not there cost nothing.
    ///
    /// # Errors
    /// [`MixtureError::Count`] or [`MixtureError::Mismatch`] when the numbers are not as many as the components;
    /// [`MixtureError::ActivityOutOfRange`] outside the range of the pairs; [`MixtureError::NotPositive`].
    pub fn new(
        pairs: &Pairs,
        which: &[usize],
        temperature_k: f64,
        vapour_pressure_pa: &[f64],
        volume_m3_mol: &[f64],
    ) -> Result<Self, MixtureError> {
        Self::with(pairs, None, which, temperature_k, vapour_pressure_pa, volume_m3_mol)
    }

    /// As [`Held::new`], with what Wilson's equation comes to for all components at that temperature, where that is known already.
    pub(crate) fn with(
        pairs: &Pairs,
        known: Option<&Lambda>,
        which: &[usize],
        temperature_k: f64,
        vapour_pressure_pa: &[f64],
        volume_m3_mol: &[f64],
    ) -> Result<Self, MixtureError> {
        let count = which.len();
        if count == 0 || count > LARGEST {
            return Err(MixtureError::Count { found: count });
        }
        for found in [vapour_pressure_pa.len(), volume_m3_mol.len()] {
            if found != count {
                return Err(MixtureError::Mismatch { found, components: count });
            }
        }
        let (low_k, high_k) = pairs.range_k();
        if count > 1 && !(low_k <= temperature_k && temperature_k <= high_k) {
            return Err(MixtureError::ActivityOutOfRange { temperature_k, low_k, high_k });
        }
        let (mut pressures, mut volumes) = ([0.0; LARGEST], [0.0; LARGEST]);
        for i in 0..count {
            pressures[i] = positive("vapour pressure, Pa", vapour_pressure_pa[i])?;
            volumes[i] = positive("volume of a mole, m³/mol", volume_m3_mol[i])?;
        }
        let lambda = match known {
            Some(known) => known.part(which),
            None => Lambda::among(pairs, which, temperature_k),
        };
        Ok(Self { count, vapour_pressure_pa: pressures, volume_m3_mol: volumes, lambda })
    }

    /// κᵢ = γᵢ Pᵢ,sat, the pressure of each component over its mole fraction; Pa. `n` in mol.
    fn escaping_pa(&self, n: &PerComponent) -> PerComponent {
        let mut out = self.lambda.activity_of_amounts(n);
        for (out, pressure) in out.iter_mut().zip(self.vapour_pressure_pa) {
            *out *= pressure;
        }
        out
    }

    /// Partial pressures over amounts in mol; Pa: `Pᵢ = xᵢ γᵢ Pᵢ,sat`. All zero over nothing.
    ///
    /// ```
    /// use thimbleworth::mixture::{Held, Pairs};
    /// // two components of which nothing is known: Raoult's law
    /// let held = Held::new(&Pairs::ideal(2)?, &[0, 1], 293.15, &[16_000.0, 24_000.0], &[130e-6, 74e-6])?;
    /// assert_eq!(held.partial_pressures_pa(&[1.0, 3.0])[..2], [4_000.0, 18_000.0]);
    /// # Ok::<(), thimbleworth::mixture::MixtureError>(())
    /// ```
    #[must_use]
    pub fn partial_pressures_pa(&self, amounts_mol: &[f64]) -> PerComponent {
        let n = self.amounts(amounts_mol);
        let total = sum(&n);
        if total <= 0.0 {
            return [0.0; LARGEST];
        }
        let mut out = self.escaping_pa(&n);
        for (out, n) in out.iter_mut().zip(n) {
            // Pᵢ = xᵢ κᵢ
            *out *= n / total;
        }
        out
    }

    fn amounts(&self, amounts_mol: &[f64]) -> PerComponent {
        let mut n = [0.0; LARGEST];
        for (n, given) in n.iter_mut().zip(amounts_mol).take(self.count) {
            *n = *given;
        }
        n
    }

    /// Takes amounts in mol down to a volume in m³, the vapour taken away as it rises, at the held temperature.
    ///
    /// Every component leaves by `dnᵢ/dθ = −κᵢ nᵢ` with `κᵢ = γᵢ Pᵢ,sat`, in a time θ that runs as fast as it likes. While the activity
    /// coefficients are steady that is solved exactly, however different the vapour pressures; they change slowly, so a few steps
    /// with those of the middle of each (the midpoint rule) are enough. Against [`Mixture::distil_batch`](super::Mixture::distil_batch) what is left
    /// differs by less than 0.2 % of the batch (a residue of a hundredth, as a rule, by less than 1 % of itself, near an azeotrope by up to 15 %), the gas by
    /// less than 2 %. And
    /// `∫ dN/Σp = ∫ N dθ`, so that the gas that carries the vapour away comes along.
    ///
    /// A volume that is not below that of the batch leaves it as it is; 0 takes everything.
    ///
    /// Source: Rayleigh's equation of simple distillation; integration as stated, held against the finer one by `tests/mixture`.
    ///
    /// ```
    /// use thimbleworth::mixture::{Held, Pairs};
    /// let held = Held::new(&Pairs::ideal(1)?, &[0], 293.15, &[16_000.0], &[130e-6])?;
    /// let end = held.take_down(&[2.0], 65e-6);
    /// assert!((end.left_mol[0] - 0.5).abs() < 1e-12 && (end.per_pressure_mol_pa * 16_000.0 - 1.5).abs() < 1e-9);
    /// # Ok::<(), thimbleworth::mixture::MixtureError>(())
    /// ```
    #[must_use]
    pub fn take_down(&self, amounts_mol: &[f64], down_to_m3: f64) -> TakenDown {
        // Lists as long as the mixture, so that most of them cost little; what is not there has no amount.
        match self.count {
            1 => self.alone(amounts_mol, down_to_m3),
            2 => Path::<2>::of(self).take_down(self.amounts(amounts_mol), down_to_m3),
            3 => Path::<3>::of(self).take_down(self.amounts(amounts_mol), down_to_m3),
            _ => Path::<LARGEST>::of(self).take_down(self.amounts(amounts_mol), down_to_m3),
        }
    }

    /// One component: κ is its vapour pressure all the way down.
    fn alone(&self, amounts_mol: &[f64], down_to_m3: f64) -> TakenDown {
        let (mut left_mol, before) = (self.amounts(amounts_mol), self.amounts(amounts_mol)[0]);
        let left = if down_to_m3 > 0.0 { down_to_m3 / self.volume_m3_mol[0] } else { 0.0 };
        if left < before {
            left_mol[0] = left;
        }
        // ∫ n dθ = (n − n')/P
        TakenDown { left_mol, per_pressure_mol_pa: (before - left_mol[0]) / self.vapour_pressure_pa[0] }
    }
}

/// A mixture of at most `N` components on its way down.
struct Path<const N: usize> {
    vapour_pressure_pa: [f64; N],
    volume_m3_mol: [f64; N],
    lambda: [[f64; N]; N],
}

#[expect(clippy::needless_range_loop, reason = "lists of one length side by side read as the equations do")]
impl<const N: usize> Path<N> {
    fn of(held: &Held) -> Self {
        let mut path = Self { vapour_pressure_pa: [1.0; N], volume_m3_mol: [0.0; N], lambda: [[1.0; N]; N] };
        for i in 0..N {
            if i < held.count {
                path.vapour_pressure_pa[i] = held.vapour_pressure_pa[i];
                path.volume_m3_mol[i] = held.volume_m3_mol[i];
            }
            for j in 0..N {
                path.lambda[i][j] = held.lambda.between(i, j);
            }
        }
        path
    }

    /// κᵢ = γᵢ Pᵢ,sat of amounts, of which only the ratio counts; Pa. γ as in [`Lambda::activity_of_amounts`].
    fn escaping_pa(&self, n: &[f64; N]) -> [f64; N] {
        let (mut total, mut over) = (0.0, [0.0; N]);
        for k in 0..N {
            let mut sum = 0.0;
            for j in 0..N {
                sum += n[j] * self.lambda[k][j];
            }
            // 1/(N Sₖ), N Sₖ = Σⱼ nⱼ Λₖⱼ
            over[k] = 1.0 / sum;
            total += n[k];
        }
        let mut kappa = [0.0; N];
        for i in 0..N {
            let mut sum = 0.0;
            for k in 0..N {
                sum += n[k] * over[k] * self.lambda[k][i];
            }
            // ln γᵢ = 1 − ln Sᵢ − Σₖ xₖ Λₖᵢ / Sₖ
            kappa[i] = exp(1.0 - sum) * over[i] * total * self.vapour_pressure_pa[i];
        }
        kappa
    }

    fn volume_m3(&self, n: &[f64; N]) -> f64 {
        let mut volume = 0.0;
        for i in 0..N {
            volume += self.volume_m3_mol[i] * n[i];
        }
        volume
    }

    /// The amounts after a time θ at steady κ: `nᵢ exp(−κᵢ θ)`.
    fn after(n: &[f64; N], kappa: &[f64; N], theta: f64) -> [f64; N] {
        let mut out = *n;
        for i in 0..N {
            out[i] *= exp(-kappa[i] * theta);
        }
        out
    }

    /// The amounts about half a step on: exp(−x) ≈ 1/(1 + x + x²/2), which stays positive and costs no exponential.
    fn about(n: &[f64; N], kappa: &[f64; N], theta: f64) -> [f64; N] {
        let mut out = *n;
        for i in 0..N {
            let x = kappa[i] * theta;
            out[i] /= 1.0 + x * (1.0 + 0.5 * x);
        }
        out
    }

    /// The amounts when the volume is down to `wanted_m3` while κ is steady, from a first guess of θ.
    ///
    /// ln V falls, and flattens, as θ grows: Newton's steps come near enough within a few.
    fn down_to(&self, n: &[f64; N], kappa: &[f64; N], mut theta: f64, wanted_m3: f64) -> [f64; N] {
        let (mut now, mut volume) = (*n, wanted_m3);
        for _ in 0..40 {
            now = Self::after(n, kappa, theta);
            let mut leaving = 0.0;
            volume = 0.0;
            for i in 0..N {
                let part = self.volume_m3_mol[i] * now[i];
                volume += part;
                leaving += part * kappa[i];
            }
            let off = volume / wanted_m3 - 1.0;
            if off.abs() < NEAR {
                break;
            }
            // ln(1 + x), by a quotient that is good for a Newton's step where x is small
            let ln = if off.abs() < 0.1 { off * (6.0 + off) / (6.0 + 4.0 * off) } else { libm::log1p(off) };
            // θ ← θ + ln(V/V_wanted) V / Σ vᵢ nᵢ κᵢ
            theta += ln * volume / leaving;
        }
        // The last hair in proportion, so that the volume is met.
        now.map(|n| n * (wanted_m3 / volume))
    }

    fn take_down(&self, amounts_mol: PerComponent, down_to_m3: f64) -> TakenDown {
        let mut left_mol = amounts_mol;
        let mut n = [0.0; N];
        n.copy_from_slice(&amounts_mol[..N]);
        let mut volume = self.volume_m3(&n);
        let mut per_pressure_mol_pa = 0.0;
        // Everything: stop at a millionth, and send the rest after it.
        let floor_m3 = if down_to_m3 > 0.0 { down_to_m3 } else { volume * 1e-6 };
        let all = libm::log(volume / floor_m3);
        if !(volume > 0.0 && all > 0.0) {
            return TakenDown { left_mol, per_pressure_mol_pa };
        }
        let mut step = all / LEAST_STEPS;
        if step > STEP {
            step = STEP;
        }
        let mut shrink = exp(-step);
        for _ in 0..MOST_STEPS {
            let mut last = volume * shrink <= floor_m3;
            let first = self.escaping_pa(&n);
            let mut leaving = 0.0;
            for i in 0..N {
                leaving += self.volume_m3_mol[i] * n[i] * first[i];
            }
            let fall = if last { libm::log(volume / floor_m3) } else { step };
            // half of the way down, at the κ of the beginning: dV/dθ = −Σ vᵢ nᵢ κᵢ
            let half_theta = 0.5 * fall * volume / leaving;
            let half = Self::about(&n, &first, half_theta);
            let middle = self.escaping_pa(&half);
            let mut change = 0.0;
            for i in 0..N {
                change += self.volume_m3_mol[i] * half[i] * (middle[i] - first[i]).abs();
            }
            let mut next = n;
            if !last {
                next = Self::after(&n, &middle, 2.0 * half_theta);
                let there = self.volume_m3(&next);
                last = there <= floor_m3;
                if !last {
                    volume = there;
                }
            }
            if last {
                next = self.down_to(&n, &middle, 2.0 * half_theta, floor_m3);
            }
            for i in 0..N {
                // ∫ nᵢ dθ = (nᵢ − nᵢ') / κᵢ
                per_pressure_mol_pa += (n[i] - next[i]) / middle[i];
            }
            n = next;
            if last {
                break;
            }
            if change < STEADY * leaving {
                step *= 2.0;
                shrink *= shrink;
            }
        }
        if down_to_m3 <= 0.0 {
            let kappa = self.escaping_pa(&n);
            for i in 0..N {
                per_pressure_mol_pa += n[i] / kappa[i];
            }
            n = [0.0; N];
        }
        left_mol[..N].copy_from_slice(&n);
        TakenDown { left_mol, per_pressure_mol_pa }
    }
}
