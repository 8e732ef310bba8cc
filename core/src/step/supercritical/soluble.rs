//! What the CO2 dissolves of what is sought, and how it comes out: held against what the plan passes through the vessel.

use crate::chance::{Draw, In};
use crate::dense_gas::chrastil::{self, Chrastil};
use crate::dense_gas::need::{Curve, Solubility, Target};
use crate::dense_gas::search::Window;
use crate::dense_gas::{hot_ball, sovova, vegetable_oil};
use crate::ledger::{Bench, Material, Place, RuleIx};
use crate::program::Reader;
use crate::quantity::Kind;
use crate::source::COMMON_PRACTICE;
use crate::step::{Control, Param};

const NOT_STATED: &str = "not stated";
const OIL: &str = "vegetable oil";
const CHRASTIL: &str = "Chrastil";

const SOLUBILITY: Param = Param::new("solubility", "Solubility by", Control::Choice(&[NOT_STATED, OIL, CHRASTIL]))
    .default(NOT_STATED, COMMON_PRACTICE)
    .hint("vegetable oil: del Valle and Aguilera, in their range alone; Chrastil: your constants, or fitted to your points.")
    .source(vegetable_oil::SOURCE);
const K: Param = Param::quantity("chrastil_k", "Constant k", Kind::Number)
    .required()
    .physical(0.1, 50.0)
    .when("solubility", &[CHRASTIL])
    .hint("Of S = ρᵏ exp(a/T + b) with S and ρ in kg/m³ and T in K; other units have other constants.")
    .source(chrastil::SOURCE);
const A: Param = Param::quantity("chrastil_a", "Constant a, in K", Kind::Number)
    .required()
    .physical(-50_000.0, 50_000.0)
    .when("solubility", &[CHRASTIL])
    .hint("As a rule negative.")
    .source(chrastil::SOURCE);
const B: Param = Param::quantity("chrastil_b", "Constant b", Kind::Number)
    .required()
    .physical(-500.0, 500.0)
    .when("solubility", &[CHRASTIL])
    .hint("With S and ρ in kg/m³.")
    .source(chrastil::SOURCE);
const SOUGHT: Param = Param::new("sought", "What dissolves", Control::Material)
    .required()
    .when("solubility", &[OIL, CHRASTIL])
    .hint("A material of extracts: what is taken out of it is held against the solubility.");
const INTACT: Param = Param::quantity("intact", "Share of it in intact cells", Kind::Fraction)
    .physical(0.0, 0.99)
    .when("solubility", &[OIL, CHRASTIL])
    .hint("At the start, by Sovová; left out, the CO2 leaves saturated to the end, the least that solubility allows.")
    .source(sovova::SOURCE);
const FAST: Param = Param::quantity("fast", "Z of the fast period", Kind::Number)
    .physical(1e-3, 1e4)
    .with("intact")
    .hint("Film around broken cells; from your own extraction curve.")
    .source(sovova::SOURCE);
const SLOW: Param = Param::quantity("slow", "W of the slow period", Kind::Number)
    .physical(1e-6, 1e3)
    .with("intact")
    .hint("Walls of intact cells; from your own extraction curve.")
    .source(sovova::SOURCE);
const DIFFUSION: Param = Param::quantity("diffusion_time", "Diffusion time r²/(π² D)", Kind::Time)
    .physical(1e-3, 1e8)
    .usual(60.0, 1e5)
    .hint("Of the hot-ball model: late in the extraction, what is left falls to a third (1/e) in it. It holds where particles, not solubility, decide.")
    .source(hot_ball::SOURCE);
const RATED_PRESSURE: Param = Param::quantity("rated_pressure", "Highest pressure for the vessel", Kind::Pressure)
    .physical(1e5, 8e8)
    .hint("Its rating at the highest temperature, less the margin to its relief: ends the search for the best state.")
    .source(COMMON_PRACTICE);
const RATED_TEMPERATURE: Param =
    Param::quantity("rated_temperature", "Highest temperature for vessel and extract", Kind::Temperature)
        .physical(250.0, 1100.0)
        .hint("Ends the search for the best state.")
        .source(COMMON_PRACTICE);

