//! Batch distillation a second way.
use super::mixed;
use thimbleworth::mixture::{Hold, Mixture};

/// Takes away the vapour in many small parts by the midpoint rule in moles, with the public equilibrium functions alone.
fn by_small_parts(
    m: &Mixture<'_>,
    start: &[f64],
    down_to_m3: f64,
    hold: Hold,
    parts: u32,
) -> (Vec<f64>, f64) {
    let volume =
        |n: &[f64]| n.iter().zip(m.components()).map(|(n, c)| n * c.molar_volume_m3_mol()).sum::<f64>();
    let state = |n: &[f64]| {
        let t = match hold {
            Hold::Pressure(p) => m.bubble_temperature_k(n, p).unwrap(),
            Hold::Temperature(t) => t,
        };
        (m.vapour_composition(n, t).unwrap(), m.bubble_pressure_pa(n, t).unwrap())
    };
    let mut n = start.to_vec();
    let first = volume(&n);
    // Parts of equal ratio of the volume: the volume of the vapour to take is known, its moles follow from its composition.
    let ratio = (down_to_m3 / first).powf(1.0 / f64::from(parts));
    let mut per_pressure = 0.0;
    for _ in 0..parts {
        let v = volume(&n);
        let take = |from: &[f64], share: f64| {
            let (y, p) = state(from);
            let molar: f64 = y.iter().zip(m.components()).map(|(y, c)| y * c.molar_volume_m3_mol()).sum();
            let moles = v * (1.0 - ratio) * share / molar;
            (n.iter().zip(y).map(|(n, y)| (n - moles * y).max(0.0)).collect::<Vec<f64>>(), moles, p)
        };
        let (middle, ..) = take(&n, 0.5);
        let (end, moles, p) = take(&middle, 1.0);
        per_pressure += moles / p;
        n = end;
    }
    (n, per_pressure)
}

// Witness: the second way above, other variables and another stepper, thousands of steps.
#[test]
fn the_path_is_that_of_many_small_parts() {
    for (names, start, down, hold) in [
        (vec!["n-hexane", "acetone"], vec![1.147, 2.04], 5e-6, Hold::Pressure(101_325.0)),
        (vec!["n-hexane", "acetone"], vec![1.147, 2.04], 5e-6, Hold::Temperature(298.15)),
        (vec!["dichloromethane", "methanol"], vec![2.0, 1.0], 20e-6, Hold::Pressure(60_000.0)),
        (vec!["acetone", "water"], vec![1.0, 3.0], 20e-6, Hold::Temperature(313.15)),
        (
            vec!["acetone", "methanol", "ethanol", "water"],
            vec![1.0, 1.0, 1.0, 1.0],
            15e-6,
            Hold::Pressure(101_325.0),
        ),
        (vec!["n-pentane", "toluene"], vec![1.0, 0.05], 4e-6, Hold::Pressure(101_325.0)),
        (vec!["acetone", "chloroform"], vec![1.0, 1.0], 3e-6, Hold::Pressure(101_325.0)),
    ] {
        mixed(&names, |m| {
            let mut steps = 0;
            let fast = m.distil_along(&start, down, hold, |_| steps += 1).unwrap();
            let (slow, per_pressure) = by_small_parts(m, &start, down, hold, 4000);
            let total: f64 = slow.iter().sum();
            let mut worst = 0.0_f64;
            for (i, slow) in slow.iter().enumerate() {
                worst = worst.max((fast.left_mol[i] - slow).abs() / total);
                let off = (fast.left_mol[i] - slow).abs() / total;
                assert!(off < 3e-4, "{names:?} {hold:?}: {} left of {}: {slow}", fast.left_mol[i], names[i]);
                assert!(
                    (fast.left_mol[i] + fast.distillate_mol[i] - start[i]).abs() < 1e-15 * start[i].max(1.0)
                );
            }
            let off = fast.per_pressure_mol_pa / per_pressure - 1.0;
            println!("{names:?} {hold:?}: {steps} points, left off {worst:.1e}, carrier off {off:.1e}");
            assert!(off.abs() < 6e-4, "{names:?} {hold:?}: {off}");
            assert!(steps < 40, "{names:?} {hold:?}: {steps} steps");
        });
    }
}

// Witness: Rayleigh's closed form for a constant relative volatility α: ln(n₁/n₁⁰) = α ln(n₂/n₂⁰). Hexane and heptane are taken as ideal, so at one temperature α is the ratio of their
// vapour pressures.
#[test]
fn an_ideal_pair_at_one_temperature_follows_the_closed_form() {
    mixed(&["n-hexane", "n-heptane"], |m| {
        let start = [1.0, 1.0];
        let end = m.distil_batch(&start, 10e-6, Hold::Temperature(313.15)).unwrap();
        let p = [0, 1].map(|i| m.components()[i].vapour_pressure_pa(313.15).unwrap());
        let slopes = [0, 1].map(|i| (end.left_mol[i] / start[i]).ln() / p[i]);
        assert!((slopes[0] / slopes[1] - 1.0).abs() < 5e-4, "{slopes:?}");
        // Their sum Σ pᵢ is what the least gas follows: one liquid alone takes N (P − p)/p.
        let alone = m.distil_batch(&[0.0, 1.0], 10e-6, Hold::Temperature(313.15)).unwrap();
        let gone = alone.distillate_mol[1];
        assert!((alone.carrier_mol(101_325.0) / (gone * (101_325.0 - p[1]) / p[1]) - 1.0).abs() < 1e-9);
        assert_eq!(alone.left_mol[0], 0.0);
    });
}

#[test]
fn nothing_to_do_and_everything() {
    mixed(&["n-hexane", "acetone"], |m| {
        let same = m.distil_batch(&[1.0, 1.0], 1.0, Hold::Pressure(101_325.0)).unwrap();
        assert_eq!(same.left_mol[..2], [1.0, 1.0]);
        assert_eq!(same.distillate_mol[..2], [0.0, 0.0]);
        let all = m.distil_batch(&[1.0, 1.0], 0.0, Hold::Pressure(101_325.0)).unwrap();
        assert_eq!(all.left_mol[..2], [0.0, 0.0]);
        assert_eq!(all.distillate_mol[..2], [1.0, 1.0]);
        // Boiling needs no gas.
        assert!(all.carrier_mol(101_325.0) < 1e-4);
    });
}
