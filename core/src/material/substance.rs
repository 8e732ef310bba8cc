//! One material and everything the accounts ask of it.
use super::{Composition, Figure, FormulaError, Law, PropertyError, Text, parse_formula};
use crate::source::Standing;

/// What a material is used as.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum Class {
    /// A liquid that dissolves and is driven off.
    Solvent,
    /// A gas at room conditions, liquefied or not.
    Gas,
    /// Water.
    Water,
    /// An acid, a base, a salt.
    Reagent,
    /// A solid that takes up water.
    DryingAgent,
    /// A solid that takes up what is sought, or what disturbs.
    Sorbent,
    /// A thing that is used up: a thimble, a cartridge, a filter.
    Consumable,
    /// What is extracted.
    Matrix,
    /// What is sought.
    Solute,
}

impl Class {
    /// All classes, in the order of the catalogue.
    pub const ALL: [Self; 9] = [
        Self::Solvent,
        Self::Gas,
        Self::Water,
        Self::Reagent,
        Self::DryingAgent,
        Self::Sorbent,
        Self::Consumable,
        Self::Matrix,
        Self::Solute,
    ];

    /// The word in a plan and in the tables.
    #[must_use]
    pub const fn word(self) -> &'static str {
        match self {
            Self::Solvent => "solvent",
            Self::Gas => "gas",
            Self::Water => "water",
            Self::Reagent => "reagent",
            Self::DryingAgent => "drying agent",
            Self::Sorbent => "sorbent",
            Self::Consumable => "consumable",
            Self::Matrix => "matrix",
            Self::Solute => "solute",
        }
    }

    /// The class with this word.
    ///
    /// ```
    /// use thimbleworth::material::Class;
    /// assert_eq!(Class::from_word("drying agent"), Some(Class::DryingAgent));
    /// ```
    #[must_use]
    pub fn from_word(word: &str) -> Option<Self> {
        Self::ALL.into_iter().find(|class| class.word() == word)
    }
}

/// What is known of the flash point.
#[derive(Clone, Debug, Default, PartialEq)]
pub enum FlashPoint {
    /// Nothing is known: treat as ignitable until tested.
    #[default]
    NotKnown,
    /// The standard test finds none. The vapour may still burn in air, as that of dichloromethane does.
    None,
    /// The flash point, K, closed cup.
    Known(Figure),
}

impl FlashPoint {
    /// The figure, where there is one.
    #[must_use]
    pub const fn figure(&self) -> Option<&Figure> {
        match self {
            Self::Known(figure) => Some(figure),
            Self::NotKnown | Self::None => None,
        }
    }
}

/// Solubility in water at 20 to 25 °C.
#[derive(Clone, Debug, Default, PartialEq)]
pub enum Solubility {
    /// Nothing is known, or the question has no meaning.
    #[default]
    NotKnown,
    /// Mixes with water in every ratio.
    Miscible,
    /// kg of the substance in a m³ of water (g/L); for gases at 1 atm of the gas.
    Limited(Figure),
}

/// Hazard statements with their date.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Hazard {
    /// The harmonised statements, codes in order; empty when there are none.
    pub statements: Vec<String>,
    /// The statements of a usual supplier label where it carries more than the harmonised entry; empty otherwise.
    pub supplier_statements: Vec<String>,
    /// The day on which the entry was held to be right, `2026-12-01`; empty when nothing is known of the hazards.
    pub as_of: Text,
    /// A key of the bibliography; empty when nothing is known.
    pub source: Text,
    /// How far the source has been traced; `None` when nothing is known of the hazards.
    pub standing: Option<Standing>,
    /// What changed lately, or what to mind; may be empty.
    pub note: Text,
}

/// Whether the substance is fully registered under REACH, which CHEM21's defaults ask.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub enum Registration {
    /// Fully registered.
    Full,
    /// Registered as an intermediate or in a low tonnage only.
    Partial,
    /// Not known.
    #[default]
    Unknown,
}

/// Global warming potential over 100 years, kg CO2e/kg, by edition of the IPCC assessment report.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Gwp100 {
    /// Fourth report, 2007.
    pub ar4: Option<Figure>,
    /// Fifth report, 2013.
    pub ar5: Option<Figure>,
    /// Sixth report, 2021.
    pub ar6: Option<Figure>,
}

