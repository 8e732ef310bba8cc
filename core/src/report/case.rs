//! The paper for finance and quality: one page, an annex, and what differs from another version of the plan.

use super::markdown::escaped;
use super::odds::{draws_words, named, odds_words, stopped_words};
use super::row::PROGRAM;
use super::words::{cited, work_words};
use crate::account::{Account, Group, RouteAccount};
use crate::case::{DrawnCase, Switch, Turn, drawn, not_ranked, switch, turning_prices, turning_results};
use crate::chance::Summary;
use crate::compare::{HEADLINES, compare};
use crate::money::{Payback, Rate};
use crate::odds::{Reading, Sampled, Spreading, input_words};
use crate::plan::{Plan, Severity, differences};
use crate::program::WorkloadProgram;
use crate::quantity::{Kind, show_money, significant};
use std::fmt::Write as _;

/// So many prices and inputs are named on the page; all stand in the annex.
const NAMED: usize = 3;

/// The case for switching as Markdown: one page for each workload (finding, figures with intervals, what must be true, what
/// it hangs on, cautions, change-control points), then an annex with every line, assumption and source.
///
/// Text from the plan is escaped. A plan with errors gives nothing.
#[must_use]
pub fn case_markdown(account: &Account, sampled: &Sampled, coverage: f64) -> String {
    let mut out = String::new();
    let (Some(plan), Some(program)) = (&account.plan, &account.program) else { return out };
    let _ = write!(out, "# {}\n\n{}", escaped(&plan.title), escaped(&plan.site.name));
    for (what, value) in [("rules", &plan.site.rules), ("as of", &plan.site.as_of)] {
        if let Some(value) = value {
            let _ = write!(out, ", {what} {}", escaped(value));
        }
    }
    let _ = write!(out, ". {}, seed {}. Drawn up by {PROGRAM}.\n\n", draws_words(sampled), sampled.seed());
    for (w, work) in program.workloads.iter().enumerate() {
        page(&mut out, account, sampled, w, work, coverage);
    }
    out.push_str("# Annex\n\n");
    for (w, work) in program.workloads.iter().enumerate() {
        annex(&mut out, account, sampled, w, work, coverage);
    }
    open_points(&mut out, account);
    out
}

struct Row<'a> {
    route: usize,
    name: &'a str,
    case: Result<Switch, Vec<String>>,
    drawn: Option<DrawnCase>,
}

fn rows<'a>(
    account: &Account,
    sampled: &Sampled,
    w: usize,
    work: &'a WorkloadProgram,
    coverage: f64,
) -> Vec<Row<'a>> {
    let mut rows: Vec<Row<'a>> = (0..work.routes.len())
        .filter(|r| *r != work.present)
        .map(|route| Row {
            route,
            name: &work.routes[route].name,
            case: switch(account, w, route),
            drawn: drawn(account, sampled, w, route, coverage),
        })
        .collect();
    // Ranked ones first, by their present value; the others in the order of the plan.
    let rank = |r: &Row<'_>| match &r.case {
        Ok(case) if case.not_ranked.is_empty() => case.investment.net_present_value(),
        _ => f64::NEG_INFINITY,
    };
    crate::order::sort(&mut rows, &|a, b| rank(a) > rank(b));
    rows
}

