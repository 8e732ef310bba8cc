//! What things cost, as the plan says it: prices read once, each with its identity, so that every route draws the same.

use super::resolve::RouteBuilder;
use super::time::{TimeUse, field, number_of};
use crate::chance::In;
use crate::ledger::Material;
use crate::plan::{Field, Problem, Route, Site, below};
use crate::quantity::{Amount, Currency, Entry, Kind, Origin, Spread};

/// The price of one material.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Price {
    /// For each kilogram.
    PerMass(In),
    /// For each cubic metre; its density beside it.
    PerVolume(In, In),
}

/// One part of what the removal of a stream costs.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Removal {
    /// For each kilogram.
    PerMass(In),
    /// For each cubic metre.
    PerVolume(In),
    /// For each container.
    PerContainer(In),
    /// For each pick-up.
    PerPickUp(In),
}

/// What a route costs, as far as the plan says.
#[derive(Clone, Debug, PartialEq)]
pub struct MoneyUse {
    /// The currency of every price.
    pub currency: Currency,
    /// The price of each material of the route, by its index.
    pub prices: Vec<Option<Price>>,
    /// What the removal of each stream costs, by its index; `None` where the plan does not say.
    pub removal: Vec<Option<Vec<Removal>>>,
    /// Pick-ups of waste in a year.
    pub pick_ups: Option<In>,
    /// For a second of labour.
    pub labour_s: Option<In>,
    /// For a joule of electricity.
    pub electricity_j: Option<In>,
    /// For a cubic metre of cooling water.
    pub cooling_water_m3: Option<In>,
    /// The yearly rate at which later money counts less.
    pub discount: Option<In>,
    /// How many years the case is drawn up for.
    pub years: Option<u32>,
    /// One more instrument.
    pub instrument: Option<In>,
    /// Once: to show that the route works.
    pub validation: Option<In>,
    /// What each bought instrument is worth at the end.
    pub residual: Option<In>,
    /// A year: service.
    pub service: Option<In>,
    /// A year: rent of cylinders.
    pub rent: Option<In>,
    /// A year: anything else.
    pub other: Option<In>,
}

/// Where the prices of the site stand.
const AT: &str = "site.money";
/// A case over more years has left what anybody can foresee.
const MOST_YEARS: u32 = 100;

