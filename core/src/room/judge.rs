//! A figure held against a limit: each kind of limit against the figure that belongs to it.
use super::course::Course;
use super::error::RoomError;
use super::limits::{Limit, LimitKind};
use super::sudden::Sudden;

/// The figures of a course that limits are about, fractions by volume.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Exposure {
    /// Highest mean over 8 hours, wherever they lie.
    pub worst_8h: f64,
    /// Highest mean over 15 minutes, wherever they lie.
    pub worst_15min: f64,
    /// Highest at any time.
    pub peak: f64,
}

impl Exposure {
    /// The exposure of somebody who is in the room all the time.
    ///
    /// ```
    /// use thimbleworth::room::{Course, Exposure, Release, Room, Ventilation, HOUR_S};
    /// let room = Room { volume_m3: 60.0, background: 0.0, mixing_factor: 1.0 };
    /// let spill = Release { from_s: 0.0, duration_s: 0.0, volume_m3: 0.06 };
    /// let e = Exposure::of(&Course::new(&room, &Ventilation::steady(6.0 / HOUR_S)?, &[spill])?);
    /// // 1000 ppm at once, a mean of 518 over the worst quarter hour and of 21 over the worst shift
    /// assert_eq!([e.peak, e.worst_15min, e.worst_8h].map(|x| (x * 1e6).round()), [1000.0, 518.0, 21.0]);
    /// # Ok::<(), thimbleworth::room::RoomError>(())
    /// ```
    #[must_use]
    pub fn of(course: &Course) -> Self {
        Self {
            worst_8h: course.worst_mean(8.0 * 3600.0).1,
            worst_15min: course.worst_mean(900.0).1,
            peak: course.peak().1,
        }
    }
}

/// A figure beside its limit.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Judgement {
    /// The limit.
    pub limit: &'static Limit,
    /// The limit as a fraction by volume.
    pub allowed: f64,
    /// The figure that was held against it, fraction by volume.
    pub found: f64,
}

impl Judgement {
    /// Whether the figure is above the limit; at the limit it is not.
    #[must_use]
    pub fn is_passed(&self) -> bool {
        self.found > self.allowed
    }

    /// The figure as a share of the limit.
    #[must_use]
    pub fn share(&self) -> f64 {
        self.found / self.allowed
    }
}

/// Holds a course against a limit: the worst 8 hours against 8-hour means and action levels, the worst 15 minutes against 15-minute means,
/// the peak against ceilings and what is immediately dangerous. `molar_mass_kg_mol` in kg/mol is used for limits in mg/m³.
///
/// # Errors
/// [`RoomError`] for a molar mass that is not positive.
pub fn judge(
    limit: &'static Limit,
    molar_mass_kg_mol: f64,
    exposure: &Exposure,
) -> Result<Judgement, RoomError> {
    let found = match limit.kind {
        LimitKind::Twa | LimitKind::ActionLevel => exposure.worst_8h,
        LimitKind::Stel => exposure.worst_15min,
        LimitKind::Ceiling | LimitKind::Idlh => exposure.peak,
    };
    Ok(Judgement { limit, allowed: limit.by_volume(molar_mass_kg_mol)?, found })
}

/// Holds a sudden release against a limit of any kind: always the figure at once, never an average of it.
///
/// # Errors
/// [`RoomError`] for a molar mass that is not positive.
///
/// ```
/// use thimbleworth::room::{Day, LimitKind, Sudden, judge_sudden, limits};
/// let s = Sudden::of_mass(22.7, 0.044_009_5, 293.15, 101_325.0, 140.0)?;
/// let limits = limits("124-38-9", Day::parse("2026-12-01").unwrap());
/// let idlh = limits.hold.iter().find(|l| l.kind == LimitKind::Idlh).unwrap();
/// // 8.9 % where 4 % is immediately dangerous
/// assert!((judge_sudden(idlh, 0.044_009_5, &s)?.share() - 2.2).abs() < 0.05);
/// # Ok::<(), thimbleworth::room::RoomError>(())
/// ```
pub fn judge_sudden(
    limit: &'static Limit,
    molar_mass_kg_mol: f64,
    sudden: &Sudden,
) -> Result<Judgement, RoomError> {
    Ok(Judgement { limit, allowed: limit.by_volume(molar_mass_kg_mol)?, found: sudden.worst() })
}
