//! Plain text for a terminal: the accounts of each route, or the routes side by side.

use super::air::air_sheets;
use super::drawn::{Drawn, Spreads};
use super::energy::{Sheet, energy_sheets};
use super::grid::{Grid, paragraph};
use super::odds::draws_words;
use super::row::figures;
use super::words::{amount, cited, is_detail, visible, work_words};
use crate::account::{Account, Figure, Group, Measure, Pouring, RouteAccount, classified};
use crate::code::CAUTION;
use crate::compare::{Comparison, Difference, HEADLINES, RouteComparison, compare};
use crate::program::{RouteProgram, SiteUse, WorkloadProgram};
use crate::quantity::significant;

/// So many routes stand beside the present one before the table starts anew.
const ROUTES_ABREAST: usize = 2;

/// The account of every route as text: figures by account, hazards, what was assumed, cautions.
///
/// Amounts are rounded to four significant digits and stand in a unit that suits their size. Control characters in names
/// are made visible. Empty where the plan has an error.
///
/// ```
/// use thimbleworth::{account::account_text, example::EXAMPLES, report::account_table};
/// let text = account_table(&account_text(EXAMPLES[0].text));
/// assert!(text.contains("Where the mass goes"));
/// ```
#[must_use]
pub fn account_table(account: &Account) -> String {
    account_table_drawn(account, None)
}

/// As [`account_table`], with the limits of each figure's interval, a year, beside its central value.
#[must_use]
pub fn account_table_drawn(account: &Account, drawn: Option<Drawn<'_>>) -> String {
    let mut out = String::new();
    let Some(program) = &account.program else { return out };
    heading(&mut out, account);
    if let Some(drawn) = drawn {
        paragraph(&mut out, "", &intervals_words(drawn));
    }
    for (w, (work, accounts)) in program.workloads.iter().zip(&account.workloads).enumerate() {
        for (i, (route, account)) in work.routes.iter().zip(&accounts.routes).enumerate() {
            let present = if i == work.present { " (present)" } else { "" };
            out.push('\n');
            paragraph(&mut out, "", &format!("{}: {}{present}", work.name, route.name));
            if let Some(account) = account {
                route_account(&mut out, &program.site, route, account, Spreads::of(drawn, w, i));
            } else {
                paragraph(&mut out, "", "Its run stopped: see the problems.");
            }
        }
    }
    out
}

/// The routes of every workload side by side, a year, with the finding first.
///
/// Per-material lines of the mass account are left to [`account_table`].
///
/// ```
/// use thimbleworth::{account::account_text, example::EXAMPLES, report::comparison_table};
/// let text = comparison_table(&account_text(EXAMPLES[0].text));
/// assert!(text.contains("In place of "));
/// ```
#[must_use]
pub fn comparison_table(account: &Account) -> String {
    let mut out = String::new();
    let Some(program) = &account.program else { return out };
    heading(&mut out, account);
    for (i, work) in program.workloads.iter().enumerate() {
        out.push('\n');
        paragraph(&mut out, "", &format!("{}: {}", work.name, work_words(work)));
        match compare(account, i) {
            Some(comparison) => compared(&mut out, account, i, work, &comparison),
            None => paragraph(&mut out, "", "The present route has no account: see the problems."),
        }
    }
    out
}

fn heading(out: &mut String, account: &Account) {
    let Some(plan) = &account.plan else { return };
    paragraph(out, "", &plan.title);
    let mut line = plan.site.name.clone();
    if let Some(rules) = &plan.site.rules {
        line.push_str(&format!(", rules: {rules}"));
    }
    if let Some(as_of) = &plan.site.as_of {
        line.push_str(&format!(", as of {as_of}"));
    }
    paragraph(out, "", &line);
}

