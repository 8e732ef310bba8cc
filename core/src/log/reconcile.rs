//! Purchases and stock, postings of the plan, consignments: what each says of a solvent in a quarter, and what none
//! explains.
//!
//! ```text
//! used        = bought − returned + stock at the start − stock at the end
//! unexplained = used − consigned − what the plan posts to air, drain, product and the like
//! ```
//!
//! Air is what the plan's rules or measurements post to it, never the remainder. What waits in containers at the end of a
//! quarter is unexplained until it is consigned; the difference between what the plan posts into streams and what was
//! consigned shows how much that may be.

use super::names::{NONE, RECLAIMED};
use super::posted::{PeriodPostings, Posted, Postings, Work};
use super::{Day, Done, Names, Reading, Register, Sum};
use crate::material::Class;
use crate::program::Program;
use crate::source::{COMMON_PRACTICE, Source, Standing};

/// A stock count stands for a day this near to it.
const NEAR_DAYS: u32 = 15;
/// √3: half the width of a rectangular distribution over its standard uncertainty (JCGM 100:2008, 4.3.7).
const ROOT_3: f64 = 1.732_050_807_568_877_2;

/// How uncertainties are joined.
pub const UNCERTAINTY: Source = Source::new("JCGM 100:2008, 4.3.7, 5.1.2 and 5.2.2", Standing::FromMemory);
/// Where the registers' usual limits come from.
pub const USUAL_LIMITS: Source = COMMON_PRACTICE;

impl Register {
    /// How far amounts can be off where the mapping does not say: half the width of a rectangular distribution, as a
    /// share. Fill of bottles and drums, levels read by eye, scales with their tare (common practice, no source).
    #[must_use]
    pub const fn usual_limits(self) -> f64 {
        match self {
            Self::Preparation => 0.0,
            Self::Purchases => 0.01,
            Self::Stock => 0.1,
            Self::Consignments | Self::Cylinders => 0.02,
        }
    }
}

/// One figure: mass, standard uncertainty, and on how many rows it stands.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub struct Line {
    /// kg.
    pub kg: f64,
    /// Standard uncertainty; kg.
    pub u_kg: f64,
    /// Rows of the site's records; 0 for what the plan posts.
    pub rows: u64,
}

impl Line {
    /// The sum or difference of figures that do not depend on one another.
    #[must_use]
    pub fn joined(parts: &[(f64, Self)]) -> Self {
        let mut out = Self::default();
        let mut squares = 0.0;
        for (sign, part) in parts {
            // x = Σ cᵢ xᵢ, u² = Σ cᵢ² uᵢ²
            out.kg += sign * part.kg;
            squares += part.u_kg * part.u_kg;
            out.rows += part.rows;
        }
        out.u_kg = libm::sqrt(squares);
        out
    }

    /// Adds a figure that is off in the same direction, as two from one scale are: u = Σ uᵢ.
    pub fn add_dependent(&mut self, other: &Self) {
        self.kg += other.kg;
        self.u_kg += other.u_kg;
        self.rows += other.rows;
    }

    /// The expanded uncertainty, k = 2; kg.
    #[must_use]
    pub fn expanded_kg(&self) -> f64 {
        2.0 * self.u_kg
    }
}

/// Which registers were read with at least one row that counts. What stands in the others is not known, and not zero.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub struct Recorded {
    /// Purchases.
    pub purchases: bool,
    /// Stock counts.
    pub stock: bool,
    /// Waste consignments.
    pub consignments: bool,
}

impl Recorded {
    fn of(readings: &[Reading]) -> Self {
        let has = |register| readings.iter().any(|r| r.mapping.register == register && r.rows.used > 0);
        Self {
            purchases: has(Register::Purchases),
            stock: has(Register::Stock),
            consignments: has(Register::Consignments),
        }
    }

    /// Whether what was used is known.
    #[must_use]
    pub const fn used(self) -> bool {
        self.purchases && self.stock
    }

