//! From the document to a program: every name resolved, every amount read, every problem found.

use super::amounts::Amounts;
use super::materials::{MaterialBook, MaterialUse};
use super::reader::Reader;
use super::waste;
use super::{
    Assumption, Basis, Program, RouteProgram, SiteUse, StepProgram, StreamUse, Work, WorkloadProgram,
};
use crate::chance::{In, Input, continued_key, identity_key};
use crate::ledger::{BENCH_PLACES, Material, Nature, Place};
use crate::material::{Class, Substance};
use crate::order::Index;
use crate::plan::{Field, Plan, Problem, Route, Severity, Site, Stream, Workload, below, nearest};
use crate::quantity::{Amount, Kind, Origin, ShareBy, Spread, read, show};
use crate::source::{DEFINITION, Source};
use crate::step::{Container, Filling, TECHNIQUES, technique};

/// The most materials that one route may use: an index fits in 16 bits, and a plan with more has gone wrong.
const MOST_MATERIALS: usize = 500;
/// The most streams that a site may declare.
const MOST_STREAMS: usize = 200;

/// A plan resolved as far as it can be.
pub struct Resolved {
    /// The program, where the plan has no error.
    pub program: Option<Program>,
    /// Everything found on the way.
    pub problems: Vec<Problem>,
}

/// Resolves a plan.
///
/// All problems are found at once; with an error among them there is no program.
#[must_use]
pub fn resolve(plan: &Plan) -> Resolved {
    let mut problems = Vec::new();
    let seed = seed(plan, &mut problems);
    let site = site(plan, &mut problems);
    let mut book = MaterialBook::read(&plan.materials, &mut problems);
    if plan.workloads.is_empty() {
        problems.push(Problem::error(
            "workloads",
            "the plan has no workload",
            "at least one workload with a route",
        ));
    }
    let mut amounts = Amounts::default();
    let mut workloads = Vec::new();
    for (i, workload) in plan.workloads.iter().enumerate() {
        let path = format!("workloads[{i}]");
        if workload.routes.is_empty() {
            problems.push(Problem::error(
                below(&path, "routes"),
                "the workload has no route",
                "at least one route",
            ));
        }
        let mut routes = Vec::new();
        for (j, route) in workload.routes.iter().enumerate() {
            let permit = plan.site.drain_permit.is_some();
            let mut builder = RouteBuilder::new(&mut book, &mut amounts, &site, permit, &mut problems);
            let at = format!("{path}.routes[{j}]");
            builder.name_paths((&path, &workload.name), (&at, &route.name));
            routes.push(builder.build(workload, route, &plan.site, &path, &at));
        }
        let present = workload.routes.iter().position(|r| r.name == workload.present).unwrap_or(0);
        let months = waste::months(workload.months.as_deref(), &below(&path, "months"), &mut problems);
        workloads.push(WorkloadProgram { name: workload.name.clone(), months, present, routes });
    }
    let broken = problems.iter().any(|p| p.severity == Severity::Error);
    let program = (!broken).then(|| Program { title: plan.title.clone(), seed, site, workloads });
    // The same doubt about a shared figure is told once.
    let mut told = Index::default();
    problems.retain(|p| told.put(format!("{}\n{}", p.path, p.found), 0).is_none());
    Resolved { program, problems }
}

fn seed(plan: &Plan, problems: &mut Vec<Problem>) -> u64 {
    let Some(Field::Text(text) | Field::Number(text)) = &plan.seed else { return 1 };
    text.trim().parse().unwrap_or_else(|_| {
        let found = format!("{text} is not such a number");
        problems.push(Problem::error(
            "seed",
            found,
            "a whole number from 0 to 18446744073709551615, such as 1",
        ));
        1
    })
}

