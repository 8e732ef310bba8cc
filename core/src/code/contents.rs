//! What a container holds, and what came to it.

use crate::material::{Class, FlashPoint, Rcra, Substance, catalogue};

/// One material in a container.
#[derive(Clone, Debug)]
pub struct Part<'a> {
    /// The material.
    pub substance: &'a Substance,
    /// Its mass; kg.
    pub kg: f64,
    /// Its density as a liquid; kg/m³; `None` for what adds no volume.
    pub density_kg_m3: Option<f64>,
}

impl<'a> Part<'a> {
    /// A liquid of this mass and density.
    #[must_use]
    pub const fn new(substance: &'a Substance, kg: f64, density_kg_m3: f64) -> Self {
        Self { substance, kg, density_kg_m3: Some(density_kg_m3) }
    }

    /// Its volume; m³.
    #[must_use]
    pub fn volume_m3(&self) -> f64 {
        self.density_kg_m3.map_or(0.0, |d| self.kg / d)
    }
}

/// A solvent as it was measured out before use.
#[derive(Clone, Debug, Default)]
pub struct Charge<'a> {
    /// Which charge: shown in the verdict.
    pub what: String,
    /// Its materials with their volumes before mixing; m³.
    pub volumes_m3: Vec<(&'a Substance, f64)>,
}

/// A flash point by a closed-cup test of the waste itself.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Flash {
    /// The test found none.
    None,
    /// The test found this; K.
    AtK(f64),
}

/// From what kind of work the waste comes: it decides the chapter of the List of Waste.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub enum Activity {
    /// Laboratory work.
    #[default]
    Laboratory,
    /// Degreasing and cleaning of metal.
    Degreasing,
    /// Extraction of food and plant material.
    Food,
    /// Basic organic chemicals.
    Organics,
    /// Pharmaceuticals.
    Pharmaceuticals,
    /// Fats, soaps, detergents, cosmetics.
    Fats,
    /// Fine chemicals.
    FineChemicals,
}

impl Activity {
    /// The words of a plan, in the order of the variants.
    pub const WORDS: &'static [&'static str] =
        &["laboratory", "degreasing", "food", "organics", "pharmaceuticals", "fats", "fine chemicals"];

    const ALL: [Self; 7] = [
        Self::Laboratory,
        Self::Degreasing,
        Self::Food,
        Self::Organics,
        Self::Pharmaceuticals,
        Self::Fats,
        Self::FineChemicals,
    ];

    /// The activity of this word.
    #[must_use]
    pub fn of(word: &str) -> Option<Self> {
        Self::WORDS.iter().position(|w| *w == word).and_then(|i| Self::ALL.get(i).copied())
    }
}

/// Everything in one container.
#[derive(Clone, Debug, Default)]
pub struct Contents<'a> {
    /// Whether it holds solids.
    pub solid: bool,
    /// What lies in it.
    pub parts: Vec<Part<'a>>,
    /// The charges of which anything came to it.
    pub charges: Vec<Charge<'a>>,
    /// Lowest and highest pH, where it is known.
    pub ph: Option<(f64, f64)>,
    /// Flash point by test.
    pub flash: Option<Flash>,
    /// Whether what is poured in is unused product.
    pub unused: bool,
    /// From what kind of work it comes.
    pub activity: Activity,
}

impl<'a> Contents<'a> {
    /// All mass in it; kg.
    #[must_use]
    pub fn mass_kg(&self) -> f64 {
        self.parts.iter().fold(0.0, |sum, p| sum + p.kg)
    }

    /// The volume of its liquids as if they mixed without change; m³.
    #[must_use]
    pub fn volume_m3(&self) -> f64 {
        self.parts.iter().fold(0.0, |sum, p| sum + p.volume_m3())
    }

    /// Density of its liquids as if they mixed without change, solids dissolved in them; kg/m³.
    #[must_use]
    pub fn density_kg_m3(&self) -> Option<f64> {
        let m3 = self.volume_m3();
        (m3 > 0.0).then(|| self.mass_kg() / m3)
    }

    /// Its share of water by mass.
    #[must_use]
    pub fn water_share(&self) -> f64 {
        self.mass_share(&is_water)
    }

    /// Whether it is a liquid of which water makes up a fifth by volume or more, so that a pH can be measured in it.
    #[must_use]
    pub fn aqueous(&self) -> bool {
        !self.solid && self.volume_share(&is_water) >= AQUEOUS
    }

