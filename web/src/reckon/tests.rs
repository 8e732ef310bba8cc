use super::*;
use thimbleworth::plan::{Field, open};

const PLAN: &str = r#"{
  "thimbleworth": 1, "title": "Trial",
  "site": { "name": "Aldmoor", "rules": "none",
    "streams": [ { "name": "flammable", "container": "20 L" }, { "name": "solids", "holds": "solid" } ] },
  "workloads": [{
    "name": "oil in meal", "results_per_year": 200, "batch": { "samples": 4 }, "feed": { "sediment": "10 g" },
    "present": "A",
    "routes": [
      { "name": "B", "steps": [ { "step": "soxhlet", "solvent": "acetone", "charge": "100 mL", "time": "6 h" } ],
        "ends": { "liquor": "flammable", "marc": "solids" } },
      { "name": "A", "steps": [ { "step": "soxhlet", "solvent": "acetone", "charge": "300 mL", "time": "18 h" } ],
        "ends": { "liquor": "flammable", "marc": "solids" } },
      { "name": "C", "steps": [ { "step": "soxhlet", "solvent": "acetone", "charge": "600 mL", "time": "18 h" } ],
        "ends": { "liquor": "flammable", "marc": "solids" } }
    ]
  }]
}"#;

fn plan() -> Plan {
    let opened = open(PLAN);
    assert!(opened.usable(), "{:?}", opened.problems);
    opened.plan.expect("a plan")
}

fn set_charge(plan: &mut Plan, route: usize, text: &str) {
    plan.workloads[0].routes[route].steps[0].fields[1].1 = Field::Text(text.into());
}

const DRAWN: &str = "mass.drawn.acetone";

fn drawn(book: &Book, r: usize) -> Option<f64> {
    book.value(0, r, DRAWN, Measure::Mass, Basis::Year)
}

#[test]
fn a_sound_plan_is_accounted_whole() {
    let reckoned = Reckoned::of(&plan());
    assert_eq!(reckoned.count(Severity::Error), 0, "{:?}", reckoned.problems);
    let book = &reckoned.book;
    let (a, b, c) = (drawn(book, 1), drawn(book, 0), drawn(book, 2));
    // The charges are as 1 : 3 : 6.
    assert!((a.unwrap() / b.unwrap() - 3.0).abs() < 1e-12 && (c.unwrap() / b.unwrap() - 6.0).abs() < 1e-12);
    let result = book.value(0, 0, DRAWN, Measure::Mass, Basis::Result).unwrap();
    assert!((result * 200.0 - b.unwrap()).abs() < 1e-9);
    assert_eq!(book.finding(0).len(), 2);
    assert!(book.finding(0)[0].starts_with("In place of A, B brings"), "{:?}", book.finding(0));
}

#[test]
fn a_route_that_cannot_be_accounted_is_left_out_and_named() {
    let mut broken = plan();
    set_charge(&mut broken, 0, "100 m");
    let reckoned = Reckoned::of(&broken);
    let book = &reckoned.book;
    assert!(!reckoned.old);
    assert_eq!(drawn(book, 0), None);
    assert_eq!(drawn(book, 1), drawn(&Reckoned::of(&plan()).book, 1));
    assert!(book.beside(0, 0).is_none() && book.beside(0, 2).is_some());
    assert_eq!(book.finding(0)[0], "B is left out: 1 thing to mend.");
    assert!(book.finding(0)[1].starts_with("In place of A, C costs"), "{:?}", book.finding(0));
    // Warnings of the others keep the paths of the whole plan.
    assert!(reckoned.problems.iter().all(|p| !p.path.contains("routes[3]")));
    assert!(
        reckoned.problems.iter().any(|p| p.path.starts_with("workloads[0].routes[2]")),
        "{:?}",
        reckoned.problems
    );
}

#[test]
fn without_the_present_route_nothing_is_compared() {
    let mut broken = plan();
    set_charge(&mut broken, 1, "");
    let book = Reckoned::of(&broken).book;
    assert!(drawn(&book, 0).is_some());
    assert!(book.beside(0, 0).is_none() && book.beside(0, 2).is_none());
    assert_eq!(
        book.finding(0),
        ["Nothing can be compared until A can be accounted: it is the present route."]
    );
}

#[test]
fn the_last_figures_stay_when_nothing_can_be_accounted() {
    let sound = Reckoned::of(&plan());
    let mut broken = plan();
    broken.site.streams[0].container = Some("20".into());
    let reckoned = Reckoned::new(&broken, &save(&broken), Some(&sound.book));
    assert!(reckoned.old);
    assert!(Rc::ptr_eq(&reckoned.book, &sound.book));
    broken.workloads[0].routes.pop();
    let other = Reckoned::new(&broken, &save(&broken), Some(&sound.book));
    assert!(!other.old, "figures of another shape are not shown");
    assert_eq!(drawn(&other.book, 0), None);
}

#[test]
fn a_blank_title_keeps_nothing_from_being_accounted() {
    let mut untitled = plan();
    untitled.title.clear();
    untitled.site.name.clear();
    let reckoned = Reckoned::of(&untitled);
    assert!(reckoned.count(Severity::Error) > 0);
    assert!(drawn(&reckoned.book, 0).is_some());
}

#[test]
fn paths_are_found_again() {
    let kept = [vec![], vec![1, 3]];
    assert_eq!(
        path_in_plan("workloads[0].routes[1].steps[2].charge", &kept),
        "workloads[1].routes[3].steps[2].charge"
    );
    assert_eq!(path_in_plan("workloads[0].repeats", &kept), "workloads[1].repeats");
    assert_eq!(path_in_plan("site.as_of", &kept), "site.as_of");
}

#[test]
fn fifty_routes_are_accounted_in_time() {
    let mut many = plan();
    let route = many.workloads[0].routes[2].clone();
    for n in 3..50 {
        let mut copy = route.clone();
        copy.name = format!("route {n}");
        many.workloads[0].routes.push(copy);
    }
    let book = Reckoned::of(&many).book;
    assert_eq!(book.works[0].routes.len(), 50);
    assert_eq!(drawn(&book, 49), drawn(&book, 2));
}
