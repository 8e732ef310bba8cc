//! A report to read and to print, as Markdown.

use super::air::air_sheets;
use super::drawn::{Drawn, Spreads};
use super::energy::{Sheet, energy_sheets};
use super::row::{MONTHS, PROGRAM, figures};
use super::table::intervals_words;
use super::words::{amount, cited, editions, hidden, is_detail, work_words};
use crate::account::{Account, Group, HazardAccount, MaterialHazard, Pouring, RouteAccount, classified};
use crate::code::CAUTION;
use crate::compare::{Comparison, compare};
use crate::hazard::{chem21, eco_scale, nemi};
use crate::material::statement_text;
use crate::program::{RouteProgram, SiteUse, WorkloadProgram};
use crate::quantity::significant;
use std::fmt::Write as _;

/// The report of an account as Markdown with tables: finding, differences, accounts, hazards, assumptions, cautions,
/// problems and sources.
///
/// Text from the plan is escaped, so that a name can neither break a table nor bring in markup. A plan with errors gives
/// its problems alone.
///
/// ```
/// use thimbleworth::{account::account_text, report::markdown};
/// let report = markdown(&account_text("{}"));
/// assert!(report.contains("## Problems"));
/// ```
#[must_use]
pub fn markdown(account: &Account) -> String {
    markdown_drawn(account, None)
}

/// As [`markdown()`], with the limits of each figure's interval, a year, beside its central value.
#[must_use]
pub fn markdown_drawn(account: &Account, drawn: Option<Drawn<'_>>) -> String {
    let mut out = String::new();
    head(&mut out, account);
    if let Some(drawn) = drawn {
        let _ = write!(out, "{}\n\n", intervals_words(drawn));
    }
    if let Some(program) = &account.program {
        for (i, (work, accounts)) in program.workloads.iter().zip(&account.workloads).enumerate() {
            let _ = write!(out, "## {}\n\n{}.\n\n", escaped(&work.name), work_words(work));
            if let Some(comparison) = compare(account, i) {
                compared(&mut out, work, &comparison);
            }
            for (j, (route, account)) in work.routes.iter().zip(&accounts.routes).enumerate() {
                let present = if j == work.present { " (present)" } else { "" };
                let _ = write!(out, "### {}{present}\n\n", escaped(&route.name));
                match account {
                    Some(account) => {
                        route_account(&mut out, &program.site, route, account, Spreads::of(drawn, i, j));
                    }
                    None => out.push_str("Its run stopped: see the problems.\n\n"),
                }
            }
        }
    }
    problems(&mut out, account);
    sources(&mut out, account);
    out
}

fn head(out: &mut String, account: &Account) {
    let title = account.plan.as_ref().map_or("", |p| p.title.as_str());
    let title = if title.trim().is_empty() { "Account" } else { title };
    let _ = write!(out, "# {}\n\n", escaped(title));
    if let Some(plan) = &account.plan {
        let mut line = escaped(&plan.site.name);
        for (what, value) in [("rules", &plan.site.rules), ("as of", &plan.site.as_of)] {
            if let Some(value) = value {
                let _ = write!(line, ", {what} {}", escaped(value));
            }
        }
        let _ = write!(out, "{line}. Drawn up by {PROGRAM}.\n\n");
        if let Some(notes) = plan.notes.as_deref().filter(|n| !n.trim().is_empty()) {
            let _ = write!(out, "{}\n\n", escaped(notes));
        }
    }
}

