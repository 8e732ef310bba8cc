//! Spent solvents, F001 to F005: by what each charge was before use, inherited by everything that it reaches.

use super::contents::{Activity, Charge, Contents, rcra};
use super::verdict::{Answer, Desk, Fact, share};
use crate::material::Substance;

/// The lists that count together towards the 10 %.
const TOTAL: [&str; 4] = ["F001", "F002", "F004", "F005"];

fn is_on(s: &Substance, code: &str, degreasing: bool) -> bool {
    let codes = rcra(s);
    let has = |list: &[String]| list.iter().any(|c| c == code);
    match code {
        "F001" => degreasing && has(&codes.spent_in_degreasing),
        // What is F001 in degreasing is not F002 as well.
        "F002" if degreasing && !codes.spent_in_degreasing.is_empty() => false,
        _ => has(&codes.spent),
    }
}

/// Whether it counts towards the 10 %, in degreasing or not.
fn counts(s: &Substance) -> bool {
    let codes = rcra(s);
    !codes.spent_in_degreasing.is_empty() || codes.spent.iter().any(|c| TOTAL.contains(&c.as_str()))
}

fn volume_share(charge: &Charge<'_>, holds: &dyn Fn(&Substance) -> bool) -> f64 {
    let (mut there, mut all) = (0.0, 0.0);
    for (s, m3) in &charge.volumes_m3 {
        all += m3;
        if holds(s) {
            there += m3;
        }
    }
    if all > 0.0 { there / all } else { 0.0 }
}

/// What a list says to one charge: whether it applies, why, and the shares by volume before use.
fn held(
    charge: &Charge<'_>,
    code: &'static str,
    degreasing: bool,
) -> Option<(bool, &'static str, Vec<Fact>)> {
    let own = volume_share(charge, &|s| is_on(s, code, degreasing));
    if own <= 0.0 {
        return None;
    }
    let total = volume_share(charge, &counts);
    // Shares come from sums of volumes: a hair below the limit is the limit.
    let enough = total >= 0.1 - 1e-9;
    let named = |what: &str| [&charge.what, ", before use: ", what].concat();
    let of_total = share(named("F001, F002, F004, F005 solvents by volume"), total, 0.1);
    if code != "F003" {
        let why = if enough {
            "10 % or more of listed solvents before use"
        } else {
            "less than 10 % of listed solvents before use"
        };
        return Some((enough, why, vec![of_total]));
    }
    let only = own >= 1.0 - 1e-9;
    let why = if only {
        "only F003 solvents before use"
    } else if enough {
        "F003 solvent with 10 % or more of F001, F002, F004 or F005 solvents before use"
    } else if volume_share(charge, &|s| s.class == crate::material::Class::Water) > 0.0 {
        "with water before use it is not solely F003 solvent; this reading is contested: ask"
    } else {
        "other solvents were in it before use, and less than 10 % of F001, F002, F004 or F005 solvents"
    };
    Some((only || enough, why, vec![share(named("F003 solvents by volume"), own, 1.0), of_total]))
}

pub(super) fn read(c: &Contents<'_>, desk: &mut Desk) {
    let degreasing = c.activity == Activity::Degreasing;
    for code in ["F001", "F002", "F003", "F004", "F005"] {
        let mut bringing: Vec<&str> = Vec::new();
        // The verdict rests on the first charge that brings the code, else on the first that comes near it.
        let mut shown: Option<(bool, &'static str, Vec<Fact>)> = None;
        for charge in &c.charges {
            let Some(found) = held(charge, code, degreasing) else { continue };
            if found.0 && !bringing.contains(&charge.what.as_str()) {
                bringing.push(&charge.what);
            }
            if shown.as_ref().is_none_or(|(applies, ..)| found.0 && !applies) {
                shown = Some(found);
            }
        }
        let Some((applies, why, facts)) = shown else { continue };
        let mut why = why.to_owned();
        if applies && (c.solid || c.charges.len() > 1 || c.parts.len() > 1) {
            why.push_str(
                "; what it is mixed with or clings to inherits the code (40 CFR 261.3(a)(2)(iv), (c)(2)(i))",
            );
        }
        if applies && code == "F003" {
            why.push_str(", until the mixture shows no characteristic (261.3(g))");
        }
        desk.put(code, if applies { Answer::Yes } else { Answer::No }, why, facts);
        if applies {
            desk.change(["without ", &bringing.join("; "), ": it would not be on this container"].concat());
        }
    }
}
