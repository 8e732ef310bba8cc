//! The mix of routes, one a workload, that lowers a chosen figure most for what it costs.
//!
//! Figure and cost of a site are the sums over its workloads, so that mixes are joined workload by workload, and of each join
//! only those are kept that no other beats in both: nothing better is lost.

use super::{not_ranked, switch};
use crate::account::{Account, Figure, Measure, Pouring, Standing, classified};
use crate::compare::absent_is_zero;
use crate::money::Investment;
use crate::program::Program;
use crate::quantity::Currency;

/// The figure that counts every stream that is hazardous or waits for a test; no account has it, because codes hang on
/// whole streams.
pub const HAZARDOUS_WASTE: &str = "waste.hazardous";

/// Mixes kept of a join; with more of them, those that lower the figure by less than this part of its range are left out.
const MOST: usize = 2000;

/// What holds the cost.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub enum Bound {
    /// Nothing: the figure as low as it goes, by the cheapest mix that does so.
    #[default]
    None,
    /// So much more a year than the present routes at most; below zero, so much has to be saved.
    Budget(f64),
    /// So much is paid for each unit (as results are written: kg, kWh) that is not there.
    Price(f64),
}

/// One mix.
#[derive(Clone, Debug, PartialEq)]
pub struct Mix {
    /// The index of the route of each workload; `None` where it has no account of the figure.
    pub routes: Vec<Option<usize>>,
    /// The figure over all workloads; SI, a year.
    pub figure: f64,
    /// Cost a year.
    pub cost: f64,
}

/// A route that is in no mix.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct LeftOut {
    /// The index of the workload.
    pub workload: usize,
    /// The index of the route.
    pub route: usize,
    /// Why.
    pub why: Vec<String>,
}

/// The mixes of a site.
#[derive(Clone, Debug, PartialEq)]
pub struct Mixes {
    /// The figure's title.
    pub title: String,
    /// What it measures.
    pub measure: Measure,
    /// In which money cost is counted; `None` where cost is not known, and then it is nothing everywhere.
    pub currency: Option<Currency>,
    /// The present routes.
    pub present: Mix,
    /// Every mix that no other beats in both, cheapest first.
    pub front: Vec<Mix>,
    /// The one of them that is sought; `None` where none keeps within the budget.
    pub chosen: Option<usize>,
    /// Whether mixes that differ by little were left out of `front`.
    pub thinned: bool,
    /// Routes that are in none of them.
    pub left_out: Vec<LeftOut>,
    /// What the cost does not hold, and where the figure of a mix differs from the sum over its routes, in sentences without a full stop.
    pub doubts: Vec<String>,
}

/// One route of a workload.
struct Choice {
    route: usize,
    figure: f64,
    cost: f64,
}

/// One mix of the workloads so far.
#[derive(Clone, Copy)]
struct Point {
    figure: f64,
    cost: f64,
    from: u32,
    route: u32,
}

