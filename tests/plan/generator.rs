//! Plans made by chance, the same ones every time.

use thimbleworth::plan::{
    Electricity, Field, Log, OtherWaste, OwnMaterial, Plan, Room, Route, Site, Step, Stream, Workload,
};

/// SplitMix64 (Steele, Lea and Flood 2014; constants from memory). Any generator would do; nothing rests on its
/// quality.
pub(crate) struct Chance(pub(crate) u64);

/// Parts of hostile texts.
const PARTS: [&str; 24] = [
    "acetone",
    "250 ± 5 mL",
    "0.10",
    " ",
    "\"",
    "\\",
    "\n",
    "\r\n",
    "\t",
    "\0",
    "\u{1b}",
    "\u{7f}",
    "\u{85}",
    "\u{2028}",
    "\u{2029}",
    "\u{feff}",
    "\u{202e}",
    "🧪",
    "é",
    "e\u{301}",
    "</script>",
    "{",
    "]",
    "not known",
];

const NUMBERS: [&str; 10] =
    ["0", "-0", "1400", "0.10", "1E+2", "-3.50e-7", "12345678901234567890123", "0.1e1", "1.0", "9"];

impl Chance {
    pub(crate) fn next(&mut self) -> u64 {
        self.0 = self.0.wrapping_add(0x9E37_79B9_7F4A_7C15);
        let mut z = self.0;
        z = (z ^ (z >> 30)).wrapping_mul(0xBF58_476D_1CE4_E5B9);
        z = (z ^ (z >> 27)).wrapping_mul(0x94D0_49BB_1331_11EB);
        z ^ (z >> 31)
    }

    pub(crate) fn below(&mut self, n: usize) -> usize {
        usize::try_from(self.next() % u64::try_from(n).unwrap()).unwrap()
    }

    fn yes(&mut self) -> bool {
        self.below(2) == 1
    }

    fn text(&mut self) -> String {
        (0..self.below(5)).map(|_| PARTS[self.below(PARTS.len())]).collect()
    }

    fn maybe<T>(&mut self, make: impl FnOnce(&mut Self) -> T) -> Option<T> {
        self.yes().then(|| make(self))
    }

    fn list<T>(&mut self, most: usize, make: impl Fn(&mut Self) -> T) -> Vec<T> {
        (0..self.below(most + 1)).map(|_| make(self)).collect()
    }

    fn rows(&mut self) -> Vec<(String, String)> {
        self.list(4, |c| (c.text(), c.text()))
    }

    fn field(&mut self) -> Field {
        match self.below(4) {
            0 => Field::Text(self.text()),
            1 => Field::Number(NUMBERS[self.below(NUMBERS.len())].into()),
            2 => Field::YesNo(self.yes()),
            _ => Field::Rows(self.rows()),
        }
    }

    fn fields(&mut self) -> Vec<(String, Field)> {
        // A letter before, so that no field is called as one of a step's own keys.
        self.list(5, |c| (format!("x{}", c.text()), c.field()))
    }

    pub(crate) fn plan(&mut self) -> Plan {
        Plan {
            title: self.text(),
            notes: self.maybe(Self::text),
            seed: self.maybe(Self::field),
            site: self.site(),
            materials: self.list(3, |c| OwnMaterial { name: c.text(), fields: c.fields() }),
            workloads: self.list(3, Self::workload),
            logs: self.list(2, |c| Log {
                name: c.text(),
                register: c.text(),
                columns: c.rows(),
                dates: c.maybe(Self::text),
                decimals: c.maybe(Self::text),
                uncertainty: c.maybe(Self::text),
                means: c.rows(),
            }),
        }
    }

    fn site(&mut self) -> Site {
        Site {
            name: self.text(),
            rules: self.maybe(Self::text),
            as_of: self.maybe(Self::text),
            bench_temperature: self.maybe(Self::text),
            drain_permit: self.maybe(Self::text),
            electricity: self.maybe(|c| Electricity {
                climate: c.maybe(Self::text),
                price: c.maybe(Self::text),
                year: c.maybe(Self::field),
                boundary: c.maybe(Self::text),
                source: c.maybe(Self::text),
            }),
            room: self.maybe(|c| {
                let mut room = Room::default();
                for key in ["volume", "air_changes", "hood_capture", "setback", "low_spaces", "cylinder"] {
                    let text = c.maybe(Self::text);
                    assert!(room.set(key, text));
                }
                room
            }),
            streams: self.list(3, |c| Stream {
                name: c.text(),
                holds: c.maybe(Self::text),
                container: c.maybe(Self::text),
                fill: c.maybe(Self::text),
                bulk_density: c.maybe(Self::text),
                treatment: c.maybe(Self::text),
                ph: c.maybe(Self::text),
                flash_point: c.maybe(Self::text),
                unused: c.maybe(Self::yes),
                made_of: c.maybe(Self::text),
                density_mark: c.maybe(Self::field),
                area: c.maybe(Self::text),
                counted: c.maybe(Self::text),
                goes_round: c.maybe(Self::text),
                saturation: c.maybe(Self::text),
                vented_to: c.maybe(Self::text),
            }),
            activity: self.maybe(Self::text),
            other_waste: self.list(3, |c| OtherWaste {
                name: c.text(),
                each_month: c.text(),
                months: c.maybe(Self::text),
                acute: c.maybe(Self::yes),
            }),
            storage_limit: self.maybe(Self::text),
            pick_up_every: self.maybe(Self::text),
            far_receiver: self.maybe(Self::yes),
            deviations: self.maybe(Self::text),
            money: self.fields(),
            hours: self.fields(),
            climate: self.fields(),
        }
    }

    fn workload(&mut self) -> Workload {
        Workload {
            name: self.text(),
            results_per_year: self.maybe(Self::field),
            batch_samples: self.maybe(Self::field),
            batch_controls: self.maybe(Self::field),
            repeats: self.maybe(Self::text),
            repeats_bring_controls: self.maybe(Self::yes),
            controls_carry_feed: self.maybe(Self::yes),
            feed: self.rows(),
            months: self.maybe(Self::text),
            present: self.text(),
            routes: self.list(3, |c| Route {
                name: c.text(),
                feed: c.maybe(Self::rows),
                recovery: c.maybe(Self::text),
                equivalence: c.maybe(Self::text),
                permission: c.maybe(Self::text),
                ph: c.maybe(Self::text),
                steps: c.list(4, |c| Step {
                    technique: c.text(),
                    per: c.maybe(Self::text),
                    fields: c.fields(),
                    measured: c.rows(),
                    note: c.maybe(Self::text),
                }),
                ends: c.rows(),
                time: c.fields(),
                money: c.fields(),
            }),
        }
    }
}
