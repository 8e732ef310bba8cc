//! What a technique reads itself through: each declared parameter, checked against its declaration.
//!
//! Reading never stops at the first problem. Where something is missing or wrong the reader keeps the problem and hands
//! out a stand-in, so that every error of a plan is found at once; a route with an error is never run.

use super::resolve::RouteBuilder;
use crate::chance::In;
use crate::ledger::{Material, Measured, Place};
use crate::letter::small_text;
use crate::plan::{Field, Problem, Step as StepDoc, below, nearest};
use crate::quantity::{Amount, Entry, Kind, Origin, ShareBy, Spread, show};
use crate::step::{Control, Mixture, Need, Param, Part, Poured, Technique};

/// At most so many materials in one mixture.
const LARGEST_MIXTURE: usize = crate::step::LARGEST;

/// Reads one step of a plan by the declarations of its technique.
pub struct Reader<'r, 'p> {
    route: &'r mut RouteBuilder<'p>,
    technique: &'static Technique,
    doc: &'p StepDoc,
    path: String,
    asked: Vec<&'static str>,
}

/// Why a parameter is not read.
enum Idle {
    /// It has a meaning elsewhere: where, and what would do.
    Because(String, String),
    /// What it hangs on is wrong itself.
    Unclear,
}

enum Found<'p> {
    Written(&'p Field),
    Default(&'static str),
    Nothing,
}

impl<'r, 'p> Reader<'r, 'p> {
    pub(super) fn new(
        route: &'r mut RouteBuilder<'p>,
        technique: &'static Technique,
        doc: &'p StepDoc,
        path: String,
    ) -> Self {
        Self { route, technique, doc, path, asked: Vec::new() }
    }

    /// For what no step declares: materials and their figures alone.
    pub(super) fn of_the_book(route: &'r mut RouteBuilder<'p>) -> Self {
        static NO_STEP: StepDoc = StepDoc {
            technique: String::new(),
            per: None,
            fields: Vec::new(),
            measured: Vec::new(),
            note: None,
        };
        Self::new(route, crate::step::TECHNIQUES[0], &NO_STEP, String::new())
    }

    fn at(&self, key: &str) -> String {
        below(&self.path, key)
    }

    fn error(&mut self, key: &str, found: impl Into<String>, need: impl Into<String>) {
        let path = self.at(key);
        self.route.problems.push(Problem::error(path, found, need));
    }

    fn field(&self, key: &str) -> Option<&'p Field> {
        let doc = self.doc;
        doc.fields.iter().find(|(k, _)| k == key).map(|(_, f)| f)
    }

    /// Why a parameter is not to be read, where it has no meaning: where it would have one, and what would do.
    fn idle(&self, p: &'static Param) -> Option<Idle> {
        if let Some((on, values)) = p.shown_when {
            let declared = self.technique.params.iter().find(|q| q.key == on);
            let word = match (self.field(on), declared.map(|d| d.need)) {
                (Some(Field::Text(word)), _) => word.as_str(),
                (None, Some(Need::Default(word, _))) => word,
                _ => "",
            };
            // A word that is no choice at all is told by itself; whether this would apply, nobody knows.
            let choices = match declared.map(|d| d.control) {
                Some(Control::Choice(words)) => words,
                _ => values,
            };
            if !(values.contains(&word) || word.is_empty() || choices.contains(&word)) {
                return Some(Idle::Unclear);
            }
            if !values.contains(&word) {
                let place = format!("only where {on} is {}", values.join(" or "));
                return Some(Idle::Because(place, format!("leave it out, or change {on}")));
            }
        }
        if let Some(other) = p.with.filter(|other| self.field(other).is_none()) {
            return Some(Idle::Because(
                format!("only beside {other}"),
                format!("leave it out, or give {other}"),
            ));
        }
        if let Some(other) = p.without.filter(|other| self.field(other).is_some()) {
            return Some(Idle::Because(
                format!("only without {other}, which stands in its place"),
                "one of the two".to_owned(),
            ));
        }
        None
    }

    fn find(&mut self, p: &'static Param) -> Found<'p> {
        self.asked.push(p.key);
        let written = self.field(p.key);
        if let Some(idle) = self.idle(p) {
            if let (true, Idle::Because(meaning, need)) = (written.is_some(), idle) {
                self.error(p.key, format!("{} is given, but it has a meaning {meaning}", p.key), need);
            }
            return Found::Nothing;
        }
        match (written, p.need) {
            (Some(field), _) => Found::Written(field),
            (None, Need::Default(text, source)) => {
                let path = self.at(p.key);
                self.route.assume(path, p.label, text, source);
                Found::Default(text)
            }
            (None, Need::Optional) => Found::Nothing,
            (None, Need::Required) => {
                let need = format!("give {}: {}", p.key, expectation(p));
                self.error(p.key, format!("{} is missing", small_text(p.label)), need);
                Found::Nothing
            }
        }
    }

    /// A required amount, or one with a default.
    pub fn quantity(&mut self, p: &'static Param) -> In {
        self.optional(p).unwrap_or(In(0))
    }

    /// An amount that may be left out, or that hangs on another parameter.
    pub fn optional(&mut self, p: &'static Param) -> Option<In> {
        let Control::Quantity(kind) = p.control else { return None };
        let (text, mut origin) = match self.find(p) {
            Found::Written(Field::Text(text)) => (text.clone(), Origin::Entered),
            Found::Written(Field::Number(text)) if matches!(kind, Kind::Number | Kind::Count) => {
                (text.clone(), Origin::Entered)
            }
            Found::Written(other) => {
                let found = format!("{} where an amount should stand", shape(other));
                self.error(p.key, found, expectation(p));
                return None;
            }
            Found::Default(text) => (text.to_owned(), Origin::Assumed),
            Found::Nothing => return None,
        };
        let amount = match self.route.amounts.entry(&text, kind) {
            Ok(Entry::Known(amount)) => amount,
            Ok(Entry::NotKnown) => {
                let Need::Default(default, source) = p.need else {
                    self.error(
                        p.key,
                        "not known",
                        format!(
                            "an estimate with its limits, such as \"{}\"; no range can be assumed here",
                            example(kind)
                        ),
                    );
                    return None;
                };
                origin = Origin::NotKnown;
                let path = self.at(p.key);
                self.route.assume(path, p.label, default, source);
                let mut amount = self.route.amounts.read(default, kind).ok()?;
                // Nobody knows where in the usual range it lies: any value there is as likely as another.
                let (low_si, high_si) = p.usual;
                if low_si < high_si && low_si.is_finite() && high_si.is_finite() {
                    amount.spread = Spread::Limits { low_si, high_si };
                }
                amount
            }
            Err(e) => {
                self.error(p.key, format!("\"{}\": {}", text, e.found()), e.need());
                return None;
            }
        };
        self.bounds(p, kind, &amount);
        let identity = self.at(p.key);
        Some(self.route.input(identity, &amount, origin))
    }

    fn bounds(&mut self, p: &'static Param, kind: Kind, amount: &Amount) {
        let (low, high) = reach(amount);
        let limits = |(a, b): (f64, f64)| match (a.is_finite(), b.is_finite()) {
            (true, true) => format!("between {} and {}", show(a, kind), show(b, kind)),
            (true, false) => format!("at least {}", show(a, kind)),
            (false, true) => format!("at most {}", show(b, kind)),
            (false, false) => "any amount".to_owned(),
        };
        if low < p.physical.0 || high > p.physical.1 {
            let found = format!("{} is outside what is possible", amount.understood());
            self.error(p.key, found, limits(p.physical));
        } else if amount.central_si < p.usual.0 || amount.central_si > p.usual.1 {
            let found = format!("{} is unusual for {}", amount.understood(), small_text(p.label));
            let need = format!("{} is usual ({}); leave it if it is right", limits(p.usual), p.source.cite);
            self.doubt(p.key, found, need);
        }
    }

    /// A power that may be left out: then the route remembers that this step's electricity is not counted, so that no
    /// comparison takes nothing stated for nothing used.
    pub fn power(&mut self, p: &'static Param) -> Option<In> {
        let power = self.optional(p);
        if power.is_none() {
            let path = self.at(p.key);
            self.route.uncounted.push(path);
        }
        power
    }

    /// A whole number.
    pub fn count(&mut self, p: &'static Param) -> u32 {
        let text = match self.find(p) {
            Found::Written(Field::Number(text) | Field::Text(text)) => text.clone(),
            Found::Written(other) => {
                let found = format!("{} where a whole number should stand", shape(other));
                self.error(p.key, found, expectation(p));
                return 1;
            }
            Found::Default(text) => text.to_owned(),
            Found::Nothing => return 1,
        };
        match text.trim().parse::<u32>() {
            Ok(n) if f64::from(n) >= p.physical.0 && f64::from(n) <= p.physical.1 && n <= 1000 => n,
            _ => {
                let need = format!(
                    "a whole number from {} to {}",
                    if p.physical.0.is_finite() { p.physical.0 } else { 0.0 },
                    if p.physical.1.is_finite() { p.physical.1 } else { 1000.0 }
                );
                self.error(p.key, format!("{text} is not such a number"), need);
                1
            }
        }
    }

    /// Yes or no; no when it is left out without a default.
    pub fn yes(&mut self, p: &'static Param) -> bool {
        match self.find(p) {
            Found::Written(Field::YesNo(yes)) => *yes,
            Found::Written(other) => {
                let found = format!("{} where true or false should stand", shape(other));
                self.error(p.key, found, "true or false");
                false
            }
            Found::Default(text) => text == "true",
            Found::Nothing => false,
        }
    }

    /// One of the declared words; the first where nothing was chosen.
    pub fn choice(&mut self, p: &'static Param) -> &'static str {
        let Control::Choice(words) = p.control else { return "" };
        let first = words.first().copied().unwrap_or("");
        let text = match self.find(p) {
            Found::Written(Field::Text(text)) => text.as_str(),
            Found::Written(other) => {
                let found = format!("{} where a word should stand", shape(other));
                self.error(p.key, found, format!("one of: {}", words.join(", ")));
                return first;
            }
            Found::Default(text) => text,
            Found::Nothing => return first,
        };
        if let Some(word) = words.iter().copied().find(|w| *w == text) {
            return word;
        }
        let hint = nearest(text, words.iter().copied())
            .map_or(String::new(), |w| format!("; did you mean \"{w}\"?"));
        let need = format!("one of: {}{hint}", words.join(", "));
        self.error(p.key, format!("\"{text}\" is none of the choices"), need);
        first
    }

    /// The material named.
    pub fn material(&mut self, p: &'static Param) -> Material {
        self.optional_material(p).unwrap_or(Material(0))
    }

    /// The material named, where one is.
    pub fn optional_material(&mut self, p: &'static Param) -> Option<Material> {
        match self.find(p) {
            Found::Written(Field::Text(name)) => {
                let path = self.at(p.key);
                self.route.material(name, &path)
            }
            Found::Written(other) => {
                let found = format!("{} where the name of a material should stand", shape(other));
                self.error(p.key, found, "a name from the catalogue, or one under materials");
                None
            }
            Found::Default(name) => {
                let path = self.at(p.key);
                self.route.material(name, &path)
            }
            Found::Nothing => None,
        }
    }

    /// A solvent of one or several materials; empty where it is missing or wrong.
    pub fn mixture(&mut self, p: &'static Param) -> Mixture {
        self.optional_mixture(p).unwrap_or(Mixture { parts: Vec::new(), by: ShareBy::Volume })
    }

    /// A solvent of one or several materials, where one is given.
    pub fn optional_mixture(&mut self, p: &'static Param) -> Option<Mixture> {
        let path = self.at(p.key);
        let rows: Vec<(&str, Option<&str>)> = match self.find(p) {
            Found::Written(Field::Text(name)) => vec![(name, None)],
            Found::Written(Field::Rows(rows)) => {
                rows.iter().map(|(name, share)| (name.as_str(), Some(share.as_str()))).collect()
            }
            Found::Written(other) => {
                let found = format!("{} where a solvent should stand", shape(other));
                self.error(
                    p.key,
                    found,
                    "a name, or names with shares: { \"n-hexane\": \"50 %\", \"acetone\": \"50 %\" }",
                );
                return None;
            }
            Found::Default(name) => vec![(name, None)],
            Found::Nothing => return None,
        };
        if rows.is_empty() || rows.len() > LARGEST_MIXTURE {
            self.error(
                p.key,
                format!("a mixture of {} materials", rows.len()),
                format!("between 1 and {LARGEST_MIXTURE} materials"),
            );
            return None;
        }
        let (mut parts, mut by, mut sum, mut whole) = (Vec::new(), None, 0.0, true);
        for (name, share) in rows {
            let row = below(&path, name);
            let amount = self.route.amounts.read(share.unwrap_or("100 %"), Kind::Fraction);
            let amount = match amount {
                Ok(amount) => amount,
                Err(e) => {
                    let found = format!("\"{}\": {}", share.unwrap_or_default(), e.found());
                    self.route.problems.push(Problem::error(row, found, e.need()));
                    whole = false;
                    continue;
                }
            };
            let share_by = if amount.share_by == ShareBy::Mass { ShareBy::Mass } else { ShareBy::Volume };
            if by.is_some_and(|b| b != share_by) {
                self.route.problems.push(Problem::error(
                    row.clone(),
                    "shares by volume and by mass in one mixture",
                    "all v/v or all w/w",
                ));
                whole = false;
            }
            by = Some(share_by);
            sum += amount.central_si;
            let Some(material) = self.route.material(name, &row) else {
                whole = false;
                continue;
            };
            let Some(density) = self.route.density(material) else {
                self.route.problems.push(Problem::error(
                    row,
                    format!("no liquid density of {name} is known at the bench's temperature, so a volume of it has no mass"),
                    "another material, or a density under materials with its source",
                ));
                whole = false;
                continue;
            };
            if parts.iter().any(|p: &Part| p.material == material) {
                let known = self.route.name_of(material).to_owned();
                self.twice(row, name, &known);
                whole = false;
                continue;
            }
            let origin = if share.is_some() { Origin::Entered } else { Origin::Computed };
            let share = self.route.input(row, &amount, origin);
            parts.push(Part { material, share, density });
        }
        // Shares are written to a few digits; a third of a per cent lost by rounding 33 % three times is an error all the same.
        if whole && (sum - 1.0).abs() > 1e-3 {
            self.error(
                p.key,
                format!("the shares come to {}", show(sum, Kind::Fraction)),
                "shares that come to 100 %",
            );
            return None;
        }
        whole.then_some(Mixture { parts, by: by.unwrap_or(ShareBy::Volume) })
    }

    /// Materials, each with an amount of the declared kind.
    pub fn per_material(&mut self, p: &'static Param) -> Vec<(Material, In)> {
        let Control::PerMaterial(kind) = p.control else { return Vec::new() };
        let path = self.at(p.key);
        let rows = match self.find(p) {
            Found::Written(Field::Rows(rows)) => rows,
            Found::Written(other) => {
                let found = format!("{} where materials with amounts should stand", shape(other));
                self.error(p.key, found, format!("{{ \"material\": \"{}\" }}", example(kind)));
                return Vec::new();
            }
            Found::Default(_) | Found::Nothing => return Vec::new(),
        };
        let mut out = Vec::new();
        for (name, text) in rows {
            let row = below(&path, name);
            let material = self.route.material(name, &row);
            match self.route.amounts.read(text, kind) {
                Ok(amount) => {
                    let (low, high) = reach(&amount);
                    if low < p.physical.0 || high > p.physical.1 {
                        let found = format!("{} is outside what is possible", amount.understood());
                        let need =
                            format!("between {} and {}", show(p.physical.0, kind), show(p.physical.1, kind));
                        self.route.problems.push(Problem::error(row, found, need));
                    } else if let Some(material) = material {
                        if out.iter().any(|(m, _)| *m == material) {
                            let known = self.route.name_of(material).to_owned();
                            self.twice(row, name, &known);
                            continue;
                        }
                        let slot = self.route.input(row, &amount, Origin::Entered);
                        out.push((material, slot));
                    }
                }
                Err(e) => {
                    self.route.problems.push(Problem::error(
                        row,
                        format!("\"{text}\": {}", e.found()),
                        e.need(),
                    ));
                }
            }
        }
        out
    }

    fn twice(&mut self, row: String, name: &str, known: &str) {
        let found = if name == known {
            format!("{known} is listed already, under another of its names")
        } else {
            format!("{name} is {known}, which is listed already")
        };
        self.route.problems.push(Problem::error(row, found, "each material once, with its whole amount"));
    }

    /// Materials of the feed with the share that is taken out of each.
    pub fn taken_out(&mut self, p: &'static Param) -> Vec<(Material, In)> {
        let rows = self.per_material(p);
        // A wet solid: its water goes along with what mixes with it.
        let mixes = |m: &super::MaterialUse| {
            m.substance.solubility_in_water == crate::material::Solubility::Miscible
                && m.substance.class == crate::material::Class::Solvent
        };
        if self.technique.takes_feed == Some(Place::MARC) && self.route.materials.iter().any(mixes) {
            let water =
                |m: &&Material| self.substance(**m).is_some_and(|s| s.class == crate::material::Class::Water);
            let wet = self.route.fed.iter().find(water).copied();
            if let Some(wet) = wet.filter(|m| !rows.iter().any(|(taken, _)| taken == m)) {
                let name = self.name_of(wet).to_owned();
                self.doubt(
                    p.key,
                    format!("the sample brings {name}, and nothing says how much of it goes with the extract: all of it stays in the marc"),
                    format!("its share, as \"{name}\": \"90 %\" with a solvent that mixes with water, or a drying agent before the step; \"0 %\" if it is right"),
                );
            }
        }
        for &(material, _) in &rows {
            if !self.route.fed.contains(&material) {
                let name = self.name_of(material).to_owned();
                let fed: Vec<&str> = self.route.fed.iter().map(|m| self.route.name_of(*m)).collect();
                let need = if fed.is_empty() {
                    "a feed that holds it".to_owned()
                } else {
                    format!("a material of the feed ({}), or a feed that holds it", fed.join(", "))
                };
                let row = below(&self.at(p.key), &name);
                let found = format!("the feed holds no {name}, so that none of it is taken out");
                self.route.problems.push(Problem::warning(row, found, need));
            }
        }
        rows
    }

    /// Materials with volumes, each with its density.
    pub fn poured(&mut self, p: &'static Param) -> Vec<Poured> {
        let rows = self.per_material(p);
        let mut out = Vec::new();
        for (material, volume) in rows {
            match self.route.density(material) {
                Some(density) => out.push(Poured { material, volume, density }),
                None => {
                    let name = self.name_of(material).to_owned();
                    let row = below(&self.at(p.key), &name);
                    self.route.problems.push(Problem::error(
                        row,
                        format!("no liquid density of {name} is known at the bench's temperature, so a volume of it has no mass"),
                        "another material, or a density under materials with its source",
                    ));
                }
            }
        }
        out
    }

    /// A material that the technique itself brings in, by its name in the catalogue.
    pub fn known(&mut self, name: &str) -> Option<Material> {
        let path = self.path.clone();
        self.route.material(name, &path)
    }

    /// The central value of an input; SI. For decisions while reading only.
    #[must_use]
    pub fn value(&self, slot: In) -> f64 {
        self.route.value(slot)
    }

    /// A place where mass may go.
    pub fn place(&mut self, p: &'static Param) -> Place {
        self.optional_place(p).unwrap_or(Place::ELSEWHERE)
    }

    /// A place where mass may go, where one is named.
    pub fn optional_place(&mut self, p: &'static Param) -> Option<Place> {
        let path = self.at(p.key);
        match self.find(p) {
            Found::Written(Field::Text(name)) => self.route.place(name, &path),
            Found::Written(other) => {
                let found = format!("{} where a place should stand", shape(other));
                let need = self.route.places();
                self.error(p.key, found, need);
                None
            }
            Found::Default(name) => self.route.place(name, &path),
            Found::Nothing => None,
        }
    }

    /// A bench place, chosen by its name.
    pub fn bench_place(&mut self, p: &'static Param) -> Place {
        Place::named(self.choice(p)).unwrap_or(Place::MARC)
    }

    /// A property of a material from the catalogue (or the plan's own), as an input shared by every route; `None` where
    /// the catalogue does not know it.
    pub fn property(
        &mut self,
        material: Material,
        property: &str,
        kind: Kind,
        of: impl FnOnce(&crate::material::Substance) -> Option<(f64, f64, f64)>,
    ) -> Option<In> {
        self.route.property(material, property, kind, of)
    }

    /// The name of a material of the route.
    #[must_use]
    pub fn name_of(&self, material: Material) -> &str {
        self.route.name_of(material)
    }

    /// What the catalogue (or the plan) knows of a material of the route.
    #[must_use]
    pub fn substance(&self, material: Material) -> Option<&crate::material::Substance> {
        self.route.substance(material)
    }

    /// What the catalogue (or the plan) knows of a material of the route, to be kept by the step.
    #[must_use]
    pub fn shared_substance(&self, material: Material) -> Option<std::sync::Arc<crate::material::Substance>> {
        self.route.materials.get(material.0 as usize).map(|m| std::sync::Arc::clone(&m.substance))
    }

    /// The density of a material of the route at the bench's temperature, as an input; `None` where it has none.
    #[must_use]
    pub fn density_of(&self, material: Material) -> Option<In> {
        self.route.density(material)
    }

    /// The temperature at which solvents are measured out, K.
    #[must_use]
    pub fn bench_temperature_k(&self) -> f64 {
        self.route.bench_temperature_k()
    }

    /// The materials that the route has met so far.
    #[must_use]
    pub fn materials_so_far(&self) -> usize {
        self.route.materials.len()
    }

    /// A number that the plan does not give and that follows from other things, as an input with its basis.
    pub fn computed(&mut self, name: &str, value_si: f64, kind: Kind, basis: &str) -> In {
        let identity = self.at(name);
        let amount = Amount {
            text: basis.to_owned(),
            kind,
            central_si: value_si,
            spread: Spread::Exact,
            share_by: ShareBy::Unstated,
            currency: None,
        };
        self.route.input(identity, &amount, Origin::Computed)
    }

    /// Whether the step writes this key at all, rightly or wrongly.
    #[must_use]
    pub fn written(&self, key: &str) -> bool {
        self.field(key).is_some()
    }

    /// A problem at one of the step's own parameters.
    pub fn problem(&mut self, key: &str, found: impl Into<String>, need: impl Into<String>) {
        self.error(key, found, need);
    }

    /// A doubt at one of the step's own parameters.
    pub fn doubt(&mut self, key: &str, found: impl Into<String>, need: impl Into<String>) {
        let path = self.at(key);
        self.route.problems.push(Problem::warning(path, found, need));
    }

    /// The parameters read so far, in the order asked.
    #[must_use]
    pub fn asked(&self) -> &[&'static str] {
        &self.asked
    }

    /// Measured figures, and whatever the plan writes that the technique does not know.
    pub(super) fn finish(&mut self) -> Vec<Option<Measured>> {
        let doc = self.doc;
        for (key, _) in &doc.fields {
            if !self.technique.params.iter().any(|p| p.key == key) {
                let known = self.technique.params.iter().map(|p| p.key);
                let hint = nearest(key, known.clone()).map_or_else(
                    || format!("one of: {}", known.collect::<Vec<_>>().join(", ")),
                    |k| format!("did you mean {k}?"),
                );
                let found = format!("{} has no parameter \"{key}\"", self.technique.key);
                self.error(key, found, hint);
            }
        }
        let mut measured = vec![None; self.technique.rules.len()];
        let under = below(&self.path, "measured");
        for (name, text) in &doc.measured {
            let path = below(&under, name);
            let open = || self.technique.rules.iter().filter(|r| r.measurable != crate::step::Measurable::No);
            let Some(index) = self.technique.rules.iter().position(|r| r.name == name) else {
                let names = open().map(|r| r.name);
                let hint = nearest(name, names.clone()).map_or_else(
                    || match names.collect::<Vec<_>>() {
                        names if names.is_empty() => {
                            format!("{} has no rule that a measurement could replace", self.technique.key)
                        }
                        names => format!("one of: {}", names.join(", ")),
                    },
                    |k| format!("did you mean \"{k}\"?"),
                );
                self.route.problems.push(Problem::error(
                    path,
                    format!("{} has no rule \"{name}\"", self.technique.key),
                    hint,
                ));
                continue;
            };
            if self.technique.rules[index].measurable == crate::step::Measurable::No {
                let names: Vec<_> = open().map(|r| r.name).collect();
                let need = if names.is_empty() {
                    "leave it out".to_owned()
                } else {
                    format!("one of: {}", names.join(", "))
                };
                self.route.problems.push(Problem::error(
                    path,
                    format!("\"{name}\" cannot be replaced by a measurement"),
                    need,
                ));
                continue;
            }
            if self.technique.rules[index].measurable == crate::step::Measurable::Energy {
                match self.route.amounts.read(text, Kind::Energy) {
                    Ok(amount) => {
                        measured[index] =
                            Some(Measured::Energy(self.route.input(path, &amount, Origin::Measured)));
                        // The meter counts what no power is stated for.
                        let under = self.path.clone() + ".";
                        self.route.uncounted.retain(|path| !path.starts_with(&under));
                    }
                    Err(e) => {
                        let need = "the electricity of one run as a meter reads it, such as \"1.2 kWh\"";
                        let found = format!("\"{text}\": {}", e.found());
                        self.route.problems.push(Problem::error(path, found, need));
                    }
                }
                continue;
            }
            let mass = self.route.amounts.read(text, Kind::Mass);
            let share =
                if mass.is_ok() { mass.clone() } else { self.route.amounts.read(text, Kind::Fraction) };
            measured[index] = match (mass, share) {
                (Ok(amount), _) => Some(Measured::Mass(self.route.input(path, &amount, Origin::Measured))),
                (_, Ok(amount)) => Some(Measured::Share(self.route.input(path, &amount, Origin::Measured))),
                (Err(as_mass), Err(as_share)) => {
                    let e = if text.contains('%') { as_share } else { as_mass };
                    let need = "a mass in one run, such as \"6 ± 2 g\", or a share of what was there, such as \"3 %\"";
                    self.route.problems.push(Problem::error(
                        path,
                        format!("\"{text}\": {}", e.found()),
                        need,
                    ));
                    None
                }
            };
        }
        measured
    }
}

/// The lowest and highest value that an amount may take as far as its limits say; SI.
fn reach(amount: &Amount) -> (f64, f64) {
    match amount.spread {
        Spread::Limits { low_si, high_si } => (low_si, high_si),
        Spread::Exact | Spread::Standard { .. } => (amount.central_si, amount.central_si),
    }
}

fn shape(field: &Field) -> String {
    match field {
        Field::Text(text) => format!("the text \"{text}\""),
        Field::Number(text) => format!("the bare number {text}"),
        Field::YesNo(yes) => format!("{yes}"),
        Field::Rows(rows) => format!("an object with {} entries", rows.len()),
    }
}

fn expectation(p: &Param) -> String {
    match p.control {
        Control::Quantity(kind) => format!("an amount with its unit, such as \"{}\"", example(kind)),
        Control::Choice(words) => format!("one of: {}", words.join(", ")),
        Control::Material => "the name of a material".to_owned(),
        Control::Mixture => "a solvent, or several with their shares".to_owned(),
        Control::PerMaterial(kind) => format!("materials, each with an amount such as \"{}\"", example(kind)),
        Control::PerStream(kind) => format!("streams, each with an amount such as \"{}\"", example(kind)),
        Control::Text => "a text".to_owned(),
        Control::Count => "a whole number".to_owned(),
        Control::YesNo => "true or false".to_owned(),
        Control::Place => "the name of a stream or place".to_owned(),
    }
}

/// An amount of a kind as one would write it.
fn example(kind: Kind) -> String {
    match kind {
        Kind::Mass => "10 g",
        Kind::Volume => "250 mL",
        Kind::Time => "18 h",
        Kind::Temperature => "60 °C",
        Kind::TemperatureDifference => "5 K",
        Kind::Pressure => "300 bar",
        Kind::Power => "250 W",
        Kind::Energy => "1.2 kWh",
        Kind::Fraction => "5 %",
        Kind::Density => "0.79 g/mL",
        Kind::MolarMass => "58.1 g/mol",
        Kind::VolumeFlow => "2 mL/min",
        Kind::MassFlow => "20 g/min",
        Kind::Frequency => "5 /h",
        Kind::VolumePerMass => "1 mL/g",
        Kind::MassPerMass => "0.1 g/g",
        Kind::SpecificEnergy => "350 kJ/kg",
        Kind::Length => "47 mm",
        Kind::Area => "20 cm2",
        Kind::Count | Kind::Number => "3",
        Kind::ClimatePerEnergy => "0.37 kg/kWh",
        Kind::Money => "1200 USD",
        Kind::PricePerMass => "3 USD/kg",
        Kind::PricePerVolume => "12 USD/L",
        Kind::PricePerEnergy => "0.14 USD/kWh",
    }
    .to_owned()
}
