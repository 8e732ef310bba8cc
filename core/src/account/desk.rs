//! The waste desk: codes of every stream, and the months and containers of the whole site.

use super::open::Account;
use super::poured::{Pouring, poured};
use crate::code::{Answer, Contents, Rules, Verdict, classify};
use crate::generator::{
    Calendar, Category, Clock, Line, Made, PickUps, Storage, category, headroom, simulate,
};
use crate::program::{Counted, SiteUse};
use crate::room::Day;

/// Whether a stream is hazardous waste.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Standing {
    /// A code applies.
    Hazardous,
    /// No code applies yet, but a test is open: counted as hazardous until then.
    UntilTested,
    /// Nothing that is known makes it hazardous.
    NotKnownHazardous,
}

impl Standing {
    /// In words.
    #[must_use]
    pub const fn words(self) -> &'static str {
        match self {
            Self::Hazardous => "hazardous",
            Self::UntilTested => "hazardous until tested",
            Self::NotKnownHazardous => "not known to be hazardous",
        }
    }
}

/// One stream on the waste desk.
#[derive(Clone, Debug)]
pub struct StreamDesk<'a> {
    /// The index of the stream in the site's list.
    pub stream: usize,
    /// What it holds, kg a year.
    pub contents: Contents<'a>,
    /// Every code held against it.
    pub verdicts: Vec<Verdict>,
}

impl StreamDesk<'_> {
    /// The codes that are put on it, in the order read; transport apart.
    #[must_use]
    pub fn codes(&self) -> Vec<&str> {
        self.kept(Verdict::applies)
    }

    /// The codes that wait for a test.
    #[must_use]
    pub fn open(&self) -> Vec<&str> {
        self.kept(Verdict::open)
    }

    fn kept(&self, holds: fn(&Verdict) -> bool) -> Vec<&str> {
        let codes = self.verdicts.iter().filter(|v| v.rule.key != "transport" && v.rule.key != "notice");
        codes.filter(|v| holds(v)).map(|v| &*v.code).collect()
    }

    /// The verdict on transport.
    #[must_use]
    pub fn transport(&self) -> Option<&Verdict> {
        self.verdicts.iter().find(|v| v.rule.key == "transport")
    }

    /// Whether it is hazardous waste under the rules read.
    #[must_use]
    pub fn standing(&self) -> Standing {
        let low = self.verdicts.iter().find(|v| v.rule.key == "low");
        if let Some(low) = low {
            let certain = self.verdicts.iter().any(|v| v.rule.code.starts_with("HP") && v.applies());
            return match (low.code.ends_with('*'), certain || low.code.starts_with("14")) {
                (true, true) => Standing::Hazardous,
                (true, false) => Standing::UntilTested,
                (false, _) if low.answer == Answer::Test => Standing::UntilTested,
                (false, _) => Standing::NotKnownHazardous,
            };
        }
        if self.codes().is_empty() {
            if self.open().is_empty() { Standing::NotKnownHazardous } else { Standing::UntilTested }
        } else {
            Standing::Hazardous
        }
    }

    /// Whether a code makes it acutely hazardous.
    #[must_use]
    pub fn acute(&self) -> bool {
        self.codes().iter().any(|c| c.starts_with('P'))
    }
}

/// The codes of each stream that these routes fill, under the rules of the site.
#[must_use]
pub fn classified<'a>(routes: &[Pouring<'a>], site: &SiteUse) -> Vec<StreamDesk<'a>> {
    let as_of = site.as_of.as_deref().and_then(|day| Day::parse(day).ok());
    let rules = Rules::of(&site.rules);
    let desk = |s: super::poured::StreamContents<'a>| StreamDesk {
        stream: s.stream,
        verdicts: classify(&s.contents, rules, as_of),
        contents: s.contents,
    };
    poured(routes, site).into_iter().map(desk).collect()
}

