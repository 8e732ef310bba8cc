//! Solvent strength and solubility.
use super::table::{assert_close, assert_printed};
use thimbleworth::co2::density_kg_m3;
use thimbleworth::dense_gas::DenseGasError;
use thimbleworth::dense_gas::chrastil::{Chrastil, Measured, fit};
use thimbleworth::dense_gas::need::Solubility;
use thimbleworth::dense_gas::strength::{giddings_mpa_half, hildebrand_of};
use thimbleworth::dense_gas::vegetable_oil;
use thimbleworth::material::catalogue;

/// Giddings' form with 72.81 atm and 467.6 kg/m³, densities by CoolProp 8.0.0, recomputed apart from this library.
#[test]
fn giddings() {
    for (celsius, megapascal, printed) in [(40.0, 20.0, "14.7"), (40.0, 30.0, "16.0"), (60.0, 30.0, "14.6")] {
        let density = density_kg_m3(celsius + 273.15, megapascal * 1e6).unwrap();
        assert_printed(giddings_mpa_half(density).unwrap(), printed, "Giddings");
    }
    assert!(giddings_mpa_half(0.0).is_err() && giddings_mpa_half(f64::NAN).is_err());
}

/// Hildebrand's parameters of liquids at 25 °C, MPa^½, as handbooks list them (A. F. M. Barton's collection, from memory).
/// The catalogue's heats and densities are other sources, so a few tenths apart is agreement.
#[test]
fn hildebrand() {
    for (name, listed) in [
        ("hexane", 14.9),
        ("heptane", 15.3),
        ("cyclohexane", 16.8),
        ("toluene", 18.2),
        ("ethyl acetate", 18.2),
        ("acetone", 19.7),
        ("dichloromethane", 20.2),
        ("ethanol", 26.5),
        ("methanol", 29.6),
        ("water", 47.9),
    ] {
        let found = hildebrand_of(catalogue().find(name).unwrap(), 298.15).unwrap();
        assert!((found - listed).abs() < 0.5, "{name}: {found:.2} and not {listed}");
    }
    // Not known, or not there: none.
    assert_eq!(hildebrand_of(catalogue().find("sodium sulfate").unwrap(), 298.15), None);
}

/// The equation's values, g/L, recomputed apart from this library with CoolProp 8.0.0's densities. The value at 40 °C and
/// 10 MPa, 0.128, is outside the range and refused.
#[test]
fn del_valle_and_aguilera() {
    for (celsius, megapascal, printed) in [
        (40.0, 20.0, "2.85"),
        (40.0, 30.0, "6.74"),
        (50.0, 30.0, "6.83"),
        (60.0, 30.0, "6.74"),
        (80.0, 30.0, "5.89"),
        (60.0, 50.0, "23.8"),
    ] {
        let found = vegetable_oil::solubility_kg_m3(celsius + 273.15, megapascal * 1e6).unwrap();
        assert_printed(found, printed, &format!("{celsius} °C, {megapascal} MPa"));
    }
    for (temperature_k, pressure_pa) in
        [(313.15, 10e6), (313.15, 89e6), (292.0, 30e6), (354.0, 30e6), (f64::NAN, 30e6), (313.15, f64::NAN)]
    {
        let found = vegetable_oil::solubility_kg_m3(temperature_k, pressure_pa);
        assert!(matches!(found, Err(DenseGasError::OutOfRange { .. })), "{found:?}");
    }
    // Above 100 g/L, at 80 °C and 88 MPa.
    let found = vegetable_oil::solubility_kg_m3(353.15, 88e6);
    assert!(
        matches!(found, Err(DenseGasError::OutOfRange { of: "solubility of an oil, kg/m³", .. })),
        "{found:?}"
    );
    // 1000/(S/ρ): 135 kg of CO2 for a kilogram of oil at 40 °C and 30 MPa, recomputed apart.
    let loading = Solubility::VegetableOil.loading_kg_kg(313.15, 30e6).unwrap();
    assert!((1.0 / loading - 135.0).abs() < 0.5, "{}", 1.0 / loading);
}

/// The hotter the less below some 30 MPa, the more above: a fact of the trade (crossover), common practice, no source.
#[test]
fn the_crossover_of_an_oil() {
    let at = |celsius: f64, megapascal: f64| {
        vegetable_oil::solubility_kg_m3(celsius + 273.15, megapascal * 1e6).unwrap()
    };
    assert!(at(70.0, 20.0) < at(40.0, 20.0));
    assert!(at(70.0, 50.0) > at(40.0, 50.0));
}

/// Points made with known constants give them back; with noise they lie within the errors that the fit states.
#[test]
fn a_fit_recovers_known_constants() {
    let truth = Chrastil { k: 7.31, a_k: -4231.0, b: -33.7, range: None };
    let mut points = Vec::new();
    for celsius in [40.0, 50.0, 60.0, 70.0] {
        for megapascal in [12.0, 20.0, 30.0, 40.0] {
            let temperature_k = celsius + 273.15;
            let density = density_kg_m3(temperature_k, megapascal * 1e6).unwrap();
            let (solubility, _) = truth.solubility_kg_m3(density, temperature_k).unwrap();
            points.push(Measured { density_kg_m3: density, temperature_k, solubility_kg_m3: solubility });
        }
    }
    let exact = fit(&points).unwrap();
    assert_close(exact.constants.k, truth.k, 1e-11, "k");
    assert_close(exact.constants.a_k, truth.a_k, 1e-10, "a");
    assert_close(exact.constants.b, truth.b, 1e-10, "b");
    assert!(exact.residuals.iter().all(|r| r.abs() < 1e-11));

    // A fixed pattern of ±4 % and ±8 %, alike in mean.
    let noise = [0.04, -0.08, 0.08, -0.04, -0.04, 0.08, -0.08, 0.04];
    for (point, off) in points.iter_mut().zip(noise.iter().cycle()) {
        point.solubility_kg_m3 *= f64::exp(*off);
    }
    let noisy = fit(&points).unwrap();
    let [of_k, of_a, of_b] = noisy.standard_errors.unwrap();
    assert!((noisy.constants.k - truth.k).abs() < 2.0 * of_k && of_k < 0.2, "{noisy:?}");
    assert!((noisy.constants.a_k - truth.a_k).abs() < 2.0 * of_a && of_a < 500.0, "{noisy:?}");
    assert!((noisy.constants.b - truth.b).abs() < 2.0 * of_b, "{noisy:?}");
    assert!((noisy.deviation.unwrap() - 0.07).abs() < 0.01, "{noisy:?}");
    // Normal equations, the second way: residuals of a least-squares fit have no part along 1, ln ρ and 1/T.
    let along = |of: fn(&Measured) -> f64| -> f64 {
        points.iter().zip(&noisy.residuals).map(|(point, r)| r * of(point)).sum()
    };
    assert!(along(|_| 1.0).abs() < 1e-11);
    assert!(along(|point| point.density_kg_m3.ln()).abs() < 1e-11);
    assert!(along(|point| 1e3 / point.temperature_k).abs() < 1e-11);
}