impl RouteBuilder<'_> {
    pub(super) fn money(&mut self, site: &Site, route: &Route, path: &str) -> Option<MoneyUse> {
        let doc = &site.money;
        if doc.is_empty() {
            if !route.money.is_empty() {
                self.problems.push(Problem::error(
                    below(path, "money"),
                    "the route has prices, and the site names no currency",
                    "site.money with its currency, such as { \"currency\": \"USD\" }",
                ));
            }
            return None;
        }
        let Some(currency) = text(doc, "currency").and_then(|t| Currency::new(t.trim())) else {
            self.problems.push(Problem::error(
                below(AT, "currency"),
                format!("\"{}\" is no currency", text(doc, "currency").unwrap_or_default()),
                "its three letters, such as \"USD\" or \"EUR\"",
            ));
            return None;
        };
        let mut out = MoneyUse {
            currency,
            prices: vec![None; self.materials.len()],
            removal: vec![None; site.streams.len()],
            pick_ups: None,
            labour_s: None,
            electricity_j: None,
            cooling_water_m3: None,
            discount: None,
            years: None,
            instrument: None,
            validation: None,
            residual: None,
            service: None,
            rent: None,
            other: None,
        };
        self.prices(rows(doc, "prices"), &mut out);
        self.removals(rows(doc, "disposal"), site, &mut out);
        out.pick_ups = self.count(doc, "pick_ups", AT);
        // An hour has 3600 seconds.
        out.labour_s = self.price(doc, "labour_hour", AT, Kind::Money, currency, 1.0 / 3600.0);
        out.cooling_water_m3 = self.price(doc, "cooling_water", AT, Kind::PricePerVolume, currency, 1.0);
        if let Some(text) = site.electricity.as_ref().and_then(|e| e.price.as_deref()) {
            out.electricity_j =
                self.amount_of("site.electricity.price", text, Kind::PricePerEnergy, currency, 1.0);
        }
        if let Some(text) = text(doc, "discount") {
            out.discount = self.read_optional(Some(text), Kind::Fraction, &below(AT, "discount"));
        }
        out.years = self.years(doc);
        let at = below(path, "money");
        for (key, slot) in [
            ("instrument", &mut out.instrument),
            ("validation", &mut out.validation),
            ("residual", &mut out.residual),
            ("service", &mut out.service),
            ("rent", &mut out.rent),
            ("other", &mut out.other),
        ] {
            *slot = self.price(&route.money, key, &at, Kind::Money, currency, 1.0);
        }
        if let (Some(new), Some(old)) = (out.instrument, out.residual)
            && self.value(old) > self.value(new)
        {
            self.problems.push(Problem::warning(
                below(&at, "residual"),
                "an instrument that is worth more at the end than it costs",
                "what it brings when it is sold; leave it if it is right",
            ));
        }
        Some(out)
    }

    fn years(&mut self, doc: &[(String, Field)]) -> Option<u32> {
        let text = number_of(field(doc, "years")?)?;
        let years = text.trim().parse().ok().filter(|n| (1..=MOST_YEARS).contains(n));
        if years.is_none() {
            self.problems.push(Problem::error(
                below(AT, "years"),
                format!("{text} is no such number"),
                format!("a whole number of years from 1 to {MOST_YEARS}"),
            ));
        }
        years
    }

    fn price(
        &mut self,
        doc: &[(String, Field)],
        key: &str,
        at: &str,
        kind: Kind,
        currency: Currency,
        factor: f64,
    ) -> Option<In> {
        self.amount_of(&below(at, key), text(doc, key)?, kind, currency, factor)
    }

    /// A price as an input; `None` where it is not known or not readable, which is said.
    fn amount_of(
        &mut self,
        path: &str,
        text: &str,
        kind: Kind,
        currency: Currency,
        factor: f64,
    ) -> Option<In> {
        match self.amounts.entry(text, kind) {
            Ok(Entry::Known(amount)) => {
                self.doubt_below_zero(path, text, &amount);
                self.in_currency(path, &amount, currency)
                    .then(|| self.input(path.to_owned(), &scaled(&amount, kind, factor), Origin::Entered))
            }
            Ok(Entry::NotKnown) => None,
            Err(e) => {
                self.problems.push(Problem::error(path, format!("\"{text}\": {}", e.found()), e.need()));
                None
            }
        }
    }

    /// Warns of a price below zero, and of one that falls below it in some draws.
    fn doubt_below_zero(&mut self, path: &str, text: &str, amount: &Amount) {
        let low = match amount.spread {
            Spread::Exact => amount.central_si,
            Spread::Limits { low_si, .. } => low_si,
            Spread::Standard { u_si } => amount.central_si - 2.0 * u_si,
        };
        let found = if amount.central_si < 0.0 {
            format!("{text} is a negative price: the site would be paid for buying it")
        } else if low < 0.0 {
            format!("{text} falls below zero in some draws: the site would be paid there")
        } else {
            return;
        };
        self.problems.push(Problem::warning(path, found, "leave it if it is right"));
    }

    fn in_currency(&mut self, path: &str, amount: &Amount, currency: Currency) -> bool {
        let same = amount.currency == Some(currency);
        if !same {
            self.problems.push(Problem::error(
                path,
                format!("\"{}\" is not in {currency}, in which the plan counts", amount.text),
                format!("a price in {currency}: no rate of exchange is known here"),
            ));
        }
        same
    }

    fn prices(&mut self, rows: &[(String, String)], out: &mut MoneyUse) {
        let under = below(AT, "prices");
        for (name, text) in rows {
            let path = below(&under, name);
            let known = match self.known_name(name) {
                Ok(known) => known,
                Err((found, need)) => {
                    self.problems.push(Problem::error(path, found, need));
                    continue;
                }
            };
            let Some(i) = self.materials.iter().position(|m| m.name == known) else { continue };
            let Ok(material) = u16::try_from(i).map(Material) else { continue };
            if out.prices.get(i).copied().flatten().is_some() {
                self.problems.push(Problem::error(
                    path,
                    format!("{name} is {known}, which has a price already"),
                    "each material once",
                ));
                continue;
            }
            let price = self.material_price(&path, text, material, out.currency);
            if let (Some(slot), Some(price)) = (out.prices.get_mut(i), price) {
                *slot = Some(price);
            }
        }
    }

    /// A price by mass or volume, or of a pack: "95 USD for 2.5 L", "18 USD for 100".
    fn material_price(
        &mut self,
        path: &str,
        text: &str,
        material: Material,
        currency: Currency,
    ) -> Option<Price> {
        let (kind, amount) = match text.split_once(" for ") {
            Some((money, pack)) => self.pack(path, money, pack, material)?,
            None => {
                let by_mass = self.amounts.entry(text, Kind::PricePerMass);
                let entry =
                    by_mass.or_else(|e| self.amounts.entry(text, Kind::PricePerVolume).map_err(|_| e));
                match entry {
                    Ok(Entry::Known(amount)) => (amount.kind, amount),
                    Ok(Entry::NotKnown) => return None,
                    Err(e) => {
                        let need = "a price by mass or volume, or of a pack: \"17 USD/L\", \"95 USD for 2.5 L\", \"18 USD for 100\"";
                        self.problems.push(Problem::error(path, format!("\"{text}\": {}", e.found()), need));
                        return None;
                    }
                }
            }
        };
        if !self.in_currency(path, &amount, currency) {
            return None;
        }
        self.doubt_below_zero(path, text, &amount);
        if kind == Kind::PricePerMass {
            return Some(Price::PerMass(self.input(path.to_owned(), &amount, Origin::Entered)));
        }
        let Some(density) = self.density(material) else {
            let found =
                format!("a price by volume of {}, whose density is not known", self.name_of(material));
            self.problems.push(Problem::error(path, found, "a price by mass, such as \"3 USD/kg\""));
            return None;
        };
        Some(Price::PerVolume(self.input(path.to_owned(), &amount, Origin::Entered), density))
    }

    fn pack(&mut self, path: &str, money: &str, pack: &str, material: Material) -> Option<(Kind, Amount)> {
        let price = match self.amounts.read(money, Kind::Money) {
            Ok(price) => price,
            Err(e) => {
                self.problems.push(Problem::error(path, format!("\"{money}\": {}", e.found()), e.need()));
                return None;
            }
        };
        for (kind, per) in [
            (Kind::Mass, Kind::PricePerMass),
            (Kind::Volume, Kind::PricePerVolume),
            (Kind::Count, Kind::PricePerMass),
        ] {
            let Ok(size) = self.amounts.read(pack, kind) else { continue };
            let pieces = kind == Kind::Count;
            let piece_kg = if pieces {
                let known = self.substance(material).and_then(|s| s.unit_mass_kg.as_ref().map(|f| f.value));
                let Some(kg) = known else {
                    self.problems.push(Problem::error(
                        path,
                        format!(
                            "a pack of {pack} pieces of {}, whose mass is not known",
                            self.name_of(material)
                        ),
                        "the mass of the pack, such as \"18 USD for 800 g\"",
                    ));
                    return None;
                };
                kg
            } else {
                1.0
            };
            let size_si = size.central_si * piece_kg;
            if size_si <= 0.0 {
                self.problems.push(Problem::error(
                    path,
                    format!("a pack of {pack}"),
                    "a pack with something in it",
                ));
                return None;
            }
            let text = format!("{money} for {pack}");
            return Some((per, Amount { text, ..scaled(&price, per, 1.0 / size_si) }));
        }
        self.problems.push(Problem::error(
            path,
            format!("\"{pack}\" is no size of a pack"),
            "a mass, a volume or a number of pieces, such as \"95 USD for 2.5 L\"",
        ));
        None
    }

    fn removals(&mut self, rows: &[(String, String)], site: &Site, out: &mut MoneyUse) {
        let under = below(AT, "disposal");
        for (name, text) in rows {
            let path = below(&under, name);
            let Some(i) = site.streams.iter().position(|s| s.name == *name) else {
                let names: Vec<&str> = site.streams.iter().map(|s| s.name.as_str()).collect();
                let need = format!("one of: {}", names.join(", "));
                self.problems.push(Problem::error(path, format!("no stream is called \"{name}\""), need));
                continue;
            };
            if text.trim() == "not known" {
                continue;
            }
            let mut parts = Vec::new();
            for part in text.split(" + ") {
                match self.removal(&path, part.trim(), parts.len(), out.currency) {
                    Some(part) => parts.push(part),
                    None => {
                        parts.clear();
                        break;
                    }
                }
            }
            if let (Some(slot), false) = (out.removal.get_mut(i), parts.is_empty()) {
                *slot = Some(parts);
            }
        }
    }

    fn removal(&mut self, path: &str, part: &str, index: usize, currency: Currency) -> Option<Removal> {
        // Each part is a number of its own.
        let identity = if index == 0 { path.to_owned() } else { format!("{path} + {index}") };
        for (ending, kind) in [("/container", Kind::Money), ("/pick-up", Kind::Money)] {
            let Some(money) = part.strip_suffix(ending) else { continue };
            let amount = match self.amounts.read(money, kind) {
                Ok(amount) => amount,
                Err(e) => {
                    self.problems.push(Problem::error(path, format!("\"{part}\": {}", e.found()), e.need()));
                    return None;
                }
            };
            if !self.in_currency(path, &amount, currency) {
                return None;
            }
            let slot = self.input(identity, &amount, Origin::Entered);
            return Some(if ending == "/container" {
                Removal::PerContainer(slot)
            } else {
                Removal::PerPickUp(slot)
            });
        }
        let by_mass = self.amounts.read(part, Kind::PricePerMass);
        let amount = by_mass.or_else(|e| self.amounts.read(part, Kind::PricePerVolume).map_err(|_| e));
        match amount {
            Ok(amount) => {
                let by_mass = amount.kind == Kind::PricePerMass;
                self.in_currency(path, &amount, currency).then(|| {
                    let slot = self.input(identity, &amount, Origin::Entered);
                    if by_mass { Removal::PerMass(slot) } else { Removal::PerVolume(slot) }
                })
            }
            Err(e) => {
                let need = "by kg, L, container or pick-up, or several of them: \"85 USD/container + 140 USD/pick-up\"";
                self.problems.push(Problem::error(path, format!("\"{part}\": {}", e.found()), need));
                None
            }
        }
    }
}

