//! Pictures of one small plan as whole files, and what holds of every picture.

use super::draw::svg;
use super::letter::class_width;
use super::*;
use std::fs;
use std::path::Path;
use thimbleworth::account::{Account, account_text, site_desk};
use thimbleworth::case::{drawn, switch};
use thimbleworth::compare::compare;
use thimbleworth::log::{Names, Reader, reconcile};
use thimbleworth::odds::{MOST_CELLS, Reading, Sampled, Wish, headline};
use thimbleworth::report::{DataTable, reconciliation_table};

const PLAN: &str = include_str!("fixture/plan.json");

fn pictures(account: &Account) -> Vec<Picture> {
    let mut out = Vec::new();
    for per in [Per::Year, Per::Result] {
        out.extend(mass_by_place(&format!("places-{}", per as u8), account, 0, per));
    }
    let routes = account.workloads[0].routes.len();
    for route in 0..routes {
        out.extend(flow(&format!("flow-{route}"), account, 0, route, Per::Year));
    }
    let program = account.program.as_ref().unwrap();
    for beside in compare(account, 0).unwrap().routes {
        out.extend(difference(&format!("difference-{}", beside.route), program, 0, &beside));
    }
    out.extend(co2_map("co2", account, 0));
    let air = account.workloads[0].routes.iter().flatten().zip(&program.workloads[0].routes).enumerate();
    for (r, (route, named)) in air.filter_map(|(r, (a, named))| Some((r, (a.air.as_ref()?, named)))) {
        out.extend(air_course(&format!("air-{r}"), &named.name, route));
    }
    for route in 0..routes {
        out.extend(cost_flow(&format!("cost-flow-{route}"), account, 0, route, Per::Year));
    }
    let mut run = Sampled::default();
    run.follow(account, Wish { draws: 400, most_cells: MOST_CELLS, wanted: &headline });
    while run.advance(account, 400) > 0 {}
    let work = &program.workloads[0];
    let reading = Reading::new(account, &run, 0, 0.95).unwrap();
    for id in ["waste.total.mass", "cost.year"] {
        let briefs: Vec<_> = (0..routes).map(|r| reading.brief(id, r)).collect();
        out.extend(intervals(&format!("intervals-{id}"), work, &briefs, 0.95));
    }
    for route in 1..routes {
        if let (Ok(case), Some(drawn)) = (switch(account, 0, route), drawn(account, &run, 0, route, 0.95)) {
            let names = (work.routes[route].name.as_str(), work.routes[0].name.as_str());
            out.extend(over_years(&format!("over-years-{route}"), names, &case, &drawn, 0.95));
        }
    }
    let desk = site_desk(account, &[]).unwrap();
    out.extend(stock("stock", &desk));
    out.extend(load("load", account, &desk));
    out.extend(reconciled("reconciled", &reconciliation(account)));
    out
}

/// Purchases and consignments of two quarters: one solvent explained, one not, one of which more left than came.
fn reconciliation(account: &Account) -> DataTable {
    let program = account.program.as_ref().unwrap();
    let mut names = Names::of(account.plan.as_ref().unwrap(), program);
    let mut readings = Vec::new();
    for (name, text) in [
        (
            "purchases.csv",
            "Date,Solvent,Amount (kg),Supplier\n2026-01-05,acetone,1000,x\n2026-04-05,toluene,20,x\n2026-04-05,methanol,1,x\n",
        ),
        (
            "waste.csv",
            "Date,Solvent,Amount (kg),Manifest\n2026-02-05,acetone,400,x\n2026-05-05,toluene,20,x\n2026-05-05,methanol,9,x\n",
        ),
        ("stock.csv", "Date,Solvent,On hand (kg)\n2026-02-15,acetone,1\n"),
    ] {
        let mut reader = Reader::new(name, names, &[]);
        reader.feed(text.as_bytes());
        let (reading, back, _) = reader.finish();
        readings.push(reading.unwrap());
        names = back;
    }
    let found = reconcile(&readings, program, &mut names);
    reconciliation_table(&found, &names)
}

fn of(plan: &str) -> Vec<Picture> {
    let account = account_text(plan);
    assert!(!account.broken(), "{:?}", account.problems);
    pictures(&account)
}

/// Hostile names, a huge and a tiny amount, many routes and places.
fn plans() -> Vec<String> {
    let long =
        "a stream with a name that is far too long for any column & holds <b>markup</b> \\\"quoted\\\" 溶剤";
    let named = PLAN.replace("solvent waste without halogens, second floor", long);
    let huge = PLAN
        .replace("\"results_per_year\": 600", "\"results_per_year\": 60000000")
        .replace("4 g", "0.001 mg");
    let mut many: serde_json::Value = serde_json::from_str(PLAN).unwrap();
    let routes = many["workloads"][0]["routes"].as_array_mut().unwrap();
    for i in 0..10 {
        let mut route = routes[1].clone();
        route["name"] = format!("CO2 number {i}").into();
        route["steps"][0]["pressure"] = format!("{} bar", 90 + 90 * i).into();
        routes.push(route);
    }
    vec![PLAN.to_owned(), named, huge, many.to_string()]
}

