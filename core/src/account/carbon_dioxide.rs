//! Carbon dioxide: drawn, returned, made up, vented, left elsewhere, sent round.

use super::figure::{Draft, Factor, Figure, Group, How, Measure, Term};
use super::mass::{destinations, materials};
use crate::ledger::{Direction, Place, Utility};
use crate::program::{Desk, RouteProgram, SiteUse};
use crate::source::{MASS_BALANCE, SITE};
use crate::step::DenseCo2;

/// The CAS number of carbon dioxide.
pub(super) const CO2_CAS: &str = "124-38-9";

/// Draws up the account of CO2, where the route uses any.
pub(super) fn draw_up(
    draft: &mut Draft,
    route: &RouteProgram,
    site: &SiteUse,
    desk: &Desk,
    dense: &[(usize, DenseCo2)],
) {
    let Some(co2) =
        materials(route).find(|m| route.materials[m.0 as usize].substance.cas.as_deref() == Some(CO2_CAS))
    else {
        return;
    };
    if desk.cells.passed(Place::STORE, Direction::OutOf, co2) <= 0.0 {
        return;
    }
    let mut figure = |id: &str, title: &str, boundary: &str, how| -> usize {
        draft.add(Figure {
            id: format!("co2.{id}"),
            title: title.into(),
            group: Group::CarbonDioxide,
            measure: Measure::Mass,
            boundary: boundary.into(),
            formula: "Σ of the postings",
            source: MASS_BALANCE,
            how,
        })
    };
    let drawn = Term::out_of(Place::STORE, co2);
    let back = Term::into(Place::STORE, co2);
    let air = [Place::HOOD, Place::ROOM];
    figure(
        "used",
        "CO2 drawn from supply",
        "gross: everything drawn, whether or not it comes back; a cylinder's heel is not drawn",
        How::Sum(vec![drawn]),
    );
    figure(
        "recycled",
        "CO2 returned to supply",
        "what the loop gives back after let-down",
        How::Sum(vec![back]),
    );
    let make_up = figure(
        "make_up",
        "CO2 made up",
        "net: drawn less returned; what has to be bought",
        How::Sum(vec![drawn, back.times(Factor::Minus)]),
    );
    figure(
        "vented",
        "CO2 vented",
        "to hood and room, leaks included",
        How::Sum(air.map(|p| Term::into(p, co2)).to_vec()),
    );
    let other = destinations(site).filter(|p| !air.contains(p)).map(|p| Term::into(p, co2));
    figure(
        "carried_off",
        "CO2 carried off in extract, marc and waste",
        "dissolved or enclosed; it escapes later, elsewhere",
        How::Sum(other.collect()),
    );
    figure(
        "circulated",
        "CO2 sent through the vessel",
        "however often the same gram passes; neither gross nor net input",
        How::Spent(Utility::CirculatedCo2),
    );
    // Several steps draw from the same cylinders: the first that says how large they are speaks for all.
    let Some((fill_kg, heel)) = dense.iter().find_map(|(_, d)| d.cylinder) else { return };
    let mut bought = |id: &str, title: &str, measure, boundary: &str, formula, how| -> usize {
        draft.add(Figure {
            id: format!("co2.{id}"),
            title: title.into(),
            group: Group::CarbonDioxide,
            measure,
            boundary: boundary.into(),
            formula,
            source: SITE,
            how,
        })
    };
    let cylinders = bought(
        "cylinders",
        "cylinders of CO2",
        Measure::Containers,
        "what is made up, from cylinders whose heel cannot be used; whole in a year",
        "n = ⌈m/(m_cylinder (1 − heel))⌉",
        How::Containers { of: make_up, takes: fill_kg * (1.0 - heel) },
    );
    bought(
        "heel",
        "heels of cylinders",
        Measure::Mass,
        "bought and sent back with the cylinders; not emitted here, and not in the book of mass",
        "m = n m_cylinder heel",
        How::Times { of: cylinders, factor: fill_kg * heel },
    );
}
