//! The hazard account as a document: statements with their text, pictogram codes as text, scores with their reasons.

use super::super::json::{Json, Value};
use crate::account::{HazardAccount, MaterialHazard};
use crate::hazard::chem21::{Assessment, Score};
use crate::hazard::eco_scale::{Block, EcoScale};
use crate::hazard::{Pictogram, chem21, eco_scale, nemi};
use crate::material::statement_text;

pub(super) fn hazard(json: &mut Json, account: &HazardAccount) {
    json.list("materials", |json| {
        for m in &account.materials {
            json.row(|json| material(json, m));
        }
    });
    match &account.eco_scale {
        Ok(eco) => {
            json.object("eco_scale", |json| scale(json, eco));
            json.put("eco_scale_not_scored", Value::Null);
        }
        Err(why) => {
            json.put("eco_scale", Value::Null);
            json.put("eco_scale_not_scored", &why.to_string());
        }
    }
    json.list("nemi", |json| {
        for criterion in &account.nemi {
            json.row(|json| {
                json.put("rule", criterion.rule);
                json.put("met", criterion.met.word());
                json.put("why", &criterion.why);
            });
        }
    });
    json.put("nemi_source", nemi::SOURCE.cite);
    json.texts("not_scored", &account.not_scored);
}

fn material(json: &mut Json, m: &MaterialHazard) {
    json.put("name", &m.name);
    json.list("statements", |json| {
        for code in &m.statements {
            json.row(|json| {
                json.put("code", code);
                json.put("text", statement_text(code));
            });
        }
    });
    pictograms(json, "pictograms", &m.label.pictograms);
    pictograms(json, "optional_pictograms", &m.label.optional);
    json.put("signal_word", m.label.signal_word.word());
    json.texts("unknown_statements", &m.label.unknown);
    let not_scored = match &m.chem21 {
        Some(Ok(scores)) => {
            json.object("chem21", |json| assessment(json, scores));
            None
        }
        Some(Err(why)) => Some(why.to_string()),
        None => Some("the guide scores solvents only".to_owned()),
    };
    if not_scored.is_some() {
        json.put("chem21", Value::Null);
    }
    json.put("chem21_not_scored", not_scored.as_deref());
    json.put("source", &m.source);
    json.put("as_of", &m.as_of);
}

fn pictograms(json: &mut Json, key: &str, pictograms: &[Pictogram]) {
    json.list(key, |json| {
        for pictogram in pictograms {
            json.item(pictogram.code());
        }
    });
}

fn assessment(json: &mut Json, a: &Assessment) {
    for (key, of) in [("safety", &a.safety), ("health", &a.health), ("environment", &a.environment)] {
        json.object(key, |json| score(json, of));
    }
    json.put("ranking", a.ranking.word());
    json.put("because", a.because);
    json.put("source", chem21::SOURCE.cite);
}

fn score(json: &mut Json, s: &Score) {
    json.put("score", s.value);
    json.put("may_be_low_by", s.may_be_low_by());
    json.list("reasons", |json| {
        for reason in &s.reasons {
            json.item(&reason.to_string());
        }
    });
}

fn scale(json: &mut Json, eco: &EcoScale) {
    json.put("score", eco.score);
    json.put("penalty", eco.penalty);
    json.put("verdict", eco.verdict.word());
    json.list("lines", |json| {
        for line in &eco.lines {
            let block = match line.block {
                Block::Reagent => "reagent",
                Block::Energy => "energy",
                Block::Occupational => "occupational hazard",
                Block::Waste => "waste",
                Block::Treatment => "treatment of waste",
            };
            json.row(|json| {
                json.put("block", block);
                json.put("what", &line.what);
                json.put("amount", &line.amount);
                json.put("penalty", line.penalty);
                json.put("why", &line.why);
            });
        }
    });
    json.put("source", eco_scale::SOURCE.cite);
}
