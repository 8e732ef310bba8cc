//! E-factor, process mass intensity and their kin. Boundary, formula and source of each stand in [`super::about`].
//!
//! All take [`Inputs`] in kg and give a plain ratio (kg/kg, or kg a result). All refuse a product of zero with
//! [`MetricError::NoProduct`] and impossible masses with the error that names them.
//!
//! Recovery is never assumed: gross counts every charge, net counts what was not reused, and both are wanted.
use super::inputs::amount;
use super::{Inputs, MetricError};

/// What is left of the inputs when product and by-product are taken away, kg.
fn by_balance(inputs_kg: f64, product_kg: f64) -> Result<f64, MetricError> {
    if product_kg > inputs_kg {
        return Err(MetricError::ProductExceedsInputs { product_kg, inputs_kg });
    }
    Ok(inputs_kg - product_kg)
}

/// E-factor of stated waste: E = m_waste/m_P.
///
/// # Errors
/// [`MetricError::WasteNotStated`] besides those of the module.
///
/// ```
/// use thimbleworth::metric::{mass, Inputs};
/// // A public teaching example: 25 kg of waste to 1 kg of product.
/// let inputs = Inputs { raw_materials_kg: 26.0, product_kg: 1.0, waste_kg: Some(25.0), ..Inputs::default() };
/// assert_eq!(mass::e_factor(&inputs), Ok(25.0));
/// assert_eq!(mass::process_mass_intensity(&inputs), Ok(26.0));
/// ```
pub fn e_factor(inputs: &Inputs) -> Result<f64, MetricError> {
    let i = inputs.with_product()?;
    let waste_kg = i.waste_kg.ok_or(MetricError::WasteNotStated)?;
    // E = m_waste/m_P
    Ok(waste_kg / i.product_kg)
}

/// E-factor by balance: E = (m_RM + m_RG + m_S − m_S,reused − m_P − m_BP)/m_P; water left out, solvent net.
///
/// # Errors
/// [`MetricError::ProductExceedsInputs`] besides those of the module.
///
/// ```
/// use thimbleworth::metric::{mass, Inputs};
/// let inputs = Inputs {
///     raw_materials_kg: 10.0, solvents_charged_kg: 50.0, solvents_reused_kg: 45.0, water_kg: 100.0,
///     product_kg: 1.0, ..Inputs::default()
/// };
/// assert_eq!(mass::e_factor_by_balance(&inputs), Ok(14.0));
/// ```
pub fn e_factor_by_balance(inputs: &Inputs) -> Result<f64, MetricError> {
    let i = inputs.with_product()?;
    let counted_kg = i.raw_materials_kg + i.reagents_kg + i.solvents_net_kg();
    // E = (m_RM + m_RG + m_S − m_S,reused − m_P − m_BP)/m_P
    Ok(by_balance(counted_kg, i.product_kg + i.by_product_kg)? / i.product_kg)
}

/// Simple E-factor: sEF = (m_RM + m_RG − m_P)/m_P; neither solvent nor water.
///
/// # Errors
/// [`MetricError::ProductExceedsInputs`] besides those of the module.
///
/// ```
/// use thimbleworth::metric::{mass, Inputs};
/// let inputs = Inputs { raw_materials_kg: 3.0, reagents_kg: 1.0, solvents_charged_kg: 50.0, product_kg: 2.0, ..Inputs::default() };
/// assert_eq!(mass::simple_e_factor(&inputs), Ok(1.0));
/// ```
pub fn simple_e_factor(inputs: &Inputs) -> Result<f64, MetricError> {
    let i = inputs.with_product()?;
    // sEF = (m_RM + m_RG − m_P)/m_P
    Ok(by_balance(i.raw_materials_kg + i.reagents_kg, i.product_kg)? / i.product_kg)
}