fn compared(out: &mut String, work: &WorkloadProgram, comparison: &Comparison) {
    let name = |i: usize| work.routes.get(i).map_or(String::new(), |r| escaped(&r.name));
    for beside in &comparison.routes {
        let _ = write!(out, "**{}**\n\n", escaped(&beside.finding));
        for doubt in &beside.doubts {
            let _ = writeln!(out, "- Doubt: {}", escaped(doubt));
        }
        if !beside.doubts.is_empty() {
            out.push('\n');
        }
        let (present, other) = (name(comparison.present), name(beside.route));
        let _ = writeln!(out, "| a year | {present} | {other} | ratio | what makes the difference |");
        out.push_str("| --- | ---: | ---: | ---: | --- |\n");
        for d in beside.differences.iter().filter(|d| !is_detail(&d.id)) {
            let shown = |v: Option<f64>| v.map_or_else(|| "not given".to_owned(), |v| amount(v, d.measure));
            let ratio = d.ratio.map_or_else(String::new, |r| significant(r, 3));
            let cause = d.causes.iter().take(2).map(|c| escaped(&c.what)).collect::<Vec<_>>().join("; ");
            let _ = writeln!(
                out,
                "| {} | {} | {} | {ratio} | {cause} |",
                escaped(&d.title),
                shown(d.present),
                shown(d.other)
            );
        }
        out.push('\n');
    }
}

fn route_account(
    out: &mut String,
    site: &SiteUse,
    route: &RouteProgram,
    account: &RouteAccount,
    spreads: Spreads<'_>,
) {
    let product = account.product_kg > 0.0;
    for group in Group::ALL {
        let rows: Vec<_> = figures(account).filter(|(f, _)| f.group == group).collect();
        if rows.is_empty() {
            continue;
        }
        let (limits, ruled) = if spreads.there() { (" from | to |", " ---: | ---: |") } else { ("", "") };
        let (last, rule) = if product { (" per kg product |", " ---: |") } else { ("", "") };
        let _ = write!(out, "#### {}\n\n", group.title());
        let _ = writeln!(
            out,
            "| figure | per result | per batch | per month | per year |{limits}{last} boundary |"
        );
        let _ = writeln!(out, "| --- | ---: | ---: | ---: | ---: |{ruled}{rule} --- |");
        for (figure, a_year) in rows {
            let mut cells = vec![escaped(&figure.title)];
            let shown = |value| amount(value, figure.measure);
            let limits = spreads.there().then(|| spreads.limits(&figure.id, figure.measure));
            if figure.measure.extensive() {
                let shared = account.shared(figure, a_year);
                cells.extend(
                    [account.per_result(shared), account.per_batch(shared), shared / MONTHS, a_year]
                        .map(shown),
                );
                cells.extend(limits.into_iter().flatten());
                cells.extend(account.per_kg_product(shared).map(shown));
            } else {
                cells.extend(["", "", ""].map(str::to_owned));
                cells.push(shown(a_year));
                cells.extend(limits.into_iter().flatten());
                cells.extend(product.then(String::new));
            }
            cells.push(escaped(&figure.boundary));
            let _ = writeln!(out, "| {} |", cells.join(" | "));
        }
        out.push('\n');
    }
    for refusal in &account.refusals {
        let _ = write!(out, "Not given: {}: {}.\n\n", refusal.metrics, escaped(&refusal.reason));
    }
    waste_codes(out, site, Pouring { route, account });
    sheets(out, &energy_sheets(route, account));
    sheets(out, &air_sheets(site, route, account));
    hazards(out, &account.hazard);
    if !route.assumptions.is_empty() {
        out.push_str("#### Assumed, because the plan does not say\n\n");
        for a in &route.assumptions {
            let _ = writeln!(
                out,
                "- {}: {} ({}); {}",
                escaped(&a.label),
                escaped(&a.value),
                escaped(&cited(a.source)),
                escaped(&a.path)
            );
        }
        out.push('\n');
    }
    if !account.cautions.is_empty() {
        out.push_str("#### Cautions\n\nLocal codes and licensed practice decide.\n\n");
        for caution in &account.cautions {
            let _ = writeln!(out, "- {} ({})", escaped(caution.text), escaped(caution.source.cite));
        }
        out.push('\n');
    }
    let _ = write!(
        out,
        "The book closes to {} of the mass that came in.\n\n",
        significant(account.closure.abs(), 2)
    );
}

