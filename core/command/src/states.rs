//! `co2 --states`: a table of states in, the same table with the properties out.

use crate::input;
use crate::output::{Refusal, complain, print};
use std::path::Path;
use std::process::ExitCode;
use thimbleworth::co2::{State, state};
use thimbleworth::quantity::shortest;
use thimbleworth::report::text_cell;

const COLUMNS: [&str; 2] = ["temperature_k", "pressure_pa"];
const HEAD: &str = "temperature_k,pressure_pa,density_kg_m3,phase,enthalpy_j_kg,entropy_j_kg_k,heat_capacity_j_kg_k,\
sound_speed_m_s,viscosity_pa_s,error\n";

pub(crate) fn run(path: &Path) -> Result<ExitCode, Refusal> {
    let bytes = input::bytes(path)?;
    let text = std::str::from_utf8(&bytes).map_err(|e| {
        Refusal::because(format!(
            "the table is not UTF-8 text from byte {} on; a CSV file would do",
            e.valid_up_to()
        ))
    })?;
    let mut rows = rows(text.strip_prefix('\u{feff}').unwrap_or(text));
    let head = rows.next().ok_or_else(|| Refusal::because(format!("the table is empty; {}", wanted())))??;
    let column = |name: &str| {
        let mut places = head.iter().enumerate().filter(|(_, cell)| cell.trim() == name).map(|(i, _)| i);
        match (places.next(), places.next()) {
            (Some(place), None) => Ok(place),
            (Some(_), Some(_)) => {
                Err(Refusal::because(format!("the column {name} stands twice in the first line")))
            }
            (None, _) => Err(Refusal::because(format!("the first line has no column {name}; {}", wanted()))),
        }
    };
    let [temperature, pressure] = [column(COLUMNS[0])?, column(COLUMNS[1])?];
    let unused: Vec<&str> = head.iter().map(|c| c.trim()).filter(|c| !COLUMNS.contains(c)).collect();
    let mut out = HEAD.to_owned();
    let (mut count, mut refused, mut extrapolated) = (0_usize, 0_usize, 0_usize);
    for row in rows {
        let row = row?;
        if row.iter().all(|cell| cell.trim().is_empty()) {
            continue;
        }
        count += 1;
        let cell = |place: usize| row.get(place).map_or("", |c| c.trim());
        let (t, p) = (cell(temperature), cell(pressure));
        match numbers(t, p).and_then(|(t, p)| state(t, p).map_err(|e| e.to_string())) {
            Ok(state) => {
                extrapolated += usize::from(state.viscosity_is_extrapolated());
                out.push_str(&line(&state));
            }
            Err(why) => {
                refused += 1;
                // The row is kept as it was written, so that none is lost.
                out.push_str(&format!("{},{},,,,,,,,{}\n", as_written(t), as_written(p), text_cell(&why)));
            }
        }
    }
    print(&out)?;
    if !unused.is_empty() {
        complain(&format!("warning: not used and left out: the columns {}", unused.join(", ")));
    }
    if refused > 0 {
        complain(&format!("warning: {refused} of {count} states are refused; the column error says why"));
    }
    if extrapolated > 0 {
        complain(&format!(
            "warning: the viscosity of {extrapolated} of {count} states is outside the range of its correlation, 220 K to 700 K for what is not a gas"
        ));
    }
    Ok(ExitCode::SUCCESS)
}

fn wanted() -> String {
    format!("a first line with {} and {} would do", COLUMNS[0], COLUMNS[1])
}

fn numbers(temperature: &str, pressure: &str) -> Result<(f64, f64), String> {
    let number = |text: &str, name: &str| {
        text.parse::<f64>().map_err(|_| {
            let found =
                if text.is_empty() { "is missing".to_owned() } else { format!("\"{text}\" is no number") };
            format!("{name} {found}; a plain number with a decimal point would do")
        })
    };
    Ok((number(temperature, COLUMNS[0])?, number(pressure, COLUMNS[1])?))
}

/// A number as it stands; any other text defused and quoted.
fn as_written(text: &str) -> String {
    if text.parse::<f64>().is_ok() { text.to_owned() } else { text_cell(text) }
}

fn line(s: &State) -> String {
    let [t, p, density] = [s.temperature_k, s.pressure_pa, s.density_kg_m3].map(shortest);
    let rest =
        [s.enthalpy_j_kg, s.entropy_j_kg_k, s.heat_capacity_j_kg_k, s.sound_speed_m_s, s.viscosity_pa_s]
            .map(shortest);
    format!("{t},{p},{density},{},{},\n", s.phase.word(), rest.join(","))
}

/// The rows of a CSV text (RFC 4180; LF alone ends a line too).
fn rows(text: &str) -> impl Iterator<Item = Result<Vec<String>, Refusal>> + '_ {
    let mut rest = text;
    let mut number = 0_usize;
    std::iter::from_fn(move || {
        if rest.is_empty() {
            return None;
        }
        number += 1;
        Some(match row(rest) {
            Some((row, after)) => {
                rest = after;
                Ok(row)
            }
            None => {
                rest = "";
                Err(Refusal::because(format!("row {number} of the table opens a quote that nothing closes")))
            }
        })
    })
}

/// The cells of the first row, and what follows it; `None` where a quote is not closed.
fn row(text: &str) -> Option<(Vec<String>, &str)> {
    let (mut cells, mut cell, mut quoted) = (Vec::new(), String::new(), false);
    let mut chars = text.char_indices().peekable();
    while let Some((at, c)) = chars.next() {
        match c {
            '"' if quoted && matches!(chars.peek(), Some((_, '"'))) => {
                chars.next();
                cell.push('"');
            }
            '"' if quoted => quoted = false,
            '"' if cell.is_empty() => quoted = true,
            ',' if !quoted => cells.push(std::mem::take(&mut cell)),
            '\n' if !quoted => {
                cells.push(cell);
                return Some((cells, text.get(at + 1..).unwrap_or_default()));
            }
            '\r' if !quoted => {}
            _ => cell.push(c),
        }
    }
    cells.push(cell);
    (!quoted).then_some((cells, ""))
}