fn site(plan: &Plan, problems: &mut Vec<Problem>) -> SiteUse {
    let doc = &plan.site;
    let rules = doc.rules.clone().unwrap_or_else(|| "none".to_owned());
    if !["US", "EU", "none"].contains(&rules.as_str()) {
        problems.push(Problem::error("site.rules", format!("\"{rules}\""), "US, EU or none"));
    }
    match &doc.as_of {
        None if rules != "none" => problems.push(Problem::warning(
            "site.as_of",
            "no date says as of when the rules are read",
            "a date such as 2026-12-01: classifications and limits change",
        )),
        Some(date) if !is_date(date) => {
            problems.push(Problem::error(
                "site.as_of",
                format!("\"{date}\" is no date"),
                "year-month-day, such as 2026-12-01",
            ));
        }
        _ => {}
    }
    let bench_temperature_k = amount(
        doc.bench_temperature.as_deref(),
        "20 °C",
        Kind::Temperature,
        "site.bench_temperature",
        problems,
    );
    if !(278.15..=313.15).contains(&bench_temperature_k) {
        problems.push(Problem::warning(
            "site.bench_temperature",
            format!("{} is unusual for a bench", show(bench_temperature_k, Kind::Temperature)),
            "the temperature at which solvents are poured and stored, as a rule between 5 and 40 °C; leave it if it is right",
        ));
    }
    if let Some(e) = &doc.electricity {
        check(e.climate.as_deref(), Kind::ClimatePerEnergy, "site.electricity.climate", problems);
        check(e.price.as_deref(), Kind::PricePerEnergy, "site.electricity.price", problems);
    }
    let room = doc.room.as_ref().and_then(|r| super::room::room(r, problems));
    if doc.streams.len() > MOST_STREAMS {
        problems.push(Problem::error(
            "site.streams",
            format!("{} streams", doc.streams.len()),
            format!("at most {MOST_STREAMS}"),
        ));
    }
    let streams = doc
        .streams
        .iter()
        .enumerate()
        .map(|(i, s)| stream(s, &format!("site.streams[{i}]"), problems))
        .collect();
    let waste = waste::site(doc, problems);
    SiteUse {
        name: doc.name.clone(),
        rules,
        as_of: doc.as_of.clone(),
        bench_temperature_k,
        streams,
        waste,
        room,
    }
}

fn stream(doc: &Stream, path: &str, problems: &mut Vec<Problem>) -> StreamUse {
    if Place::named(&doc.name).is_some() {
        problems.push(Problem::error(
            below(path, "name"),
            format!("\"{}\" is one of the book's own places", doc.name),
            "another name for the stream",
        ));
    }
    let solid = match doc.holds.as_deref() {
        None | Some("liquid") => false,
        Some("solid") => true,
        Some(other) => {
            problems.push(Problem::error(below(path, "holds"), format!("\"{other}\""), "liquid or solid"));
            false
        }
    };
    let treatment = doc.treatment.clone().unwrap_or_else(|| "none".to_owned());
    const TREATMENTS: [&str; 4] = ["none", "recycling", "degradation", "passivation"];
    if !TREATMENTS.contains(&treatment.as_str()) {
        problems.push(Problem::error(
            below(path, "treatment"),
            format!("\"{treatment}\""),
            format!("one of: {}", TREATMENTS.join(", ")),
        ));
    }
    if let Some(text) = doc.saturation.as_deref() {
        let s = amount(Some(text), "1", Kind::Number, &below(path, "saturation"), problems);
        if !(0.0..=2.0).contains(&s) {
            problems.push(Problem::error(
                below(path, "saturation"),
                format!("\"{text}\""),
                "a number from 0 (closed while it is filled) over 1 (saturated) to 2",
            ));
        }
    }
    if let Some(other) = doc.vented_to.as_deref().filter(|w| !["hood", "room"].contains(w)) {
        problems.push(Problem::error(below(path, "vented_to"), format!("\"{other}\""), "hood or room"));
    }
    let container_m3 = doc
        .container
        .as_deref()
        .map(|text| amount(Some(text), "", Kind::Volume, &below(path, "container"), problems));
    if container_m3.is_some_and(|v| v <= 0.0) {
        problems.push(Problem::error(
            below(path, "container"),
            "a container of no volume",
            "a size such as \"20 L\"",
        ));
    }
    let fill = amount(doc.fill.as_deref(), "90 %", Kind::Fraction, &below(path, "fill"), problems);
    if fill <= 0.0 {
        problems.push(Problem::error(
            below(path, "fill"),
            "a container that is never filled",
            "a share such as \"90 %\"",
        ));
    }
    if doc.fill.is_none() && container_m3.is_some() {
        problems.push(Problem::note(
            below(path, "fill"),
            "filled to 90 % is assumed (common practice, no source)",
        ));
    }
    let bulk_density_kg_m3 = amount(
        doc.bulk_density.as_deref(),
        "0.6 kg/L",
        Kind::Density,
        &below(path, "bulk_density"),
        problems,
    );
    if bulk_density_kg_m3 <= 0.0 {
        problems.push(Problem::error(
            below(path, "bulk_density"),
            "a bulk density of nothing",
            "such as \"0.6 kg/L\"",
        ));
    }
    if solid && doc.bulk_density.is_none() && container_m3.is_some() {
        problems.push(Problem::note(
            below(path, "bulk_density"),
            "0.6 kg/L is assumed (from memory): weigh a full container",
        ));
    }
    let waste = waste::stream(doc, path, problems);
    StreamUse { name: doc.name.clone(), solid, container_m3, fill, bulk_density_kg_m3, treatment, waste }
}

