//! What the site's records hold, as tables: files, columns, remarks, sums, reconciliation, solvent balance.

use super::data_table::{DataCell, DataTable};
use super::words::cited;
use crate::log::{
    Change, Day, Line, NONE, Names, OUTPUTS, Posted, RECLAIMED, Reading, Reconciliation, Register, Remark,
    SOLVENT_BALANCE, SolventBalance, Sum, UNCERTAINTY, Verdict, Why, solvent_balance,
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
    let mut notes = Vec::new();
    let rows = readings.iter().map(|r| {
        let name = &r.mapping.name;
        let gaps = r.tally.empty_months();
        if r.mapping.register != Register::Stock && !gaps.is_empty() {
            let list: Vec<String> = gaps.iter().take(24).map(|m| month(*m)).collect();
            let more = if gaps.len() > 24 { " and more" } else { "" };
            notes.push([name, ": no rows in ", &list.join(", "), more].concat());
        }
        if r.tally.compared < r.rows.used {
            let compared = r.tally.compared.to_string();
            notes.push([name, ": equal rows were sought among the first ", &compared, " only"].concat());
        }
        let day = |last: bool| r.tally.days.map_or(Empty, |(a, b)| text(&iso(if last { b } else { a })));
        vec![
            text(name),
            text(r.mapping.register.word()),
            count(r.rows.used + r.rows.refused),
            count(r.rows.used),
            count(r.rows.changed),
            count(r.rows.refused),
            count(r.rows.blank),
            day(false),
            day(true),
        ]
    });
    let rows = rows.collect();
    DataTable {
        key: "files",
        title: "Files",
        head: vec![
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
        rows,
        notes,
    }
}

fn columns(readings: &[Reading]) -> DataTable {
    let mut rows = Vec::new();
    let mut notes = Vec::new();
    for r in readings {
        for (heading, column) in &r.mapping.columns {
            rows.push(vec![text(&r.mapping.name), text(heading), text(&column.text())]);
        }
        let separator = match r.separator {
            '\t' => "tab",
            ';' => "semicolon",
            ',' => "comma",
            _ => "bar",
        };
        notes.push(
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
    DataTable {
        key: "columns",
        title: "Columns",
        head: vec![["file", "file"], ["heading", "heading"], ["read_as", "read as"]],
        rows,
        notes,
    }
}

fn reasons(readings: &[Reading]) -> DataTable {
    let mut rows = Vec::new();
    for r in readings {
        let refused = Why::ALL.iter().zip(r.rows.by_reason).map(|(w, n)| ("refused", w.words()[0], n));
        let changed = Change::ALL.iter().zip(r.rows.by_change).map(|(c, n)| ("changed", c.words(), n));
        for (what, words, n) in refused.chain(changed).filter(|(_, _, n)| *n > 0) {
            rows.push(vec![text(&r.mapping.name), text(what), text(words), count(n)]);
        }
    }
    DataTable {
        key: "reasons",
        title: "Refused and changed, by reason",
        head: vec![["file", "file"], ["what", "what"], ["why", "why"], ["rows", "rows"]],
        rows,
        notes: Vec::new(),
    }
}

/// The remarks of a file, refused rows or changed ones, as a table.
#[must_use]
pub fn remark_table(remarks: &[(String, Remark)], refused: bool) -> DataTable {
    let rows = remarks.iter().filter(|(_, r)| r.refused() == refused).map(|(file, r)| {
        vec![
            text(file),
            count(r.line),
            text(&r.heading),
            text(&r.cell),
            text(match r.what {
                Verdict::Refused(why) => why.words()[0],
                Verdict::Changed(change) => change.words(),
            }),
            text(&if refused { r.need() } else { r.detail.clone() }),
        ]
    });
    DataTable {
        key: if refused { "refused" } else { "changed" },
        title: if refused { "Refused rows" } else { "Changed rows" },
        head: vec![
            ["file", "file"],
            ["line", "line"],
            ["column", "column"],
            ["cell", "cell"],
            ["found", "found"],
            if refused { ["need", "what would do"] } else { ["read_as", "read as, or the line repeated"] },
        ],
        rows: rows.collect(),
        notes: Vec::new(),
    }
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

type Rolled = std::collections::BTreeMap<(Register, u16, u16, u16), Sum>;

/// Sums of all files by register and up to three things.
fn rolled(readings: &[Reading], key: fn(&crate::log::Key) -> (u16, u16, u16)) -> Rolled {
    let mut out = Rolled::new();
    for r in readings {
        for (at, sum) in &r.tally.sums {
            let (a, b, c) = key(at);
            out.entry((r.mapping.register, a, b, c)).or_default().join(sum);
        }
    }
    out
}

fn materials(readings: &[Reading], names: &Names) -> DataTable {
    let mut rows = Vec::new();
    for ((register, material, at, stream), sum) in rolled(readings, |k| (k.material, k.month / 3, k.stream)) {
        let mut row = vec![
            text(material_name(names, material)),
            text(register.word()),
            text(stream_name(names, stream)),
            text(&quarter(at)),
        ];
        row.extend(sum_cells(&sum));
        rows.push(row);
    }
    for r in readings {
        for ((material, day), sum) in &r.tally.stock {
            let mut row = vec![
                text(material_name(names, *material)),
                text(r.mapping.register.word()),
                Empty,
                text(&iso(*day)),
            ];
            row.extend(sum_cells(sum));
            rows.push(row);
        }
    }
    let mut head =
        vec![["material", "material"], ["register", "register"], ["stream", "stream"], ["when", "when"]];
    head.extend(SUM_HEAD);
    DataTable {
        key: "materials",
        title: "Amounts by material and quarter",
        head,
        rows,
        notes: vec!["Volumes become mass with the density at the bench's temperature.".to_owned()],
    }
}

fn months(readings: &[Reading]) -> DataTable {
    let mut rows = Vec::new();
    for ((register, at, ..), sum) in rolled(readings, |k| (k.month, 0, 0)) {
        let mut row = vec![text(&month(at)), text(register.word())];
        row.extend(sum_cells(&sum));
        rows.push(row);
    }
    let mut head = vec![["month", "month"], ["register", "register"]];
    head.extend(SUM_HEAD);
    DataTable { key: "months", title: "Amounts by month", head, rows, notes: Vec::new() }
}

fn streams(readings: &[Reading], names: &Names) -> DataTable {
    let mut rows = Vec::new();
    for ((register, stream, at, _), sum) in rolled(readings, |k| (k.stream, k.month, 0)) {
        if register == Register::Consignments && stream != NONE {
            let mut row = vec![text(stream_name(names, stream)), text(&month(at)), text(&quarter(at / 3))];
            row.extend(sum_cells(&sum));
            rows.push(row);
        }
    }
    let mut head = vec![["stream", "stream"], ["month", "month"], ["quarter", "quarter"]];
    head.extend(SUM_HEAD);
    DataTable { key: "streams", title: "Consigned by stream and month", head, rows, notes: Vec::new() }
}

fn containers(readings: &[Reading]) -> DataTable {
    let mut rows = Vec::new();
    let mut notes = Vec::new();
    for r in readings {
        for (container, sum) in &r.tally.containers {
            let mut row = vec![text(container), text(r.mapping.register.word()), text(&r.mapping.name)];
            row.extend(sum_cells(sum));
            rows.push(row);
        }
        if r.tally.more_containers {
            notes.push(
                [&r.mapping.name, ": containers beyond the first 20 000 have no sum of their own"].concat(),
            );
        }
    }
    let mut head = vec![["container", "container"], ["register", "register"], ["file", "file"]];
    head.extend(SUM_HEAD);
    DataTable { key: "containers", title: "Amounts by container", head, rows, notes }
}

fn work(readings: &[Reading], names: &Names) -> DataTable {
    let mut rows = Vec::new();
    for ((at, route), done) in readings.iter().flat_map(|r| &r.tally.done) {
        rows.push(vec![
            text(&month(*at)),
            text(names.routes.get(usize::from(*route)).map_or("", |r| r.label.as_str())),
            count(done.rows),
            Number(done.extractions),
            Number(done.controls),
            Number(done.repeats),
            if done.batches > 0 { count(done.batches) } else { Empty },
        ]);
    }
    DataTable {
        key: "work",
        title: "Extractions by month and route",
        head: vec![
            ["month", "month"],
            ["route", "work / route"],
            ["rows", "rows"],
            ["extractions", "extractions"],
            ["controls", "of them controls"],
            ["repeats", "of them repeats"],
            ["batches", "batches begun"],
        ],
        rows,
        notes: Vec::new(),
    }
}

/// Purchases, postings and consignments side by side, with what none explains, as a table.
#[must_use]
pub fn reconciliation_table(found: &Reconciliation, names: &Names) -> DataTable {
    let mut rows = Vec::new();
    for (account, whole) in
        found.quarters.iter().map(|a| (a, false)).chain(found.whole.iter().map(|a| (a, true)))
    {
        let when = if whole {
            [&quarter(account.quarters.0), " to ", &quarter(account.quarters.1)].concat()
        } else {
            quarter(account.quarters.0)
        };
        let unexplained = account.unexplained();
        let shelf = |line: Option<Line>| line.map_or(Empty, |l| Number(l.kg));
        let records = [account.bought, account.returned, account.consigned, account.reclaimed];
        let shelves = account.opening.map_or(0, |l| l.rows) + account.closing.map_or(0, |l| l.rows);
        let all_rows = records.iter().map(|l| l.rows).fold(shelves, |all, rows| all + rows);
        rows.push(vec![
            text(names.materials.get(account.material).map_or("", |m| m.name.as_str())),
            text(&when),
            Number(account.bought.kg),
            Number(account.returned.kg),
            shelf(account.opening),
            shelf(account.closing),
            Number(account.used().kg),
            Number(account.posted(Posted::Drawn).kg),
            Number(account.posted(Posted::Hood).kg + account.posted(Posted::Room).kg),
            Number(account.posted(Posted::Lost).kg),
            Number(account.posted(Posted::Streams).kg),
            Number(account.consigned.kg),
            Number(account.reclaimed.kg),
            Number(account.waiting().kg),
            Number(unexplained.kg),
            Number(unexplained.expanded_kg()),
            text(match (account.explained(), account.counted()) {
                _ if all_rows == 0 => "no record of it",
                (true, true) => "within its uncertainty",
                (true, false) => "within its uncertainty; stock not counted",
                (false, true) => "not explained",
                (false, false) => "not explained; stock not counted",
            }),
            count(all_rows),
        ]);
    }
    let mut notes = vec![
        "used = bought − returned + stock at the start − at the end; unexplained = used − consigned − reclaimed − what the plan posts to air, drain, product and the like. Air is what the plan posts, never the remainder.".to_owned(),
        "\"in containers\" is what the plan posts into streams less what was consigned; it waits to be collected, or the plan or a record is wrong.".to_owned(),
        ["± is the expanded uncertainty, k = 2 (", &cited(UNCERTAINTY), "), of limits of 1 % for purchases, 2 % for consignments and cylinders and 10 % for stock counts (common practice, no source) where the plan states no other, and of the plan's own inputs."].concat(),
    ];
    notes.extend(found.doubts.iter().cloned());
    DataTable {
        key: "reconciliation",
        title: "Reconciliation by solvent and quarter",
        head: vec![
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
        rows,
        notes,
    }
}

/// The solvent balance as a table, ready to print: one column of figures a solvent would be too wide, so it has a line each.
#[must_use]
pub fn solvent_balance_table(found: &Reconciliation, names: &Names) -> DataTable {
    let (each, all) = solvent_balance(found, names);
    let mut rows = Vec::new();
    let several = each.len() > 1;
    let total = several.then_some(("all organic solvents", all));
    let named = each.iter().map(|(material, balance)| {
        (names.materials.get(*material).map_or("", |m| m.name.as_str()), *balance)
    });
    for (name, balance) in total.into_iter().chain(named) {
        balance_rows(&mut rows, name, &balance);
    }
    let span = found.whole.first().or(found.quarters.first()).map(|a| a.quarters);
    let when = span.map_or_else(String::new, |(a, b)| {
        if a == b { quarter(a) } else { [&quarter(a), " to ", &quarter(b)].concat() }
    });
    let mut notes = vec![
        [&when, "; ", &cited(SOLVENT_BALANCE)].concat(),
        "I1, O6 and O8 are the site's records, the others postings of the plan. Whether the directive applies to the site, and to which activity, is for the competent authority; Annex VII names no laboratories.".to_owned(),
        "O8 counts what was consigned as \"reclaimed off site\"; what is kept in apparatus stands in O9; what goes off site outside of the streams in O6.".to_owned(),
        "\"unexplained\" is what the fugitive emission by difference holds beyond the postings: a finding to follow up, not an emission that was measured.".to_owned(),
    ];
    notes.extend(found.doubts.iter().cloned());
    DataTable {
        key: "balance",
        title: "Solvent balance",
        head: vec![
            ["solvent", "solvent"],
            ["line", "line"],
            ["what", "what"],
            ["mass_kg", "kg"],
            ["expanded_kg", "±, kg"],
            ["rows", "rows"],
        ],
        rows,
        notes,
    }
}

fn balance_rows(rows: &mut Vec<Vec<DataCell>>, name: &str, balance: &SolventBalance) {
    let mut put = |line: &str, what: &str, value: Line| {
        rows.push(vec![
            text(name),
            text(line),
            text(what),
            Number(value.kg),
            Number(value.expanded_kg()),
            count(value.rows),
        ]);
    };
    put("I1", "bought and used", balance.i1);
    put("I2", "recovered and used again", balance.i2);
    for (i, (what, value)) in OUTPUTS.iter().zip(balance.o).enumerate() {
        put(&["O", &(i + 1).to_string()].concat(), what, value);
    }
    put("F", "fugitive emission, I1 − O1 − O5 − O6 − O7 − O8", balance.fugitive());
    put("F posted", "fugitive emission, O2 + O3 + O4 + O9", balance.fugitive_posted());
    put("unexplained", "the difference of the two", balance.unexplained());
    put("E", "total emission, F + O1", balance.emission());
    put("C", "consumption, I1 − O8", balance.consumption());
}
