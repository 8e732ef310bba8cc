//! Small and capital letters of the alphabets in which people here name things: Latin with its accents, Greek, Cyrillic.
//!
//! The standard library knows every script, in tables that are larger than the rest of a small room. What stands here
//! for a letter is what Unicode says; letters of other scripts stay as they are.

/// The small letter of a capital one; every other character as it is.
///
/// ```
/// use thimbleworth::letter::small;
/// assert_eq!("ÉTHER Ω 7".chars().map(small).collect::<String>(), "éther ω 7");
/// ```
#[must_use]
pub const fn small(c: char) -> char {
    let apart: i32 = match c {
        'A'..='Z' | 'À'..='Ö' | 'Ø'..='Þ' | 'Α'..='Ρ' | 'Σ'..='Ϋ' | 'А'..='Я' => 32,
        'Ѐ'..='Џ' => 80,
        'Ā'..='Į' | 'Ĳ'..='Ķ' | 'Ŋ'..='Ŷ' if (c as u32).is_multiple_of(2) => 1,
        'Ĺ'..='Ň' | 'Ź'..='Ž' if c as u32 % 2 == 1 => 1,
        _ => 0,
    };
    moved(c, apart)
}

/// The capital letter of a small one; every other character as it is.
///
/// ```
/// use thimbleworth::letter::capital;
/// assert_eq!("éther ω 7".chars().map(capital).collect::<String>(), "ÉTHER Ω 7");
/// ```
#[must_use]
pub const fn capital(c: char) -> char {
    let apart: i32 = match c {
        'a'..='z' | 'à'..='ö' | 'ø'..='þ' | 'α'..='ρ' | 'σ'..='ϋ' | 'а'..='я' => -32,
        'ѐ'..='џ' => -80,
        'ā'..='į' | 'ĳ'..='ķ' | 'ŋ'..='ŷ' if c as u32 % 2 == 1 && c != 'ı' => -1,
        'ĺ'..='ň' | 'ź'..='ž' if (c as u32).is_multiple_of(2) => -1,
        _ => 0,
    };
    moved(c, apart)
}

/// Whether this is a letter: an ASCII one, or anything beyond ASCII that is no space, mark or sign of Latin-1.
///
/// ```
/// use thimbleworth::letter::is_letter;
/// assert_eq!("ä Ω-7 µ≥溶".chars().filter(|c| is_letter(*c)).collect::<String>(), "äΩµ溶");
/// ```
#[must_use]
pub const fn is_letter(c: char) -> bool {
    match c {
        'µ' | 'ª' | 'º' => true,
        // Signs of Latin-1, punctuation and mathematical signs, spaces and marks of East Asian scripts.
        '\u{80}'..='\u{bf}'
        | '×'
        | '÷'
        | '\u{2000}'..='\u{2bff}'
        | '\u{3000}'..='\u{303f}'
        | '\u{fe00}'..='\u{feff}' => false,
        _ => c.is_ascii_alphabetic() || c as u32 >= 0xc0,
    }
}

/// The text in small letters.
#[must_use]
pub fn small_text(text: &str) -> String {
    text.chars().map(small).collect()
}

/// The text with a capital first letter, as a sentence begins; in the name of a compound the capital goes behind
/// what says where its parts sit.
///
/// ```
/// use thimbleworth::letter::sentence;
/// assert_eq!(sentence("by-product"), "By-product");
/// assert_eq!(sentence("n-hexane bought"), "n-Hexane bought");
/// assert_eq!(sentence("1,4-dioxane"), "1,4-Dioxane");
/// ```
#[must_use]
pub fn sentence(text: &str) -> String {
    let behind = text.split_once('-').filter(|(before, _)| {
        matches!(*before, "n" | "o" | "m" | "p" | "sec" | "tert")
            || before.contains(',') && before.bytes().all(|b| b.is_ascii_digit() || b == b',')
    });
    let first = behind.map_or(0, |(before, _)| before.len() + 1);
    text.char_indices().map(|(place, c)| if place == first { capital(c) } else { c }).collect()
}

const fn moved(c: char, apart: i32) -> char {
    match char::from_u32((c as u32).wrapping_add_signed(apart)) {
        Some(other) => other,
        None => c,
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    /// Latin with its accents, Greek without accents, Cyrillic.
    fn covered() -> impl Iterator<Item = char> {
        ('\0'..='\u{17e}')
            .chain('\u{391}'..='\u{3a9}')
            .chain('\u{3b1}'..='\u{3c9}')
            .chain('\u{400}'..='\u{45f}')
    }

    // Witness: the Unicode tables of the standard library.
    #[test]
    fn letters_are_those_of_unicode() {
        // Written as two letters, or beside the alphabets: İ, ß, ŉ, ı, µ, ſ, Ÿ and ÿ, the final sigma.
        let odd = ['İ', 'ß', 'ŉ', 'ı', 'µ', 'Ÿ', 'ÿ', 'ς', 'ĸ'];
        for c in covered().filter(|c| !odd.contains(c)) {
            assert_eq!(small(c).to_string(), c.to_lowercase().to_string(), "{c}");
            assert_eq!(capital(c).to_string(), c.to_uppercase().to_string(), "{c}");
        }
        for c in odd.into_iter().chain(['中', '₂', '🧪', '×', '÷']) {
            assert_eq!((small(c), capital(c)), (c, c), "{c}");
        }
    }

    #[test]
    fn sentences_begin_with_a_capital() {
        assert_eq!(sentence("étuve at 40 °C"), "Étuve at 40 °C");
        assert_eq!((sentence(""), small_text("n-HEXANE")), (String::new(), "n-hexane".to_owned()));
    }
}
