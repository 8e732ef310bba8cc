//! CO2 and HCl of a solvent burnt. Molar masses: conventional atomic weights by way of a property library.
use super::table::{number, rows};
use thimbleworth::metric::incineration::{co2_kg_per_kg, hcl_kg_per_kg};

/// The values have four or three decimals, and were formed with molar masses that differ in the fifth digit.
const TOLERANCE: f64 = 6e-4;

#[test]
fn co2_and_hcl_of_each_solvent() {
    let table = rows(include_str!("combustion.csv"));
    assert_eq!(table.len(), 19);
    for row in table {
        let molar_mass = number(&row, "molar_mass_g_mol") / 1000.0;
        let co2 = co2_kg_per_kg(row["carbon"].parse().unwrap(), molar_mass).unwrap();
        assert!((co2 - number(&row, "co2_kg_per_kg")).abs() <= TOLERANCE, "{}: {co2}", row["name"]);
        if !row["hcl_kg_per_kg"].is_empty() {
            let hcl = hcl_kg_per_kg(row["chlorine"].parse().unwrap(), molar_mass).unwrap();
            assert!((hcl - number(&row, "hcl_kg_per_kg")).abs() <= TOLERANCE, "{}: {hcl}", row["name"]);
        }
    }
}

/// Mass of dichloromethane is conserved: CH2Cl2 + O2 → CO2 + 2 HCl, 31.998 g/mol of O2 (by definition).
#[test]
fn combustion_of_dichloromethane_balances() {
    let m = 0.0849326;
    let out = co2_kg_per_kg(1, m).unwrap() + hcl_kg_per_kg(2, m).unwrap();
    assert!((out - (1.0 + 0.031_998 / m)).abs() < 2e-4, "{out}");
}
