//! `schema`: the plan's JSON schema with every technique.

use crate::output::{Refusal, print};
use std::process::ExitCode;
use thimbleworth::plan::{TechniqueShape, schema};
use thimbleworth::step::TECHNIQUES;

pub(crate) fn run() -> Result<ExitCode, Refusal> {
    let shapes: Vec<TechniqueShape> = TECHNIQUES
        .iter()
        .map(|t| TechniqueShape { key: t.key, title: t.title, params: t.params, rules: t.rules })
        .collect();
    print(&schema(&shapes))?;
    Ok(ExitCode::SUCCESS)
}
