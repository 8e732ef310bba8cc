//! A circuit of CO2 on the plane of pressure and enthalpy with its saturation dome, and the extraction curve of a step.
use super::chart::{Axis, Mark, chart};
use super::letter::written;
use super::{Head, Picture, Size, Table};
use thimbleworth::co2::{CRITICAL_TEMPERATURE_K, TRIPLE_TEMPERATURE_K, saturated_states};
use thimbleworth::step::DenseCo2;

fn curve(points: Vec<(f64, f64)>, class: &'static str) -> Mark {
    Mark { points, class, name: String::new() }
}

/// Enthalpy in kJ/kg and the decimal logarithm of the pressure in bar.
fn on_plane(enthalpy_j_kg: f64, pressure_pa: f64) -> (f64, f64) {
    (enthalpy_j_kg / 1e3, f64::log10(pressure_pa / 1e5))
}

/// The dome of liquid and vapour, from the triple point over the critical one.
fn dome() -> Vec<(f64, f64)> {
    const STEPS: u32 = 40;
    let (mut liquid, mut vapour) = (Vec::new(), Vec::new());
    for i in 0..STEPS {
        // Closer together near the critical temperature, where the dome bends.
        let left = f64::from(STEPS - i) / f64::from(STEPS);
        let t = CRITICAL_TEMPERATURE_K - (CRITICAL_TEMPERATURE_K - TRIPLE_TEMPERATURE_K) * left * left;
        if let Ok((l, v)) = saturated_states(t) {
            liquid.push(on_plane(l.enthalpy_j_kg, l.pressure_pa));
            vapour.push(on_plane(v.enthalpy_j_kg, v.pressure_pa));
        }
    }
    liquid.extend(vapour.into_iter().rev());
    liquid
}

/// The circuit of a step, state by state.
#[must_use]
pub fn circuit(key: &str, route: &str, dense: &DenseCo2) -> Picture {
    let legs = &dense.legs;
    let mut marks = vec![curve(dome(), "saturation")];
    let points: Vec<(f64, f64)> =
        legs.points.iter().map(|p| on_plane(p.enthalpy_j_kg, p.pressure_pa)).collect();
    let (mut low, mut high, mut right) = (0.7, 2.6, -50.0);
    for (h, p) in &points {
        low = if p - 0.1 < low { p - 0.1 } else { low };
        high = if p + 0.2 > high { p + 0.2 } else { high };
        right = if h + 40.0 > right { h + 40.0 } else { right };
    }
    for leg in &legs.legs {
        let ends = [leg.from, leg.to].into_iter().filter_map(|i| points.get(i).copied());
        marks.push(curve(ends.collect(), "hair"));
    }
    for (point, at) in legs.points.iter().zip(&points) {
        marks.push(Mark { points: vec![*at], class: "mark", name: point.name.to_owned() });
    }
    let x = Axis { title: "enthalpy (kJ/kg)", ends: (-460.0, right), decades: false };
    let y = Axis { title: "pressure (bar)", ends: (low, high), decades: true };
    let steps: Vec<String> = legs
        .legs
        .iter()
        .filter(|l| l.energy_j_kg != 0.0)
        .map(|l| format!("{} {}\u{a0}kJ", l.name, written(l.energy_j_kg / 1e3, 3)))
        .collect();
    Picture {
        key: key.to_owned(),
        title: format!("{route}: the CO₂ circuit on the plane of pressure and enthalpy"),
        description: format!("For each kilogram that goes round: {}; below zero is taken out.", steps.join(", ")),
        notes: vec!["Under the thick line liquid and vapour exist side by side. A level line is heat or cooling, a steep one a pump, an upright one a valve. An expansion to the vent passes through dry ice, which the equation of state does not describe: only its two ends are states.".to_owned()],
        tables: vec![Table {
            caption: "States of the circuit".into(),
            head: vec![Head::words("State"), Head::number("Pressure (bar)"), Head::number("Enthalpy (kJ/kg)")],
            rows: legs
                .points
                .iter()
                .map(|p| vec![p.name.to_owned(), written(p.pressure_pa / 1e5, 4), written(p.enthalpy_j_kg / 1e3, 4)])
                .collect(),
        }],
        wide: chart(&x, &y, &marks, Size::Wide),
        narrow: chart(&x, &y, &marks, Size::Narrow),
    }
}

