//! E-factor, process mass intensity and their kin, each gross and net of recovery, each naming its boundary.

use super::figure::{Draft, Factor, Figure, Group, How, Measure, Term};
use super::mass::{destinations, materials};
use crate::ledger::{Direction, Material, Place};
use crate::material::Class;
use crate::metric::MASS_METRICS;
use crate::program::{Desk, RouteProgram, SiteUse};
use crate::source::MASS_BALANCE;

/// Why a metric is not given.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Refusal {
    /// The metrics.
    pub metrics: &'static str,
    /// The reason, and what is given in their place.
    pub reason: String,
}

/// What is drawn from the store, by what it counts as.
#[derive(Clone, Copy, PartialEq, Eq)]
enum Kind {
    Solvent,
    Water,
    Other,
}

fn kind(class: Class) -> Kind {
    match class {
        Class::Solvent | Class::Gas => Kind::Solvent,
        Class::Water => Kind::Water,
        Class::Reagent
        | Class::DryingAgent
        | Class::Sorbent
        | Class::Consumable
        | Class::Matrix
        | Class::Solute => Kind::Other,
    }
}

/// Draws up the mass metrics; without a product they are refused, and the masses that would stand above the line are
/// given for each result in their place.
pub(super) fn draw_up(draft: &mut Draft, route: &RouteProgram, site: &SiteUse, desk: &Desk) -> Vec<Refusal> {
    let all: Vec<Material> = materials(route).collect();
    let is = |m: &Material, k: Kind| kind(route.materials[m.0 as usize].substance.class) == k;
    let from_feed = |m: &Material| desk.cells.passed(Place::FEED, Direction::OutOf, *m) > 0.0;
    let dry = |m: &&Material| !is(m, Kind::Water);

    let feed: Vec<Term> = all.iter().map(|m| Term::out_of(Place::FEED, *m)).collect();
    let drawn = |k: Kind| {
        all.iter().filter(move |m| is(m, k)).map(|m| Term::out_of(Place::STORE, *m)).collect::<Vec<_>>()
    };
    let back = |k: Kind| {
        all.iter()
            .filter(move |m| is(m, k))
            .map(|m| Term::into(Place::STORE, *m).times(Factor::Minus))
            .collect::<Vec<_>>()
    };
    let net = |k: Kind| [drawn(k), back(k)].concat();
    let (solvent, water, other) = (drawn(Kind::Solvent), drawn(Kind::Water), drawn(Kind::Other));
    let gross = [feed.clone(), solvent.clone(), water.clone(), other.clone()].concat();
    let all_net = [feed, net(Kind::Solvent), net(Kind::Water), net(Kind::Other)].concat();
    let dry_feed: Vec<Term> = all.iter().filter(dry).map(|m| Term::out_of(Place::FEED, *m)).collect();
    let dry_gross = [dry_feed.clone(), solvent.clone(), other.clone()].concat();
    let dry_net = [dry_feed.clone(), net(Kind::Solvent), net(Kind::Other)].concat();
    // Waste is everything that leaves and is neither product, by-product, stock nor returned to the store.
    let kept = [Place::PRODUCT, Place::BY_PRODUCT, Place::HELD];
    let waste = |keep: &dyn Fn(&Material) -> bool| {
        destinations(site)
            .filter(|p| !kept.contains(p))
            .flat_map(|p| all.iter().filter(|m| keep(m)).map(move |m| Term::into(p, *m)))
            .collect::<Vec<_>>()
    };
    let waste_net = waste(&|m| !is(m, Kind::Water));
    let returned: Vec<Term> = all.iter().filter(dry).map(|m| Term::into(Place::STORE, *m)).collect();
    let waste_gross = [waste_net.clone(), returned].concat();
    let waste_bought = waste(&|m| !is(m, Kind::Water) && !from_feed(m));
    let product: Vec<Term> = all.iter().map(|m| Term::into(Place::PRODUCT, *m)).collect();
    let less_product = |terms: &[Term]| {
        let minus = product.iter().map(|t| t.times(Factor::Minus));
        terms.iter().copied().chain(minus).collect::<Vec<_>>()
    };

    let mut product_kg = 0.0;
    for m in &all {
        product_kg += desk.cells.passed(Place::PRODUCT, Direction::Into, *m);
    }
    let mut mass = |id: &str, title: &str, boundary: &str, terms: Vec<Term>| {
        draft.add(Figure {
            id: format!("input.{id}"),
            title: title.into(),
            group: Group::Metric,
            measure: Measure::Mass,
            boundary: boundary.into(),
            formula: "Σ of the postings",
            source: MASS_BALANCE,
            how: How::Sum(terms),
        })
    };
    let inputs_gross = mass(
        "gross",
        "all inputs, gross",
        "feed, solvents, gases, reagents, disposables and process water as drawn; cooling water and CO2 sent round are not inputs",
        gross.clone(),
    );
    let inputs_net = mass(
        "net",
        "all inputs, net of recovery",
        "as gross, less what is returned to the store",
        all_net.clone(),
    );
    let solvent_gross = mass("solvent.gross", "solvents and gases, gross", "as drawn", solvent);
    let solvent_net =
        mass("solvent.net", "solvents and gases, net of recovery", "drawn less returned", net(Kind::Solvent));
    let process_water = mass(
        "water",
        "process water",
        "drawn from the store; water in the feed and cooling water are not in it",
        water,
    );
    if product_kg <= 0.0 {
        return vec![Refusal {
            metrics: "E-factor, complete E, PMI, mass intensity, reaction mass efficiency, solvent and water intensity",
            reason: "nothing is placed in product, so there is no kilogram to divide by: see the input figures for each reported result"
                .to_owned(),
        }];
    }
    let no_water = mass(
        "no_water.gross",
        "inputs without water, gross",
        "feed without its water, solvents, gases, reagents, disposables as drawn",
        dry_gross,
    );
    let no_water_net = mass(
        "no_water.net",
        "inputs without water, net of recovery",
        "as gross, less what is returned",
        dry_net,
    );
    let simple = mass(
        "simple_excess",
        "feed and reagents less product",
        "no solvents, no water",
        less_product(&[dry_feed, other].concat()),
    );
    let complete_gross = mass(
        "complete_excess.gross",
        "all inputs less product, gross",
        "with water and solvents, no credit for recovery",
        less_product(&gross),
    );
    let complete_net = mass(
        "complete_excess.net",
        "all inputs less product, net",
        "with water and solvents, recovery credited",
        less_product(&all_net),
    );
    let leaving_gross = mass(
        "waste.gross",
        "waste without water, as if nothing were recovered",
        "streams, air, drain, destroyed, elsewhere, and what is returned to the store",
        waste_gross,
    );
    let leaving_net = mass(
        "waste.net",
        "waste without water",
        "streams, air, drain, destroyed, elsewhere; by-products and stock are not waste",
        waste_net,
    );
    let leaving_bought = mass(
        "waste.bought",
        "waste without water and without the feed's own remains",
        "as waste, less every material that comes with the feed",
        waste_bought,
    );
    let made =
        mass("product", "product", "everything placed in product, solvent left in it included", product);

    let mut ratio = |id: &str, title: &str, published: &str, boundary: &str, over, under| {
        // A key that no published metric has cannot be drawn up; a test walks through all of them.
        let Some(about) = MASS_METRICS.iter().find(|m| m.metric.key == published) else { return };
        draft.add(Figure {
            id: format!("metric.{id}"),
            title: title.into(),
            group: Group::Metric,
            measure: Measure::Ratio,
            boundary: boundary.into(),
            formula: about.metric.formula,
            source: about.metric.source,
            how: How::Ratio { over, under },
        });
    };
    ratio(
        "e_factor.net",
        "E-factor",
        "e-factor",
        "waste without water; recovered solvent is no waste; marc is waste unless placed in by-product",
        leaving_net,
        made,
    );
    ratio(
        "e_factor.gross",
        "E-factor, nothing recovered",
        "e-factor",
        "as E-factor, with everything returned to the store counted as waste",
        leaving_gross,
        made,
    );
    ratio(
        "e_factor.without_feed",
        "E-factor without the feed's remains",
        "e-factor",
        "solvents, gases, reagents and disposables lost; what is left of the feed is not counted",
        leaving_bought,
        made,
    );
    ratio(
        "simple_e",
        "simple E-factor",
        "simple-e-factor",
        "feed and reagents; no solvents, no water",
        simple,
        made,
    );
    ratio(
        "complete_e.gross",
        "complete E-factor, gross",
        "complete-e-factor",
        "all inputs with water and solvents, no credit for recovery",
        complete_gross,
        made,
    );
    ratio(
        "complete_e.net",
        "complete E-factor, net",
        "complete-e-factor",
        "all inputs with water and solvents, recovery credited",
        complete_net,
        made,
    );
    ratio(
        "pmi.gross",
        "process mass intensity, gross",
        "pmi",
        "all inputs with water, as drawn",
        inputs_gross,
        made,
    );
    ratio(
        "pmi.net",
        "process mass intensity, net",
        "pmi-net",
        "all inputs with water, less what is returned",
        inputs_net,
        made,
    );
    ratio(
        "mass_intensity.gross",
        "mass intensity, gross",
        "mass-intensity",
        "all inputs without water, as drawn",
        no_water,
        made,
    );
    ratio(
        "mass_intensity.net",
        "mass intensity, net",
        "mass-intensity",
        "all inputs without water, less what is returned",
        no_water_net,
        made,
    );
    ratio(
        "generalised_rme.gross",
        "generalised reaction mass efficiency, gross",
        "reaction-mass-efficiency-generalised",
        "1 / PMI gross",
        made,
        inputs_gross,
    );
    ratio(
        "generalised_rme.net",
        "generalised reaction mass efficiency, net",
        "reaction-mass-efficiency-generalised",
        "1 / PMI net",
        made,
        inputs_net,
    );
    ratio(
        "solvent_intensity.gross",
        "solvent intensity, gross",
        "solvent-intensity",
        "solvents and gases as drawn",
        solvent_gross,
        made,
    );
    ratio(
        "solvent_intensity.net",
        "solvent intensity, net",
        "solvent-intensity-net",
        "solvents and gases less what is returned",
        solvent_net,
        made,
    );
    ratio(
        "water_intensity",
        "water intensity",
        "water-intensity",
        "process water; not cooling water, not water in the feed",
        process_water,
        made,
    );
    vec![Refusal {
        metrics: "atom economy, stoichiometric reaction mass efficiency, carbon efficiency",
        reason: "they describe a reaction; an extraction has none".to_owned(),
    }]
}
