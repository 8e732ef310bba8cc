//! Out of range is an error with the values inside, never an extrapolation.
use super::{find, mixed};
use thimbleworth::mixture::{Hold, MixtureError, Pairs};

#[test]
fn liquids_that_do_not_mix_are_refused() {
    for pair in [
        ["dichloromethane", "water"],
        ["water", "n-hexane"],
        ["ethyl acetate", "water"],
        ["n-hexane", "methanol"],
        ["acetonitrile", "n-heptane"],
    ] {
        let error = Pairs::between(&find(&pair)).unwrap_err();
        assert!(matches!(error, MixtureError::TwoLiquids { .. }), "{pair:?}");
    }
    let text = Pairs::between(&find(&["dichloromethane", "acetone", "water"])).unwrap_err().to_string();
    assert_eq!(
        text,
        "dichloromethane and water form two liquids; separate them first and take each liquid by itself"
    );
    assert_eq!(Pairs::between(&[]).unwrap_err(), MixtureError::Count { found: 0 });
    let nine = ["n-hexane"; 9];
    assert_eq!(Pairs::between(&find(&nine)).unwrap_err(), MixtureError::Count { found: 9 });
}

#[test]
fn out_of_range_is_refused() {
    mixed(&["n-hexane", "acetone"], |m| {
        let error = m.activity_coefficients(&[1.0, 1.0], 400.0).unwrap_err();
        assert!(matches!(error, MixtureError::ActivityOutOfRange { .. }));
        assert!(m.partial_pressures_pa(&[1.0, 1.0], f64::NAN).is_err());
        for p in [1.0, 1e6] {
            let error = m.bubble_temperature_k(&[1.0, 1.0], p).unwrap_err();
            assert!(matches!(error, MixtureError::NoBubblePoint { .. }), "{p}: {error:?}");
        }
        for p in [0.0, -1.0, f64::NAN] {
            assert!(matches!(m.bubble_temperature_k(&[1.0, 1.0], p), Err(MixtureError::NotPositive { .. })));
        }
        assert_eq!(m.bubble_pressure_pa(&[0.0, 0.0], 300.0), Err(MixtureError::NothingThere));
        assert!(matches!(
            m.bubble_pressure_pa(&[1.0, -1.0], 300.0),
            Err(MixtureError::NotAnAmount { component: 1, .. })
        ));
        assert_eq!(
            m.bubble_pressure_pa(&[1.0], 300.0),
            Err(MixtureError::Mismatch { found: 1, components: 2 })
        );
        assert!(m.distil_batch(&[1.0, 1.0], f64::NAN, Hold::Temperature(300.0)).is_err());
        assert!(m.distil_batch(&[1.0, 1.0], 1e-6, Hold::Temperature(500.0)).is_err());
    });
}
