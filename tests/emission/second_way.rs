//! Each equation a second way.
use super::{close, molar_mass, vapour};
use thimbleworth::emission::{
    Pool, Vessel, depressurise, fill, heat_up, mass_transfer_m_s, pool_mackay_kg_s, purge_empty, sweep,
    vacuum_leak,
};
use thimbleworth::material::catalogue;
use thimbleworth::mixture::PerComponent;

const ATM: f64 = 101_325.0;

// Letting pressure down in a million small steps: each takes dn of gas with p/(P − p) of vapour for each mole of gas that leaves with it.
#[test]
fn let_down_by_small_steps() {
    let (v, t, p1, p2, p) = (0.1, 298.15, ATM, 50_000.0, 30_779.17);
    let rt = 8.314_462_618 * t;
    let steps = 200_000;
    let (mut pressure, mut mol) = (p1, 0.0);
    let dp = (p1 - p2) / f64::from(steps);
    for _ in 0..steps {
        // gas that leaves: dP V/(R T); vapour with it in the ratio p/(P − p) at the middle of the step
        mol += dp * v / rt * p / (pressure - 0.5 * dp - p);
        pressure -= dp;
    }
    let found = depressurise(v, t, p1, p2, &[vapour("acetone", p)]).unwrap().total_kg();
    close(found, mol * molar_mass("acetone"), 1e-8, "let-down");
}

// The integral of the heat-up over temperature on ten thousand panels by the midpoint rule, with −dn/dT by differences of n.
#[test]
fn heat_up_on_a_fine_grid() {
    let acetone = catalogue().find("acetone").unwrap();
    let hexane = catalogue().find("hexane").unwrap();
    let p = |t: f64| {
        let mut p: PerComponent = [0.0; 8];
        p[0] = 0.5 * acetone.vapour_pressure_pa(t).unwrap().value;
        p[1] = 0.3 * hexane.vapour_pressure_pa(t).unwrap().value;
        p
    };
    let vessel = Vessel { headspace_m3: 0.02, pressure_pa: ATM, from_k: 278.15, to_k: 325.15 };
    let found = heat_up(vessel, &[molar_mass("acetone"), molar_mass("hexane")], |t| Ok(p(t))).unwrap();
    let gas = |t: f64| (ATM - p(t)[0] - p(t)[1]) * 0.02 / (8.314_462_618 * t);
    let (mut mol, panels) = ([0.0; 2], 10_000);
    let h = 47.0 / f64::from(panels);
    for i in 0..panels {
        let (a, b) = (278.15 + h * f64::from(i), 278.15 + h * f64::from(i + 1));
        let middle = p(0.5 * (a + b));
        for k in 0..2 {
            mol[k] += middle[k] / (ATM - middle[0] - middle[1]) * (gas(a) - gas(b));
        }
    }
    close(found.exact.kg[0], mol[0] * molar_mass("acetone"), 1e-6, "acetone");
    close(found.exact.kg[1], mol[1] * molar_mass("hexane"), 1e-6, "hexane");
    assert!(found.exact.total_kg() < found.logarithmic.total_kg());
}

// A small rise makes the three forms one.
#[test]
fn the_forms_of_the_heat_up_meet_for_a_small_rise() {
    let toluene = catalogue().find("toluene").unwrap();
    let vessel = Vessel { headspace_m3: 0.5, pressure_pa: ATM, from_k: 293.15, to_k: 293.65 };
    let three = heat_up(vessel, &[molar_mass("toluene")], |t| {
        let mut p: PerComponent = [0.0; 8];
        p[0] = toluene.vapour_pressure_pa(t).unwrap().value;
        Ok(p)
    })
    .unwrap();
    assert!(three.spread() < 2e-3, "{three:?}");
}

// The saturation factors satisfy their own equations, and lie between no surface and a large one.
#[test]
fn saturation_factors_solve_their_equations() {
    let vapours = [vapour("acetone", 20_000.0), vapour("n-hexane", 12_000.0)];
    let (flow, area) = (2e-5, 0.005);
    let found = sweep(flow, 600.0, 293.15, ATM, Some(area), &vapours).unwrap();
    let carried: f64 = vapours.iter().zip(found.saturation).map(|(v, s)| s * v.partial_pressure_pa).sum();
    let out = flow * ATM / (ATM - carried);
    for (v, s) in vapours.iter().zip(found.saturation) {
        let ka = mass_transfer_m_s(v.molar_mass_kg_mol).unwrap() * area;
        close(s, ka / (ka + out), 1e-12, "S");
    }
    let saturated = sweep(flow, 600.0, 293.15, ATM, None, &vapours).unwrap();
    let none = sweep(flow, 600.0, 293.15, ATM, Some(0.0), &vapours).unwrap();
    let large = sweep(flow, 600.0, 293.15, ATM, Some(1e9), &vapours).unwrap();
    assert_eq!(none.emitted.total_kg(), 0.0);
    close(large.emitted.total_kg(), saturated.emitted.total_kg(), 1e-6, "a large surface");
    assert!(found.emitted.total_kg() < saturated.emitted.total_kg());
    // A vacuum's leak is a saturated sweep by the moles of air.
    let leak = vacuum_leak(0.028_97 * 1e-3, 600.0, 293.15, ATM, &vapours).unwrap();
    let same = sweep(1e-3 * 8.314_462_618 * 293.15 / ATM, 600.0, 293.15, ATM, None, &vapours).unwrap();
    close(leak.total_kg(), same.emitted.total_kg(), 1e-12, "leak");
}

// A long purge takes all that the vessel holds, and that is what filling it pushes out.
#[test]
fn a_long_purge_is_a_filling() {
    let v = [vapour("methanol", 12_997.0)];
    let purged = purge_empty(0.02, 2.0, 293.15, ATM, &v).unwrap().total_kg();
    close(purged, fill(0.02, 293.15, ATM, &v).unwrap().total_kg(), 1e-12, "purge");
}

// The two published forms of the pool equation, in m/h and in m/s: 0.0292 · 3600^(−0.22) = 0.00482 (both prefactors from memory).
#[test]
fn pool_in_metres_an_hour() {
    let pool = Pool {
        area_m2: 3.0,
        temperature_k: 298.15,
        vapour_pa: 3789.0,
        molar_mass_kg_mol: 0.092_14,
        air_m_s: 2.0,
    };
    let diameter = (4.0_f64 * 3.0 / std::f64::consts::PI).sqrt();
    let k_m_h = 0.0292 * (2.0_f64 * 3600.0).powf(0.78) * diameter.powf(-0.11) * 1.8_f64.powf(-0.67);
    let by_hand = k_m_h / 3600.0 * 0.092_14 * 3789.0 * 3.0 / (8.314_462_618 * 298.15);
    close(pool_mackay_kg_s(&pool, 1.8).unwrap(), by_hand, 2e-3, "pool");
}
