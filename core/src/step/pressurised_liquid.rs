//! Pressurised liquid extraction: the cell's void filled hot, flushed, blown out with gas.

use super::caution::{HEATED_FLAMMABLE, PRESSURE_VESSEL};
use super::common::{
    EXTRACTS, METER_K, NITROGEN_KG_M3, SOLVENT, held_by_marc, least_warming_j, loss, lost_to, power, time,
};
use super::vapours::Vapours;
use super::{Control, Group, Mixture, Param, Rule, Step, Technique};
use crate::chance::{Draw, In};
use crate::emission::BATCH_RULE;
use crate::ledger::{Bench, Halt, Material, Place, RuleIx};
use crate::quantity::Kind;
use crate::source::{COMMON_PRACTICE, DEFINITION, FROM_MEMORY, MASS_BALANCE, Source, Standing};

const SW846_3545A: Source =
    Source::new("US EPA SW-846 Method 3545A, rev. 1; timings and volumes from memory", Standing::FromMemory);

const CELL: Param = Param::quantity("cell", "Cell volume", Kind::Volume)
    .required()
    .physical(0.0, 0.1)
    .usual(5e-6, 1e-4)
    .hint("The nominal volume of the cell.")
    .source(SW846_3545A);
const VOID: Param = Param::quantity("void", "Share of the cell that solvent fills", Kind::Fraction)
    .default("50 %", FROM_MEMORY)
    .physical(0.0, 1.0)
    .usual(0.2, 0.8)
    .without("used")
    .hint("What sample and dispersant leave free.")
    .source(FROM_MEMORY);
const FLUSH: Param = Param::quantity("flush", "Flush, as a share of the cell", Kind::Fraction)
    .default("60 %", SW846_3545A)
    .physical(0.0, 5.0)
    .usual(0.3, 1.5)
    .without("used")
    .hint("Fresh solvent pumped through after the static time, all cycles together.")
    .source(SW846_3545A);
const LINES: Param = Param::quantity("lines", "Rinse of pump and lines", Kind::Volume)
    .physical(0.0, 0.1)
    .usual(0.0, 2e-5)
    .without("used")
    .hint("For each cell; it ends with the extract. Left out, none is counted.")
    .source(COMMON_PRACTICE);
const USED: Param = Param::quantity("used", "Solvent used, where it is known", Kind::Volume)
    .physical(0.0, 0.1)
    .usual(5e-6, 2e-4)
    .hint("From the instrument's log or the bottle: stands in place of void, flush and lines.")
    .source(SW846_3545A);
const DISPERSANT: Param = Param::new("dispersant", "Dispersant", Control::Material)
    .hint("Diatomaceous earth, sand or a drying agent that is mixed with the sample.");
const DISPERSANT_MASS: Param = Param::quantity("dispersant_mass", "Mass of dispersant", Kind::Mass)
    .physical(0.0, 10.0)
    .usual(1e-3, 0.05)
    .with("dispersant")
    .hint("For each cell.")
    .source(COMMON_PRACTICE);
const TEMPERATURE: Param = Param::quantity("temperature", "Temperature of the cell", Kind::Temperature)
    .physical(250.0, 500.0)
    .usual(313.15, 473.15)
    .without("used")
    .hint("The void fills with hot solvent, which is lighter: 10 % at 100 °C. Left out, it fills as if cold.")
    .source(SW846_3545A);
const TIME: Param =
    time("Time for a cell", (300.0, 3600.0), "Heating, static time, flush and purge.", SW846_3545A);
const POWER: Param = power((200.0, 1500.0), "On average; left out, no electricity is counted.");
const PURGE: Param = Param::quantity("purge", "Purge gas for a cell", Kind::Volume)
    .physical(0.0, 1.0)
    .usual(5e-4, 0.05)
    .hint("Nitrogen at 25 °C and 1 atm, blown through cell and vial; with it the loss is computed and the gas is counted.")
    .source(COMMON_PRACTICE);
const VIAL: Param = Param::quantity("vial", "Temperature in the vial while purging", Kind::Temperature)
    .default("25 °C", FROM_MEMORY)
    .physical(200.0, 400.0)
    .usual(278.15, 323.15)
    .with("purge")
    .hint("The gas leaves saturated at it.")
    .source(FROM_MEMORY);
const LOSS: Param = loss(
    "Share carried off by the purge gas",
    "5 %",
    0.14,
    "From experience; with purge it is computed instead. Purge gas can carry up to 14 % of the solvent off the collection vial; weigh the vial to know.",
)
.without("purge");
const LOST_TO: Param = lost_to("hood, or room when the vials vent into the room.");
const HOLD_UP: Param =
    held_by_marc("0.1 mL/g", (0.0, 1e-3), "After the purge, for each gram of what lies in the cell.");

