//! Liquid-liquid extraction: portions of solvent shaken with a water sample; what the water takes up and gives up.

use super::caution::{PRESSURE_IN_FUNNEL, WET_HALOGENATED};
use super::{Control, Group, Mixture, Param, Rule, Step, Technique};
use crate::chance::{Draw, In};
use crate::ledger::{Bench, Halt, Material, Place, RuleIx};
use crate::material::Solubility;
use crate::program::Reader;
use crate::quantity::Kind;
use crate::source::{COMMON_PRACTICE, DEFINITION, FROM_MEMORY, Source, Standing};

const SW846_3510C: Source = Source::new(
    "US EPA SW-846 Method 3510C, rev. 3, December 1996; portions from memory",
    Standing::FromMemory,
);
const NERNST: Source =
    Source::new("Nernst distribution law, crosscurrent stages; recomputed", Standing::Recomputed);

const SOLVENT: Param = Param::new("solvent", "Solvent", Control::Mixture)
    .required()
    .hint("One material, or several with shares by volume.");
const CHARGE: Param = Param::quantity("charge", "Solvent in one portion", Kind::Volume)
    .required()
    .physical(0.0, 10.0)
    .usual(5e-6, 1e-3)
    .hint("All solvents together, as poured.")
    .source(SW846_3510C);
const PORTIONS: Param = Param::new("portions", "Portions", Control::Count)
    .default("3", SW846_3510C)
    .physical(1.0, 50.0)
    .usual(1.0, 6.0)
    .hint("Each shaken with the same water and drawn off.")
    .source(SW846_3510C);
const SOLUBILITY: Param = Param::new(
    "solubility",
    "Solubility in the water",
    Control::PerMaterial(Kind::Density),
)
.physical(0.0, 1000.0)
.hint(
    "Mass of a solvent that a volume of the water takes up; left out, the catalogue's figure for pure water.",
);
const DISTRIBUTION: Param = Param::new(
    "distribution",
    "Distribution, solvent over water",
    Control::PerMaterial(Kind::Number),
)
.physical(0.0, 1e9)
.hint("Ratio of concentrations at equilibrium, for solvents that mix with water and for what is extracted.");
const LOSS: Param = Param::quantity("loss", "Share lost to air", Kind::Fraction)
    .physical(0.0, 1.0)
    .usual(0.0, 0.1)
    .hint("Of the solvent, on venting the funnel and pouring; left out, none is counted.")
    .source(FROM_MEMORY);
const LOST_TO: Param = Param::new("lost_to", "Lost to", Control::Place)
    .default("hood", COMMON_PRACTICE)
    .hint("hood, or room when it is done on the open bench.");

const CHARGED: RuleIx = RuleIx(0);
const SATURATED: RuleIx = RuleIx(1);
const PARTED: RuleIx = RuleIx(2);
const LOST: RuleIx = RuleIx(3);

pub(super) static TECHNIQUE: Technique = Technique {
    key: "liquid-liquid",
    title: "Liquid-liquid extraction",
    about: "Portions of solvent are shaken with a water sample and drawn off. The water is saturated with solvent once, not \
            once a portion; what mixes with water parts by its distribution ratio stage by stage, and so does what is \
            extracted. Water that the solvent takes up is not counted.",
    group: Group::Extraction,
    takes_feed: Some(Place::SECOND_PHASE),
    params: &[SOLVENT, CHARGE, PORTIONS, SOLUBILITY, DISTRIBUTION, LOSS, LOST_TO],
    rules: &[
        Rule::new("charge", "mᵢ = V φᵢ ρᵢ, for each portion", DEFINITION),
        Rule::new("dissolved in the water", "mᵢ = Sᵢ V_w, at most what is there", COMMON_PRACTICE)
            .measurable(),
        Rule::new("parted", "mᵢ(water) = (mᵢ(water before) + mᵢ(portion)) / (1 + Dᵢ V / V_w)", NERNST),
        Rule::new("lost to air", "mᵢ = s mᵢ(liquor)", FROM_MEMORY).measurable(),
    ],
    cautions: &[PRESSURE_IN_FUNNEL, WET_HALOGENATED],
    example: r#"{ "step": "liquid-liquid", "solvent": { "dichloromethane": "80 %", "acetone": "20 %" }, "charge": "75 mL",
        "portions": 3, "distribution": { "acetone": "0.7" } }"#,
    read,
};

struct LiquidLiquid {
    solvent: Mixture,
    charge: In,
    portions: u32,
    /// Solvents that the water takes up to saturation: material, solubility in kg/m³.
    saturating: Vec<(Material, In)>,
    /// What parts by a distribution ratio: material, its row in the mixture, the ratio.
    parting: Vec<(Material, Option<usize>, In)>,
    loss: Option<In>,
    lost_to: Place,
}

