//! `case`: the paper, and what differs between two versions.

use super::{folder, run};

fn example() -> String {
    run(&["example", "harbour-sediment"]).out
}

#[test]
fn the_paper_has_its_page_and_its_annex() {
    let at = folder("case").join("plan.json");
    std::fs::write(&at, example()).unwrap();
    let done = run(&["case", at.to_str().unwrap(), "--draws", "500"]);
    assert_eq!(done.status, 0, "{}", done.complaints);
    let (page, annex) = done.out.split_once("# Annex\n").unwrap();
    for part in [
        "## PAH in sediment",
        "**In place of Soxhlet, Pressurised liquid",
        "present value of",
        "### What must be true",
        "### What it hangs on",
        "### Cautions",
        "### Points of change control",
        "500 draws, seed 1",
        "Ultrasonic is shown but not ranked",
    ] {
        assert!(page.contains(part), "{part} in {page}");
    }
    assert!(
        annex.contains("Assumed, because the plan does not say") && annex.contains("Internal rate of return")
    );
    assert!(done.out.contains("| Ultrasonic | 0 | 6000 USD |") && done.out.contains("| never | no |"));
}

#[test]
fn the_difference_sheet_lists_entries_and_figures() {
    let folder = folder("since");
    let (old, new) = (folder.join("old.json"), folder.join("new.json"));
    std::fs::write(&old, example()).unwrap();
    std::fs::write(&new, example().replace("\"300 ± 5 mL\"", "\"250 ± 5 mL\"")).unwrap();
    let sheet = |a: &std::path::Path, b: &std::path::Path| {
        run(&["case", a.to_str().unwrap(), "--since", b.to_str().unwrap()])
    };
    let done = sheet(&new, &old);
    assert_eq!(done.status, 0, "{}", done.complaints);
    assert!(done.out.contains("| 300 ± 5 mL | 250 ± 5 mL |"), "{}", done.out);
    assert!(done.out.contains("| PAH in sediment | Soxhlet | waste |"), "{}", done.out);
    assert!(done.out.contains("| Pressurised liquid | present value of the case |"), "{}", done.out);
    assert!(sheet(&old, &old).out.contains("The two plans say the same."));
}

/// A4 with margins of 15 mm holds 67 lines of 110 signs in 9 point (267 mm of 3.97 mm); headings take two.
#[test]
fn the_paper_is_one_page_and_an_annex() {
    let plan = thimbleworth::example::example("harbour-sediment").unwrap().text;
    let done = super::run_on(plan.as_bytes(), &["case", "-", "--draws", "1000"]);
    assert_eq!(done.status, 0, "{}", done.complaints);
    let (page, annex) = done.out.split_once("# Annex").unwrap();
    let lines: usize = page
        .lines()
        .filter(|l| !l.is_empty() && !l.starts_with("| ---"))
        .map(|l| if l.starts_with('#') { 2 } else { l.chars().count().div_ceil(110) })
        .sum();
    assert!(lines <= 67, "{lines} lines:\n{page}");
    for part in [
        "What must be true",
        "What it hangs on",
        "### Cautions",
        "Points of change control",
        "Finance: ___",
        "scope 2",
    ] {
        assert!(page.contains(part), "{part}");
    }
    assert!(annex.contains("Vessel under pressure: rated, inspected"), "cautions in full");
}
