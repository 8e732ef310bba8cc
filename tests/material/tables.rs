//! Checksums of meaning: counts, sums, sources and CAS numbers over the tables of `core/data`.
use crate::table::read;
use std::collections::{BTreeMap, BTreeSet};
use thimbleworth::material::{Class, catalogue, statement_text};

fn data() -> std::path::PathBuf {
    std::path::Path::new(env!("CARGO_MANIFEST_DIR")).join("../core/data")
}

fn tables() -> BTreeMap<String, (Vec<String>, Vec<Vec<String>>)> {
    let mut tables = BTreeMap::new();
    for entry in std::fs::read_dir(data()).unwrap() {
        let path = entry.unwrap().path();
        if path.extension().is_some_and(|extension| extension == "csv") {
            let name = path.file_name().unwrap().to_str().unwrap().to_owned();
            tables.insert(name, read(&std::fs::read_to_string(path).unwrap()));
        }
    }
    tables
}

#[test]
fn every_row_has_a_source_and_every_source_is_used() {
    let mut used = BTreeSet::from(["IUPAC 2021".to_owned()]);
    for (file, (heading, rows)) in tables() {
        let sources: Vec<usize> =
            (0..heading.len()).filter(|&place| heading[place].ends_with("source")).collect();
        assert!(!sources.is_empty(), "{file} has no source column");
        for row in rows {
            assert_eq!(row.len(), heading.len(), "{file}: {row:?}");
            assert!(sources.iter().any(|&place| !row[place].is_empty()), "{file}: {row:?}");
            for &place in &sources {
                if !row[place].is_empty() {
                    assert!(catalogue().source(&row[place]).is_some(), "{file}: no source {}", row[place]);
                    used.insert(row[place].clone());
                }
            }
        }
    }
    let listed: BTreeSet<String> = catalogue().sources().map(|(key, _)| key.to_owned()).collect();
    assert_eq!(listed, used);
}

// A row that vanishes, a digit that slips: the count of filled cells or the sum of the numbers of a column changes. The expected
// figures are this project's own, taken when the tables were made; they guard against later accidents and prove nothing about the
// sources.
#[test]
fn counts_and_sums_of_every_column() {
    let mut found = String::new();
    for (file, (heading, rows)) in tables() {
        for (place, column) in heading.iter().enumerate() {
            let filled = rows.iter().filter(|row| !row[place].is_empty()).count();
            let numbers: Vec<f64> = rows.iter().filter_map(|row| row[place].parse().ok()).collect();
            let letters: usize = rows.iter().map(|row| row[place].len()).sum();
            let content = if numbers.is_empty() {
                format!("{letters} letters")
            } else {
                format!("sum {:.8e}", numbers.iter().fold(0.0, |sum, number| sum + number))
            };
            found.push_str(&format!("{file} {column}: {filled} filled, {content}\n"));
        }
    }
    assert_eq!(found, include_str!("checksums.txt"));
}

#[test]
fn counts_by_class() {
    let count = |class| catalogue().iter().filter(|s| s.class == class).count();
    assert_eq!(Class::ALL.map(count), [69, 11, 1, 12, 4, 9, 11, 7, 0]);
}

// Witness: the rule of the CAS registry: the last digit is the sum of the others, each times its place from the right, modulo 10.
#[test]
fn cas_numbers_have_their_check_digit() {
    let mut seen = BTreeSet::new();
    for substance in catalogue() {
        let Some(cas) = &substance.cas else {
            let may = matches!(
                substance.class,
                Class::Consumable | Class::Matrix | Class::Sorbent | Class::DryingAgent
            );
            assert!(may, "{} has no CAS number", substance.name);
            continue;
        };
        let digits: Vec<u32> = cas.chars().filter_map(|c| c.to_digit(10)).collect();
        let (check, body) = digits.split_last().unwrap();
        let sum: u32 = body.iter().rev().zip(1..).map(|(digit, place)| digit * place).sum();
        assert_eq!(sum % 10, *check, "{} {cas}", substance.name);
        assert!(seen.insert(cas.clone()), "{cas} twice");
    }
}

