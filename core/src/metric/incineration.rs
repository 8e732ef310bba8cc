//! CO2 and HCl of a solvent burnt completely, by its formula.
//!
//! The same factor serves the CO2 that a solvent vapour becomes in the air; count a carbon once. Complete combustion:
//! all carbon to CO2, all chlorine to HCl (which needs hydrogen, from the fuel where the solvent has none). Support
//! fuel, scrubbing and recovered heat are not in it.
use crate::source::{Source, Standing};
use std::fmt;

/// Stoichiometry.
pub const SOURCE: Source = Source::new("stoichiometry of complete combustion", Standing::Definition);

/// Molar mass of CO2, kg/mol, from conventional atomic weights.
pub const CO2_KG_PER_MOL: f64 = 0.044_009;

/// Molar mass of HCl, kg/mol, from conventional atomic weights.
pub const HCL_KG_PER_MOL: f64 = 0.036_458;

/// A molar mass that is not a finite number above 0, or too small for the atoms stated.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct NotAMolarMass {
    /// The value, kg/mol.
    pub molar_mass_kg_per_mol: f64,
    /// The least that the stated atoms weigh, kg/mol.
    pub least_kg_per_mol: f64,
}

impl fmt::Display for NotAMolarMass {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        let Self { molar_mass_kg_per_mol, least_kg_per_mol } = self;
        write!(
            f,
            "the molar mass is {molar_mass_kg_per_mol} kg/mol; the stated atoms alone weigh {least_kg_per_mol} kg/mol, and a figure in g/mol must be divided by 1000"
        )
    }
}

impl std::error::Error for NotAMolarMass {}

/// CO2 from burning a kilogram, kg/kg: M_CO2 n_C/M.
///
/// `carbon_atoms` is the number of carbon atoms in a molecule, `molar_mass_kg_per_mol` the molar mass in kg/mol.
///
/// # Errors
/// [`NotAMolarMass`].
///
/// ```
/// use thimbleworth::metric::incineration::co2_kg_per_kg;
/// // n-hexane, C6H14: 3.064 kg/kg
/// assert!((co2_kg_per_kg(6, 0.0861754).unwrap() - 3.0641).abs() < 5e-4);
/// assert!(co2_kg_per_kg(6, 0.001).is_err());
/// ```
pub fn co2_kg_per_kg(carbon_atoms: u32, molar_mass_kg_per_mol: f64) -> Result<f64, NotAMolarMass> {
    const CARBON_KG_PER_MOL: f64 = 0.012;
    per_kg(CO2_KG_PER_MOL, carbon_atoms, CARBON_KG_PER_MOL, molar_mass_kg_per_mol)
}

/// HCl from burning a kilogram, kg/kg: M_HCl n_Cl/M.
///
/// `chlorine_atoms` is the number of chlorine atoms in a molecule, `molar_mass_kg_per_mol` the molar mass in kg/mol.
///
/// # Errors
/// [`NotAMolarMass`].
///
/// ```
/// use thimbleworth::metric::incineration::hcl_kg_per_kg;
/// // dichloromethane: 0.8586 kg/kg
/// assert!((hcl_kg_per_kg(2, 0.0849326).unwrap() - 0.8586).abs() < 5e-4);
/// ```
pub fn hcl_kg_per_kg(chlorine_atoms: u32, molar_mass_kg_per_mol: f64) -> Result<f64, NotAMolarMass> {
    const CHLORINE_KG_PER_MOL: f64 = 0.035;
    per_kg(HCL_KG_PER_MOL, chlorine_atoms, CHLORINE_KG_PER_MOL, molar_mass_kg_per_mol)
}

fn per_kg(gas: f64, atoms: u32, atom: f64, molar_mass_kg_per_mol: f64) -> Result<f64, NotAMolarMass> {
    let least_kg_per_mol = f64::from(atoms) * atom;
    let possible = molar_mass_kg_per_mol.is_finite()
        && molar_mass_kg_per_mol > 0.0
        && molar_mass_kg_per_mol >= least_kg_per_mol;
    if !possible {
        return Err(NotAMolarMass { molar_mass_kg_per_mol, least_kg_per_mol });
    }
    // m_gas/m = M_gas n/M
    Ok(gas * f64::from(atoms) / molar_mass_kg_per_mol)
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn water_gives_no_co2() {
        assert_eq!(co2_kg_per_kg(0, 0.018).map(f64::to_bits), Ok(0.0_f64.to_bits()));
    }

    #[test]
    fn refuses_what_is_no_molar_mass() {
        for wrong in [0.0, -1.0, f64::NAN, f64::INFINITY, 0.011] {
            assert!(co2_kg_per_kg(1, wrong).is_err(), "{wrong}");
        }
    }
}
