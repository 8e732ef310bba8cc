//! Published coefficients, generated from tables of figures, not typed.
//!
//! Equation of state: R. Span, W. Wagner, *A New Equation of State for Carbon Dioxide Covering the Fluid Region from
//! the Triple-Point Temperature to 1100 K at Pressures up to 800 MPa*, J. Phys. Chem. Ref. Data 25 (1996) 1509;
//! the coefficients as carried, rounded to 12 digits, by an open reference library (CoolProp 8.0.0),
//! and in agreement with a public 14-digit listing of the paper's Table 31.
//! Viscosity: A. Laesecke, C. D. Muzny, *Reference Correlation for the Viscosity of Carbon Dioxide*, J. Phys. Chem.
//! Ref. Data 46 (2017) 013107. What shows that the digits are right stands in `tests/co2`.

/// Critical temperature, K.
pub const CRITICAL_TEMPERATURE_K: f64 = 304.1282;
/// Critical pressure as published, Pa (the equation itself gives 7 377 298 Pa at the critical density).
pub const CRITICAL_PRESSURE_PA: f64 = 7377300.0;
/// Critical density, kg/m³: the reducing density of the equation.
pub const CRITICAL_DENSITY_KG_M3: f64 = MOLAR_MASS_KG_MOL * REDUCING_DENSITY_MOL_M3;
/// Triple-point temperature, K.
pub const TRIPLE_TEMPERATURE_K: f64 = 216.592;
/// Triple-point pressure as published, Pa (the equation itself gives 517 964 Pa).
pub const TRIPLE_PRESSURE_PA: f64 = 517950.0;
/// Molar mass used by the equation, kg/mol.
pub const MOLAR_MASS_KG_MOL: f64 = 0.0440098;
/// Gas constant used by the equation, J/(mol K): the value of 1986, to which the coefficients were fitted.
pub const GAS_CONSTANT_J_MOL_K: f64 = 8.31451;
/// Molar density by which densities are reduced, mol/m³.
pub(super) const REDUCING_DENSITY_MOL_M3: f64 = 10624.9063;

/// Ideal gas: constant and linear part (enthalpy and entropy 0 for the ideal gas at 298.15 K and 101 325 Pa).
pub(super) const IDEAL_LEAD: [f64; 2] = [8.37304456, -3.70454304];
/// Ideal gas: factor of ln τ.
pub(super) const IDEAL_LOG: f64 = 2.5;
/// Ideal gas: the vibrations, as (factor, θ) of aᵢ ln(1 − exp(−θᵢ τ)).
pub(super) const IDEAL_VIBRATIONS: [(f64, f64); 5] = [
    (1.99427042, 3.15163),
    (0.62105248, 6.1119),
    (0.41195293, 6.77708),
    (1.04028922, 11.32384),
    (0.08327678, 27.08792),
];

/// A polynomial or exponential term: n δᵈ τᵗ exp(−δˡ), without the exponential where l = 0.
pub(super) struct PowerTerm {
    /// n
    pub(super) factor: f64,
    /// d
    pub(super) delta: usize,
    /// t in whole units: t = tau + tau_quarters / 4.
    pub(super) tau: usize,
    /// The quarters of t: 0, 2 or 3.
    pub(super) tau_quarters: usize,
    /// l
    pub(super) order: usize,
}
const fn power(factor: f64, delta: usize, tau: usize, tau_quarters: usize, order: usize) -> PowerTerm {
    PowerTerm { factor, delta, tau, tau_quarters, order }
}
/// The 34 polynomial and exponential terms.
pub(super) const POWER_TERMS: [PowerTerm; 34] = [
    power(0.388568232032, 1, 0, 0, 0),
    power(2.93854759427, 1, 0, 3, 0),
    power(-5.5867188535, 1, 1, 0, 0),
    power(-0.767531995925, 1, 2, 0, 0),
    power(0.317290055804, 2, 0, 3, 0),
    power(0.548033158978, 2, 2, 0, 0),
    power(0.122794112203, 3, 0, 3, 0),
    power(2.16589615432, 1, 1, 2, 1),
    power(1.58417351097, 2, 1, 2, 1),
    power(-0.231327054055, 4, 2, 2, 1),
    power(0.0581169164314, 5, 0, 0, 1),
    power(-0.553691372054, 5, 1, 2, 1),
    power(0.489466159094, 5, 2, 0, 1),
    power(-0.0242757398435, 6, 0, 0, 1),
    power(0.0624947905017, 6, 1, 0, 1),
    power(-0.121758602252, 6, 2, 0, 1),
    power(-0.370556852701, 1, 3, 0, 2),
    power(-0.0167758797004, 1, 6, 0, 2),
    power(-0.11960736638, 4, 3, 0, 2),
    power(-0.0456193625088, 4, 6, 0, 2),
    power(0.0356127892703, 4, 8, 0, 2),
    power(-0.00744277271321, 7, 6, 0, 2),
    power(-0.00173957049024, 8, 0, 0, 2),
    power(-0.0218101212895, 2, 7, 0, 3),
    power(0.0243321665592, 3, 12, 0, 3),
    power(-0.0374401334235, 3, 16, 0, 3),
    power(0.143387157569, 5, 22, 0, 4),
    power(-0.134919690833, 5, 24, 0, 4),
    power(-0.0231512250535, 6, 16, 0, 4),
    power(0.0123631254929, 7, 24, 0, 4),
    power(0.00210583219729, 8, 8, 0, 4),
    power(-0.000339585190264, 10, 2, 0, 4),
    power(0.00559936517716, 4, 28, 0, 5),
    power(-0.000303351180556, 8, 14, 0, 6),
];

