//! What each solvent's books say was used, and what explains it: two bars from zero a solvent and quarter, one above the other.

use super::books::{mass, mass_unit, mass_with_unit};
use super::letter::{fit, text_width};
use super::scale::Linear;
use super::shape::{Anchor, Hatch, Shape, line, text};
use super::{Drawing, Head, Picture, Size, Table};
use thimbleworth::report::{DataCell, DataTable};

/// The most rows that are drawn; all of them stand in the table of the reconciliation.
const MOST: usize = 12;

/// One solvent in one period; kg.
struct Row {
    name: String,
    /// Whether it is over several quarters.
    whole: bool,
    /// `None` where a register of it was not read.
    used: Option<f64>,
    /// Consigned or reclaimed, air, other ways: what explains it.
    parts: [f64; 3],
    /// Whether consignments were read.
    consigned: bool,
    /// `None` where a register is missing.
    unexplained: Option<f64>,
    expanded: f64,
    verdict: String,
}

const NOT_RECORDED: &str = "not recorded";

const CLASSES: [(&str, Hatch); 3] =
    [("fill-waste", Hatch::No), ("fill-air", Hatch::Lines), ("fill-other", Hatch::Dots)];

impl Row {
    fn of(table: &DataTable, cells: &[DataCell]) -> Self {
        let cell = |key: &str| cells.get(table.head.iter().position(|[k, _]| *k == key)?);
        let known = |key| if let Some(DataCell::Number(kg)) = cell(key) { Some(*kg) } else { None };
        let kg = |key| known(key).unwrap_or(0.0);
        let word = |key| cell(key).map(DataCell::shown).unwrap_or_default();
        let air = kg("posted_air_kg");
        Self {
            name: [word("material"), word("when")].join(", "),
            whole: word("when").contains(" to "),
            used: known("used_kg"),
            consigned: known("consigned_kg").is_some(),
            parts: [kg("consigned_kg") + kg("reclaimed_kg"), air, kg("posted_lost_kg") - air],
            unexplained: known("unexplained_kg"),
            expanded: kg("unexplained_expanded_kg"),
            verdict: word("verdict"),
        }
    }

    fn explained(&self) -> bool {
        self.unexplained.is_some_and(|kg| kg.abs() <= self.expanded)
    }

    /// What was used beyond all that explains it. More explained than used is no loss: a record is missing or wrong.
    fn lost(&self) -> f64 {
        self.unexplained.filter(|kg| *kg > self.expanded).unwrap_or(0.0)
    }

    fn largest(&self) -> f64 {
        let parts = self.parts.iter().fold(self.expanded, |sum, kg| if *kg > 0.0 { sum + kg } else { sum });
        let used = self.used.unwrap_or(0.0);
        if parts > used { parts } else { used }
    }
}

/// The reconciliation as bars; `None` where there is nothing in it. Quarters where they fit, the whole time otherwise.
#[must_use]
pub fn reconciled(key: &str, table: &DataTable) -> Option<Picture> {
    let mut rows: Vec<Row> = table.rows.iter().map(|cells| Row::of(table, cells)).collect();
    let quarters = rows.iter().filter(|r| !r.whole).count();
    if quarters <= MOST || quarters == rows.len() {
        rows.truncate(quarters);
    } else {
        rows.drain(..quarters);
    }
    rows.truncate(MOST);
    let most = rows.iter().map(Row::largest).fold(0.0, |a, b| if b > a { b } else { a });
    if most <= 0.0 {
        return None;
    }
    let unit = mass_unit(most);
    let explained = rows.iter().filter(|r| r.explained()).count();
    let title = title(&rows, unit);
    let numbers = |r: &Row| {
        let [gone, air, other] = r.parts;
        let gone = Some(gone).filter(|_| r.consigned);
        let expanded = r.unexplained.map(|_| r.expanded);
        [r.used, gone, Some(air), Some(other), r.unexplained, expanded]
            .map(|kg| kg.map_or_else(|| NOT_RECORDED.to_owned(), |kg| mass(kg, unit)))
    };
    let heads = ["Used", "Consigned or reclaimed", "Air", "Other ways", "Unexplained", "±"].map(Head::number);
    let draw = |size| drawing(&rows, most, unit, size);
    Some(Picture {
        key: key.to_owned(),
        title,
        description: format!("Of {} solvents and quarters, {explained} are explained.", rows.len()),
        notes: vec!["The upper bar is what was used; below it what explains it: plain is consigned or reclaimed, slanting lines are what the plan posts to air, dots are drain, product and other ways; an empty frame is not explained, the thin line its uncertainty (k = 2).".to_owned()],
        tables: vec![Table {
            caption: format!("Used and explained, {}", unit.0),
            head: std::iter::once(Head::words("Solvent")).chain(heads).collect(),
            rows: rows.iter().map(|r| std::iter::once(r.name.clone()).chain(numbers(r)).collect()).collect(),
        }],
        wide: draw(Size::Wide),
        narrow: draw(Size::Narrow),
    })
}

