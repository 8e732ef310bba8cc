//! What the evidence shares: tolerances, and reading of the tables beside each check.