    /// Whether nothing is missing of which a balance is made.
    #[must_use]
    pub const fn all(self) -> bool {
        self.used() && self.consignments
    }

    /// The registers that are missing, in words; empty where none is.
    #[must_use]
    pub fn missing(self) -> String {
        let mut out = String::new();
        for (there, register) in [
            (self.purchases, Register::Purchases),
            (self.stock, Register::Stock),
            (self.consignments, Register::Consignments),
        ] {
            if !there {
                out.push_str(if out.is_empty() { "" } else { ", " });
                out.push_str(register.word());
            }
        }
        out
    }
}

/// One solvent in one period.
#[derive(Clone, Debug, PartialEq)]
pub struct SolventAccount {
    /// The index of the material in [`Names::materials`].
    pub material: usize,
    /// The first and the last quarter, counted from the year 0.
    pub quarters: (u16, u16),
    /// Which registers were read: the lines of the others are empty and mean nothing.
    pub recorded: Recorded,
    /// Bought.
    pub bought: Line,
    /// Returned to the supplier in cylinders.
    pub returned: Line,
    /// On the shelf at the start; `None` without a count near that day.
    pub opening: Option<Line>,
    /// On the shelf at the end.
    pub closing: Option<Line>,
    /// Consigned as waste.
    pub consigned: Line,
    /// Sent off to be reclaimed.
    pub reclaimed: Line,
    /// What the plan posts, in the order of [`Posted`].
    pub posted: [Line; Posted::COUNT],
}

impl SolventAccount {
    /// One account of the plan's postings.
    #[must_use]
    pub fn posted(&self, account: Posted) -> Line {
        self.posted.get(account as usize).copied().unwrap_or_default()
    }

    /// What the books say was used; `None` without purchases or stock counts.
    #[must_use]
    pub fn used(&self) -> Option<Line> {
        if !self.recorded.used() {
            return None;
        }
        let (opening, closing) = match (self.opening, self.closing) {
            (Some(opening), Some(closing)) => (opening, closing),
            // Without both counts the change is not known, and not guessed.
            _ => (Line::default(), Line::default()),
        };
        Some(Line::joined(&[(1.0, self.bought), (-1.0, self.returned), (1.0, opening), (-1.0, closing)]))
    }

    /// Whether the shelf was counted at both ends.
    #[must_use]
    pub const fn counted(&self) -> bool {
        self.opening.is_some() && self.closing.is_some()
    }

    /// Used according to the books beyond what the plan draws for the work that was logged.
    #[must_use]
    pub fn beyond_plan(&self) -> Option<Line> {
        Some(Line::joined(&[(1.0, self.used()?), (-1.0, self.posted(Posted::Drawn))]))
    }

    /// Posted into waste streams beyond what was consigned: in containers still, or elsewhere; `None` without
    /// consignments.
    #[must_use]
    pub fn waiting(&self) -> Option<Line> {
        let parts = [(1.0, self.posted(Posted::Streams)), (-1.0, self.consigned), (-1.0, self.reclaimed)];
        self.recorded.consignments.then(|| Line::joined(&parts))
    }

    /// What none of the three explains; `None` where a register is missing.
    #[must_use]
    pub fn unexplained(&self) -> Option<Line> {
        let used = self.used().filter(|_| self.recorded.consignments)?;
        Some(Line::joined(&[
            (1.0, used),
            (-1.0, self.consigned),
            (-1.0, self.reclaimed),
            (-1.0, self.posted(Posted::Lost)),
        ]))
    }

    /// Whether what is unexplained lies within its expanded uncertainty; `None` where it is not known.
    #[must_use]
    pub fn explained(&self) -> Option<bool> {
        self.unexplained().map(|line| line.kg.abs() <= line.expanded_kg())
    }
}

