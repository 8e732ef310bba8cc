//! A draw allocates nothing.
//!
//! Witness: a counting allocator (`allocation-counter`, chosen because it needs neither `unsafe` here nor a binary of its
//! own and counts by thread).

use super::generator::{Style, plan_of};
use super::{routes, sound};
use allocation_counter::measure;
use thimbleworth::account::evaluate;
use thimbleworth::chance::Draw;

#[test]
fn a_draw_allocates_nothing() {
    // The counter counts.
    assert!(measure(|| drop(std::hint::black_box(vec![1_u8; 10]))).count_total >= 1);
    let mut draws = 0;
    for seed in 0..40 {
        let account = sound(&plan_of(seed, Style { uncertain: true, by_the_year: true, ..Style::PLAIN }));
        for (route, found) in routes(&account) {
            let (mut x, mut desk) = (route.central(), route.desk());
            let mut values = vec![0.0; found.figures.len()];
            let seen = measure(|| {
                for draw in 0..50 {
                    route.draw_into(1, draw, &mut x);
                    route.run(Draw(&x), &mut desk, None).unwrap();
                    evaluate(&found.figures, &desk, Draw(&x), &mut values);
                    draws += 1;
                }
            });
            assert_eq!((seen.count_total, seen.bytes_total), (0, 0), "{seed} {}", route.name);
        }
    }
    assert_eq!(draws, 40 * 3 * 50);
}
