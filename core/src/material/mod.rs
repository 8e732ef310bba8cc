//! The catalogue of materials: properties, hazards, and where each figure comes from.
