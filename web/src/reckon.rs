//! The account as the page shows it: of everything that can be accounted, with the rest named.
//!
//! The core gives no figures for a plan with an error. While an amount is half typed, or a route is still being written, the
//! page leaves that route out and accounts for the others; where nothing is left, the last figures stay, marked as old.
use crate::show::unbroken;
use std::rc::Rc;
use thimbleworth::account::{Account, Figure, Measure, RouteAccount, account, account_text};
use thimbleworth::compare::{Comparison, RouteComparison, compare};
use thimbleworth::order::{self, Index};
use thimbleworth::plan::{Plan, Problem, Severity, save};
use thimbleworth::program::{RouteProgram, SiteUse};

/// For how much work figures are shown.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub enum Basis {
    /// A year's work.
    #[default]
    Year,
    /// A month's, a twelfth.
    Month,
    /// One batch.
    Batch,
    /// One reported result.
    Result,
    /// One kilogram of product.
    Product,
}

impl Basis {
    /// All, in the order of the list.
    pub const ALL: [Self; 5] = [Self::Year, Self::Month, Self::Batch, Self::Result, Self::Product];

    /// The words behind a unit: "kg a year".
    #[must_use]
    pub const fn words(self) -> &'static str {
        match self {
            Self::Year => "a year",
            Self::Month => "a month",
            Self::Batch => "a batch",
            Self::Result => "a reported result",
            Self::Product => "a kilogram of product",
        }
    }

    /// A yearly figure on this basis; nothing where there is no product.
    #[must_use]
    pub fn of(self, account: &RouteAccount, a_year: f64) -> Option<f64> {
        match self {
            Self::Year => Some(a_year),
            Self::Month => Some(a_year / 12.0),
            Self::Batch => Some(account.per_batch(a_year)),
            Self::Result => Some(account.per_result(a_year)),
            Self::Product => account.per_kg_product(a_year),
        }
    }
}

/// Everything the page shows of a plan.
pub struct Reckoned {
    /// What is wrong or doubtful in the plan as it stands, worst first.
    pub problems: Vec<Problem>,
    /// The figures.
    pub book: Rc<Book>,
    /// Whether the figures are those of an earlier state of the plan.
    pub old: bool,
    /// Whether nothing has been accounted yet, because the page is still being put up.
    pub pending: bool,
}

/// The figures of every piece of work.
pub struct Book {
    /// The account of what could be accounted.
    pub account: Account,
    /// The pieces of work, as they stand in the plan.
    pub works: Vec<Work>,
}

/// One piece of work.
pub struct Work {
    /// Its name.
    pub name: String,
    /// The place of the present route in the plan.
    pub present: Option<usize>,
    /// The routes, as they stand in the plan.
    pub routes: Vec<Column>,
    /// Its index in the account.
    at: Option<usize>,
    /// The comparison, where the present route has an account.
    comparison: Option<Comparison>,
}

/// One route.
pub struct Column {
    /// Its name.
    pub name: String,
    /// How many errors keep it from being accounted.
    pub errors: usize,
    /// Its index in the account of the work.
    at: Option<usize>,
    /// Its figures by id.
    index: Index<'static>,
}

impl Reckoned {
    /// How many problems are of this severity.
    #[must_use]
    pub fn count(&self, severity: Severity) -> usize {
        self.problems.iter().filter(|p| p.severity == severity).count()
    }

    /// The account of `plan`, whose text is `text`. `before` are the figures to fall back on.
    #[must_use]
    pub fn new(plan: &Plan, text: &str, before: Option<&Rc<Book>>) -> Self {
        let full = account_text(text);
        let mut problems = full.problems.clone();
        if full.program.is_some() {
            let book = Rc::new(Book::new(plan, full, &whole(plan), &problems));
            return Self { problems, book, old: false, pending: false };
        }
        let kept = whatever_holds(plan, &problems);
        if kept.iter().any(|routes| !routes.is_empty()) {
            let partial = account(&only(plan, &kept));
            if partial.program.is_some() {
                for problem in &partial.problems {
                    let path = path_in_plan(&problem.path, &kept);
                    if !problems.iter().any(|p| p.path == path && p.found == problem.found) {
                        problems.push(Problem { path, ..problem.clone() });
                    }
                }
                order::sort(&mut problems, &|a, b| a.severity < b.severity);
                let book = Rc::new(Book::new(plan, partial, &kept, &problems));
                return Self { problems, book, old: false, pending: false };
            }
        }
        match before {
            Some(book) if book.fits(plan) => {
                Self { problems, book: Rc::clone(book), old: true, pending: false }
            }
            _ => {
                let book = Rc::new(Book::none(plan, &problems));
                Self { problems, book, old: false, pending: false }
            }
        }
    }

