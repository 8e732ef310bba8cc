//! What a stream of carbon dioxide costs in work, heat and cooling, per kilogram passed through, state by state.
//!
//! | file | what it holds |
//! | --- | --- |
//! | `machine` | pump and compressor: work by isentropic efficiency |
//! | `open` | from the cylinder through pump, heater and extractor to the vent |
//! | `closed` | condenser, pump, heater, extractor, valve, separator, and back |
//! | `recompression` | gas back to a store in stages with cooling between them |
//! | `electricity` | what drives, coolers and heaters draw |
//! | `vessel` | what a vessel vents at let-down, what liquid between closed valves does |
//! | `cylinder` | heel of a cylinder, number of cylinders, dry-ice snow |
//!
//! **Signs.** An energy is positive when it goes into the carbon dioxide. The kind of a leg follows from the sign: what
//! is called preheating is [`Kind::Cooling`] where the pump leaves the stream hotter than the extractor.
//!
//! **First law.** Steady flow, no change of speed or height: each energy is the difference of two specific
//! enthalpies, so the legs of a closed loop add up to zero. Pressure drops in pipes, heat from the room and what cooling
//! the steel takes are not in it; nor is warming vessels up before a run.
//!
//! **Expansion to the vent.** From extraction pressure to about 1 bar the stream passes through solid and gas (dry
//! ice), which the equation of state cannot describe. What is accounted is the heat that brings the stream to the vent
//! temperature, whatever it passed through; no state in between is given. **Caution:** that solid is what blocks
//! restrictors and vent lines, and lets go suddenly; it is left out of the figures, not out of the line.
//!
//! **Caution.** Pressures here are those of fluid that can burst what holds it: ratings, relief and interlocks are a matter
//! of local codes and licensed practice.
mod closed;
mod cylinder;
mod electricity;
mod error;
mod machine;
mod open;
mod recompression;
mod vessel;

pub use closed::ClosedLoop;
pub use cylinder::{cylinders, heel_kg, last_liquid_heel_kg, snow_kg};
pub use electricity::{Electricity, Heating, Utilities};
pub use error::LoopError;
pub use machine::{Lift, compress, pump};
pub use open::OpenLoop;
pub use recompression::Recompression;
pub use vessel::{Trapped, letdown_left_share, trapped_liquid, vent_kg, void_m3};

use crate::co2::{Equilibrium, Memo, StateError, state_from_enthalpy};
use crate::source::{Source, Standing};

/// First law of a steady stream.
pub const SOURCE: Source = Source::new(
    "first law of steady flow; enthalpies by Span and Wagner, J. Phys. Chem. Ref. Data 25 (1996) 1509",
    Standing::Definition,
);

/// What crosses the boundary of the stream in a leg.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum Kind {
    /// Work of a pump or compressor, into the stream.
    Work,
    /// Heat into the stream.
    Heat,
    /// Heat out of the stream.
    Cooling,
    /// Neither: through a valve the enthalpy stays.
    Throttling,
}

impl Kind {
    /// The word shown.
    ///
    /// ```
    /// assert_eq!(thimbleworth::co2_loop::Kind::Cooling.word(), "cooling");
    /// ```
    #[must_use]
    pub const fn word(self) -> &'static str {
        match self {
            Self::Work => "work",
            Self::Heat => "heat",
            Self::Cooling => "cooling",
            Self::Throttling => "throttling",
        }
    }

    /// Heat into the stream from 0 upwards, cooling below.
    const fn thermal(energy_j_kg: f64) -> Self {
        if energy_j_kg < 0.0 { Self::Cooling } else { Self::Heat }
    }
}

/// A place of the loop, by what fixes its state.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Point {
    /// Its name.
    pub name: &'static str,
    /// Absolute pressure, Pa.
    pub pressure_pa: f64,
    /// Specific enthalpy, J/kg; zero as in [`co2`](crate::co2).
    pub enthalpy_j_kg: f64,
    known: Option<Equilibrium>,
}

impl Point {
    fn at(name: &'static str, state: Equilibrium) -> Self {
        Self { name, pressure_pa: state.pressure_pa, enthalpy_j_kg: state.enthalpy_j_kg, known: Some(state) }
    }

    /// A point of which only pressure and enthalpy are needed for the energies.
    fn of(name: &'static str, pressure_pa: f64, enthalpy_j_kg: f64) -> Self {
        Self { name, pressure_pa, enthalpy_j_kg, known: None }
    }

    /// Temperature, density, entropy and phases there. Solved now where the energies did not need them.
    ///
    /// # Errors
    /// As for [`state_from_enthalpy`].
    ///
    /// ```
    /// use thimbleworth::co2_loop::OpenLoop;
    /// let loop_ = OpenLoop::default().energies().unwrap();
    /// // The pump warms the liquid from 5 °C to 27.5 °C.
    /// let warm = loop_.point("pump out").unwrap().state().unwrap();
    /// assert!((warm.temperature_k - 273.15 - 27.49).abs() < 0.01);
    /// ```
    pub fn state(&self) -> Result<Equilibrium, StateError> {
        self.known.map_or_else(|| state_from_enthalpy(self.enthalpy_j_kg, self.pressure_pa), Ok)
    }
}

