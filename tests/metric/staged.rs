//! Staged extraction by Nernst's law.
use thimbleworth::metric::staged::{least_solvent_m3, share_left, solvent_for_recovery_m3};

/// Acetone that comes with each fresh portion of dichloromethane and acetone (80:20 by volume, 75 mL) and goes into 1 L
/// of water: 11.854 g a portion, D 0.7 (from memory), nominal phase ratio 0.075. Recomputed apart stage by stage:
/// 11.263, 21.964, 32.131 g in the water.
#[test]
fn acetone_that_comes_with_each_portion() {
    let mut in_water_g = 0.0;
    for wanted in [11.263, 21.964, 32.131] {
        in_water_g = (in_water_g + 11.854) * share_left(0.7, 75e-6, 1e-3, 1).unwrap();
        assert!((in_water_g - wanted).abs() < 1e-3, "{in_water_g}");
    }
}

/// Worked by hand: (1 + 5 × 0.1)⁻³ = 8/27; one portion of the same total leaves (1 + 5 × 0.3)⁻¹ = 2/5.
#[test]
fn three_portions_beat_one() {
    assert!((share_left(5.0, 100e-6, 1e-3, 3).unwrap() - 8.0 / 27.0).abs() < 1e-15);
    assert!((share_left(5.0, 300e-6, 1e-3, 1).unwrap() - 0.4).abs() < 1e-15);
}

/// Worked by hand for R = 0.75, D = 2, V_w = 1 L: one portion 1.5 L, two portions 2 × 0.5 × (2 − 1) = 1 L, limit
/// 0.5 ln 4 = 0.693147 L.
#[test]
fn solvent_for_three_quarters() {
    let total = |n| solvent_for_recovery_m3(0.75, 2.0, 1e-3, n).unwrap();
    assert!((total(1) - 1.5e-3).abs() < 1e-15);
    assert!((total(2) - 1.0e-3).abs() < 1e-15);
    assert!((least_solvent_m3(0.75, 2.0, 1e-3).unwrap() - 0.693147e-3).abs() < 1e-9);
}
