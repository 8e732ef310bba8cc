//! Solid-phase extraction: condition, load, wash, elute; the bed keeps its hold-up and goes to solid waste.

use super::{Control, Group, Mixture, Param, Rule, Step, Technique};
use crate::chance::{Draw, In};
use crate::ledger::{Bench, Halt, Material, Place, RuleIx};
use crate::quantity::Kind;
use crate::source::{COMMON_PRACTICE, DEFINITION, FROM_MEMORY, MASS_BALANCE, Source, Standing};

const SW846_3535A: Source = Source::new(
    "US EPA SW-846 Method 3535A, rev. 1, February 2007; volumes from memory",
    Standing::FromMemory,
);

const CARTRIDGE: Param = Param::new("cartridge", "Cartridge or disk", Control::Material)
    .hint("From the catalogue, or the plan's own; left out, none is counted.");
const CARTRIDGE_MASS: Param = Param::quantity("cartridge_mass", "Mass of the cartridge", Kind::Mass)
    .physical(0.0, 1.0)
    .usual(1e-4, 0.05)
    .with("cartridge")
    .hint("With bed and housing, dry.")
    .source(COMMON_PRACTICE);
const CONDITION: Param = Param::new("condition", "Conditioning", Control::PerMaterial(Kind::Volume))
    .physical(0.0, 1.0)
    .hint("Solvents drawn through before the sample, each with its volume.");
const WASH: Param = Param::new("wash", "Washing", Control::PerMaterial(Kind::Volume))
    .physical(0.0, 1.0)
    .hint("Drawn through after the sample, each with its volume.");
const THROUGH: Param = Param::new("through_to", "What runs through goes to", Control::Place)
    .default("second phase", DEFINITION)
    .hint(
        "Where conditioning and washing solvent are collected; left out, they run into the sample's water.",
    );
const SOLVENT: Param = Param::new("solvent", "Eluting solvent", Control::Mixture)
    .required()
    .hint("One material, or several with shares by volume.");
const ELUTE: Param = Param::quantity("elute", "Eluting volume", Kind::Volume)
    .required()
    .physical(0.0, 1.0)
    .usual(1e-6, 6e-5)
    .hint("All portions together. Up to 10 mL a step and 50 mL a sample is usual.")
    .source(SW846_3535A);
const EXTRACTS: Param =
    Param::new("extracts", "Taken out of the sample", Control::PerMaterial(Kind::Fraction))
        .physical(0.0, 1.0)
        .hint("Share of each feed material that ends in the eluate; leave out for traces.");
const LOSS: Param = Param::quantity("loss", "Share of the eluting solvent lost to air", Kind::Fraction)
    .default("3 %", FROM_MEMORY)
    .physical(0.0, 1.0)
    .usual(0.0, 0.2)
    .hint("While eluting under vacuum.")
    .source(FROM_MEMORY);
const LOST_TO: Param = Param::new("lost_to", "Lost to", Control::Place)
    .default("hood", COMMON_PRACTICE)
    .hint("hood, or room when the pump blows into the room.");
const HOLD_UP: Param = Param::quantity("hold_up", "Eluting solvent held by the bed", Kind::Volume)
    .default("0.3 mL", FROM_MEMORY)
    .physical(0.0, 1.0)
    .usual(0.0, 3e-6)
    .hint("After drawing air through; it goes with the cartridge.")
    .source(FROM_MEMORY);

const CONDITIONED: RuleIx = RuleIx(0);
const WASHED: RuleIx = RuleIx(1);
const USED: RuleIx = RuleIx(2);
const CHARGED: RuleIx = RuleIx(3);
const EXTRACTED: RuleIx = RuleIx(4);
const LOST: RuleIx = RuleIx(5);
const HELD: RuleIx = RuleIx(6);

