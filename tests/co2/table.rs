//! Reading of the tables beside these checks.

/// The rows of a table of comma-separated values, without comments and head.
pub(crate) fn rows(text: &'static str) -> Vec<Vec<&'static str>> {
    text.lines().filter(|line| !line.starts_with('#')).skip(1).map(|line| line.split(',').collect()).collect()
}

pub(crate) fn number(text: &str) -> f64 {
    text.parse().unwrap_or_else(|_| panic!("{text:?} is not a number"))
}

/// Half of the last digit printed: 0.75 → 0.005.
pub(crate) fn half_last_digit(text: &str) -> f64 {
    let decimals = text.split_once('.').map_or(0, |(_, digits)| digits.len());
    0.5 * 10_f64.powi(-i32::try_from(decimals).unwrap())
}

/// Fails unless `found` rounds to what is printed.
pub(crate) fn assert_printed(found: f64, printed: &str, what: &str) {
    let off = (found - number(printed)).abs();
    // One of the 168 printed figures of Span and Wagner, the energy at 500 K and 1 MPa, is 0.52 of its last digit away.
    assert!(off <= half_last_digit(printed) * 1.04, "{what}: {found} does not round to {printed}");
}

/// Fails unless `found` is within `allowed` of `expected`, relatively.
pub(crate) fn assert_close(found: f64, expected: f64, allowed: f64, what: &str) {
    let off = (found / expected - 1.0).abs();
    assert!(
        off <= allowed,
        "{what}: {found:e} instead of {expected:e}, off by {off:.1e}, allowed {allowed:.1e}"
    );
}
