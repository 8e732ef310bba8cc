//! What the equations refuse, and in which words.
use super::vapour;
use thimbleworth::emission::{
    EmissionError, OpenSurface, Vessel, air_drying_kg, depressurise, fill, heat_up, open_surface_kg_s,
    purge_empty, self_cooling, sweep, vacuum_leak,
};
use thimbleworth::material::catalogue;

const ATM: f64 = 101_325.0;

#[test]
fn a_liquid_that_boils_is_refused() {
    let boiling = [vapour("acetone", 60_000.0), vapour("n-hexane", 41_325.0)];
    for result in [
        fill(1.0, 330.0, ATM, &boiling).map(|_| ()),
        purge_empty(1.0, 1.0, 330.0, ATM, &boiling).map(|_| ()),
        depressurise(1.0, 330.0, 2e5, ATM, &boiling).map(|_| ()),
        sweep(1.0, 1.0, 330.0, ATM, None, &boiling).map(|_| ()),
        vacuum_leak(1.0, 1.0, 330.0, ATM, &boiling).map(|_| ()),
    ] {
        assert_eq!(
            result,
            Err(EmissionError::Boils { vapour_pa: 101_325.0, pressure_pa: ATM, temperature_k: 330.0 })
        );
    }
    let acetone = catalogue().find("acetone").unwrap();
    let vessel = Vessel { headspace_m3: 1.0, pressure_pa: ATM, from_k: 293.15, to_k: 340.0 };
    let error = heat_up(vessel, &[0.058], |t| {
        let mut p = [0.0; 8];
        p[0] = acetone.vapour_pressure.value(t, &acetone.name, "vapour pressure")?;
        Ok(p)
    })
    .unwrap_err();
    assert!(error.to_string().starts_with("at 66.85 °C the vapour has "), "{error}");
}

#[test]
fn inputs_out_of_range_are_refused() {
    let v = [vapour("acetone", 20_000.0)];
    assert!(fill(-1.0, 293.15, ATM, &v).is_err());
    assert!(fill(1.0, 0.0, ATM, &v).is_err());
    assert!(fill(1.0, 293.15, f64::NAN, &v).is_err());
    assert_eq!(fill(1.0, 293.15, ATM, &[]), Err(EmissionError::Count { found: 0 }));
    assert_eq!(fill(1.0, 293.15, ATM, &[v[0]; 9]), Err(EmissionError::Count { found: 9 }));
    assert!(depressurise(1.0, 293.15, 50_000.0, ATM, &v).is_err());
    assert!(air_drying_kg(1.0, 0.1, 0.2).is_err());
    assert!(air_drying_kg(1.0, 1.0, 0.2).is_err());
    let dish = OpenSurface {
        area_m2: 1.0,
        temperature_k: 293.15,
        vapour_pa: 10.0,
        bulk_pa: 11.0,
        molar_mass_kg_mol: 0.1,
    };
    assert!(open_surface_kg_s(&dish).is_err());
    // Ether cools itself beyond the range of its equation.
    let error = self_cooling(298.15, ATM, 27_000.0, 290.0, |_| Ok(50_000.0)).unwrap_err();
    assert!(matches!(error, EmissionError::OutOfRange { .. }));
}

#[test]
fn errors_say_what_was_found_and_what_would_do() {
    let error = fill(1.0, 293.15, 10_000.0, &[vapour("acetone", 24_712.0)]).unwrap_err();
    assert_eq!(
        error.to_string(),
        "at 20.00 °C the vapour has 24712 Pa of the 10000 Pa in the vessel: the liquid boils and the equation does not hold; \
         take a lower temperature or a higher pressure, or account for it as distilled"
    );
    let error = air_drying_kg(-1.0, 0.2, 0.1).unwrap_err();
    assert_eq!(error.to_string(), "the dry solids, kg is -1; a number of 0 or more is needed");
}
