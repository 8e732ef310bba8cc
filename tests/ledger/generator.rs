//! Plans made from nothing but a number: valid, varied, the same on every machine.

use serde_json::{Map, Value, json};
use thimbleworth::chance::keyed_bits;

/// A stream of numbers; the core's own generator, whose evenness is tested beside it.
pub(crate) struct Chance {
    key: u64,
    count: u64,
}

impl Chance {
    pub(crate) fn new(key: u64) -> Self {
        Self { key, count: 0 }
    }

    /// A whole number from `low` to `high`, both included.
    pub(crate) fn between(&mut self, low: u64, high: u64) -> u64 {
        self.count += 1;
        low + keyed_bits(self.key.wrapping_mul(0x9E37_79B9), self.count) % (high - low + 1)
    }

    pub(crate) fn one_in(&mut self, n: u64) -> bool {
        self.between(1, n) == 1
    }

    fn of<'a>(&mut self, words: &[&'a str]) -> &'a str {
        let i = self.between(0, words.len() as u64 - 1);
        words[usize::try_from(i).unwrap()]
    }
}

/// How the amounts of a plan are written.
#[derive(Clone, Copy, Debug)]
pub(crate) struct Style {
    /// 0, 1 or 2: which of the units that mean the same.
    pub(crate) units: usize,
    /// Whether amounts carry limits.
    pub(crate) uncertain: bool,
    /// Whether some steps happen once a month or a year.
    pub(crate) by_the_year: bool,
    /// Reported results in a year.
    pub(crate) results: u64,
}

impl Style {
    pub(crate) const PLAIN: Self = Self { units: 0, uncertain: false, by_the_year: false, results: 240 };
}

/// One plan while it is written.
pub(crate) struct Writer {
    pub(crate) chance: Chance,
    style: Style,
}

/// A number of thousandths, written exactly.
fn thousandths(n: u64) -> String {
    format!("{}.{:03}", n / 1000, n % 1000)
}

impl Writer {
    pub(crate) fn new(seed: u64, style: Style) -> Self {
        Self { chance: Chance::new(seed), style }
    }

    fn spread(&mut self, text: String) -> String {
        // The number is taken whether it is used or not, so that the style does not change the plan.
        let percent = self.chance.between(1, 12);
        if self.style.uncertain { format!("{text} ± {percent} %") } else { text }
    }

    fn ml(&mut self, low: u64, high: u64) -> String {
        let n = self.chance.between(low, high);
        let text = [format!("{n} mL"), format!("{} L", thousandths(n)), format!("{n} cm3")];
        self.spread(text[self.style.units].clone())
    }

    fn g(&mut self, low: u64, high: u64) -> String {
        let n = self.chance.between(low, high);
        let text = [format!("{n} g"), format!("{} kg", thousandths(n)), format!("{} mg", n * 1000)];
        self.spread(text[self.style.units].clone())
    }

    fn minutes(&mut self, low: u64, high: u64) -> String {
        let n = self.chance.between(low, high);
        let text = [format!("{n} min"), format!("{} s", n * 60), format!("{n} min")];
        self.spread(text[self.style.units].clone())
    }

    fn celsius(&mut self, low: u64, high: u64) -> String {
        let n = self.chance.between(low, high);
        [format!("{n} °C"), format!("{}.15 K", n + 273), format!("{n} °C")][self.style.units].clone()
    }

    fn bar(&mut self, low: u64, high: u64) -> String {
        let n = self.chance.between(low, high);
        [format!("{n} bar"), format!("{}.{} MPa", n / 10, n % 10), format!("{} kPa", n * 100)]
            [self.style.units]
            .clone()
    }

    fn watt(&mut self, low: u64, high: u64) -> String {
        let n = self.chance.between(low, high);
        let text = [format!("{n} W"), format!("{} kW", thousandths(n)), format!("{n} J/s")];
        self.spread(text[self.style.units.min(1)].clone())
    }

    fn percent(&mut self, low: u64, high: u64) -> String {
        let n = self.chance.between(low, high);
        let tenths = self.chance.between(1, 9);
        if self.style.uncertain { format!("{n} % ± 0.{tenths} %") } else { format!("{n} %") }
    }

    fn hold_up(&mut self) -> String {
        let n = self.chance.between(50, 900);
        let text = [
            format!("{} mL/g", thousandths(n)),
            format!("{} L/kg", thousandths(n)),
            format!("{} cm3/g", thousandths(n)),
        ];
        self.spread(text[self.style.units].clone())
    }

    fn solvent(&mut self) -> Value {
        match self.chance.between(0, 3) {
            0 => json!("ethyl acetate"),
            1 => json!({ "n-hexane": "50 %", "acetone": "50 %" }),
            2 => json!({ "dichloromethane": "30 % w/w", "acetone": "70 % w/w" }),
            _ => json!({ "n-heptane": "60 %", "ethanol": "30 %", "water": "10 %" }),
        }
    }

