//! The accounts: one file each, from the closed book to named figures.
