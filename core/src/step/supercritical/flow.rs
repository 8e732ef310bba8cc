//! The dynamic flow: a volume at the state where it is metered, or a mass.

use crate::chance::{Draw, In};
use crate::ledger::{Bench, Halt, RuleIx};
use crate::program::Reader;
use crate::quantity::Kind;
use crate::source::{COMMON_PRACTICE, DEFINITION};
use crate::step::{Control, Param};

pub(super) const PUMP: &str = "pump head";
pub(super) const VENT: &str = "vent";
pub(super) const MASS: &str = "mass";

const METERED: Param = Param::new(
    "metered",
    "The flow is metered",
    Control::Choice(&[PUMP, VENT, MASS]),
)
.required()
.hint(
    "As liquid at the pump head, as gas at the vent, or by mass: the same litre is a different mass in each.",
);
const FLOW: Param = Param::quantity("flow", "Volume flow of CO2", Kind::VolumeFlow)
    .required()
    .physical(0.0, 1.0)
    .when("metered", &[PUMP, VENT])
    .hint("Of CO2 alone, at the state of the meter.")
    .source(COMMON_PRACTICE);
const MASS_FLOW: Param = Param::quantity("mass_flow", "Mass flow of CO2", Kind::MassFlow)
    .required()
    .physical(0.0, 1000.0)
    .when("metered", &[MASS])
    .hint("Of CO2 alone.")
    .source(COMMON_PRACTICE);
const METER_TEMPERATURE: Param =
    Param::quantity("meter_temperature", "Temperature at the meter", Kind::Temperature)
        .required()
        .physical(216.592, 1100.0)
        .when("metered", &[PUMP, VENT])
        .hint("A pump head at 20 °C instead of 4 °C meters 15 % less mass.")
        .source(COMMON_PRACTICE);
const METER_PRESSURE: Param = Param::quantity("meter_pressure", "Pressure at the meter", Kind::Pressure)
    .required()
    .physical(1e4, 8e8)
    .when("metered", &[PUMP, VENT])
    .hint("Absolute: the supply's at a pump head before compression, the extraction pressure after it.")
    .source(COMMON_PRACTICE);
const TIME: Param = Param::quantity("time", "Time of dynamic flow", Kind::Time)
    .required()
    .physical(0.0, 1e7)
    .usual(60.0, 86_400.0)
    .hint("Without static hold; \"0 min\" for a static extraction.")
    .source(DEFINITION);

pub(super) const PARAMS: [Param; 6] = [METERED, FLOW, MASS_FLOW, METER_TEMPERATURE, METER_PRESSURE, TIME];

/// The flow of one step.
pub(super) struct Flow {
    rate: Rate,
    at_pump: bool,
    time: In,
}

enum Rate {
    Volume { flow: In, temperature: In, pressure: In },
    Mass(In),
}

impl Flow {
    pub(super) fn read(r: &mut Reader<'_, '_>) -> Self {
        let at_pump = r.choice(&METERED) == PUMP;
        let (flow, mass) = (r.optional(&FLOW), r.optional(&MASS_FLOW));
        let (t, p) = (r.optional(&METER_TEMPERATURE), r.optional(&METER_PRESSURE));
        let rate = match (flow, t, p) {
            (Some(flow), Some(temperature), Some(pressure)) => Rate::Volume { flow, temperature, pressure },
            _ => Rate::Mass(mass.unwrap_or(In(0))),
        };
        Self { rate, at_pump, time: r.quantity(&TIME) }
    }

    /// Temperature and pressure of the pump's head, where the flow is metered there.
    pub(super) fn head(&self) -> Option<(In, In)> {
        match self.rate {
            Rate::Volume { temperature, pressure, .. } if self.at_pump => Some((temperature, pressure)),
            _ => None,
        }
    }

    /// Volume in a run, m³, where the flow is metered as a volume.
    pub(super) fn volume_m3(&self, x: Draw<'_>) -> f64 {
        match self.rate {
            Rate::Volume { flow, .. } => x.get(flow) * x.get(self.time),
            Rate::Mass(_) => f64::NAN,
        }
    }

    pub(super) fn time_s(&self, x: Draw<'_>) -> f64 {
        x.get(self.time)
    }

    /// What passes through the vessel; kg.
    pub(super) fn mass_kg(&self, x: Draw<'_>, b: &mut Bench<'_>, rule: RuleIx) -> Result<f64, Halt> {
        let time_s = x.get(self.time);
        b.note(rule, "t", time_s, Kind::Time);
        match self.rate {
            Rate::Mass(flow) => {
                b.note(rule, "q_m", x.get(flow), Kind::MassFlow);
                // m = q_m t
                Ok(x.get(flow) * time_s)
            }
            Rate::Volume { flow, temperature, pressure } => {
                let (temperature_k, pressure_pa) = (x.get(temperature), x.get(pressure));
                let density_kg_m3 = if self.head().is_some() {
                    // The circuit asks for the state of the head again.
                    b.states().state(temperature_k, pressure_pa)?.density_kg_m3
                } else {
                    b.states().density_kg_m3(temperature_k, pressure_pa)?
                };
                b.note(rule, "q", x.get(flow), Kind::VolumeFlow);
                b.note(rule, "T_m", temperature_k, Kind::Temperature);
                b.note(rule, "p_m", pressure_pa, Kind::Pressure);
                b.note(rule, "ρ_m", density_kg_m3, Kind::Density);
                // m = q t ρ(T_m, p_m)
                Ok(x.get(flow) * time_s * density_kg_m3)
            }
        }
    }
}
