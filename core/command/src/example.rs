//! `example`: the embedded plans, to begin from.

use crate::output::{Refusal, print};
use std::process::ExitCode;
use thimbleworth::example::EXAMPLES;

#[derive(clap::Args)]
pub(crate) struct Args {
    /// The key of an example: its plan is written to the standard output
    key: Option<String>,
}

pub(crate) fn run(args: &Args) -> Result<ExitCode, Refusal> {
    let text = match &args.key {
        None => {
            EXAMPLES.iter().map(|e| format!("{}: {}\n  {}\n", e.key, e.title, e.about)).collect::<String>()
        }
        Some(key) => {
            let found = EXAMPLES.iter().find(|e| e.key == key.as_str());
            let example = found.ok_or_else(|| {
                let keys: Vec<&str> = EXAMPLES.iter().map(|e| e.key).collect();
                Refusal::because(format!("no example \"{key}\"; there are: {}", keys.join(", ")))
            })?;
            example.text.to_owned()
        }
    };
    print(&text)?;
    Ok(ExitCode::SUCCESS)
}
