//! The draws of one route: a column for each figure that is shown.

use crate::account::{Figure, RouteAccount, evaluate_these, with_what_they_rest_on};
use crate::chance::{Draw, Summary, contribution, summary};
use crate::ledger::StepIx;
use crate::plan::Route;
use crate::program::{Desk, RouteProgram};
use crate::quantity::Spread;

/// Above this share of draws that stopped, what the others say is no interval of the figure.
pub const MOST_STOPPED: f64 = 0.05;

/// Draws that stopped at one step for one kind of reason.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Stopped {
    /// The step.
    pub step: StepIx,
    /// The reason in short.
    pub why: &'static str,
    /// How many draws.
    pub draws: u32,
}

/// One figure over all draws.
#[derive(Clone)]
struct Column {
    id: String,
    /// Its index among the figures of the account.
    figure: usize,
    /// Its value in each draw; 0 where the draw stopped.
    values: Vec<f64>,
}

/// The draws of one route.
#[derive(Clone)]
pub struct RouteColumns {
    doc: Route,
    columns: Vec<Column>,
    /// The figures that are evaluated: those of the columns, and those that they rest on.
    order: Vec<usize>,
    uncertain: Vec<usize>,
    done: u32,
    /// The numbers of the draws that stopped, ascending.
    stopped: Vec<u32>,
    kinds: Vec<Stopped>,
    /// How often each step took longer than the plan says.
    longer: Vec<(StepIx, u32)>,
    x: Vec<f64>,
    values: Vec<f64>,
    desk: Desk,
}

impl RouteColumns {
    pub(super) fn new(
        doc: &Route,
        route: &RouteProgram,
        account: &RouteAccount,
        wanted: &dyn Fn(&Figure) -> bool,
    ) -> Self {
        let shown: Vec<usize> = (0..account.figures.len()).filter(|i| wanted(&account.figures[*i])).collect();
        let order = with_what_they_rest_on(&account.figures, &shown);
        let columns = shown
            .into_iter()
            .map(|figure| Column { id: account.figures[figure].id.clone(), figure, values: Vec::new() })
            .collect();
        Self {
            doc: doc.clone(),
            columns,
            order,
            uncertain: (0..route.inputs.len()).filter(|i| route.inputs[*i].spread != Spread::Exact).collect(),
            done: 0,
            stopped: Vec::new(),
            kinds: Vec::new(),
            longer: Vec::new(),
            x: route.central(),
            values: vec![0.0; account.figures.len()],
            desk: route.desk(),
        }
    }

    /// Whether these columns are what the fresh ones, still empty, would become.
    pub(super) fn serves(&self, fresh: &Self) -> bool {
        let ids = |c: &Self| c.columns.iter().map(|c| (c.figure, c.id.clone())).collect::<Vec<_>>();
        self.doc == fresh.doc && ids(self) == ids(fresh)
    }

    pub(super) fn width(&self) -> usize {
        self.columns.len()
    }

    /// Drops what lies beyond so many draws.
    pub(super) fn at_most(&mut self, draws: u32) {
        if self.done > draws {
            for column in &mut self.columns {
                column.values.clear();
            }
            self.done = 0;
            self.stopped.clear();
            self.kinds.clear();
            self.longer.clear();
        }
    }

    pub(super) fn run(&mut self, route: &RouteProgram, account: &RouteAccount, seed: u64, count: u32) {
        for column in &mut self.columns {
            column.values.reserve(count as usize);
        }
        for draw in self.done..self.done + count {
            for &i in &self.uncertain {
                self.x[i] = route.inputs[i].draw(seed, u64::from(draw));
            }
            let mut found = None;
            match route.run(Draw(&self.x), &mut self.desk, None) {
                Ok(()) => {
                    evaluate_these(
                        &account.figures,
                        &self.order,
                        &self.desk,
                        Draw(&self.x),
                        &mut self.values,
                    );
                    self.tell_longer();
                    if !self.columns.iter().all(|c| self.values[c.figure].is_finite()) {
                        found = Some((StepIx::Closing, "a figure that is not finite"));
                    }
                }
                Err(failure) => found = Some((failure.step, failure.halt.in_short())),
            }
            if let Some((step, why)) = found {
                self.stopped.push(draw);
                match self.kinds.iter_mut().find(|k| k.step == step && k.why == why) {
                    Some(kind) => kind.draws += 1,
                    None => self.kinds.push(Stopped { step, why, draws: 1 }),
                }
            }
            for column in &mut self.columns {
                column.values.push(if found.is_none() { self.values[column.figure] } else { 0.0 });
            }
        }
        self.done += count;
    }