/// Complete E-factor: cEF = (m_RM + m_RG + m_S + m_W − m_P)/m_P; solvent and water in full, no credit for recovery.
///
/// It is the gross process mass intensity less one.
///
/// # Errors
/// [`MetricError::ProductExceedsInputs`] besides those of the module.
///
/// ```
/// use thimbleworth::metric::{mass, Inputs};
/// let inputs = Inputs {
///     raw_materials_kg: 3.0, reagents_kg: 1.0, solvents_charged_kg: 50.0, solvents_reused_kg: 40.0,
///     water_kg: 26.0, product_kg: 2.0, ..Inputs::default()
/// };
/// assert_eq!(mass::complete_e_factor(&inputs), Ok(39.0));
/// assert_eq!(mass::process_mass_intensity(&inputs), Ok(40.0));
/// ```
pub fn complete_e_factor(inputs: &Inputs) -> Result<f64, MetricError> {
    let i = inputs.with_product()?;
    // cEF = (m_RM + m_RG + m_S + m_W − m_P)/m_P
    Ok(by_balance(i.gross_kg(), i.product_kg)? / i.product_kg)
}

/// Process mass intensity, gross: PMI = (m_RM + m_RG + m_S + m_W)/m_P.
///
/// # Errors
/// Those of the module.
///
/// ```
/// use thimbleworth::metric::{mass, Inputs};
/// let inputs = Inputs { raw_materials_kg: 10.0, solvents_charged_kg: 50.0, water_kg: 40.0, product_kg: 2.0, ..Inputs::default() };
/// assert_eq!(mass::process_mass_intensity(&inputs), Ok(50.0));
/// ```
pub fn process_mass_intensity(inputs: &Inputs) -> Result<f64, MetricError> {
    let i = inputs.with_product()?;
    // PMI = (m_RM + m_RG + m_S + m_W)/m_P
    Ok(i.gross_kg() / i.product_kg)
}

/// Process mass intensity, net of reused solvent: (m_RM + m_RG + m_S − m_S,reused + m_W)/m_P.
///
/// # Errors
/// Those of the module.
///
/// ```
/// use thimbleworth::metric::{mass, Inputs};
/// let inputs = Inputs {
///     raw_materials_kg: 10.0, solvents_charged_kg: 50.0, solvents_reused_kg: 40.0, water_kg: 40.0,
///     product_kg: 2.0, ..Inputs::default()
/// };
/// assert_eq!(mass::process_mass_intensity_net(&inputs), Ok(30.0));
/// ```
pub fn process_mass_intensity_net(inputs: &Inputs) -> Result<f64, MetricError> {
    let i = inputs.with_product()?;
    // PMI_net = (m_RM + m_RG + m_S − m_S,reused + m_W)/m_P
    Ok(i.net_kg() / i.product_kg)
}

/// Mass intensity: MI = (m_RM + m_RG + m_S)/m_P; water left out.
///
/// # Errors
/// Those of the module.
///
/// ```
/// use thimbleworth::metric::{mass, Inputs};
/// // Benzyl alcohol and p-toluenesulfonyl chloride with triethylamine in toluene, after Constable 2002: 23.2
/// let inputs = Inputs {
///     raw_materials_kg: 10.81e-3 + 21.9e-3, reagents_kg: 15e-3, solvents_charged_kg: 500e-3,
///     product_kg: 23.6e-3, ..Inputs::default()
/// };
/// assert!((mass::mass_intensity(&inputs).unwrap() - 23.2).abs() < 0.05);
/// ```
pub fn mass_intensity(inputs: &Inputs) -> Result<f64, MetricError> {
    let i = inputs.with_product()?;
    // MI = (m_RM + m_RG + m_S)/m_P
    Ok((i.raw_materials_kg + i.reagents_kg + i.solvents_charged_kg) / i.product_kg)
}