    /// Nothing yet: what the page begins with, so that it can be typed into before its figures stand.
    #[must_use]
    pub fn pending(plan: &Plan) -> Self {
        Self { problems: Vec::new(), book: Rc::new(Book::none(plan, &[])), old: false, pending: true }
    }

    /// As [`new`](Self::new), with nothing to fall back on.
    #[must_use]
    pub fn of(plan: &Plan) -> Self {
        Self::new(plan, &save(plan), None)
    }
}

/// The routes of each workload that stay: all of them.
fn whole(plan: &Plan) -> Vec<Vec<usize>> {
    plan.workloads.iter().map(|w| (0..w.routes.len()).collect()).collect()
}

/// The routes of each workload that no error touches.
fn whatever_holds(plan: &Plan, problems: &[Problem]) -> Vec<Vec<usize>> {
    let mut kept = whole(plan);
    for problem in problems.iter().filter(|p| p.severity == Severity::Error) {
        match route_in(&problem.path) {
            (Some(w), Some(r)) => {
                if let Some(routes) = kept.get_mut(w) {
                    routes.retain(|i| *i != r);
                }
            }
            (Some(w), None) => {
                if let Some(routes) = kept.get_mut(w) {
                    routes.clear();
                }
            }
            // The title stands in no figure.
            (None, _) if problem.path == "title" || problem.path == "site.name" => {}
            (None, _) => kept.iter_mut().for_each(Vec::clear),
        }
    }
    kept
}

/// The workload and the route that a path lies in.
fn route_in(path: &str) -> (Option<usize>, Option<usize>) {
    let number = |rest: &str| rest.split_once(']').and_then(|(n, _)| n.parse().ok());
    let Some(rest) = path.strip_prefix("workloads[") else { return (None, None) };
    let route = rest.split_once("].routes[").and_then(|(_, rest)| number(rest));
    (number(rest), route)
}

/// The plan with these routes alone, and without the workloads that have none left.
fn only(plan: &Plan, kept: &[Vec<usize>]) -> Plan {
    let mut out = plan.clone();
    out.workloads.clear();
    for (workload, routes) in plan.workloads.iter().zip(kept).filter(|(_, routes)| !routes.is_empty()) {
        let mut left = workload.clone();
        left.routes = routes.iter().filter_map(|r| workload.routes.get(*r).cloned()).collect();
        out.workloads.push(left);
    }
    out
}

/// A path of the plan that [`only`] made, in the plan that it was made of.
fn path_in_plan(path: &str, kept: &[Vec<usize>]) -> String {
    let (Some(w), r) = route_in(path) else { return path.to_owned() };
    let Some((at, routes)) = kept.iter().enumerate().filter(|(_, routes)| !routes.is_empty()).nth(w) else {
        return path.to_owned();
    };
    let rest = path.split_once(']').map_or("", |(_, rest)| rest);
    match r.and_then(|r| routes.get(r)) {
        Some(route) => {
            let rest = rest.trim_start_matches(".routes[").split_once(']').map_or("", |(_, rest)| rest);
            format!("workloads[{at}].routes[{route}]{rest}")
        }
        None => format!("workloads[{at}]{rest}"),
    }
}

impl Book {
    fn new(plan: &Plan, account: Account, kept: &[Vec<usize>], problems: &[Problem]) -> Self {
        let mut works = Vec::new();
        let mut next = 0;
        for (w, workload) in plan.workloads.iter().enumerate() {
            let routes_kept = kept.get(w).map_or(&[][..], Vec::as_slice);
            let at = (!routes_kept.is_empty()).then_some(next);
            next += usize::from(at.is_some());
            let accounts = at.and_then(|at| account.workloads.get(at));
            let columns = workload.routes.iter().enumerate().map(|(r, route)| {
                let position = routes_kept.iter().position(|kept| *kept == r);
                let found = position.and_then(|i| accounts?.routes.get(i)?.as_ref());
                let mut index = Index::default();
                for (i, figure) in found.iter().flat_map(|a| a.figures.iter().enumerate()) {
                    index.put(figure.id.clone(), i);
                }
                let errors = problems
                    .iter()
                    .filter(|p| p.severity == Severity::Error)
                    .filter(|p| match route_in(&p.path) {
                        (Some(pw), Some(pr)) => (pw, pr) == (w, r),
                        (Some(pw), None) => pw == w,
                        (None, _) => true,
                    })
                    .count();
                Column { name: route.name.clone(), errors, at: position.filter(|_| found.is_some()), index }
            });
            let routes: Vec<Column> = columns.collect();
            let present = workload.routes.iter().position(|r| r.name == workload.present);
            // The core takes the first route where the present one is left out; that would compare with the wrong one.
            let comparison = present
                .and_then(|p| routes.get(p))
                .and_then(|column| column.at)
                .and(at)
                .and_then(|at| compare(&account, at));
            works.push(Work { name: workload.name.clone(), present, routes, at, comparison });
        }
        Self { account, works }
    }

