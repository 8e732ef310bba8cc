//! Nominal, computed and measured electricity of one step beside one another.

/// Which of the three figures was taken.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Basis {
    /// A meter's reading.
    Measured,
    /// Plate power by time and duty.
    Nominal,
    /// The floor of thermodynamics, because it is all there is or lies above the nominal figure.
    Computed,
}

impl Basis {
    /// As a report names it.
    ///
    /// ```
    /// assert_eq!(thimbleworth::heat::Basis::Measured.title(), "measured");
    /// ```
    #[must_use]
    pub const fn title(self) -> &'static str {
        match self {
            Self::Measured => "measured",
            Self::Nominal => "nominal power by time",
            Self::Computed => "computed floor",
        }
    }
}

/// What is odd about the three figures.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum DemandDoubt {
    /// The nominal figure lies below what physics asks for: the power, the duty or the time is too small.
    NominalBelowFloor,
    /// The measured figure lies below what physics asks for: the meter, the time or the charge is wrong, or heat was recovered.
    MeasuredBelowFloor,
}

/// Electricity of one step, J.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Demand {
    /// Plate power by time and duty; 0 where no power is stated.
    pub nominal_j: f64,
    /// What the duties of the step take at least, where they are known.
    pub computed_j: Option<f64>,
    /// A meter's reading for the step, where there is one.
    pub measured_j: Option<f64>,
}

impl Demand {
    /// The figure to count, with its basis: the measured one; without it the nominal one, unless the computed floor is higher.
    #[must_use]
    pub fn chosen(&self) -> (f64, Basis) {
        match (self.measured_j, self.computed_j) {
            (Some(measured), _) => (measured, Basis::Measured),
            (None, Some(computed)) if computed > self.nominal_j => (computed, Basis::Computed),
            (None, _) => (self.nominal_j, Basis::Nominal),
        }
    }

    /// What is odd about the figures, in order; empty where nothing is.
    #[must_use]
    pub fn doubts(&self) -> Vec<DemandDoubt> {
        let mut doubts = Vec::new();
        let Some(floor) = self.computed_j else { return doubts };
        if self.nominal_j > 0.0 && self.nominal_j < floor {
            doubts.push(DemandDoubt::NominalBelowFloor);
        }
        if self.measured_j.is_some_and(|measured| measured < floor) {
            doubts.push(DemandDoubt::MeasuredBelowFloor);
        }
        doubts
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    const NOMINAL: Demand = Demand { nominal_j: 5.0, computed_j: Some(1.0), measured_j: None };

    #[test]
    fn measured_overrides_nominal_and_the_floor_holds() {
        assert_eq!(NOMINAL.chosen(), (5.0, Basis::Nominal));
        assert_eq!(Demand { measured_j: Some(3.0), ..NOMINAL }.chosen(), (3.0, Basis::Measured));
        assert_eq!(Demand { nominal_j: 0.5, ..NOMINAL }.chosen(), (1.0, Basis::Computed));
        assert_eq!(Demand { nominal_j: 0.0, ..NOMINAL }.chosen(), (1.0, Basis::Computed));
    }

    #[test]
    fn what_lies_below_the_floor_is_doubted() {
        assert!(NOMINAL.doubts().is_empty());
        let low = Demand { nominal_j: 0.5, computed_j: Some(1.0), measured_j: Some(0.9) };
        assert_eq!(low.doubts(), [DemandDoubt::NominalBelowFloor, DemandDoubt::MeasuredBelowFloor]);
        // no power stated is no doubt
        assert!(Demand { nominal_j: 0.0, ..NOMINAL }.doubts().is_empty());
    }
}
