//! What registers and lists may ask for, asserted only as far as their scope is known.

use super::{Paper, PaperTable, Sheet, kilograms};
use crate::account::{Pouring, Standing};
use crate::code::{Activity, Rules};
use crate::generator::Category;
use crate::ledger::{Direction, Place};
use crate::material::table::Table;
use crate::material::{Class, Substance};
use crate::quantity::nearest;
use std::sync::OnceLock;

const TABLE: Table = Table { name: "reporting.csv", text: include_str!("../../../data/reporting.csv") };
/// 10 000 lb; kg.
const TRI_OTHERWISE_USED_KG: f64 = 4_535.923_7;
/// 100 t of volatile organic compounds without methane to air; kg.
const NMVOC_KG: f64 = 100_000.0;
/// Hazardous waste that leaves a facility of the pollutant register, 2 t (Article 5(1)(b)); kg.
const TRANSFER_KG: f64 = 2_000.0;
/// Vapour pressure from which an organic compound is volatile in the Union, 0.01 kPa at 20 °C; Pa.
const VOLATILE_PA: f64 = 10.0;

/// One row: name, kg a year to air, to water, and whether it stands on the lists.
fn rows() -> &'static [[&'static str; 6]] {
    static READ: OnceLock<Vec<[&'static str; 6]>> = OnceLock::new();
    READ.get_or_init(|| {
        let columns = ["name", "prtr_air_kg", "prtr_water_kg", "tri", "hap", "voc_exempt_us"];
        TABLE.rows(columns, &mut Vec::new())
    })
}

/// What the present routes move of one substance in a year; kg.
struct Moved<'a> {
    substance: &'a Substance,
    air_kg: f64,
    drain_kg: f64,
    bought_kg: f64,
}

fn moved<'a>(routes: &[Option<Pouring<'a>>]) -> Vec<Moved<'a>> {
    let mut out: Vec<Moved<'a>> = Vec::new();
    for Pouring { route, account } in routes.iter().flatten() {
        for p in &account.trace.postings {
            let Some(used) = route.materials.get(p.material.0 as usize) else { continue };
            let i = out.iter().position(|m| m.substance.name == used.substance.name).unwrap_or_else(|| {
                out.push(Moved { substance: &used.substance, air_kg: 0.0, drain_kg: 0.0, bought_kg: 0.0 });
                out.len() - 1
            });
            let (Some(row), kg) = (out.get_mut(i), p.kg_a_year()) else { continue };
            let mut count = |place, direction| match (place, direction) {
                (Place::HOOD | Place::ROOM, Direction::Into) => row.air_kg += kg,
                (Place::DRAIN, Direction::Into) => row.drain_kg += kg,
                (Place::STORE, Direction::OutOf) => row.bought_kg += kg,
                (Place::STORE, Direction::Into) => row.bought_kg -= kg,
                _ => {}
            };
            count(p.from, Direction::OutOf);
            count(p.to, Direction::Into);
        }
    }
    out
}

/// Activities of Directive 2010/75/EU, Annex VII, Part 2, that a site of this kind may be, each with the consumption of solvents in a
/// year from which it is one; kg.
const fn solvent_activities(activity: Activity) -> &'static [(&'static str, f64)] {
    match activity {
        Activity::Pharmaceuticals => &[("manufacturing of pharmaceutical products: is it one?", 50_000.0)],
        Activity::Food | Activity::Fats => {
            &[("extraction of vegetable oil or animal fat, refining of vegetable oil: is it one?", 10_000.0)]
        }
        Activity::Degreasing => &[
            (
                "surface cleaning with solvents of Article 59(5), such as those of H340, H350, H360, H341 or H351: is it one?",
                1_000.0,
            ),
            ("other surface cleaning: is it one?", 2_000.0),
        ],
        Activity::Laboratory | Activity::Organics | Activity::FineChemicals => &[],
    }
}

