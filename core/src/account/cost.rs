//! Cost: each line an entry times a price. What has no price is named, never counted as nothing.

use super::figure::{Draft, Entry, Figure, Group, How, Line, Measure, Term};
use super::mass::{destinations, materials, place_name, slug};
use super::time::Hours;
use crate::chance::In;
use crate::ledger::{Direction, Material, Place, Utility};
use crate::program::{Desk, MoneyUse, Price, Removal, RouteProgram, SiteUse};
use crate::quantity::Currency;
use crate::source::{DEFINITION, SITE, Source, Standing};

/// ISO 14051: how cost follows material.
const FLOW_COST: Source = Source::new(
    "ISO 14051:2011, material flow cost accounting: losses at their purchase price, waste management to the loss in full",
    Standing::Secondary,
);

struct Costs<'a> {
    draft: &'a mut Draft,
    currency: Currency,
    missing: Vec<(String, String)>,
}

impl Costs<'_> {
    fn add(
        &mut self,
        id: &str,
        title: String,
        boundary: &str,
        formula: &'static str,
        lines: Vec<Line>,
    ) -> usize {
        let measure = Measure::Money(self.currency);
        self.figure(id, title, measure, boundary, formula, SITE, How::Lines(lines))
    }

    #[expect(clippy::too_many_arguments, reason = "the parts of a figure")]
    fn figure(
        &mut self,
        id: &str,
        title: String,
        measure: Measure,
        boundary: &str,
        formula: &'static str,
        source: Source,
        how: How,
    ) -> usize {
        let (id, boundary) = (format!("cost.{id}"), boundary.into());
        self.draft.add(Figure { id, title, group: Group::Cost, measure, boundary, formula, source, how })
    }

    fn total(&mut self, id: &str, title: &str, boundary: &str, parts: &[usize]) -> usize {
        let lines = parts.iter().map(|i| Line::of(Entry::Figure(*i))).collect();
        self.add(id, title.to_owned(), boundary, "Σ of the lines", lines)
    }

    fn lacks(&mut self, what: String, path: &str) {
        self.missing.push((what, path.to_owned()));
    }
}

/// Draws up the account of cost, where the site says anything of money; returns what has no price: what it is, and the path
/// at which the plan could say it.
pub(super) fn draw_up(
    draft: &mut Draft,
    route: &RouteProgram,
    site: &SiteUse,
    desk: &Desk,
    hours: Hours,
) -> Vec<(String, String)> {
    let Some(money) = &route.money else { return Vec::new() };
    let mut costs = Costs { draft, currency: money.currency, missing: Vec::new() };
    let mut parts = purchases(&mut costs, route, money, desk);
    let mut removed = Vec::new();
    for i in 0..site.streams.len() {
        removed.extend(removal(&mut costs, route, site, money, desk, i));
    }
    parts.extend(&removed);
    let bought = parts.len();
    match (hours.attended, money.labour_s) {
        (Some(time), Some(price)) => {
            let line = Line::of(Entry::Figure(time)).by(price);
            let boundary = "people's time at the bench; supervision and reporting are not in it";
            parts.push(costs.add("labour", "labour".into(), boundary, "t × price", vec![line]));
        }
        (Some(_), None) => costs.lacks("an hour of labour".into(), "site.money.labour_hour"),
        (None, _) => costs
            .lacks(format!("the working time of {}", route.name), &format!("{}.time.attended", route.path)),
    }
    for (utility, id, price, path) in [
        (Utility::Electricity, "electricity", money.electricity_j, "site.electricity.price"),
        (Utility::CoolingWater, "cooling_water", money.cooling_water_m3, "site.money.cooling_water"),
    ] {
        if desk.spent[utility as usize] <= 0.0 {
            continue;
        }
        match price {
            Some(price) => {
                // Water: 1000 kg/m³, at which its price by volume is meant.
                let number = if utility == Utility::CoolingWater { 1e-3 } else { 1.0 };
                let line = Line::of(Entry::Spent(utility)).by(price).times(number);
                let boundary = "as far as the plan states power, flow and time";
                parts.push(costs.add(id, utility.name().into(), boundary, "amount × price", vec![line]));
            }
            None => costs.lacks(utility.name().into(), path),
        }
    }
    if !route.uncounted.is_empty() {
        costs.lacks(
            format!("electricity of {}, where no power is given", route.name),
            route.uncounted.first().map_or("", String::as_str),
        );
    }
    for (id, title, slot) in [
        ("service", "service", money.service),
        ("rent", "rent", money.rent),
        ("other", "other cost", money.other),
    ] {
        if let Some(slot) = slot {
            let line = vec![Line::of(Entry::One).by(slot)];
            parts.push(costs.add(id, title.into(), "all instruments, a year", "as stated", line));
        }
    }
    let shared = parts[bought..].to_vec();
    let what = "purchases net of what is returned, removal of waste, labour, energy, water, service and rent; not instruments and validation, which are paid once";
    let waste = flow_cost(&mut costs, route, site, money, desk, &removed);
    let shared = shared_out(&mut costs, route, site, desk, &shared);
    if costs.missing.is_empty() {
        costs.total("year", "running cost", what, &parts);
    } else {
        costs.total("known", "running cost, as far as prices are given", what, &parts);
    }
    if let Some(mut waste) = waste {
        waste.extend(shared);
        let what = if shared.is_some() {
            "purchase of what leaves as waste or to air, its share by mass of labour, energy and service, and the removal of waste"
        } else {
            "purchase of what leaves as waste or to air, and the removal of waste; labour and energy are not shared out, because a result has no mass to share them by"
        };
        costs.total("waste", "full cost of what is lost", what, &waste);
    }
    once(&mut costs, route, money, hours);
    costs.missing
}

