//! Parameters and rules that several techniques share.

use super::vapours::{AIR_PA, Masses, Vapours};
use super::{Control, Param};
use crate::chance::{Draw, In};
use crate::ledger::{Bench, Halt, Material, Place, RuleIx, Utility};
use crate::program::Reader;
use crate::quantity::Kind;
use crate::source::{COMMON_PRACTICE, FROM_MEMORY, Source};

/// The temperature at which gas is metered; K.
pub(super) const METER_K: f64 = 298.15;
/// Nitrogen at 25 °C and 101 325 Pa as an ideal gas: ρ = p M / (R T); kg/m³.
pub(super) const NITROGEN_KG_M3: f64 = AIR_PA * 0.028_013_4 / (8.314_462_618 * METER_K);

/// No usual solvent takes less heat to warm, from memory: tetrachloroethylene about 860, chloroform 960, hexane 2260; J/(kg K).
const LEAST_HEAT_CAPACITY_J_KG_K: f64 = 800.0;

/// The least heat that warms a liquid; J. 0 where it is not warmed.
pub(super) fn least_warming_j(kg: f64, from_k: f64, to_k: f64) -> f64 {
    // Q ≥ m c ΔT
    if to_k > from_k { kg * LEAST_HEAT_CAPACITY_J_KG_K * (to_k - from_k) } else { 0.0 }
}

/// The solvent of an extraction.
pub(super) const SOLVENT: Param = Param::new("solvent", "Solvent", Control::Mixture)
    .required()
    .hint("One material, or several with shares by volume.");
/// What the sample gives up.
pub(super) const EXTRACTS: Param =
    Param::new("extracts", "Taken out of the sample", Control::PerMaterial(Kind::Fraction))
        .physical(0.0, 1.0)
        .hint("Share of each feed material that goes into the liquor, the water of a wet sample included; leave out for traces.");
/// Temperature of a condenser's coolant, which turns a share from experience into physics.
pub(super) const COOLANT: Param = Param::quantity("coolant", "Coolant in the condenser", Kind::Temperature)
    .physical(200.0, 350.0)
    .usual(258.15, 298.15)
    .hint("As it enters; with it the loss is computed, and is a floor: weigh to know what your bench loses.")
    .source(COMMON_PRACTICE);
/// Cooling water run through a condenser.
pub(super) const COOLING_WATER: Param =
    Param::quantity("cooling_water", "Cooling water flow", Kind::VolumeFlow)
        .physical(0.0, 1.0)
        .usual(1.6e-6, 5e-5)
        .hint("Of the tap for this condenser; left out for a recirculating chiller.")
        .source(COMMON_PRACTICE);

/// An open surface of liquid, which turns a share from experience into physics.
pub(super) const SURFACE: Param = Param::quantity("surface", "Open surface of the liquid", Kind::Area)
    .physical(0.0, 100.0)
    .usual(1e-4, 0.1)
    .hint("Of the beaker or the wet walls; in still air, so that a draught takes more. With it the loss is computed.")
    .source(COMMON_PRACTICE);
/// The temperature of that liquid.
pub(super) const WARM: Param =
    Param::quantity("temperature", "Temperature of the open liquid", Kind::Temperature)
        .default("20 °C", COMMON_PRACTICE)
        .physical(200.0, 500.0)
        .usual(278.15, 333.15)
        .with("surface")
        .hint("An upper limit: it cools itself as it evaporates.")
        .source(COMMON_PRACTICE);

/// Time of one run of a step, with its usual range in s.
pub(super) const fn time(
    label: &'static str,
    usual: (f64, f64),
    hint: &'static str,
    source: Source,
) -> Param {
    Param::quantity("time", label, Kind::Time)
        .physical(0.0, 2e6)
        .usual(usual.0, usual.1)
        .hint(hint)
        .source(source)
}

/// Power drawn, beside the time, with its usual range in W.
pub(super) const fn power(usual: (f64, f64), hint: &'static str) -> Param {
    Param::quantity("power", "Power drawn", Kind::Power)
        .physical(0.0, 1e6)
        .usual(usual.0, usual.1)
        .with("time")
        .hint(hint)
        .source(FROM_MEMORY)
}

/// A share lost, from experience, with the highest that is usual. It stands where physics has no inputs.
pub(super) const fn loss(label: &'static str, default: &'static str, most: f64, hint: &'static str) -> Param {
    Param::quantity("loss", label, Kind::Fraction)
        .default(default, FROM_MEMORY)
        .physical(0.0, 1.0)
        .usual(0.0, most)
        .hint(hint)
        .source(FROM_MEMORY)
}

