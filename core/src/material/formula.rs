//! Chemical formulas: which atoms, how many, what they weigh.
use std::fmt;

/// Abridged standard atomic weights, g/mol (IUPAC 2021, from memory), in the order of the atomic number.
const ATOMIC_WEIGHTS: [(&str, f64); 40] = [
    ("H", 1.008),
    ("He", 4.0026),
    ("Li", 6.94),
    ("Be", 9.0122),
    ("B", 10.81),
    ("C", 12.011),
    ("N", 14.007),
    ("O", 15.999),
    ("F", 18.998),
    ("Ne", 20.180),
    ("Na", 22.990),
    ("Mg", 24.305),
    ("Al", 26.982),
    ("Si", 28.085),
    ("P", 30.974),
    ("S", 32.06),
    ("Cl", 35.45),
    ("Ar", 39.95),
    ("K", 39.098),
    ("Ca", 40.078),
    ("Ti", 47.867),
    ("Cr", 51.996),
    ("Mn", 54.938),
    ("Fe", 55.845),
    ("Co", 58.933),
    ("Ni", 58.693),
    ("Cu", 63.546),
    ("Zn", 65.38),
    ("As", 74.922),
    ("Se", 78.971),
    ("Br", 79.904),
    ("Mo", 95.95),
    ("Pd", 106.42),
    ("Ag", 107.87),
    ("Cd", 112.41),
    ("Sn", 118.71),
    ("I", 126.90),
    ("Ba", 137.33),
    ("Hg", 200.59),
    ("Pb", 207.2),
];

/// More atoms of one kind than any extraction material has; also keeps the arithmetic from overflowing.
const MOST_ATOMS: u32 = 100_000;

/// The atoms of a formula unit: symbol and number, in the order of the atomic number.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Composition {
    counts: Vec<(usize, u32)>,
}

impl Composition {
    /// Symbol and number of each element.
    pub fn iter(&self) -> impl Iterator<Item = (&'static str, u32)> + '_ {
        self.counts.iter().filter_map(|&(index, n)| ATOMIC_WEIGHTS.get(index).map(|&(symbol, _)| (symbol, n)))
    }

    /// How many atoms of `symbol`; 0 when it is not in the formula.
    #[must_use]
    pub fn count(&self, symbol: &str) -> u32 {
        self.iter().find(|&(s, _)| s == symbol).map_or(0, |(_, n)| n)
    }

    /// Molar mass, kg/mol, from the abridged standard atomic weights.
    #[must_use]
    pub fn molar_mass_kg_mol(&self) -> f64 {
        let mut grams = 0.0;
        for &(index, n) in &self.counts {
            if let Some(&(_, weight)) = ATOMIC_WEIGHTS.get(index) {
                // M = Σ nᵢ Aᵢ
                grams += f64::from(n) * weight;
            }
        }
        grams / 1000.0
    }
}

/// Why a formula cannot be read.
#[derive(Clone, Debug, PartialEq, Eq)]
pub enum FormulaError {
    /// Nothing was written.
    Empty,
    /// An element that the table of atomic weights does not hold.
    UnknownElement {
        /// What was read as its symbol.
        symbol: String,
    },
    /// A character that has no place in a formula.
    Unexpected {
        /// The character.
        found: char,
        /// Its place, counted from 1.
        place: usize,
    },
    /// Brackets that do not pair, or that nest deeper than eight.
    Brackets,
    /// A number that is zero or absurdly large.
    Number,
}

impl fmt::Display for FormulaError {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            Self::Empty => write!(f, "the formula is empty; write it as in C2H6O"),
            Self::UnknownElement { symbol } => {
                write!(f, "\"{symbol}\" is no element of the table; capitals matter, as in NaCl")
            }
            Self::Unexpected { found, place } => write!(
                f,
                "'{found}' at place {place} does not belong in a formula; write elements, numbers and round brackets, as in (C2H5)2O"
            ),
            Self::Brackets => write!(f, "the brackets of the formula do not pair; write them as in (C2H5)2O"),
            Self::Number => {
                write!(
                    f,
                    "a number in the formula is zero or above {MOST_ATOMS}; write the atoms of one formula unit"
                )
            }
        }
    }
}

impl std::error::Error for FormulaError {}

