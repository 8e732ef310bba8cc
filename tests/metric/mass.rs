//! E-factor, process mass intensity and their kin.
use thimbleworth::metric::about::{ATOM_ECONOMY, CARBON_EFFICIENCY, MASS_PER_RESULT, MASS_PER_RESULT_NET};
use thimbleworth::metric::mass::{
    complete_e_factor, e_factor, e_factor_by_balance, mass_intensity, mass_per_result_kg, mass_productivity,
    process_mass_intensity, process_mass_intensity_net, reaction_mass_efficiency,
    reaction_mass_efficiency_generalised, reaction_mass_efficiency_with_reagents, solvent_intensity,
    solvent_intensity_net, solvent_net_kg,
};
use thimbleworth::metric::reaction::{Carbon, Species, atom_economy, carbon_efficiency};
use thimbleworth::metric::{Inputs, MASS_METRICS, Metric, MetricError};

fn near(found: Result<f64, MetricError>, wanted: f64, tolerance: f64) {
    let found = found.unwrap();
    assert!((found - wanted).abs() <= tolerance, "{found} is not {wanted} ± {tolerance}");
}

/// Source: a public teaching example, 25 kg of waste to 1 kg of product is E 25 and PMI 26; seen in a secondary source.
#[test]
fn e_factor_25_is_pmi_26() {
    let inputs =
        Inputs { raw_materials_kg: 26.0, product_kg: 1.0, waste_kg: Some(25.0), ..Inputs::default() };
    near(e_factor(&inputs), 25.0, 1e-9);
    near(e_factor_by_balance(&inputs), 25.0, 1e-9);
    near(process_mass_intensity(&inputs), 26.0, 1e-9);
}

/// Source: esterification of benzyl alcohol with p-toluenesulfonyl chloride, after Constable, Curzons, Cunningham,
/// Green Chem. 2002, 4, 521. Inputs and carbon efficiency from memory, ratios recomputed by hand; the paper's printed
/// reaction mass efficiency is not claimed.
fn esterification() -> Inputs {
    Inputs {
        raw_materials_kg: 10.81e-3 + 21.9e-3,
        reagents_kg: 15e-3,
        solvents_charged_kg: 500e-3,
        product_kg: 23.6e-3,
        ..Inputs::default()
    }
}

#[test]
fn esterification_masses() {
    let inputs = esterification();
    near(mass_intensity(&inputs), 23.2, 0.05);
    near(mass_productivity(&inputs), 1.0 / 23.208, 1e-5);
    near(reaction_mass_efficiency(&inputs), 0.721, 0.0006);
    near(reaction_mass_efficiency_with_reagents(&inputs), 0.495, 0.0006);
    near(solvent_intensity(&inputs), 21.19, 0.005);
}

#[test]
fn esterification_atoms_and_carbon() {
    let one = |g_mol: f64| Species { number: 1.0, molar_mass_kg_per_mol: g_mol / 1000.0 };
    // C14H14O3S from C7H8O, C7H7ClO2S and C6H15N
    near(atom_economy(one(262.32), &[one(108.14), one(190.65), one(101.19)]), 0.656, 0.0005);
    let of = |amount_mol, atoms| Carbon { amount_mol, atoms };
    near(carbon_efficiency(of(0.09, 14), &[of(0.10, 7), of(0.115, 7)]), 0.837, 0.0005);
}

/// By definition: complete E is gross PMI less one, and the generalised efficiency its inverse, whatever the masses.
#[test]
fn identities_hold() {
    let mut state = 1_u64;
    let mut next = || {
        state = state.wrapping_mul(6_364_136_223_846_793_005).wrapping_add(1_442_695_040_888_963_407);
        f64::from(u32::try_from(state >> 40).unwrap()) / 1e5
    };
    for _ in 0..200 {
        let (product_kg, charged) = (next() + 1e-3, next());
        let inputs = Inputs {
            raw_materials_kg: product_kg + next(),
            reagents_kg: next(),
            solvents_charged_kg: charged,
            solvents_reused_kg: charged * 0.37,
            water_kg: next(),
            product_kg,
            ..Inputs::default()
        };
        let pmi = process_mass_intensity(&inputs).unwrap();
        near(complete_e_factor(&inputs), pmi - 1.0, 1e-9 * pmi);
        near(reaction_mass_efficiency_generalised(&inputs), 1.0 / pmi, 1e-12);
        let net = solvent_net_kg(charged, 0.37).unwrap() / product_kg;
        near(solvent_intensity_net(&inputs), net, 1e-9 * (1.0 + net));
        let less = pmi - charged * 0.37 / product_kg;
        near(process_mass_intensity_net(&inputs), less, 1e-9 * pmi);
    }
}

/// Analysis has no product: per product is refused with the reason, per result is the figure.
#[test]
fn analysis_is_per_result() {
    let year = Inputs { raw_materials_kg: 14.0, solvents_charged_kg: 420.0, ..Inputs::default() };
    let refused = process_mass_intensity(&year).unwrap_err();
    assert!(refused.to_string().contains("per result"), "{refused}");
    near(mass_per_result_kg(&year, 1400.0), 0.31, 1e-12);
    assert_eq!(mass_per_result_kg(&year, 0.0), Err(MetricError::NoResults { results: 0.0 }));
}

/// A report can name boundary, formula and source of each metric, and no two share a key.
#[test]
fn every_metric_says_what_it_is() {
    let mut all: Vec<&Metric> = MASS_METRICS.iter().map(|m| &m.metric).collect();
    all.extend([&ATOM_ECONOMY, &CARBON_EFFICIENCY, &MASS_PER_RESULT, &MASS_PER_RESULT_NET]);
    assert_eq!(all.len(), 19);
    for metric in &all {
        assert!(metric.boundary.ends_with('.'), "{}", metric.key);
        assert!(metric.formula.contains('/') && !metric.title.is_empty(), "{}", metric.key);
        assert!(!metric.source.cite.is_empty(), "{}", metric.key);
    }
    let mut keys: Vec<_> = all.iter().map(|m| m.key).collect();
    keys.sort_unstable();
    keys.dedup();
    assert_eq!(keys.len(), all.len());
}
