//! How long a sampled run takes: `cargo bench -p thimbleworth-tests --bench odds`.
//!
//! It judges nothing: load on a machine is no fault of the code.
#![allow(clippy::unwrap_used, clippy::panic, reason = "a program for people who measure")]

use std::time::Instant;
use thimbleworth::account::account_text;
use thimbleworth::example::example;
use thimbleworth::odds::{MOST_CELLS, Reading, Sampled, Wish, headline};

const DRAWS: u32 = 100_000;

/// Seconds that this thread has spent on a processor, where the system tells (Linux); else seconds gone by.
fn seconds(start: Instant) -> f64 {
    let told = std::fs::read_to_string("/proc/thread-self/schedstat").ok();
    let ns = told.and_then(|text| text.split(' ').next()?.parse::<f64>().ok());
    ns.map_or_else(|| start.elapsed().as_secs_f64(), |ns| ns * 1e-9)
}

fn main() {
    if cfg!(debug_assertions) {
        println!("not optimised: these times mean nothing");
    }
    let account = account_text(example("harbour-sediment").unwrap().text);
    let (mut best, mut read) = (f64::INFINITY, f64::INFINITY);
    for _ in 0..3 {
        let start = Instant::now();
        let before = seconds(start);
        let mut sampled = Sampled::default();
        sampled.follow(&account, Wish { draws: DRAWS, most_cells: MOST_CELLS, wanted: &headline });
        while sampled.advance(&account, 1000) > 0 {}
        let drawn = seconds(start) - before;
        let before = seconds(start);
        let reading = Reading::new(&account, &sampled, 0, 0.95).unwrap();
        for id in reading.ids() {
            let figure = reading.figure(id).unwrap();
            std::hint::black_box(&figure);
            std::hint::black_box(reading.matters(id, 3, Some(0)));
        }
        let here = seconds(start) - before;
        (best, read) = (best.min(drawn), read.min(here));
        assert_eq!(sampled.draws(), DRAWS);
    }
    println!("{DRAWS} draws of 4 routes: {best:.3} s to draw, {read:.3} s to read all figures drawn");
}
