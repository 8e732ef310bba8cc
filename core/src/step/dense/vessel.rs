//! The vessel: its void, and the state to which it is let down.

use super::circuit::{CIRCUIT, RECYCLED};
use crate::chance::{Draw, In};
use crate::ledger::{Bench, Halt, RuleIx};
use crate::program::Reader;
use crate::quantity::Kind;
use crate::source::{COMMON_PRACTICE, DEFINITION, FROM_MEMORY};
use crate::step::{Control, Param};

const VESSEL: Param = Param::quantity("vessel", "Vessel volume", Kind::Volume)
    .required()
    .physical(0.0, 100.0)
    .usual(1e-6, 5.0)
    .hint("The empty vessel.")
    .source(COMMON_PRACTICE);
const VOID: Param = Param::quantity("void", "Void of the filled vessel", Kind::Volume)
    .physical(0.0, 100.0)
    .hint("What CO2 fills; left out, the vessel less sample and filler.")
    .source(COMMON_PRACTICE);
const SOLID_DENSITY: Param = Param::quantity("solid_density", "Density of the solid itself", Kind::Density)
    .default("2.6 g/mL", FROM_MEMORY)
    .physical(100.0, 25_000.0)
    .usual(900.0, 8000.0)
    .without("void")
    .hint("Not the bulk density: quartz 2.6, plant tissue about 1.3 to 1.5, metals 2.7 to 8 g/mL.")
    .source(FROM_MEMORY);
const FILLER: Param = Param::quantity("filler", "Volume of inert filler", Kind::Volume)
    .default("0 mL", DEFINITION)
    .physical(0.0, 100.0)
    .without("void")
    .hint("Glass beads or a plug that takes up void.")
    .source(COMMON_PRACTICE);
const LET_DOWN: Param = Param::new("let_down", "Let down after this step", Control::YesNo)
    .default("true", DEFINITION)
    .hint("false where a further stage follows in the same vessel.");
const LET_DOWN_TEMPERATURE: Param = Param::quantity(
    "let_down_temperature",
    "Temperature in the vessel before the vent is opened",
    Kind::Temperature,
)
.physical(216.592, 1100.0)
.when("circuit", &[RECYCLED])
.hint("At the end of recovery; jacketed vessels stay warm.")
.source(COMMON_PRACTICE);
const LET_DOWN_PRESSURE: Param =
    Param::quantity("let_down_pressure", "Pressure in the vessel before the vent is opened", Kind::Pressure)
        .physical(1e5, 8e8)
        .when("circuit", &[RECYCLED])
        .hint("As far as the loop recovers the fill: without a compressor not below the receiver.")
        .source(COMMON_PRACTICE);

const LET_DOWN_TIME: Param = Param::quantity("let_down_time", "Time of letting down", Kind::Time)
    .physical(0.0, 1e6)
    .usual(10.0, 14_400.0)
    .hint(
        "While the vent is open; left out, how fast it vents is not known, and a room's air takes the worst.",
    )
    .source(COMMON_PRACTICE);

pub(in crate::step) const PARAMS: [Param; 4] = [VESSEL, VOID, SOLID_DENSITY, FILLER];
pub(in crate::step) const LETTING_DOWN: [Param; 4] =
    [LET_DOWN, LET_DOWN_TEMPERATURE, LET_DOWN_PRESSURE, LET_DOWN_TIME];

/// The vessel of one step.
pub(in crate::step) struct Vessel {
    volume: In,
    void: Option<In>,
    solid_density: In,
    filler: In,
    pub(in crate::step) let_down: bool,
    pub(in crate::step) state: Option<(In, In)>,
    time: Option<In>,
}

impl Vessel {
    pub(in crate::step) fn read(r: &mut Reader<'_, '_>) -> Self {
        let let_down = r.yes(&LET_DOWN);
        let (t, p) = (r.optional(&LET_DOWN_TEMPERATURE), r.optional(&LET_DOWN_PRESSURE));
        let recycled = r.choice(&CIRCUIT) == RECYCLED;
        if recycled && let_down {
            for (key, slot) in [("let_down_temperature", t), ("let_down_pressure", p)] {
                if slot.is_none() {
                    r.problem(
                        key,
                        "the CO2 is recycled, and nothing says from which state the vessel is vented",
                        "the state at the end of recovery, such as \"40 °C\" and \"55 bar\": the vent depends on nothing else so much",
                    );
                }
            }
        }
        Self {
            volume: r.quantity(&VESSEL),
            void: r.optional(&VOID),
            solid_density: r.quantity(&SOLID_DENSITY),
            filler: r.quantity(&FILLER),
            let_down,
            state: t.zip(p),
            time: r.optional(&LET_DOWN_TIME),
        }
    }

    /// The void that CO2 fills; m³.
    pub(in crate::step) fn void_m3(
        &self,
        x: Draw<'_>,
        b: &mut Bench<'_>,
        marc_kg: f64,
        rule: RuleIx,
    ) -> Result<f64, Halt> {
        let volume_m3 = x.get(self.volume);
        let taken_m3 = match self.void {
            Some(void) => volume_m3 - x.get(void),
            // V_void = V_vessel − m_marc / ρ_solid − V_filler
            None => marc_kg / x.get(self.solid_density) + x.get(self.filler),
        };
        let void_m3 = volume_m3 - taken_m3;
        b.note(rule, "V_void", void_m3, Kind::Volume);
        if void_m3 < 0.0 || taken_m3 < 0.0 {
            let wanted_m3 = if taken_m3 < 0.0 { void_m3 } else { taken_m3 };
            return Err(Halt::DoesNotFit { wanted_m3, there_m3: volume_m3 });
        }
        Ok(void_m3)
    }

    /// How long the vent is open, s; NaN where nobody says.
    pub(in crate::step) fn let_down_s(&self, x: Draw<'_>) -> f64 {
        self.time.map_or(f64::NAN, |t| x.get(t))
    }

    /// What the let-down vents where the rest is recovered; kg.
    pub(in crate::step) fn vented_kg(
        &self,
        x: Draw<'_>,
        b: &mut Bench<'_>,
        void_m3: f64,
        rule: RuleIx,
    ) -> Result<f64, Halt> {
        let Some((temperature, pressure)) = self.state else { return Ok(0.0) };
        let (temperature_k, pressure_pa) = (x.get(temperature), x.get(pressure));
        let density_kg_m3 = b.states().density_kg_m3(temperature_k, pressure_pa)?;
        b.note(rule, "T_l", temperature_k, Kind::Temperature);
        b.note(rule, "p_l", pressure_pa, Kind::Pressure);
        b.note(rule, "ρ_l", density_kg_m3, Kind::Density);
        // m = V_void ρ(T_l, p_l)
        Ok(void_m3 * density_kg_m3)
    }
}