pub(super) fn amount(
    text: Option<&str>,
    default: &str,
    kind: Kind,
    path: &str,
    problems: &mut Vec<Problem>,
) -> f64 {
    match read(text.unwrap_or(default), kind) {
        Ok(amount) => amount.central_si,
        Err(e) => {
            problems.push(Problem::error(
                path,
                format!("\"{}\": {}", text.unwrap_or(default), e.found()),
                e.need(),
            ));
            // What the plan would have without it, so that nothing else seems wrong.
            read(default, kind).map_or(1.0, |a| a.central_si)
        }
    }
}

fn check(text: Option<&str>, kind: Kind, path: &str, problems: &mut Vec<Problem>) {
    if let Some(text) = text {
        amount(Some(text), "", kind, path, problems);
    }
}

/// Year-month-day of the proleptic Gregorian calendar.
fn is_date(text: &str) -> bool {
    let mut parts = text.split('-');
    let mut number = |digits: usize| {
        parts
            .next()
            .filter(|p| p.len() == digits && p.bytes().all(|b| b.is_ascii_digit()))
            .and_then(|p| p.parse::<u32>().ok())
    };
    let (Some(year), Some(month), Some(day)) = (number(4), number(2), number(2)) else { return false };
    let leap = (year % 4 == 0 && year % 100 != 0) || year % 400 == 0;
    let days = match month {
        4 | 6 | 9 | 11 => 30,
        2 if leap => 29,
        2 => 28,
        1..=12 => 31,
        _ => return false,
    };
    parts.next().is_none() && (1..=days).contains(&day)
}

/// The book's own places to which mass may go.
fn own_places<'a>() -> impl Iterator<Item = &'a str> {
    Place::OUTSIDE
        .into_iter()
        .filter(|p| *p != Place::FEED)
        .chain(Place::BENCH)
        .filter_map(|p| -> Option<&'a str> { p.name() })
}

/// What a route is built from while its steps read themselves.
pub(super) struct RouteBuilder<'p> {
    book: &'p mut MaterialBook,
    pub(super) amounts: &'p mut Amounts,
    site: &'p SiteUse,
    permit: bool,
    pub(super) problems: &'p mut Vec<Problem>,
    inputs: Vec<Input>,
    /// The keys of the inputs in order, each with where it stands.
    slots: Vec<(u64, In)>,
    pub(super) materials: Vec<MaterialUse>,
    densities: Vec<Option<In>>,
    assumptions: Vec<Assumption>,
    /// What comes with the feed.
    pub(super) fed: Vec<Material>,
    /// Paths of the route and of its workload, each with the key of its name.
    named: [(String, u64); 2],
    /// Where a power could be given and is not.
    pub(super) uncounted: Vec<String>,
}

impl<'p> RouteBuilder<'p> {
    pub(super) fn new(
        book: &'p mut MaterialBook,
        amounts: &'p mut Amounts,
        site: &'p SiteUse,
        permit: bool,
        problems: &'p mut Vec<Problem>,
    ) -> Self {
        Self {
            book,
            amounts,
            site,
            permit,
            problems,
            inputs: Vec::new(),
            slots: Vec::new(),
            materials: Vec::new(),
            densities: Vec::new(),
            assumptions: Vec::new(),
            uncounted: Vec::new(),
            fed: Vec::new(),
            named: Default::default(),
        }
    }

