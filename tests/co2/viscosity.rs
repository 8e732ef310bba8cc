//! Viscosity.
use super::table::{assert_close, assert_printed, number, rows};
use thimbleworth::co2;

#[test]
fn printed_values() {
    let (mut checks, mut others) = (0, 0);
    for row in rows(include_str!("viscosity.csv")) {
        let found = co2::viscosity_pa_s(number(row[1]), number(row[2])).unwrap() * 1e6;
        let what = format!("{} K, {} kg/m3", row[1], row[2]);
        if row[0] == "check" {
            assert_printed(found, row[3], &what);
            checks += 1;
        } else {
            // Another correlation of the same property: shows that no unit is wrong.
            assert_close(found, number(row[3]), 0.04, &what);
            others += 1;
        }
    }
    assert_eq!((checks, others), (9, 10));
}
