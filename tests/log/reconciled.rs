//! Reconciliation: records held against the plan's own postings, with what was taken away found again.

use super::{harbour, in_pieces};
use std::fmt::Write as _;
use thimbleworth::account::Account;
use thimbleworth::account::site_desk;
use thimbleworth::ledger::{Direction, Place};
use thimbleworth::log::{
    Names, Posted, Reader, Reading, Reconciliation, SolventAccount, reconcile, solvent_balance,
};
use thimbleworth::report::{DataCell, consigned_year_table, reconciliation_table, solvent_balance_table};

/// The harbour's work of a year as its log would show it: in each quarter a quarter of the batches, 13 samples and 4
/// controls in each.
fn log_of_a_year(batches_a_quarter: u32) -> String {
    let mut text = String::from("Prep date,Batch,Method,QC type\n");
    for quarter in 0..4 {
        for batch in 0..batches_a_quarter {
            for extraction in 0..17 {
                let kind = if extraction < 13 { "Sample" } else { "MB" };
                let _ = writeln!(text, "2026-{:02}-15,Q{quarter}B{batch},Soxhlet,{kind}", quarter * 3 + 2);
            }
        }
    }
    text
}

fn readings(account: &Account, files: &[(&str, String)]) -> (Vec<Reading>, Names) {
    let mut names = super::names(account);
    let mut out = Vec::new();
    for (name, text) in files {
        let mut reader = Reader::new(name, names, &[]);
        reader.feed(text.as_bytes());
        let (reading, back, remarks) = reader.finish();
        assert!(remarks.iter().all(|r| !r.refused()), "{remarks:#?}");
        out.push(reading.unwrap());
        names = back;
    }
    (out, names)
}

fn of<'r>(found: &'r [SolventAccount], names: &Names, name: &str) -> Vec<&'r SolventAccount> {
    found.iter().filter(|a| names.materials[a.material].name == name).collect()
}

fn reconciled(account: &Account, files: &[(&str, String)]) -> (Reconciliation, Names) {
    let (readings, mut names) = readings(account, files);
    let found = reconcile(&readings, account.program.as_ref().unwrap(), &mut names);
    (found, names)
}

/// The plan itself has 110.92 batches of 17 in a year; a log of 25 a quarter is 100 batches. What the plan posts for them is
/// the year's account times 100 / 110.92 for all that is done by sample or batch.
#[test]
fn postings_are_those_of_the_work_that_was_logged() {
    let account = harbour();
    let (found, names) = reconciled(&account, &[("prep.csv", log_of_a_year(25))]);
    let program = account.program.as_ref().unwrap();
    let route = &program.workloads[0].routes[0];
    let year = account.workloads[0].routes[0].as_ref().unwrap();
    let mut desk = route.desk();
    route.run(thimbleworth::chance::Draw(&route.central()), &mut desk, None).unwrap();
    let share = 1700.0 / year.runs.extractions;
    let mut checked = 0;
    for account in &found.whole {
        let name = &names.materials[account.material].name;
        let Some(at) = route.materials.iter().position(|m| m.name == *name) else { continue };
        let m = thimbleworth::ledger::Material(u16::try_from(at).unwrap());
        for (posted, place) in [(Posted::Hood, Place::HOOD), (Posted::Room, Place::ROOM)] {
            let expected = desk.cells.passed(place, Direction::Into, m) * share;
            assert!(
                (account.posted(posted).kg - expected).abs() <= 1e-9 * expected.abs(),
                "{name} {posted:?}"
            );
        }
        let drawn = desk.cells.passed(Place::STORE, Direction::OutOf, m)
            - desk.cells.passed(Place::STORE, Direction::Into, m);
        assert!((account.posted(Posted::Drawn).kg - drawn * share).abs() <= 1e-9 * drawn);
        checked += 1;
    }
    assert!(checked >= 2, "{checked}");
    // The four quarters are the year.
    for name in ["acetone", "n-hexane"] {
        let parts = of(&found.quarters, &names, name);
        assert_eq!(parts.len(), 4);
        let sum: f64 = parts.iter().map(|a| a.posted(Posted::Streams).kg).sum();
        let whole = of(&found.whole, &names, name)[0].posted(Posted::Streams).kg;
        assert!((sum - whole).abs() < 1e-9 * whole);
    }
}

