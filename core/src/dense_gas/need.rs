//! Carbon dioxide that a target recovery takes at a pressure and temperature.
use super::DenseGasError;
use super::chrastil::{Chrastil, Reach};
use super::error::{positive, recovery, within};
use super::sovova::Sovova;
use super::vegetable_oil;
use crate::co2::density_kg_m3;

/// Where the solubility comes from.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Solubility {
    /// Chrastil's equation with constants of the user. Where they have a range, a state outside it is refused.
    Chrastil(Chrastil),
    /// A vegetable oil by del Valle and Aguilera, refused outside their range.
    VegetableOil,
}

impl Solubility {
    /// Solute in a kilogram of saturated carbon dioxide, kg/kg: y = S/ρ, at a temperature, K, and an absolute pressure, Pa.
    ///
    /// # Errors
    /// [`DenseGasError::OutOfRange`], [`DenseGasError::State`].
    ///
    /// ```
    /// use thimbleworth::dense_gas::need::Solubility;
    /// // 40 °C, 300 bar: 6.74 g/L in 910 g/L, so at the least 135 kg of carbon dioxide for a kilogram of oil
    /// let loading = Solubility::VegetableOil.loading_kg_kg(313.15, 30e6).unwrap();
    /// assert!((1.0 / loading - 135.0).abs() < 0.5);
    /// ```
    pub fn loading_kg_kg(&self, temperature_k: f64, pressure_pa: f64) -> Result<f64, DenseGasError> {
        let density = density_kg_m3(temperature_k, pressure_pa)?;
        let solubility = match self {
            Self::Chrastil(constants) => {
                let (solubility, reach) = constants.solubility_kg_m3(density, temperature_k)?;
                let allowed = "a density and temperature inside those of the fitted points";
                within("density of the carbon dioxide, kg/m³", density, reach != Reach::Outside, allowed)?;
                solubility
            }
            Self::VegetableOil => vegetable_oil::solubility_kg_m3(temperature_k, pressure_pa)?,
        };
        // y = S/ρ
        Ok(solubility / density)
    }
}

/// How the extract comes out.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Curve {
    /// Saturated to the end: the least that solubility allows. No bed does it.
    Saturated,
    /// Sovová's broken and intact cells.
    BrokenAndIntact {
        /// Share of the solute in intact cells at the start, 0 to below 1.
        intact_share: f64,
        /// Z of the fast period.
        fast: f64,
        /// W of the slow period.
        slow: f64,
    },
}

/// What is to be extracted.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Target {
    /// Solute, kg per kg of solid free of it.
    pub solute_kg_kg: f64,
    /// Recovery wanted, 0 to below 1.
    pub recovery: f64,
    /// How it comes out.
    pub curve: Curve,
}

impl Target {
    /// Carbon dioxide for the target, kg per kg of solid free of solute, at a solubility, kg/kg.
    ///
    /// Z and W of the curve are kept while the solubility changes with the state; in truth the film and the walls change
    /// with density and viscosity too. Trust it near the state at which they were fitted.
    ///
    /// # Errors
    /// [`DenseGasError::OutOfRange`].
    ///
    /// ```
    /// use thimbleworth::dense_gas::need::{Curve, Target};
    /// let least = Target { solute_kg_kg: 0.12, recovery: 0.9, curve: Curve::Saturated };
    /// assert!((least.solvent_kg_kg(0.007).unwrap() - 0.9 * 0.12 / 0.007).abs() < 1e-12);
    /// let curve = Curve::BrokenAndIntact { intact_share: 1.0 / 3.0, fast: 2.0, slow: 0.2 };
    /// assert!(Target { curve, ..least }.solvent_kg_kg(0.007).unwrap() > 20.0);
    /// ```
    pub fn solvent_kg_kg(&self, loading_kg_kg: f64) -> Result<f64, DenseGasError> {
        let solute = positive("solute, kg/kg", self.solute_kg_kg)?;
        let loading = positive("solubility, kg/kg", loading_kg_kg)?;
        let wanted = recovery(self.recovery)?;
        match self.curve {
            // q = R x₀/y
            Curve::Saturated => Ok(wanted * solute / loading),
            Curve::BrokenAndIntact { intact_share, fast, slow } => Sovova {
                start_kg_kg: solute,
                intact_kg_kg: intact_share * solute,
                loading_kg_kg: loading,
                fast,
                slow,
            }
            .solvent_for_kg_kg(wanted),
        }
    }
}
