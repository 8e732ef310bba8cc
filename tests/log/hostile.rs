//! Broken and hostile files: each row is used, used with a note, or refused with its line and the reason.

use super::{in_pieces, read, refused};
use thimbleworth::log::{Change, Names, Reader, Reading, Remark, Unreadable, Verdict, Why};
use thimbleworth::report::log_tables;

#[test]
fn a_german_ledger_with_everything_that_goes_wrong() {
    // Windows-1252, semicolons, decimal commas, shuffled columns, credits, a sum line, formulas, a truncated last line.
    let text = b"Einkauf 2026;;;;\r\n\
        Lieferant;CAS-Nr.;Menge (L);Artikel;Datum\r\n\
        Kr\xe4mer;67-64-1;2,5;Aceton;05.01.2026\r\n\
        Kr\xe4mer;67-64-1;-2,5;Aceton;7.1.2026\r\n\
        Kr\xe4mer;67-64-1;(2,5);Aceton;8.1.2026\r\n\
        Kr\xe4mer;110-54-3;1.250,0;\"n-Hexan; p.a.\";9.1.2026\r\n\
        x;67-64-2;2,5;Aceton;9.1.2026\r\n\
        x;;2,5;\xc4ther;9.1.2026\r\n\
        x;;2,5;=HYPERLINK(\"http://x\");9.1.2026\r\n\
        x;67-64-1;+1+cmd|' /C calc'!A0;Aceton;9.1.2026\r\n\
        x;67-64-1;2,5;Aceton;31.2.2026\r\n\
        ;;;;\r\n\
        Summe;;1.252,5;;\r\n\
        Lieferant;CAS-Nr.;Menge (L);Artikel;Datum\r\n\
        Kr\xe4mer;67-64-1;2,5;Aceton;05.01.2026\r\n\
        Kr\xe4mer;67-64-1;2,";
    let (reading, names, remarks) = read("einkauf.csv", text);
    assert_eq!(reading.separator, ';');
    assert_eq!(reading.heading_line, 2);
    let rows = &reading.rows;
    assert_eq!((rows.used, rows.refused, rows.blank), (5, 7, 2), "{remarks:#?}");
    assert_eq!(
        refused(&remarks),
        [
            (7, Why::CasDigit),
            (8, Why::UnknownMaterial),
            (9, Why::UnknownMaterial),
            (10, Why::OtherUnit),
            (11, Why::NoSuchDay),
            (13, Why::NoDate),
            (16, Why::CutOff),
        ]
        .map(|(line, why)| (line, why.words()[0]))
    );
    // 2.5 − 2.5 − 2.5 + 2.5 L of acetone are none, on four rows of which two are negative.
    let acetone = names.materials.iter().position(|m| m.name == "acetone").unwrap();
    let sum = reading.tally.over(&|k| usize::from(k.material) == acetone);
    assert!(sum.kg.abs() < 1e-12);
    assert_eq!((sum.rows, sum.negative), (4, 2));
    // 1.250,0 L of hexane; density of the catalogue at 20 °C.
    let hexane = names.materials.iter().position(|m| m.name == "n-hexane").unwrap();
    let sum = reading.tally.over(&|k| usize::from(k.material) == hexane);
    let density = names.materials[hexane].density_kg_m3.unwrap().0;
    assert!((sum.kg - 1.25 * density).abs() < 1e-9);
    let changes: Vec<Change> = remarks
        .iter()
        .filter_map(|r| match r.what {
            Verdict::Changed(change) => Some(change),
            Verdict::Refused(_) => None,
        })
        .collect();
    for change in [Change::Bracketed, Change::Thousands, Change::HeadingsAgain, Change::Repeated] {
        assert!(changes.contains(&change), "{change:?}: {changes:?}");
    }
    let again = remarks.iter().find(|r| r.what == Verdict::Changed(Change::Repeated)).unwrap();
    assert_eq!((again.line, again.detail.as_str()), (15, "3"));
}