    /// From here on inputs below these paths are known by the names, not by the numbers in the paths.
    fn name_paths(&mut self, (above, workload): (&str, &str), (path, route): (&str, &str)) {
        let workload = identity_key(&format!("workload/{workload}"));
        let route = continued_key(workload, &format!("/route/{route}"));
        self.named = [(path.to_owned(), route), (above.to_owned(), workload)];
    }

    fn key(&self, identity: &str) -> u64 {
        for (path, key) in self.named.iter().filter(|(path, _)| !path.is_empty()) {
            if let Some(rest) = identity.strip_prefix(path.as_str()) {
                return continued_key(*key, rest);
            }
        }
        identity_key(identity)
    }

    pub(super) fn input(&mut self, identity: String, amount: &Amount, origin: Origin) -> In {
        let key = self.key(&identity);
        let place = self.slots.partition_point(|(known, _)| *known < key);
        if let Some(&(_, slot)) = self.slots.get(place).filter(|(known, _)| *known == key) {
            return slot;
        }
        let slot = In(u32::try_from(self.inputs.len()).unwrap_or(u32::MAX));
        self.slots.insert(place, (key, slot));
        self.inputs.push(Input {
            identity,
            key,
            kind: amount.kind,
            central_si: amount.central_si,
            spread: amount.spread,
            origin,
            basis: amount.text.clone(),
        });
        slot
    }

    pub(super) fn assume(&mut self, path: String, label: &str, value: &str, source: Source) {
        // A technique may look at a parameter twice; those of other steps lie further back than it has parameters.
        if self.assumptions.iter().rev().take(64).any(|a| a.path == path) {
            return;
        }
        self.assumptions.push(Assumption { path, label: label.to_owned(), value: value.to_owned(), source });
    }

    pub(super) fn material(&mut self, name: &str, path: &str) -> Option<Material> {
        let found = match self.book.find(name) {
            Ok(found) => found,
            Err((found, need)) => {
                self.problems.push(Problem::error(path, found, need));
                return None;
            }
        };
        if let Some(i) = self.materials.iter().position(|m| m.name == found.name) {
            return u16::try_from(i).ok().map(Material);
        }
        if self.materials.len() >= MOST_MATERIALS {
            self.problems.push(Problem::error(
                path,
                "too many materials on one route",
                format!("at most {MOST_MATERIALS}"),
            ));
            return None;
        }
        let material = Material(u16::try_from(self.materials.len()).ok()?);
        let density = match found.substance.class {
            Class::Solvent | Class::Water | Class::Reagent | Class::Solute | Class::Gas => {
                found.substance.density_kg_m3(self.site.bench_temperature_k).ok()
            }
            Class::DryingAgent | Class::Sorbent | Class::Consumable | Class::Matrix => None,
        };
        self.materials.push(found);
        let slot = density.map(|d| {
            self.shared(material, "density", Kind::Density, (d.value, d.low, d.high), d.source.into_owned())
        });
        self.densities.push(slot);
        Some(material)
    }

    /// An input that belongs to a material, so that every route of every workload draws the same number.
    fn shared(
        &mut self,
        material: Material,
        property: &str,
        kind: Kind,
        (value, low, high): (f64, f64, f64),
        source: String,
    ) -> In {
        let identity = format!("material/{}/{property}", self.name_of(material));
        let spread = if low < high { Spread::Limits { low_si: low, high_si: high } } else { Spread::Exact };
        let amount = Amount {
            text: source,
            kind,
            central_si: value,
            spread,
            share_by: ShareBy::Unstated,
            currency: None,
        };
        self.input(identity, &amount, Origin::Computed)
    }

    pub(super) fn property(
        &mut self,
        material: Material,
        property: &str,
        kind: Kind,
        of: impl FnOnce(&Substance) -> Option<(f64, f64, f64)>,
    ) -> Option<In> {
        let figure = of(self.substance(material)?)?;
        Some(self.shared(material, property, kind, figure, "catalogue".to_owned()))
    }

    pub(super) const fn bench_temperature_k(&self) -> f64 {
        self.site.bench_temperature_k
    }

    pub(super) fn value(&self, slot: In) -> f64 {
        self.inputs.get(slot.0 as usize).map_or(0.0, |i| i.central_si)
    }

    pub(super) fn name_of(&self, material: Material) -> &str {
        self.materials.get(material.0 as usize).map_or("", |m| m.name.as_str())
    }

