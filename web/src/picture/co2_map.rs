//! Carbon dioxide's density over pressure and temperature, with the states at which a workload's routes use it.
//!
//! At one temperature the density rises with the pressure, so a line of equal density is the pressure p(T, ρ): the equation of
//! state gives it without a search, and the steps of the map are what lies between two such lines. Where liquid and vapour
//! exist side by side, the lines run together on the saturation line.

use super::books::few;
use super::co2_lines::{Frame, LEVELS_KG_M3, Lines, inside};
use super::label::{Area, Taken};
use super::letter::{class_width, text_width, written};
use super::scale::{Linear, ticks};
use super::shape::{Anchor, Hatch, Shape, Trail, line, text};
use super::{Drawing, Head, Picture, Size, Table};
use thimbleworth::account::{Account, RouteAccount};
use thimbleworth::co2::{
    CRITICAL_DENSITY_KG_M3, CRITICAL_PRESSURE_PA, CRITICAL_TEMPERATURE_K, density_kg_m3,
    saturation_pressure_pa,
};
use thimbleworth::ledger::StepIx;

/// What happens at a state.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Use {
    Extraction,
    Metering,
    LetDown,
}

impl Use {
    const fn words(self) -> &'static str {
        match self {
            Self::Extraction => "extraction",
            Self::Metering => "metering",
            Self::LetDown => "let-down",
        }
    }

    /// The symbols under which a step notes temperature, pressure and density.
    const fn symbols(self) -> [&'static str; 3] {
        match self {
            Self::Extraction => ["T", "p", "ρ"],
            Self::Metering => ["T_m", "p_m", "ρ_m"],
            Self::LetDown => ["T_l", "p_l", "ρ_l"],
        }
    }
}

/// A state at which CO2 is used, by one or several steps.
#[derive(Clone, Debug, PartialEq)]
pub(super) struct Point {
    pub(super) of: Use,
    pub(super) temperature_k: f64,
    pub(super) pressure_pa: f64,
    pub(super) density_kg_m3: f64,
    /// Route and step, for each that uses it.
    pub(super) by: Vec<String>,
}

/// The map of a workload; `None` where no route with an account uses CO2 at a stated state.
#[must_use]
pub fn co2_map(key: &str, account: &Account, workload: usize) -> Option<Picture> {
    let work = account.program.as_ref()?.workloads.get(workload)?;
    let accounts = &account.workloads.get(workload)?.routes;
    let mut points: Vec<Point> = Vec::new();
    for (route, account) in work.routes.iter().zip(accounts) {
        let Some(account) = account else { continue };
        for (i, step) in route.steps.iter().enumerate() {
            if step.step.co2_states() == 0 {
                continue;
            }
            let ix = StepIx::Step(u16::try_from(i).unwrap_or(u16::MAX));
            for of in [Use::Extraction, Use::Metering, Use::LetDown] {
                let Some([t, p, rho]) = state(account, ix, of) else { continue };
                let by = format!("{}, step {}", route.name, i + 1);
                let same = |q: &&mut Point| q.of == of && q.temperature_k == t && q.pressure_pa == p;
                match points.iter_mut().find(same) {
                    Some(point) => point.by.push(by),
                    None => points.push(Point {
                        of,
                        temperature_k: t,
                        pressure_pa: p,
                        density_kg_m3: rho,
                        by: vec![by],
                    }),
                }
            }
        }
    }
    picture(key, &points)
}

fn state(account: &RouteAccount, step: StepIx, of: Use) -> Option<[f64; 3]> {
    let [t, p, rho] = of.symbols().map(|symbol| {
        account.trace.notes.iter().find(|n| n.step == step && n.symbol == symbol).map(|n| n.value_si)
    });
    Some([t?, p?, rho?]).filter(|state| state.iter().all(|v| v.is_finite()))
}

fn celsius(point: &Point) -> f64 {
    point.temperature_k - 273.15
}

fn bar(point: &Point) -> f64 {
    point.pressure_pa / 1e5
}