    fn measured(&mut self, step: &mut Value, rules: &[&str]) {
        if self.chance.one_in(3) {
            let rule = self.chance.of(rules);
            let text = if self.chance.one_in(2) { self.percent(1, 6) } else { self.g(1, 2) };
            step["measured"] = json!({ rule: text });
        }
    }

    /// A way of extracting a solid; the last word says how much liquor is left at least, in mL.
    fn extract_a_solid(&mut self) -> (Vec<Value>, u64) {
        match self.chance.between(0, 6) {
            5 => {
                let mut step = json!({ "step": "percolate", "solvent": self.solvent(), "charge": self.ml(60, 400),
                    "time": self.minutes(300, 1400), "power": self.watt(20, 90), "extracts": { "oil": self.percent(20, 80) },
                    "loss": self.percent(1, 6), "hold_up": self.hold_up() });
                self.measured(&mut step, &["lost to air", "held in the marc"]);
                (vec![step], 30)
            }
            6 => {
                let mut step = json!({ "step": "microwave", "solvent": self.solvent(), "charge": self.ml(30, 60), "time": self.minutes(10, 30),
                    "vessels": self.chance.between(1, 16), "power": self.watt(500, 1800), "rinse": self.ml(3, 8),
                    "headspace": self.ml(30, 60), "opened_at": self.celsius(18, 30), "extracts": { "oil": self.percent(20, 80) },
                    "hold_up": self.hold_up() });
                self.measured(&mut step, &["lost to air", "held in the marc"]);
                (vec![step], 15)
            }
            0 => {
                let mut step = json!({ "step": "soxhlet", "solvent": self.solvent(), "charge": self.ml(150, 400),
                    "time": self.minutes(300, 1400), "heater": self.watt(100, 400), "extracts": { "oil": self.percent(20, 80) },
                    "loss": self.percent(1, 10), "hold_up": self.hold_up() });
                if self.chance.one_in(2) {
                    step["coolant"] = json!(self.celsius(2, 18));
                    step["draught"] = json!(self.mass_of_flow());
                    step["cycles"] = json!("5 /h");
                    step["siphon"] = json!(self.ml(50, 90));
                    step["cooling_water"] = json!("0.5 L/min");
                    step.as_object_mut().unwrap().remove("loss");
                }
                self.measured(&mut step, &["condenser loss", "held in the marc"]);
                (vec![step], 60)
            }
            1 => {
                let mut step = json!({ "step": "ultrasonic", "solvent": self.solvent(), "charge": self.ml(60, 120),
                    "portions": self.chance.between(1, 4), "time": self.minutes(2, 20), "power": self.watt(100, 900),
                    "extracts": { "oil": self.percent(10, 60) }, "loss": self.percent(1, 8), "hold_up": self.hold_up() });
                if self.chance.one_in(2) {
                    step["surface"] = json!("15 cm2");
                    step["temperature"] = json!(self.celsius(15, 30));
                    step.as_object_mut().unwrap().remove("loss");
                }
                self.measured(&mut step, &["lost to air", "held in the marc"]);
                (vec![step], 20)
            }
            2 => {
                let mut step = json!({ "step": "pressurised-liquid", "solvent": self.solvent(), "cell": self.ml(66, 100),
                    "void": self.percent(40, 60), "flush": self.percent(50, 80), "lines": self.ml(1, 6),
                    "dispersant": "diatomaceous earth", "dispersant_mass": self.g(2, 10), "extracts": { "oil": self.percent(20, 80) },
                    "loss": self.percent(1, 10), "hold_up": "0.1 mL/g" });
                if self.chance.one_in(2) {
                    step["temperature"] = json!(self.celsius(80, 120));
                    step["purge"] = json!(self.ml(500, 2000));
                    step["vial"] = json!(self.celsius(15, 25));
                    step.as_object_mut().unwrap().remove("loss");
                }
                self.measured(&mut step, &["carried off by the purge", "held in the marc"]);
                (vec![step], 15)
            }
            3 => {
                let mut out = Vec::new();
                let stages = self.chance.between(1, 3);
                for stage in 1..=stages {
                    let mut step = json!({ "step": "supercritical", "temperature": self.celsius(40, 120),
                        "pressure": self.bar(120, 450), "vessel": self.ml(60, 90), "metered": "pump head",
                        "flow": self.mass_of_flow(), "meter_temperature": self.celsius(2, 15), "meter_pressure": self.bar(60, 90),
                        "time": self.minutes(10, 60), "let_down": stage == stages, "extracts": { "oil": self.percent(10, 60) },
                        "rinse": "ethyl acetate", "rinse_volume": self.ml(4, 9) });
                    if self.chance.one_in(2) {
                        step["trap_solvent"] = json!("n-heptane");
                        step["trap_volume"] = json!(self.ml(8, 15));
                        step["dissolved"] = json!("0.02 g/g");
                        self.measured(&mut step, &["blown off the trap", "drawn off with the extract"]);
                    }
                    if self.chance.one_in(2) {
                        step["cosolvent"] = json!({ "methanol": "80 %", "water": "20 %" });
                        step["cosolvent_flow"] = json!(self.mass_of_flow());
                    }
                    out.push(step);
                }
                (out, 2)
            }
            _ => {
                let step = json!({ "step": "supercritical", "temperature": self.celsius(45, 70), "pressure": self.bar(200, 400),
                    "vessel": self.ml(100, 300), "metered": "mass", "mass_flow": "80 g/min", "time": self.minutes(30, 90),
                    "circuit": "recycled", "leak": self.percent(1, 3), "let_down_temperature": self.celsius(30, 50),
                    "let_down_pressure": self.bar(45, 60), "extracts": { "oil": self.percent(50, 90) }, "in_marc": "0.01 g/g",
                    "dissolved": "0.05 g/g", "vent_to": "room", "rinse": "ethanol", "rinse_volume": self.ml(5, 9) });
                (vec![step], 2)
            }
        }
    }

