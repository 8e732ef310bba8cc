//! Title, formula, boundary and source of each metric, so that a report can name them beside the figure.
use super::mass;
use super::{Inputs, MetricError};
use crate::source::{MASS_BALANCE, Source, Standing};

/// What a metric is.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Metric {
    /// A short, stable key.
    pub key: &'static str,
    /// Its name.
    pub title: &'static str,
    /// Its formula.
    pub formula: &'static str,
    /// What is inside the boundary and what is outside, as a sentence.
    pub boundary: &'static str,
    /// Where it comes from.
    pub source: Source,
}

/// A metric of [`Inputs`] with the function that computes it.
#[derive(Clone, Copy, Debug)]
pub struct MassMetric {
    /// What it is.
    pub metric: Metric,
    /// The function.
    pub value: fn(&Inputs) -> Result<f64, MetricError>,
}

const SHELDON: Source = Source::new("Sheldon, Green Chem. 2007, 9, 1273", Standing::Secondary);
const ROSCHANGAR: Source =
    Source::new("Roschangar, Sheldon, Senanayake, Green Chem. 2015, 17, 752", Standing::FromMemory);
const JIMENEZ: Source =
    Source::new("Jimenez-Gonzalez et al., Org. Process Res. Dev. 2011, 15, 912", Standing::Secondary);
const CONSTABLE: Source =
    Source::new("Constable, Curzons, Cunningham, Green Chem. 2002, 4, 521", Standing::FromMemory);
const ANDRAOS: Source = Source::new("Andraos, generalised reaction mass efficiency", Standing::FromMemory);
const HUDLICKY: Source = Source::new("Hudlicky et al., Green Chem. 1999, 1, 57", Standing::FromMemory);
const TROST: Source = Source::new("Trost, Science 1991, 254, 1471", Standing::FromMemory);

/// Atom economy; computed by [`super::reaction::atom_economy`].
pub static ATOM_ECONOMY: Metric = Metric {
    key: "atom-economy",
    title: "Atom economy",
    formula: "AE = ν_P M_P/Σ νᵢ Mᵢ",
    boundary: "The reactants of the balanced equation; yield, excess, reagents outside the equation, solvents and water are outside.",
    source: TROST,
};

/// Carbon efficiency; computed by [`super::reaction::carbon_efficiency`].
pub static CARBON_EFFICIENCY: Metric = Metric {
    key: "carbon-efficiency",
    title: "Carbon efficiency",
    formula: "CE = n_P C_P/Σ nᵢ Cᵢ",
    boundary: "The carbon of the product over the carbon of the reactants as charged; bases, solvents and other atoms are outside.",
    source: CONSTABLE,
};

/// Mass per reported result, gross; computed by [`super::mass::mass_per_result_kg`].
pub static MASS_PER_RESULT: Metric = Metric {
    key: "mass-per-result",
    title: "Mass per reported result, gross",
    formula: "(m_RM + m_RG + m_S + m_W)/N",
    boundary: "All inputs of the period, every solvent charge and process water included, over the results reported in it; cooling water and apparatus are outside.",
    source: MASS_BALANCE,
};

/// Mass per reported result, net; computed by [`super::mass::mass_per_result_net_kg`].
pub static MASS_PER_RESULT_NET: Metric = Metric {
    key: "mass-per-result-net",
    title: "Mass per reported result, net of reused solvent",
    formula: "(m_RM + m_RG + m_S − m_S,reused + m_W)/N",
    boundary: "As the gross figure, less the solvent that was really charged again; recovery that is only possible is outside.",
    source: MASS_BALANCE,
};

