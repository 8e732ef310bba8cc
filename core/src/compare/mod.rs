//! Each route beside the present one.
