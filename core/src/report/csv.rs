//! The figures flat, for a spreadsheet.

use super::drawn::{Drawn, Spreads};
use super::row::{Row, figures, written};
use crate::account::{Account, Figure};
use crate::quantity::shortest;

const HEAD: [&str; 12] = [
    "workload",
    "route",
    "id",
    "title",
    "unit",
    "per_result",
    "per_batch",
    "per_month",
    "per_year",
    "per_kg_product",
    "ratio",
    "boundary",
];

/// The figures of all routes as CSV (RFC 4180: comma, CRLF, quotes where they are needed), one figure a line.
///
/// Columns: `workload`, `route`, `id`, `title`, `unit` (kg, L, kWh, containers, kg_score or ratio), `per_result`,
/// `per_batch`, `per_month` (a twelfth of the year), `per_year`, `per_kg_product` (empty without a product), `ratio` (for
/// ratios, which do not grow with the work and leave the columns before it empty), `boundary`. Numbers are the shortest
/// text that reads back as the same double, with a decimal point.
///
/// A spreadsheet takes a text that starts with `=`, `+`, `-` or `@` for a formula: such a text gets an apostrophe before
/// it, so that a name in a plan can never be run.
///
/// ```
/// use thimbleworth::{account::account_text, report::result_csv};
/// let head = "workload,route,id,title,unit,per_result,per_batch,per_month,per_year,per_kg_product,ratio,boundary\r\n";
/// assert_eq!(result_csv(&account_text("{}")), head);
/// ```
#[must_use]
pub fn result_csv(account: &Account) -> String {
    result_csv_drawn(account, None)
}

/// As [`result_csv`], with three columns more: `draws` behind the interval, and its limits `low` and `high`, for a year where the
/// figure grows with the work; empty where there is no interval.
#[must_use]
pub fn result_csv_drawn(account: &Account, drawn: Option<Drawn<'_>>) -> String {
    let mut out = HEAD.join(",");
    out.push_str(if drawn.is_some() { ",draws,low,high\r\n" } else { "\r\n" });
    let Some(program) = &account.program else { return out };
    for (w, (work, accounts)) in program.workloads.iter().zip(&account.workloads).enumerate() {
        for (r, (route, account)) in work.routes.iter().zip(&accounts.routes).enumerate() {
            let Some(account) = account else { continue };
            let spreads = Spreads::of(drawn, w, r);
            for (figure, value_si) in figures(account) {
                let row = Row::of(account, figure, value_si);
                line(&mut out, [&work.name, &route.name], figure, &row);
                if drawn.is_some() {
                    let cells = spreads.get(&figure.id).map_or_else(
                        || [const { String::new() }; 3],
                        |s| {
                            let limit = |v| shortest(written(figure.measure, v));
                            [s.draws.to_string(), limit(s.symmetric.low), limit(s.symmetric.high)]
                        },
                    );
                    out.push_str(&[",", &cells.join(",")].concat());
                }
                out.push_str("\r\n");
            }
        }
    }
    out
}

fn line(out: &mut String, [workload, route]: [&str; 2], figure: &Figure, row: &Row) {
    let number = |value: f64| if value.is_finite() { shortest(value) } else { String::new() };
    let mut cells: Vec<String> =
        [workload, route, &figure.id, &figure.title, figure.measure.written().0].map(text_cell).to_vec();
    cells.extend(match *row {
        Row::Extensive { per_result, per_batch, per_month, per_year, per_kg_product } => [
            number(per_result),
            number(per_batch),
            number(per_month),
            number(per_year),
            per_kg_product.map_or_else(String::new, number),
            String::new(),
        ],
        Row::Ratio(value) => {
            [String::new(), String::new(), String::new(), String::new(), String::new(), number(value)]
        }
    });
    cells.push(text_cell(&figure.boundary));
    out.push_str(&cells.join(","));
}

