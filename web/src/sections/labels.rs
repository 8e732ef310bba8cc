//! Container labels at the size of the label that is in the printer, or of its place on a sheet.
use crate::browser;
use crate::picture::text_width;
use crate::show::unbroken;
use thimbleworth::account::{Account, SiteDesk};
use thimbleworth::hazard::label_size_mm;
use thimbleworth::report::{PaperKind, PaperTable, paper};
use yew::prelude::*;

/// One size of label; its page and its boxes stand in `web/style/labels.css` under its class.
#[derive(Clone, Copy)]
pub(super) struct Size {
    pub(super) word: &'static str,
    class: &'static str,
    /// Width and height of a label; mm.
    mm: [f64; 2],
}

pub(super) static SIZES: [Size; 7] = [
    Size { word: "4 × 6 in", class: "labels l46", mm: [101.6, 152.4] },
    Size { word: "4 × 4 in", class: "labels l44", mm: [101.6, 101.6] },
    Size { word: "A6", class: "labels la6", mm: [105.0, 148.0] },
    Size { word: "A5", class: "labels la5", mm: [148.0, 210.0] },
    Size { word: "105 × 74 mm", class: "labels l10", mm: [105.0, 74.0] },
    Size { word: "A4, four of 105 × 148 mm", class: "labels l4", mm: [105.0, 148.0] },
    Size { word: "A4, two of 210 × 148 mm", class: "labels l2", mm: [210.0, 148.0] },
];

/// Type sizes that are tried, the largest first; mm. Below 2 mm nobody reads a label.
const TYPE_MM: [(f64, &str); 6] =
    [(5.5, "t6"), (4.5, "t5"), (3.8, "t4"), (3.1, "t3"), (2.6, "t2"), (2.1, "t1")];
/// What the box keeps free around its text; mm.
const EDGE_MM: f64 = 4.0;

/// The largest type with which a label holds all of its text; `None` where it does not fit.
fn fitting(label: &PaperTable, [width, height]: [f64; 2]) -> Option<&'static str> {
    let (width, height) = (width - 2.0 * EDGE_MM, height - 2.0 * EDGE_MM);
    TYPE_MM
        .into_iter()
        .find(|(mm, _)| {
            let mut lines = 0.0;
            for text in
                std::iter::once(label.title.clone()).chain(label.rows.iter().map(|row| row.join(": ")))
            {
                // Set in bold at most; a line breaks before its last word.
                lines += (text_width(&text, *mm) * 1.2 / (width * 0.9)).ceil();
            }
            lines * mm * 1.3 <= height
        })
        .map(|(_, class)| class)
}

/// The labels, with the button that prints them; what does not fit is said and not printed.
pub(super) fn labels(account: &Account, desk: &SiteDesk<'_>, size: &Size) -> Option<Html> {
    let paper = paper(account, desk, PaperKind::Label)?;
    let streams = &account.program.as_ref()?.site.streams;
    let (mut drawn, mut said) = (Vec::new(), Vec::new());
    for (label, s) in paper.tables.iter().zip(&desk.streams) {
        let Some(class) = fitting(label, size.mm) else {
            said.push(
                [&label.title, ": the text does not fit on this size, and it is not printed."].concat(),
            );
            continue;
        };
        let least = streams.get(s.stream).and_then(|u| u.container_m3).map(label_size_mm);
        if let Some(([short, long], _)) = least {
            let (a, b) = (f64::from(short), f64::from(long));
            let [w, h] = size.mm;
            if !((w >= a && h >= b) || (w >= b && h >= a)) {
                said.push(
                    [
                        &label.title,
                        ": smaller than ",
                        &short.to_string(),
                        " × ",
                        &long.to_string(),
                        " mm, the least size of the Union for chemicals in it.",
                    ]
                    .concat(),
                );
            }
        }
        drawn.push(html! {
            <div class={classes!("label", class)}>
                <p><strong>{ unbroken(&label.title) }</strong></p>
                { for label.rows.iter().map(|row| html! {
                    <p>{ for row.iter().filter(|cell| !cell.is_empty()).enumerate().map(|(i, cell)| match (i, row.len() > 1 && !row[0].is_empty()) {
                        (0, true) => html! { <>{ cell }{ ": " }</> },
                        _ => html! { <strong>{ unbroken(cell) }</strong> },
                    }) }</p>
                }) }
            </div>
        });
    }
    Some(html! {
        <>
            <p class="tools"><button type="button" onclick={|_: MouseEvent| browser::print_labels()}>{ "Print the labels" }</button></p>
            { for said.into_iter().map(|line| html! { <p class="hint">{ line }</p> }) }
            <div class={size.class}>{ drawn }</div>
        </>
    })
}

#[cfg(test)]
mod tests {
    use super::*;
    use thimbleworth::account::{account_text, site_desk};
    use thimbleworth::example::EXAMPLES;

    #[test]
    fn type_shrinks_until_the_text_fits_or_says_that_it_does_not() {
        let label = |letters: usize| PaperTable {
            title: "waste, 20 L".into(),
            head: &["", ""],
            rows: vec![vec!["Contents".into(), "acetone ".repeat(letters / 8)]],
        };
        assert_eq!(fitting(&label(40), SIZES[0].mm), Some("t6"));
        assert_eq!(fitting(&label(40_000), SIZES[0].mm), None);
        // More text never gets larger type.
        let types: Vec<Option<&str>> = (1..40).map(|n| fitting(&label(n * 100), SIZES[1].mm)).collect();
        assert!(types.windows(2).all(|w| w[1] <= w[0]), "{types:?}");
        assert!(types.contains(&Some("t3")) && types.contains(&None));
    }

    #[test]
    fn the_labels_of_every_example_fit_on_the_common_sizes() {
        for example in EXAMPLES {
            let account = account_text(example.text);
            let Some(desk) = site_desk(&account, &[]) else { continue };
            let paper = paper(&account, &desk, PaperKind::Label).unwrap();
            for (label, _) in paper.tables.iter().zip(&desk.streams) {
                for size in SIZES.iter().filter(|s| s.mm[1] > 140.0) {
                    assert!(
                        fitting(label, size.mm).is_some(),
                        "{}: {} on {}",
                        example.title,
                        label.title,
                        size.word
                    );
                }
            }
        }
    }
}
