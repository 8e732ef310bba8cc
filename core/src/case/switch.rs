//! What switching costs and saves, and what must be true.

use crate::account::{Account, RouteAccount};
use crate::money::Investment;
use crate::program::{RouteProgram, WorkloadProgram};
use crate::quantity::{Currency, significant};

/// A route in place of the present one.
#[derive(Clone, Debug, PartialEq)]
pub struct Switch {
    /// The index of the route.
    pub route: usize,
    /// In which money is counted.
    pub currency: Currency,
    /// What is paid and saved.
    pub investment: Investment,
    /// Instruments to buy, where the plan says enough of time.
    pub to_buy: Option<f64>,
    /// What must be true for these figures to hold, in sentences without a full stop.
    pub conditions: Vec<String>,
    /// Why the route is not ranked with the others; empty where it is.
    pub not_ranked: Vec<String>,
}

/// Why a route is shown but not ranked: nothing says that its work is equal, or that its results may be reported.
#[must_use]
pub fn not_ranked(route: &RouteProgram) -> Vec<String> {
    let stated = |text: &Option<String>| text.as_deref().is_some_and(|t| !t.trim().is_empty());
    let mut out = Vec::new();
    if !stated(&route.equivalence) {
        out.push(format!("nothing says on what the claim rests that {} does equal work", route.name));
    }
    match route.recovery.and_then(|slot| route.inputs.get(slot.0 as usize)) {
        None => out.push(format!("nothing says what recovery {} reaches", route.name)),
        Some(recovery) if recovery.central_si <= 0.0 => {
            out.push(format!("{} finds nothing of what is sought: its recovery is 0", route.name));
        }
        Some(_) => {}
    }
    if !stated(&route.permission) {
        out.push(format!("nothing says that results of {} may be reported (permission)", route.name));
    }
    out
}

/// Draws up the case for a route by the central figures.
///
/// # Errors
/// What has to be known first, a sentence without a full stop for each.
pub fn switch(account: &Account, workload: usize, route: usize) -> Result<Switch, Vec<String>> {
    let nothing = || vec!["the plan has no account of both routes".to_owned()];
    let work = account.program.as_ref().and_then(|p| p.workloads.get(workload)).ok_or_else(nothing)?;
    let accounts = account.workloads.get(workload).ok_or_else(nothing)?;
    let found = |i: usize| {
        work.routes.get(i).zip(accounts.routes.get(i).and_then(Option::as_ref)).ok_or_else(nothing)
    };
    let (old, present) = found(work.present)?;
    let (new, other) = found(route)?;
    let Some(money) = &new.money else {
        return Err(vec!["the site names no prices (site.money)".to_owned()]);
    };
    let mut lacking = Vec::new();
    for (program, account) in [(old, present), (new, other)] {
        if account.value("cost.year").is_none() {
            let open: Vec<&str> = account.open.iter().map(|(what, _)| what.as_str()).collect();
            lacking.push(format!("the running cost of {}; not known: {}", program.name, open.join(", ")));
        }
    }
    let (years, discount) = (money.years, money.discount);
    if years.is_none() {
        lacking.push("over how many years (site.money.years)".to_owned());
    }
    if discount.is_none() {
        lacking.push("the discount rate (site.money.discount)".to_owned());
    }
    let to_buy = other.value("cost.to_buy");
    if to_buy.is_some_and(|n| n > 0.0) && money.instrument.is_none() {
        lacking.push(format!("the price of an instrument for {} (money.instrument)", new.name));
    }
    let (Some(before), Some(after), Some(years), Some(discount), true) =
        (present.value("cost.year"), other.value("cost.year"), years, discount, lacking.is_empty())
    else {
        return Err(lacking);
    };
    Ok(Switch {
        route,
        currency: money.currency,
        investment: Investment {
            paid: other.value("cost.once").unwrap_or(0.0),
            saved_a_year: before - after,
            years,
            residual: other.value("cost.back").unwrap_or(0.0),
            discount: new.inputs.get(discount.0 as usize).map_or(0.0, |i| i.central_si),
        },
        to_buy,
        conditions: conditions(work, new, other, (old, present)),
        not_ranked: {
            let mut why = not_ranked(new);
            if to_buy.is_none() {
                why.push(format!(
                    "nothing says whether the instruments of {} find the time for all runs (time.run, site.hours)",
                    new.name
                ));
            }
            why
        },
    })
}

fn conditions(
    work: &WorkloadProgram,
    new: &RouteProgram,
    other: &RouteAccount,
    (old, present): (&RouteProgram, &RouteAccount),
) -> Vec<String> {
    let mut out = Vec::new();
    match (other.value("time.instruments"), other.value("cost.to_buy")) {
        (Some(needed), Some(to_buy)) => {
            let hours = other.value("time.instrument").unwrap_or(0.0) / 3600.0;
            let there = other.value("time.there").unwrap_or(0.0) / 3600.0;
            let mode = if new.time.unattended { "attended and unattended" } else { "attended" };
            let mut text = format!(
                "instruments of {}: {} needed, for {} h of runs a year where one can run {} {mode} h",
                new.name,
                significant(needed, 4),
                significant(hours, 4),
                significant(there, 4)
            );
            if to_buy > 0.0 {
                text.push_str(&format!("; {} not there and to be bought", significant(to_buy, 4)));
            }
            out.push(text);
        }
        _ if new.time.run_s.is_some() => out.push(format!(
            "the instruments of {} find the time for all runs: the plan does not say in how many hours of a year they can run (site.hours)",
            new.name
        )),
        _ => out.push(format!(
            "the instruments of {} find the time for all runs: the plan does not say how long a run takes (time.run)",
            new.name
        )),
    }
    if let Some(short) = present.value("cost.to_buy").filter(|n| *n > 0.0) {
        out.push(format!("{} itself lacks {} instruments for this work", old.name, significant(short, 4)));
    }
    let results = present.runs.results;
    out.push(format!(
        "{} results a year in {}, in batches as full as the plan says",
        significant(results, 4),
        work.name
    ));
    if let Some(text) = &new.equivalence {
        out.push(format!("equal work: {text}"));
    }
    if let Some(text) = &new.permission {
        out.push(format!("permission: {text}"));
    }
    out
}
