//! Uncertainty: draws keyed by an input's identity.