    pub(super) fn substance(&self, material: Material) -> Option<&Substance> {
        self.materials.get(material.0 as usize).map(|m| &*m.substance)
    }

    pub(super) fn density(&self, material: Material) -> Option<In> {
        self.densities.get(material.0 as usize).copied().flatten()
    }

    pub(super) fn places(&self) -> String {
        let mut names: Vec<&str> = self.site.streams.iter().map(|s| s.name.as_str()).collect();
        names.extend(own_places());
        format!("one of: {}", names.join(", "))
    }

    pub(super) fn place(&mut self, name: &str, path: &str) -> Option<Place> {
        if let Some(i) = self.site.streams.iter().position(|s| s.name == name) {
            return Place::stream(i);
        }
        match Place::named(name) {
            Some(Place::FEED) => {
                self.problems.push(Problem::error(path, "nothing is returned to the feed", self.places()));
                None
            }
            Some(Place::DRAIN) if !self.permit => {
                self.problems.push(Problem::error(
                    path,
                    "the drain is closed: the plan names no permit",
                    "a waste stream, or site.drain_permit with the name of the permit that allows it; never by dilution",
                ));
                None
            }
            Some(place) => Some(place),
            None => {
                let places = self.places();
                let mut known: Vec<&str> = self.site.streams.iter().map(|s| s.name.as_str()).collect();
                known.extend(own_places());
                let need = nearest(name, known).map_or(places, |n| format!("did you mean \"{n}\"?"));
                self.problems.push(Problem::error(
                    path,
                    format!("no stream or place is called \"{name}\""),
                    need,
                ));
                None
            }
        }
    }

    fn build(
        mut self,
        workload: &'p Workload,
        doc: &'p Route,
        site: &Site,
        above: &str,
        path: &str,
    ) -> RouteProgram {
        let work = self.work(workload, above);
        let feed = self.feed(workload, doc, above, path);
        self.fed = feed.iter().map(|(m, _)| *m).collect();
        let mut steps = Vec::new();
        let (mut taken_in, mut unknown) = (None, false);
        if doc.steps.is_empty() {
            self.problems.push(Problem::error(
                below(path, "steps"),
                "the route has no step",
                "at least one step",
            ));
        }
        for (i, step) in doc.steps.iter().enumerate() {
            let at = format!("{path}.steps[{i}]");
            let Some(technique) = technique(&step.technique) else {
                let known = TECHNIQUES.iter().map(|t| t.key);
                let need = nearest(&step.technique, known.clone()).map_or_else(
                    || format!("one of: {}", known.collect::<Vec<_>>().join(", ")),
                    |k| format!("did you mean \"{k}\"?"),
                );
                let found = format!("no technique is called \"{}\"", step.technique);
                self.problems.push(Problem::error(below(&at, "step"), found, need));
                unknown = true;
                continue;
            };
            if let (None, Some(place)) = (taken_in, technique.takes_feed) {
                taken_in = Some((i, place));
            }
            let basis = step.per.as_deref().map_or(Some(Basis::Sample), Basis::named);
            if basis.is_none() {
                let found = format!("\"{}\"", step.per.as_deref().unwrap_or_default());
                let need = format!("one of: {}", Basis::WORDS.join(", "));
                self.problems.push(Problem::error(below(&at, "per"), found, need));
            }
            let mut reader = Reader::new(&mut self, technique, step, at.clone());
            let run = (technique.read)(&mut reader);
            let measured = reader.finish();
            steps.push(StepProgram {
                technique,
                path: at,
                basis: basis.unwrap_or(Basis::Sample),
                step: run,
                measured,
                note: step.note.clone(),
            });
        }
        // A technique that nobody knows may have been the one.
        if taken_in.is_none() && !unknown && !feed.is_empty() && !doc.steps.is_empty() {
            self.problems.push(Problem::error(
                below(path, "steps"),
                "no step takes the sample in",
                "an extraction step, or a feed of {} where nothing is extracted",
            ));
        }
        let ends = self.ends(doc, path);
        let recovery = self.read_optional(doc.recovery.as_deref(), Kind::Fraction, &below(path, "recovery"));
        let ph = doc.ph.as_deref().and_then(|text| waste::ph(text, &below(path, "ph"), self.problems));
        if doc.recovery.is_none() && workload.routes.len() > 1 {
            self.problems.push(Problem::warning(
                below(path, "recovery"),
                format!("nothing says what recovery {} reaches, so equal work is not shown", doc.name),
                "recovery, and equivalence with what the claim rests on",
            ));
        }
        let time = self.time(site, doc, path);
        let money = self.money(site, doc, path);
        let climate = self.climate(site);
        let filling = self.filling(site);
        let natures = self
            .materials
            .iter()
            .zip(&self.densities)
            .map(|(m, density)| Nature {
                density: *density,
                volatile: matches!(m.substance.class, Class::Solvent | Class::Gas | Class::Water),
            })
            .collect();
        RouteProgram {
            name: doc.name.clone(),
            path: path.to_owned(),
            inputs: self.inputs,
            materials: self.materials,
            natures,
            work,
            feed,
            taken_in,
            steps,
            ends,
            recovery,
            equivalence: doc.equivalence.clone(),
            permission: doc.permission.clone(),
            time,
            money,
            climate,
            ph,
            assumptions: self.assumptions,
            uncounted: self.uncounted,
            streams: self.site.streams.len(),
            filling,
        }
    }

