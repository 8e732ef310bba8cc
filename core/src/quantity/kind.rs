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
