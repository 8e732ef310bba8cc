//! What the plan's routes post for the work that was really done, with the spread of its inputs.

use super::{Done, LogRoute, Names};
use crate::chance::Draw;
use crate::ledger::{Direction, Material, Place};
use crate::program::{Desk, Program, RouteProgram};

/// Draws from which the spread is taken: enough to know it to a fourteenth part, 1/√(2 · 100).
const DRAWS: u64 = 100;
const SEED: u64 = 1;

/// The accounts into which the plan's postings of one material are sorted.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum Posted {
    /// Drawn from the store and not returned.
    Drawn,
    /// Returned to the store: used again.
    Reused,
    /// Air taken by the hood.
    Hood,
    /// Air of the room.
    Room,
    /// Down the drain.
    Drain,
    /// In the product.
    Product,
    /// In what is sold beside it.
    ByProduct,
    /// Destroyed on site.
    Destroyed,
    /// Kept in apparatus.
    Held,
    /// Off site, outside of the streams.
    Elsewhere,
    /// Brought in by the samples.
    Fed,
    /// In the waste streams.
    Streams,
    /// All that left other than in streams, less what samples brought: what bought solvent must also cover.
    Lost,
}

impl Posted {
    /// How many there are.
    pub const COUNT: usize = 13;
}

/// A mean with the sum of squared deviations: Welford's running form.
#[derive(Clone, Copy, Debug, Default)]
struct Run {
    central: f64,
    count: f64,
    mean: f64,
    squares: f64,
}

impl Run {
    fn take(&mut self, value: f64) {
        self.count += 1.0;
        // M ← M + (x − M)/n; S ← S + (x − M_old)(x − M_new)
        let from = value - self.mean;
        self.mean += from / self.count;
        self.squares += from * (value - self.mean);
    }

    /// The central value and its standard uncertainty.
    fn told(&self) -> (f64, f64) {
        let u = if self.count > 1.0 { libm::sqrt(self.squares / (self.count - 1.0)) } else { 0.0 };
        (self.central, u)
    }
}

/// What was posted in one period.
pub(super) struct PeriodPostings {
    materials: usize,
    /// By material, then by account.
    runs: Vec<Run>,
    /// By stream, then by material: the material's share of all that went into the stream.
    shares: Vec<Run>,
}

impl PeriodPostings {
    /// kg and standard uncertainty.
    pub(super) fn of(&self, material: usize, account: Posted) -> (f64, f64) {
        self.runs.get(material * Posted::COUNT + account as usize).map_or((0.0, 0.0), Run::told)
    }

    /// The share of a stream that is this material, and its standard uncertainty; 0 where nothing is posted.
    pub(super) fn share(&self, stream: usize, material: usize) -> (f64, f64) {
        self.shares.get(stream * self.materials + material).map_or((0.0, 0.0), Run::told)
    }

    pub(super) fn has_stream(&self, stream: usize) -> bool {
        (0..self.materials).any(|m| self.share(stream, m).0 > 0.0)
    }
}

/// One route of the plan with its desk and the materials of [`Names`] that its own stand for.
struct Route {
    workload: usize,
    route: usize,
    desk: Desk,
    x: Vec<f64>,
    index: Vec<usize>,
}

/// How much of a route was done in a period.
pub(super) enum Work {
    /// As the log has it, in so many years.
    Logged(Done, f64),
    /// As the plan says, in so many years.
    Planned(f64),
}

/// What the routes of a plan post in several periods and in all of them together, draw by draw, so that no caller has to
/// wait for all of them.
pub(super) struct Postings {
    materials: usize,
    streams: usize,
    routes: Vec<Option<Route>>,
    work: Vec<Vec<(u16, Work)>>,
    draw: u64,
    /// The postings of each period, then those of all.
    pub(super) periods: Vec<PeriodPostings>,
    /// Routes that cannot run, by their index.
    pub(super) stopped: Vec<u16>,
}

impl Postings {
    /// `work` says for each period how much of each route (an index of [`Names::routes`]) was done.
    pub(super) fn begin(program: &Program, names: &mut Names, work: Vec<Vec<(u16, Work)>>) -> Self {
        let mut routes: Vec<Option<Route>> = Vec::new();
        for i in 0..names.routes.len() {
            let LogRoute { workload, route, .. } = names.routes[i];
            let found = program.workloads.get(workload).and_then(|w| w.routes.get(route));
            routes.push(found.map(|program| Route {
                workload,
                route,
                index: program.materials.iter().map(|m| usize::from(names.add(&m.substance))).collect(),
                desk: program.desk(),
                x: Vec::new(),
            }));
        }
        let (materials, streams) = (names.materials.len(), names.streams.len());
        let empty = || PeriodPostings {
            materials,
            runs: vec![Run::default(); materials * Posted::COUNT],
            shares: vec![Run::default(); materials * streams],
        };
        let periods = (0..=work.len()).map(|_| empty()).collect();
        Self { materials, streams, routes, work, draw: 0, periods, stopped: Vec::new() }
    }