fn texts(drawing: &Drawing) -> Vec<&Shape> {
    drawing.shapes.iter().filter(|s| matches!(s, Shape::Text { .. })).collect()
}

/// Every file is compared to the byte; `UPDATE=1` writes them anew.
#[test]
fn drawings_are_what_they_were() {
    let folder = Path::new(env!("CARGO_MANIFEST_DIR")).join("src/picture/fixture");
    let mut names = vec!["plan.json".to_owned()];
    for picture in of(PLAN) {
        for (size, drawing) in [("wide", &picture.wide), ("narrow", &picture.narrow)] {
            let name = format!("{}-{size}.svg", picture.key);
            let text = svg(&picture, drawing, &picture.key, "drawing").text() + "\n";
            let path = folder.join(&name);
            if std::env::var_os("UPDATE").is_some() {
                fs::write(&path, &text).unwrap();
            }
            let kept = fs::read_to_string(&path).unwrap_or_default();
            assert!(kept == text, "{name} has changed: look at it, then run with UPDATE=1");
            names.push(name);
        }
    }
    for entry in fs::read_dir(folder).unwrap() {
        let name = entry.unwrap().file_name().into_string().unwrap();
        assert!(names.contains(&name), "{name} belongs to no picture");
    }
}

#[test]
fn the_plan_gives_every_picture() {
    let keys: Vec<String> = of(PLAN).into_iter().map(|p| p.key).collect();
    assert_eq!(
        keys,
        [
            "places-0",
            "places-1",
            "flow-0",
            "flow-1",
            "difference-1",
            "co2",
            "air-0",
            "air-1",
            "cost-flow-0",
            "cost-flow-1",
            "intervals-waste.total.mass",
            "intervals-cost.year",
            "over-years-1",
            "stock",
            "load",
            "reconciled"
        ]
    );
}

#[test]
fn every_text_stands_inside_its_drawing_and_on_no_other() {
    for picture in plans().iter().flat_map(|p| of(p)) {
        for drawing in [&picture.wide, &picture.narrow] {
            let found = texts(drawing);
            assert!(!found.is_empty());
            let mut boxes: Vec<(f64, f64, f64, f64, &str)> = Vec::new();
            for shape in found {
                let Shape::Text { at, anchor, size, class, text } = shape else { continue };
                let width = class_width(text, *size, class);
                let left = match anchor {
                    Anchor::Start => at.0,
                    Anchor::Middle => at.0 - width / 2.0,
                    Anchor::End => at.0 - width,
                };
                let inside = left >= -0.01
                    && left + width <= drawing.width + 0.01
                    && at.1 - size * 0.8 >= -0.01
                    && at.1 + size * 0.25 <= drawing.height + 0.01;
                assert!(inside, "{} ({}): \"{text}\" at {at:?}, {width} wide", picture.key, drawing.width);
                let (top, bottom) = (at.1 - size * 0.72, at.1 + size * 0.1);
                for (l, t, r, b, other) in &boxes {
                    let apart = left >= *r || *l >= left + width || top >= *b || *t >= bottom;
                    assert!(apart, "{} ({}): \"{text}\" over \"{other}\"", picture.key, drawing.width);
                }
                boxes.push((left, top, left + width, bottom, text));
            }
        }
    }
}

#[test]
fn every_number_of_a_drawing_stands_in_a_table() {
    for picture in plans().iter().flat_map(|p| of(p)) {
        let cells: String = picture
            .tables
            .iter()
            .flat_map(|t| t.rows.iter().flatten().chain(t.head.iter().map(|h| &h.text)).chain([&t.caption]))
            .fold(String::new(), |all, cell| all + "\n" + cell);
        for drawing in [&picture.wide, &picture.narrow] {
            let found = texts(drawing);
            for shape in found {
                let Shape::Text { text, class, .. } = shape else { continue };
                // Ticks and lines of equal density are the ruler, not what is measured; names may be cut.
                if class.contains("scale") || text.contains('…') {
                    continue;
                }
                for number in text
                    .split(|c: char| c.is_whitespace() && c != '\u{202f}')
                    .filter(|w| w.contains(|c: char| c.is_ascii_digit()))
                {
                    let number = number.trim_end_matches(',');
                    assert!(cells.contains(number), "{}: {number} of \"{text}\" is in no table", picture.key);
                }
            }
        }
    }
}

#[test]
fn nothing_is_not_a_number_and_no_style_is_inline() {
    for picture in plans().iter().flat_map(|p| of(p)) {
        let text = plate(&picture).text();
        for word in ["NaN", "inf\"", "infinity", "not a number", "style=", "<b>"] {
            assert!(!text.contains(word), "{}: {word}", picture.key);
        }
        for word in [&picture.title, &picture.description] {
            assert!(!word.contains("inf") || word.contains("info"), "{word}");
        }
        assert!(picture.description.ends_with('.') && !picture.notes.is_empty());
        for table in &picture.tables {
            assert!(table.rows.iter().all(|r| r.len() == table.head.len()));
        }
    }
}

