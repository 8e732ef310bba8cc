//! What can hurt someone. Cautions stand beside the step and the figure; they never replace local rules.

use crate::source::{COMMON_PRACTICE, Source};

/// A usual caution.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Caution {
    /// A short key, stable across versions.
    pub key: &'static str,
    /// What to mind.
    pub text: &'static str,
    /// Where it comes from.
    pub source: Source,
}

const fn usual(key: &'static str, text: &'static str) -> Caution {
    Caution { key, text, source: COMMON_PRACTICE }
}

/// Heating a flammable solvent.
pub(super) const HEATED_FLAMMABLE: Caution = usual(
    "heated flammable solvent",
    "Flammable solvent under heat: work in the hood, without ignition sources, with a cut-off that acts when cooling water fails; an unattended overnight reflux needs one.",
);
/// Ethers and other peroxide formers.
pub(super) const PEROXIDES: Caution = usual(
    "peroxide formers",
    "Ethers, tetrahydrofuran, dioxane and long-stored 2-propanol form peroxides: look at the test date before heating or drying down, and never go to dryness.",
);
/// Vessels under pressure.
pub(super) const PRESSURE_VESSEL: Caution = usual(
    "pressure vessel",
    "Vessel under pressure: rated, inspected, with relief and interlock; never opened while hot or under pressure.",
);
/// Shaking a volatile solvent in a closed funnel.
pub(super) const PRESSURE_IN_FUNNEL: Caution = usual(
    "pressure in the funnel",
    "A funnel shaken with a volatile solvent builds up pressure: vent it often, away from people, into the hood.",
);
/// Water saturated with a halogenated solvent, and what must not meet it.
pub(super) const WET_HALOGENATED: Caution = usual(
    "halogenated waste",
    "Water saturated with dichloromethane has almost the vapour pressure of the solvent: vent cap, no warm store. Keep halogenated waste from amines, nitric acid, alkali metals and aluminium, and out of unlined steel; never chloroform with acetone and base.",
);
/// Liquid CO2 between closed valves.
pub(super) const TRAPPED_LIQUID: Caution = usual(
    "liquid CO2 between valves",
    "Liquid CO2 shut in between two valves gains about 7 bar for each degree that it warms (recomputed with the reference equation: 5 °C and 60 bar become about 205 bar at 25 °C): a relief valve in every such line.",
);
/// Dry ice at the restrictor.
pub(super) const DRY_ICE: Caution = usual(
    "dry ice at the vent",
    "Restrictor and vent line can plug with dry ice or frost and then let go at once; fast decompression chills steel and tears seals. Never seal dry ice in.",
);
/// CO2 in the air of a room.
pub(super) const CO2_IN_ROOM: Caution = usual(
    "CO2 in the room",
    "CO2 harms before oxygen falls: a CO2 sensor low down, not an oxygen alarm; mind pits, cellars, ventilation at night and the cylinder store. Limits are local: 5 000 ppm over eight hours is common.",
);
/// Flammable co-solvent in a vent.
pub(super) const FLAMMABLE_VENT: Caution = usual(
    "flammable co-solvent in the vent",
    "A flammable co-solvent makes vent and separator an ignition zone: earth the line and keep ignition sources away.",
);
/// A nitrogen stream or a Snyder column sends the solvent to air.
pub(super) const EVAPORATED_TO_AIR: Caution = usual(
    "solvent to air",
    "Solvent sent to air by the method is an emission; evaporating waste to be rid of it is unpermitted treatment in the US and forbidden in most places. Keep containers closed.",
);
/// Distilling solvent that has been waste.
pub(super) const DISTILLED_WASTE: Caution = usual(
    "solvent distilled for reuse",
    "Collected solvent may hold what nobody wrote down: peroxides, acids, azeotropes that change the method's blank. Test before and after; \
     still bottoms are waste of the same codes; whether reclaiming on site needs a permit is the local authority's to say.",
);
