//! The supply: cylinders with a heel that cannot be used, and dry-ice snow for the preparation of samples.

use crate::chance::{Draw, In};
use crate::ledger::{Bench, Halt, Material, Place, RuleIx};
use crate::program::Reader;
use crate::quantity::Kind;
use crate::source::{COMMON_PRACTICE, FROM_MEMORY, Source, Standing};
use crate::step::Param;

const SW846_3562: Source =
    Source::new("US EPA SW-846 Method 3562, revision 0, homogenising with dry ice", Standing::Secondary);

const CYLINDER: Param = Param::quantity("cylinder", "CO2 in a full cylinder", Kind::Mass)
    .physical(0.1, 1e5)
    .usual(5.0, 1000.0)
    .hint("To count cylinders; left out, none are counted.")
    .source(COMMON_PRACTICE);
const HEEL: Param = Param::quantity("heel", "Share of a cylinder that cannot be used", Kind::Fraction)
    .default("12 %", FROM_MEMORY)
    .physical(0.0, 0.9)
    .usual(0.05, 0.35)
    .with("cylinder")
    .hint("It goes back to the supplier: bought, and not emitted here.")
    .source(FROM_MEMORY);
const SNOW: Param =
    Param::quantity("snow", "Dry-ice snow for grinding, volume over that of the sample", Kind::Number)
        .physical(0.0, 100.0)
        .usual(0.2, 5.0)
        .hint("1 for an equal volume; left out, none is counted. All of it goes to air.")
        .source(SW846_3562);
const SNOW_SAMPLE: Param = Param::quantity("snow_sample", "Sample that is ground with snow", Kind::Mass)
    .physical(0.0, 1000.0)
    .usual(1e-3, 1.0)
    .with("snow")
    .hint("In one run of the step; as a rule far more than is extracted.")
    .source(SW846_3562);
const SAMPLE_DENSITY: Param =
    Param::quantity("snow_sample_density", "Bulk density of that sample", Kind::Density)
        .default("1.4 g/mL", FROM_MEMORY)
        .physical(50.0, 5000.0)
        .usual(300.0, 2000.0)
        .with("snow")
        .hint("As it lies in the jar.")
        .source(FROM_MEMORY);
const SNOW_DENSITY: Param = Param::quantity("snow_density", "Density of the loose snow", Kind::Density)
    .default("0.75 ± 0.15 g/mL", FROM_MEMORY)
    .physical(100.0, 1600.0)
    .usual(500.0, 1000.0)
    .with("snow")
    .hint("0.6 to 0.9 g/mL is usual.")
    .source(FROM_MEMORY);

pub(in crate::step) const CYLINDERS: [Param; 2] = [CYLINDER, HEEL];
pub(in crate::step) const SNOWS: [Param; 4] = [SNOW, SNOW_SAMPLE, SAMPLE_DENSITY, SNOW_DENSITY];

/// The cylinders from which a step draws.
pub(in crate::step) struct Cylinder(Option<(In, In)>);

impl Cylinder {
    pub(in crate::step) fn read(r: &mut Reader<'_, '_>) -> Self {
        let (fill, heel) = (r.optional(&CYLINDER), r.optional(&HEEL));
        Self(fill.zip(heel))
    }

    /// Filling of a cylinder, kg, and the share of it that cannot be used.
    pub(in crate::step) fn of(&self, x: Draw<'_>) -> Option<(f64, f64)> {
        self.0.map(|(fill, heel)| (x.get(fill), x.get(heel)))
    }

    pub(in crate::step) fn note(&self, x: Draw<'_>, b: &mut Bench<'_>, rule: RuleIx) {
        if let Some((fill, heel)) = self.of(x) {
            b.note(rule, "m_cylinder", fill, Kind::Mass);
            b.note(rule, "heel", heel, Kind::Fraction);
        }
    }
}

/// Dry-ice snow that grinds a sample.
pub(in crate::step) struct Snow(Option<[In; 4]>);

impl Snow {
    pub(in crate::step) fn read(r: &mut Reader<'_, '_>) -> Self {
        let (ratio, sample) = (r.optional(&SNOW), r.optional(&SNOW_SAMPLE));
        let (bulk, loose) = (r.optional(&SAMPLE_DENSITY), r.optional(&SNOW_DENSITY));
        if ratio.is_some() && !r.written("snow_sample") {
            let found = "snow is given without the sample that it grinds";
            r.problem("snow_sample", found, "its mass, such as \"100 g\"");
        }
        Self(match (ratio, sample, bulk, loose) {
            (Some(ratio), Some(sample), Some(bulk), Some(loose)) => Some([ratio, sample, bulk, loose]),
            _ => None,
        })
    }

    /// Sends the snow to air.
    pub(in crate::step) fn run(
        &self,
        x: Draw<'_>,
        b: &mut Bench<'_>,
        co2: Material,
        vent_to: Place,
        rule: RuleIx,
    ) -> Result<(), Halt> {
        let Some(slots) = self.0 else { return Ok(()) };
        let [ratio, sample_kg, bulk_kg_m3, loose_kg_m3] = slots.map(|s| x.get(s));
        b.note(rule, "r", ratio, Kind::Number);
        b.note(rule, "m_s", sample_kg, Kind::Mass);
        b.note(rule, "ρ_s", bulk_kg_m3, Kind::Density);
        b.note(rule, "ρ_snow", loose_kg_m3, Kind::Density);
        let kg = crate::co2_loop::snow_kg(sample_kg, bulk_kg_m3, loose_kg_m3, ratio)?;
        b.charge(Place::STORE, vent_to, co2, kg, rule)?;
        Ok(())
    }
}
