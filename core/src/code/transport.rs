//! Transport: UN number, class, packing group and proper description.

use super::contents::{Contents, Flash, is_alcohol, is_flammable, is_hydrocarbon, is_solvent, is_water};
use super::us::burns;
use super::verdict::{Answer, Desk, Fact, list, share};
use super::{Rules, us};
use crate::material::Substance;
use crate::order;
use crate::quantity::Kind;

/// Share by mass from which a toxic or corrosive substance is named in the class without a calculation; our own, cautious.
const NAMED: f64 = 0.25;
/// Share from which the question is put; our own.
const ASKED: f64 = 0.01;
/// Share above which a container is described as the one substance; common practice, no source.
const ALONE: f64 = 0.99;

/// A transport description in its parts.
#[derive(Clone, Debug, Default, PartialEq, Eq)]
pub struct Description {
    /// `UN1992`.
    pub un: String,
    /// Proper shipping name without the word waste.
    pub name: String,
    /// The substances named in brackets for an entry "n.o.s."; empty for one with a name of its own.
    pub of: String,
    /// Class with subsidiary hazards in brackets.
    pub class: String,
    /// Packing group; may be empty.
    pub packing_group: String,
}

impl Description {
    /// The whole description: `UN1992, waste flammable liquid, toxic, n.o.s. (dichloromethane, acetone), 3 (6.1), II`.
    #[must_use]
    pub fn words(&self) -> String {
        let mut out = [&self.un, ", waste ", &self.name].concat();
        if !self.of.is_empty() {
            out.push_str(&[" (", &self.of, ")"].concat());
        }
        for part in [&self.class, &self.packing_group] {
            if !part.is_empty() {
                out.push_str(", ");
                out.push_str(part);
            }
        }
        out
    }
}

fn class_has(s: &Substance, class: &str) -> bool {
    s.transport.as_ref().is_some_and(|t| t.class.split([' ', '(', ')']).any(|c| c == class))
}

fn toxic(s: &Substance) -> bool {
    class_has(s, "6.1")
}

fn corrosive(s: &Substance) -> bool {
    class_has(s, "8")
}

