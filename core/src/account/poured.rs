//! What routes pour into each stream, and of which charges it comes: the book read once more with the origin of every gram.
//!
//! Spent-solvent codes go by what a solvent was before use, so the mass on the bench is followed by charge: where a share of a
//! place moves on, the same share of each origin moves.

use super::open::{RouteAccount, rule_of};
use crate::code::{Charge, Contents, Part};
use crate::ledger::{Material, Place, Posting, StepIx};
use crate::material::Class;
use crate::program::{RouteProgram, SiteUse};

/// A route whose waste is poured, with its account.
#[derive(Clone, Copy)]
pub struct Pouring<'a> {
    /// The route.
    pub route: &'a RouteProgram,
    /// Its account.
    pub account: &'a RouteAccount,
}

impl std::fmt::Debug for Pouring<'_> {
    fn fmt(&self, f: &mut std::fmt::Formatter<'_>) -> std::fmt::Result {
        f.write_str(&self.route.name)
    }
}

/// What one stream receives in a year.
#[derive(Clone, Debug)]
pub struct StreamContents<'a> {
    /// The index of the stream.
    pub stream: usize,
    /// What it holds, kg a year, with the charges that reach it.
    pub contents: Contents<'a>,
}

/// What each stream receives from these routes together, in the order of the site; streams that receive nothing are left out.
#[must_use]
pub fn poured<'a>(routes: &[Pouring<'a>], site: &SiteUse) -> Vec<StreamContents<'a>> {
    let mut out = Vec::new();
    let followed: Vec<Followed> = routes.iter().map(|p| Followed::of(p.route, p.account)).collect();
    for (i, stream) in site.streams.iter().enumerate() {
        let Some(place) = Place::stream(i) else { continue };
        let mut contents = Contents {
            solid: stream.solid,
            flash: stream.waste.flash,
            unused: stream.waste.unused,
            activity: site.waste.activity,
            ..Contents::default()
        };
        let mut ph = None;
        for (pouring, followed) in routes.iter().zip(&followed) {
            if add(&mut contents, pouring, followed, place, routes.len() > 1) {
                ph = wider(ph, pouring.route.ph);
            }
        }
        contents.ph = stream.waste.ph.or(ph.flatten());
        if contents.mass_kg() > 0.0 {
            out.push(StreamContents { stream: i, contents });
        }
    }
    out
}

/// The range that holds both; nothing is known once one of them is not.
fn wider(so_far: Option<Option<(f64, f64)>>, more: Option<(f64, f64)>) -> Option<Option<(f64, f64)>> {
    match so_far {
        None => Some(more),
        Some(known) => Some(
            known.zip(more).map(|((a, b), (c, d))| (if c < a { c } else { a }, if d > b { d } else { b })),
        ),
    }
}

/// Adds what one route pours into a stream; whether it pours anything.
fn add<'a>(
    to: &mut Contents<'a>,
    Pouring { route, .. }: &Pouring<'a>,
    followed: &Followed,
    place: Place,
    name_routes: bool,
) -> bool {
    let mut any = false;
    for (m, used) in route.materials.iter().enumerate() {
        let kg = followed.kg(place, m);
        if kg <= 0.0 {
            continue;
        }
        any = true;
        let density =
            route.natures.get(m).and_then(|n| n.density).and_then(|slot| route.inputs.get(slot.0 as usize));
        let part = Part { substance: &used.substance, kg, density_kg_m3: density.map(|i| i.central_si) };
        match to.parts.iter_mut().find(|p| p.substance.name == part.substance.name) {
            Some(there) => there.kg += kg,
            None => to.parts.push(part),
        }
    }
    for (origin, charge) in followed.charges.iter().enumerate() {
        let solvents = || charge.volumes_m3.iter().filter(|(m, _)| is_solvent(route, *m));
        let there = solvents().any(|(m, _)| followed.from(place, *m, origin) > 0.0);
        if !there {
            continue;
        }
        let step = rule_of(route, charge.step, charge.rule).map_or("", |r| r.name);
        let (number, title) = match charge.step {
            StepIx::Step(i) => {
                ((i + 1).to_string(), route.steps.get(i as usize).map_or("", |s| s.technique.title))
            }
            StepIx::Opening | StepIx::Closing => (String::new(), ""),
        };
        let mut what = ["step ", &number, ", ", title, ", ", step].concat();
        if name_routes {
            what = [&route.name, ": ", &what].concat();
        }
        let volumes_m3 = charge
            .volumes_m3
            .iter()
            .filter_map(|(m, m3)| Some((&*route.materials.get(*m)?.substance, *m3)))
            .collect();
        to.charges.push(Charge { what, volumes_m3 });
    }
    any
}

fn is_solvent(route: &RouteProgram, m: usize) -> bool {
    route.materials.get(m).is_some_and(|u| u.substance.class == Class::Solvent)
}

/// One draw from the store of what is measured out together.
struct Drawn {
    step: StepIx,
    rule: crate::ledger::RuleIx,
    /// Where each material is drawn for itself, one after the other, which.
    alone: Option<Material>,
    volumes_m3: Vec<(usize, f64)>,
}

