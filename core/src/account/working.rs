//! Opening a figure: the postings and utilities behind it.

use super::figure::{Entry, Factor, Figure, How};
use super::mass::place_name;
use super::open::{RouteAccount, rule_of};
use crate::chance::Draw;
use crate::ledger::{Direction, Place, Posting, StepIx};
use crate::order;
use crate::program::{RouteProgram, SiteUse};

/// What one entry of the book adds to a figure.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Contribution {
    /// A posting: its index in the trace, and what it adds; SI, a year.
    Posting {
        /// The index among the postings.
        index: usize,
        /// What it adds to the figure; SI, a year.
        amount_si: f64,
    },
    /// A utility spent: its index in the trace, and what it adds; SI, a year.
    Spending {
        /// The index among the utilities spent.
        index: usize,
        /// What it adds to the figure; SI, a year.
        amount_si: f64,
    },
}

/// Whether a posting takes something out of a waste stream again, so that it counts against what has passed into it.
fn left_again(posting: &Posting, place: Place, direction: Direction) -> bool {
    direction == Direction::Into && posting.from == place && place.stream_index().is_some()
}

/// What lies behind a figure, largest first; zeros are left out.
///
/// Behind a number of containers lies what is behind its volume; a ratio or a multiple has the figures behind it that
/// [`How`] names, and no entries of its own.
#[must_use]
pub fn behind(route: &RouteProgram, account: &RouteAccount, figure: &Figure) -> Vec<Contribution> {
    let size = |c: &Contribution| match c {
        Contribution::Posting { amount_si, .. } | Contribution::Spending { amount_si, .. } => amount_si.abs(),
    };
    let mut out = Vec::new();
    match &figure.how {
        How::Sum(terms) => {
            for (index, posting) in account.trace.postings.iter().enumerate() {
                let mut amount_si = 0.0;
                for term in terms.iter().filter(|t| t.material == posting.material) {
                    let here = match term.direction {
                        Direction::Into => posting.to,
                        Direction::OutOf => posting.from,
                    };
                    let gone = left_again(posting, term.place, term.direction);
                    if here == term.place || gone {
                        let kg = posting.kg_a_year() * if gone { -1.0 } else { 1.0 };
                        amount_si += match term.factor {
                            Factor::One => kg,
                            Factor::Minus => -kg,
                            Factor::Times(factor) => kg * factor,
                            Factor::Over(slot) => {
                                route.inputs.get(slot.0 as usize).map_or(0.0, |i| kg / i.central_si)
                            }
                        };
                    }
                }
                if amount_si != 0.0 {
                    out.push(Contribution::Posting { index, amount_si });
                }
            }
        }
        How::Spent(utility) => {
            for (index, spending) in account.trace.spendings.iter().enumerate() {
                let amount_si = spending.amount_si * spending.runs_a_year;
                if spending.utility == *utility && amount_si != 0.0 {
                    out.push(Contribution::Spending { index, amount_si });
                }
            }
        }
        How::Lines(lines) => {
            let central = route.central();
            for line in lines {
                let factor = line.factor(Draw(&central));
                match line.of {
                    Entry::Cell(place, direction, material) => {
                        for (index, p) in account.trace.postings.iter().enumerate() {
                            let here = if direction == Direction::Into { p.to } else { p.from };
                            let gone = left_again(p, place, direction);
                            if (here == place || gone) && p.material == material && p.kg != 0.0 {
                                let amount_si = p.kg_a_year() * if gone { -factor } else { factor };
                                out.push(Contribution::Posting { index, amount_si });
                            }
                        }
                    }
                    Entry::Spent(utility) => {
                        for (index, s) in account.trace.spendings.iter().enumerate() {
                            if s.utility == utility && s.amount_si != 0.0 {
                                let amount_si = s.amount_si * s.runs_a_year * factor;
                                out.push(Contribution::Spending { index, amount_si });
                            }
                        }
                    }
                    // What stands behind a figure stands there, with this line's factor.
                    Entry::Figure(i) => {
                        let Some(figure) = account.figures.get(i) else { continue };
                        let parts = behind(route, account, figure);
                        // Whole things are shared out over what fills them.
                        let mut factor = factor;
                        if matches!(figure.how, How::Containers { .. } | How::Whole(_)) {
                            let mut sum = 0.0;
                            for part in &parts {
                                sum += size(part);
                            }
                            factor *= if sum > 0.0 { account.values[i] / sum } else { 0.0 };
                        }
                        for c in parts {
                            out.push(match c {
                                Contribution::Posting { index, amount_si } => {
                                    Contribution::Posting { index, amount_si: amount_si * factor }
                                }
                                Contribution::Spending { index, amount_si } => {
                                    Contribution::Spending { index, amount_si: amount_si * factor }
                                }
                            });
                        }
                    }
                    Entry::One | Entry::Extractions | Entry::Batches | Entry::Both(..) => {}
                }
            }
        }
        How::Whole(of) => {
            if let Some(figure) = account.figures.get(*of) {
                return behind(route, account, figure);
            }
        }
        How::Containers { of, .. } => {
            if let Some(of) = account.figures.get(*of) {
                return behind(route, account, of);
            }
        }
        How::Ratio { .. } | How::Times { .. } => {}
    }
    order::sort(&mut out, &|a, b| size(a) > size(b));
    out
}

/// A posting in words: "condenser loss: n-hexane from liquor to hood, step 1 (Soxhlet extraction)".
#[must_use]
pub fn describe(route: &RouteProgram, site: &SiteUse, posting: &Posting) -> String {
    let rule = rule_of(route, posting.step, posting.rule).map_or("", |r| r.name);
    let name = route.materials.get(posting.material.0 as usize).map_or("", |m| m.name.as_str());
    let place = |p: Place| place_name(site, p);
    let by = match posting.step {
        StepIx::Opening => "before the first step".to_owned(),
        StepIx::Closing => "at the end".to_owned(),
        StepIx::Step(i) => {
            let title = route.steps.get(i as usize).map_or("", |s| s.technique.title);
            format!("step {} ({title})", i + 1)
        }
    };
    format!("{rule}: {name} from {} to {}, {by}", place(posting.from), place(posting.to))
}
