//! The hazard account as a document: statements with their text, pictogram codes as text, scores with their reasons.

use crate::account::{HazardAccount, MaterialHazard};
use crate::hazard::chem21::{Assessment, Score};
use crate::hazard::eco_scale::{Block, EcoScale, Line};
use crate::hazard::nemi::Criterion;
use crate::hazard::{Pictogram, chem21, eco_scale, nemi};
use crate::material::statement_text;
use serde::Serialize;

#[derive(Serialize)]
pub(super) struct HazardDocument<'a> {
    materials: Vec<MaterialDocument<'a>>,
    eco_scale: Option<EcoScaleDocument<'a>>,
    eco_scale_not_scored: Option<String>,
    nemi: Vec<NemiDocument<'a>>,
    nemi_source: &'static str,
    not_scored: &'a [String],
}

#[derive(Serialize)]
struct MaterialDocument<'a> {
    name: &'a str,
    statements: Vec<StatementDocument<'a>>,
    pictograms: Vec<&'static str>,
    optional_pictograms: Vec<&'static str>,
    signal_word: &'static str,
    unknown_statements: &'a [String],
    chem21: Option<Chem21Document>,
    chem21_not_scored: Option<String>,
    source: &'a str,
    as_of: &'a str,
}

#[derive(Serialize)]
struct StatementDocument<'a> {
    code: &'a str,
    text: Option<&'static str>,
}

#[derive(Serialize)]
struct Chem21Document {
    safety: ScoreDocument,
    health: ScoreDocument,
    environment: ScoreDocument,
    ranking: &'static str,
    because: &'static str,
    source: &'static str,
}

#[derive(Serialize)]
struct ScoreDocument {
    score: u8,
    may_be_low_by: u8,
    reasons: Vec<String>,
}

#[derive(Serialize)]
struct EcoScaleDocument<'a> {
    score: i64,
    penalty: u64,
    verdict: &'static str,
    lines: Vec<LineDocument<'a>>,
    source: &'static str,
}

#[derive(Serialize)]
struct LineDocument<'a> {
    block: &'static str,
    what: &'a str,
    amount: &'a str,
    penalty: u32,
    why: &'a str,
}

#[derive(Serialize)]
struct NemiDocument<'a> {
    rule: &'static str,
    met: &'static str,
    why: &'a str,
}

impl<'a> HazardDocument<'a> {
    pub(super) fn of(account: &'a HazardAccount) -> Self {
        let eco = &account.eco_scale;
        Self {
            materials: account.materials.iter().map(material).collect(),
            eco_scale: eco.as_ref().ok().map(scale),
            eco_scale_not_scored: eco.as_ref().err().map(ToString::to_string),
            nemi: account.nemi.iter().map(criterion).collect(),
            nemi_source: nemi::SOURCE.cite,
            not_scored: &account.not_scored,
        }
    }
}

fn material<'a>(m: &'a MaterialHazard) -> MaterialDocument<'a> {
    let codes = |pictograms: &[Pictogram]| pictograms.iter().map(|p| p.code()).collect();
    let statement = |code: &'a String| StatementDocument { code, text: statement_text(code) };
    MaterialDocument {
        name: &m.name,
        statements: m.statements.iter().map(statement).collect(),
        pictograms: codes(&m.label.pictograms),
        optional_pictograms: codes(&m.label.optional),
        signal_word: m.label.signal_word.word(),
        unknown_statements: &m.label.unknown,
        chem21: m.chem21.as_ref().and_then(|c| c.as_ref().ok()).map(assessment),
        chem21_not_scored: match &m.chem21 {
            Some(Ok(_)) => None,
            Some(Err(why)) => Some(why.to_string()),
            None => Some("the guide scores solvents only".to_owned()),
        },
        source: &m.source,
        as_of: &m.as_of,
    }
}

fn assessment(a: &Assessment) -> Chem21Document {
    Chem21Document {
        safety: score(&a.safety),
        health: score(&a.health),
        environment: score(&a.environment),
        ranking: a.ranking.word(),
        because: a.because,
        source: chem21::SOURCE.cite,
    }
}

fn score(s: &Score) -> ScoreDocument {
    ScoreDocument {
        score: s.value,
        may_be_low_by: s.may_be_low_by(),
        reasons: s.reasons.iter().map(ToString::to_string).collect(),
    }
}

fn scale(eco: &EcoScale) -> EcoScaleDocument<'_> {
    EcoScaleDocument {
        score: eco.score,
        penalty: eco.penalty,
        verdict: eco.verdict.word(),
        lines: eco.lines.iter().map(line).collect(),
        source: eco_scale::SOURCE.cite,
    }
}

fn line(l: &Line) -> LineDocument<'_> {
    let block = match l.block {
        Block::Reagent => "reagent",
        Block::Energy => "energy",
        Block::Occupational => "occupational hazard",
        Block::Waste => "waste",
        Block::Treatment => "treatment of waste",
    };
    LineDocument { block, what: &l.what, amount: &l.amount, penalty: l.penalty, why: &l.why }
}

fn criterion(c: &Criterion) -> NemiDocument<'_> {
    NemiDocument { rule: c.rule, met: c.met.word(), why: &c.why }
}