fn read(r: &mut Reader<'_, '_>) -> Box<dyn Step> {
    let solvent = r.mixture(&SOLVENT);
    let charge = r.quantity(&CHARGE);
    let portions = r.count(&PORTIONS);
    let own = r.per_material(&SOLUBILITY);
    let distribution = r.per_material(&DISTRIBUTION);
    let (mut saturating, mut parting) = (Vec::new(), Vec::new());
    for (i, part) in solvent.parts.iter().enumerate() {
        let m = part.material;
        if let Some(&(_, ratio)) = distribution.iter().find(|(d, _)| *d == m) {
            parting.push((m, Some(i), ratio));
            continue;
        }
        if let Some(&(_, solubility)) = own.iter().find(|(s, _)| *s == m) {
            saturating.push((m, solubility));
            continue;
        }
        match r.substance(m).map(|s| s.solubility_in_water.clone()) {
            Some(Solubility::Limited(_)) => {
                let slot =
                    r.property(m, "solubility in water", Kind::Density, |s| match &s.solubility_in_water {
                        Solubility::Limited(f) => Some((f.value, f.low, f.high)),
                        Solubility::Miscible | Solubility::NotKnown => None,
                    });
                saturating.extend(slot.map(|slot| (m, slot)));
            }
            Some(Solubility::Miscible) => {
                let name = r.name_of(m).to_owned();
                r.doubt(
                    "distribution",
                    format!("{name} mixes with water and no distribution ratio is given: all of it is left in the water"),
                    format!("the ratio of its concentrations, solvent over water, as \"{name}\": \"0.7\""),
                );
                let none = r.computed(
                    "distribution of what mixes with water",
                    0.0,
                    Kind::Number,
                    "all of it stays in the water",
                );
                parting.push((m, Some(i), none));
            }
            Some(Solubility::NotKnown) | None => {
                let name = r.name_of(m).to_owned();
                r.problem(
                    "solubility",
                    format!("nobody knows how much {name} the water takes up"),
                    format!("its solubility, as \"{name}\": \"15 g/L\""),
                );
            }
        }
    }
    for &(m, ratio) in &distribution {
        if !solvent.parts.iter().any(|p| p.material == m) {
            parting.push((m, None, ratio));
        }
    }
    Box::new(LiquidLiquid {
        solvent,
        charge,
        portions,
        saturating,
        parting,
        loss: r.optional(&LOSS),
        lost_to: r.place(&LOST_TO),
    })
}

impl Step for LiquidLiquid {
    fn run(&self, x: Draw<'_>, b: &mut Bench<'_>) -> Result<(), Halt> {
        b.need(Place::SECOND_PHASE)?;
        let water_m3 = b.liquid_volume_m3(Place::SECOND_PHASE);
        if water_m3 <= 0.0 {
            return Err(Halt::NoLiquid { place: Place::SECOND_PHASE });
        }
        let portion_m3 = x.get(self.charge);
        for _ in 0..self.portions {
            let portion_kg = self.solvent.masses_kg(x, portion_m3);
            self.solvent.charge(x, b, Place::LIQUOR, portion_m3, CHARGED)?;
            for &(m, row, ratio) in &self.parting {
                let fresh_kg = row.map_or(0.0, |i| portion_kg[i]);
                let before_kg = b.there(Place::SECOND_PHASE, m);
                let ratio = x.get(ratio);
                b.note(PARTED, "Dᵢ", ratio, Kind::Number);
                b.note(PARTED, "V", portion_m3, Kind::Volume);
                b.note(PARTED, "V_w", water_m3, Kind::Volume);
                // mᵢ(water) = (mᵢ(water before) + mᵢ(portion)) / (1 + Dᵢ V / V_w)
                let after_kg = (before_kg + fresh_kg) / (1.0 + ratio * portion_m3 / water_m3);
                let moved_kg = after_kg - before_kg;
                // Both ways are posted, one of them as zero, so that every draw has the same sequence of postings.
                let (down, up) = if moved_kg > 0.0 { (moved_kg, 0.0) } else { (0.0, -moved_kg) };
                b.take(Place::LIQUOR, Place::SECOND_PHASE, m, down, PARTED)?;
                b.take(Place::SECOND_PHASE, Place::LIQUOR, m, up, PARTED)?;
            }
        }
        let mut taken = [(Material(0), 0.0); super::mixture::LARGEST];
        let mut count = 0;
        for (row, &(m, solubility)) in taken.iter_mut().zip(&self.saturating) {
            let there_kg = b.there(Place::LIQUOR, m);
            b.note(SATURATED, "Sᵢ", x.get(solubility), Kind::Density);
            b.note(SATURATED, "V_w", water_m3, Kind::Volume);
            // mᵢ = Sᵢ V_w, at most what is there: the water is saturated once, whatever the number of portions
            let kg = x.get(solubility) * water_m3;
            *row = (m, if kg > there_kg { there_kg } else { kg });
            count += 1;
        }
        b.split(Place::LIQUOR, Place::SECOND_PHASE, &taken[..count], SATURATED)?;
        if let Some(loss) = self.loss {
            b.note(LOST, "s", x.get(loss), Kind::Fraction);
            // mᵢ = s mᵢ(liquor)
            b.share_volatile(Place::LIQUOR, self.lost_to, x.get(loss), LOST)?;
        }
        Ok(())
    }
}
