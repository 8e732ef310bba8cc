//! Vessels, lines and cylinders.
use thimbleworth::co2;
use thimbleworth::co2_loop::{cylinders, heel_kg, snow_kg, trapped_liquid, vent_kg, void_m3};

/// A worked case of SW-846 3562: 7 mL cell, 2 g of 2.6 g/mL, 1 mL filler, 80 °C, 4417 psi (304.5 bar) and 0.7501 g/mL by CoolProp
/// 8.0.0: 5.23 mL hold 3.92 g. Snow, cylinders and heel of the same case: 43 g to 64 g, ten cylinders, 27.2 kg.
#[test]
fn a_cell_its_snow_and_its_cylinders() {
    let void = void_m3(7e-6, 2e-3, 2600.0, 1e-6).unwrap();
    assert!((void * 1e6 - 5.23).abs() < 0.005);
    let fill = vent_kg(void, 353.15, 4417.0 * 6_894.757_293).unwrap();
    assert!((fill * 1e3 - 3.92).abs() < 0.02, "{fill}");
    let snow = |density| snow_kg(0.1, 1400.0, density, 1.0).unwrap() * 1e3;
    assert!((snow(600.0) - 43.0).abs() < 0.5 && (snow(900.0) - 64.0).abs() < 0.5);
    // 1886 extractions of 96.3 g.
    let need = 1886.0 * 0.0963;
    assert_eq!(cylinders(need, 22.7, 0.12), Ok(10));
    assert!((heel_kg(10, 22.7, 0.12).unwrap() - 27.2).abs() < 0.05);
}

/// Worked by hand: exactly nine cylinders' worth takes nine, a gram more takes ten.
#[test]
fn whole_cylinders() {
    assert_eq!(cylinders(9.0 * 20.0, 25.0, 0.2), Ok(9));
    assert_eq!(cylinders(9.0 * 20.0 + 1e-3, 25.0, 0.2), Ok(10));
    assert_eq!(cylinders(0.0, 25.0, 0.2), Ok(0));
    assert!(cylinders(1.0, 25.0, 1.0).is_err() && cylinders(f64::NAN, 25.0, 0.1).is_err());
}

/// CoolProp 8.0.0: from 5 °C and 60 bar about 205 bar at 25 °C, some 7 bar a kelvin.
#[test]
fn liquid_between_valves() {
    let line = trapped_liquid(278.15, 60e5, 298.15, Some(150e5)).unwrap();
    assert!((line.pressure_pa / 1e5 - 205.0).abs() < 1.0, "{line:?}");
    assert!((line.rise_pa_k / 1e5 - 7.25).abs() < 0.1);
    // Mass balance: what stays at 150 bar and 25 °C fills the line.
    let left = co2::density_kg_m3(298.15, 150e5).unwrap();
    assert!((line.relieved_share - (1.0 - left / line.density_kg_m3)).abs() < 1e-12);
    assert!(line.relieved_share > 0.0);
    let opens = line.relief_opens_k.unwrap();
    assert!((co2::density_kg_m3(opens, 150e5).unwrap() / line.density_kg_m3 - 1.0).abs() < 1e-9);
    assert!(trapped_liquid(278.15, 60e5, 270.0, None).is_err());
}
