//! Text without a document to measure it in: how wide it is about, where to break it, and numbers as the page writes them.

use thimbleworth::quantity::significant;

/// Widths in thousandths of the type size, from space to tilde. They are those of a wide sans serif (DejaVu Sans, from
/// memory), so that narrower faces leave room rather than run over.
const WIDTHS: [u16; 95] = [
    318, 401, 460, 838, 636, 950, 780, 275, 390, 390, 500, 838, 318, 361, 318, 337, // space to /
    636, 636, 636, 636, 636, 636, 636, 636, 636, 636, 337, 337, 838, 838, 838, 531, // 0 to ?
    1000, 684, 686, 698, 770, 632, 575, 775, 752, 295, 295, 656, 557, 863, 748, 787, // @ to O
    603, 787, 695, 635, 611, 732, 684, 989, 685, 611, 685, 390, 337, 390, 838, 500, // P to _
    500, 613, 635, 550, 635, 615, 352, 635, 634, 278, 278, 579, 278, 974, 634, 612, // ` to o
    635, 635, 411, 521, 392, 634, 592, 818, 592, 592, 525, 636, 337, 636, 838, // p to ~
];

/// About how wide a text is at a type size.
#[must_use]
pub fn text_width(text: &str, size: f64) -> f64 {
    text.chars().map(|c| f64::from(glyph(c))).sum::<f64>() * size / 1000.0 + 0.0
}

/// About how wide a text of a class is: some are set in bold.
pub(super) fn class_width(text: &str, size: f64, class: &str) -> f64 {
    let bold = class.split(' ').any(|c| matches!(c, "name" | "label"));
    text_width(text, size) * if bold { BOLD } else { 1.0 }
}

/// How much wider bold text is, at most (digits: 696 to 636, from memory).
pub(super) const BOLD: f64 = 1.12;

fn glyph(c: char) -> u16 {
    let code = c as usize;
    match c {
        ' '..='~' => WIDTHS.get(code - 32).copied().unwrap_or(700),
        '\u{202f}' | '\u{2009}' => 200,
        '\u{a0}' => 318,
        // combining marks and joiners
        '\u{300}'..='\u{36f}' | '\u{200b}'..='\u{200f}' | '\u{fe00}'..='\u{fe0f}' => 0,
        '⁰'..='₟' | '²' | '³' | '¹' => 420,
        '−' | '→' | '←' | '×' => 838,
        '…' | '—' => 1000,
        '–' | '·' | '“' | '”' | '‘' | '’' => 520,
        // Latin with marks, Greek, Cyrillic
        '\u{a1}'..='\u{52f}' => 800,
        '\u{1f000}'.. => 1400,
        _ => 1050,
    }
}

/// The text, or as much of its beginning as fits with an ellipsis.
#[must_use]
pub(super) fn fit(text: &str, width: f64, size: f64) -> String {
    if text_width(text, size) <= width {
        return text.to_owned();
    }
    let mut kept = String::new();
    let mut used = text_width("…", size);
    for c in text.chars() {
        used += f64::from(glyph(c)) * size / 1000.0;
        if used > width {
            break;
        }
        kept.push(c);
    }
    let kept = kept.trim_end_matches([' ', ',', ';', '(']);
    // Not even one letter: the ellipsis alone, where that fits.
    if text_width("…", size) > width { String::new() } else { format!("{kept}…") }
}

/// The text in at most so many lines, broken at spaces (inside a word only where the word is wider than a line); what does
/// not fit in the last line gives way to an ellipsis.
#[must_use]
pub(super) fn wrap(text: &str, width: f64, size: f64, most: usize) -> Vec<String> {
    let mut lines: Vec<String> = Vec::new();
    let mut line = String::new();
    let mut words = text.split_whitespace().peekable();
    while let Some(word) = words.next() {
        let longer = if line.is_empty() { word.to_owned() } else { format!("{line} {word}") };
        if text_width(&longer, size) <= width {
            line = longer;
            continue;
        }
        if lines.len() + 1 >= most {
            let rest: Vec<&str> = std::iter::once(word).chain(words.by_ref()).collect();
            let all = if line.is_empty() { rest.join(" ") } else { format!("{line} {}", rest.join(" ")) };
            lines.push(fit(&all, width, size));
            return lines;
        }
        if !line.is_empty() {
            lines.push(std::mem::take(&mut line));
        }
        // A word wider than a line is cut where the line ends.
        for c in word.chars() {
            let next = format!("{line}{c}");
            if text_width(&next, size) > width && !line.is_empty() && lines.len() + 1 < most {
                lines.push(std::mem::take(&mut line));
                line.push(c);
            } else {
                line = next;
            }
        }
        line = fit(&line, width, size);
    }
    if !line.is_empty() || lines.is_empty() {
        lines.push(line);
    }
    lines
}

