//! Extraction curves against their published solutions and against direct solution of their equations.
use super::table::{number, rows};
use thimbleworth::dense_gas::hot_ball::{self, Extraction};
use thimbleworth::dense_gas::sovova::Sovova;

/// The series summed apart from this library (Bartle and others 1990).
#[test]
fn hot_ball_table() {
    for (time, left) in [(0.05, 0.7742568), (0.5, 0.3900581), (1.0, 0.2264359), (3.0, 0.0302678)] {
        assert!((hot_ball::share_left(time).unwrap() - left).abs() < 1e-7, "{time}");
    }
    // Late: ln(m/m₀) = −0.4977 − t_r.
    for time in [4.0, 8.0, 20.0] {
        assert!((hot_ball::share_left(time).unwrap().ln() + 0.4977 + time).abs() < 1e-4);
    }
    for n in 0..1000 {
        let recovery = f64::from(n) / 1000.0;
        let time = hot_ball::reduced_time_for(recovery).unwrap();
        assert!((hot_ball::share_left(time).unwrap() - (1.0 - recovery)).abs() < 1e-12, "{recovery}");
    }
}

/// The second way: diffusion out of a sphere, by an implicit scheme in shells. With u = r c the equation is that of a slab,
/// ∂u/∂τ = ∂²u/∂r², u = 0 at the centre and at the surface.
#[test]
fn hot_ball_against_diffusion_in_shells() {
    const N: usize = 400;
    let h = 1.0 / N as f64;
    let mut u: Vec<f64> = (0..=N).map(|i| i as f64 * h).collect();
    u[N] = 0.0;
    // Small steps first: the surface starts with a jump.
    let (mut tau, mut step) = (0.0, 1e-8);
    for wanted in [0.05, 0.5, 1.0, 3.0] {
        let end = wanted / std::f64::consts::PI.powi(2);
        while tau < end - 1e-15 {
            step = f64::min(step * 1.05, 2e-4_f64.min(end - tau));
            crank_nicolson(&mut u, step / (h * h));
            tau += step;
        }
        step = 1e-5;
        // m/m₀ = 3 ∫ r² c dr = 3 ∫ r u dr, trapezoids; the ends carry nothing
        let left: f64 = 3.0 * h * (1..N).map(|i| i as f64 * h * u[i]).sum::<f64>();
        let found = hot_ball::share_left(wanted).unwrap();
        assert!((found - left).abs() < 2e-4, "{wanted}: series {found}, shells {left}");
    }
}

/// One step of the scheme of Crank and Nicolson, u fixed at both ends.
fn crank_nicolson(u: &mut [f64], ratio: f64) {
    let last = u.len() - 1;
    let half = 0.5 * ratio;
    let old = u.to_vec();
    let (mut c, mut d) = (vec![0.0; last + 1], vec![0.0; last + 1]);
    for i in 1..last {
        let right = old[i] + half * (old[i - 1] - 2.0 * old[i] + old[i + 1]);
        let pivot = 1.0 + ratio + half * c[i - 1];
        c[i] = -half / pivot;
        d[i] = (right + half * d[i - 1]) / pivot;
    }
    for i in (1..last).rev() {
        u[i] = d[i] - c[i] * u[i + 1];
    }
}

/// Limits of the two parts, by hand: much flow leaves diffusion alone, little flow leaves the stream alone.
#[test]
fn solubility_or_diffusion() {
    let run = Extraction {
        radius_m: 0.25e-3,
        diffusion_m2_s: 2e-12,
        solute_kg: 2e-3,
        flow_kg_s: 1.0,
        loading_kg_kg: 0.01,
    };
    // t = t_r r²/(π² D), t_r of 90 % is 1.8: 1.8 × 6.25e-8/(9.87 × 2e-12) = 5.7e3 s
    let time = run.time_for_s(0.9).unwrap();
    assert!((time / 5.7e3 - 1.0).abs() < 0.01, "{time}");
    assert!((run.solvent_for_kg(0.9).unwrap() - time).abs() < 1e-9);
    // At a trickle: m = F y t, so F t = 0.9 × 2 g/0.01 = 0.18 kg whatever the flow.
    for flow_kg_s in [1e-6, 1e-8] {
        let trickle = Extraction { flow_kg_s, ..run };
        assert!((trickle.solvent_for_kg(0.9).unwrap() - 0.18).abs() < 1e-12);
    }
    assert!(Extraction { radius_m: 0.0, ..run }.extracted_kg(1.0).is_err());
}