    /// Without any figures.
    fn none(plan: &Plan, problems: &[Problem]) -> Self {
        let none = Account { plan: None, program: None, workloads: Vec::new(), problems: Vec::new() };
        Self::new(plan, none, &[], problems)
    }

    /// Whether these figures can stand in for those of `plan`: the same works with as many routes.
    fn fits(&self, plan: &Plan) -> bool {
        self.works.len() == plan.workloads.len()
            && self.works.iter().zip(&plan.workloads).all(|(a, b)| a.routes.len() == b.routes.len())
            && self.works.iter().any(|w| w.at.is_some())
    }

    /// The site as the accounts know it.
    #[must_use]
    pub fn site(&self) -> Option<&SiteUse> {
        self.account.program.as_ref().map(|p| &p.site)
    }

    /// The account of a route and the route itself; workload and route as they stand in the plan.
    #[must_use]
    pub fn route(&self, w: usize, r: usize) -> Option<(&RouteProgram, &RouteAccount)> {
        let work = self.works.get(w)?;
        let (at, column) = (work.at?, work.routes.get(r)?);
        let program = self.account.program.as_ref()?.workloads.get(at)?.routes.get(column.at?)?;
        let account = self.account.workloads.get(at)?.routes.get(column.at?)?.as_ref()?;
        Some((program, account))
    }

    /// Where a piece of work and one of its routes stand in the account itself; for what reads the account directly.
    #[must_use]
    pub fn in_account(&self, w: usize, r: usize) -> Option<(usize, usize)> {
        let work = self.works.get(w)?;
        Some((work.at?, work.routes.get(r)?.at?))
    }

    /// A figure of a route and its value: a year for what grows with the work, SI.
    #[must_use]
    pub fn figure(&self, w: usize, r: usize, id: &str) -> Option<(&Figure, f64)> {
        let (_, account) = self.route(w, r)?;
        let i = self.works.get(w)?.routes.get(r)?.index.get(id)?;
        Some((account.figures.get(i)?, *account.values.get(i)?))
    }

    /// The value of a figure on a basis. What grows with the work and is not drawn up on an accounted route is nothing of
    /// it: zero.
    #[must_use]
    pub fn value(&self, w: usize, r: usize, id: &str, measure: Measure, basis: Basis) -> Option<f64> {
        let (_, account) = self.route(w, r)?;
        let value = self.figure(w, r, id).map(|(figure, value)| match basis {
            Basis::Year => value,
            _ => account.shared(figure, value),
        });
        if measure.extensive() { basis.of(account, value.unwrap_or(0.0)) } else { value }
    }

    /// How a route stands beside the present one.
    #[must_use]
    pub fn beside(&self, w: usize, r: usize) -> Option<&RouteComparison> {
        let work = self.works.get(w)?;
        let at = work.routes.get(r)?.at?;
        work.comparison.as_ref()?.routes.iter().find(|c| c.route == at)
    }

    /// The finding of a piece of work: a sentence a route, and what keeps a route out.
    #[must_use]
    pub fn finding(&self, w: usize) -> Vec<String> {
        let Some(work) = self.works.get(w) else { return Vec::new() };
        let mut out = Vec::new();
        if work.routes.iter().all(|column| column.at.is_none()) {
            out.push("Nothing can be accounted yet.".to_owned());
            return out;
        }
        let present = work.present.and_then(|p| work.routes.get(p));
        if let Some(column) = present.filter(|column| column.at.is_none()) {
            out.push(format!(
                "Nothing can be compared until {} can be accounted: it is the present route.",
                column.name
            ));
        }
        for (r, column) in work.routes.iter().enumerate() {
            if column.at.is_none() {
                if Some(r) != work.present {
                    out.push(format!("{} is left out: {} to mend.", column.name, things(column.errors)));
                }
            } else if let Some(beside) = self.beside(w, r) {
                out.push(unbroken(&beside.finding));
            }
        }
        if out.is_empty() {
            let name = present.map_or("", |column| column.name.as_str());
            out.push(format!("{name} stands alone: a second route would give something to compare it with."));
        }
        out
    }
}

/// "1 thing", "3 things".
#[must_use]
pub fn things(n: usize) -> String {
    if n == 1 { "1 thing".to_owned() } else { format!("{n} things") }
}

#[cfg(test)]
mod tests;
