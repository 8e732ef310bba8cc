//! Three units that vent carbon dioxide into a laboratory of 140 m³, by day and on night setback.
//!
//! Witness: a case worked outside the project (ideal gas at 24.055 L/mol, C = C₀ + G/(N V)(1 − e^{−N t})); figures within 2 %,
//! verdicts exact.
use super::{CO2_KG_MOL, P_PA, T_K, near, per_hour};
use thimbleworth::room::{
    CARBON_DIOXIDE_CAS, Course, Day, Exposure, HOUR_S, Jurisdiction, LimitKind, Release, Room, Sensor,
    Ventilation, judge, limits, sensor_advice,
};

const SHIFT_S: f64 = 8.0 * HOUR_S;

/// 2.5 mL a minute each, 0.9237 g/mL.
fn vent(hours: f64) -> Release {
    let kg = 3.0 * 2.5 * 0.9237 / 1000.0 * 60.0 * hours;
    Release::of_mass(0.0, hours * HOUR_S, kg, CO2_KG_MOL, T_K, P_PA).unwrap()
}

fn course(air_changes: f64, mixing_factor: f64, hours: f64) -> Course {
    let room = Room { volume_m3: 140.0, background: 420e-6, mixing_factor };
    Course::new(&room, &Ventilation::steady(per_hour(air_changes)).unwrap(), &[vent(hours)]).unwrap()
}

#[test]
fn by_day() {
    near(vent(1.0).volume_m3, 0.227, 0.02);
    let day = course(8.0, 1.0, 8.0);
    near(day.steady(0.0).unwrap() * 1e6, 623.0, 0.02);
    near(day.mean(0.0, SHIFT_S) * 1e6, 620.0, 0.02);
    let poorly_mixed = course(8.0, 0.3, 8.0);
    near((poorly_mixed.steady(0.0).unwrap() - 420e-6) * 1e6, 676.0, 0.02);
}

#[test]
fn on_night_setback() {
    let night = course(0.3, 1.0, 8.0);
    near(night.steady(0.0).unwrap() * 1e6, 5829.0, 0.02);
    near(night.at(SHIFT_S) * 1e6, 5339.0, 0.02);
    near(night.first_at(0.005).unwrap() / HOUR_S, 6.25, 0.02);
    near(night.mean(0.0, SHIFT_S) * 1e6, 3780.0, 0.02);
    assert_eq!(night.peak().0, SHIFT_S);
    // The worst eight hours start later and are worse than the run's own, for the room clears slowly.
    let (start, worst) = night.worst_mean(SHIFT_S);
    assert!(start > HOUR_S && worst > night.mean(0.0, SHIFT_S));
}

#[test]
fn the_mean_keeps_the_limit_while_the_room_passes_it() {
    let as_of = Day::parse("2026-12-01").unwrap();
    let night = course(0.3, 1.0, 8.0);
    let twelve_hours = course(0.3, 1.0, 12.0);
    let twa = |jurisdiction| {
        let held = limits(CARBON_DIOXIDE_CAS, as_of).hold;
        held.into_iter().find(|l| l.jurisdiction == jurisdiction && l.kind == LimitKind::Twa).unwrap()
    };
    for jurisdiction in [Jurisdiction::UsOsha, Jurisdiction::UsAcgih, Jurisdiction::Eu, Jurisdiction::Uk] {
        let limit = twa(jurisdiction);
        let verdict = |c: &Course| judge(limit, CO2_KG_MOL, &Exposure::of(c)).unwrap();
        assert!(!verdict(&night).is_passed(), "{jurisdiction:?}");
        assert!(night.peak().1 > verdict(&night).allowed);
        assert!(verdict(&twelve_hours).is_passed(), "{jurisdiction:?}");
    }
}

#[test]
fn a_carbon_dioxide_sensor_is_asked_for() {
    let advice = sensor_advice(CARBON_DIOXIDE_CAS);
    assert_eq!(advice.sensor, Sensor::CarbonDioxide);
    assert!(advice.blind.contains(&Sensor::Oxygen));
    assert_eq!(advice.alarms, [0.005, 0.015, 0.03]);
    assert!(advice.place.contains("floor") && advice.place.contains("pit"));
}
