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
    // One printed page: so many lines of a small size.
    assert!(page.lines().count() < 90, "{}", page.lines().count());
    assert!(
        annex.contains("Assumed, because the plan does not say") && annex.contains("Internal rate of return")
    );
    assert!(done.out.contains("| Ultrasonic | 6000 USD |") && done.out.contains("| never | no |"));
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
    assert!(sheet(&old, &old).out.contains("The two plans say the same."));
}