/// Where a loss goes: hood when left out.
pub(super) const fn lost_to(hint: &'static str) -> Param {
    Param::new("lost_to", "Lost to", Control::Place).default("hood", COMMON_PRACTICE).hint(hint)
}

/// Solvent that stays with each mass of marc, with its usual range in m³/kg.
pub(super) const fn held_by_marc(default: &'static str, usual: (f64, f64), hint: &'static str) -> Param {
    Param::quantity("hold_up", "Solvent held by the marc", Kind::VolumePerMass)
        .default(default, FROM_MEMORY)
        .physical(0.0, 0.02)
        .usual(usual.0, usual.1)
        .hint(hint)
        .source(FROM_MEMORY)
}

/// Cooling water by flow and time, beside the least that could carry the heat away; a kg is a litre.
pub(super) fn cooling_water(
    x: Draw<'_>,
    b: &mut Bench<'_>,
    flow: In,
    time_s: f64,
    heat_j: Option<f64>,
    rule: RuleIx,
) {
    // Rise of the water: common practice.
    const RISE_K: f64 = 10.0;
    b.note(rule, "q", x.get(flow), Kind::VolumeFlow);
    b.note(rule, "t", time_s, Kind::Time);
    // m = q t · 1000 kg/m³
    let run_kg = x.get(flow) * time_s * 1000.0;
    if let Some(heat_j) = heat_j {
        // m = Q / (c_p ΔT)
        let floor_kg = heat_j / (crate::heat::WATER_HEAT_CAPACITY_J_KG_K * RISE_K);
        b.note(rule, "least at a rise of 10 K", floor_kg, Kind::Mass);
        if run_kg < floor_kg {
            b.doubt(
                rule,
                "less water than carries the heat away at a rise of 10 K, which is",
                floor_kg,
                Kind::Mass,
                "check flow and time; a condenser that runs short loses solvent",
            );
        }
    }
    b.spend(Utility::CoolingWater, run_kg, rule);
}

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

/// A liquid that stands open for a time.
pub(super) struct Open {
    pub(super) vapours: Vapours,
    surface: In,
    temperature: In,
}

impl Open {
    /// Where the plan states a surface. To be read after the solvents that may lie there.
    pub(super) fn read(r: &mut Reader<'_, '_>, surface: &'static Param) -> Option<Self> {
        let (surface, temperature) = (r.optional(surface), r.optional(&WARM));
        let (surface, temperature) = surface.zip(temperature)?;
        let vapours = Vapours::read(r, Some(r.value(temperature)));
        vapours.warn_unknown(r, "surface");
        Some(Self { vapours, surface, temperature })
    }

    /// What evaporates of these masses in a time; kg.
    pub(super) fn gone(
        &self,
        x: Draw<'_>,
        b: &mut Bench<'_>,
        kg: &Masses,
        time_s: f64,
        rule: RuleIx,
    ) -> Result<Masses, Halt> {
        let (area_m2, temperature_k) = (x.get(self.surface), x.get(self.temperature));
        b.note(rule, "A", area_m2, Kind::Area);
        b.note(rule, "T", temperature_k, Kind::Temperature);
        b.note(rule, "t", time_s, Kind::Time);
        self.vapours.tell(b, kg, rule);
        let (gone, pressure_pa) = self.vapours.off_a_surface(x, kg, (area_m2, temperature_k, time_s))?;
        if pressure_pa >= AIR_PA {
            b.doubt(
                rule,
                "at the stated temperature the liquid boils at 1 atm, and the equation of an open surface in still air does not hold; the pressure over it comes to",
                pressure_pa,
                Kind::Pressure,
                "a temperature of the surface below the boiling point, or a measured loss",
            );
        }
        Ok(gone)
    }

    /// Loses to air what an open surface does where one is stated, else a share from experience of all that is there.
    pub(super) fn lose(
        open: Option<&Self>,
        x: Draw<'_>,
        b: &mut Bench<'_>,
        (from, to): (Place, Place),
        (share, time_s): (Option<In>, Option<f64>),
        rule: RuleIx,
    ) -> Result<(), Halt> {
        if let Some(time_s) = time_s {
            b.release_over(time_s);
        }
        if let (Some(open), Some(time_s)) = (open, time_s) {
            let lying = open.vapours.lying(b, from);
            let gone = open.gone(x, b, &lying, time_s, rule)?;
            let (parts, count) = open.vapours.parts(&gone);
            b.split(from, to, &parts[..count], rule)?;
        } else {
            let share = share.map_or(0.0, |s| x.get(s));
            b.note(rule, "s", share, Kind::Fraction);
            // mᵢ = s mᵢ(liquor)
            b.share_volatile(from, to, share, rule)?;
        }
        Ok(())
    }
}
