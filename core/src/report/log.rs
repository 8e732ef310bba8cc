//! What the site's records hold, as tables: files, columns, remarks, sums, reconciliation, solvent balance.

use super::data_table::{DataCell, DataTable};
use super::words::cited;
use crate::account::{Account, site_desk};
use crate::log::{
    Change, Day, Key, Line, NONE, Names, OUTPUTS, Posted, RECLAIMED, Reading, Reconciliation, Register,
    Remark, SOLVENT_BALANCE, SolventBalance, Sum, UNCERTAINTY, Verdict, Why, rolled, solvent_balance,
};
use DataCell::{Empty, Number};

fn text(text: &str) -> DataCell {
    DataCell::Text(text.to_owned())
}

fn count(count: u64) -> DataCell {
    DataCell::Count(count)
}

/// A number of two digits behind a hyphen.
fn two(number: u16) -> String {
    [if number < 10 { "-0" } else { "-" }, number.to_string().as_str()].concat()
}

/// `2026-03` for months counted from the year 0.
fn month(index: u16) -> String {
    [(index / 12).to_string(), two(index % 12 + 1)].concat()
}

fn iso(day: Day) -> String {
    [month(day.month_index()), two(u16::from(day.day))].concat()
}

/// `2026 Q1` for quarters counted from the year 0.
fn quarter(index: u16) -> String {
    [&(index / 4).to_string(), " Q", &(index % 4 + 1).to_string()].concat()
}

/// A row: texts first, then the rest.
fn put(rows: &mut Vec<Vec<DataCell>>, texts: &[&str], rest: &[DataCell]) {
    let mut row = Vec::with_capacity(texts.len() + rest.len());
    for said in texts {
        row.push(text(said));
    }
    row.extend_from_slice(rest);
    rows.push(row);
}

