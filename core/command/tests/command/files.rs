//! What is written into files: a whole result or nothing.

use super::{PLAN, folder, plan_with, run, run_on};
use serde_json::json;
use std::fs;

fn names(folder: &std::path::Path) -> Vec<String> {
    let mut names: Vec<String> =
        fs::read_dir(folder).unwrap().map(|f| f.unwrap().file_name().into_string().unwrap()).collect();
    names.sort();
    names
}

#[test]
fn a_file_gets_what_the_standard_output_would_get() {
    let folder = folder("written");
    let plan = folder.join("plan.json");
    fs::write(&plan, PLAN).unwrap();
    let (plan, out) = (plan.to_str().unwrap(), folder.join("result.json"));
    let to = out.to_str().unwrap();
    let shown = run(&["account", plan, "--format", "json"]);
    for _ in 0..2 {
        // The second time there is something to replace.
        let done = run(&["account", plan, "--format", "json", "--output", to]);
        assert_eq!((done.status, done.out.as_str()), (0, ""), "{}", done.complaints);
        assert_eq!(fs::read_to_string(&out).unwrap(), shown.out);
        assert_eq!(names(&folder), ["plan.json", "result.json"]);
    }
    // From the standard input the same.
    assert_eq!(run_on(PLAN.as_bytes(), &["account", "-", "--format", "json"]).out, shown.out);
}

#[test]
fn a_refused_plan_leaves_the_old_file_alone() {
    let folder = folder("kept");
    let out = folder.join("result.csv");
    fs::write(&out, "what was there").unwrap();
    let plan = plan_with("/workloads/0/routes/0/steps/0/charge", json!("-5 mL"));
    let args = ["compare", "-", "--format", "csv", "--output", out.to_str().unwrap()];
    let done = run_on(plan.as_bytes(), &args);
    assert_eq!(done.status, 2);
    assert!(done.complaints.contains("steps[0].charge"));
    assert_eq!(fs::read_to_string(&out).unwrap(), "what was there");
    assert_eq!(names(&folder), ["result.csv"]);
}

#[test]
fn what_cannot_be_written_is_said_and_nothing_is_left_behind() {
    let folder = folder("refused");
    let plan = folder.join("plan.json");
    fs::write(&plan, PLAN).unwrap();
    let missing = folder.join("no").join("such.txt");
    for (to, words) in [
        (folder.as_path(), "it is a folder"),
        (missing.as_path(), "there is no such file or folder"),
        (plan.as_path(), "is the file that is read"),
    ] {
        let done = run(&["account", plan.to_str().unwrap(), "--output", to.to_str().unwrap()]);
        assert_eq!((done.status, done.out.as_str()), (2, ""));
        assert!(done.complaints.contains(words), "{}", done.complaints);
    }
    assert_eq!(names(&folder), ["plan.json"]);
    assert_eq!(fs::read_to_string(&plan).unwrap(), PLAN);
}

#[cfg(unix)]
#[test]
fn a_link_keeps_pointing_at_the_file_that_is_written() {
    let folder = folder("linked");
    let (real, link) = (folder.join("real.md"), folder.join("link.md"));
    fs::write(&real, "old").unwrap();
    std::os::unix::fs::symlink(&real, &link).unwrap();
    let args = ["account", "-", "--format", "markdown", "--output", link.to_str().unwrap()];
    assert_eq!(run_on(PLAN.as_bytes(), &args).status, 0);
    assert!(fs::symlink_metadata(&link).unwrap().is_symlink());
    assert!(fs::read_to_string(&real).unwrap().starts_with("# Harbour sediment"));
    let done = run_on(PLAN.as_bytes(), &["account", "-", "--output", "/dev/null"]);
    assert_eq!(done.status, 0, "{}", done.complaints);
}
