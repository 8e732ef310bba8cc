//! Hexane and acetone 1:1 by volume, the commonest Soxhlet solvent: what ideal mixtures get wrong.
use super::{mixed, mole_fraction};
use thimbleworth::mixture::Hold;

/// 150 mL of each at 20 °C, in mol.
fn charge(m: &thimbleworth::mixture::Mixture<'_>) -> [f64; 2] {
    [0, 1].map(|i| 150e-6 / m.components()[i].molar_volume_m3_mol())
}

// Witness: hand calculation from the azeotrope alone (49.8 °C, 59 % acetone by mass, from memory) with van Laar's equation and
// activity coefficients carried unchanged to 20 °C: 1.31 and 1.72, 30.7 kPa against 21.6 ideal.
#[test]
fn van_laar_by_hand_and_the_core_agree() {
    mixed(&["n-hexane", "acetone"], |m| {
        let t = 49.8 + 273.15;
        let az = mole_fraction("n-hexane", "acetone", 0.41);
        let p = |i: usize, t| m.components()[i].vapour_pressure_pa(t).unwrap();
        let (l1, l2) = ((101_325.0 / p(0, t)).ln(), (101_325.0 / p(1, t)).ln());
        let a = l1 * (1.0 + (1.0 - az) * l2 / (az * l1)).powi(2);
        let b = l2 * (1.0 + az * l1 / ((1.0 - az) * l2)).powi(2);
        let n = charge(m);
        let x = n[0] / (n[0] + n[1]);
        let hand = [
            (a / (1.0 + a * x / (b * (1.0 - x))).powi(2)).exp(),
            (b / (1.0 + b * (1.0 - x) / (a * x)).powi(2)).exp(),
        ];
        assert!((hand[0] - 1.72).abs() < 0.005 && (hand[1] - 1.31).abs() < 0.005, "{hand:?}");
        let pressure = |g: &[f64]| x * g[0] * p(0, 293.15) + (1.0 - x) * g[1] * p(1, 293.15);
        assert!((pressure(&hand) / 30_700.0 - 1.0).abs() < 0.005);
        let ideal = m.ideal_bubble_pressure_pa(&n, 293.15).unwrap();
        assert!((ideal / 21_600.0 - 1.0).abs() < 0.002, "{ideal}");
        // At the azeotrope's own temperature Wilson's equation agrees within one per cent ...
        let there = m.activity_coefficients(&n, t).unwrap();
        assert!(
            (there[0] / hand[0] - 1.0).abs() < 0.01 && (there[1] / hand[1] - 1.0).abs() < 0.01,
            "{there:?}"
        );
        assert!((pressure(&there) / 30_700.0 - 1.0).abs() < 0.005, "{}", pressure(&there));
        // ... and at 20 °C it lies 2 to 3 % higher, because mixing takes up heat (1.2 to 1.6 kJ/mol, from memory) and the deviation grows in the cold,
        // which van Laar's constants leave out. Modified UNIFAC (Dortmund, thermo 0.6.1) gives 32.2 kPa.
        let cold = m.bubble_pressure_pa(&n, 293.15).unwrap();
        assert!(cold / 30_700.0 > 1.01 && cold / 30_700.0 < 1.03 && cold < 32_240.0, "{cold}");
        // The finding: ideal is about 30 % low.
        assert!((1.0 - ideal / cold - 0.30).abs() < 0.02, "{}", 1.0 - ideal / cold);
    });
}

// Witness: the same hand calculation's distillation: 300 mL taken to 5 mL ends as more than 99 mol % hexane with van Laar's equation, at one atmosphere as at
// 20 °C. Wilson's equation from the same azeotrope ends between 98.5 and 99.1 %: the mixture starts only 4 mol % from the azeotrope, so the end hangs on
// its composition more than on the equation. Raoult's law ends at 78 %.
#[test]
fn taken_to_5_ml_it_is_hexane() {
    mixed(&["n-hexane", "acetone"], |m| {
        for (hold, least) in [
            (Hold::Pressure(101_325.0), 0.984),
            (Hold::Temperature(293.15), 0.99),
            (Hold::Temperature(313.15), 0.988),
        ] {
            let end = m.distil_batch(&charge(m), 5e-6, hold).unwrap();
            let share = end.left_mol[0] / (end.left_mol[0] + end.left_mol[1]);
            assert!(share > least && share < 0.995, "{hold:?}: {share}");
            assert!((end.last.volume_m3 / 5e-6 - 1.0).abs() < 5e-4, "{hold:?}");
        }
        let (van_laar, ideal) = (by_hand(m, true), by_hand(m, false));
        assert!(van_laar > 0.99 && van_laar < 0.995, "{van_laar}");
        assert!((ideal - 0.784).abs() < 0.002, "{ideal}");
        // The real vapour holds more hexane than the ideal one, though less than the liquid does.
        let n = charge(m);
        let y = m.vapour_composition(&n, 293.15).unwrap();
        let ideal = n[0] * m.components()[0].vapour_pressure_pa(293.15).unwrap()
            / (m.ideal_bubble_pressure_pa(&n, 293.15).unwrap() * (n[0] + n[1]));
        assert!((ideal - 0.27).abs() < 0.01 && y[0] > 0.33, "{} {ideal}", y[0]);
    });
}

/// Mole fraction of hexane at 5 mL, at 20 °C, by ten thousand small steps with van Laar's equation or Raoult's law.
fn by_hand(m: &thimbleworth::mixture::Mixture<'_>, real: bool) -> f64 {
    let t = 49.8 + 273.15;
    let az = mole_fraction("n-hexane", "acetone", 0.41);
    let p = |i: usize, t| m.components()[i].vapour_pressure_pa(t).unwrap();
    let (l1, l2) = ((101_325.0 / p(0, t)).ln(), (101_325.0 / p(1, t)).ln());
    let a = l1 * (1.0 + (1.0 - az) * l2 / (az * l1)).powi(2);
    let b = l2 * (1.0 + az * l1 / ((1.0 - az) * l2)).powi(2);
    let v = [0, 1].map(|i| m.components()[i].molar_volume_m3_mol());
    let pure = [p(0, 293.15), p(1, 293.15)];
    let mut n = charge(m);
    let steps = 10_000;
    let fall = (60.0_f64).ln() / f64::from(steps);
    for _ in 0..steps {
        let x = n[0] / (n[0] + n[1]);
        let gamma = [
            (a / (1.0 + a * x / (b * (1.0 - x))).powi(2)).exp(),
            (b / (1.0 + b * (1.0 - x) / (a * x)).powi(2)).exp(),
        ];
        let k = [0, 1].map(|i| if real { gamma[i] * pure[i] } else { pure[i] });
        let (volume, leaving) = (n[0] * v[0] + n[1] * v[1], n[0] * v[0] * k[0] + n[1] * v[1] * k[1]);
        n = [0, 1].map(|i| n[i] * (-fall * k[i] * volume / leaving).exp());
    }
    n[0] / (n[0] + n[1])
}
