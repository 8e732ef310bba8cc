//! The kinds of amount that a plan may hold. A kind is a value, not a type: it lives at the edge, in declared
//! parameters, read amounts and figures; the physics inside is `f64` with the SI unit in the name.

/// What an amount measures. The SI unit in which the core holds it stands beside each.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum Kind {
    /// kg
    Mass,
    /// m³
    Volume,
    /// s
    Time,
    /// K, read from °C, K or °F
    Temperature,
    /// K
    TemperatureDifference,
    /// Pa, absolute
    Pressure,
    /// W
    Power,
    /// J
    Energy,
    /// 1; written as a per cent or a plain number
    Fraction,
    /// kg/m³ (also mass concentration)
    Density,
    /// kg/mol
    MolarMass,
    /// m³/s
    VolumeFlow,
    /// kg/s
    MassFlow,
    /// 1/s
    Frequency,
    /// m³/kg
    VolumePerMass,
    /// kg/kg
    MassPerMass,
    /// J/kg
    SpecificEnergy,
    /// m
    Length,
    /// m²
    Area,
    /// A number of things; 1
    Count,
    /// A plain ratio or coefficient; 1
    Number,
    /// kg of CO2-equivalent per joule
    ClimatePerEnergy,
    /// Money, in the currency written
    Money,
    /// Money per kg
    PricePerMass,
    /// Money per m³
    PricePerVolume,
    /// Money per J
    PricePerEnergy,
}

impl Kind {
    /// Every kind, in the order declared.
    pub const ALL: [Self; 26] = [
        Self::Mass,
        Self::Volume,
        Self::Time,
        Self::Temperature,
        Self::TemperatureDifference,
        Self::Pressure,
        Self::Power,
        Self::Energy,
        Self::Fraction,
        Self::Density,
        Self::MolarMass,
        Self::VolumeFlow,
        Self::MassFlow,
        Self::Frequency,
        Self::VolumePerMass,
        Self::MassPerMass,
        Self::SpecificEnergy,
        Self::Length,
        Self::Area,
        Self::Count,
        Self::Number,
        Self::ClimatePerEnergy,
        Self::Money,
        Self::PricePerMass,
        Self::PricePerVolume,
        Self::PricePerEnergy,
    ];

    /// What it is called in a sentence, with its article.
    ///
    /// ```
    /// use thimbleworth::quantity::Kind;
    /// assert_eq!(Kind::Volume.words(), "a volume");
    /// ```
    #[must_use]
    pub const fn words(self) -> &'static str {
        match self {
            Self::Mass => "a mass",
            Self::Volume => "a volume",
            Self::Time => "a time",
            Self::Temperature => "a temperature",
            Self::TemperatureDifference => "a temperature difference",
            Self::Pressure => "an absolute pressure",
            Self::Power => "a power",
            Self::Energy => "an energy",
            Self::Fraction => "a fraction",
            Self::Density => "a density or mass concentration",
            Self::MolarMass => "a molar mass",
            Self::VolumeFlow => "a volume flow",
            Self::MassFlow => "a mass flow",
            Self::Frequency => "a frequency",
            Self::VolumePerMass => "a volume per mass",
            Self::MassPerMass => "a mass per mass",
            Self::SpecificEnergy => "an energy per mass",
            Self::Length => "a length",
            Self::Area => "an area",
            Self::Count => "a whole number",
            Self::Number => "a plain number",
            Self::ClimatePerEnergy => "a mass of CO2-equivalent per energy",
            Self::Money => "an amount of money",
            Self::PricePerMass => "a price per mass",
            Self::PricePerVolume => "a price per volume",
            Self::PricePerEnergy => "a price per energy",
        }
    }

    /// How such an amount may be written, for hints and error messages. Every example is readable by [`super::read`].
    ///
    /// ```
    /// use thimbleworth::quantity::{Kind, read};
    /// assert!(Kind::ALL.iter().all(|&kind| kind.examples().iter().all(|text| read(text, kind).is_ok())));
    /// ```
    #[must_use]
    pub const fn examples(self) -> [&'static str; 2] {
        match self {
            Self::Mass => ["10 g", "0.25 kg"],
            Self::Volume => ["250 mL", "0.25 L"],
            Self::Time => ["18 h", "30 min"],
            Self::Temperature => ["12 °C", "285.15 K"],
            Self::TemperatureDifference => ["3 K", "3 °C"],
            Self::Pressure => ["335 mbar", "300 bar"],
            Self::Power => ["250 W", "1.5 kW"],
            Self::Energy => ["0.4 kWh", "500 kJ"],
            Self::Fraction => ["50 %", "0.5"],
            Self::Density => ["0.659 g/mL", "659 kg/m3"],
            Self::MolarMass => ["86.18 g/mol", "0.08618 kg/mol"],
            Self::VolumeFlow => ["2 mL/min", "6 m3/h"],
            Self::MassFlow => ["20 g/min", "1.2 kg/h"],
            Self::Frequency => ["5 /h", "5 per hour"],
            Self::VolumePerMass => ["2 mL/g", "2 L/kg"],
            Self::MassPerMass => ["0.8 g/g", "50 g/kg"],
            Self::SpecificEnergy => ["365 kJ/kg", "0.1 kWh/kg"],
            Self::Length => ["30 cm", "5 mm"],
            Self::Area => ["12 cm2", "0.5 m2"],
            Self::Count => ["4", "1 400"],
            Self::Number => ["0.5", "1.2e3"],
            Self::ClimatePerEnergy => ["0.37 kg/kWh", "370 g/kWh"],
            Self::Money => ["12 USD", "EUR 12"],
            Self::PricePerMass => ["3 EUR/kg", "12 to 22 USD/kg"],
            Self::PricePerVolume => ["17 USD/L", "12 to 22 USD/L"],
            Self::PricePerEnergy => ["0.14 USD/kWh", "EUR 0.30/kWh"],
        }
    }

    /// Whether the amount is in a currency.
    #[must_use]
    pub const fn is_money(self) -> bool {
        matches!(self, Self::Money | Self::PricePerMass | Self::PricePerVolume | Self::PricePerEnergy)
    }

    /// Whether the amount may be written without a unit.
    #[must_use]
    pub const fn is_plain(self) -> bool {
        matches!(self, Self::Fraction | Self::Count | Self::Number)
    }
}