fn page(
    out: &mut String,
    account: &Account,
    sampled: &Sampled,
    w: usize,
    work: &WorkloadProgram,
    coverage: f64,
) {
    let _ = write!(out, "## {}\n\n{}.\n\n", escaped(&work.name), work_words(work));
    let rows = rows(account, sampled, w, work, coverage);
    let reading = Reading::new(account, sampled, w, coverage);
    let present = work.routes.get(work.present).map_or("", |r| r.name.as_str());
    let Some(comparison) = compare(account, w) else {
        out.push_str("The present route has no account: see the problems.\n\n");
        return;
    };
    let first = rows.iter().find(|r| r.case.as_ref().is_ok_and(|c| c.not_ranked.is_empty()));
    if let Some(row) = first.or_else(|| rows.first()) {
        if let Some(beside) = comparison.routes.iter().find(|r| r.route == row.route) {
            let _ = write!(out, "**{}**\n\n", escaped(&beside.finding));
        }
        if let (Ok(case), Some(drawn)) = (&row.case, &row.drawn) {
            let _ = write!(out, "**{}**\n\n", escaped(&money_words(row.name, case, drawn, coverage)));
        }
    }
    let _ = writeln!(out, "### In place of {}\n", escaped(present));
    out.push_str(
        "| route | instruments to buy | paid at once | saved a year | present value | from | to | gains in | payback | ranked |\n",
    );
    out.push_str("| --- | ---: | ---: | ---: | ---: | ---: | ---: | ---: | --- | --- |\n");
    for row in &rows {
        match &row.case {
            Ok(case) => {
                let money = |v: f64| money(v, case);
                let interval = row.drawn.as_ref().and_then(|d| d.value);
                let limit = |of: fn(&Summary) -> f64| {
                    interval.as_ref().map_or("not known".to_owned(), |s| money(of(s)))
                };
                let gains = row.drawn.as_ref().map_or("not known".to_owned(), |d| percent(d.gains));
                let ranked = if case.not_ranked.is_empty() { "yes" } else { "no" };
                let _ = writeln!(
                    out,
                    "| {} | {} | {} | {} | {} | {} | {} | {gains} | {} | {ranked} |",
                    escaped(row.name),
                    case.to_buy.map_or_else(|| "not known".to_owned(), |n| significant(n, 4)),
                    money(case.investment.paid),
                    money(case.investment.saved_a_year),
                    money(case.investment.net_present_value()),
                    limit(|s| s.symmetric.low),
                    limit(|s| s.symmetric.high),
                    payback_words(case.investment.simple_payback()),
                );
            }
            Err(_) => {
                let _ = writeln!(out, "| {} | | not known | | | | | | | no |", escaped(row.name));
            }
        }
    }
    out.push('\n');
    for row in &rows {
        let name = escaped(row.name);
        match &row.case {
            Ok(case) => case.not_ranked.iter().for_each(|why| {
                let _ = writeln!(out, "- {name} is shown but not ranked: {}.", escaped(why));
            }),
            Err(lacking) => lacking.iter().for_each(|what| {
                let _ = writeln!(out, "- No case for {name} without {}.", escaped(what));
            }),
        }
    }
    for text in reading.iter().flat_map(|reading| stopped_words(work, reading)) {
        let _ = writeln!(out, "- {}", escaped(&text));
    }
    out.push_str("\n### What else changes\n\n");
    if let (Some(reading), Some(row)) = (&reading, first.or_else(|| rows.first())) {
        let accounts = account.workloads.get(w).map(|w| w.routes.as_slice()).unwrap_or_default();
        headlines(out, work, reading, row.route, accounts);
    }
    let Some(row) = first else {
        out.push_str("No route is ranked, so that nothing is recommended.\n\n");
        return;
    };
    let Ok(case) = &row.case else { return };
    let _ = writeln!(out, "### What must be true for {}\n", escaped(row.name));
    for condition in &case.conditions {
        let _ = writeln!(out, "- {}", escaped(condition));
    }
    let _ = writeln!(out, "\n### What it hangs on\n");
    if let Some(turn) = turning_results(account, w, row.route) {
        let _ = writeln!(out, "- {}", turn_words(turn));
    }
    let prices: Vec<String> = turning_prices(account, w, row.route)
        .iter()
        .take(NAMED)
        .map(|price| {
            format!(
                "{} is {} times what it is ({})",
                escaped(&input_words(work, &price.identity)),
                significant(price.over_central, 3),
                escaped(&price.written)
            )
        })
        .collect();
    if !prices.is_empty() {
        let _ = writeln!(out, "- it turns where {}", prices.join(", or "));
    }
    if let Some(reading) = &reading {
        let matters = reading.matters("cost.year", row.route, Some(work.present));
        if !matters.is_empty() {
            let _ = writeln!(out, "- how far the saving is unsure is due to: {}", escaped(&named(&matters)));
        }
    }
    let routes = account.workloads.get(w).map(|w| &w.routes);
    let found = routes.and_then(|r| r.get(row.route)).and_then(Option::as_ref);
    // What it is about; what to do stands in the annex, so that this stays one page.
    let about = |text: &'static str| text.split([':', ';', '.']).next().unwrap_or_default();
    let cautions: Vec<String> =
        found.iter().flat_map(|a| &a.cautions).map(|c| escaped(about(c.text))).collect();
    if !cautions.is_empty() {
        let _ = write!(out, "\n### Cautions\n\n{}. In full in the annex.", cautions.join(". "));
    }
    out.push_str(if cautions.is_empty() { "\n" } else { " " });
    out.push_str("Local codes, limits and licensed practice decide.\n\n### Points of change control\n\n");
    for point in [
        "equivalence shown on own samples and a reference material, with detection limits and recovery",
        "permission of whoever prescribes the method, in writing",
        "demonstration of capability by each analyst; controls and blanks as in the present method",
        "solvent, its grade and blanks fixed at what was used in validation",
        "waste streams, their codes and containers looked at again by a licensed person",
    ] {
        let _ = writeln!(out, "- [ ] {point}");
    }
    out.push_str("\nFinance: ____________________ Quality: ____________________ Date: __________\n\n");
}