/// Mass productivity: MP = 1/MI = m_P/(m_RM + m_RG + m_S), a fraction.
///
/// # Errors
/// [`MetricError::NothingToDivideBy`] besides those of the module.
///
/// ```
/// use thimbleworth::metric::{mass, Inputs};
/// let inputs = Inputs { raw_materials_kg: 4.0, solvents_charged_kg: 4.0, product_kg: 2.0, ..Inputs::default() };
/// assert_eq!(mass::mass_productivity(&inputs), Ok(0.25));
/// ```
pub fn mass_productivity(inputs: &Inputs) -> Result<f64, MetricError> {
    let i = inputs.with_product()?;
    // MP = m_P/(m_RM + m_RG + m_S)
    over(
        i.product_kg,
        i.raw_materials_kg + i.reagents_kg + i.solvents_charged_kg,
        "mass of inputs without water",
    )
}

/// Reaction mass efficiency, classic: RME = m_P/m_RM, a fraction; reactants only.
///
/// # Errors
/// [`MetricError::NothingToDivideBy`] besides those of the module.
///
/// ```
/// use thimbleworth::metric::{mass, Inputs};
/// let inputs = Inputs { raw_materials_kg: 10.81e-3 + 21.9e-3, reagents_kg: 15e-3, product_kg: 23.6e-3, ..Inputs::default() };
/// assert!((mass::reaction_mass_efficiency(&inputs).unwrap() - 0.721).abs() < 0.0005);
/// ```
pub fn reaction_mass_efficiency(inputs: &Inputs) -> Result<f64, MetricError> {
    let i = inputs.with_product()?;
    // RME = m_P/m_RM
    over(i.product_kg, i.raw_materials_kg, "mass of reactants")
}

/// Reaction mass efficiency with the reagents counted: m_P/(m_RM + m_RG), a fraction.
///
/// # Errors
/// [`MetricError::NothingToDivideBy`] besides those of the module.
///
/// ```
/// use thimbleworth::metric::{mass, Inputs};
/// let inputs = Inputs { raw_materials_kg: 10.81e-3 + 21.9e-3, reagents_kg: 15e-3, product_kg: 23.6e-3, ..Inputs::default() };
/// assert!((mass::reaction_mass_efficiency_with_reagents(&inputs).unwrap() - 0.495).abs() < 0.0005);
/// ```
pub fn reaction_mass_efficiency_with_reagents(inputs: &Inputs) -> Result<f64, MetricError> {
    let i = inputs.with_product()?;
    // RME = m_P/(m_RM + m_RG)
    over(i.product_kg, i.raw_materials_kg + i.reagents_kg, "mass of reactants and reagents")
}

/// Reaction mass efficiency, generalised: gRME = m_P/(m_RM + m_RG + m_S + m_W) = 1/PMI, a fraction.
///
/// # Errors
/// [`MetricError::NothingToDivideBy`] besides those of the module.
///
/// ```
/// use thimbleworth::metric::{mass, Inputs};
/// let inputs = Inputs { raw_materials_kg: 10.0, water_kg: 10.0, product_kg: 5.0, ..Inputs::default() };
/// assert_eq!(mass::reaction_mass_efficiency_generalised(&inputs), Ok(0.25));
/// ```
pub fn reaction_mass_efficiency_generalised(inputs: &Inputs) -> Result<f64, MetricError> {
    let i = inputs.with_product()?;
    // gRME = m_P/(m_RM + m_RG + m_S + m_W)
    over(i.product_kg, i.gross_kg(), "mass of all inputs")
}