/// Whether money can be counted at all: with what the route takes of people.
impl MoneyUse {
    /// Whether the plan gives everything that an hour of this route's people costs.
    #[must_use]
    pub const fn knows_labour(&self, time: &TimeUse) -> bool {
        self.labour_s.is_some() || !time.attends()
    }
}

fn scaled(amount: &Amount, kind: Kind, factor: f64) -> Amount {
    let spread = match amount.spread {
        Spread::Exact => Spread::Exact,
        Spread::Limits { low_si, high_si } => {
            Spread::Limits { low_si: low_si * factor, high_si: high_si * factor }
        }
        Spread::Standard { u_si } => Spread::Standard { u_si: u_si * factor },
    };
    Amount { kind, central_si: amount.central_si * factor, spread, ..amount.clone() }
}

pub(super) fn text<'d>(doc: &'d [(String, Field)], key: &str) -> Option<&'d str> {
    match field(doc, key)? {
        Field::Text(text) => Some(text),
        Field::Number(_) | Field::YesNo(_) | Field::Rows(_) => None,
    }
}

pub(super) fn rows<'d>(doc: &'d [(String, Field)], key: &str) -> &'d [(String, String)] {
    match field(doc, key) {
        Some(Field::Rows(rows)) => rows,
        _ => &[],
    }
}