    /// The containers whose filling is counted: those of liquid streams of which the plan says how far what leaves is saturated.
    fn filling(&mut self, site: &Site) -> Option<Filling> {
        let mut containers = Vec::new();
        for (i, doc) in site.streams.iter().enumerate() {
            let Some(stream) = Place::stream(i).filter(|_| doc.holds.as_deref() != Some("solid")) else {
                continue;
            };
            let path = format!("site.streams[{i}].saturation");
            let Some(saturation) = self.read_optional(doc.saturation.as_deref(), Kind::Number, &path) else {
                continue;
            };
            if self.value(saturation) > 0.0 {
                let air = if doc.vented_to.as_deref() == Some("room") { Place::ROOM } else { Place::HOOD };
                containers.push(Container { stream, saturation, air });
            }
        }
        Filling::read(&mut Reader::of_the_book(self), containers)
    }

    /// The name under which the book shows a material.
    pub(super) fn known_name(&mut self, name: &str) -> Result<String, (String, String)> {
        self.book.find(name).map(|found| found.name)
    }

    pub(super) fn read_optional(&mut self, text: Option<&str>, kind: Kind, path: &str) -> Option<In> {
        match self.amounts.read(text?, kind) {
            Ok(amount) => Some(self.input(path.to_owned(), &amount, Origin::Entered)),
            Err(e) => {
                let found = format!("\"{}\": {}", text.unwrap_or_default(), e.found());
                self.problems.push(Problem::error(path, found, e.need()));
                None
            }
        }
    }

    fn work(&mut self, doc: &Workload, path: &str) -> Work {
        let batch = below(path, "batch");
        Work {
            results: self.number(doc.results_per_year.as_ref(), None, &below(path, "results_per_year"), 1e-9),
            batch_samples: self.number(
                doc.batch_samples.as_ref(),
                Some(("1", DEFINITION)),
                &below(&batch, "samples"),
                1e-9,
            ),
            batch_controls: self.number(
                doc.batch_controls.as_ref(),
                Some(("0", DEFINITION)),
                &below(&batch, "controls"),
                0.0,
            ),
            repeats: {
                let at = below(path, "repeats");
                self.read_optional(Some(doc.repeats.as_deref().unwrap_or("0 %")), Kind::Fraction, &at)
                    .unwrap_or(In(0))
            },
            repeats_bring_controls: doc.repeats_bring_controls.unwrap_or(true),
            controls_carry_feed: doc.controls_carry_feed.unwrap_or(true),
        }
    }

    fn number(
        &mut self,
        field: Option<&Field>,
        default: Option<(&str, Source)>,
        path: &str,
        least: f64,
    ) -> In {
        let text = match (field, default) {
            (Some(Field::Text(text) | Field::Number(text)), _) => text.as_str(),
            (None, Some((text, _))) => text,
            _ => {
                self.problems.push(Problem::error(
                    path,
                    "no number is given",
                    "a number, such as 1400 or \"1400 ± 100\"",
                ));
                return In(0);
            }
        };
        match self.amounts.read(text, Kind::Number) {
            Ok(amount) if amount.central_si >= least => self.input(path.to_owned(), &amount, Origin::Entered),
            Ok(amount) => {
                self.problems.push(Problem::error(
                    path,
                    format!("{} where a number above zero should stand", amount.central_si),
                    "a number, such as 20",
                ));
                In(0)
            }
            Err(e) => {
                self.problems.push(Problem::error(path, format!("\"{text}\": {}", e.found()), e.need()));
                In(0)
            }
        }
    }

