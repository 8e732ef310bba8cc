//! Hazard: statements, CHEM21 scores, Analytical Eco-Scale, the NEMI rules, hazard-weighted mass by place.
//!
//! Scores help to compare routes; they replace no risk assessment, no safety data sheet and no local rule.

use super::carbon_dioxide::CO2_CAS;
use super::figure::{Draft, Factor, Figure, Group, How, Measure, Term};
use super::mass::materials as all_materials;
use crate::hazard::chem21::{self, Assessment, NotScored};
use crate::hazard::eco_scale::{self, EcoScale, EcoScaleError};
use crate::hazard::nemi::{self, Acidity, Criterion};
use crate::hazard::{Label, label};
use crate::ledger::{Direction, Material, Place, Utility};
use crate::material::{Class, FlashPoint, Registration, Substance};
use crate::program::{Desk, RouteProgram, SiteUse};
use crate::source::{Source, Standing};

/// What one material of a route can do to people and water.
#[derive(Clone, Debug)]
pub struct MaterialHazard {
    /// Its index on the route.
    pub material: Material,
    /// Its name.
    pub name: String,
    /// Hazard statements, codes in order; the longer supplier label where the harmonised entry is shorter.
    pub statements: Vec<String>,
    /// As of when.
    pub as_of: String,
    /// Where the statements come from: a key of the catalogue's bibliography or the plan's own words; empty when nothing is
    /// known of its hazards.
    pub source: String,
    /// What the statements bring on a label.
    pub label: Label,
    /// CHEM21 scores for solvents, or why there are none; `None` for what is no solvent.
    pub chem21: Option<Result<Assessment, NotScored>>,
}

/// The hazard account of one route.
#[derive(Clone, Debug)]
pub struct HazardAccount {
    /// Every material drawn from the store, and what of the feed carries statements.
    pub materials: Vec<MaterialHazard>,
    /// Analytical Eco-Scale for one reported result.
    pub eco_scale: Result<EcoScale, EcoScaleError>,
    /// The four NEMI rules.
    pub nemi: [Criterion; 4],
    /// Materials that reach air or drain without a score, so that the weighted masses leave them out.
    pub not_scored: Vec<String>,
}

/// Our own weighting, nobody's method.
const WEIGHTING: Source = Source::new(
    "our own weighting: mass times CHEM21 score; nobody's published method",
    Standing::Definition,
);

/// Looks up the materials of a route.
pub(super) fn materials(route: &RouteProgram, desk: &Desk, site: &SiteUse) -> Vec<MaterialHazard> {
    let mut out = Vec::new();
    for m in all_materials(route) {
        let used = &route.materials[m.0 as usize];
        let s = &*used.substance;
        let drawn = desk.cells.passed(Place::STORE, Direction::OutOf, m) > 0.0;
        let fed = desk.cells.passed(Place::FEED, Direction::OutOf, m) > 0.0;
        if !(drawn || fed && !s.hazard.statements.is_empty()) {
            continue;
        }
        let statements = if s.hazard.supplier_statements.len() > s.hazard.statements.len() {
            s.hazard.supplier_statements.clone()
        } else {
            s.hazard.statements.clone()
        };
        let codes: Vec<&str> = statements.iter().map(String::as_str).collect();
        let as_of = if s.hazard.as_of.is_empty() {
            site.as_of.clone().unwrap_or_default()
        } else {
            s.hazard.as_of.to_string()
        };
        out.push(MaterialHazard {
            material: m,
            name: used.name.clone(),
            as_of,
            source: s.hazard.source.to_string(),
            label: label(&codes),
            chem21: matches!(s.class, Class::Solvent | Class::Water)
                .then(|| chem21::assess(&inputs(s, &codes))),
            statements,
        });
    }
    out
}

