//! Results for other programs and for people: nothing here computes a figure, and nothing reads or writes a file.
//!
//! | file | what it writes |
//! | --- | --- |
//! | [`result_json`] | the result document, JSON: a contract for other programs |
//! | [`result_csv`] | the same figures, flat, for a spreadsheet |
//! | [`markdown()`] | a report to read and to print |
//! | [`account_table`], [`comparison_table`] | plain text for a terminal |
//! | [`Drawn`] | a sampled run, with which these ([`account_table_drawn`] and its kin) show intervals |
//! | [`energy_sheets`] | energy by step and CO2 by state, tables for all of them |
//! | [`log_tables`], [`reconciliation_table`], [`solvent_balance_table`] | the site's records, as tables |
//! | [`case_markdown`], [`since_markdown`] | the paper for finance and quality; what differs from an older plan |
//! | [`air_sheets`] | the air of the room, its limits, a cylinder that lets go |
//! | [`odds_table`], [`odds_json`] | what the draws say: intervals, odds, what matters most |
//! | [`paper()`] | a paper of the waste desk: codes, labels, contents, months, pick-ups, load |
//! | [`trace()`] | one figure opened into the postings, rules and inputs behind it |
//!
//! The same account gives the same bytes everywhere: numbers for programs are the shortest text that reads back, keys
//! stand in their declared order.
mod air;
mod batch;
mod case;
mod csv;
mod data_table;
mod drawn;
mod energy;
mod grid;
mod json;
mod log;
mod markdown;
mod odds;
mod paper;
mod result;
mod row;
mod table;
mod trace;
mod words;

pub use air::{air_sheets, by_volume};
pub use case::{case_markdown, money_words, payback_words, since_markdown, turn_words};
pub use csv::{result_csv, result_csv_drawn, text_cell};
pub use data_table::{DataCell, DataTable, data_csv, data_json, data_markdown, data_text};
pub use drawn::Drawn;
pub use energy::{Sheet, dense_words, energy_sheets, need_sheet};
pub use log::{consigned_year_table, log_tables, reconciliation_table, remark_table, solvent_balance_table};
pub use markdown::{escaped, markdown, markdown_drawn};
pub use odds::{ODDS_VERSION, odds_json, odds_table, odds_words, stopped_words};
pub use paper::{
    Asked, Paper, PaperKind, PaperTable, mix_paper, paper, paper_csv, paper_markdown, pour_paper, words_csv,
};
pub use result::{RESULT_VERSION, result_json, result_json_drawn};
pub use row::PROGRAM;
pub use table::{account_table, account_table_drawn, comparison_table};
pub use trace::{Selection, TraceError, TracedFigure, trace};
pub use words::{cited, problem_line, visible};