/// Each material at its price: drawn less returned, and the feed where it has a price.
fn purchases(costs: &mut Costs<'_>, route: &RouteProgram, money: &MoneyUse, desk: &Desk) -> Vec<usize> {
    let mut parts = Vec::new();
    for m in materials(route) {
        let drawn = desk.cells.passed(Place::STORE, Direction::OutOf, m) > 0.0;
        let fed = desk.cells.passed(Place::FEED, Direction::OutOf, m) > 0.0;
        let name = &route.materials[m.0 as usize].name;
        let Some(price) = money.prices[m.0 as usize] else {
            // Samples are brought, not bought; a raw material is bought where the plan gives its price.
            if drawn {
                costs.lacks(name.clone(), "site.money.prices");
            }
            continue;
        };
        let mut lines = Vec::new();
        if drawn {
            lines.push(priced(Entry::Cell(Place::STORE, Direction::OutOf, m), price));
            lines.push(priced(Entry::Cell(Place::STORE, Direction::Into, m), price).times(-1.0));
        }
        if fed {
            lines.push(priced(Entry::Cell(Place::FEED, Direction::OutOf, m), price));
        }
        if !lines.is_empty() {
            let boundary = "drawn less returned, and what of it comes with the feed";
            parts.push(costs.add(
                &format!("material.{}", slug(name)),
                format!("{name} bought"),
                boundary,
                "m × price",
                lines,
            ));
        }
    }
    parts
}

/// An entry in kilograms at a price.
fn priced(of: Entry, price: Price) -> Line {
    match price {
        Price::PerMass(price) => Line::of(of).by(price),
        // m / ρ × price
        Price::PerVolume(price, density) => Line::of(of).by(price).over(density),
    }
}

