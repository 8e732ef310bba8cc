//! The check of one pour.

use super::meet::{belongs, met};
use crate::code::{Contents, Part, Rules, Verdict, classify, is_halogenated};
use crate::material::Substance;
use crate::metric::container::adr_fill_by_boiling_point;
use crate::order;
use crate::quantity::{Kind, show};
use crate::room::Day;
use crate::source::{COMMON_PRACTICE, Source, Standing};

/// What a drain takes in the United States.
pub const DRAIN: Source = Source::new(
    "40 CFR 403.5(b), 261.3(a)(2)(iv)(E); Directive 91/271/EEC and the permit itself",
    Standing::FromMemory,
);
/// The mark of a packaging.
const MARK: Source = Source::new("ADR 6.1.3.1(c), 49 CFR 178.503(a)(4)", Standing::FromMemory);
/// The relative density up to which a packaging without such a mark may be used.
const UNMARKED: f64 = 1.2;
/// Liquids that boil below this press a closed container when it warms; K.
const PRESSES_K: f64 = 333.15;

/// How serious a finding is.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum Severity {
    /// Do not pour.
    Stop,
    /// Ask before pouring.
    Ask,
    /// Pour, and mind this.
    Mind,
}

impl Severity {
    /// The words shown.
    #[must_use]
    pub const fn words(self) -> &'static str {
        match self {
            Self::Stop => "do not pour",
            Self::Ask => "ask first",
            Self::Mind => "mind",
        }
    }
}

/// One finding.
#[derive(Clone, Debug, PartialEq)]
pub struct Finding {
    /// How serious.
    pub severity: Severity,
    /// What was found, a sentence without its full stop.
    pub what: String,
    /// Where it comes from.
    pub source: Source,
}

/// The container into which is poured.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Vessel<'a> {
    /// Its size; m³.
    pub capacity_m3: Option<f64>,
    /// How full it may be.
    pub fill: f64,
    /// What is in it already; m³; `None` where nobody says: then it is taken as half of what it may hold.
    pub held_m3: Option<f64>,
    /// What it is made of: a word of the plan.
    pub made_of: Option<&'a str>,
    /// The relative density up to which its mark allows a liquid.
    pub density_mark: Option<f64>,
}

/// What a pour brings.
#[derive(Clone, Debug, PartialEq)]
pub struct PourCheck {
    /// What was found, most serious first.
    pub findings: Vec<Finding>,
    /// Codes that the container gains.
    pub gained: Vec<String>,
    /// Codes that it gains to be tested.
    pub gained_open: Vec<String>,
    /// Every code held against the container afterwards.
    pub after: Vec<Verdict>,
}

impl PourCheck {
    /// The most serious finding.
    #[must_use]
    pub fn verdict(&self) -> Option<Severity> {
        self.findings.first().map(|f| f.severity)
    }
}

/// Both together, as one container.
fn together<'a>(into: &Contents<'a>, poured: &Contents<'a>) -> Contents<'a> {
    let mut all = into.clone();
    for p in &poured.parts {
        match all.parts.iter_mut().find(|there| there.substance.name == p.substance.name) {
            Some(there) => there.kg += p.kg,
            None => all.parts.push(Part { ..p.clone() }),
        }
    }
    all.charges.extend(poured.charges.iter().cloned());
    // A pH or a flash point that was measured before says nothing of the mixture.
    if poured.mass_kg() > 0.0 && into.mass_kg() > 0.0 {
        all.ph = into.ph.filter(|ph| poured.ph == Some(*ph));
        all.flash = None;
    }
    all
}

