//! European Union: hazardous properties, then the entry of the List of Waste with its reasoning.

use super::contents::{Activity, Contents, is_halogenated, is_solvent, is_water};
use super::hp;
use super::verdict::{Answer, Desk, Fact, list, share};
use crate::material::{Class, Substance};

/// Halogenated solvent from which the halogenated entry is taken; common practice, no source.
const HALOGENATED: f64 = 0.01;

pub(super) fn read(c: &Contents<'_>, desk: &mut Desk) {
    hp::read(c, desk);
    let hazardous = desk.verdicts.iter().any(|v| v.rule.code.starts_with("HP") && (v.applies() || v.open()));
    let properties = list(desk.verdicts.iter().filter(|v| v.applies()).map(|v| &*v.code));
    let (code, answer, reason, facts) = entry(c, hazardous);
    let why = if code.ends_with('*') && !properties.is_empty() {
        [reason, "; it shows ", &properties].concat()
    } else if code.ends_with('*') {
        [reason, "; no property is certain: archive the working above"].concat()
    } else {
        reason.to_owned()
    };
    desk.put("low", answer, why, facts);
    desk.code(code);
}

fn is_wipe(s: &Substance) -> bool {
    matches!(s.class, Class::DryingAgent | Class::Sorbent | Class::Consumable)
}

type Entry = (&'static str, Answer, &'static str, Vec<Fact>);

fn entry(c: &Contents<'_>, hazardous: bool) -> Entry {
    let none = Vec::new();
    if c.unused {
        return if hazardous {
            ("16 05 06*", Answer::Yes, "unused laboratory chemicals, mixtures included, hazardous", none)
        } else {
            ("16 05 09", Answer::Yes, "unused chemicals that show no hazardous property", none)
        };
    }
    let water = c.mass_share(&is_water);
    let halogenated = c.mass_share(&is_halogenated);
    let has_halogenated = halogenated >= HALOGENATED * (1.0 - 1e-9);
    let facts = vec![
        share("water by mass", water, 0.5),
        share("halogenated solvent by mass", halogenated, HALOGENATED),
    ];
    let halo = |yes: &'static str, no: &'static str| if has_halogenated { yes } else { no };
    if c.solid {
        return solid(c, hazardous, has_halogenated, facts);
    }
    // Sectors with a chapter of their own come before chapters 14 and 16.
    let chapter: Option<[&'static str; 3]> = match c.activity {
        Activity::Organics => Some(["07 01 01*", "07 01 03*", "07 01 04*"]),
        Activity::Pharmaceuticals => Some(["07 05 01*", "07 05 03*", "07 05 04*"]),
        Activity::Fats => Some(["07 06 01*", "07 06 03*", "07 06 04*"]),
        Activity::FineChemicals => Some(["07 07 01*", "07 07 03*", "07 07 04*"]),
        Activity::Laboratory | Activity::Degreasing | Activity::Food => None,
    };
    if let Some([aqueous, with, without]) = chapter {
        return if water >= 0.5 {
            (aqueous, Answer::Yes, "aqueous washing liquids and mother liquors of this sector", facts)
        } else {
            (
                halo(with, without),
                Answer::Yes,
                "organic solvents, washing liquids and mother liquors of this sector",
                facts,
            )
        };
    }
    if water >= 0.5 {
        return if hazardous {
            (
                "16 10 01*",
                Answer::Yes,
                "aqueous liquid for treatment elsewhere, containing hazardous substances: a mirror entry, so the properties decide",
                facts,
            )
        } else {
            (
                "16 10 02",
                Answer::Yes,
                "aqueous liquid for treatment elsewhere, without a hazardous property: a mirror entry, so the properties decide",
                facts,
            )
        };
    }
    if c.having(&is_solvent).is_empty() {
        return if hazardous {
            ("16 05 06*", Answer::Yes, "laboratory chemicals, mixtures included, hazardous", facts)
        } else {
            (
                "16 05 09",
                Answer::Test,
                "no solvent and no hazardous property is known of it: its origin decides the entry",
                facts,
            )
        };
    }
    let propellant = |s: &Substance| s.eu_low.spent.as_deref() == Some("14 06 01*");
    if !c.having(&propellant).is_empty() {
        return ("14 06 01*", Answer::Yes, "chlorofluorocarbons, HCFC, HFC", facts);
    }
    let reason = if has_halogenated {
        "halogenated solvents and their mixtures, as used; in a laboratory chapter 14 comes before chapter 16"
    } else {
        "other solvents and their mixtures, as used; in a laboratory chapter 14 comes before chapter 16"
    };
    (halo("14 06 02*", "14 06 03*"), Answer::Yes, reason, facts)
}

fn solid(c: &Contents<'_>, hazardous: bool, has_halogenated: bool, mut facts: Vec<Fact>) -> Entry {
    let solvent = !c.having(&is_solvent).is_empty();
    let wipes = c.mass_share(&is_wipe);
    facts.push(share("filters, sorbents, drying agents, disposables by mass", wipes, 0.5));
    if wipes >= 0.5 {
        return if hazardous {
            (
                "15 02 02*",
                Answer::Yes,
                "absorbents, filter materials, wipes and gloves contaminated by hazardous substances: a mirror entry",
                facts,
            )
        } else {
            (
                "15 02 03",
                Answer::Yes,
                "absorbents, filter materials and wipes without a hazardous property: a mirror entry",
                facts,
            )
        };
    }
    if c.activity == Activity::Food && !hazardous {
        return (
            "02 03 03",
            Answer::Yes,
            "wastes from solvent extraction of plant material, without a hazardous property",
            facts,
        );
    }
    if solvent {
        let code = if has_halogenated { "14 06 04*" } else { "14 06 05*" };
        return (code, Answer::Yes, "solid wastes that contain solvents", facts);
    }
    if hazardous {
        ("16 05 06*", Answer::Yes, "laboratory chemicals, mixtures included, hazardous", facts)
    } else {
        (
            "16 05 09",
            Answer::Test,
            "no solvent and no hazardous property is known of it: the origin of the sample decides the entry",
            facts,
        )
    }
}
