//! Against CoolProp 8.0.0, cycle by cycle.
use super::table::{assert_close, number, rows};
use thimbleworth::co2::{self, Phases};
use thimbleworth::co2_loop::{ClosedLoop, Kind, Loop, OpenLoop, Recompression, compress};

/// The aim is 0.05 %; both carry the same equation, so they agree far closer.
const ALLOWED: f64 = 1e-6;
/// Differences of large enthalpies that come out small, kJ/kg.
const FLOOR_KJ: f64 = 1e-5;

fn assert_kj(found_j: f64, expected_kj: f64, what: &str) {
    let off = (found_j / 1e3 - expected_kj).abs();
    assert!(
        off <= ALLOWED * expected_kj.abs() + FLOOR_KJ,
        "{what}: {} instead of {expected_kj}",
        found_j / 1e3
    );
}

fn leg(of: &Loop, name: &str) -> f64 {
    of.leg_named(name).unwrap().energy_j_kg
}

fn celsius(temperature_k: f64) -> f64 {
    temperature_k - 273.15
}

#[test]
fn all_open_loops() {
    let table = rows(include_str!("open.csv"));
    assert_eq!(table.len(), 55);
    for row in &table {
        let n: [f64; 16] = std::array::from_fn(|i| number(row[i]));
        let what = format!("open loop {:?}", &n[..8]);
        let found = OpenLoop {
            supply_temperature_k: n[0] + 273.15,
            supply_pressure_pa: Some(n[1] * 1e5),
            chill_temperature_k: n[2] + 273.15,
            pump_efficiency: n[5],
            extraction_pressure_pa: n[3] * 1e5,
            extraction_temperature_k: n[4] + 273.15,
            vent_temperature_k: n[6] + 273.15,
            vent_pressure_pa: n[7] * 1e5,
        }
        .energies()
        .unwrap();
        assert_kj(leg(&found, "chill"), n[8], &what);
        assert_kj(found.leg_named("pump").unwrap().ideal_j_kg.unwrap(), n[9], &what);
        assert_kj(leg(&found, "pump"), n[10], &what);
        assert_kj(leg(&found, "preheat"), n[11], &what);
        assert_kj(leg(&found, "restrictor"), n[12], &what);
        assert_kj(found.legs.iter().map(|l| l.energy_j_kg).sum(), n[13], &what);
        let extractor = found.point("extractor").unwrap().state().unwrap();
        assert_close(extractor.density_kg_m3, n[14], 1e-6, &what);
        let pumped = found.point("pump out").unwrap().state().unwrap();
        assert!((celsius(pumped.temperature_k) - n[15]).abs() < 1e-5, "{what}: {pumped:?}");
        assert!(found.imbalance_j_kg().abs() < 1e-6 && !found.closed);
        // Heat that comes out negative is cooling: from 80 bar and 100 °C the stream arrives too hot at the vent.
        for leg in &found.legs {
            let kind = if leg.name == "pump" {
                Kind::Work
            } else if leg.energy_j_kg < 0.0 {
                Kind::Cooling
            } else {
                Kind::Heat
            };
            assert_eq!(leg.kind, kind, "{what}: {}", leg.name);
        }
    }
}

#[test]
fn all_closed_loops() {
    let table = rows(include_str!("closed.csv"));
    assert_eq!(table.len(), 25);
    let mut one_phase = 0;
    for row in &table {
        let n: [f64; 12] = std::array::from_fn(|i| number(row[i]));
        let what = format!("closed loop {:?}", &n[..6]);
        let found = ClosedLoop {
            separator_pressure_pa: n[0] * 1e5,
            separator_temperature_k: n[1] + 273.15,
            condenser_temperature_k: n[2] + 273.15,
            extraction_pressure_pa: n[3] * 1e5,
            extraction_temperature_k: n[4] + 273.15,
            pump_efficiency: n[5],
        }
        .energies()
        .unwrap();
        assert_kj(found.leg_named("pump").unwrap().ideal_j_kg.unwrap(), n[6], &what);
        assert_kj(leg(&found, "pump"), n[7], &what);
        assert_kj(leg(&found, "preheat"), n[8], &what);
        assert_eq!(leg(&found, "valve"), 0.0);
        assert_kj(leg(&found, "separator"), n[9], &what);
        assert_kj(leg(&found, "condense"), n[10], &what);
        // First law: what goes in comes out.
        let sum: f64 = found.legs.iter().map(|l| l.energy_j_kg).sum();
        assert!(sum.abs() < 1e-6 && found.imbalance_j_kg().abs() < 1e-6 && found.closed, "{what}: {sum}");
        let after = found.point("after valve").unwrap().state().unwrap();
        assert!((celsius(after.temperature_k) - n[11]).abs() < 1e-5, "{what}: {after:?}");
        match after.phases {
            Phases::LiquidAndVapour { vapour_share } => {
                assert!((vapour_share - number(row[12])).abs() < 1e-6, "{what}: {vapour_share}");
            }
            Phases::Single(_) => {
                one_phase += 1;
                assert_eq!(row[12], "-", "{what}");
            }
        }
    }
    assert_eq!(one_phase, 4);
}