/// What one source of waste brings in each month; kg.
#[derive(Clone, Debug, PartialEq)]
pub struct MonthLine {
    /// The source.
    pub what: String,
    /// The workload behind it, with the index of the stream; `None` for other waste of the site.
    pub work: Option<(usize, usize)>,
    /// What is made.
    pub kg: [f64; 12],
    /// Whether it counts towards the category.
    pub counted: bool,
    /// What counts of it.
    pub counts_kg: [f64; 12],
    /// Whether it is acutely hazardous.
    pub acute: bool,
    /// Why it counts or does not.
    pub why: &'static str,
}

/// How many results of one workload a month may bring.
#[derive(Clone, Debug, PartialEq)]
pub struct Headroom {
    /// The index of the workload.
    pub workload: usize,
    /// The month, January as 0.
    pub month: usize,
    /// What each reported result adds; kg.
    pub kg_each: f64,
    /// Results planned in this month.
    pub planned: f64,
    /// Results in the month before it leaves the smallest category.
    pub as_vsqg: Option<u64>,
    /// Results in the month before it becomes a large quantity generator.
    pub as_sqg: Option<u64>,
}

/// The whole site, with one route of each workload.
#[derive(Clone, Debug)]
pub struct SiteDesk<'a> {
    /// The route of each workload; `None` where it has no account.
    pub routes: Vec<Option<Pouring<'a>>>,
    /// The streams that are filled.
    pub streams: Vec<StreamDesk<'a>>,
    /// Waste by source and month.
    pub lines: Vec<MonthLine>,
    /// What counts in each month.
    pub made: [Made; 12],
    /// The category of each month, under the rules of the United States.
    pub categories: Option<[Category; 12]>,
    /// How far each workload is from the next category in its months.
    pub headroom: Vec<Headroom>,
    /// The streams of the calendar, in the order of its lines.
    pub stored: Vec<usize>,
    /// The lines of the calendar.
    pub calendar_lines: Vec<Line>,
    /// What may be stored.
    pub storage: Storage,
    /// Containers and pick-ups.
    pub calendar: Calendar,
}

/// Draws up the desk of the whole site; `None` where the plan has no program. `routes` holds the index of the route of each workload;
/// where it holds none, the present one is taken.
///
/// ```
/// use thimbleworth::{account::{account_text, site_desk}, example::EXAMPLES};
/// let account = account_text(EXAMPLES[1].text);
/// let desk = site_desk(&account, &[]).unwrap();
/// let halogenated = &desk.streams[0];
/// assert!(halogenated.codes().contains(&"14 06 02*"));
/// ```
#[must_use]
pub fn site_desk<'a>(account: &'a Account, routes: &[Option<usize>]) -> Option<SiteDesk<'a>> {
    let program = account.program.as_ref()?;
    let site = &program.site;
    let chosen: Vec<Option<Pouring<'a>>> = program
        .workloads
        .iter()
        .zip(&account.workloads)
        .enumerate()
        .map(|(w, (work, accounts))| {
            let r = routes.get(w).copied().flatten().unwrap_or(work.present);
            let account = accounts.routes.get(r)?.as_ref()?;
            Some(Pouring { route: work.routes.get(r)?, account })
        })
        .collect();
    let all: Vec<Pouring<'a>> = chosen.iter().flatten().copied().collect();
    let streams = classified(&all, site);
    let mut lines = Vec::new();
    let mut m3 = vec![[0.0; 12]; site.streams.len()];
    for (w, (work, pouring)) in program.workloads.iter().zip(&chosen).enumerate() {
        let Some(pouring) = pouring else { continue };
        let months = work.months.iter().filter(|m| **m).count() as f64;
        for own in poured(&[*pouring], site) {
            let Some(stream) = site.streams.get(own.stream) else { continue };
            let desk = streams.iter().find(|s| s.stream == own.stream);
            let kg = own.contents.mass_kg() / months;
            let volume =
                if stream.solid { kg / stream.bulk_density_kg_m3 } else { own.contents.volume_m3() / months };
            if let Some(row) = m3.get_mut(own.stream) {
                spread(row, &work.months, volume);
            }
            let (counted, why) = counting(desk, stream.waste.counted);
            let mut line = MonthLine {
                what: [&work.name, ": ", &stream.name].concat(),
                work: Some((w, own.stream)),
                kg: [0.0; 12],
                counted,
                counts_kg: [0.0; 12],
                acute: desk.is_some_and(StreamDesk::acute),
                why,
            };
            spread(&mut line.kg, &work.months, kg);
            lines.push(line);
        }
    }
    for other in &site.waste.other {
        let mut line = MonthLine {
            what: other.name.clone(),
            work: None,
            kg: [0.0; 12],
            counted: true,
            counts_kg: [0.0; 12],
            acute: other.acute,
            why: "as the plan says",
        };
        spread(&mut line.kg, &other.months, other.kg_each_month);
        lines.push(line);
    }
    count(&mut lines, site);
    let made = made(&lines, None);
    let categories = (Rules::of(&site.rules) == Rules::Us).then(|| made.map(category));
    let room = if categories.is_some() { rooms(account, &chosen, &lines) } else { Vec::new() };
    let storage = storage(site, categories);
    let (stored, calendar_lines) = calendar_lines(site, &streams, &m3);
    let pick_ups =
        site.waste.pick_up_every_s.map_or(PickUps::Fewest, |s| PickUps::Every((s / 86_400.0) as u16));
    let calendar = simulate(&calendar_lines, &storage, pick_ups);
    Some(SiteDesk {
        routes: chosen,
        streams,
        lines,
        made,
        categories,
        headroom: room,
        stored,
        calendar_lines,
        storage,
        calendar,
    })
}

