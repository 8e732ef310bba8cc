//! What leaves as waste: mass, volume and containers of each declared stream.

use super::figure::{Draft, Factor, Figure, Group, How, Measure, Term};
use super::mass::{materials, slug};
use crate::ledger::{Direction, Place};
use crate::program::{Desk, RouteProgram, SiteUse};
use crate::source::{COMMON_PRACTICE, DEFINITION, MASS_BALANCE};

/// Draws up the account of waste.
///
/// The volume of a liquid stream is that of its liquids as if they mixed without change; solids dissolved in it add none.
/// The volume of a solid stream is its mass over the bulk density that the site states. Containers are carried over
/// through the year and rounded up once, not month by month.
pub(super) fn draw_up(draft: &mut Draft, route: &RouteProgram, site: &SiteUse, desk: &Desk) {
    let streams = (0..site.streams.len()).filter_map(Place::stream);
    draft.add(Figure {
        id: "waste.total.mass".into(),
        title: "all waste streams: mass".into(),
        group: Group::Waste,
        measure: Measure::Mass,
        boundary: "every declared stream; air, drain and what leaves elsewhere are not in it".into(),
        formula: "Σ of the postings",
        source: MASS_BALANCE,
        how: How::Sum(streams.flat_map(|p| materials(route).map(move |m| Term::into(p, m))).collect()),
    });
    for (i, stream) in site.streams.iter().enumerate() {
        let Some(place) = Place::stream(i) else { continue };
        let here: Vec<_> =
            materials(route).filter(|m| desk.cells.passed(place, Direction::Into, *m) > 0.0).collect();
        if here.is_empty() {
            continue;
        }
        let id = slug(&stream.name);
        draft.add(Figure {
            id: format!("waste.{id}.mass"),
            title: format!("{}: mass", stream.name),
            group: Group::Waste,
            measure: Measure::Mass,
            boundary: "everything poured or thrown into the stream, without the containers".into(),
            formula: "Σ of the postings",
            source: MASS_BALANCE,
            how: How::Sum(here.iter().map(|m| Term::into(place, *m)).collect()),
        });
        let terms = here.iter().filter_map(|m| {
            let factor = if stream.solid {
                Factor::Times(1.0 / stream.bulk_density_kg_m3)
            } else {
                Factor::Over(route.natures[m.0 as usize].density?)
            };
            Some(Term::into(place, *m).times(factor))
        });
        let volume = draft.add(Figure {
            id: format!("waste.{id}.volume"),
            title: format!("{}: volume", stream.name),
            group: Group::Waste,
            measure: Measure::Volume,
            boundary: if stream.solid {
                "mass over the stream's bulk density".into()
            } else {
                "liquids as if they mixed without change of volume; what has no liquid density adds none"
                    .into()
            },
            formula: if stream.solid { "V = Σ mᵢ / ρ_bulk" } else { "V = Σ mᵢ / ρᵢ" },
            source: DEFINITION,
            how: How::Sum(terms.collect()),
        });
        if let Some(container_m3) = stream.container_m3 {
            draft.add(Figure {
                id: format!("waste.{id}.containers"),
                title: format!("{}: containers filled", stream.name),
                group: Group::Waste,
                measure: Measure::Containers,
                boundary: "carried over through the year and rounded up once; a storage time limit may ask for more pick-ups".into(),
                formula: "n = ⌈V / (V_c · fill)⌉",
                source: COMMON_PRACTICE,
                how: How::Containers { of: volume, takes: container_m3 * stream.fill },
            });
        }
    }
}
