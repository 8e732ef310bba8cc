//! The program as people and scripts meet it: what it prints, what it refuses, its exit status, the files it writes.
#![allow(clippy::unwrap_used, clippy::expect_used, clippy::panic)]

mod bad_input;
mod case;
mod co2;
mod drawn;
mod files;
mod log;
mod need;
mod odds;
mod results;
mod waste;

use serde_json::Value;
use std::io::Write;
use std::path::{Path, PathBuf};
use std::process::{Command, Stdio};

/// A plan of two routes without an error.
const PLAN: &str = include_str!("plan.json");

/// What the program left behind.
struct Run {
    status: i32,
    out: String,
    complaints: String,
}

/// Runs the program with bytes on its standard input.
fn run_on(input: &[u8], args: &[&str]) -> Run {
    let mut child = Command::new(env!("CARGO_BIN_EXE_thimbleworth"))
        .args(args)
        .stdin(Stdio::piped())
        .stdout(Stdio::piped())
        .stderr(Stdio::piped())
        .spawn()
        .unwrap();
    // A program that refuses its arguments does not read its input.
    let _ = child.stdin.take().unwrap().write_all(input);
    let done = child.wait_with_output().unwrap();
    let run = Run {
        status: done.status.code().expect("ended by a signal"),
        out: String::from_utf8(done.stdout).unwrap(),
        complaints: String::from_utf8(done.stderr).unwrap(),
    };
    assert!(!run.complaints.contains("panicked"), "{}", run.complaints);
    run
}

fn run(args: &[&str]) -> Run {
    run_on(b"", args)
}

/// An empty folder of this test's own.
fn folder(name: &str) -> PathBuf {
    let folder = Path::new(env!("CARGO_TARGET_TMPDIR")).join(name);
    let _ = std::fs::remove_dir_all(&folder);
    std::fs::create_dir_all(&folder).unwrap();
    folder
}

/// The plan with one value changed, at a JSON pointer.
fn plan_with(pointer: &str, value: Value) -> String {
    let mut plan: Value = serde_json::from_str(PLAN).unwrap();
    let (parent, key) = pointer.rsplit_once('/').unwrap();
    let parent = plan.pointer_mut(parent).unwrap();
    match parent {
        Value::Array(items) => items[key.parse::<usize>().unwrap()] = value,
        _ => parent[key] = value,
    }
    plan.to_string()
}

/// Whether two readings of one text are the same: `serde_json` reads a number to within one unit in the last place only.
fn same(a: f64, b: f64) -> bool {
    (a - b).abs() <= 2.0 * f64::EPSILON * b.abs()
}

/// The cells of a CSV text.
fn csv(text: &str) -> Vec<Vec<String>> {
    let (mut rows, mut row, mut cell, mut quoted) = (Vec::new(), Vec::new(), String::new(), false);
    let mut chars = text.chars().peekable();
    while let Some(c) = chars.next() {
        match c {
            '"' if quoted && chars.peek() == Some(&'"') => cell.push(chars.next().unwrap()),
            '"' => quoted = !quoted,
            ',' if !quoted => row.push(std::mem::take(&mut cell)),
            '\r' if !quoted => {}
            '\n' if !quoted => {
                row.push(std::mem::take(&mut cell));
                rows.push(std::mem::take(&mut row));
            }
            _ => cell.push(c),
        }
    }
    assert!(cell.is_empty() && row.is_empty() && !quoted);
    rows
}