pub(super) fn paper(sheet: &Sheet<'_>) -> Paper {
    let moved = moved(&sheet.desk.routes);
    let mut lead = vec!["A figure above a threshold is no duty by itself: each register has a scope, and its question stands beside the figure.".to_owned()];
    let mut table = PaperTable {
        title: "Against thresholds, kg a year".into(),
        head: &["What", "List", "Amount", "Threshold", "As far as it goes"],
        rows: Vec::new(),
    };
    let mut put = |what: &str, list: &str, kg: f64, limit: f64, scope: &str| {
        let side = if kg > limit { "above the figure" } else { "at or below the figure" };
        table.rows.push(vec![
            what.into(),
            list.into(),
            kilograms(kg),
            kilograms(limit),
            [side, "; ", scope].concat(),
        ]);
    };
    let laboratory = sheet.site.waste.activity == Activity::Laboratory;
    let (us, eu) = (sheet.rules() != Rules::Eu, sheet.rules() != Rules::Us);
    let annex = "a duty only for activities of Annex I: is this one?";
    let tri = if laboratory {
        "amounts used in a laboratory under a technically qualified individual do not count (372.38(d)); not so for pilot plants, speciality production or work outside the laboratory"
    } else {
        "ask: ten full-time employees or more, and a covered industry code; making or processing has 25 000 lb of its own"
    };
    let (mut voc_eu, mut voc_us, mut hap_kg, mut consumed_kg) = (0.0, 0.0, 0.0, 0.0);
    for m in &moved {
        let s = m.substance;
        let row = rows().iter().find(|r| r[0] == s.name);
        let [_, air, water, on_tri, on_hap, exempt] = row.copied().unwrap_or_default();
        let organic = matches!(s.elements(), Some(Ok(e)) if e.count("C") > 0) && s.name != "carbon dioxide";
        if organic && s.name != "methane" {
            let volatile = s.vapour_pressure_pa(293.15).is_ok_and(|p| p.value >= VOLATILE_PA);
            voc_eu += if volatile { m.air_kg } else { 0.0 };
            let solvent = volatile && s.class == Class::Solvent;
            consumed_kg += if solvent { m.bought_kg } else { 0.0 };
            voc_us += if exempt.is_empty() { m.air_kg } else { 0.0 };
        }
        hap_kg += if on_hap.is_empty() { 0.0 } else { m.air_kg };
        if eu {
            for (list, kg, limit) in
                [("pollutant register, air", m.air_kg, air), ("pollutant register, water", m.drain_kg, water)]
            {
                if let (true, Some(limit)) = (kg > 0.0, nearest(limit)) {
                    put(&s.name, list, kg, limit, annex);
                }
            }
        }
        if us && !on_tri.is_empty() && m.bought_kg > 0.0 {
            put(&s.name, "toxics release inventory, otherwise used", m.bought_kg, TRI_OTHERWISE_USED_KG, tri);
        }
    }
    if eu {
        put("volatile organic compounds without methane", "pollutant register, air", voc_eu, NMVOC_KG, annex);
        let hazardous = sheet.desk.streams.iter().filter(|s| s.standing() != Standing::NotKnownHazardous);
        let leaving = hazardous.fold(0.0, |sum, s| sum + s.contents.mass_kg());
        put("hazardous waste that leaves", "pollutant register, transfers", leaving, TRANSFER_KG, annex);
        for (activity, limit_kg) in solvent_activities(sheet.site.waste.activity) {
            put(
                "organic solvents bought net of what is returned",
                "solvent balance, Directive 2010/75/EU",
                consumed_kg,
                *limit_kg,
                activity,
            );
        }
    }
    if let Some(categories) = sheet.desk.categories {
        let months = categories.iter().filter(|c| **c == Category::Lqg).count();
        lead.push(if months > 0 {
            [
                "Large quantity generator in ",
                &months.to_string(),
                " months: a biennial report is due by 1 March of the next even year where one of them falls in an odd one (40 CFR 262.41, from memory).",
            ]
            .concat()
        } else {
            "No month as a large quantity generator: no biennial report by the figures (40 CFR 262.41, from memory); a small quantity generator notifies again every four years (262.18(d), from memory).".to_owned()
        });
    }
    if eu && laboratory {
        lead.push("A laboratory is no activity of Directive 2010/75/EU, Annex VII: a solvent balance is voluntary, or a condition of a permit.".to_owned());
    }
    let totals = PaperTable {
        title: "To air by list, kg a year".into(),
        head: &["List", "kg", "What counts"],
        rows: [
            (
                "volatile organic compounds, Union",
                voc_eu,
                "0.01 kPa or more at 20 °C; acetone and dichloromethane count",
            ),
            (
                "volatile organic compounds, United States",
                voc_us,
                "40 CFR 51.100(s): acetone, dichloromethane, methyl acetate and others are exempt",
            ),
            (
                "hazardous air pollutants, United States",
                hap_kg,
                "section 112(b): dichloromethane, n-hexane, methanol, toluene; not acetone",
            ),
        ]
        .map(|(list, kg, what)| vec![list.to_owned(), kilograms(kg), what.to_owned()])
        .to_vec(),
    };
    Paper {
        title: "Registers and lists".into(),
        lead,
        tables: vec![table, totals],
        foot: vec![
            "Thresholds and lists are from memory (Regulation (EC) 166/2006 Article 5 and Annex II; Directive 2010/75/EU Annex VII Part 2; 40 CFR 372.25 and 372.65; Clean Air Act section 112(b); 40 CFR 51.100(s)): check the current text.".into(),
        ],
    }
}