/// The extraction curve of a step with a solubility; `None` where its state is outside the solubility's range.
#[must_use]
pub fn extraction(key: &str, route: &str, dense: &DenseCo2) -> Option<Picture> {
    let study = dense.study.as_ref()?;
    let needed = study.at(dense.temperature_k, dense.pressure_pa).ok()?;
    let far = 1.6 * needed.solvent_kg_kg;
    let points = study.curve(needed.loading_kg_kg, far, 60).ok()?;
    let (start, wanted) = (study.target.solute_kg_kg, study.target.recovery * study.target.solute_kg_kg);
    // The least that solubility allows, up to all there is.
    let full = start / needed.loading_kg_kg;
    let least = vec![(0.0, 0.0), if full < far { (full, start) } else { (far, far * needed.loading_kg_kg) }];
    let rows =
        points.iter().step_by(6).map(|(q, e)| vec![written(*q, 3), written(100.0 * e / start, 3)]).collect();
    let share = |points: Vec<(f64, f64)>| points.into_iter().map(|(q, e)| (q, 100.0 * e / start)).collect();
    let marks = [
        curve(share(least), "level"),
        curve(share(points), "saturation"),
        Mark {
            points: share(vec![(needed.solvent_kg_kg, wanted)]),
            class: "mark",
            name: format!("{}\u{a0}kg", written(needed.solvent_kg_kg, 3)),
        },
    ];
    let x = Axis { title: "CO₂ for each kg of solid (kg)", ends: (0.0, far), decades: false };
    let y = Axis { title: "out of the solid (%)", ends: (0.0, 105.0), decades: false };
    Some(Picture {
        key: key.to_owned(),
        title: format!(
            "{route}: {}\u{202f}% take {}\u{a0}kg of CO₂ for each kilogram of solid",
            written(100.0 * study.target.recovery, 3),
            written(needed.solvent_kg_kg, 3)
        ),
        description: format!("The CO₂ holds {}\u{a0}g in a kilogram where it is saturated.", written(1e3 * needed.loading_kg_kg, 3)),
        notes: vec!["The thin line is CO₂ saturated to the end, the least that solubility allows; the thick one the plan's curve.".to_owned()],
        tables: vec![Table {
            caption: "Extraction curve".into(),
            head: vec![Head::number("CO₂ for each kg of solid (kg)"), Head::number("Out of the solid (%)")],
            rows,
        }],
        wide: chart(&x, &y, &marks, Size::Wide),
        narrow: chart(&x, &y, &marks, Size::Narrow),
    })
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::picture::Shape;
    use thimbleworth::account::account_text;
    use thimbleworth::example::example;

    fn dense(text: &str) -> DenseCo2 {
        let account = account_text(text);
        account.workloads[0].routes.iter().flatten().find_map(|r| r.dense.first()).unwrap().1.clone()
    }

    #[test]
    fn every_state_of_the_circuit_stands_in_the_frame() {
        for key in ["botanical-pilot", "harbour-sediment", "garment-cleaning", "textile-dyeing"] {
            let dense = dense(example(key).unwrap().text);
            let picture = circuit("k", "A", &dense);
            for drawing in [&picture.wide, &picture.narrow] {
                let mut marks = 0;
                for shape in &drawing.shapes {
                    let Shape::Path { d, class: "mark", .. } = shape else { continue };
                    let (x, y) = d.as_str()[1..].split_once('A').unwrap().0.split_once(' ').unwrap();
                    let (x, y): (f64, f64) = (x.parse().unwrap(), y.parse().unwrap());
                    assert!(
                        (30.0..drawing.width).contains(&x) && (20.0..drawing.height - 40.0).contains(&y),
                        "{key} {x} {y}"
                    );
                    marks += 1;
                }
                assert_eq!(marks, dense.legs.points.len(), "{key}");
            }
        }
    }

    #[test]
    fn a_curve_is_drawn_where_a_solubility_is_stated() {
        let text = example("botanical-pilot").unwrap().text;
        assert!(extraction("k", "A", &dense(text)).is_none());
        let oil = text.replace(
            "\"in_marc\": \"0.01 g/g\",",
            "\"in_marc\": \"0.01 g/g\", \"solubility\": \"vegetable oil\", \"sought\": \"hop resin and oil\",",
        );
        let picture = extraction("k", "A", &dense(&oil)).unwrap();
        assert!(
            picture.title.contains("94\u{202f}%") && picture.tables[0].rows.len() == 11,
            "{}",
            picture.title
        );
    }
}