/// Books made from the plan's own postings close; a drum that is left out of them is found again, in its quarter and no
/// other, and is not put down as air.
#[test]
fn what_is_taken_away_is_found_again() {
    let account = harbour();
    let (first, names) = reconciled(&account, &[("prep.csv", log_of_a_year(25))]);
    let (mut bought, mut consigned) = (
        String::from("Order date,Item,Amount (kg)\n"),
        String::from("Ship date,Solvent,Manifest,Net (kg)\n"),
    );
    let mut posted = Vec::new();
    for name in ["acetone", "n-hexane"] {
        for (quarter, part) in of(&first.quarters, &names, name).iter().enumerate() {
            let month = quarter * 3 + 2;
            let _ = writeln!(bought, "2026-{month:02}-01,{name},{}", part.posted(Posted::Drawn).kg);
            let _ = writeln!(
                consigned,
                "2026-{month:02}-28,{name},M{quarter},{}",
                part.posted(Posted::Streams).kg
            );
            posted.push(part.posted(Posted::Streams).kg);
        }
    }
    let files = [
        ("prep.csv", log_of_a_year(25)),
        ("purchases.csv", bought),
        ("waste.csv", consigned.clone()),
        // Read, but near no turn of a quarter.
        ("stock.csv", "Count date,Item,On hand (kg)\n2026-02-10,toluene,1\n".to_owned()),
    ];
    let (closed, names) = reconciled(&account, &files);
    for name in ["acetone", "n-hexane"] {
        for part in of(&closed.quarters, &names, name) {
            assert_eq!(part.explained(), Some(true), "{name}: {:?}", part.unexplained());
            assert!(
                part.unexplained().unwrap().kg.abs() < 1e-6 && part.beyond_plan().unwrap().kg.abs() < 1e-6
            );
            assert!(part.waiting().unwrap().kg.abs() < 1e-6);
            assert!(!part.counted());
        }
    }
    assert!(closed.doubts.iter().any(|d| d.contains("not counted")));
    // The second quarter's acetone was never consigned.
    let without: Vec<&str> = consigned.lines().filter(|l| !l.starts_with("2026-05-28,acetone")).collect();
    let files =
        [files[0].clone(), files[1].clone(), ("waste.csv", without.join("\n") + "\n"), files[3].clone()];
    let (open, names) = reconciled(&account, &files);
    let parts = of(&open.quarters, &names, "acetone");
    for (quarter, part) in parts.iter().enumerate() {
        assert_eq!(part.explained(), Some(quarter != 1), "{quarter}");
    }
    assert!((parts[1].unexplained().unwrap().kg - posted[1]).abs() < 1e-6);
    assert!((parts[1].waiting().unwrap().kg - posted[1]).abs() < 1e-6);
    let hood = |found: &Reconciliation| of(&found.quarters, &names, "acetone")[1].posted(Posted::Hood).kg;
    assert_eq!(hood(&open).to_bits(), hood(&closed).to_bits(), "air is what the plan posts");
    // In the solvent balance it is fugitive by difference, unexplained by the postings.
    let (each, all) = solvent_balance(&open, &names);
    assert!(each.iter().all(|(m, _)| names.materials[*m].voc));
    assert!((all.unexplained().kg - posted[1]).abs() < 1e-6, "{:?}", all.unexplained());
    assert!((all.fugitive().kg - all.fugitive_posted().kg - posted[1]).abs() < 1e-6);
}

/// Stock, returns and reclaimed solvent by hand: used = 100 − 4 + 30 − 20 = 106 kg; 20 kg went to be reclaimed.
#[test]
fn stock_returns_and_reclaimed_solvent() {
    let account = harbour();
    let files = [
        ("purchases.csv", "Order date,Item,Amount (kg)\n2026-01-10,toluene,60\n2026-03-31,toluene,40\n".to_owned()),
        ("cylinder returns.csv", "Date,Cylinder,Gas,Heel (kg)\n2026-02-01,C1,toluene,4\n".to_owned()),
        (
            "stock.csv",
            "Count date,Item,On hand (kg)\n2025-12-20,toluene,30\n2026-04-15,toluene,12\n2026-04-15,toluene,8\n2026-04-17,toluene,99\n"
                .to_owned(),
        ),
        (
            "waste.csv",
            "Ship date,Solvent,Waste stream,Net (kg)\n2026-02-01,toluene,flammable,70\n2026-02-01,toluene,reclaimed off site,20\n"
                .to_owned(),
        ),
    ];
    let (found, names) = reconciled(&account, &files);
    let parts = of(&found.quarters, &names, "toluene");
    assert_eq!(parts.len(), 1);
    let part = parts[0];
    assert!(part.counted());
    assert_eq!(part.opening.unwrap().kg, 30.0);
    assert_eq!(part.closing.unwrap().kg, 20.0);
    assert_eq!(part.used().unwrap().kg, 106.0);
    assert_eq!((part.consigned.kg, part.reclaimed.kg), (70.0, 20.0));
    assert_eq!(part.unexplained().unwrap().kg, 16.0);
    // u² = (1 % · 100)² + (2 % · 4)² + (10 % · 30)² + (10 % · 20)² + (2 % · 70)² + (2 % · 20)², each over 3; density of
    // toluene adds its own part of less than 0.2 %.
    let squares = 1.0 + 0.0064 + 9.0 + 4.0 + 1.96 + 0.16_f64;
    let u = (squares / 3.0).sqrt();
    assert!(
        (part.unexplained().unwrap().u_kg / u - 1.0).abs() < 0.01,
        "{} {u}",
        part.unexplained().unwrap().u_kg
    );
    assert_eq!(
        part.explained(),
        Some(false),
        "16 kg are more than {}",
        part.unexplained().unwrap().expanded_kg()
    );
    let (_, all) = solvent_balance(&found, &names);
    assert_eq!(all.o[7].kg, 20.0);
    assert_eq!(all.consumption().kg, all.i1.kg - 20.0);
}