/// The mark of UTF-8 before the first heading, German names without a CAS number, one line in another encoding, and a word that
/// stands for several materials.
#[test]
fn a_mark_of_utf_8_and_german_names_without_a_number() {
    let text = b"\xef\xbb\xbfDatum;L\xc3\xb6semittel;Menge (kg);Lieferant\r\n\
        2026-01-05;Dichlormethan;2,5;x\r\n\
        2026-01-06;Essigs\xc3\xa4ureethylester;1,5;x\r\n\
        2026-01-07;Essigs\xe4ureethylester;1,0;x\r\n\
        2026-01-08;n-Hexan;3,0;x\r\n\
        2026-01-09;Benzin;4,0;x\r\n";
    let (reading, names, remarks) = read("einkauf.csv", text);
    assert_eq!((reading.rows.used, reading.rows.refused), (4, 1), "{remarks:#?}");
    assert_eq!(reading.mapping.columns[0].0, "Datum");
    let kg = |name: &str| {
        let at = names.materials.iter().position(|m| m.name == name).unwrap();
        reading.tally.over(&|k| usize::from(k.material) == at).kg
    };
    assert_eq!((kg("dichloromethane"), kg("ethyl acetate"), kg("n-hexane")), (2.5, 2.5, 3.0));
    let told = remarks.iter().find(|r| r.what == Verdict::Changed(Change::Windows1252)).unwrap();
    assert_eq!(told.line, 4);
    let petrol = remarks.iter().find(|r| r.refused()).unwrap();
    assert_eq!(petrol.line, 6);
    assert!(
        petrol.need().contains("petroleum ether") && !petrol.need().contains("benzene"),
        "{}",
        petrol.need()
    );
}

#[test]
fn both_sides_of_every_question() {
    let purchases = |rows: &str| {
        let text = format!("Date,Solvent,Amount,Unit,Supplier\n{rows}");
        let (reading, _, remarks) = read("x.csv", text.as_bytes());
        (reading.rows.used, remarks.iter().find(|r| r.refused()).map(|r| r.what))
    };
    let no = |why| (0, Some(Verdict::Refused(why)));
    for (row, expected) in [
        ("2026-01-05,acetone,2.5,L,x\n", (1, None)),
        ("05/06/2026,acetone,2.5,L,x\n", no(Why::DayOrMonth)),
        ("15/06/2026,acetone,2.5,L,x\n", (1, None)),
        ("5.6.2026,acetone,2.5,L,x\n", (1, None)),
        ("2026-02-29,acetone,2.5,L,x\n", no(Why::NoSuchDay)),
        ("2028-02-29,acetone,2.5,L,x\n", (1, None)),
        ("2026-01-05,acetone,\"1,234\",L,x\n", no(Why::CommaOrThousands)),
        ("2026-01-05,acetone,\"1,23\",L,x\n", (1, None)),
        ("2026-01-05,acetone,2.5,,x\n", no(Why::NoUnit)),
        ("2026-01-05,acetone,2.5,h,x\n", no(Why::OtherUnit)),
        ("2026-01-05,acetone,2.5 kg,,x\n", (1, None)),
        ("2026-01-05,acetone,,L,x\n", no(Why::NoAmount)),
        ("2026-01-05,,2.5,L,x\n", no(Why::NoName)),
        (",acetone,2.5,L,x\n", no(Why::NoDate)),
        ("2026-01-05,acetone,100000000,kg,x\n", (1, None)),
        ("2026-01-05,acetone,100000001,kg,x\n", no(Why::TooLarge)),
        ("2026-01-05,acetone,2,5,L,x\n", no(Why::TooManyCells)),
        ("2026-01-05,acetone,2.5,L,x,,\n", (1, None)),
        ("2026-01-05,acetone,2.5,L\n", (1, None)),
        ("2026-01-05,acetone,2.5,L", no(Why::CutOff)),
        ("2026-01-05,acetone,2.5,L,x", (1, None)),
        ("2026-01-05,\"acetone,2.5,L,x\n", no(Why::OpenQuote)),
        ("2026-01-05,\"acetone\",2.5,L,x\n", (1, None)),
        ("2026-01-05,\"acetone\"x,2.5,L,x\n", no(Why::StrayQuote)),
    ] {
        assert_eq!(purchases(row), expected, "{row}");
    }
    let stock =
        |row: &str| read("stock.csv", format!("Count date,Solvent,On hand (L)\n{row}\n").as_bytes()).0.rows;
    assert_eq!(stock("2026-01-05,acetone,-1").by_reason[Why::Negative as usize], 1);
    assert_eq!(stock("2026-01-05,acetone,0").used, 1);
    let prep = |row: &str| {
        let text = format!("Prep date,Batch,Method,QC type,Re-extract\n{row}\n");
        let (reading, _, remarks) = read("prep.csv", text.as_bytes());
        (reading.rows.used, remarks.iter().find(|r| r.refused()).map(|r| r.what))
    };
    assert_eq!(prep("2026-01-05,B1,Soxhlet,MB,"), (1, None));
    assert_eq!(prep("2026-01-05,B1,Soxhlet,mystery,"), no(Why::SampleType));
    assert_eq!(prep("2026-01-05,B1,Soxhlet,,maybe"), no(Why::YesOrNo));
    assert_eq!(prep("2026-01-05,B1,Soxhlet,,yes"), (1, None));
    assert_eq!(prep("2026-01-05,B1,Shaking,,"), no(Why::UnknownRoute));
    let waste = |row: &str| {
        let text = format!("Ship date,Waste stream,Drum,Net kg\n{row}\n");
        let (reading, _, remarks) = read("waste.csv", text.as_bytes());
        (reading.rows.used, remarks.iter().find(|r| r.refused()).map(|r| r.what))
    };
    assert_eq!(waste("2026-01-05,Flammable,D1,20"), (1, None));
    assert_eq!(waste("2026-01-05,inflammable,D1,20"), no(Why::UnknownStream));
}