/// Seeks the mix of routes with the least of a figure under a bound on its cost.
///
/// Cost is the running cost of a year and what is paid once, spread over the years of the site at its rate where both are
/// stated. A route that is not ranked (nothing says that its work is equal, or may be reported) is in no mix.
///
/// ```
/// use thimbleworth::{account::account_text, case::{Bound, mixes}, example::EXAMPLES};
/// let account = account_text(EXAMPLES[0].text);
/// let found = mixes(&account, "waste.total.mass", Bound::None).unwrap();
/// assert!(found.front[found.chosen.unwrap()].figure <= found.present.figure);
/// assert!(mixes(&account, "waste.totl.mass", Bound::None).is_err());
/// ```
///
/// # Errors
/// What stands in the way, a sentence without a full stop.
pub fn mixes(account: &Account, id: &str, bound: Bound) -> Result<Mixes, String> {
    let program = account.program.as_ref().ok_or("the plan has no program")?;
    let (title, measure) = figure_of(account, id)?;
    let mut doubts = Vec::new();
    let currency = currency(account, program, &mut doubts);
    if currency.is_none() && bound != Bound::None {
        return Err(["the cost is not known: ", &doubts.join("; ")].concat());
    }
    let mut left_out = Vec::new();
    let mut stages: Vec<Vec<Point>> = Vec::new();
    let mut present = Mix { routes: Vec::new(), figure: 0.0, cost: 0.0 };
    let mut thinned = false;
    let mut front = vec![Point { figure: 0.0, cost: 0.0, from: 0, route: u32::MAX }];
    for (w, work) in program.workloads.iter().enumerate() {
        let mut choices: Vec<Choice> = Vec::new();
        if let Some(figure) = value(account, program, w, work.present, id) {
            let cost = cost(account, w, work.present, currency).unwrap_or(0.0);
            present.figure += figure;
            present.cost += cost;
            choices.push(Choice { route: work.present, figure, cost });
        }
        present.routes.push(choices.first().map(|c| c.route));
        for (r, route) in work.routes.iter().enumerate().filter(|(r, _)| *r != work.present) {
            let mut why = not_ranked(route);
            let (figure, cost) = (value(account, program, w, r, id), cost(account, w, r, currency));
            if figure.is_none() {
                why.push(["the figure of ", &route.name, " is not known"].concat());
            }
            if cost.is_none() {
                why.push(["the running cost of ", &route.name, " is not known"].concat());
            }
            match (figure, cost) {
                (Some(figure), Some(cost)) if why.is_empty() && !choices.is_empty() => {
                    once_left_out(account, w, r, currency, &mut doubts);
                    choices.push(Choice { route: r, figure, cost });
                }
                _ => left_out.push(LeftOut { workload: w, route: r, why }),
            }
        }
        let joined = if choices.is_empty() {
            (0..).zip(&front).map(|(from, p)| Point { from, route: u32::MAX, ..*p }).collect()
        } else {
            join(&front, &choices)
        };
        let kept = thin(&joined);
        thinned |= kept.len() < joined.len();
        stages.push(kept.clone());
        front = kept;
    }
    let found: Vec<Mix> = (0..front.len()).map(|at| followed(&stages, at)).collect();
    let unit = measure.written().1;
    let within = 1e-9 * present.cost.abs();
    let chosen = match bound {
        Bound::None => found.len().checked_sub(1),
        Bound::Budget(more) => found.iter().rposition(|m| m.cost <= present.cost + more + within),
        Bound::Price(price) => {
            // least of C + p x
            let whole = |m: &Mix| m.cost + price * m.figure * unit;
            (0..found.len())
                .reduce(|best, at| if whole(&found[at]) < whole(&found[best]) { at } else { best })
        }
    };
    if id == HAZARDOUS_WASTE {
        let sought = chosen.and_then(|at| found.get(at)).filter(|m| m.routes != present.routes);
        for (mix, what) in [(Some(&present), "the present routes"), (sought, "the mix that is sought")] {
            let Some(mix) = mix else { continue };
            let whole = hazardous_kg(&poured(account, program, &mix.routes), program);
            if (whole - mix.figure).abs() > 1e-9 * (whole + mix.figure) {
                let (whole, sum) = (measure.shown(whole), measure.shown(mix.figure));
                doubts.push(
                    [
                        "codes hang on whole streams, and ",
                        what,
                        " pour into the same ones: classified together, ",
                        &whole,
                        " a year are hazardous or wait for a test, not the sum of ",
                        &sum,
                    ]
                    .concat(),
                );
            }
        }
    }
    Ok(Mixes { title, measure, currency, present, front: found, chosen, thinned, left_out, doubts })
}

/// Title and measure of a figure that grows with the work.
fn figure_of(account: &Account, id: &str) -> Result<(String, Measure), String> {
    if id == HAZARDOUS_WASTE {
        return Ok(("hazardous waste, with what waits for a test".to_owned(), Measure::Mass));
    }
    let figures =
        || account.workloads.iter().flat_map(|w| w.routes.iter().flatten()).flat_map(|r| &r.figures);
    match figures().find(|f| f.id == id) {
        Some(figure) if figure.measure.extensive() => Ok((figure.title.clone(), figure.measure)),
        Some(figure) => {
            Err([&figure.title, " does not add up over workloads; name a figure that grows with the work"]
                .concat())
        }
        None => {
            let mut ids = vec![HAZARDOUS_WASTE];
            for figure in figures().filter(|f| f.measure.extensive()) {
                if !ids.contains(&&*figure.id) {
                    ids.push(&figure.id);
                }
            }
            Err(["no route has a figure \"", id, "\"; there are: ", &ids.join(", ")].concat())
        }
    }
}

/// The figure of one route; `None` where it has none and that is not zero.
fn value(account: &Account, program: &Program, w: usize, r: usize, id: &str) -> Option<f64> {
    let work = account.workloads.get(w)?;
    let (own, route) = (work.routes.get(r)?.as_ref()?, program.workloads.get(w)?.routes.get(r)?);
    if id == HAZARDOUS_WASTE {
        return Some(hazardous_kg(&[Pouring { route, account: own }], program));
    }
    own.value(id).or_else(|| {
        let known = |f: &&Figure| f.id == id;
        let figure = account
            .workloads
            .iter()
            .flat_map(|w| w.routes.iter().flatten())
            .flat_map(|r| &r.figures)
            .find(known)?;
        absent_is_zero(route, figure).then_some(0.0)
    })
}