impl Frame {
    /// The smallest of a few frames that holds as many points as any: nothing is solid in any of them.
    fn around(points: &[Point]) -> Self {
        let most = |value: fn(&Point) -> f64, steps: &[f64]| {
            let within = |step: f64| points.iter().filter(|p| value(p) <= step).count();
            let largest = steps.last().copied().unwrap_or_default();
            steps.iter().copied().find(|s| within(*s) == within(largest)).unwrap_or(largest)
        };
        Self {
            low_c: -most(|p| -celsius(p), &[20.0, 30.0]),
            high_c: most(celsius, &[100.0, 160.0, 220.0]),
            high_bar: most(bar, &[400.0, 700.0, 1000.0]),
        }
    }

    fn holds(&self, point: &Point) -> bool {
        (self.low_c..=self.high_c).contains(&celsius(point)) && bar(point) <= self.high_bar
    }
}
const STEPS: [&str; 12] = [
    "step step-0",
    "step step-1",
    "step step-2",
    "step step-3",
    "step step-4",
    "step step-5",
    "step step-6",
    "step step-7",
    "step step-8",
    "step step-9",
    "step step-10",
    "step step-11",
];

pub(super) fn picture(key: &str, points: &[Point]) -> Option<Picture> {
    let first = points.iter().find(|p| p.of == Use::Extraction).or(points.first())?;
    let frame = Frame::around(points);
    let title =
        format!("CO₂ at {}: {} kg/m³ at {}", first.of.words(), density(first.density_kg_m3), place(first));
    let each: Vec<String> = points
        .iter()
        .map(|p| format!("{} at {} with {}\u{a0}kg/m³", p.of.words(), place(p), density(p.density_kg_m3)))
        .collect();
    let description = format!("States at which CO₂ is used: {}.", few(&each));
    let outside: Vec<String> = points
        .iter()
        .enumerate()
        .filter(|(_, p)| !frame.holds(p))
        .map(|(i, p)| format!("{} ({} at {})", i + 1, p.of.words(), place(p)))
        .collect();
    let mut notes = vec![
        "Thin lines join states of equal density, in kg/m³, and darker is denser; they run together on the saturation line, where liquid and vapour exist side by side. Pressures are absolute. Density by the equation of state of Span and Wagner, 1996."
            .to_owned(),
    ];
    if !outside.is_empty() {
        notes.push(format!("Outside the frame, and not drawn: {}.", outside.join(", ")));
    }
    let lines = Lines::of(frame);
    Some(Picture {
        key: key.to_owned(),
        title,
        description,
        notes,
        tables: vec![points_table(points), density_table(frame)],
        wide: draw(points, frame, &lines, Size::Wide),
        narrow: draw(points, frame, &lines, Size::Narrow),
    })
}

fn density(kg_m3: f64) -> String {
    written(kg_m3, 3)
}

fn temperature(point: &Point) -> String {
    written((celsius(point) * 100.0).round() / 100.0, 4)
}

fn place(point: &Point) -> String {
    format!("{}\u{a0}°C and {}\u{a0}bar", temperature(point), written(bar(point), 4))
}

fn points_table(points: &[Point]) -> Table {
    let mut rows: Vec<Vec<String>> = points
        .iter()
        .enumerate()
        .map(|(i, p)| {
            vec![
                (i + 1).to_string(),
                p.of.words().to_owned(),
                temperature(p),
                written(bar(p), 4),
                density(p.density_kg_m3),
                p.by.join("; "),
            ]
        })
        .collect();
    rows.push(vec![
        "–".into(),
        "critical point".into(),
        written(CRITICAL_TEMPERATURE_K - 273.15, 3),
        written(CRITICAL_PRESSURE_PA / 1e5, 3),
        density(CRITICAL_DENSITY_KG_M3),
        String::new(),
    ]);
    Table {
        caption: "States at which CO₂ is used".into(),
        head: vec![
            Head::words("Mark"),
            Head::words("State"),
            Head::number("Temperature (°C)"),
            Head::number("Pressure (bar)"),
            Head::number("Density (kg/m³)"),
            Head::words("Where"),
        ],
        rows,
    }
}

