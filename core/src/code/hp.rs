//! Hazardous properties HP3 to HP15 with their arithmetic: shares by mass of the whole container.

use super::contents::{Contents, Part, is_solvent};
use super::us::burns;
use super::verdict::{Answer, Desk, Fact, list, share};
use crate::material::{Class, Substance};

/// The statements read: the supplier's where its label carries more, for what is poured as a liquid or dissolved.
fn statements(s: &Substance) -> &[String] {
    let wider = matches!(s.class, Class::Solvent | Class::Reagent | Class::Solute)
        && s.hazard.supplier_statements.len() > s.hazard.statements.len();
    if wider { &s.hazard.supplier_statements } else { &s.hazard.statements }
}

/// Whether a substance carries a statement; the letters behind `H360` and its kin do not matter.
fn has(s: &Substance, code: &str) -> bool {
    statements(s).iter().any(|h| h.starts_with(code))
}

/// One limit of a property.
struct Limit {
    /// The statements whose shares are added or compared.
    codes: &'static [&'static str],
    /// The share at which the property applies.
    at: f64,
    /// Shares below this are left out; no cut-off where it is 0.
    cut_off: f64,
    /// Whether shares are added; else each substance is compared by itself.
    summed: bool,
}

const fn each(codes: &'static [&'static str], at: f64) -> Limit {
    Limit { codes, at, cut_off: 0.0, summed: false }
}

const fn sum(codes: &'static [&'static str], at: f64, cut_off: f64) -> Limit {
    Limit { codes, at, cut_off, summed: true }
}

/// HP5 to HP13 as far as they are limits of shares. A category that the statement does not tell takes the stricter limit.
const PROPERTIES: [(&str, &[Limit]); 7] = [
    (
        "HP5",
        &[
            each(&["H370"], 0.01),
            each(&["H371"], 0.1),
            each(&["H335"], 0.2),
            each(&["H372"], 0.01),
            each(&["H373"], 0.1),
        ],
    ),
    (
        "HP6",
        &[
            sum(&["H300"], 0.001, 0.001),
            sum(&["H301"], 0.05, 0.001),
            sum(&["H302"], 0.25, 0.01),
            sum(&["H310"], 0.0025, 0.001),
            sum(&["H311"], 0.15, 0.001),
            sum(&["H312"], 0.55, 0.01),
            sum(&["H330"], 0.001, 0.001),
            sum(&["H331"], 0.035, 0.001),
            sum(&["H332"], 0.225, 0.01),
        ],
    ),
    ("HP7", &[each(&["H350"], 0.001), each(&["H351"], 0.01)]),
    ("HP8", &[sum(&["H314"], 0.05, 0.01)]),
    ("HP10", &[each(&["H360"], 0.003), each(&["H361"], 0.03)]),
    ("HP11", &[each(&["H340"], 0.001), each(&["H341"], 0.01)]),
    ("HP13", &[each(&["H317"], 0.1), each(&["H334"], 0.1)]),
];

struct Shares<'a, 'b> {
    parts: &'b [Part<'a>],
    kg: f64,
}

impl Shares<'_, '_> {
    /// The share that a limit compares, and the names behind it.
    fn of(&self, limit: &Limit) -> (f64, String) {
        let (mut total, mut names) = (0.0, Vec::new());
        for p in self.parts {
            let share = p.kg / self.kg;
            if share <= 0.0 || share < limit.cut_off || !limit.codes.iter().any(|c| has(p.substance, c)) {
                continue;
            }
            if limit.summed {
                total += share;
                names.push(&*p.substance.name);
            } else if share > total {
                total = share;
                names = vec![&*p.substance.name];
            }
        }
        (total, list(names))
    }

    fn fact(&self, limit: &Limit) -> Option<(bool, Fact)> {
        let (found, names) = self.of(limit);
        let what = [&limit.codes.join(", "), " ", &names].concat();
        (found > 0.0).then(|| (reached(found, limit.at), share(what, found, limit.at)))
    }
}

/// At or above a limit; a share that differs from it by rounding alone is at it.
fn reached(share: f64, limit: f64) -> bool {
    share >= limit * (1.0 - 1e-9)
}