#[test]
fn hazard_statements_have_a_text_and_a_date() {
    for substance in catalogue() {
        let hazard = &substance.hazard;
        for code in hazard.statements.iter().chain(&hazard.supplier_statements) {
            assert!(statement_text(code).is_some(), "{}: {code}", substance.name);
        }
        assert_eq!(hazard.standing.is_some(), hazard.as_of.len() == 10, "{}", substance.name);
        // A supplier's label never says less than the harmonised entry.
        if !hazard.supplier_statements.is_empty() {
            for code in &hazard.statements {
                assert!(hazard.supplier_statements.contains(code), "{}: {code}", substance.name);
            }
        }
    }
}

#[test]
fn figures_lie_within_their_own_limits() {
    let mut checked = 0;
    for s in catalogue() {
        let laws = [&s.density, &s.vapour_pressure, &s.heat_of_vaporisation];
        for law in laws {
            let Some((low_k, high_k)) = law.range_k() else { continue };
            for step in 0..=20 {
                let t = low_k + (high_k - low_k) * f64::from(step) / 20.0;
                // The last step may land past the end by rounding.
                let t = if t > high_k { high_k } else { t };
                let figure = law.figure(t, &s.name, "figure").unwrap();
                assert!(figure.value.is_finite() && figure.value > 0.0, "{} at {t}: {figure:?}", s.name);
                assert!(
                    figure.low <= figure.value && figure.value <= figure.high,
                    "{} at {t}: {figure:?}",
                    s.name
                );
                checked += 1;
            }
        }
        let single = [
            &s.boiling_point_k,
            &s.autoignition_k,
            &s.critical_temperature_k,
            &s.bulk_density_kg_m3,
            &s.unit_mass_kg,
            &s.water_capacity_kg_kg,
            &s.odp,
        ];
        for figure in single.into_iter().flatten().chain(s.flash_point_k.figure()) {
            assert!(figure.low <= figure.value && figure.value <= figure.high, "{}: {figure:?}", s.name);
        }
    }
    assert!(checked > 4000, "{checked}");
}

// Witness: stoichiometry. Na2SO4·10H2O 1.268, MgSO4·7H2O 1.048, CaCl2·6H2O 0.974 kg/kg are the limits of uptake.
#[test]
fn drying_agents_stay_below_their_hydrate() {
    for (name, waters) in [("sodium sulfate", 10.0), ("magnesium sulfate", 7.0), ("calcium chloride", 6.0)] {
        let agent = catalogue().find(name).unwrap();
        let mass = agent.molar_mass_kg_mol.as_ref().unwrap().value;
        let capacity = agent.water_capacity_kg_kg.as_ref().unwrap();
        assert!((capacity.high - waters * 0.018_015 / mass).abs() < 0.001, "{name}");
        assert!(capacity.value < capacity.high, "{name}");
    }
}

// Density falls and vapour pressure rises with temperature, and the heat of vaporisation falls: water's density only from 4 °C, the
// heat of the two acids that pair up in the vapour not at all, that of alcohols not in the deep cold.
#[test]
fn density_falls_vapour_pressure_rises_heat_falls() {
    for s in catalogue() {
        let acid = ["acetic acid", "formic acid"].contains(&&*s.name);
        for (law, rises) in
            [(&s.density, false), (&s.vapour_pressure, true), (&s.heat_of_vaporisation, false)]
        {
            let Some((low_k, high_k)) = law.range_k() else { continue };
            let heat = std::ptr::eq(law, &s.heat_of_vaporisation);
            if heat && acid {
                continue;
            }
            let floor = if heat {
                283.15
            } else if s.class == Class::Water {
                278.0
            } else {
                0.0
            };
            let from = if floor > low_k { floor } else { low_k };
            if from >= high_k {
                continue;
            }
            let value = |step: i32| {
                law.value(from + (high_k - from) * f64::from(step) / 50.0, &s.name, "figure").unwrap()
            };
            for step in 0..49 {
                let (a, b) = (value(step), value(step + 1));
                assert!(if rises { b > a } else { b < a }, "{} from step {step}: {a} to {b}", s.name);
            }
        }
    }
}