/// Purchases, postings and consignments side by side.
#[derive(Clone, Debug, Default)]
pub struct Reconciliation {
    /// By quarter and solvent.
    pub quarters: Vec<SolventAccount>,
    /// By solvent over all quarters; empty where there is one.
    pub whole: Vec<SolventAccount>,
    /// What the figures leave out, or rest on.
    pub doubts: Vec<String>,
}

/// The quarter of a month, counted from the year 0.
const fn quarter(month: u16) -> u16 {
    month / 3
}

/// The first day of a quarter.
fn first_day(quarter: u16) -> Option<Day> {
    Day::new(quarter / 4, u8::try_from(quarter % 4).ok()? * 3 + 1, 1)
}

/// The sums of all files of a register, with the limits of each.
struct Books<'r> {
    readings: &'r [Reading],
    names: &'r Names,
    recorded: Recorded,
}

/// Holds the site's records against the plan's postings, by solvent and quarter.
///
/// Solvents and gases are reconciled that any record or posting names. The uncertainty joins the limits of each register
/// (taken as off in one direction within a register), those of densities, and the spread of the plan's inputs over
/// draws.
///
/// ```
/// use thimbleworth::{account::account_text, example::EXAMPLES, log::{Names, Reader, reconcile}};
/// let account = account_text(EXAMPLES[0].text);
/// let program = account.program.as_ref().unwrap();
/// let names = Names::of(account.plan.as_ref().unwrap(), program);
/// let mut reader = Reader::new("purchases.csv", names, &[]);
/// reader.feed(b"Date,Solvent,Amount (kg),Supplier\n2026-01-05,acetone,100,x\n");
/// let (reading, mut names, _) = reader.finish();
/// let found = reconcile(&[reading.unwrap()], program, &mut names);
/// let acetone = &found.quarters.iter().find(|a| names.materials[a.material].name == "acetone").unwrap();
/// assert_eq!(acetone.bought.kg, 100.0);
/// ```
#[must_use]
pub fn reconcile(readings: &[Reading], program: &Program, names: &mut Names) -> Reconciliation {
    let mut under_way = Reconciling::begin(readings, program, names);
    while !under_way.step(program) {}
    under_way.end(readings, names)
}

/// A reconciliation under way: it takes a draw of the plan's inputs at each step, so that no caller has to wait for all of
/// them. Each call needs the same readings, program and names.
pub struct Reconciling {
    span: (u16, u16),
    /// `None` where there is nothing to hold against the plan.
    postings: Option<Postings>,
    doubts: Vec<String>,
}

impl Reconciling {
    /// Finds the quarters and what was done in each.
    #[must_use]
    pub fn begin(readings: &[Reading], program: &Program, names: &mut Names) -> Self {
        let days: Vec<(Day, Day)> = readings.iter().filter_map(|r| r.tally.days).collect();
        // A count on the last day of a year or the first of the next one closes the year: it opens no quarter.
        let moving = |r: &&Reading| r.mapping.register != Register::Stock;
        let months = readings.iter().filter(moving).filter_map(|r| r.tally.days);
        let mut span: Option<(u16, u16)> = None;
        for (first, last) in
            months.chain(days.first().copied().filter(|_| !readings.iter().any(|r| moving(&r))))
        {
            let (a, b) = (quarter(first.month_index()), quarter(last.month_index()));
            span = Some(span.map_or((a, b), |(x, y)| (if a < x { a } else { x }, if b > y { b } else { y })));
        }
        let without = |span, doubt: &str| Self { span, postings: None, doubts: vec![doubt.to_owned()] };
        let Some((first, last)) = span else { return without((0, 0), "no row of any file counts") };
        if last - first > 400 {
            return without((0, 0), "the files span more than a hundred years: a date is wrong");
        }
        let mut doubts = Vec::new();
        let work = work(readings, names, first, last, &mut doubts);
        Self { span: (first, last), postings: Some(Postings::begin(program, names, work)), doubts }
    }

