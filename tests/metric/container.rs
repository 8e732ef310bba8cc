//! Degree of filling and number of containers.
use super::table::{number, rows};
use thimbleworth::metric::container::{adr_fill, adr_fill_by_boiling_point, containers, expansion_per_k};

#[test]
fn degree_of_filling() {
    for row in rows(include_str!("filling.csv")) {
        let alpha =
            expansion_per_k(number(&row, "density_15c_kg_m3"), number(&row, "density_50c_kg_m3")).unwrap();
        let percent = 100.0 * adr_fill(alpha, 273.15 + number(&row, "filled_at_c")).unwrap();
        let off = (percent - number(&row, "fill_percent")).abs();
        assert!(off <= number(&row, "tolerance_percent"), "{}: {percent}", row["name"]);
    }
}

/// A container filled to the rule at 20 °C is 98 % full at 50 °C, which is what the rule is for (by definition).
#[test]
fn filled_by_the_rule_it_is_98_per_cent_full_at_50() {
    let (d15, d50) = (795.8, 756.14);
    let alpha = expansion_per_k(d15, d50).unwrap();
    assert!((adr_fill(alpha, 323.15).unwrap() - 0.98).abs() < 1e-15);
    // filled at 15 °C the mean expansion is exact: fill × d₁₅/d₅₀ = 0.98
    assert!((adr_fill(alpha, 288.15).unwrap() * d15 / d50 - 0.98).abs() < 1e-12);
}

/// ADR 4.1.1.4, the table by boiling point, from memory.
#[test]
fn degree_of_filling_by_boiling_point() {
    let fills = [40.0, 60.0, 110.0, 250.0, 300.0].map(|c| adr_fill_by_boiling_point(c + 273.15).unwrap());
    assert_eq!(fills, [0.90, 0.92, 0.94, 0.96, 0.98]);
}

/// Counted by hand: a year in one count, and twelve months each rounded up.
#[test]
fn a_year_carried_over_takes_fewer_than_twelve_months_rounded_up() {
    let year = containers(0.737, 0.020, 0.90).unwrap();
    let months = 12 * containers(0.737 / 12.0, 0.020, 0.90).unwrap();
    assert_eq!((year, months), (41, 48));
}
