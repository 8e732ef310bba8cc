//! The quick way down to a volume, for the inside of draws, against the one that controls its error.
//!
//! Witness: `distil_batch`, which stands against ten thousand small steps and closed forms in `distillation.rs` and `practice.rs`.
use super::mixed;
use thimbleworth::mixture::{Held, Hold, PairLaw, pair_table};

/// Every pair with constants, three shares of it, from 300 mL down to nothing, 1 mL, 5 mL, and part of the way.
#[test]
fn the_quick_way_comes_to_where_the_careful_one_does() {
    let (mut compared, mut over_one) = (0, 0);
    let (mut worst_left, mut worst_batch, mut worst_gas) = (0.0_f64, 0.0_f64, 0.0_f64);
    for pair in pair_table() {
        if !matches!(pair.law, PairLaw::Wilson(_)) {
            continue;
        }
        let names = [&*pair.first, &*pair.second];
        for t in [303.15, 323.15] {
            mixed(&names, |m| {
                let Ok(pure) =
                    m.components().iter().map(|c| c.vapour_pressure_pa(t)).collect::<Result<Vec<_>, _>>()
                else {
                    return;
                };
                let volumes: Vec<f64> = m.components().iter().map(|c| c.molar_volume_m3_mol()).collect();
                let Ok(held) = Held::new(m.pairs(), &[0, 1], t, &pure, &volumes) else { return };
                for share in [0.1, 0.5, 0.9] {
                    let amounts = [300e-6 * share / volumes[0], 300e-6 * (1.0 - share) / volumes[1]];
                    for to_m3 in [0.0, 1e-6, 5e-6, 100e-6, 270e-6] {
                        let careful = m.distil_batch(&amounts, to_m3, Hold::Temperature(t)).unwrap();
                        let quick = held.take_down(&amounts, to_m3);
                        let mut off_m3 = 0.0;
                        for (v, (a, b)) in volumes.iter().zip(careful.left_mol.iter().zip(quick.left_mol)) {
                            off_m3 += v * (a - b).abs() / 2.0;
                        }
                        if to_m3 > 0.0 {
                            worst_left = worst_left.max(off_m3 / to_m3);
                            over_one += usize::from(off_m3 > 0.01 * to_m3);
                        }
                        worst_batch = worst_batch.max(off_m3 / 300e-6);
                        let gas = quick.per_pressure_mol_pa / careful.per_pressure_mol_pa - 1.0;
                        worst_gas = worst_gas.max(gas.abs());
                        compared += 1;
                    }
                }
            });
        }
    }
    assert!(compared > 1000, "{compared}");
    // As the docs say: 0.2 % of the batch, 15 % of what is left, 2 % of the gas. What is left of a batch near its azeotrope hangs on the
    // azeotrope's own composition more than on this.
    assert!(
        worst_left < 0.15 && worst_batch < 2e-3 && worst_gas < 0.02,
        "{worst_left} {worst_batch} {worst_gas}"
    );
    assert!(over_one < compared / 40, "{over_one} of {compared}");
    // A bound that nothing comes near would hold nothing.
    assert!(worst_left > 0.01 && worst_gas > 1e-3, "{worst_left} {worst_gas}");
}

/// Three and one component, and a batch that is below the volume already.
#[test]
fn other_numbers_of_components_and_nothing_to_do() {
    mixed(&["n-hexane", "acetone", "ethanol"], |m| {
        let t = 303.15;
        let pure: Vec<f64> = m.components().iter().map(|c| c.vapour_pressure_pa(t).unwrap()).collect();
        let volumes: Vec<f64> = m.components().iter().map(|c| c.molar_volume_m3_mol()).collect();
        let amounts: Vec<f64> = volumes.iter().map(|v| 100e-6 / v).collect();
        let held = Held::new(m.pairs(), &[0, 1, 2], t, &pure, &volumes).unwrap();
        for to_m3 in [5e-6, 50e-6, 150e-6] {
            let careful = m.distil_batch(&amounts, to_m3, Hold::Temperature(t)).unwrap();
            let quick = held.take_down(&amounts, to_m3);
            for (v, (a, b)) in volumes.iter().zip(careful.left_mol.iter().zip(quick.left_mol)) {
                assert!(v * (a - b).abs() < 0.01 * to_m3, "{to_m3}: {a} {b}");
            }
        }
        assert_eq!(held.take_down(&amounts, 1.0).left_mol[..3], amounts[..]);
        // one of them alone: what is left is the volume asked for
        let alone = Held::new(m.pairs(), &[1], t, &pure[1..2], &volumes[1..2]).unwrap();
        let left = alone.take_down(&[1.0], 10e-6).left_mol[0];
        assert!((left * volumes[1] / 10e-6 - 1.0).abs() < 1e-8);
        assert_eq!(alone.partial_pressures_pa(&[0.0])[0], 0.0);
        // and the pair 0 and 2 out of three is that pair
        let two = Held::new(m.pairs(), &[0, 2], t, &[pure[0], pure[2]], &[volumes[0], volumes[2]]).unwrap();
        let whole = m.partial_pressures_pa(&[0.4, 0.0, 0.6], t).unwrap();
        let part = two.partial_pressures_pa(&[0.4, 0.6]);
        assert!((part[0] / whole[0] - 1.0).abs() < 1e-12 && (part[1] / whole[2] - 1.0).abs() < 1e-12);
    });
}

#[test]
fn what_cannot_be_is_refused() {
    use thimbleworth::mixture::{MixtureError, Pairs};
    let pairs = Pairs::ideal(2).unwrap();
    let held = |p: &[f64], v: &[f64]| Held::new(&pairs, &[0, 1], 300.0, p, v).map(|_| ());
    assert!(matches!(held(&[1.0], &[1.0, 1.0]), Err(MixtureError::Mismatch { found: 1, components: 2 })));
    assert!(matches!(held(&[1.0, 0.0], &[1.0, 1.0]), Err(MixtureError::NotPositive { .. })));
    assert!(matches!(Held::new(&pairs, &[], 300.0, &[], &[]), Err(MixtureError::Count { found: 0 })));
    mixed(&["ethanol", "water"], |m| {
        let out = Held::new(m.pairs(), &[0, 1], 500.0, &[1.0, 1.0], &[1.0, 1.0]);
        assert!(matches!(out, Err(MixtureError::ActivityOutOfRange { .. })));
    });
}