fn inputs<'a>(s: &Substance, codes: &'a [&'a str]) -> chem21::Inputs<'a> {
    let auto_ignites = s.autoignition_k.as_ref().is_some_and(|f| f.value < 473.15);
    let peroxides = codes.iter().any(|c| c.starts_with("EUH019"));
    // The catalogue keeps all extra points together: what auto-ignition and peroxides do not explain is static charge.
    let explained = u8::from(auto_ignites) + u8::from(peroxides);
    chem21::Inputs {
        flash_point: match &s.flash_point_k {
            FlashPoint::NotKnown => chem21::FlashPoint::NotKnown,
            FlashPoint::None => chem21::FlashPoint::None,
            FlashPoint::Known(f) => chem21::FlashPoint::AtK(f.value),
        },
        boiling_point_k: s.boiling_point_k.as_ref().map(|f| f.value),
        autoignition_k: s.autoignition_k.as_ref().map(|f| f.value),
        builds_static: Some(s.chem21_extra_safety_points > explained),
        decomposes_above_500_j_per_g: s.cas.as_deref() == Some("75-52-5"),
        statements: codes,
        registration: match s.registration {
            Registration::Full => chem21::Registration::Full,
            Registration::Partial | Registration::Unknown => chem21::Registration::NotFull,
        },
        is_water: s.class == Class::Water,
    }
}

/// Draws up hazard-weighted mass: health for what goes to air, environment for what goes to the drain.
pub(super) fn draw_up(draft: &mut Draft, route: &RouteProgram, desk: &Desk, assessed: &[MaterialHazard]) {
    let reaches = |place, m| desk.cells.passed(place, Direction::Into, m) > 0.0;
    let scored = |places: &[Place], score: fn(&Assessment) -> u8| {
        let mut terms = Vec::new();
        for hazard in assessed {
            let Some(Ok(assessment)) = &hazard.chem21 else { continue };
            for &place in places {
                if reaches(place, hazard.material) {
                    let factor = Factor::Times(f64::from(score(assessment)));
                    terms.push(Term::into(place, hazard.material).times(factor));
                }
            }
        }
        terms
    };
    let mut figure = |id: &str, title: &str, boundary: &str, terms| {
        draft.add(Figure {
            id: format!("hazard.{id}"),
            title: title.into(),
            group: Group::Hazard,
            measure: Measure::WeightedMass,
            boundary: boundary.into(),
            formula: "Σ mᵢ · scoreᵢ",
            source: WEIGHTING,
            how: How::Sum(terms),
        });
    };
    if all_materials(route).any(|m| reaches(Place::HOOD, m) || reaches(Place::ROOM, m)) {
        figure(
            "air_health",
            "to air, weighted by health score",
            "solvents to hood and room times their CHEM21 health score; gases have no score and are left out",
            scored(&[Place::HOOD, Place::ROOM], |a| a.health.value),
        );
    }
    if all_materials(route).any(|m| reaches(Place::DRAIN, m)) {
        figure(
            "drain_environment",
            "to the drain, weighted by environment score",
            "solvents and water to the drain times their CHEM21 environment score",
            scored(&[Place::DRAIN], |a| a.environment.value),
        );
    }
}

/// Scores the route as an analytical procedure.
pub(super) fn account(
    route: &RouteProgram,
    site: &SiteUse,
    desk: &Desk,
    materials: Vec<MaterialHazard>,
) -> HazardAccount {
    let results = desk.runs.results;
    let passed = |place, direction, m| desk.cells.passed(place, direction, m);
    let to_air = |m| passed(Place::HOOD, Direction::Into, m) + passed(Place::ROOM, Direction::Into, m);
    let substance = |m: Material| &*route.materials[m.0 as usize].substance;

    let mut reagents = Vec::new();
    for hazard in &materials {
        let drawn_kg = passed(Place::STORE, Direction::OutOf, hazard.material);
        let s = substance(hazard.material);
        if drawn_kg > 0.0 && matches!(s.class, Class::Solvent | Class::Water | Class::Reagent | Class::Gas) {
            reagents.push(eco_scale::Reagent {
                name: &hazard.name,
                amount: eco_scale::Amount::MassKg(drawn_kg / results),
                pictograms: u32::try_from(hazard.label.pictograms.len()).unwrap_or(u32::MAX),
                signal_word: hazard.label.signal_word,
                water_or_inert_gas: s.class == Class::Water
                    || s.class == Class::Gas
                        && (hazard.statements.is_empty() || s.cas.as_deref() == Some(CO2_CAS)),
            });
        }
    }
    let (mut waste_kg, mut treatment) = (0.0, eco_scale::Treatment::Recycling);
    for (i, stream) in site.streams.iter().enumerate() {
        let Some(place) = Place::stream(i) else { continue };
        let mut here_kg = 0.0;
        for m in all_materials(route) {
            here_kg += passed(place, Direction::Into, m);
        }
        if here_kg > 0.0 {
            waste_kg += here_kg;
            treatment = worse(treatment, &stream.treatment);
        }
    }
    for m in all_materials(route) {
        let here_kg = passed(Place::DRAIN, Direction::Into, m) + passed(Place::ELSEWHERE, Direction::Into, m);
        if here_kg > 0.0 {
            waste_kg += here_kg;
            treatment = eco_scale::Treatment::None;
        }
    }
    let eco = eco_scale::score(
        &eco_scale::Procedure {
            reagents: &reagents,
            energy_j_per_sample: desk.spent[Utility::Electricity as usize] / results,
            emits_to_air: all_materials(route).any(|m| to_air(m) > 0.0),
            waste: (waste_kg > 0.0).then_some(eco_scale::Amount::MassKg(waste_kg / results)),
            treatment,
        },
        eco_scale::Options::default(),
    );

    let drawn = || materials.iter().filter(|h| passed(Place::STORE, Direction::OutOf, h.material) > 0.0);
    let pbt: Vec<&str> = drawn().filter(|h| substance(h.material).pbt).map(|h| h.name.as_str()).collect();
    let listed: Vec<String> = drawn().filter_map(|h| rcra(&h.name, substance(h.material))).collect();
    let rcra: Vec<&str> = listed.iter().map(String::as_str).collect();
    let nemi = nemi::profile(&nemi::Inputs {
        pbt: Some(&pbt),
        rcra: Some(&rcra),
        acidity: route.ph.map_or(Acidity::NotKnown, |(lowest, highest)| Acidity::Range { lowest, highest }),
        waste_kg_per_sample: Some(waste_kg / results),
    });
    let not_scored = materials
        .iter()
        .filter(|h| !matches!(h.chem21, Some(Ok(_))))
        .filter(|h| to_air(h.material) + passed(Place::DRAIN, Direction::Into, h.material) > 0.0)
        .map(|h| h.name.clone())
        .collect();
    HazardAccount { eco_scale: eco, nemi, not_scored, materials }
}

/// The listed codes that a used solvent or an unused product of it can carry.
fn rcra(name: &str, s: &Substance) -> Option<String> {
    let r = &s.rcra;
    let mut codes: Vec<&str> = Vec::new();
    codes.extend(r.characteristic.iter().map(String::as_str));
    codes.extend(r.toxicity.iter().map(String::as_str));
    codes.extend(r.spent.iter().map(String::as_str));
    codes.extend(r.unused.as_deref());
    (!codes.is_empty()).then(|| format!("{name} ({})", codes.join(", ")))
}

/// The less helpful of two treatments.
fn worse(a: eco_scale::Treatment, word: &str) -> eco_scale::Treatment {
    use eco_scale::Treatment::{Degradation, None, Passivation, Recycling};
    let b = match word {
        "recycling" => Recycling,
        "degradation" => Degradation,
        "passivation" => Passivation,
        _ => None,
    };
    let rank = |t| match t {
        Recycling => 0,
        Degradation => 1,
        Passivation => 2,
        None => 3,
    };
    if rank(b) > rank(a) { b } else { a }
}