/// A text as a cell: defused where a spreadsheet would take it for a formula, quoted where RFC 4180 asks for it.
///
/// ```
/// use thimbleworth::report::text_cell;
/// assert_eq!(text_cell("n-hexane"), "n-hexane");
/// assert_eq!(text_cell("=1+1"), "'=1+1");
/// assert_eq!(text_cell("-1.5"), "-1.5");
/// assert_eq!(text_cell("-1.5+2"), "'-1.5+2");
/// assert_eq!(text_cell("a, \"b\""), "\"a, \"\"b\"\"\"");
/// ```
#[must_use]
pub fn text_cell(text: &str) -> String {
    // Spaces before it do not stop a spreadsheet, nor do the full-width forms of these characters.
    let first = text.trim_start_matches(' ').chars().next();
    let formula =
        matches!(first, Some('=' | '+' | '-' | '@' | '\t' | '\r' | '\n' | '＝' | '＋' | '－' | '＠'));
    // A bare number is what it is.
    let digits = text.strip_prefix('-').unwrap_or_default();
    let number = digits.starts_with(|c: char| c.is_ascii_digit())
        && digits.bytes().all(|b| b.is_ascii_digit() || b == b'.');
    let apostrophe = if formula && !number { "'" } else { "" };
    if text.contains([',', '"', '\r', '\n']) || text.starts_with(' ') || text.ends_with(' ') {
        format!("\"{apostrophe}{}\"", text.replace('"', "\"\""))
    } else {
        format!("{apostrophe}{text}")
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::account::account_text;
    use crate::example::EXAMPLES;

    /// A reader of RFC 4180 for the test alone.
    fn read(text: &str) -> Vec<Vec<String>> {
        let (mut rows, mut row, mut cell) = (Vec::new(), Vec::new(), String::new());
        let mut quoted = false;
        let mut chars = text.chars().peekable();
        while let Some(c) = chars.next() {
            match (quoted, c) {
                (true, '"') if chars.peek() == Some(&'"') => cell.push(chars.next().unwrap()),
                (_, '"') => quoted = !quoted,
                (false, ',') => row.push(std::mem::take(&mut cell)),
                (false, '\r') => {
                    assert_eq!(chars.next(), Some('\n'));
                    row.push(std::mem::take(&mut cell));
                    rows.push(std::mem::take(&mut row));
                }
                _ => cell.push(c),
            }
        }
        assert!(cell.is_empty() && row.is_empty());
        rows
    }

    #[test]
    fn every_figure_of_every_route_reads_back() {
        let account = account_text(EXAMPLES[0].text);
        let rows = read(&result_csv(&account));
        let mut expected = 0;
        for (work, accounts) in account.program.as_ref().unwrap().workloads.iter().zip(&account.workloads) {
            for (route, account) in work.routes.iter().zip(&accounts.routes) {
                let account = account.as_ref().unwrap();
                expected += account.figures.len();
                for (figure, value) in figures(account) {
                    let row = rows.iter().find(|r| r[1] == route.name && r[2] == figure.id).unwrap();
                    assert_eq!(row.len(), HEAD.len());
                    if figure.measure.extensive() {
                        let read: f64 = row[8].parse().unwrap();
                        assert_eq!(read, value * figure.measure.written().1);
                    }
                }
            }
        }
        assert_eq!(rows.len(), expected + 1);
    }

    #[test]
    fn formulas_are_defused_and_numbers_are_left_alone() {
        for (text, cell) in [
            ("@SUM(A1)", "'@SUM(A1)"),
            ("-2+3", "'-2+3"),
            ("\t=1", "'\t=1"),
            ("  =1", "\"'  =1\""),
            ("=cmd|' /C calc'!A0,1", "\"'=cmd|' /C calc'!A0,1\""),
            ("two\r\nlines", "\"two\r\nlines\""),
            ("", ""),
            ("1,4-dioxane", "\"1,4-dioxane\""),
        ] {
            assert_eq!(text_cell(text), cell);
        }
        let hostile = EXAMPLES[0].text.replace("\"name\": \"Soxhlet\"", "\"name\": \"=HYPERLINK(1)\"");
        let hostile = hostile.replace("\"present\": \"Soxhlet\"", "\"present\": \"=HYPERLINK(1)\"");
        let csv = result_csv(&account_text(&hostile));
        assert!(csv.contains(",'=HYPERLINK(1),") && !csv.contains(",=HYPERLINK"));
    }
}
