//! The page: a view of the account in `thimbleworth`, and nothing that the account itself should know.
//!
//! `document`, `edit`, `files`, `form`, `history`, `reckon`, `show` and `state` are free of the document object model and
//! tested natively; everything else draws. `account` is exported
//! beside `start_page`, so that what a test computes with is the very module that people open.
mod app;
mod browser;
pub mod document;
mod draws;
pub mod edit;
pub mod files;
pub mod form;
pub mod history;
mod parts;
pub mod picture;
pub mod reckon;
mod sections;
pub mod show;
pub mod state;

use thimbleworth::account::{Account, account_text};
use thimbleworth::odds::{MOST_CELLS, Sampled, Wish, headline};
use thimbleworth::report::{markdown, odds_json, result_csv, result_json};
use wasm_bindgen::prelude::wasm_bindgen;

/// Name and version, as the page and its documents show them.
pub const PROGRAM: &str = concat!("Thimbleworth ", env!("CARGO_PKG_VERSION"));

/// Draws the page into the element `app` of the shell.
#[wasm_bindgen]
pub fn start_page() {
    // Through Yew, which puts a hook of its own over one that is set past it.
    yew::set_custom_panic_hook(Box::new(|fault| {
        gloo::console::error!(fault.to_string());
        browser::show_stopped();
    }));
    match gloo::utils::document().get_element_by_id("app") {
        Some(root) => {
            yew::Renderer::<app::App>::with_root(root).render();
        }
        None => gloo::console::error!("The shell has no element with the id \"app\"."),
    }
}

/// The account of a plan as a document, the same bytes as the command writes: `json`, `csv` or `markdown` as
/// `thimbleworth account PLAN --format …`, `compare` as `thimbleworth compare PLAN --format json`, `odds` as `thimbleworth odds PLAN --draws 2000 --format json`, or
/// `odds 100000` for another number of draws.
///
/// A plan with errors gives a JSON document without workloads, with the problems in it. An unknown format is answered with
/// a sentence.
#[wasm_bindgen]
#[must_use]
pub fn account(plan_json: &str, format: &str) -> String {
    if let Some(draws) = format.strip_prefix("odds") {
        let draws = draws.trim().parse().unwrap_or(2000);
        let account = account_text(plan_json);
        let mut sampled = Sampled::default();
        sampled.follow(&account, Wish { draws, most_cells: MOST_CELLS, wanted: &headline });
        while sampled.advance(&account, 2000) > 0 {}
        return odds_json(&account, &sampled, 0.95);
    }
    let write: fn(&Account) -> String = match format {
        "json" => |account| result_json(account, false),
        "compare" => |account| result_json(account, true),
        "csv" => result_csv,
        "markdown" => markdown,
        _ => return format!("no format \"{format}\"; there are: json, compare, csv, odds, markdown"),
    };
    write(&account_text(plan_json))
}
