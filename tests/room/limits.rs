//! The table of limits: read whole, consistent with the catalogue and with itself, and chosen by date.
use std::collections::BTreeSet;
use thimbleworth::material::catalogue;
use thimbleworth::room::{
    Day, Jurisdiction, Limit, LimitKind, LimitState, Limits, Uses, Why, all_limits, limit_faults, limits,
};

const DCM: &str = "75-09-2";
const PCE: &str = "127-18-4";

fn on(cas: &str, day: &str) -> Limits {
    limits(cas, Day::parse(day).unwrap())
}

fn held(limits: &Limits, jurisdiction: Jurisdiction, kind: LimitKind) -> Vec<f64> {
    let of = |l: &&&Limit| l.jurisdiction == jurisdiction && l.kind == kind;
    limits.hold.iter().filter(of).map(|l| l.value).collect()
}

#[test]
fn every_row_is_read_and_names_its_substance() {
    assert_eq!(limit_faults(), [""; 0]);
    assert!(all_limits().len() > 250);
    for limit in all_limits() {
        let substance = catalogue().find(limit.cas).unwrap();
        assert_eq!(substance.name, limit.name);
        assert!(catalogue().source(limit.source).is_some(), "{}", limit.source);
        assert!(limit.from.is_none() || limit.until.is_none() || limit.from < limit.until, "{limit:?}");
        assert!(!limit.citation.is_empty());
    }
}

// Witness: the molar mass. A slip in one of the two printed figures, or a row under the wrong substance, shows here. Rules round their
// milligrams, some of them generously: DEVIATION 250 ppm of isopropyl acetate beside 950 mg/m³, 2 ppm of dichloromethane beside 8.
#[test]
fn ppm_and_milligrams_agree() {
    let mut checked = 0;
    for limit in all_limits() {
        let Some(printed) = limit.printed_mg_m3 else { continue };
        let molar_mass = catalogue().find(limit.cas).unwrap().molar_mass_kg_mol.as_ref().unwrap().value;
        // mg/m³ = ppm M/V_m, V_m = 24.465 L/mol at 25 °C and 24.055 at 20 °C
        let litres = if limit.reference_temperature_k() == 298.15 { 24.465 } else { 24.055 };
        let off = printed / (limit.value * molar_mass * 1000.0 / litres) - 1.0;
        let allowed = match (limit.name, limit.jurisdiction) {
            ("isopropyl acetate", Jurisdiction::UsOsha) => 0.10,
            ("dichloromethane", Jurisdiction::UsTsca) => 0.16,
            ("pyridine", _) => 0.09,
            _ => 0.06,
        };
        assert!(off.abs() < allowed, "{} {:?}: {off}", limit.name, limit.jurisdiction);
        checked += 1;
    }
    assert!(checked > 200, "{checked}");
}

// Nobody sets a short limit below the long one, or calls a level dangerous at once that may be breathed for 15 minutes.
#[test]
fn shorter_times_allow_more() {
    for limit in all_limits().iter().filter(|l| l.kind == LimitKind::Twa && l.state == LimitState::InForce) {
        for other in all_limits() {
            let same = other.cas == limit.cas
                && other.jurisdiction == limit.jurisdiction
                && other.uses == limit.uses
                && other.state == limit.state;
            if same && matches!(other.kind, LimitKind::Stel | LimitKind::Ceiling | LimitKind::Idlh) {
                assert!(other.value > limit.value, "{limit:?} {other:?}");
            }
            if same && other.kind == LimitKind::ActionLevel {
                assert!(other.value <= limit.value, "{limit:?}");
            }
        }
    }
}

#[test]
fn no_two_rows_hold_at_once_for_the_same() {
    for day in ["2019-06-01", "2023-01-01", "2024-06-01", "2026-12-01", "2027-06-01"] {
        for cas in all_limits().iter().map(|l| l.cas).collect::<BTreeSet<_>>() {
            let found = on(cas, day);
            let mut seen = BTreeSet::new();
            for l in &found.hold {
                assert!(seen.insert((l.jurisdiction, l.kind, l.uses)), "{day}: {l:?}");
            }
            let rows = all_limits().iter().filter(|l| l.cas == cas).count();
            assert_eq!(found.hold.len() + found.notes.len(), rows, "a row of {cas} is lost on {day}");
        }
    }
}