pub(super) fn read(c: &Contents<'_>, desk: &mut Desk) {
    let shares = Shares { parts: &c.parts, kg: c.mass_kg() };
    let (answer, why, facts) = burns(c);
    // What burns is on the label until tested; what is only suspected in water or clings to a solid is left to the test.
    if answer != Answer::No || !facts.is_empty() {
        desk.put("HP3", answer, why, facts);
    }
    irritant(&shares, desk);
    for (key, limits) in PROPERTIES {
        let mut facts = Vec::new();
        let mut yes = false;
        for limit in limits {
            if let Some((over, fact)) = shares.fact(limit) {
                yes |= over;
                facts.push(fact);
            }
        }
        let mut test = false;
        if key == "HP5" && !c.solid {
            // Aspiration: the sum, and a kinematic viscosity of at most 20.5 mm²/s at 40 °C, which solvents keep.
            if let Some((over, fact)) = shares.fact(&sum(&["H304"], 0.1, 0.0)) {
                let thin = c.mass_share(&is_solvent) >= 0.5;
                yes |= over && thin;
                test |= over && !thin;
                facts.push(fact);
            }
        }
        if !facts.is_empty() {
            let answer = if yes {
                Answer::Yes
            } else if test {
                Answer::Test
            } else {
                Answer::No
            };
            let mut why = match answer {
                Answer::Yes => "at or above a limit".to_owned(),
                Answer::Test => "for H304 the viscosity decides: at most 20.5 mm²/s at 40 °C".to_owned(),
                Answer::Assumed | Answer::No => "below every limit".to_owned(),
            };
            notes(c, limits, &mut why);
            desk.put(key, answer, why, facts);
        }
    }
    gas(c, desk);
    ecotoxic(&shares, desk);
    let later = c.having(&|s| ["EUH001", "EUH019", "EUH044", "H205"].iter().any(|h| has(s, h)));
    if !later.is_empty() {
        let why = ["may form peroxides or explode later: ", &list(later.iter().map(|s| &*s.name))].concat();
        desk.put("HP15", Answer::Test, why, Vec::new());
    }
}

/// What changed lately in the entry of a substance that these limits read.
fn notes(c: &Contents<'_>, limits: &[Limit], why: &mut String) {
    for s in
        c.having(&|s| !s.hazard.note.is_empty() && limits.iter().any(|l| l.codes.iter().any(|h| has(s, h))))
    {
        for part in ["; ", &s.name, ": ", &s.hazard.note] {
            why.push_str(part);
        }
    }
}

/// HP4; where HP8 applies, HP4 does not.
fn irritant(shares: &Shares<'_, '_>, desk: &mut Desk) {
    let (corrosive, _) = shares.of(&sum(&["H314"], 0.05, 0.01));
    let mut facts = Vec::new();
    let mut answer = Answer::No;
    // Category 1A is not told by the statement: between its limit and that of HP8 it is asked for.
    if let Some((over, fact)) = shares.fact(&sum(&["H314"], 0.01, 0.01)) {
        answer = if over { Answer::Test } else { answer };
        facts.push(fact);
    }
    // Read as: each substance with either statement counts once; the stricter of two readings of the text.
    for limit in [sum(&["H318"], 0.1, 0.01), sum(&["H315", "H319"], 0.2, 0.01)] {
        if let Some((over, fact)) = shares.fact(&limit) {
            answer = if over { Answer::Yes } else { answer };
            facts.push(fact);
        }
    }
    if facts.is_empty() {
        return;
    }
    let why = if reached(corrosive, 0.05) {
        answer = Answer::No;
        "HP8 applies in its place"
    } else {
        match answer {
            Answer::Yes => "at or above a limit; substances with H315 or H319 are added, each once",
            Answer::Test => "applies if a substance with H314 is of category 1A",
            Answer::Assumed | Answer::No => "below every limit",
        }
    };
    desk.put("HP4", answer, why, facts);
}

fn gas(c: &Contents<'_>, desk: &mut Desk) {
    let makers = c.having(&|s| ["EUH029", "EUH031", "EUH032"].iter().any(|h| has(s, h)));
    if !makers.is_empty() {
        let why = ["may release a toxic gas: ", &list(makers.iter().map(|s| &*s.name))].concat();
        desk.put("HP12", Answer::Test, why, Vec::new());
    }
}

fn ecotoxic(shares: &Shares<'_, '_>, desk: &mut Desk) {
    let part = |code: &'static [&'static str], cut_off| shares.of(&sum(code, 1.0, cut_off));
    let (ozone, acute) = (part(&["H420"], 0.001), part(&["H400"], 0.001));
    let [h410, h411] = [part(&["H410"], 0.001).0, part(&["H411"], 0.01).0];
    let [h412, h413] = [part(&["H412"], 0.01).0, part(&["H413"], 0.01).0];
    let chronic = h410 + h411 + h412 + h413;
    if ozone.0 + acute.0 + chronic <= 0.0 {
        return;
    }
    // 100 Σ H410 + 10 Σ H411 + Σ H412
    let weighted = 100.0 * h410 + 10.0 * h411 + h412;
    let rows = [
        (ozone.0, 0.001, "H420"),
        (acute.0, 0.25, "Σ H400"),
        (weighted, 0.25, "100 Σ H410 + 10 Σ H411 + Σ H412"),
        (chronic, 0.25, "Σ H410, H411, H412, H413"),
    ];
    let yes = rows.iter().any(|(found, limit, _)| reached(*found, *limit));
    let facts = rows
        .into_iter()
        .filter(|r| r.0 > 0.0)
        .map(|(found, limit, what)| share(what, found, limit))
        .collect();
    let (answer, why) =
        if yes { (Answer::Yes, "at or above a limit") } else { (Answer::No, "below every limit") };
    desk.put("HP14", answer, why, facts);
}