fn density_table(frame: Frame) -> Table {
    let bars: Vec<f64> = ticks(0.0, frame.high_bar, 9).into_iter().filter(|b| *b > 0.0).collect();
    let mut head = vec![Head::words("Temperature (°C)")];
    head.extend(bars.iter().map(|b| Head::number(&format!("{} bar", written(*b, 4)))));
    let rows = ticks(frame.low_c, frame.high_c, 8)
        .into_iter()
        .map(|c| {
            let cell = |b: &f64| {
                density_kg_m3(c + 273.15, b * 1e5).map_or_else(|_| "two phases".to_owned(), density)
            };
            std::iter::once(written(c, 4)).chain(bars.iter().map(cell)).collect()
        })
        .collect();
    Table { caption: "Density of CO₂ (kg/m³) by temperature and pressure".into(), head, rows }
}
struct Axes {
    x: Linear,
    y: Linear,
    area: Area,
}

impl Axes {
    fn new(frame: Frame, size: Size, height: f64) -> Self {
        let (left, right, top, bottom) = if size.narrow() {
            (34.0, size.width() - 18.0, 22.0, height - 40.0)
        } else {
            (46.0, size.width() - 18.0, 24.0, height - 42.0)
        };
        Self {
            x: Linear::new((0.0, frame.high_bar), (left, right)),
            y: Linear::new((frame.low_c, frame.high_c), (bottom, top)),
            area: Area { left, top, right, bottom },
        }
    }

    fn at(&self, bar: f64, c: f64) -> (f64, f64) {
        (self.x.at(bar), self.y.at(c))
    }
}

fn draw(points: &[Point], frame: Frame, map: &Lines, size: Size) -> Drawing {
    let (width, type_size) = (size.width(), size.text());
    let height = if size.narrow() { 300.0 } else { 400.0 };
    let axes = Axes::new(frame, size, height);
    let Lines { rows_c, levels } = map;
    let mut shapes = steps(&axes, frame, rows_c, levels);
    let mut lines = Vec::new();
    for level in levels {
        let inside: Vec<_> = inside(rows_c, level, frame).into_iter().map(|(b, c)| axes.at(b, c)).collect();
        if inside.len() > 1 {
            shapes.push(Shape::Path { d: Trail::through(&inside), class: "level", hatch: Hatch::No });
        }
        lines.push(inside);
    }
    let saturation: Vec<(f64, f64)> = rows_c
        .iter()
        .filter_map(|c| Some(axes.at(saturation_pressure_pa(c + 273.15).ok()? / 1e5, *c)))
        .chain([axes.at(CRITICAL_PRESSURE_PA / 1e5, CRITICAL_TEMPERATURE_K - 273.15)])
        .collect();
    shapes.push(Shape::Path { d: Trail::through(&saturation), class: "saturation", hatch: Hatch::No });
    shapes.extend(scales(&axes, frame, size));

    let mut taken = Taken::new(axes.area);
    let critical = axes.at(CRITICAL_PRESSURE_PA / 1e5, CRITICAL_TEMPERATURE_K - 273.15);
    let drawn: Vec<(usize, &Point)> = points.iter().enumerate().filter(|(_, p)| frame.holds(p)).collect();
    for at in drawn.iter().map(|(_, p)| axes.at(bar(p), celsius(p))).chain([critical]) {
        taken.take(around(at, 7.0));
    }
    for (i, point) in &drawn {
        shapes.extend(point_shapes(*i, point, &axes, &mut taken, type_size, size));
    }
    shapes.push(Shape::Path {
        d: Trail::circle(critical.0, critical.1, 4.5),
        class: "open",
        hatch: Hatch::No,
    });
    shapes.extend(beside(critical, "critical point", "", type_size, &mut taken));
    let middle = saturation.get(saturation.len() / 3).copied();
    shapes.extend(middle.and_then(|at| beside(at, "saturation line", "", type_size, &mut taken)));
    for (name, b, c) in [("liquid", 0.6, 10.0), ("gas", 0.06, 70.0), ("supercritical", 0.45, 85.0)] {
        let (x, y) = axes.at(b * frame.high_bar, c);
        shapes.extend(beside((x - 7.0, y), name, "region", type_size, &mut taken));
    }
    for (line, density) in lines.iter().zip(LEVELS_KG_M3) {
        shapes.extend(level_label(line, density, &mut taken, type_size - 1.0));
    }
    Drawing { width, height, shapes }
}