/// Masses by place, material and origin; kg a year.
struct Followed {
    charges: Vec<Drawn>,
    materials: usize,
    /// By place and material, then by origin: the charges, and last everything else.
    kg: Vec<Vec<f64>>,
}

impl Followed {
    fn of(route: &RouteProgram, account: &RouteAccount) -> Self {
        let mut charges: Vec<Drawn> = Vec::new();
        for p in account.trace.postings.iter().filter(|p| p.from == Place::STORE) {
            let density = route.natures.get(p.material.0 as usize).and_then(|n| n.density);
            let Some(density) = density.and_then(|slot| route.inputs.get(slot.0 as usize)) else { continue };
            let at = Self::origin(route, &charges, p).unwrap_or_else(|| {
                charges.push(Drawn {
                    step: p.step,
                    rule: p.rule,
                    alone: alone(route, p),
                    volumes_m3: Vec::new(),
                });
                charges.len() - 1
            });
            if let Some(charge) = charges.get_mut(at) {
                let (m, m3) = (p.material.0 as usize, p.kg_a_year() / density.central_si);
                match charge.volumes_m3.iter_mut().find(|(known, _)| *known == m) {
                    Some(row) => row.1 += m3,
                    None => charge.volumes_m3.push((m, m3)),
                }
            }
        }
        let places = crate::ledger::OUTSIDE_PLACES + crate::ledger::BENCH_PLACES + route.streams;
        let materials = route.materials.len();
        let mut followed = Self { kg: vec![Vec::new(); places * materials], charges, materials };
        for p in &account.trace.postings {
            followed.post(route, p);
        }
        followed
    }

    /// The charge to which a posting out of the store belongs.
    fn origin(route: &RouteProgram, charges: &[Drawn], p: &Posting) -> Option<usize> {
        let alone = alone(route, p);
        charges.iter().position(|c| c.step == p.step && c.rule == p.rule && c.alone == alone)
    }

    fn row(&self, place: Place, m: usize) -> usize {
        place.index() * self.materials + m
    }

    fn post(&mut self, route: &RouteProgram, p: &Posting) {
        let kg = p.kg_a_year();
        if kg <= 0.0 {
            return;
        }
        let origins = self.charges.len() + 1;
        let (from, to) = (self.row(p.from, p.material.0 as usize), self.row(p.to, p.material.0 as usize));
        let mut moved = vec![0.0; origins];
        if p.from.on_bench() || p.from.stream_index().is_some() {
            let Some(there) = self.kg.get_mut(from).filter(|row| !row.is_empty()) else { return };
            let mut all = 0.0;
            for kg in there.iter() {
                all += kg;
            }
            // The same share of each origin; a rounding above 1 is everything.
            let share = if kg < all { kg / all } else { 1.0 };
            for (moved, there) in moved.iter_mut().zip(there.iter_mut()) {
                *moved = *there * share;
                *there -= *moved;
            }
        } else {
            let origin = (p.from == Place::STORE).then(|| Self::origin(route, &self.charges, p)).flatten();
            if let Some(moved) = moved.get_mut(origin.unwrap_or(origins - 1)) {
                *moved = kg;
            }
        }
        let Some(row) = self.kg.get_mut(to) else { return };
        row.resize(origins, 0.0);
        for (there, moved) in row.iter_mut().zip(moved) {
            *there += moved;
        }
    }

    fn from(&self, place: Place, m: usize, origin: usize) -> f64 {
        self.kg.get(self.row(place, m)).and_then(|row| row.get(origin)).copied().unwrap_or(0.0)
    }

    fn kg(&self, place: Place, m: usize) -> f64 {
        let mut sum = 0.0;
        for kg in self.kg.get(self.row(place, m)).into_iter().flatten() {
            sum += kg;
        }
        sum
    }
}

/// Solvents that a cartridge sees one after the other are no blend: each is a charge of its own.
fn alone(route: &RouteProgram, p: &Posting) -> Option<Material> {
    let name = rule_of(route, p.step, p.rule)?.name;
    ["conditioning", "washing"].contains(&name).then_some(p.material)
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::account::account_text;
    use crate::example::EXAMPLES;

    /// The origins of every gram add up to what the book says of each stream.
    #[test]
    fn what_is_followed_is_what_was_posted() {
        let mut seen = 0;
        for example in EXAMPLES {
            let account = account_text(example.text);
            let program = account.program.as_ref().unwrap();
            for (work, accounts) in program.workloads.iter().zip(&account.workloads) {
                for (route, account) in work.routes.iter().zip(&accounts.routes) {
                    let account = account.as_ref().unwrap();
                    let found = poured(&[Pouring { route, account }], &program.site);
                    for s in &found {
                        let place = Place::stream(s.stream).unwrap();
                        let mut posted = 0.0;
                        for p in &account.trace.postings {
                            posted += p.kg_a_year()
                                * (f64::from(u8::from(p.to == place)) - f64::from(u8::from(p.from == place)));
                        }
                        assert!((s.contents.mass_kg() / posted - 1.0).abs() < 1e-9, "{}", example.key);
                        seen += s.contents.charges.len();
                    }
                }
            }
        }
        assert!(seen > EXAMPLES.len(), "{seen}");
    }
}