const CHARGED: RuleIx = RuleIx(0);
const DISPERSED: RuleIx = RuleIx(1);
const EXTRACTED: RuleIx = RuleIx(2);
const LOST: RuleIx = RuleIx(3);
const HELD: RuleIx = RuleIx(4);
const HEATED: RuleIx = RuleIx(5);
const PURGED: RuleIx = RuleIx(6);

pub(super) static TECHNIQUE: Technique = Technique {
    key: "pressurised-liquid",
    title: "Pressurised liquid extraction",
    about: "Hot solvent under pressure fills the cell's void, is flushed through and blown out with gas. Volumes are those \
            of cold solvent; with the cell's temperature the void takes what expands to fill it. With the purge gas the loss is what \
            leaves with it saturated, else a share from experience.",
    group: Group::Extraction,
    takes_feed: Some(Place::MARC),
    params: &[
        SOLVENT,
        CELL,
        VOID,
        FLUSH,
        LINES,
        USED,
        TEMPERATURE,
        DISPERSANT,
        DISPERSANT_MASS,
        TIME,
        POWER,
        EXTRACTS,
        LOSS,
        PURGE,
        VIAL,
        LOST_TO,
        HOLD_UP,
    ],
    rules: &[
        Rule::new("charge", "mᵢ = V φᵢ ρᵢ, V = V_cell (ε ρ_hot / ρ_cold + f) + V_lines", SW846_3545A),
        Rule::new("dispersant", "m", MASS_BALANCE),
        Rule::new("extracted", "mᵢ = sᵢ mᵢ(marc)", MASS_BALANCE),
        Rule::new(
            "carried off by the purge",
            "mᵢ = s mᵢ(liquor); with a purge mᵢ = V pᵢ Mᵢ / (R T) · P / (P − Σp)",
            BATCH_RULE,
        )
        .measurable(),
        Rule::new("held in the marc", "mᵢ = (h m_marc / V_liquor) mᵢ(liquor)", FROM_MEMORY).measurable(),
        Rule::new("heating and pumping", "W = P t, no less than m c ΔT", DEFINITION).metered(),
        Rule::new("purge gas", "m = V p M / (R T), 25 °C and 1 atm", DEFINITION),
    ],
    cautions: &[PRESSURE_VESSEL, HEATED_FLAMMABLE],
    example: r#"{ "step": "pressurised-liquid", "solvent": { "n-hexane": "50 %", "acetone": "50 %" }, "cell": "33 mL",
        "dispersant": "diatomaceous earth", "dispersant_mass": "8 g", "lines": "5 mL", "temperature": "100 °C", "purge": "3 L",
        "time": "20 min", "power": "700 W" }"#,
    read: |r| {
        let dispersant = r.optional_material(&DISPERSANT);
        let mass = r.optional(&DISPERSANT_MASS);
        if dispersant.is_some() && mass.is_none() {
            r.problem("dispersant_mass", "a dispersant without its mass", "its mass, such as \"8 g\"");
        }
        let solvent = r.mixture(&SOLVENT);
        let (purge, vial) = (r.optional(&PURGE), r.optional(&VIAL));
        let purge = purge.zip(vial).and_then(|p| r.known("nitrogen").map(|m| (m, p)));
        let vapours = Vapours::read(r, None);
        if purge.is_some() {
            vapours.warn_unknown(r, "purge");
        }
        Box::new(PressurisedLiquid {
            solvent,
            vapours,
            temperature: r.optional(&TEMPERATURE),
            purge,
            bench_k: r.bench_temperature_k(),
            cell: r.quantity(&CELL),
            void: r.quantity(&VOID),
            flush: r.quantity(&FLUSH),
            lines: r.optional(&LINES),
            used: r.optional(&USED),
            dispersant: dispersant.zip(mass),
            time: r.optional(&TIME),
            power: r.power(&POWER),
            extracts: r.taken_out(&EXTRACTS),
            loss: r.optional(&LOSS),
            lost_to: r.place(&LOST_TO),
            hold_up: r.quantity(&HOLD_UP),
        })
    },
};

struct PressurisedLiquid {
    solvent: Mixture,
    cell: In,
    void: In,
    flush: In,
    lines: Option<In>,
    used: Option<In>,
    dispersant: Option<(Material, In)>,
    time: Option<In>,
    power: Option<In>,
    extracts: Vec<(Material, In)>,
    loss: Option<In>,
    vapours: Vapours,
    temperature: Option<In>,
    /// Nitrogen, its volume and the vial's temperature.
    purge: Option<(Material, (In, In))>,
    bench_k: f64,
    lost_to: Place,
    hold_up: In,
}