/// Transport classification of the pure substance (or of the usual solution).
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Transport {
    /// `UN1090`.
    pub un: Text,
    /// Class with subsidiary hazards in brackets, `3 (6.1)`.
    pub class: Text,
    /// `I`, `II`, `III`, `I or II`; empty for gases.
    pub packing_group: Text,
    /// A key of the bibliography.
    pub source: Text,
}

/// Waste codes of the United States. Help for a licensed person; local rules and licensed practice decide.
#[derive(Clone, Debug, Default, PartialEq, Eq)]
pub struct Rcra {
    /// Characteristic codes that the pure substance meets (D001 to D003).
    pub characteristic: Vec<String>,
    /// Toxicity characteristic codes, at or above the limit in the extract.
    pub toxicity: Vec<String>,
    /// Spent-solvent codes outside degreasing.
    pub spent: Vec<String>,
    /// Spent-solvent codes in degreasing only.
    pub spent_in_degreasing: Vec<String>,
    /// Code of the unused commercial product.
    pub unused: Option<Text>,
    /// A key of the bibliography; empty when no code is known.
    pub source: Text,
}

/// Codes of the European List of Waste. Help for a licensed person; national practice differs.
#[derive(Clone, Debug, Default, PartialEq, Eq)]
pub struct EuLow {
    /// As a spent solvent, `14 06 03*`.
    pub spent: Option<Text>,
    /// As an unused laboratory chemical or gas, `16 05 06*`.
    pub laboratory: Option<Text>,
    /// A key of the bibliography; empty when no code is known.
    pub source: Text,
}

/// One material. Every field is public, so that a plan can override any of them.
#[derive(Clone, Debug, PartialEq)]
pub struct Substance {
    /// The name under which it appears in every report.
    pub name: Text,
    /// Other names under which it is found.
    pub synonyms: Vec<Text>,
    /// CAS registry number.
    pub cas: Option<Text>,
    /// Formula; for a solution that of the solute.
    pub formula: Option<Text>,
    /// What it is used as.
    pub class: Class,
    /// What to mind about its figures; may be empty.
    pub note: Text,
    /// Molar mass, kg/mol.
    pub molar_mass_kg_mol: Option<Figure>,
    /// Boiling point at 101.325 kPa, K.
    pub boiling_point_k: Option<Figure>,
    /// Flash point, K.
    pub flash_point_k: FlashPoint,
    /// Auto-ignition temperature, K.
    pub autoignition_k: Option<Figure>,
    /// Critical temperature, K.
    pub critical_temperature_k: Option<Figure>,
    /// Density of the (saturated) liquid, kg/m³.
    pub density: Law,
    /// Vapour pressure, Pa.
    pub vapour_pressure: Law,
    /// Heat of vaporisation, J/kg.
    pub heat_of_vaporisation: Law,
    /// Solubility in water.
    pub solubility_in_water: Solubility,
    /// Hazard statements.
    pub hazard: Hazard,
    /// REACH registration.
    pub registration: Registration,
    /// All extra safety points of the CHEM21 guide together: auto-ignition, resistivity, peroxides.
    pub chem21_extra_safety_points: u8,
    /// Global warming potential.
    pub gwp100: Gwp100,
    /// Ozone depletion potential, kg/kg of CFC-11.
    pub odp: Option<Figure>,
    /// Transport classification.
    pub transport: Option<Transport>,
    /// Waste codes of the United States.
    pub rcra: Rcra,
    /// Codes of the European List of Waste.
    pub eu_low: EuLow,
    /// Bulk density of a solid as poured, kg/m³.
    pub bulk_density_kg_m3: Option<Figure>,
    /// Mass of one piece, kg.
    pub unit_mass_kg: Option<Figure>,
    /// Water taken up by a drying agent in practice, kg/kg; `high` is the limit of its hydrate where it has one.
    pub water_capacity_kg_kg: Option<Figure>,
    /// Whether it is on the PBT list of the US Toxics Release Inventory; nothing in the catalogue is (from memory).
    pub pbt: bool,
}