fn spread(row: &mut [f64; 12], months: &[bool; 12], each: f64) {
    for (cell, here) in row.iter_mut().zip(months) {
        if *here {
            *cell += each;
        }
    }
}

/// Whether a stream counts towards the category of the month, and why.
fn counting(desk: Option<&StreamDesk<'_>>, counted: Counted) -> (bool, &'static str) {
    match (desk.map(StreamDesk::standing), counted) {
        (None | Some(Standing::NotKnownHazardous), _) => (false, "no code applies"),
        (_, Counted::TreatedAtOnce) => {
            (false, "treated at once in a permitted unit and never stored: not counted (40 CFR 262.13(c))")
        }
        (_, Counted::ReclaimedAtOnce) => (
            false,
            "reclaimed here without having been stored: not counted; its bottoms are, where they go (40 CFR 262.13(c))",
        ),
        (_, Counted::Reclaimed) => (
            true,
            "stored, then reclaimed here: the same solvent counts once in a calendar month, its bottoms not again (262.13(d)); where the plan does not say how much goes round (goes_round), all of it is counted",
        ),
        (Some(Standing::UntilTested), _) => (true, "counted until a test clears it"),
        (Some(Standing::Hazardous), _) => {
            (true, "counted in the month in which it is made, satellite containers included, not at pick-up")
        }
    }
}

/// Says how much of each line counts: all of it, but of a reclaimed stream at most what goes round, each month once.
fn count(lines: &mut [MonthLine], site: &SiteUse) {
    for line in lines.iter_mut().filter(|l| l.counted) {
        line.counts_kg = line.kg;
    }
    for (s, stream) in site.streams.iter().enumerate() {
        let (Some(most), Counted::Reclaimed) = (stream.waste.goes_round_kg, stream.waste.counted) else {
            continue;
        };
        let of = |l: &MonthLine| l.counted && l.work.is_some_and(|(_, stream)| stream == s);
        for month in 0..12 {
            let at = |kg: &[f64; 12]| kg.get(month).copied().unwrap_or(0.0);
            let all = lines.iter().filter(|l| of(l)).fold(0.0, |sum, l| sum + at(&l.kg));
            for line in lines.iter_mut().filter(|l| of(l) && all > most) {
                // Each workload its part: mᵢ M / Σ m
                let part = at(&line.kg) * most / all;
                if let Some(kg) = line.counts_kg.get_mut(month) {
                    *kg = part;
                }
            }
        }
    }
}