fn route_account(
    out: &mut String,
    site: &SiteUse,
    route: &RouteProgram,
    account: &RouteAccount,
    spreads: Spreads<'_>,
) {
    let runs = account.runs;
    let number = |value| significant(value, 4);
    paragraph(
        out,
        "",
        &format!(
            "{} results, {} extractions, {} batches a year; a month is a twelfth of it",
            number(runs.results),
            number(runs.extractions),
            number(runs.batches)
        ),
    );
    out.push('\n');
    let product = account.product_kg > 0.0;
    let mut grid = Grid::new(40, 10);
    let mut head = ["", "per result", "per batch", "per month", "per year"].map(str::to_owned).to_vec();
    if spreads.there() {
        head.extend(["from", "to"].map(str::to_owned));
    }
    if product {
        head.push("per kg product".to_owned());
    }
    grid.row(head);
    for group in Group::ALL {
        let rows: Vec<_> = figures(account).filter(|(f, _)| f.group == group).collect();
        if rows.is_empty() {
            continue;
        }
        grid.heading(group.title());
        for (figure, a_year) in rows {
            let mut cells = vec![format!("  {}", visible(&figure.title))];
            if figure.measure.extensive() {
                let shared = account.shared(figure, a_year);
                let per = [
                    account.per_result(shared),
                    account.per_batch(shared),
                    shared / super::row::MONTHS,
                    a_year,
                ];
                cells.extend(per.map(|value| amount(value, figure.measure)));
                limits(&mut cells, figure, spreads);
                cells.extend(account.per_kg_product(shared).map(|value| amount(value, figure.measure)));
            } else {
                // A ratio holds for every unit of work; it stands once, in the last column.
                cells.extend([String::new(), String::new(), String::new()]);
                cells.push(amount(a_year, figure.measure));
                limits(&mut cells, figure, spreads);
            }
            grid.row(cells);
        }
    }
    grid.print(out);
    for refusal in &account.refusals {
        paragraph(out, "  ", &format!("Not given: {}: {}.", refusal.metrics, refusal.reason));
    }
    waste_codes(out, site, Pouring { route, account });
    for sheet in energy_sheets(route, account).into_iter().chain(air_sheets(site, route, account)) {
        sheet_of_words(out, &sheet);
    }
    hazards(out, account);
    if !route.assumptions.is_empty() {
        out.push_str("Assumed, because the plan does not say\n");
        for a in &route.assumptions {
            let text = format!("{}: {} ({}); {}", a.label, a.value, cited(a.source), a.path);
            paragraph(out, "  ", &text);
        }
    }
    if !account.cautions.is_empty() {
        out.push_str("Cautions; local codes and licensed practice decide\n");
        for caution in &account.cautions {
            paragraph(out, "  ", caution.text);
        }
    }
    paragraph(
        out,
        "",
        &format!("The book closes to {} of the mass that came in.", significant(account.closure.abs(), 2)),
    );
}

fn limits(cells: &mut Vec<String>, figure: &Figure, spreads: Spreads<'_>) {
    if spreads.there() {
        cells.extend(spreads.limits(&figure.id, figure.measure));
    }
}

/// What the columns "from" and "to" hold.
pub(super) fn intervals_words(drawn: Drawn<'_>) -> String {
    format!(
        "{}, seed {}: \"from\" and \"to\" hold {} % of them, a year.",
        draws_words(drawn.sampled),
        drawn.sampled.seed(),
        significant(drawn.coverage * 100.0, 3)
    )
}

/// The widest that a table may be: beyond it a terminal breaks its lines, and the columns are lost.
const WIDEST: usize = 130;

/// A table with its notes; where it would be too wide, a paragraph a row, each cell behind the word for its column.
fn sheet_of_words(out: &mut String, sheet: &Sheet) {
    paragraph(out, "", &sheet.title);
    let mut grid = Grid::new(12, 8);
    grid.row(sheet.head.iter().map(|h| (*h).to_owned()).collect());
    for row in &sheet.rows {
        grid.row(row.iter().map(|cell| visible(cell)).collect());
    }
    let mut table = String::new();
    grid.print(&mut table);
    if table.lines().all(|line| line.chars().count() <= WIDEST) {
        out.push_str(&table);
    } else {
        for row in &sheet.rows {
            let mut text = String::new();
            for (i, (head, cell)) in
                sheet.head.iter().zip(row).filter(|(_, cell)| !cell.is_empty()).enumerate()
            {
                match i {
                    0 => text.push_str(cell),
                    _ => text.extend([if i == 1 { ": " } else { "; " }, head.trim_end(), " ", cell]),
                }
            }
            paragraph(out, "  ", &text);
        }
    }
    for note in &sheet.notes {
        paragraph(out, "  ", note);
    }
}

fn waste_codes(out: &mut String, site: &SiteUse, pouring: Pouring<'_>) {
    let streams = classified(&[pouring], site);
    if streams.is_empty() {
        return;
    }
    out.push_str("Waste codes; the papers of \"waste\" show rule and figures\n");
    for s in &streams {
        let name = site.streams.get(s.stream).map_or("", |u| u.name.as_str());
        let mut text = [name, ": ", s.standing().words()].concat();
        for (what, codes) in [("; ", s.codes()), ("; test, do not assume: ", s.open())] {
            if !codes.is_empty() {
                text.push_str(what);
                text.push_str(&codes.join(" "));
            }
        }
        if let Some(v) = s.transport() {
            text.push_str("; transport: ");
            text.push_str(&v.why);
        }
        paragraph(out, "  ", &text);
    }
    paragraph(out, "  ", CAUTION);
}