/// One change of state.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Leg {
    /// Its name.
    pub name: &'static str,
    /// Index of the point where it starts.
    pub from: usize,
    /// Index of the point where it ends.
    pub to: usize,
    /// What crosses the boundary.
    pub kind: Kind,
    /// Energy into the stream, J/kg; negative for cooling.
    pub energy_j_kg: f64,
    /// For work: what a loss-free machine would need, J/kg.
    pub ideal_j_kg: Option<f64>,
}

/// What a route keeps of carbon dioxide from draw to draw: states met, and room for a loop. Nothing follows from what
/// stands in it.
#[derive(Clone, Debug, Default)]
pub struct Scratch {
    /// States met.
    pub states: Memo,
    /// Room for a loop.
    pub legs: Loop,
}

impl Scratch {
    /// Room for so many calls of a run.
    #[must_use]
    pub fn with_room(calls: usize) -> Self {
        let most = if calls > 0 { 24 } else { 0 };
        let legs = Loop { points: Vec::with_capacity(most), legs: Vec::with_capacity(most), closed: false };
        Self { states: Memo::with_room(calls), legs }
    }
}

/// The points and legs of a loop, open or closed, per kilogram of carbon dioxide passed through.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Loop {
    /// The points in the order of flow.
    pub points: Vec<Point>,
    /// The legs in the order of flow.
    pub legs: Vec<Leg>,
    /// Whether the last leg ends at the first point.
    pub closed: bool,
}

impl Loop {
    /// Empty but for a first point.
    fn begin(&mut self, first: Point) {
        self.points.clear();
        self.legs.clear();
        self.closed = false;
        self.points.push(first);
    }

    fn last(&self) -> usize {
        self.points.len().saturating_sub(1)
    }

    /// A leg of heat or cooling to a new point.
    fn thermal(&mut self, name: &'static str, to: Point) {
        let energy = to.enthalpy_j_kg - self.enthalpy(self.last());
        self.leg(name, to, Kind::thermal(energy), energy, None);
    }

    /// A leg of work to a new point.
    fn work(&mut self, name: &'static str, to: &'static str, lift: &Lift) {
        let end = Point::of(to, lift.pressure_pa, lift.enthalpy_j_kg);
        self.leg(name, end, Kind::Work, lift.work_j_kg, Some(lift.ideal_j_kg));
    }

    fn leg(&mut self, name: &'static str, to: Point, kind: Kind, energy_j_kg: f64, ideal: Option<f64>) {
        let from = self.last();
        self.points.push(to);
        self.legs.push(Leg { name, from, to: self.last(), kind, energy_j_kg, ideal_j_kg: ideal });
    }

    /// Back to the first point by heat or cooling.
    fn close(&mut self, name: &'static str) {
        let from = self.last();
        let energy = self.enthalpy(0) - self.enthalpy(from);
        let kind = Kind::thermal(energy);
        self.legs.push(Leg { name, from, to: 0, kind, energy_j_kg: energy, ideal_j_kg: None });
        self.closed = true;
    }

    fn enthalpy(&self, point: usize) -> f64 {
        self.points.get(point).map_or(f64::NAN, |p| p.enthalpy_j_kg)
    }

    /// The point of that name.
    ///
    /// ```
    /// use thimbleworth::co2_loop::OpenLoop;
    /// assert!(OpenLoop::default().energies().unwrap().point("extractor").is_some());
    /// ```
    #[must_use]
    pub fn point(&self, name: &str) -> Option<&Point> {
        self.points.iter().find(|point| point.name == name)
    }

    /// The leg of that name.
    ///
    /// ```
    /// use thimbleworth::co2_loop::OpenLoop;
    /// let chill = OpenLoop::default().energies().unwrap().leg_named("chill").unwrap().energy_j_kg;
    /// assert!((chill + 44_439.0).abs() < 1.0);
    /// ```
    #[must_use]
    pub fn leg_named(&self, name: &str) -> Option<&Leg> {
        self.legs.iter().find(|leg| leg.name == name)
    }

    /// Sum over the legs of one kind, J/kg; 0 or negative for cooling.
    ///
    /// ```
    /// use thimbleworth::co2_loop::{Kind, OpenLoop};
    /// let work = OpenLoop::default().energies().unwrap().sum_j_kg(Kind::Work);
    /// assert!((work - 36_089.0).abs() < 1.0);
    /// ```
    #[must_use]
    pub fn sum_j_kg(&self, kind: Kind) -> f64 {
        self.legs.iter().filter(|leg| leg.kind == kind).fold(0.0, |sum, leg| sum + leg.energy_j_kg)
    }

    /// What the first law leaves unexplained, J/kg: the sum of the legs less the change of enthalpy from the first point
    /// to the last (0 for a closed loop). Rounding only.
    ///
    /// ```
    /// use thimbleworth::co2_loop::ClosedLoop;
    /// assert!(ClosedLoop::default().energies().unwrap().imbalance_j_kg().abs() < 1e-6);
    /// ```
    #[must_use]
    pub fn imbalance_j_kg(&self) -> f64 {
        let sum = self.legs.iter().fold(0.0, |sum, leg| sum + leg.energy_j_kg);
        let end = if self.closed { 0 } else { self.last() };
        sum - (self.enthalpy(end) - self.enthalpy(0))
    }
}
