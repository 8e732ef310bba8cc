//! The sampled run of a whole plan, in slices.

use super::column::RouteColumns;
use crate::account::{Account, Figure};
use crate::plan::{OwnMaterial, Plan, Site, Workload};

/// So many cells (draws times columns) are kept at most where nothing else is said: 64 MB, or 100,000 draws of 80 figures.
pub const MOST_CELLS: usize = 8_000_000;

/// So many draws of one route are made before another route has its turn.
const TURN: u32 = 500;

/// What is to be drawn.
#[derive(Clone, Copy)]
pub struct Wish<'a> {
    /// How many draws.
    pub draws: u32,
    /// The most cells that may be kept; with more, fewer draws are made.
    pub most_cells: usize,
    /// Of which figures.
    pub wanted: &'a dyn Fn(&Figure) -> bool,
}

/// Draws of every route of a plan, followed through edits: only routes that an edit touches are drawn again.
///
/// A draw is one set of numbers for the whole plan. What routes share (the density of a solvent, the number of results a
/// year) is the same number in each of them, because it has the same identity.
///
/// ```
/// use thimbleworth::account::account_text;
/// use thimbleworth::example::EXAMPLES;
/// use thimbleworth::odds::{MOST_CELLS, Sampled, Wish, headline};
/// let account = account_text(EXAMPLES[0].text);
/// let mut sampled = Sampled::default();
/// sampled.follow(&account, Wish { draws: 500, most_cells: MOST_CELLS, wanted: &headline });
/// while sampled.advance(&account, 300) > 0 {}
/// let waste = sampled.route(0, 0).unwrap().summary("waste.total.mass", 0.95).unwrap();
/// assert!(waste.symmetric.low < waste.mean && waste.mean < waste.symmetric.high);
/// ```
#[derive(Default)]
pub struct Sampled {
    seed: u64,
    asked: u32,
    draws: u32,
    generation: u64,
    site: Site,
    materials: Vec<OwnMaterial>,
    works: Vec<WorkSampled>,
}

struct WorkSampled {
    /// The workload without its routes and without which of them is the present one.
    header: Workload,
    routes: Vec<Option<RouteColumns>>,
}

impl Sampled {
    /// Turns to the plan of this account. Columns of routes that are as they were are kept; the others begin anew.
    ///
    /// Where the plan has an error nothing is kept or begun. Returns the generation: a slice that was ordered for an
    /// earlier one need not be run.
    pub fn follow(&mut self, account: &Account, wish: Wish<'_>) -> u64 {
        self.generation += 1;
        let (Some(plan), Some(program)) = (&account.plan, &account.program) else {
            self.works.clear();
            return self.generation;
        };
        let same_ground =
            self.seed == program.seed && self.site == plan.site && self.materials == plan.materials;
        let old = std::mem::take(&mut self.works);
        let mut columns = 0;
        for (w, work) in program.workloads.iter().enumerate() {
            let header = header(plan, w);
            // By name: a workload that has moved is the same one.
            let known = old.iter().find(|o| same_ground && o.header == header);
            let mut routes = Vec::new();
            for (r, route) in work.routes.iter().enumerate() {
                let doc = plan.workloads.get(w).and_then(|w| w.routes.get(r));
                let found = account.workloads.get(w).and_then(|w| w.routes.get(r)).and_then(Option::as_ref);
                let fresh = doc.zip(found).map(|(doc, found)| {
                    let fresh = RouteColumns::new(doc, route, found, wish.wanted);
                    columns += fresh.width();
                    let mut kept = known.into_iter().flat_map(|k| &k.routes).flatten();
                    kept.find(|k| k.serves(&fresh)).cloned().unwrap_or(fresh)
                });
                routes.push(fresh);
            }
            self.works.push(WorkSampled { header, routes });
        }
        self.seed = program.seed;
        self.site.clone_from(&plan.site);
        self.materials.clone_from(&plan.materials);
        self.asked = wish.draws;
        let most = wish.most_cells / if columns > 0 { columns } else { 1 };
        let most = u32::try_from(most).unwrap_or(u32::MAX);
        self.draws = if wish.draws < most { wish.draws } else { most };
        for route in self.works.iter_mut().flat_map(|w| &mut w.routes).flatten() {
            route.at_most(self.draws);
        }
        self.generation
    }

    /// Runs at most so many draws of routes, those of the route that is furthest behind first, so that all routes can be
    /// read long before the last draw. Returns how many are still to be run. `account` is the one that was followed last.
    pub fn advance(&mut self, account: &Account, budget: u32) -> u64 {
        let mut left = budget;
        let Some(program) = &account.program else { return 0 };
        while left > 0 {
            let mut behind: Option<(usize, usize, u32)> = None;
            for (w, work) in self.works.iter().enumerate() {
                for (r, columns) in work.routes.iter().enumerate() {
                    let Some(columns) = columns else { continue };
                    let done = columns.done();
                    if done < self.draws && behind.is_none_or(|(_, _, least)| done < least) {
                        behind = Some((w, r, done));
                    }
                }
            }
            let Some((w, r, done)) = behind else { break };
            let route = program.workloads.get(w).and_then(|w| w.routes.get(r));
            let found = account.workloads.get(w).and_then(|w| w.routes.get(r)).and_then(Option::as_ref);
            let columns = self.works.get_mut(w).and_then(|w| w.routes.get_mut(r)).and_then(Option::as_mut);
            let (Some(route), Some(found), Some(columns)) = (route, found, columns) else { break };
            let mut now = self.draws - done;
            for most in [left, TURN] {
                now = if now < most { now } else { most };
            }
            columns.run(route, found, self.seed, now);
            left -= now;
        }
        self.remaining()
    }

    /// How many draws of routes are still to be run.
    #[must_use]
    pub fn remaining(&self) -> u64 {
        let mut sum = 0;
        for route in self.works.iter().flat_map(|w| &w.routes).flatten() {
            sum += u64::from(self.draws - route.done());
        }
        sum
    }

    /// The columns of a route.
    #[must_use]
    pub fn route(&self, workload: usize, route: usize) -> Option<&RouteColumns> {
        self.works.get(workload)?.routes.get(route)?.as_ref()
    }

    /// What the draws follow from.
    #[must_use]
    pub const fn seed(&self) -> u64 {
        self.seed
    }

    /// How many draws each route gets.
    #[must_use]
    pub const fn draws(&self) -> u32 {
        self.draws
    }

    /// How many were asked for; more than [`Sampled::draws`] where they would have needed too many cells.
    #[must_use]
    pub const fn asked(&self) -> u32 {
        self.asked
    }

    /// How many draws every route has.
    #[must_use]
    pub fn done(&self) -> u32 {
        let routes = self.works.iter().flat_map(|w| &w.routes).flatten();
        routes.map(RouteColumns::done).min().unwrap_or(0)
    }

    /// The count of plans followed.
    #[must_use]
    pub const fn generation(&self) -> u64 {
        self.generation
    }
}

fn header(plan: &Plan, workload: usize) -> Workload {
    plan.workloads.get(workload).map_or_else(Workload::default, |w| Workload {
        name: w.name.clone(),
        results_per_year: w.results_per_year.clone(),
        batch_samples: w.batch_samples.clone(),
        batch_controls: w.batch_controls.clone(),
        repeats: w.repeats.clone(),
        repeats_bring_controls: w.repeats_bring_controls,
        controls_carry_feed: w.controls_carry_feed,
        feed: w.feed.clone(),
        ..Workload::default()
    })
}
