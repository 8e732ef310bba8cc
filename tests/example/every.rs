//! What holds for every example.

use super::accounted;
use thimbleworth::compare::compare;
use thimbleworth::example::{EXAMPLES, example};
use thimbleworth::plan::{Severity, open, save};

#[test]
fn each_is_found_by_its_key_and_bears_its_title() {
    for e in EXAMPLES {
        assert_eq!(example(e.key), Some(e));
        assert_eq!(EXAMPLES.iter().filter(|f| f.key == e.key).count(), 1);
        assert_eq!(open(e.text).plan.unwrap().title, e.title);
        assert!(!e.about.is_empty());
    }
    assert!(example("").is_none());
}

#[test]
fn each_is_stored_as_the_writer_writes_it() {
    for e in EXAMPLES {
        let opened = open(e.text);
        assert_eq!(opened.problems, [], "{}", e.key);
        assert_eq!(save(&opened.plan.unwrap()), e.text, "{}: store what plan::save gives back", e.key);
    }
}

#[test]
fn each_accounts_for_every_route_and_closes() {
    for e in EXAMPLES {
        let account = accounted(e.key);
        assert!(!account.broken(), "{}: {:?}", e.key, account.problems);
        assert!(!account.workloads.is_empty());
        for (i, workload) in account.workloads.iter().enumerate() {
            for route in &workload.routes {
                let route = route.as_ref().unwrap();
                assert!(route.closure.abs() <= 1e-12, "{}: {:e}", e.key, route.closure);
                assert!(route.value("mass.in").unwrap() > 0.0);
                assert!(
                    route.figures.len() == route.values.len() && route.values.iter().all(|v| v.is_finite())
                );
            }
            let routes = compare(&account, i).unwrap().routes;
            assert_eq!(routes.len() + 1, workload.routes.len());
        }
    }
}

/// A warning in an example is one that the example means to show.
#[test]
fn warnings_are_those_that_are_meant() {
    let mut found = Vec::new();
    for e in EXAMPLES {
        let problems = accounted(e.key).problems;
        let told = problems.iter().filter(|p| p.severity != Severity::Note);
        found.extend(told.map(|p| format!("{}: {}", e.key, p.path)));
    }
    let meant = [
        // A cylinder of CO2 in 160 and in 30 m³ is immediately dangerous, whatever the averages say.
        "harbour-sediment: site.room.cylinder",
        "harbour-sediment: site.room.cylinder",
        // What is left of the extract is heptane with a little of the co-solvent, methanol: the two do not mix.
        "harbour-sediment: workloads[0].routes[3].steps[6]",
        // An extractor of 150 L is no laboratory flask.
        "botanical-pilot: workloads[0].routes[0].steps[0].charge",
        "botanical-pilot: workloads[0].routes[0].steps[0].heater",
        // Plants are larger than the laboratories for which the usual ranges are.
        "decaffeination: workloads[0].routes[0].steps[1].power",
        "decaffeination: workloads[0].routes[1].steps[1].power",
        "decaffeination: workloads[0].routes[2].steps[1].charge",
        "textile-dyeing: workloads[0].routes[0].steps[0].power",
        "textile-dyeing: workloads[0].routes[0].steps[4].charge",
        "garment-cleaning: workloads[0].routes[0].steps[1].power",
        "implant-cleaning: workloads[0].routes[0].steps[0].charge",
        "timber-preservation: workloads[0].routes[0].steps[0].power",
    ];
    assert_eq!(found, meant);
}

/// The examples are invented: their own materials say so, and so do their notes.
#[test]
fn each_says_that_it_is_invented() {
    for e in EXAMPLES {
        let plan = open(e.text).plan.unwrap();
        assert!(plan.notes.is_some_and(|n| n.starts_with("An example: the place") && n.contains("invented")));
        for material in &plan.materials {
            let source = material.fields.iter().find(|(key, _)| key == "source");
            assert!(format!("{source:?}").contains("invented for this example"));
        }
    }
}