// Source: OSHA Z-1, ACGIH and NIOSH as quoted in NIOSH's documentation of 1994 (secondary); EH40 as quoted in a trade page (secondary);
// Directive 2006/15/EC from memory. The 10 000 ppm of the vacated rule of 1989 must not appear.
#[test]
fn carbon_dioxide() {
    let found = on("124-38-9", "2026-12-01");
    use Jurisdiction::{Eu, Uk, UsAcgih, UsNiosh, UsOsha};
    for jurisdiction in [UsOsha, UsAcgih, UsNiosh, Eu, Uk] {
        assert_eq!(held(&found, jurisdiction, LimitKind::Twa), [5000.0], "{jurisdiction:?}");
    }
    assert_eq!(held(&found, UsAcgih, LimitKind::Stel), [30_000.0]);
    assert_eq!(held(&found, UsNiosh, LimitKind::Stel), [30_000.0]);
    assert_eq!(held(&found, Uk, LimitKind::Stel), [15_000.0]);
    assert_eq!(held(&found, UsNiosh, LimitKind::Idlh), [40_000.0]);
    assert!(all_limits().iter().all(|l| l.cas != "124-38-9" || l.value != 10_000.0));
}

// Source: 89 FR 39254 and 90 FR 50894 (excerpts and secondary texts): laboratories monitor from 9 November 2026 and keep 2 and 16 ppm
// from 8 February 2027.
#[test]
fn dichloromethane_in_a_laboratory_by_date() {
    let lab = |day| {
        let of_lab = |l: &&&Limit| l.uses == Uses::Laboratory;
        on(DCM, day).hold.iter().filter(of_lab).map(|l| (l.kind, l.value)).collect::<Vec<_>>()
    };
    assert_eq!(lab("2026-11-08"), []);
    assert_eq!(lab("2026-11-09"), [(LimitKind::ActionLevel, 1.0)]);
    assert_eq!(lab("2027-02-07"), [(LimitKind::ActionLevel, 1.0)]);
    let all = [(LimitKind::ActionLevel, 1.0), (LimitKind::Twa, 2.0), (LimitKind::Stel, 16.0)];
    assert_eq!(lab("2027-02-08"), all);
    let before = on(DCM, "2026-11-08");
    let coming: Vec<String> = before.notes.iter().map(|n| n.why.to_string()).collect();
    assert_eq!(coming, ["holds from 2026-11-09", "holds from 2027-02-08", "holds from 2027-02-08"]);
    // OSHA's own stay in force beside them
    assert_eq!(held(&before, Jurisdiction::UsOsha, LimitKind::Twa), [25.0]);
    assert_eq!(held(&before, Jurisdiction::UsOsha, LimitKind::Stel), [125.0]);
}

// Source: 89 FR 103560, 103512 and 102568 with 91 FR 14790 (excerpts and secondary texts): their dates are open.
#[test]
fn open_dates_never_count_and_are_always_told() {
    for (cas, value) in [(PCE, 0.14), ("56-23-5", 0.03), ("79-01-6", 0.2)] {
        for day in ["2025-06-01", "2026-12-01", "2028-01-01"] {
            let found = on(cas, day);
            assert_eq!(held(&found, Jurisdiction::UsTsca, LimitKind::Twa), [0.0; 0], "{cas} {day}");
            assert!(
                found.notes.iter().any(|n| n.limit.value == value && n.why == Why::Pending),
                "{cas} {day}"
            );
        }
    }
    let laboratory = "Laboratory use is under no exposure limit";
    assert!(on(PCE, "2026-12-01").notes.iter().any(|n| n.limit.note.contains(laboratory)));
}

// Directive (EU) 2022/431 from memory: three values one after the other, without a day between them.
#[test]
fn benzene_steps_down() {
    let value = |day| held(&on("71-43-2", day), Jurisdiction::Eu, LimitKind::Twa);
    assert_eq!(value("2024-04-04"), [1.0]);
    assert_eq!(value("2024-04-05"), [0.5]);
    assert_eq!(value("2026-04-04"), [0.5]);
    assert_eq!(value("2026-04-05"), [0.2]);
    let past = on("71-43-2", "2026-12-01");
    assert!(past.notes.iter().any(|n| n.why.to_string() == "held until 2026-04-04"));
}

#[test]
fn a_substance_that_is_missing_has_no_limit_here() {
    let none = on("7732-18-5", "2026-12-01");
    assert!(none.hold.is_empty() && none.notes.is_empty());
}