    fn mass_of_flow(&mut self) -> String {
        let n = self.chance.between(1, 4);
        let text = [format!("{n} mL/min"), format!("{} L/min", thousandths(n)), format!("{n} cm3/min")];
        self.spread(text[self.style.units].clone())
    }

    /// A stream of gas that can carry away whatever these plans hold.
    fn stream(&mut self) -> String {
        let n = self.chance.between(40, 55);
        let text = [format!("{n} L/min"), format!("{n}000 mL/min"), format!("{n} dm3/min")];
        self.spread(text[self.style.units].clone())
    }

    fn extract_water(&mut self) -> (Vec<Value>, u64) {
        if self.chance.one_in(2) {
            let mut step = json!({ "step": "liquid-liquid", "solvent": { "dichloromethane": "85 %", "acetone": "15 %" },
                "charge": self.ml(40, 90), "portions": self.chance.between(1, 4), "distribution": { "acetone": "0.7", "oil": "25" },
                "loss": self.percent(1, 5) });
            self.measured(&mut step, &["dissolved in the water", "lost to air"]);
            (vec![step], 15)
        } else {
            let mut step = json!({ "step": "solid-phase", "cartridge": "SPE cartridge 500 mg", "cartridge_mass": self.g(4, 6),
                "condition": { "methanol": self.ml(5, 10), "water": self.ml(5, 10) }, "wash": { "water": self.ml(2, 5) },
                "solvent": self.solvent(), "elute": self.ml(20, 50), "extracts": { "oil": self.percent(50, 90) },
                "loss": self.percent(1, 5), "hold_up": "0.3 mL" });
            self.measured(&mut step, &["lost to air", "held in the bed"]);
            (vec![step], 12)
        }
    }

    fn tail(&mut self, steps: &mut Vec<Value>, least_ml: u64) {
        if self.chance.one_in(3) {
            steps.push(json!({ "step": "dry", "agent": "sodium sulfate", "mass": self.g(1, 3), "hold_up": "0.2 mL/g", "to": "solids" }));
        }
        if self.chance.one_in(2) {
            let condensate = self.chance.of(&["store", "waste", "elsewhere"]);
            let to = if least_ml > 10 { self.ml(2, 5) } else { "1 mL".to_owned() };
            let mut step = match self.chance.between(0, 4) {
                3 => {
                    json!({ "step": "concentrate", "by": "rotary evaporator", "to": to, "condensate": condensate, "coolant": self.celsius(1, 8),
                    "evacuated": self.ml(1000, 4000), "time": self.minutes(5, 30), "power": self.watt(500, 1500) })
                }
                4 => {
                    json!({ "step": "distil", "to": to, "distillate": condensate, "forerun": "1 mL", "forerun_to": "waste", "coolant": self.celsius(1, 8),
                    "time": self.minutes(60, 120), "power": self.watt(500, 1500) })
                }
                0 => {
                    json!({ "step": "concentrate", "by": "rotary evaporator", "to": to, "condensate": condensate,
                    "loss": self.percent(2, 9), "time": self.minutes(5, 30), "power": self.watt(500, 1500) })
                }
                1 => {
                    json!({ "step": "concentrate", "by": "Kuderna-Danish", "to": to, "caught": self.percent(10, 80),
                    "condensate": condensate })
                }
                _ => {
                    json!({ "step": "concentrate", "by": "nitrogen stream", "to": to, "gas_flow": self.stream(),
                    "time": self.minutes(90, 120), "lost_to": "room" })
                }
            };
            if step["by"] == "rotary evaporator" && self.chance.one_in(3) {
                step["measured"] = json!({ "lost past the condenser": self.percent(1, 9) });
            }
            steps.push(step);
        }
        if self.chance.one_in(2) {
            let to = self.chance.of(&["waste", "liquor"]);
            let mut step = json!({ "step": "rinse", "solvent": self.solvent(), "charge": self.ml(10, 60), "to": to, "loss": self.percent(1, 8) });
            self.measured(&mut step, &["lost to air"]);
            steps.push(step);
        }
        if self.chance.one_in(3) {
            steps.push(json!({ "step": "discard", "from": "marc", "to": "solids" }));
        }
        if self.chance.one_in(2) {
            let to = self.chance.of(&["solids", "marc", "by-product", "held"]);
            steps.push(
                json!({ "step": "consume", "material": "nitrile glove", "mass": self.g(4, 12), "to": to }),
            );
        }
    }

