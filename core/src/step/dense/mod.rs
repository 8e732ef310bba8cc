//! What the techniques with dense CO2 share: the vessel, the circuit around it, the supply, and what is shown of them.

pub(super) mod circuit;
mod shown;
pub(super) mod supply;
pub(super) mod vessel;

pub use shown::{DenseCo2, Metered};

use self::circuit::{Circuit, Recovered, State};
use self::vessel::Vessel;
use super::{Param, Rule};
use crate::chance::{Draw, In};
use crate::co2_loop::Scratch;
use crate::ledger::{Bench, Halt, Material, Place, RuleIx, Utility};
use crate::quantity::Kind;
use crate::source::{Source, Standing};

pub(super) const SPAN_WAGNER: Source =
    Source::new("Span and Wagner 1996, J. Phys. Chem. Ref. Data 25, 1509", Standing::Secondary);

pub(super) const TEMPERATURE: Param =
    Param::quantity("temperature", "Temperature in the vessel", Kind::Temperature)
        .required()
        .physical(216.592, 1100.0)
        .usual(304.0, 400.0)
        .hint("Of the CO2 while it works.")
        .source(SPAN_WAGNER);
pub(super) const PRESSURE: Param = Param::quantity("pressure", "Pressure in the vessel", Kind::Pressure)
    .required()
    .physical(1e5, 8e8)
    .usual(7.4e6, 6e7)
    .hint("Absolute.")
    .source(SPAN_WAGNER);

/// Parameters of several files in one list.
pub(super) const fn params<const N: usize>(parts: &[&[Param]]) -> [Param; N] {
    let mut all = [TEMPERATURE; N];
    let (mut done, mut part) = (0, 0);
    while part < parts.len() {
        let mut i = 0;
        while i < parts[part].len() {
            all[done] = parts[part][i];
            done += 1;
            i += 1;
        }
        part += 1;
    }
    assert!(done == N, "the list is as long as its parts");
    all
}

/// Rules of a technique with those of the circuit behind them.
pub(super) const fn rules<const N: usize>(own: &[Rule]) -> [Rule; N] {
    let mut all = [circuit::RULES[0]; N];
    let mut i = 0;
    while i < N {
        all[i] = if i < own.len() { own[i] } else { circuit::RULES[i - own.len()] };
        i += 1;
    }
    assert!(N == own.len() + circuit::RULES.len(), "the list is as long as its parts");
    all
}

/// The places of the rules in a technique's list.
pub(super) struct Rules {
    pub(super) filled: RuleIx,
    pub(super) flowed: RuleIx,
    pub(super) swept: RuleIx,
    pub(super) leaked: RuleIx,
    pub(super) let_down: RuleIx,
    pub(super) returned: RuleIx,
}

/// A vessel of dense CO2 with its circuit.
pub(super) struct Chamber {
    pub(super) co2: Material,
    pub(super) state: State,
    pub(super) vessel: Vessel,
    pub(super) circuit: Circuit,
    pub(super) rules: Rules,
}

impl Chamber {
    /// Brings the vessel to its state; what it held more of in the stage before passes on. Returns what is drawn; kg.
    pub(super) fn fill(&self, x: Draw<'_>, b: &mut Bench<'_>, void_m3: f64) -> Result<f64, Halt> {
        let (temperature_k, pressure_pa) = (x.get(self.state.0), x.get(self.state.1));
        // The circuit asks for the same state again.
        let density_kg_m3 = b.states().state(temperature_k, pressure_pa)?.density_kg_m3;
        let rule = self.rules.filled;
        b.note(rule, "T", temperature_k, Kind::Temperature);
        b.note(rule, "p", pressure_pa, Kind::Pressure);
        b.note(rule, "ρ", density_kg_m3, Kind::Density);
        // m = V_void ρ(T, p) less what is there
        let missing_kg = void_m3 * density_kg_m3 - b.there(Place::VAPOUR, self.co2);
        let (drawn_kg, over_kg) = if missing_kg > 0.0 { (missing_kg, 0.0) } else { (0.0, -missing_kg) };
        b.charge(Place::STORE, Place::VAPOUR, self.co2, drawn_kg, rule)?;
        b.take(Place::VAPOUR, self.circuit.passed_to(), self.co2, over_kg, self.rules.swept)?;
        Ok(drawn_kg)
    }

    /// Passes CO2 through the vessel: drawn and vented, or sent round with its leaks.
    pub(super) fn pass(&self, x: Draw<'_>, b: &mut Bench<'_>, passed_kg: f64) -> Result<(), Halt> {
        b.spend(Utility::CirculatedCo2, passed_kg, self.rules.flowed);
        if self.circuit.recycled {
            return self.leak(x, b, passed_kg);
        }
        b.charge(Place::STORE, Place::VAPOUR, self.co2, passed_kg, self.rules.flowed)?;
        b.take(Place::VAPOUR, self.circuit.vent_to, self.co2, passed_kg, self.rules.swept)?;
        Ok(())
    }

