//! Climate: lines that stand beside one another, each with its scope, never one netted number.

use super::carbon_dioxide::CO2_CAS;
use super::figure::{Draft, Entry, Figure, Group, How, Line, Measure};
use super::mass::materials;
use crate::climate::{GWP_SOURCE, gwp100};
use crate::ledger::{Direction, Material, Place, Utility};
use crate::material::Class;
use crate::metric::incineration;
use crate::program::{Desk, RouteProgram, SiteUse};
use crate::source::{SITE, Source};

/// Draws up the account of climate, as far as the plan asks for it; names what it leaves open, with the path at which the
/// plan could say it.
pub(super) fn draw_up(
    draft: &mut Draft,
    route: &RouteProgram,
    site: &SiteUse,
    desk: &Desk,
) -> Vec<(String, String)> {
    let climate = &route.climate;
    let mut missing = Vec::new();
    let mut line = |id: &str, title: String, boundary: String, formula, source: Source, lines: Vec<Line>| {
        draft.add(Figure {
            id: format!("climate.{id}"),
            title,
            group: Group::Climate,
            measure: Measure::Climate,
            boundary,
            formula,
            source,
            how: How::Lines(lines),
        });
    };
    let drawn = desk.spent[Utility::Electricity as usize] > 0.0;
    if let Some(factor) = climate.electricity_j {
        if drawn || route.uncounted.is_empty() {
            let lines = vec![Line::of(Entry::Spent(Utility::Electricity)).by(factor)];
            let boundary = format!("scope 2; {}", climate.electricity_of);
            line("electricity", "electricity".into(), boundary, "W × factor", SITE, lines);
        }
    } else if climate.asked && drawn {
        missing.push(("electricity".to_owned(), "site.electricity.climate".to_owned()));
    }
    if !climate.asked {
        return missing;
    }
    let substance = |m: Material| &*route.materials[m.0 as usize].substance;
    let is_co2 = |m: &Material| substance(*m).cas.as_deref() == Some(CO2_CAS);
    let to_air = |m: Material| [Place::HOOD, Place::ROOM].map(|p| (Entry::Cell(p, Direction::Into, m), m));
    let in_air = |m: &Material| {
        desk.cells.passed(Place::HOOD, Direction::Into, *m)
            + desk.cells.passed(Place::ROOM, Direction::Into, *m)
            > 0.0
    };
    let vapours: Vec<Material> =
        materials(route).filter(|m| substance(*m).class == Class::Solvent && in_air(m)).collect();

    let edition = climate.edition;
    let mut direct = Vec::new();
    for &m in &vapours {
        let s = substance(m);
        let halogens = s.elements().and_then(Result::ok);
        let halogenated = halogens.is_some_and(|e| ["F", "Cl", "Br", "I"].iter().any(|x| e.count(x) > 0));
        match s.cas.as_deref().and_then(|cas| gwp100(cas, edition)) {
            Some(gwp) => direct.extend(to_air(m).map(|(of, _)| Line::of(of).times(gwp))),
            None if halogenated => missing.push((
                format!("the warming potential of {}, which {} does not give", s.name, edition.word()),
                "site.climate.gwp".to_owned(),
            )),
            None => {}
        }
    }
    let boundary = format!(
        "scope 1; solvents with a 100-year warming potential in {}, to hood and room",
        edition.word()
    );
    line("direct", "halocarbons to air".into(), boundary, "Σ m × GWP100", GWP_SOURCE, direct);

    let vented: Vec<Line> =
        materials(route).filter(|m| is_co2(m)).flat_map(to_air).map(|(of, _)| Line::of(of)).collect();
    let any_vented = materials(route).any(|m| is_co2(&m) && in_air(&m));
    match climate.co2_origin {
        Some(origin) => line(
            "vented",
            format!("CO2 vented, {}", origin.word()),
            origin.scope().to_owned(),
            "m",
            SITE,
            vented,
        ),
        None if any_vented => {
            missing
                .push(("where the vented CO2 comes from".to_owned(), "site.climate.co2_origin".to_owned()));
        }
        None => {}
    }

    let mut oxidised = Vec::new();
    for &m in &vapours {
        if let Some(factor) = substance(m).stoichiometric_co2_kg_kg() {
            oxidised.extend(to_air(m).map(|(of, _)| Line::of(of).times(factor)));
        }
    }
    line(
        "oxidised",
        "solvents to air, once oxidised".into(),
        "no gas of scope 1 itself: what the vapour becomes in the air; for a solvent from plants it is biogenic".into(),
        "Σ m × 44.009 n_C / M",
        incineration::SOURCE,
        oxidised,
    );

    let mut burnt = Vec::new();
    for (i, share) in climate.incinerated.iter().enumerate() {
        let (Some(share), Some(place)) = (share, Place::stream(i)) else { continue };
        for m in materials(route).filter(|m| desk.cells.passed(place, Direction::Into, *m) > 0.0) {
            if let Some(factor) = substance(m).stoichiometric_co2_kg_kg().filter(|_| !is_co2(&m)) {
                burnt.push(Line::of(Entry::Cell(place, Direction::Into, m)).by(*share).times(factor));
            }
        }
    }
    if climate.incinerated.iter().any(Option::is_some) {
        let names: Vec<&str> = site
            .streams
            .iter()
            .zip(&climate.incinerated)
            .filter_map(|(s, share)| share.map(|_| s.name.as_str()))
            .collect();
        line(
            "incineration",
            "waste burnt".into(),
            format!(
                "scope 3, treatment of waste; carbon of materials with a known formula in {}; support fuel and recovered heat are not in it",
                names.join(", ")
            ),
            "Σ m × share × 44.009 n_C / M",
            incineration::SOURCE,
            burnt,
        );
    }

    if !climate.upstream.is_empty() {
        let mut made = Vec::new();
        for &(m, factor) in &climate.upstream {
            made.push(Line::of(Entry::Cell(Place::STORE, Direction::OutOf, m)).by(factor));
            made.push(Line::of(Entry::Cell(Place::STORE, Direction::Into, m)).by(factor).times(-1.0));
        }
        let names: Vec<&str> =
            climate.upstream.iter().map(|(m, _)| route.materials[m.0 as usize].name.as_str()).collect();
        line(
            "upstream",
            "making of what is bought".into(),
            format!("scope 3, purchased goods; only {}; {}", names.join(", "), climate.source),
            "Σ m × factor",
            SITE,
            made,
        );
    }
    missing
}
