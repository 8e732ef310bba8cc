//! Every factor that the general library `uom` 0.38 knows, against ours. The two were written independently: `uom`
//! takes its factors from NIST SP 811.

use thimbleworth::quantity::{Kind, UNITS, unit};
use uom::si::f64 as si;

/// The relative difference that is allowed: `uom` holds a few factors to seven digits (SP 811's own rounding).
const ROUNDED_IN_PRINT: f64 = 2e-7;
/// One or two roundings of a double.
const EXACT: f64 = 5e-16;

/// 1 of a unit in SI by `uom`.
macro_rules! one {
    ($quantity:ident, $module:ident, $unit:ident, $base:ident) => {
        si::$quantity::new::<uom::si::$module::$unit>(1.0).get::<uom::si::$module::$base>()
    };
}

fn cases() -> Vec<(Kind, &'static str, f64, f64)> {
    vec![
        (Kind::Mass, "ng", one!(Mass, mass, nanogram, kilogram), EXACT),
        (Kind::Mass, "µg", one!(Mass, mass, microgram, kilogram), EXACT),
        (Kind::Mass, "mg", one!(Mass, mass, milligram, kilogram), EXACT),
        (Kind::Mass, "g", one!(Mass, mass, gram, kilogram), EXACT),
        (Kind::Mass, "kg", one!(Mass, mass, kilogram, kilogram), EXACT),
        (Kind::Mass, "t", one!(Mass, mass, ton, kilogram), EXACT),
        (Kind::Mass, "lb", one!(Mass, mass, pound, kilogram), ROUNDED_IN_PRINT),
        (Kind::Mass, "oz", one!(Mass, mass, ounce, kilogram), ROUNDED_IN_PRINT),
        (Kind::Volume, "nL", one!(Volume, volume, nanoliter, cubic_meter), EXACT),
        (Kind::Volume, "µL", one!(Volume, volume, microliter, cubic_meter), EXACT),
        (Kind::Volume, "mL", one!(Volume, volume, milliliter, cubic_meter), EXACT),
        (Kind::Volume, "cL", one!(Volume, volume, centiliter, cubic_meter), EXACT),
        (Kind::Volume, "dL", one!(Volume, volume, deciliter, cubic_meter), EXACT),
        (Kind::Volume, "L", one!(Volume, volume, liter, cubic_meter), EXACT),
        (Kind::Volume, "cm3", one!(Volume, volume, cubic_centimeter, cubic_meter), EXACT),
        (Kind::Volume, "mm3", one!(Volume, volume, cubic_millimeter, cubic_meter), EXACT),
        (Kind::Volume, "dm3", one!(Volume, volume, cubic_decimeter, cubic_meter), EXACT),
        (Kind::Volume, "m³", one!(Volume, volume, cubic_meter, cubic_meter), EXACT),
        (Kind::Volume, "US gal", one!(Volume, volume, gallon, cubic_meter), ROUNDED_IN_PRINT),
        (Kind::Volume, "US qt", one!(Volume, volume, quart_liquid, cubic_meter), ROUNDED_IN_PRINT),
        (Kind::Time, "ms", one!(Time, time, millisecond, second), EXACT),
        (Kind::Time, "s", one!(Time, time, second, second), EXACT),
        (Kind::Time, "min", one!(Time, time, minute, second), EXACT),
        (Kind::Time, "h", one!(Time, time, hour, second), EXACT),
        (Kind::Time, "d", one!(Time, time, day, second), EXACT),
        (Kind::Time, "year", one!(Time, time, year, second), EXACT),
        (Kind::Pressure, "Pa", one!(Pressure, pressure, pascal, pascal), EXACT),
        (Kind::Pressure, "hPa", one!(Pressure, pressure, hectopascal, pascal), EXACT),
        (Kind::Pressure, "kPa", one!(Pressure, pressure, kilopascal, pascal), EXACT),
        (Kind::Pressure, "MPa", one!(Pressure, pressure, megapascal, pascal), EXACT),
        (Kind::Pressure, "bar", one!(Pressure, pressure, bar, pascal), EXACT),
        (Kind::Pressure, "mbar", one!(Pressure, pressure, millibar, pascal), EXACT),
        (Kind::Pressure, "atm", one!(Pressure, pressure, atmosphere, pascal), EXACT),
        (Kind::Pressure, "psi", one!(Pressure, pressure, psi, pascal), ROUNDED_IN_PRINT),
        (Kind::Pressure, "Torr", one!(Pressure, pressure, torr, pascal), 5e-7),
        (Kind::Pressure, "mmHg", one!(Pressure, pressure, millimeter_of_mercury, pascal), 5e-7),
        (Kind::Power, "W", one!(Power, power, watt, watt), EXACT),
        (Kind::Power, "kW", one!(Power, power, kilowatt, watt), EXACT),
        (Kind::Energy, "J", one!(Energy, energy, joule, joule), EXACT),
        (Kind::Energy, "kJ", one!(Energy, energy, kilojoule, joule), EXACT),
        (Kind::Energy, "MJ", one!(Energy, energy, megajoule, joule), EXACT),
        (Kind::Energy, "GJ", one!(Energy, energy, gigajoule, joule), EXACT),
        (Kind::Energy, "Wh", one!(Energy, energy, watt_hour, joule), EXACT),
        (Kind::Energy, "kWh", one!(Energy, energy, kilowatt_hour, joule), EXACT),
        (Kind::Energy, "MWh", one!(Energy, energy, megawatt_hour, joule), EXACT),
        (Kind::Fraction, "%", one!(Ratio, ratio, percent, ratio), EXACT),
        (Kind::Fraction, "‰", one!(Ratio, ratio, per_mille, ratio), EXACT),
        (Kind::Fraction, "ppm", one!(Ratio, ratio, part_per_million, ratio), EXACT),
        (Kind::MolarMass, "g/mol", one!(MolarMass, molar_mass, gram_per_mole, kilogram_per_mole), EXACT),
        (Kind::Length, "nm", one!(Length, length, nanometer, meter), EXACT),
        (Kind::Length, "µm", one!(Length, length, micrometer, meter), EXACT),
        (Kind::Length, "mm", one!(Length, length, millimeter, meter), EXACT),
        (Kind::Length, "cm", one!(Length, length, centimeter, meter), EXACT),
        (Kind::Length, "m", one!(Length, length, meter, meter), EXACT),
        (Kind::Length, "km", one!(Length, length, kilometer, meter), EXACT),
        (Kind::Length, "in", one!(Length, length, inch, meter), EXACT),
        (Kind::Length, "ft", one!(Length, length, foot, meter), EXACT),
        (Kind::Area, "mm²", one!(Area, area, square_millimeter, square_meter), EXACT),
        (Kind::Area, "cm²", one!(Area, area, square_centimeter, square_meter), EXACT),
        (Kind::Area, "m²", one!(Area, area, square_meter, square_meter), EXACT),
        (Kind::Frequency, "Hz", one!(Frequency, frequency, hertz, hertz), EXACT),
        (Kind::Frequency, "/min", one!(Frequency, frequency, cycle_per_minute, hertz), EXACT),
        (
            Kind::Density,
            "g/mL",
            one!(MassDensity, mass_density, gram_per_cubic_centimeter, kilogram_per_cubic_meter),
            EXACT,
        ),
        (Kind::MassFlow, "kg/h", one!(MassRate, mass_rate, kilogram_per_hour, kilogram_per_second), EXACT),
        (Kind::MassFlow, "g/min", one!(MassRate, mass_rate, gram_per_minute, kilogram_per_second), EXACT),
        (
            Kind::VolumeFlow,
            "L/min",
            one!(VolumeRate, volume_rate, liter_per_minute, cubic_meter_per_second),
            EXACT,
        ),
        (
            Kind::VolumeFlow,
            "m³/h",
            one!(VolumeRate, volume_rate, cubic_meter_per_hour, cubic_meter_per_second),
            EXACT,
        ),
        (
            Kind::SpecificEnergy,
            "kJ/kg",
            one!(AvailableEnergy, available_energy, kilojoule_per_kilogram, joule_per_kilogram),
            EXACT,
        ),
        (
            Kind::TemperatureDifference,
            "°C",
            one!(TemperatureInterval, temperature_interval, degree_celsius, kelvin),
            EXACT,
        ),
        (
            Kind::TemperatureDifference,
            "°F",
            one!(TemperatureInterval, temperature_interval, degree_fahrenheit, kelvin),
            EXACT,
        ),
    ]
}