/// Effective mass yield: EMY = m_P/(Σ m_in − m_benign), a fraction that can pass 1; all inputs gross.
///
/// What is benign is the plan's own list and must be printed beside the figure.
///
/// # Errors
/// [`MetricError::NothingToDivideBy`] where every input is declared benign, [`MetricError::NotAnAmount`] where more than
/// that is, besides those of the module.
///
/// ```
/// use thimbleworth::metric::{mass, Inputs};
/// let inputs = Inputs {
///     raw_materials_kg: 4.0, solvents_charged_kg: 6.0, water_kg: 10.0, benign_kg: 16.0, product_kg: 2.0, ..Inputs::default()
/// };
/// assert_eq!(mass::effective_mass_yield(&inputs), Ok(0.5));
/// ```
pub fn effective_mass_yield(inputs: &Inputs) -> Result<f64, MetricError> {
    let i = inputs.with_product()?;
    let counted_kg = amount("mass of inputs less the benign", i.gross_kg() - i.benign_kg)?;
    // EMY = m_P/(Σ m_in − m_benign)
    over(i.product_kg, counted_kg, "mass of inputs not declared benign")
}

/// Solvent intensity, gross: SI = m_S/m_P.
///
/// # Errors
/// Those of the module.
///
/// ```
/// use thimbleworth::metric::{mass, Inputs};
/// let inputs = Inputs { solvents_charged_kg: 50.0, solvents_reused_kg: 40.0, product_kg: 2.0, ..Inputs::default() };
/// assert_eq!(mass::solvent_intensity(&inputs), Ok(25.0));
/// assert_eq!(mass::solvent_intensity_net(&inputs), Ok(5.0));
/// ```
pub fn solvent_intensity(inputs: &Inputs) -> Result<f64, MetricError> {
    let i = inputs.with_product()?;
    // SI = m_S/m_P
    Ok(i.solvents_charged_kg / i.product_kg)
}

/// Solvent intensity, net of reused solvent: SI_net = (m_S − m_S,reused)/m_P.
///
/// # Errors
/// Those of the module.
///
/// ```
/// use thimbleworth::metric::{mass, Inputs};
/// let inputs = Inputs { solvents_charged_kg: 3.0, solvents_reused_kg: 2.0, product_kg: 2.0, ..Inputs::default() };
/// assert_eq!(mass::solvent_intensity_net(&inputs), Ok(0.5));
/// ```
pub fn solvent_intensity_net(inputs: &Inputs) -> Result<f64, MetricError> {
    let i = inputs.with_product()?;
    // SI_net = (m_S − m_S,reused)/m_P
    Ok(i.solvents_net_kg() / i.product_kg)
}

/// Water intensity: WI = m_W/m_P; process water only.
///
/// # Errors
/// Those of the module.
///
/// ```
/// use thimbleworth::metric::{mass, Inputs};
/// assert_eq!(mass::water_intensity(&Inputs { water_kg: 9.0, product_kg: 2.0, ..Inputs::default() }), Ok(4.5));
/// ```
pub fn water_intensity(inputs: &Inputs) -> Result<f64, MetricError> {
    let i = inputs.with_product()?;
    // WI = m_W/m_P
    Ok(i.water_kg / i.product_kg)
}

/// Mass per reported result, gross, kg: (m_RM + m_RG + m_S + m_W)/N. For analysis, where there is no product.
///
/// `results` is the number of reported results over the same basis as the masses, so that blanks, controls and repeats
/// weigh on the results they serve.
///
/// # Errors
/// [`MetricError::NoResults`], and impossible masses.
///
/// ```
/// use thimbleworth::metric::{mass, Inputs};
/// let year = Inputs { raw_materials_kg: 14.0, solvents_charged_kg: 420.0, ..Inputs::default() };
/// assert_eq!(mass::mass_per_result_kg(&year, 1400.0), Ok(0.31));
/// ```
pub fn mass_per_result_kg(inputs: &Inputs, results: f64) -> Result<f64, MetricError> {
    // PMI_result = (m_RM + m_RG + m_S + m_W)/N
    Ok(inputs.checked()?.gross_kg() / counted(results)?)
}