/// A number as the page writes it: so many significant digits, a true minus sign, and narrow spaces between groups of three
/// from five digits on.
#[must_use]
pub(super) fn written(value: f64, digits: u32) -> String {
    let text = significant(value, digits);
    let (sign, size) = text.strip_prefix('-').map_or(("", text.as_str()), |rest| ("−", rest));
    let whole = size.bytes().take_while(u8::is_ascii_digit).count();
    let (head, tail) = size.split_at(whole);
    let mut grouped = String::new();
    for (i, c) in head.chars().enumerate() {
        if whole > 4 && i > 0 && (whole - i).is_multiple_of(3) {
            grouped.push('\u{202f}');
        }
        grouped.push(c);
    }
    format!("{sign}{grouped}{tail}")
}

/// A change with its sign: "+12 %", "−98 %".
#[must_use]
pub(super) fn signed_percent(share: f64) -> String {
    // Two digits, and as many as a whole number of per cent has.
    let percent = share * 100.0;
    let digits = if percent.abs() >= 99.5 { 3 } else { 2 };
    let plus = if percent > 0.0 { "+" } else { "" };
    format!("{plus}{}\u{202f}%", written(percent, digits))
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn widths_add_up_and_scale() {
        assert_eq!(text_width("", 13.0), 0.0);
        assert!((text_width("0000", 10.0) - 4.0 * 6.36).abs() < 1e-12);
        assert!(text_width("iii", 13.0) < text_width("mmm", 13.0));
        assert!((text_width("hood", 26.0) - 2.0 * text_width("hood", 13.0)).abs() < 1e-12);
    }

    #[test]
    fn a_text_that_fits_stays_and_a_longer_one_fits_with_an_ellipsis() {
        assert_eq!(fit("hood", 100.0, 13.0), "hood");
        for width in 0..200 {
            let width = f64::from(width);
            let cut = fit("a very long name of a waste stream, with <b>markup</b> and more", width, 13.0);
            assert!(text_width(&cut, 13.0) <= width);
        }
        assert_eq!(fit("hood", 1.0, 13.0), "");
    }

    #[test]
    fn lines_hold_the_width_and_every_word() {
        assert_eq!(wrap("hood", 80.0, 12.0, 2), ["hood"]);
        assert_eq!(wrap("", 80.0, 12.0, 2), [""]);
        let text = "halogenated solvents of the second floor";
        assert_eq!(wrap(text, 150.0, 12.0, 9).join(" "), text);
        for text in
            [text, "Donaudampfschifffahrtsgesellschaftskapitän", "a Donaudampfschifffahrtsgesellschaft b"]
        {
            for most in 1..4 {
                let lines = wrap(text, 70.0, 12.0, most);
                assert!(
                    lines.len() <= most && lines.iter().all(|l| text_width(l, 12.0) <= 70.0),
                    "{lines:?}"
                );
            }
        }
    }

    #[test]
    fn numbers_as_the_page_writes_them() {
        for (value, text) in [
            (0.0, "0"),
            (1e-12, "1×10⁻¹²"),
            (1e9, "1\u{202f}000\u{202f}000\u{202f}000"),
            (1234.0, "1230"),
            (-12_345.0, "−12\u{202f}300"),
            (0.001_234_5, "0.00123"),
        ] {
            assert_eq!(written(value, 3), text);
        }
        assert_eq!(signed_percent(-0.9812), "−98\u{202f}%");
        assert_eq!(signed_percent(-1.0), "−100\u{202f}%");
        assert_eq!(signed_percent(0.034), "+3.4\u{202f}%");
        assert_eq!(signed_percent(12.34), "+1230\u{202f}%");
        assert_eq!(signed_percent(0.0), "0\u{202f}%");
    }
}
