//! Atom economy and carbon efficiency: what a reaction's equation and its amounts of substance allow.
use super::MetricError;
use super::inputs::amount;

/// One species of a reaction equation.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Species {
    /// Stoichiometric number, above 0.
    pub number: f64,
    /// Molar mass, kg/mol.
    pub molar_mass_kg_per_mol: f64,
}

/// An amount of substance and its carbon.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Carbon {
    /// Amount of substance, mol.
    pub amount_mol: f64,
    /// Carbon atoms in a molecule.
    pub atoms: u32,
}

/// Atom economy: AE = ν_P M_P/Σ νᵢ Mᵢ over the reactants of the balanced equation, a fraction.
///
/// A base that ends in the salt is a reactant of the balanced equation and counts.
///
/// # Errors
/// [`MetricError::NoProduct`] for a product of no mass, [`MetricError::NotAnAmount`],
/// [`MetricError::NothingToDivideBy`].
///
/// ```
/// use thimbleworth::metric::reaction::{atom_economy, Species};
/// let one = |molar_mass_kg_per_mol| Species { number: 1.0, molar_mass_kg_per_mol };
/// // benzyl alcohol + p-toluenesulfonyl chloride + triethylamine → benzyl p-toluenesulfonate: 65.6 %
/// let economy = atom_economy(one(0.26232), &[one(0.10814), one(0.19065), one(0.10119)]).unwrap();
/// assert!((economy - 0.656).abs() < 0.0005);
/// ```
pub fn atom_economy(product: Species, reactants: &[Species]) -> Result<f64, MetricError> {
    let above = mass(product)?;
    if above <= 0.0 {
        return Err(MetricError::NoProduct { product: above });
    }
    let mut below = 0.0;
    for reactant in reactants {
        below += mass(*reactant)?;
    }
    if below <= 0.0 {
        return Err(MetricError::NothingToDivideBy { of: "mass of the equation's reactants" });
    }
    // AE = ν_P M_P/Σ νᵢ Mᵢ
    Ok(above / below)
}

/// Carbon efficiency: CE = n_P C_P/Σ nᵢ Cᵢ over the reactants as charged, a fraction.
///
/// Which reagents carry carbon that counts is a matter of boundary: the published examples count the reactants whose
/// carbon is meant for the product, and leave out bases and solvents.
///
/// # Errors
/// [`MetricError::NoProduct`] for a product without carbon, [`MetricError::NotAnAmount`],
/// [`MetricError::NothingToDivideBy`].
///
/// ```
/// use thimbleworth::metric::reaction::{carbon_efficiency, Carbon};
/// let of = |amount_mol, atoms| Carbon { amount_mol, atoms };
/// let efficiency = carbon_efficiency(of(0.09, 14), &[of(0.10, 7), of(0.115, 7)]).unwrap();
/// assert!((efficiency - 0.837).abs() < 0.0005);
/// ```
pub fn carbon_efficiency(product: Carbon, reactants: &[Carbon]) -> Result<f64, MetricError> {
    let above = carbon_mol(product)?;
    if above <= 0.0 {
        return Err(MetricError::NoProduct { product: above });
    }
    let mut below = 0.0;
    for reactant in reactants {
        below += carbon_mol(*reactant)?;
    }
    if below <= 0.0 {
        return Err(MetricError::NothingToDivideBy { of: "carbon of the reactants" });
    }
    // CE = n_P C_P/Σ nᵢ Cᵢ
    Ok(above / below)
}

fn mass(species: Species) -> Result<f64, MetricError> {
    let number = amount("stoichiometric number", species.number)?;
    Ok(number * amount("molar mass", species.molar_mass_kg_per_mol)?)
}

fn carbon_mol(carbon: Carbon) -> Result<f64, MetricError> {
    Ok(amount("amount of substance", carbon.amount_mol)? * f64::from(carbon.atoms))
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn refuses_empty_equations() {
        let product = Species { number: 1.0, molar_mass_kg_per_mol: 0.1 };
        assert!(matches!(atom_economy(product, &[]), Err(MetricError::NothingToDivideBy { .. })));
        let carbon = Carbon { amount_mol: 1.0, atoms: 0 };
        assert_eq!(carbon_efficiency(carbon, &[]), Err(MetricError::NoProduct { product: 0.0 }));
    }

    #[test]
    fn addition_keeps_every_atom() {
        let half = Species { number: 2.0, molar_mass_kg_per_mol: 0.05 };
        assert_eq!(atom_economy(Species { number: 1.0, molar_mass_kg_per_mol: 0.1 }, &[half]), Ok(1.0));
    }
}
