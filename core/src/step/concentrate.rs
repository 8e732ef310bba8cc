//! Taking an extract down: rotary evaporator, Kuderna-Danish, nitrogen stream; what is caught and what goes to air.

use super::caution::{EVAPORATED_TO_AIR, HEATED_FLAMMABLE, PEROXIDES};
use super::{Control, Group, Param, Rule, Step, Technique};
use crate::chance::{Draw, In};
use crate::ledger::{Bench, Halt, Material, Place, RuleIx};
use crate::program::Reader;
use crate::quantity::Kind;
use crate::source::{COMMON_PRACTICE, DEFINITION, FROM_MEMORY, MASS_BALANCE, Source, Standing};

const ROTARY: &str = "rotary evaporator";
const KUDERNA: &str = "Kuderna-Danish";
const NITROGEN: &str = "nitrogen stream";
const IDEAL_GAS: Source = Source::new("ideal gas law, R of CODATA 2018", Standing::Definition);

const BY: Param = Param::new("by", "By", Control::Choice(&[ROTARY, KUDERNA, NITROGEN]))
    .required()
    .hint("An open Kuderna-Danish and a nitrogen stream send all they evaporate to air.");
const TO: Param = Param::quantity("to", "Volume left", Kind::Volume)
    .required()
    .physical(0.0, 10.0)
    .usual(1e-7, 0.01)
    .hint("Of liquid; what is dissolved in it stays.")
    .source(COMMON_PRACTICE);
const CONDENSATE: Param = Param::new("condensate", "Condensate goes to", Control::Place)
    .hint("A stream, or store where it is used again.");
const LOSS: Param = Param::quantity("loss", "Share past the condenser", Kind::Fraction)
    .default("5 %", FROM_MEMORY)
    .physical(0.0, 1.0)
    .usual(0.0, 0.3)
    .when("by", &[ROTARY])
    .hint("Of what evaporates. Weigh the condensate to know.")
    .source(FROM_MEMORY);
const CAUGHT: Param = Param::quantity("caught", "Share caught by a recovery condenser", Kind::Fraction)
    .default("0 %", COMMON_PRACTICE)
    .physical(0.0, 1.0)
    .when("by", &[KUDERNA])
    .hint("An open Snyder column catches nothing; say what a recovery condenser brings back.")
    .source(COMMON_PRACTICE);
const GAS_FLOW: Param = Param::quantity("gas_flow", "Nitrogen flow", Kind::VolumeFlow)
    .physical(0.0, 1.0)
    .usual(1e-6, 1e-3)
    .when("by", &[NITROGEN])
    .with("time")
    .hint("At 25 °C and 1 atm, for one sample; left out, no nitrogen is counted.")
    .source(COMMON_PRACTICE);
const LOST_TO: Param = Param::new("lost_to", "To air by", Control::Place)
    .default("hood", COMMON_PRACTICE)
    .hint("hood, room, or destroyed where an abatement device takes it.");
const TIME: Param = Param::quantity("time", "Time", Kind::Time)
    .physical(0.0, 1e6)
    .usual(60.0, 14_400.0)
    .hint("For one run of the step.")
    .source(COMMON_PRACTICE);
const POWER: Param = Param::quantity("power", "Power drawn", Kind::Power)
    .physical(0.0, 1e6)
    .usual(0.0, 3000.0)
    .with("time")
    .hint("Bath, rotation, pump and chiller on average; \"0 W\" for an unheated stream; left out, electricity is not compared.")
    .source(FROM_MEMORY);

const EVAPORATED: RuleIx = RuleIx(0);
const LOST: RuleIx = RuleIx(1);
const CONDENSED: RuleIx = RuleIx(2);
const BLOWN: RuleIx = RuleIx(3);
const HEATED: RuleIx = RuleIx(4);

/// Nitrogen at 25 °C and 101 325 Pa as an ideal gas: ρ = p M / (R T); kg/m³.
const NITROGEN_KG_M3: f64 = 101_325.0 * 0.028_013_4 / (8.314_462_618 * 298.15);