#[test]
fn files_that_are_no_tables_say_what_would_do() {
    let fails = |text: &[u8]| in_pieces("x", text, 7).0.unwrap_err().why;
    assert_eq!(fails(b""), Unreadable::Empty);
    assert_eq!(fails(b"\xef\xbb\xbf  \n"), Unreadable::Empty);
    assert_eq!(fails(b"PK\x03\x04 a workbook"), Unreadable::NotText);
    assert_eq!(fails(b"D\0a\0t\0e\0"), Unreadable::NotText);
    assert_eq!(fails(b"\xff\xfeD\0a\0"), Unreadable::Utf16);
    assert_eq!(fails(b"hello\nworld\n"), Unreadable::NoHeadings);
    assert_eq!(fails(b"Date,Solvent,Amount (L)\n"), Unreadable::WhichRegister);
    assert!(matches!(fails(b"Solvent,Amount (L),Supplier\n"), Unreadable::Missing(_)));
    for why in [Unreadable::Empty, Unreadable::Missing("x")] {
        assert!(why.words().iter().all(|w| !w.is_empty()));
    }
}

/// Reads with names that are handed on, so that the plan is drawn up once.
fn read_again(names: &mut Option<Names>, text: &[u8], piece: usize) -> (Reading, Vec<Remark>) {
    let mut reader = Reader::new("x.csv", names.take().unwrap(), &[]);
    let mut remarks = Vec::new();
    for piece in text.chunks(piece) {
        reader.feed(piece);
        remarks.extend(reader.take_remarks());
    }
    let (reading, back, rest) = reader.finish();
    *names = Some(back);
    remarks.extend(rest);
    (reading.unwrap(), remarks)
}

#[test]
fn any_bytes_in_any_pieces_give_the_same_and_every_row_is_somewhere() {
    const PIECES: [&[u8]; 26] = [
        b"2026-01-05",
        b"05/06/2026",
        b",",
        b";",
        b"\t",
        b"\n",
        b"\r\n",
        b"\"",
        b"\"\"",
        b"acetone",
        b"2.5",
        b"1,5",
        b"L",
        b"kg",
        b"\xe4",
        b"\xff",
        b"=1+1",
        b"-",
        b"()",
        b" ",
        b"67-64-1",
        b"Soxhlet",
        b"\xf0\x9f\x98\x80",
        b"x",
        b"99999999999999999999",
        b"\r",
    ];
    let mut state = 11_u64;
    let mut dice = |faces: usize| {
        state = state.wrapping_mul(6_364_136_223_846_793_005).wrapping_add(1_442_695_040_888_963_407);
        usize::try_from(state >> 33).unwrap() % faces
    };
    let mut used = 0;
    let mut names = Some(super::names(&super::harbour()));
    for _ in 0..300 {
        let mut text = b"Date,Solvent,Amount,Unit,Supplier\n".to_vec();
        for _ in 0..dice(60) {
            if dice(4) == 0 {
                text.extend_from_slice(b"2026-01-05,acetone,2.5,L,x\n");
            } else {
                text.extend_from_slice(PIECES[dice(PIECES.len())]);
            }
        }
        let (reading, told_whole) = read_again(&mut names, &text, text.len());
        for piece in [1, 2, 13] {
            let (again, remarks) = read_again(&mut names, &text, piece);
            assert_eq!(again.rows, reading.rows, "{}", String::from_utf8_lossy(&text));
            assert_eq!(again.tally.sums, reading.tally.sums);
            assert_eq!(remarks, told_whole);
        }
        let told = told_whole.iter().filter(|r| r.refused()).count() as u64;
        assert_eq!(told, reading.rows.refused, "each refused row is told");
        assert_eq!(reading.rows.used, reading.tally.rows(), "the sums stand on the rows that are used");
        assert_eq!(reading.rows.by_reason.iter().sum::<u64>(), reading.rows.refused);
        used += reading.rows.used;
    }
    assert!(used > 500, "{used}");
}

