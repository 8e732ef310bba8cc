//! Printed examples and recomputed figures.
use super::{CO2_KG_MOL, P_PA, T_K, near, per_hour};
use thimbleworth::room::{
    Course, HOUR_S, OXYGEN_ALARM_FIRST, OXYGEN_VENTILATED, Release, Room, Sudden, Ventilation,
    gas_fraction_at_oxygen, mass_concentration_kg_m3, oxygen_beside, oxygen_ventilated,
};

// Source: University of Oxford S4/03, appendix 1 (read in the source): five dewars lose 0.15 L of liquid nitrogen a day each, doubled, 700
// times the volume as gas, 36 m³ at 0.4 air changes an hour. It prints 0.044 m³/h, 0.003 and 0.06 %: as far as its digits go.
#[test]
fn evaporation_from_dewars() {
    let litres_a_day = 5.0 * 0.15 * 2.0 * 700.0;
    let gas_m3_h: f64 = litres_a_day / 1000.0 / 24.0;
    assert!((gas_m3_h - 0.044).abs() < 0.0005);
    let o2 = oxygen_ventilated(36.0, gas_m3_h / HOUR_S, per_hour(0.4), f64::INFINITY).unwrap();
    let drop = OXYGEN_VENTILATED - o2;
    assert!((drop / OXYGEN_VENTILATED - 0.003).abs() < 0.0005);
    assert!((100.0 * drop - 0.06).abs() < 0.005);
    // The course comes to the same share by another way: the rise of a release that goes on.
    let room = Room { volume_m3: 36.0, background: 0.0, mixing_factor: 1.0 };
    let long = Release { from_s: 0.0, duration_s: 1000.0 * HOUR_S, volume_m3: 1000.0 * gas_m3_h };
    let course = Course::new(&room, &Ventilation::steady(per_hour(0.4)).unwrap(), &[long]).unwrap();
    near(course.steady(0.0).unwrap(), drop / OXYGEN_VENTILATED, 1e-12);
    near(course.at(500.0 * HOUR_S), drop / OXYGEN_VENTILATED, 1e-12);
}

// Source: guideline 2.70.20c, adapted from the one of Oxford (read in the source): 0.93 L a day, doubled, 682 times, 108 m³, six air
// changes an hour. It prints 0.053 m³/h, 0.000082 and 0.0017 %.
#[test]
fn evaporation_from_one_store() {
    let gas_m3_h: f64 = 0.93 * 2.0 * 682.0 / 1000.0 / 24.0;
    assert!((gas_m3_h - 0.053).abs() < 0.0005);
    let o2 = oxygen_ventilated(108.0, gas_m3_h / HOUR_S, per_hour(6.0), f64::INFINITY).unwrap();
    let drop = OXYGEN_VENTILATED - o2;
    assert!((drop / OXYGEN_VENTILATED - 0.000_082).abs() < 5e-7);
    assert!((100.0 * drop - 0.0017).abs() < 5e-5);
}

// Recomputed outside the project from the stated formulas (ideal gas, displacement, exponential dilution): 30 kg of carbon dioxide in 75 m³.
#[test]
fn a_cylinder_of_30_kg() {
    let s = Sudden::of_mass(30.0, CO2_KG_MOL, T_K, P_PA, 75.0).unwrap();
    near(s.gas_m3, 16.3977, 1e-3);
    near(s.at_once, 0.21864, 1e-3);
    near(s.oxygen_at_once, 0.16331, 1e-3);
    near(s.oxygen_mixed, 0.16796, 1e-3);
}

// Recomputed outside the project from the box model: 20 g a minute for an hour in 75 m³, six air changes an hour or none.
#[test]
fn an_hour_of_vent() {
    let vent = Release::of_mass(0.0, HOUR_S, 1.2, CO2_KG_MOL, T_K, P_PA).unwrap();
    near(vent.volume_m3, 0.6559, 1e-3);
    let room = Room { volume_m3: 75.0, background: 0.0, mixing_factor: 1.0 };
    let rise = |n| {
        let course = Course::new(&room, &Ventilation::steady(per_hour(n)).unwrap(), &[vent]).unwrap();
        (course.steady(1.0).map(|x| x * 1e6), course.peak().1 * 1e6)
    };
    near(rise(6.0).0.unwrap(), 1457.6, 1e-3);
    let (closed_steady, closed_peak) = rise(0.0);
    assert_eq!(closed_steady, None);
    near(closed_peak, 8745.4, 1e-3);
}

// Recomputed outside the project: 50 ppm of dichloromethane at 25 °C with 24.465 L/mol.
#[test]
fn parts_per_million_to_milligrams() {
    near(mass_concentration_kg_m3(50e-6, 0.084_932_6, 298.15, P_PA).unwrap() * 1e6, 173.58, 1e-4);
}

// Recomputed outside the project from 20.9 % oxygen in air.
#[test]
fn an_oxygen_sensor_is_blind_to_carbon_dioxide() {
    assert!((100.0 * gas_fraction_at_oxygen(OXYGEN_ALARM_FIRST).unwrap() - 6.7).abs() < 0.05);
    assert!((100.0 * oxygen_beside(0.005).unwrap() - 20.8).abs() < 0.05);
    assert!((100.0 * oxygen_beside(0.030).unwrap() - 20.3).abs() < 0.05);
}