pub(super) const PARAMS: [Param; 11] =
    [SOLUBILITY, K, A, B, SOUGHT, INTACT, FAST, SLOW, DIFFUSION, RATED_PRESSURE, RATED_TEMPERATURE];

/// The solubility of one step.
pub(super) struct Soluble {
    law: Option<Law>,
    sought: Option<Material>,
    curve: Option<[In; 3]>,
    diffusion: Option<In>,
    rated: (Option<In>, Option<In>),
}

#[derive(Clone, Copy)]
enum Law {
    Oil,
    Chrastil([In; 3]),
}

impl Soluble {
    pub(super) fn read(r: &mut Reader<'_, '_>, state: (In, In)) -> Self {
        let word = r.choice(&SOLUBILITY);
        let constants = (r.optional(&K), r.optional(&A), r.optional(&B));
        let law = match (word, constants) {
            (OIL, _) => Some(Law::Oil),
            (CHRASTIL, (Some(k), Some(a), Some(b))) => Some(Law::Chrastil([k, a, b])),
            _ => None,
        };
        let sought = r.optional_material(&SOUGHT);
        let curve = [&INTACT, &FAST, &SLOW].map(|p| r.optional(p));
        if curve[0].is_some() {
            for p in [&FAST, &SLOW] {
                if !r.written(p.key) {
                    r.problem(
                        p.key,
                        "intact is given without Z and W of the curve",
                        "a number from your own curve",
                    );
                }
            }
        }
        let diffusion = r.optional(&DIFFUSION);
        let rated = (r.optional(&RATED_PRESSURE), r.optional(&RATED_TEMPERATURE));
        for (key, slot, rating) in [("pressure", state.1, rated.0), ("temperature", state.0, rated.1)] {
            if let Some(rating) = rating
                && r.value(slot) > r.value(rating)
            {
                r.problem(
                    key,
                    format!("the {key} is above rated_{key}"),
                    "a state that the vessel is rated for",
                );
            }
        }
        let curve = match curve {
            [Some(intact), Some(fast), Some(slow)] => Some([intact, fast, slow]),
            _ => None,
        };
        Self { law, sought, curve, diffusion, rated }
    }

    fn law(&self, x: Draw<'_>) -> Option<Solubility> {
        Some(match self.law? {
            Law::Oil => Solubility::VegetableOil,
            Law::Chrastil(slots) => {
                let [k, a_k, b] = slots.map(|s| x.get(s));
                Solubility::Chrastil(Chrastil { k, a_k, b, range: None })
            }
        })
    }

    fn curve(&self, x: Draw<'_>) -> Curve {
        self.curve.map_or(Curve::Saturated, |slots| {
            let [intact_share, fast, slow] = slots.map(|s| x.get(s));
            Curve::BrokenAndIntact { intact_share, fast, slow }
        })
    }

    /// What is asked of solubility and curve, with what was noted of the feed: solute and recovery.
    pub(super) fn target(&self, x: Draw<'_>) -> Option<(Solubility, Curve)> {
        Some((self.law(x)?, self.curve(x)))
    }

    /// Where a better state may be sought: up to the ratings, from 10 K and a quarter below.
    pub(super) fn window(&self, x: Draw<'_>, (temperature_k, pressure_pa): (f64, f64)) -> Option<Window> {
        let (high_pa, high_k) = (self.rated.0?, self.rated.1?);
        let low_k = if temperature_k < 308.15 { temperature_k } else { 308.15 };
        let low_pa = if pressure_pa < 10e6 { pressure_pa } else { 10e6 };
        Some(Window { temperature_k: [low_k, x.get(high_k)], pressure_pa: [low_pa, x.get(high_pa)] })
    }