impl Substance {
    /// A material of which nothing is known yet but its name and class; set what is known.
    ///
    /// ```
    /// use thimbleworth::material::{Class, Figure, Law, Substance};
    /// let mut oil = Substance::blank("lavender oil", Class::Solute);
    /// oil.density = Law::Constant(Figure::single(885.0, "supplier's sheet"));
    /// assert_eq!(oil.density_kg_m3(293.15).map(|f| f.value), Ok(885.0));
    /// assert!(oil.vapour_pressure_pa(293.15).is_err());
    /// ```
    #[must_use]
    pub fn blank(name: impl Into<Text>, class: Class) -> Self {
        Self {
            name: name.into(),
            synonyms: Vec::new(),
            cas: None,
            formula: None,
            class,
            note: Text::default(),
            molar_mass_kg_mol: None,
            boiling_point_k: None,
            flash_point_k: FlashPoint::NotKnown,
            autoignition_k: None,
            critical_temperature_k: None,
            density: Law::NotKnown,
            vapour_pressure: Law::NotKnown,
            heat_of_vaporisation: Law::NotKnown,
            solubility_in_water: Solubility::NotKnown,
            hazard: Hazard::default(),
            registration: Registration::Unknown,
            chem21_extra_safety_points: 0,
            gwp100: Gwp100::default(),
            odp: None,
            transport: None,
            rcra: Rcra::default(),
            eu_low: EuLow::default(),
            bulk_density_kg_m3: None,
            unit_mass_kg: None,
            water_capacity_kg_kg: None,
            pbt: false,
        }
    }

    /// Density of the liquid at `temperature_k`, kg/m³; at saturation, which a few bar change by less than 0.1 %.
    ///
    /// ```
    /// let acetone = thimbleworth::material::catalogue().find("acetone").unwrap();
    /// let density = acetone.density_kg_m3(293.15).unwrap();
    /// assert!((density.value - 790.0).abs() < 1.0);
    /// ```
    ///
    /// # Errors
    /// [`PropertyError`] when it is not known, or not at this temperature.
    pub fn density_kg_m3(&self, temperature_k: f64) -> Result<Figure, PropertyError> {
        self.density.figure(temperature_k, &self.name, "density of the liquid")
    }

    /// Vapour pressure at `temperature_k`, Pa.
    ///
    /// ```
    /// let ether = thimbleworth::material::catalogue().find("ether").unwrap();
    /// let pressure = ether.vapour_pressure_pa(293.15).unwrap();
    /// assert!((pressure.value / 58_600.0 - 1.0).abs() < 0.01);
    /// ```
    ///
    /// # Errors
    /// [`PropertyError`] when it is not known, or not at this temperature.
    pub fn vapour_pressure_pa(&self, temperature_k: f64) -> Result<Figure, PropertyError> {
        self.vapour_pressure.figure(temperature_k, &self.name, "vapour pressure")
    }

    /// Heat of vaporisation at `temperature_k`, J/kg.
    ///
    /// ```
    /// let water = thimbleworth::material::catalogue().find("water").unwrap();
    /// let heat = water.heat_of_vaporisation_j_kg(373.15).unwrap();
    /// assert!((heat.value / 2.2565e6 - 1.0).abs() < 0.001);
    /// ```
    ///
    /// # Errors
    /// [`PropertyError`] when it is not known, or not at this temperature.
    pub fn heat_of_vaporisation_j_kg(&self, temperature_k: f64) -> Result<Figure, PropertyError> {
        self.heat_of_vaporisation.figure(temperature_k, &self.name, "heat of vaporisation")
    }

    /// The atoms of the formula; `None` without a formula.
    ///
    /// # Errors
    /// [`FormulaError`] when a plan's own formula cannot be read.
    pub fn elements(&self) -> Option<Result<Composition, FormulaError>> {
        self.formula.as_deref().map(parse_formula)
    }

    /// Carbon dioxide from complete oxidation of all carbon, kg/kg; `None` without a formula that can be read.
    ///
    /// ```
    /// let hexane = thimbleworth::material::catalogue().find("hexane").unwrap();
    /// assert!((hexane.stoichiometric_co2_kg_kg().unwrap() - 3.064).abs() < 0.001);
    /// ```
    #[must_use]
    pub fn stoichiometric_co2_kg_kg(&self) -> Option<f64> {
        let elements = self.elements()?.ok()?;
        let molar_mass = self.molar_mass_kg_mol.as_ref().map_or(elements.molar_mass_kg_mol(), |m| m.value);
        // 44.009 n_C/M, g/mol over g/mol
        Some(0.044_009 * f64::from(elements.count("C")) / molar_mass)
    }
}