struct Row {
    bed: Sovova,
    q: f64,
    e: f64,
    periods: (f64, f64),
}

fn table() -> Vec<Row> {
    rows(include_str!("sovova.csv"))
        .iter()
        .map(|row| {
            let n: [f64; 9] = std::array::from_fn(|i| number(row[i]));
            let bed =
                Sovova { start_kg_kg: n[0], intact_kg_kg: n[1], loading_kg_kg: n[2], fast: n[3], slow: n[4] };
            Row { bed, q: n[5], e: n[6], periods: (n[7], n[8]) }
        })
        .collect()
}

#[test]
fn sovova_points() {
    let table = table();
    assert_eq!(table.len(), 13);
    for Row { bed, q, e, periods } in &table {
        assert!((bed.extracted_kg_kg(*q).unwrap() - e).abs() < 1e-6, "{bed:?} {q}");
        let (q_m, q_n) = bed.periods().unwrap();
        assert!((q_m - periods.0).abs() < 1e-5 && (q_n - periods.1).abs() < 1e-5, "{bed:?}");
    }
}

/// The second way: the model's own equations. Along the bed ∂y/∂z = J and in the solid ∂x/∂q = −J, with z from 0 to 1,
/// J = Z (y_r − y) while x > x_k and W x (1 − y/y_r) after. Cells along the bed, in each of which J is linear in y.
#[test]
fn sovova_against_its_equations() {
    for first in [0, 6, 9] {
        let rows = table();
        let bed = rows[first].bed;
        let ends: Vec<&Row> = rows.iter().filter(|row| row.bed == bed).collect();
        let last = ends.iter().fold(0.0, |most, row| f64::max(most, row.q));
        const CELLS: usize = 500;
        const STEPS: u32 = 10_000;
        let (dz, dq) = (1.0 / CELLS as f64, last / f64::from(STEPS));
        let mut solid = vec![bed.start_kg_kg; CELLS];
        let mut extracted = 0.0;
        for step in 1..=STEPS {
            let mut y = 0.0;
            for x in &mut solid {
                let (limit, rate) = if *x > bed.intact_kg_kg {
                    (bed.loading_kg_kg, bed.fast)
                } else {
                    (bed.loading_kg_kg, bed.slow * *x / bed.loading_kg_kg)
                };
                // y over the cell: (y_r − y) decays by e^(−rate Δz)
                let taken = (limit - y) * -f64::exp_m1(-rate * dz);
                *x -= taken / dz * dq;
                y += taken;
            }
            extracted += y * dq;
            let q = dq * f64::from(step);
            if ends.iter().any(|row| (row.q - q).abs() < 0.5 * dq) {
                let found = bed.extracted_kg_kg(q).unwrap();
                // First order in time, and x_k is passed in the middle of a step: a few 1e-5 with these steps.
                assert!((found - extracted).abs() < 1e-4, "{bed:?} {q}: {found}, directly {extracted}");
            }
        }
        // What has left the solid is in the stream.
        let left = solid.iter().sum::<f64>() * dz;
        assert!((bed.start_kg_kg - left - extracted).abs() < 1e-12);
    }
}

/// Carbon dioxide for a recovery is the inverse of the curve in all three periods.
#[test]
fn sovova_inverse() {
    for Row { bed, .. } in table() {
        let mut last = 0.0;
        for n in 1..1000 {
            let recovery = f64::from(n) / 1000.0;
            let q = bed.solvent_for_kg_kg(recovery).unwrap();
            let found = bed.extracted_kg_kg(q).unwrap() / bed.start_kg_kg;
            assert!((found - recovery).abs() < 1e-11, "{bed:?} {recovery}: {found}");
            assert!(q > last);
            last = q;
        }
    }
}