/// Whether `poured` may go into a container that holds `into`. Masses count as they stand in both.
///
/// ```
/// use thimbleworth::code::{Contents, Part, Rules};
/// use thimbleworth::material::catalogue;
/// use thimbleworth::pour::{Severity, Vessel, into_vessel};
/// let find = |name| catalogue().find(name).unwrap();
/// let drum = Contents { parts: vec![Part::new(find("dichloromethane"), 10.0, 1326.0)], ..Contents::default() };
/// let acid = Contents { parts: vec![Part::new(find("nitric acid"), 0.1, 1400.0)], ..Contents::default() };
/// let check = into_vessel(&acid, &drum, &Vessel { fill: 0.9, ..Vessel::default() }, Rules::Us, None);
/// assert_eq!(check.verdict(), Some(Severity::Stop));
/// ```
#[must_use]
pub fn into_vessel(
    poured: &Contents<'_>,
    into: &Contents<'_>,
    vessel: &Vessel<'_>,
    rules: Rules,
    as_of: Option<Day>,
) -> PourCheck {
    let all = together(into, poured);
    let mut findings = Vec::new();
    let mut put = |severity, what: String, source| findings.push(Finding { severity, what, source });
    let there: Vec<&Substance> = all.parts.iter().filter(|p| p.kg > 0.0).map(|p| p.substance).collect();
    for (pair, names) in met(&there) {
        put(pair.severity, [pair.text, " (", &names.join(", "), ")"].concat(), COMMON_PRACTICE);
    }
    material(&all, vessel, &mut put);
    space((poured, into, &all), vessel, &mut put);
    if all.solid != poured.solid && !poured.parts.is_empty() {
        let what = if all.solid {
            "liquid into a container for solids"
        } else {
            "solids into a container for liquids"
        };
        put(Severity::Ask, what.to_owned(), COMMON_PRACTICE);
    }
    let volatile = |s: &Substance| s.boiling_point_k.as_ref().is_some_and(|f| f.value < PRESSES_K);
    if all.water_share() >= 0.1 && there.iter().any(|s| is_halogenated(s) && volatile(s)) {
        let what = "water saturated with a volatile halogenated solvent has almost the vapour pressure of the solvent (dichloromethane about 47 kPa at 20 °C): vented cap, no warm store";
        put(Severity::Mind, what.to_owned(), COMMON_PRACTICE);
    }
    order::sort(&mut findings, &|a, b| a.severity < b.severity);
    let before = classify(into, rules, as_of);
    let after = classify(&all, rules, as_of);
    let gained = |holds: fn(&Verdict) -> bool| {
        let coded = |v: &&Verdict| !["transport", "notice"].contains(&v.rule.key) && holds(v);
        let mut out: Vec<String> = Vec::new();
        for v in after.iter().filter(coded) {
            if !before.iter().filter(coded).any(|b| b.code == v.code) {
                out.push(v.code.to_string());
            }
        }
        out
    };
    PourCheck { gained: gained(Verdict::applies), gained_open: gained(Verdict::open), findings, after }
}

fn material(all: &Contents<'_>, vessel: &Vessel<'_>, put: &mut dyn FnMut(Severity, String, Source)) {
    let Some(made_of) = vessel.made_of else { return };
    let has = |holds: &dyn Fn(&Substance) -> bool| all.parts.iter().any(|p| p.kg > 0.0 && holds(p.substance));
    let halogenated = has(&is_halogenated);
    let corrosive = has(&|s| belongs(s, "acid") || belongs(s, "base"))
        || matches!(all.ph, Some((low, high)) if low < 4.0 || high > 10.0);
    match made_of {
        "steel" | "stainless steel" if halogenated => put(
            Severity::Stop,
            ["halogenated waste in unlined ", made_of, ": wet, it makes hydrochloric acid and eats through"]
                .concat(),
            COMMON_PRACTICE,
        ),
        "steel" if corrosive => put(Severity::Stop, "acid or base in steel".to_owned(), COMMON_PRACTICE),
        "stainless steel" if has(&|s| s.cas.as_deref() == Some("7647-01-0")) => {
            put(Severity::Stop, "hydrochloric acid in stainless steel".to_owned(), COMMON_PRACTICE);
        }
        "polyethylene" if halogenated || has(&crate::code::is_hydrocarbon) => put(
            Severity::Mind,
            "halogenated solvents and hydrocarbons go through polyethylene on long storage".to_owned(),
            COMMON_PRACTICE,
        ),
        _ => {}
    }
}

