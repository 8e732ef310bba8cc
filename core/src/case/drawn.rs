//! The case in every draw.

use super::switch::switch;
use crate::account::Account;
use crate::chance::{Input, Summary, summary};
use crate::money::{Investment, Payback};
use crate::odds::{MOST_STOPPED, Sampled};

/// What the draws say of a case.
#[derive(Clone, Debug)]
pub struct DrawnCase {
    /// Draws that ran on both routes.
    pub draws: usize,
    /// The net present value.
    pub value: Option<Summary>,
    /// The share of draws in which it is above nothing.
    pub gains: f64,
    /// The share of draws in which it has paid within 0, 1, 2, ... years, without discounting.
    pub paid_within: Vec<f64>,
    /// The share of draws in which it never pays within the years looked at.
    pub never: f64,
    /// The middle of the simple paybacks of all draws, where half of them pay.
    pub median_payback: Option<f64>,
    /// Money in hand at the end of each year, beginning with what is paid.
    pub cumulative: Vec<Option<Summary>>,
}

/// Draws up the case of a route in every draw. `None` where there is no case, where the figures it rests on
/// ([`NEEDED`](super::NEEDED)) are not drawn, or where too many draws stopped.
#[must_use]
pub fn drawn(
    account: &Account,
    sampled: &Sampled,
    workload: usize,
    route: usize,
    coverage: f64,
) -> Option<DrawnCase> {
    let base = switch(account, workload, route).ok()?.investment;
    let work = account.program.as_ref()?.workloads.get(workload)?;
    let (old, new) = (sampled.route(workload, work.present)?, sampled.route(workload, route)?);
    let program = work.routes.get(route)?;
    let discount: &Input = program.inputs.get(program.money.as_ref()?.discount?.0 as usize)?;
    let (before, after) = (old.column("cost.year")?, new.column("cost.year")?);
    let (paid, back) = (new.column("cost.once")?, new.column("cost.back")?);
    let years = base.years as usize;
    let mut values = Vec::new();
    let mut hands = vec![Vec::new(); years + 1];
    let mut within = vec![0_u32; years + 1];
    let (mut never, mut gains, mut paybacks) = (0_u32, 0_u32, Vec::new());
    for draw in new.kept(old, u32::MAX) {
        let d = draw as usize;
        let case = Investment {
            paid: paid[d],
            saved_a_year: before[d] - after[d],
            years: base.years,
            residual: back[d],
            discount: discount.draw(sampled.seed(), u64::from(draw)),
        };
        let value = case.net_present_value();
        values.push(value);
        gains += u32::from(value > 0.0);
        for (hand, money) in hands.iter_mut().zip(case.cash_flow()) {
            hand.push(money);
        }
        let payback = match case.simple_payback() {
            Payback::AtOnce => 0.0,
            Payback::After(years) => years,
            Payback::NotWithin(_) | Payback::Never => f64::INFINITY,
        };
        never += u32::from(payback == f64::INFINITY);
        for (year, count) in within.iter_mut().enumerate() {
            *count += u32::from(payback <= year as f64);
        }
        paybacks.push(payback);
    }
    let draws = values.len();
    let done = if old.done() < new.done() { old.done() } else { new.done() };
    if draws == 0 || (draws as f64) < (1.0 - MOST_STOPPED) * f64::from(done) {
        return None;
    }
    let share = |n: u32| f64::from(n) / draws as f64;
    let (_, middle, _) = paybacks.select_nth_unstable_by(draws / 2, f64::total_cmp);
    Some(DrawnCase {
        draws,
        median_payback: Some(*middle).filter(|m| m.is_finite()),
        value: summary(&mut values, coverage),
        gains: share(gains),
        paid_within: within.into_iter().map(share).collect(),
        never: share(never),
        cumulative: hands.iter_mut().map(|hand| summary(hand, coverage)).collect(),
    })
}