/// A Gaussian term: n δᵈ τᵗ exp(−η (δ − 1)² − β (τ − γ)²).
pub(super) struct GaussianTerm {
    /// n
    pub(super) factor: f64,
    /// d
    pub(super) delta: usize,
    /// t
    pub(super) tau: usize,
    /// η
    pub(super) eta: f64,
    /// β
    pub(super) beta: f64,
    /// γ
    pub(super) gamma: f64,
}
const fn gaussian(factor: f64, delta: usize, tau: usize, eta: f64, beta: f64, gamma: f64) -> GaussianTerm {
    GaussianTerm { factor, delta, tau, eta, beta, gamma }
}
/// The five Gaussian terms.
pub(super) const GAUSSIAN_TERMS: [GaussianTerm; 5] = [
    gaussian(-213.654886883, 2, 1, 25.0, 325.0, 1.16),
    gaussian(26641.5691493, 2, 0, 25.0, 300.0, 1.19),
    gaussian(-24027.2122046, 2, 1, 25.0, 300.0, 1.19),
    gaussian(-283.41603424, 3, 3, 15.0, 275.0, 1.25),
    gaussian(212.472844002, 3, 3, 20.0, 275.0, 1.22),
];

/// A term of the critical region: n Δᵇ δ exp(−C (δ − 1)² − D (τ − 1)²), Δ = θ² + B |δ − 1|²ᵃ,
/// θ = (1 − τ) + A |δ − 1|^(1/β). A = 0.7, β = 0.3 and D = 275 are common to the three.
pub(super) struct CriticalTerm {
    /// n
    pub(super) factor: f64,
    /// b
    pub(super) exponent: f64,
    /// C
    pub(super) width: f64,
}
/// A, in θ.
pub(super) const CRITICAL_A: f64 = 0.7;
/// D, in the common exponential.
pub(super) const CRITICAL_D: f64 = 275.0;
/// B of the first two terms, whose 2a is 7.
pub(super) const CRITICAL_B_SEVENTH: f64 = 0.3;
/// B of the third term, whose 2a is 6.
pub(super) const CRITICAL_B_SIXTH: f64 = 1.0;
/// The three terms of the critical region.
pub(super) const CRITICAL_TERMS: [CriticalTerm; 3] = [
    CriticalTerm { factor: -0.666422765408, exponent: 0.875, width: 10.0 },
    CriticalTerm { factor: 0.726086323499, exponent: 0.925, width: 10.0 },
    CriticalTerm { factor: 0.0550686686128, exponent: 0.875, width: 12.5 },
];

/// Melting line: pₘ/pₜ = 1 + a₁ (T/Tₜ − 1) + a₂ (T/Tₜ − 1)².
pub(super) const MELTING: [f64; 2] = [1955.539, 2055.4593];

/// Viscosity at zero density, in the order of the formula.
pub(super) const DILUTE: [f64; 7] = [
    1749.35489318835,
    -369.069300007128,
    5423856.34887691,
    -2.21283852168356,
    -269503.247933569,
    73145.021531826,
    5.34368649509278,
];
/// Second viscosity virial coefficient: (b, t) of Σ b (T/ε)^(−t).
pub(super) const INITIAL_DENSITY: [(f64, f64); 9] = [
    (-19.572881, 0.0),
    (219.73999, 0.25),
    (-1015.3226, 0.5),
    (2471.0125, 0.75),
    (-3375.1717, 1.0),
    (2491.6597, 1.25),
    (-787.26086, 1.5),
    (14.085455, 2.5),
    (-0.34664158, 5.5),
];
/// ε/k of the initial-density term, K.
pub(super) const WELL_DEPTH_K: f64 = 200.760;
/// σ of the initial-density term, m.
pub(super) const LENGTH_M: f64 = 0.378421e-9;
/// γ of the residual term.
pub(super) const RESIDUAL_GAMMA: f64 = 8.06282737481277;
/// c₁ and c₂ of the residual term.
pub(super) const RESIDUAL: [f64; 2] = [0.360603235428487, 0.121550806591497];
/// Density that reduces the residual term, kg/m³.
pub(super) const VISCOSITY_DENSITY_KG_M3: f64 = 1178.53;
/// Molar mass in the viscosity correlation, kg/mol.
pub(super) const VISCOSITY_MOLAR_MASS_KG_MOL: f64 = 0.0440095;
/// Avogadro constant in the viscosity correlation, 1/mol.
pub(super) const AVOGADRO: f64 = 6.02214129e+23;
/// Gas constant in the viscosity correlation, J/(mol K).
pub(super) const VISCOSITY_GAS_CONSTANT: f64 = 8.3144598;