#[test]
fn every_factor_that_uom_knows() {
    for (kind, symbol, by_uom, allowed) in cases() {
        let ours = unit(symbol, kind).unwrap().to_si(1.0);
        let difference = (ours - by_uom).abs() / by_uom;
        assert!(difference <= allowed, "{symbol}: {ours} against {by_uom}, {difference:e}");
    }
}

#[test]
fn temperatures_as_uom_converts_them() {
    for value in [-40.0, 0.0, 12.0, 68.0, 100.0, 350.5] {
        let celsius =
            si::ThermodynamicTemperature::new::<uom::si::thermodynamic_temperature::degree_celsius>(value);
        let fahrenheit =
            si::ThermodynamicTemperature::new::<uom::si::thermodynamic_temperature::degree_fahrenheit>(value);
        for (symbol, by_uom) in [("°C", celsius.value), ("°F", fahrenheit.value)] {
            let ours = unit(symbol, Kind::Temperature).unwrap().to_si(value);
            assert!((ours - by_uom).abs() <= 2e-13, "{value} {symbol}: {ours} against {by_uom}");
        }
    }
}

/// What is left without a witness in `uom` is named, so that a new unit is not forgotten.
#[test]
fn the_units_that_uom_does_not_know_are_these() {
    let cases = cases();
    let unchecked: Vec<&str> = UNITS
        .iter()
        .filter(|row| !cases.iter().any(|case| case.0 == row.kind && case.1 == row.symbol))
        .map(|row| row.symbol)
        .filter(|symbol| !symbol.is_empty())
        .collect();
    let expected = ["week", "month", "K", "°C", "°F", "K", "% v/v", "% w/w", "% w/w", "kg/mol", "kg/kmol"];
    assert_eq!(unchecked, expected);
}