/// The headline figures and the lines of climate: the present route, another one with its interval, and the odds.
fn headlines(
    out: &mut String,
    work: &WorkloadProgram,
    reading: &Reading<'_>,
    route: usize,
    accounts: &[Option<RouteAccount>],
) {
    let name = |r: usize| work.routes.get(r).map_or(String::new(), |r| escaped(&r.name));
    let ids: Vec<&str> = reading.ids();
    let headline = HEADLINES.iter().map(|(id, _)| *id).filter(|id| ids.contains(id) && *id != "cost.year");
    let climate = ids.iter().copied().filter(|id| id.starts_with("climate."));
    let _ =
        writeln!(out, "| a year | {} | {} | from | to | than the present |", name(work.present), name(route));
    out.push_str("| --- | ---: | ---: | ---: | ---: | --- |\n");
    for figure in headline.chain(climate).filter_map(|id| reading.figure(id)) {
        let at = |r: usize| figure.routes.get(r).copied().flatten();
        let (before, after) = (at(work.present), at(route));
        let nothing = |spread: Option<Spreading>| spread.is_none_or(|s| s.central == 0.0);
        if nothing(before) && nothing(after) {
            continue;
        }
        let limits = |s: Spreading| s.drawn.map_or((0.0, 0.0), |s| (s.symmetric.low, s.symmetric.high));
        let show = |v: f64, s: Spreading| figure.measure.shown_within(v, limits(s));
        let central = |s: Option<Spreading>| s.map_or_else(|| "none".to_owned(), |s| show(s.central, s));
        let (low, high) = after
            .filter(|s| s.drawn.is_some())
            .map_or((String::new(), String::new()), |s| (show(limits(s).0, s), show(limits(s).1, s)));
        let odds = figure
            .rivals
            .iter()
            .find(|x| x.route == route)
            .map_or(String::new(), |x| odds_words(x.less, x.same));
        let climate = if figure.id.starts_with("climate.") { scope(accounts, &figure.id) } else { "" };
        let (a, b) = (central(before), central(after));
        let _ =
            writeln!(out, "| {climate}{} | {a} | {b} | {low} | {high} | {odds} |", escaped(&figure.title));
    }
    out.push_str("\nLines of climate are never added up: each has its own scope (annex).\n\n");
}

/// Which scope a line of climate belongs to, as its boundary says.
fn scope(accounts: &[Option<RouteAccount>], id: &str) -> &'static str {
    let figures = accounts.iter().flatten().flat_map(|a| &a.figures);
    let boundary = figures.into_iter().find(|f| f.id == id).map_or("", |f| f.boundary.as_str());
    match boundary.get(..7) {
        Some("scope 1") => "climate, scope 1: ",
        Some("scope 2") => "climate, scope 2: ",
        Some("scope 3") => "climate, scope 3: ",
        _ => "climate, no scope: ",
    }
}