#[test]
fn the_states_of_the_worked_loops() {
    let loops = [
        ("open", OpenLoop::default().energies().unwrap()),
        ("closed", ClosedLoop::default().energies().unwrap()),
    ];
    let table = rows(include_str!("states.csv"));
    assert_eq!(table.len(), 10);
    for row in &table {
        let (_, of) = loops.iter().find(|(name, _)| *name == row[0]).unwrap();
        let point = of.point(row[1]).unwrap();
        let found = point.state().unwrap();
        let what = format!("{} loop, {}", row[0], row[1]);
        let n: [f64; 5] = std::array::from_fn(|i| number(row[i + 2]));
        assert_close(found.temperature_k, n[0], 1e-8, &what);
        assert_close(found.pressure_pa, n[1], 1e-9, &what);
        assert_close(found.density_kg_m3, n[2], 1e-6, &what);
        assert_kj(found.enthalpy_j_kg + co2::TO_IIR_ENTHALPY_J_KG, n[3], &what);
        assert_close((found.entropy_j_kg_k + co2::TO_IIR_ENTROPY_J_KG_K) / 1e3, n[4], 1e-7, &what);
        assert!((found.enthalpy_j_kg - point.enthalpy_j_kg).abs() < 1e-3, "{what}");
        let share = match found.phases {
            Phases::Single(_) => None,
            Phases::LiquidAndVapour { vapour_share } => Some(vapour_share),
        };
        assert_eq!(share.is_some(), row[7] != "-", "{what}");
        if let Some(share) = share {
            assert!((share - number(row[7])).abs() < 1e-6);
        }
    }
}

#[test]
fn gas_compression() {
    let inlet = co2::state(298.15, 50e5).unwrap().into();
    let table = rows(include_str!("compression.csv"));
    assert_eq!(table.len(), 4);
    for row in &table {
        let n: [f64; 5] = std::array::from_fn(|i| number(row[i]));
        let lift = compress(&inlet, n[0] * 1e5, 0.7).unwrap();
        assert_kj(lift.ideal_j_kg, n[1], row[0]);
        assert_kj(lift.work_j_kg, n[2], row[0]);
        let outlet = co2::state_from_enthalpy(lift.enthalpy_j_kg, lift.pressure_pa).unwrap();
        assert!((celsius(outlet.temperature_k) - n[3]).abs() < 1e-5, "{outlet:?}");
        assert_close(outlet.density_kg_m3, n[4], 1e-6, row[0]);
    }
}

#[test]
fn recompression_in_three_stages() {
    let found = Recompression::default().energies().unwrap();
    let table = rows(include_str!("recompression.csv"));
    assert_eq!((table.len(), found.legs.len()), (3, 7));
    for (row, pair) in table.iter().zip(found.legs.chunks(2)) {
        let n: [f64; 4] = std::array::from_fn(|i| number(row[i]));
        let outlet = found.points[pair[0].to].state().unwrap();
        assert_close(outlet.pressure_pa, n[0] * 1e5, 1e-8, "pressure between the stages");
        assert_kj(pair[0].energy_j_kg, n[1], "work");
        assert!((celsius(outlet.temperature_k) - n[2]).abs() < 1e-4, "{outlet:?}");
        assert_kj(pair[1].energy_j_kg, n[3], "cooling");
        assert_eq!((pair[0].kind, pair[1].kind), (Kind::Work, Kind::Cooling));
    }
    // CoolProp 8.0.0: sums, and condensing to 15 °C.
    assert_kj(found.sum_j_kg(Kind::Work), 365.57841002640157, "work");
    assert_kj(leg(&found, "condense"), -179.08219393458845, "condensing");
    assert_kj(found.sum_j_kg(Kind::Cooling), -450.9673778506603 - 179.08219393458845, "cooling");
    assert!(found.imbalance_j_kg().abs() < 1e-6);
}

#[test]
fn heat_of_condensing() {
    let table = rows(include_str!("latent.csv"));
    assert_eq!(table.len(), 12);
    for row in &table {
        let n: [f64; 5] = std::array::from_fn(|i| number(row[i]));
        let (liquid, vapour) = co2::saturated_states(n[0] + 273.15).unwrap();
        assert_close(liquid.pressure_pa, n[1], 1e-7, row[0]);
        assert_close(vapour.enthalpy_j_kg - liquid.enthalpy_j_kg, n[2] * 1e3, 1e-6, row[0]);
        assert_close(liquid.density_kg_m3, n[3], 1e-6, row[0]);
        assert_close(vapour.density_kg_m3, n[4], 1e-6, row[0]);
        assert_close(co2::saturation_temperature_k(n[1]).unwrap(), n[0] + 273.15, 1e-8, row[0]);
    }
}
