//! Factors against values outside the project, each with its witness.

use thimbleworth::quantity::{Kind, read};

/// A factor as printed, and half a unit of its last printed digit.
struct Printed {
    text: &'static str,
    kind: Kind,
    si: f64,
    within: f64,
    witness: &'static str,
}

const fn printed(text: &'static str, kind: Kind, si: f64, within: f64, witness: &'static str) -> Printed {
    Printed { text, kind, si, within, witness }
}

const BROCHURE: &str = "BIPM, SI Brochure, 8th edition (updated 2014), Table 6, read on bipm.org";
const STATE: &str = "Nebraska Energy Office, Conversion/Equivalency Factors, P: a pound 0.453 592 37 kg, a US liquid pint 0.473 176 5 L";
const MEMORY: &str = "NIST SP 811 (2008), Appendix B.8, from memory";

const PRINTED: [Printed; 16] = [
    printed("1 min", Kind::Time, 60.0, 0.0, BROCHURE),
    printed("1 h", Kind::Time, 3600.0, 0.0, BROCHURE),
    printed("1 d", Kind::Time, 86_400.0, 0.0, BROCHURE),
    printed("1 L", Kind::Volume, 1e-3, 0.0, BROCHURE),
    printed("1 t", Kind::Mass, 1e3, 0.0, BROCHURE),
    printed("1 lb", Kind::Mass, 0.453_592_37, 0.0, STATE),
    // Two pints are a quart.
    printed("1 US qt", Kind::Volume, 0.946_353e-3, 0.5e-9, STATE),
    printed("1 oz", Kind::Mass, 2.834_952e-2, 0.5e-8, MEMORY),
    printed("1 US gal", Kind::Volume, 3.785_412e-3, 0.5e-9, MEMORY),
    printed("1 psi", Kind::Pressure, 6.894_757e3, 0.5e-3, MEMORY),
    printed("1 Torr", Kind::Pressure, 1.333_224e2, 0.5e-4, MEMORY),
    printed("1 mmHg", Kind::Pressure, 1.333_224e2, 0.5e-4, MEMORY),
    printed("1 atm", Kind::Pressure, 101_325.0, 0.0, MEMORY),
    printed("1 kWh", Kind::Energy, 3.6e6, 0.0, MEMORY),
    printed("1 year", Kind::Time, 3.1536e7, 0.0, MEMORY),
    printed("1 lb/US gal", Kind::Density, 1.198_264e2, 0.5e-4, MEMORY),
];

#[test]
fn printed_factors() {
    for Printed { text, kind, si, within, witness } in PRINTED {
        let ours = read(text, kind).unwrap().central_si;
        assert!((ours - si).abs() <= within, "{text}: {ours} against {si} ({witness})");
    }
}

/// Temperatures that meet on the scales: 32 °F is 0 °C, 212 °F is 100 °C, -40 is the same on both. By definition.
#[test]
fn the_scales_meet() {
    for (one, other) in [("32 °F", "0 °C"), ("212 °F", "100 °C"), ("-40 °F", "-40 °C"), ("0 °C", "273.15 K")]
    {
        let [a, b] = [one, other].map(|text| read(text, Kind::Temperature).unwrap().central_si);
        assert_eq!(a.to_bits(), b.to_bits(), "{one} and {other}");
    }
}

/// However an amount is written, the same double is read: 4000 volumes in mL, cm³, L, µL and m³. By definition.
#[test]
fn the_unit_changes_nothing() {
    for n in 1..4000_u32 {
        let expected = format!("{n}e-7").parse::<f64>().unwrap();
        let (whole, tenth) = (n / 10, n % 10);
        for text in [
            format!("{whole}.{tenth} mL"),
            format!("{whole}.{tenth} cm³"),
            format!("{n}e-4 L"),
            format!("{n}00 µL"),
            format!("{n}×10⁻⁷ m³"),
            format!("{n}e-3 dL"),
        ] {
            let read = read(&text, Kind::Volume).unwrap().central_si;
            assert_eq!(read.to_bits(), expected.to_bits(), "{text}: {read:e} against {expected:e}");
        }
    }
}