    /// Takes the next draw; `true` once there is none left.
    pub fn step(&mut self, program: &Program) -> bool {
        self.postings.as_mut().is_none_or(|postings| postings.step(program))
    }

    /// Puts purchases, postings and consignments side by side.
    #[must_use]
    pub fn end(self, readings: &[Reading], names: &Names) -> Reconciliation {
        let mut out = Reconciliation { doubts: self.doubts, ..Reconciliation::default() };
        let Some(postings) = self.postings else { return out };
        let (first, last) = self.span;
        for route in &postings.stopped {
            let label = names.routes.get(usize::from(*route)).map_or("", |r| r.label.as_str());
            out.doubts
                .push(["the route ", label, " stops and posts nothing: see the plan's problems"].concat());
        }
        let recorded = Recorded::of(readings);
        if !recorded.all() {
            out.doubts.push(
                [
                    "not recorded: ",
                    &recorded.missing(),
                    "; what was not recorded is not zero, so nothing is said of what is unexplained and there is no solvent balance. Add the register that is missing, with its rows over the same quarters",
                ]
                .concat(),
            );
        }
        let books = Books { readings, names, recorded };
        let mut stocks = 0_u32;
        let posted = &postings.periods;
        for (i, period) in posted.iter().enumerate() {
            let whole = i == postings.count();
            if whole && i == 1 {
                break;
            }
            let at = first + u16::try_from(i).unwrap_or(0);
            let span = if whole { (first, last) } else { (at, at) };
            for material in 0..names.materials.len() {
                let account = books.account(material, span, period, posted, whole);
                if let Some(account) = account {
                    stocks += u32::from(!account.counted());
                    if whole { out.whole.push(account) } else { out.quarters.push(account) }
                }
            }
        }
        if stocks > 0 && recorded.stock {
            out.doubts.push(
                "where the shelf was not counted within 15 days of both ends of a quarter, the change of stock is not known and not in \"used\"; a count at each turn of a quarter would do"
                    .to_owned(),
            );
        }
        books.doubts(posted, &mut out.doubts);
        out
    }
}

/// How much of each route was done in each quarter.
fn work(
    readings: &[Reading],
    names: &Names,
    first: u16,
    last: u16,
    doubts: &mut Vec<String>,
) -> Vec<Vec<(u16, Work)>> {
    let logs: Vec<&Reading> =
        readings.iter().filter(|r| r.mapping.register == Register::Preparation).collect();
    if logs.is_empty() {
        doubts.push(
            "there is no preparation log: what the plan posts is a quarter of its own year, by its present routes"
                .to_owned(),
        );
        let planned = || names.present().iter().map(|route| (*route, Work::Planned(0.25))).collect();
        return (first..=last).map(|_| planned()).collect();
    }
    let mut done: Vec<((u16, u16), Done)> = Vec::new();
    let mut untold = false;
    for (key, part) in logs.iter().flat_map(|r| &r.tally.done) {
        let key = (quarter(key.month), key.material);
        let at = done.iter().position(|(known, _)| *known == key).unwrap_or_else(|| {
            done.push((key, Done::default()));
            done.len() - 1
        });
        let Some((_, sum)) = done.get_mut(at) else { continue };
        sum.rows += part.rows;
        sum.extractions += part.extractions;
        sum.controls += part.controls;
        sum.repeats += part.repeats;
        sum.batches += part.batches;
        untold |= part.batches == 0;
    }
    if untold {
        doubts.push(
            "in some months the log names no batch: batches are then as full as the plan says".to_owned(),
        );
    }
    let mut out: Vec<Vec<(u16, Work)>> = (first..=last).map(|_| Vec::new()).collect();
    for ((at, route), sum) in done {
        let Some(period) = out.get_mut(usize::from(at.saturating_sub(first))) else { continue };
        if sum.extractions > 0.0 {
            period.push((route, Work::Logged(sum, 0.25)));
        } else {
            doubts.push("a route has no extraction left in a quarter after corrections".to_owned());
        }
    }
    out
}