/// Mass per reported result, net of reused solvent, kg: (m_RM + m_RG + m_S − m_S,reused + m_W)/N.
///
/// # Errors
/// [`MetricError::NoResults`], and impossible masses.
///
/// ```
/// use thimbleworth::metric::{mass, Inputs};
/// let year = Inputs { solvents_charged_kg: 420.0, solvents_reused_kg: 140.0, ..Inputs::default() };
/// assert_eq!(mass::mass_per_result_net_kg(&year, 1400.0), Ok(0.2));
/// ```
pub fn mass_per_result_net_kg(inputs: &Inputs, results: f64) -> Result<f64, MetricError> {
    // PMI_result,net = (m_RM + m_RG + m_S − m_S,reused + m_W)/N
    Ok(inputs.checked()?.net_kg() / counted(results)?)
}

/// Solvent to buy when a fraction r of the charge is really reused: m_S,net = m_S (1 − r), kg.
///
/// # Errors
/// [`MetricError::NotAnAmount`] for a negative mass or a fraction outside 0 to 1.
///
/// ```
/// assert_eq!(thimbleworth::metric::mass::solvent_net_kg(100.0, 0.75), Ok(25.0));
/// ```
pub fn solvent_net_kg(charged_kg: f64, reused_fraction: f64) -> Result<f64, MetricError> {
    amount("mass of solvents charged", charged_kg)?;
    if !(0.0..=1.0).contains(&reused_fraction) {
        return Err(MetricError::NotAnAmount { of: "reused fraction (0 to 1)", value: reused_fraction });
    }
    // m_S,net = m_S (1 − r)
    Ok(charged_kg * (1.0 - reused_fraction))
}

fn over(above: f64, below: f64, of: &'static str) -> Result<f64, MetricError> {
    if below > 0.0 { Ok(above / below) } else { Err(MetricError::NothingToDivideBy { of }) }
}

fn counted(results: f64) -> Result<f64, MetricError> {
    if results.is_finite() && results > 0.0 { Ok(results) } else { Err(MetricError::NoResults { results }) }
}

#[cfg(test)]
mod tests {
    use super::*;

    const ONE: Inputs = Inputs {
        raw_materials_kg: 5.0,
        reagents_kg: 1.0,
        solvents_charged_kg: 20.0,
        solvents_reused_kg: 15.0,
        water_kg: 8.0,
        product_kg: 2.0,
        by_product_kg: 1.0,
        waste_kg: None,
        benign_kg: 8.0,
    };

    #[test]
    fn no_product_is_refused_by_every_metric() {
        for about in super::super::MASS_METRICS {
            let none = (about.value)(&Inputs { product_kg: 0.0, ..ONE });
            assert_eq!(none, Err(MetricError::NoProduct { product: 0.0 }), "{}", about.metric.key);
        }
    }

    #[test]
    fn impossible_masses_are_refused_by_every_metric() {
        for about in super::super::MASS_METRICS {
            let waste_kg = Some(1.0);
            let negative = (about.value)(&Inputs { waste_kg, water_kg: -1.0, ..ONE });
            let of = "mass of water";
            assert_eq!(negative, Err(MetricError::NotAnAmount { of, value: -1.0 }), "{}", about.metric.key);
            let reused = (about.value)(&Inputs { waste_kg, solvents_reused_kg: 21.0, ..ONE });
            assert!(matches!(reused, Err(MetricError::ReusedExceedsCharged { .. })), "{}", about.metric.key);
        }
    }

    #[test]
    fn product_heavier_than_its_inputs_is_refused() {
        let wet = Inputs { raw_materials_kg: 0.5, reagents_kg: 0.0, ..ONE };
        assert_eq!(
            simple_e_factor(&wet),
            Err(MetricError::ProductExceedsInputs { product_kg: 2.0, inputs_kg: 0.5 })
        );
    }

    #[test]
    fn by_product_is_no_waste() {
        assert_eq!(e_factor_by_balance(&ONE), Ok((5.0 + 1.0 + 5.0 - 3.0) / 2.0));
        assert_eq!(e_factor(&ONE), Err(MetricError::WasteNotStated));
    }
}