    /// Organic halogen as the elements, a share by mass: of solvents whose formula is known.
    ///
    /// ```
    /// use thimbleworth::{code::{Contents, Part}, material::catalogue};
    /// let dcm = catalogue().find("dichloromethane").unwrap();
    /// let drum = Contents { parts: vec![Part::new(dcm, 1.0, 1326.0)], ..Contents::default() };
    /// // 2 · 35.45 / 84.93
    /// assert!((drum.halogen_share() - 0.8348).abs() < 1e-3);
    /// ```
    #[must_use]
    pub fn halogen_share(&self) -> f64 {
        let mut kg = 0.0;
        for p in self.parts.iter().filter(|p| is_solvent(p.substance)) {
            let Some(Ok(elements)) = p.substance.elements() else { continue };
            let mut of_halogen = 0.0;
            for (symbol, molar_mass_kg_mol) in
                [("F", 0.018_998), ("Cl", 0.035_45), ("Br", 0.079_904), ("I", 0.126_904)]
            {
                of_halogen += f64::from(elements.count(symbol)) * molar_mass_kg_mol;
            }
            // w = Σ nᵢ Mᵢ / M
            kg += p.kg * of_halogen / elements.molar_mass_kg_mol();
        }
        kg / self.mass_kg()
    }

    /// Density of its liquids alone, as if they mixed without change; kg/m³.
    #[must_use]
    pub fn liquid_density_kg_m3(&self) -> Option<f64> {
        let m3 = self.volume_m3();
        let kg = self.parts.iter().filter(|p| p.density_kg_m3.is_some()).fold(0.0, |sum, p| sum + p.kg);
        (m3 > 0.0).then(|| kg / m3)
    }

    /// The share by mass of the parts for which this holds.
    pub(super) fn mass_share(&self, holds: &dyn Fn(&Substance) -> bool) -> f64 {
        let kg = self.parts.iter().filter(|p| holds(p.substance)).fold(0.0, |sum, p| sum + p.kg);
        kg / self.mass_kg()
    }

    /// The share by volume of the parts for which this holds; 0 without liquids.
    pub(super) fn volume_share(&self, holds: &dyn Fn(&Substance) -> bool) -> f64 {
        let m3 = self.parts.iter().filter(|p| holds(p.substance)).fold(0.0, |sum, p| sum + p.volume_m3());
        if m3 > 0.0 { m3 / self.volume_m3() } else { 0.0 }
    }

    /// Substances in it for which this holds.
    pub(super) fn having(&self, holds: &dyn Fn(&Substance) -> bool) -> Vec<&'a Substance> {
        self.parts.iter().filter(|p| p.kg > 0.0 && holds(p.substance)).map(|p| p.substance).collect()
    }
}

/// Share of water by volume from which a pH is measured (SW-846 9040C section 1.1, from memory).
pub(super) const AQUEOUS: f64 = 0.2;

/// The temperature below which a liquid counts as ignitable or flammable, 60 °C; K.
pub(super) const FLASH_LIMIT_K: f64 = 333.15;

pub(crate) fn is_water(s: &Substance) -> bool {
    s.class == Class::Water
}

pub(super) fn is_solvent(s: &Substance) -> bool {
    s.class == Class::Solvent
}

/// A liquid with a flash point below 60 °C.
pub(super) fn is_flammable(s: &Substance) -> bool {
    let liquid = matches!(s.class, Class::Solvent | Class::Reagent | Class::Solute);
    liquid && s.flash_point_k.figure().is_some_and(|f| f.value < FLASH_LIMIT_K)
}

/// A solvent of whose flash point nothing is known.
pub(super) fn is_unknown(s: &Substance) -> bool {
    is_solvent(s) && s.flash_point_k == FlashPoint::NotKnown
}

/// An alcohol, by its name.
pub(super) fn is_alcohol(s: &Substance) -> bool {
    is_solvent(s) && (s.name.ends_with("anol") || s.name.ends_with("alcohol"))
}

fn has_element(s: &Substance, symbols: &[&str]) -> bool {
    matches!(s.elements(), Some(Ok(e)) if symbols.iter().any(|x| e.count(x) > 0))
}

/// A solvent with fluorine, chlorine, bromine or iodine.
pub(crate) fn is_halogenated(s: &Substance) -> bool {
    is_solvent(s) && has_element(s, &["F", "Cl", "Br", "I"])
}

/// A solvent of carbon and hydrogen alone.
pub(crate) fn is_hydrocarbon(s: &Substance) -> bool {
    is_solvent(s) && s.formula.is_some() && !has_element(s, &["F", "Cl", "Br", "I", "O", "N", "S", "P"])
}

/// The waste codes of a substance: its own, or those of the catalogue's substance with its CAS number.
pub(super) fn rcra(s: &Substance) -> &Rcra {
    let known = || s.cas.as_deref().and_then(|cas| catalogue().find(cas).ok());
    if s.rcra.source.is_empty() { known().map_or(&s.rcra, |k| &k.rcra) } else { &s.rcra }
}
