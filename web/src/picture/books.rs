//! What the pictures of masses read from an account: who brings what, and where it ends.

use super::Hatch;
use super::letter::written;
use thimbleworth::account::RouteAccount;
use thimbleworth::ledger::{Material, Place};
use thimbleworth::letter::sentence;
use thimbleworth::program::{RouteProgram, SiteUse};
use thimbleworth::quantity::Currency;

/// For what amounts are given.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Per {
    /// A year's work.
    Year,
    /// A reported result.
    Result,
    /// A batch.
    Batch,
    /// A kilogram of product, where there is any.
    KgProduct,
}

impl Per {
    /// As it follows an amount: "12 kg a year".
    #[must_use]
    pub const fn words(self) -> &'static str {
        match self {
            Self::Year => "a year",
            Self::Result => "for each result",
            Self::Batch => "for each batch",
            Self::KgProduct => "for each kg of product",
        }
    }

    /// A year's amount for one of these; `None` where the route makes none.
    pub(super) fn of(self, account: &RouteAccount, a_year: f64) -> Option<f64> {
        match self {
            Self::Year => Some(a_year),
            Self::Result => Some(account.per_result(a_year)),
            Self::Batch => Some(account.per_batch(a_year)),
            Self::KgProduct => account.per_kg_product(a_year),
        }
    }
}

/// What kind of place mass ends in: no more kinds than can be told apart without colour.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum End {
    Kept,
    Waste,
    Air,
    Other,
    Back,
}

impl End {
    pub(super) fn of(place: Place) -> Self {
        match place {
            Place::STORE => Self::Back,
            Place::PRODUCT | Place::BY_PRODUCT | Place::HELD => Self::Kept,
            Place::HOOD | Place::ROOM => Self::Air,
            p if p.stream_index().is_some() => Self::Waste,
            _ => Self::Other,
        }
    }

    /// Fill of a bar.
    pub(super) const fn class(self) -> &'static str {
        match self {
            Self::Kept => "fill-kept",
            Self::Waste => "fill-waste",
            Self::Air => "fill-air",
            Self::Other => "fill-other",
            Self::Back => "fill-back",
        }
    }

    pub(super) const fn hatch(self) -> Hatch {
        match self {
            Self::Kept | Self::Waste | Self::Back => Hatch::No,
            Self::Air => Hatch::Lines,
            Self::Other => Hatch::Dots,
        }
    }

    pub(super) const fn words(self) -> &'static str {
        match self {
            Self::Kept => "product or kept",
            Self::Waste => "waste stream",
            Self::Air => "air",
            Self::Other => "drain, destroyed or elsewhere",
            Self::Back => "returned",
        }
    }
}

/// How the fills are to be read, of those that occur.
pub(super) fn fills(ends: &[End]) -> String {
    let said: Vec<&str> = [
        (End::Waste, "plain is a waste stream"),
        (End::Air, "slanting lines are air"),
        (End::Kept, "dark is product or kept"),
        (End::Other, "dots are drain, destroyed or elsewhere"),
        (End::Back, "a broken outline is returned to the store"),
    ]
    .into_iter()
    .filter_map(|(end, words)| ends.contains(&end).then_some(words))
    .collect();
    let text = said.join("; ");
    if text.is_empty() { text } else { sentence(&text) + "." }
}

/// The first few of a list in words; a sentence with more of them would not be read.
pub(super) fn few(items: &[String]) -> String {
    match items {
        [a, b, c, d, _, rest @ ..] => format!("{a}; {b}; {c}; {d}; and {} more in the table", rest.len() + 1),
        _ => items.join("; "),
    }
}

/// The name of a place, streams by the site's names.
pub(super) fn place_name(site: &SiteUse, place: Place) -> String {
    place
        .stream_index()
        .and_then(|i| site.streams.get(i))
        .map_or_else(|| place.name().unwrap_or_default().to_owned(), |s| s.name.clone())
}

pub(super) fn material_name(route: &RouteProgram, material: Material) -> &str {
    route.materials.get(material.0 as usize).map_or("", |m| m.name.as_str())
}

/// The places off the bench that a route's mass has come into, the store among them, with a year's mass; kg.
pub(super) fn into_places(account: &RouteAccount) -> Vec<(Place, f64)> {
    let mut found: Vec<(Place, f64)> = Vec::new();
    for posting in &account.trace.postings {
        let kg = posting.kg_a_year();
        // Pushed out of a container again by filling: it has not stayed there.
        if let Some((_, sum)) =
            found.iter_mut().find(|(p, _)| p.stream_index().is_some() && *p == posting.from)
        {
            *sum -= kg;
        }
        if posting.to.on_bench() || !(kg > 0.0 && kg.is_finite()) {
            continue;
        }
        match found.iter_mut().find(|(p, _)| *p == posting.to) {
            Some((_, sum)) => *sum += kg,
            None => found.push((posting.to, kg)),
        }
    }
    found
}

/// One unit for all masses of a picture, that of the largest: its symbol, and how many of it a kilogram is.
pub(super) fn mass_unit(largest_kg: f64) -> (&'static str, f64) {
    match largest_kg {
        x if x >= 1e4 => ("t", 1e-3),
        x if x >= 1.0 => ("kg", 1.0),
        x if x >= 1e-3 => ("g", 1e3),
        x if x >= 1e-6 => ("mg", 1e6),
        x if x > 0.0 => ("µg", 1e9),
        _ => ("kg", 1.0),
    }
}

/// The same for money: millions from a million on, which leaves room for names.
pub(super) fn money_unit(most: f64, currency: Currency) -> (String, f64) {
    let (words, over) = if most >= 1e6 { ("million ", 1e-6) } else { ("", 1.0) };
    ([words, currency.code()].concat(), over)
}

/// A mass in such a unit, without it.
pub(super) fn mass(kg: f64, unit: (&str, f64)) -> String {
    written(kg * unit.1, 3)
}

/// A mass in such a unit, with it.
pub(super) fn mass_with_unit(kg: f64, unit: (&str, f64)) -> String {
    format!("{}\u{a0}{}", mass(kg, unit), unit.0)
}

/// A share in per cent.
pub(super) fn percent(share: f64) -> String {
    format!("{}\u{202f}%", written(share * 100.0, if share >= 0.995 { 3 } else { 2 }))
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn units_follow_the_largest() {
        for (kg, text) in [
            (0.0, "0\u{a0}kg"),
            (1e-12, "0.001\u{a0}µg"),
            (0.25, "250\u{a0}g"),
            (437.2, "437\u{a0}kg"),
            (1e9, "1\u{202f}000\u{202f}000\u{a0}t"),
        ] {
            assert_eq!(mass_with_unit(kg, mass_unit(kg)), text);
        }
    }

    #[test]
    fn long_lists_are_cut() {
        let items: Vec<String> = (1..=6).map(|i| i.to_string()).collect();
        assert_eq!(few(&items[..4]), "1; 2; 3; 4");
        assert_eq!(few(&items), "1; 2; 3; 4; and 2 more in the table");
    }

    #[test]
    fn every_place_has_its_kind() {
        assert_eq!(End::of(Place::HOOD), End::Air);
        assert_eq!(End::of(Place::DRAIN), End::Other);
        assert_eq!(Place::stream(3).map(End::of), Some(End::Waste));
        assert_eq!(fills(&[End::Air]), "Slanting lines are air.");
        assert_eq!(fills(&[]), "");
    }
}
