//! The pour check as a paper.

use super::{Paper, PaperTable, Sheet, codes};
use crate::account::{Account, SiteDesk};
use crate::code::{Charge, Contents, Part, Rules};
use crate::material::Substance;
use crate::plan::Plan;
use crate::pour::{Finding, Vessel, drain, into_vessel};
use crate::program::{MaterialBook, MaterialUse};
use crate::quantity::{Kind, read};
use crate::report::words::cited;
use crate::room::Day;

/// What is to be poured where.
#[derive(Clone, Copy, Debug)]
pub struct Asked<'a> {
    /// A stream of the site, or `drain`.
    pub into: &'a str,
    /// Materials with mass or volume, as one mixture: `acetone`, `40 mL`.
    pub parts: &'a [(String, String)],
    /// What is in the container already; half of what it may hold where nobody says.
    pub held: Option<&'a str>,
}

/// Whether a mixture may go into a container of the site, as a paper.
///
/// ```
/// use thimbleworth::{account::{account_text, site_desk}, example::EXAMPLES, report::{Asked, pour_paper}};
/// let account = account_text(EXAMPLES[1].text);
/// let desk = site_desk(&account, &[]).unwrap();
/// let parts = [("nitric acid".to_owned(), "50 mL".to_owned())];
/// let paper = pour_paper(&account, &desk, &Asked { into: "halogenated", parts: &parts, held: None }).unwrap();
/// assert!(paper.title.contains("do not pour"));
/// ```
///
/// # Errors
/// A sentence: a material, an amount or a stream that nobody knows, and what would do.
pub fn pour_paper(account: &Account, desk: &SiteDesk<'_>, asked: &Asked<'_>) -> Result<Paper, String> {
    let (Some(program), Some(plan)) = (&account.program, &account.plan) else {
        return Err("the plan has no program".to_owned());
    };
    let sheet = Sheet { account, program, site: &program.site, desk };
    let known = materials(plan, asked.parts)?;
    let poured = poured(&sheet, asked.parts, &known)?;
    let mut paper = if asked.into == "drain" {
        let findings = drain(&poured, sheet.site.waste.drain_permit.as_deref());
        Paper { title: title("the drain", &findings), tables: vec![table(&findings)], ..Paper::default() }
    } else {
        stream(&sheet, asked, &poured)?
    };
    let what: Vec<String> =
        asked.parts.iter().map(|(name, amount)| [name.as_str(), amount].join(" ")).collect();
    paper.lead.insert(0, ["To be poured, as one mixture: ", &what.join(", "), "."].concat());
    sheet.foot(&mut paper.foot);
    Ok(paper)
}

fn materials(plan: &Plan, parts: &[(String, String)]) -> Result<Vec<MaterialUse>, String> {
    let mut book = MaterialBook::read(&plan.materials, &mut Vec::new());
    let find = |(name, _): &(String, String)| {
        book.find(name.trim()).map_err(|(found, need)| [found, need].join("; "))
    };
    parts.iter().map(find).collect()
}

fn poured<'a>(
    sheet: &Sheet<'_>,
    parts: &[(String, String)],
    known: &'a [MaterialUse],
) -> Result<Contents<'a>, String> {
    let mut out = Contents { activity: sheet.site.waste.activity, ..Contents::default() };
    let mut charge = Charge { what: "this pour".into(), volumes_m3: Vec::new() };
    for ((name, text), used) in parts.iter().zip(known) {
        let s: &Substance = &used.substance;
        let density = s.density_kg_m3(sheet.site.bench_temperature_k).ok().map(|f| f.value);
        let kg = match (read(text, Kind::Volume), density) {
            (Ok(m3), Some(density)) => m3.central_si * density,
            (Ok(_), None) => {
                return Err([name, ": no density is known; a mass such as \"40 g\" would do"].concat());
            }
            (Err(_), _) => match read(text, Kind::Mass) {
                Ok(kg) => kg.central_si,
                Err(e) => return Err([name, ": ", &e.to_string()].concat()),
            },
        };
        if kg <= 0.0 {
            return Err([name, ": an amount above zero would do"].concat());
        }
        let part = Part { substance: s, kg, density_kg_m3: density };
        charge.volumes_m3.push((s, part.volume_m3()));
        out.parts.push(part);
    }
    if out.parts.is_empty() {
        return Err(
            "nothing is to be poured; a material with its amount, such as acetone=40 mL, would do".to_owned()
        );
    }
    out.charges.push(charge);
    Ok(out)
}