impl Books<'_> {
    fn of(&self, register: Register) -> impl Iterator<Item = &Reading> {
        self.readings.iter().filter(move |r| r.mapping.register == register)
    }

    /// Half the width of a file's amounts as a share.
    fn limits(reading: &Reading) -> f64 {
        reading.mapping.uncertainty.unwrap_or(reading.mapping.register.usual_limits())
    }

    /// A sum as a line: u = a |x| / √3 for the register, and the same for the density of the material.
    fn line(&self, reading: &Reading, sum: &Sum, material: usize) -> Line {
        let density = self.names.materials.get(material).and_then(|m| m.density_kg_m3).map_or(0.0, |d| d.1);
        let share = Self::limits(reading);
        let u_kg = sum.kg.abs() * libm::sqrt(share * share + density * density) / ROOT_3;
        Line { kg: sum.kg, u_kg, rows: sum.rows }
    }

    fn moved(
        &self,
        register: Register,
        material: usize,
        (first, last): (u16, u16),
        stream: Option<u16>,
    ) -> Line {
        let mut out = Line::default();
        for reading in self.of(register) {
            let sum = reading.tally.over(&|key| {
                usize::from(key.material) == material
                    && (first..=last).contains(&quarter(key.month))
                    && stream.is_none_or(|s| (key.stream == RECLAIMED) == (s == RECLAIMED))
            });
            out.add_dependent(&self.line(reading, &sum, material));
        }
        out
    }

    /// What stood on the shelf on the first day of a quarter.
    fn shelf(&self, material: usize, at: u16) -> Option<Line> {
        let day = first_day(at)?.number();
        let mut nearest: Option<u32> = None;
        for reading in self.of(Register::Stock) {
            // A shelf that was counted and holds none of a solvent has no row for it, on a day that has others.
            for counted in reading.tally.stock.iter().filter_map(|(key, _)| key.date()) {
                let apart = counted.number().abs_diff(day);
                if apart <= NEAR_DAYS && nearest.is_none_or(|n| apart < n.abs_diff(day)) {
                    nearest = Some(counted.number());
                }
            }
        }
        let nearest = nearest?;
        let mut out = Line::default();
        for reading in self.of(Register::Stock) {
            for (key, sum) in &reading.tally.stock {
                let then = key.date().is_some_and(|day| day.number() == nearest);
                if usize::from(key.material) == material && then {
                    out.add_dependent(&self.line(reading, sum, material));
                }
            }
        }
        Some(out)
    }

    /// Waste that left, by material or as a share of its stream.
    fn consigned(
        &self,
        material: usize,
        span: (u16, u16),
        period: &PeriodPostings,
        all: &PeriodPostings,
    ) -> Line {
        let mut out = self.moved(Register::Consignments, material, span, Some(NONE));
        for reading in self.of(Register::Consignments) {
            for stream in 0..self.names.streams.len() {
                let sum = reading.tally.over(&|key| {
                    key.material == NONE
                        && usize::from(key.stream) == stream
                        && (span.0..=span.1).contains(&quarter(key.month))
                });
                // What leaves in a quarter without work was made before: the share is then that of the whole time.
                let source = if period.has_stream(stream) { period } else { all };
                let (share, u_share) = source.share(stream, material);
                if sum.kg == 0.0 || share == 0.0 {
                    continue;
                }
                let limits = Self::limits(reading) / ROOT_3;
                // m = M w, u² = (M u_w)² + (w u_M)²
                let (from_share, from_mass) = (sum.kg * u_share, share * sum.kg * limits);
                let u_kg = libm::sqrt(from_share * from_share + from_mass * from_mass);
                out.add_dependent(&Line { kg: sum.kg * share, u_kg, rows: sum.rows });
            }
        }
        out
    }

    fn account(
        &self,
        material: usize,
        span: (u16, u16),
        period: &PeriodPostings,
        posted: &[PeriodPostings],
        whole: bool,
    ) -> Option<SolventAccount> {
        let what = self.names.materials.get(material)?;
        if !matches!(what.class, Class::Solvent | Class::Gas) {
            return None;
        }
        let all = posted.last()?;
        let mut lines = [Line::default(); Posted::COUNT];
        for (line, account) in lines.iter_mut().zip(ACCOUNTS) {
            let (kg, u_kg) = period.of(material, account);
            *line = Line { kg: kg + 0.0, u_kg, rows: 0 };
        }
        // The share of a stream that is this solvent is that of each quarter, also where quarters are added up.
        let mut consigned = Line::default();
        for at in span.0..=span.1 {
            let quarter = if whole { posted.get(usize::from(at - span.0)).unwrap_or(all) } else { period };
            consigned.add_dependent(&self.consigned(material, (at, at), quarter, all));
        }
        let account = SolventAccount {
            material,
            quarters: span,
            recorded: self.recorded,
            bought: self.moved(Register::Purchases, material, span, None),
            returned: self.moved(Register::Cylinders, material, span, None),
            opening: self.shelf(material, span.0),
            closing: self.shelf(material, span.1 + 1),
            consigned,
            reclaimed: self.moved(Register::Consignments, material, span, Some(RECLAIMED)),
            posted: lines,
        };
        let shelf = |line: Option<Line>| line.is_some_and(|l| l.rows > 0);
        let any =
            account.bought.rows + account.returned.rows + account.consigned.rows + account.reclaimed.rows > 0
                || shelf(account.opening)
                || shelf(account.closing)
                || account.posted(Posted::Drawn).kg != 0.0
                || account.posted(Posted::Streams).kg != 0.0;
        any.then_some(account)
    }

    /// What the figures leave out.
    fn doubts(&self, posted: &[PeriodPostings], doubts: &mut Vec<String>) {
        let Some(all) = posted.last() else { return };
        for reading in self.readings {
            let mut open = Sum::default();
            for (key, sum) in &reading.tally.sums {
                let stream = usize::from(key.stream);
                let unknown =
                    key.material == NONE && stream < self.names.streams.len() && !all.has_stream(stream);
                if unknown {
                    open.join(sum);
                }
            }
            if open.rows > 0 {
                doubts.push(format!(
                    "{}: {} rows of {} kg are of streams into which the plan posts nothing: they are in no solvent",
                    reading.mapping.name,
                    open.rows,
                    crate::quantity::significant(open.kg, 4)
                ));
            }
            let mut by_volume = Sum::default();
            for (_, sum) in reading.tally.sums.iter().chain(&reading.tally.stock) {
                by_volume.join(sum);
            }
            if by_volume.rows_by_volume > 0 {
                doubts.push(format!(
                    "{}: {} rows give a volume ({} L) of what has no density here: they are in no mass",
                    reading.mapping.name,
                    by_volume.rows_by_volume,
                    crate::quantity::significant(by_volume.m3 * 1000.0, 4)
                ));
            }
            if reading.rows.refused > 0 {
                doubts.push(format!(
                    "{}: {} of {} rows are refused and in no sum",
                    reading.mapping.name,
                    reading.rows.refused,
                    reading.rows.refused + reading.rows.used
                ));
            }
        }
    }
}

/// The accounts in their order.
const ACCOUNTS: [Posted; Posted::COUNT] = [
    Posted::Drawn,
    Posted::Reused,
    Posted::Hood,
    Posted::Room,
    Posted::Drain,
    Posted::Product,
    Posted::ByProduct,
    Posted::Destroyed,
    Posted::Held,
    Posted::Elsewhere,
    Posted::Fed,
    Posted::Streams,
    Posted::Lost,
];