/// What lies between two lines of equal density.
fn steps(axes: &Axes, frame: Frame, rows_c: &[f64], levels: &[Vec<(f64, bool)>]) -> Vec<Shape> {
    let cut = |bar: f64| if bar > frame.high_bar { frame.high_bar } else { bar };
    let edge = |i: Option<usize>, otherwise: f64| -> Vec<(f64, f64)> {
        let line = i.and_then(|i| levels.get(i));
        let bar = |j: usize| line.and_then(|l| l.get(j)).map_or(otherwise, |(bar, _)| cut(*bar));
        rows_c.iter().enumerate().map(|(j, c)| axes.at(bar(j), *c)).collect()
    };
    let mut shapes = Vec::new();
    for (i, class) in STEPS.into_iter().enumerate() {
        let low = edge(i.checked_sub(1), 0.0);
        let high = edge((i < levels.len()).then_some(i), frame.high_bar);
        if low.iter().zip(&high).all(|(a, b)| b.0 - a.0 < 0.05) {
            continue;
        }
        let around: Vec<(f64, f64)> = low.into_iter().chain(high.into_iter().rev()).collect();
        shapes.push(Shape::Path { d: Trail::through(&around).closed(), class, hatch: Hatch::No });
    }
    shapes
}

fn scales(axes: &Axes, frame: Frame, size: Size) -> Vec<Shape> {
    let (a, type_size) = (&axes.area, size.text());
    let mut shapes = vec![
        Shape::Rect {
            x: a.left,
            y: a.top,
            width: a.right - a.left,
            height: a.bottom - a.top,
            class: "frame",
            hatch: Hatch::No,
        },
        text((0.0, 12.0), Anchor::Start, type_size, "soft", "temperature (°C)"),
        text((a.right, a.bottom + 34.0), Anchor::End, type_size, "soft", "pressure (bar)"),
    ];
    for b in ticks(0.0, frame.high_bar, if size.narrow() { 5 } else { 9 }) {
        let x = axes.x.at(b);
        shapes.push(line((x, a.bottom), (x, a.bottom + 4.0), "axis"));
        shapes.push(text((x, a.bottom + 18.0), Anchor::Middle, type_size, "scale", written(b, 4)));
    }
    for c in ticks(frame.low_c, frame.high_c, 8) {
        let y = axes.y.at(c);
        shapes.push(line((a.left - 4.0, y), (a.left, y), "axis"));
        shapes.push(text(
            (a.left - 6.0, y + type_size * 0.35),
            Anchor::End,
            type_size,
            "scale",
            written(c, 4),
        ));
    }
    shapes
}

pub(super) fn around((x, y): (f64, f64), r: f64) -> Area {
    Area { left: x - r, top: y - r, right: x + r, bottom: y + r }
}

/// A text beside a point, wherever there is room.
pub(super) fn beside(
    (x, y): (f64, f64),
    words: &str,
    class: &'static str,
    size: f64,
    taken: &mut Taken,
) -> Option<Shape> {
    let (w, gap) = (class_width(words, size, class), 8.0);
    let area = |left: f64, middle: f64| Area {
        left: left - 1.0,
        top: middle - size * 0.6,
        right: left + w + 1.0,
        bottom: middle + size * 0.6,
    };
    let wanted = [
        area(x + gap, y),
        area(x - gap - w, y),
        area(x + 3.0, y - size),
        area(x + 3.0, y + size),
        area(x - 3.0 - w, y - size),
        area(x - 3.0 - w, y + size),
        area(x - w / 2.0, y - size - 2.0),
        area(x - w / 2.0, y + size + 2.0),
    ];
    let (_, place) = taken.first_free(wanted)?;
    let base = (place.top + place.bottom) / 2.0 + size * 0.35;
    Some(text((place.left + 1.0, base), Anchor::Start, size, class, words))
}

