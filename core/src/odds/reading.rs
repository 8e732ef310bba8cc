//! What the draws say of a figure: intervals of every route, odds against the present one, and what matters most.

use super::column::{MOST_STOPPED, RouteColumns};
use super::name::input_words;
use super::sampled::Sampled;
use crate::account::{Account, Figure, Measure, RouteAccount};
use crate::chance::{Input, Summary, combined_uncertainty, summary, variance_share};
use crate::compare::absent_is_zero;
use crate::order;
use crate::program::{RouteProgram, WorkloadProgram};
use crate::quantity::{Origin, Spread};
use std::cell::OnceCell;

/// Shares of variance are taken from so many draws at most: more would sharpen the third digit of a share.
const DRAWS_FOR_SHARES: u32 = 20_000;

/// One workload of a sampled plan, ready to be asked.
pub struct Reading<'a> {
    sampled: &'a Sampled,
    index: usize,
    work: &'a WorkloadProgram,
    routes: Vec<Option<RouteReading<'a>>>,
    coverage: f64,
}

/// What each input, by its key, contributes to each figure.
type Contributions = Vec<(u64, Vec<f64>)>;

struct RouteReading<'a> {
    program: &'a RouteProgram,
    account: &'a RouteAccount,
    columns: &'a RouteColumns,
    /// By input key, to first order, in the order of the columns. Runs the route twice for every input, so only once asked for.
    contributions: OnceCell<Option<Contributions>>,
}

/// One figure on every route.
#[derive(Clone, Debug)]
pub struct FigureReading {
    /// The figure's id.
    pub id: String,
    /// Its title.
    pub title: String,
    /// What it measures.
    pub measure: Measure,
    /// On each route of the workload; `None` where a route has no such figure or no account.
    pub routes: Vec<Option<Spreading>>,
    /// Every other route beside the present one.
    pub rivals: Vec<Rival>,
}

/// One figure of one route; SI.
#[derive(Clone, Copy)]
pub struct Brief<'a> {
    /// The figure.
    pub figure: &'a Figure,
    /// With every input at its central value.
    pub central: f64,
    /// What the draws say; `None` where too few ran.
    pub drawn: Option<Summary>,
    /// The shares of draws with less than on the present route, and with the same; `None` of the present route itself.
    pub odds: Option<(f64, f64)>,
}

/// How far a figure of a route spreads; SI.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Spreading {
    /// With every input at its central value.
    pub central: f64,
    /// What the draws say; `None` where too few ran.
    pub drawn: Option<Summary>,
    /// The standard uncertainty to first order; `None` where a run a standard uncertainty away stops.
    pub first_order_u: Option<f64>,
}

/// A route beside the present one, draw by draw.
#[derive(Clone, Debug)]
pub struct Rival {
    /// The index of the route.
    pub route: usize,
    /// Draws that ran on both.
    pub draws: usize,
    /// The share of them in which the route has less of the figure than the present route.
    pub less: f64,
    /// The share in which both have the same.
    pub same: f64,
    /// Route less present.
    pub difference: Option<Summary>,
    /// The standard uncertainty of the difference, to first order.
    pub first_order_u: Option<f64>,
}

/// An input with the share of a variance that it explains by itself.
#[derive(Clone, Debug, PartialEq)]
pub struct Matter {
    /// The input's identity: its path in the plan, or the material and property.
    pub identity: String,
    /// The same in words.
    pub words: String,
    /// Its share of the variance, 0 to 1.
    pub share: f64,
    /// Whether the plan says that it is not known, or leaves it to a default.
    pub origin: Origin,
}

impl Spreading {
    /// Whether the first-order interval agrees with the drawn one to one digit of the standard uncertainty: JCGM
    /// 101:2008, 8.1, with one significant digit. `None` where one of the two is missing.
    #[must_use]
    pub fn agrees(&self, coverage: f64) -> Option<bool> {
        let (drawn, u) = (self.drawn?, self.first_order_u?);
        let k = crate::chance::normal_quantile(0.5 + coverage / 2.0);
        // u = c × 10^l with one digit c; δ = 10^l / 2
        let delta = 0.5 * libm::pow(10.0, libm::floor(libm::log10(drawn.u)));
        // d_low = |y − U − y_low|, d_high = |y + U − y_high|
        let low = (self.central - k * u - drawn.symmetric.low).abs();
        let high = (self.central + k * u - drawn.symmetric.high).abs();
        Some(drawn.u == 0.0 || (low <= delta && high <= delta))
    }
}

