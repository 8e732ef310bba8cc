//! What the account of climate rests on, as the plan says it.

use super::money::{rows, text};
use super::resolve::RouteBuilder;
use super::time::number_of;
use crate::chance::In;
use crate::climate::{Edition, Origin as Co2Origin};
use crate::ledger::Material;
use crate::plan::{Problem, Site, below};
use crate::quantity::{Entry, Kind, Origin};

/// The factors of the account of climate.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct ClimateUse {
    /// CO2-equivalent of a joule of electricity; kg.
    pub electricity_j: Option<In>,
    /// Year and boundary of that factor, as the plan says.
    pub electricity_of: String,
    /// Whether the plan asks for the account beyond electricity.
    pub asked: bool,
    /// Whose warming potentials are read.
    pub edition: Edition,
    /// Where bought CO2 comes from.
    pub co2_origin: Option<Co2Origin>,
    /// The share of each stream that is burnt, by its index.
    pub incinerated: Vec<Option<In>>,
    /// CO2-equivalent of making a kilogram of a material.
    pub upstream: Vec<(Material, In)>,
    /// Where the factors come from.
    pub source: String,
}

const AT: &str = "site.climate";

impl RouteBuilder<'_> {
    pub(super) fn climate(&mut self, site: &Site) -> ClimateUse {
        let doc = &site.climate;
        let mut out = ClimateUse {
            asked: !doc.is_empty(),
            edition: text(doc, "gwp").and_then(Edition::named).unwrap_or_default(),
            co2_origin: text(doc, "co2_origin").and_then(Co2Origin::named),
            incinerated: vec![None; site.streams.len()],
            source: text(doc, "source").unwrap_or_default().trim().to_owned(),
            ..ClimateUse::default()
        };
        if let Some(e) = &site.electricity {
            let path = "site.electricity.climate";
            let known = e.climate.as_deref().filter(|t| t.trim() != "not known");
            out.electricity_j = self.read_optional(known, Kind::ClimatePerEnergy, path);
            let parts = [e.year.as_ref().and_then(number_of), e.boundary.as_deref(), e.source.as_deref()];
            out.electricity_of = parts.into_iter().flatten().collect::<Vec<_>>().join(", ");
            if out.electricity_j.is_some() && e.year.is_none() {
                self.problems.push(Problem::note(
                    "site.electricity.year",
                    "no year stands beside the climate figure of electricity, which changes from year to year",
                ));
            }
        }
        for (name, share) in rows(doc, "incinerated") {
            let path = below(&below(AT, "incinerated"), name);
            match site.streams.iter().position(|s| s.name == *name) {
                Some(i) => {
                    let share = self.read_optional(Some(share), Kind::Fraction, &path);
                    if let Some(slot) = out.incinerated.get_mut(i) {
                        *slot = share;
                    }
                }
                None => self.problems.push(Problem::error(
                    path,
                    format!("no stream is called \"{name}\""),
                    "the name of a stream of the site",
                )),
            }
        }
        let upstream = rows(doc, "upstream");
        if !upstream.is_empty() && out.source.is_empty() {
            self.problems.push(Problem::error(
                below(AT, "source"),
                "factors of production without a source",
                "where they come from, such as \"supplier's declaration, 2025\"",
            ));
        }
        for (name, factor) in upstream {
            let path = below(&below(AT, "upstream"), name);
            let known = match self.known_name(name) {
                Ok(known) => known,
                Err((found, need)) => {
                    self.problems.push(Problem::error(path, found, need));
                    continue;
                }
            };
            let at = self.materials.iter().position(|m| m.name == known);
            let Some(material) = at.and_then(|i| u16::try_from(i).ok()).map(Material) else { continue };
            match self.amounts.entry(factor, Kind::MassPerMass) {
                Ok(Entry::Known(amount)) => {
                    let slot = self.input(path, &amount, Origin::Entered);
                    out.upstream.push((material, slot));
                }
                Ok(Entry::NotKnown) => {}
                Err(e) => {
                    self.problems.push(Problem::error(
                        path,
                        format!("\"{factor}\": {}", e.found()),
                        e.need(),
                    ));
                }
            }
        }
        out
    }
}