impl Step for PressurisedLiquid {
    fn run(&self, x: Draw<'_>, b: &mut Bench<'_>) -> Result<(), Halt> {
        b.need(Place::MARC)?;
        if let Some((material, mass)) = self.dispersant {
            b.charge(Place::STORE, Place::MARC, material, x.get(mass), DISPERSED)?;
        }
        let marc_kg = b.mass_kg(Place::MARC);
        let volume_m3 = match self.used {
            Some(used) => x.get(used),
            None => {
                let lines_m3 = self.lines.map_or(0.0, |l| x.get(l));
                b.note(CHARGED, "V_cell", x.get(self.cell), Kind::Volume);
                b.note(CHARGED, "ε", x.get(self.void), Kind::Fraction);
                b.note(CHARGED, "f", x.get(self.flush), Kind::Fraction);
                b.note(CHARGED, "V_lines", lines_m3, Kind::Volume);
                let lighter = self.lighter(x)?;
                b.note(CHARGED, "ρ_hot / ρ_cold", lighter, Kind::Number);
                // V = V_cell (ε ρ_hot / ρ_cold + f) + V_lines
                x.get(self.cell) * (x.get(self.void) * lighter + x.get(self.flush)) + lines_m3
            }
        };
        let before_kg = b.mass_kg(Place::LIQUOR);
        self.solvent.charge(x, b, Place::LIQUOR, volume_m3, CHARGED)?;
        let solvent_kg = b.mass_kg(Place::LIQUOR) - before_kg;
        super::extract(x, b, &self.extracts, Place::MARC, Place::LIQUOR, EXTRACTED)?;
        let time_s = self.time.map(|t| x.get(t));
        if let Some(time_s) = time_s {
            b.release_over(time_s);
        }
        if let Some((nitrogen, (volume, vial))) = self.purge {
            let (gas_m3, vial_k) = (x.get(volume), x.get(vial));
            // The gas is metered at 25 °C and leaves at the vial's temperature.
            let liquor = self.vapours.lying(b, Place::LIQUOR);
            self.vapours.tell(b, &liquor, LOST);
            let (lost, sum_pa) = self.vapours.carried_off(x, &liquor, gas_m3 * vial_k / METER_K, vial_k)?;
            b.note(LOST, "V", gas_m3, Kind::Volume);
            b.note(LOST, "T", vial_k, Kind::Temperature);
            b.note(LOST, "Σp", sum_pa, Kind::Pressure);
            let (parts, count) = self.vapours.parts(&lost);
            b.split(Place::LIQUOR, self.lost_to, &parts[..count], LOST)?;
            b.note(PURGED, "V", gas_m3, Kind::Volume);
            // m = V p M / (R T)
            b.charge(Place::STORE, self.lost_to, nitrogen, gas_m3 * NITROGEN_KG_M3, PURGED)?;
        } else {
            let loss = self.loss.map_or(0.0, |s| x.get(s));
            b.note(LOST, "s", loss, Kind::Fraction);
            // mᵢ = s mᵢ(liquor)
            b.share_volatile(Place::LIQUOR, self.lost_to, loss, LOST)?;
        }
        super::hold_up(b, x.get(self.hold_up), marc_kg, HELD)?;
        let floor_j = match self.temperature {
            Some(t) if volume_m3 > 0.0 => {
                // At the least what fills the cell once is warmed: V_cell ε ρ_hot / ρ_cold of the volume charged.
                let once = x.get(self.cell) * x.get(self.void) * self.lighter(x)? / volume_m3;
                let once = if once < 1.0 { once } else { 1.0 };
                Some(least_warming_j(once * solvent_kg, self.bench_k, x.get(t)))
            }
            _ => None,
        };
        super::electricity(x, b, self.power, time_s, floor_j, HEATED);
        Ok(())
    }
}

impl PressurisedLiquid {
    /// How much lighter the solvent is in the hot cell than at the bench: ρ_hot / ρ_cold; 1 where no temperature is stated.
    fn lighter(&self, x: Draw<'_>) -> Result<f64, Halt> {
        let Some(temperature) = self.temperature else { return Ok(1.0) };
        let mut kg = [0.0; super::LARGEST];
        for (part, mass) in self.solvent.parts.iter().zip(self.solvent.masses_kg(x, 1.0)) {
            self.vapours.add(&mut kg, part.material, mass);
        }
        let temperature_k = x.get(temperature);
        let hot = self.vapours.density_kg_m3(&kg, temperature_k);
        match hot.zip(self.vapours.density_kg_m3(&kg, self.bench_k)) {
            Some((hot, cold)) => Ok(hot / cold),
            None => Err(Halt::OutOfRange {
                of: "temperature of the cell in K",
                value: temperature_k,
                allowed: "one at which the density of every solvent in it is known, or the solvent used",
            }),
        }
    }
}