impl<'a> Reading<'a> {
    /// Begins to read a workload; `coverage` is a probability such as 0.95. `None` where the plan has no such workload or
    /// its account is not the one that was followed.
    #[must_use]
    pub fn new(account: &'a Account, sampled: &'a Sampled, workload: usize, coverage: f64) -> Option<Self> {
        let work = account.program.as_ref()?.workloads.get(workload)?;
        let found = &account.workloads.get(workload)?.routes;
        let mut routes = Vec::new();
        for (i, program) in work.routes.iter().enumerate() {
            let account = found.get(i).and_then(Option::as_ref);
            routes.push(account.zip(sampled.route(workload, i)).map(|(account, columns)| RouteReading {
                program,
                account,
                columns,
                contributions: OnceCell::new(),
            }));
        }
        Some(Self { sampled, index: workload, work, routes, coverage })
    }

    /// The index of the workload.
    #[must_use]
    pub const fn workload(&self) -> usize {
        self.index
    }

    /// The probability that an interval holds.
    #[must_use]
    pub const fn coverage(&self) -> f64 {
        self.coverage
    }

    /// The draws of a route.
    #[must_use]
    pub fn columns(&self, route: usize) -> Option<&RouteColumns> {
        self.at(route).map(|r| r.columns)
    }

    /// The ids of the figures drawn on any route, in the order of the accounts.
    #[must_use]
    pub fn ids(&self) -> Vec<&str> {
        let mut ids: Vec<&str> = Vec::new();
        for id in self.routes.iter().flatten().flat_map(|r| r.columns.ids()) {
            if !ids.contains(&id) {
                ids.push(id);
            }
        }
        ids
    }

    fn at(&self, route: usize) -> Option<&RouteReading<'a>> {
        self.routes.get(route)?.as_ref()
    }

    fn figure_of(&self, id: &str) -> Option<&'a Figure> {
        self.routes.iter().flatten().find_map(|r| r.account.figures.iter().find(|f| f.id == id))
    }

    /// One figure of one route by itself, which takes a fraction of what [`Reading::figure`] takes: its central value, what
    /// its draws say, and the shares of draws in which it is less than that of the present route and the same. `None` where
    /// the route has no such figure.
    #[must_use]
    pub fn brief(&self, id: &str, route: usize) -> Option<Brief<'a>> {
        let (figure, this) = self.figure_of(id).zip(self.at(route))?;
        let beside = self.at(self.work.present).filter(|_| route != self.work.present);
        Some(Brief {
            figure,
            central: this.account.value(id)?,
            drawn: this.columns.summary(id, self.coverage),
            odds: beside.and_then(|present| Some(odds(&differences(figure, present, this, u32::MAX)?))),
        })
    }

    /// What the draws say of a figure; `None` where no route has it.
    #[must_use]
    pub fn figure(&self, id: &str) -> Option<FigureReading> {
        let figure = self.figure_of(id)?;
        let routes = self.routes.iter().map(|r| {
            let r = r.as_ref()?;
            Some(Spreading {
                central: r.account.value(id)?,
                drawn: r.columns.summary(id, self.coverage),
                first_order_u: r.first_order(id).map(|c| u_of(&c)),
            })
        });
        let present = self.work.present;
        let others = (0..self.routes.len()).filter(|i| *i != present);
        Some(FigureReading {
            id: id.to_owned(),
            title: figure.title.clone(),
            measure: figure.measure,
            routes: routes.collect(),
            rivals: others.filter_map(|i| self.rival(figure, i)).collect(),
        })
    }

    fn rival(&self, figure: &Figure, route: usize) -> Option<Rival> {
        let (present, other) = (self.at(self.work.present)?, self.at(route)?);
        let mut differences = differences(figure, present, other, u32::MAX)?;
        let ran = differences.len();
        let (less, same) = odds(&differences);
        let (a, b) = (present.columns.done(), other.columns.done());
        let said = ran as f64 >= (1.0 - MOST_STOPPED) * f64::from(if a < b { a } else { b });
        let first_order = || {
            let (mut rows, other) = (present.first_order(&figure.id)?, other.first_order(&figure.id)?);
            for row in &mut rows {
                row.1 = -row.1;
            }
            for (key, c) in other {
                match rows.iter_mut().find(|(k, _)| *k == key) {
                    Some(row) => row.1 += c,
                    None => rows.push((key, c)),
                }
            }
            Some(u_of(&rows))
        };
        Some(Rival {
            route,
            draws: ran,
            less,
            same,
            difference: if said { summary(&mut differences, self.coverage) } else { None },
            first_order_u: first_order(),
        })
    }

    /// The inputs that explain most of how far a figure of a route spreads, or of how far it differs from that of the route
    /// `against`: largest first; those below a thousandth, or below what chance alone would show, are left out. What they do not add up to is due to inputs that act
    /// together. Empty with too few draws.
    #[must_use]
    pub fn matters(&self, id: &str, route: usize, against: Option<usize>) -> Vec<Matter> {
        let Some((figure, this)) = self.figure_of(id).zip(self.at(route)) else { return Vec::new() };
        let other = match against {
            Some(other) => match self.at(other) {
                Some(other) => Some(other),
                None => return Vec::new(),
            },
            None => None,
        };
        let values = match other {
            Some(other) => differences(figure, other, this, DRAWS_FOR_SHARES),
            None => column(figure, this, this, DRAWS_FOR_SHARES),
        };
        let Some(values) = values else { return Vec::new() };
        // The share of an input without influence scatters by √(2 · 31)/N around 0: three times that is nothing.
        let by_chance = 24.0 / values.len() as f64;
        let least = if by_chance > 1e-3 { by_chance } else { 1e-3 };
        let mut inputs: Vec<&Input> = Vec::new();
        for input in [Some(this), other].into_iter().flatten().flat_map(|r| &r.program.inputs) {
            if input.spread != Spread::Exact && !inputs.iter().any(|i| i.key == input.key) {
                inputs.push(input);
            }
        }
        let beside = other.unwrap_or(this).columns;
        let mut out = Vec::new();
        for input in inputs {
            let draws = this.columns.kept(beside, DRAWS_FOR_SHARES).map(u64::from);
            let share = variance_share(draws, &values, input.key, self.sampled.seed());
            if let Some(share) = share.filter(|s| *s >= least) {
                let words = input_words(self.work, &input.identity);
                out.push(Matter { identity: input.identity.clone(), words, share, origin: input.origin });
            }
        }
        order::sort(&mut out, &|a, b| a.share > b.share);
        out
    }
}