fn hazards(out: &mut String, account: &RouteAccount) {
    let hazard = &account.hazard;
    out.push_str("Hazard; it replaces no safety data sheet and no risk assessment\n");
    for m in &hazard.materials {
        let pictograms: Vec<&str> = m.label.pictograms.iter().map(|p| p.code()).collect();
        let mut text = format!("{}: ", m.name);
        if m.source.is_empty() {
            text.push_str("nothing is known of its hazards");
        } else if m.statements.is_empty() {
            text.push_str("no hazard statement");
        } else {
            text.push_str(&format!(
                "{}, {}; {}",
                m.label.signal_word.word(),
                pictograms.join(" "),
                m.statements.join(" ")
            ));
        }
        match &m.chem21 {
            Some(Ok(a)) => text.push_str(&format!(
                "; CHEM21 safety {}, health {}, environment {}: {}",
                a.safety.value,
                a.health.value,
                a.environment.value,
                a.ranking.word()
            )),
            Some(Err(why)) => text.push_str(&format!("; no CHEM21 score: {why}")),
            None => {}
        }
        paragraph(out, "  ", &text);
    }
    match &hazard.eco_scale {
        Ok(eco) => {
            paragraph(
                out,
                "  ",
                &format!("Analytical Eco-Scale: {} of 100, {}", eco.score, eco.verdict.word()),
            );
            for line in eco.lines.iter().filter(|l| l.penalty > 0) {
                let of = if line.amount.is_empty() { String::new() } else { format!(", {}", line.amount) };
                paragraph(out, "    ", &format!("-{}  {}{of}: {}", line.penalty, line.what, line.why));
            }
        }
        Err(why) => paragraph(out, "  ", &format!("Analytical Eco-Scale: not scored, {why}")),
    }
    for rule in &hazard.nemi {
        paragraph(out, "  ", &format!("NEMI, {}: {} ({})", rule.rule, rule.met.word(), rule.why));
    }
    if !hazard.not_scored.is_empty() {
        let names = hazard.not_scored.join(", ");
        paragraph(
            out,
            "  ",
            &format!("Reaches air or drain without a score, not in the weighted mass: {names}"),
        );
    }
}

fn compared(out: &mut String, account: &Account, workload: usize, work: &WorkloadProgram, c: &Comparison) {
    if c.routes.is_empty() {
        paragraph(out, "", "There is no other route to set beside the present one.");
    }
    for beside in &c.routes {
        out.push('\n');
        finding(out, beside);
    }
    let Some(accounts) = account.workloads.get(workload) else { return };
    let Some(Some(present)) = accounts.routes.get(c.present) else { return };
    let others: Vec<_> = c.routes.iter().collect();
    let blocks: Vec<&[&RouteComparison]> =
        if others.is_empty() { vec![&[]] } else { others.chunks(ROUTES_ABREAST).collect() };
    for block in blocks {
        out.push('\n');
        side_by_side(out, work, present, c.present, block);
    }
    out.push_str(
        "× is the ratio to the present route; `account` shows each material and each unit of work.\n",
    );
}

/// The finding with the postings that make it, and what speaks against equal work.
fn finding(out: &mut String, beside: &RouteComparison) {
    paragraph(out, "", &beside.finding);
    for (id, name) in HEADLINES {
        let Some(d) = beside.differences.iter().find(|d| d.id == id) else { continue };
        let causes: Vec<String> = d
            .causes
            .iter()
            .take(3)
            .map(|c| format!("{} ({})", signed(c.change, d.measure), c.what))
            .collect();
        if !causes.is_empty() {
            paragraph(out, "  ", &format!("{name}: {}", causes.join(", ")));
        }
    }
    for doubt in &beside.doubts {
        paragraph(out, "  Doubt: ", doubt);
    }
}

fn signed(value: f64, measure: Measure) -> String {
    let sign = if value < 0.0 { "−" } else { "+" };
    format!("{sign}{}", amount(value.abs(), measure))
}