/// What the removal of one stream costs; nothing where nothing goes in.
fn removal(
    costs: &mut Costs<'_>,
    route: &RouteProgram,
    site: &SiteUse,
    money: &MoneyUse,
    desk: &Desk,
    stream: usize,
) -> Option<usize> {
    let place = Place::stream(stream)?;
    let name = &site.streams.get(stream)?.name;
    if !materials(route).any(|m| desk.cells.passed(place, Direction::Into, m) > 0.0) {
        return None;
    }
    let Some(parts) = money.removal.get(stream).and_then(Option::as_ref) else {
        costs.lacks(format!("the removal of {name}"), "site.money.disposal");
        return None;
    };
    let at = |costs: &Costs<'_>, what: &str| {
        let id = format!("waste.{}.{what}", slug(name));
        costs.draft.figures.iter().position(|f| f.id == id)
    };
    let mut lines = Vec::new();
    for part in parts {
        let (of, slot): (Option<Entry>, In) = match *part {
            Removal::PerMass(slot) => (at(costs, "mass").map(Entry::Figure), slot),
            Removal::PerVolume(slot) => (at(costs, "volume").map(Entry::Figure), slot),
            Removal::PerContainer(slot) => (at(costs, "containers").map(Entry::Figure), slot),
            Removal::PerPickUp(slot) => (money.pick_ups.map(|_| Entry::One), slot),
        };
        let Some(of) = of else {
            let (what, path) = if matches!(part, Removal::PerPickUp(_)) {
                ("the number of pick-ups", "site.money.pick_ups".to_owned())
            } else {
                ("the size of its containers", format!("site.streams[{stream}].container"))
            };
            costs.lacks(format!("the removal of {name}: {what}"), &path);
            return None;
        };
        let mut line = Line::of(of).by(slot);
        if let (Removal::PerPickUp(_), Some(pick_ups)) = (part, money.pick_ups) {
            line = line.by(pick_ups);
        }
        lines.push(line);
    }
    let boundary = "by mass, volume, container or pick-up, as the plan prices it";
    Some(costs.add(
        &format!("disposal.{}", slug(name)),
        format!("{name} taken away"),
        boundary,
        "amount × price",
        lines,
    ))
}

/// What is lost at its purchase price, by where it goes, and the removal of waste.
fn flow_cost(
    costs: &mut Costs<'_>,
    route: &RouteProgram,
    site: &SiteUse,
    money: &MoneyUse,
    desk: &Desk,
    removed: &[usize],
) -> Option<Vec<usize>> {
    let kept = [Place::PRODUCT, Place::BY_PRODUCT, Place::HELD];
    let bought = |m: &Material| desk.cells.passed(Place::STORE, Direction::OutOf, *m) > 0.0;
    let mut parts = removed.to_vec();
    for place in destinations(site).filter(|p| !kept.contains(p)) {
        let mut lines = Vec::new();
        for m in materials(route) {
            if desk.cells.passed(place, Direction::Into, m) <= 0.0 {
                continue;
            }
            match money.prices[m.0 as usize] {
                Some(price) => lines.push(priced(Entry::Cell(place, Direction::Into, m), price)),
                // Without its price the full cost is not known; a sample has none.
                None if bought(&m) => return None,
                None => {}
            }
        }
        if lines.is_empty() {
            continue;
        }
        let name = place_name(site, place);
        let (id, title) = (format!("cost.lost.{}", slug(&name)), format!("bought and lost to {name}"));
        let measure = Measure::Money(costs.currency);
        parts.push(costs.draft.add(Figure {
            id,
            title,
            group: Group::Cost,
            measure,
            boundary: "every material that goes there, at its purchase price".into(),
            formula: "Σ m × price",
            source: FLOW_COST,
            how: How::Lines(lines),
        }));
    }
    // Waste for which nobody could say what its removal costs has no full cost.
    let streams = (0..site.streams.len()).filter_map(Place::stream);
    let filled =
        streams.filter(|p| materials(route).any(|m| desk.cells.passed(*p, Direction::Into, m) > 0.0));
    (filled.count() == removed.len()).then_some(parts)
}