    /// What leaks of a flow, made up from the supply.
    pub(super) fn leak(&self, x: Draw<'_>, b: &mut Bench<'_>, flow_kg: f64) -> Result<(), Halt> {
        let share = self.circuit.leak.map_or(0.0, |s| x.get(s));
        b.note(self.rules.leaked, "s", share, Kind::Fraction);
        b.note(self.rules.leaked, "m_flow", flow_kg, Kind::Mass);
        // m = s m_flow
        b.charge(Place::STORE, self.circuit.vent_to, self.co2, share * flow_kg, self.rules.leaked)?;
        Ok(())
    }

    /// CO2 that stays with the extract or in the goods: a mass for each mass that lies there.
    pub(super) fn keep(
        &self,
        x: Draw<'_>,
        b: &mut Bench<'_>,
        share: Option<In>,
        with: Place,
        rule: RuleIx,
    ) -> Result<(), Halt> {
        let Some(share) = share else { return Ok(()) };
        let lying_kg = b.mass_kg(with);
        let there_kg = b.there(Place::VAPOUR, self.co2);
        b.note(rule, "c", x.get(share), Kind::MassPerMass);
        b.note(rule, "m", lying_kg, Kind::Mass);
        // m = c m_lying, at most what is there
        let kg = x.get(share) * lying_kg;
        b.split(Place::VAPOUR, with, &[(self.co2, if kg > there_kg { there_kg } else { kg })], rule)?;
        Ok(())
    }

    /// Lets the vessel down: vented as a whole, or recovered down to the let-down state and vented from there. Returns what a
    /// compressor takes below the receiver's pressure.
    pub(super) fn let_down(
        &self,
        x: Draw<'_>,
        b: &mut Bench<'_>,
        void_m3: f64,
    ) -> Result<Option<Recovered>, Halt> {
        let (rule, vent_to) = (self.rules.let_down, self.circuit.vent_to);
        b.release_over(self.vessel.let_down_s(x));
        if !self.circuit.recycled {
            b.note(rule, "m(vessel)", b.there(Place::VAPOUR, self.co2), Kind::Mass);
            b.all(Place::VAPOUR, vent_to, self.co2, rule);
            return Ok(None);
        }
        if let Some(claim) = self.circuit.claim {
            b.note(rule, "said to come back", x.get(claim), Kind::Fraction);
        }
        let kg = self.vessel.vented_kg(x, b, void_m3, rule)?;
        let there_kg = b.there(Place::VAPOUR, self.co2);
        let recovered = self.recovered(x, b, void_m3, kg)?;
        b.split(Place::VAPOUR, vent_to, &[(self.co2, if kg > there_kg { there_kg } else { kg })], rule)?;
        b.all(Place::VAPOUR, Place::STORE, self.co2, self.rules.returned);
        Ok(recovered)
    }

    fn recovered(
        &self,
        x: Draw<'_>,
        b: &mut Bench<'_>,
        void_m3: f64,
        left_kg: f64,
    ) -> Result<Option<Recovered>, Halt> {
        let (Some(receiver_pa), Some((t, p))) = (self.circuit.receiver_pa(x), self.vessel.state) else {
            return Ok(None);
        };
        if self.circuit.stages == 0 {
            return Ok(None);
        }
        let (temperature_k, pressure_pa) = (x.get(t), x.get(p));
        let kg = if pressure_pa < receiver_pa {
            // m = V_void (ρ(T_l, p_receiver) − ρ(T_l, p_l))
            void_m3 * b.states().density_kg_m3(temperature_k, receiver_pa)? - left_kg
        } else {
            0.0
        };
        Ok(Some(Recovered { kg: if kg > 0.0 { kg } else { 0.0 }, temperature_k, pressure_pa }))
    }

    /// How many states a run asks for at most: of fill, meter and let-down, of the circuit, of a compressor.
    pub(super) fn states(&self) -> usize {
        12 + 2 * self.circuit.stages as usize
    }

    /// What is shown of the step beside its postings, for a single run.
    pub(super) fn shown(&self, x: Draw<'_>) -> Option<DenseCo2> {
        let mut scratch = Scratch::default();
        self.circuit.legs(x, &mut scratch).ok()?;
        let (temperature_k, pressure_pa) = (x.get(self.state.0), x.get(self.state.1));
        let let_down = self.vessel.state.map(|(t, p)| (x.get(t), x.get(p)));
        DenseCo2::of(self.circuit.recycled, (temperature_k, pressure_pa), let_down, scratch.legs)
    }
}