/// The metrics per product that follow from [`Inputs`], in the order of a report.
///
/// ```
/// use thimbleworth::metric::{Inputs, MASS_METRICS};
/// let batch = Inputs { raw_materials_kg: 26.0, product_kg: 1.0, ..Inputs::default() };
/// let pmi = MASS_METRICS.iter().find(|m| m.metric.key == "pmi").unwrap();
/// assert_eq!((pmi.value)(&batch), Ok(26.0));
/// assert!(pmi.metric.boundary.contains("cooling water"));
/// ```
pub static MASS_METRICS: &[MassMetric] = &[
    MassMetric {
        metric: Metric {
            key: "pmi",
            title: "Process mass intensity, gross",
            formula: "PMI = (m_RM + m_RG + m_S + m_W)/m_P",
            boundary: "All inputs, every solvent charge and process water included; cooling water, energy and apparatus are outside; no credit for recovery.",
            source: JIMENEZ,
        },
        value: mass::process_mass_intensity,
    },
    MassMetric {
        metric: Metric {
            key: "pmi-net",
            title: "Process mass intensity, net of reused solvent",
            formula: "PMI_net = (m_RM + m_RG + m_S − m_S,reused + m_W)/m_P",
            boundary: "As the gross figure, less the solvent that was really charged again; cooling water and recovery that is only possible are outside.",
            source: MASS_BALANCE,
        },
        value: mass::process_mass_intensity_net,
    },
    MassMetric {
        metric: Metric {
            key: "e-factor",
            title: "E-factor, stated waste",
            formula: "E = m_waste/m_P",
            boundary: "Waste as stated, emissions to air included; water, product and by-product put to use are outside.",
            source: SHELDON,
        },
        value: mass::e_factor,
    },
    MassMetric {
        metric: Metric {
            key: "e-factor-by-balance",
            title: "E-factor by balance",
            formula: "E = (m_RM + m_RG + m_S − m_S,reused − m_P − m_BP)/m_P",
            boundary: "All inputs but water, solvent net of what was really reused, less product and by-product put to use; no recovery is assumed.",
            source: SHELDON,
        },
        value: mass::e_factor_by_balance,
    },
    MassMetric {
        metric: Metric {
            key: "simple-e-factor",
            title: "Simple E-factor",
            formula: "sEF = (m_RM + m_RG − m_P)/m_P",
            boundary: "Raw materials and reagents; solvents and water are outside.",
            source: ROSCHANGAR,
        },
        value: mass::simple_e_factor,
    },
    MassMetric {
        metric: Metric {
            key: "complete-e-factor",
            title: "Complete E-factor",
            formula: "cEF = (m_RM + m_RG + m_S + m_W − m_P)/m_P",
            boundary: "All inputs, every solvent charge and process water included; no credit for recovery; equals PMI − 1.",
            source: ROSCHANGAR,
        },
        value: mass::complete_e_factor,
    },
    MassMetric {
        metric: Metric {
            key: "mass-intensity",
            title: "Mass intensity",
            formula: "MI = (m_RM + m_RG + m_S)/m_P",
            boundary: "All inputs but water, every solvent charge included.",
            source: CONSTABLE,
        },
        value: mass::mass_intensity,
    },
    MassMetric {
        metric: Metric {
            key: "mass-productivity",
            title: "Mass productivity",
            formula: "MP = m_P/(m_RM + m_RG + m_S)",
            boundary: "As mass intensity: all inputs but water, every solvent charge included.",
            source: CONSTABLE,
        },
        value: mass::mass_productivity,
    },
    MassMetric {
        metric: Metric {
            key: "reaction-mass-efficiency",
            title: "Reaction mass efficiency",
            formula: "RME = m_P/m_RM",
            boundary: "Reactants as charged; reagents, solvents and water are outside.",
            source: CONSTABLE,
        },
        value: mass::reaction_mass_efficiency,
    },
    MassMetric {
        metric: Metric {
            key: "reaction-mass-efficiency-with-reagents",
            title: "Reaction mass efficiency, reagents counted",
            formula: "RME = m_P/(m_RM + m_RG)",
            boundary: "Reactants and reagents as charged; solvents and water are outside.",
            source: CONSTABLE,
        },
        value: mass::reaction_mass_efficiency_with_reagents,
    },
    MassMetric {
        metric: Metric {
            key: "reaction-mass-efficiency-generalised",
            title: "Reaction mass efficiency, generalised",
            formula: "gRME = m_P/(m_RM + m_RG + m_S + m_W)",
            boundary: "All inputs, every solvent charge and process water included; the inverse of PMI.",
            source: ANDRAOS,
        },
        value: mass::reaction_mass_efficiency_generalised,
    },
    MassMetric {
        metric: Metric {
            key: "effective-mass-yield",
            title: "Effective mass yield",
            formula: "EMY = m_P/(Σ m_in − m_benign)",
            boundary: "All inputs but those that the plan declares benign; the list is the plan's own and is printed beside the figure; can pass 100 %.",
            source: HUDLICKY,
        },
        value: mass::effective_mass_yield,
    },
    MassMetric {
        metric: Metric {
            key: "solvent-intensity",
            title: "Solvent intensity, gross",
            formula: "SI = m_S/m_P",
            boundary: "Every solvent charge, reused solvent included; water and everything else are outside.",
            source: CONSTABLE,
        },
        value: mass::solvent_intensity,
    },
    MassMetric {
        metric: Metric {
            key: "solvent-intensity-net",
            title: "Solvent intensity, net of reused solvent",
            formula: "SI_net = (m_S − m_S,reused)/m_P",
            boundary: "Solvent charged less what was really charged again; water and everything else are outside.",
            source: MASS_BALANCE,
        },
        value: mass::solvent_intensity_net,
    },
    MassMetric {
        metric: Metric {
            key: "water-intensity",
            title: "Water intensity",
            formula: "WI = m_W/m_P",
            boundary: "Process water; cooling water and the moisture of the feed are outside.",
            source: CONSTABLE,
        },
        value: mass::water_intensity,
    },
];
