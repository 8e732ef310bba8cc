//! United States: characteristics, unused products, the notice for land disposal. Spent solvents stand beside.

use super::contents::{
    AQUEOUS, Contents, FLASH_LIMIT_K, Flash, is_alcohol, is_flammable, is_solvent, is_unknown, is_water, rcra,
};
use super::us_spent;
use super::verdict::{Answer, Desk, Fact, list, share};
use crate::material::Text;
use crate::material::table::Table;
use crate::quantity::{Kind, nearest};
use std::sync::OnceLock;

const LIMITS: Table = Table { name: "toxicity_us.csv", text: include_str!("../../data/toxicity_us.csv") };

pub(super) fn read(c: &Contents<'_>, desk: &mut Desk) {
    ignitable(c, desk);
    corrosive(c, desk);
    reactive(c, desk);
    toxic(c, desk);
    if c.unused {
        unused(c, desk);
    } else {
        us_spent::read(c, desk);
    }
    notice(desk);
}

/// What is known of ignition without a test; shared with the rules of the Union and of transport.
pub(super) fn burns(c: &Contents<'_>) -> (Answer, Text, Vec<Fact>) {
    let degrees = |value_si| Fact {
        what: "flash point by test".into(),
        value_si,
        kind: Kind::Temperature,
        limit_si: Some(FLASH_LIMIT_K),
    };
    match c.flash {
        Some(Flash::None) => {
            return (Answer::No, "the test of the waste finds no flash point".into(), Vec::new());
        }
        Some(Flash::AtK(k)) => {
            let answer = if k < FLASH_LIMIT_K { Answer::Yes } else { Answer::No };
            return (answer, "by the test of the waste itself".into(), vec![degrees(k)]);
        }
        None => {}
    }
    let mut facts = Vec::new();
    for p in c.parts.iter().filter(|p| p.kg > 0.0 && is_flammable(p.substance)) {
        if let Some(f) = p.substance.flash_point_k.figure() {
            facts.push(Fact {
                what: ["flash point of ", &p.substance.name].concat().into(),
                value_si: f.value,
                kind: Kind::Temperature,
                limit_si: Some(FLASH_LIMIT_K),
            });
        }
    }
    let unknown = c.having(&is_unknown);
    if facts.is_empty() && unknown.is_empty() {
        return (Answer::No, "nothing in it has a flash point below 60 °C".into(), facts);
    }
    if c.solid {
        return (
            Answer::Test,
            "wet with flammable liquid: free liquid (paint filter test) counts as a liquid".into(),
            facts,
        );
    }
    if facts.is_empty() {
        return (
            Answer::Test,
            ["no flash point is known of ", &list(unknown.iter().map(|s| &*s.name))].concat().into(),
            facts,
        );
    }
    let water = c.mass_share(&is_water);
    if water >= 0.5 {
        facts.push(share("water by mass", water, 0.5));
        let why = "flammable liquid in water: a few per cent can flash near room temperature, and averages of flash points prove nothing";
        return (Answer::Test, why.into(), facts);
    }
    let all = c.parts.iter().all(|p| p.density_kg_m3.is_none() || p.kg <= 0.0 || is_flammable(p.substance));
    if all {
        (Answer::Yes, "every liquid in it has a flash point below 60 °C".into(), facts)
    } else {
        (
            Answer::Assumed,
            "a liquid in it has a flash point below 60 °C; that of the mixture cannot be averaged".into(),
            facts,
        )
    }
}

fn ignitable(c: &Contents<'_>, desk: &mut Desk) {
    let (answer, why, facts) = burns(c);
    // Aqueous solutions with less than 24 % alcohol and at least half water, with nothing else that burns.
    let alcohols = c.having(&|s| is_flammable(s) && is_alcohol(s)).len();
    let burning = c.having(&|s| is_flammable(s) || is_unknown(s)).len();
    if !c.solid && alcohols > 0 && alcohols == burning && answer != Answer::No {
        let (alcohol, water) = (c.volume_share(&is_alcohol), c.mass_share(&is_water));
        let facts = vec![share("alcohol by volume", alcohol, 0.24), share("water by mass", water, 0.5)];
        if alcohol < 0.24 && water >= 0.5 {
            desk.put(
                "alcohol",
                Answer::No,
                "an aqueous solution whose only flammable liquid is alcohol, below the limit",
                facts,
            );
            return;
        }
    }
    desk.put("ignitable", answer, why, facts);
}

