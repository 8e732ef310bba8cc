//! The materials of a plan: the catalogue's, with the plan's own beside and over them.

use crate::material::{Class, Figure, FlashPoint, Law, Solubility, Substance, catalogue};
use crate::order::Index;
use crate::plan::{Field, OwnMaterial, Problem, below, nearest};
use crate::quantity::{Amount, Kind, Spread, read};
use crate::source::{SITE, Standing};
use crate::step::{Control, Param};
use std::sync::Arc;

/// A material of one route.
#[derive(Clone, Debug)]
pub struct MaterialUse {
    /// The name under which the book shows it.
    pub name: String,
    /// What is known of it.
    pub substance: Arc<Substance>,
}

const CLASSES: &[&str] =
    &["solvent", "gas", "water", "reagent", "drying agent", "sorbent", "consumable", "matrix", "solute"];

/// The fields of a material that a plan adds or overrides.
pub static OWN_FIELDS: &[Param] = &[
    Param::new("class", "Class", Control::Choice(CLASSES))
        .hint("What it counts as in the accounts; solute when left out."),
    Param::new("cas", "CAS number", Control::Text).hint("As in 110-54-3."),
    Param::new("formula", "Formula", Control::Text).hint("As in C6H14."),
    Param::quantity("molar_mass", "Molar mass", Kind::MolarMass).physical(1e-3, 10.0),
    Param::quantity("density", "Density at the bench's temperature", Kind::Density).physical(0.01, 25_000.0),
    Param::quantity("bulk_density", "Bulk density", Kind::Density).physical(1.0, 25_000.0),
    Param::quantity("boiling_point", "Boiling point", Kind::Temperature).physical(1.0, 5000.0),
    Param::quantity("flash_point", "Flash point", Kind::Temperature)
        .physical(1.0, 2000.0)
        .hint("Or \"none\"."),
    Param::quantity("solubility_in_water", "Solubility in water", Kind::Density)
        .physical(0.0, 5000.0)
        .hint("Mass dissolved in a volume of water, or \"miscible\"."),
    Param::new("hazards", "Hazard statements", Control::Text)
        .hint("H codes with spaces between, or \"none\"."),
    Param::new("source", "Source", Control::Text).required().hint("Where these figures come from."),
];

/// Resolves names once for a whole plan.
pub struct MaterialBook {
    /// The plan's own, by their names.
    own: Index<'static>,
    /// What the plan calls the catalogue's.
    met: Index<'static>,
    substances: Vec<Arc<Substance>>,
}

impl MaterialBook {
    /// Reads the plan's own materials.
    #[must_use]
    pub fn read(own: &[OwnMaterial], problems: &mut Vec<Problem>) -> Self {
        let mut book = Self { own: Index::default(), met: Index::default(), substances: Vec::new() };
        for material in own {
            let path = below("materials", &material.name);
            let substance = own_substance(material, &path, problems);
            book.own.put(material.name.clone(), book.substances.len());
            book.substances.push(Arc::new(substance));
        }
        book
    }

    /// As [`MaterialBook::find`], without suggestions, and by the CAS number of the plan's own materials too: for long
    /// lists of names.
    #[must_use]
    pub fn known(&self, name: &str) -> Option<Arc<Substance>> {
        let own =
            |name: &str| self.own.get(name).and_then(|place| self.substances.get(place)).map(Arc::clone);
        if let Some(own) = own(name) {
            return Some(own);
        }
        if let Some(known) = catalogue().known(name) {
            return Some(own(&known.name).unwrap_or_else(|| Arc::new(known.clone())));
        }
        let same = |own: &&Arc<Substance>| {
            own.name.eq_ignore_ascii_case(name) || own.cas.as_deref().is_some_and(|cas| cas == name)
        };
        // What stands behind them was met under another name.
        self.substances.iter().take(self.own.len()).find(same).map(Arc::clone)
    }

    /// The material of this name: the plan's own first, then the catalogue's by name, synonym or CAS number.
    ///
    /// # Errors
    /// What was found and what would do, when nobody knows the name.
    pub fn find(&mut self, name: &str) -> Result<MaterialUse, (String, String)> {
        let place = self.own.get(name).or_else(|| self.met.get(name));
        if let Some(own) = place.and_then(|place| self.substances.get(place)) {
            return Ok(MaterialUse { name: own.name.to_string(), substance: Arc::clone(own) });
        }
        match catalogue().find(name) {
            Ok(known) => {
                // A synonym of a material that the plan overrides is that material too.
                let own = self.own.get(&known.name).and_then(|place| self.substances.get(place));
                let substance = own.map_or_else(|| Arc::new(known.clone()), Arc::clone);
                self.met.put(name.to_owned(), self.substances.len());
                self.substances.push(Arc::clone(&substance));
                Ok(MaterialUse { name: substance.name.to_string(), substance })
            }
            Err(unknown) => {
                let own = nearest(name, self.own.iter().map(|(own, _)| own)).map(str::to_owned);
                let mut suggestions: Vec<_> = own.into_iter().chain(unknown.suggestions).collect();
                suggestions.truncate(3);
                let need = if suggestions.is_empty() {
                    "a name from the catalogue (thimbleworth materials lists it), or add it under materials with its source".to_owned()
                } else {
                    format!(
                        "did you mean {}? Or add it under materials with its source",
                        suggestions.join(", ")
                    )
                };
                Err((format!("no material \"{name}\" is known"), need))
            }
        }
    }
}

