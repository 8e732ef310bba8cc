//! The masses that the mass metrics are formed from.
use super::MetricError;

/// Masses of one route over one basis (a batch, a campaign, a year), all kg.
///
/// Cooling water belongs nowhere here: it touches nothing and is in no published metric.
///
/// ```
/// use thimbleworth::metric::{mass, Inputs};
/// let batch = Inputs { raw_materials_kg: 26.0, product_kg: 1.0, ..Inputs::default() };
/// assert_eq!(mass::process_mass_intensity(&batch), Ok(26.0));
/// ```
#[derive(Clone, Copy, Debug, PartialEq, Default)]
pub struct Inputs {
    /// Feed and reactants, kg: what the product is made of or won from, its own moisture included.
    pub raw_materials_kg: f64,
    /// Reagents, kg: what is used up without ending in the product, such as bases, acids, catalysts, drying agents,
    /// sorbents.
    pub reagents_kg: f64,
    /// Solvents charged, kg, gross: every charge counted each time, reused solvent included. Of CO2 in a closed loop
    /// count the first fill's share and the make-up, not what circulates.
    pub solvents_charged_kg: f64,
    /// The part of that charge that came from recovery and was really charged again, kg; not what might be recovered.
    pub solvents_reused_kg: f64,
    /// Process water, kg: water that meets the product or the feed, as a solvent or a wash.
    pub water_kg: f64,
    /// Isolated product, kg; 0 where there is none.
    pub product_kg: f64,
    /// By-product sold or put to use, kg; the marc where it leaves as feed, compost or fuel, and the plan says so.
    pub by_product_kg: f64,
    /// Waste as weighed or counted, without water, kg; emissions to air included; `None` where it is not stated.
    pub waste_kg: Option<f64>,
    /// Inputs that the plan declares benign for the effective mass yield, kg; the list must be printed beside it.
    pub benign_kg: f64,
}

impl Inputs {
    /// Every input, solvent gross and water included, kg.
    pub(super) fn gross_kg(&self) -> f64 {
        self.raw_materials_kg + self.reagents_kg + self.solvents_charged_kg + self.water_kg
    }

    /// Solvent bought to make up, kg.
    pub(super) fn solvents_net_kg(&self) -> f64 {
        self.solvents_charged_kg - self.solvents_reused_kg
    }

    /// Every input, solvent net and water included, kg.
    pub(super) fn net_kg(&self) -> f64 {
        self.raw_materials_kg + self.reagents_kg + self.solvents_net_kg() + self.water_kg
    }

    /// Checks the masses, whatever the metric.
    pub(super) fn checked(&self) -> Result<&Self, MetricError> {
        let masses = [
            ("mass of raw materials", self.raw_materials_kg),
            ("mass of reagents", self.reagents_kg),
            ("mass of solvents charged", self.solvents_charged_kg),
            ("mass of solvents reused", self.solvents_reused_kg),
            ("mass of water", self.water_kg),
            ("mass of by-product", self.by_product_kg),
            ("mass of waste", self.waste_kg.unwrap_or(0.0)),
            ("mass of benign inputs", self.benign_kg),
        ];
        for (of, value) in masses {
            amount(of, value)?;
        }
        if self.solvents_reused_kg > self.solvents_charged_kg {
            return Err(MetricError::ReusedExceedsCharged {
                reused_kg: self.solvents_reused_kg,
                charged_kg: self.solvents_charged_kg,
            });
        }
        Ok(self)
    }

    /// Checks the masses and that there is a product.
    pub(super) fn with_product(&self) -> Result<&Self, MetricError> {
        if !(self.product_kg.is_finite() && self.product_kg > 0.0) {
            return Err(MetricError::NoProduct { product: self.product_kg });
        }
        self.checked()
    }
}

/// An amount that is finite and not negative.
pub(super) fn amount(of: &'static str, value: f64) -> Result<f64, MetricError> {
    if value.is_finite() && value >= 0.0 { Ok(value) } else { Err(MetricError::NotAnAmount { of, value }) }
}