fn corrosive(c: &Contents<'_>, desk: &mut Desk) {
    let acid = |s: &crate::material::Substance| rcra(s).characteristic.iter().any(|code| code == "D002");
    let water = c.volume_share(&is_water);
    let mut facts = vec![share("water by volume", water, AQUEOUS)];
    let (answer, why) = if c.solid {
        (Answer::No, "a solid has no pH of its own")
    } else if !c.aqueous() {
        if c.having(&acid).is_empty() {
            (Answer::No, "not aqueous, and no acid or base is in it")
        } else {
            (
                Answer::Test,
                "not aqueous, but an acid or base is in it: the test on steel (SW-846 1110A) decides",
            )
        }
    } else if let Some((low, high)) = c.ph {
        let number = |what: &'static str, value_si, limit| Fact {
            what: what.into(),
            value_si,
            kind: Kind::Number,
            limit_si: Some(limit),
        };
        facts.push(number("lowest pH", low, 2.0));
        facts.push(number("highest pH", high, 12.5));
        let beyond = |ph: f64| ph <= 2.0 || ph >= 12.5;
        match (beyond(low), beyond(high)) {
            (true, true) if (low <= 2.0) == (high <= 2.0) => {
                (Answer::Yes, "aqueous, and its pH is beyond the limit")
            }
            (false, false) => (Answer::No, "aqueous, with a pH between the limits"),
            _ => (Answer::Test, "its pH may lie beyond the limit: measure the container"),
        }
    } else {
        (Answer::Test, "aqueous, and its pH is not known: measure it")
    };
    desk.put("corrosive", answer, why, facts);
}

fn reactive(c: &Contents<'_>, desk: &mut Desk) {
    let formers = c.having(&|s| s.hazard.statements.iter().any(|h| h == "EUH019"));
    if !formers.is_empty() {
        let why = [
            "forms peroxides: ",
            &list(formers.iter().map(|s| &*s.name)),
            "; date it, test it, never to dryness",
        ]
        .concat();
        desk.put("reactive", Answer::Test, why, Vec::new());
    }
}

fn limits() -> &'static [[&'static str; 4]] {
    static READ: OnceLock<Vec<[&'static str; 4]>> = OnceLock::new();
    READ.get_or_init(|| LIMITS.rows(["code", "name", "cas", "limit_mg_l"], &mut Vec::new()))
}

fn toxic(c: &Contents<'_>, desk: &mut Desk) {
    let cresols: Vec<&str> =
        limits().iter().filter(|r| ["D023", "D024", "D025"].contains(&r[0])).map(|r| r[2]).collect();
    for &[code, name, cas, limit] in limits() {
        let Some(limit) = nearest(limit) else { continue };
        let is = |s: &crate::material::Substance| {
            s.cas
                .as_deref()
                .is_some_and(|own| if code == "D026" { cresols.contains(&own) } else { own == cas })
        };
        let mut kg = 0.0;
        for p in c.parts.iter().filter(|p| is(p.substance)) {
            kg += p.kg;
        }
        if kg <= 0.0 {
            continue;
        }
        let liquid_m3 = c.volume_m3();
        let (per_m3, answer, why) = if c.solid || liquid_m3 <= 0.0 {
            // c = w / 20: twenty parts of leaching fluid to one of solid, all of it leached
            let most = kg / c.mass_kg() * 1000.0 / 20.0;
            let answer = if most < limit * 1e-3 { Answer::No } else { Answer::Test };
            (most, answer, "a solid, as if all of it leached into twenty parts of fluid")
        } else {
            let is_over = kg / liquid_m3 >= limit * 1e-3;
            (
                kg / liquid_m3,
                if is_over { Answer::Yes } else { Answer::No },
                "a liquid with few solids is its own extract",
            )
        };
        let facts = vec![Fact {
            what: name.into(),
            value_si: per_m3,
            kind: Kind::Density,
            limit_si: Some(limit * 1e-3),
        }];
        desk.put("toxic", answer, why, facts);
        desk.code(code);
    }
}

fn unused(c: &Contents<'_>, desk: &mut Desk) {
    let active: Vec<_> = c.parts.iter().filter(|p| p.kg > 0.0 && !is_water(p.substance)).collect();
    for p in &active {
        let Some(code) = &rcra(p.substance).unused else { continue };
        let (answer, why) = if active.len() == 1 {
            (Answer::Yes, "the sole active ingredient of an unused product")
        } else {
            (
                Answer::Test,
                "listed for the unused product with it as the sole active ingredient; ask for each product poured in",
            )
        };
        desk.put("unused", answer, [&*p.substance.name, ": ", why].concat(), Vec::new());
        desk.code(code.clone());
    }
}

fn notice(desk: &mut Desk) {
    let codes = list(desk.codes());
    if !codes.is_empty() {
        let why = [
            "one notice with the first shipment to each facility, for ",
            &codes,
            "; F001 to F005 name their constituents, D001 and D002 their underlying hazardous constituents",
        ];
        desk.put("notice", Answer::Yes, why.concat(), Vec::new());
    }
}

/// Whether anything in it is a solvent.
pub(super) fn any_solvent(c: &Contents<'_>) -> bool {
    !c.having(&is_solvent).is_empty()
}
