//! Without a subcommand: the embedded demo plan, its comparison, and where to go next.

use crate::output::{Refusal, complain_of, print};
use std::process::ExitCode;
use thimbleworth::account::account_text;
use thimbleworth::example::EXAMPLES;
use thimbleworth::report::comparison_table;

pub(crate) fn run() -> Result<ExitCode, Refusal> {
    let Some(demo) = EXAMPLES.first() else {
        return Err(Refusal::because("this build holds no example plan; give a plan of your own"));
    };
    let account = account_text(demo.text);
    if account.broken() {
        complain_of(&account.problems);
        return Err(Refusal::Said);
    }
    let mut text = format!("An example in an invented place ({}), not a result of yours.\n\n", demo.key);
    text.push_str(&comparison_table(&account));
    text.push_str(&format!(
        "\nNext:\n  \
         thimbleworth example {key} > plan.json       this plan as a file to change\n  \
         thimbleworth compare plan.json                          your own routes beside one another\n  \
         thimbleworth trace plan.json waste.total.mass           what stands behind a figure\n",
        key = demo.key
    ));
    print(&text)?;
    Ok(ExitCode::SUCCESS)
}