fn point_shapes(
    i: usize,
    point: &Point,
    axes: &Axes,
    taken: &mut Taken,
    type_size: f64,
    size: Size,
) -> Vec<Shape> {
    let (x, y) = axes.at(bar(point), celsius(point));
    let d = match point.of {
        Use::Extraction => Trail::circle(x, y, 5.5),
        Use::Metering => {
            Trail::through(&[(x - 5.0, y - 5.0), (x + 5.0, y - 5.0), (x + 5.0, y + 5.0), (x - 5.0, y + 5.0)])
                .closed()
        }
        Use::LetDown => Trail::through(&[(x - 6.0, y - 5.0), (x + 6.0, y - 5.0), (x, y + 6.0)]).closed(),
    };
    let mut shapes = vec![Shape::Path { d, class: "mark", hatch: Hatch::No }];
    let number = i + 1;
    let short = format!("{number} {}", point.of.words());
    let long = format!("{short}, {}\u{a0}kg/m³", density(point.density_kg_m3));
    let words = if size.narrow() { [short, number.to_string()] } else { [long, short] };
    let last = number.to_string();
    let label = words.iter().chain([&last]).find_map(|w| beside((x, y), w, "label", type_size, taken));
    shapes.extend(label);
    shapes
}

/// The density on its line, as far up the line as there is room.
fn level_label(line: &[(f64, f64)], density: f64, taken: &mut Taken, size: f64) -> Option<Shape> {
    let words = written(density, 4);
    let half = text_width(&words, size) / 2.0 + 1.0;
    let at = |(x, y): &(f64, f64)| Area {
        left: x - half,
        top: y - size * 0.6,
        right: x + half,
        bottom: y + size * 0.6,
    };
    let (_, area) = taken.first_free(line.iter().rev().skip(2).map(at))?;
    let middle = ((area.left + area.right) / 2.0, (area.top + area.bottom) / 2.0 + size * 0.35);
    Some(text(middle, Anchor::Middle, size, "scale on", words))
}

#[cfg(test)]
mod tests {
    use super::*;

    fn point(of: Use, c: f64, bar: f64) -> Point {
        let (temperature_k, pressure_pa) = (c + 273.15, bar * 1e5);
        let density_kg_m3 = density_kg_m3(temperature_k, pressure_pa).unwrap();
        Point { of, temperature_k, pressure_pa, density_kg_m3, by: vec!["A, step 1".into()] }
    }

    #[test]
    fn the_frame_grows_as_far_as_it_helps() {
        let small = Frame { low_c: -20.0, high_c: 100.0, high_bar: 400.0 };
        assert_eq!(Frame::around(&[]), small);
        assert_eq!(Frame::around(&[point(Use::Extraction, 80.0, 305.0)]), small);
        assert_eq!(Frame::around(&[point(Use::Extraction, 120.0, 900.0)]).high_bar, 1000.0);
        // Beyond every frame: it stays small, and the note says where the point is.
        let far = [point(Use::Extraction, 400.0, 3000.0)];
        assert_eq!(Frame::around(&far), small);
        let picture = picture("k", &far).unwrap();
        assert!(
            picture.notes[1].contains("1 (extraction at 400\u{a0}°C and 3000\u{a0}bar)"),
            "{}",
            picture.notes[1]
        );
        assert!(!picture.wide.shapes.iter().any(|s| matches!(s, Shape::Path { class: "mark", .. })));
    }

    #[test]
    fn points_on_one_spot_keep_their_labels_apart() {
        let points: Vec<Point> =
            (0..12).map(|i| point(Use::Metering, 4.0 + f64::from(i) * 0.2, 60.0)).collect();
        let drawing = draw(&points, Frame::around(&points), &Lines::of(Frame::around(&points)), Size::Wide);
        let marks = drawing.shapes.iter().filter(|s| matches!(s, Shape::Path { class: "mark", .. })).count();
        assert_eq!(marks, 12);
    }
}