    fn feed(&mut self, workload: &Workload, doc: &Route, above: &str, path: &str) -> Vec<(Material, In)> {
        let (rows, path) = match &doc.feed {
            Some(rows) => (rows, below(path, "feed")),
            None => (&workload.feed, below(above, "feed")),
        };
        let mut out = Vec::new();
        for (name, text) in rows {
            let at = below(&path, name);
            let Some(material) = self.material(name, &at) else { continue };
            if out.iter().any(|(m, _)| *m == material) {
                let known = self.name_of(material).to_owned();
                let found = format!("{name} is {known}, which the feed holds already");
                self.problems.push(Problem::error(at, found, "each material once, with its whole amount"));
                continue;
            }
            let mass = self.amounts.read(text, Kind::Mass);
            let volume = if mass.is_ok() { mass.clone() } else { self.amounts.read(text, Kind::Volume) };
            match (mass, volume) {
                (Ok(mass), _) => out.push((material, self.input(at, &mass, Origin::Entered))),
                (Err(_), Ok(volume)) => {
                    match self.density(material).and_then(|d| self.inputs.get(d.0 as usize)) {
                        Some(density) => {
                            // m = V ρ; the density's own spread is small beside that of a sample's volume
                            let rho = density.central_si;
                            let spread = match volume.spread {
                                Spread::Exact => Spread::Exact,
                                Spread::Limits { low_si, high_si } => {
                                    Spread::Limits { low_si: low_si * rho, high_si: high_si * rho }
                                }
                                Spread::Standard { u_si } => Spread::Standard { u_si: u_si * rho },
                            };
                            let mass = Amount {
                                kind: Kind::Mass,
                                central_si: volume.central_si * rho,
                                spread,
                                ..volume
                            };
                            out.push((material, self.input(at, &mass, Origin::Entered)));
                        }
                        None => self.problems.push(Problem::error(
                            at,
                            format!("a volume of {name}, whose density is not known"),
                            "a mass, or a density under materials with its source",
                        )),
                    }
                }
                (Err(e), Err(_)) => self.problems.push(Problem::error(
                    at,
                    format!("\"{text}\": {}", e.found()),
                    "the mass or volume that one sample brings, such as \"10 g\" or \"1 L\"",
                )),
            }
        }
        out
    }

    fn ends(&mut self, doc: &Route, path: &str) -> [Option<(Place, bool)>; BENCH_PLACES] {
        let at = below(path, "ends");
        for (name, _) in &doc.ends {
            if !Place::named(name).is_some_and(Place::on_bench) {
                let names = Place::BENCH.into_iter().filter_map(Place::name).collect::<Vec<_>>().join(", ");
                self.problems.push(Problem::error(
                    below(&at, name),
                    format!("\"{name}\" is no place on the bench"),
                    format!("one of: {names}"),
                ));
            }
        }
        let first =
            |solid: bool| self.site.streams.iter().position(|s| s.solid == solid).and_then(Place::stream);
        let (liquid, solid) = (first(false), first(true));
        Place::BENCH.map(|place| {
            let name = place.name().unwrap_or_default();
            match doc.ends.iter().find(|(n, _)| n == name) {
                Some((_, to)) => {
                    let end = self.place(to, &below(&at, name));
                    if end.is_some_and(Place::on_bench) {
                        self.problems.push(Problem::error(
                            below(&at, name),
                            format!("\"{to}\" is on the bench itself"),
                            "a place outside the bench: a stream, product, elsewhere, hood",
                        ));
                        return None;
                    }
                    end.map(|p| (p, true))
                }
                None => match place {
                    Place::MARC => solid.map(|p| (p, false)),
                    Place::LIQUOR | Place::SECOND_PHASE | Place::TRAP => liquid.map(|p| (p, false)),
                    // Air is never the silent balancing item.
                    _ => None,
                },
            }
        })
    }
}