fn stream(sheet: &Sheet<'_>, asked: &Asked<'_>, poured: &Contents<'_>) -> Result<Paper, String> {
    let Some(at) = sheet.site.streams.iter().position(|s| s.name == asked.into) else {
        let names: Vec<&str> = sheet.site.streams.iter().map(|s| s.name.as_str()).collect();
        return Err(
            ["no stream is called \"", asked.into, "\"; one of: ", &names.join(", "), ", or drain"].concat()
        );
    };
    let Some(stream) = sheet.site.streams.get(at) else { return Err(String::new()) };
    let held = match asked.held {
        Some(text) => Some(read(text, Kind::Volume).map_err(|e| e.to_string())?.central_si),
        None => None,
    };
    let most = stream.container_m3.map(|m3| m3 * stream.fill);
    let empty = Contents { solid: stream.solid, activity: sheet.site.waste.activity, ..Contents::default() };
    let filled = sheet.desk.streams.iter().find(|s| s.stream == at).map(|s| &s.contents);
    let mut into = filled.cloned().unwrap_or(empty);
    // In the proportions of a year: what is said to be in it, else half of what it may hold.
    let there = if stream.solid { into.mass_kg() / stream.bulk_density_kg_m3 } else { into.volume_m3() };
    if let Some(m3) = held.or(most.map(|m| m / 2.0))
        && there > 0.0
    {
        for p in &mut into.parts {
            p.kg *= m3 / there;
        }
    }
    let vessel = Vessel {
        capacity_m3: stream.container_m3,
        fill: stream.fill,
        held_m3: held,
        made_of: stream.waste.made_of.as_deref(),
        density_mark: stream.waste.density_mark,
    };
    let as_of = sheet.site.as_of.as_deref().and_then(|d| Day::parse(d).ok());
    let check = into_vessel(poured, &into, &vessel, Rules::of(&sheet.site.rules), as_of);
    let mut lead = Vec::new();
    for (what, codes) in
        [("The container gains: ", &check.gained), ("It gains, to be tested: ", &check.gained_open)]
    {
        let text = if codes.is_empty() { "no code".to_owned() } else { codes.join(", ") };
        lead.push([what, &text, "."].concat());
    }
    if filled.is_none() {
        lead.push(
            "No route of the plan fills this container: its codes are those of an empty one.".to_owned(),
        );
        if held.is_none() && most.is_some() {
            lead.push("For the space in it, it is taken as half full.".to_owned());
        }
    } else if held.is_none() {
        lead.push("The container is taken as half full, in the proportions of a year.".to_owned());
    }
    let codes = PaperTable {
        title: "Codes afterwards".into(),
        head: &codes::HEAD,
        rows: check.after.iter().map(codes::row).collect(),
    };
    Ok(Paper {
        title: title(&stream.name, &check.findings),
        lead,
        tables: vec![table(&check.findings), codes],
        foot: Vec::new(),
    })
}

fn title(into: &str, findings: &[Finding]) -> String {
    let verdict = findings.iter().map(|f| f.severity).reduce(|a, b| if b < a { b } else { a });
    ["Pour into ", into, ": ", verdict.map_or("nothing found against it", |v| v.words())].concat()
}

fn table(findings: &[Finding]) -> PaperTable {
    let row = |f: &Finding| vec![f.severity.words().to_owned(), f.what.clone(), cited(f.source)];
    PaperTable {
        title: "Found".into(),
        head: &["", "What", "Source"],
        rows: findings.iter().map(row).collect(),
    }
}
