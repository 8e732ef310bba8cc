//! Places, postings, the bench and the closing of the book.
//!
//! A posting moves a mass of one material from one place to another, because of one step, by one stated rule. Steps
//! are never given a free `post(from, to, kg)`: they move a share, an amount capped by what is there, or everything,
//! so that no bench place is ever overdrawn and the bench is exactly empty at the end.

mod bench;
mod cells;
mod halt;
mod place;
mod trace;

pub use bench::{Bench, Measured, Nature};
pub use cells::{Cells, Direction};
pub use halt::Halt;
pub use place::{BENCH_PLACES, OUTSIDE_PLACES, Place};
pub use trace::{Batch, Doubt, Note, Posting, Spending, StepIx, Trace};

/// A material of one route: the index into that route's own list.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub struct Material(pub u16);

/// A rule of the technique at work: the index into the table that the technique declares.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub struct RuleIx(pub u8);

/// What a step uses up that is not a mass in the book: the second kind of entry, which does not close.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum Utility {
    /// Electrical energy; J.
    Electricity,
    /// Cooling water run through condensers; kg. Never part of a mass intensity.
    CoolingWater,
    /// Carbon dioxide sent through the vessel, however often the same gram passes; kg. Neither gross nor net input.
    CirculatedCo2,
    /// Heat into the streams of the work; J. What delivers it may be electricity, which is counted apart.
    Heat,
    /// Heat taken out of the streams of the work; J. Likewise.
    Cooling,
    /// Work of pumps and compressors on the streams of the work; J. Likewise.
    Work,
    /// Electricity by stated power and time, whether or not it is the figure that counts; J.
    NominalElectricity,
    /// Electricity by physics and efficiencies, likewise; J.
    ComputedElectricity,
    /// Electricity by a meter, likewise; J.
    MeasuredElectricity,
}

impl Utility {
    /// How many there are.
    pub const COUNT: usize = 9;
    /// All of them, in the order of their index.
    pub const ALL: [Self; Self::COUNT] = [
        Self::Electricity,
        Self::CoolingWater,
        Self::CirculatedCo2,
        Self::Heat,
        Self::Cooling,
        Self::Work,
        Self::NominalElectricity,
        Self::ComputedElectricity,
        Self::MeasuredElectricity,
    ];

    /// Whether it is an energy, J; else a mass, kg.
    #[must_use]
    pub const fn is_energy(self) -> bool {
        !matches!(self, Self::CoolingWater | Self::CirculatedCo2)
    }

    /// The name shown.
    #[must_use]
    pub const fn name(self) -> &'static str {
        match self {
            Self::Electricity => "electricity",
            Self::CoolingWater => "cooling water",
            Self::CirculatedCo2 => "CO2 circulated",
            Self::Heat => "heat",
            Self::Cooling => "cooling",
            Self::Work => "work",
            Self::NominalElectricity => "electricity, nominal",
            Self::ComputedElectricity => "electricity, computed",
            Self::MeasuredElectricity => "electricity, measured",
        }
    }
}