    /// The next draw; `true` once there is none left.
    pub(super) fn step(&mut self, program: &Program) -> bool {
        let (materials, streams, draw) = (self.materials, self.streams, self.draw);
        if draw > DRAWS {
            return true;
        }
        let cells = materials * Posted::COUNT + materials * streams;
        // The last row is for all periods together.
        let mut all = vec![0.0; cells];
        for (period, done) in self.work.iter().enumerate() {
            let mut here = vec![0.0; cells];
            for (place, work) in done {
                let Some(Some(route)) = self.routes.get_mut(usize::from(*place)) else { continue };
                match route.run(program, draw, work) {
                    Some(years) => route.add(years, &mut here, materials, streams),
                    None if draw == 0 && !self.stopped.contains(place) => self.stopped.push(*place),
                    None => {}
                }
            }
            for (sum, part) in all.iter_mut().zip(&here) {
                *sum += part;
            }
            if let Some(period) = self.periods.get_mut(period) {
                period.take(draw, &here, streams);
            }
        }
        if let Some(last) = self.periods.last_mut() {
            last.take(draw, &all, streams);
        }
        self.draw += 1;
        self.draw > DRAWS
    }

    /// How many periods there are beside the whole.
    pub(super) fn count(&self) -> usize {
        self.work.len()
    }
}

impl PeriodPostings {
    fn take(&mut self, draw: u64, sums: &[f64], streams: usize) {
        let put = |run: &mut Run, value: f64| {
            if draw == 0 {
                run.central = value;
            } else {
                run.take(value);
            }
        };
        for (run, value) in self.runs.iter_mut().zip(sums) {
            put(run, *value);
        }
        let masses = sums.get(self.materials * Posted::COUNT..).unwrap_or_default();
        for stream in 0..streams {
            let range = stream * self.materials..(stream + 1) * self.materials;
            let Some(here) = masses.get(range.clone()) else { continue };
            let whole = here.iter().fold(0.0, |sum, kg| sum + kg);
            for (run, kg) in self.shares.get_mut(range).unwrap_or_default().iter_mut().zip(here) {
                put(run, if whole > 0.0 { kg / whole } else { 0.0 });
            }
        }
    }
}

impl Route {
    /// Runs one draw; the years of work for which its yearly figures stand, or `None` where it stops.
    fn run(&mut self, program: &Program, draw: u64, work: &Work) -> Option<f64> {
        let program = program.workloads.get(self.workload)?.routes.get(self.route)?;
        if draw == 0 || self.x.is_empty() {
            self.x = program.central();
        }
        if draw > 0 {
            program.draw_into(SEED, draw, &mut self.x);
        }
        let years = match work {
            Work::Planned(years) => *years,
            Work::Logged(done, years) => {
                self.as_logged(program, done, *years)?;
                *years
            }
        };
        program.run(Draw(&self.x), &mut self.desk, None).ok()?;
        Some(years)
    }

    /// Puts the logged work in place of the plan's, as a rate a year. Repeats are extractions like others: they stand
    /// in the log.
    fn as_logged(&mut self, program: &RouteProgram, done: &Done, years: f64) -> Option<()> {
        let work = program.work;
        let get = |x: &[f64], slot: crate::chance::In| x.get(slot.0 as usize).copied();
        let (samples, controls) = (get(&self.x, work.batch_samples)?, get(&self.x, work.batch_controls)?);
        let extractions = done.extractions / years;
        // Where no row is a control, or every one is, the log does not tell them apart, and the plan does.
        let told = done.controls > 0.0 && done.controls < done.extractions;
        let share = if told { done.controls / done.extractions } else { controls / (samples + controls) };
        let batches =
            if done.batches > 0 { done.batches as f64 / years } else { extractions / (samples + controls) };
        let mut put = |slot: crate::chance::In, value: f64| {
            if let Some(x) = self.x.get_mut(slot.0 as usize) {
                *x = value;
            }
        };
        // S = E (1 − c), n = S/B, c = E c/B
        put(work.results, extractions * (1.0 - share));
        put(work.repeats, 0.0);
        put(work.batch_samples, extractions * (1.0 - share) / batches);
        put(work.batch_controls, extractions * share / batches);
        Some(())
    }

    fn add(&self, years: f64, sums: &mut [f64], materials: usize, streams: usize) {
        const PLACES: [(Posted, Place); 8] = [
            (Posted::Hood, Place::HOOD),
            (Posted::Room, Place::ROOM),
            (Posted::Drain, Place::DRAIN),
            (Posted::Product, Place::PRODUCT),
            (Posted::ByProduct, Place::BY_PRODUCT),
            (Posted::Destroyed, Place::DESTROYED),
            (Posted::Held, Place::HELD),
            (Posted::Elsewhere, Place::ELSEWHERE),
        ];
        for (i, &material) in self.index.iter().enumerate() {
            let Ok(m) = u16::try_from(i).map(Material) else { return };
            let into = |place| self.desk.cells.passed(place, Direction::Into, m) * years;
            let out_of = |place| self.desk.cells.passed(place, Direction::OutOf, m) * years;
            let mut add = |account: Posted, kg: f64| {
                if let Some(sum) = sums.get_mut(material * Posted::COUNT + account as usize) {
                    *sum += kg;
                }
            };
            add(Posted::Drawn, out_of(Place::STORE) - into(Place::STORE));
            add(Posted::Reused, into(Place::STORE));
            add(Posted::Fed, out_of(Place::FEED));
            let mut lost = -out_of(Place::FEED);
            for (account, place) in PLACES {
                let kg = into(place) - out_of(place);
                add(account, kg);
                lost += kg;
            }
            add(Posted::Lost, lost);
            let mut all = 0.0;
            for stream in 0..streams {
                let Some(place) = Place::stream(stream) else { continue };
                let kg = into(place) - out_of(place);
                all += kg;
                if let Some(sum) = sums.get_mut(materials * Posted::COUNT + stream * materials + material) {
                    *sum += kg;
                }
            }
            if let Some(sum) = sums.get_mut(material * Posted::COUNT + Posted::Streams as usize) {
                *sum += all;
            }
        }
    }
}