/// The stricter packing group of two; an empty text is none.
fn stricter(a: &'static str, b: &str) -> &'static str {
    let rank = |g: &str| match g {
        "I" => 3,
        "II" => 2,
        "III" => 1,
        _ => 0,
    };
    let which = if rank(a) >= rank(b) { rank(a) } else { rank(b) };
    ["", "III", "II", "I"].get(which).copied().unwrap_or("")
}

/// The largest of the parts for which this holds, at most two.
fn two(c: &Contents<'_>, holds: &dyn Fn(&Substance) -> bool) -> String {
    let mut parts: Vec<_> = c.parts.iter().filter(|p| p.kg > 0.0 && holds(p.substance)).collect();
    order::sort(&mut parts, &|a, b| a.kg > b.kg);
    list(parts.iter().take(2).map(|p| &*p.substance.name))
}

/// Packing group of class 3: I where it boils at 35 °C or below, else II where it flashes below 23 °C, else III.
fn packing_group(c: &Contents<'_>, facts: &mut Vec<Fact>) -> &'static str {
    let mut least = |what: &'static str, limit: f64, of: &dyn Fn(&Substance) -> Option<f64>| {
        let mut found: Option<f64> = None;
        for s in c.having(&is_flammable) {
            if let Some(k) = of(s)
                && found.is_none_or(|f| k < f)
            {
                found = Some(k);
            }
        }
        if let Some(value_si) = found {
            facts.push(Fact { what: what.into(), value_si, kind: Kind::Temperature, limit_si: Some(limit) });
        }
        found
    };
    let boils = least("lowest boiling point", 308.15, &|s| s.boiling_point_k.as_ref().map(|f| f.value));
    let flashes = match c.flash {
        Some(Flash::AtK(k)) => Some(k),
        _ => least("lowest flash point", 296.15, &|s| s.flash_point_k.figure().map(|f| f.value)),
    };
    if boils.is_some_and(|k| k <= 308.15) {
        "I"
    } else if flashes.is_some_and(|k| k < 296.15) {
        "II"
    } else {
        "III"
    }
}

pub(super) fn read(c: &Contents<'_>, rules: Rules, desk: &mut Desk) {
    let (burning, _, _) = burns(c);
    let mut facts = Vec::new();
    let mut asks: Vec<&str> = Vec::new();
    if matches!(c.ph, Some((low, high)) if low <= 2.0 || high >= 11.5) && !c.solid {
        asks.push("its pH asks for the corrosion test of class 8");
    }
    let mut weigh =
        |what: &'static str, holds: &dyn Fn(&Substance) -> bool, ask: &'static str, facts: &mut Vec<Fact>| {
            let found = c.mass_share(holds);
            if found >= ASKED {
                facts.push(share(what, found, NAMED));
            }
            if (ASKED..NAMED).contains(&found) {
                asks.push(ask);
            }
            found >= NAMED
        };
    let is_toxic = weigh(
        "class 6.1 by mass",
        &toxic,
        "calculate the toxicity of the mixture (2.2.61) before the class is chosen",
        &mut facts,
    );
    let is_corrosive = weigh(
        "class 8 by mass",
        &corrosive,
        "ask for the corrosion test before the class is chosen",
        &mut facts,
    );
    let environmental = marine(c);
    let mut burns_now = matches!(burning, Answer::Yes | Answer::Assumed);
    if burning == Answer::Test && c.solid {
        burns_now = true;
        asks.push("with free liquid it travels as that liquid");
    } else if burning == Answer::Test {
        asks.push("a flash point test decides whether it is class 3");
    }
    let mut d = single(c).unwrap_or_default();
    if d.un.is_empty() {
        let group = if burns_now && !c.solid { packing_group(c, &mut facts) } else { "" };
        let hazards = |s: &Substance| is_flammable(s) || toxic(s) || corrosive(s);
        d.of = two(c, &hazards);
        let all = |holds: &dyn Fn(&Substance) -> bool| {
            let liquids = c.having(&|s| is_solvent(s) || is_water(s));
            !liquids.is_empty() && liquids.into_iter().all(holds)
        };
        let toxic_group = c.having(&toxic).iter().fold("III", |g, s| stricter(g, own_group(s)));
        let (un, name, class, group) = match (c.solid, burns_now, is_toxic, is_corrosive) {
            (true, true, true, _) => ("UN2926", "flammable solid, toxic, organic, n.o.s.", "4.1 (6.1)", "II"),
            (true, true, false, _) => ("UN3175", "solids containing flammable liquid, n.o.s.", "4.1", "II"),
            (true, false, true, _) => ("UN3243", "solids containing toxic liquid, n.o.s.", "6.1", "II"),
            (true, false, false, true) => ("UN3244", "solids containing corrosive liquid, n.o.s.", "8", "II"),
            (false, true, true, true) => {
                ("UN3286", "flammable liquid, toxic, corrosive, n.o.s.", "3 (6.1, 8)", group)
            }
            (false, true, true, false) => {
                ("UN1992", "flammable liquid, toxic, n.o.s.", "3 (6.1)", stricter(group, toxic_group))
            }
            (false, true, false, true) => ("UN2924", "flammable liquid, corrosive, n.o.s.", "3 (8)", group),
            (false, true, false, false) if all(&is_hydrocarbon) => {
                ("UN3295", "hydrocarbons, liquid, n.o.s.", "3", group)
            }
            (false, true, false, false) if all(&|s| is_alcohol(s) || is_water(s)) => {
                ("UN1987", "alcohols, n.o.s.", "3", group)
            }
            (false, true, false, false) => ("UN1993", "flammable liquid, n.o.s.", "3", group),
            (false, false, true, _) => ("UN2810", "toxic liquid, organic, n.o.s.", "6.1", toxic_group),
            (false, false, false, true) => ("UN1760", "corrosive liquid, n.o.s.", "8", "II"),
            (solid, false, false, false) if environmental => {
                d.of = two(c, &is_marine);
                if solid {
                    ("UN3077", "environmentally hazardous substance, solid, n.o.s.", "9", "III")
                } else {
                    ("UN3082", "environmentally hazardous substance, liquid, n.o.s.", "9", "III")
                }
            }
            _ => ("", "", "", ""),
        };
        (d.un, d.name, d.class, d.packing_group) = (un.into(), name.into(), class.into(), group.into());
    }
    let mut why = if d.un.is_empty() {
        "no class of dangerous goods follows from what is known".to_owned()
    } else {
        d.words()
    };
    if environmental && !d.un.is_empty() && !d.class.starts_with('9') {
        why.push_str(", environmentally hazardous");
    }
    if rules == Rules::Us && !us::any_solvent(c) && d.un.is_empty() && !desk.codes().is_empty() {
        // A hazardous waste that needs a manifest is class 9 in the United States.
        let (un, name) = if c.solid { ("UN3077", "solid") } else { ("UN3082", "liquid") };
        d.un = un.into();
        why = [un, ", hazardous waste, ", name, ", n.o.s., 9, III (NA3077 or NA3082 within the country)"]
            .concat();
    }
    for ask in &asks {
        why.push_str("; ");
        why.push_str(ask);
    }
    let answer = match (d.un.is_empty(), asks.is_empty(), burning) {
        (true, true, _) => Answer::No,
        (_, false, _) => Answer::Test,
        (false, true, Answer::Assumed) => Answer::Assumed,
        (false, true, _) => Answer::Yes,
    };
    desk.put("transport", answer, why, facts);
    if !d.un.is_empty() {
        desk.code(d.un);
    }
}

fn own_group(s: &Substance) -> &str {
    match s.transport.as_ref().map_or("", |t| &*t.packing_group) {
        "I or II" => "I",
        group => group,
    }
}

/// The entry of the one substance that a container holds.
fn single(c: &Contents<'_>) -> Option<Description> {
    let p = c.parts.iter().find(|p| p.kg / c.mass_kg() >= ALONE)?;
    let t = p.substance.transport.as_ref().filter(|_| !c.solid)?;
    Some(Description {
        un: t.un.to_string(),
        name: p.substance.name.to_string(),
        of: String::new(),
        class: t.class.to_string(),
        packing_group: t.packing_group.to_string(),
    })
}

fn is_marine(s: &Substance) -> bool {
    s.hazard.statements.iter().any(|h| h == "H410" || h == "H411" || h == "H400")
}

/// Environmentally hazardous for transport: 10 Σ chronic 1 + Σ chronic 2 of 25 % or more, or Σ acute 1.
fn marine(c: &Contents<'_>) -> bool {
    let sum = |code: &str| c.mass_share(&|s| s.hazard.statements.iter().any(|h| h == code));
    // 10 Σ H410 + Σ H411
    10.0 * sum("H410") + sum("H411") >= 0.25 || sum("H400") >= 0.25
}