impl RouteReading<'_> {
    /// By the key of each input, what it contributes to a figure; nothing where the route has none of it.
    fn first_order(&self, id: &str) -> Option<Vec<(u64, f64)>> {
        let found = self.contributions.get_or_init(|| self.columns.contributions(self.program, self.account));
        let rows = found.as_ref()?;
        let Some(at) = self.columns.ids().position(|i| i == id) else { return Some(Vec::new()) };
        Some(rows.iter().map(|(key, row)| (*key, row.get(at).copied().unwrap_or(0.0))).collect())
    }
}

/// The shares of differences that are less than nothing, and nothing.
fn odds(differences: &[f64]) -> (f64, f64) {
    let (mut less, mut same) = (0_u32, 0_u32);
    for d in differences {
        less += u32::from(*d < 0.0);
        same += u32::from(*d == 0.0);
    }
    let ran = differences.len();
    let share = |n: u32| if ran > 0 { f64::from(n) / ran as f64 } else { 0.0 };
    (share(less), share(same))
}

fn u_of(rows: &[(u64, f64)]) -> f64 {
    let c: Vec<f64> = rows.iter().map(|r| r.1).collect();
    combined_uncertainty(&c, &[])
}

/// The draws of a figure of `this` that ran on both routes, up to `until`.
fn column(
    figure: &Figure,
    this: &RouteReading<'_>,
    beside: &RouteReading<'_>,
    until: u32,
) -> Option<Vec<f64>> {
    let draws = this.columns.kept(beside.columns, until);
    match this.columns.column(&figure.id) {
        Some(values) => Some(draws.map(|d| values[d as usize]).collect()),
        None => absent_is_zero(this.program, figure).then(|| draws.map(|_| 0.0).collect()),
    }
}

/// Other less present, draw by draw.
fn differences(
    figure: &Figure,
    present: &RouteReading<'_>,
    other: &RouteReading<'_>,
    until: u32,
) -> Option<Vec<f64>> {
    let mut values = column(figure, other, present, until)?;
    let before = column(figure, present, other, until)?;
    for (value, before) in values.iter_mut().zip(before) {
        *value -= before;
    }
    Some(values)
}