#[test]
fn names_bring_neither_markup_nor_formulas_into_the_tables() {
    use thimbleworth::report::{data_csv, data_json, data_markdown, log_tables, remark_table};
    let text = b"Ship date,<img src=x onerror=alert(1)>,Waste stream,Drum,Net kg\n\
        2026-01-05,=1+1,flammable,=cmd|' /C calc'!A0,20\n2026-01-05,x,<script>,@SUM(A1),20\n";
    let (reading, names, remarks) = read("=evil|<b>.csv", text);
    let mut tables = log_tables(&[reading], &names);
    let remarks: Vec<_> = remarks.into_iter().map(|r| ("=f".to_owned(), r)).collect();
    tables.push(remark_table(&remarks, true));
    let markdown = data_markdown("=<b>", &tables);
    assert!(
        !markdown.contains("<img") && !markdown.contains("<script") && markdown.contains("&lt;script&gt;")
    );
    for table in &tables {
        for line in data_csv(table).lines() {
            assert!(!line.split(',').any(|c| c.trim_start_matches('"').starts_with(['=', '@'])), "{line}");
        }
    }
    let json: serde_json::Value = serde_json::from_str(&data_json(&tables)).unwrap();
    assert_eq!(json["tables"]["containers"]["rows"][0]["container"], "=cmd|' /C calc'!A0");
    assert_eq!(json["tables"]["refused"]["rows"][0]["line"], 3);
}

/// A column is settled by its own rows alone: the sizes of packs say nothing of the amounts.
#[test]
fn a_number_with_two_readings_is_asked_about_in_its_own_column() {
    let read_as = |rows: &str| {
        let text = format!("Date\tSolvent\tAmount (kg)\tPacks\tPack size (L)\tSupplier\n{rows}");
        let (reading, _, remarks) = read("x.csv", text.as_bytes());
        let asked: Vec<u64> = remarks
            .iter()
            .filter(|r| r.what == Verdict::Refused(Why::CommaOrThousands))
            .map(|r| r.line)
            .collect();
        assert_eq!(asked.len(), refused(&remarks).len(), "{remarks:#?}");
        (reading.rows.used, asked)
    };
    let asked = vec![2];
    for (rows, expected) in [
        ("2026-01-05\tacetone\t1,234\t\t\tx\n", (0, asked.clone())),
        ("2026-01-05\tacetone\t1,234\t\t\tx\n2026-01-06\tacetone\t\t4\t2.5\tx\n", (1, asked.clone())),
        ("2026-01-05\tacetone\t\t1,234\t2.5\tx\n", (0, asked.clone())),
        ("2026-01-05\tacetone\t1,234\t\t\tx\n2026-01-06\tacetone\t12.5\t\t\tx\n", (2, vec![])),
        (
            "2026-01-05\tacetone\t1,234\t\t\tx\n2026-01-06\tacetone\t12.5\t\t\tx\n2026-01-06\tacetone\t12,5\t\t\tx\n",
            (2, asked),
        ),
    ] {
        assert_eq!(read_as(rows), expected, "{rows}");
    }
}

/// A month whose rows were refused has rows; a paste needs no last line end; a last line short of cells may be cut.
#[test]
fn refused_months_and_last_lines_are_told_as_they_are() {
    let notes = |rows: &str| {
        let (reading, names, remarks) =
            read("x.csv", format!("Date,Solvent,Amount (kg),Supplier\n{rows}").as_bytes());
        (log_tables(&[reading], &names)[0].notes.join("; "), remarks)
    };
    let (said, remarks) =
        notes("2026-03-05,acetone,2,x\n2026-04-05,acetone,plenty,x\n2026-06-05,acetone,2,x");
    assert_eq!(said, "x.csv: all rows were refused in 2026-04; x.csv: no rows in 2026-05");
    assert_eq!(remarks.len(), 1, "nothing is said of the line end: {remarks:#?}");
    let (said, _) = notes("2026-03-05,acetone,2,x\n04/05/2026,acetone,2,x\n2026-05-05,acetone,2,x");
    assert_eq!(said, "x.csv: no row that counts in 2026-04; 1 refused rows have no date that can be read");
    let (_, remarks) = notes("2026-03-05,acetone,2,x\n2026-04-05,acetone,2");
    assert_eq!(refused(&remarks), [(3, Why::CutOff.words()[0])]);
    let (_, remarks) = notes("2026-03-05,acetone,2,x\n2026-04-05,acetone,2,\"x");
    assert_eq!(refused(&remarks), [(3, Why::OpenQuote.words()[0])]);
}