fn space(
    (poured, into, all): (&Contents<'_>, &Contents<'_>, &Contents<'_>),
    vessel: &Vessel<'_>,
    put: &mut dyn FnMut(Severity, String, Source),
) {
    if all.solid {
        return;
    }
    if let Some(density) = all.liquid_density_kg_m3() {
        let relative = density / 1000.0;
        let words = |mark: f64| {
            let (found, mark) = (show(relative, Kind::Number), show(mark, Kind::Number));
            ["relative density ", &found, ", and the container is for at most ", &mark].concat()
        };
        match vessel.density_mark {
            Some(mark) if relative > mark => put(Severity::Stop, words(mark), MARK),
            None if relative > UNMARKED => {
                put(
                    Severity::Ask,
                    [&words(UNMARKED), " unless its mark says more: read the mark"].concat(),
                    MARK,
                );
            }
            _ => {}
        }
    }
    let Some(capacity) = vessel.capacity_m3 else { return };
    let most = capacity * vessel.fill;
    // Where nobody says, half of what it may hold, as the codes are found; no less than what the contents themselves take up.
    let (half, known) = (most / 2.0, into.volume_m3());
    let held = vessel.held_m3.unwrap_or(if known > half { known } else { half });
    let after = held + poured.volume_m3();
    if after > most {
        let over = show(after - most, Kind::Volume);
        let taken = if vessel.held_m3.is_none() {
            ["; how full it is was not said, and it is taken to hold ", &show(held, Kind::Volume)].concat()
        } else {
            String::new()
        };
        let what = ["no headspace: ", &over, " more than it may hold", &taken].concat();
        put(Severity::Stop, what, COMMON_PRACTICE);
    } else if vessel.held_m3.is_none() {
        let room = show(most - poured.volume_m3(), Kind::Volume);
        put(
            Severity::Mind,
            ["how full it is was not said: at most ", &room, " may be in it before"].concat(),
            COMMON_PRACTICE,
        );
    }
    let mut lowest: Option<f64> = None;
    for p in all.parts.iter().filter(|p| p.kg > 0.0 && p.density_kg_m3.is_some()) {
        if let Some(k) = p.substance.boiling_point_k.as_ref().map(|f| f.value)
            && lowest.is_none_or(|known| k < known)
        {
            lowest = Some(k);
        }
    }
    if let Some(Ok(limit)) = lowest.map(adr_fill_by_boiling_point)
        && vessel.fill > limit
    {
        let limit = show(limit, Kind::Fraction);
        put(
            Severity::Ask,
            ["for transport it may be filled to ", &limit, " at 15 °C, by its lowest boiling point"].concat(),
            crate::metric::container::SOURCE,
        );
    }
}

/// Whether something may go down the drain: never without a named permit, never by dilution.
#[must_use]
pub fn drain(poured: &Contents<'_>, permit: Option<&str>) -> Vec<Finding> {
    let mut out = Vec::new();
    let mut put = |severity, what: String| out.push(Finding { severity, what, source: DRAIN });
    let Some(permit) = permit.filter(|p| !p.trim().is_empty()) else {
        put(Severity::Stop, "the drain is closed: the site names no permit (site.drain_permit)".to_owned());
        return out;
    };
    put(Severity::Ask, ["under ", permit, ", and only what it names; never by dilution"].concat());
    if poured.parts.iter().any(|p| p.kg > 0.0 && p.substance.class == crate::material::Class::Solvent) {
        put(
            Severity::Ask,
            "it holds solvent: closed-cup flash point of 60 °C or more (403.5(b)(1)), and the exemption for laboratory wastewater (261.3(a)(2)(iv)(E)) has limits of its own".to_owned(),
        );
    }
    if poured.ph.is_none_or(|(low, high)| low < 5.0 || high > 12.5) {
        put(Severity::Ask, "pH below 5 or not known (403.5(b)(2)): measure it".to_owned());
    }
    out
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::material::{Class, catalogue};

    fn part(name: &str, kg: f64) -> Part<'static> {
        let s = catalogue().find(name).unwrap();
        let density = s.density_kg_m3(293.15).ok().map(|f| f.value);
        Part { substance: s, kg, density_kg_m3: density }
    }

    fn holds(parts: &[(&str, f64)]) -> Contents<'static> {
        Contents { parts: parts.iter().map(|(n, kg)| part(n, *kg)).collect(), ..Contents::default() }
    }

    fn found(poured: &[(&str, f64)], into: &[(&str, f64)], vessel: &Vessel<'_>) -> Vec<(Severity, String)> {
        let check = into_vessel(&holds(poured), &holds(into), vessel, Rules::Us, None);
        check.findings.into_iter().map(|f| (f.severity, f.what)).collect()
    }

    const OPEN: Vessel<'static> =
        Vessel { capacity_m3: None, fill: 0.9, held_m3: None, made_of: None, density_mark: Some(2.0) };

    /// The pairs that the trade warns of: common practice, no source.
    #[test]
    fn what_must_not_meet() {
        for (poured, into, severity) in [
            (
                &[("acetone", 1.0)][..],
                &[("chloroform", 1.0), ("potassium hydroxide", 0.1)][..],
                Some(Severity::Stop),
            ),
            (&[("acetone", 1.0)], &[("chloroform", 1.0)], None),
            (&[("nitric acid", 0.1)], &[("dichloromethane", 1.0)], Some(Severity::Stop)),
            (&[("nitric acid", 0.1)], &[("ethanol", 1.0)], Some(Severity::Stop)),
            (&[("nitric acid", 0.1)], &[("water", 1.0)], None),
            (&[("triethylamine", 0.1)], &[("dichloromethane", 1.0)], Some(Severity::Ask)),
            (&[("hydrochloric acid", 0.1)], &[("sodium hydroxide", 1.0)], Some(Severity::Ask)),
            (&[("acetone", 1.0)], &[("n-hexane", 1.0)], None),
        ] {
            let worst = found(poured, into, &OPEN).first().map(|f| f.0);
            assert_eq!(worst, severity, "{poured:?} into {into:?}");
        }
        let mut azide = Substance::blank("sodium azide", Class::Reagent);
        azide.cas = Some("26628-22-8".into());
        let poured = Contents {
            parts: vec![Part { substance: &azide, kg: 0.01, density_kg_m3: None }],
            ..Contents::default()
        };
        let check = into_vessel(&poured, &holds(&[("dichloromethane", 1.0)]), &OPEN, Rules::Us, None);
        assert_eq!(check.verdict(), Some(Severity::Stop));
    }

    #[test]
    fn a_can_marked_for_1_2_carries_no_dichloromethane() {
        let marked = |mark| Vessel { density_mark: mark, ..OPEN };
        let dcm = &[("dichloromethane", 1.0)][..];
        assert_eq!(found(dcm, dcm, &marked(Some(1.2)))[0].0, Severity::Stop);
        assert_eq!(found(dcm, dcm, &marked(None))[0].0, Severity::Ask);
        assert!(found(dcm, dcm, &marked(Some(1.4))).is_empty());
        assert!(found(&[("acetone", 1.0)], &[("acetone", 1.0)], &marked(Some(1.2))).is_empty());
    }

    #[test]
    fn headspace_is_kept() {
        let can = |held| Vessel { capacity_m3: Some(0.02), held_m3: Some(held), ..OPEN };
        // 1 kg of toluene is 1.15 L; 18 L may be in a 20 L can
        assert!(found(&[("toluene", 1.0)], &[("toluene", 1.0)], &can(0.0168)).is_empty());
        assert_eq!(found(&[("toluene", 1.0)], &[("toluene", 1.0)], &can(0.0169))[0].0, Severity::Stop);
    }

    #[test]
    fn a_container_of_which_nothing_is_said_is_half_full() {
        let can = Vessel { capacity_m3: Some(0.02), ..OPEN };
        let of = |name: &str, litres: f64| {
            let kg = part(name, 1.0).density_kg_m3.unwrap() * litres / 1000.0;
            found(&[(name, kg)], &[], &can)[0].clone()
        };
        // 18 L may be in it: 9 + 8 pass, 9 + 10 are 1 L over, 9 + 30 are 21 L over
        let (severity, what) = of("acetone", 8.0);
        assert!(severity == Severity::Mind && what.contains("at most 10 L"), "{what}");
        for (name, litres, over) in [("acetone", 10.0, "1 L more"), ("water", 30.0, "21 L more")] {
            let (severity, what) = of(name, litres);
            assert!(severity == Severity::Stop && what.contains(over) && what.contains("hold 9 L"), "{what}");
        }
    }

    #[test]
    fn steel_and_polyethylene() {
        let of = |made_of| Vessel { made_of: Some(made_of), ..OPEN };
        let dcm = &[("dichloromethane", 1.0)][..];
        let worst = |made_of| found(dcm, dcm, &of(made_of)).first().map(|f| f.0);
        assert_eq!(worst("steel"), Some(Severity::Stop));
        assert_eq!(worst("stainless steel"), Some(Severity::Stop));
        assert_eq!(worst("lined steel"), None);
        assert_eq!(worst("glass"), None);
        assert_eq!(worst("polyethylene"), Some(Severity::Mind));
    }

    #[test]
    fn the_drain_is_closed_without_a_permit() {
        let water = holds(&[("water", 1.0), ("dichloromethane", 0.016)]);
        assert_eq!(drain(&water, None)[0].severity, Severity::Stop);
        assert_eq!(drain(&water, Some(" "))[0].severity, Severity::Stop);
        let open = drain(&water, Some("permit 7"));
        assert!(open.iter().all(|f| f.severity == Severity::Ask) && open.len() == 3);
    }
}
