//! Where a case turns: the number of results and the price at which nothing is gained or lost.

use super::switch::switch;
use crate::account::{Account, RouteAccount, evaluate};
use crate::chance::Draw;
use crate::money::Investment;
use crate::program::RouteProgram;

/// The number of results a year at which the net present value is nothing.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Turn {
    /// It gains from this number on.
    From(f64),
    /// It gains up to this number.
    UpTo(f64),
    /// It gains at every number looked at.
    Always,
    /// It gains at none.
    Never,
}

/// The price at which the net present value is nothing.
#[derive(Clone, Debug, PartialEq)]
pub struct PriceTurn {
    /// The path of the price.
    pub identity: String,
    /// What was written.
    pub written: String,
    /// The central value; SI.
    pub central_si: f64,
    /// The price over the central one at which the case turns.
    pub over_central: f64,
}

/// Numbers of results looked at reach from one to so many times the plan's own.
const REACH: f64 = 100.0;

/// Both routes, run again with other numbers.
struct Again<'a> {
    routes: [(&'a RouteProgram, &'a RouteAccount); 2],
    investment: Investment,
}

impl<'a> Again<'a> {
    fn new(account: &'a Account, workload: usize, route: usize) -> Option<Self> {
        let investment = switch(account, workload, route).ok()?.investment;
        let work = account.program.as_ref()?.workloads.get(workload)?;
        let accounts = &account.workloads.get(workload)?.routes;
        let at = |i: usize| Some((work.routes.get(i)?, accounts.get(i)?.as_ref()?));
        Some(Self { routes: [at(work.present)?, at(route)?], investment })
    }

    /// The net present value with one input at another value.
    fn value(&self, key: u64, value_si: f64) -> Option<f64> {
        let mut found = [[0.0; 3]; 2];
        for ((route, account), out) in self.routes.iter().zip(&mut found) {
            let mut x = route.central();
            for (slot, input) in x.iter_mut().zip(&route.inputs) {
                if input.key == key {
                    *slot = value_si;
                }
            }
            let mut desk = route.desk();
            route.run(Draw(&x), &mut desk, None).ok()?;
            let mut values = vec![0.0; account.figures.len()];
            evaluate(&account.figures, &desk, Draw(&x), &mut values);
            for (slot, id) in out.iter_mut().zip(super::NEEDED) {
                *slot = account.figures.iter().position(|f| f.id == id).map_or(0.0, |i| values[i]);
            }
        }
        let [[before, ..], [after, paid, residual]] = found;
        let again = Investment { paid, residual, saved_a_year: before - after, ..self.investment };
        Some(again.net_present_value()).filter(|v| v.is_finite())
    }
}

/// The number of results a year at which the case turns, from one result to a hundred times the plan's own. Instruments and
/// containers come in whole numbers, so that it may turn more than once; told is the last turn below the plan's number
/// where it gains there, else the first one above. `None` where there is no case.
#[must_use]
pub fn turning_results(account: &Account, workload: usize, route: usize) -> Option<Turn> {
    let again = Again::new(account, workload, route)?;
    let (program, found) = again.routes[0];
    let key = program.inputs.get(program.work.results.0 as usize)?.key;
    let here = found.runs.results;
    let gains = |results: f64| again.value(key, results).is_some_and(|v| v >= 0.0);
    const STEPS: u32 = 240;
    let (low, high) = (1.0, here * REACH);
    let at = |i: u32| low * libm::pow(high / low, f64::from(i) / f64::from(STEPS));
    // The neighbour of `from` at which it no longer is as it is there.
    let edge = |mut same: f64, mut other: f64| {
        let kind = gains(same);
        for _ in 0..60 {
            let middle = 0.5 * (same + other);
            if gains(middle) == kind {
                same = middle;
            } else {
                other = middle;
            }
        }
        0.5 * (same + other)
    };
    let gains_here = gains(here);
    // Downwards where it gains: from how many results on?
    let mut same = here;
    for i in (0..=STEPS).rev().map(at).filter(|n| *n < here) {
        if gains(i) != gains_here {
            let turn = edge(same, i);
            return Some(if gains_here { Turn::From(turn) } else { Turn::UpTo(turn) });
        }
        same = i;
    }
    same = here;
    for i in (0..=STEPS).map(at).filter(|n| *n > here) {
        if gains(i) != gains_here {
            let turn = edge(same, i);
            return Some(if gains_here { Turn::UpTo(turn) } else { Turn::From(turn) });
        }
        same = i;
    }
    Some(if gains_here { Turn::Always } else { Turn::Never })
}

/// The prices at which the case turns, those first that need the smallest change; only where a price above nothing turns
/// it. A price enters in proportion, so that two runs tell; a third confirms it.
#[must_use]
pub fn turning_prices(account: &Account, workload: usize, route: usize) -> Vec<PriceTurn> {
    let Some(again) = Again::new(account, workload, route) else { return Vec::new() };
    let mut out: Vec<PriceTurn> = Vec::new();
    let mut seen = Vec::new();
    for input in again.routes.iter().flat_map(|(route, _)| &route.inputs) {
        let priced = input.kind.is_money();
        if !priced || input.central_si == 0.0 || seen.contains(&input.key) {
            continue;
        }
        seen.push(input.key);
        let at = |over: f64| again.value(input.key, input.central_si * over);
        let (Some(none), Some(here)) = (at(0.0), at(1.0)) else { continue };
        // V(p) = V(0) + p (V(1) − V(0))
        let over_central = -none / (here - none);
        if !(over_central.is_finite() && over_central > 0.0) {
            continue;
        }
        let size = if none.abs() > here.abs() { none.abs() } else { here.abs() };
        if at(over_central).is_some_and(|v| v.abs() < 1e-6 * size) {
            out.push(PriceTurn {
                identity: input.identity.clone(),
                written: input.basis.clone(),
                central_si: input.central_si,
                over_central,
            });
        }
    }
    out.sort_by(|a, b| libm::log(a.over_central).abs().total_cmp(&libm::log(b.over_central).abs()));
    out
}