    fn tell_longer(&mut self) {
        let mut left = self.desk.longer;
        while left != 0 {
            let step = StepIx::Step(u16::try_from(left.trailing_zeros()).unwrap_or(0));
            match self.longer.iter_mut().find(|(s, _)| *s == step) {
                Some((_, draws)) => *draws += 1,
                None => self.longer.push((step, 1)),
            }
            left &= left - 1;
        }
    }

    /// The steps that took longer than the plan says, because the numbers of a draw asked for it, and in how many draws: they
    /// count like the others, with the longer time.
    #[must_use]
    pub fn longer(&self) -> &[(StepIx, u32)] {
        &self.longer
    }

    /// How many draws have been run.
    #[must_use]
    pub const fn done(&self) -> u32 {
        self.done
    }

    /// Why draws stopped, each kind with its count. They are left out of every column.
    #[must_use]
    pub fn stopped(&self) -> &[Stopped] {
        &self.kinds
    }

    /// The share of draws that stopped.
    #[must_use]
    pub fn stopped_share(&self) -> f64 {
        if self.done == 0 { 0.0 } else { self.stopped.len() as f64 / f64::from(self.done) }
    }

    /// The ids of the figures drawn.
    pub fn ids(&self) -> impl Iterator<Item = &str> {
        self.columns.iter().map(|c| c.id.as_str())
    }

    /// Every draw of a figure, 0 where the run stopped.
    pub(crate) fn column(&self, id: &str) -> Option<&[f64]> {
        self.columns.iter().find(|c| c.id == id).map(|c| c.values.as_slice())
    }

    /// The numbers of the draws that ran, up to `until`, on this route and on another one.
    pub(crate) fn kept<'a>(&'a self, other: &'a Self, until: u32) -> impl Iterator<Item = u32> + 'a {
        let (mut mine, mut theirs) = (self.stopped.iter().peekable(), other.stopped.iter().peekable());
        let ends = [self.done, other.done, until].into_iter().min().unwrap_or(0);
        (0..ends).filter(move |draw| {
            let a = mine.next_if_eq(&draw).is_some();
            let b = theirs.next_if_eq(&draw).is_some();
            !(a || b)
        })
    }

    /// What the draws of a figure say; `None` where there are too few, where too many stopped, or where the figure is not
    /// drawn.
    #[must_use]
    pub fn summary(&self, id: &str, coverage: f64) -> Option<Summary> {
        if self.stopped_share() > MOST_STOPPED {
            return None;
        }
        let column = self.column(id)?;
        let mut values: Vec<f64> = if self.stopped.is_empty() {
            column.to_vec()
        } else {
            self.kept(self, self.done).map(|d| column[d as usize]).collect()
        };
        summary(&mut values, coverage)
    }

    /// To first order: what each uncertain input contributes to each figure, `cᵢ u(xᵢ)`: the key of the input, and the
    /// contributions in the order of [`RouteColumns::ids`]. `None` where a run a standard uncertainty away stops.
    #[must_use]
    pub fn contributions(
        &self,
        route: &RouteProgram,
        account: &RouteAccount,
    ) -> Option<Vec<(u64, Vec<f64>)>> {
        let (mut x, mut desk) = (route.central(), route.desk());
        let (mut above, mut below) = (self.values.clone(), self.values.clone());
        let mut rows = Vec::new();
        for &i in &self.uncertain {
            let (central, u) = (x[i], route.inputs[i].spread.standard_uncertainty());
            for (value, out) in [(central + u, &mut above), (central - u, &mut below)] {
                x[i] = value;
                route.run(Draw(&x), &mut desk, None).ok()?;
                evaluate_these(&account.figures, &self.order, &desk, Draw(&x), out);
            }
            x[i] = central;
            let row = self.columns.iter().map(|c| contribution(above[c.figure], below[c.figure])).collect();
            rows.push((route.inputs[i].key, row));
        }
        Some(rows)
    }
}
