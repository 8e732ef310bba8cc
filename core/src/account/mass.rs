//! Where every gram goes: by place, and by place and material.

use super::figure::{Draft, Factor, Figure, Group, How, Measure, Term};
use crate::ledger::{Direction, Material, Place};
use crate::material::Class;
use crate::program::{Desk, RouteProgram, SiteUse};
use crate::source::MASS_BALANCE;

/// A piece of an id: words joined by hyphens.
pub(super) fn slug(name: &str) -> String {
    name.split_whitespace().collect::<Vec<_>>().join("-")
}

/// The name of a place, streams by the site's names.
#[must_use]
pub fn place_name(site: &SiteUse, place: Place) -> String {
    place
        .stream_index()
        .and_then(|i| site.streams.get(i))
        .map_or_else(|| place.name().unwrap_or_default().to_owned(), |s| s.name.clone())
}

/// Every place where mass can end: the book's own and the site's streams.
pub(super) fn destinations(site: &SiteUse) -> impl Iterator<Item = Place> + '_ {
    let own = Place::OUTSIDE.into_iter().filter(|p| *p != Place::FEED && *p != Place::STORE);
    (0..site.streams.len()).filter_map(Place::stream).chain(own)
}

/// The materials of a route.
pub(super) fn materials(route: &RouteProgram) -> impl Iterator<Item = Material> {
    let count = u16::try_from(route.materials.len()).unwrap_or(u16::MAX);
    (0..count).map(Material)
}

fn sum(id: String, title: String, boundary: String, terms: Vec<Term>) -> Figure {
    Figure {
        id,
        title,
        group: Group::Mass,
        measure: Measure::Mass,
        boundary,
        formula: "Σ of the postings",
        source: MASS_BALANCE,
        how: How::Sum(terms),
    }
}

/// Draws up the account of mass.
pub(super) fn draw_up(draft: &mut Draft, route: &RouteProgram, site: &SiteUse, desk: &Desk) {
    let all: Vec<Material> = materials(route).collect();
    let passed = |place, direction, m| desk.cells.passed(place, direction, m) > 0.0;
    let name = |m: Material| route.materials[m.0 as usize].name.as_str();

    let feed = all.iter().map(|m| Term::out_of(Place::FEED, *m));
    let drawn = all.iter().map(|m| Term::out_of(Place::STORE, *m));
    let back = all.iter().map(|m| Term::into(Place::STORE, *m).times(Factor::Minus));
    draft.add(sum(
        "mass.in".into(),
        "all mass in".into(),
        "feed and everything drawn from the store, gross of what is returned".into(),
        feed.clone().chain(drawn.clone()).collect(),
    ));
    draft.add(sum(
        "mass.feed".into(),
        "feed taken in".into(),
        "samples or raw material, with their water".into(),
        feed.collect(),
    ));
    draft.add(sum(
        "mass.bought".into(),
        "bought".into(),
        "drawn from the store less returned to it".into(),
        drawn.chain(back).collect(),
    ));
    let solvents = all.iter().filter(|m| route.materials[m.0 as usize].substance.class == Class::Solvent);
    draft.add(sum(
        "air.solvents".into(),
        "solvents to air".into(),
        "to hood and room; gases such as CO2 and nitrogen are not in it".into(),
        solvents.flat_map(|m| [Place::HOOD, Place::ROOM].map(|p| Term::into(p, *m))).collect(),
    ));
    for &m in &all {
        if passed(Place::FEED, Direction::OutOf, m) {
            draft.add(sum(
                format!("mass.feed.{}", slug(name(m))),
                format!("{} in the feed", name(m)),
                "samples or raw material".into(),
                vec![Term::out_of(Place::FEED, m)],
            ));
        }
    }
    for &m in &all {
        if passed(Place::STORE, Direction::OutOf, m) {
            draft.add(sum(
                format!("mass.drawn.{}", slug(name(m))),
                format!("{} drawn from the store", name(m)),
                "gross of what is returned".into(),
                vec![Term::out_of(Place::STORE, m)],
            ));
        }
    }
    for &m in &all {
        if passed(Place::STORE, Direction::Into, m) {
            draft.add(sum(
                format!("mass.returned.{}", slug(name(m))),
                format!("{} returned to the store", name(m)),
                "recovered and drawn again".into(),
                vec![Term::into(Place::STORE, m)],
            ));
        }
    }
    for place in destinations(site) {
        let here: Vec<Material> =
            all.iter().copied().filter(|m| passed(place, Direction::Into, *m)).collect();
        if here.is_empty() {
            continue;
        }
        let to = place_name(site, place);
        draft.add(sum(
            format!("mass.to.{}", slug(&to)),
            format!("to {to}"),
            "every material".into(),
            here.iter().map(|m| Term::into(place, *m)).collect(),
        ));
        for m in here {
            draft.add(sum(
                format!("mass.to.{}.{}", slug(&to), slug(name(m))),
                format!("{} to {to}", name(m)),
                "this material alone".into(),
                vec![Term::into(place, m)],
            ));
        }
    }
}

/// How far the book is from closing: (everything that came in − everything that left) / everything that came in.
///
/// It closes by construction; what is left is rounding.
pub(super) fn closure(route: &RouteProgram, site: &SiteUse, desk: &Desk) -> f64 {
    let (mut came, mut left) = (0.0, 0.0);
    for m in materials(route) {
        came += desk.cells.passed(Place::FEED, Direction::OutOf, m)
            + desk.cells.passed(Place::STORE, Direction::OutOf, m);
        left += desk.cells.passed(Place::STORE, Direction::Into, m);
        for place in destinations(site) {
            left += desk.cells.passed(place, Direction::Into, m);
        }
    }
    if came > 0.0 { (came - left) / came } else { 0.0 }
}