/// Reads a formula such as `C2H6O`, `(C2H5)2O` or `Na2SO4`.
///
/// ```
/// let ether = thimbleworth::material::parse_formula("(C2H5)2O")?;
/// assert_eq!((ether.count("C"), ether.count("H"), ether.count("O")), (4, 10, 1));
/// # Ok::<(), thimbleworth::material::FormulaError>(())
/// ```
///
/// # Errors
/// [`FormulaError`] says which part could not be read.
pub fn parse_formula(text: &str) -> Result<Composition, FormulaError> {
    let mut reader = Reader { bytes: text.trim().char_indices().peekable(), deep: 0 };
    let counts = reader.group()?;
    if reader.bytes.peek().is_some() {
        return Err(FormulaError::Brackets);
    }
    if counts.is_empty() {
        return Err(FormulaError::Empty);
    }
    Ok(Composition { counts })
}

struct Reader<'a> {
    bytes: std::iter::Peekable<std::str::CharIndices<'a>>,
    deep: u8,
}

impl Reader<'_> {
    fn group(&mut self) -> Result<Vec<(usize, u32)>, FormulaError> {
        let mut counts: Vec<(usize, u32)> = Vec::new();
        while let Some(&(at, c)) = self.bytes.peek() {
            if c == ')' {
                break;
            }
            self.bytes.next();
            let inner = if c == '(' {
                self.deep += 1;
                if self.deep > 8 {
                    return Err(FormulaError::Brackets);
                }
                let inner = self.group()?;
                if self.bytes.next().map(|(_, c)| c) != Some(')') {
                    return Err(FormulaError::Brackets);
                }
                self.deep -= 1;
                inner
            } else if c.is_ascii_uppercase() {
                let mut symbol = String::from(c);
                while let Some(&(_, small)) = self.bytes.peek() {
                    if !small.is_ascii_lowercase() {
                        break;
                    }
                    symbol.push(small);
                    self.bytes.next();
                }
                match ATOMIC_WEIGHTS.iter().position(|&(s, _)| s == symbol) {
                    Some(index) => vec![(index, 1)],
                    None => return Err(FormulaError::UnknownElement { symbol }),
                }
            } else {
                return Err(FormulaError::Unexpected { found: c, place: at + 1 });
            };
            let times = self.number()?;
            for (index, n) in inner {
                add(&mut counts, index, n.saturating_mul(times))?;
            }
        }
        Ok(counts)
    }

    fn number(&mut self) -> Result<u32, FormulaError> {
        let mut number = None;
        while let Some(digit) = self.bytes.peek().and_then(|&(_, c)| c.to_digit(10)) {
            self.bytes.next();
            let next = number.unwrap_or(0_u32).saturating_mul(10).saturating_add(digit);
            if next > MOST_ATOMS {
                return Err(FormulaError::Number);
            }
            number = Some(next);
        }
        match number {
            Some(0) => Err(FormulaError::Number),
            Some(n) => Ok(n),
            None => Ok(1),
        }
    }
}

fn add(counts: &mut Vec<(usize, u32)>, index: usize, n: u32) -> Result<(), FormulaError> {
    match counts.binary_search_by_key(&index, |&(i, _)| i) {
        Ok(place) => {
            if let Some(entry) = counts.get_mut(place) {
                entry.1 = entry.1.saturating_add(n);
                if entry.1 > MOST_ATOMS {
                    return Err(FormulaError::Number);
                }
            }
        }
        Err(_) if n > MOST_ATOMS => return Err(FormulaError::Number),
        Err(place) => counts.insert(place, (index, n)),
    }
    Ok(())
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn reads_brackets_and_weighs() {
        let salt = parse_formula("Na2SO4").unwrap();
        assert!((salt.molar_mass_kg_mol() - 0.142_036).abs() < 1e-9);
        let nested = parse_formula("Ca(C2H3(O)O)2").unwrap();
        assert_eq!((nested.count("Ca"), nested.count("C"), nested.count("O")), (1, 4, 4));
        assert_eq!(parse_formula("CO2").unwrap().iter().collect::<Vec<_>>(), vec![("C", 1), ("O", 2)]);
    }

    #[test]
    fn refuses_with_a_reason() {
        for (text, error) in [
            ("", FormulaError::Empty),
            ("  ", FormulaError::Empty),
            ("co2", FormulaError::Unexpected { found: 'c', place: 1 }),
            ("Xx2", FormulaError::UnknownElement { symbol: "Xx".into() }),
            ("(CH3", FormulaError::Brackets),
            ("CH3)2", FormulaError::Brackets),
            ("C0", FormulaError::Number),
            ("C999999999999", FormulaError::Number),
            ("(C99999)99999", FormulaError::Number),
            ("C2·H2O", FormulaError::Unexpected { found: '·', place: 3 }),
            ("(((((((((C)))))))))", FormulaError::Brackets),
        ] {
            assert_eq!(parse_formula(text), Err(error), "{text}");
        }
        assert!(parse_formula(&"(".repeat(100_000)).is_err());
    }
}
