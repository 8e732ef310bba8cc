//! From the embedded tables to substances. Units are converted here and nowhere else.
use super::substance::{EuLow, Gwp100, Hazard, Rcra, Transport};
use super::table::Table;
use super::{Class, Figure, FlashPoint, Registration, Solubility, Substance, Text, parse_formula};
use crate::order;
use crate::quantity::nearest;
use crate::source::{Source, Standing};

macro_rules! tables {
    ($($constant:ident $file:literal)*) => {
        $(const $constant: Table = Table { name: $file, text: include_str!(concat!(env!("CARGO_MANIFEST_DIR"), "/data/", $file)) };)*
    };
}
mod laws;

tables! {
    IDENTITY "identity.csv"
    BOILING "boiling.csv"
    IGNITION "ignition.csv"
    SOLUBILITY "solubility_water.csv"
    HAZARDS "hazards_clp.csv"
    AR4 "gwp100_ipcc_ar4.csv"
    AR5 "gwp100_ipcc_ar5.csv"
    AR6 "gwp100_ipcc_ar6.csv"
    ODP "odp.csv"
    TRANSPORT "transport_un.csv"
    RCRA "rcra.csv"
    LOW "low_eu.csv"
    CHEM21 "chem21.csv"
    CONSUMABLES "consumables.csv"
}

/// What the tables hold, and what in them could not be read.
pub(super) struct Loaded {
    pub(super) substances: Vec<Substance>,
    pub(super) sources: Vec<(&'static str, Source)>,
    pub(super) faults: Vec<String>,
}

pub(super) fn load() -> Loaded {
    let mut shelf = Shelf { substances: Vec::new(), names: Vec::new(), faults: Vec::new() };
    let sources = sources(&mut shelf.faults);
    shelf.identity();
    shelf.density();
    shelf.vapour_pressure();
    shelf.heat();
    shelf.boiling();
    shelf.ignition();
    shelf.solubility();
    shelf.hazards(&sources);
    shelf.climate();
    shelf.transport_and_waste();
    shelf.scores_and_pieces();
    Loaded { substances: shelf.substances, sources, faults: shelf.faults }
}

/// The bibliography is the table in SOURCES.md, so that there is one list and people can read it.
fn sources(faults: &mut Vec<String>) -> Vec<(&'static str, Source)> {
    let mut sources = Vec::new();
    for line in include_str!("../../data/SOURCES.md").lines() {
        let Some(row) = line.strip_prefix("| `") else { continue };
        let mut cells = row.trim_end_matches('|').split('|').map(str::trim);
        if let (Some(key), Some(cite), Some(word)) = (cells.next(), cells.next(), cells.next()) {
            let standing = match word {
                "secondary" => Standing::Secondary,
                "recomputed" => Standing::Recomputed,
                "memory" => Standing::FromMemory,
                "practice" => Standing::CommonPractice,
                "definition" => Standing::Definition,
                _ => {
                    faults.push(format!("SOURCES.md: no standing \"{word}\""));
                    continue;
                }
            };
            sources.push((key.trim_end_matches('`'), Source::new(cite, standing)));
        }
    }
    order::sort(&mut sources, &|a, b| a.0 < b.0);
    sources
}

struct Shelf {
    substances: Vec<Substance>,
    /// The names in the order of `substances`.
    names: Vec<&'static str>,
    faults: Vec<String>,
}

fn celsius(figure: Figure) -> Figure {
    Figure {
        value: figure.value + 273.15,
        low: figure.low + 273.15,
        high: figure.high + 273.15,
        source: figure.source,
    }
}

fn text(cell: &'static str) -> Option<Text> {
    (!cell.is_empty()).then_some(Text::Borrowed(cell))
}

fn list(cell: &str, separator: char) -> Vec<String> {
    cell.split(separator).filter(|part| !part.is_empty()).map(str::to_owned).collect()
}

impl Shelf {
    fn number(&mut self, table: Table, name: &str, cell: &str) -> f64 {
        nearest(cell).unwrap_or_else(|| {
            self.faults.push(format!("{}: {name}: \"{cell}\" is no number", table.name));
            f64::NAN
        })
    }

    fn numbers<const N: usize>(&mut self, table: Table, name: &str, cells: [&str; N]) -> [f64; N] {
        cells.map(|cell| self.number(table, name, cell))
    }

    /// A figure from value, low and high; empty limits mean no second source.
    fn figure(
        &mut self,
        table: Table,
        name: &str,
        [value, low, high]: [&str; 3],
        scale: f64,
        source: &'static str,
    ) -> Option<Figure> {
        if value.is_empty() {
            return None;
        }
        let or_value = |cell| if str::is_empty(cell) { value } else { cell };
        let [value, low, high] = self.numbers(table, name, [value, or_value(low), or_value(high)]);
        Some(Figure::new(value * scale, low * scale, high * scale, source))
    }

