//! Carbon dioxide: equation of state, phase, transport properties.