/// A table under construction.
fn begun(key: &'static str, title: &'static str, head: &[[&'static str; 2]]) -> DataTable {
    DataTable { key, title, head: head.to_vec(), rows: Vec::new(), notes: Vec::new() }
}

/// What was read: files, columns, reasons, sums by material, month, stream and container, extractions.
#[must_use]
pub fn log_tables(readings: &[Reading], names: &Names) -> Vec<DataTable> {
    let mut out = vec![files(readings), columns(readings), reasons(readings)];
    out.extend([materials(readings, names), months(readings), streams(readings, names)]);
    out.extend([containers(readings), work(readings, names)]);
    out.retain(|t| !t.rows.is_empty());
    out
}

fn files(readings: &[Reading]) -> DataTable {
    let mut table = begun(
        "files",
        "Files",
        &[
            ["file", "file"],
            ["register", "read as"],
            ["rows", "rows"],
            ["used", "used"],
            ["changed", "used with a change"],
            ["refused", "refused"],
            ["blank", "blank lines"],
            ["first_day", "first day"],
            ["last_day", "last day"],
        ],
    );
    for r in readings {
        let name = &r.mapping.name;
        let undated = r.tally.undated.to_string();
        let mut told = |said: &str, gaps: &[u16], more: &[&str]| {
            if gaps.is_empty() {
                return;
            }
            let mut list = String::new();
            for gap in gaps.iter().take(24) {
                list.push_str(if list.is_empty() { "" } else { ", " });
                list.push_str(&month(*gap));
            }
            let and = if gaps.len() > 24 { " and more" } else { "" };
            table.notes.push([name, said, &list, and, &more.concat()].concat());
        };
        told(": all rows were refused in ", &r.tally.refused_months(), &[]);
        if r.mapping.register != Register::Stock {
            let gaps = r.tally.empty_months();
            // A refused row without a day may be of any month.
            if r.tally.undated > 0 {
                let rows = ["; ", &undated, " refused rows have no date that can be read"];
                told(": no row that counts in ", &gaps, &rows);
            } else {
                told(": no rows in ", &gaps, &[]);
            }
        }
        if r.tally.compared < r.rows.used {
            let compared = r.tally.compared.to_string();
            table
                .notes
                .push([name, ": equal rows were sought among the first ", &compared, " only"].concat());
        }
        let day = |last: bool| r.tally.days.map_or(Empty, |(a, b)| text(&iso(if last { b } else { a })));
        let rows = &r.rows;
        let counts = [rows.used + rows.refused, rows.used, rows.changed, rows.refused, rows.blank].map(count);
        put(&mut table.rows, &[name, r.mapping.register.word()], &counts);
        if let Some(row) = table.rows.last_mut() {
            row.extend([day(false), day(true)]);
        }
    }
    table
}

fn columns(readings: &[Reading]) -> DataTable {
    let mut table =
        begun("columns", "Columns", &[["file", "file"], ["heading", "heading"], ["read_as", "read as"]]);
    for r in readings {
        for (heading, column) in &r.mapping.columns {
            put(&mut table.rows, &[&r.mapping.name, heading, &column.text()], &[]);
        }
        let separator = match r.separator {
            '\t' => "tab",
            ';' => "semicolon",
            ',' => "comma",
            _ => "bar",
        };
        table.notes.push(
            [
                &r.mapping.name,
                ": cells apart by ",
                separator,
                "; decimals: ",
                r.mapping.decimals.word(),
                "; dates with strokes: ",
                r.mapping.dates.word(),
            ]
            .concat(),
        );
    }
    table
}

fn reasons(readings: &[Reading]) -> DataTable {
    let mut table = begun(
        "reasons",
        "Refused and changed, by reason",
        &[["file", "file"], ["what", "what"], ["why", "why"], ["rows", "rows"]],
    );
    for r in readings {
        let mut one = |what: &str, why: &str, rows: u64| {
            if rows > 0 {
                put(&mut table.rows, &[&r.mapping.name, what, why], &[count(rows)]);
            }
        };
        for (why, rows) in Why::ALL.iter().zip(r.rows.by_reason) {
            one("refused", why.words()[0], rows);
        }
        for (change, rows) in Change::ALL.iter().zip(r.rows.by_change) {
            one("changed", change.words(), rows);
        }
    }
    table
}

/// The remarks of a file, refused rows or changed ones, as a table.
#[must_use]
pub fn remark_table(remarks: &[(String, Remark)], refused: bool) -> DataTable {
    let mut table = begun(
        if refused { "refused" } else { "changed" },
        if refused { "Refused rows" } else { "Changed rows" },
        &[
            ["file", "file"],
            ["line", "line"],
            ["column", "column"],
            ["cell", "cell"],
            ["found", "found"],
            if refused { ["need", "what would do"] } else { ["read_as", "read as, or the line repeated"] },
        ],
    );
    for (file, r) in remarks.iter().filter(|(_, r)| r.refused() == refused) {
        let found = match r.what {
            Verdict::Refused(why) => why.words()[0],
            Verdict::Changed(change) => change.words(),
        };
        let need = if refused { r.need() } else { r.detail.clone() };
        put(&mut table.rows, &[file, &r.heading, &r.cell, found, &need], &[]);
        if let Some(row) = table.rows.last_mut() {
            row.insert(1, count(r.line));
        }
    }
    table
}

const SUM_HEAD: [[&str; 2]; 4] = [
    ["rows", "rows"],
    ["negative_rows", "of them negative"],
    ["mass_kg", "mass, kg"],
    ["volume_without_density_l", "without density, L"],
];

fn sum_cells(sum: &Sum) -> [DataCell; 4] {
    let litres = if sum.rows_by_volume > 0 { Number(sum.m3 * 1000.0) } else { Empty };
    [count(sum.rows), count(sum.negative), Number(sum.kg), litres]
}

fn stream_name(names: &Names, index: u16) -> &str {
    match index {
        NONE => "",
        RECLAIMED => "reclaimed off site",
        i => names.streams.get(usize::from(i)).map_or("", String::as_str),
    }
}

fn material_name(names: &Names, index: u16) -> &str {
    names.materials.get(usize::from(index)).map_or("", |m| m.name.as_str())
}

/// Headings before those of a sum.
fn with_sums(key: &'static str, title: &'static str, head: &[[&'static str; 2]]) -> DataTable {
    let mut table = begun(key, title, head);
    table.head.extend(SUM_HEAD);
    table
}

/// The word of a register that stands in the place of a day.
fn register(key: &Key) -> &'static str {
    Register::WORDS.get(usize::from(key.day)).copied().unwrap_or_default()
}

fn materials(readings: &[Reading], names: &Names) -> DataTable {
    let mut table = with_sums(
        "materials",
        "Amounts by material and quarter",
        &[["material", "material"], ["register", "register"], ["stream", "stream"], ["when", "when"]],
    );
    for (key, sum) in rolled(readings, |k| (k.material, k.month / 3, k.stream)) {
        let (name, stream) = (material_name(names, key.month), stream_name(names, key.stream));
        put(&mut table.rows, &[name, register(&key), stream, &quarter(key.material)], &sum_cells(&sum));
    }
    for r in readings {
        for (key, sum) in &r.tally.stock {
            let day = key.date().map(iso).unwrap_or_default();
            let name = material_name(names, key.material);
            put(&mut table.rows, &[name, r.mapping.register.word(), "", &day], &sum_cells(sum));
        }
    }
    table.notes.push("Volumes become mass with the density at the bench's temperature.".to_owned());
    table
}

fn months(readings: &[Reading]) -> DataTable {
    let mut table = with_sums("months", "Amounts by month", &[["month", "month"], ["register", "register"]]);
    for (key, sum) in rolled(readings, |k| (k.month, 0, 0)) {
        put(&mut table.rows, &[&month(key.month), register(&key)], &sum_cells(&sum));
    }
    table
}

fn streams(readings: &[Reading], names: &Names) -> DataTable {
    let mut table = with_sums(
        "streams",
        "Consigned by stream and month",
        &[["stream", "stream"], ["month", "month"], ["quarter", "quarter"]],
    );
    for (key, sum) in rolled(readings, |k| (k.stream, k.month, 0)) {
        if key.day == Register::Consignments as u8 && key.month != NONE {
            let at = key.material;
            let texts = [stream_name(names, key.month), &month(at), &quarter(at / 3)];
            put(&mut table.rows, &texts, &sum_cells(&sum));
        }
    }
    table
}

/// What was consigned of each stream over the days covered, scaled to a year, beside the plan's year.
///
/// The days covered run from the first consignment to the last, both counted; what was collected on the first of them may
/// have stood for longer, so few collections scale badly.
#[must_use]
pub fn consigned_year_table(readings: &[Reading], names: &Names, account: &Account) -> DataTable {
    let mut table =
        with_sums("consigned_year", "Consigned by stream, scaled to a year", &[["stream", "stream"]]);
    table.head.extend([
        ["days", "days covered"],
        ["scaled_kg_year", "scaled to a year, kg"],
        ["plan_kg_year", "plan, kg a year"],
    ]);
    let mut days: Option<(u32, u32)> = None;
    for r in readings.iter().filter(|r| r.mapping.register == Register::Consignments) {
        if let Some((first, last)) = r.tally.days.map(|(a, b)| (a.number(), b.number())) {
            days = Some(days.map_or((first, last), |(a, b)| {
                (if a < first { a } else { first }, if b > last { b } else { last })
            }));
        }
    }
    let (Some((first, last)), Some(desk)) = (days, site_desk(account, &[])) else { return table };
    let covered = last - first + 1;
    for (key, sum) in rolled(readings, |k| (k.stream, 0, 0)) {
        if key.day != Register::Consignments as u8 || key.month == NONE {
            continue;
        }
        let planned = desk.streams.iter().find(|s| s.stream == usize::from(key.month));
        let mut cells = sum_cells(&sum).to_vec();
        cells.push(count(u64::from(covered)));
        // m · 365 / days
        cells.push(Number(sum.kg * 365.0 / f64::from(covered)));
        cells.push(planned.map_or(Empty, |s| Number(s.contents.mass_kg())));
        put(&mut table.rows, &[stream_name(names, key.month)], &cells);
    }
    table.notes.push("Scaled: mass × 365 / days from the first consignment to the last, both counted. It is no record of a year; a few collections scale badly. The plan's figure is that of its present routes.".to_owned());
    table
}

fn containers(readings: &[Reading]) -> DataTable {
    let mut table = with_sums(
        "containers",
        "Amounts by container",
        &[["container", "container"], ["register", "register"], ["file", "file"]],
    );
    for r in readings {
        for (container, sum) in &r.tally.containers {
            let texts = [container, r.mapping.register.word(), &r.mapping.name];
            put(&mut table.rows, &texts, &sum_cells(sum));
        }
        if r.tally.more_containers {
            table.notes.push(
                [&r.mapping.name, ": containers beyond the first 20 000 have no sum of their own"].concat(),
            );
        }
    }
    table
}

fn work(readings: &[Reading], names: &Names) -> DataTable {
    let mut table = begun(
        "work",
        "Extractions by month and route",
        &[
            ["month", "month"],
            ["route", "work / route"],
            ["rows", "rows"],
            ["extractions", "extractions"],
            ["controls", "of them controls"],
            ["repeats", "of them repeats"],
            ["batches", "batches begun"],
        ],
    );
    for r in readings {
        for (key, done) in &r.tally.done {
            let route = names.routes.get(usize::from(key.material)).map_or("", |r| r.label.as_str());
            let numbers = [
                count(done.rows),
                Number(done.extractions),
                Number(done.controls),
                Number(done.repeats),
                if done.batches > 0 { count(done.batches) } else { Empty },
            ];
            put(&mut table.rows, &[&month(key.month), route], &numbers);
        }
    }
    table
}

/// Purchases, postings and consignments side by side, with what none explains, as a table.
#[must_use]
pub fn reconciliation_table(found: &Reconciliation, names: &Names) -> DataTable {
    let mut table = begun(
        "reconciliation",
        "Reconciliation by solvent and quarter",
        &[
            ["material", "solvent"],
            ["when", "when"],
            ["bought_kg", "bought, kg"],
            ["returned_kg", "returned, kg"],
            ["opening_kg", "stock at start, kg"],
            ["closing_kg", "at end, kg"],
            ["used_kg", "used, kg"],
            ["posted_drawn_kg", "plan draws, kg"],
            ["posted_air_kg", "plan: air, kg"],
            ["posted_lost_kg", "plan: air, drain and the like, kg"],
            ["posted_streams_kg", "plan: streams, kg"],
            ["consigned_kg", "consigned, kg"],
            ["reclaimed_kg", "reclaimed, kg"],
            ["waiting_kg", "in containers, kg"],
            ["unexplained_kg", "unexplained, kg"],
            ["unexplained_expanded_kg", "±, kg"],
            ["verdict", "verdict"],
            ["rows", "rows"],
        ],
    );
    for account in found.quarters.iter().chain(&found.whole) {
        let unexplained = account.unexplained();
        let recorded = account.recorded;
        let known = |there: bool, line: Option<Line>| match (there, line) {
            (true, Some(line)) => Number(line.kg),
            (true, None) => Empty,
            _ => text("not recorded"),
        };
        let records = [account.bought, account.returned, account.consigned, account.reclaimed];
        let shelves = account.opening.map_or(0, |l| l.rows) + account.closing.map_or(0, |l| l.rows);
        let all_rows = records.iter().map(|l| l.rows).fold(shelves, |all, rows| all + rows);
        let missing = ["not recorded: ", &recorded.missing()].concat();
        let negative = unexplained.is_some_and(|line| line.kg < 0.0);
        let verdict = match (account.explained(), account.counted()) {
            _ if all_rows == 0 => "no record of it",
            (None, _) => &missing,
            (Some(true), true) => "within its uncertainty",
            (Some(true), false) => "within its uncertainty; stock not counted",
            // More left than came: no finding of a loss.
            (Some(false), true) if negative => "more left than the records brought",
            (Some(false), false) if negative => "more left than the records brought; stock not counted",
            (Some(false), true) => "not explained",
            (Some(false), false) => "not explained; stock not counted",
        };
        let numbers = [
            known(recorded.purchases, Some(account.bought)),
            Number(account.returned.kg),
            known(recorded.stock, account.opening),
            known(recorded.stock, account.closing),
            known(recorded.used(), account.used()),
            Number(account.posted(Posted::Drawn).kg),
            Number(account.posted(Posted::Hood).kg + account.posted(Posted::Room).kg),
            Number(account.posted(Posted::Lost).kg),
            Number(account.posted(Posted::Streams).kg),
            known(recorded.consignments, Some(account.consigned)),
            known(recorded.consignments, Some(account.reclaimed)),
            known(recorded.consignments, account.waiting()),
            known(recorded.all(), unexplained),
            unexplained.map_or(Empty, |line| Number(line.expanded_kg())),
            text(verdict),
            count(all_rows),
        ];
        let name = names.materials.get(account.material).map_or("", |m| m.name.as_str());
        put(&mut table.rows, &[name, &quarters(account.quarters)], &numbers);
    }
    table.notes = vec![
        names.heading.clone(),
        "used = bought − returned + stock at the start − at the end; unexplained = used − consigned − reclaimed − what the plan posts to air, drain, product and the like. Air is what the plan posts, never the remainder.".to_owned(),
        "\"in containers\" is what the plan posts into streams less what was consigned; it waits to be collected, or the plan or a record is wrong.".to_owned(),
        ["± is the expanded uncertainty, k = 2 (", &cited(UNCERTAINTY), "), of limits of 1 % for purchases, 2 % for consignments and cylinders and 10 % for stock counts (common practice, no source) where the plan states no other, and of the plan's own inputs."].concat(),
    ];
    table.notes.extend_from_slice(&found.doubts);
    table
}

/// Quarters counted from the year 0, in words.
fn quarters((first, last): (u16, u16)) -> String {
    if first == last { quarter(first) } else { [&quarter(first), " to ", &quarter(last)].concat() }
}

/// The solvent balance as a table, ready to print: one column of figures a solvent would be too wide, so it has a line each.
#[must_use]
pub fn solvent_balance_table(found: &Reconciliation, names: &Names) -> DataTable {
    let (each, all) = solvent_balance(found, names);
    let mut table = begun(
        "balance",
        "Solvent balance",
        &[
            ["solvent", "solvent"],
            ["line", "line"],
            ["what", "what"],
            ["mass_kg", "kg"],
            ["expanded_kg", "±, kg"],
            ["rows", "rows"],
        ],
    );
    if each.len() > 1 {
        balance_rows(&mut table.rows, "all organic solvents", &all);
    }
    for (material, balance) in &each {
        let name = names.materials.get(*material).map_or("", |m| m.name.as_str());
        balance_rows(&mut table.rows, name, balance);
    }
    let span = found.whole.first().or(found.quarters.first()).map(|a| a.quarters);
    table.notes = vec![
        names.heading.clone(),
        [&span.map(quarters).unwrap_or_default(), "; ", &cited(SOLVENT_BALANCE)].concat(),
        "I1, O6 and O8 are the site's records, the others postings of the plan. Whether the directive applies to the site, and to which activity, is for the competent authority; Annex VII names no laboratories.".to_owned(),
        "O8 counts what was consigned as \"reclaimed off site\"; what is kept in apparatus stands in O9; what goes off site outside of the streams in O6.".to_owned(),
        "\"unexplained\" is what the fugitive emission by difference holds beyond the postings: a finding to follow up, not an emission that was measured.".to_owned(),
    ];
    table.notes.extend_from_slice(&found.doubts);
    table
}

fn balance_rows(rows: &mut Vec<Vec<DataCell>>, name: &str, balance: &SolventBalance) {
    let mut one = |line: &str, what: &str, value: Line| {
        put(rows, &[name, line, what], &[Number(value.kg), Number(value.expanded_kg()), count(value.rows)]);
    };
    one("I1", "bought and used", balance.i1);
    one("I2", "recovered and used again", balance.i2);
    for (i, (what, value)) in OUTPUTS.iter().zip(balance.o).enumerate() {
        one(&["O", &(i + 1).to_string()].concat(), what, value);
    }
    one("F", "fugitive emission, I1 − O1 − O5 − O6 − O7 − O8", balance.fugitive());
    one("F posted", "fugitive emission, O2 + O3 + O4 + O9", balance.fugitive_posted());
    one("unexplained", "the difference of the two", balance.unexplained());
    one("E", "total emission, F + O1", balance.emission());
    one("C", "consumption, I1 − O8", balance.consumption());
}
