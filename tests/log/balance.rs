//! The solvent balance: the directive's formulas on whole numbers.
//!
//! Directive 2010/75/EU, Annex VII, Part 7, 3: F = I1 − O1 − O5 − O6 − O7 − O8, or F = O2 + O3 + O4 + O9; consumption
//! C = I1 − O8. The consumption and I1 = opening + bought − closing are stated so by a national authority's guidance, too
//! (evocs.org, "Solvent consumption", Slovenia).

use thimbleworth::log::{Line, SolventBalance};

fn kg(kg: f64, u_kg: f64) -> Line {
    Line { kg, u_kg, rows: 1 }
}

#[test]
fn both_ways_to_fugitive_emission_agree_where_the_balance_closes() {
    // 1000 in = 210 + 15 + 25 + 60 + 40 + 500 + 30 + 100 + 20 out
    let out = [210.0, 15.0, 25.0, 60.0, 40.0, 500.0, 30.0, 100.0, 20.0];
    assert_eq!(out.iter().sum::<f64>(), 1000.0);
    let balance = SolventBalance { i1: kg(1000.0, 0.0), i2: kg(300.0, 0.0), o: out.map(|x| kg(x, 0.0)) };
    assert_eq!(balance.fugitive().kg, 120.0);
    assert_eq!(balance.fugitive_posted().kg, 120.0);
    assert_eq!(balance.unexplained().kg, 0.0);
    assert_eq!(balance.emission().kg, 330.0);
    assert_eq!(balance.consumption().kg, 900.0);
}

#[test]
fn uncertainties_are_joined_by_squares_and_those_of_one_scale_added_up() {
    let mut balance = SolventBalance { i1: kg(1000.0, 3.0), ..SolventBalance::default() };
    balance.o[5] = kg(700.0, 4.0);
    assert_eq!((balance.fugitive().kg, balance.fugitive().u_kg), (300.0, 5.0));
    assert_eq!(balance.fugitive().expanded_kg(), 10.0);
    let other = balance;
    balance.add(&other);
    assert_eq!((balance.fugitive().kg, balance.fugitive().u_kg), (600.0, 10.0));
}