pub(super) static TECHNIQUE: Technique = Technique {
    key: "solid-phase",
    title: "Solid-phase extraction",
    about: "A water sample is drawn through a conditioned bed, which is washed and eluted. The sample's water and what runs \
            through lie in the second phase; conditioning solvent left in the bed is counted as run through.",
    group: Group::Extraction,
    takes_feed: Some(Place::SECOND_PHASE),
    params: &[
        CARTRIDGE,
        CARTRIDGE_MASS,
        CONDITION,
        WASH,
        THROUGH,
        SOLVENT,
        ELUTE,
        EXTRACTS,
        LOSS,
        LOST_TO,
        HOLD_UP,
    ],
    rules: &[
        Rule::new("conditioning", "mᵢ = Vᵢ ρᵢ", DEFINITION),
        Rule::new("washing", "mᵢ = Vᵢ ρᵢ", DEFINITION),
        Rule::new("cartridge", "m", MASS_BALANCE),
        Rule::new("elution", "mᵢ = V φᵢ ρᵢ", DEFINITION),
        Rule::new("extracted", "mᵢ = sᵢ mᵢ(second phase)", MASS_BALANCE),
        Rule::new("lost to air", "mᵢ = s mᵢ(liquor)", FROM_MEMORY).measurable(),
        Rule::new("held in the bed", "mᵢ = (V_held / V_liquor) mᵢ(liquor)", FROM_MEMORY).measurable(),
    ],
    cautions: &[],
    example: r#"{ "step": "solid-phase", "cartridge": "SPE cartridge", "cartridge_mass": "9 g",
        "condition": { "methanol": "10 mL", "water": "10 mL" }, "solvent": { "ethyl acetate": "100 %" }, "elute": "10 mL" }"#,
    read: |r| {
        let cartridge = r.optional_material(&CARTRIDGE);
        let mass = r.optional(&CARTRIDGE_MASS);
        if cartridge.is_some() && mass.is_none() {
            r.problem("cartridge_mass", "a cartridge without its mass", "its mass, such as \"9 g\"");
        }
        Box::new(SolidPhase {
            cartridge: cartridge.zip(mass),
            condition: r.poured(&CONDITION),
            wash: r.poured(&WASH),
            through: r.place(&THROUGH),
            solvent: r.mixture(&SOLVENT),
            elute: r.quantity(&ELUTE),
            extracts: r.taken_out(&EXTRACTS),
            loss: r.quantity(&LOSS),
            lost_to: r.place(&LOST_TO),
            hold_up: r.quantity(&HOLD_UP),
        })
    },
};

struct SolidPhase {
    cartridge: Option<(Material, In)>,
    condition: Vec<Poured>,
    wash: Vec<Poured>,
    through: Place,
    solvent: Mixture,
    elute: In,
    extracts: Vec<(Material, In)>,
    loss: In,
    lost_to: Place,
    hold_up: In,
}

/// A volume of one material.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Poured {
    /// The material.
    pub material: Material,
    /// The volume; m³.
    pub volume: In,
    /// Its density at the bench's temperature; kg/m³.
    pub density: In,
}

fn pour(x: Draw<'_>, b: &mut Bench<'_>, poured: &[Poured], to: Place, rule: RuleIx) -> Result<(), Halt> {
    for p in poured {
        let (volume_m3, density_kg_m3) = (x.get(p.volume), x.get(p.density));
        b.note(rule, "Vᵢ", volume_m3, Kind::Volume);
        b.note(rule, "ρᵢ", density_kg_m3, Kind::Density);
        // mᵢ = Vᵢ ρᵢ
        b.charge(Place::STORE, to, p.material, volume_m3 * density_kg_m3, rule)?;
    }
    Ok(())
}

impl Step for SolidPhase {
    fn run(&self, x: Draw<'_>, b: &mut Bench<'_>) -> Result<(), Halt> {
        b.need(Place::SECOND_PHASE)?;
        pour(x, b, &self.condition, self.through, CONDITIONED)?;
        pour(x, b, &self.wash, self.through, WASHED)?;
        if let Some((material, mass)) = self.cartridge {
            b.charge(Place::STORE, Place::MARC, material, x.get(mass), USED)?;
        }
        self.solvent.charge(x, b, Place::LIQUOR, x.get(self.elute), CHARGED)?;
        super::extract(x, b, &self.extracts, Place::SECOND_PHASE, Place::LIQUOR, EXTRACTED)?;
        b.note(LOST, "s", x.get(self.loss), Kind::Fraction);
        // mᵢ = s mᵢ(liquor)
        b.share_volatile(Place::LIQUOR, self.lost_to, x.get(self.loss), LOST)?;
        let liquor_m3 = b.liquid_volume_m3(Place::LIQUOR);
        let held_m3 = x.get(self.hold_up);
        b.note(HELD, "V_held", held_m3, Kind::Volume);
        b.note(HELD, "V_liquor", liquor_m3, Kind::Volume);
        // s = V_held / V_liquor, at most all
        let share = if held_m3 < liquor_m3 { held_m3 / liquor_m3 } else { 1.0 };
        b.share_all(Place::LIQUOR, Place::MARC, share, HELD)?;
        Ok(())
    }
}
