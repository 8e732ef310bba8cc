//! Rules that several techniques share.

use crate::chance::{Draw, In};
use crate::ledger::{Bench, Halt, Material, Place, RuleIx};
use crate::quantity::Kind;

/// What the sample gives up: a share of each named material moves with the extract.
pub(super) fn extract(
    x: Draw<'_>,
    b: &mut Bench<'_>,
    extracts: &[(Material, In)],
    from: Place,
    to: Place,
    rule: RuleIx,
) -> Result<(), Halt> {
    for &(m, share) in extracts {
        let share = x.get(share);
        b.note(rule, "sᵢ", share, Kind::Fraction);
        // mᵢ = sᵢ mᵢ(marc)
        b.share(from, to, m, share, rule)?;
    }
    Ok(())
}

/// What the marc holds back: a volume of liquor for each kilogram that lay there, never more than there is.
pub(super) fn hold_up(b: &mut Bench<'_>, hold_up_m3_kg: f64, marc_kg: f64, rule: RuleIx) -> Result<(), Halt> {
    let volume_m3 = b.liquid_volume_m3(Place::LIQUOR);
    b.note(rule, "h", hold_up_m3_kg, Kind::VolumePerMass);
    b.note(rule, "m_marc", marc_kg, Kind::Mass);
    b.note(rule, "V_liquor", volume_m3, Kind::Volume);
    // s = h m_marc / V_liquor
    let share = if volume_m3 > 0.0 { hold_up_m3_kg * marc_kg / volume_m3 } else { 0.0 };
    b.share_all(Place::LIQUOR, Place::MARC, if share < 1.0 { share } else { 1.0 }, rule)?;
    Ok(())
}

/// Electricity of a step: power by time where both are stated, against the floor of physics where that is known; J.
pub(super) fn electricity(
    x: Draw<'_>,
    b: &mut Bench<'_>,
    power: Option<In>,
    time_s: Option<f64>,
    floor_j: Option<f64>,
    rule: RuleIx,
) {
    let nominal_j = match (power, time_s) {
        (Some(power), Some(time_s)) => {
            b.note(rule, "P", x.get(power), Kind::Power);
            b.note(rule, "t", time_s, Kind::Time);
            // W = P t
            Some(x.get(power) * time_s)
        }
        _ => None,
    };
    b.electricity(nominal_j, floor_j, rule);
}