    /// Calls `set` with the substance that each row of the table names.
    fn each<const N: usize>(
        &mut self,
        table: Table,
        columns: [&str; N],
        mut set: impl FnMut(&mut Self, usize, [&'static str; N]),
    ) {
        let rows = table.rows(columns, &mut self.faults);
        // The rows follow the order of identity.csv, so the search starts where the last one ended.
        let mut start = 0;
        for row in rows {
            let name = row.first().copied().unwrap_or("");
            let (passed, ahead) = self.names.split_at_checked(start).unwrap_or((&self.names, &[]));
            let found = ahead
                .iter()
                .position(|known| *known == name)
                .map(|place| start + place)
                .or_else(|| passed.iter().position(|known| *known == name));
            match found {
                Some(index) => {
                    start = index + 1;
                    set(self, index, row);
                }
                None => self.faults.push(format!("{}: \"{name}\" is not in identity.csv", table.name)),
            }
        }
    }

    fn set(&mut self, index: usize, set: impl FnOnce(&mut Substance)) {
        if let Some(substance) = self.substances.get_mut(index) {
            set(substance);
        }
    }

    fn molar_mass(&self, index: usize) -> f64 {
        let mass = self.substances.get(index).and_then(|s| s.molar_mass_kg_mol.as_ref());
        mass.map_or(f64::NAN, |figure| figure.value)
    }

    fn identity(&mut self) {
        let columns = ["name", "cas", "formula", "class", "synonyms", "note"];
        for [name, cas, formula, class, synonyms, note] in IDENTITY.rows(columns, &mut self.faults) {
            let Some(class) = Class::from_word(class) else {
                self.faults.push(format!("{}: {name}: no class \"{class}\"", IDENTITY.name));
                continue;
            };
            let mut substance = Substance::blank(name, class);
            substance.cas = text(cas);
            substance.formula = text(formula);
            substance.note = note.into();
            substance.synonyms = synonyms.split(';').filter_map(text).collect();
            if !formula.is_empty() {
                match parse_formula(formula) {
                    Ok(elements) => {
                        substance.molar_mass_kg_mol =
                            Some(Figure::single(elements.molar_mass_kg_mol(), "IUPAC 2021"));
                    }
                    Err(error) => self.faults.push(format!("{}: {name}: {error}", IDENTITY.name)),
                }
            }
            self.names.push(name);
            self.substances.push(substance);
        }
    }

    fn boiling(&mut self) {
        let columns = ["name", "boiling_c", "low_c", "high_c", "source", "critical_c", "critical_source"];
        self.each(
            BOILING,
            columns,
            |shelf, index, [name, value, low, high, source, critical, critical_source]| {
                let boiling = shelf.figure(BOILING, name, [value, low, high], 1.0, source).map(celsius);
                let critical =
                    shelf.figure(BOILING, name, [critical, "", ""], 1.0, critical_source).map(celsius);
                shelf.set(index, |s| {
                    s.boiling_point_k = boiling;
                    s.critical_temperature_k = critical;
                });
            },
        );
    }

    fn ignition(&mut self) {
        let columns = [
            "name",
            "flash_c",
            "flash_low_c",
            "flash_high_c",
            "flash_source",
            "autoignition_c",
            "autoignition_low_c",
            "autoignition_high_c",
            "autoignition_source",
        ];
        self.each(
            IGNITION,
            columns,
            |shelf, index, [name, flash, low, high, source, auto, auto_low, auto_high, auto_source]| {
                let flash = if flash == "none" {
                    FlashPoint::None
                } else {
                    let figure = shelf.figure(IGNITION, name, [flash, low, high], 1.0, source);
                    figure.map_or(FlashPoint::NotKnown, |figure| FlashPoint::Known(celsius(figure)))
                };
                let auto =
                    shelf.figure(IGNITION, name, [auto, auto_low, auto_high], 1.0, auto_source).map(celsius);
                shelf.set(index, |s| {
                    s.flash_point_k = flash;
                    s.autoignition_k = auto;
                });
            },
        );
    }

    fn solubility(&mut self) {
        let columns = ["name", "solubility_g_l", "low", "high", "source"];
        self.each(SOLUBILITY, columns, |shelf, index, [name, value, low, high, source]| {
            let solubility = if value == "miscible" {
                Solubility::Miscible
            } else {
                // g/L is kg/m³
                let figure = shelf.figure(SOLUBILITY, name, [value, low, high], 1.0, source);
                figure.map_or(Solubility::NotKnown, Solubility::Limited)
            };
            shelf.set(index, |s| s.solubility_in_water = solubility);
        });
    }

    fn hazards(&mut self, sources: &[(&'static str, Source)]) {
        let columns = ["name", "statements", "supplier_label", "as_of", "source", "note"];
        self.each(HAZARDS, columns, |shelf, index, [_, statements, supplier, as_of, source, note]| {
            let standing = sources.binary_search_by_key(&source, |&(key, _)| key).ok();
            let hazard = Hazard {
                statements: list(statements, ' '),
                supplier_statements: list(supplier, ' '),
                as_of: as_of.into(),
                source: source.into(),
                standing: standing.and_then(|place| sources.get(place)).map(|(_, source)| source.standing),
                note: note.into(),
            };
            shelf.set(index, |s| s.hazard = hazard);
        });
    }

    fn climate(&mut self) {
        type Edition = fn(&mut Gwp100) -> &mut Option<Figure>;
        let editions: [(Table, Edition); 3] =
            [(AR4, |gwp| &mut gwp.ar4), (AR5, |gwp| &mut gwp.ar5), (AR6, |gwp| &mut gwp.ar6)];
        for (table, edition) in editions {
            self.each(table, ["name", "gwp100", "source"], |shelf, index, [name, value, source]| {
                let figure = shelf.figure(table, name, [value, "", ""], 1.0, source);
                shelf.set(index, |s| *edition(&mut s.gwp100) = figure);
            });
        }
        self.each(
            ODP,
            ["name", "odp", "low", "high", "source"],
            |shelf, index, [name, value, low, high, source]| {
                let figure = shelf.figure(ODP, name, [value, low, high], 1.0, source);
                shelf.set(index, |s| s.odp = figure);
            },
        );
    }

    fn transport_and_waste(&mut self) {
        let columns = ["name", "un", "class", "packing_group", "source"];
        self.each(TRANSPORT, columns, |shelf, index, [_, un, class, packing_group, source]| {
            let transport = Transport {
                un: un.into(),
                class: class.into(),
                packing_group: packing_group.into(),
                source: source.into(),
            };
            shelf.set(index, |s| s.transport = Some(transport));
        });
        let columns =
            ["name", "characteristic", "toxicity", "spent", "spent_in_degreasing", "unused", "source"];
        self.each(
            RCRA,
            columns,
            |shelf, index, [_, characteristic, toxicity, spent, degreasing, unused, source]| {
                let rcra = Rcra {
                    characteristic: list(characteristic, ';'),
                    toxicity: list(toxicity, ';'),
                    spent: list(spent, ';'),
                    spent_in_degreasing: list(degreasing, ';'),
                    unused: text(unused),
                    source: source.into(),
                };
                shelf.set(index, |s| s.rcra = rcra);
            },
        );
        self.each(
            LOW,
            ["name", "spent", "laboratory", "source"],
            |shelf, index, [_, spent, laboratory, source]| {
                let low = EuLow { spent: text(spent), laboratory: text(laboratory), source: source.into() };
                shelf.set(index, |s| s.eu_low = low);
            },
        );
    }

    fn scores_and_pieces(&mut self) {
        let columns = ["name", "extra_safety_points", "registration"];
        self.each(CHEM21, columns, |shelf, index, [name, points, registration]| {
            let registration = match registration {
                "full" => Registration::Full,
                "partial" => Registration::Partial,
                _ => Registration::Unknown,
            };
            let points = points.parse().unwrap_or_else(|_| {
                shelf.faults.push(format!("{}: {name}: \"{points}\" is no number of points", CHEM21.name));
                0
            });
            shelf.set(index, |s| {
                s.chem21_extra_safety_points = points;
                s.registration = registration;
            });
        });
        let columns = [
            "name",
            "bulk_kg_m3",
            "bulk_low",
            "bulk_high",
            "unit_g",
            "unit_low",
            "unit_high",
            "water_kg_kg",
            "water_low",
            "water_high",
            "source",
        ];
        self.each(
            CONSUMABLES,
            columns,
            |shelf, index, [name, b, b_low, b_high, u, u_low, u_high, w, w_low, w_high, source]| {
                let bulk = shelf.figure(CONSUMABLES, name, [b, b_low, b_high], 1.0, source);
                let unit = shelf.figure(CONSUMABLES, name, [u, u_low, u_high], 1e-3, source);
                let water = shelf.figure(CONSUMABLES, name, [w, w_low, w_high], 1.0, source);
                shelf.set(index, |s| {
                    s.bulk_density_kg_m3 = bulk;
                    s.unit_mass_kg = unit;
                    s.water_capacity_kg_kg = water;
                });
            },
        );
    }
}