fn waste_codes(out: &mut String, site: &SiteUse, pouring: Pouring<'_>) {
    let streams = classified(&[pouring], site);
    if streams.is_empty() {
        return;
    }
    let _ = write!(
        out,
        "#### Waste codes\n\n{CAUTION} The papers of the command `waste` show rule, figures and what would change each.\n\n"
    );
    out.push_str(
        "| stream | standing | codes | test, do not assume | transport |\n| --- | --- | --- | --- | --- |\n",
    );
    for s in &streams {
        let name = site.streams.get(s.stream).map_or("", |u| u.name.as_str());
        let transport = s.transport().map_or("", |v| &*v.why);
        let cells = [name, s.standing().words(), &s.codes().join(", "), &s.open().join(", "), transport];
        let _ = writeln!(out, "| {} |", cells.map(escaped).join(" | "));
    }
    out.push('\n');
}

fn sheets(out: &mut String, all: &[Sheet]) {
    for sheet in all {
        let _ = write!(out, "#### {}\n\n| {} |\n|", escaped(&sheet.title), sheet.head.join(" | "));
        for i in 0..sheet.head.len() {
            out.push_str(if i == 0 { " --- |" } else { " ---: |" });
        }
        out.push('\n');
        for row in &sheet.rows {
            let cells: Vec<String> = row.iter().map(|cell| escaped(cell)).collect();
            let _ = writeln!(out, "| {} |", cells.join(" | "));
        }
        out.push('\n');
        for note in &sheet.notes {
            let _ = writeln!(out, "- {}", escaped(note));
        }
        if !sheet.notes.is_empty() {
            out.push('\n');
        }
    }
}

fn hazards(out: &mut String, hazard: &HazardAccount) {
    out.push_str("#### Hazard\n\nScores help to compare; they replace no safety data sheet, no risk assessment and no local rule.\n\n");
    out.push_str("| material | label | statements | CHEM21 safety, health, environment | source |\n");
    out.push_str("| --- | --- | --- | --- | --- |\n");
    for m in &hazard.materials {
        let _ = writeln!(
            out,
            "| {} | {} | {} | {} | {} |",
            escaped(&m.name),
            label(m),
            statements(m),
            scores(m),
            escaped(&source(m))
        );
    }
    out.push('\n');
    match &hazard.eco_scale {
        Ok(eco) => {
            let _ = writeln!(
                out,
                "Analytical Eco-Scale for one result: {} of 100, {} ({}).\n",
                eco.score,
                eco.verdict.word(),
                escaped(eco_scale::SOURCE.cite)
            );
            out.push_str("| penalty | for | amount | why |\n| ---: | --- | --- | --- |\n");
            for line in &eco.lines {
                let _ = writeln!(
                    out,
                    "| {} | {} | {} | {} |",
                    line.penalty,
                    escaped(&line.what),
                    escaped(&line.amount),
                    escaped(&line.why)
                );
            }
            out.push('\n');
        }
        Err(why) => {
            let _ = write!(out, "Analytical Eco-Scale: not scored, {}.\n\n", escaped(&why.to_string()));
        }
    }
    let _ = write!(out, "NEMI rules ({}):\n\n", escaped(nemi::SOURCE.cite));
    for rule in &hazard.nemi {
        let _ = writeln!(out, "- {}: {} ({})", escaped(rule.rule), rule.met.word(), escaped(&rule.why));
    }
    out.push('\n');
    if !hazard.not_scored.is_empty() {
        let names: Vec<String> = hazard.not_scored.iter().map(|n| escaped(n)).collect();
        let _ = write!(
            out,
            "Reaches air or drain without a score, so not in the weighted mass: {}.\n\n",
            names.join(", ")
        );
    }
}

fn label(m: &MaterialHazard) -> String {
    let codes: Vec<&str> = m.label.pictograms.iter().map(|p| p.code()).collect();
    format!("{} {}", m.label.signal_word.word(), codes.join(" ")).trim_end().to_owned()
}

