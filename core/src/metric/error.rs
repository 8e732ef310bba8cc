//! Why a metric cannot be formed.
use std::fmt;

/// Why a metric cannot be formed, with the values found.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum MetricError {
    /// There is no product to divide by.
    NoProduct {
        /// The product as given, kg or mol.
        product: f64,
    },
    /// There are no results to divide by.
    NoResults {
        /// The number as given.
        results: f64,
    },
    /// An amount is negative or not a number.
    NotAnAmount {
        /// Which.
        of: &'static str,
        /// The value, in the unit of the input.
        value: f64,
    },
    /// More solvent is reused than was charged.
    ReusedExceedsCharged {
        /// Reused, kg.
        reused_kg: f64,
        /// Charged, kg.
        charged_kg: f64,
    },
    /// The product weighs more than what went in under the metric's boundary.
    ProductExceedsInputs {
        /// Product and by-product, kg.
        product_kg: f64,
        /// What went in, kg.
        inputs_kg: f64,
    },
    /// Nothing stands below the line of the fraction.
    NothingToDivideBy {
        /// What is zero.
        of: &'static str,
    },
    /// The waste was not stated.
    WasteNotStated,
}

impl fmt::Display for MetricError {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            Self::NoProduct { product } => write!(
                f,
                "the product is {product}; a metric per product needs a product above 0; for analysis take the metrics per result"
            ),
            Self::NoResults { results } => {
                write!(f, "the number of results is {results}; a number above 0 is needed")
            }
            Self::NotAnAmount { of, value } => {
                write!(f, "the {of} is {value}; a finite amount of 0 or more is needed")
            }
            Self::ReusedExceedsCharged { reused_kg, charged_kg } => write!(
                f,
                "{reused_kg} kg of solvent are reused but only {charged_kg} kg were charged; the charge is gross, reused solvent included"
            ),
            Self::ProductExceedsInputs { product_kg, inputs_kg } => write!(
                f,
                "the product of {product_kg} kg is more than the {inputs_kg} kg of inputs counted; an input is missing, or the product holds solvent or water that this boundary leaves out"
            ),
            Self::NothingToDivideBy { of } => write!(f, "the {of} is 0, and the metric divides by it"),
            Self::WasteNotStated => {
                write!(f, "the waste was not stated; state it, or take the E-factor by balance")
            }
        }
    }
}

impl std::error::Error for MetricError {}
