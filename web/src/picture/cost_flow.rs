//! What materials, work and the removal of waste cost, as a flow: how much of it stays in the product, and how much goes with
//! what is lost (material flow cost accounting).

use super::books::{End, Per, few, mass_with_unit, money_unit, percent};
use super::flow::{Flow, picture};
use super::{Head, Picture};
use thimbleworth::account::{Account, RouteAccount};
use thimbleworth::program::SiteUse;

const KEPT: &str = "product, or kept";

/// The flow of one route; `None` where the full cost of what is lost is not known, and where something brings money in.
#[must_use]
pub fn cost_flow(key: &str, account: &Account, workload: usize, route: usize, per: Per) -> Option<Picture> {
    let program = account.program.as_ref()?;
    let routed = program.workloads.get(workload)?.routes.get(route)?;
    let book = account.workloads.get(workload)?.routes.get(route)?.as_ref()?;
    let currency = routed.money.as_ref()?.currency;
    let all = per.of(book, book.value("cost.waste")?)?;
    let flow =
        Flow { currency: Some(currency), route: routed.name.clone(), ..read(book, &program.site, per)? };
    let total: f64 = flow.sources.iter().map(|s| s.2).sum();
    let mut picture = picture(key, &flow)?;
    let (words, over) = money_unit(total, currency);
    let unit = (words.as_str(), over);
    picture.title = format!("{}: what is lost costs {} {}", flow.route, mass_with_unit(all, unit), flow.per);
    let ends: Vec<String> = flow
        .ends
        .iter()
        .map(|(name, _, cost)| format!("{} with {name}", mass_with_unit(*cost, unit)))
        .collect();
    picture.description = format!(
        "That is {} of {}, which goes: {}.",
        percent(all / total),
        mass_with_unit(total, unit),
        few(&ends)
    );
    picture.notes.push(if flow.sources.iter().any(|s| s.0 == WORK) {
        "Materials at their purchase price; labour, energy and service by the share of the mass that is lost; removal in full."
    } else {
        "Materials at their purchase price, removal in full. Labour and energy are not shared out: a result has no mass to share them by."
    }.to_owned());
    for table in &mut picture.tables {
        if let Some(head) = table.head.first_mut() {
            *head = Head::words("Cost of");
        }
    }
    Some(picture)
}

const WORK: &str = "labour, energy, service";

/// Sources, ends and links, in money.
fn read(book: &RouteAccount, site: &SiteUse, per: Per) -> Option<Flow> {
    let figures = || book.figures.iter().zip(&book.values);
    let sum =
        |start: &str| -> f64 { figures().filter(|(f, _)| f.id.starts_with(start)).map(|(_, v)| *v).sum() };
    // By what follows the start of the id: a stream has both, what is bought and lost in it, and its removal.
    let mut ends: Vec<(&str, String, End, [f64; 2])> = Vec::new();
    for (at, start, words) in [(0, "cost.lost.", "bought and lost to "), (1, "cost.disposal.", " taken away")]
    {
        for (figure, value) in figures() {
            let Some(slug) = figure.id.strip_prefix(start) else { continue };
            if let Some(end) = ends.iter_mut().find(|e| e.0 == slug) {
                end.3[at] += value;
                continue;
            }
            let name = figure.title.replace(words, "");
            let end = match name.as_str() {
                name if site.streams.iter().any(|s| s.name == name) => End::Waste,
                "hood" | "room" => End::Air,
                _ => End::Other,
            };
            let mut costs = [0.0; 2];
            costs[at] = *value;
            ends.push((slug, name, end, costs));
        }
    }
    let bought = sum("cost.material.");
    let lost: f64 = ends.iter().map(|e| e.3[0]).sum();
    let removed: f64 = ends.iter().map(|e| e.3[1]).sum();
    let (mut work, mut work_lost) = (0.0, 0.0);
    if let Some(shared) = book.value("cost.flow.shared") {
        work_lost = shared;
        for id in ["labour", "electricity", "cooling_water", "service", "rent", "other"] {
            work += book.value(&format!("cost.{id}")).unwrap_or(0.0);
        }
    }
    // What rounding leaves of a difference is nothing.
    let rest = |all: f64, part: f64| if all - part > 1e-9 * all { all - part } else { 0.0 };
    let (kept, work_kept) = (rest(bought, lost), rest(work, work_lost));
    let mut links = vec![(0, 0, kept)];
    links.extend(ends.iter().enumerate().map(|(e, end)| (0, e + 1, end.3[0])));
    links.extend([(1, 0, work_kept), (1, ends.len() + 1, work_lost)]);
    links.extend(ends.iter().enumerate().map(|(e, end)| (2, e + 1, end.3[1])));
    if links.iter().any(|l| l.2 < 0.0) {
        return None;
    }
    let mut flow = Flow {
        currency: None,
        route: String::new(),
        per: per.words(),
        sources: vec![
            ("materials bought".to_owned(), "", bought),
            (WORK.to_owned(), "", work),
            ("removal of waste".to_owned(), "", removed),
        ],
        ends: vec![(KEPT.to_owned(), End::Kept, kept + work_kept)],
        links: Vec::new(),
    };
    flow.ends.extend(ends.into_iter().map(|(_, name, end, costs)| (name, end, costs[0] + costs[1])));
    flow.ends.push(("work spent on what is lost".to_owned(), End::Other, work_lost));
    // Without what is nothing; the others move up.
    let place = |at: usize, there: &[bool]| there.iter().take(at).filter(|t| **t).count();
    let from: Vec<bool> = flow.sources.iter().map(|s| s.2 > 0.0).collect();
    let to: Vec<bool> = flow.ends.iter().map(|e| e.2 > 0.0).collect();
    for (s, e, cost) in links {
        if let (true, Some(cost)) = (cost > 0.0, per.of(book, cost)) {
            flow.links.push((place(s, &from), place(e, &to), cost));
        }
    }
    flow.sources.retain(|s| s.2 > 0.0);
    flow.ends.retain(|e| e.2 > 0.0);
    for cost in flow.sources.iter_mut().map(|s| &mut s.2).chain(flow.ends.iter_mut().map(|e| &mut e.2)) {
        *cost = per.of(book, *cost)?;
    }
    Some(flow)
}
