//! The four NEMI rules. Source: Keith, Gron, Young, Chem. Rev. 2007, 107, 2695, seen in a secondary source, with the
//! boundaries stated there: pH not 2 or below, not 12 or above; waste below 50 g, exactly 50 g fails.
use thimbleworth::hazard::nemi::{Acidity, Answer, Inputs, profile};

const CLEAN: Inputs<'static> = Inputs {
    pbt: Some(&[]),
    rcra: Some(&[]),
    acidity: Acidity::Range { lowest: 5.0, highest: 8.0 },
    waste_kg_per_sample: Some(0.012),
};

fn met(inputs: &Inputs<'_>) -> [Answer; 4] {
    profile(inputs).map(|c| c.met)
}

#[test]
fn a_clean_method_passes_all_four() {
    assert_eq!(met(&CLEAN), [Answer::Yes; 4]);
}

#[test]
fn each_rule_fails_alone() {
    use Answer::{No, Yes};
    let range = |lowest, highest| Acidity::Range { lowest, highest };
    assert_eq!(met(&Inputs { pbt: Some(&["mercury"]), ..CLEAN }), [No, Yes, Yes, Yes]);
    assert_eq!(met(&Inputs { rcra: Some(&["acetone (F003)"]), ..CLEAN }), [Yes, No, Yes, Yes]);
    for acidity in [range(2.0, 7.0), range(1.8, 7.0), range(7.0, 12.0), range(7.0, 13.5)] {
        assert_eq!(met(&Inputs { acidity, ..CLEAN }), [Yes, Yes, No, Yes], "{acidity:?}");
    }
    for waste in [0.050, 0.300] {
        assert_eq!(met(&Inputs { waste_kg_per_sample: Some(waste), ..CLEAN }), [Yes, Yes, Yes, No]);
    }
    assert_eq!(met(&Inputs { waste_kg_per_sample: Some(0.0499), ..CLEAN }), [Yes; 4]);
}

#[test]
fn the_reason_names_what_was_found() {
    let found = profile(&Inputs { rcra: Some(&["dichloromethane (F002)"]), ..CLEAN });
    assert_eq!(found[1].why, "on the RCRA lists: dichloromethane (F002)");
    assert_eq!(found[3].why, "12.0 g, below 50 g");
}
