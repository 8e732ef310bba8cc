//! The law of propagation of uncertainty, to first order.

/// The combined standard uncertainty from what each input contributes, `cᵢ u(xᵢ)`, and the correlation coefficients of
/// those pairs that are correlated, each pair once.
///
/// ```text
/// u_c² = Σ (cᵢ uᵢ)² + 2 Σ r_ij cᵢ uᵢ c_j u_j
/// ```
///
/// A sum that contradictory coefficients make negative counts as 0. Source: JCGM 100:2008, equation (16).
///
/// ```
/// use thimbleworth::chance::combined_uncertainty;
/// assert_eq!(combined_uncertainty(&[3.0, 4.0], &[]), 5.0);
/// assert_eq!(combined_uncertainty(&[3.0, 4.0], &[(0, 1, -1.0)]), 1.0);
/// ```
#[must_use]
pub fn combined_uncertainty(contributions: &[f64], correlated: &[(usize, usize, f64)]) -> f64 {
    let mut variance = 0.0;
    for c in contributions {
        variance += c * c;
    }
    let at = |i: usize| contributions.get(i).copied().unwrap_or(0.0);
    for &(i, j, r) in correlated {
        variance += 2.0 * r * at(i) * at(j);
    }
    if variance > 0.0 { variance.sqrt() } else { 0.0 }
}

/// What an input contributes to a result: half the difference of the results with the input a standard uncertainty above
/// and below its central value.
///
/// Source: JCGM 100:2008, 5.1.3, note 2.
///
/// ```
/// assert_eq!(thimbleworth::chance::contribution(10.5, 9.5), 0.5);
/// ```
#[must_use]
pub const fn contribution(above: f64, below: f64) -> f64 {
    // cᵢ u(xᵢ) ≈ (f(xᵢ + uᵢ) − f(xᵢ − uᵢ)) / 2
    (above - below) / 2.0
}