fn annex(
    out: &mut String,
    account: &Account,
    sampled: &Sampled,
    w: usize,
    work: &WorkloadProgram,
    coverage: f64,
) {
    let _ = write!(out, "## {}: lines of cost, time and climate\n\n", escaped(&work.name));
    let accounts = account.workloads.get(w).map(|w| w.routes.as_slice()).unwrap_or_default();
    for (route, found) in work.routes.iter().zip(accounts) {
        let Some(found) = found else { continue };
        let _ = write!(
            out,
            "### {}\n\n| line | a year, or once | what is counted | source |\n| --- | ---: | --- | --- |\n",
            escaped(&route.name)
        );
        for (figure, value) in found.figures.iter().zip(&found.values) {
            if matches!(figure.group, Group::Cost | Group::Time | Group::Climate) {
                let _ = writeln!(
                    out,
                    "| {} | {} | {} | {} |",
                    escaped(&figure.title),
                    figure.measure.shown(*value),
                    escaped(&figure.boundary),
                    escaped(&cited(figure.source))
                );
            }
        }
        for why in not_ranked(route) {
            let _ = writeln!(out, "\nNot ranked: {}.", escaped(&why));
        }
        if !found.cautions.is_empty() {
            out.push_str("\nCautions; local codes, limits and licensed practice decide:\n\n");
            for caution in &found.cautions {
                let _ = writeln!(out, "- {}", escaped(caution.text));
            }
        }
        out.push_str("\nAssumed, because the plan does not say:\n\n");
        for a in &route.assumptions {
            let _ = writeln!(
                out,
                "- {}: {} ({})",
                escaped(&a.label),
                escaped(&a.value),
                escaped(&cited(a.source))
            );
        }
        out.push('\n');
    }
    for row in rows(account, sampled, w, work, coverage) {
        let (Ok(case), Some(drawn)) = (&row.case, &row.drawn) else { continue };
        let _ = write!(
            out,
            "### {}: money in hand\n\n| year | from | middle | to | paid back by then in |\n| ---: | ---: | ---: | ---: | ---: |\n",
            escaped(row.name)
        );
        for (year, (hand, paid)) in drawn.cumulative.iter().zip(&drawn.paid_within).enumerate() {
            let Some(hand) = hand else { continue };
            let money = |v: f64| money(v, case);
            let _ = writeln!(
                out,
                "| {year} | {} | {} | {} | {} |",
                money(hand.symmetric.low),
                money(hand.median),
                money(hand.symmetric.high),
                percent(*paid)
            );
        }
        let rate = match case.investment.internal_rate() {
            Rate::Of(rate) => format!("{} % a year", significant(rate * 100.0, 3)),
            Rate::None => "none: the money never comes back".to_owned(),
            Rate::NothingPaid => "none: nothing is paid".to_owned(),
        };
        let discounted = payback_words(case.investment.discounted_payback());
        let _ = write!(
            out,
            "\nInternal rate of return: {rate}. Discounted payback: {discounted}. Never within the years looked at: {} of draws.\n\n",
            percent(drawn.never)
        );
        for price in turning_prices(account, w, row.route) {
            let _ = writeln!(
                out,
                "- turns where {} ({}) is {} times what it is",
                escaped(&input_words(work, &price.identity)),
                escaped(&price.written),
                significant(price.over_central, 3)
            );
        }
        out.push('\n');
    }
}

fn open_points(out: &mut String, account: &Account) {
    let open: Vec<_> = account.problems.iter().filter(|p| p.severity != Severity::Note).collect();
    if !open.is_empty() {
        out.push_str("## Open points\n\n");
        for p in open {
            let _ = writeln!(out, "- {}: {}; {}", escaped(&p.path), escaped(&p.found), escaped(&p.need));
        }
        out.push('\n');
    }
}

fn money(value: f64, case: &Switch) -> String {
    show_money(value, Kind::Money, Some(case.currency))
}

fn percent(share: f64) -> String {
    match share {
        s if s >= 1.0 => "all draws".to_owned(),
        s if s <= 0.0 => "no draw".to_owned(),
        s if s > 0.999 => "over 99.9 %".to_owned(),
        s if s < 0.001 => "under 0.1 %".to_owned(),
        s => format!("{} %", significant(s * 100.0, 3)),
    }
}

/// A payback in words; "never" where it never comes.
///
/// ```
/// use thimbleworth::{money::Payback, report::payback_words};
/// assert_eq!(payback_words(Payback::After(4.0)), "4 years");
/// assert_eq!(payback_words(Payback::Never), "never");
/// ```
#[must_use]
pub fn payback_words(payback: Payback) -> String {
    match payback {
        Payback::AtOnce => "at once".to_owned(),
        Payback::After(years) => format!("{} years", significant(years, 3)),
        Payback::NotWithin(years) => format!("not within {years} years"),
        Payback::Never => "never".to_owned(),
    }
}

/// Where a case turns, in words.
#[must_use]
pub fn turn_words(turn: Turn) -> String {
    match turn {
        Turn::From(n) => format!("it gains from {} results a year on", significant(n, 3)),
        Turn::UpTo(n) => format!("it gains up to {} results a year", significant(n, 3)),
        Turn::Always => "it gains at any number of results from 1 to a hundred times the plan's".to_owned(),
        Turn::Never => "it gains at no number of results from 1 to a hundred times the plan's".to_owned(),
    }
}