fn statements(m: &MaterialHazard) -> String {
    if m.source.is_empty() {
        return "nothing is known".to_owned();
    }
    let text = |code: &String| match statement_text(code) {
        Some(text) => format!("{} {}", escaped(code), escaped(text)),
        None => escaped(code),
    };
    let all: Vec<String> = m.statements.iter().map(text).collect();
    if all.is_empty() { "none".to_owned() } else { all.join("; ") }
}

fn scores(m: &MaterialHazard) -> String {
    match &m.chem21 {
        Some(Ok(a)) => {
            format!("{}, {}, {}: {}", a.safety.value, a.health.value, a.environment.value, a.ranking.word())
        }
        Some(Err(why)) => escaped(&why.to_string()),
        None => String::new(),
    }
}

fn source(m: &MaterialHazard) -> String {
    if m.as_of.is_empty() { m.source.clone() } else { format!("{}, as of {}", m.source, m.as_of) }
}

fn problems(out: &mut String, account: &Account) {
    if account.problems.is_empty() {
        return;
    }
    out.push_str("## Problems\n\n| | where | found | what would do |\n| --- | --- | --- | --- |\n");
    for p in &account.problems {
        let _ = writeln!(
            out,
            "| {} | {} | {} | {} |",
            p.severity.word(),
            escaped(&p.path),
            escaped(&p.found),
            escaped(&p.need)
        );
    }
    out.push('\n');
}

fn sources(out: &mut String, account: &Account) {
    let Some(program) = &account.program else { return };
    out.push_str("## Sources\n\n");
    for edition in editions(program) {
        let _ =
            writeln!(out, "- {}: {} ({})", escaped(&edition.key), escaped(&edition.cite), edition.standing);
    }
    let _ = writeln!(out, "- CHEM21: {}", escaped(&cited(chem21::SOURCE)));
}

/// Text as it stands, whatever it holds: markup, HTML and line breaks are made plain.
///
/// ```
/// use thimbleworth::report::escaped;
/// assert_eq!(escaped("a|b <i>`c`"), "a\\|b &lt;i&gt;\\`c\\`");
/// assert_eq!(escaped("two\nlines"), "two\\\\u{a}lines");
/// ```
#[must_use]
pub fn escaped(text: &str) -> String {
    let mut out = String::with_capacity(text.len());
    for c in text.chars() {
        match c {
            '&' => out.push_str("&amp;"),
            '<' => out.push_str("&lt;"),
            '>' => out.push_str("&gt;"),
            '\\' | '`' | '*' | '_' | '[' | ']' | '|' | '~' | '#' | '!' | '$' => {
                out.push('\\');
                out.push(c);
            }
            c if hidden(c) => {
                out.push('\\');
                out.extend(c.escape_unicode());
            }
            _ => out.push(c),
        }
    }
    out
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::account::account_text;
    use crate::example::EXAMPLES;

    /// The cells of a table row: pipes that are not escaped.
    fn pipes(line: &str) -> usize {
        line.replace("\\\\", "").replace("\\|", "").matches('|').count()
    }

    #[test]
    fn every_table_has_as_many_cells_in_each_row() {
        for example in EXAMPLES {
            let report = markdown(&account_text(example.text));
            let mut width = None;
            let mut rows = 0;
            for line in report.lines() {
                if line.starts_with('|') {
                    let here = pipes(line);
                    assert_eq!(*width.get_or_insert(here), here, "{line}");
                    rows += 1;
                } else {
                    width = None;
                }
            }
            assert!(rows > 40, "{rows}");
            for title in ["## Sources", "#### Hazard", "In place of "] {
                assert!(report.contains(title), "{title}");
            }
        }
    }

    #[test]
    fn names_bring_no_markup() {
        let evil = "<img src=x onerror=alert(1)> | `x` **b** [l](javascript:1)";
        let text = EXAMPLES[0].text.replace("\"Ultrasonic\"", &format!("\"{evil}\""));
        let report = markdown(&account_text(&text));
        assert!(report.contains("&lt;img src=x onerror=alert(1)&gt; \\| \\`x\\`"));
        assert!(!report.contains("<img") && !report.contains("[l]("));
    }
}