    /// Notes what diffusion out of the particles asks for by the hot-ball model, in a run that is traced, and doubts a plan that
    /// allows less time.
    pub(super) fn diffuse(
        &self,
        x: Draw<'_>,
        b: &mut Bench<'_>,
        extracts: &[(Material, In)],
        (time_s, passed_kg): (f64, f64),
        rule: RuleIx,
    ) {
        let (true, Some(slot)) = (b.traced(), self.diffusion) else { return };
        b.note(rule, "r²/(π² D)", x.get(slot), Kind::Time);
        for (_, share) in extracts {
            let share = x.get(*share);
            // Everything takes no finite time by the model.
            let recovery = if share < 1.0 { share } else { 1.0 - 1e-9 };
            let Ok(reduced) = hot_ball::reduced_time_for(recovery) else { continue };
            // t = t_r r²/(π² D)
            let least_s = reduced * x.get(slot);
            b.note(rule, "t, by diffusion", least_s, Kind::Time);
            b.note(rule, "m_CO2, by diffusion", passed_kg * least_s / time_s, Kind::Mass);
            if time_s < least_s * (1.0 - 1e-9) {
                b.doubt(
                    rule,
                    "more is taken out than diffusion lets out of the particles in the dynamic time, which would take",
                    least_s,
                    Kind::Time,
                    "more time, finer particles, or a smaller share taken out",
                );
            }
        }
    }

    /// Notes what the solubility asks for, in a run that is traced, and doubts a plan that passes less.
    pub(super) fn hold(
        &self,
        x: Draw<'_>,
        b: &mut Bench<'_>,
        extracts: &[(Material, In)],
        (temperature_k, pressure_pa): (f64, f64),
        passed_kg: f64,
        rule: RuleIx,
    ) {
        for (symbol, slot, kind) in
            [("p_rated", self.rated.0, Kind::Pressure), ("T_rated", self.rated.1, Kind::Temperature)]
        {
            if let Some(slot) = slot {
                b.note(rule, symbol, x.get(slot), kind);
            }
        }
        let (true, Some(law), Some(sought)) = (b.traced(), self.law(x), self.sought) else { return };
        let Some(share) = extracts.iter().find(|(m, _)| *m == sought).map(|(_, s)| x.get(*s)) else {
            b.doubt(
                rule,
                "nothing is taken out of what the solubility is stated for:",
                0.0,
                Kind::Fraction,
                "sought among extracts",
            );
            return;
        };
        let solute_kg = b.there(Place::MARC, sought);
        let solid_kg = b.mass_kg(Place::MARC) - solute_kg;
        // x₀ = m_solute/m_solid
        let solute_kg_kg = solute_kg / solid_kg;
        b.note(rule, "x₀", solute_kg_kg, Kind::MassPerMass);
        b.note(rule, "R", share, Kind::Fraction);
        let Ok(loading) = law.loading_kg_kg(temperature_k, pressure_pa) else {
            b.doubt(
                rule,
                "the state is outside the range of the solubility, which is not extrapolated; the pressure is",
                pressure_pa,
                Kind::Pressure,
                "a state inside the range (vegetable oils: 20 to 80 °C and 150 to 880 bar), or constants that hold here",
            );
            return;
        };
        b.note(rule, "y", loading, Kind::MassPerMass);
        for curve in [Curve::Saturated, self.curve(x)] {
            // A recovery of 100 % takes no finite amount by the curve.
            let recovery = if share < 1.0 { share } else { 1.0 - 1e-9 };
            let Ok(q) = (Target { solute_kg_kg, recovery, curve }).solvent_kg_kg(loading) else { continue };
            let least_kg = q * solid_kg;
            if curve == Curve::Saturated {
                // m = R x₀ m_solid/y
                b.note(rule, "m_CO2, saturated", least_kg, Kind::Mass);
                if passed_kg < least_kg * (1.0 - 1e-9) {
                    b.doubt(
                        rule,
                        "more is taken out than the CO2 passed through can dissolve, which would take at least",
                        least_kg,
                        Kind::Mass,
                        "more flow or time, another state, or a smaller share taken out",
                    );
                }
            } else {
                b.note(rule, "m_CO2, by the curve", least_kg, Kind::Mass);
            }
        }
    }
}