/// The case in two sentences.
#[must_use]
pub fn money_words(name: &str, case: &Switch, drawn: &DrawnCase, coverage: f64) -> String {
    let i = case.investment;
    let mut text = format!(
        "{name} costs {} at once and {} a year: over {} years at {} % a present value of {}",
        money(i.paid, case),
        if i.saved_a_year < 0.0 {
            format!("{} more", money(-i.saved_a_year, case))
        } else {
            ["saves ", &money(i.saved_a_year, case)].concat()
        },
        i.years,
        significant(i.discount * 100.0, 3),
        money(i.net_present_value(), case)
    );
    if let Some(s) = drawn.value {
        let _ = write!(
            text,
            " ({} to {} in {} % of draws)",
            money(s.symmetric.low, case),
            money(s.symmetric.high, case),
            significant(coverage * 100.0, 3)
        );
    }
    let _ = write!(text, "; it gains in {}", percent(drawn.gains));
    match i.simple_payback() {
        Payback::AtOnce => text.push_str(", and nothing has to be paid back."),
        Payback::After(years) => {
            let _ = write!(text, " and has paid after {} years.", significant(years, 3));
        }
        Payback::NotWithin(years) => {
            let _ = write!(text, " and has not paid within {years} years.");
        }
        Payback::Never => text.push_str(" and never pays."),
    }
    text
}

/// What differs between two versions of a plan: each changed entry, and each changed headline figure, as Markdown.
#[must_use]
pub fn since_markdown(old: &Account, new: &Account) -> String {
    let mut out = String::from("# What differs\n\n");
    let empty = Plan::default();
    let plan = |a: &Account| a.plan.clone().unwrap_or_else(|| empty.clone());
    let changes = differences(&plan(old), &plan(new));
    if changes.is_empty() {
        out.push_str("The two plans say the same.\n");
        return out;
    }
    out.push_str("| entry | before | after |\n| --- | --- | --- |\n");
    for change in &changes {
        let said = |text: &Option<String>| text.as_deref().map_or_else(|| "not there".to_owned(), escaped);
        let _ = writeln!(
            out,
            "| {} | {} | {} |",
            escaped(&change.path),
            said(&change.before),
            said(&change.after)
        );
    }
    out.push_str("\n| workload | route | figure | before | after |\n| --- | --- | --- | ---: | ---: |\n");
    let works = |a: &Account| {
        a.program
            .as_ref()
            .map(|p| p.workloads.iter().map(|w| w.name.clone()).collect::<Vec<_>>())
            .unwrap_or_default()
    };
    for (w, work) in new.program.iter().flat_map(|p| &p.workloads).enumerate() {
        let Some(before) = works(old).iter().position(|n| *n == work.name) else { continue };
        for (r, route) in work.routes.iter().enumerate() {
            let old_work = old.program.as_ref().and_then(|p| p.workloads.get(before));
            let Some(at) = old_work.and_then(|w| w.routes.iter().position(|o| o.name == route.name)) else {
                continue;
            };
            let found = |a: &Account, w: usize, r: usize, id: &str| {
                let account = a.workloads.get(w)?.routes.get(r)?.as_ref()?;
                let i = account.figures.iter().position(|f| f.id == id)?;
                Some((account.figures[i].measure.shown(account.values[i]), account.values[i]))
            };
            let value = |a: &Account, w: usize, r: usize| {
                let case = switch(a, w, r).ok()?;
                Some((money(case.investment.net_present_value(), &case), case.investment.net_present_value()))
            };
            let (a, b) = (value(old, before, at), value(new, w, r));
            let changed = a.as_ref().map(|v| v.1) != b.as_ref().map(|v| v.1);
            if changed && r != work.present {
                let said = |v: Option<(String, f64)>| v.map_or_else(|| "no case".to_owned(), |v| v.0);
                let _ = writeln!(
                    out,
                    "| {} | {} | present value of the case | {} | {} |",
                    escaped(&work.name),
                    escaped(&route.name),
                    said(a),
                    said(b)
                );
            }
            for (id, title) in HEADLINES {
                let (a, b) = (found(old, before, at, id), found(new, w, r, id));
                if a.as_ref().map(|v| v.1) != b.as_ref().map(|v| v.1) {
                    let said = |v: Option<(String, f64)>| v.map_or_else(|| "not given".to_owned(), |v| v.0);
                    let _ = writeln!(
                        out,
                        "| {} | {} | {title} | {} | {} |",
                        escaped(&work.name),
                        escaped(&route.name),
                        said(a),
                        said(b)
                    );
                }
            }
        }
    }
    out
}
