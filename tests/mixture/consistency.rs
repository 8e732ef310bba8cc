//! Identities that hold whatever the constants.
use super::mixed;
use thimbleworth::mixture::{PairLaw, ideal_error, pair_table};

// Witness: the equation of Gibbs and Duhem at constant temperature and pressure, Σ xᵢ d ln γᵢ = 0, along three directions in a mixture of four.
#[test]
fn gibbs_duhem() {
    mixed(&["acetone", "methanol", "ethanol", "water"], |m| {
        let x = [0.2, 0.3, 0.1, 0.4];
        for to in 0..3 {
            let e = 1e-5;
            let shifted = |sign: f64| {
                let mut x = x;
                x[to] += sign * e;
                x[3] -= sign * e;
                m.activity_coefficients(&x, 320.0).unwrap()
            };
            let (up, down) = (shifted(1.0), shifted(-1.0));
            let (mut sum, mut size) = (0.0, 0.0);
            for i in 0..4 {
                let slope = (up[i].ln() - down[i].ln()) / (2.0 * e);
                sum += x[i] * slope;
                size += (x[i] * slope).abs();
            }
            assert!(size > 0.1 && sum.abs() < 1e-8 * size.max(1.0), "{sum} of {size}");
        }
    });
}

// Witness: the definition; the boiling point of each pure component is where its vapour pressure is the pressure.
#[test]
fn bubble_pressure_and_temperature_are_each_others_inverse() {
    mixed(&["n-hexane", "acetone", "ethyl acetate"], |m| {
        for x in [[0.2, 0.5, 0.3], [1.0, 0.0, 0.0], [1e-9, 1.0, 0.0], [3.0, 1.0, 7.0]] {
            for p in [8_000.0, 30_000.0, 101_325.0] {
                let t = m.bubble_temperature_k(&x, p).unwrap();
                assert!((m.bubble_pressure_pa(&x, t).unwrap() / p - 1.0).abs() < 1e-11, "{x:?} {p}");
            }
        }
    });
    mixed(&["n-hexane"], |m| {
        let t = m.bubble_temperature_k(&[2.0], 101_325.0).unwrap();
        assert!((t - 273.15 - 68.7).abs() < 0.15, "{t}");
        assert_eq!(m.activity_coefficients(&[2.0], 300.0).unwrap()[0], 1.0);
    });
}

#[test]
fn the_order_of_components_does_not_matter() {
    let ab = mixed(&["acetone", "water"], |m| m.partial_pressures_pa(&[0.3, 0.7], 310.0).unwrap());
    let ba = mixed(&["water", "acetone"], |m| m.partial_pressures_pa(&[0.7, 0.3], 310.0).unwrap());
    assert!((ab[0] / ba[1] - 1.0).abs() < 1e-14 && (ab[1] / ba[0] - 1.0).abs() < 1e-14);
}

// The range told for unknown pairs is that of the known ones: found anew on a finer grid it may be a little wider, never much.
#[test]
fn the_error_of_an_ideal_pair_is_that_of_the_known_pairs() {
    let told = ideal_error();
    let (mut lowest, mut highest, mut pairs) = (1.0_f64, 1.0_f64, 0);
    for pair in pair_table() {
        let PairLaw::Wilson(w) = pair.law else { continue };
        if w.b12_k == 0.0 {
            continue;
        }
        pairs += 1;
        mixed(&[&pair.first, &pair.second], |m| {
            for i in 1..400 {
                let x = f64::from(i) / 400.0;
                let ratio = m.bubble_pressure_pa(&[x, 1.0 - x], 293.15).unwrap()
                    / m.ideal_bubble_pressure_pa(&[x, 1.0 - x], 293.15).unwrap();
                lowest = lowest.min(ratio);
                highest = highest.max(ratio);
            }
        });
    }
    println!("{told:?}; {lowest} {highest}");
    assert_eq!(told.pairs, pairs);
    assert!(told.lowest >= lowest && told.lowest / lowest < 1.01);
    assert!(told.highest <= highest && highest / told.highest < 1.08);
}
