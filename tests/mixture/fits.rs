//! The constants of the table recomputed from what they were fitted to.
use super::{mole_fraction, number, rows};
use thimbleworth::material::catalogue;
use thimbleworth::mixture::{Basis, PairLaw, Wilson, find_pair, pair_table};

/// Wilson's equation for two, written out anew: ln γ₁ = −ln(x₁ + Λ₁₂x₂) + x₂(Λ₁₂/(x₁ + Λ₁₂x₂) − Λ₂₁/(x₂ + Λ₂₁x₁)).
fn ln_gamma(x: f64, l12: f64, l21: f64) -> [f64; 2] {
    let y = 1.0 - x;
    let (s1, s2) = (x + l12 * y, y + l21 * x);
    let bend = l12 / s1 - l21 / s2;
    [y * bend - s1.ln(), -x * bend - s2.ln()]
}

fn lambdas(w: &Wilson, t: f64) -> (f64, f64) {
    ((w.a12 + w.b12_k / t).exp(), (w.a21 + w.b21_k / t).exp())
}

fn constants(first: &str, second: &str) -> Wilson {
    match find_pair(first, second).unwrap().law {
        PairLaw::Wilson(w) => w,
        PairLaw::Splits => panic!("{first}/{second} splits"),
    }
}

#[test]
fn every_row_of_the_table_is_read() {
    let lines = include_str!("../../core/data/activity.csv").lines().count() - 1;
    assert_eq!(pair_table().len(), lines);
    for pair in pair_table() {
        for name in [&pair.first, &pair.second] {
            assert_eq!(catalogue().find(name).unwrap().name, *name);
        }
        assert!(catalogue().source(&pair.source).is_some(), "{}", pair.source);
        let twice = pair_table().iter().filter(|p| {
            (p.first == pair.first && p.second == pair.second)
                || (p.first == pair.second && p.second == pair.first)
        });
        assert_eq!(twice.count(), 1, "{}/{}", pair.first, pair.second);
    }
}

// At an azeotrope γᵢ = P/Pᵢ,sat; two equations for Λ₁₂ and Λ₂₁, solved here by Newton's method from the azeotrope's row.
#[test]
fn constants_from_azeotropes_are_those_of_the_stated_azeotrope() {
    let mut fitted = 0;
    for row in rows(include_str!("../../core/data/azeotropes.csv")) {
        if row[4] != "fit" {
            continue;
        }
        let (first, second, t) = (row[0], row[1], number(row[2]) + 273.15);
        assert_eq!(find_pair(first, second).unwrap().basis, Basis::Azeotrope);
        let x = mole_fraction(first, second, number(row[3]) / 100.0);
        let wanted = [first, second].map(|name| {
            (101_325.0 / catalogue().find(name).unwrap().vapour_pressure_pa(t).unwrap().value).ln()
        });
        let off = |u: [f64; 2]| {
            let found = ln_gamma(x, u[0].exp(), u[1].exp());
            [found[0] - wanted[0], found[1] - wanted[1]]
        };
        let mut u = [-1.0, -1.0];
        for _ in 0..100 {
            let (f, e) = (off(u), 1e-7);
            let (fa, fb) = (off([u[0] + e, u[1]]), off([u[0], u[1] + e]));
            let j = [(fa[0] - f[0]) / e, (fb[0] - f[0]) / e, (fa[1] - f[1]) / e, (fb[1] - f[1]) / e];
            let d = j[0] * j[3] - j[1] * j[2];
            let (d0, d1) = ((j[1] * f[1] - j[3] * f[0]) / d, (j[2] * f[0] - j[0] * f[1]) / d);
            let damp = (0.3 / d0.abs().max(d1.abs())).min(1.0);
            u = [u[0] + damp * d0, u[1] + damp * d1];
        }
        assert!(off(u).iter().all(|f| f.abs() < 1e-10));
        let w = constants(first, second);
        let (l12, l21) = lambdas(&w, t);
        assert!((l12.ln() - u[0]).abs() < 1e-3 && (l21.ln() - u[1]).abs() < 1e-3, "{first}/{second}: {u:?}");
        // Wilson's own form: a is the logarithm of the ratio of molar volumes, here at 25 °C.
        let volume = |name: &str| {
            let s = catalogue().find(name).unwrap();
            super::molar_mass(name) / s.density_kg_m3(298.15).unwrap().value
        };
        assert!((w.a12 - (volume(second) / volume(first)).ln()).abs() < 0.01, "{first}/{second}");
        assert_eq!(w.a12, -w.a21);
        fitted += 1;
    }
    assert_eq!(fitted, 2);
}

// The points are activity coefficients by NRTL constants (ChemSep) or modified UNIFAC (Dortmund), both as in thermo 0.6.1, taken
// when the constants were made. The constants have to lie within 8 % of each and to be the least squares: no change of one of them lowers the sum.
#[test]
fn fitted_constants_are_the_least_squares_of_their_points() {
    let points = rows(include_str!("points.csv"));
    let mut pairs = 0;
    for pair in pair_table().iter().filter(|pair| pair.basis == Basis::Fitted) {
        let PairLaw::Wilson(w) = pair.law else { panic!() };
        let own: Vec<_> = points.iter().filter(|p| p[0] == pair.first && p[1] == pair.second).collect();
        assert_eq!(own.len(), 14, "{}/{}", pair.first, pair.second);
        let sum = |w: &Wilson| {
            let (mut sum, mut worst) = (0.0, 0.0_f64);
            for p in &own {
                assert_eq!(p[6], pair.source);
                let (l12, l21) = lambdas(w, number(p[3]) + 273.15);
                let found = ln_gamma(number(p[2]), l12, l21);
                for (found, printed) in found.iter().zip([p[4], p[5]]) {
                    let off = found - number(printed).ln();
                    sum += off * off;
                    worst = worst.max(off.abs());
                }
            }
            (sum, worst)
        };
        let (least, worst) = sum(&w);
        assert!(worst < 0.08, "{}/{}: {worst}", pair.first, pair.second);
        let mut changes: Vec<Wilson> = Vec::new();
        for step in [-5.0, 5.0] {
            changes.push(Wilson { b12_k: w.b12_k + step, ..w });
            changes.push(Wilson { b21_k: w.b21_k + step, ..w });
            // With NRTL's two temperatures the ratio of volumes was kept.
            if pair.source == "UNIFAC (Do)" {
                changes.push(Wilson { a12: w.a12 + step / 300.0, ..w });
                changes.push(Wilson { a21: w.a21 + step / 300.0, ..w });
            }
        }
        for changed in changes {
            assert!(sum(&changed).0 > least, "{}/{}: {changed:?}", pair.first, pair.second);
        }
        pairs += 1;
    }
    assert_eq!(pairs, 16);
}