/// What counts in each month, without one workload where it is named.
fn made(lines: &[MonthLine], without: Option<usize>) -> [Made; 12] {
    let mut out = [Made::default(); 12];
    let own = |l: &MonthLine| without.is_some() && l.work.map(|(w, _)| w) == without;
    for line in lines.iter().filter(|l| l.counted && !own(l)) {
        for (month, kg) in out.iter_mut().zip(line.counts_kg) {
            if line.acute {
                month.acute_kg += kg;
            } else {
                month.kg += kg;
            }
        }
    }
    out
}

fn rooms(account: &Account, chosen: &[Option<Pouring<'_>>], lines: &[MonthLine]) -> Vec<Headroom> {
    let mut out = Vec::new();
    let Some(program) = &account.program else { return out };
    for (w, (work, pouring)) in program.workloads.iter().zip(chosen).enumerate() {
        let Some(pouring) = pouring else { continue };
        let months = work.months.iter().filter(|m| **m).count() as f64;
        let planned = pouring.account.runs.results / months;
        let base = made(lines, Some(w));
        for (month, base) in base.into_iter().enumerate().filter(|(m, _)| work.months.get(*m) == Some(&true))
        {
            let mut kg = 0.0;
            for line in
                lines.iter().filter(|l| l.counted && !l.acute && l.work.map(|(own, _)| own) == Some(w))
            {
                kg += line.counts_kg.get(month).copied().unwrap_or(0.0);
            }
            let kg_each = kg / planned;
            if kg_each > 0.0 {
                out.push(Headroom {
                    workload: w,
                    month,
                    kg_each,
                    planned,
                    as_vsqg: headroom(base, kg_each, Category::Vsqg),
                    as_sqg: headroom(base, kg_each, Category::Sqg),
                });
            }
        }
    }
    out
}

fn storage(site: &SiteUse, categories: Option<[Category; 12]>) -> Storage {
    let own = site.waste.storage_limit_s.map(|s| (s / 86_400.0) as u16);
    let days = |c: Option<Category>| {
        let rule = c.and_then(|c| c.storage_days(site.waste.far_receiver));
        match (own, rule) {
            (Some(own), Some(rule)) => Some(if own < rule { own } else { rule }),
            (own, rule) => own.or(rule),
        }
    };
    match categories {
        Some(c) => Storage { days: c.map(|c| days(Some(c))), kg: c.map(Category::on_site_kg) },
        None => Storage { days: [days(None); 12], kg: [None; 12] },
    }
}

/// The streams that are stored in containers, as the calendar needs them.
fn calendar_lines(site: &SiteUse, streams: &[StreamDesk<'_>], m3: &[[f64; 12]]) -> (Vec<usize>, Vec<Line>) {
    let (mut stored, mut lines) = (Vec::new(), Vec::new());
    for s in streams {
        let (Some(stream), Some(m3)) = (site.streams.get(s.stream), m3.get(s.stream)) else { continue };
        let Some(container_m3) = stream.container_m3 else { continue };
        if matches!(stream.waste.counted, Counted::TreatedAtOnce | Counted::ReclaimedAtOnce) {
            continue;
        }
        let density = if stream.solid { Some(stream.bulk_density_kg_m3) } else { s.contents.density_kg_m3() };
        let us = Rules::of(&site.rules) == Rules::Us;
        stored.push(s.stream);
        lines.push(Line {
            name: stream.name.clone(),
            m3: *m3,
            density_kg_m3: density.unwrap_or(1000.0),
            takes_m3: container_m3 * stream.fill,
            clock: if us && stream.waste.satellite { Clock::WhenFull } else { Clock::FirstDrop },
        });
    }
    (stored, lines)
}