/// The largest loss; without one, what the records leave open.
fn title(rows: &[Row], unit: (&'static str, f64)) -> String {
    let worst = rows.iter().filter(|r| r.lost() > 0.0).max_by(|a, b| a.lost().total_cmp(&b.lost()));
    let open = rows.iter().find(|r| r.unexplained.is_none());
    if let Some(w) = worst {
        [&mass_with_unit(w.lost(), unit), " of ", &w.name, " cannot be explained"].concat()
    } else if let Some(open) = open {
        ["What is unexplained cannot be said; ", &open.verdict].concat()
    } else if let Some(more) = rows.iter().find(|r| !r.explained()) {
        ["No loss is found, but the records of ", &more.name, " lack some of what came"].concat()
    } else {
        "All that was used is explained within its uncertainty".to_owned()
    }
}

fn drawing(rows: &[Row], most: f64, unit: (&'static str, f64), size: Size) -> Drawing {
    let (width, type_size) = (size.width(), size.text());
    let x = Linear::new((0.0, most), (1.0, width - 2.0));
    let mut shapes = Vec::new();
    let mut y = 0.0;
    for row in rows {
        let said = row.unexplained.map_or_else(
            || NOT_RECORDED.to_owned(),
            |kg| format!("{} ± {}", mass(kg, unit), mass_with_unit(row.expanded, unit)),
        );
        let room = width - text_width(&said, type_size) - 14.0;
        shapes.push(text((0.0, y + 14.0), Anchor::Start, type_size, "", fit(&row.name, room, type_size)));
        shapes.push(text((width - 2.0, y + 14.0), Anchor::End, type_size, "amount", said));
        let mut bar = |from: f64, kg: f64, top: f64, class, hatch| {
            if kg > 0.0 {
                let (x, width) = (x.at(from), x.length(kg));
                shapes.push(Shape::Rect { x, y: top, width, height: 10.0, class, hatch });
            }
        };
        bar(0.0, row.used.unwrap_or(0.0), y + 20.0, "fill-kept", Hatch::No);
        let mut from = 0.0;
        for (kg, (class, hatch)) in row.parts.into_iter().zip(CLASSES) {
            bar(from, kg, y + 32.0, class, hatch);
            from += if kg > 0.0 { kg } else { 0.0 };
        }
        if let Some(kg) = row.unexplained {
            bar(from, kg, y + 32.0, "open", Hatch::No);
            let low = if row.expanded < from { from - row.expanded } else { 0.0 };
            let middle = y + 37.0;
            shapes.push(line((x.at(low), middle), (x.at(from + row.expanded), middle), "axis"));
        }
        y += 52.0;
    }
    shapes.push(line((1.0, 18.0), (1.0, y - 8.0), "axis"));
    Drawing { width, height: y, shapes }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn row(used: f64, parts: [f64; 3], expanded: f64) -> Row {
        Row {
            name: "acetone, 2026 Q1".into(),
            whole: false,
            used: Some(used),
            parts,
            consigned: true,
            unexplained: Some(used - parts.iter().sum::<f64>()),
            expanded,
            verdict: String::new(),
        }
    }

    #[test]
    fn bars_are_as_long_as_their_masses() {
        for size in [Size::Wide, Size::Narrow] {
            let drawing = drawing(&[row(100.0, [50.0, 25.0, 0.0], 5.0)], 100.0, ("kg", 1.0), size);
            let widths: Vec<f64> = drawing
                .shapes
                .iter()
                .filter_map(|s| if let Shape::Rect { width, .. } = s { Some(*width) } else { None })
                .collect();
            let shares: Vec<f64> = widths.iter().map(|w| w / widths[0]).collect();
            assert_eq!(shares, [1.0, 0.5, 0.25, 0.25], "used, consigned, air, not explained");
        }
    }

    #[test]
    fn the_headline_is_a_loss_or_what_the_records_leave_open() {
        let (loss, more) = (row(100.0, [50.0, 0.0, 0.0], 5.0), row(10.0, [754.0, 0.0, 0.0], 5.0));
        let mut open = row(0.0, [754.0, 0.0, 0.0], 0.0);
        (open.used, open.unexplained) = (None, None);
        open.verdict = "not recorded: purchases".into();
        let said = |rows: &[Row]| title(rows, ("kg", 1.0));
        assert_eq!(said(&[more, loss]), "50\u{a0}kg of acetone, 2026 Q1 cannot be explained");
        assert_eq!(said(&[open]), "What is unexplained cannot be said; not recorded: purchases");
        let more = said(&[row(10.0, [754.0, 0.0, 0.0], 5.0)]);
        assert_eq!(more, "No loss is found, but the records of acetone, 2026 Q1 lack some of what came");
    }

    #[test]
    fn what_is_explained_more_than_once_has_no_frame() {
        let drawing = drawing(&[row(10.0, [12.0, 0.0, 0.0], 1.0)], 13.0, ("kg", 1.0), Size::Wide);
        assert!(!drawing.shapes.iter().any(|s| matches!(s, Shape::Rect { class: "open", .. })));
    }
}