fn own_substance(own: &OwnMaterial, path: &str, problems: &mut Vec<Problem>) -> Substance {
    let mut substance = catalogue()
        .find(&own.name)
        .map_or_else(|_| Substance::blank(own.name.clone(), Class::Solute), |known| known.clone());
    substance.name = own.name.clone().into();
    let text = |key: &str| {
        own.fields.iter().find(|(k, _)| k == key).and_then(|(_, f)| match f {
            Field::Text(text) => Some(text.as_str()),
            Field::Number(_) | Field::YesNo(_) | Field::Rows(_) => None,
        })
    };
    let source = text("source").map(str::trim).filter(|s| !s.is_empty());
    if source.is_none() {
        problems.push(Problem::error(
            below(path, "source"),
            format!("{} has no source", own.name),
            "say where its figures come from, such as \"supplier's data sheet, 2026\"",
        ));
    }
    let source = source.unwrap_or(SITE.cite).to_owned();
    for (key, field) in &own.fields {
        let at = below(path, key);
        let Some(declared) = OWN_FIELDS.iter().find(|p| p.key == key) else {
            let known = OWN_FIELDS.iter().map(|p| p.key);
            let need = nearest(key, known.clone()).map_or_else(
                || format!("one of: {}", known.collect::<Vec<_>>().join(", ")),
                |k| format!("did you mean {k}?"),
            );
            problems.push(Problem::error(at, format!("a material has no field \"{key}\""), need));
            continue;
        };
        let Field::Text(text) = field else {
            problems.push(Problem::error(at, format!("{key} is not a text"), declared.hint));
            continue;
        };
        if let Err((found, need)) = set(&mut substance, declared, text.trim(), &source) {
            problems.push(Problem::error(at, found, need));
        }
    }
    substance
}

fn set(to: &mut Substance, p: &Param, text: &str, source: &str) -> Result<(), (String, String)> {
    match p.key {
        "class" => {
            to.class = Class::from_word(text).ok_or_else(|| {
                (format!("\"{text}\" is no class"), format!("one of: {}", CLASSES.join(", ")))
            })?;
        }
        "cas" => to.cas = Some(text.to_owned().into()),
        "formula" => to.formula = Some(text.to_owned().into()),
        "hazards" => {
            to.hazard.statements = statements(text)?;
            to.hazard.supplier_statements.clear();
            to.hazard.source = source.to_owned().into();
            to.hazard.standing = Some(Standing::Site);
        }
        "flash_point" if text == "none" => to.flash_point_k = FlashPoint::None,
        "solubility_in_water" if text == "miscible" => to.solubility_in_water = Solubility::Miscible,
        "source" => {}
        _ => {
            let Control::Quantity(kind) = p.control else { return Ok(()) };
            let amount = read(text, kind).map_err(|e| (format!("\"{text}\": {}", e.found()), e.need()))?;
            if amount.central_si < p.physical.0 || amount.central_si > p.physical.1 {
                return Err((
                    format!("{} is outside what is possible", amount.understood()),
                    format!(
                        "between {} and {}",
                        crate::quantity::show(p.physical.0, kind),
                        crate::quantity::show(p.physical.1, kind)
                    ),
                ));
            }
            let figure = figure(&amount, source);
            match p.key {
                "molar_mass" => to.molar_mass_kg_mol = Some(figure),
                "density" => to.density = Law::Constant(figure),
                "bulk_density" => to.bulk_density_kg_m3 = Some(figure),
                "boiling_point" => to.boiling_point_k = Some(figure),
                "flash_point" => to.flash_point_k = FlashPoint::Known(figure),
                "solubility_in_water" => to.solubility_in_water = Solubility::Limited(figure),
                _ => {}
            }
        }
    }
    Ok(())
}

fn figure(amount: &Amount, source: &str) -> Figure {
    let (low, high) = match amount.spread {
        Spread::Exact => (amount.central_si, amount.central_si),
        Spread::Limits { low_si, high_si } => (low_si, high_si),
        Spread::Standard { u_si } => (amount.central_si - u_si, amount.central_si + u_si),
    };
    Figure::new(amount.central_si, low, high, source.to_owned())
}

/// H statements as people list them: `H225, H319 H336`.
fn statements(text: &str) -> Result<Vec<String>, (String, String)> {
    if text == "none" {
        return Ok(Vec::new());
    }
    let mut out = Vec::new();
    for word in text.split([' ', ',', ';', '+']).filter(|w| !w.is_empty()) {
        let digits = word.trim_start_matches("EUH").trim_start_matches('H');
        let plain = (word.starts_with('H') || word.starts_with("EUH"))
            && digits.len() >= 3
            && digits.bytes().take(3).all(|b| b.is_ascii_digit())
            && digits.bytes().all(|b| b.is_ascii_alphanumeric());
        if !plain {
            return Err((
                format!("\"{word}\" is no hazard statement"),
                "codes such as H225 or EUH066 with spaces between, or \"none\"".to_owned(),
            ));
        }
        out.push(word.to_owned());
    }
    Ok(out)
}
