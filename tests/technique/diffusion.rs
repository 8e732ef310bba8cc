//! The hot-ball model in a plan: how long diffusion out of the particles takes for what is taken out.
use super::{plan_around, route, sound};
use serde_json::json;

fn plan(share: &str, time: &str) -> String {
    let step = json!({ "step": "supercritical", "temperature": "60 °C", "pressure": "300 bar", "vessel": "100 mL",
        "metered": "mass", "mass_flow": "3 g/min", "time": time, "extracts": { "tracer": share }, "diffusion_time": "10 min" });
    plan_around(
        &json!({ "sediment": "30 g", "tracer": "1 g" }),
        vec![step],
        &json!({ "marc": "solids", "trap": "waste" }),
    )
}

/// Witness: the share left after π² D t/r² = 0.5, 1 and 3, from the series of Crank recomputed in the project's notes
/// (0.3900581, 0.2264359, 0.0302678).
#[test]
fn the_time_of_the_hot_ball_is_that_of_the_series() {
    for (left, reduced) in [(0.390_058_1, 0.5), (0.226_435_9, 1.0), (0.030_267_8, 3.0)] {
        let share = format!("{}", 1.0 - left);
        for (time, enough) in [(reduced * 600.0 * 1.01, true), (reduced * 600.0 * 0.99, false)] {
            let account = sound(&plan(&share, &format!("{time} s")));
            let (_, found) = route(&account, "r");
            let noted =
                |symbol: &str| found.trace.notes.iter().find(|n| n.symbol == symbol).unwrap().value_si;
            assert!((noted("t, by diffusion") / (600.0 * reduced) - 1.0).abs() < 1e-5, "{reduced}");
            // 3 g/min for that long
            let kg = 3e-3 / 60.0 * 600.0 * reduced;
            assert!((noted("m_CO2, by diffusion") / kg - 1.0).abs() < 1e-5, "{reduced}");
            let doubted = found.trace.doubts.iter().any(|d| d.found.contains("diffusion"));
            assert_eq!(doubted, !enough, "{reduced} {time}");
        }
    }
}
