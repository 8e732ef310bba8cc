//! Published hazard scores as pure functions of stated inputs.