/// What is hazardous or waits for a test of all that these routes pour; kg a year.
fn hazardous_kg(routes: &[Pouring<'_>], program: &Program) -> f64 {
    let mut kg = 0.0;
    for s in classified(routes, &program.site) {
        if s.standing() != Standing::NotKnownHazardous {
            kg += s.contents.mass_kg();
        }
    }
    kg
}

/// The routes of a mix with their accounts.
fn poured<'a>(account: &'a Account, program: &'a Program, routes: &[Option<usize>]) -> Vec<Pouring<'a>> {
    let mut out = Vec::new();
    for ((work, own), r) in program.workloads.iter().zip(&account.workloads).zip(routes) {
        let Some(r) = *r else { continue };
        if let (Some(route), Some(Some(account))) = (work.routes.get(r), own.routes.get(r)) {
            out.push(Pouring { route, account });
        }
    }
    out
}

/// The money of the site, where the running cost of every present route is known.
fn currency(account: &Account, program: &Program, doubts: &mut Vec<String>) -> Option<Currency> {
    let mut out = None;
    for (work, own) in program.workloads.iter().zip(&account.workloads) {
        let (Some(route), Some(Some(own))) = (work.routes.get(work.present), own.routes.get(work.present))
        else {
            continue;
        };
        let Some(money) = &route.money else {
            doubts.push("the site names no prices (site.money)".to_owned());
            return None;
        };
        if own.value("cost.year").is_none() {
            let open: Vec<&str> = own.open.iter().map(|(what, _)| what.as_str()).collect();
            doubts.push(["of ", &route.name, " are not known ", &open.join(", ")].concat());
            return None;
        }
        out = Some(money.currency);
    }
    out
}

/// What a route costs a year: its running cost, and what is paid once for it, spread over the years.
fn cost(account: &Account, w: usize, r: usize, currency: Option<Currency>) -> Option<f64> {
    if currency.is_none() {
        return Some(0.0);
    }
    let own = account.workloads.get(w)?.routes.get(r)?.as_ref()?;
    let running = own.value("cost.year")?;
    let present = account.program.as_ref()?.workloads.get(w)?.present;
    let once =
        if r == present { 0.0 } else { switch(account, w, r).map_or(0.0, |s| once_a_year(&s.investment)) };
    Some(running + once)
}

/// What is paid once as equal sums at the end of each year: (I − S/(1 + d)ⁿ) / Σ 1/(1 + d)ᵏ.
fn once_a_year(investment: &Investment) -> f64 {
    let one = Investment { paid: 0.0, saved_a_year: 1.0, residual: 0.0, ..*investment };
    let paid = Investment { saved_a_year: 0.0, ..*investment };
    let years = one.net_present_value();
    if years > 0.0 { -paid.net_present_value() / years } else { 0.0 }
}

/// Says where what is paid once could not be counted.
fn once_left_out(
    account: &Account,
    w: usize,
    r: usize,
    currency: Option<Currency>,
    doubts: &mut Vec<String>,
) {
    if let (Some(_), Err(lacking)) = (currency, switch(account, w, r)) {
        let doubt = ["what is paid once is not counted: not known are ", &lacking.join("; ")].concat();
        if !doubts.contains(&doubt) {
            doubts.push(doubt);
        }
    }
}

/// Every mix with one more workload that no other beats, cheapest first.
fn join(front: &[Point], choices: &[Choice]) -> Vec<Point> {
    let mut next = vec![0_usize; choices.len()];
    let mut out: Vec<Point> = Vec::new();
    loop {
        // The cheapest of the heads of as many ordered lists as there are routes; of equals the one with less, then the first.
        let mut best: Option<(usize, Point)> = None;
        for (i, (choice, at)) in choices.iter().zip(&next).enumerate() {
            let Some(head) = front.get(*at) else { continue };
            let point = Point {
                figure: head.figure + choice.figure,
                cost: head.cost + choice.cost,
                from: u32::try_from(*at).unwrap_or(u32::MAX),
                route: u32::try_from(choice.route).unwrap_or(u32::MAX),
            };
            if best.is_none_or(|(_, b)| (point.cost, point.figure) < (b.cost, b.figure)) {
                best = Some((i, point));
            }
        }
        let Some((i, point)) = best else { return out };
        if let Some(at) = next.get_mut(i) {
            *at += 1;
        }
        if out.last().is_none_or(|last| point.figure < last.figure) {
            out.push(point);
        }
    }
}

/// As many of them as can be kept.
fn thin(front: &[Point]) -> Vec<Point> {
    let (Some(first), Some(last)) = (front.first(), front.last()) else { return Vec::new() };
    if front.len() <= MOST {
        return front.to_vec();
    }
    let least = (first.figure - last.figure) / MOST as f64;
    let mut out = vec![*first];
    let mut before = first.figure;
    for (i, point) in front.iter().enumerate().skip(1) {
        if before - point.figure >= least || i + 1 == front.len() {
            out.push(*point);
            before = point.figure;
        }
    }
    out
}

/// The routes of a mix, followed back through the joins.
fn followed(stages: &[Vec<Point>], at: usize) -> Mix {
    let mut at = at;
    let mut out = Mix { routes: vec![None; stages.len()], figure: 0.0, cost: 0.0 };
    for (w, stage) in stages.iter().enumerate().rev() {
        let Some(point) = stage.get(at) else { break };
        if w + 1 == stages.len() {
            (out.figure, out.cost) = (point.figure, point.cost);
        }
        if let Some(slot) = out.routes.get_mut(w) {
            *slot = (point.route != u32::MAX).then_some(point.route as usize);
        }
        at = point.from as usize;
    }
    out
}

#[cfg(test)]
mod tests {
    use super::*;

    fn choices(of: &[(f64, f64)]) -> Vec<Choice> {
        of.iter()
            .enumerate()
            .map(|(route, (figure, cost))| Choice { route, figure: *figure, cost: *cost })
            .collect()
    }

    // Witness: every mix there is, one by one.
    #[test]
    fn the_front_is_what_trying_all_mixes_finds() {
        let mut state = 7_u32;
        let mut dice = |most: u32| {
            state = state.wrapping_mul(1_664_525).wrapping_add(1_013_904_223);
            f64::from(state >> 16) % f64::from(most)
        };
        for _ in 0..200 {
            let work: Vec<Vec<(f64, f64)>> =
                (0..4).map(|_| (0..3).map(|_| (dice(20), dice(20))).collect()).collect();
            let mut stages: Vec<Vec<Point>> = Vec::new();
            let mut front = vec![Point { figure: 0.0, cost: 0.0, from: 0, route: 0 }];
            for own in &work {
                front = join(&front, &choices(own));
                stages.push(front.clone());
            }
            let mut all: Vec<(f64, f64)> = Vec::new();
            for mix in 0..81_usize {
                let mut sum = (0.0, 0.0);
                for (w, own) in work.iter().enumerate() {
                    let (figure, cost) = own[mix / 3_usize.pow(w as u32) % 3];
                    sum = (sum.0 + cost, sum.1 + figure);
                }
                all.push(sum);
            }
            all.sort_by(|a, b| a.partial_cmp(b).unwrap());
            let mut expected: Vec<(f64, f64)> = Vec::new();
            for sum in all {
                if expected.last().is_none_or(|last| sum.1 < last.1) {
                    expected.push(sum);
                }
            }
            let found: Vec<(f64, f64)> = front.iter().map(|p| (p.cost, p.figure)).collect();
            assert_eq!(found, expected);
            for at in 0..front.len() {
                let mix = followed(&stages, at);
                let sum = mix.routes.iter().zip(&work).fold((0.0, 0.0), |s, (r, own)| {
                    let (figure, cost) = own[r.unwrap()];
                    (s.0 + cost, s.1 + figure)
                });
                assert_eq!(sum, (mix.cost, mix.figure));
            }
        }
    }

    #[test]
    fn what_is_paid_once_is_an_annuity() {
        // 60,000 over ten years at 8 %: 8,941.77 a year (annuity factor 6.710 081, recomputed)
        let case = Investment { paid: 60e3, saved_a_year: 15e3, years: 10, residual: 0.0, discount: 0.08 };
        assert!((once_a_year(&case) - 8_941.77).abs() < 0.005);
    }

    #[test]
    fn long_fronts_keep_their_ends() {
        let long: Vec<Point> = (0..10_000)
            .map(|i| Point { figure: -f64::from(i), cost: f64::from(i), from: 0, route: 0 })
            .collect();
        let kept = thin(&long);
        assert!(kept.len() <= MOST + 1);
        assert_eq!((kept[0].cost, kept[kept.len() - 1].cost), (0.0, 9999.0));
    }
}