pub(super) static TECHNIQUE: Technique = Technique {
    key: "concentrate",
    title: "Concentration",
    about: "Solvent is evaporated until the stated volume is left. Solvents and water are taken to evaporate in the \
            proportion in which they are there, which overstates the less volatile one; the share that passes the \
            condenser is a stated one, to be replaced by weighing the condensate.",
    group: Group::Extract,
    takes_feed: None,
    params: &[BY, TO, CONDENSATE, LOSS, CAUGHT, GAS_FLOW, LOST_TO, TIME, POWER],
    rules: &[
        Rule::new("evaporated", "mᵢ = (1 − V_left / V) mᵢ(liquor)", MASS_BALANCE),
        Rule::new("lost past the condenser", "mᵢ = s mᵢ(vapour)", FROM_MEMORY).measurable(),
        Rule::new("condensed", "what is left of the vapour", MASS_BALANCE),
        Rule::new("nitrogen blown through", "m = q t p M / (R T), 25 °C and 1 atm", IDEAL_GAS),
        Rule::new("heating and pumping", "W = P t", DEFINITION).metered(),
    ],
    cautions: &[HEATED_FLAMMABLE, PEROXIDES, EVAPORATED_TO_AIR],
    example: r#"{ "step": "concentrate", "by": "rotary evaporator", "to": "5 mL", "condensate": "elsewhere", "time": "20 min",
        "power": "1.3 kW" }"#,
    read,
};

struct Concentrate {
    to: In,
    condensate: Place,
    /// Share of the vapour that goes to air.
    loss: Loss,
    gas: Option<(Material, In)>,
    lost_to: Place,
    time: Option<In>,
    power: Option<In>,
}

enum Loss {
    Share(In),
    AllBut(In),
    All,
}

fn read(r: &mut Reader<'_, '_>) -> Box<dyn Step> {
    let by = r.choice(&BY);
    let to = r.quantity(&TO);
    let condensate = r.optional_place(&CONDENSATE);
    let (share, caught, flow) = (r.optional(&LOSS), r.optional(&CAUGHT), r.optional(&GAS_FLOW));
    let catches = caught.is_some_and(|c| r.value(c) > 0.0);
    if !r.written("condensate") && (by == ROTARY || catches) {
        r.problem(
            "condensate",
            "nothing says where the condensate goes",
            "a stream, or store where it is used again",
        );
    }
    let loss = match (by, share, caught) {
        (ROTARY, Some(share), _) => Loss::Share(share),
        (KUDERNA, _, Some(caught)) => Loss::AllBut(caught),
        _ => Loss::All,
    };
    let lost_to = r.place(&LOST_TO);
    let time = r.optional(&TIME);
    let gas = flow.and_then(|flow| r.known("nitrogen").map(|m| (m, flow)));
    Box::new(Concentrate {
        to,
        condensate: condensate.unwrap_or(lost_to),
        loss,
        gas,
        lost_to,
        time,
        power: r.power(&POWER),
    })
}

impl Step for Concentrate {
    fn run(&self, x: Draw<'_>, b: &mut Bench<'_>) -> Result<(), Halt> {
        b.need(Place::LIQUOR)?;
        // What evaporates passes the vapour place: CO2 still in a vessel must not end in the condensate.
        b.need_empty(Place::VAPOUR)?;
        let (there_m3, wanted_m3) = (b.liquid_volume_m3(Place::LIQUOR), x.get(self.to));
        if wanted_m3 > there_m3 {
            return Err(Halt::NotReached { wanted_m3, there_m3 });
        }
        b.note(EVAPORATED, "V_left", wanted_m3, Kind::Volume);
        b.note(EVAPORATED, "V", there_m3, Kind::Volume);
        // mᵢ = (1 − V_left / V) mᵢ(liquor)
        let share = if there_m3 > 0.0 { 1.0 - wanted_m3 / there_m3 } else { 0.0 };
        b.share_volatile(Place::LIQUOR, Place::VAPOUR, share, EVAPORATED)?;

        if let Some(time) = self.time {
            b.release_over(x.get(time));
        }
        let lost = match self.loss {
            Loss::Share(share) => x.get(share),
            Loss::AllBut(caught) => 1.0 - x.get(caught),
            Loss::All => 1.0,
        };
        b.note(LOST, "s", lost, Kind::Fraction);
        // mᵢ = s mᵢ(vapour)
        b.share_volatile(Place::VAPOUR, self.lost_to, lost, LOST)?;
        b.sweep(Place::VAPOUR, self.condensate, CONDENSED);

        if let (Some((nitrogen, flow)), Some(time)) = (self.gas, self.time) {
            b.note(BLOWN, "q", x.get(flow), Kind::VolumeFlow);
            b.note(BLOWN, "t", x.get(time), Kind::Time);
            // m = q t p M / (R T)
            let kg = x.get(flow) * x.get(time) * NITROGEN_KG_M3;
            b.charge(Place::STORE, self.lost_to, nitrogen, kg, BLOWN)?;
        }
        super::electricity(x, b, self.power, self.time.map(|t| x.get(t)), None, HEATED);
        Ok(())
    }
}