    /// A route; `product` where its liquor is what the work is done for.
    pub(crate) fn route(&mut self, name: &str, product: bool) -> Value {
        let solid = product || self.chance.one_in(2);
        let (mut steps, least_ml) = if solid { self.extract_a_solid() } else { self.extract_water() };
        let feed = if solid {
            json!({ "sediment": self.g(12, 40), "water": self.g(1, 5), "oil": self.g(1, 4) })
        } else {
            json!({ "water": self.ml(500, 1000), "oil": self.g(1, 2) })
        };
        self.tail(&mut steps, least_ml);
        if self.chance.one_in(2) {
            let (charge, mass) = (self.ml(50, 90), self.g(5, 20));
            steps.push(json!({ "step": "rinse", "per": "batch", "solvent": "acetone", "charge": charge, "to": "waste" }));
            steps.push(json!({ "step": "consume", "per": "batch", "material": "cellulose filter paper", "mass": mass }));
        }
        let (month, year) = (self.g(100, 900), self.ml(300, 900));
        if self.style.by_the_year {
            steps.push(json!({ "step": "consume", "per": "month", "material": "activated carbon", "mass": month, "to": "solids" }));
            steps.push(json!({ "step": "rinse", "per": "year", "solvent": "ethanol", "charge": year, "to": "elsewhere" }));
        }
        let mut ends = Map::new();
        let liquor = self.chance.of(&["waste", "elsewhere", "held"]);
        ends.insert("liquor".into(), json!(if product { "product" } else { liquor }));
        if self.chance.one_in(2) {
            ends.insert("marc".into(), json!(self.chance.of(&["solids", "by-product"])));
        }
        if self.chance.one_in(2) {
            ends.insert("second phase".into(), json!(self.chance.of(&["aqueous", "elsewhere", "destroyed"])));
        }
        json!({ "name": name, "recovery": "90 %", "feed": feed, "steps": steps, "ends": ends })
    }
}

/// A plan around routes.
pub(crate) fn plan(routes: &[Value], seed: u64, style: Style) -> Value {
    let mut chance = Chance::new(seed ^ 0xB00C);
    let repeats =
        if style.uncertain { "3 % ± 1 %".to_owned() } else { format!("{} %", chance.between(0, 9)) };
    json!({
        "thimbleworth": 1,
        "title": "A plan made by a number",
        "site": { "name": "Tern Hollow pilot hall", "streams": [
            { "name": "waste", "container": "20 L" }, { "name": "aqueous", "container": "60 L", "fill": "80 %" },
            { "name": "solids", "holds": "solid", "container": "60 L" }
        ] },
        "materials": { "oil": { "class": "solute", "source": "made up for this test" } },
        "workloads": [{
            "name": "w", "results_per_year": style.results,
            "batch": { "samples": chance.between(1, 13), "controls": chance.between(0, 4) }, "repeats": repeats,
            "repeats_bring_controls": chance.one_in(2), "controls_carry_feed": chance.one_in(2),
            "feed": {}, "present": routes[0]["name"], "routes": routes
        }]
    })
}

/// The plan of this number: three routes.
pub(crate) fn plan_of(seed: u64, style: Style) -> Value {
    let mut writer = Writer::new(seed, style);
    let routes: Vec<Value> = ["A", "B", "C"].iter().map(|name| writer.route(name, false)).collect();
    plan(&routes, seed, style)
}

/// The plan of this number with one route that makes a product.
pub(crate) fn plan_with_product(seed: u64, style: Style) -> Value {
    plan(&[Writer::new(seed, style).route("A", true)], seed, style)
}