#[test]
fn ids_are_unique_and_start_with_the_key() {
    for picture in of(PLAN) {
        let text = plate(&picture).text();
        let mut ids: Vec<&str> =
            text.split(" id=\"").skip(1).filter_map(|rest| rest.split('"').next()).collect();
        assert!(ids.len() >= 9 && ids.iter().all(|id| id.starts_with(&picture.key)));
        ids.sort_unstable();
        let count = ids.len();
        ids.dedup();
        assert_eq!(ids.len(), count);
    }
}

/// The picture's masses are those of the account.
/// The heading's figure may stand between two hours; what has long been blown away is not written with 23 noughts.
#[test]
fn the_course_of_the_air_has_its_peak_in_the_table() {
    let mut seen = 0;
    for picture in of(PLAN).iter().filter(|p| p.key.starts_with("air-")) {
        let rows = &picture.tables[0].rows;
        let highest = rows.last().unwrap();
        assert!(
            picture.description.contains(&[" comes to ", &highest[1]].concat()),
            "{}",
            picture.description
        );
        assert!(!rows.iter().flatten().any(|cell| cell.contains("10⁻") || cell.contains("e-")), "{rows:?}");
        seen += 1;
    }
    assert!(seen > 0);
}

#[test]
fn places_hold_what_the_account_says() {
    let account = account_text(PLAN);
    let picture = mass_by_place("k", &account, 0, Per::Year).unwrap();
    let route = account.workloads[0].routes[0].as_ref().unwrap();
    let hood_kg = route.value("mass.to.hood").unwrap();
    assert!(hood_kg > 0.0);
    let row = picture.tables[0].rows.iter().find(|r| r[0] == "Soxhlet" && r[1] == "hood").unwrap();
    assert_eq!(row[3], letter::written(hood_kg, 3));
    let all = picture.tables[0].rows.iter().find(|r| r[0] == "Soxhlet" && r[1] == "together").unwrap();
    let ended_kg = route.value("mass.feed").unwrap() + route.value("mass.bought").unwrap();
    assert_eq!(all[3], letter::written(ended_kg, 3));
}

/// The flow of cost ends where its account says, with labour and energy shared out where there is a product.
#[test]
fn the_flow_of_cost_is_the_account_of_what_is_lost() {
    let made = PLAN
        .replace("\"liquor\": \"solvent waste without halogens, second floor\"", "\"liquor\": \"product\"");
    for (text, shared) in [(PLAN, false), (&made, true)] {
        let account = account_text(text);
        let mut count = 0;
        for r in 0..account.workloads[0].routes.len() {
            let Some(route) = &account.workloads[0].routes[r] else { continue };
            let Some(picture) = cost_flow("k", &account, 0, r, Per::Year) else { continue };
            let lost = route.value("cost.waste").unwrap();
            assert!(picture.title.contains(&letter::written(lost, 3)), "{}", picture.title);
            assert_eq!(picture.notes[1].contains("by the share of the mass"), shared, "{:?}", picture.notes);
            let rows = &picture.tables[0].rows;
            assert!(rows.iter().any(|row| row[0] == "removal of waste" && row[2] == "all places"));
            count += 1;
        }
        assert!(count > 0);
    }
}

/// The interval is that of the draws, and its caption says what it is.
#[test]
fn an_interval_says_what_it_is() {
    let pictures = of(PLAN);
    let picture = pictures.iter().find(|p| p.key == "intervals-cost.year").unwrap();
    assert!(
        picture.description.contains("95\u{202f}% coverage interval, 400 draws"),
        "{}",
        picture.description
    );
    let years = pictures.iter().find(|p| p.key == "over-years-1").unwrap();
    assert!(years.description.contains("95\u{202f}% coverage interval, 400 draws"), "{}", years.description);
    assert_eq!(years.tables[0].rows.len(), 7);
    // The same plan without spread has a point for an interval, and no odds between.
    let exact = PLAN
        .replace(" ± 4 EUR", " EUR")
        .replace(" ± 5 EUR", " EUR")
        .replace(" ± 3 min", " min")
        .replace(" ± 3000 EUR", " EUR");
    assert!(exact.len() < PLAN.len());
    assert!(pictures.len() == of(&exact).len());
}

#[test]
fn a_saved_drawing_stands_alone() {
    for picture in of(PLAN) {
        let text = to_svg_text(&picture);
        assert!(text.starts_with("<?xml") && text.trim_end().ends_with("</svg>"));
        assert_eq!(text.matches("<style>").count(), 1);
        assert!(text.find("<title").unwrap() < text.find("<style>").unwrap());
        assert!(text.contains(".drawing text") && text.contains("class=\"paper\""));
    }
}