fn side_by_side(
    out: &mut String,
    work: &WorkloadProgram,
    present: &RouteAccount,
    present_index: usize,
    others: &[&RouteComparison],
) {
    let name = |i: usize| work.routes.get(i).map_or(String::new(), |r| short(&r.name));
    let mut grid = Grid::new(38, 8);
    let mut head = vec!["A year".to_owned(), name(present_index)];
    let mut under = vec![String::new(), "present".to_owned()];
    for other in others {
        head.extend([name(other.route), String::new()]);
        under.extend([String::new(), String::new()]);
    }
    grid.row(head);
    grid.row(under);
    for group in Group::ALL {
        let rows = union(present, others).into_iter().filter(|r| r.0 == group && !is_detail(&r.1.id));
        let mut titled = false;
        for (_, row) in rows {
            if !titled {
                grid.heading(group.title());
                titled = true;
            }
            let shown = |v: Option<f64>| v.map_or_else(|| "not given".to_owned(), |v| amount(v, row.measure));
            let mut cells = vec![format!("  {}", visible(&row.title)), shown(row.present)];
            for other in others {
                let difference = other.differences.iter().find(|d| d.id == row.id);
                // A figure that neither this route nor the present one has is zero on both, or stated on neither.
                let zero = (row.measure.extensive() && group != Group::Energy).then_some(0.0);
                cells.push(shown(difference.map_or(zero, |d| d.other)));
                let ratio = difference.and_then(|d| d.ratio);
                cells.push(ratio.map_or_else(String::new, |r| format!("×{}", significant(r, 3))));
            }
            grid.row(cells);
        }
    }
    grid.print(out);
}

/// One line of the table: what all routes share of a figure.
struct Shared {
    id: String,
    title: String,
    measure: Measure,
    present: Option<f64>,
}

/// Every figure that the present route or one of the others has.
fn union(present: &RouteAccount, others: &[&RouteComparison]) -> Vec<(Group, Shared)> {
    let mut out: Vec<(Group, Shared)> = Vec::new();
    for (figure, value) in figures(present) {
        let (id, title, measure) = (figure.id.clone(), figure.title.clone(), figure.measure);
        out.push((figure.group, Shared { id, title, measure, present: Some(value) }));
    }
    for d in others.iter().flat_map(|o| &o.differences) {
        if !out.iter().any(|(_, row)| row.id == d.id) {
            out.push((group_of(d), shared(d)));
        }
    }
    out
}

fn shared(d: &Difference) -> Shared {
    Shared { id: d.id.clone(), title: d.title.clone(), measure: d.measure, present: d.present }
}

/// The account of a figure that only the other route has: the first word of its id says it.
fn group_of(d: &Difference) -> Group {
    match d.id.split('.').next().unwrap_or_default() {
        "waste" => Group::Waste,
        "co2" => Group::CarbonDioxide,
        "input" | "metric" => Group::Metric,
        "hazard" => Group::Hazard,
        "energy" => Group::Energy,
        "time" => Group::Time,
        "cost" => Group::Cost,
        "climate" => Group::Climate,
        _ => Group::Mass,
    }
}

/// A name of a route, short enough for a column.
fn short(name: &str) -> String {
    const LONGEST: usize = 18;
    let name = visible(name);
    match name.char_indices().nth(LONGEST) {
        Some((end, _)) => format!("{}…", name.get(..end).unwrap_or_default().trim_end()),
        None => name,
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::account::account_text;
    use crate::example::EXAMPLES;

    #[test]
    fn lines_are_not_endless_and_nothing_steers_the_terminal() {
        let hostile = EXAMPLES[0].text.replacen("\"title\": \"", "\"title\": \"\\u001b[2J\\u202e", 1);
        let account = account_text(&hostile);
        for text in [account_table(&account), comparison_table(&account)] {
            assert!(text.starts_with("\\u{1b}[2J\\u{202e}"));
            assert!(!text.chars().any(|c| c != '\n' && super::super::words::hidden(c)));
            for line in text.lines() {
                assert!(line.chars().count() <= WIDEST, "{line}");
            }
        }
    }

    #[test]
    fn the_group_of_a_figure_follows_from_its_id() {
        for example in EXAMPLES {
            let account = account_text(example.text);
            for route in account.workloads.iter().flat_map(|w| &w.routes).flatten() {
                for (figure, value) in figures(route) {
                    let d = Difference {
                        id: figure.id.clone(),
                        title: String::new(),
                        measure: figure.measure,
                        present: Some(value),
                        other: None,
                        change: None,
                        ratio: None,
                        causes: Vec::new(),
                    };
                    assert_eq!(group_of(&d), figure.group, "{}", figure.id);
                }
            }
        }
    }

    #[test]
    fn routes_stand_side_by_side_under_their_names() {
        let text = comparison_table(&account_text(EXAMPLES[0].text));
        let head = text.lines().find(|l| l.starts_with("A year")).unwrap();
        let line = text.lines().find(|l| l.starts_with("  all waste streams: mass")).unwrap();
        assert!(head.split_whitespace().count() >= 4, "{head}");
        assert!(line.contains('×'), "{line}");
    }
}