#[test]
fn a_count_a_day_too_far_is_no_count() {
    let account = harbour();
    let with = |day: &str| {
        let files = [
            ("purchases.csv", "Order date,Item,Amount (kg)\n2026-02-10,toluene,60\n".to_owned()),
            ("stock.csv", format!("Count date,Item,On hand (kg)\n{day},toluene,30\n2026-04-01,toluene,30\n")),
        ];
        let (found, names) = reconciled(&account, &files);
        of(&found.quarters, &names, "toluene")[0].counted()
    };
    // 15 days before 1 January is 17 December; 15 after is 16 January.
    assert!(with("2025-12-17") && with("2026-01-16"));
    assert!(!with("2025-12-16") && !with("2026-01-17"));
}

#[test]
fn a_stream_that_the_plan_does_not_fill_is_told_and_in_no_solvent() {
    let (reading, mut names, _) =
        in_pieces("waste.csv", b"Ship date,Waste stream,Net (kg)\n2026-02-01,flammable,100\n", 10);
    let account = harbour();
    let readings = [reading.unwrap()];
    let found = reconcile(&readings, account.program.as_ref().unwrap(), &mut names);
    // Without a log the plan's own year stands in, and says so.
    assert!(found.doubts.iter().any(|d| d.contains("no preparation log")));
    let shares: f64 = ["acetone", "n-hexane"]
        .iter()
        .flat_map(|name| of(&found.quarters, &names, name))
        .map(|a| a.consigned.kg)
        .sum();
    assert!(shares > 50.0 && shares <= 100.0, "{shares}");
}

/// 73 days are a fifth of a year.
#[test]
fn consignments_are_scaled_to_a_year_beside_the_plan() {
    let account = harbour();
    let text = "Ship date,Waste stream,Net (kg)\n2026-01-01,flammable,60\n2026-03-14,flammable,40\n";
    let (readings, names) = readings(&account, &[("waste.csv", text.to_owned())]);
    let table = consigned_year_table(&readings, &names, &account);
    let cell = |key: &str| table.rows[0][table.head.iter().position(|h| h[0] == key).unwrap()].clone();
    assert_eq!((cell("mass_kg"), cell("days")), (DataCell::Number(100.0), DataCell::Count(73)));
    assert_eq!(cell("scaled_kg_year"), DataCell::Number(500.0));
    let desk = site_desk(&account, &[]).unwrap();
    let at = names.streams.iter().position(|s| *s == cell("stream").shown()).unwrap();
    let planned = desk.streams.iter().find(|s| s.stream == at).unwrap().contents.mass_kg();
    assert!(planned > 0.0);
    assert_eq!(cell("plan_kg_year"), DataCell::Number(planned));
}

/// 754 kg of acetone left and nothing says what came: no figure is made of that.
#[test]
fn a_register_that_was_not_read_is_not_zero() {
    let account = harbour();
    let waste = ("waste.csv", "Ship date,Solvent,Manifest,Net (kg)\n2026-05-05,acetone,M1,754\n".to_owned());
    let bought = ("purchases.csv", "Order date,Item,Amount (kg)\n2026-04-10,acetone,800\n".to_owned());
    let stock = ("stock.csv", "Count date,Item,On hand (kg)\n2026-04-01,acetone,5\n".to_owned());
    for (files, missing) in [
        (vec![waste.clone()], "purchases, stock count"),
        (vec![waste.clone(), bought.clone()], "stock count"),
        (vec![waste.clone(), stock.clone()], "purchases"),
        (vec![bought.clone(), stock.clone()], "waste consignments"),
        (vec![waste, bought, stock], ""),
    ] {
        let (found, names) = reconciled(&account, &files);
        let part = of(&found.quarters, &names, "acetone")[0];
        assert_eq!(part.recorded.missing(), missing);
        assert_eq!(part.unexplained().is_some(), missing.is_empty(), "{missing}");
        assert_eq!(part.explained().is_some(), missing.is_empty(), "{missing}");
        assert_eq!(solvent_balance(&found, &names).0.is_empty(), !missing.is_empty(), "{missing}");
        let told = found.doubts.iter().any(|d| d.starts_with(&format!("not recorded: {missing};")));
        assert_eq!(told, !missing.is_empty(), "{:?}", found.doubts);
        let table = reconciliation_table(&found, &names);
        let row = table.rows.iter().find(|r| r[0].shown() == "acetone").unwrap();
        let cell = |key: &str| row[table.head.iter().position(|h| h[0] == key).unwrap()].shown();
        for (key, register) in
            [("bought_kg", "purchases"), ("opening_kg", "stock"), ("consigned_kg", "waste")]
        {
            assert_eq!(cell(key) == "not recorded", missing.contains(register), "{missing}: {key}");
        }
        assert_eq!(cell("unexplained_kg") == "not recorded", !missing.is_empty());
        assert_eq!(solvent_balance_table(&found, &names).rows.is_empty(), !missing.is_empty());
    }
}
