//! The plan compiled once: names resolved, amounts read, every number that a route rests on in a slot. The single traced
//! run and the many sampled ones run the same steps over the same slots.

mod amounts;
mod asked;
mod book;
mod climate;
mod declared;
mod materials;
mod money;
mod reader;
mod resolve;
mod room;
mod run;
mod time;
mod waste;
mod work;

pub use asked::asked;
pub use book::{BOOK_RULES, PLACED, PLACED_BY_DEFAULT, PUSHED_OUT, TAKEN_IN};
pub use climate::ClimateUse;
pub use declared::{Fields, ROUTE_FIELDS, SITE_FIELDS};
pub use materials::{MaterialBook, MaterialUse, OWN_FIELDS};
pub use money::{MoneyUse, Price, Removal};
pub use reader::Reader;
pub use resolve::{Resolved, resolve};
pub use room::{ROOM_FIELDS, RoomUse};
pub use run::{Desk, Failure};
pub use time::TimeUse;
pub use waste::{Counted, EVERY_MONTH, Months, OtherWasteUse, SiteWaste, StreamWaste};
pub use work::{Basis, Runs, Work};

use crate::chance::In;
use crate::chance::Input;
use crate::ledger::{BENCH_PLACES, Material, Measured, Nature, Place};
use crate::source::Source;
use crate::step::{Filling, Step, Technique};

/// A plan that can run.
pub struct Program {
    /// What is asked.
    pub title: String,
    /// What draws of uncertain amounts follow from.
    pub seed: u64,
    /// The site as the accounts need it.
    pub site: SiteUse,
    /// The pieces of work.
    pub workloads: Vec<WorkloadProgram>,
}

/// What the accounts need to know of the site.
#[derive(Clone, Debug, PartialEq)]
pub struct SiteUse {
    /// Its name.
    pub name: String,
    /// Under which rules it works: `US`, `EU` or `none`.
    pub rules: String,
    /// The date on which rules are read.
    pub as_of: Option<String>,
    /// The temperature at which solvents are measured out; K.
    pub bench_temperature_k: f64,
    /// The waste streams.
    pub streams: Vec<StreamUse>,
    /// What the waste desk needs to know.
    pub waste: SiteWaste,
    /// The room, where the plan gives its volume and its air changes.
    pub room: Option<RoomUse>,
}

/// A waste stream as the accounts need it.
#[derive(Clone, Debug, PartialEq)]
pub struct StreamUse {
    /// Its name.
    pub name: String,
    /// Whether it holds solids, whose volume follows from the bulk density.
    pub solid: bool,
    /// Size of one container; m³.
    pub container_m3: Option<f64>,
    /// How full a container is when it is closed.
    pub fill: f64,
    /// Bulk density of a solid stream; kg/m³.
    pub bulk_density_kg_m3: f64,
    /// What happens to it on site: `none`, `recycling`, `degradation` or `passivation`.
    pub treatment: String,
    /// What the waste desk needs to know.
    pub waste: StreamWaste,
}

/// One piece of work.
pub struct WorkloadProgram {
    /// Its name.
    pub name: String,
    /// The months in which it is done.
    pub months: Months,
    /// The index of the present route.
    pub present: usize,
    /// The routes.
    pub routes: Vec<RouteProgram>,
}

/// One route, ready to run.
pub struct RouteProgram {
    /// Its name.
    pub name: String,
    /// Its path in the plan.
    pub path: String,
    /// The inputs, one slot each.
    pub inputs: Vec<Input>,
    /// The materials, one index each.
    pub materials: Vec<MaterialUse>,
    /// What the bench knows of each material.
    pub natures: Vec<Nature>,
    /// How much work there is.
    pub work: Work,
    /// What a sample brings: material and mass.
    pub feed: Vec<(Material, In)>,
    /// Before which step the feed is taken in, and where it lies then.
    pub taken_in: Option<(usize, Place)>,
    /// The steps.
    pub steps: Vec<StepProgram>,
    /// Where what is left goes, in the order of [`Place::BENCH`]: the place, and whether the plan says so.
    pub ends: [Option<(Place, bool)>; BENCH_PLACES],
    /// What the plan states of recovery.
    pub recovery: Option<In>,
    /// On what the claim of equal work rests.
    pub equivalence: Option<String>,
    /// By which method, permit or agreement its results may be reported.
    pub permission: Option<String>,
    /// What it takes of instruments and people.
    pub time: TimeUse,
    /// What it costs; `None` where the site says nothing of money.
    pub money: Option<MoneyUse>,
    /// What the account of climate rests on.
    pub climate: ClimateUse,
    /// The lowest and highest pH on the way.
    pub ph: Option<(f64, f64)>,
    /// What was assumed because the plan does not say.
    pub assumptions: Vec<Assumption>,
    /// Where a power could be given and is not, so that the step's electricity is not counted.
    pub uncounted: Vec<String>,
    /// How many streams the site has.
    pub streams: usize,
    pub(crate) filling: Option<Filling>,
}

/// One step of a route, ready to run.
pub struct StepProgram {
    /// Its technique.
    pub technique: &'static Technique,
    /// Its path in the plan.
    pub path: String,
    /// How often it happens.
    pub basis: Basis,
    /// The step itself.
    pub step: Box<dyn Step>,
    /// Measured figures, by rule.
    pub measured: Vec<Option<Measured>>,
    /// Free text of the plan.
    pub note: Option<String>,
}

/// A value that stands in for one that the plan does not give.
#[derive(Clone, Debug, PartialEq)]
pub struct Assumption {
    /// The path at which the plan could say otherwise.
    pub path: String,
    /// What it is.
    pub label: String,
    /// The value, as text.
    pub value: String,
    /// Where it comes from.
    pub source: Source,
}