/// The share by mass of energy and system cost that the loss carries, where there is a product to carry the rest.
fn shared_out(
    costs: &mut Costs<'_>,
    route: &RouteProgram,
    site: &SiteUse,
    desk: &Desk,
    parts: &[usize],
) -> Option<usize> {
    if !materials(route).any(|m| desk.cells.passed(Place::PRODUCT, Direction::Into, m) > 0.0)
        || parts.is_empty()
    {
        return None;
    }
    let mass = |places: Vec<Place>| {
        let terms = places.into_iter().flat_map(|p| materials(route).map(move |m| Term::into(p, m)));
        How::Sum(terms.collect())
    };
    let kept = [Place::BY_PRODUCT, Place::HELD];
    let all: Vec<Place> = destinations(site).filter(|p| !kept.contains(p)).collect();
    let lost = all.iter().copied().filter(|p| *p != Place::PRODUCT).collect();
    let mut add = |id: &str, title: &str, measure, text: &str, how| {
        costs.figure(id, title.into(), measure, text, "by mass", FLOW_COST, how)
    };
    let text = "streams, air, drain, destroyed and elsewhere";
    let lost = add("flow.lost", "mass lost", Measure::Mass, text, mass(lost));
    let all = add("flow.all", "mass lost or made", Measure::Mass, "what is lost, and the product", mass(all));
    let how = How::Ratio { over: lost, under: all };
    let share = add("flow.share", "share of the mass that is lost", Measure::Ratio, text, how);
    let lines = parts.iter().map(|i| Line::of(Entry::Both(*i, share))).collect();
    let text = "labour, energy, water, service and rent, by the share of the mass that is lost";
    Some(costs.add("flow.shared", "labour and energy spent on what is lost".into(), text, "s × Σ", lines))
}

/// What is paid once: instruments that are not there, and the proof that the route works.
fn once(costs: &mut Costs<'_>, route: &RouteProgram, money: &MoneyUse, hours: Hours) {
    let to_buy = hours.instruments.map(|needed| {
        let mut lines = vec![Line::of(Entry::Figure(needed))];
        if let Some(there) = route.time.instruments {
            lines.push(Line::of(Entry::One).by(there).times(-1.0));
        }
        let text = "needed less those that are there";
        let how = How::Lines(lines);
        let short = costs.figure(
            "short",
            "instruments short".into(),
            Measure::Ratio,
            text,
            "n = needed − there",
            DEFINITION,
            how,
        );
        costs.figure(
            "to_buy",
            "instruments to buy".into(),
            Measure::Count,
            text,
            "n = ⌈short⌉, not below 0",
            DEFINITION,
            How::Whole(short),
        )
    });
    // Where nothing says how many it takes, one is meant.
    let each = |slot: In, costs: &mut Costs<'_>, id: &str, title: &str| {
        let one = vec![Line::of(Entry::One).by(slot)];
        let Some(to_buy) = to_buy else { return Line::of(Entry::One).by(slot) };
        let measure = Measure::MoneyOnce(costs.currency);
        let one =
            costs.figure(id, title.into(), measure, "one, as stated", "as stated", SITE, How::Lines(one));
        Line::of(Entry::Both(to_buy, one))
    };
    let mut paid = Vec::new();
    match money.instrument {
        Some(slot) => paid.push(each(slot, costs, "instrument", "one instrument")),
        None if to_buy.is_some_and(|_| route.time.instruments.is_none()) => {
            costs.lacks(
                format!("the price of an instrument for {}, or how many are there,", route.name),
                &format!("{}.money.instrument", route.path),
            );
            return;
        }
        None => {}
    }
    let mut back = Vec::new();
    if let Some(slot) = money.residual {
        back.push(each(slot, costs, "residual", "one instrument at the end"));
    }
    paid.extend(money.validation.map(|slot| Line::of(Entry::One).by(slot)));
    let measure = Measure::MoneyOnce(costs.currency);
    let what = "instruments to buy and validation; nothing for the route in use";
    costs.figure(
        "once",
        "paid at once".into(),
        measure,
        what,
        "n × instrument + validation",
        SITE,
        How::Lines(paid),
    );
    let what = "what bought instruments are worth at the end";
    costs.figure(
        "back",
        "come back at the end".into(),
        measure,
        what,
        "n × residual",
        SITE,
        How::Lines(back),
    );
}
